"""A plugin for pytest: every claim of a project's .claim files is a test.

It is off until a project asks for it, in its settings (`claim_sheets = true`) or on the command
line (`--claim-sheets`).  A test passes if its claim's verdict is `holds`, or the one that a
comment at the end of the claim's line expects:

    claim |PA| = |PB| + |PC|   # expect: conditional

`claim_time_limit` (in the settings) are the seconds for each claim, 60 if not given.
"""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import replace
from pathlib import Path
from typing import TYPE_CHECKING, Any

import pytest

if TYPE_CHECKING:
    from .sheet import Sheet
    from .verdict.outcome import Decision

GRACE = 0.5  # seconds that a claim has to come to its own stop before it is killed

_EXPECT = re.compile(r"#\s*expect\s*:\s*(.*?)\s*$")
_LINE_END = re.compile(r"\r\n|\r|\n")


class Unexpected(Exception):
    """A claim whose verdict is not the expected one; the text is what the report shows."""


def pytest_addoption(parser: pytest.Parser) -> None:
    """The flag and the settings."""
    group = parser.getgroup("surdwise", "claim sheets")
    group.addoption(
        "--claim-sheets", action="store_true", default=None, help="test every claim of the .claim files"
    )
    parser.addini("claim_sheets", "test every claim of the .claim files", type="bool", default=False)
    parser.addini("claim_time_limit", "seconds for each claim", default="60")


def pytest_collect_file(file_path: Path, parent: pytest.Collector) -> pytest.Collector | None:
    """Claim files, where the project asks for them."""
    config = parent.config
    if file_path.suffix == ".claim" and (config.getoption("claim_sheets") or config.getini("claim_sheets")):
        return ClaimFile.from_parent(parent, path=file_path)
    return None


class ClaimFile(pytest.File):
    """A file of claim sheets."""

    def collect(self) -> Iterator[pytest.Item]:
        """One test a claim."""
        from .sheet import SheetError, read_file, show

        try:
            sheets = read_file(self.path)
            expected = expectations(self.path.read_text(encoding="utf-8-sig"))
        except SheetError as e:
            raise self.CollectError(str(e)) from None
        except ValueError as e:
            raise self.CollectError(f"{self.path}: {e}") from None
        claims = [(i, sheet, line) for i, sheet in enumerate(sheets, 1) for line in sheet.claims]
        stray = set(expected) - {line.span.line for _, _, line in claims}
        if stray:
            raise self.CollectError(f"{self.path}:{min(stray)}: `# expect:` stands behind a claim only")
        for i, sheet, line in claims:
            name = f"{i}: {show(line.body)}" if len(sheets) > 1 else show(line.body)
            wanted = expected.get(line.span.line, "holds")
            one = replace(sheet, claims=(line,))
            yield ClaimItem.from_parent(self, name=name, sheet=one, wanted=wanted)


class ClaimItem(pytest.Item):
    """One claim; it passes if its verdict is the wanted one."""

    def __init__(self, *, sheet: Sheet, wanted: str, **rest: Any) -> None:
        super().__init__(**rest)
        self.sheet = sheet
        self.wanted = wanted

    def runtest(self) -> None:
        """Decide the claim in a process that can be killed."""
        from .limits import LimitReached, run_guarded

        seconds = float(self.config.getini("claim_time_limit"))
        try:
            decision: Decision = run_guarded(_decided, self.sheet, seconds, seconds=seconds + GRACE)
        except LimitReached as e:
            if self.wanted != "undecided":
                raise Unexpected(f"expected the verdict {self.wanted}, got undecided\n{e}") from None
            return
        if decision.verdict.value != self.wanted:
            from .printing import decision_text

            head = f"expected the verdict {self.wanted}, got {decision.verdict.value}"
            raise Unexpected(f"{head}\n\n{decision_text(decision, colour=False)}")

    def repr_failure(self, excinfo: pytest.ExceptionInfo[BaseException], style: Any = None) -> Any:
        """The answer itself; no traceback."""
        if isinstance(excinfo.value, Unexpected):
            return str(excinfo.value)
        return super().repr_failure(excinfo)

    def reportinfo(self) -> tuple[Path, int, str]:
        """File and line (from 0) of the claim."""
        return self.path, self.sheet.claims[0].span.line - 1, self.name


def _decided(sheet: Sheet, seconds: float, tell: object) -> Decision:
    from .api import decide

    (decision,) = decide(sheet, time_limit=seconds)
    return decision


def expectations(text: str) -> dict[int, str]:
    """Expected verdicts by the number of their line, from 1.  Raises ValueError for a word that
    is no verdict."""
    from .verdict.outcome import Verdict

    known = [v.value for v in Verdict]
    out = {}
    for number, line in enumerate(_LINE_END.split(text), 1):
        found = _EXPECT.search(line)
        if found is None:
            continue
        if found.group(1) not in known:
            got = f"got {found.group(1)!r}"
            raise ValueError(f"line {number}: expected one of {', '.join(known)} behind `# expect:`, {got}")
        out[number] = found.group(1)
    return out
