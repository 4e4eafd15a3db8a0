"""What there is to draw of a figure, in the figure's own coordinates.

The given lines say which segments, lines and circles stand in the drawing; the claim says which
lengths are emphasised: its left side in one ink, its right side in another.
"""

from __future__ import annotations

import itertools
import math
from collections.abc import Callable, Sequence
from contextlib import suppress
from dataclasses import dataclass, field
from typing import Any

from ..sheet.tree import (
    And,
    Binary,
    Comparison,
    Condition,
    Fact,
    Line,
    Measure,
    Not,
    Or,
    Pt,
    Quantity,
    Relation,
    Through,
    Unary,
)
from ..sheet.tree import Curve as CurveRef
from .picture import XY, Ink
from .plane import MISSING, Plane

CLAIMED = (Ink.LEFT, Ink.RIGHT)


@dataclass
class Draft:
    """Strokes of a figure before they are fitted to a page."""

    plane: Plane
    points: dict[str, XY]
    segments: dict[tuple[XY, XY, Ink], None] = field(default_factory=dict)
    lines: list[tuple[XY, XY, Ink, str]] = field(default_factory=list)
    rays: list[tuple[XY, XY, Ink]] = field(default_factory=list)
    rings: list[tuple[XY, float, Ink, str]] = field(default_factory=list)
    squares: list[tuple[XY, XY, XY]] = field(default_factory=list)
    angles: list[tuple[XY, XY, XY, Ink]] = field(default_factory=list)
    areas: list[tuple[tuple[XY, ...], Ink]] = field(default_factory=list)

    def segment(self, a: XY, b: XY, ink: Ink) -> None:
        """A segment, once."""
        if math.dist(a, b) > 1e-12:
            self.segments.setdefault((min(a, b), max(a, b), ink))

    def ring(self, centre: XY, radius: float, ink: Ink, name: str = "") -> None:
        """A circle, once; a name given later is kept."""
        if radius < 1e-12:
            return
        for i, (c, r, k, n) in enumerate(self.rings):
            if (
                math.dist(c, centre) < 1e-9 * radius
                and abs(r - radius) < 1e-9 * radius
                and (k == ink or ink == Ink.HELPER)
            ):
                self.rings[i] = (c, r, k, n or name)
                return
        self.rings.append((centre, radius, ink, name))

    def line(self, at: XY, way: XY, ink: Ink, name: str = "") -> None:
        """A whole line, once."""
        for i, (p, d, k, n) in enumerate(self.lines):
            off = abs(d[0] * (at[1] - p[1]) - d[1] * (at[0] - p[0])) / math.hypot(*d)
            turn = abs(d[0] * way[1] - d[1] * way[0]) / (math.hypot(*d) * math.hypot(*way))
            if off < 1e-9 and turn < 1e-9:
                self.lines[i] = (p, d, Ink.GIVEN if Ink.GIVEN in (k, ink) else k, n or name)
                return
        self.lines.append((at, way, ink, name))

    def square(self, at: XY, a: XY, b: XY) -> None:
        """The mark of a right angle at a corner between the ways to a and b."""
        if math.dist(at, a) > 1e-9 and math.dist(at, b) > 1e-9:
            self.squares.append((at, a, b))


def draft(given: Sequence[Line], points: dict[str, XY], claim: Condition | None) -> Draft:
    """Everything to draw; lines of the sheet that speak of points without a place are left out."""
    plane = Plane(points, given)
    out = Draft(plane, dict(points))
    for line in given:
        with suppress(*MISSING):
            if isinstance(line.body, Fact):
                fn = GIVEN.get(line.body.form)
                if fn is not None:
                    fn(out, *line.body.args)
            else:
                _condition(out, line.body, (Ink.GIVEN, Ink.GIVEN))
    if claim is not None:
        _condition(out, claim, CLAIMED)
    return out


# ---------------------------------------------------------------- given lines


def _polygon(d: Draft, names: tuple[Pt, ...], *rest: Any) -> None:
    spots = [d.plane.spot(p) for p in names]
    for a, b in itertools.pairwise([*spots, spots[0]]):
        d.segment(a, b, Ink.GIVEN)


def _pair(d: Draft, pair: tuple[Pt, ...], ink: Ink) -> None:
    d.segment(d.plane.spot(pair[0]), d.plane.spot(pair[1]), ink)


def _curve(d: Draft, ref: CurveRef, ink: Ink = Ink.GIVEN, name: str = "") -> None:
    if d.plane.is_circle(ref):
        d.ring(*d.plane.ring(ref), ink, name)
        return
    if isinstance(ref, Through):
        _pair(d, ref.points, ink)
        d.line(*d.plane.straight(ref), Ink.PRODUCED, name)
    else:
        d.line(*d.plane.straight(ref), ink, name)


def _reach(d: Draft, at: XY, ref: CurveRef) -> None:
    """The line that `at` lies on, as far as it takes."""
    if not isinstance(ref, Through):
        return
    a, b = (d.plane.spot(p) for p in ref.points)
    if (at[0] - a[0]) * (at[0] - b[0]) + (at[1] - a[1]) * (at[1] - b[1]) > 1e-12:
        d.segment(at, min((a, b), key=lambda p: math.dist(p, at)), Ink.PRODUCED)
    d.segment(a, b, Ink.GIVEN)


def _foot(d: Draft, made: Pt, p: Any, ref: CurveRef) -> None:
    f, top = d.plane.spot(made), d.plane.spot(p)
    d.segment(f, top, Ink.HELPER)
    _reach(d, f, ref)
    d.square(f, top, _along(d, f, ref))


def _along(d: Draft, at: XY, ref: CurveRef) -> XY:
    """A point of a line away from `at`."""
    way = d.plane.straight(ref)[1]
    if isinstance(ref, Through):
        ends = [d.plane.spot(x) for x in ref.points]
        far = max(ends, key=lambda e: math.dist(e, at))
        if math.dist(far, at) > 1e-9:
            return far
    return at[0] + way[0], at[1] + way[1]


def _bisector_foot(d: Draft, made: Pt, triple: tuple[Pt, ...], pair: tuple[Pt, ...]) -> None:
    d.segment(d.plane.spot(triple[1]), d.plane.spot(made), Ink.HELPER)
    _pair(d, pair, Ink.GIVEN)


def _mirror(d: Draft, made: Pt, p: Any, ref: Any) -> None:
    a, b = d.plane.spot(p), d.plane.spot(made)
    d.segment(a, b, Ink.HELPER)
    if isinstance(ref, Pt):
        return
    middle = ((a[0] + b[0]) / 2, (a[1] + b[1]) / 2)
    _reach(d, middle, ref)
    d.square(middle, a, _along(d, middle, ref))


def _circle_of(form: str) -> Callable[..., None]:
    return lambda d, made, *args: d.ring(*d.plane.curve(form, *args), Ink.HELPER)


def _apex(d: Draft, made: Pt, pair: tuple[Pt, ...], *rest: Any) -> None:
    _polygon(d, (*pair, made))


def _square_corners(d: Draft, p: Pt, q: Pt, pair: tuple[Pt, ...], *rest: Any) -> None:
    _polygon(d, (*pair, p, q))


def _meet(d: Draft, made: Pt, one: CurveRef, two: CurveRef, *rest: Any) -> None:
    for ref in (one, two):
        if isinstance(ref, Through) and len(ref.points) == 2:
            _reach(d, d.plane.spot(made), ref)
        else:
            _curve(d, ref)


def _ray(d: Draft, p: Pt, pair: tuple[Pt, ...]) -> None:
    a, b = (d.plane.spot(x) for x in pair)
    d.segment(a, b, Ink.GIVEN)
    d.rays.append((a, (b[0] - a[0], b[1] - a[1]), Ink.PRODUCED))


def _angle_ray(d: Draft, p: Pt, triple: tuple[Pt, ...]) -> None:
    b, a, c = (d.plane.spot(x) for x in triple)
    d.segment(a, b, Ink.GIVEN)
    d.segment(a, c, Ink.GIVEN)
    u, v = _unit(a, b), _unit(a, c)
    d.rays.append((a, (u[0] + v[0], u[1] + v[1]), Ink.HELPER))


def _unit(a: XY, b: XY) -> XY:
    n = math.dist(a, b) or 1.0
    return (b[0] - a[0]) / n, (b[1] - a[1]) / n


def _upright(d: Draft, p: Pt, pair: tuple[Pt, ...]) -> None:
    a, b = (d.plane.spot(x) for x in pair)
    d.segment(a, b, Ink.GIVEN)
    d.line(((a[0] + b[0]) / 2, (a[1] + b[1]) / 2), (a[1] - b[1], b[0] - a[0]), Ink.HELPER)


def _named(d: Draft, name: Any, *args: Any) -> None:
    _curve(d, name, Ink.GIVEN, name.name)


_SHAPES = (
    "triangle quadrilateral equilateral_triangle isosceles_triangle right_triangle square rectangle "
    "parallelogram rhombus kite trapezium cyclic_quadrilateral tangential_quadrilateral "
    "regular_pentagon regular_hexagon"
)
_CURVES = (
    "circle_through circle_centre_through circle_diameter circle_centre_radius incircle excircle "
    "line_through parallel perpendicular tangent perpendicular_bisector angle_bisector"
)
GIVEN: dict[str, Callable[..., None]] = {
    **dict.fromkeys(_SHAPES.split(), _polygon),
    **dict.fromkeys(_CURVES.split(), _named),
    "on_line": lambda d, p, ref: _curve(d, ref),
    "on_segment": lambda d, p, pair: _pair(d, pair, Ink.GIVEN),
    "on_ray": _ray,
    "on_circle": lambda d, p, ref: _curve(d, ref),
    "on_perpendicular_bisector": _upright,
    "on_angle_bisector": _angle_ray,
    "inside_triangle": lambda d, p, tri: _polygon(d, tri),
    "midpoint": lambda d, m, pair: _pair(d, pair, Ink.GIVEN),
    "foot": _foot,
    "foot_of_bisector": _bisector_foot,
    "reflection_in_line": _mirror,
    "reflection_in_point": _mirror,
    "circumcentre": _circle_of("circle_through"),
    "incentre": _circle_of("incircle"),
    "excentre": _circle_of("excircle"),
    "touch_point": lambda d, t, tri, pair: d.ring(*d.plane.curve("incircle", tri), Ink.HELPER),
    "equilateral_apex": _apex,
    "equilateral_apex_sided": _apex,
    "square_corners": _square_corners,
    "meet": _meet,
    "meet_other": _meet,
}


# ---------------------------------------------------------------- the claim


def _condition(d: Draft, c: Condition, inks: tuple[Ink, Ink]) -> None:
    if isinstance(c, Not):
        _condition(d, c.arg, inks)
    elif isinstance(c, (And, Or)):
        for x in c.args:
            _condition(d, x, inks)
    elif isinstance(c, Comparison):
        for i, q in enumerate(c.items):
            _quantity(d, q, inks[i % 2])
    else:
        _relation(d, c, inks)


def _relation(d: Draft, c: Relation, inks: tuple[Ink, Ink]) -> None:
    if c.form in ("parallel_lines", "perpendicular_lines"):
        for ref, ink in zip(c.args, inks, strict=True):
            if isinstance(ref, Through):
                _pair(d, ref.points, ink)
            else:
                d.line(*d.plane.straight(ref), ink)  # type: ignore[arg-type]
    elif c.form in ("concyclic", "collinear"):
        names: tuple[Pt, ...] = c.args[0]  # type: ignore[assignment]
        spots = [d.plane.spot(p) for p in names]
        if c.form == "concyclic":
            d.ring(*d.plane.ring(Through(names[:3])), inks[0])
            return
        a, b = max(itertools.combinations(spots, 2), key=lambda ab: math.dist(*ab))
        d.segment(a, b, inks[0])
    elif c.form in ("on_line", "on_circle"):
        _curve(d, c.args[1], inks[0])  # type: ignore[arg-type]
    elif c.form in ("on_segment", "on_ray"):
        _pair(d, c.args[1], inks[0])  # type: ignore[arg-type]
    elif c.form == "between":
        _pair(d, (c.args[1], c.args[2]), inks[0])  # type: ignore[arg-type]
    elif c.form == "angle_size":
        _angle(d, c.args[0], inks[0])


def _quantity(d: Draft, q: Quantity, ink: Ink) -> None:
    if isinstance(q, Unary):
        _quantity(d, q.arg, ink)
    elif isinstance(q, Binary):
        _quantity(d, q.left, ink)
        _quantity(d, q.right, ink)
    elif isinstance(q, Measure):
        with suppress(*MISSING):
            MEASURED[q.kind](d, q, ink)


def _length(d: Draft, q: Measure, ink: Ink) -> None:
    d.segment(d.plane.spot(q.points[0]), d.plane.spot(q.points[1]), ink)


def _to_line(d: Draft, p: XY, ref: CurveRef, ink: Ink) -> None:
    at, way = d.plane.straight(ref)
    t = ((p[0] - at[0]) * way[0] + (p[1] - at[1]) * way[1]) / (way[0] ** 2 + way[1] ** 2)
    foot = (at[0] + t * way[0], at[1] + t * way[1])
    d.segment(p, foot, ink)
    _reach(d, foot, ref)
    d.square(foot, p, _along(d, foot, ref))


def _dist(d: Draft, q: Measure, ink: Ink) -> None:
    assert q.line is not None
    _to_line(d, d.plane.spot(q.points[0]), q.line, ink)


def _area(d: Draft, q: Measure, ink: Ink) -> None:
    d.areas.append((tuple(d.plane.spot(p) for p in q.points), ink))


def _perimeter(d: Draft, q: Measure, ink: Ink) -> None:
    spots = [d.plane.spot(p) for p in q.points]
    for a, b in itertools.pairwise([*spots, spots[0]]):
        d.segment(a, b, ink)


def _circumradius(d: Draft, q: Measure, ink: Ink) -> None:
    tri: Any = q.points[:3]
    o, r = d.plane.ring(Through(tri))
    d.ring(o, r, Ink.HELPER)
    d.segment(o, d.plane.spot(tri[0]), ink)


def _touching_radius(d: Draft, q: Measure, ink: Ink) -> None:
    tri: Any = q.points[:3]
    if q.kind == "inradius":
        o, r = d.plane.curve("incircle", tri)
        side = tri[:2]
    else:
        o, r = d.plane.curve("excircle", tri, q.points[3])
        side = tuple(p for p in tri if p != q.points[3])
    d.ring(o, r, Ink.HELPER)
    _to_line(d, o, Through(side), ink)


def _corner(q: Measure) -> tuple[Pt, tuple[Pt, Pt]]:
    top: Any = q.points[3]
    b, c = (p for p in q.points[:3] if p != top)
    return top, (b, c)  # type: ignore[return-value]


def _median(d: Draft, q: Measure, ink: Ink) -> None:
    top, (b, c) = _corner(q)
    d.segment(d.plane.spot(top), d.plane.made("midpoint", (b, c)), ink)


def _altitude(d: Draft, q: Measure, ink: Ink) -> None:
    top, side = _corner(q)
    _to_line(d, d.plane.spot(top), Through(side), ink)


def _bisector(d: Draft, q: Measure, ink: Ink) -> None:
    top, (b, c) = _corner(q)
    d.segment(d.plane.spot(top), d.plane.made("foot_of_bisector", (b, top, c), (b, c)), ink)


def _angle(d: Draft, triple: Any, ink: Ink) -> None:
    b, a, c = (d.plane.spot(p) for p in triple)
    for arm in (b, c):
        d.segment(a, arm, Ink.HELPER)
    d.angles.append((a, b, c, ink))


MEASURED: dict[str, Callable[[Draft, Measure, Ink], None]] = {
    "length": _length,
    "dist": _dist,
    "area": _area,
    "perimeter": _perimeter,
    "circumradius": _circumradius,
    "inradius": _touching_radius,
    "exradius": _touching_radius,
    "median": _median,
    "altitude": _altitude,
    "bisector": _bisector,
    "cos": lambda d, q, ink: _angle(d, q.points, ink),
    "sin": lambda d, q, ink: _angle(d, q.points, ink),
}
