"""Witness figures: hand-made coordinates of known figures, the program's own witnesses, random figures."""

from __future__ import annotations

import json
import subprocess
import sys
from collections.abc import Mapping
from pathlib import Path
from random import Random
from typing import Any

import pytest

from surdwise_recheck.exact import Limits
from surdwise_recheck.forms_plane import Figure, Vec
from surdwise_recheck.text import TextError, check_condition, parse_condition, read_sheets
from surdwise_recheck.tree import Build, Condition, Sheet
from surdwise_recheck.witness import Outcome, check_witness
from tests.attack.sheets import SHEETS

from .witness_sampling import recheck, sample

ROOT = Path(__file__).parents[2]
EXAMPLES = sorted((ROOT / "examples").glob("*.claim"))
CORPUS = ROOT / "tests/corpus/sheets"

Points = Mapping[str, tuple[str, str]]


def one(text: str) -> tuple[Sheet, Condition]:
    (sheet,) = read_sheets(text)
    claim = sheet.claims[0].body
    assert not isinstance(claim, Build)
    return sheet, claim


def outcome(text: str, points: Points, truth: bool = True) -> Outcome:
    sheet, claim = one(text)
    return check_witness(sheet, claim, points, truth).outcome


# ---------------------------------------------------------------- the triangle with sides 3, 4, 5

TRIANGLE: Points = {"A": ("0", "0"), "B": ("3", "0"), "C": ("0", "4")}

# what is made on A = (0, 0), B = (3, 0), C = (0, 4), worked out by hand
MADE: list[tuple[str, Points]] = [
    ("M = midpoint of BC", {"M": ("3/2", "2")}),
    ("G = centroid of ABC", {"G": ("1", "4/3")}),
    ("O = circumcentre of ABC", {"O": ("3/2", "2")}),
    ("H = orthocentre of ABC", {"H": ("0", "0")}),
    ("N = nine-point centre of ABC", {"N": ("3/4", "1")}),
    ("I = incentre of ABC", {"I": ("1", "1")}),
    ("J = excentre of ABC opposite A", {"J": ("6", "6")}),
    ("J = excentre of ABC opposite B", {"J": ("-3", "3")}),
    ("J = excentre of ABC opposite C", {"J": ("2", "-2")}),
    ("T = touch point of incircle of ABC on BC", {"T": ("9/5", "8/5")}),
    ("D = foot of A on BC", {"D": ("48/25", "36/25")}),
    ("D = foot of bisector of angle BAC on BC", {"D": ("12/7", "12/7")}),
    ("D = foot of bisector of angle ABC on AC", {"D": ("0", "3/2")}),
    ("A' = reflection of A in BC", {"A'": ("96/25", "72/25")}),
    ("A' = reflection of A in B", {"A'": ("6", "0")}),
    ("D = apex of equilateral triangle on AB away from C", {"D": ("3/2", "-3*sqrt(3)/2")}),
    ("D = apex of equilateral triangle on AB towards C", {"D": ("3/2", "3*sqrt(3)/2")}),
    ("D = apex of equilateral triangle on AB", {"D": ("3/2", "-sqrt(27)/2")}),
    ("D, E = corners of square on BC away from A", {"D": ("4", "7"), "E": ("7", "3")}),
    ("D, E = corners of square on BC towards A", {"D": ("-4", "1"), "E": ("-1", "-3")}),
    ("k = circle ABC\ngiven O = centre of k", {"O": ("3/2", "2")}),
    ("k = incircle of ABC\ngiven I = centre of k", {"I": ("1", "1")}),
    ("k = excircle of ABC opposite C\ngiven J = centre of k", {"J": ("2", "-2")}),
    ("l = bisector of angle BAC\ngiven X = meet of l and circle ABC other than A", {"X": ("7/2", "7/2")}),
    ("l = tangent to ABC at A\ngiven D = foot of C on l", {"D": ("-48/25", "36/25")}),
    ("l = parallel to BC through A\ngiven D = foot of B on l", {"D": ("27/25", "-36/25")}),
    ("l = perpendicular to BC through A\ngiven D = meet of l and BC", {"D": ("48/25", "36/25")}),
    ("l = perpendicular bisector of AB\ngiven X = meet of BC and l", {"X": ("3/2", "2")}),
    (
        "k = circle with centre A and radius 2\ngiven X = meet of k and ABC",
        {"X": ("12/25 - 8*sqrt(21)/25", "16/25 + 6*sqrt(21)/25")},
    ),
    (
        "k = circle with centre A and radius 2\ngiven X = meet of k and ABC",
        {"X": ("12/25 + 8*sqrt(21)/25", "16/25 - 6*sqrt(21)/25")},
    ),
    ("k = circle with diameter AB\ngiven X = meet of BC and k other than B", {"X": ("48/25", "36/25")}),
    ("k = circle with centre B through A\ngiven X = meet of BC and k", {"X": ("6/5", "12/5")}),
    ("k = circle with centre B through A\ngiven X = meet of BC and k", {"X": ("24/5", "-12/5")}),
]


@pytest.mark.parametrize(("line", "made"), MADE, ids=[m[0].replace("\n", "; ") for m in MADE])
def test_made_points_of_the_three_four_five_triangle(line: str, made: Points) -> None:
    text = f"given triangle ABC\ngiven {line}\nclaim |AC| > |AB|\n"
    assert outcome(text, {**TRIANGLE, **made}) is Outcome.ACCEPTED
    assert outcome(text, {**TRIANGLE, **made}, False) is Outcome.REJECTED
    for name, (x, y) in made.items():
        for moved in ((f"{x} + 1/10**30", y), (x, f"{y} - 1/10**30")):
            assert outcome(text, {**TRIANGLE, **made, name: moved}) is Outcome.REJECTED


def square(*corners: tuple[str, str]) -> Points:
    return dict(zip("ABCDEF", corners, strict=False))


UNIT = square(("0", "0"), ("1", "0"), ("1", "1"), ("0", "1"))
CLOCKWISE = square(("0", "0"), ("0", "1"), ("1", "1"), ("1", "0"))
CROSSED = square(("0", "0"), ("1", "1"), ("1", "0"), ("0", "1"))
C36, S36 = "(1 + sqrt(5))/4", "sqrt(10 - 2*sqrt(5))/4"
C72, S72 = "(sqrt(5) - 1)/4", "sqrt(10 + 2*sqrt(5))/4"
PENTAGON = square(("1", "0"), (C72, S72), (f"-{C36}", S36), (f"-{C36}", f"-{S36}"), (C72, f"-{S72}"))
PENTAGRAM = dict(zip("ACEBD", PENTAGON.values(), strict=True))
HEXAGON = square(
    ("1", "0"), ("1/2", "sqrt(3)/2"), ("-1/2", "sqrt(3)/2"), ("-1", "0"), ("-1/2", "-sqrt(3)/2"),
    ("1/2", "-sqrt(3)/2"),
)  # fmt: skip
KITE = square(("0", "2"), ("1", "0"), ("0", "-3"), ("-1", "0"))
DART = square(("0", "2"), ("1", "0"), ("0", "1/2"), ("-1", "0"))
TRAPEZIUM = square(("0", "0"), ("5", "0"), ("3", "2"), ("1", "2"))
RHOMBUS = square(("0", "0"), ("5", "0"), ("8", "4"), ("3", "4"))

SHAPES: list[tuple[str, Points, bool]] = [
    ("square ABCD", UNIT, True),
    ("square ABCD", CLOCKWISE, True),
    ("square ABCD", CROSSED, False),
    ("square ABCD", RHOMBUS, False),
    ("rectangle ABCD", UNIT, True),
    ("rectangle ABCD", square(("0", "0"), ("3", "0"), ("3", "1"), ("0", "1")), True),
    ("rectangle ABCD", RHOMBUS, False),
    ("rhombus ABCD", RHOMBUS, True),
    ("rhombus ABCD", UNIT, True),
    ("rhombus ABCD", KITE, False),
    ("parallelogram ABCD", RHOMBUS, True),
    ("parallelogram ABCD", TRAPEZIUM, False),
    ("parallelogram ABCD", square(("0", "0"), ("1", "0"), ("3", "0"), ("2", "0")), False),
    ("kite ABCD", KITE, True),
    ("kite ABCD", DART, False),
    ("kite ABCD", TRAPEZIUM, False),
    ("trapezium ABCD", TRAPEZIUM, True),
    ("trapezium ABCD", UNIT, True),
    ("trapezium ABCD", CROSSED, False),
    ("quadrilateral ABCD", DART, True),
    ("quadrilateral ABCD", CROSSED, True),
    ("quadrilateral ABCD", square(("0", "0"), ("1", "0"), ("2", "0"), ("0", "1")), False),
    ("cyclic quadrilateral ABCD", UNIT, True),
    ("cyclic quadrilateral ABCD", CROSSED, False),
    ("cyclic quadrilateral ABCD", KITE, False),
    ("tangential quadrilateral ABCD", KITE, True),
    ("tangential quadrilateral ABCD", RHOMBUS, True),
    ("tangential quadrilateral ABCD", TRAPEZIUM, False),
    ("regular pentagon ABCDE", PENTAGON, True),
    ("regular pentagon ABCDE", PENTAGRAM, False),
    ("regular hexagon ABCDEF", HEXAGON, True),
    ("regular hexagon ABCDEF", {**HEXAGON, "A": ("2", "0")}, False),
    ("equilateral triangle ABC", square(("0", "0"), ("2", "0"), ("1", "-sqrt(3)")), True),
    ("equilateral triangle ABC", square(("0", "0"), ("2", "0"), ("1", "1")), False),
    ("isosceles triangle ABC with apex A", square(("0", "0"), ("3", "4"), ("5", "0")), True),
    ("isosceles triangle ABC with apex B", square(("0", "0"), ("3", "4"), ("5", "0")), False),
    ("right triangle ABC with right angle at A", TRIANGLE, True),
    ("right triangle ABC with right angle at B", TRIANGLE, False),
    ("triangle ABC", square(("0", "0"), ("1", "1"), ("3", "3")), False),
    ("points A, B, C", square(("0", "0"), ("1", "1"), ("3", "3")), True),
    ("points A, B, C", square(("0", "0"), ("1", "1"), ("1", "1")), False),
]


@pytest.mark.parametrize(("shape", "points", "good"), SHAPES)
def test_shapes(shape: str, points: Points, good: bool) -> None:
    text = f"given {shape}\nclaim |AB| >= 0\n"
    assert outcome(text, points) is (Outcome.ACCEPTED if good else Outcome.REJECTED)


@pytest.mark.parametrize(
    ("line", "place", "good"),
    [
        ("P on line AB", ("-7", "0"), True),
        ("P on line AB", ("1", "1"), False),
        ("P on segment AB", ("3", "0"), True),
        ("P on segment AB", ("4", "0"), False),
        ("P on ray BA", ("-1", "0"), True),
        ("P on ray AB", ("-1", "0"), False),
        ("P on circle ABC", ("3", "4"), True),
        ("P on circle ABC", ("3", "3"), False),
        ("P on perpendicular bisector of AB", ("3/2", "9"), True),
        ("P on perpendicular bisector of AB", ("1", "9"), False),
        ("P on bisector of angle BAC", ("5", "5"), True),
        ("P on bisector of angle BAC", ("-5", "-5"), False),
        ("P inside triangle ABC", ("1", "1"), True),
        ("P inside triangle ABC", ("3/2", "2"), False),
        ("|PA| = |PB| + |PC|", ("0", "0"), False),
        ("|PA|^2 = 25", ("3", "4"), True),
        ("AP parallel to BC", ("3", "-4"), True),
        ("A, B, C, P concyclic", ("3", "4"), True),
        ("A, B, C, P concyclic", ("3", "5"), False),
        ("A, P, C collinear", ("0", "5"), True),
        ("A, P, C collinear", ("1", "5"), False),
    ],
)
def test_points_on_curves_and_hypotheses(line: str, place: tuple[str, str], good: bool) -> None:
    text = f"given triangle ABC\ngiven point P\ngiven {line}\nclaim |AB| > 0\n"
    assert outcome(text, {**TRIANGLE, "P": place}) is (Outcome.ACCEPTED if good else Outcome.REJECTED)


@pytest.mark.parametrize(
    ("condition", "place", "truth"),
    [
        ("P between A and B", ("1", "0"), True),
        ("P between A and B", ("3", "0"), False),
        ("P inside ABC", ("1", "1"), True),
        ("P inside ABC", ("1", "0"), False),
        ("P outside ABC", ("1", "0"), False),
        ("P outside ABC", ("3", "3"), True),
        ("P and C on the same side of AB", ("9", "1"), True),
        ("P and C on opposite sides of AB", ("9", "0"), False),
        ("P and C on opposite sides of AB", ("9", "-1"), True),
        ("angle BPC right", ("3", "4"), True),
        ("angle BPC obtuse", ("1", "1"), True),
        ("ABP acute", ("1", "2"), True),
        ("ABC acute", ("1", "2"), False),
        ("ABCP convex", ("1", "1"), False),
        ("ABPC convex", ("3", "4"), True),
        ("A, B, P distinct", ("3", "0"), False),
        ("A, B, C, P concyclic", ("3", "0"), True),  # coincidences are admitted and counted
        ("P, B, A, C concyclic", ("3", "0"), True),
        ("P, B, A, C concyclic", ("2", "0"), False),
        ("ABP equilateral", ("3/2", "3*sqrt(3)/2"), True),
        ("ABP isosceles with apex P", ("3/2", "77"), True),
        ("P on segment BC", ("3/2", "2"), True),
        ("P on ray CB and not P on segment BC", ("6", "-4"), True),
        ("|PA| < |PB| <= |PC|", ("0", "-1"), True),
        ("|PA| < |PB| <= |PC|", ("0", "3"), False),
        ("dist(P, AB) = 2 or |PA| = 1", ("7", "-2"), True),
    ],
)
def test_conditions(condition: str, place: tuple[str, str], truth: bool) -> None:
    points = {**TRIANGLE, "P": place}
    text = f"given triangle ABC\ngiven point P\nclaim {condition}\n"
    assert outcome(text, points, truth) is Outcome.ACCEPTED
    assert outcome(text, points, not truth) is Outcome.REJECTED
    provided = f"given triangle ABC\ngiven point P\nprovided {condition}\nclaim |AB| = 3\n"
    assert outcome(provided, points) is (Outcome.ACCEPTED if truth else Outcome.REJECTED)


def test_findings_say_what_is_wrong() -> None:
    sheet, claim = one("given triangle ABC\ngiven P on circle ABC\nclaim |AB|/|PC| < |AC|\n")
    good: dict[str, tuple[str, ...]] = {**TRIANGLE, "P": ("3", "4")}
    assert check_witness(sheet, claim, good, True).found == "the claim is true on it"
    for change, words in (
        ({"P": ("3", "sqrt(16) + 1")}, "given P on circle ABC"),
        ({"P": ("3", "x")}, "P:"),
        ({"P": ("3",)}, "1 coordinates"),
        ({"Q": ("0", "0")}, "Q"),
        ({"P": ("0", "4")}, "not defined"),
        ({"C": ("9", "0"), "P": ("0", "0")}, "given triangle ABC"),
    ):
        found = check_witness(sheet, claim, {**good, **change}, True)
        assert found.outcome is Outcome.REJECTED and words in found.found
    del good["P"]
    assert check_witness(sheet, claim, good, True).outcome is Outcome.REJECTED
    root = "CRootOf(x**9 + 3*x**6 + 3*x**3 - 1, 0)*CRootOf(x**3 - 9, 0) + CRootOf(x**3 - 2, 0)"
    hard = {**TRIANGLE, "P": (f"2 + {root} - CRootOf(x**3 - 4, 0)", "4")}
    assert check_witness(sheet, claim, hard, True).outcome is Outcome.ACCEPTED  # that number is 3
    assert check_witness(sheet, claim, hard, True, Limits(bits=300)).outcome is Outcome.INCOMPLETE


# ---------------------------------------------------------------- the program's own witnesses


@pytest.fixture(scope="module")
def decided() -> list[tuple[Sheet, Condition, dict[str, Any]]]:
    """Every claim of the examples and two files of the corpus, with the program's answer."""
    files = [*EXAMPLES, CORPUS / "lines.claim", CORPUS / "centres.claim"]
    done = subprocess.run(
        [sys.executable, "-m", "surdwise", "decide", "--json", *map(str, files)],
        capture_output=True,
        text=True,
        timeout=300,
    )
    answers = [json.loads(line) for line in done.stdout.splitlines()]
    claims = [
        (sheet, line.body)
        for f in files
        for sheet in read_sheets(f.read_text(encoding="utf-8"))
        for line in sheet.claims
    ]
    assert len(answers) == len(claims), done.stderr
    return [(s, c, a) for (s, c), a in zip(claims, answers, strict=True) if not isinstance(c, Build)]


def exact(figure: dict[str, Any]) -> dict[str, tuple[str, str]]:
    return {name: tuple(place["exact"]) for name, place in figure.items()}


def test_witnesses_of_the_program_are_accepted(
    decided: list[tuple[Sheet, Condition, dict[str, Any]]],
) -> None:
    seen = 0
    for sheet, claim, answer in decided:
        for key, truth in (("holds_at", True), ("fails_at", False)):
            if answer[key]:
                points = exact(answer[key])
                finding = check_witness(sheet, claim, points, truth)
                assert finding.outcome is Outcome.ACCEPTED, (answer["claim"], key, finding)
                assert check_witness(sheet, claim, points, not truth).outcome is Outcome.REJECTED
                seen += 1
        for variant in answer["variants"]:
            if variant["holds_at"]:
                other = parse_condition(variant["claim"])
                finding = check_witness(sheet, other, exact(variant["holds_at"]), True)
                assert finding.outcome is Outcome.ACCEPTED, (variant, finding)
        for key in ("condition", "equality"):
            if answer[key] not in (None, "never", "always"):
                check_condition(sheet, parse_condition(answer[key]))
    assert seen > 90


def test_moved_witnesses_are_rejected(decided: list[tuple[Sheet, Condition, dict[str, Any]]]) -> None:
    """A point that a line makes may not be moved at all."""
    seen = 0
    for sheet, claim, answer in decided:
        built = [(line.body, line.text) for line in sheet.given]
        made = {str(b.args[0]) for b, text in built if isinstance(b, Build) and "=" in text}
        figure = answer["holds_at"] or answer["fails_at"]
        if not figure:
            continue
        points = exact(figure)
        for name in sorted(made & set(points)):
            x, y = points[name]
            moved = {**points, name: (f"{x} + 1/10**20", f"{y} + 1/10**21")}
            assert check_witness(sheet, claim, moved, answer["holds_at"] is not None).outcome is (
                Outcome.REJECTED
            ), (sheet.title, name)
            seen += 1
    assert seen > 60


# ---------------------------------------------------------------- placing and checking agree


def test_random_figures_meet_their_own_lines() -> None:
    """Figures placed by the parametrisation pass the checks of the definitions, in every frame."""
    random = Random(20)
    texts = [*(f.read_text(encoding="utf-8") for f in EXAMPLES), *SHEETS[:120]]
    seen = 0
    for text in texts:
        for sheet in read_sheets(text):
            for frame in ("cartesian", "sides", "incircle", "half-angles"):
                found = sample(sheet, frame, random, 40)
                if found is not None:
                    recheck(sheet, *found)
                    seen += 1
    assert seen > 300


def test_parameters_are_asked_in_the_documented_order() -> None:
    expected = [
        ("points A, B, C", "0", ["x of C", "y of C"]),
        ("triangle ABC\ngiven P on circle ABC", "0", ["x of C", "y of C", "cot of the chord angle of P"]),
        ("points A, B\ngiven P on segment AB", "0", ["|AP| over |AB|"]),
        ("isosceles triangle ABC with apex A", "0", ["height of A"]),
        # a number to compare with keeps the scale
        ("rhombus ABCD", "2", ["|AB|", "tan of half the angle at A"]),
    ]
    for lines, least, labels in expected:
        (sheet,) = read_sheets(f"given {lines}\nclaim |AB| >= {least}\n")
        found = sample(sheet, "cartesian", Random(1))
        assert found is not None and found[1].labels == labels
    (sheet,) = read_sheets("given triangle ABC\nclaim |AB| = 1\n")
    sides = sample(sheet, "sides", Random(1))
    assert sides is not None
    assert sides[1].labels == [f"tangent length at {p}" for p in "ABC"]
    # |AB| = x + y, and a reflected copy of the figure is one too
    numbers, figure = sides[1], sides[0]
    mirrored = Figure({p: Vec(v.x, -v.y) for p, v in figure.points.items()})
    recheck(sheet, mirrored, numbers)


def test_names_of_conditions_are_checked() -> None:
    (sheet,) = read_sheets("given triangle ABC\nclaim |AB| = |AC|\n")
    check_condition(sheet, parse_condition("angle BAC acute"))
    with pytest.raises(TextError):
        check_condition(sheet, parse_condition("angle BAD acute"))
