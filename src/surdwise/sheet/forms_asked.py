"""The forms that state something: relations, conditions, quantities, the thesis."""

from __future__ import annotations

from .form import ANYWHERE, ASKED, Form, Kind


def _condition(
    alias: str,
    example: str,
    meaning: str,
    args: tuple[str, ...],
    pattern: str,
    corner: tuple[int, int] | None = None,
) -> Form:
    return Form(alias, Kind.CONDITION, example, meaning, args, pattern, ASKED, corner=corner)


def _relation(alias: str, example: str, meaning: str, args: tuple[str, ...], pattern: str) -> Form:
    return Form(alias, Kind.RELATION, example, meaning, args, pattern, ANYWHERE)


def _quantity(
    alias: str,
    example: str,
    meaning: str,
    args: tuple[str, ...],
    pattern: str,
    corner: tuple[int, int] | None = None,
) -> Form:
    return Form(alias, Kind.QUANTITY, example, meaning, args, pattern, corner=corner)


def _reference(alias: str, example: str, meaning: str, args: tuple[str, ...], pattern: str) -> Form:
    return Form(alias, Kind.REFERENCE, example, meaning, args, pattern)


RELATIONS = (
    _relation("collinear", "A, B, C collinear", "on one line", ("points",), "{0} collinear"),
    _relation(
        "concyclic", "A, B, C, D concyclic", "on one circle, in any order", ("points",), "{0} concyclic"
    ),
    _relation(
        "parallel_lines",
        "AB parallel to CD",
        "the lines have one direction",
        ("line", "line"),
        "{0} parallel to {1}",
    ),
    _relation(
        "perpendicular_lines",
        "AB perpendicular to CD",
        "the lines are at right angles",
        ("line", "line"),
        "{0} perpendicular to {1}",
    ),
    _relation(
        "equation",
        "|DE| = |BC|/3",
        "the two quantities are equal",
        ("quantity", "quantity"),
        "{0} = {1}",
    ),
)

CONDITIONS = (
    _condition(
        "between",
        "C between A and B",
        "on the segment AB, the ends excluded",
        ("point", "point", "point"),
        "{0} between {1} and {2}",
    ),
    _condition(
        "inside", "P inside ABC", "strictly inside the triangle", ("point", "triple"), "{0} inside {1}"
    ),
    _condition(
        "outside", "P outside ABC", "strictly outside the triangle", ("point", "triple"), "{0} outside {1}"
    ),
    _condition(
        "same_side",
        "P and Q on the same side of AB",
        "neither is on the line, and it does not part them",
        ("point", "point", "line"),
        "{0} and {1} on the same side of {2}",
    ),
    _condition(
        "opposite_sides",
        "P and Q on opposite sides of AB",
        "neither is on the line, and it parts them",
        ("point", "point", "line"),
        "{0} and {1} on opposite sides of {2}",
    ),
    _condition(
        "angle_size",
        "angle BAC acute",
        "the angle at A is less than a right angle (or `right`, `obtuse`)",
        ("triple", "size"),
        "angle {0} {1}",
    ),
    _condition(
        "triangle_size",
        "ABC acute",
        "all three angles are acute (or one is `right`, `obtuse`)",
        ("triple", "size"),
        "{0} {1}",
    ),
    _condition("convex", "ABCD convex", "a convex quadrilateral, corners in order", ("quad",), "{0} convex"),
    _condition("distinct", "A, B distinct", "no two of the points coincide", ("points",), "{0} distinct"),
    _condition("is_equilateral", "ABC equilateral", "three equal sides", ("triple",), "{0} equilateral"),
    _condition(
        "is_isosceles",
        "ABC isosceles with apex A",
        "the two sides at the apex are equal",
        ("triple", "point"),
        "{0} isosceles with apex {1}",
        (0, 1),
    ),
    _condition("not_", "not C between A and B", "the condition does not hold", ("condition",), "not {0}"),
    _condition(
        "and_",
        "ABC acute and |AB| < |AC|",
        "all of them hold; binds closer than `or`",
        ("condition", "condition"),
        "{0} and {1}",
    ),
    _condition(
        "or_",
        "ABC acute or ABC right",
        "at least one of them holds",
        ("condition", "condition"),
        "{0} or {1}",
    ),
)

QUANTITIES = (
    _quantity("length", "|AB|", "the distance of two points, never negative", ("pair",), "|{0}|"),
    _quantity(
        "dist", "dist(P, BC)", "the distance of a point to a whole line", ("place", "line"), "dist({0}, {1})"
    ),
    _quantity(
        "area",
        "area(ABC)",
        "the area of a triangle or quadrilateral, never negative",
        ("triple",),
        "area({0})",
    ),
    _quantity(
        "perimeter",
        "perimeter(ABC)",
        "the sum of the sides, for three to six corners in order",
        ("triple",),
        "perimeter({0})",
    ),
    _quantity(
        "circumradius", "circumradius(ABC)", "the radius of the circle ABC", ("triple",), "circumradius({0})"
    ),
    _quantity(
        "inradius", "inradius(ABC)", "the radius of the inscribed circle", ("triple",), "inradius({0})"
    ),
    _quantity(
        "exradius",
        "exradius(ABC, A)",
        "the radius of the escribed circle opposite A",
        ("triple", "point"),
        "exradius({0}, {1})",
        (0, 1),
    ),
    _quantity(
        "median",
        "median(ABC, A)",
        "from A to the middle of the opposite side",
        ("triple", "point"),
        "median({0}, {1})",
        (0, 1),
    ),
    _quantity(
        "altitude",
        "altitude(ABC, A)",
        "from A to the line of the opposite side",
        ("triple", "point"),
        "altitude({0}, {1})",
        (0, 1),
    ),
    _quantity(
        "bisector",
        "bisector(ABC, A)",
        "along the inner bisector from A to the opposite side",
        ("triple", "point"),
        "bisector({0}, {1})",
        (0, 1),
    ),
    _quantity("cos", "cos(BAC)", "the cosine of the angle at A", ("triple",), "cos({0})"),
    _quantity("sin", "sin(BAC)", "the sine of the angle at A", ("triple",), "sin({0})"),
    _quantity("number", "3/4", "an integer, fraction or decimal, read exactly", (), ""),
    _quantity("sqrt", "sqrt(3)", "the square root, never negative", ("quantity",), "sqrt({0})"),
    _quantity("abs", "abs(|AB| - |CD|)", "the absolute value", ("quantity",), "abs({0})"),
    _quantity("add", "|AB| + |CD|", "sum", ("quantity", "quantity"), "{0} + {1}"),
    _quantity("sub", "|AB| - |CD|", "difference", ("quantity", "quantity"), "{0} - {1}"),
    _quantity(
        "mul",
        "2|AB|*|CD|",
        "product; a number may stand before a quantity without a sign",
        ("quantity", "quantity"),
        "{0}*{1}",
    ),
    _quantity("div", "|AB|/|CD|", "quotient", ("quantity", "quantity"), "{0}/{1}"),
    _quantity("pow", "|AB|^2", "power with a whole number as exponent", ("quantity", "quantity"), "{0}^{1}"),
    _quantity("neg", "-|AB|", "the opposite", ("quantity",), "-{0}"),
)

THESIS = (
    Form(
        "comparison",
        Kind.THESIS,
        "|AB| < |BC| <= |CA|",
        "two or more quantities joined by = < <= > >=; a chain holds when every link does",
        ("quantity", "quantity"),
        "{0} = {1}",
        ASKED,
    ),
)

REFERENCES = (
    _reference("point", "A", "a capital, with digits (B2) or primes (B') if need be", ("point",), "{0}"),
    _reference(
        "through", "AB", "a run of points: the line through two, the circle through three", ("pair",), "{0}"
    ),
    _reference("named", "k", "a line or circle by its name, a word in lower case", ("name",), "{0}"),
    _reference(
        "centre_of",
        "centre of k",
        "the centre of a circle, where a point may stand in a construction",
        ("circle",),
        "centre of {0}",
    ),
)

ASKED_FORMS = RELATIONS + CONDITIONS + QUANTITIES + THESIS + REFERENCES
