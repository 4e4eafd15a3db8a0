"""The table of engines."""

from __future__ import annotations

from ..sheet.errors import SurdwiseError
from .by_singular import SingularEngine
from .by_sympy import SympyEngine
from .by_tower import TowerEngine
from .engine import Engine

ENGINES: dict[str, type[Engine]] = {e.name: e for e in (TowerEngine, SingularEngine, SympyEngine)}


class EngineError(SurdwiseError):
    """An engine that is not known or not installed."""


def engines(names: list[str] | tuple[str, ...] = ()) -> dict[Engine, str]:
    """Engines by name, with their versions, in the table's order; without names every one that is
    installed.  Raises EngineError."""
    for n in names:
        if n not in ENGINES:
            raise EngineError(f"expected one of {', '.join(ENGINES)} as engine, got {n}")
    out: dict[Engine, str] = {}
    for n, kind in ENGINES.items():
        if names and n not in names:
            continue
        engine = kind()
        v = engine.version()
        if v is not None:
            out[engine] = v
        elif names:
            raise EngineError(f"expected the engine {n} to be installed, found none")
    return out
