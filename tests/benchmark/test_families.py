"""Families of sheets: every member has the verdict that is known beforehand."""

from __future__ import annotations

import pytest

import surdwise
from surdwise.benchmark.families import FAMILIES, FamilyError, Member, families, members

# members that take seconds and more are measured by the bench with the truth that is known
SLOW = {"line": 4, "roots": 0, "perimeter": 4, "chords": 5}
SOON = {("roots", 1, 1), ("roots", 2, 1), ("roots", 3, 1), ("roots", 4, 1), ("roots", 1, 2), ("roots", 3, 3)}


def soon(m: Member) -> bool:
    """Whether deciding it takes about a second at most."""
    return (m.family, *m.size) in SOON or m.size[0] <= SLOW.get(m.family, 9)


@pytest.mark.parametrize("m", [m for n in FAMILIES for m in members(n) if soon(m)], ids=lambda m: m.name)
def test_the_truth_is_as_known(m: Member) -> None:
    (sheet,) = surdwise.read(m.text)
    (d,) = surdwise.decide(sheet, time_limit=30)
    assert d.verdict is m.verdict, m.why


def test_every_member_is_read_and_grows() -> None:
    for name in FAMILIES:
        found = list(members(name))
        assert len(found) >= 4
        assert len({m.name for m in found}) == len(found)
        for m in found:
            (sheet,) = surdwise.read(m.text)
            assert len(sheet.claims) == 1


def test_what_is_not_there_is_named() -> None:
    with pytest.raises(FamilyError, match="expected one of line, row"):
        families("stars", 5)
    with pytest.raises(FamilyError, match="expected one of the sizes"):
        families("line", 2)
