"""Where a polynomial keeps its sign: even multiplicities and sums of squares.

Lemma: p = c * prod f^m can change its sign only where a factor of odd m does, and a factor
f = sum of weight * q^2 with positive weights (or its negative) does nowhere.  (x^2 y: only at y = 0.)
"""

from __future__ import annotations

from . import ring
from .ring import Poly
from .squares import sum_of_squares

HIGHEST_DEGREE = 8
MOST_TERMS = 120
MANY = 3  # parameters from which on a sum of squares is worth looking for


def steady_factors(num: Poly, den: Poly, positive: frozenset[int]) -> frozenset[str]:
    """Keys of the irreducible factors of num and den through whose zeros num/den keeps its sign."""
    odd: dict[str, bool] = {}
    polys: dict[str, Poly] = {}
    for p in (num, den):
        for f, m in ring.irreducible_factors(p):
            name = ring.key(f)
            polys[name] = f
            odd[name] = odd.get(name, False) != (m % 2 == 1)
    return frozenset(n for n, changes in odd.items() if not changes or _definite(polys[n], positive))


def _definite(f: Poly, positive: frozenset[int]) -> bool:
    """Whether f or -f is shown to be a sum of squares."""
    if len(ring.params_in(f)) < MANY or len(f) > MOST_TERMS:
        return False
    degree = f.total_degree() * (2 if positive & set(ring.params_in(f)) else 1)
    if degree % 2 or degree > HIGHEST_DEGREE:
        return False
    near = frozenset(positive & set(ring.params_in(f)))
    return any(sum_of_squares(g, near) is not None for g in (f, -f))


def sign_somewhere(f: Poly) -> int:
    """The sign of f at some point with positive parameters where it is not zero; the sign of f
    everywhere for a polynomial that keeps it."""
    used = ring.params_in(f)
    for n in range(1, 50):
        v = ring.value_of(ring.substitute(f, {k: ring.rational(n + i * i) for i, k in enumerate(used)}))
        if v != 0:
            return 1 if v > 0 else -1
    return 0
