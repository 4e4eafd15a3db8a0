"""Claims as tests of a project, by running pytest on a project of its own."""

from __future__ import annotations

import os
import subprocess
import sys
from pathlib import Path

import pytest

SRC = Path(__file__).parents[2] / "src"

SHEET = """given points A, B
claim |AB| = |BA|
claim |AB| < |BA|   # expect: fails
claim |AB| <= |BA|  # expect: conditional
claim |AB| > |BA|
"""


def run(folder: Path, *args: str) -> tuple[int, str]:
    """Exit code and output of pytest with the plugin loaded once, however it is installed."""
    code = (
        "import sys, pytest, importlib.metadata as m\n"
        "known = any(e.value == 'surdwise.pytest_plugin' for e in m.entry_points(group='pytest11'))\n"
        "sys.exit(pytest.main(sys.argv[1:] + ([] if known else ['-p', 'surdwise.pytest_plugin'])))"
    )
    done = subprocess.run(
        [sys.executable, "-c", code, "-q", "-p", "no:cacheprovider", *args],
        cwd=folder,
        env=os.environ | {"PYTHONPATH": str(SRC)},
        capture_output=True,
        text=True,
        timeout=60,
    )
    return done.returncode, done.stdout + done.stderr


@pytest.fixture
def project(tmp_path: Path) -> Path:
    (tmp_path / "pytest.ini").write_text("[pytest]\n")
    (tmp_path / "a.claim").write_text(SHEET)
    return tmp_path


def test_off_until_asked_for(project: Path) -> None:
    code, text = run(project)
    assert code == 5, text  # nothing collected


def test_each_claim_is_a_test(project: Path) -> None:
    code, text = run(project, "--claim-sheets", "-rA")
    assert code == 1
    assert "2 failed, 2 passed" in text
    for claim in ("|AB| = |BA|", "|AB| < |BA|"):
        assert f"PASSED a.claim::{claim}" in text
    assert "expected the verdict conditional, got holds" in text
    assert "expected the verdict holds, got fails" in text
    assert "The text should not be printed" in text  # the answer itself
    assert "Traceback" not in text and "pytest_plugin.py" not in text


def test_settings(project: Path) -> None:
    (project / "pytest.ini").write_text("[pytest]\nclaim_sheets = true\nclaim_time_limit = 1\n")
    (project / "a.claim").write_text(
        "given triangle ABC\ngiven triangle ABD\nclaim inradius(ABC) + inradius(ABD) = |CD|\n"
        "---\ngiven triangle ABC\ngiven triangle ABD\n"
        "claim inradius(ABC) + inradius(ABD) = |CD|   # expect: undecided\n"
    )
    code, text = run(project)
    assert code == 1
    assert "1 failed, 1 passed" in text
    assert "expected the verdict holds, got undecided" in text


@pytest.mark.parametrize(
    ("text", "said"),
    [
        (SHEET.replace("fails", "true"), "line 3: expected one of holds, conditional"),
        ("# expect: holds\n" + SHEET, "a.claim:1: `# expect:` stands behind a claim only"),
        ("given triangle AB\nclaim |AB| = |BA|\n", "a.claim:1:16: expected three points"),
    ],
)
def test_what_is_wrong_is_said(project: Path, text: str, said: str) -> None:
    (project / "a.claim").write_text(text)
    code, told = run(project, "--claim-sheets")
    assert code == 2
    assert said in told
    assert "Traceback" not in told
