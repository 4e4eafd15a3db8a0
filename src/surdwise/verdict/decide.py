"""Decide a claim: survey the figure, name where the claim holds, prove the name."""

from __future__ import annotations

import time
from collections.abc import Callable, Sequence
from dataclasses import dataclass, replace

from ..field import exact, ring, roots
from ..field.ball import between, branch_parameters
from ..field.cells import TooManyCells, never_zero
from ..field.near import NearBranch
from ..field.real import Branch, Unsettled, branches
from ..field.ring import PARAM_NAMES, TooLarge, is_constant
from ..field.tower import Element
from ..figure.component import Component
from ..figure.conditions import EQUATIONS, Judge, is_closed, is_open, truth
from ..figure.program import Program, program
from ..sheet.show import show
from ..sheet.tree import Comparison, Condition, Line, Relation, Sheet
from .algebraic import AlgebraicSide, algebraic_side, dominant
from .candidates import Candidate, candidates
from .explain import explain
from .frames import cheapest_frame
from .outcome import Decision, Figure, Link, PlacedPoint, Variant, Verdict
from .spot import Undefined
from .survey import OutOfTime, Place, Statement, Survey, Surveyor
from .variants import patterns, signed, terms
from .words import Lexicon, in_frame, name, said

PROOF_ROUNDS = 6
NAMING_PLACES = 120
NAMING_SECONDS = 20.0


def statement(c: Condition) -> Statement:
    """A condition as something to be judged."""
    return lambda j: truth(c, j)


def agrees(claim: Condition, guess: Condition) -> Statement:
    """Whether claim and guess are true or false together (an undefined guess disagrees)."""

    def judge(j: Judge) -> bool:
        t = truth(claim, j)
        try:
            return truth(guess, j) == t
        except Undefined:
            return False

    return judge


@dataclass
class Case:
    """The sheet's figure under examination for one claim."""

    sheet: Sheet
    program: Program
    deadline: float
    progress: Callable[[str], None]
    lexicon: Lexicon | None = None

    def tick(self) -> None:
        """Stop when time is out."""
        if time.monotonic() > self.deadline:
            raise OutOfTime

    def survey(self, statements: Sequence[Statement], closed: bool, shallow: bool = False) -> Survey:
        """Survey all admitted figures (or open cells only) for some statements."""
        conditions: list[Condition] = [line.body for line in self.sheet.provided]  # type: ignore[misc]
        return Surveyor(
            self.program,
            [statement(c) for c in conditions],
            statements,
            self.deadline,
            closed=closed,
            open_conditions=all(is_open(c) for c in conditions),
            progress=self.progress,
            shallow=shallow,
        ).run()

    def words(self, found: Survey, claim: Condition) -> Lexicon:
        """The figure's vocabulary, and the borders of the survey as a last resort."""
        if self.lexicon is None:
            comps = _distinct([p.comp for p in found.places])
            last = [
                Candidate(Relation("frame_sign", (p, op)), 4.0 + 0.2 * len(p))  # type: ignore[arg-type]
                for p in found.borders.values()
                if len(p) <= 60
                for op in (">", "<", "=")
            ]
            self.lexicon = Lexicon([*candidates(self.sheet, comps, claim), *last])
        return self.lexicon

    def named(
        self, whats: Sequence[Condition], found: Survey, loose: frozenset[int] = frozenset()
    ) -> list[Name]:
        """For each statement (the i-th judged by the survey's i-th truth) a condition proved
        equivalent to it on every admitted figure, or none.

        Guess from the places, prove by a survey of the agreement, learn from the places where
        they differ.  For the `loose` statements a name that is right up to a thin set will do
        where no exact one is short.
        """
        lexicon = self.words(found, whats[0])
        full = max(p.dimension for p in found.places)
        pools = [_varied([(p, bool(p.truths[i])) for p in found.places]) for i in range(len(whats))]
        answers = [Name(None, True)] * len(whats)
        rough: set[int] = set()
        open_ = set(range(len(whats)))
        for _ in range(PROOF_ROUNDS):
            guesses: dict[int, Condition] = {}
            for i in sorted(open_):
                guess = None if i in rough else _guessed(lexicon, pools[i], whats[i], i not in loose)
                if guess is None and i in loose:
                    rough.add(i)
                    pools[i] = [(p, t) for p, t in pools[i] if p.dimension == full]
                    guess = _guessed(lexicon, pools[i], whats[i], True)
                if guess is not None:
                    guesses[i] = guess
            open_ = set(guesses)
            if not guesses:
                break
            keys = list(guesses)
            pairs: list[Statement] = [agrees(whats[i], guesses[i]) for i in keys]
            proof = self.survey([*pairs, *(statement(whats[i]) for i in keys)], closed=False)
            for k, i in enumerate(keys):
                wrong = [p for p in proof.places if not p.truths[k]]
                bad = [p for p in wrong if p.dimension == full] if i in rough else wrong
                if bad:
                    news = [(p, bool(p.truths[len(keys) + k])) for p in bad[:30]]
                    if full <= 2:
                        lexicon.extend(separators(news, pools[i]))
                    pools[i] = [*pools[i], *news]
                else:
                    answers[i] = Name(guesses[i], not wrong)
                    open_.discard(i)
        return answers


def separators(bad: Sequence[tuple[Place, bool]], pool: Sequence[tuple[Place, bool]]) -> list[Candidate]:
    """Comparisons of one parameter with a rational that tell places apart which the figure's
    words and the borders' signs do not."""
    out: dict[str, Candidate] = {}
    for p, t in bad[:6]:
        here = branch_parameters(p.branch)
        for q, s in pool:
            there = branch_parameters(q.branch) if s != t else {}
            for k in here.keys() & there.keys():
                value = between(here[k], there[k])
                if value is not None and len(out) < 40:
                    f = ring.primitive(ring.param(k) - value)
                    for op in (">", "<"):
                        relation = Relation("frame_sign", (f, op))  # type: ignore[arg-type]
                        out[f"{ring.key(f)} {op}"] = Candidate(relation, 5.0)
    return list(out.values())


@dataclass(frozen=True)
class Name:
    """A proved condition (None: not found), and whether it is right on thin sets too."""

    condition: Condition | None
    exact: bool


def _guessed(
    lexicon: Lexicon, pool: Sequence[tuple[Place, bool]], what: Condition, with_frame: bool
) -> Condition | None:
    pts = [p for p, _ in pool]
    target = sum(1 << k for k, (_, t) in enumerate(pool) if t)
    whole = (1 << len(pts)) - 1
    lits = lexicon.literals(pts, what)
    plain = [x for x in lits if not in_frame(x.condition)]
    full = max(p.dimension for p, _ in pool)
    short = full - max((p.dimension for p, t in pool if t), default=full)
    guess = name(target, whole, plain, short)
    if guess is None and with_frame:
        guess = name(target, whole, lits, short)
    return guess


def _distinct(comps: Sequence[Component]) -> list[Component]:
    return list({id(c): c for c in comps}.values())


def _varied(places: Sequence[tuple[Place, bool]]) -> Sequence[tuple[Place, bool]]:
    """At most NAMING_PLACES places, both truths and all dimensions among them."""
    if len(places) <= NAMING_PLACES:
        return places
    groups: dict[tuple[int, bool], list[tuple[Place, bool]]] = {}
    for p, t in places:
        groups.setdefault((p.dimension, t), []).append((p, t))
    share = NAMING_PLACES // len(groups)
    out: list[tuple[Place, bool]] = []
    for g in groups.values():
        step = max(len(g) // share, 1)
        out += g[::step][:share]
    return out


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


def figure(prog: Program, p: Place) -> Figure | None:
    """The witness figure of a place; None if its exact coordinates are out of reach."""
    comp, branch = p.comp, p.branch
    if isinstance(branch, NearBranch):
        same = exactly_there(prog, comp, branch)
        if same is None:
            return None
        comp, branch = same
    return {
        n: PlacedPoint(
            (exact.text(v.x, branch), exact.text(v.y, branch)), (branch.approx(v.x), branch.approx(v.y))
        )
        for n, v in comp.points.items()
    }


WITNESS_DEGREE = 24


def exactly_there(prog: Program, comp: Component, near: NearBranch) -> tuple[Component, Branch] | None:
    """The figure of an enclosed point over the number field of its coordinates: the equations
    of the point are solved exactly and the one figure within the enclosure is taken."""
    if max(p.total_degree() for p in near.system) > WITNESS_DEGREE:
        return None
    wanted = {n: (near.ball(v.x, 128), near.ball(v.y, 128)) for n, v in comp.points.items()}
    fit = []
    equations = [ring.primitive(p) for p in near.system]
    for c in prog.run(equations).components:
        if c.free:
            continue
        for b in branches(c.ground(), {}):
            here = {n: (b.ball(v.x, 128), b.ball(v.y, 128)) for n, v in c.points.items()}
            if all(here[n][i].overlaps(wanted[n][i]) for n in wanted for i in (0, 1)):
                fit.append((c, b))
    return fit[0] if len(fit) == 1 else None


def witness(prog: Program, places: Sequence[Place], i: int, value: bool) -> Figure | None:
    """A figure with the given truth: of full dimension if possible, then the plainest."""
    fit = [p for p in places if p.truths[i] == value]
    if not fit:
        return None
    top = max(p.dimension for p in fit)
    best = sorted((p for p in fit if p.dimension == top), key=lambda p: _plainness(p.branch))[:6]
    if isinstance(best[0].branch, NearBranch):
        best = best[:1]
    figures = [f for f in (figure(prog, p) for p in best) if f is not None]
    if not figures:
        return None
    return min(figures, key=lambda f: sum(len(q.exact[0]) + len(q.exact[1]) for q in f.values()))


def _plainness(b: Branch | NearBranch) -> int:
    if isinstance(b, NearBranch):
        return 1000 + sum(p.total_degree() for p in b.system)
    return 40 * len(b.path) + sum(len(str(v)) for v in b.values.values())


def decide_claim(
    sheet: Sheet,
    line: Line,
    time_limit: float,
    progress: Callable[[str], None] = lambda text: None,
    frame: str | None = None,
) -> Decision:
    """Decide one claim within a time limit in seconds; `frame` forces a frame, else the
    cheapest of those that can hold the sheet is taken."""
    start = time.monotonic()
    claim: Condition = line.body  # type: ignore[assignment]
    blank = Decision(sheet.file, sheet.title, show(claim), Verdict.UNDECIDED)
    try:
        kind = frame or cheapest_frame(sheet, claim)
        case = Case(sheet, program(sheet, kind), start + time_limit, progress)
        out = _decided(case, claim, blank)
    except OutOfTime:
        out = replace(blank, reason=f"the time limit of {time_limit:g} s was reached")
    except (TooLarge, TooManyCells, Unsettled) as e:
        out = replace(blank, reason=str(e))
    return replace(out, seconds=round(time.monotonic() - start, 6))


def _decided(case: Case, claim: Condition, blank: Decision) -> Decision:
    parts = _links(claim)
    equalities = [_equality(c) for c in parts]
    whats = [claim]
    if len(parts) > 1:
        whats += parts
    whats += [c for c in equalities if c is not None]
    # the continuity lemma speaks of the claim alone
    plain = len(whats) == 1 and is_closed(claim)
    found = case.survey([statement(c) for c in whats], closed=plain)
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
    side: AlgebraicSide | None = None
    if is_equality(claim):
        assert isinstance(claim, (Comparison, Relation))
        side = algebraic_side(dominant(found.components), claim, found.places, case.tick)
        out = replace(out, algebraic=side.statuses, components=side.components)
    try:
        case.deadline = min(case.deadline, time.monotonic() + NAMING_SECONDS)
        out = _explained(case, whats, parts, found, out, side)
    except OutOfTime:
        out = replace(out, reason="the verdict is proved; naming where it holds ran out of time")
    total, true = (side.total, side.true) if side is not None else (0, 0)
    return replace(out, explanation=explain(out, total, true))


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
        first = case.survey([statement(c) for c in forms], closed=False, shallow=True)
        full = max((p.dimension for p in first.places), default=0)
        top = [p for p in first.places if p.dimension == full]
        keep = [i for i in range(len(forms)) if any(p.truths[i] for p in top)]
        written = keep.index(0) if 0 in keep else -1
        forms = [forms[i] for i in keep]
    if forms:
        whats = [*whats, *forms]
        found = case.survey([statement(c) for c in whats], closed=False)
    n = len(whats) - len(forms)
    said_ = _where(case, whats, found, n)
    where, exact_ = [w for w, _, _ in said_], [e for _, e, _ in said_]
    if out.verdict in (Verdict.CONDITIONAL, Verdict.FAILS):
        out = replace(out, condition=where[0], in_frame=said_[0][2])
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
            out[i] = ("never", True, False)
        else:
            todo.append(i)
    if todo:
        loose = frozenset(k for k, i in enumerate(todo) if i >= strict)
        answers = case.named([whats[i] for i in todo], _only(found, todo), loose)
        for i, a in zip(todo, answers, strict=True):
            c = a.condition
            out[i] = (None if c is None else said(c), a.exact, c is not None and in_frame(c))
    return out


def _links(claim: Condition) -> list[Condition]:
    if not isinstance(claim, Comparison) or len(claim.ops) == 1:
        return [claim]
    return [Comparison((claim.items[i], claim.items[i + 1]), (op,)) for i, op in enumerate(claim.ops)]


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
    return tuple(f"{PARAM_NAMES[k]}: {prog.frame.labels.get(k, '')}" for k in used)


def _frame(prog: Program, found: Survey) -> str:
    for p in found.places[:1]:
        spots = []
        for n, v in list(p.comp.points.items())[:3]:
            spots.append(f"{n} = ({_coordinate(v.x)}, {_coordinate(v.y)})")
        scale = "" if prog.frame.keeps_scale else ", up to similarity"
        return FRAME_NAMES[prog.frame.kind] + ": " + ", ".join(spots) + scale
    return FRAME_NAMES[prog.frame.kind]


FRAME_NAMES = {"cartesian": "Cartesian", "sides": "side lengths"}


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
    if not found.dead:
        return "no real figure meets every line of the sheet"
    step, why = max(found.dead)
    return f"line {case.program.lines[step].span.line}: {why}"
