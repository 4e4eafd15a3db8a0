"""LaTeX pages compile with a stock distribution and stay within their margins."""

from __future__ import annotations

import re
import shutil
import subprocess
from pathlib import Path

import pytest

from tests.report.pages import page

pytestmark = pytest.mark.skipif(shutil.which("pdflatex") is None, reason="pdflatex is not installed")


@pytest.mark.parametrize(
    "name", ["chord-sum", "parallelogram-law", "no-such-figure", "isosceles-base", "chain", "areas"]
)
def test_page_compiles(name: str, tmp_path: Path) -> None:
    (tmp_path / "page.tex").write_text(page(name, "tex"), encoding="utf-8")
    done = subprocess.run(
        ["pdflatex", "-interaction=nonstopmode", "-halt-on-error", "page.tex"],
        cwd=tmp_path,
        capture_output=True,
        timeout=120,
        check=False,
    )
    log = (tmp_path / "page.log").read_text(encoding="utf-8", errors="replace")
    assert done.returncode == 0, log[-2000:]
    assert "Missing character" not in log
    wide = [float(x) for x in re.findall(r"Overfull \\hbox \(([\d.]+)pt", log)]
    assert max(wide, default=0.0) < 15, wide
    assert (tmp_path / "page.pdf").read_bytes().startswith(b"%PDF")
