"""The summary page: every claim of a review in one table, with links to the report pages."""

from __future__ import annotations

from collections import Counter
from collections.abc import Mapping, Sequence
from html import escape
from urllib.parse import quote

from .. import __version__
from .result import UNREADABLE, Result
from .show import tally

_STYLE = """
body { font: 16px/1.45 Georgia, "Times New Roman", serif; margin: 2rem auto; max-width: 70rem;
  padding: 0 1rem; color: #1c1c1c; background: #fffdf8 }
h1 { font-size: 1.4rem; font-weight: normal; border-bottom: 3px double #a33; padding-bottom: .3rem }
table { border-collapse: collapse; width: 100% }
th, td { text-align: left; vertical-align: top; padding: .3rem .6rem; border-bottom: 1px solid #ddd3c0 }
th { font-weight: normal; font-style: italic }
td.seconds, th.seconds { text-align: right; font-variant-numeric: tabular-nums }
td.claim { font-family: ui-monospace, "DejaVu Sans Mono", monospace; font-size: .85rem }
td.verdict { font-variant: small-caps; white-space: nowrap }
tr.holds td.verdict { color: #1d6b36 }
tr.conditional td.verdict { color: #8a5a00 }
tr.fails td.verdict, tr.empty td.verdict, tr.unreadable td.verdict { color: #a01c1c }
tr.undecided td.verdict { color: #1f5d85 }
p.note { font-size: .85rem }
@media print { body { margin: 0; max-width: none; background: none } a { color: inherit } }
"""

_USE = (
    "Exact mathematics of the ideal figure. Where a result may steer physical work, tolerances, local codes "
    "and licensed practice decide the rest."
)


def summary_html(folder: str, results: Sequence[Result], pages: Mapping[str, str]) -> str:
    """A page that needs nothing else; `pages` are the report pages by file name, as paths seen
    from this page."""
    counts = tally(Counter(r.verdict for r in results))
    bad = sum(r.verdict == UNREADABLE for r in results)
    counts += f"; {bad} unreadable" if bad else ""
    rows = "\n".join(_row(r, pages.get(r.name)) for r in results)
    return f"""<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>Review of {escape(folder)}</title>
<style>{_STYLE}</style>
</head>
<body>
<h1>Review of {escape(folder)}</h1>
<p>{len(results) - bad} claims: {escape(counts)}</p>
<table>
<thead><tr><th>file</th><th>claim</th><th>verdict</th><th>where it holds, or why not known</th>
<th class="seconds">seconds</th></tr></thead>
<tbody>
{rows}
</tbody>
</table>
<p class="note">surdwise {escape(__version__)}. {_USE}</p>
</body>
</html>
"""


def _row(r: Result, page: str | None) -> str:
    name = escape(r.name)
    if page is not None:
        name = f'<a href="{quote(page)}">{name}</a>'
    return (
        f'<tr class="{r.verdict}"><td>{name}</td><td class="claim">{escape(r.label)}</td>'
        f'<td class="verdict">{r.verdict}</td><td>{escape(r.message)}</td>'
        f'<td class="seconds">{r.seconds:.3f}</td></tr>'
    )
