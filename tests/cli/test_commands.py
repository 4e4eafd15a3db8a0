"""The commands as a script calls them: output, exit codes, limits, errors."""

from __future__ import annotations

import json
import subprocess
import sys
import time
from pathlib import Path

import pytest

EXAMPLES = Path(__file__).parents[2] / "examples"

FIELDS = {
    "file", "title", "claim", "verdict", "condition", "equality", "degenerate", "algebraic", "components",
    "variants", "links", "holds_at", "fails_at", "parameters", "frame", "seconds", "certificate",
}  # fmt: skip


def run(*args: str | Path) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        [sys.executable, "-m", "surdwise", *map(str, args)], capture_output=True, text=True, timeout=120
    )


@pytest.mark.parametrize(
    ("name", "code"),
    [("chord-sum-arc", 0), ("chord-sum", 1), ("no-such-figure", 1), ("incentre-not-excentre", 1)],
)
def test_exit_codes(name: str, code: int) -> None:
    done = run("decide", EXAMPLES / f"{name}.claim")
    assert done.returncode == code, done.stderr
    assert "\x1b" not in done.stdout  # plain text in a pipe
    assert done.stderr == ""


def test_json_has_the_fields_of_the_contract() -> None:
    done = run("decide", EXAMPLES / "chord-sum.claim", "--json")
    (line,) = done.stdout.splitlines()
    d = json.loads(line)
    assert set(d) >= FIELDS
    assert set(d["algebraic"]) == {"auxiliary", "squared", "sign_product", "eliminant", "minimal"}
    assert set(d["components"][0]) == {"degree", "status", "signs", "real"}
    assert set(d["holds_at"]["P"]) == {"exact", "float"}


def test_worst_code_counts(tmp_path: Path) -> None:
    bad = tmp_path / "bad.claim"
    bad.write_text("given triangle AB\nclaim |AB| = 1\n")
    done = run("decide", bad)
    assert done.returncode == 2
    assert f"{bad}:1:" in done.stderr
    assert "^" in done.stderr
    assert "Traceback" not in done.stderr
    assert run("decide", tmp_path / "missing.claim").returncode == 2


HEAVY = (
    "given triangle ABC\ngiven P inside triangle ABC\n"
    "claim |PA| + |PB| + |PC| >= 2(dist(P, AB) + dist(P, BC) + dist(P, CA))\n"
)


def test_time_limit_stops_the_work(tmp_path: Path) -> None:
    heavy = tmp_path / "heavy.claim"
    heavy.write_text(HEAVY)
    start = time.monotonic()
    done = run("decide", heavy, "--time-limit", "4", "--json")
    assert done.returncode == 3
    assert json.loads(done.stdout)["verdict"] == "undecided"
    assert "no figure was found where the claim fails" in json.loads(done.stdout)["reason"]
    assert time.monotonic() - start < 20


def test_what_is_proved_early_outlives_the_work(tmp_path: Path) -> None:
    """A single elimination that never looks at the clock is stopped all the same."""
    heavy = tmp_path / "heavy.claim"
    heavy.write_text("given quadrilateral ABCD\nclaim |AC| + |BD| > |AB| + |CD|\n")
    start = time.monotonic()
    done = run("decide", heavy, "--time-limit", "2", "--json")
    assert done.returncode == 1
    answer = json.loads(done.stdout)
    assert answer["verdict"] == "conditional"
    assert answer["holds_at"] and answer["fails_at"]
    assert "where the claim holds was not settled" in answer["reason"]
    assert time.monotonic() - start < 15


def test_memory_limit_stops_the_work(tmp_path: Path) -> None:
    heavy = tmp_path / "heavy.claim"
    heavy.write_text(
        "given triangle ABC\n"
        "claim bisector(ABC, A) + bisector(ABC, B) + bisector(ABC, C) <= sqrt(3)*perimeter(ABC)/2\n"
    )
    done = run(
        "decide", heavy, "--memory-limit", "16", "--frame", "cartesian", "--time-limit", "60", "--json"
    )
    assert done.returncode == 3
    assert "limit" in json.loads(done.stdout)["reason"]


@pytest.mark.parametrize("to", ["text", "latex", "sympy", "singular"])
def test_rewrite(to: str) -> None:
    done = run("rewrite", EXAMPLES / "chord-sum.claim", "--to", to, "--form", "sign_product")
    assert done.returncode == 0, done.stderr
    assert "x" in done.stdout


def test_rewrite_refuses_unknown_forms() -> None:
    assert run("rewrite", EXAMPLES / "chord-sum.claim", "--form", "best").returncode == 2


def test_compare_lists_five_formulations() -> None:
    done = run("compare", EXAMPLES / "chord-sum.claim", "--engine", "tower", "--repeat", "1")
    assert done.returncode == 0
    for name in ("auxiliary", "squared", "sign product", "eliminant", "minimal"):
        assert name in done.stdout


def test_version() -> None:
    done = run("--version")
    assert done.returncode == 0
    assert done.stdout.startswith("surdwise ")
