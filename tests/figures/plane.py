"""Random real figures of a claim sheet, in floats: shares no code with the program but the
reader.  Everything here is a float hint, good to about ten digits; nothing is a proof.

A figure is built from a vector of real numbers `theta` and a list of two-valued choices, line by
line.  Hypotheses that constrain become residuals and are solved for theta by least squares.
"""

from __future__ import annotations

import cmath
import math
import random
from collections.abc import Callable, Sequence
from typing import Any

from scipy.optimize import least_squares

from surdwise.sheet import (
    And,
    Binary,
    CentreOf,
    Comparison,
    Fact,
    Measure,
    Named,
    Not,
    Number,
    Or,
    Pt,
    Relation,
    Sheet,
    Unary,
)

Figure = dict[str, complex]


class NoFigure(Exception):
    """These numbers give no figure."""


class Canvas:
    """A figure being built from numbers and choices."""

    def __init__(self, theta: Sequence[float], choices: Sequence[int]) -> None:
        self.theta = list(theta)
        self.choices = list(choices)
        self.used = 0
        self.chosen = 0
        self.points: Figure = {}
        self.curves: dict[str, tuple[Any, ...]] = {}
        self.residuals: list[float] = []

    def number(self) -> float:
        if self.used == len(self.theta):
            raise IndexError
        self.used += 1
        return self.theta[self.used - 1]

    def choose(self) -> int:
        self.chosen += 1
        return self.choices[(self.chosen - 1) % len(self.choices)]

    def new(self) -> complex:
        return complex(self.number(), self.number())

    def at(self, ref: Any) -> complex:
        if isinstance(ref, CentreOf):
            return complex(self.circle(ref.circle)[0])
        return self.points[ref.name]

    def put(self, ref: Pt, z: complex) -> None:
        if ref.name in self.points:
            d = self.points[ref.name] - z
            self.residuals += [d.real, d.imag]
        else:
            self.points[ref.name] = z

    def line(self, ref: Any) -> tuple[complex, complex]:
        if isinstance(ref, Named):
            p, d = self.curves[ref.name]
        elif isinstance(ref, tuple):
            p, d = self.at(ref[0]), self.at(ref[1]) - self.at(ref[0])
        else:
            p, d = self.at(ref.points[0]), self.at(ref.points[1]) - self.at(ref.points[0])
        if abs(d) < 1e-9:
            raise NoFigure
        return p, d / abs(d)

    def circle(self, ref: Any) -> tuple[complex, float]:
        if isinstance(ref, Named):
            c, r = self.curves[ref.name]
            return c, r
        a, b, c = (self.at(p) for p in ref.points)
        o = circumcentre(a, b, c)
        return o, abs(a - o)

    def is_circle(self, ref: Any) -> bool:
        if isinstance(ref, Named):
            return isinstance(self.curves[ref.name][1], float)
        return len(ref.points) == 3


def cross(a: complex, b: complex) -> float:
    return (a.conjugate() * b).imag


def dot(a: complex, b: complex) -> float:
    return (a.conjugate() * b).real


def turn(a: complex, b: complex, c: complex) -> float:
    return cross(b - a, c - a)


def circumcentre(a: complex, b: complex, c: complex) -> complex:
    d = 2 * turn(a, b, c)
    if abs(d) < 1e-9:
        raise NoFigure
    b, c = b - a, c - a
    return a + (1j * (b * abs(c) ** 2 - c * abs(b) ** 2)) / d


def foot(p: complex, line: tuple[complex, complex]) -> complex:
    q, d = line
    return q + d * dot(d, p - q)


def incentre(a: complex, b: complex, c: complex, sign: tuple[int, int, int] = (1, 1, 1)) -> complex:
    w = [s * x for s, x in zip(sign, (abs(b - c), abs(c - a), abs(a - b)), strict=True)]
    return (w[0] * a + w[1] * b + w[2] * c) / sum(w)


def meet(m: tuple[complex, complex], n: tuple[complex, complex]) -> complex:
    den = cross(m[1], n[1])
    if abs(den) < 1e-7:
        raise NoFigure
    return m[0] + m[1] * (cross(n[0] - m[0], n[1]) / den)


def line_circle(m: tuple[complex, complex], k: tuple[complex, float], choice: int) -> complex:
    f = foot(k[0], m)
    h = k[1] ** 2 - abs(f - k[0]) ** 2
    if h < 0:
        raise NoFigure
    return f + m[1] * (choice * math.sqrt(h))


def direction(a: complex, b: complex, c: complex) -> complex:
    """Bisector of the angle at a."""
    u = (b - a) / abs(b - a) + (c - a) / abs(c - a)
    if abs(u) < 1e-7:
        raise NoFigure
    return u / abs(u)


# ---------------------------------------------------------------- facts


def free(c: Canvas, names: Sequence[Pt]) -> None:
    for p in names:
        if p.name not in c.points:
            c.points[p.name] = c.new()


def need(ok: bool) -> None:
    if not ok:
        raise NoFigure


def tri_at(c: Canvas, tri: Sequence[Pt]) -> list[complex]:
    return [c.at(p) for p in tri]


def fact(c: Canvas, f: Fact) -> None:
    """Build or constrain by one given line."""
    a = f.args
    kind = f.form
    if kind == "points":
        for p in a[0]:  # type: ignore[union-attr]
            if p.name not in c.points:  # type: ignore[union-attr]
                c.points[p.name] = c.new()  # type: ignore[union-attr]
        z = [c.at(p) for p in a[0]]  # type: ignore[union-attr]
        need(all(abs(u - v) > 1e-6 for i, u in enumerate(z) for v in z[:i]))
    elif kind in SHAPES:
        SHAPES[kind](c, *a)
    elif kind.startswith("on_") or kind == "inside_triangle":
        _on(c, kind, *a)
    elif kind in CURVES:
        c.curves[a[0].name] = CURVES[kind](c, *a[1:])  # type: ignore[union-attr]
    elif kind == "square_corners":
        d, e, (b, q), side, mark = a  # type: ignore[misc]
        u, v = c.at(b), c.at(q)
        up = (v - u) * 1j
        s = 1 if turn(u, v, c.at(mark)) > 0 else -1
        up *= s if side == "towards" else -s
        c.put(d, v + up)
        c.put(e, u + up)
    else:
        c.put(a[0], MADE[kind](c, *a[1:]))  # type: ignore[arg-type]


def _triangle(c: Canvas, tri: Any) -> None:
    free(c, tri)
    need(abs(turn(*tri_at(c, tri))) > 1e-3)


def _isosceles(c: Canvas, tri: Any, apex: Pt) -> None:
    base = [p for p in tri if p.name != apex.name]
    if all(p.name not in c.points for p in tri):
        free(c, base)
        u, v = (c.at(p) for p in base)
        c.points[apex.name] = (u + v) / 2 + 1j * (v - u) * c.number()
    else:
        free(c, tri)
        c.residuals.append(abs(c.at(apex) - c.at(base[0])) - abs(c.at(apex) - c.at(base[1])))
    need(abs(turn(*tri_at(c, tri))) > 1e-3)


def _right(c: Canvas, tri: Any, at: Pt) -> None:
    legs = [p for p in tri if p.name != at.name]
    if all(p.name not in c.points for p in tri):
        free(c, [at, legs[0]])
        c.points[legs[1].name] = c.at(at) + 1j * (c.at(legs[0]) - c.at(at)) * c.number()
    else:
        free(c, tri)
        c.residuals.append(dot(c.at(legs[0]) - c.at(at), c.at(legs[1]) - c.at(at)))
    need(abs(turn(*tri_at(c, tri))) > 1e-3)


def _equilateral(c: Canvas, tri: Any) -> None:
    order = sorted(tri, key=lambda p: p.name not in c.points)
    free(c, order[:2])
    u, v = c.at(order[0]), c.at(order[1])
    need(abs(u - v) > 1e-3)
    c.put(order[2], u + (v - u) * cmath.exp(1j * math.pi / 3 * c.choose()))


def _polygon(make: Callable[[Canvas, complex, complex], list[complex]]) -> Callable[[Canvas, Any], None]:
    def shape(c: Canvas, run: Any) -> None:
        ways = [seq[i:] + seq[:i] for seq in (run, run[::-1]) for i in range(len(run))]
        if make in FREE_SHAPES and all(p.name in c.points for p in run):
            p, q, r, t = (c.at(x) for x in run)
            need(abs(turn(p, q, r)) > 1e-9)
            c.residuals += [abs(q - p - (r - t)), FREE_SHAPES[make](p, q, r)]
            return
        run = max(ways, key=lambda w: [p.name in c.points for p in w])
        free(c, run[:2])
        u, v = c.at(run[0]), c.at(run[1])
        need(abs(u - v) > 1e-3)
        for p, z in zip(run[2:], make(c, u, v), strict=True):
            c.put(p, z)

    return shape


def _regular(n: int) -> Callable[[Canvas, complex, complex], list[complex]]:
    def make(c: Canvas, u: complex, v: complex) -> list[complex]:
        q = cmath.exp(2j * math.pi / n * c.choose())
        out, d, at = [], v - u, v
        for _ in range(n - 2):
            d *= q
            at += d
            out.append(at)
        return out

    return make


def _rectangle(c: Canvas, u: complex, v: complex) -> list[complex]:
    d = 1j * (v - u) * c.number()
    need(abs(d) > 1e-3)
    return [v + d, u + d]


def _parallelogram(c: Canvas, u: complex, v: complex) -> list[complex]:
    s = c.new()
    need(abs(turn(u, v, s)) > 1e-3)
    return [v + s - u, s]


def _rhombus(c: Canvas, u: complex, v: complex) -> list[complex]:
    d = (v - u) * cmath.exp(1j * c.number())
    need(abs(cross(v - u, d)) > 1e-3)
    return [v + d, u + d]


def _quadrilateral(c: Canvas, quad: Any) -> None:
    free(c, quad)
    z = [c.at(p) for p in quad]
    need(all(abs(turn(z[i], z[j], z[k])) > 1e-3 for i, j, k in ((0, 1, 2), (1, 2, 3), (2, 3, 0), (3, 0, 1))))


def convex(z: Sequence[complex]) -> bool:
    n = len(z)
    signs = {math.copysign(1, turn(z[i - 2], z[i - 1], z[i])) for i in range(n)}
    return len(signs) == 1


def _kite(c: Canvas, quad: Any) -> None:
    p, q, r, s = quad
    free(c, (p, q, r))
    c.put(s, 2 * foot(c.at(q), c.line((p, r))) - c.at(q))
    need(convex([c.at(x) for x in quad]))


def _trapezium(c: Canvas, quad: Any) -> None:
    p, q, r, s = quad
    free(c, (p, q, s))
    if r.name in c.points:
        c.residuals.append(cross(c.at(q) - c.at(p), c.at(r) - c.at(s)))
    else:
        c.points[r.name] = c.at(s) + (c.at(q) - c.at(p)) * abs(c.number())
    need(convex([c.at(x) for x in quad]))


def _cyclic(c: Canvas, quad: Any) -> None:
    free(c, quad[:3])
    o = circumcentre(*(c.at(p) for p in quad[:3]))
    if quad[3].name in c.points:
        c.residuals.append(abs(c.at(quad[3]) - o) - abs(c.at(quad[0]) - o))
    else:
        c.points[quad[3].name] = o + abs(c.at(quad[0]) - o) * cmath.exp(1j * c.number() * 3)
    need(convex([c.at(x) for x in quad]))


def _tangential(c: Canvas, quad: Any) -> None:
    free(c, quad)
    z = [c.at(p) for p in quad]
    need(convex(z))
    c.residuals.append(abs(z[0] - z[1]) + abs(z[2] - z[3]) - abs(z[1] - z[2]) - abs(z[3] - z[0]))


FREE_SHAPES: dict[Any, Callable[[complex, complex, complex], float]] = {
    _rectangle: lambda p, q, r: dot(p - q, r - q),
    _parallelogram: lambda p, q, r: 0.0,
    _rhombus: lambda p, q, r: abs(p - q) - abs(r - q),
}

SHAPES: dict[str, Callable[..., None]] = {
    "triangle": _triangle,
    "isosceles_triangle": _isosceles,
    "right_triangle": _right,
    "equilateral_triangle": _equilateral,
    "square": _polygon(_regular(4)),
    "regular_pentagon": _polygon(_regular(5)),
    "regular_hexagon": _polygon(_regular(6)),
    "rectangle": _polygon(_rectangle),
    "parallelogram": _polygon(_parallelogram),
    "rhombus": _polygon(_rhombus),
    "quadrilateral": _quadrilateral,
    "kite": _kite,
    "trapezium": _trapezium,
    "cyclic_quadrilateral": _cyclic,
    "tangential_quadrilateral": _tangential,
}


def _on(c: Canvas, kind: str, p: Pt, where: Any) -> None:
    known = p.name in c.points
    if kind == "on_circle":
        o, r = c.circle(where)
        if known:
            c.residuals.append(abs(c.at(p) - o) - r)
        else:
            c.points[p.name] = o + r * cmath.exp(1j * c.number() * 3)
        return
    if kind == "inside_triangle":
        if not known:
            c.points[p.name] = c.new()
        need(inside(c.at(p), tri_at(c, where)) > 1e-6)
        return
    if kind == "on_perpendicular_bisector":
        u, v = c.at(where[0]), c.at(where[1])
        line = ((u + v) / 2, 1j * (v - u) / abs(v - u))
    elif kind == "on_angle_bisector":
        u, v, w = tri_at(c, where)
        line = (v, direction(v, u, w))
    else:
        line = c.line(where)
    if known:
        c.residuals.append(cross(line[1], c.at(p) - line[0]))
        t = dot(line[1], c.at(p) - line[0])
    else:
        t = c.number()
        if kind == "on_segment":
            t = abs(c.at(where[1]) - c.at(where[0])) * (0.5 + 0.5 * math.sin(2 * t))
        if kind in ("on_ray", "on_angle_bisector"):
            t = abs(t)
        c.points[p.name] = line[0] + line[1] * t
    if kind == "on_segment":
        need(-1e-9 <= t <= abs(c.at(where[1]) - c.at(where[0])) + 1e-9)
    if kind in ("on_ray", "on_angle_bisector"):
        need(t >= -1e-9)


def _apex(c: Canvas, pair: Any) -> complex:
    u, v = c.at(pair[0]), c.at(pair[1])
    need(abs(u - v) > 1e-6)
    return u + (v - u) * cmath.exp(1j * math.pi / 3 * c.choose())


def _apex_sided(c: Canvas, pair: Any, side: str, mark: Pt) -> complex:
    u, v = c.at(pair[0]), c.at(pair[1])
    t = turn(u, v, c.at(mark))
    need(abs(t) > 1e-6)
    s = (1 if t > 0 else -1) * (1 if side == "towards" else -1)
    return u + (v - u) * cmath.exp(1j * math.pi / 3 * s)


def _meet(c: Canvas, one: Any, two: Any) -> complex:
    if c.is_circle(one) and c.is_circle(two):
        (o, r), (p, s) = c.circle(one), c.circle(two)
        d = abs(p - o)
        need(d > 1e-6)
        x = (d * d + r * r - s * s) / (2 * d)
        need(abs(x) <= r)
        u = (p - o) / d
        return o + u * (x + 1j * c.choose() * math.sqrt(r * r - x * x))
    if c.is_circle(one):
        one, two = two, one
    if c.is_circle(two):
        return line_circle(c.line(one), c.circle(two), c.choose())
    return meet(c.line(one), c.line(two))


def _meet_other(c: Canvas, one: Any, two: Any, than: Pt) -> complex:
    z = _meet(c, one, two)
    need(abs(z - c.at(than)) > 1e-6)
    return z


def _foot_of_bisector(c: Canvas, triple: Any, pair: Any) -> complex:
    u, v, w = tri_at(c, triple)
    d = direction(v, u, w)
    z = meet((v, d), c.line(pair))
    need(dot(d, z - v) >= -1e-9)
    return z


def _excentre(c: Canvas, tri: Any, opposite: Pt) -> complex:
    signs = tuple(-1 if p.name == opposite.name else 1 for p in tri)
    z = tri_at(c, tri)
    need(abs(turn(*z)) > 1e-6)
    return incentre(*z, signs)  # type: ignore[arg-type]


def _touch(c: Canvas, tri: Any, pair: Any) -> complex:
    return foot(incentre(*tri_at(c, tri)), c.line(pair))


MADE: dict[str, Callable[..., complex]] = {
    "midpoint": lambda c, pair: (c.at(pair[0]) + c.at(pair[1])) / 2,
    "foot": lambda c, p, line: foot(c.at(p), c.line(line)),
    "foot_of_bisector": _foot_of_bisector,
    "reflection_in_line": lambda c, p, line: 2 * foot(c.at(p), c.line(line)) - c.at(p),
    "reflection_in_point": lambda c, p, m: 2 * c.at(m) - c.at(p),
    "centroid": lambda c, tri: sum(tri_at(c, tri)) / 3,
    "circumcentre": lambda c, tri: circumcentre(*tri_at(c, tri)),
    "orthocentre": lambda c, tri: sum(tri_at(c, tri)) - 2 * circumcentre(*tri_at(c, tri)),
    "incentre": lambda c, tri: incentre(*tri_at(c, tri)),
    "excentre": _excentre,
    "nine_point_centre": lambda c, tri: (sum(tri_at(c, tri)) - circumcentre(*tri_at(c, tri))) / 2,
    "touch_point": _touch,
    "equilateral_apex": _apex,
    "equilateral_apex_sided": _apex_sided,
    "centre": lambda c, k: c.circle(k)[0],
    "meet": _meet,
    "meet_other": _meet_other,
}


def _round(c: Canvas, tri: Any, signs: tuple[int, int, int]) -> tuple[complex, float]:
    z = tri_at(c, tri)
    o = incentre(*z, signs)
    return o, abs(foot(o, (z[0], (z[1] - z[0]) / abs(z[1] - z[0]))) - o)


CURVES: dict[str, Callable[..., tuple[Any, ...]]] = {
    "circle_through": lambda c, tri: (
        circumcentre(*tri_at(c, tri)),
        abs(c.at(tri[0]) - circumcentre(*tri_at(c, tri))),
    ),
    "circle_centre_through": lambda c, o, p: (c.at(o), abs(c.at(p) - c.at(o))),
    "circle_diameter": lambda c, pair: (
        (c.at(pair[0]) + c.at(pair[1])) / 2,
        abs(c.at(pair[0]) - c.at(pair[1])) / 2,
    ),
    "circle_centre_radius": lambda c, o, r: (c.at(o), float(quantity(r, c))),
    "incircle": lambda c, tri: _round(c, tri, (1, 1, 1)),
    "excircle": lambda c, tri, p: _round(
        c,
        tri,
        tuple(-1 if x.name == p.name else 1 for x in tri),  # type: ignore[arg-type]
    ),
    "line_through": lambda c, pair: c.line(pair),
    "parallel": lambda c, line, p: (c.at(p), c.line(line)[1]),
    "perpendicular": lambda c, line, p: (c.at(p), 1j * c.line(line)[1]),
    "perpendicular_bisector": lambda c, pair: (
        (c.at(pair[0]) + c.at(pair[1])) / 2,
        1j * c.line(pair)[1],
    ),
    "angle_bisector": lambda c, triple: (
        c.at(triple[1]),
        direction(c.at(triple[1]), c.at(triple[0]), c.at(triple[2])),
    ),
    "tangent": lambda c, k, p: (
        c.at(p),
        1j * (c.at(p) - c.circle(k)[0]) / abs(c.at(p) - c.circle(k)[0]),
    ),
}


# ---------------------------------------------------------------- quantities and conditions


def inside(p: complex, tri: Sequence[complex]) -> float:
    """Positive inside, negative outside, by the nearest side."""
    a, b, c = tri
    s = math.copysign(1, turn(a, b, c))
    return min(s * turn(u, v, p) / abs(u - v) for u, v in ((a, b), (b, c), (c, a)))


def quantity(q: Any, c: Canvas) -> float:
    """Value of a quantity."""
    if isinstance(q, Number):
        return float(q.value)
    if isinstance(q, Unary):
        x = quantity(q.arg, c)
        if q.op == "sqrt" and x < 0:
            raise NoFigure
        return -x if q.op == "neg" else abs(x) if q.op == "abs" else math.sqrt(x)
    if isinstance(q, Binary):
        x, y = quantity(q.left, c), quantity(q.right, c)
        if q.op == "/":
            if abs(y) < 1e-12:
                raise NoFigure
            return x / y
        return x + y if q.op == "+" else x - y if q.op == "-" else x * y if q.op == "*" else float(x**y)
    assert isinstance(q, Measure)
    z = [c.at(p) for p in q.points]
    if q.kind == "length":
        return abs(z[0] - z[1])
    if q.kind == "dist":
        p, d = c.line(q.line)
        return abs(cross(d, z[0] - p))
    if q.kind == "area":
        return abs(sum(cross(u, v) for u, v in zip(z, z[1:] + z[:1], strict=True))) / 2
    if q.kind == "perimeter":
        return sum(abs(u - v) for u, v in zip(z, z[1:] + z[:1], strict=True))
    a, b, t = abs(z[1] - z[2]), abs(z[2] - z[0]), abs(z[0] - z[1])
    area = abs(turn(*z[:3])) / 2
    if q.kind == "cos":
        need(abs(z[0] - z[1]) * abs(z[2] - z[1]) > 1e-9)
        return dot(z[0] - z[1], z[2] - z[1]) / (abs(z[0] - z[1]) * abs(z[2] - z[1]))
    if q.kind == "sin":
        need(abs(z[0] - z[1]) * abs(z[2] - z[1]) > 1e-9)
        return 2 * area / (abs(z[0] - z[1]) * abs(z[2] - z[1]))
    if q.kind == "circumradius":
        need(area > 1e-9)
        return a * b * t / (4 * area)
    if q.kind == "inradius":
        return 2 * area / (a + b + t)
    i = [p.name for p in q.points[:3]].index(q.points[3].name)  # type: ignore[union-attr]
    v, u, w = z[i], z[(i + 1) % 3], z[(i + 2) % 3]
    if q.kind == "exradius":
        return 2 * area / (abs(u - v) + abs(w - v) - abs(u - w))
    if q.kind == "median":
        return abs((u + w) / 2 - v)
    if q.kind == "altitude":
        return 2 * area / abs(u - w)
    y, x = abs(u - v), abs(w - v)
    return math.sqrt(max(2 * x * y * (x * y + dot(u - v, w - v)), 0.0)) / (x + y)


NEAR = 1e-7


def truth(c: Any, v: Canvas) -> bool | None:
    """Truth of a condition; None where it is too near a border to tell in floats."""
    if isinstance(c, Not):
        t = truth(c.arg, v)
        return None if t is None else not t
    if isinstance(c, (And, Or)):
        ts = [truth(x, v) for x in c.args]
        stop = isinstance(c, Or)
        if stop in ts:
            return stop
        return None if None in ts else not stop
    if isinstance(c, Comparison):
        xs = [quantity(q, v) for q in c.items]
        out: bool | None = True
        for x, op, y in zip(xs, c.ops, xs[1:], strict=False):
            gap = (x - y) / (abs(x) + abs(y) + 1e-9)
            close = abs(gap) < (1e-8 if op == "=" else NEAR)
            if op == "=":
                link: bool | None = close if close or abs(gap) > 1e-6 else None
            else:
                link = None if close else (gap < 0) == (op in ("<", "<="))
            if link is False:
                return False
            out = None if link is None else out
        return out
    assert isinstance(c, Relation)
    return _relation(c, v)


def _zero(*xs: float) -> bool | None:
    if all(abs(x) < 1e-8 for x in xs):
        return True
    return False if any(abs(x) > 1e-6 for x in xs) else None


def _positive(x: float) -> bool | None:
    return None if abs(x) < NEAR else x > 0


def _relation(c: Relation, v: Canvas) -> bool | None:
    a: Any = c.args
    if c.form == "between":
        p, q, m = v.at(a[1]), v.at(a[2]), v.at(a[0])
        flat = _zero(turn(p, q, m) / (1e-9 + abs(p - q)))
        return _positive(-dot(p - m, q - m)) if flat else flat
    if c.form in ("inside", "outside"):
        t = _positive(inside(v.at(a[0]), tri_at(v, a[1])))
        return t if t is None or c.form == "inside" else not t
    if c.form in ("same_side", "opposite_sides"):
        p, d = v.line(a[2])
        x, y = cross(d, v.at(a[0]) - p), cross(d, v.at(a[1]) - p)
        if abs(x) < 1e-9 or abs(y) < 1e-9:
            return False
        if abs(x) < NEAR or abs(y) < NEAR:
            return None
        return (x * y > 0) == (c.form == "same_side")
    if c.form in ("angle_size", "triangle_size"):
        z = tri_at(v, a[0])
        corners = [z] if c.form == "angle_size" else [z, z[1:] + z[:1], z[2:] + z[:2]]
        cosines = []
        for p, q, r in corners:
            need(abs(p - q) > 1e-9 and abs(r - q) > 1e-9)
            cosines.append(dot(p - q, r - q) / (abs(p - q) * abs(r - q)))
        if a[1] == "right":
            found = [_zero(x) for x in cosines]
            return True if True in found else None if None in found else False
        x = min(cosines)
        if abs(x) < 1e-9:
            return False
        return _positive(x if a[1] == "acute" else -x)
    if c.form == "convex":
        z = [v.at(p) for p in a[0]]
        turns = [turn(z[i - 2], z[i - 1], z[i]) for i in range(len(z))]
        if min(abs(t) for t in turns) < NEAR:
            return None
        return len({t > 0 for t in turns}) == 1
    if c.form == "distinct":
        z = [v.at(p) for p in a[0]]
        gaps = [_zero(abs(p - q)) for i, p in enumerate(z) for q in z[:i]]
        return False if True in gaps else None if None in gaps else True
    if c.form == "collinear":
        z = [v.at(p) for p in a[0]]
        return _zero(*(turn(z[0], z[1], p) for p in z[2:]))
    if c.form == "concyclic":
        z = [v.at(p) for p in a[0]]
        o = circumcentre(*z[:3])
        return _zero(*(abs(p - o) - abs(z[0] - o) for p in z[3:]))
    if c.form == "parallel_lines":
        return _zero(cross(v.line(a[0])[1], v.line(a[1])[1]))
    if c.form == "perpendicular_lines":
        return _zero(dot(v.line(a[0])[1], v.line(a[1])[1]))
    if c.form == "on_line":
        p, d = v.line(a[1])
        return _zero(cross(d, v.at(a[0]) - p))
    raise NotImplementedError(c.form)


def constrain(c: Canvas, rel: Any) -> None:
    """Residuals of a relation or an equation among the givens."""
    if isinstance(rel, Comparison):
        c.residuals.append(quantity(rel.items[0], c) - quantity(rel.items[1], c))
        return
    a: Any = rel.args
    if rel.form == "collinear":
        z = [c.at(p) for p in a[0]]
        c.residuals += [turn(z[0], z[1], p) for p in z[2:]]
    elif rel.form == "concyclic":
        z = [c.at(p) for p in a[0]]
        o = circumcentre(*z[:3])
        c.residuals += [abs(p - o) - abs(z[0] - o) for p in z[3:]]
    elif rel.form == "parallel_lines":
        c.residuals.append(cross(c.line(a[0])[1], c.line(a[1])[1]))
    elif rel.form == "perpendicular_lines":
        c.residuals.append(dot(c.line(a[0])[1], c.line(a[1])[1]))


# ---------------------------------------------------------------- drawing


def build(sheet: Sheet, theta: Sequence[float], choices: Sequence[int]) -> Canvas:
    """The figure of these numbers; NoFigure where there is none."""
    c = Canvas(theta, choices)
    for line in sheet.given:
        if isinstance(line.body, Fact):
            fact(c, line.body)
        else:
            constrain(c, line.body)
    return c


def count(sheet: Sheet) -> int:
    """How many numbers a figure takes: the most that any of 300 attempts used."""
    best = 0
    for seed in range(300):
        rng = random.Random(seed)
        try:
            best = max(best, build(sheet, [rng.gauss(0, 1) for _ in range(60)], [1, -1]).used)
        except (NoFigure, ZeroDivisionError):
            continue
    return best


def figures(sheet: Sheet, wanted: int, seed: int, tries: int = 20) -> list[Canvas]:
    """Random admitted figures, at most `wanted`."""
    rng = random.Random(seed)
    n = count(sheet)
    out: list[Canvas] = []
    for _ in range(wanted * tries):
        if len(out) >= wanted:
            break
        scale = rng.choice((0.3, 1.0, 1.0, 3.0))
        theta = [rng.gauss(0, scale) for _ in range(n)]
        if rng.random() < 0.1:
            theta = [float(round(t)) for t in theta]
        choices = [rng.choice((1, -1)) for _ in range(8)]
        try:
            c = build(sheet, theta, choices)
            if c.residuals:
                solved = _solved(sheet, theta, choices)
                if solved is None:
                    continue
                c = solved
            if all(truth(line.body, c) for line in sheet.provided):
                out.append(c)
        except (NoFigure, ZeroDivisionError, OverflowError):
            continue
    return out


def _solved(sheet: Sheet, theta: list[float], choices: list[int]) -> Canvas | None:
    def residual(x: Sequence[float]) -> list[float]:
        return build(sheet, list(x), choices).residuals

    got = least_squares(residual, theta, xtol=1e-15, ftol=1e-15, gtol=1e-15, max_nfev=60)
    c = build(sheet, list(got.x), choices)
    return c if max(map(abs, c.residuals)) < 1e-11 else None
