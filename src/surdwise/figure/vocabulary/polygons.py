"""Quadrilaterals and regular polygons.

Each derives its later vertices from the first ones; a vertex that is already placed turns the
derivation into a constraint.
"""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction
from itertools import combinations

from ...field.tower import Element
from ...sheet.tree import Pt
from ..component import Builder
from ..plane import cross, dot, orientation, square
from .on_curves import on_round
from .placements import placed_by
from .shapes import missing
from .table import form


def _ensure(b: Builder, names: Sequence[Pt], off_line: bool = True) -> None:
    for p in names:
        if not b.has(p.name):
            b.free_point(p, names, off_line)


def _differ(b: Builder, p: Pt, q: Pt) -> None:
    b.require(square(b.at(p) - b.at(q)), "!=", f"{p} = {q}")


def _symmetric(b: Builder, quad: tuple[Pt, ...]) -> tuple[Pt, ...]:
    """The same quadrilateral named so that placed vertices come first."""
    ways = []
    for seq in (quad, quad[::-1]):
        ways += [seq[i:] + seq[:i] for i in range(4)]
    return max(ways, key=lambda w: [b.has(p.name) for p in w])


def _sign(b: Builder, first: bool) -> int:
    return 1 if first else b.choose()


@form("square")
def square_shape(b: Builder, quad: tuple[Pt, ...]) -> None:
    """A square, vertices in order."""
    first = not b.comp.points
    p, q, r, s = _symmetric(b, quad)
    if b.has(p.name) and b.has(r.name) and not b.has(q.name):
        m = (b.at(p) + b.at(r)) / 2
        d = (b.at(r) - b.at(p)).turned() * Fraction(1, 2) * b.choose()
        _differ(b, p, r)
        b.put(q, m + d)
        b.put(s, m - d)
        return
    _ensure(b, (p, q))
    _differ(b, p, q)
    d = (b.at(q) - b.at(p)).turned() * _sign(b, first)
    b.put(r, b.at(q) + d)
    b.put(s, b.at(p) + d)


@form("rectangle")
def rectangle(b: Builder, quad: tuple[Pt, ...]) -> None:
    """A rectangle, vertices in order."""
    first = not b.comp.points
    p, q, r, s = _symmetric(b, quad)
    _ensure(b, (p, q))
    _differ(b, p, q)
    if b.has(r.name):
        b.vanish(dot(b.at(p) - b.at(q), b.at(r) - b.at(q)), "the rectangle has no right angle")
        _differ(b, q, r)
        b.put(s, b.at(p) + b.at(r) - b.at(q))
        return
    t = b.param(f"side {p}{s}", positive=first)
    b.require(t, "!=", f"{p} = {s}")
    d = (b.at(q) - b.at(p)).turned() * t
    b.put(r, b.at(q) + d)
    b.put(s, b.at(p) + d)


@form("parallelogram")
def parallelogram(b: Builder, quad: tuple[Pt, ...]) -> None:
    """A parallelogram, vertices in order, not flat."""
    p, q, r, s = _symmetric(b, quad)
    if b.has(p.name) and b.has(r.name) and not b.has(q.name):
        _ensure(b, (q,))
        b.put(s, b.at(p) + b.at(r) - b.at(q))
    else:
        if b.has(r.name):
            _ensure(b, (p, q))
            b.put(s, b.at(p) + b.at(r) - b.at(q))
        else:
            _ensure(b, (p, q, s))
            b.put(r, b.at(q) + b.at(s) - b.at(p))
    b.require(orientation(b.at(p), b.at(q), b.at(s)), "!=", f"{p}, {q}, {s} collinear")


@form("rhombus")
def rhombus(b: Builder, quad: tuple[Pt, ...]) -> None:
    """Four equal sides, not flat."""
    first = not b.comp.points
    p, q, r, s = _symmetric(b, quad)
    if b.has(p.name) and b.has(r.name):
        m, d = (b.at(p) + b.at(r)) / 2, (b.at(r) - b.at(p)).turned()
        _differ(b, p, r)
        if not b.has(q.name):
            b.put(q, m + d * b.param(f"half diagonal to {q}"))
        b.vanish(dot(b.at(q) - m, b.at(r) - m), "the diagonals are not perpendicular")
        b.put(s, m * 2 - b.at(q))
    else:
        _ensure(b, (p, q))
        _differ(b, p, q)
        t = b.param(f"tan of half the angle at {p}", positive=first)
        d = b.at(q) - b.at(p)
        k = 1 / (t * t + 1)
        b.put(s, b.at(p) + d * ((1 - t * t) * k) + d.turned() * (t * 2 * k))
        b.put(r, b.at(q) + b.at(s) - b.at(p))
    b.require(orientation(b.at(p), b.at(q), b.at(s)), "!=", f"{p}, {q}, {s} collinear")


@form("quadrilateral")
def quadrilateral(b: Builder, quad: tuple[Pt, ...]) -> None:
    """Four points, no three collinear."""
    _ensure(b, quad)
    for tri in combinations(quad, 3):
        b.require(orientation(*(b.at(p) for p in tri)), "!=", ", ".join(map(str, tri)) + " collinear")


def _convex(b: Builder, quad: tuple[Pt, ...]) -> None:
    """Strictly convex in this order: the four corners turn the same way."""
    p, q, r, s = (b.at(x) for x in quad)
    words = "".join(map(str, quad)) + " not convex"
    a = orientation(p, q, r)
    for other in (orientation(q, r, s), orientation(r, s, p), orientation(s, p, q)):
        b.require(a * other, ">", words)


@form("kite")
def kite(b: Builder, quad: tuple[Pt, ...]) -> None:
    """|AB| = |AD| and |CB| = |CD|, convex: D mirrors B in AC."""
    p, q, r, s = quad
    if b.has(s.name) and not b.has(q.name):
        q, s = s, q
    if not missing(b, quad) or (b.has(q.name) and b.has(s.name)):
        m = (b.at(q) + b.at(s)) / 2
        d = (b.at(s) - b.at(q)).turned()
        for x in (p, r):
            if not b.has(x.name):
                b.put(x, m + d * b.param(f"place of {x}"))
            b.vanish(square(b.at(x) - b.at(q)) - square(b.at(x) - b.at(s)), f"{x} is not equidistant")
    else:
        _ensure(b, (p, r, q))
        _differ(b, p, r)
        axis = b.at(r) - b.at(p)
        v = b.at(q) - b.at(p)
        t = b.divide(dot(v, axis), square(axis), f"{p} = {r}")
        b.put(s, b.at(p) + axis * (t * 2) - v)
    _convex(b, quad)


@form("trapezium")
def trapezium(b: Builder, quad: tuple[Pt, ...]) -> None:
    """AB parallel to CD, convex."""
    p, q, r, s = quad
    if not b.has(s.name) or not b.has(r.name):
        new, old = (r, s) if not b.has(r.name) else (s, r)
        _ensure(b, (p, q, old))
        t = b.param(f"|{r}{s}| over |{p}{q}|", positive=True)
        d = (b.at(q) - b.at(p)) * t
        b.put(new, b.at(old) + (d if new is r else -d))
    else:
        _ensure(b, (p, q))
        b.vanish(cross(b.at(q) - b.at(p), b.at(r) - b.at(s)), f"{p}{q} is not parallel to {r}{s}")
    _convex(b, quad)


@form("cyclic_quadrilateral")
def cyclic_quadrilateral(b: Builder, quad: tuple[Pt, ...]) -> None:
    """Concyclic, in that order round the circle."""
    if placed_by(b, "cyclic_quadrilateral", quad):
        return
    order = sorted(quad, key=lambda p: not b.has(p.name))
    _ensure(b, order[:3])
    b.require(orientation(*(b.at(p) for p in order[:3])), "!=", ", ".join(map(str, order[:3])) + " collinear")
    on_round(b, order[3], b.circle_through(order[0], order[1], order[2]))
    _convex(b, quad)


@form("tangential_quadrilateral")
def tangential_quadrilateral(b: Builder, quad: tuple[Pt, ...]) -> None:
    """Convex with an inscribed circle: |AB| + |CD| = |BC| + |DA| (Pitot)."""
    if placed_by(b, "tangential_quadrilateral", quad):
        return
    _ensure(b, quad)
    _convex(b, quad)
    p, q, r, s = (b.at(x) for x in quad)
    b.vanish(
        b.distance(p, q) + b.distance(r, s) - b.distance(q, r) - b.distance(s, p),
        "the sums of opposite sides differ",
    )


def _regular(b: Builder, names: tuple[Pt, ...], cos: Element, sin: Element) -> None:
    """Regular polygon from its first two vertices by turning the side."""
    first = not b.comp.points
    n = len(names)
    ways = [seq[i:] + seq[:i] for seq in (names, names[::-1]) for i in range(n)]
    names = max(ways, key=lambda w: [b.has(p.name) for p in w])
    _ensure(b, names[:2])
    _differ(b, names[0], names[1])
    sign = _sign(b, first)
    d = b.at(names[1]) - b.at(names[0])
    at = b.at(names[1])
    for p in names[2:]:
        d = d * cos + d.turned() * (sin * sign)
        at = at + d
        b.put(p, at)


@form("regular_pentagon")
def regular_pentagon(b: Builder, names: tuple[Pt, ...]) -> None:
    """Turning angle 72 degrees: cos = (sqrt5 - 1)/4, sin = sqrt(10 + 2 sqrt5)/4 (Euclid IV.11)."""
    r5 = b.root(b.number(5))
    _regular(b, names, (r5 - 1) / 4, b.root(r5 * 2 + 10) / 4)


@form("regular_hexagon")
def regular_hexagon(b: Builder, names: tuple[Pt, ...]) -> None:
    """Turning angle 60 degrees."""
    _regular(b, names, b.number(Fraction(1, 2)), b.root(b.number(3)) / 2)
