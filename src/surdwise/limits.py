"""Hard limits: a call in a worker process that is killed when its time or memory is up."""

from __future__ import annotations

import gc
import os
import pickle
import resource
import select
import signal
import time
from collections.abc import Callable
from typing import Any, NoReturn

MIB = 1 << 20
GRACE = 0.2  # seconds between asking a worker to stop and killing it
PAUSE = 0.2  # seconds between two texts of progress


class LimitReached(Exception):
    """The worker was stopped; the text says which limit was reached, `partial` is the last thing
    that it had reported, or None."""

    def __init__(self, text: str, partial: Any = None) -> None:
        super().__init__(text)
        self.partial = partial


def run_guarded(
    work: Callable[..., Any],
    *args: Any,
    seconds: float,
    mebibytes: int | None = None,
    progress: Callable[[str], None] | None = None,
) -> Any:
    """work(*args) in a fork of this process that is killed after `seconds` and refused more than
    `mebibytes` of address space beyond what it starts with.

    The work gets one more argument, a function `tell(kind, what)`: kind "partial" keeps an answer for
    the case that the work is killed, kind "progress" hands a text to `progress` in this process
    (never more than a few times a second).  The lighter guard of single commands: loading the worker pool
    would take as long as deciding a small sheet.  Raises LimitReached; errors come through
    unchanged.
    """
    ours, theirs = os.pipe()
    child = os.fork()
    if child == 0:
        os.close(ours)
        _work(theirs, work, args, mebibytes, progress is not None)
    os.close(theirs)
    end = time.monotonic() + seconds
    partial: Any = None
    said = "working"

    def idle() -> None:
        if progress is not None:
            progress(said)

    with os.fdopen(ours, "rb", buffering=0) as pipe:
        while True:
            message = _message(pipe, end, idle)
            if message is None:
                os.kill(child, signal.SIGKILL)
                os.waitpid(child, 0)
                raise LimitReached("the time limit was reached", partial)
            kind, answer = message
            if kind == "progress":
                said = answer
                idle()
            elif kind == "partial":
                partial = answer
            else:
                break
    os.waitpid(child, 0)
    if kind == "answer":
        return answer
    if kind == "error" and not isinstance(answer, MemoryError):
        raise answer
    if mebibytes is None:
        raise LimitReached("the process that did the work died", partial)
    raise LimitReached(f"the memory limit of {mebibytes} MiB was reached", partial)


def _work(
    pipe: int, work: Callable[..., Any], args: tuple[Any, ...], mebibytes: int | None, watched: bool
) -> NoReturn:
    """The child's side: answers are pickles, each behind its length."""

    def send(kind: str, what: Any) -> None:
        data = pickle.dumps((kind, what))
        data = len(data).to_bytes(8, "big") + data
        while data:
            data = data[os.write(pipe, data) :]

    last = 0.0

    def tell(kind: str, what: Any) -> None:
        nonlocal last
        now = time.monotonic()
        if kind != "progress" or (watched and now - last > PAUSE):
            last = now
            send(kind, what)

    # no finaliser of the parent's objects (a cluster client's, say) may run here
    gc.freeze()
    code = 1
    try:
        if mebibytes is not None:
            _confine(mebibytes)
        try:
            send("answer", work(*args, tell))
        except BaseException as e:
            send("error", e)
        code = 0
    finally:
        os._exit(code)


def _message(pipe: Any, end: float, idle: Callable[[], None]) -> tuple[str, Any] | None:
    """The child's next message; ("dead", None) if it died, None when time is up."""
    size = _bytes(pipe, 8, end, idle)
    if size is None or not size:
        return size if size is None else ("dead", None)
    data = _bytes(pipe, int.from_bytes(size, "big"), end, idle)
    if data is None or not data:
        return data if data is None else ("dead", None)
    kind, what = pickle.loads(data)  # our own child's answer
    return kind, what


def _bytes(pipe: Any, count: int, end: float, idle: Callable[[], None]) -> bytes | None:
    """Exactly `count` bytes, b"" if the child is gone first, None when time is up; `idle` is
    called while waiting."""
    out = b""
    while len(out) < count:
        left = end - time.monotonic()
        ready, _, _ = select.select([pipe], [], [], max(min(left, 2 * PAUSE), 0.0))
        if not ready:
            if left <= 0:
                return None
            idle()
            continue
        chunk = pipe.read(count - len(out))
        if not chunk:
            return b""
        out += chunk
    return out


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
