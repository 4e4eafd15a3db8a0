"""Named lines and circles."""

from __future__ import annotations

from .forms_drawing import Drawing, form
from .forms_plane import HALF, Round, Straight, Vec, square
from .quantities import value
from .tree import CurveRef, PointRef, Quantity, Run


@form("circle_through")
def circle_through(d: Drawing, k: str, triangle: tuple[str, ...]) -> None:
    """Through three points."""
    d.figure.curves[k] = d.circle(Run(triangle))


@form("circle_centre_through")
def circle_centre_through(d: Drawing, k: str, o: PointRef, a: str) -> None:
    """About o through a, which must differ."""
    c, p = d.at(o), d.at(a)
    d.differ(c, p, "the radius is 0")
    d.figure.curves[k] = Round(c, square(p - c), p)


@form("circle_diameter")
def circle_diameter(d: Drawing, k: str, pair: tuple[str, ...]) -> None:
    """About the middle of two different points."""
    d.apart(*pair)
    p, q = d.at(pair[0]), d.at(pair[1])
    c = (p + q) * HALF
    d.figure.curves[k] = Round(c, square(p - c), p)


@form("circle_centre_radius")
def circle_centre_radius(d: Drawing, k: str, o: PointRef, radius: Quantity) -> None:
    """About o with a positive radius; the known point is to the right of o."""
    r = value(radius, d)
    d.numbers.require(r, ">", "the radius is not positive")
    c = d.at(o)
    d.figure.curves[k] = Round(c, r * r, c + Vec(r, d.numbers.number(0)))


def _touching(d: Drawing, triangle: tuple[str, ...], opposite: str) -> Round:
    """About the incentre or an excentre, through its foot on the first side."""
    c = d.touching(triangle, opposite)
    t = d.foot(c, Straight(d.at(triangle[0]), d.at(triangle[1]) - d.at(triangle[0])))
    return Round(c, square(t - c), t)


@form("incircle")
def incircle(d: Drawing, k: str, triangle: tuple[str, ...]) -> None:
    """Touches the three sides from inside."""
    d.figure.curves[k] = _touching(d, triangle, "")


@form("excircle")
def excircle(d: Drawing, k: str, triangle: tuple[str, ...], opposite: str) -> None:
    """Touches one side from outside and the two others produced."""
    d.figure.curves[k] = _touching(d, triangle, opposite)


@form("line_through")
def line_through(d: Drawing, m: str, pair: tuple[str, ...]) -> None:
    """Through two points."""
    d.figure.curves[m] = d.line_of(pair)


@form("parallel")
def parallel(d: Drawing, m: str, line: CurveRef, p: PointRef) -> None:
    """In a line's direction through a point."""
    d.figure.curves[m] = Straight(d.at(p), d.line(line).direction)


@form("perpendicular")
def perpendicular(d: Drawing, m: str, line: CurveRef, p: PointRef) -> None:
    """At right angles to a line through a point."""
    d.figure.curves[m] = Straight(d.at(p), d.line(line).direction.turned())


@form("perpendicular_bisector")
def perpendicular_bisector(d: Drawing, m: str, pair: tuple[str, ...]) -> None:
    """Of two different points."""
    line = d.line_of(pair)
    d.figure.curves[m] = Straight((d.at(pair[0]) + d.at(pair[1])) * HALF, line.direction.turned())


@form("angle_bisector")
def angle_bisector(d: Drawing, m: str, triple: tuple[str, ...]) -> None:
    """The whole line of the ray inside the angle."""
    d.figure.curves[m] = d.bisector(triple)


@form("tangent")
def tangent(d: Drawing, m: str, k: CurveRef, a: str) -> None:
    """At a point that is on the circle."""
    c = d.circle(k)
    p = d.at(a)
    d.numbers.vanish(square(p - c.centre) - c.radius2, f"{a} is not on the circle")
    d.numbers.require(c.radius2, "!=", "the radius is 0")
    d.figure.curves[m] = Straight(p, (p - c.centre).turned())
