"""What a claim sheet says, as frozen nodes.  Points and curves are names; nothing here knows geometry."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction

# ---------------------------------------------------------------- references


@dataclass(frozen=True)
class Run:
    """Points written as one run: the line through two, the circle through three."""

    points: tuple[str, ...]


@dataclass(frozen=True)
class Name:
    """A line or circle by its own name."""

    name: str


CurveRef = Run | Name


@dataclass(frozen=True)
class Centre:
    """`centre of k`, standing where a point may stand."""

    circle: CurveRef


PointRef = str | Centre


# ---------------------------------------------------------------- quantities


@dataclass(frozen=True)
class Constant:
    """An exact rational number."""

    value: Fraction


@dataclass(frozen=True)
class Measure:
    """A measured quantity: length, dist, area, perimeter, circumradius, inradius, exradius, median,
    altitude, bisector, cos or sin.

    `points` in the order of the text; for exradius, median, altitude and bisector the triangle and then
    the corner; for dist the point alone, its line standing in `line`.
    """

    kind: str
    points: tuple[PointRef, ...]
    line: CurveRef | None = None


@dataclass(frozen=True)
class Applied:
    """`op` (neg, sqrt or abs) of a quantity."""

    op: str
    arg: Quantity


@dataclass(frozen=True)
class Joined:
    """Two quantities joined by + - * or /."""

    op: str
    left: Quantity
    right: Quantity


@dataclass(frozen=True)
class Power:
    """A quantity to an integer power."""

    base: Quantity
    exponent: int


Quantity = Constant | Measure | Applied | Joined | Power


# ---------------------------------------------------------------- conditions

Arg = str | Run | Name | Centre | Constant | Measure | Applied | Joined | Power | tuple[str, ...]


@dataclass(frozen=True)
class Compare:
    """A chain: items[0] ops[0] items[1] ops[1] ...; each op one of = < <= > >=."""

    items: tuple[Quantity, ...]
    ops: tuple[str, ...]


@dataclass(frozen=True)
class Says:
    """A relation or condition in words."""

    form: str
    args: tuple[Arg, ...]


@dataclass(frozen=True)
class FrameSign:
    """A polynomial in the frame's parameters compared with 0 (op one of = != < <= > >=).

    `terms`: pairs of a monomial ((k, exponent), ...), k rising, and its coefficient; none is zero.
    """

    terms: tuple[tuple[tuple[tuple[int, int], ...], Fraction], ...]
    op: str


@dataclass(frozen=True)
class Not:
    """The condition does not hold."""

    arg: Condition


@dataclass(frozen=True)
class And:
    """All of them hold."""

    args: tuple[Condition, ...]


@dataclass(frozen=True)
class Or:
    """At least one of them holds."""

    args: tuple[Condition, ...]


Condition = Compare | Says | FrameSign | Not | And | Or


def links(c: Compare) -> tuple[Compare, ...]:
    """The single comparisons of a chain."""
    return tuple(Compare(c.items[i : i + 2], (op,)) for i, op in enumerate(c.ops))


# ---------------------------------------------------------------- sheets


@dataclass(frozen=True)
class Build:
    """What one `given` line constructs: a form of the table in forms.py and its arguments."""

    form: str
    args: tuple[Arg, ...]


@dataclass(frozen=True)
class Line:
    """A given, provided or claim line: its keyword, its text as written, its meaning."""

    keyword: str
    text: str
    body: Build | Condition


@dataclass(frozen=True)
class Sheet:
    """One claim sheet."""

    title: str
    source: str
    given: tuple[Line, ...]
    provided: tuple[Line, ...]
    claims: tuple[Line, ...]
    text: str
