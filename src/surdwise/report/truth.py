"""The truth of a claim over the parameters of its figure, judged exactly at many sample places.

The places are rational; at each, every real figure of every component of full dimension is built
and judged by `Lone`, as in verdict/search.py: signs are proved, and a place where something
vanishes that need not vanish is left for its neighbour.  So every colour of a map is a proved
statement about its place, and nothing is claimed about what lies between.
"""

from __future__ import annotations

import time
from collections.abc import Callable, Sequence
from contextlib import suppress
from dataclasses import dataclass, field
from enum import Enum
from fractions import Fraction
from typing import Any

from ..field.cells import TooManyCells
from ..field.real import Branch, Unsettled, branches
from ..field.ring import PARAM_NAMES, Poly, TooLarge, param_slot, rational
from ..field.sketch import Evaluator, Sketch, evaluator, quotient
from ..figure.component import Component
from ..figure.conditions import Judge, truth
from ..figure.program import demands, frames_for, program
from ..sheet.tree import Condition, Sheet
from ..verdict.spot import FloatHint, Lone, Undefined
from ..verdict.survey import OutOfTime, Surveyor
from .picture import XY

Values = dict[int, Fraction]
NUDGES = (Fraction(0), Fraction(1, 9973), Fraction(-1, 8117))


class Truth(Enum):
    """What the figures at one sample place say."""

    TRUE = "true"
    FALSE = "false"
    MIXED = "mixed"  # several figures, of which some make it true
    NONE = "none"  # no admitted figure


@dataclass(frozen=True)
class Seen:
    """One figure at a place: whether the claim is true, where the moving point is."""

    true: bool
    at: XY | None


def summary(seen: Sequence[Seen]) -> Truth:
    """The truth of several figures together."""
    truths = {s.true for s in seen}
    if len(truths) == 2:
        return Truth.MIXED
    return Truth.NONE if not truths else Truth.TRUE if truths.pop() else Truth.FALSE


@dataclass
class Sampler:
    """The components of full dimension of a sheet's figure, ready to be judged anywhere.

    `free` are their parameters; `mover` is the first point that depends on them and `direct`
    says that its coordinates are the parameters themselves; `fixed` are the points that do not
    move; `borders` the polynomials at which the program says truth may change.
    """

    components: list[Component]
    conditions: list[Callable[[Judge], bool]]
    claim: Callable[[Judge], bool]
    deadline: float
    free: tuple[int, ...]
    borders: list[Poly]
    labels: dict[int, str]
    mover: str | None = None
    direct: bool = False
    fixed: dict[str, XY] = field(default_factory=dict)
    count: int = 0

    def late(self) -> bool:
        """Whether the time for the picture is up."""
        return time.monotonic() > self.deadline

    def positive(self, k: int) -> bool:
        """Whether a parameter ranges over positive numbers only."""
        return all(k in c.positive for c in self.components)

    def judge(self, values: Sequence[Fraction]) -> list[Seen] | None:
        """All admitted figures over one place; None where a sign is not settled there or close by."""
        for nudge in NUDGES:
            sample = {k: v + nudge * (i + 1) for i, (k, v) in enumerate(zip(self.free, values, strict=True))}
            if any(v <= 0 for k, v in sample.items() if self.positive(k)):
                continue
            with suppress(Unsettled):
                out = self._at(sample)
                self.count += 1
                return out
        return None

    def _at(self, sample: Values) -> list[Seen]:
        out = []
        exact = {k: rational(v) for k, v in sample.items()}
        for comp in self.components:
            for branch in branches(comp.ground(), exact):
                spot = Lone(comp, branch)
                try:
                    if spot.admitted(self.conditions):
                        out.append(Seen(self.claim(spot), self._place(comp, branch)))
                except Undefined:
                    continue
        return out

    def _place(self, comp: Component, branch: Branch) -> XY | None:
        if self.mover is None:
            return None
        v = comp.points[self.mover]
        return branch.approx(v.x), branch.approx(v.y)

    def hints(self) -> Hints:
        """The same figures in floats, for curves drawn through the judged places."""
        return Hints(self.components, self.free)


class Hints:
    """Float figures at any parameters; for the pen, never for a colour."""

    def __init__(self, components: Sequence[Component], free: tuple[int, ...]) -> None:
        self.free = free
        self.components = [(c, Sketch(c.tower), _Values(c)) for c in components]

    def at(self, values: Sequence[float]) -> list[FloatHint]:
        """A float judge for every figure."""
        out = []
        for comp, sketch, table in self.components:
            for v in sketch.points(dict(zip(self.free, values, strict=True))):
                with suppress(ArithmeticError, ValueError):
                    out.append(FloatHint(comp, lambda e, v=v, table=table: table.value(e, v), {}))  # type: ignore[misc]
        return out


class _Values:
    def __init__(self, comp: Component) -> None:
        self.known: dict[int, tuple[Any, Evaluator]] = {}

    def value(self, e: Any, v: list[float]) -> float:
        found = self.known.get(id(e))
        if found is None:
            found = self.known[id(e)] = (e, quotient(e))
        return found[1](v)


def sampler(
    sheet: Sheet, claim: Condition, seconds: float, dimensions: tuple[int, ...] = (1, 2)
) -> Sampler | None:
    """A sampler in the plainest frame that the limits allow, or None: no figure, too many
    parameters, or too large a figure."""
    end = time.monotonic() + seconds
    for kind in frames_for(sheet):
        found = _in_frame(sheet, claim, kind, time.monotonic() + 0.5 * (end - time.monotonic()))
        if found is None:
            continue
        if len(found.free) not in dimensions:
            return None
        found.deadline = end
        return found
    return None


def _in_frame(sheet: Sheet, claim: Condition, kind: str, deadline: float) -> Sampler | None:
    prog = program(sheet, kind)
    bodies = demands(sheet)
    conditions = [_statement(c) for c in bodies]
    surveyor = Surveyor(prog, conditions, [lambda j: truth(claim, j)], deadline, shallow=True)
    borders: list[Poly] = []
    try:
        places = surveyor.run().places
        borders = list(surveyor.result.borders.values())
    except (OutOfTime, Unsettled, TooLarge, TooManyCells):
        # the places seen so far still tell which components have figures
        places = surveyor.result.places
    full = max((p.dimension for p in places), default=-1)
    top = list({id(p.comp): p.comp for p in places if p.dimension == full}.values())
    if not top and full < 0:
        try:
            top = prog.run().components
        except (TooLarge, TooManyCells):
            return None
    if not top or len({tuple(sorted(c.free)) for c in top}) != 1:
        return None
    free = tuple(sorted(top[0].free))
    out = Sampler(
        top, conditions, lambda j: truth(claim, j), deadline, free, borders, dict(prog.frame.labels)
    )
    _movement(out)
    return out


def _statement(c: Condition) -> Callable[[Judge], bool]:
    return lambda j: truth(c, j)


def _movement(s: Sampler) -> None:
    """Which points stand still in all figures, and which one moves first."""
    comp = s.components[0]
    still = [n for n in comp.points if all(_is_still(c, n) for c in s.components)]
    moving = [n for n in comp.points if n not in still]
    s.mover = moving[0] if moving and still else None
    for n in still:
        with suppress(ValueError):
            v = comp.points[n]
            s.fixed[n] = (_plain(comp, v.x), _plain(comp, v.y))
    if s.mover is not None and len(s.free) == 2:
        a, b = s.free
        s.direct = all(
            (c.points[s.mover].x - c.tower.param(a)).is_zero()
            and (c.points[s.mover].y - c.tower.param(b)).is_zero()
            for c in s.components
        )


def _plain(comp: Component, e: Any) -> float:
    """The value of an element without parameters, all of whose roots are numbers' roots."""
    for v in Sketch(comp.tower.lower(_depth(e))).points({}):
        return quotient(e)(v)
    raise ValueError("no real value")


def _depth(e: Any) -> int:
    """How many steps of the tower an element needs."""
    n = len(e.tower.gens)
    while n and e.num.degrees()[e.tower.gens[n - 1].slot] <= 0:
        n -= 1
    return n


def _is_still(comp: Component, name: str) -> bool:
    """Whether a point's coordinates are one number each, the same in every figure."""
    for e in (comp.points[name].x, comp.points[name].y):
        if any(e.num.degrees()[param_slot(k)] > 0 or e.den.degrees()[param_slot(k)] > 0 for k in comp.free):
            return False
        for g in comp.tower.gens[: _depth(e)]:
            if g.radicand is None or g.choice != "positive":
                return False
            if any(g.radicand.degrees()[param_slot(k)] > 0 for k in comp.free):
                return False
    return True


def border_functions(s: Sampler) -> list[Callable[[float, float], float]]:
    """The program's border polynomials as functions of the two parameters."""
    from ..field import ring

    out: list[Callable[[float, float], float]] = []
    size = ring.MAX_GENS + ring.MAX_PARAMS
    for p in s.borders:
        if set(ring.params_in(p)) - set(s.free) or ring.has_gens(p):
            continue
        f = evaluator(p)

        def at(x: float, y: float, f: Evaluator = f) -> float:
            v = [0.0] * size
            v[param_slot(s.free[0])], v[param_slot(s.free[1])] = x, y
            return f(v)

        out.append(at)
    return out


def parameter_words(s: Sampler, k: int) -> str:
    """A parameter's name and meaning."""
    label = s.labels.get(k, "")
    return f"{PARAM_NAMES[k]}: {label}" if label else PARAM_NAMES[k]
