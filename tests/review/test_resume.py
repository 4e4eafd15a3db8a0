"""A review that is killed goes on where it was: nothing is lost, nothing is done twice."""

from __future__ import annotations

import json
import os
import random
import signal
import subprocess
import sys
import time
from collections import Counter
from pathlib import Path
from typing import Any

import pytest

from surdwise.review import review
from surdwise.review.journal import Entry, Journal, JournalError

from .works import SHEET, Tell, decided, folder_of

ROOT = Path(__file__).parents[2]
FILES = 16
KILLS = 4

REVIEW = """
import sys
from surdwise.review import review
from tests.review.works import logged
sys.exit(review(sys.argv[1], jsonl=sys.argv[2], junit=sys.argv[3], workers=2, resume=True, work=logged))
"""


def alive(pid: int) -> bool:
    """Whether the process is there and no zombie."""
    try:
        return Path(f"/proc/{pid}/stat").read_text().rsplit(")", 1)[1].split()[0] != "Z"
    except OSError:
        return False


def settled_keys(journal: Path) -> set[tuple[str, int]]:
    """(title, line of the claim) of what the journal says is done."""
    entries = [Entry.of(line) for line in journal.read_bytes().splitlines()]
    return {(e.result["title"], e.key[2] + 2) for e in entries if e is not None}


def test_killed_at_random_moments(tmp_path: Path) -> None:
    folder = folder_of(tmp_path / "issue", **{f"s{i}": f"t{i}" for i in range(FILES)})
    for path in folder.iterdir():
        path.write_text(path.read_text() + "claim |AB| < |BA|\n")
    out, junit, starts = (tmp_path / n for n in ("out.jsonl", "out.xml", "starts"))
    journal = tmp_path / "out.jsonl.journal"
    command = [sys.executable, "-c", REVIEW, *map(str, (folder, out, junit))]
    env = os.environ | {"STARTS": str(starts), "PYTHONPATH": f"{ROOT / 'src'}{os.pathsep}{ROOT}"}
    seed = random.randrange(10**6)
    print("seed", seed)
    moments = random.Random(seed)
    frozen: dict[tuple[str, int], int] = {}

    def counts() -> Counter[tuple[str, int]]:
        text = starts.read_text() if starts.exists() else ""
        return Counter((w[0], int(w[1])) for w in map(str.split, text.splitlines()))

    kills = 0
    while kills < KILLS:
        process = subprocess.Popen(command, env=env, stdout=subprocess.DEVNULL, stderr=subprocess.DEVNULL)
        # from before the first claim to the middle of the work
        wait_for = moments.randrange(0, 8) if kills else 0
        begun = sum(counts().values())
        deadline = time.monotonic() + 20
        while sum(counts().values()) - begun < wait_for and process.poll() is None:
            assert time.monotonic() < deadline
            time.sleep(0.005)
        time.sleep(moments.uniform(0, 0.1))
        process.send_signal(signal.SIGKILL)
        process.wait()
        kills += 1
        workers = (
            {int(line.split()[2]) for line in starts.read_text().splitlines()} if starts.exists() else ()
        )
        while any(alive(pid) for pid in workers):
            assert time.monotonic() < deadline, "a worker outlives the review"
            time.sleep(0.01)
        if journal.exists():
            for key in settled_keys(journal):
                frozen.setdefault(key, counts()[key])
            with open(journal, "ab") as f:  # a line that was cut off
                f.write(b'{"file": "s0.claim", "sheet": 1, "cla')
    assert not out.exists()
    done = subprocess.run(command, env=env, capture_output=True, text=True, timeout=60)
    assert done.returncode == 1, done.stderr
    after = counts()
    assert frozen, "no kill came after the first claim was done"
    assert {key: after[key] for key in frozen} == frozen
    assert len(after) == 2 * FILES

    assert review(folder, jsonl=tmp_path / "whole.jsonl", workers=2) == 1
    got, whole = (
        [{k: v for k, v in json.loads(line).items() if k != "seconds"} for line in path.open()]
        for path in (out, tmp_path / "whole.jsonl")
    )
    assert got == whole
    assert len([e for e in map(Entry.of, journal.read_bytes().splitlines()) if e]) == 2 * FILES


def counted(sheet: Any, seconds: float, tell: Tell) -> dict[str, Any]:
    """decided, or undecided for the title `hard`; adds a line to the file that STARTS names."""
    with open(os.environ["STARTS"], "a") as f:
        f.write(sheet.title + "\n")
    answer = decided(sheet, seconds, tell)
    return answer | {"verdict": "undecided", "reason": "too hard"} if sheet.title == "hard" else answer


def test_what_is_decided_again(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """A changed sheet, and what was not settled if the limits have changed; nothing else."""
    starts = tmp_path / "starts"
    monkeypatch.setenv("STARTS", str(starts))
    folder = folder_of(tmp_path / "issue", a="a", b="b", c="hard")

    def again(seconds: float, resume: bool = True) -> list[str]:
        starts.write_text("")
        review(folder, jsonl=tmp_path / "o", workers=1, time_limit=seconds, resume=resume, work=counted)
        return sorted(starts.read_text().split())

    assert again(10) == ["a", "b", "hard"]
    assert again(10) == []
    assert again(20) == ["hard"]
    (folder / "b.claim").write_text(f"title b2\n{SHEET}")
    assert again(20) == ["b2"]
    moved = folder.rename(tmp_path / "elsewhere")
    folder = moved
    assert again(20) == []
    assert json.loads((tmp_path / "o").read_text().splitlines()[0])["file"] == str(moved / "a.claim")
    assert again(20, resume=False) == ["a", "b2", "hard"]


def test_a_broken_journal_costs_only_its_broken_lines(tmp_path: Path) -> None:
    path = tmp_path / "journal"
    good = [Entry((f"{i}.claim", 1, 1, "d"), {"verdict": "holds"}, (60.0, None), True) for i in range(3)]
    with Journal(path, resume=False) as journal:
        journal.add(good)
    data = path.read_bytes()
    for cut in range(0, len(data), 7):
        path.write_bytes(data[:cut])
        with Journal(path, resume=True) as journal:
            assert list(journal.entries.values()) == good[: data[:cut].count(b"\n")]
            journal.add(good[2:])
        with Journal(path, resume=True) as journal:
            assert good[2] in journal.entries.values()
    middle = data.splitlines(keepends=True)
    path.write_bytes(middle[0] + b"\0" * 40 + b"\n[1]\n{}\n" + middle[2])
    with Journal(path, resume=True) as journal:
        assert list(journal.entries.values()) == [good[0], good[2]]


def test_one_writer_at_a_time(tmp_path: Path) -> None:
    code = (
        "import sys; from pathlib import Path; from surdwise.review.journal import Journal\n"
        "with Journal(Path(sys.argv[1]), True): print('open', flush=True); sys.stdin.read()"
    )
    path = tmp_path / "journal"
    other = subprocess.Popen(
        [sys.executable, "-c", code, str(path)], stdin=subprocess.PIPE, stdout=subprocess.PIPE
    )
    try:
        assert other.stdout is not None
        assert other.stdout.readline() == b"open\n"
        with pytest.raises(JournalError, match="another review"):
            Journal(path, resume=True)
    finally:
        other.communicate()
    Journal(path, resume=True).__exit__(None, None, None)
