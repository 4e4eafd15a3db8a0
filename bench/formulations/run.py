"""Measure every formulation on the examples, the families and some sheets more; write results.md.

python bench/formulations/run.py                     the published table (under 20 minutes)
python bench/formulations/run.py --journal FILE      goes on where a run with the same file stopped
python bench/formulations/run.py --data FOLDER       also CSV, JSON lines and the HTML page
"""

from __future__ import annotations

import argparse
import sys
from dataclasses import replace
from pathlib import Path

from findings import by_claim, findings, largest, words
from limit import CASES, limit

import surdwise
from surdwise.benchmark.choice import CHOICES, ELIMINATION
from surdwise.benchmark.families import FAMILIES, members
from surdwise.benchmark.literal import Agreement
from surdwise.benchmark.measure import Options
from surdwise.benchmark.page import html
from surdwise.benchmark.row import Row
from surdwise.benchmark.run import Benchmark, benchmark
from surdwise.benchmark.show import SHORT, csv_text, json_lines, number, seconds
from surdwise.sheet import Sheet
from surdwise.verdict.outcome import Verdict

HERE = Path(__file__).resolve().parent
ROOT = HERE.parents[1]
SIGNS = {
    Agreement.AGREES.value: "",
    Agreement.PARTIAL.value: "?",
    Agreement.WRONG.value: "!",
    Agreement.OPEN.value: "",
}


def sheets() -> tuple[list[Sheet], dict[str, Verdict]]:
    """Every sheet, and the verdicts known beforehand."""
    out: list[Sheet] = []
    for folder in (ROOT / "examples", HERE / "sheets"):
        for path in sorted(folder.glob("*.claim")):
            out += [replace(s, file=path.stem) for s in surdwise.read(path)]
    known = {}
    for name in FAMILIES:
        for m in members(name):
            out += [replace(s, file=m.name) for s in surdwise.read(m.text)]
            known[m.name] = m.verdict
    return out, known


def table(head: list[str], rows: list[list[str]]) -> str:
    """A table in Markdown."""
    lines = [head, ["---"] * len(head), *rows]
    return "\n".join("| " + " | ".join(c.replace("|", "\\|") for c in r) + " |" for r in lines)


def cell(rows: dict[tuple[str, str], Row], choice: str, engines: list[str]) -> str:
    """Times through the engines and the status with its sign."""
    mine = [rows.get((choice, e)) for e in engines]
    known = next((r for r in mine if r is not None and r.status is not None), None)
    parts = []
    for r in mine:
        if r is None:
            continue
        if r.seconds is not None:
            parts.append(seconds(r.seconds))
        else:
            parts.append({"time": "time", "memory": "memory"}.get(r.end, "-"))
    if known is None or known.status is None:
        return " / ".join(parts)
    return f"{SHORT[known.status]}{SIGNS[known.agreement]} {' / '.join(parts)}"


def main_table(b: Benchmark, engines: list[str]) -> str:
    """One line a claim."""
    rows = []
    for (file, _, _), mine in by_claim(b.rows).items():
        r = next(iter(mine.values()))
        product = mine["sign_product", engines[0]]
        claim = r.claim if len(r.claim) <= 60 else r.claim[:57] + "..."
        rows.append(
            [
                file,
                f"`{claim}`",
                str(r.literal),
                number(r.parameters),
                number(r.radicals),
                number(product.terms),
                *(cell(mine, c, engines) for c in CHOICES),
            ]
        )
    head = [
        "sheet",
        "claim",
        "literally",
        "parameters",
        "lengths",
        "terms of the product",
        *map(words, CHOICES),
    ]
    return table(head, rows)


def limit_table() -> tuple[str, str]:
    """The sign product against one multiplication, and a sentence on it."""
    rows = []
    found = []
    for name in CASES:
        x = limit(name)
        found.append((x.terms, x.per_term, x.seconds))
        rows.append(
            [
                name,
                str(x.terms),
                seconds(x.seconds),
                f"{1e9 * x.seconds / x.terms:.0f} ns",
                seconds(x.one),
                str(x.one_terms),
                f"{1e9 * x.one / x.one_terms:.0f} ns",
                f"{x.per_term:.2f}",
            ]
        )
    head = [
        "case",
        "terms",
        "sign product",
        "per term",
        "one multiplication",
        "its terms",
        "per term",
        "ratio per term",
    ]
    most = max(s for n, _, s in found if n < 1000)
    large = [p for n, p, _ in found if n >= 1000]
    small = [p for n, p, _ in found if n < 1000]
    words_ = (
        "- Time of the sign product per written term, over that of the one multiplication (X + Y r)(X - Y r) "
        f"that gives the same polynomial before r^2 is replaced: {min(large):.1f} to {max(large):.1f} for "
        f"results of a thousand terms and more, {min(small):.1f} to {max(small):.1f} for smaller ones, all "
        f"of which take at most {seconds(most)}."
    )
    return table(head, rows), words_


def main() -> None:
    """Measure, write results.md."""
    parser = argparse.ArgumentParser(
        description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter
    )
    parser.add_argument("--repeat", type=int, default=3, help="counted runs (3)")
    parser.add_argument("--time-limit", type=float, default=2.0, help="seconds for each run (2)")
    parser.add_argument("--journal", type=Path, help="a file that lets a stopped run go on")
    parser.add_argument("--data", type=Path, help="a folder for CSV, JSON lines and HTML")
    parser.add_argument("--only", help="sheets whose name contains this (results.md is not written)")
    o = parser.parse_args()
    every, known = sheets()
    if o.only:
        every = [s for s in every if o.only in s.file]
    options = Options(
        repeat=o.repeat, warm_up=1, time_limit=o.time_limit, memory_limit=2048, decide_limit=10.0
    )
    resume = o.journal is not None and o.journal.exists()
    b = benchmark(
        every, (), options, o.journal, resume, lambda text: print(text, file=sys.stderr, flush=True), known
    )
    engines = [k.split()[1] for k in b.machine if k.startswith("engine ")]
    limits, sentence = limit_table()
    sizes = {m.name: (name, m.size) for name in FAMILIES for m in members(name)}
    facts = "\n".join(f"- {k}: {v}" for k, v in b.machine.items())
    left = "\n".join(f"- `{claim}` ({file}): {why}" for file, claim, why in b.left_out)
    text = f"""# Formulations compared

Written by `python bench/formulations/run.py`. {len(every)} sheets, {len(by_claim(b.rows))} equalities;
{o.repeat} counted runs after one that is not counted, each in a process of its own, at most {o.time_limit:g}
s and 2048 MiB. A time is the median of writing the formulation down plus the median of the engine's answer,
from reading the polynomials on, by its own clock. The processor was shared if the load below is well over 0.

{facts}

## Findings

{chr(10).join([*findings(b.rows, o.time_limit), sentence])}

Wrong: generally true of a claim that is false on some admitted figure, or generally false of one that is
true on figures of full dimension. Partial: true on parts of a claim that holds or fails. A time is that of an
answer of three values: generally true, generally false, or true on parts. The minimal polynomial stands in
plain coordinates: where lengths depend on each other it follows one sign pattern, which need not be the
literal one.

## The table

In each column: the status (true, false, parts), `?` where it is partial and `!` where it is wrong against the
literal verdict, then the times through {" / ".join(engines)}; {words(ELIMINATION)}: the engine eliminates the
lengths itself ({" / ".join(e for e in engines if e != "tower")}).

{main_table(b, engines)}

## Families

How many members of each family were answered within the limits, through {" / ".join(engines)} (elimination:
{" / ".join(e for e in engines if e != "tower")}).

{table(["family", "members", *map(words, CHOICES)], largest(b.rows, sizes))}

## The limit of writing down

{limits}

## Left out

{left}
"""
    if o.data is not None:
        o.data.mkdir(parents=True, exist_ok=True)
        for name, make in (
            ("formulations.csv", csv_text),
            ("formulations.jsonl", json_lines),
            ("formulations.html", html),
        ):
            (o.data / name).write_text(make(b), encoding="utf-8")
    if o.only:
        print(text)
    else:
        (HERE / "results.md").write_text(text, encoding="utf-8")


if __name__ == "__main__":
    main()
