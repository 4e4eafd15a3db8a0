"""Random real figures of a claim sheet in plain floats, many at once, and the same walk over given
coordinates in many digits.

A figure is a dictionary of points; a point is a numpy array of complex numbers (one entry a figure)
or one complex number of mpmath.  The walk goes line by line: a point that is new is placed, a point
that is there already leaves a residual.  So one walk draws figures, states the equations that a
sheet's constraints put on the numbers drawn, and checks a figure that somebody else made.
Nothing here is a proof; all of it is written from the meaning of the forms alone.
"""

from __future__ import annotations

import itertools
import math
from collections.abc import Callable, Sequence
from fractions import Fraction
from typing import Any

import mpmath  # type: ignore[import-untyped]
import numpy as np

from surdwise.sheet import Sheet
from surdwise.sheet.tree import CentreOf, Comparison, Fact, Named, Pt, Relation

from . import measure

Num = Any  # a numpy array of complex or real numbers, or an mpmath number
UNKNOWN, UNDEFINED = 9, 8
TINY = 1e-300


class Floats:
    """Arithmetic on numpy arrays."""

    def __init__(self, lo: Any = 1e-11, hi: Any = 1e-7) -> None:
        self.lo: Any = lo
        self.hi: Any = hi
        self.i: Any = 1j

    def sqrt(self, x: Num) -> Num:
        return np.sqrt(x)

    def where(self, c: Any, a: Num, b: Num) -> Num:
        return np.where(c, a, b)

    def larger(self, a: Num, b: Num) -> Num:
        return np.maximum(a, b)

    def sign(self, x: Num, size: Num) -> Any:
        """-1, 0, 1; UNKNOWN too near to zero to call, UNDEFINED for no number."""
        m = np.abs(x)
        s = np.where(m <= self.lo * size, 0, np.where(m < self.hi * size, UNKNOWN, np.sign(np.nan_to_num(x))))
        return np.where(np.isfinite(m), s, UNDEFINED).astype(np.int8)

    def number(self, value: Any) -> Num:
        return float(value)

    def turn(self, t: Num) -> Num:
        return np.exp(1j * t)


class Digits:
    """Arithmetic on mpmath numbers, one figure."""

    lo = mpmath.mpf(10) ** -26
    hi = mpmath.mpf(10) ** -22
    i = mpmath.mpc(0, 1)

    def sqrt(self, x: Num) -> Num:
        return mpmath.sqrt(x) if x >= 0 else mpmath.nan

    def where(self, c: Any, a: Num, b: Num) -> Num:
        return a if c else b

    def larger(self, a: Num, b: Num) -> Num:
        return max(a, b)

    def sign(self, x: Num, size: Num) -> Any:
        if not mpmath.isfinite(x):
            return UNDEFINED
        m = abs(x)
        if m <= self.lo * size:
            return 0
        return UNKNOWN if m < self.hi * size else int(mpmath.sign(x))

    def number(self, value: Any) -> Num:
        return mpmath.mpf(value.numerator) / value.denominator

    def turn(self, t: Num) -> Num:
        return mpmath.exp(1j * t)


def cross(a: Num, b: Num) -> Num:
    return a.real * b.imag - a.imag * b.real


def dot(a: Num, b: Num) -> Num:
    return a.real * b.real + a.imag * b.imag


def sq(a: Num) -> Num:
    return a.real * a.real + a.imag * a.imag


class Drawing:
    """A figure (or many) under construction.

    `theta` are the numbers drawn so far, `picks` the signs chosen at two-valued steps; `ok` says
    which figures are still admitted, `residuals` are (value, size) of every equation left over.
    """

    def __init__(self, ops: Any, n: int = 1, rng: Any = None, special: Any = None) -> None:
        self.ops = ops
        self.n = n
        self.rng = rng
        self.special = special
        self.theta: list[Num] = []
        self.picks: list[Num] = []
        self.drawing = True
        self.restart({})

    def restart(self, points: dict[str, Num]) -> None:
        self.points = dict(points)
        self.curves: dict[str, tuple[Any, ...]] = {}
        self.residuals: list[tuple[Num, Num]] = []
        self.measured: tuple[int, Num] = (-1, None)
        self.ok: Any = np.ones(self.n, dtype=bool) if isinstance(self.ops, Floats) else True
        self.used = self.picked = 0
        self.why: list[str] = []

    # ------------------------------------------------------------ numbers and choices
    def number(self, sample: Callable[[Any, int], Num], marks: Sequence[float] = ()) -> Num:
        """The next free number; `marks` are special values taken now and then."""
        if self.used == len(self.theta):
            t = sample(self.rng, self.n)
            if marks:
                at = self.rng.choice(np.array(marks, dtype=float), self.n)
                t = np.where((self.rng.random(self.n) < 0.3) & self.special, at, t)
            self.theta.append(np.asarray(t, dtype=float))
        self.used += 1
        return self.theta[self.used - 1]

    def theta_is_new(self) -> bool:
        """Whether the number just taken was drawn in this walk (and not set by a solver)."""
        return self.drawing

    def pick(self) -> Num:
        if self.picked == len(self.picks):
            self.picks.append(np.where(self.rng.random(self.n) < 0.5, 1.0, -1.0))
        self.picked += 1
        return self.picks[self.picked - 1]

    def need(self, ok: Any, why: str) -> None:
        if not isinstance(self.ops, Floats) and not ok:
            self.why.append(why)
        self.ok = self.ok & ok

    def zero(self, value: Num, size: Num, why: str = "") -> None:
        self.residuals.append((value, size))
        if not isinstance(self.ops, Floats) and self.ops.sign(value, size) != 0:
            self.why.append(f"{why}: off by {mpmath.nstr(value, 5)}")

    # ------------------------------------------------------------ points and curves
    def at(self, p: Any) -> Num:
        return self.circle(p.circle)[0] if isinstance(p, CentreOf) else self.points[p.name]

    def new(self, p: Pt) -> bool:
        return p.name not in self.points

    def free(self, p: Pt) -> None:
        """A point anywhere (on a small grid now and then)."""
        if self.new(p):
            grid = (-2.0, -1.0, 0.0, 1.0, 2.0)
            x = self.number(lambda r, n: r.normal(0, 1, n) * 1.5, grid)
            y = self.number(lambda r, n: r.normal(0, 1, n) * 1.5, grid)
            self.points[p.name] = x + 1j * y

    def put(self, p: Pt, *options: Num) -> None:
        """Place a point at one of the options, or say how far it is from the nearest."""
        if self.new(p):
            at = options[0]
            if len(options) == 2:
                at = self.ops.where(self.pick() > 0, options[0], options[1])
            self.points[p.name] = at
            return
        at, size = self.points[p.name], abs(options[0]) + self.extent()
        gap = at - options[0]
        if len(options) == 2:
            other = at - options[1]
            gap = self.ops.where(abs(other) < abs(gap), other, gap)
        self.zero(gap.real, size, p.name)
        self.zero(gap.imag, size, p.name)

    def extent(self) -> Num:
        """The size of the figure so far, on which rounding errors of coordinates are judged."""
        if self.measured[0] != len(self.points):
            self.measured = len(self.points), sum(abs(z) for z in self.points.values()) * 0.5 + TINY
        return self.measured[1]

    def differ(self, a: Num, b: Num, why: str) -> None:
        s = self.ops.sign(abs(a - b), self.extent())
        self.need(s == 1, why)

    def not_flat(self, a: Num, b: Num, c: Num, why: str = "flat") -> None:
        w, size = cross(b - a, c - a), self.spread(a, b, c)
        s = self.ops.sign(w, size)
        self.need((s == 1) | (s == -1), why)
        if isinstance(self.ops, Floats):  # too flat for floats
            self.need(abs(w) > 1e-3 * size, why)

    def spread(self, a: Num, b: Num, c: Num) -> Num:
        return (abs(b - a) + abs(c - a)) * self.extent() + TINY

    def line(self, c: Any) -> tuple[Num, Num]:
        """A point and a direction."""
        if isinstance(c, Named):
            kind, point, direction = self.curves[c.name]
            assert kind == "line"
            return point, direction
        a, b = (self.at(p) for p in c.points)
        self.differ(a, b, "line through one point")
        return a, b - a

    def circle(self, c: Any) -> tuple[Num, Num]:
        """Centre and squared radius."""
        if isinstance(c, Named):
            kind, centre, r2 = self.curves[c.name]
            assert kind == "circle"
            return centre, r2
        a, b, d = (self.at(p) for p in c.points)
        self.not_flat(a, b, d, "no circle")
        o = circumcentre(a, b, d)
        return o, sq(a - o)

    def is_circle(self, c: Any) -> bool:
        return self.curves[c.name][0] == "circle" if isinstance(c, Named) else len(c.points) == 3

    # ------------------------------------------------------------ meets
    def meets(self, one: Any, two: Any) -> tuple[Num, ...]:
        if not self.is_circle(one) and not self.is_circle(two):
            (p, d), (q, e) = self.line(one), self.line(two)
            return (self.cut(p, d, q, e),)
        if self.is_circle(one) and self.is_circle(two):
            (o, r2), (m, s2) = self.circle(one), self.circle(two)
            d = m - o
            self.differ(o, m, "concentric")
            w = (sq(d) + r2 - s2) / (2 * sq(d))
            return self.line_circle(o + d * w, d * self.ops.i, o, r2)
        if self.is_circle(one):
            one, two = two, one
        p, d = self.line(one)
        o, r2 = self.circle(two)
        return self.line_circle(p, d, o, r2)

    def cut(self, p: Num, d: Num, q: Num, e: Num) -> Num:
        w = cross(d, e)
        s = self.ops.sign(w, abs(d) * abs(e) + TINY)
        self.need((s == 1) | (s == -1), "parallel lines")
        return p + d * (cross(q - p, e) / w)

    def line_circle(self, p: Num, d: Num, o: Num, r2: Num) -> tuple[Num, Num]:
        foot = p + d * (dot(o - p, d) / sq(d))
        h2 = r2 - sq(o - foot)
        size = r2 + sq(o - foot) + TINY
        s = self.ops.sign(h2, size)
        self.need((s == 0) | (s == 1), "no common point")
        h = self.ops.sqrt(self.ops.where(h2 > self.ops.lo * size, h2, 0 * h2))
        step = d / abs(d) * h
        return foot + step, foot - step


def circumcentre(a: Num, b: Num, c: Num) -> Num:
    """Intersection of perpendicular bisectors, relative to a."""
    u, v = b - a, c - a
    w = 2 * cross(u, v)
    x = (v.imag * sq(u) - u.imag * sq(v)) / w
    y = (u.real * sq(v) - v.real * sq(u)) / w
    return a + x + 1j * y


EQUATIONS = ("collinear", "concyclic", "parallel_lines", "perpendicular_lines")
FORMS: dict[str, Callable[..., None]] = {}


def form(*aliases: str) -> Callable[[Callable[..., None]], Callable[..., None]]:
    def keep(f: Callable[..., None]) -> Callable[..., None]:
        for alias in aliases:
            FORMS[alias] = f
        return f

    return keep


# ---------------------------------------------------------------- free points and shapes


@form("points")
def _points(g: Drawing, names: tuple[Pt, ...]) -> None:
    for p in names:
        g.free(p)
    _distinct(g, names)


def _distinct(g: Drawing, names: Sequence[Pt]) -> None:
    for i, p in enumerate(names):
        for q in names[:i]:
            g.differ(g.at(p), g.at(q), f"{p} = {q}")


@form("triangle")
def _triangle(g: Drawing, names: tuple[Pt, ...]) -> None:
    for p in names:
        g.free(p)
    g.not_flat(*(g.at(p) for p in names))


@form("quadrilateral")
def _quadrilateral(g: Drawing, names: tuple[Pt, ...]) -> None:
    for p in names:
        g.free(p)
    _no_three(g, [g.at(p) for p in names])


def _no_three(g: Drawing, v: Sequence[Num]) -> None:
    for i in range(len(v)):
        for j in range(i):
            for k in range(j):
                g.not_flat(v[i], v[j], v[k], "three vertices in a row")


def _convex(g: Drawing, v: Sequence[Num]) -> None:
    n = len(v)
    total = None
    for i in range(n):
        a, b, c = v[i], v[(i + 1) % n], v[(i + 2) % n]
        s = g.ops.sign(cross(b - a, c - b), g.spread(a, b, c))
        g.need((s == 1) | (s == -1), "not convex")
        if total is None:
            total = s
        g.need(s == total, "not convex")


def _shaped(g: Drawing, names: tuple[Pt, ...], make: Callable[[], Sequence[Num]]) -> None:
    """Place the corners at what `make` gives under a random similarity, if all are new; a shape on
    points of the figure gets its other corners anywhere and keeps its equations as residuals."""
    if all(g.new(p) for p in names):
        v = make()
        c = g.number(lambda r, n: r.normal(0, 0.3, n)) + 1j * g.number(lambda r, n: r.normal(0, 0.3, n))
        size = g.number(lambda r, n: r.normal(0, 0.7, n), (0.0, math.log(2)))
        t = g.number(lambda r, n: r.uniform(0, 2 * math.pi, n), (0.0, math.pi / 2))
        flip = g.pick()
        w = np.exp(size + 1j * t)
        for p, x in zip(names, v, strict=True):
            z = np.asarray(x) + np.zeros(g.n)
            g.points[p.name] = c + w * np.where(flip > 0, z, np.conj(z))
    else:
        for p in names:
            g.free(p)


def _zero_dot(g: Drawing, a: Num, b: Num) -> None:
    g.zero(dot(a, b), abs(a) * abs(b) + TINY, "not at right angles")


def _equal(g: Drawing, a: Num, b: Num) -> None:
    g.zero(sq(a) - sq(b), sq(a) + sq(b) + TINY, "lengths differ")


def _same(g: Drawing, a: Num, b: Num) -> None:
    d = a - b
    g.zero(d.real, abs(a) + abs(b) + TINY, "vectors differ")
    g.zero(d.imag, abs(a) + abs(b) + TINY, "vectors differ")


ROOT3 = math.sqrt(3)


def _positive(g: Drawing, marks: Sequence[float] = (1.0, ROOT3, 2.0, 1 / ROOT3)) -> Num:
    return np.exp(g.number(lambda r, n: r.normal(0, 0.8, n), [math.log(m) for m in marks]))


@form("equilateral_triangle")
def _equilateral(g: Drawing, names: tuple[Pt, ...]) -> None:
    made = all(g.new(p) for p in names)
    _shaped(g, names, lambda: [0j, 1 + 0j, 0.5 + ROOT3 / 2 * 1j])
    a, b, c = (g.at(p) for p in names)
    if not made:
        _equal(g, b - a, c - a)
        _equal(g, b - a, c - b)
    g.differ(a, b, "side 0")


def _apex_first(names: tuple[Pt, ...], apex: Pt) -> tuple[Pt, Pt, Pt]:
    b, c = (p for p in names if p.name != apex.name)
    return apex, b, c


@form("isosceles_triangle")
def _isosceles(g: Drawing, names: tuple[Pt, ...], apex: Pt) -> None:
    order = _apex_first(names, apex)
    made = all(g.new(p) for p in names)

    def make() -> Sequence[Num]:
        h = _positive(g)
        return [1j * h, -1 + 0j, 1 + 0j]

    _shaped(g, order, make)
    a, b, c = (g.at(p) for p in order)
    if not made:
        _equal(g, b - a, c - a)
    g.not_flat(a, b, c)


@form("right_triangle")
def _right(g: Drawing, names: tuple[Pt, ...], corner: Pt) -> None:
    order = _apex_first(names, corner)
    made = all(g.new(p) for p in names)
    _shaped(g, order, lambda: [0j, 1 + 0j, 1j * _positive(g)])
    a, b, c = (g.at(p) for p in order)
    if not made:
        _zero_dot(g, b - a, c - a)
    g.not_flat(a, b, c)


@form("square")
def _square(g: Drawing, names: tuple[Pt, ...]) -> None:
    made = all(g.new(p) for p in names)
    _shaped(g, names, lambda: [0j, 1 + 0j, 1 + 1j, 1j])
    a, b, c, d = (g.at(p) for p in names)
    if not made:
        _same(g, b - a, c - d)
        _zero_dot(g, b - a, d - a)
        _equal(g, b - a, d - a)
    g.differ(a, b, "side 0")


@form("rectangle")
def _rectangle(g: Drawing, names: tuple[Pt, ...]) -> None:
    made = all(g.new(p) for p in names)

    def make() -> Sequence[Num]:
        h = _positive(g)
        return [0j, 1 + 0j, 1 + 1j * h, 1j * h]

    _shaped(g, names, make)
    a, b, c, d = (g.at(p) for p in names)
    if not made:
        _same(g, b - a, c - d)
        _zero_dot(g, b - a, d - a)
    g.not_flat(a, b, c)


@form("parallelogram")
def _parallelogram(g: Drawing, names: tuple[Pt, ...]) -> None:
    made = all(g.new(p) for p in names)

    def make() -> Sequence[Num]:
        u = g.number(lambda r, n: r.normal(0, 1, n), (0.0, 0.5, 1.0)) + 1j * _positive(g)
        return [0j, 1 + 0j, 1 + u, u]

    _shaped(g, names, make)
    a, b, c, d = (g.at(p) for p in names)
    if not made:
        _same(g, b - a, c - d)
    g.not_flat(a, b, c)


@form("rhombus")
def _rhombus(g: Drawing, names: tuple[Pt, ...]) -> None:
    made = all(g.new(p) for p in names)

    def make() -> Sequence[Num]:
        u = np.exp(1j * g.number(lambda r, n: r.uniform(0.05, 3.09, n), (math.pi / 2, math.pi / 3)))
        return [0j, 1 + 0j, 1 + u, u]

    _shaped(g, names, make)
    a, b, c, d = (g.at(p) for p in names)
    if not made:
        _same(g, b - a, c - d)
        _equal(g, b - a, d - a)
    g.not_flat(a, b, c)


@form("kite")
def _kite(g: Drawing, names: tuple[Pt, ...]) -> None:
    made = all(g.new(p) for p in names)

    def make() -> Sequence[Num]:
        s = 1 / (1 + _positive(g, (1.0,)))
        h = _positive(g)
        return [0j, s + 1j * h, 1 + 0j, s - 1j * h]

    _shaped(g, names, make)
    a, b, c, d = (g.at(p) for p in names)
    if not made:
        _equal(g, b - a, d - a)
        _equal(g, b - c, d - c)
    _convex(g, [a, b, c, d])


@form("trapezium")
def _trapezium(g: Drawing, names: tuple[Pt, ...]) -> None:
    made = all(g.new(p) for p in names)

    def make() -> Sequence[Num]:
        d = g.number(lambda r, n: r.normal(0, 1, n), (0.0, 0.5)) + 1j * _positive(g)
        return [0j, 1 + 0j, d + _positive(g), d]

    _shaped(g, names, make)
    a, b, c, d = (g.at(p) for p in names)
    if not made:
        g.zero(cross(b - a, c - d), abs(b - a) * abs(c - d) + TINY, "not parallel")
    _convex(g, [a, b, c, d])


def _round_gaps(g: Drawing, n: int) -> list[Num]:
    parts = [_positive(g, (1.0, 2.0)) for _ in range(n)]
    total = sum(parts)
    return [p / total * 2 * math.pi for p in parts]


@form("cyclic_quadrilateral")
def _cyclic(g: Drawing, names: tuple[Pt, ...]) -> None:
    made = all(g.new(p) for p in names)

    def make() -> Sequence[Num]:
        t = _round_gaps(g, 4)
        return [np.exp(1j * sum(t[:i])) for i in range(4)]

    _shaped(g, names, make)
    v = [g.at(p) for p in names]
    if not made:
        _concyclic_zero(g, v)
    _convex(g, v)


@form("tangential_quadrilateral")
def _tangential(g: Drawing, names: tuple[Pt, ...]) -> None:
    made = all(g.new(p) for p in names)

    def make() -> Sequence[Num]:
        t = _round_gaps(g, 4)
        out = []
        for i in range(4):
            g.need(t[i] < 3.0, "no tangential quadrilateral")
            out.append(np.exp(1j * (sum(t[:i]) + t[i] / 2)) / np.cos(t[i] / 2))
        return out

    _shaped(g, names, make)
    a, b, c, d = (g.at(p) for p in names)
    if not made:
        left, right = abs(b - a) + abs(d - c), abs(c - b) + abs(a - d)
        g.zero(left - right, left + right, "Pitot")
    _convex(g, [a, b, c, d])


@form("regular_pentagon", "regular_hexagon")
def _regular(g: Drawing, names: tuple[Pt, ...]) -> None:
    n = len(names)
    made = all(g.new(p) for p in names)
    _shaped(g, names, lambda: [np.exp(2j * math.pi * k / n) for k in range(n)])
    v = [g.at(p) for p in names]
    if not made:
        turn = g.ops.turn(2 * (mpmath.pi if isinstance(g.ops, Digits) else math.pi) / n)
        left = cross(v[1] - v[0], v[2] - v[0]) > 0
        w = g.ops.where(left, turn, turn.conjugate())
        for k in range(1, n - 1):
            _same(g, v[k + 1] - v[k], (v[k] - v[k - 1]) * w)
    g.differ(v[0], v[1], "side 0")


# ---------------------------------------------------------------- points on curves


def _on_straight(g: Drawing, p: Pt, a: Num, d: Num) -> Num:
    """Place p on a line and give its coordinate along d."""
    if g.new(p):
        t = g.number(lambda r, n: r.normal(0.5, 1.2, n), (0.0, 1.0, 0.5, -1.0, 2.0))
        g.points[p.name] = a + d * t
    else:
        x = g.at(p) - a
        g.zero(cross(x, d), (abs(x) + g.extent()) * abs(d) + TINY, f"{p} not on the line")
    return dot(g.at(p) - a, d) / sq(d)


@form("on_line")
def _on_line(g: Drawing, p: Pt, line: Any) -> None:
    a, d = g.line(line)
    _on_straight(g, p, a, d)


def _pair(g: Drawing, pair: tuple[Pt, ...]) -> tuple[Num, Num]:
    a, b = g.at(pair[0]), g.at(pair[1])
    g.differ(a, b, "no line")
    return a, b - a


def _range(g: Drawing, t: Num, low: float, high: float, why: str) -> None:
    size = 1 + abs(t)
    s = g.ops.sign(t - low, size)
    g.need((s == 0) | (s == 1), why)
    if high < math.inf:
        s = g.ops.sign(t - high, size)
        g.need((s == 0) | (s == -1), why)


@form("on_segment")
def _on_segment(g: Drawing, p: Pt, pair: tuple[Pt, ...]) -> None:
    a, d = _pair(g, pair)
    if g.new(p):
        t = g.number(lambda r, n: r.uniform(0, math.pi, n), (0.0, math.pi, math.pi / 2, math.pi / 3))
        g.points[p.name] = a + d * (1 - np.cos(t)) / 2
    else:
        _range(g, _on_straight(g, p, a, d), 0, 1, f"{p} not on the segment")


@form("on_ray")
def _on_ray(g: Drawing, p: Pt, pair: tuple[Pt, ...]) -> None:
    a, d = _pair(g, pair)
    if g.new(p):
        t = g.number(lambda r, n: r.normal(0, 1.2, n), (0.0, 1.0, math.sqrt(0.5)))
        g.points[p.name] = a + d * t * t
    else:
        _range(g, _on_straight(g, p, a, d), 0, math.inf, f"{p} not on the ray")


@form("on_circle")
def _on_circle(g: Drawing, p: Pt, k: Any) -> None:
    o, r2 = g.circle(k)
    if g.new(p):
        t = g.number(lambda r, n: r.uniform(0, 2 * math.pi, n))
        at = o + np.sqrt(r2) * np.exp(1j * t)
        known = list(g.points.values())
        if g.theta_is_new() and known:
            # now and then at a point of the circle, or opposite or halfway to one
            i = g.rng.integers(0, len(known), g.n)
            mark = np.choose(i, known) - o
            u = np.angle(mark) + g.rng.choice(np.array([0, math.pi, math.pi / 2, math.pi / 3]), g.n)
            t = np.where((g.rng.random(g.n) < 0.3) & g.special & np.isfinite(u), u, t)
            g.theta[g.used - 1] = t
            at = o + np.sqrt(r2) * np.exp(1j * t)
        g.points[p.name] = at
    else:
        x = g.at(p) - o
        g.zero(sq(x) - r2, sq(x) + r2 + sq(o) + TINY, f"{p} not on the circle")


@form("on_perpendicular_bisector")
def _on_perpendicular_bisector(g: Drawing, p: Pt, pair: tuple[Pt, ...]) -> None:
    a, d = _pair(g, pair)
    _on_straight(g, p, a + d / 2, d * g.ops.i)


def _bisector(g: Drawing, triple: tuple[Pt, ...]) -> tuple[Num, Num]:
    b, a, c = (g.at(p) for p in triple)
    g.differ(a, b, "no angle")
    g.differ(a, c, "no angle")
    u, v = (b - a) / abs(b - a), (c - a) / abs(c - a)
    g.need(g.ops.sign(abs(u + v), 1) == 1, "straight angle")
    return a, u + v


@form("on_angle_bisector")
def _on_angle_bisector(g: Drawing, p: Pt, triple: tuple[Pt, ...]) -> None:
    a, d = _bisector(g, triple)
    if g.new(p):
        t = g.number(lambda r, n: r.normal(0, 1.2, n), (0.0, 1.0))
        g.points[p.name] = a + d * t * t
    else:
        _range(g, _on_straight(g, p, a, d), 0, math.inf, f"{p} not on the bisector")


@form("inside_triangle")
def _inside_triangle(g: Drawing, p: Pt, tri: tuple[Pt, ...]) -> None:
    a, b, c = (g.at(q) for q in tri)
    g.not_flat(a, b, c)
    if g.new(p):
        u, v = _positive(g, (1.0,)), _positive(g, (1.0, 2.0))
        g.points[p.name] = (a + u * b + v * c) / (1 + u + v)
    z = g.at(p)
    whole = g.ops.sign(cross(b - a, c - a), g.spread(a, b, c))
    for x, y in ((a, b), (b, c), (c, a)):
        g.need(g.ops.sign(cross(y - x, z - x), g.spread(x, y, z)) == whole, f"{p} not inside")


# ---------------------------------------------------------------- made points


@form("midpoint")
def _midpoint(g: Drawing, m: Pt, pair: tuple[Pt, ...]) -> None:
    g.put(m, (g.at(pair[0]) + g.at(pair[1])) / 2)


def foot(p: Num, a: Num, d: Num) -> Num:
    return a + d * (dot(p - a, d) / sq(d))


@form("foot")
def _foot(g: Drawing, d: Pt, p: Any, line: Any) -> None:
    a, u = g.line(line)
    g.put(d, foot(g.at(p), a, u))


@form("foot_of_bisector")
def _foot_of_bisector(g: Drawing, d: Pt, triple: tuple[Pt, ...], pair: tuple[Pt, ...]) -> None:
    a, u = _bisector(g, triple)
    p, v = _pair(g, pair)
    g.put(d, g.cut(a, u, p, v))


@form("reflection_in_line")
def _reflection_in_line(g: Drawing, image: Pt, p: Any, line: Any) -> None:
    a, u = g.line(line)
    g.put(image, 2 * foot(g.at(p), a, u) - g.at(p))


@form("reflection_in_point")
def _reflection_in_point(g: Drawing, image: Pt, p: Any, m: Any) -> None:
    g.put(image, 2 * g.at(m) - g.at(p))


@form("centroid")
def _centroid(g: Drawing, x: Pt, tri: tuple[Pt, ...]) -> None:
    a, b, c = (g.at(q) for q in tri)
    g.put(x, (a + b + c) / 3)


@form("circumcentre")
def _circumcentre(g: Drawing, o: Pt, tri: tuple[Pt, ...]) -> None:
    a, b, c = (g.at(q) for q in tri)
    g.not_flat(a, b, c)
    g.put(o, circumcentre(a, b, c))


@form("orthocentre")
def _orthocentre(g: Drawing, h: Pt, tri: tuple[Pt, ...]) -> None:
    a, b, c = (g.at(q) for q in tri)
    g.not_flat(a, b, c)
    g.put(h, a + b + c - 2 * circumcentre(a, b, c))


@form("nine_point_centre")
def _nine_point_centre(g: Drawing, x: Pt, tri: tuple[Pt, ...]) -> None:
    a, b, c = (g.at(q) for q in tri)
    g.not_flat(a, b, c)
    g.put(x, circumcentre((b + c) / 2, (c + a) / 2, (a + b) / 2))


def _touching(g: Drawing, tri: tuple[Pt, ...], opposite: Pt | None = None) -> tuple[Num, Num]:
    """Centre and radius of the incircle or an excircle."""
    a, b, c = (g.at(q) for q in tri)
    g.not_flat(a, b, c)
    w = [abs(b - c), abs(c - a), abs(a - b)]
    if opposite is not None:
        i = [q.name for q in tri].index(opposite.name)
        w[i] = -w[i]
    total = w[0] + w[1] + w[2]
    return (w[0] * a + w[1] * b + w[2] * c) / total, abs(cross(b - a, c - a)) / total


@form("incentre")
def _incentre(g: Drawing, x: Pt, tri: tuple[Pt, ...]) -> None:
    g.put(x, _touching(g, tri)[0])


@form("excentre")
def _excentre(g: Drawing, x: Pt, tri: tuple[Pt, ...], opposite: Pt) -> None:
    g.put(x, _touching(g, tri, opposite)[0])


@form("touch_point")
def _touch_point(g: Drawing, t: Pt, tri: tuple[Pt, ...], pair: tuple[Pt, ...]) -> None:
    o, _r = _touching(g, tri)
    a, d = _pair(g, pair)
    g.put(t, foot(o, a, d))


def _turned60(g: Drawing) -> tuple[Num, Num]:
    root = g.ops.sqrt(g.ops.number(Fraction(3)))
    return 0.5 + g.ops.i * root / 2, 0.5 - g.ops.i * root / 2


@form("equilateral_apex")
def _equilateral_apex(g: Drawing, x: Pt, pair: tuple[Pt, ...]) -> None:
    a, d = _pair(g, pair)
    up, down = _turned60(g)
    g.put(x, a + d * up, a + d * down)


def _side(g: Drawing, a: Num, d: Num, side: str, mark: Pt) -> Any:
    """1 where the turn to the left is wanted, -1 to the right."""
    c = cross(d, g.at(mark) - a)
    s = g.ops.sign(c, abs(d) * g.extent() + TINY)
    g.need((s == 1) | (s == -1), "mark on the line")
    return -s if side.startswith("away") else s


@form("equilateral_apex_sided")
def _equilateral_apex_sided(g: Drawing, x: Pt, pair: tuple[Pt, ...], side: str, mark: Pt) -> None:
    a, d = _pair(g, pair)
    up, down = _turned60(g)
    g.put(x, a + d * g.ops.where(_side(g, a, d, side, mark) == 1, up, down))


@form("square_corners")
def _square_corners(g: Drawing, x: Pt, y: Pt, pair: tuple[Pt, ...], side: str, mark: Pt) -> None:
    a, d = _pair(g, pair)
    w = g.ops.where(_side(g, a, d, side, mark) == 1, g.ops.i, -g.ops.i)
    g.put(x, a + d + d * w)
    g.put(y, a + d * w)


@form("centre")
def _centre(g: Drawing, o: Pt, k: Any) -> None:
    g.put(o, g.circle(k)[0])


@form("meet")
def _meet(g: Drawing, x: Pt, one: Any, two: Any) -> None:
    g.put(x, *g.meets(one, two))


@form("meet_other")
def _meet_other(g: Drawing, x: Pt, one: Any, two: Any, than: Pt) -> None:
    p, q = g.meets(one, two)
    t = g.at(than)
    size = abs(p) + abs(q) + abs(t) + TINY
    near = 1e-6 if isinstance(g.ops, Floats) else g.ops.hi
    p_is, q_is = abs(p - t) < near * size, abs(q - t) < near * size
    one_p, one_q = g.ops.where(p_is, q, p), g.ops.where(q_is, p, q)
    g.need(abs(one_p - t) >= near * size, "no other point")
    g.put(x, one_p, one_q)


# ---------------------------------------------------------------- curves


def _keep_line(g: Drawing, m: Named, p: Num, d: Num) -> None:
    g.curves[m.name] = ("line", p, d)


def _keep_circle(g: Drawing, k: Named, o: Num, r2: Num) -> None:
    g.curves[k.name] = ("circle", o, r2)


@form("circle_through")
def _circle_through(g: Drawing, k: Named, tri: tuple[Pt, ...]) -> None:
    a, b, c = (g.at(q) for q in tri)
    g.not_flat(a, b, c)
    o = circumcentre(a, b, c)
    _keep_circle(g, k, o, sq(a - o))


@form("circle_centre_through")
def _circle_centre_through(g: Drawing, k: Named, o: Any, a: Pt) -> None:
    g.differ(g.at(o), g.at(a), "radius 0")
    _keep_circle(g, k, g.at(o), sq(g.at(a) - g.at(o)))


@form("circle_diameter")
def _circle_diameter(g: Drawing, k: Named, pair: tuple[Pt, ...]) -> None:
    a, d = _pair(g, pair)
    _keep_circle(g, k, a + d / 2, sq(d) / 4)


@form("circle_centre_radius")
def _circle_centre_radius(g: Drawing, k: Named, o: Any, radius: Any) -> None:
    r, size = measure.value(radius, g)
    g.need(g.ops.sign(r, size) == 1, "radius not positive")
    _keep_circle(g, k, g.at(o), r * r)


@form("incircle")
def _incircle(g: Drawing, k: Named, tri: tuple[Pt, ...]) -> None:
    o, r = _touching(g, tri)
    _keep_circle(g, k, o, r * r)


@form("excircle")
def _excircle(g: Drawing, k: Named, tri: tuple[Pt, ...], opposite: Pt) -> None:
    o, r = _touching(g, tri, opposite)
    _keep_circle(g, k, o, r * r)


@form("line_through")
def _line_through(g: Drawing, m: Named, pair: tuple[Pt, ...]) -> None:
    _keep_line(g, m, *_pair(g, pair))


@form("parallel")
def _parallel(g: Drawing, m: Named, line: Any, p: Any) -> None:
    _keep_line(g, m, g.at(p), g.line(line)[1])


@form("perpendicular")
def _perpendicular(g: Drawing, m: Named, line: Any, p: Any) -> None:
    _keep_line(g, m, g.at(p), g.line(line)[1] * g.ops.i)


@form("perpendicular_bisector")
def _perpendicular_bisector(g: Drawing, m: Named, pair: tuple[Pt, ...]) -> None:
    a, d = _pair(g, pair)
    _keep_line(g, m, a + d / 2, d * g.ops.i)


@form("angle_bisector")
def _angle_bisector(g: Drawing, m: Named, triple: tuple[Pt, ...]) -> None:
    _keep_line(g, m, *_bisector(g, triple))


@form("tangent")
def _tangent(g: Drawing, m: Named, k: Any, a: Pt) -> None:
    o, r2 = g.circle(k)
    x = g.at(a) - o
    g.zero(sq(x) - r2, sq(x) + r2 + sq(o) + TINY, f"{a} not on the circle")
    g.need(g.ops.sign(r2, r2 + sq(o)) == 1, "radius 0")
    _keep_line(g, m, g.at(a), x * g.ops.i)


# ---------------------------------------------------------------- constraints


def _concyclic_zero(g: Drawing, v: Sequence[Num]) -> None:
    g.not_flat(*v[:3])
    o = circumcentre(*v[:3])
    r2 = sq(v[0] - o)
    for x in v[3:]:
        g.zero(sq(x - o) - r2, sq(x - o) + r2 + sq(o), "not concyclic")


def constrain(g: Drawing, body: Comparison | Relation) -> None:
    """An equation or a relation under `given`."""
    if isinstance(body, Comparison):
        values = [measure.value(q, g) for q in body.items]
        for (x, sx), (y, sy) in itertools.pairwise(values):
            g.zero(x - y, sx + sy + TINY, "equation")
        return
    if body.form == "collinear":
        a, b, *rest = (g.at(p) for p in body.args[0])  # type: ignore[union-attr]
        for c in rest:
            g.zero(cross(b - a, c - a), g.spread(a, b, c), "not collinear")
        if len(rest) > 1:  # with a = b the rest must still lie on one line
            for i in range(len(rest) - 1):
                for p in (a, b):
                    g.zero(cross(rest[i] - p, rest[i + 1] - p), g.spread(p, rest[i], rest[i + 1]), "row")
        return
    if body.form == "concyclic":
        _concyclic_zero(g, [g.at(p) for p in body.args[0]])  # type: ignore[union-attr]
        return
    (p, d), (_q, e) = (g.line(x) for x in body.args)
    w = cross(d, e) if body.form == "parallel_lines" else dot(d, e)
    assert body.form in ("parallel_lines", "perpendicular_lines")
    g.zero(w, abs(d) * abs(e) + TINY, body.form)


def walk(g: Drawing, sheet: Sheet) -> None:
    """All given lines."""
    for line in sheet.given:
        body = line.body
        if isinstance(body, Fact):
            FORMS[body.form](g, *body.args)
        else:
            assert isinstance(body, Comparison | Relation)
            constrain(g, body)
    for line in sheet.provided:  # a thin condition is met by solving for it, not by luck
        body = line.body
        if (isinstance(body, Comparison) and set(body.ops) == {"="}) or (
            isinstance(body, Relation) and body.form in EQUATIONS
        ):
            constrain(g, body)


# ---------------------------------------------------------------- many figures


def random_figures(sheet: Sheet, n: int, seed: int) -> Drawing:
    """About n real figures of the sheet; `ok` marks those that are admitted by the given and
    provided lines beyond doubt, `general` those without a special value."""
    with np.errstate(all="ignore"):
        rng = np.random.default_rng(seed)
        ops = Floats()
        g = Drawing(ops, n, rng, rng.random(n) < 0.5)
        walk(g, sheet)
        g.drawing = False
        if g.residuals:
            _solve(g, sheet)
        for line in sheet.provided:
            g.ok = g.ok & (measure.truth(line.body, g) == 1)
        for z in g.points.values():
            g.ok = g.ok & np.isfinite(z) & (np.abs(z) < 1e3)
    return g


def _residuals(g: Drawing, sheet: Sheet, theta: Any) -> Any:
    g.theta = [theta[:, k] for k in range(theta.shape[1])]
    g.restart({})
    walk(g, sheet)
    return np.stack([np.asarray(v) / 1.0 + np.zeros(len(theta)) for v, _s in g.residuals], axis=1)


def _solve(g: Drawing, sheet: Sheet, steps: int = 40) -> None:
    """Damped Gauss-Newton steps on all figures at once; only those that end at rounding error
    are kept.  Where the equations are singular at the solution the points are worth fewer digits."""
    theta = np.stack([t + np.zeros(g.n) for t in g.theta], axis=1)
    damp = np.full(g.n, 1e-3)
    f = np.nan_to_num(_residuals(g, sheet, theta), nan=1e6, posinf=1e6, neginf=-1e6)
    for _ in range(steps):
        jac = _jacobian(g, sheet, theta)
        jt = np.transpose(jac, (0, 2, 1))
        a = jt @ jac
        a += (
            (damp[:, None, None] + 1e-13)
            * (1 + np.trace(a, axis1=1, axis2=2))[:, None, None]
            * np.eye(a.shape[1])
        )
        step = np.linalg.solve(a, jt @ f[:, :, None])[:, :, 0]
        new = theta - np.clip(step, -1.0, 1.0)
        fn = np.nan_to_num(_residuals(g, sheet, new), nan=1e6, posinf=1e6, neginf=-1e6)
        better = (fn**2).sum(1) < (f**2).sum(1)
        theta = np.where(better[:, None], new, theta)
        f = np.where(better[:, None], fn, f)
        damp = np.where(better, damp * 0.1, np.minimum(damp * 8, 1e6))
        damp = np.maximum(damp, 1e-14)
        if np.quantile(np.abs(f).max(1), 0.7) < 1e-15:
            break
    jac = _jacobian(g, sheet, theta)
    rows = np.median(np.linalg.norm(jac, axis=2), axis=0) > 1e-7  # the others hold by construction
    least = np.full(g.n, 1.0)
    if rows.any():
        least = np.linalg.svd(jac[:, rows], compute_uv=False)[:, -1]
    _residuals(g, sheet, theta)
    worst = np.zeros(g.n)
    for v, s in g.residuals:
        worst = np.fmax(worst, np.where(np.isfinite(v), np.abs(v) / s, 1.0))
    g.ok = g.ok & (worst < 1e-12)
    loose = least < 1e-3
    g.ops = Floats(np.where(loose, 1e-4, 1e-10), np.where(loose, 3e-2, 1e-7))


def _jacobian(g: Drawing, sheet: Sheet, theta: Any) -> Any:
    h = 1e-6
    columns = []
    for k in range(theta.shape[1]):
        up, down = theta.copy(), theta.copy()
        up[:, k] += h
        down[:, k] -= h
        columns.append((_residuals(g, sheet, up) - _residuals(g, sheet, down)) / (2 * h))
    return np.nan_to_num(np.stack(columns, axis=2), nan=0.0, posinf=0.0, neginf=0.0)


def given_figure(points: dict[str, Any]) -> Drawing:
    """One figure with known coordinates in many digits."""
    g = Drawing(Digits())
    g.restart(points)
    return g
