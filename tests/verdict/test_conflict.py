"""An empty sheet names the lines that contradict each other, and no others."""

from __future__ import annotations

import pytest

from surdwise import Verdict, decide, read

# (sheet, the lines to be named); Euclid I.20, I.5 and III.20 stand behind the first three
TABLE = [
    (
        "given triangle ABC\ngiven point P\ngiven |AB| = 4\ngiven |BC| = 2\n"
        "given |CA| = 1\ngiven |PA| = |PB|\n",
        {3, 4, 5},
    ),
    ("given isosceles triangle ABC with apex A\nprovided |AB| < |AC|\nprovided |AB| < 2|BC|\n", {2}),
    (
        "given equilateral triangle ABC\ngiven P on circle ABC\n"
        "provided P and A on opposite sides of BC\nprovided |PA| < |PB|\n",
        {3, 4},
    ),
    ("given square ABCD\ngiven |AC| = |AB|\n", {2}),
    ("given triangle ABC\ngiven M = midpoint of AB\ngiven M on line BC\n", {3}),
]


@pytest.mark.parametrize(("text", "lines"), TABLE, ids=[t[0].splitlines()[-1] for t in TABLE])
def test_the_contradicting_lines_are_named(text: str, lines: set[int]) -> None:
    (sheet,) = read(text + "claim |AB| = |BC|\n")
    (d,) = decide(sheet)
    assert d.verdict is Verdict.EMPTY
    named = {n for n in range(1, 9) if f"line {n} " in d.reason}
    assert named == lines, d.reason
    assert d.reason.endswith("cannot hold" if len(lines) == 1 else "cannot hold together")
