"""Statements that parse but cannot be meant: one check a mistake.

Each looks at one statement alone; names.py compares the statements of a sheet.
"""

from __future__ import annotations

from collections.abc import Sequence

from .errors import Problem
from .forms import FORMS
from .tree import Condition, Fact, Measure, Number, Pt, Relation, Span, Through, Unary
from .walk import parts

FEWEST = {"collinear": 3, "concyclic": 4, "distinct": 2}
_COUNTS = {2: "two", 3: "three", 4: "four", 5: "five", 6: "six"}
_CORNERED = ("exradius", "median", "altitude", "bisector")


def check(body: Fact | Condition) -> None:
    """Raise a Problem at the first part that cannot be meant."""
    for part in parts(body):
        match part:
            case Fact() | Relation():
                _check_form(part)
            case Measure():
                _check_measure(part)
            case Through():
                _check_run(part.points)
            case Unary("sqrt", Number() as number) if number.value < 0:
                raise Problem(number.span, "expected a number that is not negative under a square root")
            case _:
                pass


def extent(points: Sequence[Pt]) -> Span:
    """From the first point to the last."""
    first, last = points[0].span, points[-1].span
    return Span(first.line, first.column, last.end)


def names(points: Sequence[Pt]) -> str:
    """The points as one run."""
    return "".join(point.name for point in points)


def _check_form(part: Fact | Relation) -> None:
    form = FORMS[part.form]
    for role, arg in zip(form.args, part.args, strict=True):
        if isinstance(arg, tuple):
            if role == "points":
                _check_list(part.form, arg)
            else:
                _check_run(arg)
    if form.corner is not None:
        triangle, corner = (part.args[i] for i in form.corner)
        if isinstance(triangle, tuple):
            for point in corner if isinstance(corner, tuple) else (corner,):
                if isinstance(point, Pt):
                    _check_corner(triangle, point)
    match part.form, part.args:
        case ("equilateral_apex_sided", (_, tuple() as pair, str(), Pt() as point)):
            _check_off_line(pair, point)
        case ("square_corners", (Pt() as first, Pt() as second, tuple() as pair, str(), Pt() as point)):
            if first == second:
                raise Problem(second.span, f"expected two different corners, got {second.name} twice")
            _check_off_line(pair, point)
        case (("same_side" | "opposite_sides"), (Pt() as first, Pt() as second, line)):
            if first == second:
                raise Problem(second.span, f"expected two different points, got {second.name} twice")
            if isinstance(line, Through):
                _check_off_line(line.points, first)
                _check_off_line(line.points, second)
        case ("between", (Pt() as middle, Pt() as first, Pt() as second)):
            _check_run((middle, first, second))
        case (("inside" | "outside" | "inside_triangle"), (Pt() as point, tuple() as triangle)):
            if point in triangle:
                message = f"expected a point other than the corners of {names(triangle)}, got {point.name}"
                raise Problem(point.span, message)
        case (("meet" | "meet_other"), (_, Through() as one, Through() as other, *_)):
            if set(one.points) == set(other.points):
                raise Problem(other.span, f"expected two different curves, got {names(other.points)} twice")
        case ("circle_centre_radius", (_, _, Number() as radius)):
            if radius.value <= 0:
                raise Problem(radius.span, f"expected a positive radius, got {radius.value}")
        case _:
            pass


def _check_measure(part: Measure) -> None:
    points = [point for point in part.points if isinstance(point, Pt)]
    if part.kind in _CORNERED:
        _check_run(points[:-1])
        _check_corner(points[:-1], points[-1])
    elif part.kind == "length" and points[0] == points[1]:
        message = f"expected two different points, got the distance of {points[0].name} to itself"
        raise Problem(extent(points), message)
    else:
        _check_run(points)


def _check_run(points: Sequence[Pt]) -> None:
    seen: set[str] = set()
    for point in points:
        if point.name in seen:
            count = _COUNTS.get(len(points), str(len(points)))
            raise Problem(point.span, f"expected {count} different points, got {point.name} twice")
        seen.add(point.name)


def _check_list(form: str, points: Sequence[Pt]) -> None:
    fewest = FEWEST.get(form, 1)
    if len(points) < fewest:
        count = _COUNTS.get(len(points), "one")
        raise Problem(
            extent(points), f"expected at least {_COUNTS[fewest]} points that are {form}, got {count}"
        )
    _check_run(points)


def _check_corner(triangle: Sequence[Pt], point: Pt) -> None:
    if point not in triangle:
        known = [corner.name for corner in triangle]
        message = f"expected a corner of {names(triangle)}, got {point.name}"
        raise Problem(point.span, message, f"write {', '.join(known[:-1])} or {known[-1]}")


def _check_off_line(line: Sequence[Pt], point: Pt) -> None:
    if point in line:
        message = f"expected a point off the line {names(line)}, got {point.name}, which is on it"
        raise Problem(point.span, message)
