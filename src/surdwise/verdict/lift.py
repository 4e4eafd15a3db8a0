"""Curves of high degree in a plane of two parameters, examined point by point.

A border of high degree is not made an equation of the figure (its function field would be
large).  Instead the curve is cut into arcs and critical points by projection; one point of
every arc and a box about every critical point are judged in certified balls.  On an arc a
quantity that cannot be separated from zero is zero if it changes sign across the arc there
(intermediate value theorem: between the two rational neighbours its norm has no other zero).
What stays unsettled is reported as not examined, never guessed.

Lemma (why one point of an arc is enough): let N = norm of e have g as a factor of
multiplicity m, g simple in v along the arc and no other factor of N or of a discriminant
vanishing on it.  The orders of vanishing of the conjugates of e in v add up to m at every
point of the arc; each can only jump up at special points, so none jumps: a conjugate vanishes
on the whole arc or nowhere on it.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator, Sequence
from dataclasses import dataclass
from typing import Any

from ..field import cells, ring
from ..field.near import (
    NEAR_PREC,
    Enclosure,
    NearBranch,
    cover_zeros,
    crossing_box,
    exactly,
    fixed,
    follow,
    near_branches,
    root_enclosure,
)
from ..field.real import Unsettled, isolate, simplest_between
from ..field.ring import Poly, Rational
from ..field.tower import Element
from ..figure.component import Component
from ..figure.conditions import Judge
from ..figure.plane import Vec, square
from .spot import Register, Spot, Undefined

HEAVY = {1: 6, 2: 2}  # largest degree that becomes an equation, by number of parameters
HEAVY_BEYOND = 4
WIDTHS = (20, 60)
Statement = Callable[[Judge], bool]


def heavy(p: Poly, comp: Component) -> bool:
    """Whether a border is too large to become an equation of the figure."""
    degs = [p.degrees()[ring.param_slot(k)] for k in comp.free]
    return min(degs) > HEAVY.get(len(comp.free), HEAVY_BEYOND)


@dataclass(frozen=True)
class Lifted:
    """A judged point: arc (dimension 1) or critical point (0)."""

    dimension: int
    branch: NearBranch
    truths: tuple[bool | None, ...]


class LiftSpot(Spot):
    """A spot over an enclosed point: signs in balls, zero proved by a change of sign."""

    def __init__(self, comp: Component, branch: NearBranch, flanks: tuple[dict[int, Rational], ...]) -> None:
        super().__init__(comp, branch, Register())  # type: ignore[arg-type]
        self.near = branch
        self.flanks = flanks

    def _enter(self, kind: str, e: Element) -> None:
        return

    def _sign(self, e: Element, kind: str) -> int:
        if e.is_zero():
            return 0
        if e.is_rational():
            return 1 if e.as_rational() > 0 else -1
        known = self._signs.get(id(e))
        if known is None:
            known = e, self._found(Element(self.comp.tower, e.num, e.den))
            self._signs[id(e)] = known
        return known[1]

    def _found(self, e: Element) -> int:
        s = self.near.sign(e)
        if s is not None:
            return s
        if self.flanks:
            one, two = (follow(self.near, self.comp.tower, v).sign(e) for v in self.flanks)
            if one * two < 0:
                return 0
        raise Unsettled("a sign on a curve of high degree")

    def zero(self, e: Element) -> bool:
        """Whether e vanishes at this very point."""
        return self._sign(e, "thin") == 0

    def divide(self, a: Element, b: Element, words: str) -> Element:
        """a/b; Undefined where b vanishes here."""
        if self._sign(b, "thin") == 0:
            raise Undefined(words)
        return super().divide(a, b, words)

    def differ(self, a: Vec, b: Vec, words: str) -> None:
        """Undefined where two points coincide here."""
        if self._sign(square(a - b), "thin") == 0:
            raise Undefined(words)

    def admitted(self, conditions: Sequence[Statement]) -> bool:
        """As for a spot, with `!=` read at the point."""
        for r in self.comp.requires:
            s = self._sign(r.element, "open")
            if {"!=": s == 0, ">": s <= 0, ">=": s < 0}[r.op]:
                return False
        return all(c(self) for c in conditions)


def lift(
    comp: Component,
    register: Register,
    curves: Sequence[Poly],
    exact: Sequence[Poly],
    order: Sequence[int],
    conditions: Sequence[Statement],
    statements: Sequence[Statement],
    tick: Callable[[], None],
) -> tuple[list[Lifted], list[tuple[Poly, ...]], bool]:
    """Judge arcs and critical points of the given curves.  Besides the points: the systems of
    equations whose points stayed unsettled, and whether all arcs were settled."""
    out: list[Lifted] = []
    open_: list[tuple[Poly, ...]] = []
    complete = True

    def judged(points: Iterator[Point], limit: int) -> bool:
        """Judge points into `out`; False if one stays unsettled."""
        settled = True
        for dimension, spots, sides, system in points:
            tick()
            try:
                for branch in near_branches(comp.ground(), spots, limit, system):
                    truths = _judged(LiftSpot(comp, branch, sides), conditions, statements)
                    if truths is not None:
                        out.append(Lifted(dimension, branch, truths))
            except Unsettled:
                settled = False
        return settled

    if len(order) == 1:
        for g in curves:
            before = len(out)
            try:
                settled = judged(_roots(comp, register, g, order[0]), NEAR_PREC)
            except Unsettled:
                settled = False
            if not settled:
                del out[before:]
                open_.append((g,))
        return out, open_, True
    plan = _plan(comp, register, curves, exact, order, tick)
    try:
        complete &= judged(_arcs(plan), NEAR_PREC)
    except Unsettled:
        complete = False
    for h in plan.below:
        before = len(out)
        for width in WIDTHS:
            tick()
            del out[before:]
            try:
                settled = judged(_critical(plan, h, width), 2 * width + 64)
            except Unsettled:
                settled = False
            if settled:
                break
        if not settled:
            del out[before:]
            open_ += [(g, h) for g in plan.curves]
    return out, open_, complete


def _judged(
    spot: LiftSpot, conditions: Sequence[Statement], statements: Sequence[Statement]
) -> tuple[bool | None, ...] | None:
    try:
        if not spot.admitted(conditions):
            return None
        return tuple(s(spot) for s in statements)
    except Undefined:
        return None


def _roots(comp: Component, register: Register, g: Poly, k: int) -> Iterator[Point]:
    """The zeros of a polynomial in one parameter, with rational neighbours on both sides."""
    slot = ring.param_slot(k)
    polys = [ring.univariate(p, slot) for p in register.polys.values()]
    spaces = cells.gaps([p for p in polys if p.degree() > 0], k in comp.positive)
    picks = [simplest_between(a, b) for a, b in spaces]
    line = ring.univariate(g, slot)
    for i, root in enumerate(isolate(line, 128)):
        if k in comp.positive and not root > 0:
            continue
        lower, higher = [q for q in picks if root > q], [q for q in picks if root < q]
        if not lower or not higher or len(lower) + len(higher) != len(picks):
            raise Unsettled("a zero is not separated from its neighbours")
        yield 0, {k: root_enclosure(line, i)}, ({k: max(lower)}, {k: min(higher)}), (g,)


Point = tuple[int, dict[int, Enclosure], tuple[dict[int, Rational], ...], tuple[Poly, ...]]


@dataclass(frozen=True)
class Plan:
    """A curve in the plane of parameters u, v: the polynomials in v that cut its fibres, and
    those in u alone at whose roots something can change."""

    u: int
    v: int
    positive: frozenset[int]
    curves: tuple[Poly, ...]
    figure: tuple[str, ...]
    upper: tuple[Poly, ...]
    below: tuple[Poly, ...]
    crossings: dict[tuple[str, str], tuple[Poly, ...]]
    boxes: dict[object, list[Any]]


def _plan(
    comp: Component,
    register: Register,
    curves: Sequence[Poly],
    exact: Sequence[Poly],
    order: Sequence[int],
    tick: Callable[[], None],
) -> Plan:
    u, v = order
    slot = ring.param_slot(v)
    everything = list(register.polys.values())
    below: dict[str, Poly] = {}
    crossings: dict[tuple[str, str], tuple[Poly, ...]] = {}
    strata = {ring.key(p) for p in exact}

    def put(factors: Iterable[tuple[Poly, int]]) -> list[str]:
        """Enter the factors; returns those of multiplicity one."""
        simple = []
        for f, m in factors:
            if not cells.never_zero(f, comp.positive):
                below[ring.key(f)] = f
                if m == 1:
                    simple.append(ring.key(f))
        return simple

    known = comp.eliminations
    upper = [p for p in everything if p.degrees()[slot] > 0]
    for p in everything:
        if p.degrees()[slot] <= 0:
            put([(p, 1)])
    for g in curves:
        tick()
        cs = ring.coefficients(g, slot)
        put(ring.irreducible_factors(cs[-1]))
        put(known.discriminant(g, v))
        if v in comp.positive and not cs[0].is_zero():
            put(ring.irreducible_factors(cs[0]))
        for p in upper:
            if p is not g and p != g:
                once = put(known.resultant(p, g, v))
                if ring.key(p) in strata:
                    for name in once:
                        pair = name, ring.key(g)
                        crossings[pair] = (*crossings.get(pair, ()), p)
    figure = tuple(register.of(["figure"]))
    return Plan(
        u, v, comp.positive, tuple(curves), figure, tuple(upper), tuple(below.values()), crossings, comp.boxes
    )


def _arcs(plan: Plan) -> Iterator[Point]:
    """A point of every arc, with rational neighbours on both sides in its fibre."""
    u, v = plan.u, plan.v
    uslot, vslot = ring.param_slot(u), ring.param_slot(v)
    bottom = [ring.univariate(p, uslot) for p in plan.below]
    for low, high in cells.gaps(bottom, u in plan.positive):
        s = simplest_between(low, high)
        fibres = [ring.univariate(ring.substitute(p, {u: s}), vslot) for p in plan.upper]
        spaces = cells.gaps([f for f in fibres if f.degree() > 0], v in plan.positive)
        picks = [simplest_between(a, b) for a, b in spaces]
        for g in plan.curves:
            f = ring.univariate(ring.substitute(g, {u: s}), vslot)
            if f.degree() < 1:
                continue
            for i, root in enumerate(isolate(f, 128)):
                if v in plan.positive and not root > 0:
                    continue
                lower = [q for q in picks if root > q]
                higher = [q for q in picks if root < q]
                if not lower or not higher or len(lower) + len(higher) != len(picks):
                    raise Unsettled("an arc is not separated from its neighbours")
                sides = ({u: s, v: max(lower)}, {u: s, v: min(higher)})
                yield 1, {u: exactly(s), v: root_enclosure(f, i)}, sides, (g, ring.param(u) - s)


def _critical(plan: Plan, h: Poly, width: int) -> Iterator[Point]:
    """Boxes that contain every point of the curves over the real roots of h."""
    if ring.key(h) in plan.figure:
        return  # the whole line belongs to a border of the figure, examined by itself
    u, v = plan.u, plan.v
    vslot = ring.param_slot(v)
    line = ring.univariate(h, ring.param_slot(u))
    for i, root in enumerate(isolate(line, 128)):
        if u in plan.positive and not root > 0:
            continue
        at = root_enclosure(line, i)
        for g in plan.curves:
            p = _reduced(g, h, vslot, v in plan.positive)
            name = ring.key(g), ring.key(h), i, v, width
            if name not in plan.boxes:
                plan.boxes[name] = cover_zeros(p, vslot, u, at, v in plan.positive, width)
            boxes = plan.boxes[name]
            met = plan.crossings.get((ring.key(h), ring.key(g)), ())
            spoken = {_crossing(g, q, boxes, plan, at, width) for q in met}
            for k, box in enumerate(boxes):
                if k not in spoken:
                    yield 0, {u: at, v: fixed(box)}, (), (g, h)


def _crossing(g: Poly, q: Poly, boxes: list[Any], plan: Plan, at: Enclosure, width: int) -> int | None:
    """The box whose only point of g is its crossing with q, a border examined by itself.

    Lemma: a root alpha of multiplicity one of the resultant of g and q belongs to exactly one
    common root, which is real with alpha.  If q can vanish in one box of g only, the common
    root is there; if moreover g is monotone in v on that box, it is g's only zero in it.
    """
    return crossing_box(g, q, boxes, {plan.u: at}, plan.v, width)


def _reduced(g: Poly, h: Poly, vslot: int, positive: bool) -> Poly:
    """g without the leading terms in v whose coefficients vanish at the roots of h; for v > 0
    also without the factors v that it has there."""
    cs = ring.coefficients(g, vslot)
    while len(cs) > 1 and divmod(cs[-1], h)[1].is_zero():
        cs = cs[:-1]
    while positive and len(cs) > 1 and divmod(cs[0], h)[1].is_zero():
        cs = cs[1:]
    return ring.from_coefficients(cs, vslot)
