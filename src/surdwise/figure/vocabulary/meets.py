"""Meets of lines and circles."""

from __future__ import annotations

from typing import Any

from ...sheet.tree import Pt
from ..component import Builder, Dead
from ..plane import Round, Straight, Vec, dot, square
from .made import cut
from .table import form


def meet_of(b: Builder, one: Any, two: Any) -> Vec:
    """A common point of two curves (any one, where there are two)."""
    if b.is_circle(one) and b.is_circle(two):
        return _circles(b, b.circle(one), b.circle(two))
    if b.is_circle(one):
        one, two = two, one
    if b.is_circle(two):
        return line_circle(b, b.line(one), b.circle(two))
    return cut(b, b.line(one), b.line(two), "the lines are parallel")[0]


def line_circle(b: Builder, line: Straight, k: Round) -> Vec:
    """Roots of |P + s d - O|^2 = r^2 in s, by the quadratic formula."""
    d, w = line.direction, line.point - k.centre
    dd, dw = square(d), dot(d, w)
    disc = dw * dw - dd * (square(w) - k.radius2)
    s = b.divide(b.either_root(disc) - dw, dd, "the line is not defined")
    return line.point + d * s


def _circles(b: Builder, k: Round, m: Round) -> Vec:
    """On the radical axis of the two circles."""
    d = m.centre - k.centre
    dd = square(d)
    if dd.is_zero():
        raise Dead("the circles are concentric")
    s = b.divide(dd + k.radius2 - m.radius2, dd * 2, "the circles are concentric")
    return line_circle(b, Straight(k.centre + d * s, d.turned()), k)


@form("meet")
def meet(b: Builder, x: Pt, one: Any, two: Any) -> None:
    """A meet of two curves."""
    b.put(x, meet_of(b, one, two))


@form("meet_other")
def meet_other(b: Builder, x: Pt, one: Any, two: Any, than: Pt) -> None:
    """The meet that is not the named point."""
    v = meet_of(b, one, two)
    b.require(square(v - b.at(than)), "!=", f"no meet other than {than}")
    b.put(x, v)
