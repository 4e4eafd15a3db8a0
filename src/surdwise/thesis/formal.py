"""An equality as a polynomial in lengths: the raw material of the five formulations.

The points of the statement get coordinates of their own (a frame takes four of them away), and
every root-built quantity becomes a symbol with a known square.  Exact.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from fractions import Fraction
from typing import Any, cast

from ..field import roots
from ..field.ring import Poly
from ..field.tower import Element, Gen, Tower
from ..figure.component import Builder, Component, Frame
from ..figure.plane import Vec
from ..figure.quantities import value
from ..figure.reader import Reader
from ..sheet.tree import Comparison, PointRef, Pt


class Ratio:
    """A quotient of two elements that is never simplified by conjugates."""

    __slots__ = ("den", "num")

    def __init__(self, num: Element, den: Element) -> None:
        self.num = num
        self.den = den

    def is_zero(self) -> bool:
        """Whether the numerator vanishes."""
        return self.num.is_zero()

    def _of(self, b: Ratio | Element | int | Fraction) -> Ratio:
        if isinstance(b, Ratio):
            return b
        one = self.den.tower.constant(1)
        return Ratio(b if isinstance(b, Element) else self.den.tower.constant(b), one)

    def __add__(self, other: Ratio | Element | int | Fraction) -> Ratio:
        b = self._of(other)
        if self.den.key() == b.den.key():
            return Ratio(self.num + b.num, self.den)
        return Ratio(self.num * b.den + b.num * self.den, self.den * b.den)

    __radd__ = __add__

    def __neg__(self) -> Ratio:
        return Ratio(-self.num, self.den)

    def __sub__(self, other: Ratio | Element | int | Fraction) -> Ratio:
        return self + -self._of(other)

    def __rsub__(self, other: Element | int | Fraction) -> Ratio:
        return self._of(other) + -self

    def __mul__(self, other: Ratio | Element | int | Fraction) -> Ratio:
        b = self._of(other)
        return Ratio(self.num * b.num, self.den * b.den)

    __rmul__ = __mul__

    def __truediv__(self, other: Ratio | Element | int | Fraction) -> Ratio:
        b = self._of(other)
        return Ratio(self.num * b.den, self.den * b.num)

    def __pow__(self, n: int) -> Ratio:
        return Ratio(self.num**n, self.den**n) if n >= 0 else Ratio(self.den**-n, self.num**-n)


@dataclass(frozen=True)
class Length:
    """A symbol for a non-negative quantity, and its square."""

    gen: Gen
    square: Element
    label: str


class Formal(Reader):
    """Reads quantities with a symbol for every root; numeric roots stay positive numbers."""

    def __init__(self, comp: Component) -> None:
        self.comp = comp
        self.lengths: list[Length] = []
        self._known: dict[str, Ratio] = {}
        self._label = ""

    def span(self, a: PointRef, b: PointRef) -> Any:
        """The symbol of a distance, labelled."""
        self._label = f"|{a}{b}|"
        try:
            return super().span(a, b)
        finally:
            self._label = ""

    def _wrap(self, e: Element) -> Ratio:
        return Ratio(e, self.comp.tower.constant(1))

    def kept(self, name: object, make: Callable[[], Element]) -> Any:
        """Sign-free elements, as ratios."""
        return self._wrap(make())

    def number(self, value: int | Fraction) -> Any:
        """A rational constant."""
        return self._wrap(self.comp.tower.constant(value))

    def absolute(self, e: Any) -> Any:
        """A symbol whose square is e^2."""
        return self.root(e * e) if not _rational(e) else Ratio(_size(e.num), _size(e.den))

    def root(self, q: Any) -> Any:
        """A symbol whose square is q; of a quotient, the quotient of the roots' product."""
        if q.is_zero():
            return q
        whole: Element = q.num * q.den
        name = whole.key()
        if name not in self._known:
            self._known[name] = self._wrap(self._symbol(whole))
        return self._known[name] / q.den

    def _symbol(self, q: Element) -> Element:
        t = self.comp.tower
        if q.is_rational():
            s = roots.sqrt(q, t)
            if s is not None:
                return s
            self.comp.tower, r = t.adjoin_sqrt(q, "positive", "number")
            return r
        self.comp.tower, r = t.adjoin_symbol(q)
        self.lengths.append(Length(self.comp.tower.gens[-1], q, self._label or "a root"))
        return r

    def divide(self, a: Any, b: Any, words: str) -> Any:
        """a/b."""
        return (a if isinstance(a, Ratio) else self._wrap(a)) / b

    def differ(self, a: Vec, b: Vec, words: str) -> None:
        """Nothing to check here."""


def _rational(e: Ratio) -> bool:
    return e.num.is_rational() and e.den.is_rational()


def _size(e: Element) -> Element:
    return -e if e.as_rational() < 0 else e


@dataclass(frozen=True)
class Thesis:
    """An equality in general coordinates: left and right over one denominator, as polynomials
    in coordinates and length symbols."""

    left: Poly
    right: Poly
    tower: Tower
    lengths: tuple[Length, ...]
    coordinates: dict[int, str]
    placed: dict[str, tuple[str, str]]

    @property
    def equation(self) -> Poly:
        """left - right."""
        return self.tower.reduce(self.left - self.right)


def thesis(claim: Comparison, points: list[str], keeps_scale: bool) -> Thesis:
    """The formal equality of a claim over the named points, placed by the frame."""
    comp = Component(Tower(), {}, ())
    frame = Frame(keeps_scale)
    b = Builder(comp, frame, 0, (), frozenset())
    for n in points:
        b.free_point(Pt(n), [Pt(m) for m in points])
    r = Formal(b.comp)
    left, right = (cast(Ratio, value(q, r)) for q in claim.items)
    t = r.comp.tower
    one = left.num * right.den
    two = right.num * left.den
    den = one.den * (two.den / one.den.gcd(two.den))
    placed = {n: (str(v.x.num), str(v.y.num)) for n, v in b.comp.points.items()}
    return Thesis(
        t.reduce(one.num * (den / one.den)),
        t.reduce(two.num * (den / two.den)),
        t,
        tuple(r.lengths),
        dict(frame.labels),
        placed,
    )
