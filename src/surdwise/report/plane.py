"""A figure in floats: the sheet's own constructions read over numbers, for drawing only."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from contextlib import suppress
from typing import Any

from ..field.tower import Tower
from ..figure.component import Component
from ..figure.plane import Round, Straight, Vec
from ..figure.vocabulary import CONSTRUCTIONS
from ..sheet import FORMS, Kind
from ..sheet.tree import Curve as CurveRef
from ..sheet.tree import Fact, Line, Named, Pt, Through
from ..verdict.spot import FloatHint, Undefined
from .picture import XY

MISSING = (KeyError, Undefined, ZeroDivisionError, ArithmeticError)


class Plane(FloatHint):
    """Points with float coordinates, read like any figure; what a construction requires is not
    asked again, the points come from a figure that was admitted."""

    def __init__(self, points: dict[str, XY], given: Sequence[Line] = ()) -> None:
        spots: dict[str, Any] = {n: Vec(x, y) for n, (x, y) in points.items()}  # type: ignore[arg-type]
        identity: Callable[[Any], Any] = lambda e: e  # noqa: E731
        super().__init__(Component(Tower(), {}, (), spots), identity, {})
        for line in given:
            if isinstance(line.body, Fact) and FORMS[line.body.form].kind is Kind.CURVE:
                with suppress(*MISSING):
                    CONSTRUCTIONS[line.body.form](self, *line.body.args)

    def require(self, e: Any, op: str, words: str) -> None:
        """Nothing is asked."""

    def vanish(self, e: Any, words: str) -> None:
        """Nothing is asked."""

    def circle_through(self, a: Pt, b: Pt, c: Pt) -> Round:
        """Circumcircle of three points."""
        return self.circle(Through((a, b, c)))

    def line_of(self, pair: tuple[Pt, ...]) -> Straight:
        """The line through two points."""
        return self.line(Through(pair))

    def spot(self, ref: Any) -> XY:
        """A point's coordinates."""
        v: Any = self.at(ref)
        return float(v.x), float(v.y)

    def straight(self, ref: CurveRef) -> tuple[XY, XY]:
        """A point and a direction of a line."""
        m: Any = self.line(ref)
        return (float(m.point.x), float(m.point.y)), (float(m.direction.x), float(m.direction.y))

    def ring(self, ref: CurveRef) -> tuple[XY, float]:
        """Centre and radius of a circle."""
        k: Any = self.circle(ref)
        return (float(k.centre.x), float(k.centre.y)), max(float(k.radius2), 0.0) ** 0.5

    def made(self, form: str, *args: Any) -> XY:
        """The point a construction would make, under a name that no sheet can use."""
        name = Pt("?")
        self.comp.points.pop("?", None)
        CONSTRUCTIONS[form](self, name, *args)
        v: Any = self.comp.points.pop("?")
        return float(v.x), float(v.y)

    def curve(self, form: str, *args: Any) -> tuple[XY, float]:
        """The circle a construction would name."""
        CONSTRUCTIONS[form](self, Named("?"), *args)
        k: Any = self.comp.curves.pop("?")
        return (float(k.centre.x), float(k.centre.y)), max(float(k.radius2), 0.0) ** 0.5

    def has(self, name: str) -> bool:
        """Whether a point of this name is placed."""
        return name in self.comp.points

    def put(self, ref: Pt, v: Vec) -> None:
        """Place a point."""
        self.comp.points[ref.name] = v
