"""Measure everything in one run, print tables of ratios, and write results.md next to this file.

python bench/run.py                 everything (some minutes)
python bench/run.py --only startup  one table: startup, norms, peers, growth, sheets
"""

from __future__ import annotations

import argparse
import datetime
import os
import platform
import sys
import time
from collections.abc import Callable
from importlib.metadata import version
from pathlib import Path

from measure import ROOT, show, table

sys.path.insert(0, str(ROOT / "src"))


def startup(options: argparse.Namespace) -> str:
    """(a) and (e): the whole command."""
    import startup as s

    command, floor = s.ratio(options.runs)
    r = command.median / floor.median
    rows = [
        ["python -m surdwise decide examples/stretched-string.claim", str(command)],
        ['python -c "import flint, typer, lark"', str(floor)],
        ["ratio of medians", f"{r:.2f} (target: at most {s.TARGET})"],
    ]
    extra, mine, base = s.beyond_the_floor()
    worst = [[m.name, f"{m.own / 1000:.2f}", f"{m.whole / 1000:.2f}"] for m in extra[:15]]
    ours = sum(m.own for m in extra if m.name.startswith("surdwise"))
    rest = sum(m.own for m in extra) - ours
    return (
        f"## The whole command\n\nMedians (least .. greatest) of {options.runs} alternating runs, "
        "bytecode warm.\n\n" + table(["process", "time"], rows) + "\n\n"
        f"Import times (`-X importtime`, least of 5): {mine / 1000:.0f} ms for the command, "
        f"{base / 1000:.0f} ms for the imports alone. Modules that only the command imports: "
        f"{ours / 1000:.1f} ms of its own, {rest / 1000:.1f} ms of others; the slowest:\n\n"
        + table(["module", "itself, ms", "with its imports, ms"], worst)
    )


def norms(options: argparse.Namespace) -> str:
    """(b): sign products against eliminations."""
    import norms as n

    rows = []
    for name in n.CLAIMS:
        c = n.contest(name, 5, options.cap)
        inside = "-" if c.theirs is None else str(c.theirs)
        whole = "-" if c.whole_theirs is None else str(c.whole_theirs)
        if c.theirs is not None and c.whole_theirs is not None:
            r = [c.theirs.median / c.mine.median, c.whole_theirs.median / c.whole_mine.median]
            ratios = [f"{x:.1f}" for x in r]
        elif n.PROGRAM is None:
            ratios = ["-", "-"]
        else:
            inside = whole = f"over {options.cap:.0f} s"
            ratios = [
                f"over {options.cap / c.mine.median:.0f}",
                f"over {options.cap / c.whole_mine.median:.0f}",
            ]
        rows.append([name, str(c.terms), str(c.mine), inside, ratios[0], str(c.whole_mine), whole, ratios[1]])
    head = ["claim", "terms", "sign product", "eliminate", "ratio", "process", "Singular process", "ratio"]
    claims = "\n".join(f"- {name}: `{claim}`" for name, claim in n.CLAIMS.items())
    return (
        "## Sign products and eliminations\n\nThe sign product here, and Singular's `eliminate` of the "
        "lengths from the auxiliary ideal of the same claim (degree reverse lexicographic order). Times "
        "inside each system, Singular's by its own clock `rtimer` (wall time, in milliseconds), short ones "
        "over 50 repetitions; then whole processes. Target for the medians, inside: "
        f"{n.TARGET:.0f}.\n\n{claims}\n\n" + table(head, rows)
    )


def growth(options: argparse.Namespace) -> str:
    """(c): r roots in d parameters."""
    import growth as g

    rows = []
    for d in range(1, 5):
        for r in range(2, 8):
            c = g.case(r, d, options.cap)
            if c is None:
                rows.append([str(d), str(r), "", "", "", f"over {options.cap:.0f} s", "", ""])
                break
            rows.append(
                [
                    str(d),
                    str(r),
                    str(c.degree),
                    str(c.terms),
                    str(c.bits),
                    show(c.seconds),
                    f"{show(c.multiplication)} ({c.product_terms} terms)",
                    f"{c.seconds / c.multiplication:.1f}",
                ]
            )
    head = ["d", "r", "degree", "terms", "bits", "sign product", "one multiplication", "ratio"]
    return (
        "## Growth\n\nSign product of a sum of r independent roots in d parameters, next to one FLINT "
        "multiplication of two dense polynomials of half its degree and half its coefficients' length. "
        f"A column stops at its first case over {options.cap:.0f} s.\n\n" + table(head, rows)
    )


def sheets(options: argparse.Namespace) -> str:
    """(d): every example."""
    import surdwise

    rows = []
    total = 0.0
    for path in sorted((ROOT / "examples").glob("*.claim")):
        start = time.perf_counter()
        decisions = [d for s in surdwise.read(path) for d in surdwise.decide(s, time_limit=options.cap)]
        seconds = time.perf_counter() - start
        total += seconds
        rows.append([path.name, ", ".join(d.verdict.value for d in decisions), show(seconds)])
    rows.append(["all", "", show(total)])
    return (
        "## Sheets\n\n`decide` over the examples, one after another in one process (without its start).\n\n"
        + table(["sheet", "verdicts", "time"], rows)
    )


def peers(options: argparse.Namespace) -> str:
    """Inequalities, next to two general solvers."""
    import peers as p

    return "\n".join(p.inequality_table(options.peers)).strip()


PARTS: dict[str, Callable[[argparse.Namespace], str]] = {
    "startup": startup,
    "norms": norms,
    "peers": peers,
    "growth": growth,
    "sheets": sheets,
}


def main() -> None:
    """Run, print, write."""
    parser = argparse.ArgumentParser(
        description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter
    )
    parser.add_argument("--runs", type=int, default=15, help="runs of whole processes (15)")
    parser.add_argument(
        "--cap", type=float, default=30.0, help="seconds after which one case is given up (30)"
    )
    parser.add_argument("--peers", type=float, default=60.0, help="seconds for each solver (60; 0: none)")
    parser.add_argument("--only", choices=PARTS, action="append", help="one table; may be repeated")
    options = parser.parse_args()
    head = (
        f"# Measurements\n\n{datetime.date.today().isoformat()}, {os.cpu_count()} processors "
        f"({platform.machine()}), Python {platform.python_version()}, "
        f"python-flint {version('python-flint')}. Written by `python bench/run.py`; every ratio is between "
        "figures of the same run."
    )
    text = [head]
    print(head, flush=True)
    for name in options.only or PARTS:
        text.append(PARTS[name](options))
        print("\n" + text[-1], flush=True)
    if not options.only:
        (Path(__file__).parent / "results.md").write_text("\n\n".join(text) + "\n", encoding="utf-8")


if __name__ == "__main__":
    main()
