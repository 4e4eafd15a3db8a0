"""The table of forms covers the grammar, and every example reads as the form it stands for."""

from __future__ import annotations

import re

import pytest

from surdwise.sheet import (
    FORMS,
    Comparison,
    Fact,
    Form,
    Kind,
    Measure,
    Named,
    Pt,
    Relation,
    forms_of,
    read_line,
    read_text,
    show,
)
from surdwise.sheet.table import GRAMMAR_FILE, load_table
from surdwise.sheet.walk import parts

FIGURE_KINDS = (Kind.FREE, Kind.SHAPE, Kind.POINT_ON, Kind.MADE, Kind.MEET, Kind.CURVE)


def grammar_aliases() -> set[str]:
    with open(GRAMMAR_FILE, encoding="utf-8") as file:
        return set(re.findall(r"->\s*(\w+)", file.read()))


def test_every_alias_of_the_grammar_has_a_form_and_no_other() -> None:
    assert set(FORMS) == grammar_aliases()
    assert {rule.alias for rule in load_table().rules} - {""} == set(FORMS)


def test_the_groups_cover_the_table_in_order() -> None:
    listed = [form for kind in Kind for form in forms_of(kind)]
    assert len(listed) == len(FORMS)
    assert set(listed) == set(FORMS.values())
    assert all(forms_of(kind) for kind in Kind)


@pytest.mark.parametrize("form", FORMS.values(), ids=lambda form: form.alias)
def test_a_form_says_what_it_is(form: Form) -> None:
    assert form.example and form.meaning and not form.meaning.endswith(".")
    assert form.args == () or all(f"{{{i}}}" in form.pattern for i in range(len(form.args)))
    assert (form.makes != "") == (form.kind is Kind.CURVE)
    assert all(0 <= index < len(form.args) for index in form.new)
    assert bool(form.new) == (form.kind in FIGURE_KINDS)
    if form.corner is not None:
        assert form.args[form.corner[0]] == "triple"


STATED = [(form, keyword) for form in FORMS.values() for keyword in form.under]


@pytest.mark.parametrize(
    ("form", "keyword"), STATED, ids=[f"{form.alias} {keyword}" for form, keyword in STATED]
)
def test_an_example_reads_as_its_form(form: Form, keyword: str) -> None:
    body = read_line(keyword, form.example)
    if isinstance(body, Fact | Relation):
        assert body.form == form.alias
        assert len(body.args) == len(form.args)
        assert isinstance(body, Fact) == (keyword == "given" and form.kind in FIGURE_KINDS)
    elif isinstance(body, Comparison):
        assert form.alias in ("equation", "comparison")
    assert show(body) == form.example or form.alias == "points"


@pytest.mark.parametrize("form", forms_of(Kind.QUANTITY), ids=lambda form: form.alias)
def test_an_example_of_a_quantity_reads_as_one(form: Form) -> None:
    body = read_line("claim", f"{form.example} = 1")
    assert isinstance(body, Comparison)
    assert show(body.items[0]) == form.example
    if isinstance(body.items[0], Measure):
        assert body.items[0].kind == form.alias


@pytest.mark.parametrize("form", forms_of(Kind.REFERENCE), ids=lambda form: form.alias)
def test_a_reference_stands_in_a_meet_or_a_distance(form: Form) -> None:
    place = form.alias in ("point", "centre_of")
    text = f"dist({form.example}, BC) = 1" if place else f"dist(P, {form.example}) = 1"
    assert show(read_line("claim", text)) == text


SYNONYMS = (
    ("O = circumcenter of ABC", "O = circumcentre of ABC"),
    ("H = orthocenter of ABC", "H = orthocentre of ABC"),
    ("I = incenter of ABC", "I = incentre of ABC"),
    ("J = excenter of ABC opposite A", "J = excentre of ABC opposite A"),
    ("N = nine-point center of ABC", "N = nine-point centre of ABC"),
    ("O = center of circle ABC", "O = centre of ABC"),
    ("trapezoid ABCD", "trapezium ABCD"),
    ("P lies on line AB", "P on line AB"),
    ("P lies on AB", "P on line AB"),
    ("P on l", "P on line l"),
    ("P lies inside ABC", "P inside triangle ABC"),
    ("P on the perp. bisector of AB", "P on perpendicular bisector of AB"),
    ("P on the bisector of angle ABC", "P on bisector of angle ABC"),
    ("D = foot of perpendicular from A on line BC", "D = foot of A on BC"),
    ("X = intersection of line AB and circle k", "X = meet of AB and k"),
    ("X = meet of circle ABC and line l", "X = meet of ABC and l"),
    ("D = apex of equilateral triangle on BC toward A", "D = apex of equilateral triangle on BC towards A"),
    ("A’ = reflection of A in line BC", "A' = reflection of A in BC"),
    ("A'' = reflection of A in l", "A'' = reflection of A in l"),
    ("D = foot of (centre of k) on BC", "D = foot of centre of k on BC"),
    ("k = circumcircle of ABC", "k = circle ABC"),
    ("m = tangent to circle k at A", "m = tangent to k at A"),
    ("m = parallel to line l through centre of k", "m = parallel to l through centre of k"),
    ("point P", "point P"),
    ("points P", "point P"),
    ("line AB parallel to line l", "AB parallel to l"),
)


@pytest.mark.parametrize(("written", "unified"), SYNONYMS)
def test_synonyms_are_unified(written: str, unified: str) -> None:
    body = read_line("given", written)
    assert show(body) == unified
    assert read_line("given", unified) == body


CONDITIONS = (
    ("P and Q lie on opposite sides of AB", "P and Q on opposite sides of AB"),
    ("P and Q on the opposite side of line AB", "P and Q on opposite sides of AB"),
    ("P and Q on same side of l", "P and Q on the same side of l"),
    ("C lies between A and B", "C between A and B"),
    ("triangle ABC acute", "ABC acute"),
    ("P lies outside triangle ABC", "P outside ABC"),
    ("AB perp. to CD", "AB perpendicular to CD"),
    ("|AB| ≤ |AC| ≥ 1", "|AB| <= |AC| >= 1"),
    ("2·|AB|×|CD| − 1 > 0", "2|AB|*|CD| - 1 > 0"),
    ("((C between A and B))", "C between A and B"),
    ("(not (C between A and B))", "not C between A and B"),
    ("dist(centre of k, line l) = 1", "dist(centre of k, l) = 1"),
    ("|A'B′| = |A’’B|", "|A'B'| = |A''B|"),
    ("| AB |=1", "|AB| = 1"),
    ("1/2 |AB| = 0.25|CD|", "1/2|AB| = 1/4|CD|"),
    ("|AB|^(-2) = 1", "|AB|^-2 = 1"),
)


@pytest.mark.parametrize(("written", "unified"), CONDITIONS)
def test_synonyms_in_conditions_are_unified(written: str, unified: str) -> None:
    body = read_line("provided", written)
    assert show(body) == unified
    assert read_line("claim", unified) == body


CONTRACT = """
given: point P; points A, B, C; triangle ABC; quadrilateral ABCD; equilateral triangle ABC
given: isosceles triangle ABC with apex A; right triangle ABC with right angle at C; square ABCD
given: rectangle ABCD; parallelogram ABCD; rhombus ABCD; kite ABCD; trapezium ABCD
given: cyclic quadrilateral ABCD; tangential quadrilateral ABCD
given: regular pentagon ABCDE; regular hexagon ABCDEF
given: P on line AB; P on segment AB; P on ray AB; P on circle ABC; P on circle k; P on line l
given: P on perpendicular bisector of AB; P on bisector of angle BAC; P inside triangle ABC
given: M = midpoint of AB; D = foot of A on BC; D = foot of bisector of angle BAC on BC
given: A' = reflection of A in M; A' = reflection of A in line BC; G = centroid of ABC
given: O = circumcentre of ABC; H = orthocentre of ABC; I = incentre of ABC; J = excentre of ABC opposite A
given: N = nine-point centre of ABC; T = touch point of incircle of ABC on BC
given: D = apex of equilateral triangle on BC; D = apex of equilateral triangle on BC away from A
given: D = apex of equilateral triangle on BC towards A; D, E = corners of square on BC away from A
given: D, E = corners of square on BC towards A; X = meet of AB and CD
given: X = meet of l and m; X = meet of l and AB
given: X = meet of line l and circle k; X = meet of AB and circle k; X = meet of circle k and circle m
given: X = meet of line l and circle k other than A; X = meet of circle k and circle m other than A
given: k = circle ABC; k = circle with centre O through A; k = circle with diameter AB
given: k = circle with centre O and radius 2; k = incircle of ABC; l = line AB; l = parallel to AB through C
given: l = perpendicular to AB through C; l = tangent to k at A; A, B, C collinear; A, B, C, D concyclic
given: AB parallel to CD; AB perpendicular to CD; |DE| = |BC|/3; |PF| + |PG| = 4; l parallel to m
claim: A, B, C collinear; A, B, C, D concyclic; AB parallel to CD; AB perpendicular to CD; |DE| = |BC|/3
provided: C between A and B; P inside ABC; P outside ABC; P and Q on the same side of AB
provided: P and Q on opposite sides of AB; angle BAC acute; angle BAC right; angle BAC obtuse
provided: ABC acute; ABC obtuse
provided: ABCD convex; A, B distinct; |AB| < |AC|; not (A, B distinct or ABC acute) and ABCD convex
claim: |AB| = dist(P, BC); dist(P, l) < area(ABC); perimeter(ABC) = circumradius(ABC); inradius(ABC) > 0
claim: exradius(ABC, A) = median(ABC, A); altitude(ABC, A) <= bisector(ABC, A); cos(BAC) >= sin(BAC)
claim: 3/4 = 0.75; sqrt(|AB|) = abs(|AB| - 1); 2|AB| + 1/2|CD|*3 - |AB|/|CD|^2 = 1; 1 < |AB| <= 2
"""
STATEMENTS = [
    (line.split(":", 1)[0], text.strip())
    for line in CONTRACT.strip().splitlines()
    for text in line.split(":", 1)[1].split(";")
]


@pytest.mark.parametrize(("keyword", "text"), STATEMENTS, ids=lambda value: value)
def test_the_contract_reads_and_prints_again(keyword: str, text: str) -> None:
    body = read_line(keyword, text)
    assert read_line(keyword, show(body)) == body


@pytest.mark.parametrize(("keyword", "text"), STATEMENTS, ids=lambda value: value)
def test_the_contract_stands_in_a_sheet(keyword: str, text: str) -> None:
    """With what it refers to made before it, and nothing else."""
    body = read_line(keyword, text)
    new: set[str] = set()
    if isinstance(body, Fact):
        brought = [body.args[index] for index in FORMS[body.form].new]
        new = {part.name for arg in brought for part in parts(arg) if isinstance(part, Pt | Named)}
    used = {part.name for part in parts(body) if isinstance(part, Pt)} - new
    named = {part.name for part in parts(body) if isinstance(part, Named)} - new
    lines = [f"given point {name}" for name in sorted(used | {"U", "V", "W"})]
    both_circles = "circle m" in text
    for name in sorted(named):
        lines.append(
            f"given {name} = "
            + ("circle UVW" if name == "k" or (both_circles and name == "m") else "line UV")
        )
    lines.append(f"{keyword} {text}")
    (sheet,) = read_text("\n".join([*lines, "claim 1 = 1"]))
    assert body in [line.body for line in (*sheet.given, *sheet.provided, *sheet.claims)]
