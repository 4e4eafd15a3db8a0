"""Mistakes people make, as examples that teach the reader what to say.

An example is read up to the word where it goes wrong; the place in the grammar that it
has reached, with that word, is what the lesson is about.  Any other sheet that goes wrong
at the same place in the same way gets the same advice.
"""

from __future__ import annotations

from dataclasses import dataclass

_FUNCTION_EXAMPLES = ("sqrt(3)", "abs(1)", "dist(A, BC)", "area(ABC)", "cos(BAC)", "median(ABC, A)", "(1)")


@dataclass(frozen=True)
class Lesson:
    """Advice for what goes wrong in the examples (each under the keyword).

    Where `look` is given, it is a pattern that the text must match from the wrong word on;
    `behind` is one that the word before it must match.  A loose lesson is about what may come
    next, not about the word that came last.
    """

    keyword: str
    examples: tuple[str, ...]
    advice: str
    look: str = ""
    behind: str = ""
    loose: bool = False


@dataclass(frozen=True)
class Place:
    """What is expected behind the beginning of a statement, where a list would be too long."""

    keyword: str
    beginning: str
    expected: str


_BARS = "a length is written between bars: |AB|"
_SIGN = "write * between two factors (a number may stand before a quantity, as in 2|AB|)"
_TWO_READINGS = "|AB|/2|CD| can be read in two ways: write (|AB|/2)*|CD| or |AB|/(2|CD|)"
_TOGETHER = "write the points of one figure together, without spaces or commas: ABC"
_COMMAS = "separate the points by commas: A, B, C"
_NAME_IT = "name the curve first, as in `k = incircle of ABC`, then write `P on circle k`"
_ARC = "for an arc write `P on circle ABC` under given, and `P and C on opposite sides of AB` under provided"
_ANGLES = "angles are compared by cos or sin, as in cos(BAC) = 1/2; for sizes write `angle BAC acute`"
_ANGLE_POINTS = "an angle has three points, with its vertex in the middle: BAC"
_PARENTHESES = "the points stand in parentheses, as in area(ABC) or median(ABC, A)"
_FUNCTIONS = (
    "the functions are area, perimeter, circumradius, inradius, exradius, dist, cos, sin, sqrt and abs"
)
_UNKNOWN_NUMBER = "letters do not stand for numbers: write what is meant, such as circumradius(ABC)"
_COINCIDE = "for points that coincide write |AB| = 0"
_NOT_FIRST = "`not` stands before the whole condition: not P on line AB"
_ONE_POINT = "one point a line: P on circle k"
_FIRST_THE_NAME = "first the name, then what it is: X = midpoint of AB"
_FIRST_THE_SHAPE = "first what it is, then its points: triangle ABC"
_BOTH = "name both points: P and C on opposite sides of AB"
_THE = "leave out `the`"
_ASSUMPTION = "write the assumption behind `provided`"

LESSONS = (
    Lesson(
        "claim",
        ("AB = CD", "AB < CD", "AB + CD = 1", "AB - CD = 1", "AB*2 = 1", "AB/2 = 1", "AB^2 = 1"),
        _BARS,
    ),
    Lesson(
        "claim",
        ("|AB| = CD", "|AB| + CD = 1", "|AB|*CD = 1", "|AB|/CD = 1", "2AB = 1", "-AB = 1", "1/2AB = 1"),
        _BARS,
    ),
    Lesson("given", ("|AB| = CD", "2AB = 1", "AB = 1", "sqrt(AB) = 1"), _BARS),
    Lesson("claim", tuple(f"|AB|/2{f} = 1" for f in ("|CD|", *_FUNCTION_EXAMPLES)), _TWO_READINGS),
    Lesson("claim", tuple(f"|AB| {f} = 1" for f in ("|CD|", "2", *_FUNCTION_EXAMPLES)), _SIGN, loose=True),
    Lesson("claim", tuple(f"|AB| = |CD| {f}" for f in ("|EF|", "2", *_FUNCTION_EXAMPLES)), _SIGN, loose=True),
    Lesson("claim", tuple(f"(|AB| {f} = 1" for f in ("|CD|", "2", *_FUNCTION_EXAMPLES)), _SIGN, loose=True),
    Lesson("claim", ("|AB|^2^2 = 1",), "powers of powers need parentheses: (|AB|^2)^2"),
    Lesson("claim", ("|AB| = 3,5",), "decimals are written with a point: 3.5", r",[0-9]"),
    Lesson(
        "claim", ("|A B| = 1", "cos(A B C) = 1", "area(A, B, C) = 1"), _TOGETHER, r"[A-Z][0-9']*[ ,]+[A-Z]"
    ),
    Lesson(
        "given",
        ("triangle A, B, C", "square A, B, C, D", "quadrilateral A, B, C, D", "M = midpoint of A, B"),
        _TOGETHER,
        r"[A-Z][0-9']*[ ,]+[A-Z]",
    ),
    Lesson("given", ("M = midpoint of A and B",), "write the two points together: midpoint of AB"),
    Lesson(
        "claim",
        ("A B C collinear", "ABC collinear", "ABCD concyclic", "ABC concyclic", "AB distinct"),
        _COMMAS,
    ),
    Lesson("claim", ("ABC distinct", "ABCD distinct", "ABCD collinear", "AB collinear"), _COMMAS),
    Lesson("given", ("points A B", "points ABC", "point AB", "points A and B"), _COMMAS),
    Lesson(
        "claim", ("|AB| = 3 cm",), "lengths have no unit here: leave it out", r"(mm|cm|dm|m|km|in|ft|pt)\b"
    ),
    Lesson("claim", ("angle ABC = 1", "angle ABC < 1", "|AB| = angle ABC", "angle ABC + 1"), _ANGLES),
    Lesson("claim", ("cos(A) = 1", "sin(A) = 1", "angle A acute"), _ANGLE_POINTS, r"[A-Z][0-9']*[ )]"),
    Lesson(
        "given", ("P on bisector of angle A", "l = bisector of angle A"), _ANGLE_POINTS, r"[A-Z][0-9']*\s*$"
    ),
    Lesson("given", ("M is midpoint of AB",), "write M = midpoint of AB", r"(is|be|as)\b"),
    Lesson("given", ("let M = midpoint of AB",), "start with what the line says: M = midpoint of AB"),
    Lesson("given", ("P on arc AB", "P on arc ABC", "P on arc A"), _ARC, behind="arc"),
    Lesson("claim", ("P on arc AB", "P on arc ABC", "P on arc A"), _ARC, behind="arc"),
    Lesson(
        "given", tuple(f"P on {word} of ABC" for word in ("incircle", "excircle", "circumcircle")), _NAME_IT
    ),
    Lesson(
        "claim", tuple(f"P on {word} of ABC" for word in ("incircle", "excircle", "circumcircle")), _NAME_IT
    ),
    Lesson("given", ("P, Q on circle ABC", "P, Q inside triangle ABC"), _ONE_POINT),
    Lesson("provided", ("P and Q on circle k", "P and Q on line l", "P and Q on segment AB"), _ONE_POINT),
    Lesson("provided", ("P and Q inside ABC",), "one condition for each point, joined by `and`"),
    Lesson(
        "claim",
        tuple(
            f"{word} {rest}"
            for word in ("area", "perimeter", "circumradius")
            for rest in ("ABC", "of", "triangle")
        ),
        _PARENTHESES,
    ),
    Lesson(
        "claim",
        tuple(
            f"{word} {rest}" for word in ("inradius", "median", "altitude") for rest in ("ABC", "of", "from")
        ),
        _PARENTHESES,
    ),
    Lesson(
        "claim",
        ("cos ABC = 1", "sin ABC = 1", "cos A = 1", "sin A = 1", "sqrt 3 = 1"),
        "write cos(BAC), sqrt(3)",
    ),
    Lesson("claim", ("area(triangle ABC) = 1", "perimeter(triangle ABC) = 1"), "only the points: area(ABC)"),
    Lesson(
        "claim", ("dist(AB) = 1", "dist(A, B) = 1"), "dist(P, AB) is to a line; between points write |AB|"
    ),
    Lesson("claim", ("P = Q",), _COINCIDE, r"=\s*[A-Z][0-9']*\s*(and\b|or\b|$)"),
    Lesson("given", ("P = Q",), _COINCIDE),
    Lesson("claim", ("|AB| = 1 if |AC| = 1", "|AB| if"), _ASSUMPTION, r"(if|when|where|provided|iff)\b"),
    Lesson("claim", ("|AB| = tan(1)", "2tan(1) = 1", "|AB| + tan(1) = 1"), _FUNCTIONS, r"[a-z]+\("),
    Lesson("claim", ("tan(1) = 1",), _FUNCTIONS),
    Lesson("claim", ("|AB| = x", "2x = 1", "|AB| + x = 1", "|AB|*x = 1", "|AB|/x = 1"), _UNKNOWN_NUMBER),
    Lesson("claim", ("|AB| = R", "2R = 1", "|AB| + R = 1", "|AB|*R = 1", "|AB|/R = 1"), _UNKNOWN_NUMBER),
    Lesson("given", ("|AB| = x", "|AB| = R"), _UNKNOWN_NUMBER),
    Lesson("claim", ("P not on line AB",), _NOT_FIRST),
    Lesson("given", ("P not on line AB",), "conditions belong under `provided`: not P on line AB"),
    Lesson("given", ("P in triangle ABC",), "write `inside`"),
    Lesson("claim", ("P in triangle ABC",), "write `inside`"),
    Lesson("claim", ("P inside circle ABC", "P inside k"), "inside a circle with centre O: |OP| < |OA|"),
    Lesson("given", ("P inside circle ABC", "P inside k"), "under provided, with the centre O: |OP| < |OA|"),
    Lesson("claim", ("AB and CD parallel",), "write `AB parallel to CD` or `AB perpendicular to CD`"),
    Lesson(
        "given",
        ("l parallel to AB through C", "l perpendicular to AB through C"),
        "a new line needs =: l = ...",
    ),
    Lesson("given", ("point P on circle k", "point M = midpoint of AB"), "leave out `point`"),
    Lesson("given", ("circle ABC", "circle k"), "give it a name: k = circle ABC"),
    Lesson("given", ("line AB", "line l"), "give it a name: l = line AB; AB alone needs no line of its own"),
    Lesson(
        "given",
        tuple(f"{word} of ABC" for word in ("midpoint", "foot", "reflection", "centroid", "circumcentre")),
        _FIRST_THE_NAME,
    ),
    Lesson(
        "given",
        tuple(f"{word} of ABC" for word in ("orthocentre", "incentre", "centre", "meet")),
        _FIRST_THE_NAME,
    ),
    Lesson(
        "given",
        ("ABC triangle", "ABCD square"),
        _FIRST_THE_SHAPE,
        r"[A-Z0-9']+ (triangle|square|rect|rh|par|tr)",
    ),
    Lesson(
        "given", ("square ABCD with side 2", "triangle ABC with"), "say more on a line of its own: |AB| = 2"
    ),
    Lesson("given", ("right triangle ABC",), "say where: right triangle ABC with right angle at C"),
    Lesson("given", ("isosceles triangle ABC",), "say where: isosceles triangle ABC with apex A"),
    Lesson("claim", ("if |AB| = 1", "if A"), _ASSUMPTION, behind="if|when|suppose|assume"),
    Lesson("claim", ("AB || CD",), "write `AB parallel to CD`", r"\|\|"),
    Lesson("given", ("AB || CD",), "write `AB parallel to CD`", r"\|\|"),
    Lesson("claim", ("||AB| - 1| = 1", "2||AB| - 1| = 1"), "an absolute value is written abs(...)"),
    Lesson("claim", ("P on opposite sides of AB", "P on same side of AB"), _BOTH),
    Lesson("claim", ("P on the same side of AB",), _BOTH, r"the (same|opposite)\b"),
    Lesson("given", tuple(f"P on the {c}" for c in ("line AB", "segment AB", "ray AB", "circle ABC")), _THE),
    Lesson("claim", ("P on the line AB", "P on the circle ABC"), _THE, r"the (line|segment|ray|circle)\b"),
    Lesson(
        "given",
        ("k = circle with centre O radius 2", "k = circle with centre O, radius 2"),
        "write `and` before the radius",
    ),
    Lesson(
        "given", ("D = apex of equilateral triangle ABC",), "name the side it stands on: ... triangle on BC"
    ),
)

PLACES = (
    Place("given", "", "a construction or relation such as `triangle ABC` or `M = midpoint of AB`"),
    Place("provided", "", "a condition such as `C between A and B` or `|AB| < |AC|`"),
    Place("claim", "", "a statement such as `|AB| = |CD|` or `AB parallel to CD`"),
    Place("given", "X =", "the construction of a point such as `midpoint of AB`"),
    Place("given", "k =", "a line or circle such as `line AB` or `circle ABC`"),
    Place("given", "P on", "`line`, `segment`, `ray`, `circle`, `bisector` or `perpendicular bisector`"),
    Place("claim", "P on", "`line`, `segment`, `ray` or `circle`"),
    Place("claim", "P", "`between`, `inside`, `outside`, `on`, `and` or `,`"),
    Place("given", "X = meet of", "a line or circle such as AB, ABC or its name"),
    Place("given", "X = meet of AB and", "a line or circle such as AB, ABC or its name"),
    Place("claim", "(", "a quantity or condition"),
    Place("claim", "not", "a condition such as `C between A and B` or `|AB| = |AC|`"),
    Place("claim", "|AB| = 1 and", "a condition such as `C between A and B` or `|AB| = |AC|`"),
    Place("claim", "|AB| = 1 or", "a condition such as `C between A and B` or `|AB| = |AC|`"),
)
