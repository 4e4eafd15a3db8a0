"""`python -m surdwise_recheck FILE`: one line a claim; exit code 0 accepted, 3 incomplete, 1 rejected."""

from __future__ import annotations

import argparse
import sys
from contextlib import suppress
from pathlib import Path

from .check import Refused, outcome_of, recheck
from .exact import Limits
from .witness import Outcome

CODES = {Outcome.ACCEPTED: 0, Outcome.INCOMPLETE: 3, Outcome.REJECTED: 1}


def main(arguments: list[str] | None = None) -> int:
    """Recheck one certificate and print what was found."""
    parser = argparse.ArgumentParser(prog="surdwise_recheck", description="Recheck a certificate.")
    parser.add_argument("file", type=Path)
    parser.add_argument("--time-limit", type=float, default=30.0, help="seconds for each claim's figures")
    asked = parser.parse_args(arguments)
    try:
        reports = recheck(asked.file, Limits(seconds=asked.time_limit))
    except (Refused, OSError) as e:
        print(f"rejected: {e}")
        return CODES[Outcome.REJECTED]
    lines = []
    for r in reports:
        lines.append(f"{r.outcome.value}: {r.text}: {r.verdict}")
        if r.outcome is not Outcome.ACCEPTED:
            lines.append(f"    step {r.step}: expected {r.expected}, found {r.found}")
    with suppress(BrokenPipeError):
        print("\n".join(lines), flush=True)
    return CODES[outcome_of(reports)]


if __name__ == "__main__":
    sys.exit(main())
