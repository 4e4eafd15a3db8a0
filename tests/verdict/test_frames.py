"""The frame is a matter of cost, never of the answer: the same sheet in every frame that can hold
it gets the same verdict and an equivalent condition."""

from __future__ import annotations

from fractions import Fraction

import pytest
from flint import fmpq

from surdwise import decide, read
from surdwise.field.real import branches
from surdwise.figure.conditions import truth
from surdwise.figure.program import frames_for, program
from surdwise.verdict.frames import Trial
from surdwise.verdict.outcome import Decision

TRIANGLE = "given triangle ABC\n"
SHEETS = [
    TRIANGLE + "claim |AB| + |BC| > |CA|\n",
    TRIANGLE + "claim circumradius(ABC) >= 2inradius(ABC)\n",
    TRIANGLE + "claim circumradius(ABC) <= 2inradius(ABC)\n",
    TRIANGLE + "claim bisector(ABC, A) < median(ABC, A)\n",
    TRIANGLE + "claim perimeter(ABC)^2 >= 12*sqrt(3)*area(ABC)\n",
    TRIANGLE + "claim |AB|^2 + |BC|^2 + |CA|^2 <= 8circumradius(ABC)^2\n",
    TRIANGLE + "claim |AB|^2 + |BC|^2 = |CA|^2\n",
    TRIANGLE + "claim |AB| = |BC|\n",
    TRIANGLE + "claim |AB| = |AC| + 1\n",
    TRIANGLE + "given O = circumcentre of ABC\ngiven H = orthocentre of ABC\n"
    "claim |OH| < circumradius(ABC)\n",
    TRIANGLE + "given I = incentre of ABC\nclaim |IA|*|IB|*|IC| = 4circumradius(ABC)*inradius(ABC)^2\n",
    TRIANGLE + "given P on circle ABC\nclaim |PA|*|BC| = |PB|*|CA| + |PC|*|AB|\n",
    "given cyclic quadrilateral ABCD\nclaim |AC|*|BD| = |AB|*|CD| + |BC|*|DA|\n",
    "given equilateral triangle ABC\ngiven P on circle ABC\nclaim |PA| = |PB| + |PC|\n",
    "given square ABCD\ngiven P on circle ABC\nclaim |PA| + |PC| = sqrt(2)*|PB|\n",
]


@pytest.mark.parametrize("text", SHEETS, ids=[t.splitlines()[-1][6:] for t in SHEETS])
def test_every_frame_gives_the_same_answer(text: str) -> None:
    (sheet,) = read(text)
    kinds = frames_for(sheet)
    assert len(kinds) >= 2
    found = {k: decide(sheet, frame=k)[0] for k in kinds}
    first = found[kinds[0]]
    for kind, d in found.items():
        assert d.verdict is first.verdict, kind
        assert (d.equality == "never") == (first.equality == "never"), kind
        assert _agree(text, d, first), (kind, d.condition, first.condition)


def _agree(text: str, d: Decision, first: Decision) -> bool:
    """Whether two conditions mean the same, decided in the other frame: each implies the claim."""
    if d.condition == first.condition or d.in_frame or first.in_frame or d.condition in (None, "never"):
        return True
    body, claim = text.rsplit("claim ", 1)
    for condition in (d.condition, first.condition):
        (sheet,) = read(f"{body}provided {condition}\nclaim {claim}")
        if decide(sheet)[0].verdict.value != "holds":
            return False
    return True


# (frame, parameters of an admitted figure, what its docstring says is rational there)
RATIONAL = [
    ("sides", (2, 3), "|AB| + |BC| + |CA| = perimeter(ABC)^2"),
    ("incircle", (2, 3), "|AB| + circumradius(ABC) + inradius(ABC) + exradius(ABC, A) = area(ABC)"),
    ("half-angles", ("1/5", "1/3"), "|AB| + circumradius(ABC) + bisector(ABC, A) = area(ABC)"),
]


@pytest.mark.parametrize(("kind", "values", "claim"), RATIONAL)
def test_lengths_of_the_frame_need_no_root(kind: str, values: tuple[object, ...], claim: str) -> None:
    (sheet,) = read(f"given triangle ABC\nclaim {claim}\n")
    (comp,) = program(sheet, kind).run().components
    numbers = [Fraction(str(v)) for v in (*values, 1)]
    sample = {k: fmpq(numbers[k].numerator, numbers[k].denominator) for k in comp.free}
    trial = Trial(comp, branches(comp.ground(), sample)[0])
    before = comp.tower.degree
    assert trial.admitted([])
    truth(sheet.claims[0].body, trial)  # type: ignore[arg-type]
    assert comp.tower.degree == before
