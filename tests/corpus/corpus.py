"""The corpus: claim sheets with the answer that is expected of every claim beside it.

Behind each `claim` line stands a comment, written from knowledge of the statement and not from the
program's answer:

    # expect VERDICT              VERDICT is holds, conditional, fails, empty
    # expect VERDICT: CONDITION   where a conditional or failing claim holds, or `never`
    # equality: CONDITION         for an inequality: its equality cases, or `never`

A CONDITION is one of the sheet language.  It is compared by meaning, see same.py.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from functools import cache
from pathlib import Path

from surdwise import Sheet, Verdict
from surdwise.sheet import read_text

SHEETS = Path(__file__).parent / "sheets"
_COMMENT = re.compile(r"# (expect|equality:) (.+)")


@dataclass(frozen=True)
class Expected:
    """What is expected of one claim; None for a condition that is not given."""

    verdict: Verdict
    condition: str | None = None
    equality: str | None = None


@dataclass(frozen=True)
class Entry:
    """One sheet of the corpus, with the answer expected of each of its claims."""

    name: str
    sheet: Sheet
    expected: tuple[Expected, ...]


@cache
def entries() -> tuple[Entry, ...]:
    """All sheets of the corpus, file by file."""
    out = []
    for path in sorted(SHEETS.glob("*.claim")):
        for chunk in re.split(r"^---$", path.read_text(encoding="utf-8"), flags=re.M):
            (sheet,) = read_text(chunk, path.name)
            expected = tuple(_expected(part) for part in re.split(r"^claim .*$", chunk, flags=re.M)[1:])
            assert sheet.title and sheet.source, f"{path.name}: title and source: {chunk}"
            assert len(expected) == len(sheet.claims)
            out.append(Entry(f"{path.stem}: {sheet.title}", sheet, expected))
    return tuple(out)


def _expected(part: str) -> Expected:
    """The comments behind one claim."""
    verdict, condition, equality = "", None, None
    for kind, text in _COMMENT.findall(part):
        if kind == "expect":
            verdict, _, words = text.partition(": ")
            condition = words or None
        else:
            equality = text
    found = Verdict(verdict)
    assert (condition is not None) == (found in (Verdict.CONDITIONAL, Verdict.FAILS)), part
    return Expected(found, condition, equality)
