"""Centres of a triangle; those built on side lengths use positive lengths."""

from __future__ import annotations

from typing import Any

from ...field.tower import Element
from ...sheet.tree import Pt
from ..component import Builder
from ..plane import Vec, orientation
from .table import form


@form("centroid")
def centroid(b: Builder, g: Pt, tri: tuple[Pt, ...]) -> None:
    """Mean of the vertices."""
    p, q, r = (b.at(x) for x in tri)
    b.put(g, (p + q + r) / 3)


@form("circumcentre")
def circumcentre(b: Builder, o: Pt, tri: tuple[Pt, ...]) -> None:
    """Equidistant from the vertices."""
    b.put(o, b.circumcentre(*tri))


def orthocentre_of(b: Builder, tri: tuple[Pt, ...]) -> Vec:
    """Orthocentre H = A + B + C - 2 O (Euler)."""
    p, q, r = (b.at(x) for x in tri)
    return p + q + r - b.circumcentre(*tri) * 2


@form("orthocentre")
def orthocentre(b: Builder, h: Pt, tri: tuple[Pt, ...]) -> None:
    """Meet of the altitudes."""
    b.put(h, orthocentre_of(b, tri))


@form("nine_point_centre")
def nine_point_centre(b: Builder, n: Pt, tri: tuple[Pt, ...]) -> None:
    """Midpoint of circumcentre and orthocentre (Euler)."""
    b.put(n, (b.circumcentre(*tri) + orthocentre_of(b, tri)) / 2)


def weighted(b: Builder, tri: tuple[Pt, ...], weights: tuple[Element, Element, Element]) -> Vec:
    """The point with the given barycentric weights."""
    p, q, r = (b.at(x) for x in tri)
    x, y, z = weights
    k = b.divide(b.number(1), x + y + z, ", ".join(map(str, tri)) + " collinear")
    return (p * x + q * y + r * z) * k


def not_flat(b: Builder, tri: tuple[Pt, ...]) -> None:
    """A centre built on lengths is that of a proper triangle."""
    b.require(orientation(*(b.at(x) for x in tri)), "!=", ", ".join(map(str, tri)) + " collinear")


def excentre_weights(
    b: Builder, tri: tuple[Pt, ...], opposite: Pt | None
) -> tuple[Element, Element, Element]:
    """Side lengths, that of the side opposite to the excentre taken negative."""
    x, y, z = b.sides(*tri)
    if opposite is None:
        return x, y, z
    i = [p.name for p in tri].index(opposite.name)
    w = [x, y, z]
    w[i] = -w[i]
    return w[0], w[1], w[2]


@form("incentre")
def incentre(b: Builder, i: Pt, tri: tuple[Pt, ...]) -> None:
    """Barycentric weights a : b : c."""
    not_flat(b, tri)
    b.put(i, weighted(b, tri, excentre_weights(b, tri, None)))


@form("excentre")
def excentre(b: Builder, j: Pt, tri: tuple[Pt, ...], opposite: Pt) -> None:
    """Barycentric weights -a : b : c, opposite the first vertex."""
    not_flat(b, tri)
    b.put(j, weighted(b, tri, excentre_weights(b, tri, opposite)))


@form("touch_point")
def touch_point(b: Builder, t: Pt, tri: tuple[Pt, ...], pair: tuple[Pt, ...]) -> None:
    """Touch point of the incircle on a side: at distance s - b from its first end."""
    not_flat(b, tri)
    p, q = pair
    r = next(x for x in tri if x.name not in (p.name, q.name))
    x, y, z = b.sides(p, q, r)  # opposite p, q, r; |pq| = z
    k = b.divide(y + z - x, z * 2, f"{p} = {q}")
    b.put(t, b.at(p) + (b.at(q) - b.at(p)) * k)


@form("centre")
def centre(b: Builder, o: Pt, k: Any) -> None:
    """Centre of a circle."""
    b.put(o, b.circle(k).centre)
