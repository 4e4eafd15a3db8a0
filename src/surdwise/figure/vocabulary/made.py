"""Made points: midpoints, feet, reflections, apexes, corners."""

from __future__ import annotations

from typing import Any

from ...sheet.tree import Pt
from ..component import Builder
from ..plane import Straight, Vec, cross, orientation
from .on_curves import bisector_direction
from .shapes import apex_on
from .table import form


@form("midpoint")
def midpoint(b: Builder, m: Pt, pair: tuple[Pt, ...]) -> None:
    """Midpoint of two points."""
    b.put(m, (b.at(pair[0]) + b.at(pair[1])) / 2)


@form("foot")
def foot(b: Builder, d: Pt, p: Any, line: Any) -> None:
    """Foot of the perpendicular from a point on a line."""
    b.put(d, b.foot(b.at(p), b.line(line), "the line is not defined"))


@form("foot_of_bisector")
def foot_of_bisector(b: Builder, d: Pt, triple: tuple[Pt, ...], pair: tuple[Pt, ...]) -> None:
    """Meet of the bisector ray of an angle with a line."""
    a, u = bisector_direction(b, triple)
    line = b.line_of(pair)
    at, t = cut(b, Straight(a, u), line, "the bisector is parallel to the line")
    b.require(t, ">=", "the bisector ray misses the line")
    b.put(d, at)


def cut(b: Builder, m: Straight, n: Straight, words: str) -> tuple[Vec, Any]:
    """Meet of two lines, with its coordinate along the first."""
    t = b.divide(cross(n.point - m.point, n.direction), cross(m.direction, n.direction), words)
    return m.point + m.direction * t, t


@form("reflection_in_line")
def reflection_in_line(b: Builder, image: Pt, p: Any, line: Any) -> None:
    """Mirror image in a line."""
    v = b.at(p)
    b.put(image, b.foot(v, b.line(line), "the line is not defined") * 2 - v)


@form("reflection_in_point")
def reflection_in_point(b: Builder, image: Pt, p: Any, m: Any) -> None:
    """Mirror image in a point."""
    b.put(image, b.at(m) * 2 - b.at(p))


@form("equilateral_apex")
def equilateral_apex(b: Builder, d: Pt, pair: tuple[Pt, ...]) -> None:
    """Apex of an equilateral triangle, to either side."""
    p, q = b.at(pair[0]), b.at(pair[1])
    b.differ(p, q, f"{pair[0]} = {pair[1]}")
    b.put(d, apex_on(b, p, q))


def _sided(b: Builder, p: Vec, q: Vec, made: Vec, side: str, mark: Pt) -> None:
    """Demand that `made` lies away from / towards the marked point with respect to pq."""
    product = orientation(p, q, made) * orientation(p, q, b.at(mark))
    words = f"{mark} on the line of the base"
    b.require(product if side == "towards" else -product, ">", words)


@form("equilateral_apex_sided")
def equilateral_apex_sided(b: Builder, d: Pt, pair: tuple[Pt, ...], side: str, mark: Pt) -> None:
    """Apex of an equilateral triangle, to the side named."""
    equilateral_apex(b, d, pair)
    _sided(b, b.at(pair[0]), b.at(pair[1]), b.at(d), side, mark)


@form("square_corners")
def square_corners(b: Builder, d: Pt, e: Pt, pair: tuple[Pt, ...], side: str, mark: Pt) -> None:
    """Corners D, E of the square B, C, D, E on BC, to the side named."""
    p, q = b.at(pair[0]), b.at(pair[1])
    b.differ(p, q, f"{pair[0]} = {pair[1]}")
    up = (q - p).turned() * b.choose()
    b.put(d, q + up)
    b.put(e, p + up)
    _sided(b, p, q, q + up, side, mark)
