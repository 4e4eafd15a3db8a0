"""Sheets of the benchmark's tests, read once."""

from __future__ import annotations

from pathlib import Path

import surdwise
from surdwise.sheet.tree import Sheet

EXAMPLES = Path(__file__).parents[2] / "examples"

# given lines and claim; published statements with their status over the components of the hypotheses:
# of auxiliary, squared and sign product (T true, F false, P true on parts)
CASES = {
    "point of a line": ("points P, Q\nX on line PQ", "|PX| + |XQ| = |PQ|", "PPT"),
    "three free points": ("points P, Q, X", "|PX| + |XQ| = |PQ|", "FFF"),
    "Pythagoras": ("right triangle ABC with right angle at C", "|AC|^2 + |BC|^2 = |AB|^2", "TTT"),
    "Ptolemy, free": ("points A, B, C, D", "|AB|*|CD| + |BC|*|DA| = |AC|*|BD|", "FFF"),
    "chords": ("equilateral triangle ABC\nP on circle ABC", "|PA| = |PB| + |PC|", "PPT"),
    "Euler line": (
        "triangle ABC\nO = circumcentre of ABC\nG = centroid of ABC\nH = orthocentre of ABC",
        "|OH| = 3|OG|",
        "PTT",
    ),
    "apexes on two sides": (
        "triangle ABC\nD = apex of equilateral triangle on BC\nE = apex of equilateral triangle on CA",
        "|AD| = |BE|",
        "PPP",
    ),
    "rectangle and point": ("rectangle ABCD\npoint P", "|PA|^2 + |PC|^2 = |PB|^2 + |PD|^2", "TTT"),
    "equal sides": ("isosceles triangle ABC with apex A", "|AB| = |AC|", "PTT"),
    "sides of a triangle": ("triangle ABC", "|AB| = |AC|", "FFF"),
    "two circles": (
        "points A, B\npoint C\nk = circle with centre A through C\nm = circle with centre B through C\n"
        "D = meet of k and m other than C",
        "|CD| = 2dist(C, AB)",
        "PTT",
    ),
    "third of a side": (
        "triangle PQR\nU on line PQ\n|PU| = |PQ|/3\nV on line PR\n|PV| = |PR|/3",
        "|UV| = |QR|/3",
        "PPP",
    ),
}


def sheet(name: str) -> Sheet:
    """One sheet of the table."""
    given, claim, _ = CASES[name]
    return text("".join(f"given {line}\n" for line in given.split("\n")) + f"claim {claim}\n")


def text(source: str) -> Sheet:
    """The only sheet of a text."""
    (s,) = surdwise.read(source)
    return s
