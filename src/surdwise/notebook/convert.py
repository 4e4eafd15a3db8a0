"""Trees of the sheet language to SymPy expressions and back; imports SymPy."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from fractions import Fraction
from typing import Any

import sympy

from ..api import Rewriting
from ..sheet import read_line, show
from ..sheet.tree import Binary, Comparison, Measure, Number, Quantity, Unary
from ..thesis import export
from ..thesis.parts import Form
from .interop import InteropError
from .literal import kept, literal
from .symbols import OfPoints, measure, of_points

_MAKERS = {"=": sympy.Eq, "<": sympy.Lt, "<=": sympy.Le, ">": sympy.Gt, ">=": sympy.Ge}
_OPS = {made: op for op, made in _MAKERS.items()}


# ---------------------------------------------------------------- to SymPy


def relation(claim: Comparison, evaluate: bool) -> Any:
    """A comparison as a relation, a chain as a tuple of relations; sides are simplified as SymPy
    does if asked, relations never."""
    sides = [expression(q, evaluate) for q in claim.items]
    links = tuple(
        _MAKERS[op](a, b, evaluate=False) for op, a, b in zip(claim.ops, sides, sides[1:], strict=False)
    )
    return links[0] if len(links) == 1 else links


def expression(q: Quantity, evaluate: bool) -> Any:
    """A quantity as an expression."""
    e = _evaluated(q) if evaluate else literal(q)
    if e.has(sympy.zoo, sympy.nan, sympy.oo):
        raise InteropError(f"expected a quantity that is defined, got {show(q)}")
    return e


def _evaluated(q: Quantity) -> Any:
    match q:
        case Number(value):
            return sympy.Rational(value.numerator, value.denominator)
        case Measure():
            return of_points(q)
        case Unary("neg", arg):
            return -_evaluated(arg)
        case Unary("sqrt", arg):
            return sympy.sqrt(_evaluated(arg))
        case Unary(_, arg):
            return sympy.Abs(_evaluated(arg))
        case Binary("+", a, b):
            return _evaluated(a) + _evaluated(b)
        case Binary("-", a, b):
            return _evaluated(a) - _evaluated(b)
        case Binary("*", a, b):
            return _evaluated(a) * _evaluated(b)
        case Binary("/", a, b):
            return _evaluated(a) / _evaluated(b)
        case Binary(_, a, b):
            return _evaluated(a) ** _evaluated(b)
    raise InteropError(f"expected a claim, a quantity or a rewriting, got {type(q).__name__}")


def polynomials(r: Rewriting, form: Form | str | None) -> tuple[Any, ...]:
    """A formulation's polynomials in symbols named as in the legend."""
    known = [f.value for f in Form]
    if form is None or (isinstance(form, str) and form not in known):
        raise InteropError(f"expected one of {', '.join(known)} with a rewriting, got {form}")
    if r.thesis is None:
        raise InteropError(f"expected a claim that is rewritten, got one that is {r.why_not}")
    names = export.names(r.thesis)
    chosen = next((f for f in r.formulations if f.form is Form(form)), None)
    if chosen is None or not chosen.polynomials:
        why = chosen.why_not if chosen is not None else "not asked for"
        raise InteropError(f"expected polynomials of the formulation {Form(form).value}, got none: {why}")
    return tuple(sympy.Add(*map(_term, export.terms(p, names))) for p in chosen.polynomials)


def _term(term: tuple[int, list[tuple[str, int]]]) -> Any:
    c, powers = term
    return sympy.Mul(c, *(sympy.Symbol(v) ** e for v, e in powers))


# ---------------------------------------------------------------- from SymPy


def text(expr: Any, evaluate: bool) -> str:
    """The text of a relation, a chain or an expression; it is read again and must give the tree
    that was built here."""
    read = _quantity if evaluate else kept
    if isinstance(expr, tuple | list):
        return _text(_chain(expr, read))
    if type(expr) in _OPS:
        return _text(_chain([expr], read))
    quantity = read(sympy.sympify(expr))
    _text(Comparison((quantity, Number(Fraction(0))), ("=",)))
    return show(quantity)


def _text(claim: Comparison) -> str:
    """The claim's text; it is read again, so that what cannot be written is an error."""
    text = show(claim)
    if read_line("claim", text) != claim:
        raise InteropError(f"expected a claim of the sheet language, got {text}")
    return text


def _chain(links: Sequence[Any], read: Callable[[Any], Quantity]) -> Comparison:
    if not links:
        raise InteropError("expected a relation, got an empty list")
    items: list[Quantity] = []
    ops = []
    last: Any = None
    for link in links:
        if type(link) not in _OPS:
            raise InteropError(f"expected a relation such as Eq(a, b), got {link}")
        if last is not None and link.lhs != last:
            raise InteropError(f"expected a chain, got {last} followed by {link.lhs}")
        if last is None:
            items.append(read(link.lhs))
        items.append(read(link.rhs))
        ops.append(_OPS[type(link)])
        last = link.rhs
    return Comparison(tuple(items), tuple(ops))


def _quantity(e: Any) -> Quantity:
    e = sympy.sympify(e)
    if e.is_Rational:
        return Number(Fraction(int(e.p), int(e.q)))
    if isinstance(e, OfPoints):
        return measure(e)
    if isinstance(e, sympy.Add):
        return _sum(e)
    if isinstance(e, sympy.Mul):
        return _product(e)
    if isinstance(e, sympy.Pow):
        return _power(e.base, e.exp)
    if isinstance(e, sympy.Abs):
        return Unary("abs", _quantity(e.args[0]))
    if e.is_Float:
        raise InteropError(f"expected an exact number such as Rational(1, 2), got the float {e}")
    raise InteropError(f"expected lengths, areas and other quantities of points, got {e}")


def _sum(e: Any) -> Quantity:
    terms = sorted(e.as_ordered_terms(), key=lambda t: bool(t.could_extract_minus_sign()))
    out = _quantity(terms[0])
    for t in terms[1:]:
        minus = bool(t.could_extract_minus_sign())
        out = Binary("-" if minus else "+", out, _quantity(-t if minus else t))
    return out


def _product(e: Any) -> Quantity:
    """Factors with a negative exponent, and the number's denominator, go below one bar."""
    number, rest = e.as_coeff_Mul(rational=True)
    if number.is_negative:
        return Unary("neg", _quantity(-e))
    above: list[Quantity] = []
    below: list[Quantity] = []
    for f in rest.as_ordered_factors():
        base, exponent = f.as_base_exp()
        if exponent.is_Rational and exponent.is_negative:
            below.append(_power(base, -exponent))
        else:
            above.append(_quantity(f))
    if number.p != 1 or not above:
        above.insert(0, Number(Fraction(int(number.p))))
    if number.q != 1:
        below.insert(0, Number(Fraction(int(number.q))))
    return _multiplied(above) if not below else _divided(_multiplied(above), _multiplied(below))


def _multiplied(factors: Sequence[Quantity]) -> Quantity:
    out = factors[0]
    for f in factors[1:]:
        out = Binary("*", out, f)
    return out


def _divided(a: Quantity, b: Quantity) -> Quantity:
    if isinstance(a, Number) and isinstance(b, Number):
        return Number(a.value / b.value)
    return Binary("/", a, b)


def _power(base: Any, exponent: Any) -> Quantity:
    if not exponent.is_Rational or exponent.q & (exponent.q - 1):
        raise InteropError(f"expected whole powers and square roots, got the exponent {exponent}")
    if exponent.is_negative:
        return _divided(Number(Fraction(1)), _power(base, -exponent))
    out = _quantity(base)
    q = int(exponent.q)
    while q > 1:
        out = Unary("sqrt", out)
        q //= 2
    return out if exponent.p == 1 else Binary("^", out, Number(Fraction(int(exponent.p))))
