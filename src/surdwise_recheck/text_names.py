"""Names across the lines of a sheet: each is made once, before it is used, and of the right kind."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, field

from .tree import (
    And,
    Applied,
    Build,
    Centre,
    Compare,
    Condition,
    Constant,
    FrameSign,
    Joined,
    Measure,
    Name,
    Not,
    Or,
    Power,
    Quantity,
    Run,
    Says,
)

# forms whose first points may be placed already: then the line is a constraint
_AGAIN = {
    "triangle",
    "quadrilateral",
    "equilateral_triangle",
    "isosceles_triangle",
    "right_triangle",
    "square",
    "rectangle",
    "parallelogram",
    "rhombus",
    "kite",
    "trapezium",
    "cyclic_quadrilateral",
    "tangential_quadrilateral",
    "regular_pentagon",
    "regular_hexagon",
    "on_line",
    "on_segment",
    "on_ray",
    "on_circle",
    "on_perpendicular_bisector",
    "on_angle_bisector",
    "inside_triangle",
}
_CIRCLES = {
    "circle_through",
    "circle_centre_through",
    "circle_diameter",
    "circle_centre_radius",
    "incircle",
    "excircle",
}
_LINES = {"line_through", "parallel", "perpendicular", "perpendicular_bisector", "angle_bisector", "tangent"}
_OF_CIRCLE = {"on_circle", "centre", "tangent"}
_WORDS = {"acute", "right", "obtuse", "away", "towards"}


class Misnamed(Exception):
    """A name that is unknown, doubled or of the wrong kind."""


@dataclass
class Names:
    """What the given lines read so far have made: points; curves with `line` or `circle`."""

    points: set[str] = field(default_factory=set)
    curves: dict[str, str] = field(default_factory=dict)

    def build(self, b: Build, said: tuple[tuple[str, str], ...]) -> None:
        """Check one construction and enter what it makes."""
        new = 2 if b.form == "square_corners" else 1
        if b.form in _CIRCLES | _LINES:
            k = b.args[0]
            assert isinstance(k, str)
            self._all(b, b.args[1:])
            if k in self.curves:
                raise Misnamed(f"{k} is named already")
            self.curves[k] = "circle" if b.form in _CIRCLES else "line"
            return
        made: list[str] = []
        for arg in b.args[:new]:
            made += arg if isinstance(arg, tuple) else [str(arg)]
        rest = [a for a in b.args[new:] if not (b.form.endswith("_triangle") and a in made)]
        self._all(b, tuple(rest))
        for p in made:
            if p in self.points and b.form not in _AGAIN:
                raise Misnamed(f"{p} is made already")
        self.points.update(made)
        for name, kind in said:
            self.curve(Name(name), kind)
        if b.form == "meet_other" and [self.kind(a) for a in b.args[1:3]] == ["line", "line"]:
            raise Misnamed("two lines meet once: `other than` needs a circle")

    def kind(self, a: object) -> str:
        """Whether a reference means a line or a circle."""
        if isinstance(a, Run):
            return "line" if len(a.points) == 2 else "circle"
        return self.curves.get(a.name, "") if isinstance(a, Name) else ""

    def curve(self, a: Run | Name, wanted: str) -> None:
        """A curve of the wanted kind ("" for either) whose name or points are known."""
        if isinstance(a, Run):
            self.known(a.points)
        elif a.name not in self.curves:
            raise Misnamed(f"no line or circle {a.name} is made before this line")
        if wanted and self.kind(a) != wanted:
            raise Misnamed(f"expected a {wanted}")

    def known(self, points: tuple[str, ...]) -> None:
        """Points that are made before."""
        for p in points:
            if p not in self.points:
                raise Misnamed(f"no point {p} is made before this line")

    def _all(self, b: Build | Says, args: tuple[object, ...]) -> None:
        wanted = "circle" if b.form in _OF_CIRCLE else "" if b.form.startswith("meet") else "line"
        for a in args:
            self._part(a, wanted)

    def _part(self, a: object, wanted: str) -> None:
        match a:
            case Run() | Name():
                self.curve(a, wanted)
            case Centre():
                self.curve(a.circle, "circle")
            case tuple():
                self.known(a)
            case str():
                if a not in _WORDS:
                    self.known((a,))
            case Constant() | Measure() | Applied() | Joined() | Power():
                self.quantity(a)
            case _:
                raise TypeError(f"expected part of a statement, got {type(a).__name__}")

    def quantity(self, q: Quantity) -> None:
        """Every name in a quantity."""
        for m in measures(q):
            for p in m.points:
                self._part(p, "")
            if m.line is not None:
                self.curve(m.line, "line")

    def condition(self, c: Condition) -> None:
        """Every name in a condition."""
        match c:
            case Not():
                self.condition(c.arg)
            case And() | Or():
                for part in c.args:
                    self.condition(part)
            case Compare():
                for q in c.items:
                    self.quantity(q)
            case Says():
                self._all(c, c.args)
            case FrameSign():
                pass


def measures(q: Quantity) -> Iterator[Measure]:
    """The measured quantities in a quantity."""
    stack: list[Quantity] = [q]
    while stack:
        part = stack.pop()
        match part:
            case Measure():
                yield part
            case Applied():
                stack.append(part.arg)
            case Joined():
                stack += [part.left, part.right]
            case Power():
                stack.append(part.base)
            case Constant():
                pass
