"""What a page is made of, before it is written as HTML or LaTeX: plain data for the templates."""

from __future__ import annotations

from collections import Counter
from collections.abc import Sequence
from contextlib import suppress
from dataclasses import dataclass, replace
from pathlib import Path

from ..api import Rewriting
from ..sheet import SurdwiseError, read_line
from ..sheet.tree import Comparison, Condition, Fact, Line, Sheet
from ..thesis.parts import Form
from ..verdict.outcome import Decision, Figure, Verdict
from ..verdict.repair import repaired
from .draft import draft
from .fit import figure_picture
from .formula import Formula, formula
from .landmarks import TruthMap
from .maps import SECONDS, truth_map
from .picture import Picture

LONG = 120  # terms of a polynomial that a page still prints


@dataclass(frozen=True)
class CertificateNote:
    """The certificate that goes with a page: its file, the digest (SHA-256) a referee compares, how
    many steps it has and the command that rechecks it."""

    file: str
    digest: str
    steps: int = 0
    command: str = ""

    @property
    def recheck(self) -> str:
        """The command to run."""
        return self.command or f"surdwise recheck {self.file}"


@dataclass(frozen=True)
class Said:
    """A condition or claim: typeset where it reads as one, else its text."""

    text: str
    formula: Formula | None


def said(text: str) -> Said:
    """A printed condition or claim, read back for typesetting."""
    with suppress(SurdwiseError):
        return Said(text, formula(read_line("provided", text)))
    return Said(text, None)


@dataclass(frozen=True)
class ProofLine:
    """A line of the sheet as printed, with the editor's mark: none, stet, insert, delete, query."""

    number: str
    keyword: str
    body: Said
    mark: str = ""


@dataclass(frozen=True)
class DrawnFigure:
    """A figure with the claim true or false in it."""

    kind: str
    picture: Picture
    rows: tuple[tuple[str, str, str, str], ...]  # point, exact x, exact y, floats


@dataclass(frozen=True)
class VariantRow:
    """A signed form of the claim and where it holds."""

    letter: str
    claim: Said
    where: Said | None
    note: str
    as_written: bool


@dataclass(frozen=True)
class LinkRow:
    """A link of a chain."""

    claim: Said
    verdict: str
    condition: Said | None
    equality: Said | None


@dataclass(frozen=True)
class CostRow:
    """A formulation, what it costs and what it lets in."""

    name: str
    numbers: tuple[str, ...]
    seconds: str
    status: str
    foreign: str
    why_not: str
    polynomials: tuple[str, ...]
    omitted: str


@dataclass(frozen=True)
class ClaimPart:
    """One claim's part of the page."""

    number: int
    anchor: str
    title: str
    source: str
    file: str
    claim: Said
    decision: Decision
    gloss: str
    condition: Said | None
    equality: Said | None
    unexamined: bool
    lines: tuple[ProofLine, ...]
    repaired: str
    figures: tuple[DrawnFigure, ...]
    map: TruthMap | None
    map_why_not: str
    links: tuple[LinkRow, ...]
    variants: tuple[VariantRow, ...]
    costs: tuple[CostRow, ...]
    costs_why_not: str
    symbols: tuple[str, ...]
    degenerate: tuple[str, ...]
    parameters: tuple[str, ...]
    components: tuple[str, ...]
    notes: tuple[str, ...]

    @property
    def verdict(self) -> str:
        """The verdict's word."""
        return self.decision.verdict.value


def claim_parts(
    sheet: Sheet,
    decisions: Sequence[Decision],
    rewritings: Sequence[Rewriting],
    first: int,
    map_seconds: float = SECONDS,
) -> list[ClaimPart]:
    """One part for each claim of a sheet, numbered from `first`."""
    out = []
    for i, (line, d) in enumerate(zip(sheet.claims, decisions, strict=True)):
        r = next((x for x in rewritings[i : i + 1]), None)
        out.append(_part(sheet, line, d, r, first + i, map_seconds))
    return out


def _part(
    sheet: Sheet, line: Line, d: Decision, r: Rewriting | None, number: int, map_seconds: float
) -> ClaimPart:
    claim: Condition = line.body  # type: ignore[assignment]
    chart, why_not = None, ""
    if d.verdict is not Verdict.EMPTY and d.parameters and map_seconds > 0:
        chart = truth_map(sheet, line, d, map_seconds)
    if chart is None and d.verdict is not Verdict.EMPTY:
        why_not = _no_map(d, map_seconds)
    variants = _variants(d)
    symbols = () if r is None else tuple(r.legend())
    return ClaimPart(
        number=number,
        anchor=f"claim-{number}",
        title=sheet.title or "Untitled",
        source=sheet.source,
        file=Path(sheet.file).name,
        claim=Said(line.text, formula(claim)),
        decision=d,
        gloss=GLOSS[d.verdict],
        condition=_shown(d.condition),
        equality=_shown(d.equality),
        unexamined=any(w.endswith("not examined") for w in d.degenerate),
        lines=_proof_lines(sheet, line, d),
        repaired=repaired(replace(sheet, claims=(line,)), [d]),
        figures=_figures(sheet, claim, d),
        map=chart,
        map_why_not=why_not,
        links=tuple(
            LinkRow(said(x.claim), x.verdict.value, _shown(x.condition), _shown(x.equality)) for x in d.links
        ),
        variants=variants,
        costs=() if r is None else _costs(r, d, variants),
        costs_why_not="" if r is None or r.thesis is not None else r.why_not,
        symbols=symbols,
        degenerate=d.degenerate,
        parameters=d.parameters,
        components=_components(d),
        notes=tuple(x for x in (d.reason, d.explanation) if x),
    )


GLOSS = {
    Verdict.HOLDS: "The statement is true on every admitted figure.",
    Verdict.CONDITIONAL: "The statement is true on some admitted figures and false on others.",
    Verdict.FAILS: "The statement is false on every admitted figure outside a thin set.",
    Verdict.EMPTY: "No real figure meets every line of the sheet.",
    Verdict.UNDECIDED: "The statement was not settled within the limits.",
}


def _no_map(d: Decision, map_seconds: float) -> str:
    n = len(d.parameters)
    if n == 0:
        return "No map: the figure has no free parameter."
    if n > 2:
        return f"No map: the figure has {n} free parameters, and a map shows at most two."
    return "No map was drawn within the time allowed." if map_seconds > 0 else "No map was asked for."


def _shown(text: str | None) -> Said | None:
    if text is None:
        return None
    return Said(text, None) if text in ("never", "always") else said(text)


def mendable(d: Decision) -> bool:
    """Whether the printed condition can be pasted into the sheet."""
    return d.verdict is Verdict.CONDITIONAL and d.condition is not None and not d.in_frame


def _proof_lines(sheet: Sheet, line: Line, d: Decision) -> tuple[ProofLine, ...]:
    out = []
    for x in (*sheet.given, *sheet.provided):
        body = formula(x.body) if isinstance(x.body, (Fact, Comparison)) or x.body else None
        out.append(ProofLine(str(x.span.line or ""), x.keyword, Said(x.text, body)))
    if mendable(d):
        assert d.condition is not None
        out.append(ProofLine("", "provided", said(d.condition), "insert"))
    marks = {
        Verdict.HOLDS: "stet",
        Verdict.FAILS: "delete",
        Verdict.CONDITIONAL: "" if mendable(d) else "query",
    }
    mark = marks.get(d.verdict, "query")
    out.append(ProofLine(str(line.span.line or ""), "claim", Said(line.text, formula(line.body)), mark))
    return tuple(out)


def _figures(sheet: Sheet, claim: Condition, d: Decision) -> tuple[DrawnFigure, ...]:
    out = []
    for kind, figure in (("true", d.holds_at), ("false", d.fails_at)):
        if figure is None:
            continue
        points = {n: p.float for n, p in figure.items()}
        title = "A figure where the claim holds" if kind == "true" else "A figure where the claim fails"
        picture = figure_picture(draft(sheet.given, points, claim), title, _words(figure))
        rows = tuple(
            (n, p.exact[0], p.exact[1], f"({_short(p.float[0])}, {_short(p.float[1])})")
            for n, p in figure.items()
        )
        out.append(DrawnFigure(kind, picture, rows))
    return tuple(out)


def _words(figure: Figure) -> str:
    spots = "; ".join(f"{n} at ({_short(p.float[0])}, {_short(p.float[1])})" for n, p in figure.items())
    return f"Points: {spots}."


def _short(x: float) -> str:
    text = f"{x:.4f}".rstrip("0").rstrip(".")
    return "0" if text in ("-0", "") else text.replace("-", "−")


def _variants(d: Decision) -> tuple[VariantRow, ...]:
    out = []
    for i, v in enumerate(d.variants):
        where = None if v.condition is None else said(v.condition)
        note = "on a region without a short name" if v.condition is None else ""
        if not v.exact:
            note = (note + "; " if note else "") + "and on a thin set besides"
        out.append(VariantRow(chr(ord("a") + i), said(v.claim), where, note, v.as_written))
    return tuple(out)


def _components(d: Decision) -> tuple[str, ...]:
    """The components of the hypotheses, like ones counted together."""
    out = []
    for (degree, status, real), n in Counter((c.degree, c.status, c.real) for c in d.components).items():
        signs = [
            c.signs
            for c in d.components
            if (c.degree, c.status, c.real) == (degree, status, real) and c.signs
        ]
        tail = f", signs {' or '.join(signs)}" if real and 0 < len(signs) <= 3 else ""
        seen = "with real figures" if real else "without real figures"
        out.append(f"{n} of degree {degree}, {status}, {seen}{tail}")
    return tuple(out)


def _costs(r: Rewriting, d: Decision, variants: Sequence[VariantRow]) -> tuple[CostRow, ...]:
    out = []
    for f in r.formulations:
        foreign = [
            row.letter
            for row, v in zip(variants, d.variants, strict=True)
            if not v.as_written and f.form.value in v.admitted_by
        ]
        largest = str(f.largest) if f.largest < 10**9 else f"{float(f.largest):.1e}"
        numbers = (
            (str(f.unknowns), str(f.degree), str(f.terms), largest) if f.polynomials else ("", "", "", "")
        )
        polys: tuple[str, ...] = ()
        omitted = ""
        if f.polynomials and f.terms <= LONG:
            polys = tuple(r.export(f.form).split("\n"))
        elif f.polynomials:
            omitted = f"{f.terms} terms, not printed here; `surdwise rewrite` prints them."
        out.append(
            CostRow(
                FORM_NAMES[f.form],
                numbers,
                f"{f.seconds:.4f}" if f.polynomials else "",
                d.algebraic.get(f.form.value, ""),
                ", ".join(foreign) if foreign else ("none" if d.algebraic else ""),
                f.why_not,
                polys,
                omitted,
            )
        )
    return tuple(out)


FORM_NAMES = {f: f.value.replace("_", " ") for f in Form}
