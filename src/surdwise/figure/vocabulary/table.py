"""The table of constructions: form name to the function that builds it.

A construction is `fn(b: Builder, *args)`, straight-line code that places points and curves or
lets elements vanish; args stand in the order of the sheet's text.  A new form is one line of
the grammar, one row of `sheet/forms.py` and one function here.
"""

from __future__ import annotations

from collections.abc import Callable

Construction = Callable[..., None]
CONSTRUCTIONS: dict[str, Construction] = {}


def form(*names: str) -> Callable[[Construction], Construction]:
    """Register a construction under its form's name."""

    def enter(fn: Construction) -> Construction:
        for name in names:
            if name in CONSTRUCTIONS:
                raise ValueError(f"form {name} is built twice")
            CONSTRUCTIONS[name] = fn
        return fn

    return enter
