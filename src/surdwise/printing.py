"""Decisions and rewritings as text for a terminal or a pipe."""

from __future__ import annotations

import sys
from textwrap import wrap

from .verdict.outcome import Decision, Figure, Verdict

WIDTH = 88
LABEL = 12

_COLOURS = {
    Verdict.HOLDS: "32",
    Verdict.CONDITIONAL: "33",
    Verdict.FAILS: "31",
    Verdict.EMPTY: "35",
    Verdict.UNDECIDED: "36",
}


def decision_text(d: Decision, colour: bool) -> str:
    """One decision, labelled line by line."""
    out: list[str] = []

    def row(label: str, text: str, code: str = "") -> None:
        lines = wrap(text, WIDTH - LABEL, break_long_words=False, break_on_hyphens=False) or [""]
        for i, line in enumerate(lines):
            body = f"\x1b[{code}m{line}\x1b[0m" if colour and code else line
            head = (label if i == 0 else "").ljust(LABEL)
            out.append((f"\x1b[2m{head}\x1b[0m" if colour else head) + body)

    row("claim", d.claim, "1")
    row("verdict", d.verdict.value.upper(), "1;" + _COLOURS[d.verdict])
    if d.verdict is Verdict.CONDITIONAL:
        row("holds", f"exactly when {d.condition}" if d.condition else "(no name found for where it holds)")
    if d.verdict is Verdict.FAILS:
        row("holds", _only(d.condition))
    if d.equality is not None:
        where = d.equality if d.equality in ("never", "always") else f"exactly when {d.equality}"
        limit = {None: "", "no": "; not sharp in the limit"}.get(d.sharp, f"; sharp in the limit, {d.sharp}")
        row("equality", where + limit)
    if d.reason:
        row("reason", d.reason)
    for x in d.links:
        tail = f", exactly when {x.condition}" if x.condition else ""
        same = f"; equality {x.equality}" if x.equality else ""
        row("link", f"{x.claim}: {x.verdict.value}{tail}{same}")
    for v in d.variants:
        if v.as_written:
            continue
        where = f"where {v.condition}" if v.condition else "on a region without a short name"
        row("variant", f"{v.claim}, {where}" + ("" if v.exact else " (and on a thin set besides)"))
    if d.holds_at is not None and d.verdict is not Verdict.HOLDS:
        row("true at", points_text(d.holds_at))
    if d.fails_at is not None:
        row("false at", points_text(d.fails_at))
    for w in d.degenerate:
        row("degenerate", w)
    if d.algebraic:
        row("algebra", "; ".join(f"{k.replace('_', ' ')}: {v}" for k, v in d.algebraic.items()))
    if d.frame:
        row("frame", d.frame)
    if d.explanation:
        row("in words", d.explanation)
    return "\n".join(out)


def _only(condition: str | None) -> str:
    if condition == "never":
        return "on no admitted figure"
    return f"only when {condition}" if condition else "at most on a thin set"


def points_text(f: Figure) -> str:
    """A witness figure on one line."""
    return ", ".join(f"{n} = ({p.exact[0]}, {p.exact[1]})" for n, p in f.items())


def wants_colour() -> bool:
    """Colour on a terminal, unless NO_COLOR says otherwise."""
    import os

    return sys.stdout.isatty() and not os.environ.get("NO_COLOR")


def table(head: list[str], rows: list[list[str]]) -> str:
    """A plain table; the first column flush left, the others right."""
    widths = [max(len(r[i]) for r in [head, *rows]) for i in range(len(head))]
    lines = []
    for r in [head, *rows]:
        cells = [c.ljust(w) if i == 0 else c.rjust(w) for i, (c, w) in enumerate(zip(r, widths, strict=True))]
        lines.append("  ".join(cells).rstrip())
    return "\n".join(lines)
