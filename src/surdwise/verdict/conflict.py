"""Which lines of an empty sheet contradict each other."""

from __future__ import annotations

import time
from dataclasses import replace

from ..field.cells import TooManyCells
from ..field.real import Unsettled
from ..field.ring import TooLarge
from ..figure.program import program
from ..sheet.tree import Fact, Line, Pt, Sheet
from .naming import Case
from .survey import OutOfTime

SECONDS = 6.0


def conflict(case: Case) -> str:
    """A smallest set of lines that admit no figure together, found by leaving lines out one at a
    time; empty text where time runs out first or no line can be left out."""
    sheet = case.sheet
    end = min(case.deadline, time.monotonic() + SECONDS)
    core = _demands(sheet)
    free = [line for line in (*sheet.given, *sheet.provided) if line not in core]
    try:
        if not _empty(sheet, [*free, *core], case, end):
            return ""
        for line in list(core):
            rest = [x for x in core if x is not line]
            if _empty(sheet, [*free, *rest], case, end):
                core = rest
    except (OutOfTime, TooLarge, TooManyCells, Unsettled):
        return ""
    said = [f"line {x.span.line} (`{x.keyword} {x.text}`)" for x in core]
    if not said:
        return "the figure itself cannot exist"
    if len(said) == 1:
        return f"{said[0]} cannot hold"
    return f"{', '.join(said[:-1])} and {said[-1]} cannot hold together"


def _demands(sheet: Sheet) -> list[Line]:
    """Lines that narrow the figure and define nothing that other lines need: relations, conditions,
    and points placed a second time."""
    placed: set[str] = set()
    out: list[Line] = []
    for line in sheet.given:
        body = line.body
        if not isinstance(body, Fact):
            out.append(line)
            continue
        first = body.args[0]
        if isinstance(first, Pt) and first.name in placed:
            out.append(line)
        placed |= {p.name for p in _points(first)}
    return [*out, *sheet.provided]


def _points(arg: object) -> list[Pt]:
    if isinstance(arg, Pt):
        return [arg]
    return [p for p in arg if isinstance(p, Pt)] if isinstance(arg, tuple) else []


def _empty(sheet: Sheet, lines: list[Line], case: Case, end: float) -> bool:
    """Whether the sheet with only some of its lines admits no figure."""
    keep = {id(x) for x in lines}
    less = replace(
        sheet,
        given=tuple(x for x in sheet.given if id(x) in keep),
        provided=tuple(x for x in sheet.provided if id(x) in keep),
    )
    part = Case(less, program(less, case.program.frame.kind), end, case.progress)
    found = part.survey([lambda j: True], closed=False)
    if found.not_examined:
        raise TooManyCells("not examined")
    return not found.places
