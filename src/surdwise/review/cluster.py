"""The same jobs on a cluster that is there already, by dask.distributed.

A cluster's worker may not be killed for one claim, and may not start processes by
multiprocessing; so each keeps children (child.py) that do the work and can be killed.  Jobs of a
worker that dies are given to another one by the scheduler; each job's end is taken once.
"""

from __future__ import annotations

import pickle
import queue
import subprocess
import sys
import time
import uuid
from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass
from multiprocessing.connection import Connection, Pipe
from typing import Any

from distributed import Client, KilledWorker, Worker, WorkerPlugin, get_worker

from .. import __version__
from ..sheet import SurdwiseError
from .pool import Job, Outcome
from .work import Stopped

READY = 60.0  # seconds that a child has to start
PATIENCE = 60.0  # seconds without any worker after which a cluster is given up
CONNECT = 10.0  # seconds to reach a scheduler


class ClusterError(SurdwiseError):
    """A cluster that cannot be used."""


class Child:
    """A process that works for this one and is killed when it must be."""

    def __init__(self) -> None:
        ours, theirs = Pipe()
        self._line: Connection = ours
        fd = theirs.fileno()
        self._process = subprocess.Popen(
            [sys.executable, "-m", "surdwise.review.child", str(fd)], pass_fds=[fd], stdin=subprocess.DEVNULL
        )
        theirs.close()
        if not self._line.poll(READY) or self._line.recv_bytes() != b"ready":
            self.kill()
            raise ClusterError(f"expected a child process to start within {READY:g} s, got none")

    def ask(self, request: bytes, seconds: float) -> Any:
        """The answer to a request; a child that is `dead` or late afterwards gives a Stopped."""
        self._line.send_bytes(request)
        if not self._line.poll(seconds):
            self.kill()
            return Stopped("the time limit was reached")
        try:
            return pickle.loads(self._line.recv_bytes())  # our own child's answer
        except (EOFError, OSError):
            self.kill()
            return Stopped("the worker process died")

    @property
    def dead(self) -> bool:
        """Whether the child can take no more requests."""
        return self._process.poll() is not None

    def kill(self) -> None:
        """End the child, whatever it does."""
        self._process.kill()
        self._process.wait()
        self._line.close()


class Children(WorkerPlugin):
    """The idle children of one worker of the cluster, for one review."""

    def setup(self, worker: Worker) -> None:
        """Called by the worker when the plugin reaches it."""
        self._idle: queue.LifoQueue[Child] = queue.LifoQueue()

    def teardown(self, worker: Worker) -> None:
        """Called by the worker when it closes."""
        while not self._idle.empty():
            self._idle.get_nowait().kill()

    def run(self, request: bytes, seconds: float) -> Any:
        """One request, by an idle child or a new one."""
        child = self._child()
        try:
            answer = child.ask(request, seconds)
        except OSError:  # it died while it was idle
            child.kill()
            child = Child()
            answer = child.ask(request, seconds)
        if not child.dead:
            self._idle.put(child)
        return answer

    def _child(self) -> Child:
        try:
            return self._idle.get_nowait()
        except queue.Empty:
            return Child()


@dataclass(frozen=True)
class Told:
    """What a worker of the cluster says: its version of this program, the answer, seconds."""

    version: str
    answer: Any
    seconds: float


def _there(name: str, request: bytes, seconds: float) -> Told:
    """Runs on a worker of the cluster that has the plugin of this name."""
    began = time.monotonic()
    children: Any = get_worker().plugins[name]
    return Told(__version__, children.run(request, seconds), time.monotonic() - began)


def run(address: str, jobs: Sequence[Job], tick: Callable[[], None] = lambda: None) -> Iterator[Outcome]:
    """The outcome of every job, as they come in.

    Raises ClusterError when there is no scheduler, no worker, or another version of this program
    on a worker.
    """
    try:
        client: Any = Client(address, timeout=CONNECT, set_as_default=False)  # type: ignore[no-untyped-call]
    except (OSError, TimeoutError, ValueError) as e:
        raise ClusterError(f"expected a scheduler at {address}, got none: {e}") from None
    name = f"surdwise-review-{uuid.uuid4().hex[:12]}"
    with client:
        client.register_plugin(Children(), name=name)
        try:
            yield from _submitted(client, name, jobs, tick)
        finally:
            if client.status == "running":
                client.unregister_worker_plugin(name)  # ends the children


def _submitted(client: Any, name: str, jobs: Sequence[Job], tick: Callable[[], None]) -> Iterator[Outcome]:
    done: queue.SimpleQueue[Any] = queue.SimpleQueue()
    waiting: dict[str, tuple[Job, Any]] = {}
    for i, job in enumerate(jobs):
        request = pickle.dumps((job.seconds, job.work, job.args))
        future = client.submit(_there, name, request, job.seconds, key=f"{name}-{i}", pure=False)
        waiting[future.key] = (job, future)
        future.add_done_callback(done.put)
    alone = time.monotonic()
    while waiting:
        try:
            key = done.get(timeout=0.5).key
        except queue.Empty:
            tick()
            if client.status == "running" and client.scheduler_info()["workers"]:
                alone = time.monotonic()
            elif time.monotonic() - alone > PATIENCE:
                raise ClusterError(f"expected workers on the cluster, got none for {PATIENCE:g} s") from None
            continue
        if key not in waiting:
            continue
        job, future = waiting.pop(key)
        told = _told(future)
        if told is None:
            yield Outcome(job, Stopped("the workers that did the work died"), 0.0)
        else:
            yield Outcome(job, told.answer, told.seconds, not done.empty())
        future.release()


def _told(future: Any) -> Told | None:
    """The result of a future that is done; None where every worker that tried it died."""
    try:
        told = future.result()
    except KilledWorker:
        return None
    except ClusterError:
        raise
    except Exception as e:
        raise ClusterError(f"expected an answer from the cluster, got {type(e).__name__}: {e}") from e
    assert isinstance(told, Told)
    if told.version != __version__:
        raise ClusterError(f"expected surdwise {__version__} on every worker, got {told.version}")
    return told
