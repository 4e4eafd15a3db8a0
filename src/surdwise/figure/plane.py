"""Vectors, lines and circles whose coordinates are tower elements.  Exact."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

from ..field.tower import Element


@dataclass(frozen=True)
class Vec:
    """A point or vector of the plane."""

    x: Element
    y: Element

    def __add__(self, other: Vec) -> Vec:
        return Vec(self.x + other.x, self.y + other.y)

    def __sub__(self, other: Vec) -> Vec:
        return Vec(self.x - other.x, self.y - other.y)

    def __neg__(self) -> Vec:
        return Vec(-self.x, -self.y)

    def __mul__(self, factor: Element | int | Fraction) -> Vec:
        return Vec(self.x * factor, self.y * factor)

    def __truediv__(self, factor: Element | int | Fraction) -> Vec:
        return self * (1 / factor if isinstance(factor, Element) else Fraction(1) / factor)

    def turned(self) -> Vec:
        """Turned by a right angle, anticlockwise."""
        return Vec(-self.y, self.x)


def dot(a: Vec, b: Vec) -> Element:
    """Scalar product."""
    return a.x * b.x + a.y * b.y


def cross(a: Vec, b: Vec) -> Element:
    """Determinant of two vectors: twice the signed area they span."""
    return a.x * b.y - a.y * b.x


def square(a: Vec) -> Element:
    """Squared length."""
    return a.x * a.x + a.y * a.y


def orientation(a: Vec, b: Vec, c: Vec) -> Element:
    """Twice the signed area of triangle abc."""
    return cross(b - a, c - a)


@dataclass(frozen=True)
class Straight:
    """A line: a point and a direction (not zero)."""

    point: Vec
    direction: Vec


@dataclass(frozen=True)
class Round:
    """A circle: centre, squared radius, and a point on it with coordinates in the tower."""

    centre: Vec
    radius2: Element
    start: Vec


Curve = Straight | Round
