"""Inequalities in three and more parameters: lemmas, equality cases, early counterexamples."""

from __future__ import annotations

import time

import pytest

from surdwise import Verdict, decide, read
from surdwise.sheet.tree import Comparison
from surdwise.verdict.triangles import prove

INSIDE = "given triangle ABC\ngiven P inside triangle ABC\n"
ANYWHERE = "given triangle ABC\ngiven point P\n"
FOUR = "given points A, B, C, D\n"
CONVEX = "given quadrilateral ABCD\nprovided ABCD convex\n"

# (figure, claim, verdict, equality); Bottema et al., Geometric Inequalities (1969), chapters 12 and 15,
# Euclid I.20 and I.21, Ptolemy; from memory
TABLE = [
    (INSIDE, "|PA| + |PB| < |CA| + |CB|", "holds", "never"),  # Euclid I.21
    (INSIDE, "|PA| + |PB| + |PC| < perimeter(ABC)", "holds", "never"),
    (ANYWHERE, "|PA| + |PB| + |PC| > perimeter(ABC)/2", "holds", "never"),
    (CONVEX, "|AC| + |BD| > |AB| + |CD|", "holds", "never"),
    (CONVEX, "2(|AC| + |BD|) > perimeter(ABC) + |CD| + |DA| - |CA|", "holds", "never"),
    (FOUR, "|AD| <= |AB| + |BC| + |CD|", "holds", "B between A and C and C between A and D"),
    (FOUR, "|AC| <= |AB| + |BC|", "holds", "B between A and C"),  # Euclid I.20
    (FOUR, "|AC|*|BD| > |AB|*|CD| + |BC|*|DA|", "fails", None),  # Ptolemy, reversed
    (
        "given quadrilateral ABCD\n",
        "|AC|*|BD| <= |AB|*|CD| + |BC|*|DA|",
        "holds",
        "A, B, C, D concyclic and ABCD convex",
    ),
    (ANYWHERE, "|PA|*|BC| <= |PB|*|CA| + |PC|*|AB|", "holds", None),
    ("given quadrilateral ABCD\n", "2area(ABCD) <= |AC|*|BD|", "holds", "AC perpendicular to BD"),
    (FOUR, "|AB|^2 + |BC|^2 + |CD|^2 + |DA|^2 >= |AC|^2 + |BD|^2", "holds", None),
    ("given triangle ABC\ngiven D on segment BC\n", "|AD| <= |AB| + |AC|", "holds", "never"),
    (ANYWHERE, "|PA| + |PB| + |PC| >= perimeter(ABC)", "conditional", None),
    (INSIDE, "|PA| + |PB| > |CA| + |CB|", "fails", "never"),
]


@pytest.mark.parametrize(("figure", "claim", "verdict", "equality"), TABLE, ids=[t[1] for t in TABLE])
def test_handbook(figure: str, claim: str, verdict: str, equality: str | None) -> None:
    (sheet,) = read(f"{figure}claim {claim}\n")
    (d,) = decide(sheet, time_limit=30)
    assert d.verdict.value == verdict, d.reason
    if equality is not None:
        assert set(str(d.equality).split(" and ")) == set(equality.split(" and ")), d.equality


def test_the_proof_is_said_in_words() -> None:
    (sheet,) = read(INSIDE + "claim |PA| + |PB| < |CA| + |CB|\n")
    (d,) = decide(sheet)
    assert "with X the meet of" in d.explanation
    assert "|AX| <" in d.explanation


# what is false, or does not follow from triangle inequalities, is not proved by them
FALSE = [
    (INSIDE, "|PA| + |PB| > |CA| + |CB|", 1),
    (INSIDE, "|PA| + |PB| < |CA|", -1),
    (ANYWHERE, "|PA| + |PB| < |CA| + |CB|", -1),
    ("given quadrilateral ABCD\n", "|AC| + |BD| > |AB| + |CD|", 1),  # not for crossed ones
    (FOUR, "|AD| <= |AB| + |BC|", -1),
    (FOUR, "|AD| <= |AB| + |BC| + |CD| - 1", -1),
]


@pytest.mark.parametrize(("figure", "claim", "sign"), FALSE, ids=[t[1] for t in FALSE])
def test_triangle_inequalities_do_not_prove(figure: str, claim: str, sign: int) -> None:
    (sheet,) = read(f"{figure}claim {claim}\n")
    body = sheet.claims[0].body
    assert isinstance(body, Comparison)
    names = ["A", "B", "C", "D" if "D" in figure else "P"]
    assert prove(sheet, names, body, sign) is None


def test_a_false_claim_dies_at_a_small_figure() -> None:
    (sheet,) = read("given points A, B, C, D, E\nclaim |AB| + |BC| + |CD| <= |DE| + |EA|\n")
    start = time.monotonic()
    (d,) = decide(sheet, time_limit=5)
    assert time.monotonic() - start < 30
    assert d.verdict is Verdict.CONDITIONAL
    assert d.fails_at is not None
    assert all(len(x) <= 4 for p in d.fails_at.values() for x in p.exact)
