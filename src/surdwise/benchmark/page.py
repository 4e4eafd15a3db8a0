"""The benchmark as one HTML page that needs nothing else."""

from __future__ import annotations

from html import escape

from .. import __version__
from .chart import AXES, HATCH, charts, legend
from .choice import CHOICES
from .literal import Agreement
from .row import Row
from .run import Benchmark
from .show import HEAD, cells, claims, number

_STYLE = """
body { font: 16px/1.45 Georgia, "Times New Roman", serif; margin: 2rem auto; max-width: 74rem;
  padding: 0 1rem; color: #1c1c1c; background: #fffdf8 }
h1 { font-size: 1.4rem; font-weight: normal; border-bottom: 3px double #555; padding-bottom: .3rem }
h2 { font-size: 1.15rem; font-weight: normal; margin-top: 2rem }
h3 { font: .95rem ui-monospace, "DejaVu Sans Mono", monospace; margin: 1.5rem 0 .2rem }
table { border-collapse: collapse; font-variant-numeric: tabular-nums; font-size: .9rem }
caption { text-align: left; font-style: italic }
th, td { text-align: right; padding: .15rem .6rem; border-bottom: 1px solid #ccc }
th { font-weight: normal; font-style: italic }
th[scope=row], .scroll td:nth-child(2), th:first-child { text-align: left }
td.partial { font-style: italic } td.wrong { font-weight: bold; text-decoration: underline }
.scroll { overflow-x: auto }
figure { margin: 1rem 0 } figcaption { font-size: .85rem }
svg text { font: 12px Georgia, serif; fill: #1c1c1c }
svg .grid { stroke: #ddd } svg .limit { stroke: #1c1c1c; stroke-dasharray: 6 4 }
.item { white-space: nowrap; margin-right: 1rem } .item svg { vertical-align: middle }
p.note, dl { font-size: .85rem } dt { float: left; clear: left; width: 10rem } dd { margin-left: 10rem }
@media print { body { margin: 0; max-width: none; background: none } }
"""


def html(b: Benchmark) -> str:
    """The page."""
    parts = [
        f"<section><h2>{escape(a.name.capitalize())}</h2>{x}</section>"
        for a in AXES
        if (x := charts(a, b.rows, b.options.time_limit))
    ]
    facts = "".join(f"<dt>{escape(k)}</dt><dd>{escape(v)}</dd>" for k, v in b.machine.items())
    o = b.options
    limits = (
        f"{o.repeat} counted runs after {o.warm_up}; each in a process of its own, at most {o.time_limit:g} s"
        + (f" and {o.memory_limit} MiB" if o.memory_limit is not None else "")
        + ". Times are medians; MiB is the largest peak of memory beyond the start."
    )
    left = "".join(f"<li>{escape(c)} ({escape(f)}): {escape(w)}</li>" for f, c, w in b.left_out)
    return f"""<!DOCTYPE html>
<html lang="en">
<head>
<meta charset="utf-8">
<meta name="viewport" content="width=device-width, initial-scale=1">
<title>Formulations compared</title>
<style>{_STYLE}</style>
</head>
<body>
<h1>Formulations compared</h1>
<p>{len(claims(b))} claims, {len(b.rows)} measurements. {limits}</p>
<h2>Status against the literal verdict</h2>
{_agreements(b)}
{HATCH}
{legend()}
{"".join(parts)}
<h2>All numbers</h2>
{"".join(_claim(rows) for rows in claims(b))}
{f"<h2>Left out</h2><ul>{left}</ul>" if left else ""}
<h2>Machine</h2>
<dl>{facts}</dl>
<p class="note">surdwise {escape(__version__)}.</p>
</body>
</html>
"""


def _agreements(b: Benchmark) -> str:
    head = "".join(f'<th scope="col">{a.value}</th>' for a in Agreement)
    rows = []
    for c in CHOICES:
        mine = [r for r in b.rows if r.formulation == c]
        if not mine:
            continue
        counts = "".join(f"<td>{sum(r.agreement == a.value for r in mine)}</td>" for a in Agreement)
        rows.append(f'<tr><th scope="row">{escape(c.replace("_", " "))}</th>{counts}</tr>')
    words = (
        "agrees: says what is literally true; partial: true on parts where it holds or fails; wrong: "
        "generally true of a claim that is false somewhere, or generally false of one true somewhere; "
        "open: no status within the limits"
    )
    return (
        f'<table class="counts"><caption>{words}</caption>'
        f'<thead><tr><th scope="col">formulation</th>{head}</tr></thead>'
        f"<tbody>{''.join(rows)}</tbody></table>"
    )


def _claim(rows: list[Row]) -> str:
    first = rows[0]
    size = max(rows, key=lambda r: r.parameters is not None)
    head = "".join(f'<th scope="col">{escape(h)}</th>' for h in HEAD)
    body = []
    for r in rows:
        name, *rest = cells(r)
        inside = "".join(f"<td>{escape(x)}</td>" for x in rest[:-1])
        hint = f' title="{escape(r.words)}"' if r.words else ""
        body.append(
            f'<tr{hint}><th scope="row">{escape(name)}</th>{inside}'
            f'<td class="{r.agreement}">{rest[-1]}</td></tr>'
        )
    known = (
        f"{first.title} ({first.file}); literally {first.literal}; parameters {number(size.parameters)}, "
        f"components {number(size.components)}, lengths {number(size.radicals)}"
    )
    return (
        f'<h3>{escape(first.claim)}</h3><p class="note">{escape(known)}</p>'
        f'<div class="scroll"><table><thead><tr>{head}</tr></thead>'
        f"<tbody>{''.join(body)}</tbody></table></div>"
    )
