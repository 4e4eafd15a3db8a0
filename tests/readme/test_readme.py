"""The README is true: its example, its reference, its Python snippet, its promises."""

from __future__ import annotations

import re
import subprocess
import sys

from .fill import README, ROOT, filled


def test_generated_parts_are_current() -> None:
    text = README.read_text(encoding="utf-8")
    assert filled(text) == text, "run `python -m tests.readme.fill`"


def test_first_paragraph_states_the_job() -> None:
    first = README.read_text(encoding="utf-8").split("\n\n")[1]
    assert "distances in plane figures" in first


def test_python_example_runs() -> None:
    (code,) = re.findall(r"```python\n(.*?)```", README.read_text(encoding="utf-8"), re.S)
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, cwd=ROOT)
    assert done.stdout == "conditional | not A and P on the same side of BC\n"


def test_top_level_is_the_agreed_one() -> None:
    done = subprocess.run(["git", "ls-files"], capture_output=True, text=True, cwd=ROOT)
    top = {line.split("/")[0] for line in done.stdout.splitlines()}
    assert top <= {
        "README.md", "DEVELOPERS.md", "LICENSE", "pyproject.toml", "src", "tests", "examples", "bench",
        ".ci", ".gitignore",
    }  # fmt: skip
