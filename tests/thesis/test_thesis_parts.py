"""Statuses of published theorems over the components of their hypotheses.

The counts are recomputed, where it can be asked in reasonable time, by Singular's decomposition
of the hypotheses with every length an unknown.
"""

from __future__ import annotations

import pytest

import surdwise
from surdwise.figure.program import program
from surdwise.sheet.tree import Comparison, Relation
from surdwise.thesis.parts import Form, Part, Status, parts, statuses

from ..field.outside import needs_singular, singular

T, F, P = Status.TRUE.value, Status.FALSE.value, Status.PARTS.value

# given lines, claim; parts and how many of them are true; status of auxiliary, squared, product
CASES = {
    "point of a line": ("points P, Q\nX on line PQ", "|PX| + |XQ| = |PQ|", 8, 2, (P, P, T)),
    "three free points": ("points P, Q, X", "|PX| + |XQ| = |PQ|", 2, 0, (F, F, F)),
    "Thales": (
        "points A, B\nk = circle with diameter AB\nP on circle k",
        "AP perpendicular to BP",
        1,
        1,
        (T, T, T),
    ),
    "Pythagoras": ("right triangle ABC with right angle at C", "|AC|^2 + |BC|^2 = |AB|^2", 1, 1, (T, T, T)),
    "Ptolemy": ("cyclic quadrilateral ABCD", "|AB|*|CD| + |BC|*|DA| = |AC|*|BD|", 8, 2, (P, P, T)),
    "Ptolemy, any order": (
        "triangle ABC\nD on circle ABC",
        "|AB|*|CD| + |BC|*|DA| = |AC|*|BD|",
        8,
        2,
        (P, P, T),
    ),
    "Ptolemy, free": ("points A, B, C, D", "|AB|*|CD| + |BC|*|DA| = |AC|*|BD|", 2, 0, (F, F, F)),
    "chords of an equilateral triangle": (
        "equilateral triangle ABC\nP on circle ABC",
        "|PA| = |PB| + |PC|",
        4,
        1,
        (P, P, T),
    ),
    "Euler line": (
        "triangle ABC\nO = circumcentre of ABC\nG = centroid of ABC\nH = orthocentre of ABC",
        "|OH| = 3|OG|",
        2,
        1,
        (P, T, T),
    ),
    "apexes on two sides": (
        "triangle ABC\nD = apex of equilateral triangle on BC\nE = apex of equilateral triangle on CA",
        "|AD| = |BE|",
        3,
        1,
        (P, P, P),
    ),
    "apexes on three sides": (
        "triangle ABC\nD = apex of equilateral triangle on BC\nE = apex of equilateral triangle on CA"
        "\nF = apex of equilateral triangle on AB",
        "|AD| = |BE|",
        6,
        2,
        (P, P, P),
    ),
    "rectangle and point": ("rectangle ABCD\npoint P", "|PA|^2 + |PC|^2 = |PB|^2 + |PD|^2", 1, 1, (T, T, T)),
    "parallelogram law": ("parallelogram ABCD", "|AC|^2 + |BD|^2 = 2|AB|^2 + 2|BC|^2", 1, 1, (T, T, T)),
    "equal sides": ("isosceles triangle ABC with apex A", "|AB| = |AC|", 2, 1, (P, T, T)),
    "sides of a triangle": ("triangle ABC", "|AB| = |AC|", 2, 0, (F, F, F)),
}


def found(name: str) -> list[Part]:
    given, claim, *_ = CASES[name]
    text = "".join(f"given {line}\n" for line in given.split("\n")) + f"claim {claim}\n"
    (sheet,) = surdwise.read(text)
    body = sheet.claims[0].body
    assert isinstance(body, (Comparison, Relation))
    return [p for c in program(sheet).run().components for p in parts(c, body)]


@pytest.mark.parametrize("name", CASES)
def test_parts_and_statuses(name: str) -> None:
    _, _, count, true, expected = CASES[name]
    mine = found(name)
    assert (len(mine), sum(p.true for p in mine)) == (count, true)
    table = statuses(mine, mine[:1])
    got = [table[f.value].value for f in (Form.AUXILIARY, Form.SQUARED, Form.SIGN_PRODUCT)]
    assert tuple(got) == expected
    assert table[Form.ELIMINANT.value] is table[Form.SIGN_PRODUCT.value]


@pytest.mark.parametrize("name", CASES)
def test_a_part_never_holds_both_ways_unless_it_vanishes(name: str) -> None:
    """left = right and left = -right together mean left = 0; no case here says that, and the true
    parts come in mirrored pairs where every length is dependent."""
    for p in found(name):
        if isinstance(CASES[name][1], str) and "perpendicular" in CASES[name][1]:
            continue
        assert not (p.true and p.opposite)
        assert len(p.signs.replace(" ", "")) == len(p.folds)


def test_the_command_counts_eight_components_of_three_collinear_points() -> None:
    """The same through the whole program, where the line comes as a hypothesis."""
    (sheet,) = surdwise.read("given points P, Q, X\ngiven P, Q, X collinear\nclaim |PX| + |XQ| = |PQ|\n")
    (d,) = surdwise.decide(sheet)
    assert len(d.components) == 8
    assert sum(c.status == T for c in d.components) == 2
    # of the eight, three have real figures with no negative length: X between, beyond P, beyond Q
    assert sum(c.real for c in d.components) == 3
    assert sum(c.real and c.status == T for c in d.components) == 1
    assert [d.algebraic[f.value] for f in Form] == [P, P, T, T, T]


def test_no_component_is_a_status_of_its_own() -> None:
    assert set(statuses([], []).values()) == {Status.NONE}


# free coordinates, unknowns, hypotheses, thesis (its zero on a component is asked)
IDEALS = {
    "point of a line": ("u", "a,b,c", "a^2-u^2, b^2-(u-1)^2, c^2-1", "a+b-c"),
    "three free points": ("u,v", "a,b,c", "a^2-u^2-v^2, b^2-(u-1)^2-v^2, c^2-1", "a+b-c"),
    "chords of an equilateral triangle": (
        # A = (0,0), B = (1,0), C = (1/2, h), circle x^2 + y^2 - x = 2hy/3; P by its slope u
        "u",
        "h,x,y,a,b,c",
        "4*h^2-3, y-u*x, 3*x+3*u^2*x-3-2*h*u, a^2-x^2-y^2, b^2-(x-1)^2-y^2, c^2-(x-1/2)^2-(y-h)^2",
        "a-b-c",
    ),
    "apexes on two sides": (
        # C = (0,0), B = (1,0), A = (u,v); D = (x,y) over BC, E = (z,w) over CA
        "u,v",
        "x,y,z,w,a,b",
        "x^2+y^2-(x-1)^2-y^2, x^2+y^2-1, z^2+w^2-(z-u)^2-(w-v)^2, z^2+w^2-u^2-v^2,"
        "a^2-(x-u)^2-(y-v)^2, b^2-(z-1)^2-w^2",
        "a-b",
    ),
    "equal sides": ("v", "a,b", "a^2-1/4-v^2, b^2-1/4-v^2", "a-b"),
}


@needs_singular
@pytest.mark.parametrize("name", IDEALS)
def test_parts_are_singulars_components(name: str) -> None:
    free, unknown, ideal, thesis = IDEALS[name]
    out = singular(
        'LIB "primdec.lib";\n'
        f"ring r = (0,{free}), ({unknown}), dp;\nideal i = {ideal};\npoly e = {thesis};\n"
        "list l = minAssGTZ(i); int k; int n;\n"
        "for (k=1; k<=size(l); k++) { n = n + (reduce(e, std(l[k])) == 0); }\nsize(l); n;"
    )
    count, true = map(int, out.split())
    assert (count, true) == CASES[name][2:4]
