"""A figure: named points, the facts that define its named curves, and the value of every quantity.

A value comes with its sensitivity: if every coordinate is off by t times the figure's size, the value
is off by about t times that much.  Comparisons are judged on this scale.  Rigour: float hint (about
1e-15 of the sensitivity in floats, 1e-55 in digits).
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from fractions import Fraction
from typing import Any

import numpy as np

from surdwise.sheet.tree import Binary, CentreOf, Fact, Measure, Named, Number, Pt, Sheet, Through, Unary

from .plane import (
    Circle,
    Line,
    Num,
    Vec,
    circumcentre,
    cross,
    dot,
    excentre,
    gap,
    incentre,
    inner_direction,
    is_digits,
    line_of,
    middle,
    most,
    number,
    over,
    power,
    root,
    weighted,
)

Value = tuple[Num, Num]  # the value and its sensitivity
LINES = frozenset(
    ("line_through", "parallel", "perpendicular", "tangent", "perpendicular_bisector", "angle_bisector")
)
CIRCLES = frozenset(
    ("circle_through", "circle_centre_through", "circle_diameter", "circle_centre_radius", "incircle")
    + ("excircle",)
)


class Figure:
    """Points by name (columns), and the facts behind the names of curves."""

    def __init__(self, points: Mapping[str, Vec], curves: Mapping[str, Fact], digits: bool) -> None:
        self.points = dict(points)
        self.curves = dict(curves)
        self.digits = digits
        self._known: dict[str, Line | Circle] = {}
        self._size: tuple[int, Num] = (0, 1.0)

    @classmethod
    def of(cls, sheet: Sheet, coordinates: Mapping[str, Any]) -> Figure:
        """One figure from plain coordinates: (x, y) pairs or complex numbers, floats or mpmath's."""
        points, digits = {}, False
        for name, value in coordinates.items():
            x, y = (value.real, value.imag) if hasattr(value, "real") else value
            digits = digits or hasattr(x, "_mpf_") or hasattr(y, "_mpf_")
            points[name] = (x, y)
        kind = object if digits else float
        columns = {n: Vec(np.array([x], dtype=kind), np.array([y], dtype=kind)) for n, (x, y) in points.items()}
        return cls(columns, named_curves(sheet), digits)

    def take(self, index: Any) -> Figure:
        """The figures of an index array or mask."""
        return Figure({n: Vec(p.x[index], p.y[index]) for n, p in self.points.items()}, self.curves, self.digits)

    @property
    def tiny(self) -> float:
        """Below this share of the size, what ought to be positive counts as zero."""
        return 1e-40 if self.digits else 1e-9

    @property
    def size(self) -> Num:
        """The larger side of the box around all points; 1 for a single point."""
        if self._size[0] != len(self.points):
            xs, ys = [p.x for p in self.points.values()], [p.y for p in self.points.values()]
            s = most([most(xs) + most([-x for x in xs]), most(ys) + most([-y for y in ys])])
            self._size = len(self.points), np.where(s > 0, s, np.where(s == s, 1 + 0 * s, s))
        return self._size[1]

    def at(self, ref: Any) -> Vec:
        if isinstance(ref, CentreOf):
            return self.circle(ref.circle).c
        assert isinstance(ref, Pt)
        return self.points[ref.name]

    def run(self, refs: Any) -> tuple[Vec, ...]:
        return tuple(self.at(r) for r in refs)

    def is_line(self, curve: Any) -> bool:
        if isinstance(curve, Through):
            return len(curve.points) == 2
        return self.curves[curve.name].form in LINES

    def line(self, curve: Any) -> Line:
        found = self._curve(curve)
        assert isinstance(found, Line)
        return found

    def circle(self, curve: Any) -> Circle:
        found = self._curve(curve)
        assert isinstance(found, Circle)
        return found

    def _curve(self, curve: Any) -> Line | Circle:
        if isinstance(curve, Through):
            p = self.run(curve.points)
            return line_of(*p) if len(p) == 2 else _round(*p)
        assert isinstance(curve, Named)
        if curve.name not in self._known:
            self._known[curve.name] = self._draw(self.curves[curve.name])
        return self._known[curve.name]

    def _draw(self, fact: Fact) -> Line | Circle:
        a: tuple[Any, ...] = fact.args
        match fact.form:
            case "line_through":
                return line_of(*self.run(a[1]))
            case "parallel":
                m = self.line(a[1])
                return Line(self.at(a[2]), m.d, m.base)
            case "perpendicular":
                m = self.line(a[1])
                return Line(self.at(a[2]), m.d.left(), m.base)
            case "tangent":
                k, p = self.circle(a[1]), self.at(a[2])
                return Line(p, (p - k.c).unit().left(), k.r)
            case "perpendicular_bisector":
                m = line_of(*self.run(a[1]))
                return Line(middle(*self.run(a[1])), m.d.left(), m.base)
            case "angle_bisector":
                b, v, c = self.run(a[1])
                d = inner_direction(b, v, c)
                return Line(v, d, (gap(b, v) + gap(c, v)) * 0.5)
            case "circle_through":
                return _round(*self.run(a[1]))
            case "circle_centre_through":
                o = self.at(a[1])
                return Circle(o, gap(o, self.at(a[2])))
            case "circle_diameter":
                p, q = self.run(a[1])
                return Circle(middle(p, q), gap(p, q) * 0.5)
            case "circle_centre_radius":
                o = self.at(a[1])
                return Circle(o, value(a[2], self)[0] + 0 * o.x)
            case "incircle":
                p, q, s = self.run(a[1])
                i = incentre(p, q, s)
                return Circle(i, np.abs(line_of(p, q).height(i)))
            case "excircle":
                p, q, s = _from(self, a[1], a[2])
                j = excentre(p, q, s)
                return Circle(j, np.abs(line_of(q, s).height(j)))
        raise ValueError(fact.form)


def named_curves(sheet: Sheet) -> dict[str, Fact]:
    """The facts of a sheet that name a line or a circle."""
    out: dict[str, Fact] = {}
    for line in sheet.given:
        if isinstance(line.body, Fact) and line.body.form in LINES | CIRCLES:
            name = line.body.args[0]
            assert isinstance(name, Named)
            out[name.name] = line.body
    return out


def _round(a: Vec, b: Vec, c: Vec) -> Circle:
    o = circumcentre(a, b, c)
    return Circle(o, gap(o, a))


def _from(fig: Figure, triangle: Sequence[Any], corner: Any) -> tuple[Vec, Vec, Vec]:
    """The triangle's corners, the named one first."""
    i = [p.name for p in triangle].index(corner.name)
    a, b, c = (fig.at(triangle[(i + j) % 3]) for j in range(3))
    return a, b, c


# ------------------------------------------------------------------------------ quantities


def value(q: Any, fig: Figure) -> Value:
    """A quantity on every figure, with its sensitivity; NaN where it is undefined."""
    s = fig.size
    if isinstance(q, Number):
        v = number(q.value, s)
        return v, np.abs(v)
    if isinstance(q, Measure):
        return _measured(q, fig)
    if isinstance(q, Unary):
        v, e = value(q.arg, fig)
        if q.op == "neg":
            return -v, e
        if q.op == "abs":
            return np.abs(v), e
        noise = 1e-50 if is_digits(v) else 1e-14
        v = np.where(np.abs(v) <= noise * e, 0 * v, v)  # a zero that rounding hides
        w = root(v)
        return w, over(e, w + root(e * noise), 0.0)
    assert isinstance(q, Binary)
    v, e = value(q.left, fig)
    if q.op == "^":
        n = whole(q.right)
        w = power(v, n)
        return w, np.abs(n * power(v, n - 1)) * e if n else 1 + 0 * e
    w, f = value(q.right, fig)
    if q.op == "+":
        return v + w, e + f
    if q.op == "-":
        return v - w, e + f
    if q.op == "*":
        return v * w, np.abs(v) * f + np.abs(w) * e
    w = np.where(np.abs(w) <= fig.tiny * 1e-3 * f, 0 * w, w)
    return over(v, w), over(e, np.abs(w)) + over(np.abs(v) * f, w * w)


def whole(q: Any) -> int:
    """The exponent of a power."""
    if isinstance(q, Unary) and q.op == "neg":
        return -whole(q.arg)
    assert isinstance(q, Number) and Fraction(q.value).denominator == 1
    return int(q.value)


def _measured(q: Measure, fig: Figure) -> Value:
    s = fig.size
    p = fig.run(q.points)
    if q.kind == "length":
        return gap(*p), s
    if q.kind == "dist":
        m = fig.line(q.line)
        return np.abs(m.height(p[0])), s * (1 + over(gap(p[0], m.p), m.base))
    if q.kind == "perimeter":
        return sum(gap(a, b) for a, b in zip(p, p[1:] + p[:1], strict=True)), s * len(p)
    if q.kind in ("cos", "sin"):
        u, v = p[0] - p[1], p[2] - p[1]
        m, n = u.len(), v.len()
        top = dot(u, v) if q.kind == "cos" else np.abs(cross(u, v))
        return over(top, m * n), over(s, m) + over(s, n)
    if q.kind == "area":
        o = p[0]
        twice = sum(cross(a - o, b - o) for a, b in zip(p[1:], p[2:], strict=False))
        return np.abs(twice) * 0.5, s * sum(gap(a, b) for a, b in zip(p, p[1:] + p[:1], strict=True))
    triangle: Any = q.points[:3]
    a, b, c = _from(fig, triangle, q.points[3]) if len(q.points) == 4 else p
    return _of_triangle(q.kind, a, b, c, s)


def _of_triangle(kind: str, a: Vec, b: Vec, c: Vec, s: Num) -> Value:
    """Median, altitude and so on from a; radii."""
    x, y, z = gap(b, c), gap(c, a), gap(a, b)
    if kind == "median":
        return gap(a, middle(b, c)), s
    if kind == "bisector":
        foot = weighted((b, c), (y, z))
        straight = cross(b - a, c - a) == 0
        return np.where(straight, NAN_LIKE, gap(a, foot)), 3 * s * (1 + over(x, y + z))
    area = np.abs(cross(b - a, c - a)) * 0.5
    e = s * (x + y + z)
    if kind == "altitude":
        return over(2 * area, x), over(e, x)
    half = (x + y + z) * 0.5
    area = np.where(area == 0, NAN_LIKE, area)
    if kind == "inradius":
        return over(area, half), 3 * over(e, half)
    if kind == "circumradius":
        r = over(x * y * z, 4 * area)
        return r, r * (over(s, x) + over(s, y) + over(s, z) + over(e, area))
    assert kind == "exradius"
    rest = half - x
    return over(area, rest), over(e, rest) + over(area * 3 * s, rest * rest)


NAN_LIKE = float("nan")
