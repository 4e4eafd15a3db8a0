"""What a worker process does, and how it is kept within bounds there."""

from __future__ import annotations

import ctypes
import gc
import os
import resource
import signal
import sys
from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from ..api import decide
from ..jsonform import decision_object
from ..limits import LimitReached, run_guarded
from ..sheet import Sheet, SheetError, read_file

GRACE = 0.5  # seconds that a claim has to come to its own stop before it is killed
_PDEATHSIG = 1  # prctl(2): the signal that a process gets when its parent dies

Tell = Callable[[str, Any], None]
Work = Callable[[Sheet, float, Tell], dict[str, Any]]


@dataclass(frozen=True)
class Stopped:
    """A call that gave no answer, and why; `partial` is what it had found out by then."""

    reason: str
    partial: dict[str, Any] | None = None


def decided(sheet: Sheet, seconds: float, tell: Tell) -> dict[str, Any]:
    """The answer to a sheet's single claim, as a JSON object; what is proved early is told."""

    def report(known: Any) -> None:
        tell("partial", decision_object(known))

    (decision,) = decide(sheet, time_limit=seconds, report=report)
    return decision_object(decision)


def read(path: str) -> tuple[Sheet, ...] | SheetError:
    """The sheets of a file, or what is wrong with it."""
    try:
        return read_file(path)
    except SheetError as error:
        return error


def guarded(work: Work, sheet: Sheet, seconds: float, mebibytes: int | None) -> dict[str, Any] | Stopped:
    """The answer to a sheet's single claim, worked out in a fork of this process, so that no claim
    leaves anything behind in the worker and each has the same memory to begin with."""
    try:
        answer: dict[str, Any] = run_guarded(
            _mortal, os.getpid(), work, sheet, seconds, seconds=seconds + GRACE, mebibytes=mebibytes
        )
    except LimitReached as e:
        return Stopped(f"{e} ({seconds:g} s)" if "time" in str(e) else str(e), e.partial)
    except (Exception, SystemExit) as e:
        return Stopped(f"an error inside the program: {type(e).__name__}: {e}")
    return answer


def _mortal(parent: int, work: Work, sheet: Sheet, seconds: float, tell: Tell) -> dict[str, Any]:
    mortal(parent)
    return work(sheet, seconds, tell)


def prepare(parent: int) -> None:
    """Make a new worker silent, the first to be ended when the machine runs out of memory, and
    mortal with its parent; its children inherit the first two."""
    # what the parent had is never collected here: a finaliser of it could wait for its threads,
    # which a fork does not have
    gc.freeze()
    sink = os.open(os.devnull, os.O_RDWR)
    os.dup2(sink, 1)
    os.dup2(sink, 2)
    # the parent may have been writing at the fork: its buffers and their locks stay untouched
    sys.stdout = sys.stderr = open(sink, "w", encoding="utf-8", closefd=False)  # noqa: SIM115
    resource.setrlimit(resource.RLIMIT_CORE, (0, 0))
    try:
        with open("/proc/self/oom_score_adj", "w", encoding="ascii") as f:
            f.write("1000")
    except OSError:
        pass  # another system: it chooses by itself
    mortal(parent)


def mortal(parent: int) -> None:
    """End this process with its parent, where the system can do that (Linux)."""
    if sys.platform != "linux":
        return
    ctypes.CDLL(None, use_errno=True).prctl(_PDEATHSIG, signal.SIGKILL, 0, 0, 0)
    if os.getppid() != parent:
        os._exit(1)
