"""Decide a claim: survey the figure, name where the claim holds, prove the name."""

from __future__ import annotations

import time
from collections.abc import Callable, Sequence
from dataclasses import replace

from ..field import roots
from ..field.cells import TooManyCells, never_zero
from ..field.real import Unsettled
from ..field.ring import PARAM_NAMES, TooLarge, is_constant
from ..field.tower import Element
from ..figure.conditions import EQUATIONS, is_closed
from ..figure.program import Program, program
from ..figure.vocabulary.placements import CARTESIAN
from ..sheet.show import show
from ..sheet.tree import Comparison, Condition, Line, Relation, Sheet
from .ahead import Ahead, look_ahead
from .algebraic import AlgebraicSide, algebraic_side, dominant
from .conflict import conflict
from .explain import explain
from .frames import frames_by_cost
from .limit import sharpness
from .naming import Case, links_of
from .outcome import Decision, Link, Variant, Verdict
from .survey import OutOfTime, Place, Survey
from .variants import patterns, signed, terms
from .witness import witness
from .words import in_frame, said

NAMING_SECONDS = 20.0


def verdict_of(places: Sequence[Place], i: int) -> Verdict:
    """The verdict on statement i from all places."""
    if not places:
        return Verdict.EMPTY
    full = max(p.dimension for p in places)
    if all(p.truths[i] for p in places):
        return Verdict.HOLDS
    if any(p.truths[i] for p in places if p.dimension == full):
        return Verdict.CONDITIONAL
    return Verdict.FAILS


def decide_claim(
    sheet: Sheet,
    line: Line,
    time_limit: float,
    progress: Callable[[str], None] = lambda text: None,
    frame: str | None = None,
    report: Callable[[Decision], None] = lambda known: None,
) -> Decision:
    """Decide one claim within a time limit in seconds; `frame` forces a frame.

    Else the frames that can hold the sheet are tried, the cheapest first, until an answer leaves
    nothing open; of answers with gaps the first of the best kind stands.
    """
    start = time.monotonic()
    claim: Condition = line.body  # type: ignore[assignment]
    end = start + time_limit
    best: Decision | None = None

    def tell(known: Decision) -> None:
        if best is None or _gaps(known) < _gaps(best):
            report(known)

    def tick() -> None:
        if time.monotonic() > end:
            raise OutOfTime

    ahead = Ahead()
    kinds: list[str] = []
    blank = Decision(sheet.file, sheet.title, show(claim), Verdict.UNDECIDED)
    try:
        ahead = look_ahead(sheet, claim, blank, tick)
        if ahead.known is not None:
            report(ahead.known)
        kinds = [frame] if frame else frames_by_cost(sheet, claim)
        if ahead.lemmas:
            kinds.sort(key=lambda k: k != CARTESIAN)
    except OutOfTime:
        best = replace(blank, reason=f"the time limit of {time_limit:g} s was reached")
    except (TooLarge, TooManyCells, Unsettled) as e:
        best = replace(blank, reason=str(e))
    for i, kind in enumerate(kinds):
        left = end - time.monotonic()
        last = i == len(kinds) - 1
        case = Case(
            sheet,
            program(sheet, kind),
            time.monotonic() + (left if last else left / 2),
            progress,
            tell,
            lemmas=ahead.lemmas,
            known=ahead.known,
        )
        out = _in_frame(case, claim, blank, time_limit)
        if best is None or _gaps(out) < _gaps(best):
            best = out
            report(best)
        if not _gaps(best) or end - time.monotonic() < 0.1 * time_limit:
            break
    assert best is not None
    return replace(best, seconds=round(time.monotonic() - start, 6))


def _in_frame(case: Case, claim: Condition, blank: Decision, time_limit: float) -> Decision:
    try:
        return _decided(case, claim, blank)
    except OutOfTime:
        why = f"the time limit of {time_limit:g} s was reached"
    except (TooLarge, TooManyCells, Unsettled) as e:
        why = str(e)
    known = case.known or blank
    return replace(known, reason=f"{known.reason}{why}")


def _gaps(d: Decision) -> int:
    """How much an answer leaves open: 0 nothing, 3 everything."""
    if d.verdict is Verdict.UNDECIDED:
        return 3
    unseen = any(w.endswith("not examined") for w in d.degenerate)
    return unseen + bool(d.reason and d.verdict is not Verdict.EMPTY)


def _decided(case: Case, claim: Condition, blank: Decision) -> Decision:
    parts = links_of(claim)
    equalities = [_equality(c) for c in parts]
    whats = [claim]
    if len(parts) > 1:
        whats += parts
    whats += [c for c in equalities if c is not None]
    # the continuity lemma speaks of the claim alone
    plain = len(whats) == 1 and is_closed(claim)
    found = case.survey([case.statement(c) for c in whats], closed=plain)
    verdict = verdict_of(found.places, 0)
    out = replace(
        blank,
        verdict=verdict,
        parameters=_parameters(case.program, found),
        frame=_frame(case.program, found),
        degenerate=_degenerate(found),
    )
    if verdict is Verdict.EMPTY:
        return replace(out, reason=_why_empty(case, found))
    out = replace(
        out,
        holds_at=witness(case.program, found.places, 0, True),
        fails_at=witness(case.program, found.places, 0, False),
    )
    case.known = replace(out, reason="the verdict is proved; naming where it holds was stopped: ")
    case.report(case.known)
    side: AlgebraicSide | None = None
    if is_equality(claim):
        assert isinstance(claim, (Comparison, Relation))
        side = algebraic_side(dominant(found.components), claim, found.places, case.tick)
        out = replace(out, algebraic=side.statuses, components=side.components)
    try:
        case.deadline = min(case.deadline, time.monotonic() + NAMING_SECONDS)
        out = _explained(case, whats, parts, found, out, side)
        plane = max(p.dimension for p in found.places) <= 2
        if out.equality == "never" and out.verdict is Verdict.HOLDS and plane:
            assert isinstance(claim, Comparison)
            out = replace(out, sharp=sharpness(case, claim))
    except OutOfTime:
        out = replace(out, reason="the verdict is proved; naming where it holds ran out of time")
    late = [f"{w}: not examined" for w in sorted(case.unexamined)]
    out = replace(out, degenerate=tuple(dict.fromkeys((*out.degenerate, *late))))
    total, true = (side.total, side.true) if side is not None else (0, 0)
    proofs = "".join(f" {x.words}." for x in case.lemmas)
    return replace(out, explanation=explain(out, total, true) + proofs)


def is_equality(c: Condition) -> bool:
    """Whether a claim says that something vanishes."""
    if isinstance(c, Comparison):
        return c.ops == ("=",)
    return isinstance(c, Relation) and c.form in EQUATIONS


def _explained(
    case: Case,
    whats: list[Condition],
    parts: Sequence[Condition],
    found: Survey,
    out: Decision,
    side: AlgebraicSide | None,
) -> Decision:
    """The decision with its side condition, equality cases, links and variants."""
    claim = whats[0]
    forms: list[Condition] = []
    written = -1
    if out.verdict is not Verdict.HOLDS and len(parts) == 1 and isinstance(claim, Comparison):
        forms = _signed_forms(claim)
    if forms:
        first = case.survey([case.statement(c) for c in forms], closed=False, shallow=True)
        full = max((p.dimension for p in first.places), default=0)
        top = [p for p in first.places if p.dimension == full]
        keep = [i for i in range(len(forms)) if any(p.truths[i] for p in top)]
        written = keep.index(0) if 0 in keep else -1
        forms = [forms[i] for i in keep]
    if forms:
        whats = [*whats, *forms]
        found = case.survey([case.statement(c) for c in whats], closed=False)
    n = len(whats) - len(forms)
    said_ = _where(case, whats, found, n)
    where, exact_ = [w for w, _, _ in said_], [e for _, e, _ in said_]
    if out.verdict in (Verdict.CONDITIONAL, Verdict.FAILS):
        out = replace(out, condition=where[0], in_frame=said_[0][2])
        if where[0] is None:
            out = replace(out, reason="the verdict is proved; no short name was found for where it holds")
    if len(parts) == 1 and n == 2:
        settled = not found.not_examined or where[1] != "never"
        out = replace(out, equality=where[1] if settled else None)
    if len(parts) > 1:
        links = []
        k = 1 + len(parts)
        for i, c in enumerate(parts, start=1):
            same = None
            if _equality(c) is not None:
                same = where[k]
                k += 1
            v = verdict_of(found.places, i)
            links.append(
                Link(
                    show(c),
                    v,
                    where[i] if v in (Verdict.CONDITIONAL, Verdict.FAILS) else None,
                    same,
                    witness(case.program, found.places, i, True),
                    witness(case.program, found.places, i, False),
                )
            )
        out = replace(out, links=tuple(links))
    variants = []
    for i, c in enumerate(forms):
        comps = {id(p.comp) for p in found.places if p.truths[n + i]}
        variants.append(
            Variant(
                show(c),
                where[n + i],
                exact_[n + i],
                witness(case.program, found.places, n + i, True),
                i == written,
                () if side is None else side.admitting(comps),
            )
        )
    return replace(out, variants=tuple(variants))


def _only(s: Survey, keep: Sequence[int]) -> Survey:
    """The survey with some of its statements."""
    places = [replace(p, truths=tuple(p.truths[i] for i in keep)) for p in s.places]
    return replace(s, places=places)


def _where(
    case: Case, whats: Sequence[Condition], found: Survey, strict: int
) -> list[tuple[str | None, bool, bool]]:
    """Where each statement holds, in words, whether the words are exact on thin sets too, and
    whether they speak of the frame; the first `strict` statements get exact words or none."""
    out: list[tuple[str | None, bool, bool]] = [(None, True, False)] * len(whats)
    todo = []
    for i in range(len(whats)):
        truths = {bool(p.truths[i]) for p in found.places}
        if truths == {True}:
            out[i] = ("always", True, False)
        elif truths == {False}:
            # true nowhere that was looked at; `never` only if everything was
            out[i] = (None if found.not_examined else "never", True, False)
        else:
            todo.append(i)
    if todo:
        loose = frozenset(k for k, i in enumerate(todo) if i >= strict)
        answers = case.named([whats[i] for i in todo], _only(found, todo), loose)
        for i, a in zip(todo, answers, strict=True):
            c = a.condition
            out[i] = (None if c is None else said(c), a.exact, c is not None and in_frame(c))
    return out


def _equality(c: Condition) -> Condition | None:
    """The equality case of an inequality."""
    if isinstance(c, Comparison) and c.ops[0] != "=":
        return Comparison(c.items, ("=",))
    return None


def _signed_forms(claim: Comparison) -> list[Condition]:
    """Signed forms of an equality."""
    ts = terms(claim)
    if ts is None:
        return []
    return [c for c in (signed(ts, p) for p in patterns(ts)) if c is not None]


# ---------------------------------------------------------------- words about the figure


def _parameters(prog: Program, found: Survey) -> tuple[str, ...]:
    used = sorted({k for p in found.places for k in p.comp.free})
    out = []
    for k in used:
        at_zero = any(k in p.comp.folded for p in found.places)
        positive = all(k in p.comp.positive for p in found.places if k in p.comp.free)
        range_ = f", {PARAM_NAMES[k]} {'>=' if at_zero else '>'} 0" if positive else ""
        out.append(f"{PARAM_NAMES[k]}: {prog.frame.labels.get(k, '')}{range_}")
    return tuple(out)


def _frame(prog: Program, found: Survey) -> str:
    for p in found.places[:1]:
        spots = []
        for n, v in list(p.comp.points.items())[:3]:
            spots.append(f"{n} = ({_coordinate(v.x)}, {_coordinate(v.y)})")
        halved = ", ".join(t.split(", ")[-1] for t in _parameters(prog, found) if t.endswith(" 0"))
        scale = "" if prog.frame.keeps_scale else ", up to similarity"
        if halved:
            scale += f" and reflection ({halved})" if scale else f", up to reflection ({halved})"
        return FRAME_NAMES[prog.frame.kind] + ": " + ", ".join(spots) + scale
    return FRAME_NAMES[prog.frame.kind]


FRAME_NAMES = {
    "cartesian": "Cartesian",
    "sides": "side lengths",
    "half-angles": "half angles",
    "incircle": "about the incircle",
}


def _coordinate(e: Element) -> str:
    text = repr(e)[1:-1]
    for g in e.tower.gens:
        if g.radicand is not None and is_constant(g.radicand):
            text = text.replace(f"g{g.index}", f"sqrt({g.radicand})")
    return text if len(text) <= 40 else "..."


def _degenerate(found: Survey) -> tuple[str, ...]:
    """Positions at which a made point or the claim is not defined, in words."""
    words: list[str] = []
    if found.top is not None:
        for c in found.top.components:
            shut: set[str] = set()
            for r in c.requires:
                shut |= set(roots.norm_factors(Element(c.tower, r.element.num, r.element.den)))
            for g in c.guards:
                zeros = roots.norm_factors(Element(c.tower, g.element.num, g.element.den))
                real = [n for n, p in zeros.items() if n not in shut and not never_zero(p, c.positive)]
                if real and g.words not in words:
                    words.append(g.words)
    words += [w for w in sorted(found.undefined) if w not in words]
    words += [f"{w}: not examined" for w in dict.fromkeys(found.not_examined)]
    return tuple(words)


def _why_empty(case: Case, found: Survey) -> str:
    words = conflict(case)
    if words:
        return words
    if not found.dead:
        return "no real figure meets every line of the sheet"
    step, why = max(found.dead)
    return f"line {case.program.lines[step].span.line}: {why}"
