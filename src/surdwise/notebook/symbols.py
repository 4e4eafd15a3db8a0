"""The sheet language's quantities as SymPy functions of points; imports SymPy.

A point is a Symbol of its name.  Every function is real, and all but the cosine are never
negative, so that SymPy simplifies `sqrt(Distance(A, B)**2)` to `Distance(A, B)`.  Arguments may
be given as text, which is safe for names like E that SymPy would read otherwise.
"""

from __future__ import annotations

from typing import Any

import sympy

from ..report import texmath
from ..report.formula import formula
from ..sheet.show import show
from ..sheet.tree import CentreOf, Curve, Measure, Named, PointRef, Pt, Through


class OfPoints(sympy.Function):  # type: ignore[misc]
    """A function of points."""

    is_real = True
    kind = ""

    def __new__(cls, *args: Any, **options: Any) -> Any:
        return super().__new__(cls, *(sympy.Symbol(a) if isinstance(a, str) else a for a in args), **options)

    def _sympystr(self, printer: Any) -> str:
        return show(measure(self))

    def _latex(self, printer: Any, exp: Any = None) -> str:
        text = texmath.math(formula(measure(self)))
        inside = text[1:-1]
        text = rf"\text{{{text}}}" if "$" in inside else inside
        return text if exp is None else rf"{text}^{{{exp}}}"


class Distance(OfPoints):
    """|AB|; |BA| is the same."""

    kind = "length"
    nargs = 2
    is_nonnegative = True

    @classmethod
    def eval(cls, a: Any, b: Any) -> Any:
        """Put the two points in order."""
        return cls(b, a) if a.sort_key() > b.sort_key() else None


class DistanceToLine(OfPoints):
    """dist(P, AB) of P, A, B, or dist(P, l) of P and a named line."""

    kind = "dist"
    nargs = (2, 3)
    is_nonnegative = True


class Area(OfPoints):
    """area(ABC) or area(ABCD)."""

    kind = "area"
    nargs = (3, 4)
    is_nonnegative = True


class Perimeter(OfPoints):
    """perimeter of three to six points in order."""

    kind = "perimeter"
    nargs = (3, 4, 5, 6)
    is_nonnegative = True


class Circumradius(OfPoints):
    """circumradius(ABC)."""

    kind = "circumradius"
    nargs = 3
    is_nonnegative = True


class Inradius(OfPoints):
    """inradius(ABC)."""

    kind = "inradius"
    nargs = 3
    is_nonnegative = True


class Exradius(OfPoints):
    """exradius(ABC, A) of A, B, C, A."""

    kind = "exradius"
    nargs = 4
    is_nonnegative = True


class Median(OfPoints):
    """median(ABC, A) of A, B, C, A."""

    kind = "median"
    nargs = 4
    is_nonnegative = True


class Altitude(OfPoints):
    """altitude(ABC, A) of A, B, C, A."""

    kind = "altitude"
    nargs = 4
    is_nonnegative = True


class Bisector(OfPoints):
    """bisector(ABC, A) of A, B, C, A."""

    kind = "bisector"
    nargs = 4
    is_nonnegative = True


class CosAngle(OfPoints):
    """cos(BAC), the cosine of the angle at the middle point."""

    kind = "cos"
    nargs = 3


class SinAngle(OfPoints):
    """sin(BAC), the sine of the angle at the middle point."""

    kind = "sin"
    nargs = 3
    is_nonnegative = True


class Centre(sympy.Function):  # type: ignore[misc]
    """The centre of a named circle, or of the circle through three points; stands for a point."""

    nargs = (1, 3)


FUNCTIONS: dict[str, type[OfPoints]] = {f.kind: f for f in OfPoints.__subclasses__()}


def _symbol(name: str) -> Any:
    return sympy.Symbol(name)


def _curve(curve: Curve) -> list[Any]:
    return [_symbol(n) for n in ([curve.name] if isinstance(curve, Named) else map(str, curve.points))]


def _place(p: PointRef) -> Any:
    return Centre(*_curve(p.circle)) if isinstance(p, CentreOf) else _symbol(p.name)


def of_points(m: Measure, evaluate: bool = True) -> Any:
    """A measure as a SymPy expression."""
    places = [_place(p) for p in m.points]
    return FUNCTIONS[m.kind](*places, *([] if m.line is None else _curve(m.line)), evaluate=evaluate)


def measure(e: OfPoints) -> Measure:
    """The measure that an expression of this module stands for."""
    if e.kind != "dist":
        return Measure(e.kind, tuple(Pt(str(a)) for a in e.args))
    return Measure("dist", (_place_of(e.args[0]),), _curve_of(e.args[1:]))


def _place_of(e: Any) -> PointRef:
    return CentreOf(_curve_of(e.args)) if isinstance(e, Centre) else Pt(str(e))


def _curve_of(args: Any) -> Curve:
    return Named(str(args[0])) if len(args) == 1 else Through(tuple(Pt(str(a)) for a in args))
