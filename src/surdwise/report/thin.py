"""Thin sets that a printed condition speaks of: its equations in floats, for the pen.

An equation is a function that vanishes; where several must hold together their common zeros are
sought by a shrinking cross.
"""

from __future__ import annotations

import itertools
import math
from collections.abc import Callable
from contextlib import suppress

from ..figure.conditions import EQUATIONS, equations, truth
from ..figure.quantities import difference
from ..sheet import SurdwiseError, read_line
from ..sheet.tree import And, Comparison, Condition, Fact, Not, Or, Relation
from ..verdict.spot import FloatHint
from .picture import XY

Field = Callable[[float, float], float]


def stated(text: str | None) -> Condition | None:
    """A condition of the decision as a tree; None for one that speaks of the frame."""
    if text is None or text in ("never", "always"):
        return None
    with suppress(SurdwiseError):
        body = read_line("provided", text)
        return None if isinstance(body, Fact) else body
    return None


def descend(f: Field, p: XY, step: float) -> XY | None:
    """A zero of a non-negative function near p, by a shrinking cross of eight ways."""
    best = f(*p)
    for _ in range(300):
        if step < 1e-13 or not (0 <= p[0] <= 1 and 0 <= p[1] <= 1):
            break
        ways = [
            (p[0] + step * math.cos(k * math.pi / 4), p[1] + step * math.sin(k * math.pi / 4))
            for k in range(8)
        ]
        q = min(ways, key=lambda x: finite(f(*x)))
        v = finite(f(*q))
        if v < best:
            p, best = q, v
        else:
            step /= 2
    return p if best < 1e-22 else None


def finite(x: float) -> float:
    return x if math.isfinite(x) else math.inf


def atoms(c: Condition) -> list[Condition]:
    """The equations in a condition."""
    if isinstance(c, Not):
        return atoms(c.arg)
    if isinstance(c, (And, Or)):
        return [a for x in c.args for a in atoms(x)]
    if isinstance(c, Comparison):
        return [c] if len(c.ops) == 1 else []
    return [c]


def count(c: Condition) -> int:
    """How many equations have to hold together."""
    if isinstance(c, And):
        return sum(count(x) for x in c.args)
    if isinstance(c, Not):
        return 2 if isinstance(c.arg, Relation) and c.arg.form == "distinct" else 0
    if isinstance(c, Comparison):
        return int(c.ops == ("=",))
    if isinstance(c, Relation):
        plain = c.form in EQUATIONS or c.form == "is_isosceles" or c.args[-1] == "right"
        return 2 if c.form == "is_equilateral" else int(plain)
    return 0


def near(table: dict[tuple[int, int], float], k: tuple[int, int]) -> list[float]:
    around = itertools.product((k[0] - 1, k[0], k[0] + 1), (k[1] - 1, k[1], k[1] + 1))
    return [table[x] for x in around if x in table]


def residues(c: Condition, j: FloatHint) -> list[float]:
    """What must vanish for an equation to hold; nothing for other conditions."""
    if isinstance(c, Comparison):
        return [float(difference(c.items[0], c.items[1], j))]  # type: ignore[arg-type]
    if not isinstance(c, Relation):
        return []
    found = equations(c, j)
    if found is not None:
        return [float(e) for e in found]  # type: ignore[arg-type]
    a = c.args
    spots = a[0] if isinstance(a[0], tuple) else ()
    if c.form == "is_isosceles":
        p, q = (x for x in spots if x != a[1])
        return [float(j.gap2(a[1], p) - j.gap2(a[1], q))]  # type: ignore[arg-type]
    if c.form == "is_equilateral":
        x, y, z = spots
        return [float(j.gap2(x, y) - j.gap2(y, z)), float(j.gap2(y, z) - j.gap2(z, x))]  # type: ignore[arg-type]
    if c.form == "angle_size" and a[1] == "right":
        x, y, z = spots
        return [float(j.lean(y, x, z))]  # type: ignore[arg-type]
    if c.form == "distinct" and len(spots) == 2:
        v = j.at(spots[0]) - j.at(spots[1])
        return [float(v.x), float(v.y)]  # type: ignore[arg-type]
    if c.form == "between":
        return [float(j.turn(c.args[1], c.args[2], c.args[0]))]  # type: ignore[arg-type]
    return []


def distance(c: Condition, j: FloatHint) -> float:
    """Zero where the equations of a condition hold, positive elsewhere."""
    if isinstance(c, And):
        return sum(distance(x, j) for x in c.args)
    if count(c):
        return sum(x * x for x in residues(c.arg if isinstance(c, Not) else c, j))
    return 0.0 if truth(c, j) else 1.0
