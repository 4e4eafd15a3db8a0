"""The same review on a cluster: a real scheduler and two workers over TCP on this machine."""

from __future__ import annotations

import json
import os
import signal
import socket
import subprocess
import sys
import threading
import time
from collections.abc import Iterator
from contextlib import ExitStack
from pathlib import Path
from typing import Any

import pytest

from surdwise.review import review
from surdwise.review.journal import Entry

from .test_resume import alive
from .works import folder_of, logged, troubled

distributed = pytest.importorskip("distributed", reason="dask.distributed is not installed")

ROOT = Path(__file__).parents[2]
FILES = 30


def free_port() -> int:
    with socket.socket() as s:
        s.bind(("127.0.0.1", 0))
        return int(s.getsockname()[1])


class Cluster:
    """A scheduler and its workers, as processes of their own."""

    def __init__(self, folder: Path) -> None:
        self.starts = folder / "starts"
        path = f"{ROOT / 'src'}{os.pathsep}{ROOT}"
        self._env = os.environ | {"PYTHONPATH": path, "STARTS": str(self.starts)}
        self._folder = folder
        self._stack = ExitStack()
        port = free_port()
        self.address = f"tcp://127.0.0.1:{port}"
        self.dask("scheduler", "--host", "127.0.0.1", "--port", str(port), "--no-dashboard")

    def dask(self, *args: str) -> subprocess.Popen[bytes]:
        """A dask command that runs until the end of the test."""
        with open(self._folder / f"{args[0]}.log", "ab") as log:
            process = subprocess.Popen(
                [sys.executable, "-m", "dask", *args], env=self._env, cwd=self._folder, stdout=log, stderr=log
            )
        self._stack.callback(process.wait)
        self._stack.callback(process.terminate)
        return process

    def worker(self, *options: str) -> subprocess.Popen[bytes]:
        """One more worker of one thread."""
        return self.dask("worker", self.address, "--nthreads", "1", "--no-dashboard", *options)

    def wait_for_workers(self, count: int) -> None:
        """Return when so many workers are there."""
        with distributed.Client(self.address, timeout=30, set_as_default=False) as client:
            client.wait_for_workers(count, timeout=60)

    def close(self) -> None:
        """End every process."""
        self._stack.close()


@pytest.fixture
def cluster(tmp_path: Path) -> Iterator[Cluster]:
    c = Cluster(tmp_path)
    yield c
    c.close()


def lines(path: Path) -> list[dict[str, Any]]:
    return [json.loads(line) for line in path.read_text(encoding="utf-8").splitlines()]


def test_a_worker_dies_midway(tmp_path: Path, cluster: Cluster) -> None:
    folder = folder_of(tmp_path / "issue", **{f"s{i:02}": f"t{i}" for i in range(FILES)})
    doomed = cluster.worker("--no-nanny")
    cluster.worker()  # with the process that watches over it, as clusters have them
    cluster.wait_for_workers(2)
    out = tmp_path / "out.jsonl"

    def pids() -> set[int]:
        text = cluster.starts.read_text() if cluster.starts.exists() else ""
        return {int(line.split()[2]) for line in text.splitlines()}

    def kill_midway() -> None:
        while len(pids()) < 2 or cluster.starts.read_text().count("\n") < FILES // 3:
            time.sleep(0.01)
        doomed.send_signal(signal.SIGKILL)

    killer = threading.Thread(target=kill_midway, daemon=True)
    killer.start()
    assert review(folder, jsonl=out, scheduler=cluster.address, workers=1, work=logged) == 0
    killer.join(5)
    assert doomed.poll() == -signal.SIGKILL  # before the end
    assert len(pids()) >= 2  # both did some of the work
    answers = lines(out)
    assert [d["title"] for d in answers] == [f"t{i}" for i in range(FILES)]
    entries = [Entry.of(line) for line in (tmp_path / "out.jsonl.journal").read_bytes().splitlines()]
    assert sorted(e.key[0] for e in entries if e) == [f"s{i:02}.claim" for i in range(FILES)]
    deadline = time.monotonic() + 5
    while any(alive(pid) for pid in pids()):  # the children end with the review
        assert time.monotonic() < deadline
        time.sleep(0.05)

    alone = tmp_path / "alone.jsonl"
    assert review(folder, jsonl=alone, workers=1) == 0
    strip = [{k: v for k, v in d.items() if k != "seconds"} for d in (*answers, *lines(alone))]
    assert strip[:FILES] == strip[FILES:]


def test_limits_hold_on_a_cluster(tmp_path: Path, cluster: Cluster) -> None:
    names = {"a": "hang", "b": "plain", "c": "eat", "d": "plain", "e": "crash", "f": "plain", "g": "err"}
    folder = folder_of(tmp_path / "issue", **names)
    cluster.worker()
    out = tmp_path / "out.jsonl"
    options: dict[str, Any] = {"time_limit": 0.5, "memory_limit": 96, "work": troubled}
    assert review(folder, jsonl=out, scheduler=cluster.address, workers=1, **options) == 3
    there = lines(out)
    assert [d["verdict"] == "holds" for d in there] == [title == "plain" for title in names.values()]
    assert review(folder, jsonl=out, workers=1, **options) == 3
    assert [d["reason"] for d in there] == [d["reason"] for d in lines(out)]


def test_no_scheduler_is_said(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    folder = folder_of(tmp_path / "issue", a="plain")
    assert review(folder, scheduler="no address", workers=1) == 2
    assert capsys.readouterr().err.startswith("expected a scheduler at no address, got none")
