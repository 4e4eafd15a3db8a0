"""Output files: checked before the work, replaced whole after it."""

from __future__ import annotations

import os
from pathlib import Path

from ..sheet import SurdwiseError


class OutputError(SurdwiseError):
    """A file that cannot be written."""


def check(path: Path) -> None:
    """Raise OutputError unless a file can be written there."""
    if path.is_dir():
        raise OutputError(f"expected a file to write, got the folder {path}")
    if not path.parent.is_dir():
        raise OutputError(f"expected a folder {path.parent} to write {path.name} in, got none")
    if not os.access(path if path.exists() else path.parent, os.W_OK):
        raise OutputError(f"expected to write {path}, got no permission")


def is_plain(path: Path) -> bool:
    """Whether the path is, or will be, an ordinary file (no device, no pipe)."""
    return path.is_file() or not path.exists()


def write(path: Path, text: str) -> None:
    """Put the text in the file, whole or not at all.  Raises OutputError."""
    data = text.encode("utf-8", "replace")
    try:
        if not is_plain(path):
            path.write_bytes(data)
            return
        path = path.resolve()
        new = path.with_name(f".{path.name}.new")
        with open(new, "wb") as f:
            f.write(data)
            f.flush()
            os.fsync(f.fileno())
        os.replace(new, path)
    except OSError as e:
        raise OutputError(f"expected to write {path}, got: {e.strerror}") from None
