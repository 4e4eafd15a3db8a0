"""Numbers as certified balls at fixed precision, with the arithmetic of tower elements.

Constructions and conditions are written once over `+ - * /`; over balls they give a fast
enclosure.  A ball that contains zero and is tiny is *taken for* zero: a hint, never a proof.
"""

from __future__ import annotations

from contextlib import AbstractContextManager
from fractions import Fraction

from flint import arb, ctx, fmpq

from . import ring
from .near import NearBranch
from .real import Branch, simplest_between
from .ring import Poly
from .tower import Element

PREC = 512
_TINY = arb(2) ** -100


class Ball:
    """A real number known to about 150 digits."""

    __slots__ = ("v",)

    def __init__(self, v: arb) -> None:
        self.v = v

    def is_zero(self) -> bool:
        """Whether the number is taken for zero (a hint)."""
        return bool(self.v.contains(0) and self.v.rad() < _TINY)

    def sign(self) -> int | None:
        """Certified sign, 0 for a number taken for zero, None if the ball is too wide."""
        if self.v > 0:
            return 1
        if self.v < 0:
            return -1
        return 0 if self.is_zero() else None

    def __add__(self, b: Ball | int | Fraction) -> Ball:
        return Ball(self.v + _arb(b))

    __radd__ = __add__

    def __neg__(self) -> Ball:
        return Ball(-self.v)

    def __sub__(self, b: Ball | int | Fraction) -> Ball:
        return Ball(self.v - _arb(b))

    def __rsub__(self, b: int | Fraction) -> Ball:
        return Ball(_arb(b) - self.v)

    def __mul__(self, b: Ball | int | Fraction) -> Ball:
        return Ball(self.v * _arb(b))

    __rmul__ = __mul__

    def __truediv__(self, b: Ball | int | Fraction) -> Ball:
        return Ball(self.v / _arb(b))

    def __rtruediv__(self, b: int | Fraction) -> Ball:
        return Ball(_arb(b) / self.v)

    def __pow__(self, n: int) -> Ball:
        return Ball(self.v**n)

    def root(self) -> Ball:
        """Square root of a number that is not negative."""
        return Ball(self.v.nonnegative_part().sqrt())


def _arb(x: Ball | int | Fraction) -> arb:
    if isinstance(x, Ball):
        return x.v
    return arb(fmpq(x.numerator, x.denominator))


def number(x: int | Fraction) -> Ball:
    """A rational as a ball."""
    return Ball(_arb(x))


def branch_parameters(branch: Branch | NearBranch) -> dict[int, Ball]:
    """The values of the free parameters at a branch."""
    if isinstance(branch, NearBranch):
        return {k: Ball(f(min(PREC, branch.limit))) for k, f in branch.spots.items()}
    return {k: Ball(arb(v)) for k, v in branch.values.items()}


def ball_of(e: Element, branch: Branch | NearBranch) -> Ball:
    """The value of an element at a branch."""
    return Ball(branch.ball(e, PREC))


def between(a: Ball, b: Ball) -> fmpq | None:
    """A plain rational strictly between two numbers, or None if they are not told apart."""
    if a.v > b.v:
        a, b = b, a
    if not a.v < b.v:
        return None
    low, high = (
        fmpq(Fraction(float(x.v.mid())).numerator, Fraction(float(x.v.mid())).denominator) for x in (a, b)
    )
    value = simplest_between(low, high) if low < high else None
    return value if value is not None and a.v < arb(value) < b.v else None


def polynomial(p: Poly, values: dict[int, Ball]) -> Ball:
    """A polynomial in the parameters at their values; KeyError for one without a value."""
    total = arb(0)
    for mono, c in p.terms():
        term = arb(c)
        for k, e in enumerate(mono[ring.MAX_GENS :]):
            if e:
                term = term * values[k].v ** e
        total = total + term
    return Ball(total)


def precise() -> AbstractContextManager[object]:
    """A context in which balls are computed at this module's precision."""
    return ctx.workprec(PREC)
