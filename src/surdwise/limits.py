"""Hard limits: a call in a worker process that is killed when its time or memory is up."""

from __future__ import annotations

import os
import pickle
import resource
import select
import signal
import time
from collections.abc import Callable
from concurrent.futures import TimeoutError as OutOfWait
from typing import Any

MIB = 1 << 20
GRACE = 0.2  # seconds between asking a worker to stop and killing it


class LimitReached(Exception):
    """The worker was stopped; the text says which limit was reached."""


def run_guarded(work: Callable[..., Any], *args: Any, seconds: float) -> Any:
    """work(*args) in a fork of this process that is killed after `seconds`.

    The lighter guard of every command without limits of its own: loading the worker pool would
    take as long as deciding a small sheet.  Raises LimitReached; errors come through unchanged.
    """
    ours, theirs = os.pipe()
    child = os.fork()
    if child == 0:
        os.close(ours)
        code = 1
        try:
            try:
                answer = pickle.dumps((True, work(*args)))
            except BaseException as e:
                answer = pickle.dumps((False, e))
            with os.fdopen(theirs, "wb") as out:
                out.write(answer)
            code = 0
        finally:
            os._exit(code)
    os.close(theirs)
    chunks: list[bytes] = []
    end = time.monotonic() + seconds
    with os.fdopen(ours, "rb", buffering=0) as pipe:
        while True:
            ready, _, _ = select.select([pipe], [], [], max(end - time.monotonic(), 0.0))
            if not ready:
                os.kill(child, signal.SIGKILL)
                os.waitpid(child, 0)
                raise LimitReached("the time limit was reached")
            chunk = pipe.read(1 << 16)
            if not chunk:
                break
            chunks.append(chunk)
    os.waitpid(child, 0)
    if not chunks:
        raise LimitReached("the process that did the work died")
    ok, answer = pickle.loads(b"".join(chunks))  # our own child's answer
    if not ok:
        raise answer
    return answer


def run_limited(
    work: Callable[..., Any], *args: Any, seconds: float | None = None, mebibytes: int | None = None
) -> Any:
    """work(*args) in a process of its own, killed after `seconds` and refused more than
    `mebibytes` of address space beyond what it starts with.

    Raises LimitReached; errors of the work itself come through unchanged.
    """
    from multiprocessing import get_context

    from pebble import CONSTS, ProcessExpired, ProcessPool

    CONSTS.term_timeout = GRACE
    with ProcessPool(
        max_workers=1,
        context=get_context("fork"),
        initializer=_confine,
        initargs=[mebibytes],
    ) as pool:
        future = pool.schedule(work, args=args, timeout=seconds)
        try:
            return future.result()
        except OutOfWait as e:
            raise LimitReached("the time limit was reached") from e
        except (ProcessExpired, MemoryError) as e:
            if mebibytes is None:
                raise LimitReached("the worker process died") from e
            raise LimitReached(f"the memory limit of {mebibytes} MiB was reached") from e


def _confine(mebibytes: int | None) -> None:
    """Make this process silent (no core files, no last words of a library that runs out of
    memory) and cap its address space."""
    sink = os.open(os.devnull, os.O_WRONLY)
    os.dup2(sink, 1)
    os.dup2(sink, 2)
    resource.setrlimit(resource.RLIMIT_CORE, (0, 0))
    if mebibytes is None:
        return
    with open("/proc/self/statm", encoding="ascii") as f:
        used = int(f.read().split()[0]) * resource.getpagesize()
    top = used + mebibytes * MIB
    resource.setrlimit(resource.RLIMIT_AS, (top, top))
