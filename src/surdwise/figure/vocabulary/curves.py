"""Named lines and circles."""

from __future__ import annotations

from typing import Any

from ...sheet.tree import Named, Pt
from ..component import Builder
from ..plane import Curve, Round, Straight, Vec, square
from ..quantities import value
from .centres import excentre_weights, not_flat, weighted
from .on_curves import bisector_direction
from .table import form


def _name(b: Builder, ref: Named, curve: Curve) -> None:
    b.comp.curves[ref.name] = curve


@form("circle_through")
def circle_through(b: Builder, k: Named, tri: tuple[Pt, ...]) -> None:
    """Through three points."""
    _name(b, k, b.circle_through(*tri))


@form("circle_centre_through")
def circle_centre_through(b: Builder, k: Named, o: Any, a: Pt) -> None:
    """About a centre through a point."""
    c, p = b.at(o), b.at(a)
    b.differ(c, p, "the circle has radius 0")
    _name(b, k, Round(c, square(p - c), p))


@form("circle_diameter")
def circle_diameter(b: Builder, k: Named, pair: tuple[Pt, ...]) -> None:
    """On a diameter."""
    p, q = b.at(pair[0]), b.at(pair[1])
    b.differ(p, q, f"{pair[0]} = {pair[1]}")
    c = (p + q) / 2
    _name(b, k, Round(c, square(p - c), p))


@form("circle_centre_radius")
def circle_centre_radius(b: Builder, k: Named, o: Any, radius: Any) -> None:
    """About a centre with a given radius, which must be positive."""
    r = value(radius, b)
    b.require(r, ">", "the radius is not positive")
    c = b.at(o)
    _name(b, k, Round(c, r * r, c + Vec(r, b.number(0))))


def _touching(b: Builder, tri: tuple[Pt, ...], opposite: Pt | None) -> Round:
    not_flat(b, tri)
    c = weighted(b, tri, excentre_weights(b, tri, opposite))
    p, q = b.at(tri[0]), b.at(tri[1])
    t = b.foot(c, Straight(p, q - p), f"{tri[0]} = {tri[1]}")
    return Round(c, square(t - c), t)


@form("incircle")
def incircle(b: Builder, k: Named, tri: tuple[Pt, ...]) -> None:
    """Touching the three sides from inside."""
    _name(b, k, _touching(b, tri, None))


@form("excircle")
def excircle(b: Builder, k: Named, tri: tuple[Pt, ...], opposite: Pt) -> None:
    """Touching one side from outside and the two others produced."""
    _name(b, k, _touching(b, tri, opposite))


@form("line_through")
def line_through(b: Builder, m: Named, pair: tuple[Pt, ...]) -> None:
    """Through two points."""
    _name(b, m, b.line_of(pair))


@form("parallel")
def parallel(b: Builder, m: Named, line: Any, p: Any) -> None:
    """Parallel to a line through a point."""
    _name(b, m, Straight(b.at(p), b.line(line).direction))


@form("perpendicular")
def perpendicular(b: Builder, m: Named, line: Any, p: Any) -> None:
    """Perpendicular to a line through a point."""
    _name(b, m, Straight(b.at(p), b.line(line).direction.turned()))


@form("perpendicular_bisector")
def perpendicular_bisector(b: Builder, m: Named, pair: tuple[Pt, ...]) -> None:
    """Perpendicular bisector of two points."""
    line = b.line_of(pair)
    _name(b, m, Straight((b.at(pair[0]) + b.at(pair[1])) / 2, line.direction.turned()))


@form("angle_bisector")
def angle_bisector(b: Builder, m: Named, triple: tuple[Pt, ...]) -> None:
    """The line of the bisector of an angle."""
    a, d = bisector_direction(b, triple)
    _name(b, m, Straight(a, d))


@form("tangent")
def tangent(b: Builder, m: Named, k: Any, a: Pt) -> None:
    """Tangent to a circle at a point of it."""
    c = b.circle(k)
    p = b.at(a)
    b.vanish(square(p - c.centre) - c.radius2, f"{a} is not on the circle")
    b.require(c.radius2, "!=", "the circle has radius 0")
    _name(b, m, Straight(p, (p - c.centre).turned()))
