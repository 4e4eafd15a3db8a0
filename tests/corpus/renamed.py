"""The same sheet said otherwise: points renamed, runs turned where the form means the same,
independent lines in another order."""

from __future__ import annotations

import random
from collections.abc import Sequence
from dataclasses import fields, is_dataclass, replace
from itertools import permutations
from typing import Any

from surdwise import Sheet
from surdwise.sheet import read_text, show
from surdwise.sheet.tree import Fact, Line, Measure, Named, Pt, Through
from surdwise.sheet.walk import parts

LETTERS = "ABCDEFGHIJKLMNOPQRSTUVWXYZ"
Turn = tuple[int, ...]


def ring(n: int) -> tuple[Turn, ...]:
    """The orders in which the corners of an n-gon may be read."""
    forward = [tuple((i + k) % n for i in range(n)) for k in range(n)]
    return tuple(forward + [t[::-1] for t in forward])


def anyhow(n: int) -> tuple[Turn, ...]:
    """All orders."""
    return tuple(permutations(range(n)))


SWAP: tuple[Turn, ...] = ((0, 1), (1, 0))
ANGLE: tuple[Turn, ...] = ((0, 1, 2), (2, 1, 0))

# form: (number of its argument that is a run, the orders of that run that mean the same)
RUNS: dict[str, tuple[tuple[int, tuple[Turn, ...]], ...]] = {
    "triangle": ((0, anyhow(3)),),
    "quadrilateral": ((0, ring(4)),),
    "equilateral_triangle": ((0, anyhow(3)),),
    "isosceles_triangle": ((0, anyhow(3)),),
    "right_triangle": ((0, anyhow(3)),),
    "square": ((0, ring(4)),),
    "rectangle": ((0, ring(4)),),
    "parallelogram": ((0, ring(4)),),
    "rhombus": ((0, ring(4)),),
    "kite": ((0, ((0, 1, 2, 3), (0, 3, 2, 1), (2, 1, 0, 3), (2, 3, 0, 1))),),
    "trapezium": ((0, ((0, 1, 2, 3), (1, 0, 3, 2), (2, 3, 0, 1), (3, 2, 1, 0))),),
    "cyclic_quadrilateral": ((0, ring(4)),),
    "tangential_quadrilateral": ((0, ring(4)),),
    "regular_pentagon": ((0, ring(5)),),
    "regular_hexagon": ((0, ring(6)),),
    "on_segment": ((1, SWAP),),
    "on_perpendicular_bisector": ((1, SWAP),),
    "on_angle_bisector": ((1, ANGLE),),
    "inside_triangle": ((1, anyhow(3)),),
    "midpoint": ((1, SWAP),),
    "foot_of_bisector": ((1, ANGLE), (2, SWAP)),
    "centroid": ((1, anyhow(3)),),
    "circumcentre": ((1, anyhow(3)),),
    "orthocentre": ((1, anyhow(3)),),
    "incentre": ((1, anyhow(3)),),
    "excentre": ((1, anyhow(3)),),
    "nine_point_centre": ((1, anyhow(3)),),
    "touch_point": ((1, anyhow(3)), (2, SWAP)),
    "equilateral_apex": ((1, SWAP),),
    "equilateral_apex_sided": ((1, SWAP),),
    "circle_through": ((1, anyhow(3)),),
    "circle_diameter": ((1, SWAP),),
    "incircle": ((1, anyhow(3)),),
    "excircle": ((1, anyhow(3)),),
    "line_through": ((1, SWAP),),
    "perpendicular_bisector": ((1, SWAP),),
    "angle_bisector": ((1, ANGLE),),
}
CORNERED = ("exradius", "median", "altitude", "bisector")


class Renaming:
    """New letters for the points of a sheet, and a source of chance for the rest."""

    def __init__(self, sheet: Sheet, seed: str) -> None:
        self.chance = random.Random(seed)
        names = sorted({p.name for line in (*sheet.given, *sheet.claims) for p in _points(line.body)})
        self.names = dict(zip(names, self.chance.sample(LETTERS, len(names)), strict=True))

    def said(self, node: Any) -> Any:
        """A node of the tree under the new names, its runs turned."""
        if isinstance(node, Pt):
            return Pt(self.names[node.name])
        if isinstance(node, tuple):
            return tuple(self.said(x) for x in node)
        if not is_dataclass(node):
            return node
        new = replace(node, **{f.name: self.said(getattr(node, f.name)) for f in fields(node)})  # type: ignore[type-var]
        return self._turned(new)

    def _turned(self, node: Any) -> Any:
        if isinstance(node, Through):
            return Through(self._mixed(node.points, anyhow(len(node.points))))
        if isinstance(node, Measure):
            return replace(node, points=self._measured(node))
        if not isinstance(node, Fact):
            return node
        args = list(node.args)
        if node.form == "points":
            args[0] = self._mixed(args[0], anyhow(len(args[0])))  # type: ignore[arg-type]
        elif node.form == "square_corners":
            if self.chance.random() < 0.5:  # D, E on BC are E, D on CB
                args[:3] = [args[1], args[0], args[2][::-1]]  # type: ignore[index]
        elif node.form in ("meet", "meet_other"):
            args[1:3] = self.chance.sample(args[1:3], 2)
        else:
            for at, turns in RUNS.get(node.form, ()):
                args[at] = self._mixed(args[at], turns)  # type: ignore[arg-type]
        return replace(node, args=tuple(args))

    def _measured(self, m: Measure) -> tuple[Any, ...]:
        n = len(m.points)
        if m.kind in ("cos", "sin"):
            return self._mixed(m.points, ANGLE)
        if m.kind in CORNERED:
            return (*self._mixed(m.points[:3], anyhow(3)), m.points[3])
        return self._mixed(m.points, ring(n)) if n > 1 else m.points

    def _mixed(self, run: Sequence[Any], turns: Sequence[Turn]) -> tuple[Any, ...]:
        return tuple(run[i] for i in self.chance.choice(turns))

    def sheet(self, sheet: Sheet) -> Sheet:
        """The whole sheet, its given lines in another order that introduces all names in time."""
        given = [replace(line, body=self.said(line.body)) for line in self._reordered(sheet.given)]
        asked = [replace(line, body=self.said(line.body)) for line in (*sheet.provided, *sheet.claims)]
        text = show(replace(sheet, given=tuple(given), provided=(), claims=()))
        text += "".join(show(line) + "\n" for line in asked)
        return read_text(text, sheet.file)[0]

    def _reordered(self, lines: Sequence[Line]) -> list[Line]:
        """A line stays behind the lines that introduced the other names it uses."""
        made_by: dict[str, int] = {}
        behind: list[set[int]] = []
        for i, line in enumerate(lines):
            uses = _names(line.body)
            behind.append({made_by[x] for x in uses if x in made_by})
            for x in uses:
                made_by.setdefault(x, i)
        out: list[int] = []
        while len(out) < len(lines):
            ready = [i for i in range(len(lines)) if i not in out and behind[i] <= set(out)]
            out.append(self.chance.choice(ready))
        return [lines[i] for i in out]


def _points(body: Any) -> list[Pt]:
    return [p for p in parts(body) if isinstance(p, Pt)]


def _names(body: Any) -> set[str]:
    return {p.name for p in parts(body) if isinstance(p, Pt | Named)}
