"""One measured run in a group of processes of its own, with hard limits and its peak of memory.

Stricter than limits.run_guarded, which it does not replace: the group is killed as a whole, so that a program
started by the work dies with it, and what the work said before it was killed is kept.
"""

from __future__ import annotations

import contextlib
import json
import os
import resource
import select
import signal
import time
from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from .memory import children_of, now_of, peak_of

MIB = 1 << 20

Send = Callable[[dict[str, Any]], None]


@dataclass(frozen=True)
class Outcome:
    """What a run said, in order; how it ended: done, time, memory, or error (`words` say what); peak of
    memory of the process, or of the program it started, and memory at its start (KiB; 0 for a
    started program)."""

    said: tuple[dict[str, Any], ...]
    end: str
    words: str
    peak: int | None
    start: int | None


def guarded(work: Callable[[Send], None], seconds: float, mebibytes: int | None) -> Outcome:
    """Run `work(send)` in a fork; messages are JSON objects."""
    ours, theirs = os.pipe()
    child = os.fork()
    if child == 0:
        os.close(ours)
        _work(work, theirs, mebibytes)
    os.close(theirs)
    with contextlib.suppress(OSError):
        os.setpgid(child, child)
    try:
        data, in_time = _read(ours, time.monotonic() + seconds)
        peak, started = _peak(child)
    finally:
        os.close(ours)
        with contextlib.suppress(OSError):
            os.killpg(child, signal.SIGKILL)
        os.waitpid(child, 0)
    lines = data[: data.rfind(b"\n") + 1].splitlines()
    said = [json.loads(x) for x in lines]
    start = 0 if started else said[0]["start"] if said else None
    last = said[-1] if said else {}
    own = [m for m in said if "start" not in m and "end" not in m]
    if "end" in last:
        return Outcome(tuple(own), last["end"], last["words"], last["peak"], start)
    if not in_time:
        return Outcome(tuple(own), "time", "", peak, start)
    return Outcome(
        tuple(own), "memory" if mebibytes is not None else "error", "the process died", peak, start
    )


def _peak(child: int) -> tuple[int | None, bool]:
    """Of the program that the work started, if any (then True), else of the work."""
    started = [p for p in map(peak_of, children_of(child)) if p is not None]
    return (max(started), True) if started else (peak_of(child), False)


def _read(pipe: int, deadline: float) -> tuple[bytes, bool]:
    """Everything up to the message `end`, and whether it came in time."""
    data = b""
    while True:
        left = deadline - time.monotonic()
        ready, _, _ = select.select([pipe], [], [], max(left, 0.0))
        if not ready:
            return data, False
        chunk = os.read(pipe, 1 << 16)
        if not chunk:
            return data, True
        data += chunk


def _work(work: Callable[[Send], None], pipe: int, mebibytes: int | None) -> None:
    def send(message: dict[str, Any]) -> None:
        line = json.dumps(message).encode() + b"\n"
        while line:
            line = line[os.write(pipe, line) :]

    code = 1
    try:
        with contextlib.suppress(OSError):
            os.setpgid(0, 0)
        sink = os.open(os.devnull, os.O_WRONLY)
        os.dup2(sink, 1)
        os.dup2(sink, 2)
        resource.setrlimit(resource.RLIMIT_CORE, (0, 0))
        signal.signal(signal.SIGINT, signal.SIG_DFL)
        send({"start": now_of(os.getpid())})
        if mebibytes is not None:
            _confine(mebibytes)
        end, words = "done", ""
        try:
            work(send)
        except MemoryError:
            end = "memory"
        except BaseException as e:
            end, words = "error", f"{type(e).__name__}: {e}"
        send({"end": end, "words": words, "peak": peak_of(os.getpid())})
        code = 0
    finally:
        os._exit(code)


def _confine(mebibytes: int) -> None:
    """Cap the address space beyond what the process has."""
    with open("/proc/self/statm", encoding="ascii") as f:
        used = int(f.read().split()[0]) * resource.getpagesize()
    top = used + mebibytes * MIB
    resource.setrlimit(resource.RLIMIT_AS, (top, top))
