"""What every reading of a figure shares: looking points and curves up, and the constructions
that statements and figures both need.

A `Reader` reads one component.  How a sign is settled is left to the subclass: the builder of
a figure forks, a sample looks it up, the formal reader keeps lengths as symbols.
"""

from __future__ import annotations

from abc import ABC, abstractmethod
from collections.abc import Callable
from fractions import Fraction
from typing import TYPE_CHECKING

from ..field.tower import Element
from ..sheet.tree import CentreOf, Measure, Named, PointRef, Pt, Through
from ..sheet.tree import Curve as CurveRef
from .plane import Round, Straight, Vec, cross, dot, orientation, square

if TYPE_CHECKING:
    from .component import Component


class Reader(ABC):
    """Reads points, curves and quantities of one component."""

    comp: Component

    @abstractmethod
    def absolute(self, e: Element) -> Element:
        """|e|."""

    @abstractmethod
    def root(self, q: Element) -> Element:
        """The non-negative square root of q."""

    def measuring(self, q: Measure) -> None:  # noqa: B027
        """Called before a measured quantity is read, for readers that keep quantities apart."""

    def nonnegative(self, q: Element) -> None:  # noqa: B027
        """Demand that a quantity under a written square root is not negative (squares of lengths
        never are and are not asked)."""

    @abstractmethod
    def divide(self, a: Element, b: Element, words: str) -> Element:
        """a/b, defined where b is not zero; `words` say what b = 0 means."""

    @abstractmethod
    def differ(self, a: Vec, b: Vec, words: str) -> None:
        """Demand that two points differ."""

    def kept(self, name: object, make: Callable[[], Element]) -> Element:
        """An element that depends on no sign; readers of a finished component keep it."""
        return make()

    def turn(self, a: PointRef, b: PointRef, c: PointRef) -> Element:
        """Twice the signed area of a triangle of placed points."""
        return self.kept(("turn", a, b, c), lambda: orientation(self.at(a), self.at(b), self.at(c)))

    def gap2(self, a: PointRef, b: PointRef) -> Element:
        """Squared distance of two placed points."""
        return self.kept(("gap", a, b), lambda: square(self.at(b) - self.at(a)))

    def lean(self, a: PointRef, b: PointRef, c: PointRef) -> Element:
        """Scalar product of the vectors from a to b and c."""
        return self.kept(("lean", a, b, c), lambda: dot(self.at(b) - self.at(a), self.at(c) - self.at(a)))

    def circle_test(self, a: PointRef, b: PointRef, c: PointRef, d: PointRef) -> Element:
        """The determinant that vanishes when four points lie on a circle (or three of them, a,
        b, c, on a line with d on it too): sum of squared distances from d times signed areas."""

        def make() -> Element:
            p, q, s = (self.at(x) - self.at(d) for x in (a, b, c))
            return square(p) * cross(q, s) + square(q) * cross(s, p) + square(s) * cross(p, q)

        return self.kept(("circle test", a, b, c, d), make)

    def offset(self, p: PointRef, ref: CurveRef) -> Element:
        """Signed area of a line's direction and the way from the line to p."""

        def make() -> Element:
            line = self.line(ref)
            return cross(line.direction, self.at(p) - line.point)

        return self.kept(("offset", p, ref), make)

    def stretch(self, ref: CurveRef) -> Element:
        """Squared length of a line's direction."""
        return self.kept(("stretch", ref), lambda: square(self.line(ref).direction))

    def number(self, value: int | Fraction) -> Element:
        """A rational constant."""
        return self.comp.tower.constant(value)

    def at(self, ref: PointRef) -> Vec:
        """Coordinates of a placed point."""
        if isinstance(ref, CentreOf):
            return self.circle(ref.circle).centre
        return self.comp.points[ref.name]

    def distance(self, a: Vec, b: Vec) -> Element:
        """Distance of two points."""
        return self.root(square(b - a))

    def line(self, ref: CurveRef) -> Straight:
        """A named line or the line through two points (which must differ)."""
        if isinstance(ref, Named):
            c = self.comp.curves[ref.name]
            assert isinstance(c, Straight)
            return c
        a, b = (self.at(p) for p in ref.points)
        self.differ(a, b, f"{ref.points[0]} = {ref.points[1]}")
        return Straight(a, b - a)

    def circle(self, ref: CurveRef) -> Round:
        """A named circle or the circle through three points."""
        if isinstance(ref, Named):
            c = self.comp.curves[ref.name]
            assert isinstance(c, Round)
            return c
        a, b, c3 = ref.points
        o = self.circumcentre(a, b, c3)
        return Round(o, square(self.at(a) - o), self.at(a))

    def is_circle(self, ref: CurveRef) -> bool:
        """Whether a reference means a circle."""
        if isinstance(ref, Through):
            return len(ref.points) == 3
        return isinstance(self.comp.curves[ref.name], Round)

    def circumcentre(self, a: Pt, b: Pt, c: Pt) -> Vec:
        """Circumcentre; the points must not be collinear."""
        p, q, r = self.at(a), self.at(b) - self.at(a), self.at(c) - self.at(a)
        d = cross(q, r) * 2
        k = self.divide(self.number(1), d, f"{a}, {b}, {c} collinear")
        qq, rr = square(q), square(r)
        return p + Vec((r.y * qq - q.y * rr) * k, (q.x * rr - r.x * qq) * k)

    def foot(self, p: Vec, line: Straight, words: str) -> Vec:
        """Foot of the perpendicular from p to a line."""
        d = line.direction
        t = self.divide(dot(p - line.point, d), square(d), words)
        return line.point + d * t

    def span(self, a: PointRef, b: PointRef) -> Element:
        """Distance of two placed points."""
        return self.root(self.gap2(a, b))

    def sides(self, a: PointRef, b: PointRef, c: PointRef) -> tuple[Element, Element, Element]:
        """Side lengths opposite a, b, c."""
        return self.span(b, c), self.span(c, a), self.span(a, b)
