"""The whole command against the bare imports it needs, and where the difference goes."""

from __future__ import annotations

import re
import subprocess
from dataclasses import dataclass

from measure import ROOT, Timing, alternating, environment, python

COMMAND = ("-m", "surdwise", "decide", "examples/stretched-string.claim")
FLOOR = ("-c", "import flint, typer, lark")
TARGET = 2.5


def ratio(runs: int) -> tuple[Timing, Timing]:
    """The command, and the floor."""
    command, floor = alternating([python(*COMMAND), python(*FLOOR)], runs)
    return command, floor


@dataclass(frozen=True)
class Import:
    """One module: microseconds by itself, and with what it imports."""

    name: str
    own: int
    whole: int


def imports(args: tuple[str, ...]) -> dict[str, Import]:
    """Import times of a command, the least of five runs each."""
    best: dict[str, Import] = {}
    for _ in range(5):
        run = subprocess.run(
            python("-X", "importtime", *args),
            capture_output=True,
            text=True,
            cwd=ROOT,
            env=environment(),
            check=False,
        )
        for own, whole, name in re.findall(r"import time:\s+(\d+) \|\s+(\d+) \|\s*(\S+)", run.stderr):
            old = best.get(name)
            new = Import(name, int(own), int(whole))
            best[name] = (
                new if old is None else Import(name, min(old.own, new.own), min(old.whole, new.whole))
            )
    return best


def beyond_the_floor() -> tuple[list[Import], int, int]:
    """Modules that the command imports and the floor does not, slowest first; and the sums of
    import time of both."""
    mine, floor = imports(COMMAND), imports(FLOOR)
    extra = sorted((m for n, m in mine.items() if n not in floor), key=lambda m: -m.own)
    return extra, sum(m.own for m in mine.values()), sum(m.own for m in floor.values())
