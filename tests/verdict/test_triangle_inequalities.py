"""Published triangle inequalities: true ones with their equality cases, false reversals and false
strengthenings.  Sources: Bottema, Djordjevic, Janic, Mitrinovic, Vasic, Geometric Inequalities
(1969), by chapter; all values from memory."""

from __future__ import annotations

import pytest

from surdwise import Verdict, decide, read

P = "perimeter(ABC)"
S = "area(ABC)"
R = "circumradius(ABC)"
r = "inradius(ABC)"
AB, BC, CA = "|AB|", "|BC|", "|CA|"
SUM2 = "(|AB|^2 + |BC|^2 + |CA|^2)"
PAIRS = "(|AB|*|BC| + |BC|*|CA| + |CA|*|AB|)"
MEDIANS = "(median(ABC, A) + median(ABC, B) + median(ABC, C))"
ALTITUDES = "(altitude(ABC, A) + altitude(ABC, B) + altitude(ABC, C))"
EXRADII = "(exradius(ABC, A) + exradius(ABC, B) + exradius(ABC, C))"

HOLDS, FAILS, SOME = Verdict.HOLDS, Verdict.FAILS, Verdict.CONDITIONAL
EQUAL = "equilateral"

TABLE = [
    # sides (chapter 1)
    (f"{AB} + {BC} > {CA}", HOLDS, "never"),
    (f"abs({AB} - {BC}) < {CA}", HOLDS, "never"),
    (f"3*{PAIRS} <= {P}^2", HOLDS, EQUAL),
    (f"{P}^2 < 4*{PAIRS}", HOLDS, "never"),
    (f"{P}^2 < 3*{PAIRS}", FAILS, None),
    (f"3*{SUM2} >= {P}^2", HOLDS, EQUAL),
    (f"2*{SUM2} < {P}^2", HOLDS, "never"),
    (f"2*{SUM2} > {P}^2", FAILS, None),
    (f"{SUM2} >= {PAIRS}", HOLDS, EQUAL),
    (f"({AB} + {BC} - {CA})*({BC} + {CA} - {AB})*({CA} + {AB} - {BC}) <= {AB}*{BC}*{CA}", HOLDS, EQUAL),
    (f"({AB} + {BC})*({BC} + {CA})*({CA} + {AB}) >= 8{AB}*{BC}*{CA}", HOLDS, EQUAL),
    (f"({AB} + {BC})*({BC} + {CA})*({CA} + {AB}) >= 9{AB}*{BC}*{CA}", SOME, None),
    (f"{AB}/({BC} + {CA}) + {BC}/({CA} + {AB}) + {CA}/({AB} + {BC}) < 2", HOLDS, "never"),
    (f"{AB}/({BC} + {CA}) + {BC}/({CA} + {AB}) + {CA}/({AB} + {BC}) >= 3/2", HOLDS, EQUAL),
    # area (chapter 4)
    (f"{SUM2} >= 4*sqrt(3)*{S}", HOLDS, EQUAL),
    (f"{SUM2} >= 7*{S}", SOME, None),
    (f"{PAIRS} >= 4*sqrt(3)*{S}", HOLDS, EQUAL),
    (f"{P}^2 >= 12*sqrt(3)*{S}", HOLDS, EQUAL),
    (f"{P}^2 <= 12*sqrt(3)*{S}", FAILS, None),
    (f"2*{S} <= {AB}*{BC}", HOLDS, "right at B"),
    # radii (chapter 5)
    (f"{R} >= 2*{r}", HOLDS, EQUAL),
    (f"{R} > 2*{r}", SOME, None),
    (f"{R} <= 2*{r}", FAILS, None),
    (f"{P}^2/4 >= 27*{r}^2", HOLDS, EQUAL),
    (f"2*{P} <= 6*sqrt(3)*{R}", HOLDS, EQUAL),
    (f"{P}/2 > 2*{R}", SOME, None),
    (f"{EXRADII} >= 9*{r}", HOLDS, EQUAL),
    (f"2*{EXRADII} <= 9*{R}", HOLDS, EQUAL),
    (f"2*{EXRADII} >= 9*{r}", HOLDS, "never"),
    (f"{SUM2} <= 9*{R}^2", HOLDS, EQUAL),
    (f"{SUM2} <= 8*{R}^2", SOME, None),
    (f"{AB}*{BC}*{CA} <= 3*sqrt(3)*{R}^3", HOLDS, EQUAL),
    # altitudes (chapter 6)
    (f"{ALTITUDES} >= 9*{r}", HOLDS, EQUAL),
    (f"{ALTITUDES} < {P}", HOLDS, "never"),
    (f"2*{ALTITUDES} <= sqrt(3)*{P}", HOLDS, EQUAL),
    ("altitude(ABC, A) <= median(ABC, A)", HOLDS, "isosceles"),
    # bisectors and medians (chapter 8)
    ("altitude(ABC, A) <= bisector(ABC, A)", HOLDS, "isosceles"),
    ("bisector(ABC, A) <= median(ABC, A)", HOLDS, "isosceles"),
    ("bisector(ABC, A) >= median(ABC, A)", FAILS, None),
    (f"2median(ABC, A) < {AB} + {CA}", HOLDS, "never"),
    (f"2median(ABC, A) > {AB} + {CA} - {BC}", HOLDS, "never"),
    (f"{MEDIANS} < {P}", HOLDS, "never"),
    (f"4*{MEDIANS} > 3*{P}", HOLDS, "never"),
    (f"{MEDIANS} >= {P}", FAILS, None),
    (f"2*{MEDIANS} <= 9*{R}", HOLDS, EQUAL),
    ("median(ABC, A)^2 >= area(ABC)*cos(BAC)", HOLDS, None),
    (f"median(ABC, A) + median(ABC, B) > 3/2*{AB}", HOLDS, "never"),
]

WORDS = {
    EQUAL: {"|AB| = |AC| and |AB| = |BC|", "|AB| = |BC| and |AB| = |AC|"},
    "isosceles": {"|AB| = |AC|"},
    "right at B": {"angle ABC right", "angle CBA right"},
    "never": {"never"},
}


def test_there_are_forty() -> None:
    assert len(TABLE) >= 40


@pytest.mark.parametrize(("claim", "verdict", "equality"), TABLE, ids=[row[0] for row in TABLE])
def test_inequality(claim: str, verdict: Verdict, equality: str | None) -> None:
    (sheet,) = read(f"given triangle ABC\nclaim {claim}\n")
    (d,) = decide(sheet)
    assert d.verdict is verdict, (d.condition, d.equality)
    if equality is not None:
        assert d.equality in WORDS[equality] or (
            equality == EQUAL and d.equality is not None and d.equality.count(" = ") == 2
        ), d.equality
