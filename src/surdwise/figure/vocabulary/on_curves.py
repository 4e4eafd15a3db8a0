"""Points anywhere on a line, segment, ray, circle or bisector, or inside a triangle."""

from __future__ import annotations

from typing import Any

from ...field.tower import Element
from ...sheet.tree import Pt
from ..component import Builder
from ..plane import Round, Straight, Vec, cross, dot, orientation, square
from .placements import HALF_ANGLES
from .table import form


def on_straight(b: Builder, p: Pt, line: Straight, label: str) -> Element:
    """Place p on the line, or demand that it lies there; returns its coordinate along it."""
    if b.has(p.name):
        v = b.at(p) - line.point
        b.vanish(cross(line.direction, v), f"{p} is not on the line")
        return b.divide(dot(v, line.direction), square(line.direction), "the line is not defined")
    t = b.param(label)
    b.put(p, line.point + line.direction * t)
    return t


def on_round(b: Builder, p: Pt, k: Round) -> None:
    """Place p on the circle by the slope of its chord from the circle's known point, or demand
    that it lies there.  The chord at right angles to the first direction is the missed one."""
    if b.has(p.name):
        b.vanish(square(b.at(p) - k.centre) - k.radius2, f"{p} is not on the circle")
        return
    d = k.centre - k.start
    if b.at_missed_chart():
        b.put(p, k.start)
        return
    if b.frame.kind == HALF_ANGLES:
        # chord angles lie in (0, 180 degrees), their halves' tangents in (0, oo)
        s = b.param(f"tan of half the chord angle of {p}", positive=True)
        t = (1 - s * s) / (s * 2)
    else:
        t = b.param(f"cot of the chord angle of {p}")
    along = d + d.turned() * t
    b.put(p, k.start + along * (2 / (t * t + 1)))


@form("on_line")
def on_line(b: Builder, p: Pt, line: Any) -> None:
    """Anywhere on the line."""
    on_straight(b, p, b.line(line), f"place of {p} on the line")


@form("on_segment")
def on_segment(b: Builder, p: Pt, pair: tuple[Pt, ...]) -> None:
    """Between the ends or at one of them."""
    t = _along(b, p, pair)
    b.require(t, ">=", f"{p} before {pair[0]}")
    b.require(1 - t, ">=", f"{p} beyond {pair[1]}")


@form("on_ray")
def on_ray(b: Builder, p: Pt, pair: tuple[Pt, ...]) -> None:
    """On the ray from the first point through the second, the origin included."""
    t = _along(b, p, pair)
    b.require(t, ">=", f"{p} before {pair[0]}")


def _along(b: Builder, p: Pt, pair: tuple[Pt, ...]) -> Element:
    u, v = b.at(pair[0]), b.at(pair[1])
    b.differ(u, v, f"{pair[0]} = {pair[1]}")
    return on_straight(b, p, Straight(u, v - u), f"|{pair[0]}{p}| over |{pair[0]}{pair[1]}|")


@form("on_circle")
def on_circle(b: Builder, p: Pt, k: Any) -> None:
    """Anywhere on the circle."""
    on_round(b, p, b.circle(k))


@form("on_perpendicular_bisector")
def on_perpendicular_bisector(b: Builder, p: Pt, pair: tuple[Pt, ...]) -> None:
    """Equidistant from two points."""
    u, v = b.at(pair[0]), b.at(pair[1])
    b.differ(u, v, f"{pair[0]} = {pair[1]}")
    on_straight(b, p, Straight((u + v) / 2, (v - u).turned()), f"place of {p} on the bisector")


def bisector_direction(b: Builder, triple: tuple[Pt, ...]) -> tuple[Vec, Vec]:
    """Corner and direction of the bisector ray inside angle BAC: |AC| AB + |AB| AC (as
    vectors); for a straight angle the perpendicular, for which there is no inside: excluded."""
    p, a, q = (b.at(x) for x in triple)
    b.differ(a, p, f"{triple[1]} = {triple[0]}")
    b.differ(a, q, f"{triple[1]} = {triple[2]}")
    m, n = b.distance(a, p), b.distance(a, q)
    d = (p - a) * n + (q - a) * m
    b.require(square(d), "!=", f"angle {triple[0]}{triple[1]}{triple[2]} straight")
    return a, d


@form("on_angle_bisector")
def on_angle_bisector(b: Builder, p: Pt, triple: tuple[Pt, ...]) -> None:
    """On the ray from the corner inside the angle."""
    a, d = bisector_direction(b, triple)
    t = on_straight(b, p, Straight(a, d), f"place of {p} on the bisector")
    b.require(t, ">=", f"{p} on the wrong side of the corner")


@form("inside_triangle")
def inside_triangle(b: Builder, p: Pt, tri: tuple[Pt, ...]) -> None:
    """Strictly inside."""
    if not b.has(p.name):
        b.free_point(p)
    u, v, w = (b.at(x) for x in tri)
    at = b.at(p)
    whole = orientation(u, v, w)
    b.require(whole, "!=", ", ".join(map(str, tri)) + " collinear")
    for s, e in ((u, v), (v, w), (w, u)):
        b.require(orientation(s, e, at) * whole, ">", f"{p} not inside")
