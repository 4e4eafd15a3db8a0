"""What the forms of given lines are written in: a view of the figure that places, chooses, demands."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Any

from .forms_plane import Figure, Straight, Vec, View, cross, dot, orientation, square
from .protocol import Num, Placing

CARTESIAN, SIDES, INCIRCLE, HALF_ANGLES = "cartesian", "sides", "incircle", "half-angles"


@dataclass(frozen=True)
class Frame:
    """How the first points are placed, and whether the sheet fixes the scale."""

    kind: str
    keeps_scale: bool


class Drawing(View):
    """One given line at work.  A point that is placed already is not placed again but checked."""

    numbers: Placing

    def __init__(self, figure: Figure, placing: Placing, frame: Frame) -> None:
        super().__init__(figure, placing)
        self.numbers: Placing = placing
        self.frame = frame

    # ------------------------------------------------------------ demands

    def differ(self, a: Vec, b: Vec, words: str) -> None:
        """Two points must not coincide."""
        self.numbers.require(square(b - a), "!=", words)

    def apart(self, p: str, q: str) -> None:
        """Two placed points must not coincide."""
        self.differ(self.at(p), self.at(q), f"{p} = {q}")

    def proper(self, triangle: Sequence[str]) -> None:
        """Three placed points must not be on one line."""
        a, b, c = (self.at(p) for p in triangle)
        self.numbers.require(orientation(a, b, c), "!=", f"{', '.join(triangle)} are on one line")

    # ------------------------------------------------------------ placing

    def has(self, p: str) -> bool:
        """Whether the point is placed already."""
        return p in self.figure.points

    def put(self, p: str, v: Vec) -> None:
        """Place a point there, or demand that it lies there."""
        if not self.has(p):
            self.figure.points[p] = v
            return
        d = self.at(p) - v
        self.numbers.vanish(d.x, f"{p} lies elsewhere")
        self.numbers.vanish(d.y, f"{p} lies elsewhere")

    def scale(self, label: str) -> Num:
        """A positive parameter where the sheet fixes the scale, 1 where it does not."""
        return self.numbers.parameter(label, "positive") if self.frame.keeps_scale else self.numbers.number(1)

    def free(self, p: str, mates: Sequence[str] = (), off_line: bool = False) -> None:
        """A free point in the Cartesian frame.

        Up to similarity (congruence where the scale is kept) the first point is (0, 0), the first that
        differs from it (1, 0) or (w, 0) with w > 0, and the first off the axis has y > 0, by a reflection.
        A point that its shape (`mates`) does not keep apart from the origin may also fall on it: that is
        the missed position.  `off_line`: the shape keeps it off the lines of its other points, so that y
        cannot be 0 once two mates are apart on the axis.
        """
        n, placed = self.numbers, self.figure.points
        zero = n.number(0)
        if not placed:
            placed[p] = Vec(zero, zero)
            return
        there = [placed[q] for q in mates if q != p and q in placed]
        if all(n.same(square(v)) for v in placed.values()):
            if not there and n.at_missed():
                placed[p] = Vec(zero, zero)
            else:
                placed[p] = Vec(self.scale(f"|{next(iter(placed))}{p}|"), zero)
            return
        x = n.parameter(f"x of {p}", "free")
        domain = "free"
        if all(n.same(v.y) for v in placed.values()):
            apart = off_line and any(not n.same(v.x - there[0].x) for v in there[1:])
            domain = "positive" if apart else "folded"
        placed[p] = Vec(x, n.parameter(f"y of {p}", domain))

    # ------------------------------------------------------------ common parts

    def along(self, p: str, line: Straight, label: str) -> Num:
        """Place p anywhere on the line, or demand that it is there; its coordinate along the line."""
        if self.has(p):
            v = self.at(p) - line.point
            self.numbers.vanish(cross(line.direction, v), f"{p} is not on the line")
            above = dot(v, line.direction)
            return self.numbers.divide(above, square(line.direction), "the line is not defined")
        t = self.numbers.parameter(label, "free")
        self.put(p, line.point + line.direction * t)
        return t

    def length(self, a: Vec, b: Vec) -> Num:
        """Distance of two points."""
        return self.numbers.root(square(b - a))

    def bisector(self, triple: tuple[str, ...]) -> Straight:
        """The ray that halves angle BAC, from A inside: direction |AC| AB + |AB| AC, a diagonal of the
        rhombus on two vectors of one length.  Not defined for a straight angle."""
        b, a, c = (self.at(p) for p in triple)
        self.differ(a, b, f"{triple[1]} = {triple[0]}")
        self.differ(a, c, f"{triple[1]} = {triple[2]}")
        m, n = self.length(a, b), self.length(a, c)
        d = (b - a) * n + (c - a) * m
        self.numbers.require(square(d), "!=", f"angle {''.join(triple)} is straight")
        return Straight(a, d)

    def sides(self, triangle: Sequence[str]) -> list[Num]:
        """Lengths of the sides opposite the three corners."""
        a, b, c = triangle
        return [self.span(b, c), self.span(c, a), self.span(a, b)]

    def weighted(self, triangle: Sequence[str], weights: Sequence[Num]) -> Vec:
        """The point with the given barycentric weights."""
        a, b, c = (self.at(p) for p in triangle)
        x, y, z = weights
        k = self.numbers.divide(self.numbers.number(1), x + y + z, f"{', '.join(triangle)} are on one line")
        return (a * x + b * y + c * z) * k

    def touching(self, triangle: tuple[str, ...], opposite: str) -> Vec:
        """Incentre (weights a : b : c), or with `opposite` the excentre beyond that corner's side (its weight
        negative).  The triangle must be proper."""
        self.proper(triangle)
        weights = self.sides(triangle)
        return self.weighted(
            triangle, [-w if p == opposite else w for p, w in zip(triangle, weights, strict=True)]
        )

    def touches_sides(self, p: str, triangle: tuple[str, ...], opposite: str) -> None:
        """Demand that a placed point is the incentre, or the excentre opposite a corner: as far from each of
        the side lines, on the inner side of each but that of the corner."""
        self.proper(triangle)
        n = self.numbers
        whole = self.turn(*_three(triangle))
        far: list[tuple[Num, Num]] = []
        for i, corner in enumerate(triangle):
            a, b = triangle[(i + 1) % 3], triangle[(i + 2) % 3]
            t = self.turn(a, b, p)
            inner = -(t * whole) if corner == opposite else t * whole
            n.require(inner, ">", f"{p} is on the wrong side of {a}{b}")
            far.append((t * t, self.gap2(a, b)))
        for (s, u), (t, w) in ((far[0], far[1]), (far[1], far[2])):
            n.vanish(s * w - t * u, f"{p} is not as far from all sides")


def _three(triangle: Sequence[str]) -> tuple[str, str, str]:
    a, b, c = triangle
    return a, b, c


Form = Callable[..., None]
FORMS: dict[str, Form] = {}


def form(name: str) -> Callable[[Form], Form]:
    """Enter a function into the table of forms under the form's name."""

    def enter(fn: Form) -> Form:
        assert name not in FORMS, name
        FORMS[name] = fn
        return fn

    return enter


def perform(d: Drawing, name: str, args: tuple[Any, ...]) -> None:
    """Run one construction."""
    FORMS[name](d, *args)

