"""The recheck's own reader of claim sheets: every form, every mistake, precedence, limits."""

from __future__ import annotations

import re
from fractions import Fraction
from pathlib import Path

import pytest

from surdwise_recheck.conditions import is_closed, is_open
from surdwise_recheck.exact import Reals
from surdwise_recheck.forms_plane import Figure, Vec, View
from surdwise_recheck.forms_scale import keeps_scale
from surdwise_recheck.quantities import value
from surdwise_recheck.text import TextError, parse_condition, read_sheets
from surdwise_recheck.tree import And, Build, Compare, FrameSign, Not, Or, Says
from tests.attack.sheets import SHEETS

ROOT = Path(__file__).parents[2]
FILES = sorted([*(ROOT / "examples").glob("*.claim"), *(ROOT / "tests/corpus/sheets").glob("*.claim")])

# points and curves for the README's examples; A', D, E, ... are left to the line under test
SCENE = (
    "given triangle ABC\ngiven points P, Q, Z, F\ngiven k = circle ABC\ngiven l = line AB\n"
    "given m = circle with centre P through Q\n"
)


def sheet_with(*lines: str) -> str:
    return SCENE + "\n".join(lines) + "\n"


def one(line: str) -> Build | Says | Compare:
    (sheet,) = read_sheets(f"{SCENE}given {line}\nclaim |AB| = |AC|\n")
    body = sheet.given[-1].body
    assert isinstance(body, Build | Says | Compare)
    return body


@pytest.mark.parametrize("path", FILES, ids=lambda p: p.name)
def test_files_are_read_line_by_line(path: Path) -> None:
    text = path.read_text(encoding="utf-8")
    sheets = read_sheets(text)
    for keyword, lines in (("given", "given"), ("provided", "provided"), ("claim", "claims")):
        said = [
            m.group(1).partition("#")[0].strip() for m in re.finditer(rf"^{keyword} +(.*)$", text, re.M)
        ]
        assert [line.text for s in sheets for line in getattr(s, lines)] == said


def test_every_sheet_of_the_attack_is_read() -> None:
    for text in SHEETS:
        (sheet,) = read_sheets(text)
        assert len(sheet.claims) == len(re.findall(r"^claim ", text, re.M))


def test_every_form_of_the_readme_is_read() -> None:
    table = (ROOT / "README.md").read_text(encoding="utf-8").partition("<!-- reference -->")[2]
    section, seen = "", 0
    for line in table.splitlines():
        if line.startswith("**"):
            section = line.strip("*")
        m = re.match(r"\| `((?:[^`\\]|\\.)+)` \|", line)
        if not m or section in ("", "references"):
            continue
        form = m.group(1).replace("\\|", "|")
        if section in ("relations", "conditions", "thesis"):
            tail = f"claim {form}"
        elif section == "quantities":
            tail = f"claim {form} >= 0"
        else:
            tail = f"given {form}\nclaim |A1B1| = 1"
        made = re.match(r"[A-Zkl][']?(, [A-Z])*(?= = )|(?<=points )[A-C, ]+|", form)
        assert made is not None
        new = set("ABC" if form.startswith("points") else re.findall(r"[A-Zkl]'?", made.group()))
        scene = "".join(f"given point {p}\n" for p in "ABCDEMOPQ" if p not in new)
        scene += "given points A1, B1, C1\n"
        for curve, how in (("k", "circle A1B1C1"), ("l", "line A1B1")):
            scene += "" if curve in new else f"given {curve} = {how}\n"
        assert read_sheets(f"{scene}{tail}\n"), form
        seen += 1
    assert seen >= 75


@pytest.mark.parametrize(
    ("said", "form"),
    [
        ("O = circumcenter of ABC", "circumcentre"),
        ("H = orthocenter of ABC", "orthocentre"),
        ("I = incenter of ABC", "incentre"),
        ("J = excenter of ABC opposite B", "excentre"),
        ("N = nine-point center of ABC", "nine_point_centre"),
        ("trapezoid ABDE", "trapezium"),
        ("P lies on line l", "on_line"),
        ("P on l", "on_line"),
        ("P on the perp. bisector of AB", "on_perpendicular_bisector"),
        ("P lies on the bisector of angle BAC", "on_angle_bisector"),
        ("P lies inside ABC", "inside_triangle"),
        ("D = foot of perp. from A on line BC", "foot"),
        ("D = foot of A on BC", "foot"),
        ("D = reflection of A in centre of k", "reflection_in_point"),
        ("D = reflection of (center of circle k) in l", "reflection_in_line"),
        ("X = intersection of line l and circle m other than A", "meet_other"),
        ("X = meet of AB and ABC", "meet"),
        ("D, E = corners of square on BC toward A", "square_corners"),
        ("D = apex of equilateral triangle on BC towards A", "equilateral_apex_sided"),
        ("n = circumcircle of ABC", "circle_through"),
        ("n = circle with center O' through P", ""),
        ("n = circle with centre of k and radius 2|AB|", ""),
        ("n = perp. bisector of AB", "perpendicular_bisector"),
        ("n = perp. to line l through centre of k", "perpendicular"),
        ("A, B, C, P concyclic", "concyclic"),
        ("line l perp. to AB", "perpendicular_lines"),
    ],
)
def test_synonyms(said: str, form: str) -> None:
    if not form:
        with pytest.raises(TextError):
            one(said)
    else:
        body = one(said)
        assert isinstance(body, Build | Says) and body.form == form


MISTAKES = [
    ("given points P, P", "different"),
    ("given triangle AAB", "different"),
    ("given isosceles triangle ABC with apex P", "corner"),
    ("given M = midpoint of AM", "no point M"),
    ("given A = midpoint of BC", "already"),
    ("given k = circle ABP", "already"),
    ("given n = tangent to l at A", "circle"),
    ("given D = foot of A on k", "line"),
    ("given D on circle l", "circle"),
    ("given X = meet of line k and AB", "line"),
    ("given X = meet of AB and BA", "different"),
    ("given X = meet of AB and l other than A", "circle"),
    ("given A, B distinct", "provided"),
    ("given C between A and B", "inside"),
    ("given |AB| < |AC|", "`=`"),
    ("given D = apex of equilateral triangle on BC away from B", "other than"),
    ("provided P inside PAB", "other than"),
    ("provided A and P on the same side of AB", "off the line"),
    ("provided A, B concyclic", "at least 4"),
    ("provided ABC acute and", "quantity"),
    ("provided u0 > 0", "parallel"),
    ("claim |AB| = |BD|", "no point D"),
    ("claim |AB|", "comparison"),
    ("claim |AA| = 1", "different"),
    ("claim |AB| == |AC|", "no statement"),
    ("claim |AB||AC| = 1", "comparison"),
    ("claim |AB|^(1/2) = 1", "whole number"),
    ("claim |AB|^65 = 1", "whole number"),
    ("claim |AB|/0 = 1", "divisor"),
    ("claim 1/0|AB| = 1", "divisor"),
    ("claim sqrt(-2) = 1", "negative"),
    ("claim exradius(ABC, P) = 1", "corner"),
    ("claim dist(P, k) = 1", "line"),
    ("prove |AB| = |AC|", "title"),
    ("claim lineAB parallel to CP", "no statement"),
    ("claim |A1'B| = 1", "no statement"),
]


@pytest.mark.parametrize(("line", "word"), MISTAKES)
def test_mistakes_are_refused_with_their_line(line: str, word: str) -> None:
    text = sheet_with(line, "claim |AB| = |AC|")
    with pytest.raises(TextError, match=re.escape(word)) as caught:
        read_sheets(text)
    assert caught.value.line == SCENE.count("\n") + 1
    assert str(caught.value).startswith("line ")


def test_limits() -> None:
    for deep in (
        "(" * 300 + "|AB|" + ")" * 300 + " = 1",
        "-" * 300 + "|AB| = 1",
        "not " * 300 + "ABC acute",
        " + ".join(["|AB|"] * 300) + " = 1",
        "sqrt(" * 300 + "1" + ")" * 300 + " = 1",
        "(" * 90 + "ABC acute" + ")" * 89,
        "9" * 1001 + " = 1",
    ):
        with pytest.raises(TextError):
            read_sheets(sheet_with(f"claim {deep}"))
    (sheet,) = read_sheets(sheet_with("claim " + "(" * 90 + "ABC acute" + ")" * 90))
    assert sheet.claims[0].body == Says("triangle_size", (("A", "B", "C"), "acute"))


def test_sheets_comments_and_separators() -> None:
    text = "\ufefftitle T # no\r\ngiven triangle ABC\rclaim |AB| = |AC| # a comment\n---\n\n------ # end\n"
    sheet, other = read_sheets(text + "given points A, B'\nclaim |AB’| = 1\n")
    assert sheet.title == "T" and sheet.claims[0].text == "|AB| = |AC|"
    assert keeps_scale(other) and not keeps_scale(sheet)
    for bad in ("", "---", "given triangle ABC", "claim 1 = 1", "given triangle ABC\0\nclaim |AB| = |AC|"):
        with pytest.raises(TextError):
            read_sheets(bad)


@pytest.mark.parametrize(
    ("said", "expected"),
    [
        # A = (0, 0), B = (3, 0), C = (0, 4): |AB| = 3, |AC| = 4, |BC| = 5
        ("2|AB|^2", 18),
        ("-|AB|^2", -9),
        ("1/2|AB|*|AC|", 6),
        ("3/4", Fraction(3, 4)),
        ("12/2/3", 2),
        ("|AB| - |AC| - |BC|", -6),
        ("|BC|^-2*25", 1),
        ("2(|AB| + |AC|)/7", 2),
        ("|AB|/2*|AC|", 6),
        ("2*3/4|AB|", Fraction(9, 2)),
        ("abs(|AB| - |AC|) − 0.5", Fraction(1, 2)),
        ("sqrt(|AB|·|AB| + |AC|^2)", 5),
        ("area(ABC)", 6),
        ("perimeter(ABC)", 12),
        ("circumradius(ABC)", Fraction(5, 2)),
        ("inradius(ABC)", 1),
        ("exradius(ABC, A)", 6),
        ("exradius(ABC, B)", 3),
        ("median(ABC, A)", Fraction(5, 2)),
        ("altitude(ABC, A)", Fraction(12, 5)),
        ("bisector(ABC, A)^2", Fraction(288, 49)),
        ("cos(ABC)", Fraction(3, 5)),
        ("sin(ABC)", Fraction(4, 5)),
        ("dist(A, BC)", Fraction(12, 5)),
    ],
)
def test_quantities_of_the_three_four_five_triangle(said: str, expected: Fraction) -> None:
    c = parse_condition(f"{said} = 0")
    assert isinstance(c, Compare)
    numbers = Reals()
    places = {"A": (0, 0), "B": (3, 0), "C": (0, 4)}
    points = {p: Vec(numbers.number(x), numbers.number(y)) for p, (x, y) in places.items()}
    found = value(c.items[0], View(Figure(points), numbers))
    assert numbers.zero(found - expected)


def test_conditions_bind_as_written() -> None:
    c = parse_condition("ABC acute or not A and P on the same side of BC and (|AB| < |AC| or |AB| = 1)")
    assert isinstance(c, Or) and isinstance(c.args[1], And)
    first, second = c.args[1].args
    assert isinstance(first, Not) and isinstance(second, Or)
    d = parse_condition("(|AB| + |AC|)/2 <= (|BC|) < 3")
    assert isinstance(d, Compare) and d.ops == ("<=", "<")
    e = parse_condition("C between A and B and P and Q on opposite side of AC")
    assert isinstance(e, And) and len(e.args) == 2


def test_comparisons_in_the_frames_parameters() -> None:
    c = parse_condition("u0^2*u1 - 3/2*u1 + 2 > 0")
    assert isinstance(c, FrameSign) and c.op == ">"
    assert dict(c.terms) == {
        ((0, 2), (1, 1)): Fraction(1),
        ((1, 1),): Fraction(-3, 2),
        (): Fraction(2),
    }
    d = parse_condition("not (u0 < 0) and ABC acute or (u1 - u0)^2 = 2*u0*u1")
    assert isinstance(d, Or) and isinstance(d.args[1], FrameSign)
    assert dict(d.args[1].terms) == {
        ((0, 2),): Fraction(1),
        ((0, 1), (1, 1)): Fraction(-4),
        ((1, 2),): Fraction(1),
    }
    for bad in ("u0", "u0^1000 > 0", "(u0 + u1 + u2 + u3 + u4)^300 > 0", "u0/u1 > 0", "u0 > |AB|"):
        with pytest.raises(TextError):
            parse_condition(bad)


@pytest.mark.parametrize(
    ("said", "opens", "closes"),
    [
        ("|AB| = |AC|", False, True),
        ("|AB| < |AC|", True, False),
        ("not |AB| < |AC|", False, True),
        ("|AB| <= |AC| < |BC|", False, False),
        ("P inside ABC", True, False),
        ("not P inside ABC and A, B, C collinear", False, True),
        ("C between A and B", True, False),
        ("not C between A and B", False, False),
        ("not (C between A and B or ABC acute)", False, False),
        ("A, B, C, D concyclic", False, False),
        ("P on segment AB", False, True),
        ("angle BAC right", False, False),
        ("u0 > 0", False, False),
    ],
)
def test_open_and_closed(said: str, opens: bool, closes: bool) -> None:
    c = parse_condition(said)
    assert (is_open(c), is_closed(c)) == (opens, closes)
