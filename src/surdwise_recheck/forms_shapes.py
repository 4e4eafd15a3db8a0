"""Free points, triangles, quadrilaterals, regular polygons.

A shape derives its later corners from the first ones; corners placed by an earlier line come first, and one
that would be derived is checked instead.
"""

from __future__ import annotations

from collections.abc import Sequence
from itertools import combinations

from .forms_drawing import Drawing, form
from .forms_frames import framed
from .forms_plane import HALF, Vec, cross, dot, orientation, square
from .forms_points import on_round, third_corner
from .protocol import Num
from .tree import Run

Names = tuple[str, ...]


@form("points")
def points(d: Drawing, names: Names) -> None:
    """Free points, different from each other."""
    for i, p in enumerate(names):
        if not d.has(p):
            d.free(p, names[:i])
        for q in names[:i]:
            d.apart(p, q)


def _missing(d: Drawing, names: Sequence[str]) -> list[str]:
    return [p for p in names if not d.has(p)]


def _ensure(d: Drawing, some: Sequence[str], mates: Names = ()) -> None:
    """Place the missing ones freely, apart from each other (from the `mates`) and off each other's lines."""
    for p in some:
        if not d.has(p):
            d.free(p, mates or some, off_line=True)


def _rotations(names: Names) -> list[Names]:
    """The names of the same polygon from each corner, one way round and then the other."""
    return [w[i:] + w[:i] for w in (names, names[::-1]) for i in range(len(names))]


def _placed_first(d: Drawing, names: Names) -> Names:
    """The first of these names of the polygon whose placed corners come earliest."""
    return max(_rotations(names), key=lambda w: [d.has(p) for p in w])


def _orientation_sign(d: Drawing, first: bool) -> int:
    """A first shape turns left, by reflection; a later one may turn either way."""
    return 1 if first else d.numbers.choose()


# ---------------------------------------------------------------- triangles


@form("triangle")
def triangle(d: Drawing, names: Names) -> None:
    """Three points, not on one line."""
    if not framed(d, "triangle", names):
        _ensure(d, names)
        d.proper(names)


@form("isosceles_triangle")
def isosceles_triangle(d: Drawing, names: Names, apex: str) -> None:
    """The apex on the perpendicular bisector of the base, or a base corner on a circle about the apex."""
    base = [p for p in names if p != apex]
    new = _missing(d, names)
    first = not d.figure.points
    if apex in new:
        _ensure(d, base, names)
        u, v = (d.at(p) for p in base)
        t = d.numbers.parameter(f"height of {apex}", "positive" if first else "free")
        d.put(apex, (u + v) * HALF + (v - u).turned() * t)
    elif len(new) == 1:
        (there,) = (p for p in base if p not in new)
        _swing(d, new[0], d.at(apex), d.at(there))
    else:
        _ensure(d, names)
        d.numbers.vanish(d.gap2(apex, base[0]) - d.gap2(apex, base[1]), f"the sides at {apex} differ")
    d.proper(names)


def _swing(d: Drawing, p: str, centre: Vec, start: Vec) -> None:
    """Place p on the circle about `centre` through `start` by t, the tangent of half its turn from `start`;
    the opposite point is missed."""
    n = d.numbers
    if n.at_missed():
        d.put(p, centre * 2 - start)
        return
    t = n.parameter(f"tan of half the turn of {p}", "free")
    d.put(p, centre + _turned_by(d, start - centre, t))


def _turned_by(d: Drawing, v: Vec, t: Num) -> Vec:
    """v turned by an angle with tangent of its half t."""
    k = d.numbers.divide(d.numbers.number(1), t * t + 1, "1 + t^2 = 0")
    return v * ((-(t * t) + 1) * k) + v.turned() * (t * 2 * k)


@form("right_triangle")
def right_triangle(d: Drawing, names: Names, corner: str) -> None:
    """A leg at right angles to the other, or the corner on the circle with the hypotenuse as diameter."""
    legs = [p for p in names if p != corner]
    first = not d.figure.points
    new = _missing(d, names)
    if corner in new and len(new) > 1:
        d.free(corner, names, off_line=True)
        new.remove(corner)
    if corner in new:
        p, q = (d.at(x) for x in legs)
        _swing(d, corner, (p + q) * HALF, p)
    elif new:
        if len(new) == 2:
            d.free(legs[0], names, off_line=True)
            new.remove(legs[0])
        last = new[0]
        other = legs[0] if last == legs[1] else legs[1]
        t = d.numbers.parameter(f"leg to {last}", "positive" if first else "free")
        d.put(last, d.at(corner) + (d.at(other) - d.at(corner)).turned() * t)
    else:
        d.numbers.vanish(d.lean(corner, legs[0], legs[1]), f"the angle at {corner} is not right")
    d.proper(names)


@form("equilateral_triangle")
def equilateral_triangle(d: Drawing, names: Names) -> None:
    """The third corner from two."""
    first = not d.figure.points
    new = _missing(d, names)
    p, q, r = sorted(names, key=lambda x: x in new)
    for x in (p, q):
        if not d.has(x):
            d.free(x, names)
    d.apart(p, q)
    three = d.numbers.number(3)
    root3 = d.numbers.root(three) if first else d.numbers.either_root(three)
    d.put(r, third_corner(d, d.at(p), d.at(q), root3))


# ---------------------------------------------------------------- quadrilaterals


@form("square")
def square_shape(d: Drawing, quad: Names) -> None:
    """From a side, or from a diagonal if that is what is placed."""
    first = not d.figure.points
    p, q, r, s = _placed_first(d, quad)
    if d.has(p) and d.has(r) and not d.has(q):
        d.apart(p, r)
        m = (d.at(p) + d.at(r)) * HALF
        half = (d.at(r) - d.at(p)).turned() * HALF * d.numbers.choose()
        d.put(q, m + half)
        d.put(s, m - half)
        return
    _ensure(d, (p, q))
    d.apart(p, q)
    up = (d.at(q) - d.at(p)).turned() * _orientation_sign(d, first)
    d.put(r, d.at(q) + up)
    d.put(s, d.at(p) + up)


@form("rectangle")
def rectangle(d: Drawing, quad: Names) -> None:
    """From a side and the length of the next over it."""
    first = not d.figure.points
    p, q, r, s = _placed_first(d, quad)
    _ensure(d, (p, q))
    d.apart(p, q)
    if d.has(r):
        d.numbers.vanish(d.lean(q, p, r), f"the angle at {q} is not right")
        d.apart(q, r)
        d.put(s, d.at(p) + d.at(r) - d.at(q))
        return
    t = d.numbers.parameter(f"side {p}{s}", "positive" if first else "free")
    d.numbers.require(t, "!=", f"{p} = {s}")
    up = (d.at(q) - d.at(p)).turned() * t
    d.put(r, d.at(q) + up)
    d.put(s, d.at(p) + up)


@form("parallelogram")
def parallelogram(d: Drawing, quad: Names) -> None:
    """The corner opposite one of three, not flat."""
    p, q, r, s = _placed_first(d, quad)
    if d.has(r):
        _ensure(d, (p, q))
        d.put(s, d.at(p) + d.at(r) - d.at(q))
    else:
        _ensure(d, (p, q, s))
        d.put(r, d.at(q) + d.at(s) - d.at(p))
    d.proper((p, q, s))


@form("rhombus")
def rhombus(d: Drawing, quad: Names) -> None:
    """From a side and an angle, or from a diagonal and the other, which halves it at right angles."""
    first = not d.figure.points
    p, q, r, s = _placed_first(d, quad)
    if d.has(p) and d.has(r):
        d.apart(p, r)
        m = (d.at(p) + d.at(r)) * HALF
        if not d.has(q):
            t = d.numbers.parameter(f"half diagonal to {q}", "free")
            d.put(q, m + (d.at(r) - d.at(p)).turned() * t)
        d.numbers.vanish(dot(d.at(q) - m, d.at(r) - m), "the diagonals are not at right angles")
        d.put(s, m * 2 - d.at(q))
    else:
        _ensure(d, (p, q))
        d.apart(p, q)
        t = d.numbers.parameter(f"tan of half the angle at {p}", "positive" if first else "free")
        d.put(s, d.at(p) + _turned_by(d, d.at(q) - d.at(p), t))
        d.put(r, d.at(q) + d.at(s) - d.at(p))
    d.proper((p, q, s))


@form("quadrilateral")
def quadrilateral(d: Drawing, quad: Names) -> None:
    """Four points, no three on one line."""
    _ensure(d, quad)
    for three in combinations(quad, 3):
        d.proper(three)


def _convex(d: Drawing, quad: Names) -> None:
    """The four corners turn the same way."""
    turns = [
        orientation(d.at(quad[i]), d.at(quad[(i + 1) % 4]), d.at(quad[(i + 2) % 4])) for i in range(4)
    ]
    for t in turns[1:]:
        d.numbers.require(turns[0] * t, ">", f"{''.join(quad)} is not convex")


@form("kite")
def kite(d: Drawing, quad: Names) -> None:
    """The second and fourth corner mirror each other in the line of the others; convex."""
    p, q, r, s = quad
    if d.has(s) and not d.has(q):
        q, s = s, q
    if d.has(q) and d.has(s):
        m, across = (d.at(q) + d.at(s)) * HALF, (d.at(s) - d.at(q)).turned()
        for x in (p, r):
            if not d.has(x):
                d.put(x, m + across * d.numbers.parameter(f"place of {x}", "free"))
            d.numbers.vanish(d.gap2(x, q) - d.gap2(x, s), f"{x} is not as far from {q} and {s}")
    else:
        _ensure(d, (p, r, q))
        d.apart(p, r)
        axis, v = d.at(r) - d.at(p), d.at(q) - d.at(p)
        t = d.numbers.divide(dot(v, axis), square(axis), f"{p} = {r}")
        d.put(s, d.at(p) + axis * (t * 2) - v)
    _convex(d, quad)


@form("trapezium")
def trapezium(d: Drawing, quad: Names) -> None:
    """DC = t AB with t > 0; convex."""
    p, q, r, s = quad
    if d.has(r) and d.has(s):
        _ensure(d, (p, q))
        d.numbers.vanish(cross(d.at(q) - d.at(p), d.at(r) - d.at(s)), f"{p}{q} is not parallel to {r}{s}")
    else:
        old = r if d.has(r) else s
        _ensure(d, (p, q, old))
        t = d.numbers.parameter(f"|{r}{s}| over |{p}{q}|", "positive")
        step = (d.at(q) - d.at(p)) * t
        if old == s:
            d.put(r, d.at(s) + step)
        else:
            d.put(s, d.at(r) - step)
    _convex(d, quad)


@form("cyclic_quadrilateral")
def cyclic_quadrilateral(d: Drawing, quad: Names) -> None:
    """The fourth corner on the circle of three; in this order round it."""
    if framed(d, "cyclic_quadrilateral", quad):
        return
    order = sorted(quad, key=lambda p: not d.has(p))
    three = tuple(order[:3])
    _ensure(d, three)
    d.proper(three)
    on_round(d, order[3], d.circle(Run(three)))
    _convex(d, quad)


@form("tangential_quadrilateral")
def tangential_quadrilateral(d: Drawing, quad: Names) -> None:
    """Convex, and both pairs of opposite sides have one sum (Pitot; the converse by Steiner)."""
    if framed(d, "tangential_quadrilateral", quad):
        return
    _ensure(d, quad)
    _convex(d, quad)
    p, q, r, s = quad
    d.numbers.vanish(
        d.span(p, q) + d.span(r, s) - d.span(q, r) - d.span(s, p), "the sums of opposite sides differ"
    )


# ---------------------------------------------------------------- regular polygons


def _regular(d: Drawing, names: Names, cos: Num, sin: Num, first: bool) -> None:
    """Each side is the one before turned by the outer angle."""
    names = _placed_first(d, names)
    _ensure(d, names[:2])
    d.apart(names[0], names[1])
    sin = sin * _orientation_sign(d, first)
    side = d.at(names[1]) - d.at(names[0])
    at = d.at(names[1])
    for p in names[2:]:
        side = side * cos + side.turned() * sin
        at = at + side
        d.put(p, at)


@form("regular_pentagon")
def regular_pentagon(d: Drawing, names: Names) -> None:
    """72 degrees: cosine (sqrt(5) - 1)/4, sine sqrt(10 + 2 sqrt(5))/4 (Euclid IV.11)."""
    n = d.numbers
    first = not d.figure.points
    root5 = n.root(n.number(5))
    _regular(d, names, (root5 - 1) * HALF * HALF, n.root(root5 * 2 + 10) * (HALF * HALF), first)


@form("regular_hexagon")
def regular_hexagon(d: Drawing, names: Names) -> None:
    """60 degrees: cosine 1/2, sine sqrt(3)/2."""
    n = d.numbers
    _regular(d, names, n.number(HALF), n.root(n.number(3)) * HALF, not d.figure.points)
