"""What a review shows: a bar on a terminal while it runs, a few lines when it is done."""

from __future__ import annotations

import sys
import time
from collections import Counter
from collections.abc import Sequence
from types import TracebackType

from .result import UNREADABLE, Kind, Result

ORDER = ("holds", "conditional", "fails", "empty", "undecided")
_OFTEN = 0.1  # seconds between two drawings of the bar


class Bar:
    """Progress on a terminal: how many claims of all, what they came to, time left; silent in a
    pipe."""

    def __init__(self, total: int, wanted: bool) -> None:
        self._counts: Counter[str] = Counter()
        self._total = total
        self._wanted = wanted and sys.stderr.isatty() and total > 0
        self._drawn = 0.0

    def __enter__(self) -> Bar:
        if self._wanted:
            from rich import progress as rich
            from rich.console import Console

            counts = rich.TextColumn("{task.description}")
            columns = (rich.BarColumn(30), rich.MofNCompleteColumn(), rich.TimeRemainingColumn(), counts)
            # drawn from this thread only: workers are forked from this process
            self._progress = rich.Progress(
                *columns, console=Console(stderr=True), transient=True, auto_refresh=False
            )
            self._task = self._progress.add_task("", total=self._total)
            self._progress.start()
        return self

    def __exit__(
        self, kind: type[BaseException] | None, error: BaseException | None, trace: TracebackType | None
    ) -> None:
        if self._wanted:
            self._progress.stop()

    def add(self, verdict: str) -> None:
        """One more claim is done."""
        self._counts[verdict] += 1
        if self._wanted:
            self._progress.update(self._task, advance=1, description=tally(self._counts))
        self.tick()

    def tick(self) -> None:
        """Draw the bar if it was not drawn just now."""
        now = time.monotonic()
        if self._wanted and now - self._drawn > _OFTEN:
            self._drawn = now
            self._progress.refresh()


def tally(counts: Counter[str]) -> str:
    """How many of each verdict."""
    return ", ".join(f"{counts[v]} {v}" for v in ORDER if counts[v])


def closing(results: Sequence[Result]) -> str:
    """The claims that do not simply hold, and the count of all."""
    lines = []
    for r in results:
        if r.kind is Kind.PASS or r.verdict == UNREADABLE:
            continue
        lines.append(f"{r.name}  {r.label}")
        lines.append(f"    {r.verdict.upper()}{': ' + r.message if r.message else ''}")
    claims = [r for r in results if r.verdict != UNREADABLE]
    bad = len(results) - len(claims)
    files = len({r.name for r in results})
    text = f"{_many(len(claims), 'claim')} in {_many(files, 'file')}"
    counted = tally(Counter(r.verdict for r in claims))
    text += f": {counted}" if counted else ""
    if bad:
        text += f"; {_many(bad, 'file')} cannot be read"
    return "\n".join([*lines, text])


def _many(n: int, word: str) -> str:
    return f"{n} {word}" if n == 1 else f"{n} {word}s"
