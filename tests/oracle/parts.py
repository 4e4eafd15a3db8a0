"""What each form of the language asks of the points, as numbers.

Every number is a length divided by the figure's size (so it means the same for every form):
`zero` must vanish, `at_least` must be >= 0, `above` must be > 0; where a `needs` is not > 0 the line is
undefined (a line through one point twice); where a `clear` is not > 0 its reading is a matter of taste,
and random figures keep away.  Rigour: float hint.
"""

from __future__ import annotations

import itertools
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field
from typing import Any

import numpy as np

from surdwise.sheet.tree import Comparison, Fact, Pt, Relation

from .figure import Figure, _from, value
from .made import MADE, flatness, made, new_names
from .plane import (
    NAN,
    Line,
    Num,
    Vec,
    circumcentre,
    cross,
    dot,
    gap,
    inner_direction,
    least,
    line_of,
    most,
    over,
    sgn,
)


@dataclass
class Parts:
    zero: list[Num] = field(default_factory=list)
    at_least: list[Num] = field(default_factory=list)
    above: list[Num] = field(default_factory=list)
    needs: list[Num] = field(default_factory=list)
    clear: list[Num] = field(default_factory=list)


def parts(body: Fact | Relation | Comparison, fig: Figure) -> Parts:
    """The parts of one line; a comparison is measured against the sensitivity of its sides."""
    if isinstance(body, Comparison):
        return _comparison(body, fig)
    if isinstance(body, Fact) and body.form in MADE:
        return _made(body, fig)
    return FORMS[body.form](fig, *body.args)


def _comparison(body: Comparison, fig: Figure) -> Parts:
    out = Parts()
    values = [value(q, fig) for q in body.items]
    for (v, e), (w, f), op in zip(values, values[1:], body.ops, strict=False):
        m = over(w - v, e + f, 0.0)
        if op == "=":
            out.zero.append(m)
        else:
            (out.above if op in "<>" else out.at_least).append(m if op in ("<", "<=") else -m)
    return out


def _made(fact: Fact, fig: Figure) -> Parts:
    points = [fig.points[n] for n in new_names(fact)]
    a: tuple[Any, ...] = fact.args
    best: Num = None
    for choice in made(fact, fig):
        miss = sum(gap(p, q) for p, q in zip(points, choice, strict=True))
        best = miss if best is None else np.where((miss < best) | (best != best), miss, best)
    out = Parts(zero=[best / fig.size])
    s = fig.size
    if fact.form == "centroid":
        out.clear.append(flatness(*fig.run(a[1])) / s)
    if fact.form == "foot_of_bisector":
        b, v, c = fig.run(a[1])
        out.needs.append(_unbent(b, v, c))
        if {p.name for p in a[2]} != {a[1][0].name, a[1][2].name}:
            out.clear.append(dot(inner_direction(b, v, c), points[0] - v) / s)
        out.clear.append(flatness(b, v, c) / s)
    if fact.form in ("foot", "reflection_in_line"):
        out.needs.append(fig.line(a[2]).base / s)
    return out


def _unbent(b: Vec, v: Vec, c: Vec) -> Num:
    """Positive unless the angle at v is straight or an arm has no length."""
    return ((b - v).unit() + (c - v).unit()).len()


# ------------------------------------------------------------------------------ shapes


def _points(fig: Figure, refs: Any) -> Parts:
    p = fig.run(refs)
    return Parts(above=[gap(a, b) / fig.size for a, b in itertools.combinations(p, 2)])


def _triangle(fig: Figure, refs: Any) -> Parts:
    return Parts(above=[flatness(*fig.run(refs)) / fig.size])


def _quadrilateral(fig: Figure, refs: Any) -> Parts:
    return Parts(above=[flatness(*t) / fig.size for t in itertools.combinations(fig.run(refs), 3)])


def _same(fig: Figure, a: Vec, b: Vec, c: Vec, d: Vec) -> Num:
    """|AB| - |CD|."""
    return (gap(a, b) - gap(c, d)) / fig.size


def _square_on(fig: Figure, u: Vec, v: Vec) -> Num:
    """Zero where two vectors are at right angles: the shorter one's projection on the other."""
    m, n = u.len(), v.len()
    return over(dot(u, v), np.where(m > n, m, n), 0.0) / fig.size


def _aligned(fig: Figure, u: Vec, v: Vec) -> Num:
    m, n = u.len(), v.len()
    return over(cross(u, v), np.where(m > n, m, n), 0.0) / fig.size


def _equilateral(fig: Figure, refs: Any) -> Parts:
    a, b, c = fig.run(refs)
    out = _triangle(fig, refs)
    out.zero = [_same(fig, a, b, b, c), _same(fig, b, c, c, a)]
    return out


def _isosceles(fig: Figure, refs: Any, apex: Any) -> Parts:
    a, b, c = _from(fig, refs, apex)
    out = _triangle(fig, refs)
    out.zero = [_same(fig, a, b, a, c)]
    return out


def _right(fig: Figure, refs: Any, corner: Any) -> Parts:
    a, b, c = _from(fig, refs, corner)
    out = _triangle(fig, refs)
    out.zero = [_square_on(fig, b - a, c - a)]
    return out


def _parallelogram(fig: Figure, refs: Any) -> Parts:
    a, b, c, d = fig.run(refs)
    e = (a - b) + (c - d)
    return Parts(zero=[e.x / fig.size, e.y / fig.size], above=[flatness(a, b, d) / fig.size])


def _rectangle(fig: Figure, refs: Any) -> Parts:
    a, b, _, d = fig.run(refs)
    out = _parallelogram(fig, refs)
    out.zero.append(_square_on(fig, b - a, d - a))
    return out


def _rhombus(fig: Figure, refs: Any) -> Parts:
    a, b, _, d = fig.run(refs)
    out = _parallelogram(fig, refs)
    out.zero.append(_same(fig, a, b, a, d))
    return out


def _square(fig: Figure, refs: Any) -> Parts:
    a, b, _, d = fig.run(refs)
    out = _rectangle(fig, refs)
    out.zero.append(_same(fig, a, b, a, d))
    return out


def bulge(p: Sequence[Vec]) -> Num:
    """Positive for a strictly convex quadrilateral with its corners in order."""
    turns = []
    for i in range(4):
        u, v = p[i] - p[i - 1], p[(i + 1) % 4] - p[i]
        m, n = u.len(), v.len()
        turns.append(over(cross(u, v), np.where(m > n, m, n), 0.0))
    up, down = least(turns), least([-t for t in turns])
    return np.where((up > down) | (up != up), up, down)


def _convex(fig: Figure, refs: Any) -> Parts:
    return Parts(above=[bulge(fig.run(refs)) / fig.size])


def _kite(fig: Figure, refs: Any) -> Parts:
    a, b, c, d = fig.run(refs)
    out = _convex(fig, refs)
    out.zero = [_same(fig, a, b, a, d), _same(fig, c, b, c, d)]
    return out


def _trapezium(fig: Figure, refs: Any) -> Parts:
    a, b, c, d = fig.run(refs)
    out = _convex(fig, refs)
    out.zero = [_aligned(fig, b - a, d - c)]
    return out


def _cyclic(fig: Figure, refs: Any) -> Parts:
    a, b, c, d = fig.run(refs)
    out = _convex(fig, refs)
    o = circumcentre(a, b, c)
    out.zero = [(gap(o, d) - gap(o, a)) / fig.size]
    return out


def _tangential(fig: Figure, refs: Any) -> Parts:
    a, b, c, d = fig.run(refs)
    out = _convex(fig, refs)
    out.zero = [(gap(a, b) + gap(c, d) - gap(b, c) - gap(d, a)) / fig.size]
    return out


def _regular(fig: Figure, refs: Any) -> Parts:
    p = fig.run(refs)
    n = len(p)
    turn = 2 * angle_of_half_turn(fig) / n * sgn(cross(p[1] - p[0], p[2] - p[1]))
    out = Parts(above=[gap(p[0], p[1]) / fig.size])
    for i in range(2, n):
        e = p[i - 1] + (p[i - 1] - p[i - 2]).turned(turn) - p[i]
        out.zero += [e.x / fig.size, e.y / fig.size]
    return out


def angle_of_half_turn(fig: Figure) -> Num:
    import mpmath  # type: ignore[import-untyped]

    return +mpmath.pi if fig.digits else np.pi


# ------------------------------------------------------------------------------ points on


def _on_line(fig: Figure, p: Any, line: Any) -> Parts:
    m = fig.line(line)
    return Parts(zero=[m.height(fig.at(p)) / fig.size], needs=[m.base / fig.size])


def _on_segment(fig: Figure, p: Any, pair: Any) -> Parts:
    a, b = fig.run(pair)
    q, u = fig.at(p), (b - a).unit()
    out = Parts([line_of(a, b).height(q) / fig.size], needs=[gap(a, b) / fig.size])
    out.at_least = [dot(u, q - a) / fig.size, dot(u, b - q) / fig.size]
    return out


def _on_ray(fig: Figure, p: Any, pair: Any) -> Parts:
    out = _on_segment(fig, p, pair)
    out.at_least = out.at_least[:1]
    return out


def _on_circle(fig: Figure, p: Any, circle: Any) -> Parts:
    k = fig.circle(circle)
    return Parts([(gap(fig.at(p), k.c) - k.r) / fig.size], needs=[k.r / fig.size])


def _on_perpendicular_bisector(fig: Figure, p: Any, pair: Any) -> Parts:
    a, b = fig.run(pair)
    q = fig.at(p)
    return Parts([_same(fig, q, a, q, b)], needs=[gap(a, b) / fig.size])


def _on_angle_bisector(fig: Figure, p: Any, triple: Any) -> Parts:
    b, v, c = fig.run(triple)
    d = inner_direction(b, v, c)
    q = fig.at(p) - v
    return Parts(
        [cross(d, q) / fig.size], [dot(d, q) / fig.size], needs=[_unbent(b, v, c)], clear=[_unbent(b, v, c)]
    )


def _depth(fig: Figure, p: Any, triple: Any) -> tuple[Num, Num]:
    """How deep inside the triangle (negative outside), and the triangle's flatness."""
    a, b, c = fig.run(triple)
    q = fig.at(p)
    side = sgn(cross(b - a, c - a))
    depth = least([line_of(x, y).height(q) * side for x, y in ((a, b), (b, c), (c, a))])
    return depth / fig.size, flatness(a, b, c) / fig.size


def _inside(fig: Figure, p: Any, triple: Any) -> Parts:
    depth, solid = _depth(fig, p, triple)
    return Parts(above=[depth], needs=[solid])


def _outside(fig: Figure, p: Any, triple: Any) -> Parts:
    depth, solid = _depth(fig, p, triple)
    return Parts(above=[-depth], needs=[solid])


# ------------------------------------------------------------------------------ curves


def _curve(fig: Figure, name: Any, *_: Any) -> Parts:
    if fig.is_line(name):
        m = fig.line(name)
        proper = m.p.fits() & m.d.fits()
        return Parts(needs=[np.where(proper, m.base / fig.size, NAN)])
    k = fig.circle(name)
    return Parts(needs=[np.where(k.c.fits(), k.r / fig.size, NAN)])


def _circle_through(fig: Figure, name: Any, triple: Any) -> Parts:
    return Parts(needs=[flatness(*fig.run(triple)) / fig.size])


def _excircle(fig: Figure, name: Any, triple: Any, corner: Any) -> Parts:
    return _circle_through(fig, name, triple)


def _tangent(fig: Figure, name: Any, circle: Any, p: Any) -> Parts:
    return _on_circle(fig, p, circle)


def _angle_bisector(fig: Figure, name: Any, triple: Any) -> Parts:
    return Parts(needs=[_unbent(*fig.run(triple))], clear=[_unbent(*fig.run(triple))])


# ------------------------------------------------------------------------------ relations


def _collinear(fig: Figure, refs: Any) -> Parts:
    out = Parts()
    for a, b, c in itertools.combinations(fig.run(refs), 3):
        x, y, z = gap(b, c), gap(c, a), gap(a, b)
        out.zero.append(over(cross(b - a, c - a), most([x, y, z]), 0.0) / fig.size)
    return out


def _concyclic(fig: Figure, refs: Any) -> Parts:
    """Every four on a circle, the points not all on a line."""
    p = fig.run(refs)
    out = Parts()
    solid = []
    for four in itertools.combinations(p, 4):
        triples = list(itertools.combinations(four, 3))
        areas = [np.abs(cross(b - a, c - a)) for a, b, c in triples]
        width = most([gap(a, b) for a, b in itertools.combinations(four, 2)])
        u, v, w = (q - four[3] for q in four[:3])
        det = dot(u, u) * cross(v, w) - dot(v, v) * cross(u, w) + dot(w, w) * cross(u, v)
        out.zero.append(over(over(det, most(areas), 0.0), width, 0.0) / fig.size)
        solid += [flatness(*t) for t in triples]
    out.above.append(most(solid) / fig.size)
    return out


def _directions(fig: Figure, one: Any, two: Any) -> tuple[Line, Line, Num, list[Num]]:
    m, n = fig.line(one), fig.line(two)
    return m, n, np.where(m.base < n.base, m.base, n.base) / fig.size, [m.base / fig.size, n.base / fig.size]


def _parallel(fig: Figure, one: Any, two: Any) -> Parts:
    m, n, scale, needs = _directions(fig, one, two)
    return Parts([cross(m.d, n.d) * scale], needs=needs)


def _perpendicular(fig: Figure, one: Any, two: Any) -> Parts:
    m, n, scale, needs = _directions(fig, one, two)
    return Parts([dot(m.d, n.d) * scale], needs=needs)


# ------------------------------------------------------------------------------ conditions


def _between(fig: Figure, c: Any, a: Any, b: Any) -> Parts:
    u, v = fig.at(a) - fig.at(c), fig.at(b) - fig.at(c)
    return Parts([_aligned(fig, u, v)], above=[-_square_on(fig, u, v), u.len() / fig.size, v.len() / fig.size])


def _sides(fig: Figure, p: Any, q: Any, line: Any) -> tuple[Num, list[Num]]:
    """Positive on one side, negative on opposite sides, 0 on the line: the lesser distance."""
    m = fig.line(line)
    h, k = m.height(fig.at(p)), m.height(fig.at(q))
    size = np.where(np.abs(h) < np.abs(k), np.abs(h), np.abs(k))
    return size * sgn(h) * sgn(k) / fig.size + 0 * (h + k), [m.base / fig.size]


def _same_side(fig: Figure, p: Any, q: Any, line: Any) -> Parts:
    side, needs = _sides(fig, p, q, line)
    return Parts(above=[side], needs=needs)


def _opposite_sides(fig: Figure, p: Any, q: Any, line: Any) -> Parts:
    side, needs = _sides(fig, p, q, line)
    return Parts(above=[-side], needs=needs)


def _by_size(size: Any, sharpest: Num, needs: list[Num]) -> Parts:
    """acute where positive, right where zero, obtuse where negative."""
    if size == "right":
        return Parts([sharpest], needs=needs)
    return Parts(above=[sharpest if size == "acute" else -sharpest], needs=needs)


def _angle_size(fig: Figure, triple: Any, size: Any) -> Parts:
    b, v, c = fig.run(triple)
    needs = [gap(b, v) / fig.size, gap(c, v) / fig.size]
    return _by_size(size, _square_on(fig, b - v, c - v), needs)


def _triangle_size(fig: Figure, triple: Any, size: Any) -> Parts:
    p = fig.run(triple)
    least_one = least([_square_on(fig, p[i - 1] - p[i], p[i - 2] - p[i]) for i in range(3)])
    return _by_size(size, least_one, [flatness(*p) / fig.size])


def _is_equilateral(fig: Figure, triple: Any) -> Parts:
    a, b, c = fig.run(triple)
    return Parts([_same(fig, a, b, b, c), _same(fig, b, c, c, a)], needs=[gap(a, b) + gap(b, c) + 0 * fig.size])


def _is_isosceles(fig: Figure, triple: Any, apex: Pt) -> Parts:
    a, b, c = _from(fig, triple, apex)
    return Parts([_same(fig, a, b, a, c)])


FORMS: dict[str, Callable[..., Parts]] = {
    "points": _points,
    "distinct": _points,
    "triangle": _triangle,
    "quadrilateral": _quadrilateral,
    "equilateral_triangle": _equilateral,
    "isosceles_triangle": _isosceles,
    "right_triangle": _right,
    "square": _square,
    "rectangle": _rectangle,
    "parallelogram": _parallelogram,
    "rhombus": _rhombus,
    "kite": _kite,
    "trapezium": _trapezium,
    "cyclic_quadrilateral": _cyclic,
    "tangential_quadrilateral": _tangential,
    "regular_pentagon": _regular,
    "regular_hexagon": _regular,
    "on_line": _on_line,
    "on_segment": _on_segment,
    "on_ray": _on_ray,
    "on_circle": _on_circle,
    "on_perpendicular_bisector": _on_perpendicular_bisector,
    "on_angle_bisector": _on_angle_bisector,
    "inside_triangle": _inside,
    "circle_through": _circle_through,
    "circle_centre_through": _curve,
    "circle_diameter": _curve,
    "circle_centre_radius": _curve,
    "incircle": _circle_through,
    "excircle": _excircle,
    "line_through": _curve,
    "parallel": _curve,
    "perpendicular": _curve,
    "tangent": _tangent,
    "perpendicular_bisector": _curve,
    "angle_bisector": _angle_bisector,
    "collinear": _collinear,
    "concyclic": _concyclic,
    "parallel_lines": _parallel,
    "perpendicular_lines": _perpendicular,
    "between": _between,
    "inside": _inside,
    "outside": _outside,
    "same_side": _same_side,
    "opposite_sides": _opposite_sides,
    "angle_size": _angle_size,
    "triangle_size": _triangle_size,
    "convex": _convex,
    "is_equilateral": _is_equilateral,
    "is_isosceles": _is_isosceles,
}
