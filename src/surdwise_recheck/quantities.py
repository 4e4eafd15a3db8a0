"""Quantities of a sheet in any arithmetic.

`value` is the quantity, `squared` the square of one that is a product of non-negative factors.  Two such
are compared by their squares: for x, y >= 0 the sign of x - y is that of x^2 - y^2 = (x - y)(x + y), as
x + y is zero only where both are.
"""

from __future__ import annotations

from collections.abc import Callable
from fractions import Fraction

from .forms_plane import HALF, View
from .protocol import Num
from .tree import Applied, Constant, Joined, Measure, PointRef, Power, Quantity

_DENOMINATOR = "a denominator is 0"
_ANGLE = "the angle is not defined"


def value(q: Quantity, v: View) -> Num:
    """The quantity; Undefined where it has no value."""
    match q:
        case Constant():
            return v.numbers.number(q.value)
        case Measure():
            return MEASURES[q.kind](v, q)
        case Applied("neg"):
            return -value(q.arg, v)
        case Applied("abs"):
            return v.numbers.absolute(value(q.arg, v))
        case Applied():
            return v.numbers.root(value(q.arg, v))
        case Power():
            n = q.exponent
            s = squared(q.base, v) if n % 2 == 0 and n else None
            return _power(value(q.base, v), n, v) if s is None else _power(s, n // 2, v)
        case Joined():
            a, b = value(q.left, v), value(q.right, v)
            if q.op == "/":
                return v.numbers.divide(a, b, _DENOMINATOR)
            return a * b if q.op == "*" else a + b if q.op == "+" else a - b


def _power(x: Num, n: int, v: View) -> Num:
    """x^n by repeated squaring."""
    out, m = v.numbers.number(1), abs(n)
    while m:
        if m & 1:
            out = out * x
        m >>= 1
        if m:
            x = x * x
    return out if n >= 0 else v.numbers.divide(v.numbers.number(1), out, _DENOMINATOR)


def is_product(q: Quantity) -> bool:
    """Whether the quantity is a product of non-negative factors whose squares are known."""
    match q:
        case Constant():
            return q.value >= 0
        case Measure():
            return q.kind in SQUARES
        case Applied():
            return q.op == "abs"
        case Power():
            return is_product(q.base)
        case Joined():
            return q.op in "*/" and is_product(q.left) and is_product(q.right)


def squared(q: Quantity, v: View) -> Num | None:
    """The square of a product of non-negative factors; None for another quantity."""
    if not is_product(q):
        return None
    match q:
        case Constant():
            return v.numbers.number(q.value * q.value)
        case Measure():
            return SQUARES[q.kind](v, q)
        case Applied():
            x = value(q.arg, v)
            return x * x
        case Power():
            s = squared(q.base, v)
            return None if s is None else _power(s, q.exponent, v)
        case Joined():
            a, b = squared(q.left, v), squared(q.right, v)
            if a is None or b is None:
                return None
            return a * b if q.op == "*" else v.numbers.divide(a, b, _DENOMINATOR)


def difference(left: Quantity, right: Quantity, v: View) -> Num:
    """A number with the sign of left - right."""
    plain = isinstance(left, Constant) and isinstance(right, Constant)
    if is_product(left) and is_product(right) and not plain:
        a, b = squared(left, v), squared(right, v)
        if a is not None and b is not None:
            return a - b
    return value(left, v) - value(right, v)


# ---------------------------------------------------------------- one function a kind


def _corner_first(q: Measure) -> tuple[PointRef, PointRef, PointRef]:
    """The triangle of a measure at a corner, that corner first."""
    i = q.points[:3].index(q.points[3])
    return q.points[i], q.points[(i + 1) % 3], q.points[(i + 2) % 3]


def _whole(v: View, q: Measure) -> Num:
    """Twice the signed area of the triangle."""
    return v.turn(*q.points[:3])


def _sides(v: View, a: PointRef, b: PointRef, c: PointRef) -> tuple[Num, Num, Num]:
    """|bc|, |ca|, |ab|."""
    return v.span(b, c), v.span(c, a), v.span(a, b)


def _flat(q: Measure) -> str:
    return ", ".join(str(p) for p in q.points[:3]) + " are on one line"


def _length(v: View, q: Measure) -> Num:
    return v.span(q.points[0], q.points[1])


def _length2(v: View, q: Measure) -> Num:
    return v.gap2(q.points[0], q.points[1])


def _line_parts(v: View, q: Measure) -> tuple[Num, Num]:
    """Offset of the point from the line, and the squared length of the line's direction."""
    assert q.line is not None
    line = v.line(q.line)
    d = line.direction
    return v.offset(q.points[0], line), d.x * d.x + d.y * d.y


def _dist(v: View, q: Measure) -> Num:
    c, dd = _line_parts(v, q)
    return v.numbers.divide(v.numbers.absolute(c), v.numbers.root(dd), "the line is not defined")


def _dist2(v: View, q: Measure) -> Num:
    c, dd = _line_parts(v, q)
    return v.numbers.divide(c * c, dd, "the line is not defined")


def _twice_area(v: View, q: Measure) -> Num:
    """Twice the signed area of a polygon, by triangles from its first corner."""
    total = v.numbers.number(0)
    for b, c in zip(q.points[1:-1], q.points[2:], strict=True):
        total = total + v.turn(q.points[0], b, c)
    return total


def _area(v: View, q: Measure) -> Num:
    return v.numbers.absolute(_twice_area(v, q)) * HALF


def _area2(v: View, q: Measure) -> Num:
    d = _twice_area(v, q)
    return d * d * Fraction(1, 4)


def _perimeter(v: View, q: Measure) -> Num:
    total = v.numbers.number(0)
    for i, p in enumerate(q.points):
        total = total + v.span(p, q.points[(i + 1) % len(q.points)])
    return total


def _circumradius(v: View, q: Measure) -> Num:
    """R = abc/(4S)."""
    a, b, c = q.points
    x, y, z = _sides(v, a, b, c)
    return v.numbers.divide(x * y * z, v.numbers.absolute(_whole(v, q)) * 2, _flat(q))


def _circumradius2(v: View, q: Measure) -> Num:
    a, b, c = q.points
    d = _whole(v, q)
    return v.numbers.divide(v.gap2(b, c) * v.gap2(c, a) * v.gap2(a, b), d * d * 4, _flat(q))


def _inradius(v: View, q: Measure) -> Num:
    """r = 2S/(a + b + c)."""
    a, b, c = q.points
    x, y, z = _sides(v, a, b, c)
    return v.numbers.divide(v.numbers.absolute(_whole(v, q)), x + y + z, _flat(q))


def _exradius(v: View, q: Measure) -> Num:
    """r_a = 2S/(b + c - a)."""
    x, y, z = _sides(v, *_corner_first(q))
    return v.numbers.divide(v.numbers.absolute(_whole(v, q)), y + z - x, _flat(q))


def _median2(v: View, q: Measure) -> Num:
    """4 m^2 = 2b^2 + 2c^2 - a^2 (Apollonius)."""
    a, b, c = _corner_first(q)
    return (v.gap2(a, b) * 2 + v.gap2(a, c) * 2 - v.gap2(b, c)) * Fraction(1, 4)


def _median(v: View, q: Measure) -> Num:
    return v.numbers.root(_median2(v, q))


def _altitude(v: View, q: Measure) -> Num:
    _, b, c = _corner_first(q)
    return v.numbers.divide(v.numbers.absolute(_whole(v, q)), v.span(b, c), "the side is not defined")


def _altitude2(v: View, q: Measure) -> Num:
    _, b, c = _corner_first(q)
    d = _whole(v, q)
    return v.numbers.divide(d * d, v.gap2(b, c), "the side is not defined")


def _bisector_parts(v: View, q: Measure) -> tuple[Num, Num]:
    """w^2 = bc((b + c)^2 - a^2)/(b + c)^2: the product above and the sum b + c."""
    a, b, c = _corner_first(q)
    y, z = v.span(c, a), v.span(a, b)
    # (b + c)^2 - a^2 = 2(bc + the scalar product at the corner), by the law of cosines
    return y * z * (y * z + v.lean(a, b, c)) * 2, y + z


def _bisector(v: View, q: Measure) -> Num:
    above, s = _bisector_parts(v, q)
    return v.numbers.divide(v.numbers.root(above), s, _ANGLE)


def _bisector2(v: View, q: Measure) -> Num:
    above, s = _bisector_parts(v, q)
    return v.numbers.divide(above, s * s, _ANGLE)


def _cos(v: View, q: Measure) -> Num:
    b, a, c = q.points
    return v.numbers.divide(v.lean(a, b, c), v.span(a, b) * v.span(a, c), _ANGLE)


def _sin(v: View, q: Measure) -> Num:
    b, a, c = q.points
    return v.numbers.divide(v.numbers.absolute(_whole(v, q)), v.span(a, b) * v.span(a, c), _ANGLE)


def _sin2(v: View, q: Measure) -> Num:
    b, a, c = q.points
    d = _whole(v, q)
    return v.numbers.divide(d * d, v.gap2(a, b) * v.gap2(a, c), _ANGLE)


MEASURES: dict[str, Callable[[View, Measure], Num]] = {
    "length": _length,
    "dist": _dist,
    "area": _area,
    "perimeter": _perimeter,
    "circumradius": _circumradius,
    "inradius": _inradius,
    "exradius": _exradius,
    "median": _median,
    "altitude": _altitude,
    "bisector": _bisector,
    "cos": _cos,
    "sin": _sin,
}

SQUARES: dict[str, Callable[[View, Measure], Num]] = {
    "length": _length2,
    "dist": _dist2,
    "area": _area2,
    "circumradius": _circumradius2,
    "median": _median2,
    "altitude": _altitude2,
    "bisector": _bisector2,
    "sin": _sin2,
}
