"""Random towers, elements and polynomials for property tests."""

from __future__ import annotations

from fractions import Fraction

from hypothesis import HealthCheck, settings
from hypothesis import strategies as st

from surdwise.field import ring, roots
from surdwise.field.ring import Poly
from surdwise.field.tower import Element, Tower

small = st.integers(-4, 4)
# the same examples at every run
quick = settings(max_examples=60, deadline=None, derandomize=True, suppress_health_check=list(HealthCheck))


def _monomial(t: Tower, params: int, powers: tuple[int, ...]) -> Element:
    out = t.constant(1)
    for k, e in enumerate(powers[:params]):
        out = out * t.param(k) ** e
    for g, e in zip(t.gens, powers[2:], strict=False):
        if e % g.degree:
            out = out * t.element(ring.gen(g.index)) ** (e % g.degree)
    return out


@st.composite
def elements_of(draw: st.DrawFn, t: Tower, params: int, terms: int = 3, quotient: bool = True) -> Element:
    """A short sum of monomials of the tower, over a short denominator in the parameters."""
    out = t.constant(0)
    for _ in range(draw(st.integers(1, terms))):
        powers = tuple(draw(st.lists(st.integers(0, 2), min_size=2 + len(t.gens), max_size=2 + len(t.gens))))
        out = out + _monomial(t, params, powers) * Fraction(draw(small), draw(st.integers(1, 3)))
    if quotient and params and draw(st.booleans()):
        den = t.param(draw(st.integers(0, params - 1))) + draw(small)
        out = out / den
    return out


@st.composite
def towers(draw: st.DrawFn, steps: int = 3, cubic: bool = True) -> tuple[Tower, int]:
    """A tower of square roots over Q or Q(u0) or Q(u0, u1).  Now and then there is one cubic
    step: anywhere over Q, alone over Q(U), where factoring over longer towers takes minutes."""
    params = draw(st.integers(0, 2))
    t = Tower()
    for _ in range(draw(st.integers(0, steps))):
        if cubic and draw(st.integers(0, 3)) == 0 and all(g.radicand is not None for g in t.gens):
            if params and t.gens:
                continue
            # x^3 - 2x - c is irreducible at these integers, and over degrees that are powers of 2
            c = t.constant(draw(st.sampled_from([2, 3, 5]))) * (t.param(0) if params else 1)
            t, _ = t.adjoin_root([-c, t.constant(-2), t.constant(0), t.constant(1)], "cubic")
            if params:
                break
            continue
        q = draw(elements_of(t, params))
        if not q.is_zero() and roots.sqrt(q, t) is None:
            t, _ = t.adjoin_sqrt(q, "either", "root")
    return t, params


@st.composite
def families(draw: st.DrawFn, count: int, steps: int = 3, cubic: bool = True) -> tuple[Tower, list[Element]]:
    """A tower and some elements of it."""
    t, params = draw(towers(steps, cubic))
    return t, [draw(elements_of(t, params)) for _ in range(count)]


@st.composite
def polynomials(draw: st.DrawFn, params: int = 2, terms: int = 4, degree: int = 2) -> Poly:
    """A short polynomial in the first parameters, with rational coefficients."""
    out = ring.ZERO
    for _ in range(draw(st.integers(1, terms))):
        term = ring.constant(Fraction(draw(st.integers(-9, 9)), draw(st.integers(1, 6))))
        for k in range(params):
            term = term * ring.param(k) ** draw(st.integers(0, degree))
        out = out + term
    return out
