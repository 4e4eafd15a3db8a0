"""The journal of a benchmark: rows that are measured, so that a run that was stopped goes on.

One JSON object a line, on the disk before the next measurement starts.  The first line names the machine.
A last line that was cut off is removed; lines of other limits, other texts or other versions are
measured again.
"""

from __future__ import annotations

import hashlib
import json
import os
from pathlib import Path
from typing import Any

from ..sheet.errors import SurdwiseError
from ..sheet.tree import Sheet
from .measure import Options


class JournalError(SurdwiseError):
    """A journal that cannot be read or written."""


def key(sheet: Sheet, number: int, what: str, version: str, options: Options) -> str:
    """A name for one measurement: everything that its result may depend on but the machine."""
    o = options
    limits = [o.repeat, o.warm_up, o.time_limit, o.memory_limit, o.decide_limit]
    text = json.dumps(
        [sheet.text, sheet.given[0].span.line if sheet.given else 0, number, what, version, limits]
    )
    return hashlib.sha256(text.encode()).hexdigest()


class Journal:
    """Entries by key; a journal without a path lives in memory only."""

    def __init__(self, path: Path | None, resume: bool) -> None:
        self.path = path
        self.entries: dict[str, dict[str, Any]] = {}
        if path is None:
            return
        try:
            if resume and path.exists():
                self._read(path)
            else:
                path.write_bytes(b"")
        except OSError as e:
            raise JournalError(f"expected to write {path}, got: {e.strerror}") from None

    def _read(self, path: Path) -> None:
        data = path.read_bytes()
        whole = data.rfind(b"\n") + 1
        if whole < len(data):
            with open(path, "r+b") as f:
                f.truncate(whole)
        for line in data[:whole].splitlines():
            try:
                entry = json.loads(line)
                self.entries[str(entry["key"])] = dict(entry["fields"])
            except (ValueError, KeyError, TypeError):
                continue

    def add(self, name: str, fields: dict[str, Any]) -> None:
        """Keep an entry; it is on the disk when this returns."""
        self.entries[name] = fields
        if self.path is None:
            return
        try:
            with open(self.path, "ab") as f:
                f.write(json.dumps({"key": name, "fields": fields}).encode() + b"\n")
                f.flush()
                os.fsync(f.fileno())
        except OSError as e:
            raise JournalError(f"expected to write {self.path}, got: {e.strerror}") from None
