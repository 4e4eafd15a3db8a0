"""Measure one formulation of one claim through one engine: warm-up, repeated runs, medians."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from statistics import median
from typing import Any

from ..field.ring import TooLarge
from ..sheet.tree import Line, Sheet
from ..thesis.formulations import Formulation, formulate
from ..thesis.parts import Form
from ..verdict.decide import decide_claim
from .choice import ELIMINATION
from .engine import Engine, OutOfMemory
from .guard import Outcome, Send, guarded
from .plain import Terms, variables
from .problem import NoProblem, Problem, problem


@dataclass(frozen=True)
class Options:
    """Counted runs, runs before them, hard limits of each run (seconds; MiB of address space), and
    seconds for the literal verdict of each claim."""

    repeat: int = 5
    warm_up: int = 1
    time_limit: float = 10.0
    memory_limit: int | None = 2048
    decide_limit: float = 60.0


def measured(sheet: Sheet, line: Line, choice: str, engine: Engine, options: Options) -> dict[str, Any]:
    """Fields of a row: what was measured, without the names.  The first run that ends badly is the
    last."""
    outcomes: list[Outcome] = []
    for i in range(options.warm_up + options.repeat):

        def work(send: Send) -> None:
            _run(sheet, line, choice, engine, options.memory_limit, send)

        out = guarded(work, options.time_limit, options.memory_limit)
        said = {k: v for m in out.said for k, v in m.items()}
        if out.end != "done" or "none" in said:
            shape = {k: v for k, v in said.items() if k in _SHAPE}
            end, words = ("none", said["none"]) if "none" in said else (out.end, _words(out, said, options))
            return {"end": end, "words": words, "runs": 0, "memory": _mebibytes([out]), **shape}
        if i >= options.warm_up:
            outcomes.append(out)
    runs = [{k: v for m in out.said for k, v in m.items()} for out in outcomes]
    fields: dict[str, Any] = {k: v for k, v in runs[0].items() if k in (*_SHAPE, "status")}
    for name in ("write", "answer"):
        taken = [r[name] for r in runs]
        fields |= {name: median(taken), f"{name}_least": min(taken), f"{name}_most": max(taken)}
    return {"end": "done", "words": "", "runs": len(runs), "memory": _mebibytes(outcomes), **fields}


_SHAPE = ("parameters", "components", "radicals", "unknowns", "degree", "terms", "digits", "write")


def _words(out: Outcome, said: dict[str, Any], options: Options) -> str:
    step = "answering" if "terms" in said else "writing it down" if is_read(said) else "reading the figure"
    if out.end == "time":
        return f"{options.time_limit:g} s were over while {step}"
    if out.end == "memory":
        return f"{options.memory_limit} MiB were used up while {step}"
    return out.words


def is_read(fields: dict[str, Any]) -> bool:
    """Whether a run got past the figure, which is the same for all formulations and engines."""
    return "parameters" in fields


def _mebibytes(outcomes: Sequence[Outcome]) -> float | None:
    """Largest peak of the runs; of a forked process what it took beyond its start."""
    known = []
    for out in outcomes:
        peak = next((m["peak"] for m in reversed(out.said) if m.get("peak") is not None), None)
        if peak is not None:
            known.append(peak)
        elif out.peak is not None and out.start is not None:
            known.append(max(out.peak - out.start, 0))
    return round(max(known) / 1024, 1) if known else None


def _run(sheet: Sheet, line: Line, choice: str, engine: Engine, mebibytes: int | None, send: Send) -> None:
    """One run: the figure and the thesis are read before any clock starts."""
    try:
        p = problem(sheet, line.body)
    except (NoProblem, TooLarge) as e:
        send({"none": str(e)})
        return
    send({"parameters": p.parameters, "components": len(p.figures), "radicals": p.radicals})
    try:
        if choice == ELIMINATION:
            _eliminated(p, engine, mebibytes, send)
            return
        f = formulate(p.thesis, Form(choice))
        if not f.polynomials:
            send({"none": f.why_not})
            return
        send({**_size(f), "write": f.seconds})
        answer = engine.decide(p, f, mebibytes)
        send({"status": answer.status.value, "answer": answer.seconds, "peak": answer.peak})
    except TooLarge as e:
        send({"none": str(e)})
    except OutOfMemory:
        raise MemoryError from None


def _eliminated(p: Problem, engine: Engine, mebibytes: int | None, send: Send) -> None:
    if not engine.eliminates:
        send({"none": "the engine has no elimination of its own"})
        return
    done = engine.eliminate(p, formulate(p.thesis, Form.AUXILIARY), mebibytes)
    send({**_plain_size(done.polynomials), "write": done.seconds, "peak": done.peak})
    answer = engine.decide_plain(p, done.polynomials, mebibytes)
    peaks = [x for x in (done.peak, answer.peak) if x is not None]
    peak = max(peaks) if peaks else None
    send({"status": answer.status.value, "answer": answer.seconds, "peak": peak})


def _size(f: Formulation) -> dict[str, int]:
    return {
        "unknowns": f.unknowns,
        "degree": max(int(f.degree), 0),
        "terms": f.terms,
        "digits": len(hex(f.largest)) - 2,
    }


def _plain_size(polys: Sequence[Terms]) -> dict[str, int]:
    degrees = [sum(e for _, e in powers) for q in polys for _, powers in q]
    largest = max((abs(c) for q in polys for c, _ in q), default=0)
    return {
        "unknowns": len(variables(polys)),
        "degree": max(degrees, default=0),
        "terms": sum(map(len, polys)),
        "digits": len(hex(largest)) - 2,
    }


def verdict(sheet: Sheet, line: Line, seconds: float, mebibytes: int | None) -> str:
    """The literal verdict, within hard limits; `undecided` where they are reached."""

    def work(send: Send) -> None:
        d = decide_claim(sheet, line, seconds, report=lambda known: send({"verdict": known.verdict.value}))
        send({"verdict": d.verdict.value})

    said = guarded(work, seconds + 2, mebibytes).said
    return str(said[-1]["verdict"]) if said else "undecided"
