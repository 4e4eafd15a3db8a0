"""Memory of a process, as the kernel tells it; None where it tells nothing."""

from __future__ import annotations

import re
from pathlib import Path


def _status(pid: int, field: str) -> int | None:
    try:
        found = re.search(rf"^{field}:\s+(\d+) kB", Path(f"/proc/{pid}/status").read_text("ascii"), re.M)
    except (OSError, UnicodeDecodeError):
        return None
    return int(found.group(1)) if found else None


def peak_of(pid: int) -> int | None:
    """Largest resident memory so far, in KiB."""
    return _status(pid, "VmHWM")


def now_of(pid: int) -> int | None:
    """Resident memory now, in KiB."""
    return _status(pid, "VmRSS")


def children_of(pid: int) -> list[int]:
    """Processes that a process started."""
    try:
        return [int(x) for x in Path(f"/proc/{pid}/task/{pid}/children").read_text("ascii").split()]
    except (OSError, ValueError):
        return []
