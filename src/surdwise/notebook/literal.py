"""Trees to SymPy expressions that are left as they stand, and back; imports SymPy."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import sympy

from ..sheet.tree import Binary, Measure, Number, Quantity, Unary
from .interop import InteropError
from .symbols import OfPoints, measure, of_points

_HALF = sympy.Rational(1, 2)


def literal(q: Quantity) -> Any:
    """The quantity as an expression that is not evaluated."""
    match q:
        case Number(value):
            return sympy.Rational(value.numerator, value.denominator)
        case Measure():
            return of_points(q, evaluate=False)
        case Unary("neg", arg):
            return _times(sympy.S.NegativeOne, literal(arg))
        case Unary("sqrt", arg):
            return _power(literal(arg), _HALF)
        case Unary(_, arg):
            return sympy.Abs(literal(arg), evaluate=False)
        case Binary("+", a, b):
            return sympy.Add(literal(a), literal(b), evaluate=False)
        case Binary("-", a, b):
            return sympy.Add(literal(a), _times(sympy.S.NegativeOne, literal(b)), evaluate=False)
        case Binary("*", a, b):
            return _times(literal(a), literal(b))
        case Binary("/", a, b):
            return _times(literal(a), _power(literal(b), sympy.S.NegativeOne))
        case Binary(_, a, b):
            return _power(literal(a), literal(b))
    raise InteropError(f"expected a claim, a quantity or a rewriting, got {type(q).__name__}")


def _times(a: Any, b: Any) -> Any:
    return sympy.Mul(a, b, evaluate=False)


def _power(a: Any, b: Any) -> Any:
    return sympy.Pow(a, b, evaluate=False)


def kept(e: Any) -> Quantity:
    """The quantity that an expression spells, its arguments in the order in which they stand."""
    if e.is_Rational:
        return Number(Fraction(int(e.p), int(e.q)))
    if isinstance(e, OfPoints):
        return measure(e)
    if isinstance(e, sympy.Abs):
        return Unary("abs", kept(e.args[0]))
    if isinstance(e, sympy.Add):
        out = kept(e.args[0])
        for a in e.args[1:]:
            minus = _negated(a)
            out = Binary("+", out, kept(a)) if minus is None else Binary("-", out, kept(minus))
        return out
    if isinstance(e, sympy.Mul):
        minus = _negated(e)
        if minus is not None:
            return Unary("neg", kept(minus))
        out = kept(e.args[0])
        for a in e.args[1:]:
            divisor = isinstance(a, sympy.Pow) and a.exp == -1
            out = Binary("/", out, kept(a.base)) if divisor else Binary("*", out, kept(a))
        return out
    if isinstance(e, sympy.Pow) and e.exp == _HALF:
        return Unary("sqrt", kept(e.base))
    if isinstance(e, sympy.Pow) and e.exp.is_Integer:
        return Binary("^", kept(e.base), Number(Fraction(int(e.exp))))
    raise InteropError(f"expected lengths, areas and other quantities of points, got {e}")


def _negated(e: Any) -> Any:
    """What a product of -1 and something negates, else None."""
    return e.args[1] if isinstance(e, sympy.Mul) and len(e.args) == 2 and e.args[0] == -1 else None
