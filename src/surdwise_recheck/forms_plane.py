"""Vectors, lines and circles over any arithmetic, the figure that holds them, a view that reads it."""

from __future__ import annotations

from dataclasses import dataclass, field
from fractions import Fraction

from .protocol import Arithmetic, Num, Undefined
from .tree import Centre, CurveRef, Name, PointRef, Run


@dataclass(frozen=True)
class Vec:
    """A point or vector of the plane."""

    x: Num
    y: Num

    def __add__(self, other: Vec) -> Vec:
        return Vec(self.x + other.x, self.y + other.y)

    def __sub__(self, other: Vec) -> Vec:
        return Vec(self.x - other.x, self.y - other.y)

    def __neg__(self) -> Vec:
        return Vec(-self.x, -self.y)

    def __mul__(self, factor: Num | int | Fraction) -> Vec:
        return Vec(self.x * factor, self.y * factor)

    def turned(self) -> Vec:
        """Turned by a right angle, anticlockwise."""
        return Vec(-self.y, self.x)


HALF = Fraction(1, 2)


def dot(a: Vec, b: Vec) -> Num:
    """Scalar product."""
    return a.x * b.x + a.y * b.y


def cross(a: Vec, b: Vec) -> Num:
    """Twice the signed area that two vectors span."""
    return a.x * b.y - a.y * b.x


def square(a: Vec) -> Num:
    """Squared length."""
    return dot(a, a)


def orientation(a: Vec, b: Vec, c: Vec) -> Num:
    """Twice the signed area of triangle abc."""
    return cross(b - a, c - a)


@dataclass(frozen=True)
class Straight:
    """A line: a point of it and its direction, which is not zero."""

    point: Vec
    direction: Vec


@dataclass(frozen=True)
class Round:
    """A circle: its centre, its squared radius, a point on it."""

    centre: Vec
    radius2: Num
    start: Vec


@dataclass
class Figure:
    """The points and named curves made so far."""

    points: dict[str, Vec] = field(default_factory=dict)
    curves: dict[str, Straight | Round] = field(default_factory=dict)

    def copy(self) -> Figure:
        """A figure that can be built on without touching this one."""
        return Figure(dict(self.points), dict(self.curves))


class View:
    """Reads a figure in an arithmetic; what is not defined there raises Undefined."""

    def __init__(self, figure: Figure, arithmetic: Arithmetic) -> None:
        self.figure = figure
        self.numbers = arithmetic

    def differ(self, a: Vec, b: Vec, words: str) -> None:
        """Two points must not coincide."""
        if self.numbers.zero(square(b - a)):
            raise Undefined(words)

    def at(self, p: PointRef) -> Vec:
        """A placed point, or the centre of a circle."""
        return self.circle(p.circle).centre if isinstance(p, Centre) else self.figure.points[p]

    def line(self, ref: CurveRef) -> Straight:
        """A named line, or the line through two points."""
        if isinstance(ref, Name):
            c = self.figure.curves[ref.name]
            assert isinstance(c, Straight)
            return c
        return self.line_of(ref.points)

    def line_of(self, pair: tuple[str, ...]) -> Straight:
        """The line through two points."""
        p, q = pair
        a, b = self.at(p), self.at(q)
        self.differ(a, b, f"{p} = {q}")
        return Straight(a, b - a)

    def is_circle(self, ref: CurveRef) -> bool:
        """Whether a reference means a circle."""
        if isinstance(ref, Run):
            return len(ref.points) == 3
        return isinstance(self.figure.curves[ref.name], Round)

    def circle(self, ref: CurveRef) -> Round:
        """A named circle, or the circle through three points."""
        if isinstance(ref, Name):
            c = self.figure.curves[ref.name]
            assert isinstance(c, Round)
            return c
        o = self.circumcentre(ref.points)
        a = self.at(ref.points[0])
        return Round(o, square(a - o), a)

    def circumcentre(self, triangle: tuple[str, ...]) -> Vec:
        """The point o with |o - a| = |o - b| = |o - c|: two linear equations, solved by Cramer's rule."""
        a, b, c = (self.at(p) for p in triangle)
        q, r = b - a, c - a
        k = self.numbers.divide(
            self.numbers.number(1), cross(q, r) * 2, f"{', '.join(triangle)} are on one line"
        )
        m, n = square(q), square(r)
        return a + Vec(r.y * m - q.y * n, q.x * n - r.x * m) * k

    def foot(self, p: Vec, line: Straight) -> Vec:
        """Foot of the perpendicular from p."""
        along = dot(p - line.point, line.direction)
        t = self.numbers.divide(along, square(line.direction), "the line is not defined")
        return line.point + line.direction * t

    def turn(self, a: PointRef, b: PointRef, c: PointRef) -> Num:
        """Twice the signed area of a triangle."""
        return orientation(self.at(a), self.at(b), self.at(c))

    def gap2(self, a: PointRef, b: PointRef) -> Num:
        """Squared distance."""
        return square(self.at(b) - self.at(a))

    def lean(self, a: PointRef, b: PointRef, c: PointRef) -> Num:
        """Scalar product of the vectors from a to b and to c; it has the sign of the angle's cosine."""
        return dot(self.at(b) - self.at(a), self.at(c) - self.at(a))

    def offset(self, p: PointRef, line: Straight) -> Num:
        """Signed distance of p from the line, times the length of its direction."""
        return cross(line.direction, self.at(p) - line.point)

    def span(self, a: PointRef, b: PointRef) -> Num:
        """Distance of two points."""
        return self.numbers.root(self.gap2(a, b))
