"""Quantities by textbook formulas over numbers, from the syntax tree alone.

Nothing of the program's own algebra is used: a sheet's claim and numeric coordinates go in, the
two sides come out, as mpmath numbers.
"""

from __future__ import annotations

from collections.abc import Mapping
from itertools import pairwise
from typing import Any

import mpmath  # type: ignore[import-untyped]

from surdwise.sheet.tree import Comparison, Measure, Number, Pt, Quantity, Through, Unary

Place = tuple[Any, Any]
Places = Mapping[str, Place]


def apart(a: Place, b: Place) -> Any:
    """Distance."""
    return mpmath.hypot(a[0] - b[0], a[1] - b[1])


def sides_of(a: Place, b: Place, c: Place) -> tuple[Any, Any, Any]:
    """Sides opposite a, b, c."""
    return apart(b, c), apart(c, a), apart(a, b)


def heron(x: Any, y: Any, z: Any) -> Any:
    """Area of a triangle from its sides."""
    s = (x + y + z) / 2
    return mpmath.sqrt(abs(s * (s - x) * (s - y) * (s - z)))


def measure(q: Measure, at: Places) -> Any:
    """One measured quantity."""
    names = [p.name for p in q.points if isinstance(p, Pt)]
    assert len(names) == len(q.points)
    ps = [at[n] for n in names]
    if q.kind == "length":
        return apart(ps[0], ps[1])
    if q.kind == "dist":
        assert isinstance(q.line, Through)
        b, c = (at[p.name] for p in q.line.points)
        return 2 * heron(*sides_of(ps[0], b, c)) / apart(b, c)
    if q.kind == "area":
        # cut along the diagonals from the first vertex, with signs from the winding
        total = mpmath.mpf(0)
        for b, c in pairwise(ps[1:]):
            total += (b[0] - ps[0][0]) * (c[1] - ps[0][1]) - (b[1] - ps[0][1]) * (c[0] - ps[0][0])
        return abs(total) / 2
    if q.kind == "perimeter":
        return sum((apart(a, b) for a, b in zip(ps, ps[1:] + ps[:1], strict=True)), mpmath.mpf(0))
    if q.kind in ("cos", "sin"):
        b, a, c = ps
        x, y, z = sides_of(a, b, c)
        cos = (y * y + z * z - x * x) / (2 * y * z)
        return cos if q.kind == "cos" else mpmath.sqrt(1 - cos * cos)
    a, b, c = ps[:3]
    if q.kind == "circumradius":
        x, y, z = sides_of(a, b, c)
        return x * y * z / (4 * heron(x, y, z))
    if q.kind == "inradius":
        x, y, z = sides_of(a, b, c)
        return 2 * heron(x, y, z) / (x + y + z)
    while names[0] != names[3]:
        names[:3] = names[1:3] + names[:1]
    a, b, c = (at[n] for n in names[:3])
    x, y, z = sides_of(a, b, c)
    if q.kind == "exradius":
        return 2 * heron(x, y, z) / (y + z - x)
    if q.kind == "median":
        return apart(a, ((b[0] + c[0]) / 2, (b[1] + c[1]) / 2))
    if q.kind == "altitude":
        return 2 * heron(x, y, z) / x
    assert q.kind == "bisector"
    # its foot cuts the opposite side in the ratio of the sides at a
    foot = tuple((y * b[i] + z * c[i]) / (y + z) for i in range(2))
    return apart(a, (foot[0], foot[1]))


def quantity(q: Quantity, at: Places) -> Any:
    """A quantity of a figure with numeric points."""
    if isinstance(q, Number):
        return mpmath.mpf(q.value.numerator) / q.value.denominator
    if isinstance(q, Measure):
        return measure(q, at)
    if isinstance(q, Unary):
        x = quantity(q.arg, at)
        return -x if q.op == "neg" else mpmath.sqrt(x) if q.op == "sqrt" else abs(x)
    a, b = quantity(q.left, at), quantity(q.right, at)
    if q.op == "^":
        return a ** int(b)
    return a + b if q.op == "+" else a - b if q.op == "-" else a * b if q.op == "*" else a / b


def two_sides(claim: Comparison, at: Places) -> tuple[Any, Any]:
    """Left and right of an equality."""
    left, right = claim.items
    return quantity(left, at), quantity(right, at)
