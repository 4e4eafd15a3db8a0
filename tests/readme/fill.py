"""Fill the generated parts of README.md: `python -m tests.readme.fill`.

The worked example's output and the language reference stand between marked comments; this
writes them anew from the program, and the test beside it says when they are stale.
"""

from __future__ import annotations

import re
import subprocess
import sys
from pathlib import Path

from surdwise.sheet.reference import markdown

ROOT = Path(__file__).parents[2]
README = ROOT / "README.md"
EXAMPLE = "examples/chord-sum.claim"


def parts() -> dict[str, str]:
    """The generated parts by the name of their comment."""
    sheet = (ROOT / EXAMPLE).read_text(encoding="utf-8")
    done = subprocess.run(
        [sys.executable, "-m", "surdwise", "decide", EXAMPLE], capture_output=True, text=True, cwd=ROOT
    )
    return {
        "sheet": _indented(sheet),
        "output": _indented(done.stdout),
        "reference": "\n" + markdown() + "\n",
    }


def _indented(text: str) -> str:
    return "".join(f"    {line}".rstrip() + "\n" for line in text.strip().splitlines())


def filled(readme: str) -> str:
    """The README with its generated parts made anew."""
    for name, text in parts().items():
        mark = re.compile(rf"(<!-- {name} -->\n).*?(<!-- /{name} -->)", re.S)
        readme = mark.sub(lambda m, text=text: m.group(1) + text + m.group(2), readme)  # type: ignore[misc]
    return readme


if __name__ == "__main__":
    README.write_text(filled(README.read_text(encoding="utf-8")), encoding="utf-8")
