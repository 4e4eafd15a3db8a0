"""The whole benchmark: every claim, formulation and engine in order, resumable."""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from .. import __version__
from ..sheet import show
from ..sheet.tree import Comparison, Sheet
from ..verdict.outcome import Verdict
from .choice import CHOICES, ELIMINATION
from .engine import Engine
from .engines import engines as installed
from .journal import Journal, key
from .machine import facts
from .measure import Options, is_read, measured, verdict
from .row import Row


@dataclass(frozen=True)
class Benchmark:
    """Rows in the order of sheets, claims, formulations and engines; claims left out, with the
    reason; the machine; the options."""

    rows: tuple[Row, ...]
    left_out: tuple[tuple[str, str, str], ...]
    machine: dict[str, str]
    options: Options


def benchmark(
    sheets: Sequence[Sheet],
    engines: Sequence[str] = (),
    options: Options | None = None,
    journal: Path | None = None,
    resume: bool = False,
    progress: Callable[[str], None] = lambda text: None,
    known: Mapping[str, Verdict] | None = None,
) -> Benchmark:
    """Measure every formulation of every equality through every engine named (all that are installed
    if none is).  `known` are literal verdicts by file, for sheets whose truth is known beforehand; the
    others are decided.  Raises EngineError, JournalError."""
    options = Options() if options is None else options
    found = installed(tuple(engines))
    for e in found:
        e.load()
    machine = facts({e.name: v for e, v in found.items()})
    kept = Journal(journal, resume)
    rows: list[Row] = []
    left_out: list[tuple[str, str, str]] = []
    plan = [(s, n) for s in sheets for n in range(len(s.claims))]
    for done, (sheet, number) in enumerate(plan):
        line = sheet.claims[number]
        claim = show(line.body)
        if not isinstance(line.body, Comparison) or line.body.ops != ("=",):
            left_out.append((sheet.file, claim, "not an equality between two quantities"))
            continue
        progress(f"claim {done + 1} of {len(plan)}, {claim}")
        mine = _claim(sheet, number, claim, found, options, kept, known or {})
        if mine and mine[0].parameters is None:
            left_out.append((sheet.file, claim, mine[0].words))
            continue
        rows += mine
    return Benchmark(tuple(rows), tuple(left_out), machine, options)


def _claim(
    sheet: Sheet,
    number: int,
    claim: str,
    engines: dict[Engine, str],
    options: Options,
    kept: Journal,
    known: Mapping[str, Verdict],
) -> list[Row]:
    line = sheet.claims[number]
    if sheet.file in known:
        literal = known[sheet.file].value
    else:
        name = key(sheet, number, "literal", __version__, options)
        if name not in kept.entries:
            kept.add(name, {"verdict": verdict(sheet, line, options.decide_limit, options.memory_limit)})
        literal = str(kept.entries[name]["verdict"])
    out = []
    # what was given up before the engine's turn is the same for the next engine
    lost: dict[str, Any] | None = None
    unread = False
    for choice in CHOICES:
        lost = lost if unread else None
        for e, version in engines.items():
            if choice == ELIMINATION and not e.eliminates:
                continue
            name = key(sheet, number, f"{choice} {e.name}", version, options)
            if name not in kept.entries:
                fields = lost if lost is not None else measured(sheet, line, choice, e, options)
                kept.add(name, fields)
            if choice != ELIMINATION and "terms" not in kept.entries[name]:
                lost = kept.entries[name]
            unread = unread or not is_read(kept.entries[name])
            first = sheet.given[0].span.line if sheet.given else 0
            row = Row(
                file=sheet.file,
                title=sheet.title,
                sheet=first,
                claim=claim,
                number=number,
                formulation=choice,
                engine=e.name,
                **kept.entries[name],
            )
            out.append(row.against(literal))
    return out
