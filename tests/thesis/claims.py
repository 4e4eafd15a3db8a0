"""Claims whose formulations are computed and compared; each stands over free points."""

from __future__ import annotations

import surdwise
from surdwise.api import points_of
from surdwise.figure.scale import keeps_scale
from surdwise.sheet.tree import Comparison
from surdwise.thesis.formal import Thesis, thesis

CLAIMS = [
    # sums of distances
    "|AC| = |BC|",
    "|PX| + |XQ| = |PQ|",
    "|PX| - |XQ| = |PQ|",
    "|PA| = |PB| + |PC|",
    "|AB| + |CD| = |BC| + |DA|",
    "|AB|*|CD| + |BC|*|DA| = |AC|*|BD|",
    "|PA| + |PB| + |PC| = |AB| + |BC|",
    "|PA|^2 + |PC|^2 = |PB|^2 + |PD|^2",
    "|AB|^2 + |BC|^2 = |CA|^2",
    "2|AC| + 3|BC| = 4|AB|",
    "|AC| + |BC| = 2",
    "|AC|*|BC| = 1/2",
    "|AC|^3 + |BC|^3 = |AB|^3",
    "abs(|AC| - |BC|) = |AB|/2",
    # quotients
    "|PA|/|PB| = |QA|/|QB|",
    "|AC|/|BC| = 2",
    "|AB|/|AC| + |AC|/|AB| = 3",
    "1/|AC| + 1/|BC| = 1/|AB|",
    "(|AC| + |BC|)/(|BC| - |AC|) = 3",
    "|AC|/(|AB| + |BC|) = 1/2",
    # areas, radii, altitudes
    "area(ABC) = |AB|*|BC|/2",
    "area(ABCD) = |AB|*|BC|",
    "area(ABC) = area(ABD)",
    "4*area(ABC) = |AB|^2 + |AC|^2",
    "perimeter(ABC) = 3|AB|",
    "perimeter(ABC) = 2",
    "circumradius(ABC) = |AB|",
    "circumradius(ABC) = 2inradius(ABC)",
    "inradius(ABC) = |AB|/5",
    "exradius(ABC, A) = |AD|",
    "exradius(ABC, A) = 3inradius(ABC)",
    "altitude(ABC, A) = altitude(ABC, B)",
    "altitude(ABC, A) + altitude(ABC, B) = |AC|",
    "dist(P, AB) = dist(P, AC)",
    "dist(P, AB) + dist(P, BC) = |PA|",
    # medians and bisectors, roots under roots
    "median(ABC, A) = |AB|",
    "median(ABC, A) = median(ABC, B)",
    "median(ABC, A) + median(ABC, B) = 3/2*|AC|",
    "bisector(ABC, A) = |AB|/2",
    "bisector(ABC, A) = median(ABC, B)",
    "bisector(ABC, A) = bisector(ABC, B)",
    "bisector(ABC, A) + altitude(ABC, A) = |AC|",
    "sqrt(|AC|*|BC|) = |AB|",
    "sqrt(|AC|) + sqrt(|BC|) = 2*sqrt(|AB|)",
    "sqrt(|AC|*|BC|) + |AD| = |BD|",
    # angles, numeric roots
    "cos(BAC) = 1/3",
    "cos(ABC)*cos(BCA) = 1/4",
    "sin(ABC) + sin(BCA) = 1",
    "|AC| = sqrt(3)*|BC|",
    "|AC| + sqrt(2)*|BC| = sqrt(3)*|AB|",
    "area(ABC) = sqrt(3)/4*|AC|^2",
    "sqrt(2)*|AC| + sqrt(3)*|BC| = sqrt(6)*|AB|",
]


def comparison(claim: str) -> tuple[surdwise.Sheet, Comparison]:
    """The sheet of free points for a claim, and its equality."""
    names = [n for n in "ABCDPQX" if n in _capitals(claim)]
    (sheet,) = surdwise.read(f"given points {', '.join(names)}\nclaim {claim}\n")
    body = sheet.claims[0].body
    assert isinstance(body, Comparison)
    return sheet, body


def _capitals(claim: str) -> str:
    return "".join(c for c in claim if c.isupper())


def formal(claim: str) -> tuple[Thesis, Comparison]:
    """A claim's thesis in general coordinates."""
    sheet, body = comparison(claim)
    return thesis(body, points_of(body), keeps_scale(sheet)), body
