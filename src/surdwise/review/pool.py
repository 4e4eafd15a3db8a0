"""Warm workers on this machine, each a process that can be killed without touching another.

Every worker is a pebble pool of one process: a pool of several shares pipes and locks between
its processes, so that one that dies at a bad moment can stop the others; single ones cannot.
"""

from __future__ import annotations

import os
import queue
import time
from collections.abc import Callable, Iterable, Iterator
from concurrent.futures import TimeoutError as OutOfWait
from concurrent.futures.process import BrokenProcessPool
from dataclasses import dataclass
from multiprocessing import get_context
from types import TracebackType
from typing import Any

from pebble import CONSTS, ProcessExpired, ProcessFuture, ProcessPool

from ..limits import GRACE as TERM
from .work import Stopped, prepare

OVERDUE = 5.0  # seconds past its limit after which a worker is given up that should be dead by then


@dataclass(frozen=True)
class Job:
    """A call of a function that can be pickled, what it is for, and the seconds after which it
    is killed."""

    of: Any
    work: Callable[..., Any]
    args: tuple[Any, ...]
    seconds: float


@dataclass(frozen=True)
class Outcome:
    """What a job came to, the seconds it took, and whether the next outcome is there already."""

    job: Job
    answer: Any
    seconds: float
    more: bool = False


@dataclass(frozen=True)
class _Run:
    """A job in a worker: since when, and whether it is the second try."""

    job: Job
    future: ProcessFuture[Any]
    began: float
    again: bool


class Slot:
    """One worker, replaced when it is killed or breaks."""

    def __init__(self) -> None:
        self._pool: ProcessPool | None = None

    def start(self, job: Job, again: bool = False) -> _Run:
        """Hand the worker a job."""
        if self.broken:
            self.stop()
        if self._pool is None:
            self._pool = ProcessPool(
                max_workers=1, context=get_context("fork"), initializer=prepare, initargs=[os.getpid()]
            )
        began = time.monotonic()
        return _Run(job, self._pool.schedule(job.work, args=job.args, timeout=job.seconds), began, again)

    @property
    def broken(self) -> bool:
        """Whether the pool has lost its worker while no job was known to run in it."""
        return self._pool is not None and not self._pool.active

    def stop(self) -> None:
        """End the worker, whatever it does."""
        if self._pool is not None:
            self._pool.stop()  # type: ignore[no-untyped-call]
            self._pool.join()
        self._pool = None


class Pool:
    """A few workers that take jobs in order; a context manager that leaves no process behind."""

    def __init__(self, workers: int) -> None:
        CONSTS.term_timeout = TERM
        self._slots = [Slot() for _ in range(workers)]

    def __enter__(self) -> Pool:
        return self

    def __exit__(
        self, kind: type[BaseException] | None, error: BaseException | None, trace: TracebackType | None
    ) -> None:
        for slot in self._slots:
            slot.stop()

    def run(self, jobs: Iterable[Job], tick: Callable[[], None] = lambda: None) -> Iterator[Outcome]:
        """The outcome of every job, as they come in.

        `tick` is called now and then while nothing comes in.
        """
        waiting = iter(jobs)
        done: queue.SimpleQueue[tuple[Slot, _Run]] = queue.SimpleQueue()
        busy: dict[Slot, _Run] = {}

        def start(slot: Slot, job: Job, again: bool = False) -> None:
            run = busy[slot] = slot.start(job, again)
            run.future.add_done_callback(lambda _: done.put((slot, run)))

        def lost(slot: Slot, run: _Run) -> bool:
            """Whether the job's end will never be heard of."""
            return slot.broken or _overdue(run)

        for slot, job in zip(self._slots, waiting, strict=False):
            start(slot, job)
        while busy:
            try:
                slot, run = done.get(timeout=0.2)
            except queue.Empty:
                tick()
                stray = next((x for x in busy.items() if lost(*x) and not x[1].future.done()), None)
                if stray is None:
                    continue
                slot, run = stray
            if busy.get(slot) is not run:
                continue
            error = _error(run)
            if isinstance(error, BrokenProcessPool):
                slot.stop()
                if not run.again:  # the worker may have died before the job reached it
                    start(slot, run.job, again=True)
                    continue
            answer = run.future.result() if error is None else _stopped(error)
            del busy[slot]
            following = next(waiting, None)
            if following is not None:
                start(slot, following)
            yield Outcome(run.job, answer, time.monotonic() - run.began, not done.empty())


def _overdue(run: _Run) -> bool:
    return time.monotonic() - run.began > run.job.seconds + OVERDUE


def _error(run: _Run) -> BaseException | None:
    """The error of a run; of one that is given up, the error it stands for."""
    if run.future.done():
        return run.future.exception()
    return OutOfWait() if _overdue(run) else BrokenProcessPool()


def _stopped(error: BaseException) -> Stopped:
    if isinstance(error, OutOfWait):
        return Stopped("the time limit was reached")
    if isinstance(error, ProcessExpired | BrokenProcessPool):
        return Stopped("the worker process died")
    return Stopped(f"an error inside the program: {type(error).__name__}: {error}")
