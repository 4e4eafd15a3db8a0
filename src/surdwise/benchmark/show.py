"""A benchmark as tables and data: terminal, CSV, JSON lines."""

from __future__ import annotations

import csv
import io
import json

from ..printing import table
from .row import COLUMNS, Row
from .run import Benchmark

HEAD = [
    "formulation",
    "engine",
    "unknowns",
    "degree",
    "terms",
    "write",
    "answer",
    "spread",
    "MiB",
    "status",
    "agreement",
]
SHORT = {
    "generally true": "true",
    "generally false": "false",
    "true on parts and false on parts": "parts",
    "no component dominates": "none",
}


def seconds(x: float | None) -> str:
    """A time in a fitting unit."""
    if x is None:
        return "-"
    if x < 1e-3:
        return f"{x * 1e6:.0f} us"
    return f"{x * 1e3:.1f} ms" if x < 1 else f"{x:.2f} s"


def number(x: int | None) -> str:
    """A count, or a dash."""
    return "-" if x is None else str(x)


def spread(r: Row) -> str:
    """The least and the greatest time of the answer."""
    if r.answer_least is None or r.answer_most is None:
        return "-"
    return f"{seconds(r.answer_least)} .. {seconds(r.answer_most)}"


def cells(r: Row) -> list[str]:
    """One row of the terminal table."""
    return [
        r.formulation.replace("_", " "),
        r.engine,
        number(r.unknowns),
        number(r.degree),
        number(r.terms),
        seconds(r.write),
        seconds(r.answer),
        spread(r),
        "-" if r.memory is None else f"{r.memory:.0f}",
        ending(r) if r.status is None else SHORT[r.status],
        r.agreement,
    ]


def ending(r: Row) -> str:
    """How a run without a status ended, in one or two words."""
    return {"time": "time out", "memory": "memory out", "none": "not written"}.get(r.end, r.end)


def claims(b: Benchmark) -> list[list[Row]]:
    """The rows claim by claim."""
    out: dict[tuple[str, int, int], list[Row]] = {}
    for r in b.rows:
        out.setdefault((r.file, r.sheet, r.number), []).append(r)
    return list(out.values())


def text(b: Benchmark) -> str:
    """Tables for a terminal, one a claim."""
    out = []
    for rows in claims(b):
        first = rows[0]
        size = max(rows, key=lambda r: r.parameters is not None)
        out.append(
            f"{first.claim}  ({first.file})\nliterally {first.literal}; "
            f"parameters {number(size.parameters)}, components {number(size.components)}, "
            f"lengths {number(size.radicals)}\n\n"
            + table(HEAD, [cells(r) for r in rows])
            + "".join(f"\n{r.formulation.replace('_', ' ')}, {r.engine}: {r.words}" for r in rows if r.words)
        )
    out += [f"{claim}  ({file})\nleft out: {why}" for file, claim, why in b.left_out]
    out.append(", ".join(f"{k}: {v}" for k, v in b.machine.items()))
    return "\n\n".join(out) + "\n"


def csv_text(b: Benchmark) -> str:
    """Comma-separated values, one line a row; columns are the fields of a row."""
    out = io.StringIO()
    writer = csv.DictWriter(out, COLUMNS, lineterminator="\n")
    writer.writeheader()
    for r in b.rows:
        writer.writerow({k: "" if v is None else v for k, v in r.data().items()})
    return out.getvalue()


def json_lines(b: Benchmark) -> str:
    """JSON lines: first the machine and the options, then one object a row, then what was left out."""
    o = b.options
    head = {
        "machine": b.machine,
        "repeat": o.repeat,
        "warm_up": o.warm_up,
        "time_limit": o.time_limit,
        "memory_limit": o.memory_limit,
        "decide_limit": o.decide_limit,
    }
    rows = [head, *(r.data() for r in b.rows)]
    rows += [{"file": f, "claim": c, "left_out": why} for f, c, why in b.left_out]
    return "".join(json.dumps(x, ensure_ascii=False) + "\n" for x in rows)
