"""Truth of conditions on a figure, in any arithmetic; and which conditions are open or closed."""

from __future__ import annotations

from collections.abc import Callable
from itertools import combinations
from typing import Any, cast

from .forms_plane import Figure, View, cross, dot, square
from .protocol import Arithmetic, FrameArithmetic, Num
from .quantities import difference
from .tree import And, Compare, Condition, CurveRef, FrameSign, Not, Or, PointRef, Says

Triple = tuple[str, ...]


def truth(c: Condition, figure: Figure, arithmetic: Arithmetic) -> bool:
    """Whether the condition holds; and / or are read from the left and stop early.

    Undefined where something that is read has no value.
    """
    return _holds(c, View(figure, arithmetic))


def _holds(c: Condition, v: View) -> bool:
    match c:
        case Not():
            return not _holds(c.arg, v)
        case And():
            return all(_holds(x, v) for x in c.args)
        case Or():
            return any(_holds(x, v) for x in c.args)
        case Compare():
            return all(_link(c.items[i], op, c.items[i + 1], v) for i, op in enumerate(c.ops))
        case FrameSign():
            return _frame_sign(c, v)
        case Says():
            if c.form in EQUATIONS:
                return all(v.numbers.zero(e) for e in equations(c, v))
            return CONDITIONS[c.form](v, *c.args)


def _link(left: Any, op: str, right: Any, v: View) -> bool:
    e = difference(left, right, v)
    if op == "=":
        return v.numbers.zero(e)
    if op == "<":
        return v.numbers.sign(e) < 0
    if op == ">":
        return v.numbers.sign(e) > 0
    return v.numbers.weak_sign(e) <= 0 if op == "<=" else v.numbers.weak_sign(e) >= 0


def _frame_sign(c: FrameSign, v: View) -> bool:
    """A polynomial of the frame's parameters; false where one of them has no value."""
    numbers = cast(FrameArithmetic, v.numbers)
    total = numbers.number(0)
    values: dict[int, Num] = {}
    for mono, factor in c.terms:
        term = numbers.number(factor)
        for k, e in mono:
            if k not in values:
                u = numbers.frame_parameter(k)
                if u is None:
                    return False
                values[k] = u
            for _ in range(e):
                term = term * values[k]
        total = total + term
    if c.op in ("=", "!="):
        return numbers.zero(total) == (c.op == "=")
    if c.op in ("<", ">"):
        return numbers.sign(total) == (1 if c.op == ">" else -1)
    return numbers.weak_sign(total) != (-1 if c.op == ">=" else 1)


# ---------------------------------------------------------------- relations that are equations


def _collinear(v: View, pts: Triple) -> list[Num]:
    return [v.turn(a, b, c) for a, b, c in combinations(pts, 3)]


def _parallel(v: View, a: CurveRef, b: CurveRef) -> list[Num]:
    return [cross(v.line(a).direction, v.line(b).direction)]


def _perpendicular(v: View, a: CurveRef, b: CurveRef) -> list[Num]:
    return [dot(v.line(a).direction, v.line(b).direction)]


def _on_line(v: View, p: PointRef, line: CurveRef) -> list[Num]:
    return [v.offset(p, v.line(line))]


def _on_circle(v: View, p: PointRef, k: CurveRef) -> list[Num]:
    c = v.circle(k)
    return [square(v.at(p) - c.centre) - c.radius2]


EQUATIONS: dict[str, Callable[..., list[Num]]] = {
    "collinear": _collinear,
    "parallel_lines": _parallel,
    "perpendicular_lines": _perpendicular,
    "on_line": _on_line,
    "on_circle": _on_circle,
}


def equations(c: Says, v: View) -> list[Num]:
    """Numbers that all vanish exactly where the relation holds (a form of EQUATIONS)."""
    return EQUATIONS[c.form](v, *c.args)


def circle_test(v: View, a: PointRef, b: PointRef, c: PointRef, d: PointRef) -> Num:
    """Determinant of the rows (x, y, x^2 + y^2, 1) of four points, up to sign: zero where they lie on one
    circle or one line."""
    o = v.at(d)
    p, q, r = (v.at(x) - o for x in (a, b, c))
    return square(p) * cross(q, r) + square(q) * cross(r, p) + square(r) * cross(p, q)


# ---------------------------------------------------------------- conditions in words


def _concyclic(v: View, pts: Triple) -> bool:
    """Some circle carries all the points.

    Where the first three are on one line, coinciding points are counted once; then two points always have a
    circle, and more need three that are not on one line.
    """
    zero = v.numbers.zero
    if zero(v.turn(*pts[:3])):
        apart: list[str] = []
        for p in pts:
            if not any(zero(v.gap2(p, q)) for q in apart):
                apart.append(p)
        if len(apart) < 3:
            return True
        pts = tuple(apart)
        if zero(v.turn(*pts[:3])):
            return False
    return all(zero(circle_test(v, pts[0], pts[1], pts[2], d)) for d in pts[3:])


def _between(v: View, c: str, a: str, b: str) -> bool:
    return v.numbers.zero(v.turn(a, b, c)) and v.numbers.sign(v.lean(c, a, b)) < 0


def _seen_from_sides(v: View, p: str, tri: Triple) -> tuple[int, list[int]]:
    """Sign of the triangle's area, and p's sides of its three sides: 1 within, -1 beyond."""
    whole = v.numbers.sign(v.turn(*tri))
    edges = ((tri[0], tri[1]), (tri[1], tri[2]), (tri[2], tri[0]))
    return whole, [v.numbers.sign(v.turn(a, b, p)) * whole for a, b in edges]


def _inside(v: View, p: str, tri: Triple) -> bool:
    whole, seen = _seen_from_sides(v, p, tri)
    return whole != 0 and min(seen) > 0


def _outside(v: View, p: str, tri: Triple) -> bool:
    whole, seen = _seen_from_sides(v, p, tri)
    return whole != 0 and min(seen) < 0


def _sides_of(v: View, p: str, q: str, line: CurveRef) -> int:
    m = v.line(line)
    s = v.numbers.sign(v.offset(p, m))
    return s and s * v.numbers.sign(v.offset(q, m))


def _same_side(v: View, p: str, q: str, line: CurveRef) -> bool:
    return _sides_of(v, p, q, line) > 0


def _opposite_sides(v: View, p: str, q: str, line: CurveRef) -> bool:
    return _sides_of(v, p, q, line) < 0


def _angle(v: View, triple: Triple) -> str:
    b, a, c = triple
    for p in (b, c):
        v.differ(v.at(a), v.at(p), f"{a} = {p}")
    return {1: "acute", 0: "right", -1: "obtuse"}[v.numbers.sign(v.lean(a, b, c))]


def _angle_size(v: View, triple: Triple, size: str) -> bool:
    return _angle(v, triple) == size


def _triangle_size(v: View, tri: Triple, size: str) -> bool:
    a, b, c = tri
    angles = ((c, a, b), (a, b, c), (b, c, a))
    if size == "acute":
        return all(_angle(v, x) == size for x in angles)
    return any(_angle(v, x) == size for x in angles)


def _convex(v: View, quad: Triple) -> bool:
    """Strictly convex: all corners turn the same way (enough for four corners)."""
    n = len(quad)
    turns = {v.numbers.sign(v.turn(quad[i], quad[(i + 1) % n], quad[(i + 2) % n])) for i in range(n)}
    return turns in ({1}, {-1})


def _distinct(v: View, pts: Triple) -> bool:
    return not any(v.numbers.zero(v.gap2(a, b)) for a, b in combinations(pts, 2))


def _on_segment(v: View, p: str, pair: Triple) -> bool:
    a, b = pair
    return v.numbers.zero(v.turn(a, b, p)) and v.numbers.weak_sign(v.lean(p, a, b)) <= 0


def _on_ray(v: View, p: str, pair: Triple) -> bool:
    a, b = pair
    v.differ(v.at(a), v.at(b), f"{a} = {b}")
    return v.numbers.zero(v.turn(a, b, p)) and v.numbers.weak_sign(v.lean(a, p, b)) >= 0


def _is_equilateral(v: View, tri: Triple) -> bool:
    a, b, c = tri
    x = v.gap2(b, c)
    return v.numbers.zero(v.gap2(a, b) - x) and v.numbers.zero(x - v.gap2(c, a))


def _is_isosceles(v: View, tri: Triple, apex: str) -> bool:
    b, c = (p for p in tri if p != apex)
    return v.numbers.zero(v.gap2(apex, b) - v.gap2(apex, c))


CONDITIONS: dict[str, Callable[..., bool]] = {
    "concyclic": _concyclic,
    "between": _between,
    "inside": _inside,
    "outside": _outside,
    "same_side": _same_side,
    "opposite_sides": _opposite_sides,
    "angle_size": _angle_size,
    "triangle_size": _triangle_size,
    "convex": _convex,
    "distinct": _distinct,
    "on_segment": _on_segment,
    "on_ray": _on_ray,
    "is_equilateral": _is_equilateral,
    "is_isosceles": _is_isosceles,
}


# ---------------------------------------------------------------- open and closed

_OPEN = {"inside", "outside", "same_side", "opposite_sides", "convex", "distinct"}
_CLOSED = {*EQUATIONS, "on_segment", "on_ray", "is_equilateral", "is_isosceles"}


def is_open(c: Condition) -> bool:
    """Whether a figure on which the condition is true (and everything in it defined) has a neighbourhood
    on which it is; equations that hold on the whole component count as true (so `between` is open)."""
    match c:
        case Not():
            return is_closed(c.arg)
        case And() | Or():
            return all(is_open(x) for x in c.args)
        case Compare():
            return all(op in "<>" for op in c.ops)
        case Says():
            return c.form in _OPEN or c.form == "between" or c.args[-1] in ("acute", "obtuse")
        case FrameSign():
            return False


def is_closed(c: Condition) -> bool:
    """Whether the condition is true on every limit of figures on which it is true, if everything in it is
    defined there.  Not so `concyclic` (a circle may grow into a line) and `not C between A and B` (the
    equation in it may begin to hold)."""
    match c:
        case Not():
            return _is_strictly_open(c.arg)
        case And() | Or():
            return all(is_closed(x) for x in c.args)
        case Compare():
            return all(op in ("=", "<=", ">=") for op in c.ops)
        case Says():
            return c.form in _CLOSED
        case FrameSign():
            return False


def _is_strictly_open(c: Condition) -> bool:
    """Open with no equation inside that is only true because it holds on the whole component."""
    match c:
        case Not():
            return is_closed(c.arg)
        case And() | Or():
            return all(_is_strictly_open(x) for x in c.args)
        case Says():
            return c.form != "between" and is_open(c)
        case _:
            return is_open(c)
