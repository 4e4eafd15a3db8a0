"""Random sheets are decided within hard limits, and held against random figures."""

from __future__ import annotations

import json
import random
import subprocess
import sys
from pathlib import Path

import pytest

from surdwise.guarded import decided
from surdwise.sheet import read_text

from ..attack.judge import complaints
from .sheets import valid

COUNT, SEED = 60, 5
SECONDS, MEBIBYTES, FIGURES = 2.0, 600, 300


@pytest.mark.parametrize("n", range(COUNT))
def test_no_random_sheet_is_decided_wrongly(n: int) -> None:
    text = valid(random.Random(SEED * 1000 + n))
    (sheet,) = read_text(text)
    for i, d in enumerate(decided(sheet, SECONDS, MEBIBYTES)):
        assert d.verdict.value != "undecided" or d.reason
        # a claim that is true of needles only, or of tiny figures, may show on none of a few hundred
        found = [c for c in complaints(sheet, i, d, FIGURES) if "but never" not in c]
        assert not found, (text, d.claim, d.verdict.value, d.condition, found[:3])


# what would explode: each ends in a clear refusal (2) or within its limits
EXPLOSIVE = [
    "claim |AB|^64*|BC|^64 = |CA|^64 + 1",
    "claim " + " + ".join(["|DA|", "|DB|", "|DC|", "|AB|", "|BC|", "|CA|"] * 6) + " = area(ABC)",
    "claim " + "sqrt(" * 40 + "|AB|" + ")" * 40 + " = 2",
    "claim " + "abs(" * 60 + "|AB| - |BC|" + ")" * 60 + " = 0",
    "claim 10^64*|AB| = 3^64*|BC|",
    "claim |AB|^100000 = 1",
    "claim 9^9^9 = 1",
    "claim " + "(" * 5000 + "|AB|" + ")" * 5000 + " = 1",
    "claim " + "1" * 100_000 + " = |AB|",
    "claim (|DA| + |DB| + |DC| + |AB| + |BC|)^20 = 1",
]


@pytest.mark.parametrize("claim", EXPLOSIVE, ids=range(len(EXPLOSIVE)))
def test_what_would_explode_ends_within_limits(claim: str, tmp_path: Path) -> None:
    sheet = tmp_path / "a.claim"
    sheet.write_text(f"given triangle ABC\ngiven point D\n{claim}\n")
    command = [sys.executable, "-m", "surdwise", "decide", str(sheet), "--json"]
    limits = ["--time-limit", "2", "--memory-limit", "600"]
    run = subprocess.run([*command, *limits], capture_output=True, text=True, timeout=60, check=False)
    assert run.returncode in (0, 1, 2, 3)
    assert "Traceback" not in run.stderr
    if run.returncode == 2:
        assert "expected" in run.stderr
    else:
        answer = json.loads(run.stdout)
        assert answer["verdict"] != "undecided" or answer["reason"]
