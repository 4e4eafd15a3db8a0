"""Every example's verdict against ten thousand random real figures (fewer where equations have
to be solved), and every figure handed out against every line of its sheet."""

from __future__ import annotations

from pathlib import Path

import pytest

from surdwise import decide, read
from surdwise.sheet import Fact

from .judge import complaints
from .sheets import SHEETS

EXAMPLES = sorted((Path(__file__).parents[2] / "examples").glob("*.claim"))


def _check(text: str) -> None:
    for sheet in read(text):
        solve = any(not isinstance(line.body, Fact) for line in sheet.given)
        for i, d in enumerate(decide(sheet)):
            found = list(complaints(sheet, i, d, 150 if solve else 10_000 // len(sheet.claims)))
            assert not found, (d.claim, d.verdict.value, d.condition, found[:3])


@pytest.mark.parametrize("path", EXAMPLES, ids=lambda p: p.stem)
def test_example(path: Path) -> None:
    _check(path.read_text(encoding="utf-8"))


@pytest.mark.parametrize("text", SHEETS, ids=lambda t: t.splitlines()[-1])
def test_sheet(text: str) -> None:
    _check(text + "\n")
