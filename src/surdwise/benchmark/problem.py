"""A claim and its figure as polynomials: what an engine is given.

The figure is placed as a person would place it (Cartesian frame of the program: first point at the
origin, second at (1, 0) or (w, 0)); a coordinate that the frame makes a constant or a free parameter
stands as such, every other coordinate is an unknown.  The hypotheses are the defining equations of
the figure's towers, one triangular system for each component that dominates the free parameters:

    modulus of each algebraic step = 0,    denominator * coordinate - numerator = 0.

They are taken from the towers, and not from a second table of the sheet's forms, because then the
components are those over which `decide` states the algebraic status, so statuses can be compared;
the price is that an engine gets the figure already decomposed: its time is the time of the thesis.
Exact.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Any, cast

from ..field import ring
from ..field.ring import Poly
from ..field.tower import Element, Tower
from ..figure.component import Component
from ..figure.plane import Curve, Round, Straight, Vec
from ..figure.program import Program, program
from ..figure.quantities import value
from ..sheet.errors import SurdwiseError
from ..sheet.tree import Comparison, Measure, Named, PointRef, Pt, Sheet, Through
from ..thesis.formal import Formal, Ratio, Thesis

MAX_LEVELS = 12


class NoProblem(SurdwiseError):
    """A claim that cannot be put to an engine; the text says why."""


@dataclass(frozen=True)
class Figure:
    """One component: its tower, its free parameters and the values of the unknown coordinates, by
    index of the ring's parameter that stands for them."""

    tower: Tower
    free: tuple[int, ...]
    coordinates: dict[int, Element]


@dataclass(frozen=True)
class Problem:
    """A thesis in plain coordinates and the components of its figure."""

    thesis: Thesis
    figures: tuple[Figure, ...]

    @property
    def parameters(self) -> int:
        """Number of free parameters."""
        return len(self.figures[0].free)

    @property
    def radicals(self) -> int:
        """Number of different lengths in the thesis."""
        return len(self.thesis.lengths)


def problem(sheet: Sheet, claim: object, tick: Callable[[], None] = lambda: None) -> Problem:
    """The problem of one claim.  Raises NoProblem for what is no equality of quantities or has no
    figure, ring.TooLarge for more coordinates than the ring has."""
    if not isinstance(claim, Comparison) or claim.ops != ("=",):
        raise NoProblem("not an equality between two quantities")
    prog = program(sheet)
    comps = dominating(prog, tick)
    if not comps:
        raise NoProblem("the figure has no component")
    plain = _Plain(comps, len(prog.frame.slots))
    names, curves = _named(claim)
    for n in names:
        plain.point(n)
    for n in curves:
        plain.curve(n)
    return Problem(
        thesis_over(claim, plain.comp, plain.labels(prog)),
        tuple(Figure(c.tower, c.free, v) for c, v in zip(comps, plain.values, strict=True)),
    )


def dominating(prog: Program, tick: Callable[[], None]) -> list[Component]:
    """The components with the most free parameters: those of the figure itself, or, where a
    hypothesis ties parameters, of the first strata that have any."""
    level: list[tuple[list[Poly], list[Poly]]] = [([], [])]
    seen: set[frozenset[str]] = set()
    for _ in range(MAX_LEVELS):
        found: list[Component] = []
        below: list[tuple[list[Poly], list[Poly]]] = []
        for eqs, excluded in level:
            run = prog.run(eqs, frozenset(), excluded, tick)
            found += run.components
            done = list(excluded)
            for name, p in sorted(run.strata.items(), key=lambda item: (len(item[1]), item[0])):
                both = frozenset([*map(ring.key, eqs), name])
                if both not in seen:
                    seen.add(both)
                    below.append(([*eqs, p], list(done)))
                done.append(p)
        if found:
            full = max(len(c.free) for c in found)
            return [c for c in found if len(c.free) == full]
        level = below
    return []


class _Separate(Formal):
    """Every distance of two points is an unknown of its own, even if another has the same square:
    whoever puts |AC| = |BC| to an engine writes two unknowns.  Other roots with the same square are one."""

    def __init__(self, comp: Component) -> None:
        super().__init__(comp)
        self._pairs: dict[frozenset[str], dict[str, Ratio]] = {}
        self._side: Through | None = None

    def _as_pair(self, names: frozenset[str], make: Callable[[], Any]) -> Any:
        outer = self._known
        self._known = self._pairs.setdefault(names, {})
        try:
            return make()
        finally:
            self._known = outer

    def span(self, a: PointRef, b: PointRef) -> Any:
        """A distance of two points."""
        read = super().span
        return self._as_pair(frozenset((str(a), str(b))), lambda: read(a, b))

    def measuring(self, q: Measure) -> None:
        """A distance from a line AB is divided by |AB|, which is that unknown."""
        self._side = q.line if isinstance(q.line, Through) and len(q.line.points) == 2 else None

    def root(self, q: Any) -> Any:
        """A root, of the side of a distance from a line or any other."""
        side, make = self._side, super().root
        if side is None:
            return make(q)
        length: Any = self.stretch(side)
        if q.num.key() != length.num.key() or q.den.key() != length.den.key():
            return make(q)
        return self._as_pair(frozenset(map(str, side.points)), lambda: make(q))


def thesis_over(claim: Comparison, comp: Component, labels: dict[int, str]) -> Thesis:
    """The equality over one denominator, every root a symbol with a known square."""
    r = _Separate(comp)
    left, right = (cast(Ratio, value(q, r)) for q in claim.items)
    t = r.comp.tower
    one, two = left.num * right.den, right.num * left.den
    den = one.den * (two.den / one.den.gcd(two.den))
    placed = {n: (str(v.x.num), str(v.y.num)) for n, v in comp.points.items()}
    return Thesis(
        t.reduce(one.num * (den / one.den)),
        t.reduce(two.num * (den / two.den)),
        t,
        tuple(r.lengths),
        labels,
        placed,
    )


class _Plain:
    """A component whose points are constants, parameters and unknowns."""

    def __init__(self, comps: Sequence[Component], first: int) -> None:
        self.comps = comps
        self.next = first
        self.tower = Tower()
        self.comp = Component(self.tower, {}, ())
        self.values: list[dict[int, Element]] = [{} for _ in comps]
        self.own: dict[int, str] = {}

    def labels(self, prog: Program) -> dict[int, str]:
        """What the coordinates stand for, by index of the ring's parameter."""
        return {**prog.frame.labels, **self.own}

    def coordinate(self, label: str, elements: Sequence[Element]) -> Element:
        """A constant or a free parameter where every component has the same, else an unknown."""
        e = elements[0]
        if all(x.key() == e.key() for x in elements):
            if e.is_rational():
                return self.tower.constant(e.as_rational())
            for k in self.comps[0].free:
                if e.den.is_one() and e.num == ring.param(k):
                    return self.tower.param(k)
        k = self.next
        self.next += 1
        out = self.tower.param(k)
        self.own[k] = label
        for x, table in zip(elements, self.values, strict=True):
            table[k] = x
        return out

    def vector(self, name: str, vs: Sequence[Vec]) -> Vec:
        """A point or direction."""
        x = self.coordinate(f"x of {name}", [v.x for v in vs])
        return Vec(x, self.coordinate(f"y of {name}", [v.y for v in vs]))

    def point(self, name: str) -> None:
        """Place a point of the claim."""
        self.comp.points[name] = self.vector(name, [c.points[name] for c in self.comps])

    def curve(self, name: str) -> None:
        """Place a line or circle of the claim.  Quantities read a circle's centre and radius only."""
        curves = [c.curves[name] for c in self.comps]
        out: Curve
        if isinstance(curves[0], Straight):
            lines = [c for c in curves if isinstance(c, Straight)]
            out = Straight(
                self.vector(name, [c.point for c in lines]),
                self.vector(f"direction {name}", [c.direction for c in lines]),
            )
        else:
            rounds = [c for c in curves if isinstance(c, Round)]
            centre = self.vector(name, [c.centre for c in rounds])
            out = Round(
                centre, self.coordinate(f"squared radius {name}", [c.radius2 for c in rounds]), centre
            )
        self.comp.curves[name] = out


def _named(claim: Comparison) -> tuple[list[str], list[str]]:
    """Names of the points and of the curves in a claim, in order of appearance."""
    points: dict[str, None] = {}
    curves: dict[str, None] = {}

    def walk(node: object) -> None:
        if isinstance(node, tuple):
            for x in node:
                walk(x)
        elif isinstance(node, Pt):
            points[node.name] = None
        elif isinstance(node, Named):
            curves[node.name] = None
        elif hasattr(node, "__dataclass_fields__"):
            for f in node.__dataclass_fields__:
                walk(getattr(node, f))

    walk(claim.items)
    return list(points), list(curves)
