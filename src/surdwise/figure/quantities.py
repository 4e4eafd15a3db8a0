"""Measured quantities as tower elements; one small function a kind, in one table.

`value` gives the quantity itself, `squared` its square where the quantity is a product of
non-negative factors: for such sides `L = R` and `L^2 = R^2` say the same, and no root is
needed.  Exact.
"""

from __future__ import annotations

import itertools
from collections.abc import Callable
from fractions import Fraction

from ..field.tower import Element
from ..sheet.tree import Measure, Number, PointRef, Quantity, Unary
from .reader import Reader


def value(q: Quantity, r: Reader) -> Element:
    """The quantity as an element.  Raises what the reader raises where it is undefined."""
    if isinstance(q, Number):
        return r.number(q.value)
    if isinstance(q, Measure):
        r.measuring(q)
        return MEASURES[q.kind](r, q)
    if isinstance(q, Unary):
        x = value(q.arg, r)
        if q.op == "neg":
            return -x
        if q.op == "abs":
            return r.absolute(x)
        r.nonnegative(x)
        return r.root(x)
    if q.op == "^":
        n = exponent(q.right)
        if n % 2 == 0 and n:
            s = squared(q.left, r)
            if s is not None:
                return s ** (n // 2) if n > 0 else r.divide(r.number(1), s ** (-n // 2), "a denominator is 0")
        x = value(q.left, r)
        return x**n if n >= 0 else r.divide(r.number(1), x**-n, "a denominator is 0")
    a, b = value(q.left, r), value(q.right, r)
    if q.op == "+":
        return a + b
    if q.op == "-":
        return a - b
    if q.op == "*":
        return a * b
    return r.divide(a, b, "a denominator is 0")


def exponent(q: Quantity) -> int:
    """The integer an exponent stands for."""
    if isinstance(q, Number):
        return int(q.value)
    if isinstance(q, Unary) and q.op == "neg":
        return -exponent(q.arg)
    raise ValueError("the exponent is not an integer")


def squared(q: Quantity, r: Reader) -> Element | None:
    """The square of a quantity that is a product of non-negative factors, else None.

    Lemma: for x, y >= 0, sign(x - y) = sign(x^2 - y^2), since x^2 - y^2 = (x - y)(x + y) and
    x + y = 0 only if both vanish.  (Not so for signed x: -2 < 1 but 4 > 1.)
    """
    if isinstance(q, Number):
        return r.number(q.value * q.value) if q.value >= 0 else None
    if isinstance(q, Measure):
        fn = SQUARES.get(q.kind)
        return fn(r, q) if fn is not None else None
    if isinstance(q, Unary):
        if q.op != "abs":
            return None
        x = value(q.arg, r)
        return x * x
    if q.op == "^":
        n = exponent(q.right)
        s = squared(q.left, r)
        if s is None:
            return None
        return s**n if n >= 0 else r.divide(r.number(1), s**-n, "a denominator is 0")
    if q.op not in "*/":
        return None
    if not (is_product(q.left) and is_product(q.right)):
        return None
    a, b = squared(q.left, r), squared(q.right, r)
    if a is None or b is None:
        return None
    return a * b if q.op == "*" else r.divide(a, b, "a denominator is 0")


def is_product(q: Quantity) -> bool:
    """Whether `squared` applies (without computing)."""
    if isinstance(q, Number):
        return q.value >= 0
    if isinstance(q, Measure):
        return q.kind in SQUARES
    if isinstance(q, Unary):
        return q.op == "abs"
    if q.op == "^":
        return is_product(q.left)
    return q.op in "*/" and is_product(q.left) and is_product(q.right)


def difference(left: Quantity, right: Quantity, r: Reader) -> Element:
    """An element with the sign of left - right."""
    if is_product(left) and is_product(right) and not (is_plain(left) and is_plain(right)):
        a, b = squared(left, r), squared(right, r)
        if a is not None and b is not None:
            return a - b
    return value(left, r) - value(right, r)


def is_plain(q: Quantity) -> bool:
    """Whether the quantity is a bare number."""
    return isinstance(q, Number)


# ---------------------------------------------------------------- one function a kind


def _length2(r: Reader, q: Measure) -> Element:
    return r.gap2(q.points[0], q.points[1])


def _dist(r: Reader, q: Measure) -> Element:
    assert q.line is not None
    c = r.offset(q.points[0], q.line)
    return r.divide(r.absolute(c), r.root(r.stretch(q.line)), "the line is not defined")


def _dist2(r: Reader, q: Measure) -> Element:
    assert q.line is not None
    c = r.offset(q.points[0], q.line)
    return r.divide(c * c, r.stretch(q.line), "the line is not defined")


def _twice_area(r: Reader, q: Measure) -> Element:
    """Twice the signed area, by a fan of triangles from the first vertex."""
    first, *rest = q.points
    total = r.number(0)
    for a, b in itertools.pairwise(rest):
        total = total + r.turn(first, a, b)
    return total


def _perimeter(r: Reader, q: Measure) -> Element:
    total = r.number(0)
    for a, b in zip(q.points, q.points[1:] + q.points[:1], strict=True):
        total = total + r.span(a, b)
    return total


def _whole(r: Reader, q: Measure) -> Element:
    return r.turn(*q.points[:3])


def _circumradius(r: Reader, q: Measure) -> Element:
    a, b, c = r.sides(*q.points[:3])
    return r.divide(a * b * c, r.absolute(_whole(r, q)) * 2, _flat(q))


def _circumradius2(r: Reader, q: Measure) -> Element:
    a, b, c = q.points[:3]
    d = r.turn(a, b, c)
    return r.divide(r.gap2(a, b) * r.gap2(b, c) * r.gap2(c, a), d * d * 4, _flat(q))


def _flat(q: Measure) -> str:
    return ", ".join(str(p) for p in q.points[:3]) + " collinear"


def _inradius(r: Reader, q: Measure) -> Element:
    a, b, c = r.sides(*q.points[:3])
    return r.divide(r.absolute(_whole(r, q)), a + b + c, _flat(q))


def _exradius(r: Reader, q: Measure) -> Element:
    a, b, c = _turned(q)
    opp, s, t = r.sides(a, b, c)
    return r.divide(r.absolute(_whole(r, q)), s + t - opp, _flat(q))


def _turned(q: Measure) -> tuple[PointRef, PointRef, PointRef]:
    """The triangle's vertices with the named one first."""
    i = q.points[:3].index(q.points[3])
    return q.points[i], q.points[(i + 1) % 3], q.points[(i + 2) % 3]


def _median2(r: Reader, q: Measure) -> Element:
    """Apollonius: 4 m^2 = 2 b^2 + 2 c^2 - a^2."""
    a, b, c = _turned(q)
    return (r.gap2(a, b) * 2 + r.gap2(a, c) * 2 - r.gap2(b, c)) * Fraction(1, 4)


def _altitude(r: Reader, q: Measure) -> Element:
    _a, b, c = _turned(q)
    return r.divide(r.absolute(_whole(r, q)), r.span(b, c), "the side is not defined")


def _altitude2(r: Reader, q: Measure) -> Element:
    _a, b, c = _turned(q)
    d = _whole(r, q)
    return r.divide(d * d, r.gap2(b, c), "the side is not defined")


def _bisector(r: Reader, q: Measure) -> Element:
    a, b, c = _turned(q)
    y, z = r.span(c, a), r.span(a, b)
    s = y + z
    # length^2 = yz (1 - (x/(y+z))^2), and (y+z)^2 - x^2 = 2 (yz + the scalar product at a)
    inner = y * z * 2 * (y * z + r.lean(a, b, c))
    return r.divide(r.root(inner), s, "the angle is not defined")


def _bisector2(r: Reader, q: Measure) -> Element:
    a, b, c = _turned(q)
    y, z = r.span(c, a), r.span(a, b)
    s = y + z
    return r.divide(y * z * 2 * (y * z + r.lean(a, b, c)), s * s, "the angle is not defined")


def _cos(r: Reader, q: Measure) -> Element:
    b, a, c = q.points
    return r.divide(r.lean(a, b, c), r.span(a, b) * r.span(a, c), "the angle is not defined")


def _sin(r: Reader, q: Measure) -> Element:
    b, a, c = q.points
    return r.divide(r.absolute(_whole(r, q)), r.span(a, b) * r.span(a, c), "the angle is not defined")


def _sin2(r: Reader, q: Measure) -> Element:
    b, a, c = q.points
    d = _whole(r, q)
    return r.divide(d * d, r.gap2(a, b) * r.gap2(a, c), "the angle is not defined")


def _area2(r: Reader, q: Measure) -> Element:
    d = _twice_area(r, q)
    return d * d * Fraction(1, 4)


MEASURES: dict[str, Callable[[Reader, Measure], Element]] = {
    "length": lambda r, q: r.span(q.points[0], q.points[1]),
    "dist": _dist,
    "area": lambda r, q: r.absolute(_twice_area(r, q)) * Fraction(1, 2),
    "perimeter": _perimeter,
    "circumradius": _circumradius,
    "inradius": _inradius,
    "exradius": _exradius,
    "median": lambda r, q: r.root(_median2(r, q)),
    "altitude": _altitude,
    "bisector": _bisector,
    "cos": _cos,
    "sin": _sin,
}

SQUARES: dict[str, Callable[[Reader, Measure], Element]] = {
    "length": _length2,
    "dist": _dist2,
    "area": _area2,
    "circumradius": _circumradius2,
    "median": _median2,
    "altitude": _altitude2,
    "bisector": _bisector2,
    "sin": _sin2,
}
