"""Towers are fields, norms are multiplicative, and a root of a square is plus or minus its root."""

from __future__ import annotations

from fractions import Fraction
from itertools import product

import pytest
from flint import fmpq
from hypothesis import given, settings
from hypothesis import strategies as st

from surdwise.field import ring, roots
from surdwise.field.real import simplest_between
from surdwise.field.ring import Poly
from surdwise.field.tower import Element, Tower

from .made import elements_of, families, polynomials, quick


def same(a: Element, b: Element) -> bool:
    """Equality of elements, and of their canonical names with it."""
    equal = (a - b).is_zero()
    assert equal == (a.key() == b.key())
    return equal


@quick
@given(families(3))
def test_the_laws_of_a_commutative_ring(case: tuple[Tower, list[Element]]) -> None:
    t, (a, b, c) = case
    assert same(a + b, b + a) and same((a + b) + c, a + (b + c))
    assert same(a * b, b * a) and same((a * b) * c, a * (b * c))
    assert same(a * (b + c), a * b + a * c)
    assert same(a + 0, a) and same(a * 1, a) and same(a - a, t.constant(0))
    assert same(2 - a, -(a - 2)) and same(a * 3, a + a + a) and same(a**3, a * a * a)
    assert same(a * Fraction(2, 3), a + a - a * Fraction(4, 3))


@quick
@given(families(2))
def test_every_element_but_zero_has_an_inverse(case: tuple[Tower, list[Element]]) -> None:
    t, (a, b) = case
    if a.is_zero():
        with pytest.raises(ZeroDivisionError):
            a.inverse()
        return
    assert same(a * a.inverse(), t.constant(1))
    assert same(b / a * a, b) and same(1 / (1 / a), a) and same(a**-2 * a * a, t.constant(1))


@quick
@given(families(2))
def test_a_representation_is_canonical(case: tuple[Tower, list[Element]]) -> None:
    """However an element is come by, its numerator is reduced and coprime to a primitive
    denominator without generators."""
    _, (a, b) = case
    for e in (a * b, a + b, a - b, (a + b) * (a - b)):
        assert not ring.has_gens(e.den)
        assert ring.primitive(e.den) == e.den
        assert ring.is_constant(e.num.gcd(e.den)) or e.is_zero()
        for g in e.tower.gens:
            assert e.num.degrees()[g.slot] < g.degree


@quick
@given(families(2))
def test_norms_are_multiplicative(case: tuple[Tower, list[Element]]) -> None:
    t, (a, b) = case
    (p, d), (q, e), (r, f) = roots.norm(a), roots.norm(b), roots.norm(a * b)
    assert (p * q * f - r * d * e).is_zero()
    n, m = roots.norm(t.constant(3))
    assert n == m * ring.constant(3**t.degree)


@quick
@given(families(1))
def test_norm_factors_are_those_of_the_norm(case: tuple[Tower, list[Element]]) -> None:
    _, (a,) = case
    if a.is_zero():
        return
    whole, _ = roots.norm(Element(a.tower, a.num, ring.ONE))
    assert set(roots.norm_factors(a)) == {ring.key(f) for f, _ in ring.irreducible_factors(whole)}


@settings(parent=quick, max_examples=120)
@given(families(1))
def test_the_root_of_a_square_is_the_element_up_to_sign(case: tuple[Tower, list[Element]]) -> None:
    _, (a,) = case
    r = roots.sqrt(a * a)
    assert r is not None
    assert same(r, a) or same(r, -a)


@settings(parent=quick, max_examples=120)
@given(families(1))
def test_a_root_found_is_a_root_and_a_root_missed_splits_nothing(case: tuple[Tower, list[Element]]) -> None:
    """Where no root is found, x^2 - e keeps in one piece under the norm method too."""
    t, (a,) = case
    if a.is_zero():
        return
    r = roots.sqrt(a)
    pieces = roots._split_by_norm([-a, t.constant(0), t.constant(1)], t)
    assert len(pieces) == (1 if r is None else 2)
    assert r is None or same(r * r, a)


@quick
@given(st.data())
def test_residues_prove_only_what_is_true(data: st.DataObject) -> None:
    t, (a,) = data.draw(families(1))
    assert a.is_zero() or not t.surely_not_square(a * a)


def test_a_residue_at_a_ramified_place_proves_nothing() -> None:
    """g = sqrt(2) + p sqrt(n): the modulus is a square mod p, and n is a square in the field."""
    p, n = 32719, 3
    assert pow(n, (p - 1) // 2, p) != 1 and pow(2, (p - 1) // 2, p) == 1
    a, b = 2 + p * p * n, 2 - p * p * n
    c = Tower().constant
    t, g = Tower().adjoin_root([c(b * b), c(0), c(-2 * a), c(0), c(1)], "g")
    s = (g * g - a) / (2 * p)
    assert same(s * s, t.constant(2 * n))
    r = (g + (g * g - a) * g / b) / 2
    assert roots.sqrt(t.constant(2 * n)) is not None
    assert roots.sqrt(t.constant(n)) is not None and roots.sqrt(t.constant(2)) is not None
    assert not r.is_zero()


@quick
@given(families(1, cubic=False))
def test_adjoining_a_root_gives_its_square(case: tuple[Tower, list[Element]]) -> None:
    t, (a,) = case
    if a.is_zero() or roots.sqrt(a, t) is not None:
        return
    longer, r = t.adjoin_sqrt(a, "positive", "new")
    assert len(longer.gens) == len(t.gens) + 1
    assert same(r * r, Element(longer, a.num, a.den))
    # radicands are kept free of denominators and of square factors in the parameters
    radicand = longer.gens[-1].radicand
    assert radicand is not None
    _, free = ring.split_square(ring.content_over_gens(radicand))
    assert all(m == 1 for _, m in ring.irreducible_factors(free))


@quick
@given(st.data())
def test_a_root_adjoined_is_a_root(data: st.DataObject) -> None:
    t, (a, b) = data.draw(families(2, steps=2, cubic=False))
    cs = [a - 7, b, t.constant(1), t.constant(2)]
    if len(roots.factor(cs, t)) > 1 or len(roots.factor(cs, t)[0][0]) < 4:
        return
    longer, r = t.adjoin_root(cs, "root of a cubic")
    value = longer.constant(0)
    for c in reversed(cs):
        value = value * r + c
    assert value.is_zero() and longer.degree == 3 * t.degree
    e = data.draw(elements_of(longer, 0))
    assert e.is_zero() or same(e * e.inverse(), longer.constant(1))


@quick
@given(polynomials(), polynomials())
def test_split_square_takes_every_square_out(p: Poly, q: Poly) -> None:
    whole = p * q * q
    if whole.is_zero():
        return
    s, d = ring.split_square(whole)
    assert s * s * d == whole
    lead, facs = d.factor()
    assert all(m == 1 for _, m in facs)
    assert lead.q == 1
    n = abs(int(lead.p))
    assert all(n % (k * k) for k in range(2, int(n**0.5) + 1))
    assert (ring.square_root(whole) is None) == (not d.is_one())


@quick
@given(polynomials(), polynomials())
def test_roots_contents_and_coefficients_of_polynomials(p: Poly, q: Poly) -> None:
    r = ring.square_root(p * p)
    assert r is not None and r in (p, -p)
    mixed = p * ring.gen(1) + q * ring.gen(0) ** 2
    if not mixed.is_zero():
        c = ring.content_over_gens(mixed)
        assert c == ring.gcd_all([p, q])
    for slot in (ring.param_slot(0), ring.gen_slot(0)):
        assert ring.from_coefficients(ring.coefficients(mixed, slot), slot) == mixed


def _fractions(bound: int) -> list[Fraction]:
    return sorted({Fraction(a, b) for b in range(1, bound) for a in range(-2 * b, 2 * b + 1)})


def test_simplest_between_is_minimal() -> None:
    """Against all fractions of small denominator: none strictly inside has a smaller denominator,
    and of those with the same denominator none is smaller in size."""
    ends = _fractions(6)
    pool = _fractions(24)
    for low, high in product(ends, ends):
        if low >= high:
            continue
        got = simplest_between(fmpq(low.numerator, low.denominator), fmpq(high.numerator, high.denominator))
        mine = Fraction(int(got.p), int(got.q))
        best = min((f for f in pool if low < f < high), key=lambda f: (f.denominator, abs(f)))
        assert mine == best, (low, high)


@given(st.fractions(-50, 50, max_denominator=10**6), st.fractions(-50, 50, max_denominator=10**6))
def test_simplest_between_lies_between(a: Fraction, b: Fraction) -> None:
    low, high = sorted((fmpq(a.numerator, a.denominator), fmpq(b.numerator, b.denominator)))
    if low < high:
        v = simplest_between(low, high)
        assert low < v < high
        width = high - low
        assert v.q <= 1 / width + 1
    assert simplest_between(low, None) > low and simplest_between(None, low) < low
    assert simplest_between(None, None) == 0
