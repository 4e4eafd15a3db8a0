"""Three terms x + y against z, each a product of lengths, without one root.

Lemma.  Let x, y, z >= 0 and N = 4 x^2 y^2 - (z^2 - x^2 - y^2)^2, a polynomial in their squares.  N is
the product (x + y + z)(x + y - z)(x - y + z)(-x + y + z).  If N >= 0 everywhere, all three triangle
inequalities hold: two negative factors at once would add up to a negative double of one of x, y, z.
x + y = z only where N = 0, which is looked at more closely there alone (1 + 1 against 2 and 2 + 1
against 1 both have N = 0).  For four points N of the three products of opposite distances is a perfect
square: Ptolemy's inequality.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from fractions import Fraction

from ..field.cells import known_sign
from ..field.definite import sign_somewhere, steady_factors
from ..field.ring import has_gens, irreducible_factors, key
from ..field.tower import Element
from ..figure.component import Component
from ..figure.conditions import Judge, compare
from ..figure.quantities import is_product, squared
from ..figure.reader import Reader
from ..sheet.show import show
from ..sheet.tree import Binary, Comparison, Number, Quantity, Unary
from .lemma import Lemma

ReaderOf = Callable[[Component], Reader | None]


@dataclass(frozen=True)
class Term:
    """coefficient * product, the product never negative."""

    coefficient: Fraction
    product: Quantity

    def square(self, r: Reader) -> Element:
        """The square of the term."""
        s = squared(self.product, r)
        assert s is not None
        return s * (self.coefficient * self.coefficient)


def terms(q: Quantity, factor: Fraction = Fraction(1)) -> list[Term] | None:
    """A quantity as a sum of terms, or None."""
    if is_product(q):
        return [] if isinstance(q, Number) and q.value == 0 else [Term(factor, q)]
    if isinstance(q, Unary):
        return terms(q.arg, -factor) if q.op == "neg" else None
    if isinstance(q, Binary):
        if q.op in "+-":
            a, b = terms(q.left, factor), terms(q.right, factor if q.op == "+" else -factor)
            return None if a is None or b is None else a + b
        if q.op == "*" and isinstance(q.left, Number):
            return terms(q.right, factor * q.left.value)
        if q.op == "*" and isinstance(q.right, Number):
            return terms(q.left, factor * q.right.value)
        if q.op == "/" and isinstance(q.right, Number):
            return terms(q.left, factor / q.right.value)
    return None


def prove(components: list[Component], reader: ReaderOf, claim: Comparison, sign: int) -> Lemma | None:
    """That sign * (left - right) = x + y - z >= 0 by the lemma, or None; `reader` reads a component."""
    left, right = terms(claim.items[0], Fraction(sign)), terms(claim.items[1], Fraction(-sign))
    if left is None or right is None or len(left) + len(right) != 3:
        return None
    plus = [t for t in (*left, *right) if t.coefficient > 0]
    minus = [t for t in (*left, *right) if t.coefficient < 0]
    if len(plus) != 2:
        return None
    (x, y), (z,) = plus, minus

    def parts(r: Reader) -> tuple[Element, Element, Element, Element]:
        a, b, c = (t.square(r) for t in (x, y, z))
        w = c - a - b
        return a * b * 4 - w * w, a, b, c

    for comp in components:
        r = reader(comp)
        if r is None or not never_negative(parts(r)[0], comp):
            return None

    def equal(j: Judge) -> bool:
        return j.zero(parts(j)[0]) and compare(claim.items[0], "=", claim.items[1], j)

    return Lemma(claim.items[0], claim.items[1], sign, equal, f"{show(claim)}: {WORDS}")


WORDS = (
    "with x, y, z for its three terms, 4x^2y^2 - (z^2 - x^2 - y^2)^2 is nowhere negative, "
    "so each is at most the sum of the others"
)


def never_negative(e: Element, comp: Component) -> bool:
    """Whether an element without generators is shown to be >= 0 on the whole component."""
    if e.is_zero():
        return True
    if has_gens(e.num):
        return False
    steady = steady_factors(e.num, e.den, comp.positive)
    sign = 1 if e.num.leading_coefficient() * e.den.leading_coefficient() > 0 else -1
    for p in (e.num, e.den):
        for f, m in irreducible_factors(p):
            if m % 2 == 0:
                continue
            s = known_sign(f, comp.positive)
            if s == 0 and key(f) in steady:
                s = sign_somewhere(f)
            if s == 0:
                return False
            sign *= s
    return sign > 0
