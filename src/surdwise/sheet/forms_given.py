"""The forms that build a figure: points, shapes, constructions, curves."""

from __future__ import annotations

from .form import ANYWHERE, GIVEN, Form, Kind


def _shape(
    alias: str, example: str, meaning: str, run: str, pattern: str, corner: tuple[int, int] | None = None
) -> Form:
    args = (run, "point") if corner else (run,)
    return Form(alias, Kind.SHAPE, example, meaning, args, pattern, GIVEN, (0,), corner=corner)


def _made(
    alias: str,
    example: str,
    meaning: str,
    args: tuple[str, ...],
    pattern: str,
    corner: tuple[int, int] | None = None,
    kind: Kind = Kind.MADE,
) -> Form:
    return Form(
        alias, kind, example, meaning, ("point", *args), "{0} = " + pattern, GIVEN, (0,), True, "", corner
    )


def _curve(
    makes: str,
    alias: str,
    example: str,
    meaning: str,
    args: tuple[str, ...],
    pattern: str,
    corner: tuple[int, int] | None = None,
) -> Form:
    return Form(
        alias,
        Kind.CURVE,
        example,
        meaning,
        ("name", *args),
        "{0} = " + pattern,
        GIVEN,
        (0,),
        True,
        makes,
        corner,
    )


def _on(alias: str, example: str, meaning: str, args: tuple[str, ...], pattern: str) -> Form:
    under = ANYWHERE if alias in ("on_line", "on_segment", "on_ray", "on_circle") else GIVEN
    return Form(alias, Kind.POINT_ON, example, meaning, ("point", *args), "{0} " + pattern, under, (0,))


FREE = (
    Form(
        "points",
        Kind.FREE,
        "points A, B, C",
        "different points, otherwise anywhere; `point P` for one",
        ("points",),
        "points {0}",
        GIVEN,
        (0,),
        True,
    ),
    Form(
        "triangle",
        Kind.FREE,
        "triangle ABC",
        "three points not on one line",
        ("triple",),
        "triangle {0}",
        GIVEN,
        (0,),
    ),
    Form(
        "quadrilateral",
        Kind.FREE,
        "quadrilateral ABCD",
        "four points, no three on one line; concave and crossed ones are included",
        ("quad",),
        "quadrilateral {0}",
        GIVEN,
        (0,),
    ),
)

SHAPES = (
    _shape(
        "equilateral_triangle",
        "equilateral triangle ABC",
        "a triangle with three equal sides",
        "triple",
        "equilateral triangle {0}",
    ),
    _shape(
        "isosceles_triangle",
        "isosceles triangle ABC with apex A",
        "a triangle whose two sides at the apex are equal",
        "triple",
        "isosceles triangle {0} with apex {1}",
        (0, 1),
    ),
    _shape(
        "right_triangle",
        "right triangle ABC with right angle at C",
        "a triangle with a right angle at the named corner",
        "triple",
        "right triangle {0} with right angle at {1}",
        (0, 1),
    ),
    _shape(
        "square", "square ABCD", "four equal sides and right angles, corners in order", "quad", "square {0}"
    ),
    _shape("rectangle", "rectangle ABCD", "four right angles, corners in order", "quad", "rectangle {0}"),
    _shape(
        "parallelogram",
        "parallelogram ABCD",
        "AB parallel to DC and AD parallel to BC, not flat",
        "quad",
        "parallelogram {0}",
    ),
    _shape("rhombus", "rhombus ABCD", "a parallelogram with four equal sides", "quad", "rhombus {0}"),
    _shape("kite", "kite ABCD", "a convex quadrilateral with AB = AD and CB = CD", "quad", "kite {0}"),
    _shape(
        "trapezium",
        "trapezium ABCD",
        "a convex quadrilateral with AB parallel to CD",
        "quad",
        "trapezium {0}",
    ),
    _shape(
        "cyclic_quadrilateral",
        "cyclic quadrilateral ABCD",
        "four points of one circle, in that order round it",
        "quad",
        "cyclic quadrilateral {0}",
    ),
    _shape(
        "tangential_quadrilateral",
        "tangential quadrilateral ABCD",
        "a convex quadrilateral with an inscribed circle",
        "quad",
        "tangential quadrilateral {0}",
    ),
    _shape(
        "regular_pentagon",
        "regular pentagon ABCDE",
        "five equal sides and angles, convex",
        "quint",
        "regular pentagon {0}",
    ),
    _shape(
        "regular_hexagon",
        "regular hexagon ABCDEF",
        "six equal sides and angles, convex",
        "hexa",
        "regular hexagon {0}",
    ),
)

POINTS_ON = (
    _on("on_line", "P on line AB", "anywhere on the whole line", ("line",), "on line {1}"),
    _on("on_segment", "P on segment AB", "between A and B, the ends included", ("pair",), "on segment {1}"),
    _on("on_ray", "P on ray AB", "on the half-line from A through B, A included", ("pair",), "on ray {1}"),
    _on("on_circle", "P on circle ABC", "anywhere on the circle", ("circle",), "on circle {1}"),
    _on(
        "on_perpendicular_bisector",
        "P on perpendicular bisector of AB",
        "equally far from A and B",
        ("pair",),
        "on perpendicular bisector of {1}",
    ),
    _on(
        "on_angle_bisector",
        "P on bisector of angle BAC",
        "on the half-line from A that halves the angle from inside, A included",
        ("triple",),
        "on bisector of angle {1}",
    ),
    _on(
        "inside_triangle",
        "P inside triangle ABC",
        "strictly inside",
        ("triple",),
        "inside triangle {1}",
    ),
)

MADE = (
    _made("midpoint", "M = midpoint of AB", "the middle of the segment", ("pair",), "midpoint of {1}"),
    _made(
        "foot",
        "D = foot of A on BC",
        "where the perpendicular from A meets the whole line BC",
        ("place", "line"),
        "foot of {1} on {2}",
    ),
    _made(
        "foot_of_bisector",
        "D = foot of bisector of angle BAC on BC",
        "where the inner bisector at A meets BC",
        ("triple", "pair"),
        "foot of bisector of angle {1} on {2}",
    ),
    _made(
        "reflection_in_line",
        "A' = reflection of A in BC",
        "the mirror image in a line",
        ("place", "line"),
        "reflection of {1} in {2}",
    ),
    _made(
        "reflection_in_point",
        "A' = reflection of A in M",
        "the image under the half-turn about M",
        ("place", "place"),
        "reflection of {1} in {2}",
    ),
    _made("centroid", "G = centroid of ABC", "where the medians meet", ("triple",), "centroid of {1}"),
    _made(
        "circumcentre",
        "O = circumcentre of ABC",
        "the centre of the circle through the corners",
        ("triple",),
        "circumcentre of {1}",
    ),
    _made(
        "orthocentre", "H = orthocentre of ABC", "where the altitudes meet", ("triple",), "orthocentre of {1}"
    ),
    _made(
        "incentre",
        "I = incentre of ABC",
        "the centre of the inscribed circle",
        ("triple",),
        "incentre of {1}",
    ),
    _made(
        "excentre",
        "J = excentre of ABC opposite A",
        "the centre of the escribed circle beyond BC",
        ("triple", "point"),
        "excentre of {1} opposite {2}",
        (1, 2),
    ),
    _made(
        "nine_point_centre",
        "N = nine-point centre of ABC",
        "the centre of the circle through the midpoints of the sides",
        ("triple",),
        "nine-point centre of {1}",
    ),
    _made(
        "touch_point",
        "T = touch point of incircle of ABC on BC",
        "where the inscribed circle touches the side BC",
        ("triple", "pair"),
        "touch point of incircle of {1} on {2}",
        (1, 2),
    ),
    _made(
        "equilateral_apex",
        "D = apex of equilateral triangle on BC",
        "the third corner of an equilateral triangle, on either side of BC",
        ("pair",),
        "apex of equilateral triangle on {1}",
    ),
    _made(
        "equilateral_apex_sided",
        "D = apex of equilateral triangle on BC away from A",
        "the same on the side of BC away from A (or `towards A`)",
        ("pair", "side", "point"),
        "apex of equilateral triangle on {1} {2} {3}",
    ),
    Form(
        "square_corners",
        Kind.MADE,
        "D, E = corners of square on BC away from A",
        "the corners of the square B, C, D, E, on the side of BC away from A (or `towards A`)",
        ("point", "point", "pair", "side", "point"),
        "{0}, {1} = corners of square on {2} {3} {4}",
        GIVEN,
        (0, 1),
        True,
    ),
    _made("centre", "O = centre of k", "the centre of a circle", ("circle",), "centre of {1}"),
)

MEETS = (
    _made(
        "meet",
        "X = meet of AB and CD",
        "a common point of two lines, a line and a circle, or two circles (either one, if there are two)",
        ("curve", "curve"),
        "meet of {1} and {2}",
        kind=Kind.MEET,
    ),
    _made(
        "meet_other",
        "X = meet of AB and k other than A",
        "the common point that is not A; one of the two is a circle",
        ("curve", "curve", "point"),
        "meet of {1} and {2} other than {3}",
        kind=Kind.MEET,
    ),
)

CURVES = (
    _curve("circle", "circle_through", "k = circle ABC", "through three points", ("triple",), "circle {1}"),
    _curve(
        "circle",
        "circle_centre_through",
        "k = circle with centre O through A",
        "about O, through A",
        ("place", "point"),
        "circle with centre {1} through {2}",
    ),
    _curve(
        "circle",
        "circle_diameter",
        "k = circle with diameter AB",
        "with the segment AB as a diameter",
        ("pair",),
        "circle with diameter {1}",
    ),
    _curve(
        "circle",
        "circle_centre_radius",
        "k = circle with centre O and radius 2",
        "about O, with a radius given as a quantity",
        ("place", "quantity"),
        "circle with centre {1} and radius {2}",
    ),
    _curve(
        "circle",
        "incircle",
        "k = incircle of ABC",
        "the circle inside that touches the three sides",
        ("triple",),
        "incircle of {1}",
    ),
    _curve(
        "circle",
        "excircle",
        "k = excircle of ABC opposite A",
        "the circle beyond BC that touches the three side lines",
        ("triple", "point"),
        "excircle of {1} opposite {2}",
        (1, 2),
    ),
    _curve("line", "line_through", "l = line AB", "through two points", ("pair",), "line {1}"),
    _curve(
        "line",
        "parallel",
        "l = parallel to AB through C",
        "the line through C in the direction of AB",
        ("line", "place"),
        "parallel to {1} through {2}",
    ),
    _curve(
        "line",
        "perpendicular",
        "l = perpendicular to AB through C",
        "the line through C at right angles to AB",
        ("line", "place"),
        "perpendicular to {1} through {2}",
    ),
    _curve(
        "line",
        "tangent",
        "l = tangent to k at A",
        "the tangent of the circle at its point A",
        ("circle", "point"),
        "tangent to {1} at {2}",
    ),
    _curve(
        "line",
        "perpendicular_bisector",
        "l = perpendicular bisector of AB",
        "the line of the points equally far from A and B",
        ("pair",),
        "perpendicular bisector of {1}",
    ),
    _curve(
        "line",
        "angle_bisector",
        "l = bisector of angle BAC",
        "the whole line that halves the angle at A from inside",
        ("triple",),
        "bisector of angle {1}",
    ),
)

GIVEN_FORMS = FREE + SHAPES + POINTS_ON + MADE + MEETS + CURVES
