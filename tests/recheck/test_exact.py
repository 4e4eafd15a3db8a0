"""Exact real numbers against published identities, SymPy and mpmath."""

from __future__ import annotations

from fractions import Fraction
from itertools import pairwise, product

import mpmath
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from surdwise_recheck.exact import Limits, OutOfReach, Real, Reals
from surdwise_recheck.exact_roots import RealRoot
from surdwise_recheck.exact_text import BadNumber, parse_real
from surdwise_recheck.protocol import Undefined


def sign(text: str) -> int:
    reals = Reals()
    return reals.sign(parse_real(text, reals))


ZEROS = [
    "sqrt(2) + sqrt(3) - sqrt(5 + 2*sqrt(6))",
    # Ramanujan (from memory): sqrt(28^(1/3) - 3) = (98^(1/3) - 28^(1/3) - 1)/3
    "sqrt(CRootOf(x**3 - 28, 0) - 3) - (CRootOf(x**3 - 98, 0) - CRootOf(x**3 - 28, 0) - 1)/3",
    # Ramanujan (from memory): (2^(1/3) - 1)^(1/3) = (1 - 2^(1/3) + 4^(1/3))/9^(1/3)
    "CRootOf(x**9 + 3*x**6 + 3*x**3 - 1, 0)*CRootOf(x**3 - 9, 0) - 1 + CRootOf(x**3 - 2, 0)"
    " - CRootOf(x**3 - 4, 0)",
    # the golden ratio as a root and by its surd
    "CRootOf(x**2 - x - 1, 1) - (1 + sqrt(5))/2",
    # cos 36 degrees - cos 72 degrees = 1/2 (Euclid XIII), by their minimal polynomials
    "CRootOf(4*x**2 - 2*x - 1, 1) - CRootOf(4*x**2 + 2*x - 1, 1) - 1/2",
    # the three roots of 8x^3 - 6x - 1 sum to 0 (Vieta)
    "CRootOf(8*x**3 - 6*x - 1, 0) + CRootOf(8*x**3 - 6*x - 1, 1) + CRootOf(8*x**3 - 6*x - 1, 2)",
    "sqrt(12)/2 - sqrt(27)/3",
    "1/(sqrt(3) - sqrt(2)) - sqrt(3) - sqrt(2)",
    "sqrt(10 + 2*sqrt(5))*sqrt(10 - 2*sqrt(5)) - 4*sqrt(5)",
    "(sqrt(2) + 1)**-3 - (sqrt(2) - 1)^3",
]


@pytest.mark.parametrize("text", ZEROS)
def test_published_identities_are_zero_and_their_neighbours_are_not(text: str) -> None:
    assert sign(text) == 0
    assert sign(f"{text} + 1/10**60") == 1
    assert sign(f"{text} - 1/10**60") == -1


def test_close_sums_of_square_roots() -> None:
    # smallest gaps of sums of square roots of numbers below 50, by mpmath
    sums = sorted(
        (mpmath.sqrt(a) + mpmath.sqrt(b) + mpmath.sqrt(c), (a, b, c))
        for a, b, c in product(range(2, 30), repeat=3)
        if a < b < c
    )
    gaps = sorted((t - s, x, y) for (s, x), (t, y) in pairwise(sums) if t - s > 1e-12)
    for _, x, y in gaps[:20]:
        text = " + ".join(f"sqrt({n})" for n in y) + "".join(f" - sqrt({n})" for n in x)
        assert sign(text) == 1


atoms = st.sampled_from(["1", "2", "3", "1/3", "sqrt(2)", "sqrt(3)", "sqrt(6)", "CRootOf(x**3 - x - 1, 0)"])
texts = st.recursive(
    atoms,
    lambda inner: st.tuples(inner, st.sampled_from("+-*"), inner).map(lambda t: f"({t[0]} {t[1]} {t[2]})"),
    max_leaves=10,
)


@settings(max_examples=120, deadline=None)
@given(texts, texts)
def test_signs_agree_with_a_hundred_digits(a: str, b: str) -> None:
    with mpmath.workdps(100):
        root = mpmath.findroot(lambda x: x**3 - x - 1, 1.3)

        def number(text: str) -> mpmath.mpf:
            plain = text.replace("CRootOf(x**3 - x - 1, 0)", "root").replace("1/3", "mpf(1)/3")
            return eval(plain, {"sqrt": mpmath.sqrt, "root": root, "mpf": mpmath.mpf})

        value = number(a) - number(b)
        # products of at most 20 such numbers that differ do so by more than 10^-60 (the bound of exact.py)
        expected = 0 if abs(value) < mpmath.mpf(10) ** -60 else int(mpmath.sign(value))
    assert sign(f"{a} - {b}") == expected
    if expected:
        assert sign(f"1/({a} - {b})") == expected


@settings(max_examples=60, deadline=None)
@given(st.lists(st.integers(-20, 20), min_size=3, max_size=8).filter(lambda c: c[-1] != 0))
def test_real_roots_are_those_of_sympy(coefficients: list[int]) -> None:
    p = sympy.Poly(list(reversed(coefficients)), sympy.Symbol("x"))
    if not p.is_sqf:
        with pytest.raises(ValueError, match="square-free"):
            RealRoot(tuple(coefficients), 0)
        return
    intervals = p.intervals(eps=sympy.Rational(1, 10**30))
    for i, ((a, b), _) in enumerate(intervals):
        lo, hi = RealRoot(tuple(coefficients), i).enclosure(200)
        assert lo <= hi <= lo + 2
        low, high = Fraction(int(a.p), int(a.q)), Fraction(int(b.p), int(b.q))
        assert Fraction(hi, 1 << 200) >= low and Fraction(lo, 1 << 200) <= high
    with pytest.raises(ValueError, match="no root"):
        RealRoot(tuple(coefficients), len(intervals))


@pytest.mark.parametrize(
    "text",
    [
        "", "1 +", "sqrt(-1)", "1/(sqrt(2)**2 - 2)", "sqrt(2", "__import__('os')", "CRootOf(x**2 + 1, 0)",
        "CRootOf(x**2 - 2, 2)", "CRootOf(x**2 - 2*x + 1, 0)", "x", "1.5", "2**1000", "pi", "CRootOf(2, 0)",
        "(" * 200 + "1" + ")" * 200,
    ],
)  # fmt: skip
def test_what_is_no_number_is_refused(text: str) -> None:
    with pytest.raises(BadNumber):
        parse_real(text, Reals())


def test_rational_roots_are_rational() -> None:
    assert parse_real("CRootOf(2*x - 3, 0)", Reals()).value == Fraction(3, 2)
    assert sign("CRootOf(3*x**2 - 4*x + 1, 0) - 1/3") == 0


def test_limits_and_undefined() -> None:
    reals = Reals(Limits(bits=500, seconds=60))
    x = parse_real(ZEROS[2], reals)
    with pytest.raises(OutOfReach):
        reals.sign(x)
    two: Real = reals.root(reals.number(2))
    with pytest.raises(Undefined):
        reals.divide(two, two * two - 2, "nothing")
    with pytest.raises(Undefined):
        reals.root(-two)
