"""Sums of squares and polynomials that keep their sign."""

from __future__ import annotations

from fractions import Fraction

import pytest

from surdwise.field import ring
from surdwise.field.definite import steady_factors
from surdwise.field.ring import Poly
from surdwise.field.squares import expanded, sum_of_squares

a, b, c, d = (ring.param(k) for k in range(4))
ALL = frozenset({0, 1, 2})

# (polynomial, parameters taken positive); sources beside each, from memory
SUMS = [
    (a**2 + b**2 + c**2 - a * b - b * c - c * a, frozenset()),  # rearrangement
    (a**4 + b**4 + c**4 + d**4 - 4 * a * b * c * d, frozenset()),  # arithmetic and geometric mean
    ((a**2 + b**2) * (c**2 + d**2) - (a * c + b * d) ** 2 + (a - b) ** 2, frozenset()),  # Lagrange
    (a**3 + b**3 + c**3 - 3 * a * b * c, ALL),  # arithmetic and geometric mean
    (2 * a**2 + 3 * b**2 - 2 * a * b + 1 - a, frozenset()),  # completing squares
    (a * b + b * c + c * a, ALL),
]
NOT_SUMS = [
    (a**4 * b**2 + a**2 * b**4 - 3 * a**2 * b**2 + 1, frozenset()),  # Motzkin 1967: positive, no sum
    (a**2 - b**2, frozenset()),
    (a**3 + b**3 + c**3 - 4 * a * b * c, ALL),
    (a**2 + b**2 - 3 * a * b + c**2, frozenset()),
]


def coefficients(p: Poly, positive: frozenset[int]) -> dict[tuple[int, ...], Fraction]:
    used = ring.params_in(p)
    out = {}
    for mono, k in p.terms():
        tail = [int(e) for e in mono[ring.MAX_GENS :]]
        out[tuple(tail[i] * (2 if i in positive else 1) for i in used)] = Fraction(int(k.p), int(k.q))
    return out


@pytest.mark.parametrize(("p", "positive"), SUMS, ids=lambda x: str(x)[:40])
def test_identity_is_exact(p: Poly, positive: frozenset[int]) -> None:
    squares = sum_of_squares(p, positive)
    assert squares is not None
    assert all(w > 0 for w, _ in squares)
    assert expanded(squares) == coefficients(p, positive)


@pytest.mark.parametrize(("p", "positive"), NOT_SUMS, ids=lambda x: str(x)[:40])
def test_what_is_no_sum_is_not_called_one(p: Poly, positive: frozenset[int]) -> None:
    assert sum_of_squares(p, positive) is None


def test_steady_factors() -> None:
    line, oval = a - b, a**2 + b**2 + c**2 + 1
    name = ring.key
    assert name(ring.primitive(line)) in steady_factors(line**2 * c, ring.ONE, frozenset())
    assert name(ring.primitive(line)) not in steady_factors(line**3 * c, ring.ONE, frozenset())
    # (a - b)/(a - b)^2 changes its sign, (a - b)^3/(a - b) would not
    assert name(ring.primitive(line)) not in steady_factors(line, line**2, frozenset())
    assert name(oval) in steady_factors(oval * c, ring.ONE, frozenset())
