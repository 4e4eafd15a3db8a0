"""The corpus said otherwise: points renamed, runs turned, lines in another order.  The verdict and the
meaning of condition and equality case stay."""

from __future__ import annotations

import pytest

from surdwise import decide
from tests.attack.judge import in_frame

from .corpus import Entry, entries
from .renamed import Renaming
from .same import condition, differences
from .tidy import tidy

SOME, THIN = 150, 60


@pytest.mark.parametrize("entry", [pytest.param(e, id=e.name) for e in entries()])
def test_renamed(entry: Entry) -> None:
    renaming = Renaming(entry.sheet, entry.name)
    sheet = renaming.sheet(entry.sheet)
    for line, x, d in zip(sheet.claims, entry.expected, decide(sheet, time_limit=30), strict=True):
        assert d.verdict is x.verdict, (line.text, d.reason)
        jobs = [(x.condition, d.condition), (x.equality, d.equality)]
        for expected, printed in jobs:
            if expected is None:
                continue
            assert printed is not None, d.reason
            if in_frame(printed):
                continue
            said = [
                ("expected", renaming.said(condition(entry.sheet, expected))),
                ("printed", condition(sheet, printed)),
            ]
            if tidy(said[0][1]) == tidy(said[1][1]):
                continue
            found = differences(sheet, said, SOME, THIN)
            assert not found, (sheet.text, expected, printed, found[:3])


def test_renaming_changes_sheets() -> None:
    """Nearly every sheet comes out with other text; the number of lines stays."""
    changed = 0
    for e in entries():
        new = Renaming(e.sheet, e.name).sheet(e.sheet)
        changed += new.text != e.sheet.text
        assert len(new.given) == len(e.sheet.given)
        assert len(new.claims) == len(e.sheet.claims)
    assert changed > 0.95 * len(entries())
