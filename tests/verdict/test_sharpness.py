"""Inequalities that are never equal: sharp in the limit or not.  Constants from Bottema et al.,
Geometric Inequalities (1969), 1.1, 1.19, 8.1, 8.2; from memory."""

from __future__ import annotations

import pytest

from surdwise import decide, read

MEDIANS = "median(ABC, A) + median(ABC, B) + median(ABC, C)"
SQUARES = "|AB|^2 + |BC|^2 + |CA|^2"
TABLE = [
    ("|AB| + |BC| > |CA|", "as B tends to segment AC"),
    (f"{MEDIANS} < perimeter(ABC)", "come together"),  # a needle
    (f"{MEDIANS} > 3/4 perimeter(ABC)", "tends to segment"),
    (f"4({MEDIANS}) > 2perimeter(ABC)", "no"),
    ("2median(ABC, A) < |AB| + |CA|", "as "),
    (f"{SQUARES} < perimeter(ABC)^2/2", "come together"),
    (f"{SQUARES} < 5/8perimeter(ABC)^2", "no"),
    ("2inradius(ABC) < |AB|", ""),  # equal to nothing in the limit either: see below
]


@pytest.mark.parametrize(("claim", "words"), TABLE, ids=[t[0] for t in TABLE])
def test_sharpness(claim: str, words: str) -> None:
    (sheet,) = read(f"given triangle ABC\nclaim {claim}\n")
    (d,) = decide(sheet)
    assert d.verdict.value == "holds"
    assert d.equality == "never"
    if words == "no":
        assert d.sharp == "no"
    elif words:
        assert d.sharp is not None and words in d.sharp
    else:
        assert d.sharp in (None, "no")


def test_nothing_is_said_of_figures_with_a_scale() -> None:
    (sheet,) = read("given triangle ABC\nclaim |AB| + |BC| + 1 > |CA|\n")
    assert decide(sheet)[0].sharp is None
