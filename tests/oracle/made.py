"""Made points from what their line says: every point (or pair of points) it allows, as columns.

An entry that the line leaves undefined is NaN.  Rigour: float hint.
"""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import numpy as np

from surdwise.sheet.tree import Fact

from .figure import Figure, _from
from .plane import (
    NAN,
    Num,
    Vec,
    choose,
    circumcentre,
    cross,
    excentre,
    gap,
    incentre,
    inner_direction,
    line_of,
    meet_circles,
    meet_line_circle,
    meet_lines,
    middle,
    number,
    root,
    sgn,
)

Points = tuple[Vec, ...]
MADE = frozenset(
    (
        "midpoint foot foot_of_bisector reflection_in_line reflection_in_point centroid circumcentre"
        " orthocentre incentre excentre nine_point_centre touch_point equilateral_apex"
        " equilateral_apex_sided square_corners centre meet meet_other"
    ).split()
)


def new_names(fact: Fact) -> tuple[str, ...]:
    """The points that a made-point line brings in."""
    first, second = fact.args[0], fact.args[1]
    count = 2 if fact.form == "square_corners" else 1
    return tuple(p.name for p in (first, second)[:count])  # type: ignore[union-attr]


def made(fact: Fact, fig: Figure) -> list[Points]:
    """The choices that the line leaves."""
    a: tuple[Any, ...] = fact.args
    match fact.form:
        case "midpoint":
            return [(middle(*fig.run(a[1])),)]
        case "foot":
            return [(fig.line(a[2]).foot(fig.at(a[1])),)]
        case "foot_of_bisector":
            b, v, c = fig.run(a[1])
            d = inner_direction(b, v, c)
            return [(meet_lines(line_of(v, v + d), line_of(*fig.run(a[2]))),)]
        case "reflection_in_line":
            p = fig.at(a[1])
            return [(fig.line(a[2]).foot(p) * 2 - p,)]
        case "reflection_in_point":
            return [(fig.at(a[2]) * 2 - fig.at(a[1]),)]
        case "equilateral_apex":
            return [(x,) for x in apexes(*fig.run(a[1]))]
        case "equilateral_apex_sided":
            p, q = fig.run(a[1])
            left, right = apexes(p, q)
            side = side_of(fig, p, q, fig.at(a[3]), a[2])
            return [(_sided(side, left, right),)]
        case "square_corners":
            p, q = fig.run(a[2])
            up = (q - p).left()
            side = side_of(fig, p, q, fig.at(a[4]), a[3])
            return [(_sided(side, q + up, q - up), _sided(side, p + up, p - up))]
        case "centre":
            return [(fig.circle(a[1]).c,)]
        case "meet":
            return [(x,) for x in meets(fig, a[1], a[2])]
        case "meet_other":
            avoid = fig.at(a[3])
            return [(_unless_at(fig, x, avoid),) for x in meets(fig, a[1], a[2])]
        case "touch_point":
            q, r = fig.run(a[2])
            third = next(v for v in a[1] if v not in a[2])
            p = fig.at(third)
            along = (gap(q, r) + gap(q, p) - gap(r, p)) * 0.5
            return [(_solid(fig, q + (r - q).unit() * along, p, q, r),)]
        case "excentre":
            corners = _from(fig, a[1], a[2])
            return [(_solid(fig, excentre(*corners), *corners),)]
    p, q, r = fig.run(a[1])
    if fact.form == "centroid":
        k = 1 / number(Fraction(3), p.x)
        return [(p + (q - p + (r - p)) * k,)]
    if fact.form == "incentre":
        return [(_solid(fig, incentre(p, q, r), p, q, r),)]
    o = circumcentre(p, q, r)
    h = p + (q - o) + (r - o)
    centre = {"circumcentre": o, "orthocentre": h, "nine_point_centre": middle(o, h)}[fact.form]
    return [(_solid(fig, centre, p, q, r),)]


def meets(fig: Figure, one: Any, two: Any) -> Points:
    """The common points of two curves; a touching gives the same point twice."""
    if fig.is_line(one) and fig.is_line(two):
        m, n = fig.line(one), fig.line(two)
        parallel = ~(np.abs(cross(m.d, n.d)) > fig.tiny)
        return (_undefined(parallel, meet_lines(m, n)),)
    if fig.is_line(one):
        return meet_line_circle(fig.line(one), fig.circle(two))
    if fig.is_line(two):
        return meet_line_circle(fig.line(two), fig.circle(one))
    return meet_circles(fig.circle(one), fig.circle(two))


def apexes(p: Vec, q: Vec) -> tuple[Vec, Vec]:
    """The third corners of the equilateral triangles on pq, left and right of it."""
    up = (q - p).left() * (root(number(Fraction(3), p.x)) * 0.5)
    m = middle(p, q)
    flat = gap(p, q) == 0
    return _undefined(flat, m + up), _undefined(flat, m - up)


def side_of(fig: Figure, p: Vec, q: Vec, mark: Vec, word: str) -> Num:
    """1 for the left side of pq and -1 for the right, as the word and the mark say; 0 if undefined."""
    h = line_of(p, q).height(mark)
    side = np.where(np.abs(h) > fig.tiny * fig.size, sgn(h), 0)
    return side if word == "towards" else -side


def _sided(side: Num, left: Vec, right: Vec) -> Vec:
    return _undefined(side == 0, choose(side > 0, left, right))


def _undefined(mask: Num, p: Vec) -> Vec:
    return Vec(np.where(mask, NAN, p.x), np.where(mask, NAN, p.y))


def _unless_at(fig: Figure, p: Vec, avoid: Vec) -> Vec:
    near = 1e-20 if fig.digits else 1e-6  # a touching blurs to the root of the rounding error
    return _undefined(gap(p, avoid) <= near * fig.size, p)


def _solid(fig: Figure, p: Vec, a: Vec, b: Vec, c: Vec) -> Vec:
    """Undefined where the triangle is flat."""
    return _undefined(~(flatness(a, b, c) > fig.tiny * fig.size), p)


def flatness(a: Vec, b: Vec, c: Vec) -> Num:
    """The least height of a triangle, 0 for a flat one."""
    x, y, z = gap(b, c), gap(c, a), gap(a, b)
    longest = np.where(x > y, x, y)
    longest = np.where(longest > z, longest, z)
    return np.where(longest > 0, np.abs(cross(b - a, c - a)) / np.where(longest > 0, longest, 1), 0 * longest)
