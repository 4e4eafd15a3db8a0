"""Vectors, lines, circles and triangle centres over columns of numbers.

A column is a numpy array with one entry a figure: of floats, or of mpmath numbers (dtype object); the
same code serves both.  What is undefined becomes NaN and stays NaN.  Rigour: float hint; every result
is as good as its column's digits times the conditioning of the figure.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction
from typing import Any

import mpmath  # type: ignore[import-untyped]
import numpy as np

Num = Any  # a column, or a plain number
NAN = float("nan")


def is_digits(a: Num) -> bool:
    """Whether a column holds mpmath numbers."""
    return getattr(a, "dtype", None) == object


def _each(f: Any) -> Any:
    return np.frompyfunc(f, 1, 1)


_ROOT = _each(lambda v: mpmath.sqrt(v) if v >= 0 else mpmath.nan)
_COS, _SIN = _each(mpmath.cos), _each(mpmath.sin)


def root(a: Num) -> Num:
    """The square root; NaN for what is negative."""
    if is_digits(a):
        return _ROOT(a)
    return np.sqrt(np.where(a >= 0, a, np.nan))


def over(a: Num, b: Num, empty: float = NAN) -> Num:
    """a/b, or `empty` where b is zero."""
    bad = b == 0
    return np.where(bad, empty + 0 * a, a / np.where(bad, 1, b))


def power(a: Num, n: int) -> Num:
    """a to a whole power; NaN for zero to a negative one."""
    return a**n if n >= 0 else over(1 + 0 * a, a ** (-n))


def finite(a: Num) -> Num:
    """Where a column holds proper numbers."""
    return (a == a) & (np.abs(a) < 1e200)


def sgn(a: Num) -> Num:
    return np.where(a > 0, 1, np.where(a < 0, -1, 0))


def least(items: Sequence[Num]) -> Num:
    """Entry by entry the least; NaN if any is NaN."""
    best = items[0]
    for a in items[1:]:
        best = np.where((a < best) | (a != a), a, best)
    return best


def most(items: Sequence[Num]) -> Num:
    return -least([-a for a in items])


def number(value: Fraction, like: Num) -> Num:
    """A rational constant in the digits of a column."""
    if is_digits(like):
        one = np.empty(1, dtype=object)
        one[0] = mpmath.mpf(value.numerator) / value.denominator
        return one
    return np.full(1, float(value))


@dataclass(frozen=True)
class Vec:
    """A point or a vector."""

    x: Num
    y: Num

    def __add__(self, o: Vec) -> Vec:
        return Vec(self.x + o.x, self.y + o.y)

    def __sub__(self, o: Vec) -> Vec:
        return Vec(self.x - o.x, self.y - o.y)

    def __mul__(self, k: Num) -> Vec:
        return Vec(self.x * k, self.y * k)

    def left(self) -> Vec:
        """Turned by a right angle, anticlockwise."""
        return Vec(-self.y, self.x)

    def turned(self, angle: Num) -> Vec:
        """Turned anticlockwise by an angle."""
        c, s = (_COS(angle), _SIN(angle)) if is_digits(angle) else (np.cos(angle), np.sin(angle))
        return Vec(self.x * c - self.y * s, self.x * s + self.y * c)

    def len(self) -> Num:
        return root(self.x * self.x + self.y * self.y)

    def unit(self) -> Vec:
        k = self.len()
        return Vec(over(self.x, k), over(self.y, k))

    def fits(self) -> Num:
        return finite(self.x) & finite(self.y)


def dot(a: Vec, b: Vec) -> Num:
    return a.x * b.x + a.y * b.y


def cross(a: Vec, b: Vec) -> Num:
    return a.x * b.y - a.y * b.x


def gap(a: Vec, b: Vec) -> Num:
    """The distance of two points."""
    return (a - b).len()


def choose(mask: Num, a: Vec, b: Vec) -> Vec:
    """a where the mask is set, else b."""
    return Vec(np.where(mask, a.x, b.x), np.where(mask, a.y, b.y))


def middle(a: Vec, b: Vec) -> Vec:
    return (a + b) * 0.5


@dataclass(frozen=True)
class Line:
    """A point, a unit direction, and the length of the base that it was drawn from."""

    p: Vec
    d: Vec
    base: Num

    def height(self, q: Vec) -> Num:
        """Signed distance of q, positive on the left."""
        return cross(self.d, q - self.p)

    def foot(self, q: Vec) -> Vec:
        return self.p + self.d * dot(self.d, q - self.p)


@dataclass(frozen=True)
class Circle:
    c: Vec
    r: Num


def line_of(a: Vec, b: Vec) -> Line:
    return Line(a, (b - a).unit(), gap(a, b))


def meet_lines(m: Line, n: Line) -> Vec:
    return m.p + m.d * over(cross(n.p - m.p, n.d), cross(m.d, n.d))


def _half_chord(square: Num, r: Num) -> Num:
    """Root of r^2 - distance^2; a touching that rounding hides counts as one."""
    slack = 1e-45 if is_digits(square) else 2e-14
    return root(np.where(np.abs(square) <= slack * r * r, 0 * square, square))


def meet_line_circle(m: Line, k: Circle) -> tuple[Vec, Vec]:
    f = m.foot(k.c)
    off = m.height(k.c)
    h = m.d * _half_chord((k.r - off) * (k.r + off), k.r)
    return f + h, f - h


def meet_circles(k: Circle, m: Circle) -> tuple[Vec, Vec]:
    d = m.c - k.c
    e = d.len()
    a = over(e * e + (k.r - m.r) * (k.r + m.r), 2 * e)
    u = d.unit()
    f = k.c + u * a
    h = u.left() * _half_chord((k.r - a) * (k.r + a), np.where(k.r < m.r, k.r, m.r))
    return f + h, f - h


def circumcentre(a: Vec, b: Vec, c: Vec) -> Vec:
    u, v = b - a, c - a
    k, uu, vv = 2 * cross(u, v), dot(u, u), dot(v, v)
    return a + Vec(over(v.y * uu - u.y * vv, k), over(u.x * vv - v.x * uu, k))


def weighted(points: Sequence[Vec], weights: Sequence[Num]) -> Vec:
    total = sum(weights[1:], weights[0])
    origin = points[0]
    shift = Vec(0 * total, 0 * total)
    for p, w in zip(points[1:], weights[1:], strict=True):
        shift = shift + (p - origin) * over(w, total)
    return origin + shift


def incentre(a: Vec, b: Vec, c: Vec) -> Vec:
    return weighted((a, b, c), (gap(b, c), gap(c, a), gap(a, b)))


def excentre(a: Vec, b: Vec, c: Vec) -> Vec:
    """Opposite the first point."""
    return weighted((a, b, c), (-gap(b, c), gap(c, a), gap(a, b)))


def inner_direction(b: Vec, a: Vec, c: Vec) -> Vec:
    """The unit direction from a that halves the angle BAC from inside."""
    return ((b - a).unit() + (c - a).unit()).unit()
