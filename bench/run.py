"""Ratios measured in one run: `python bench/run.py [--peers SECONDS]`.

Speed is never a timed test; it is judged here, each figure next to a yardstick taken in the
same run on the same machine.  Writes bench/results.md.
"""

from __future__ import annotations

import argparse
import datetime
import os
import platform
import subprocess
import sys
import time
from pathlib import Path
from statistics import median

from peers import inequality_table

from surdwise import Form, decide, read
from surdwise.thesis.formal import thesis
from surdwise.thesis.formulations import formulate

ROOT = Path(__file__).parents[1]
MEDIANS = (
    "given triangle ABC\n"
    "claim 2*(2median(ABC, A) + 2median(ABC, B) + 2median(ABC, C)) = 3*(|AB| + |BC| + |CA|)\n"
)
# the ideal of the same elimination: squares of the three doubled medians and two sides
SINGULAR = """
ring r = 0, (p, q, w, a, b, u, v), dp;
poly e = 2*(p + q + w) - 3*(a + b + 1);
ideal i = e, p^2 - (2*u - 1)^2 - 4*v^2, q^2 - (u + 1)^2 - v^2, w^2 - (u - 2)^2 - v^2,
  a^2 - (u - 1)^2 - v^2, b^2 - u^2 - v^2;
system("--ticks-per-sec", 1000);
int t = rtimer;
ideal j = eliminate(i, p*q*w*a*b);
print(rtimer - t);
print(deg(j[1])); print(size(j[1]));
quit;
"""


def process_ratio(runs: int) -> list[str]:
    """Whole processes, alternating: the three-point sheet against importing its libraries."""
    env = {k: v for k, v in os.environ.items() if k != "PYTHONDONTWRITEBYTECODE"}
    ours = [sys.executable, "-m", "surdwise", "decide", "examples/stretched-string.claim"]
    base = [sys.executable, "-c", "import flint, typer, lark"]
    times: dict[str, list[float]] = {"ours": [], "base": []}
    for i in range(runs + 1):
        for name, command in (("ours", ours), ("base", base)):
            start = time.perf_counter()
            subprocess.run(command, cwd=ROOT, env=env, stdout=subprocess.DEVNULL, check=False)
            if i:
                times[name].append(time.perf_counter() - start)
    a, b = median(times["ours"]), median(times["base"])
    return [
        "## A small sheet, whole process",
        "",
        f"`decide examples/stretched-string.claim`: {a:.3f} s; `import flint, typer, lark`: {b:.3f} s; "
        f"ratio {a / b:.2f} (medians of {runs} alternating runs; target at most 2.5).",
        "",
    ]


def medians_norm() -> list[str]:
    """The norm of 2(p + q + w) - 3(a + b + 1) against the same elimination in Singular."""
    (sheet,) = read(MEDIANS)
    claim = sheet.claims[0].body
    t = thesis(claim, ["A", "B", "C"], False)  # type: ignore[arg-type]
    runs = [formulate(t, Form.SIGN_PRODUCT) for _ in range(15)]
    f = runs[0]
    ours = median(r.seconds for r in runs)
    out = ["## The medians' norm", ""]
    head = f"surdwise: {ours * 1000:.2f} ms, degree {f.degree}, {f.terms} terms"
    try:
        start = time.perf_counter()
        done = subprocess.run(["Singular", "-q"], input=SINGULAR, capture_output=True, text=True, timeout=300)
        whole = time.perf_counter() - start
        inside, degree, size = (int(x) for x in done.stdout.split()[:3])
        out.append(
            f"{head}; Singular `eliminate` on the same ideal: {inside} ms by its own timer "
            f"({whole:.2f} s as a process), degree {degree}, {size} terms; "
            f"ratio {inside / (ours * 1000):.0f} (target at least 100)."
        )
    except (OSError, ValueError, subprocess.TimeoutExpired) as e:
        out.append(f"{head}; Singular gave no figure ({type(e).__name__}).")
    return [*out, ""]


def growth() -> list[str]:
    """Sign products of sums of r independent distances in d parameters: seconds, terms, and the
    time of one multiplication that writes a polynomial of that size."""
    rows = ["## Growth of the sign product", "", "| radicals | parameters | terms | seconds | per term |"]
    rows.append("| --- | --- | --- | --- | --- |")
    for d, points in ((2, "ABC"), (4, "ABCD")):
        pairs = [(x, y) for i, x in enumerate(points) for y in points[:i]]
        sums = [f"|{x}{y}|" for x, y in pairs if (x, y) != ("B", "A")]
        sums += [f"median({points[:3]}, {x})" for x in points[:3]]
        for r in range(2, min(len(sums), 5 if d == 4 else 5) + 1):
            text = f"given points {', '.join(points)}\nclaim {' + '.join(sums[:r])} = |AB|\n"
            (sheet,) = read(text)
            t = thesis(sheet.claims[0].body, list(points), False)  # type: ignore[arg-type]
            start = time.perf_counter()
            f = formulate(t, Form.SIGN_PRODUCT)
            s = time.perf_counter() - start
            rows.append(f"| {r} | {d} | {f.terms} | {s:.4f} | {s / max(f.terms, 1) * 1e6:.1f} us |")
    return [*rows, ""]


def examples() -> list[str]:
    """Seconds of every example."""
    rows = ["## The examples", "", "| sheet | claims | verdicts | seconds |", "| --- | --- | --- | --- |"]
    for path in sorted((ROOT / "examples").glob("*.claim")):
        start = time.perf_counter()
        found = [d for sheet in read(path) for d in decide(sheet)]
        s = time.perf_counter() - start
        rows.append(f"| {path.stem} | {len(found)} | {', '.join(d.verdict.value for d in found)} | {s:.3f} |")
    return [*rows, ""]


def main() -> None:
    """Measure and write."""
    options = argparse.ArgumentParser(description=__doc__)
    options.add_argument("--runs", type=int, default=15, help="alternating process runs")
    options.add_argument("--peers", type=float, default=60.0, help="seconds for each solver, 0 for none")
    chosen = options.parse_args()
    lines = [
        "# Measured in one run",
        "",
        f"{datetime.date.today()}, Python {platform.python_version()}, {os.cpu_count()} cores, "
        f"{platform.machine()}.",
        "",
    ]
    lines += process_ratio(chosen.runs)
    lines += medians_norm()
    lines += inequality_table(chosen.peers)
    lines += growth()
    lines += examples()
    text = "\n".join(lines)
    print(text)
    (Path(__file__).parent / "results.md").write_text(text, encoding="utf-8")


if __name__ == "__main__":
    main()
