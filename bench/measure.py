"""Timing of whole processes and of calls; medians, and the spread that belongs to them."""

from __future__ import annotations

import os
import subprocess
import sys
import time
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from pathlib import Path
from statistics import median

ROOT = Path(__file__).resolve().parents[1]


@dataclass(frozen=True)
class Timing:
    """Seconds: the median of repeated runs, the least and the greatest."""

    median: float
    least: float
    greatest: float

    @staticmethod
    def of(runs: Sequence[float]) -> Timing:
        """Of a list of seconds."""
        return Timing(median(runs), min(runs), max(runs))

    def __str__(self) -> str:
        return f"{show(self.median)} ({show(self.least)} .. {show(self.greatest)})"


def show(seconds: float) -> str:
    """A time in a fitting unit."""
    if seconds < 1e-3:
        return f"{seconds * 1e6:.0f} us"
    return f"{seconds * 1e3:.1f} ms" if seconds < 1 else f"{seconds:.2f} s"


def environment() -> dict[str, str]:
    """For child processes: the sources first, bytecode written and used."""
    env = {k: v for k, v in os.environ.items() if k != "PYTHONDONTWRITEBYTECODE"}
    env["PYTHONPATH"] = str(ROOT / "src")
    return env


def process(args: Sequence[str], stdin: str = "", seconds: float = 120.0) -> float:
    """Seconds of one whole process; raises TimeoutExpired past the limit."""
    start = time.perf_counter()
    subprocess.run(
        args,
        input=stdin,
        text=True,
        capture_output=True,
        cwd=ROOT,
        env=environment(),
        timeout=seconds,
        check=False,
    )
    return time.perf_counter() - start


def alternating(commands: Sequence[Sequence[str]], runs: int) -> list[Timing]:
    """Whole processes in turn, so that a slow moment of the machine meets all of them; one run of
    each comes first and is not counted (it warms the bytecode and the disk)."""
    taken: list[list[float]] = [[] for _ in commands]
    for k in range(runs + 1):
        for i, args in enumerate(commands):
            t = process(args)
            if k:
                taken[i].append(t)
    return [Timing.of(t) for t in taken]


def calls(work: Callable[[], object], runs: int) -> Timing:
    """Repeated calls in this process; the first is not counted."""
    taken = []
    for k in range(runs + 1):
        start = time.perf_counter()
        work()
        if k:
            taken.append(time.perf_counter() - start)
    return Timing.of(taken)


def python(*args: str) -> list[str]:
    """A command line of this interpreter."""
    return [sys.executable, *args]


def table(head: Sequence[str], rows: Sequence[Sequence[str]]) -> str:
    """A table in Markdown, its columns aligned for reading as it is."""
    widths = [max(len(r[i]) for r in [head, *rows]) for i in range(len(head))]
    lines = [
        "| " + " | ".join(c.ljust(w) for c, w in zip(r, widths, strict=True)) + " |" for r in [head, *rows]
    ]
    lines.insert(1, "|" + "|".join("-" * (w + 2) for w in widths) + "|")
    return "\n".join(lines)
