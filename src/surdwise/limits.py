"""Hard limits: a call in a worker process that is killed when its time or memory is up."""

from __future__ import annotations

import resource
from collections.abc import Callable
from concurrent.futures import TimeoutError as OutOfWait
from typing import Any

MIB = 1 << 20


class LimitReached(Exception):
    """The worker was stopped; the text says which limit was reached."""


def run_limited(
    work: Callable[..., Any], *args: Any, seconds: float | None = None, mebibytes: int | None = None
) -> Any:
    """work(*args) in a process of its own, killed after `seconds` and refused more than
    `mebibytes` of address space beyond what it starts with.

    Raises LimitReached; errors of the work itself come through unchanged.
    """
    from multiprocessing import get_context

    from pebble import ProcessExpired, ProcessPool

    setup = [mebibytes] if mebibytes is not None else []
    with ProcessPool(
        max_workers=1,
        context=get_context("fork"),
        initializer=_confine if setup else None,
        initargs=setup,
    ) as pool:
        future = pool.schedule(work, args=args, timeout=seconds)
        try:
            return future.result()
        except OutOfWait as e:
            raise LimitReached(f"the time limit of {seconds:g} s was reached") from e
        except (ProcessExpired, MemoryError) as e:
            if mebibytes is None:
                raise LimitReached("the worker process died") from e
            raise LimitReached(f"the memory limit of {mebibytes} MiB was reached") from e


def _confine(mebibytes: int) -> None:
    """Cap the address space of this process; core files are not wanted."""
    resource.setrlimit(resource.RLIMIT_CORE, (0, 0))
    with open("/proc/self/statm", encoding="ascii") as f:
        used = int(f.read().split()[0]) * resource.getpagesize()
    top = used + mebibytes * MIB
    resource.setrlimit(resource.RLIMIT_AS, (top, top))
