"""The machine a benchmark ran on."""

from __future__ import annotations

import datetime
import os
import platform
import re
from importlib.metadata import PackageNotFoundError, version
from pathlib import Path

from .. import __version__


def facts(engines: dict[str, str]) -> dict[str, str]:
    """Date, processor, cores, load, memory, systems and versions, as text."""
    out = {
        "date": datetime.date.today().isoformat(),
        "processor": _found("/proc/cpuinfo", r"model name\s*:\s*(.+)") or platform.processor() or "unknown",
        "cores": str(os.cpu_count() or "unknown"),
        "load at start": _load(),
        "memory": _memory(),
        "system": f"{platform.system()} {platform.machine()}",
        "Python": platform.python_version(),
        "surdwise": __version__,
        "python-flint": _version("python-flint"),
    }
    out |= {f"engine {k}": v for k, v in engines.items()}
    if "sympy" in engines:
        from sympy.external.gmpy import GROUND_TYPES

        out["numbers of sympy"] = str(GROUND_TYPES)
    return out


def _found(file: str, pattern: str) -> str | None:
    try:
        m = re.search(pattern, Path(file).read_text("utf-8"))
    except OSError:
        return None
    return m.group(1).strip() if m else None


def _load() -> str:
    try:
        return f"{os.getloadavg()[0]:.1f}"
    except OSError:
        return "unknown"


def _memory() -> str:
    kib = _found("/proc/meminfo", r"MemTotal:\s+(\d+) kB")
    return f"{int(kib) / (1 << 20):.1f} GiB" if kib else "unknown"


def _version(package: str) -> str:
    try:
        return version(package)
    except PackageNotFoundError:
        return "unknown"
