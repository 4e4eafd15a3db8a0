"""Name where a statement holds: guess from places, prove by a survey, learn from the misses."""

from __future__ import annotations

import time
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field

from ..field import ring
from ..field.ball import between, branch_parameters
from ..field.real import Branch
from ..figure.component import Component
from ..figure.conditions import Judge, is_open, truth
from ..figure.program import Program, demands
from ..sheet.tree import Comparison, Condition, Relation, Sheet
from .candidates import Candidate, candidates
from .lemma import Lemma
from .outcome import Decision
from .spot import Register, Spot, Undefined
from .survey import OutOfTime, Place, Statement, Survey, Surveyor
from .words import Lexicon, in_frame, name

PROOF_ROUNDS = 6
NAMING_PLACES = 120


def agree(claim: Statement, guess: Statement) -> Statement:
    """Whether claim and guess are true or false together (an undefined guess disagrees)."""

    def judge(j: Judge) -> bool:
        t = claim(j)
        try:
            return guess(j) == t
        except Undefined:
            return False

    return judge


def links_of(claim: Condition) -> list[Condition]:
    """The links of a chain; any other claim is its own only link."""
    if not isinstance(claim, Comparison) or len(claim.ops) == 1:
        return [claim]
    return [Comparison((claim.items[i], claim.items[i + 1]), (op,)) for i, op in enumerate(claim.ops)]


@dataclass
class Case:
    """The sheet's figure under examination for one claim."""

    sheet: Sheet
    program: Program
    deadline: float
    progress: Callable[[str], None]
    report: Callable[[Decision], None] = lambda known: None
    lexicon: Lexicon | None = None
    unexamined: set[str] = field(default_factory=set)
    lemmas: tuple[Lemma, ...] = ()
    known: Decision | None = None

    def statement(self, c: Condition) -> Statement:
        """A condition as something to be judged, by a lemma where one says the same more plainly."""
        if isinstance(c, Comparison) and len(c.ops) > 1:
            links = [self.statement(x) for x in links_of(c)]
            return lambda j: all(x(j) for x in links)
        for lemma in self.lemmas:
            plain = lemma.statement(c)
            if plain is not None:
                return plain
        return lambda j: truth(c, j)

    def tick(self) -> None:
        """Stop when time is out."""
        if time.monotonic() > self.deadline:
            raise OutOfTime

    def survey(
        self,
        statements: Sequence[Statement],
        closed: bool,
        shallow: bool = False,
        where: Sequence[Condition] = (),
    ) -> Survey:
        """Survey all admitted figures (or open cells only; or those `where` conditions hold
        besides) for some statements."""
        conditions = [*demands(self.sheet), *where]
        return Surveyor(
            self.program,
            [self.statement(c) for c in conditions],
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
        points = [_points(found, i) for i in range(len(whats))]
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
            for i in [i for i in guesses if points[i] is not None]:
                misses = self._wrong_at_points(whats[i], guesses[i], points[i] or [])
                pools[i] = [*pools[i], *misses]
                if not misses:
                    answers[i] = Name(guesses[i], True)
                    open_.discard(i)
                del guesses[i]
            if not guesses:
                continue
            keys = list(guesses)
            claims = [self.statement(whats[i]) for i in keys]
            pairs = [agree(c, self.statement(guesses[i])) for i, c in zip(keys, claims, strict=True)]
            proof = self.survey([*pairs, *claims], closed=False)
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
                    self.unexamined |= set(proof.not_examined)
                    open_.discard(i)
        return answers

    def _wrong_at_points(
        self, what: Condition, guess: Condition, points: Sequence[Place]
    ) -> list[tuple[Place, bool]]:
        """Places where a statement true at single `points` only differs from a guess: points
        that the guess leaves out, and figures that it lets in.  None is a proof."""
        out = [(p, True) for p in points if not _says(guess, p)]
        if out:
            return out
        proof = self.survey([self.statement(what)], closed=False, where=[guess])
        self.unexamined |= set(proof.not_examined)
        return [(p, False) for p in proof.places if not p.truths[0]][:30]


def _points(found: Survey, i: int) -> list[Place] | None:
    """The places where statement i is true if they are single figures given exactly, and the
    survey has left nothing out; else None."""
    out = [p for p in found.places if p.truths[i]]
    exact = all(p.dimension == 0 and isinstance(p.branch, Branch) for p in out)
    full = max(p.dimension for p in found.places)
    return out if out and exact and full > 0 and not found.not_examined else None


def _says(guess: Condition, p: Place) -> bool:
    assert isinstance(p.branch, Branch)
    try:
        return truth(guess, Spot(p.comp, p.branch, Register()))
    except Undefined:
        return False


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
    clear = [(p, t) for p, t in pool if not lexicon.blurred(p)]
    if len({t for _, t in clear}) == 2:
        pool = clear  # what is proved afterwards may be proposed from fewer places
    pts = [p for p, _ in pool]
    target = sum(1 << k for k, (_, t) in enumerate(pool) if t)
    whole = (1 << len(pts)) - 1
    lits = lexicon.literals(pts, what)
    plain = [x for x in lits if not in_frame(x.condition)]
    full = max(p.dimension for p, _ in pool)
    short = full - max((p.dimension for p, t in pool if t), default=full)
    top = sum(1 << k for k, p in enumerate(pts) if p.dimension == full)
    guess = name(target, whole, plain, short, top)
    if guess is None and with_frame:
        guess = name(target, whole, lits, short, top)
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
