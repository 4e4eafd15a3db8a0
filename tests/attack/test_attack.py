"""Every example and every sheet of sheets.py against random real figures; see judge.py."""

from __future__ import annotations

from pathlib import Path

import pytest

from surdwise import Sheet
from surdwise.guarded import decided
from surdwise.sheet import read_file, read_text

from ..verdict.test_triangle_inequalities import TABLE as INEQUALITIES
from .handbook import HANDBOOK
from .judge import complaints
from .sheets import SHEETS

FIGURES = 10_000
SECONDS = 12.0  # each claim, in a process that is stopped then: what is proved by then is checked
EXAMPLES = Path(__file__).parents[2] / "examples"


def all_sheets() -> list[tuple[str, Sheet]]:
    out = [(p.name, s) for p in sorted(EXAMPLES.glob("*.claim")) for s in read_file(p)]
    for text in (*SHEETS, *HANDBOOK):
        for s in read_text(text.strip() + "\n", "sheets.py"):
            out.append((s.title or s.claims[0].text, s))
    for row in INEQUALITIES:
        out += [(row[0], s) for s in read_text(f"given triangle ABC\nclaim {row[0]}\n")]
    return out


@pytest.mark.parametrize("sheet", [pytest.param(s, id=name) for name, s in all_sheets()])
def test_decisions(sheet: Sheet) -> None:
    for i, d in enumerate(decided(sheet, SECONDS)):
        found = complaints(sheet, i, d, FIGURES)
        assert not found, (d.claim, d.verdict.value, d.condition, found[:4])
