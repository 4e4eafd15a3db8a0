"""Whether a sheet speaks of absolute lengths: dimensional analysis of its quantities.

A figure may be scaled freely unless some line compares quantities of different dimension, such
as `|AB| = 4`.  Exact.
"""

from __future__ import annotations

from collections.abc import Iterator

from ..sheet.tree import (
    And,
    Binary,
    Comparison,
    Condition,
    Fact,
    Measure,
    Not,
    Number,
    Or,
    Quantity,
    Sheet,
    Unary,
)
from .quantities import exponent

_DIMENSION = {"area": 2, "cos": 0, "sin": 0}


class _Mixed(Exception):
    """A sum of unlike dimensions."""


def keeps_scale(sheet: Sheet) -> bool:
    """Whether any line of the sheet fixes a length absolutely."""
    for line in (*sheet.given, *sheet.provided, *sheet.claims):
        body = line.body
        if isinstance(body, Fact):
            if body.form == "circle_centre_radius":
                radius = body.args[-1]
                try:
                    d = dimension(radius)  # type: ignore[arg-type]
                except _Mixed:
                    return True
                if d != 1:
                    return True
            continue
        if any(_absolute(c) for c in _comparisons(body)):
            return True
    return False


def _comparisons(c: Condition) -> Iterator[Comparison]:
    if isinstance(c, Comparison):
        yield c
    elif isinstance(c, Not):
        yield from _comparisons(c.arg)
    elif isinstance(c, (And, Or)):
        for x in c.args:
            yield from _comparisons(x)


def _absolute(c: Comparison) -> bool:
    try:
        dims = {d for d in (dimension(q) for q in c.items) if d is not None}
    except _Mixed:
        return True
    return len(dims) > 1


def dimension(q: Quantity) -> float | None:
    """Power of length in a quantity; None for zero, which has every dimension.

    Raises when a sum mixes dimensions.
    """
    if isinstance(q, Number):
        return None if q.value == 0 else 0
    if isinstance(q, Measure):
        return _DIMENSION.get(q.kind, 1)
    if isinstance(q, Unary):
        d = dimension(q.arg)
        return d if d is None or q.op != "sqrt" else d / 2
    assert isinstance(q, Binary)
    if q.op == "^":
        d = dimension(q.left)
        return None if d is None else d * exponent(q.right)
    a, b = dimension(q.left), dimension(q.right)
    if q.op == "*":
        return None if a is None or b is None else a + b
    if q.op == "/":
        return None if a is None or b is None else a - b
    if a is None or b is None:
        return b if a is None else a
    if a != b:
        raise _Mixed
    return a
