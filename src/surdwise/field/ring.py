"""The polynomial ring every tower lives in, and the few polynomial services built on it.

One sparse ring Q[g23, ..., g0, u0, ..., u11] (FLINT's `fmpq_mpoly`, lexicographic order).
`u*` are parameters, `g*` generators of algebraic steps; a later generator is larger in the
order, so one division by a monic modulus reduces its powers.  Everything here is exact.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from fractions import Fraction
from math import gcd, lcm
from typing import TypeAlias

from flint import fmpq, fmpq_mpoly, fmpq_mpoly_ctx, fmpz, fmpz_poly
from flint.utils.flint_exceptions import DomainError

MAX_GENS = 24
MAX_PARAMS = 12
GEN_NAMES = [f"g{k}" for k in range(MAX_GENS)]
PARAM_NAMES = [f"u{k}" for k in range(MAX_PARAMS)]
_NAMES = GEN_NAMES[::-1] + PARAM_NAMES
CTX = fmpq_mpoly_ctx.get(_NAMES, "lex")
_VARS = CTX.gens()

Poly: TypeAlias = fmpq_mpoly
Rational: TypeAlias = fmpq

ONE: Poly = CTX.constant(1)
ZERO: Poly = CTX.constant(0)


class TooLarge(Exception):
    """The computation outgrew what a tower may hold; the caller answers `undecided`."""


def gen_slot(k: int) -> int:
    """Position of generator k among the ring's variables."""
    return MAX_GENS - 1 - k


def param_slot(k: int) -> int:
    """Position of parameter k among the ring's variables."""
    return MAX_GENS + k


def gen(k: int) -> Poly:
    """The generator g_k as a polynomial; raises TooLarge past the ring's last generator."""
    if k >= MAX_GENS:
        raise TooLarge(f"more than {MAX_GENS} algebraic steps in one figure")
    return _VARS[gen_slot(k)]


def param(k: int) -> Poly:
    """The parameter u_k as a polynomial; raises TooLarge past the ring's last parameter."""
    if k >= MAX_PARAMS:
        raise TooLarge(f"more than {MAX_PARAMS} free parameters in one figure")
    return _VARS[param_slot(k)]


def rational(value: Fraction | int) -> Rational:
    """An exact rational of FLINT."""
    return fmpq(value.numerator, value.denominator) if isinstance(value, Fraction) else fmpq(value)


def constant(value: Fraction | int | Rational) -> Poly:
    """A constant polynomial."""
    return CTX.constant(rational(value) if isinstance(value, (Fraction, int)) else value)


def is_constant(p: Poly) -> bool:
    """Whether p is a number."""
    return bool(p.is_constant())


def value_of(p: Poly) -> Rational:
    """The number a constant polynomial stands for."""
    return p.leading_coefficient() if not p.is_zero() else fmpq(0)


def degrees(p: Poly) -> tuple[int, ...]:
    """Degrees in all variables of the ring (-1 everywhere for zero)."""
    return tuple(int(d) for d in p.degrees())


def has_gens(p: Poly) -> bool:
    """Whether any generator occurs in p."""
    return any(d > 0 for d in p.degrees()[:MAX_GENS])


def top_gen(p: Poly) -> int:
    """Largest k such that g_k occurs in p, or -1."""
    for slot, d in enumerate(p.degrees()[:MAX_GENS]):
        if d > 0:
            return MAX_GENS - 1 - slot
    return -1


def params_in(p: Poly) -> list[int]:
    """Indices of the parameters occurring in p, ascending."""
    return [k for k, d in enumerate(p.degrees()[MAX_GENS:]) if d > 0]


def coefficients(p: Poly, slot: int) -> list[Poly]:
    """Coefficients of p as a polynomial in one variable, ascending: p = sum c[i] x^i."""
    deg = p.degrees()[slot]
    if deg <= 0:
        return [p]
    parts: list[dict[tuple[int, ...], Rational]] = [{} for _ in range(deg + 1)]
    for mono, c in p.terms():
        e = mono[slot]
        parts[e][mono[:slot] + (0,) + mono[slot + 1 :] if e else mono] = c
    return [CTX.from_dict(d) for d in parts]


def linear_parts(p: Poly, slot: int) -> tuple[Poly, Poly]:
    """(a, b) with p = a + b x, for p of degree at most one in the variable: b is the derivative."""
    b = p.derivative(_NAMES[slot])
    return p - b * _VARS[slot], b


def from_coefficients(cs: Sequence[Poly], slot: int) -> Poly:
    """The polynomial sum cs[i] x^i."""
    x = _VARS[slot]
    out = ZERO
    for c in reversed(cs):
        out = out * x + c
    return out


def primitive(p: Poly) -> Poly:
    """p over the integers with content 1 and positive leading coefficient (zero stays zero)."""
    if p.is_zero():
        return p
    cs = p.coeffs()
    num = gcd(*(int(c.p) for c in cs))
    den = lcm(*(int(c.q) for c in cs))
    if cs[0] < 0:
        num = -num
    return p if num == den else p * fmpq(den, num)


def key(p: Poly) -> str:
    """A hashable name of a polynomial."""
    return str(p.str())


def irreducible_factors(p: Poly) -> list[tuple[Poly, int]]:
    """Irreducible primitive factors of p over Q with multiplicities (constants dropped)."""
    if p.is_zero():
        raise ValueError("zero has no factorisation")
    if is_constant(p):
        return []
    return [(primitive(f), int(m)) for f, m in p.factor()[1]]


def square_root(p: Poly) -> Poly | None:
    """The square root of p in Q[...] with positive leading coefficient, or None. Exact."""
    if p.is_zero():
        return p
    try:
        r = p.sqrt()
    except (DomainError, ValueError):
        return None
    return -r if r.leading_coefficient() < 0 else r


def split_square(p: Poly) -> tuple[Poly, Poly]:
    """Write p = s^2 * d with d squarefree (its integer content too); returns (s, d)."""
    lead, facs = p.factor()
    s = ONE
    d = ONE
    for f, m in facs:
        q, odd = divmod(int(m), 2)
        if q:
            s = s * f**q
        if odd:
            d = d * f
    num, den = int(lead.p), int(lead.q)
    sq, free = _split_integer(num * den)
    return s * fmpq(sq, den), d * free


def _split_integer(n: int) -> tuple[int, int]:
    """n = a^2 * b with b squarefree and of the sign of n."""
    sign = -1 if n < 0 else 1
    a, b = 1, 1
    for q, m in fmpz(abs(n)).factor():
        a *= int(q) ** (int(m) // 2)
        b *= int(q) ** (int(m) % 2)
    return a, sign * b


def gcd_all(ps: Iterable[Poly]) -> Poly:
    """Greatest common divisor of polynomials, primitive."""
    g = ZERO
    for p in ps:
        g = g.gcd(p)
        if is_constant(g) and not g.is_zero():
            return ONE
    return primitive(g)


def content_over_gens(p: Poly) -> Poly:
    """The content of p in Q[params], p read as a polynomial in the generators."""
    if not has_gens(p):
        return primitive(p)
    parts: dict[tuple[int, ...], dict[tuple[int, ...], Rational]] = {}
    zero = (0,) * MAX_GENS
    for mono, c in p.terms():
        parts.setdefault(mono[:MAX_GENS], {})[zero + mono[MAX_GENS:]] = c
    return gcd_all(CTX.from_dict(d) for d in parts.values())


def substitute(p: Poly, values: dict[int, Rational]) -> Poly:
    """p with parameters replaced by rationals."""
    if not values:
        return p
    return p.subs({PARAM_NAMES[k]: v for k, v in values.items()})


def replaced(p: Poly, values: dict[int, Poly]) -> Poly:
    """p with some variables, by position, replaced by polynomials."""
    if not values:
        return p
    return p.compose(*(values.get(k, v) for k, v in enumerate(_VARS)))


def univariate(p: Poly, slot: int) -> fmpz_poly:
    """p, which involves at most one variable, as an integer polynomial up to a constant."""
    p = primitive(p)
    n = max(p.degrees()[slot], 0)
    cs = [0] * (n + 1)
    for mono, c in p.terms():
        cs[mono[slot]] = int(c.p)
    return fmpz_poly(cs)
