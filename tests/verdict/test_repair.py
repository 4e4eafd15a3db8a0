"""Every example: the repaired sheet holds as it stands, and says something."""

from __future__ import annotations

from pathlib import Path

import pytest

from surdwise import Verdict, decide, read, repair

EXAMPLES = sorted((Path(__file__).parents[2] / "examples").glob("*.claim"))


def test_there_are_examples() -> None:
    assert len(EXAMPLES) >= 15


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda p: p.stem)
def test_repaired_sheet_holds(path: Path) -> None:
    for sheet in read(path):
        decisions = decide(sheet)
        assert all(d.verdict is not Verdict.UNDECIDED for d in decisions)
        text = repair(sheet, decisions)
        if not any(d.verdict in (Verdict.HOLDS, Verdict.CONDITIONAL) for d in decisions):
            assert "# not repaired" in text
            continue
        for mended in read(text):
            for d in decide(mended):
                assert d.verdict is Verdict.HOLDS, (d.claim, d.condition)
