"""Whether a sheet fixes the scale of its figure: whether it compares quantities of different dimension."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction

from .tree import (
    And,
    Applied,
    Build,
    Compare,
    Condition,
    Constant,
    Joined,
    Measure,
    Not,
    Or,
    Power,
    Quantity,
    Sheet,
)


class _Mixed(Exception):
    """A sum of quantities of different dimension."""


def keeps_scale(sheet: Sheet) -> bool:
    """Whether similar figures may differ in what some line says."""
    for line in (*sheet.given, *sheet.provided, *sheet.claims):
        if isinstance(line.body, Build):
            if line.body.form == "circle_centre_radius" and _dimensions(line.body.args[-1:]) != {Fraction(1)}:
                return True
            continue
        for c in _comparisons(line.body):
            found = _dimensions(c.items)
            if found is None or len(found) > 1:
                return True
    return False


def _dimensions(items: tuple[object, ...]) -> set[Fraction] | None:
    """The powers of length in quantities; None where one mixes them.  Zero has every dimension and none."""
    try:
        found = {_power(q) for q in items}  # type: ignore[arg-type]
    except _Mixed:
        return None
    return {d for d in found if d is not None}


def _comparisons(c: Condition) -> Iterator[Compare]:
    match c:
        case Compare():
            yield c
        case Not():
            yield from _comparisons(c.arg)
        case And() | Or():
            for x in c.args:
                yield from _comparisons(x)
        case _:
            return


def _power(q: Quantity) -> Fraction | None:
    match q:
        case Constant():
            return Fraction(0) if q.value else None
        case Measure():
            return Fraction({"area": 2, "cos": 0, "sin": 0}.get(q.kind, 1))
        case Applied():
            d = _power(q.arg)
            return d if d is None or q.op != "sqrt" else d / 2
        case Power():
            d = _power(q.base)
            return None if d is None else d * q.exponent
        case Joined():
            a, b = _power(q.left), _power(q.right)
            if a is None or b is None:
                return None if q.op in "*/" else b if a is None else a
            if q.op == "*":
                return a + b
            if q.op == "/":
                return a - b
            if a != b:
                raise _Mixed
            return a
