"""How much faster two workers are than one: `python -m tests.review.measure [COPIES]`.

Whole reviews of a folder with copies of short examples, one and two workers in turn; prints the
ratio of each pair.  Measure on an idle machine with two cores.
"""

from __future__ import annotations

import shutil
import subprocess
import sys
import tempfile
import time
from pathlib import Path

EXAMPLES = Path(__file__).parents[2] / "examples"
NAMES = ("chord-sum", "third-parallel", "euler-line", "erected-two", "altitude-foot", "isosceles-base")
CODE = "import sys; from surdwise.review import review; review(sys.argv[1], workers=int(sys.argv[2]))"
PAIRS = 5


def main(copies: int) -> None:
    """Print a line a pair."""
    with tempfile.TemporaryDirectory() as folder:
        for i in range(copies):
            for name in NAMES:
                shutil.copy(EXAMPLES / f"{name}.claim", Path(folder, f"{name}-{i}.claim"))
        for _ in range(PAIRS):
            taken = []
            for workers in "12":
                start = time.perf_counter()
                subprocess.run([sys.executable, "-c", CODE, folder, workers], check=True, capture_output=True)
                taken.append(time.perf_counter() - start)
            one, two = taken
            print(f"one worker {one:.2f} s, two workers {two:.2f} s, ratio {one / two:.2f}")


if __name__ == "__main__":
    main(int(sys.argv[1]) if len(sys.argv) > 1 else 12)
