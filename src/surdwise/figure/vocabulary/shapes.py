"""Free points and triangles."""

from __future__ import annotations

from fractions import Fraction

from ...sheet.tree import Pt
from ..component import Builder
from ..plane import Vec, dot, orientation, square
from .placements import placed_by
from .table import form


@form("points")
def points(b: Builder, names: tuple[Pt, ...]) -> None:
    """Free points; those of one line are distinct."""
    placed: list[Pt] = []
    for p in names:
        b.free_point(p, placed)
        for q in placed:
            b.require(square(b.at(p) - b.at(q)), "!=", f"{p} = {q}")
        placed.append(p)


def missing(b: Builder, names: tuple[Pt, ...]) -> list[Pt]:
    """The vertices not placed yet."""
    return [p for p in names if not b.has(p.name)]


def corners(b: Builder, names: tuple[Pt, ...]) -> None:
    """Place the missing vertices of a triangle freely."""
    for p in names:
        if not b.has(p.name):
            b.free_point(p, names, off_line=True)


def not_flat(b: Builder, names: tuple[Pt, ...]) -> None:
    """Demand that three points are not collinear."""
    b.require(orientation(*(b.at(p) for p in names)), "!=", ", ".join(str(p) for p in names) + " collinear")


@form("triangle")
def triangle(b: Builder, names: tuple[Pt, ...]) -> None:
    """Three points, not collinear."""
    if placed_by(b, "triangle", names):
        return
    corners(b, names)
    not_flat(b, names)


@form("isosceles_triangle")
def isosceles_triangle(b: Builder, names: tuple[Pt, ...], apex: Pt) -> None:
    """Two equal sides at the apex: the apex lies on the bisector of the base."""
    base = [p for p in names if p.name != apex.name]
    new = {p.name for p in missing(b, names)}
    if apex.name in new:
        for p in base:
            if p.name in new:
                b.free_point(p, names, off_line=True)
        u, v = b.at(base[0]), b.at(base[1])
        first = len(b.comp.points) == 2 and new == {x.name for x in names}
        t = b.param(f"height of {apex}", positive=first)
        b.put(apex, (u + v) / 2 + (v - u).turned() * t)
    elif len(new) == 1:
        there = next(p for p in base if p.name not in new)
        other = next(p for p in base if p.name in new)
        swing(b, other, b.at(apex), b.at(there))
    else:
        corners(b, names)
        a, u, v = b.at(apex), b.at(base[0]), b.at(base[1])
        b.vanish(square(u - a) - square(v - a), f"|{apex}{base[0]}| = |{apex}{base[1]}| cannot hold")
    not_flat(b, names)


def swing(b: Builder, new: Pt, centre: Vec, start: Vec) -> None:
    """A point anywhere on the circle about `centre` through `start`, by the rational
    parametrisation of its central angle; the point opposite `start` is the missed one."""
    if b.at_missed_chart():
        b.put(new, centre * 2 - start)
        return
    t = b.param(f"tan of half the turn of {new}")
    d = start - centre
    k = 1 / (t * t + 1)
    b.put(new, centre + d * ((1 - t * t) * k) + d.turned() * (t * 2 * k))


@form("right_triangle")
def right_triangle(b: Builder, names: tuple[Pt, ...], corner: Pt) -> None:
    """A right angle at the named corner."""
    legs = [p for p in names if p.name != corner.name]
    new = {p.name for p in missing(b, names)}
    first = not b.comp.points
    if corner.name in new and len(new) > 1:
        b.free_point(corner, names, off_line=True)
        new.discard(corner.name)
    if corner.name in new:
        p, q = b.at(legs[0]), b.at(legs[1])
        swing(b, corner, (p + q) / 2, p)
    elif new:
        if len(new) == 2:
            b.free_point(legs[0], names, off_line=True)
            new.discard(legs[0].name)
        last = next(p for p in legs if p.name in new)
        other = next(p for p in legs if p.name != last.name)
        c = b.at(corner)
        t = b.param(f"leg to {last}", positive=first)
        b.put(last, c + (b.at(other) - c).turned() * t)
    else:
        c, p, q = b.at(corner), b.at(legs[0]), b.at(legs[1])
        b.vanish(dot(p - c, q - c), f"the angle at {corner} cannot be right")
    not_flat(b, names)


@form("equilateral_triangle")
def equilateral_triangle(b: Builder, names: tuple[Pt, ...]) -> None:
    """Three equal sides."""
    first = not b.comp.points
    new = {p.name for p in missing(b, names)}
    order = sorted(names, key=lambda p: p.name in new)
    for p in order[:2]:
        if p.name in new:
            b.free_point(p, names)
    b.require(square(b.at(order[0]) - b.at(order[1])), "!=", f"{order[0]} = {order[1]}")
    side = 1 if first else 0
    b.put(order[2], apex_on(b, b.at(order[0]), b.at(order[1]), side))


def apex_on(b: Builder, p: Vec, q: Vec, side: int = 0) -> Vec:
    """Third vertex of an equilateral triangle on pq: to the left (side 1) or either way (0)."""
    s = b.root(b.number(3)) if side else b.either_root(b.number(3))
    return (p + q) / 2 + (q - p).turned() * (s * Fraction(1, 2))
