"""surdwise: statements about distances in plane figures, decided as written.

    import surdwise
    for sheet in surdwise.read("next-issue.claim"):
        for decision in surdwise.decide(sheet):
            print(decision.claim, decision.verdict.value, decision.condition)

Names are loaded on first use.
"""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

__version__ = "0.1.0"

if TYPE_CHECKING:
    from .api import Cost, Rewriting, compare, decide, read, repair, rewrite
    from .sheet import Sheet, SheetError, SurdwiseError
    from .thesis.parts import Form
    from .verdict.outcome import Decision, Verdict

_HOMES = {
    "Cost": "api",
    "Decision": "verdict.outcome",
    "Form": "thesis.parts",
    "Rewriting": "api",
    "Sheet": "sheet",
    "SheetError": "sheet",
    "SurdwiseError": "sheet",
    "Verdict": "verdict.outcome",
    "compare": "api",
    "decide": "api",
    "read": "api",
    "repair": "api",
    "rewrite": "api",
}

__all__ = [
    "Cost",
    "Decision",
    "Form",
    "Rewriting",
    "Sheet",
    "SheetError",
    "SurdwiseError",
    "Verdict",
    "compare",
    "decide",
    "read",
    "repair",
    "rewrite",
]


def __getattr__(name: str) -> Any:
    if name not in _HOMES:
        raise AttributeError(f"module 'surdwise' has no attribute {name!r}")
    from importlib import import_module

    return getattr(import_module(f".{_HOMES[name]}", __name__), name)
