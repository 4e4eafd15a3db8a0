"""Sums of numeric roots against SymPy's minimal polynomials and mpmath's digits."""

from __future__ import annotations

import mpmath  # type: ignore[import-untyped]
import pytest
import sympy as sp  # type: ignore[import-untyped]
from flint import ctx

from surdwise.field import exact
from surdwise.field.real import Branch, branches

from .outside import Radicals, minimal_polynomial

X = sp.Symbol("x")

# the sum, and the degree that its field's tower ends with
SUMS = [
    ("sqrt(2) + sqrt(3)", 4),
    ("sqrt(2) - sqrt(3) + sqrt(5)", 8),
    ("sqrt(2) + sqrt(3) + sqrt(5) + sqrt(7)", 16),
    ("sqrt(2) + sqrt(3) + sqrt(5) + sqrt(7) + sqrt(11)", 32),
    ("sqrt(2) + sqrt(3) + sqrt(5) + sqrt(7) + sqrt(11) + sqrt(13)", 64),
    ("sqrt(2) + sqrt(3) + sqrt(6)", 4),
    ("sqrt(2) + sqrt(8) + sqrt(18)", 2),
    ("sqrt(6) + sqrt(10) + sqrt(15)", 4),
    ("sqrt(2) + sqrt(3) + sqrt(6) + sqrt(5) + sqrt(10) + sqrt(15)", 8),
    ("sqrt(12) - 2*sqrt(3) + sqrt(5)", 4),
    ("sqrt(2 + sqrt(3))", 4),
    ("sqrt(2 + sqrt(2))", 4),
    ("sqrt(3 + 2*sqrt(2))", 2),
    ("sqrt(5 + 2*sqrt(6)) - sqrt(2)", 4),
    ("sqrt(2 + sqrt(3)) + sqrt(2 - sqrt(3))", 4),
    ("sqrt(2 + sqrt(3)) - sqrt(2 - sqrt(3)) + sqrt(6)", 4),
    ("sqrt(2 + sqrt(2 + sqrt(2)))", 8),
    ("sqrt(10 + 2*sqrt(5)) + sqrt(10 - 2*sqrt(5)) + sqrt(5)", 4),
    ("sqrt(3) + sqrt(10 + 2*sqrt(5))", 8),
    ("sqrt(5 - sqrt(21)) + sqrt(7)/3", 8),
    ("sqrt(2)/2 + 1/sqrt(3)", 4),
    ("sqrt(1 + sqrt(2)*sqrt(3)) + sqrt(7 - 2*sqrt(6))", 8),
    ("sqrt(6 + sqrt(2) + 2*sqrt(3) + 2*sqrt(6))", 8),
]


@pytest.mark.parametrize(("text", "degree"), SUMS)
def test_the_minimal_polynomial_is_sympys(text: str, degree: int) -> None:
    value = sp.sympify(text, evaluate=False)
    made = Radicals()
    e = made.read(value)
    mine = minimal_polynomial(e, X)
    assert sp.expand(mine) == sp.expand(sp.minimal_polynomial(sp.sympify(text), X))
    assert made.tower.degree == degree
    assert degree % sp.degree(mine, X) == 0


@pytest.mark.parametrize(("text", "degree"), SUMS)
def test_the_value_is_mpmaths(text: str, degree: int) -> None:
    """The ball at the one branch of positive roots holds the number, to 60 digits."""
    made = Radicals()
    e = made.read(sp.sympify(text, evaluate=False))
    (branch,) = branches(made.tower, {})
    with ctx.workprec(256):
        ball = branch.ball(e, 256)
        with mpmath.workdps(70):
            true = mpmath.mpmathify(sp.sympify(text).evalf(70))
            off = abs(mpmath.mpf(ball.mid().str(70, radius=False)) - true)
            assert off < mpmath.mpf(10) ** -60
        assert ball.rad() < 1e-60
    assert branch.sign(e) == (1 if true > 0 else -1)
    assert abs(branch.approx(e) - float(true)) < 1e-14


@pytest.mark.parametrize(("text", "degree"), SUMS)
def test_the_printed_value_is_the_value(text: str, degree: int) -> None:
    made = Radicals()
    e = made.read(sp.sympify(text, evaluate=False))
    printed = exact.text(e, branches(made.tower, {})[0])
    assert abs(sp.sympify(printed).evalf(50) - sp.sympify(text).evalf(50)) < sp.Rational(1, 10**40)


ZEROS = [
    "sqrt(2)*sqrt(3) - sqrt(6)",
    "sqrt(3 + 2*sqrt(2)) - 1 - sqrt(2)",
    "sqrt(5 + 2*sqrt(6)) - sqrt(2) - sqrt(3)",
    "sqrt(5 - 2*sqrt(6)) + sqrt(2) - sqrt(3)",
    "sqrt(2 + sqrt(3)) - sqrt(6)/2 - sqrt(2)/2",
    "sqrt(2 + sqrt(3)) + sqrt(2 - sqrt(3)) - sqrt(6)",
    "sqrt(11 + 6*sqrt(2)) + sqrt(11 - 6*sqrt(2)) - 6",
    "sqrt(10 + 2*sqrt(5))*sqrt(10 - 2*sqrt(5)) - 4*sqrt(5)",
    "1/(sqrt(2) + sqrt(3)) - sqrt(3) + sqrt(2)",
    "sqrt(16 - 2*sqrt(29) + 2*sqrt(55 - 10*sqrt(29))) - sqrt(5) - sqrt(11 - 2*sqrt(29))",
    "sqrt(112 + 70*sqrt(2) + (46 + 34*sqrt(2))*sqrt(5)) - 5 - 4*sqrt(2) - (3 + sqrt(2))*sqrt(5)",
]


@pytest.mark.parametrize("text", ZEROS)
def test_sums_that_vanish_are_zero(text: str) -> None:
    """Known denestings: the zero test is exact, no digits are asked."""
    assert Radicals().read(sp.sympify(text, evaluate=False)).is_zero()


@pytest.mark.parametrize("text", ZEROS)
def test_sums_that_nearly_vanish_are_not(text: str) -> None:
    made = Radicals()
    e = made.read(sp.sympify(text, evaluate=False)) + made.number(1) / 10**40
    assert not e.is_zero() and Branch({}).sign(e) == 1
    assert Branch({}).sign(e - made.number(1) / 10**39) == -1


@pytest.mark.parametrize(
    ("small", "large"),
    [
        # near misses: differences of about 1e-12 and less
        ("sqrt(10) + sqrt(11)", "sqrt(5) + sqrt(18) + sqrt(25)/1000000*14363"),
        ("sqrt(1000000) + sqrt(1000003)", "sqrt(1000001) + sqrt(1000002)"),
        ("sqrt(100000000000) + sqrt(100000000003)", "sqrt(100000000001) + sqrt(100000000002)"),
    ],
)
def test_signs_of_near_misses(small: str, large: str) -> None:
    made = Radicals()
    e = made.read(sp.sympify(large, evaluate=False)) - made.read(sp.sympify(small, evaluate=False))
    true = sp.sympify(large).evalf(60) - sp.sympify(small).evalf(60)
    assert Branch({}).sign(e) == (1 if true > 0 else -1)
