"""The journal of a review: what is done, so that a killed review goes on where it was.

One JSON object a line, appended and flushed to the disk before the claim counts as done.  A last
line that was cut off is removed when the journal is opened again; a line that cannot be read is
passed over (its claim is decided again).  Only one process writes a journal at a time.
"""

from __future__ import annotations

import fcntl
import json
import os
from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import Path
from types import TracebackType
from typing import Any

from ..sheet import SurdwiseError

Key = tuple[str, int, int, str]


class JournalError(SurdwiseError):
    """A journal that cannot be written."""


@dataclass(frozen=True)
class Entry:
    """A claim that is done: its answer as a JSON object, and the limits it was given.

    `settled` answers are final; the others may come out differently under other limits.
    """

    key: Key
    result: dict[str, Any]
    limits: tuple[float, int | None]
    settled: bool

    def line(self) -> bytes:
        """The entry as one line."""
        file, sheet, claim, digest = self.key
        data = {
            "file": file,
            "sheet": sheet,
            "claim": claim,
            "digest": digest,
            "limits": list(self.limits),
            "settled": self.settled,
            "result": self.result,
        }
        return json.dumps(data).encode() + b"\n"

    @staticmethod
    def of(line: bytes) -> Entry | None:
        """The entry of a line, or None for a line that is none."""
        try:
            d = json.loads(line)
            seconds, mebibytes = d["limits"]
            key = (str(d["file"]), int(d["sheet"]), int(d["claim"]), str(d["digest"]))
            return Entry(key, dict(d["result"]), (float(seconds), mebibytes), bool(d["settled"]))
        except (ValueError, KeyError, TypeError):
            return None


class Journal:
    """A journal file, open for appending and locked; with `resume` its entries stay in it."""

    def __init__(self, path: Path, resume: bool) -> None:
        self.path = path
        try:
            self._file = os.open(path, os.O_RDWR | os.O_CREAT | os.O_CLOEXEC, 0o666)
        except OSError as e:
            raise JournalError(f"expected to write {path}, got: {e.strerror}") from None
        try:
            # a lock of this process alone: workers forked from it do not hold it
            fcntl.lockf(self._file, fcntl.LOCK_EX | fcntl.LOCK_NB)
        except OSError:
            os.close(self._file)
            what = "a journal that another review writes"
            raise JournalError(f"expected to write {path}, got {what}") from None
        self.entries = self._kept() if resume else {}
        if not resume:
            os.ftruncate(self._file, 0)
        os.lseek(self._file, 0, os.SEEK_END)
        self._sync_folder()

    def __enter__(self) -> Journal:
        return self

    def __exit__(
        self, kind: type[BaseException] | None, error: BaseException | None, trace: TracebackType | None
    ) -> None:
        os.close(self._file)

    def _kept(self) -> dict[Key, Entry]:
        """The entries of the file, the last of each key; what was cut off at its end is removed."""
        # by this very descriptor: closing another one of the file would give up the lock
        data = b""
        while chunk := os.read(self._file, 1 << 20):
            data += chunk
        whole = data.rfind(b"\n") + 1
        os.ftruncate(self._file, whole)
        found = (Entry.of(line) for line in data[:whole].splitlines())
        return {e.key: e for e in found if e is not None}

    def _sync_folder(self) -> None:
        folder = os.open(self.path.parent, os.O_RDONLY)
        try:
            os.fsync(folder)
        finally:
            os.close(folder)

    def add(self, entries: Sequence[Entry]) -> None:
        """Append entries; they are on the disk when this returns.  Raises JournalError."""
        data = b"".join(e.line() for e in entries)
        try:
            while data:
                data = data[os.write(self._file, data) :]
            os.fsync(self._file)
        except OSError as e:
            raise JournalError(f"expected to write {self.path}, got: {e.strerror}") from None
