"""Sheets, decisions and rewritings as a small piece of HTML, or as LaTeX."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from functools import singledispatch
from html import escape

from ..api import Rewriting
from ..field import ring
from ..field.ring import Poly
from ..report import mathml, texmath
from ..report.formula import formula, point_name
from ..sheet import Sheet, SheetError, read_line
from ..sheet.tree import Condition, Fact
from ..thesis import export
from ..thesis.formulations import Formulation
from ..verdict.outcome import Decision, Figure, Verdict

LONGEST = 600  # characters of a polynomial that are shown

_STYLE = "border-collapse:collapse;font-family:Georgia,serif"
_CELL = "text-align:left;vertical-align:top;padding:.15em .8em .15em 0"

Row = tuple[str, str]


@singledispatch
def html(obj: object) -> str:
    """A Sheet, Decision, Rewriting or Formulation as HTML with MathML; everything is escaped."""
    raise TypeError(f"expected a Sheet, Decision, Rewriting or Formulation, got {type(obj).__name__}")


@singledispatch
def latex(obj: object) -> str:
    """The same as LaTeX for display: one `aligned` between dollar signs."""
    raise TypeError(f"expected a Sheet, Decision, Rewriting or Formulation, got {type(obj).__name__}")


def _table(rows: Iterable[Row]) -> str:
    """Rows of a label, escaped here, and a cell that is HTML already."""
    body = "".join(
        f'<tr><th scope="row" style="{_CELL};font-weight:normal;font-style:italic">{escape(label)}</th>'
        f'<td style="{_CELL}">{cell}</td></tr>'
        for label, cell in rows
    )
    return f'<table class="surdwise" style="{_STYLE}"><tbody>{body}</tbody></table>'


def _aligned(rows: Iterable[Row]) -> str:
    """Rows of a label, escaped here, and a cell of running LaTeX."""
    body = " \\\\\n".join(rf"\textit{{{texmath.text(label)}}} &\quad \text{{{cell}}}" for label, cell in rows)
    return "$\\displaystyle\n\\begin{aligned}\n" + body + "\n\\end{aligned}\n$"


def _read(text: str) -> Fact | Condition | None:
    try:
        return read_line("claim", text)
    except SheetError:
        return None  # a comparison of polynomials in the frame, say


def _math(text: str) -> str:
    """A claim or condition; one that the sheet language does not have is read as a value."""
    node = _read(text)
    return mathml.value(text) if node is None else mathml.math(formula(node))


def _tex(text: str) -> str:
    node = _read(text)
    return texmath.value(text) if node is None else texmath.math(formula(node))


# ---------------------------------------------------------------- sheets


def _lines(sheet: Sheet) -> list[tuple[str, Fact | Condition]]:
    return [(x.keyword, x.body) for x in (*sheet.given, *sheet.provided, *sheet.claims)]


@html.register
def _(sheet: Sheet) -> str:
    head = [(k, escape(v)) for k, v in (("title", sheet.title), ("source", sheet.source)) if v]
    return _table([*head, *((keyword, mathml.math(formula(body))) for keyword, body in _lines(sheet))])


@latex.register
def _(sheet: Sheet) -> str:
    words = (("title", sheet.title), ("source", sheet.source))
    head = [(k, texmath.text(v)) for k, v in words if v]
    return _aligned([*head, *((keyword, texmath.math(formula(body))) for keyword, body in _lines(sheet))])


# ---------------------------------------------------------------- decisions


def _where(verdict: Verdict, condition: str | None) -> tuple[str, str]:
    """Words before the condition, and the condition (which may be missing)."""
    if verdict is Verdict.CONDITIONAL:
        return ("exactly when", condition) if condition else ("on a part of the figures without a name", "")
    if verdict is Verdict.FAILS:
        if condition == "never":
            return "on no admitted figure", ""
        return ("only when", condition) if condition else ("at most on a thin set", "")
    return "", ""


@html.register
def _(d: Decision) -> str:
    rows = [("claim", _math(d.claim)), ("verdict", f"<strong>{d.verdict.value}</strong>")]
    words, condition = _where(d.verdict, d.condition)
    if words:
        rows.append(("holds", escape(words) + (f" {_math(condition)}" if condition else "")))
    if d.equality is not None:
        rows.append(("equality", _equality_html(d.equality)))
    if d.reason:
        rows.append(("reason", escape(d.reason)))
    for x in d.links:
        tail = f", exactly when {_math(x.condition)}" if x.condition else ""
        rows.append(("link", f"{_math(x.claim)}: {x.verdict.value}{tail}"))
    for v in d.variants:
        if not v.as_written:
            tail = f", where {_math(v.condition)}" if v.condition else ""
            rows.append(("variant", _math(v.claim) + tail))
    if d.holds_at is not None and d.verdict is not Verdict.HOLDS:
        rows.append(("true at", _figure(d.holds_at)))
    if d.fails_at is not None:
        rows.append(("false at", _figure(d.fails_at)))
    rows += [("degenerate", escape(w)) for w in d.degenerate]
    if d.algebraic:
        rows.append(
            ("algebra", escape("; ".join(f"{k.replace('_', ' ')}: {v}" for k, v in d.algebraic.items())))
        )
    if d.frame:
        rows.append(("frame", escape(d.frame)))
    return _table(rows)


def _equality_html(equality: str) -> str:
    return equality if equality in ("never", "always") else f"exactly when {_math(equality)}"


def _figure(f: Figure) -> str:
    """Exact coordinates, one point after another."""
    spots = ((n, ", ".join(map(mathml.value, p.exact))) for n, p in f.items())
    return "; ".join(f"{_point(n)}&nbsp;=&nbsp;({where})" for n, where in spots)


def _point(name: str) -> str:
    return mathml.math(point_name(name))


@latex.register
def _(d: Decision) -> str:
    rows = [("claim", _tex(d.claim)), ("verdict", rf"\textbf{{{d.verdict.value}}}")]
    words, condition = _where(d.verdict, d.condition)
    if words:
        rows.append(("holds", words + (f" {_tex(condition)}" if condition else "")))
    if d.equality is not None:
        plain = d.equality in ("never", "always")
        rows.append(("equality", d.equality if plain else f"exactly when {_tex(d.equality)}"))
    if d.reason:
        rows.append(("reason", texmath.text(d.reason)))
    return _aligned(rows)


# ---------------------------------------------------------------- rewritings

_HEAD = ("formulation", "unknowns", "degree", "terms", "largest", "seconds", "status")


def _cost(f: Formulation, status: str = "") -> tuple[str, ...]:
    largest = str(f.largest) if f.largest < 10**9 else f"{float(f.largest):.1e}"
    name = f.form.value.replace("_", " ")
    return (name, *map(str, (f.unknowns, f.degree, f.terms)), largest, f"{f.seconds:.6f}", status)


def _costs(rows: Sequence[Sequence[str]]) -> str:
    head = "".join(f'<th style="{_CELL};font-weight:normal;font-style:italic">{h}</th>' for h in _HEAD)
    body = "".join(
        "<tr>" + "".join(f'<td style="{_CELL}">{escape(c)}</td>' for c in row) + "</tr>" for row in rows
    )
    inside = f"<thead><tr>{head}</tr></thead><tbody>{body}</tbody>"
    return f'<table class="surdwise" style="{_STYLE}">{inside}</table>'


def _names() -> dict[int, str]:
    """Names of the ring's variables for a formulation that stands alone."""
    return dict(enumerate([*reversed(ring.GEN_NAMES), *ring.PARAM_NAMES]))


def _shown(p: Poly, names: dict[int, str]) -> tuple[str, str]:
    """A polynomial as text, cut at a sign if it is long, and what to say of the rest."""
    text = export.plain(p, names)
    if len(text) <= LONGEST:
        return text + " = 0", ""
    cut = max(text.rfind(" + ", 0, LONGEST), text.rfind(" - ", 0, LONGEST))
    rest = text[cut:].count(" + ") + text[cut:].count(" - ")
    return text[:cut], f" … and {rest} more terms"


def _polynomials(f: Formulation, names: dict[int, str]) -> str:
    if not f.polynomials:
        return f"<div>not written down: {escape(f.why_not)}</div>"
    shown = [_shown(p, names) for p in f.polynomials]
    return "".join(f"<div>{mathml.flowing(text)}{more}</div>" for text, more in shown)


def _polynomials_tex(f: Formulation, names: dict[int, str]) -> list[Row]:
    label = f.form.value.replace("_", " ")
    if not f.polynomials:
        return [(label, texmath.text(f"not written down: {f.why_not}"))]
    shown = [_shown(p, names) for p in f.polynomials]
    return [(label, texmath.value(text) + texmath.text(more)) for text, more in shown]


@html.register
def _(f: Formulation) -> str:
    return _costs([_cost(f)]) + _polynomials(f, _names())


@latex.register
def _(f: Formulation) -> str:
    return _aligned(_polynomials_tex(f, _names()))


@html.register
def _(r: Rewriting) -> str:
    rows = [("claim", _math(r.claim))]
    if r.thesis is None:
        return _table([*rows, ("not rewritten", escape(r.why_not))])
    rows += [("where", escape(text)) for text in r.legend()]
    names = export.names(r.thesis)
    details = "".join(
        f"<details><summary>{f.form.value.replace('_', ' ')}</summary>{_polynomials(f, names)}</details>"
        for f in r.formulations
    )
    return (
        _table(rows) + _costs([_cost(f, r.statuses.get(f.form.value, "")) for f in r.formulations]) + details
    )


@latex.register
def _(r: Rewriting) -> str:
    rows = [("claim", _tex(r.claim))]
    if r.thesis is None:
        return _aligned([*rows, ("not rewritten", texmath.text(r.why_not))])
    names = export.names(r.thesis)
    rows += [row for f in r.formulations for row in _polynomials_tex(f, names)]
    return _aligned(rows)
