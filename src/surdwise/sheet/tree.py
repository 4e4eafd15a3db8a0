"""The syntax tree of a claim sheet: frozen nodes with a place on each.

A node compares equal to another with the same content wherever it stands: the place
(`span`) is left out of comparisons.  Nothing here knows geometry.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from fractions import Fraction


@dataclass(frozen=True)
class Span:
    """A place in the file: line and columns, counted from 1; `end` is the column after."""

    line: int
    column: int
    end: int


NOWHERE = Span(0, 0, 0)


@dataclass(frozen=True)
class Pt:
    """A reference to a point by name."""

    name: str
    span: Span = field(default=NOWHERE, compare=False)

    def __str__(self) -> str:
        return self.name


@dataclass(frozen=True)
class Named:
    """A reference to a named line or circle."""

    name: str
    span: Span = field(default=NOWHERE, compare=False)


@dataclass(frozen=True)
class Through:
    """The line through two points, or the circle through three."""

    points: tuple[Pt, ...]
    span: Span = field(default=NOWHERE, compare=False)


Curve = Named | Through


@dataclass(frozen=True)
class CentreOf:
    """`centre of k`, standing where a point may stand."""

    circle: Curve
    span: Span = field(default=NOWHERE, compare=False)


PointRef = Pt | CentreOf


# ---------------------------------------------------------------- quantities


@dataclass(frozen=True)
class Number:
    """An exact rational number."""

    value: Fraction
    span: Span = field(default=NOWHERE, compare=False)


@dataclass(frozen=True)
class Measure:
    """A measured quantity of the figure.

    `kind` is one of length, dist, area, perimeter, circumradius, inradius, exradius,
    median, altitude, bisector, cos, sin.  `points` are its points in order (for
    exradius, median, altitude and bisector: the triangle, then the vertex; for dist: the
    point alone, which may be the centre of a circle, with the line in `line`).
    """

    kind: str
    points: tuple[PointRef, ...]
    line: Curve | None = None
    span: Span = field(default=NOWHERE, compare=False)


@dataclass(frozen=True)
class Unary:
    """`op` is one of neg, sqrt, abs (the reader puts the minus of a number into the Number)."""

    op: str
    arg: Quantity
    span: Span = field(default=NOWHERE, compare=False)


@dataclass(frozen=True)
class Binary:
    """`op` is one of + - * / ^ (the right side of ^ is an integer Number).

    The reader makes one Number of an integer divided by an integer, as in `3/4`.
    """

    op: str
    left: Quantity
    right: Quantity
    span: Span = field(default=NOWHERE, compare=False)


Quantity = Number | Measure | Unary | Binary


# ---------------------------------------------------------------- conditions


@dataclass(frozen=True)
class Comparison:
    """A chain `q0 ops[0] q1 ops[1] ...`; each op one of = < <= > >=."""

    items: tuple[Quantity, ...]
    ops: tuple[str, ...]
    span: Span = field(default=NOWHERE, compare=False)


Arg = Pt | Named | Through | CentreOf | Quantity | tuple[Pt, ...] | str


@dataclass(frozen=True)
class Relation:
    """A relation or condition in words, such as `C between A and B`; forms in forms.py."""

    form: str
    args: tuple[Arg, ...]
    span: Span = field(default=NOWHERE, compare=False)


@dataclass(frozen=True)
class Not:
    """Negation."""

    arg: Condition
    span: Span = field(default=NOWHERE, compare=False)


@dataclass(frozen=True)
class And:
    """Conjunction."""

    args: tuple[Condition, ...]
    span: Span = field(default=NOWHERE, compare=False)


@dataclass(frozen=True)
class Or:
    """Disjunction."""

    args: tuple[Condition, ...]
    span: Span = field(default=NOWHERE, compare=False)


Condition = Comparison | Relation | Not | And | Or


# ---------------------------------------------------------------- sheets


@dataclass(frozen=True)
class Fact:
    """One `given` line in words: a construction, a shape, a point on a curve, a curve."""

    form: str
    args: tuple[Arg, ...]
    span: Span = field(default=NOWHERE, compare=False)


@dataclass(frozen=True)
class Line:
    """One statement line: its keyword, its text as written, what it says."""

    keyword: str
    text: str
    body: Fact | Condition
    span: Span = field(default=NOWHERE, compare=False)


@dataclass(frozen=True)
class Sheet:
    """One claim sheet: figure, conditions, claims."""

    file: str
    title: str
    source: str
    given: tuple[Line, ...]
    provided: tuple[Line, ...]
    claims: tuple[Line, ...]
    text: str
