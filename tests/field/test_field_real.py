"""Real branches, signs and exact texts of towers at rational samples, recomputed by mpmath."""

from __future__ import annotations

from typing import Any

import mpmath  # type: ignore[import-untyped]
import pytest
import sympy as sp  # type: ignore[import-untyped]
from flint import ctx, fmpq, fmpz_poly
from hypothesis import assume, given
from hypothesis import strategies as st

from surdwise.field import ball, exact, ring, roots
from surdwise.field.cells import known_sign, never_zero
from surdwise.field.real import Branch, Unsettled, branches, isolate
from surdwise.field.ring import Poly
from surdwise.field.tower import Element, Tower

from .made import families, quick

DIGITS = 60


def value(p: Poly, point: dict[int, Any]) -> Any:
    """A polynomial at numbers, by slot."""
    total = mpmath.mpf(0)
    for mono, c in p.terms():
        term = mpmath.mpf(int(c.p)) / int(c.q)
        for slot, e in enumerate(mono):
            if e:
                term *= point[slot] ** int(e)
        total += term
    return total


def points(t: Tower, sample: dict[int, Any]) -> list[dict[int, Any]]:
    """All real points of a tower over a sample, by mpmath alone; those with a radicand or a
    discriminant near zero are left to the caller to avoid."""
    out = [{ring.param_slot(k): mpmath.mpf(int(v.p)) / int(v.q) for k, v in sample.items()}]
    for g in t.gens:
        longer = []
        for p in out:
            if g.radicand is not None:
                q = value(g.radicand, p)
                if q > 0:
                    s = mpmath.sqrt(q)
                    found = [-s, s] if g.choice == "either" else [s if value(g.orient, p) > 0 else -s]
                else:
                    found = []
            else:
                cs = [value(c, p) for c in ring.coefficients(g.modulus, g.slot)]
                every = mpmath.polyroots(cs[::-1], maxsteps=500, extraprec=400)
                found = sorted(r.real for r in every if abs(r.imag) < mpmath.mpf(10) ** -30)
            longer += [{**p, g.slot: r} for r in found]
        out = longer
    return out


def near(b: Any, x: Any) -> bool:
    """Whether a ball's middle is a number to 30 digits, relative to its size."""
    mid = mpmath.mpf(b.mid().str(DIGITS, radius=False))
    return bool(abs(mid - x) < mpmath.mpf(10) ** -30 * (1 + abs(x)))


def printed(e: Element, branch: Branch) -> Any:
    """The exact text of an element, evaluated by SymPy."""
    return mpmath.mpmathify(sp.sympify(exact.text(e, branch)).evalf(45))


@quick
@given(families(2), st.integers(-30, 30), st.integers(-30, 30))
def test_branches_and_values(case: tuple[Tower, list[Element]], a: int, b: int) -> None:
    t, es = case
    sample = {0: fmpq(2 * a + 1, 7), 1: fmpq(2 * b + 1, 5)}
    with mpmath.workdps(DIGITS), ctx.workprec(256):
        try:
            mine = branches(t, sample)
        except Unsettled:
            assume(False)
        theirs = points(t, sample)
        assert len(mine) == len(theirs)
        left = list(theirs)
        for branch in mine:
            balls = branch.known(256)
            found = [p for p in left if all(near(x, p[g.slot]) for x, g in zip(balls, t.gens, strict=True))]
            assert len(found) == 1
            left.remove(found[0])
            for e in es:
                den = value(e.den, found[0])
                if den == 0:
                    continue
                x = value(e.num, found[0]) / den
                assert near(branch.ball(e, 256), x)
                if abs(x) > mpmath.mpf(10) ** -30:
                    assert branch.sign(e) == mpmath.sign(x)
                else:
                    with pytest.raises(Unsettled):
                        assert branch.sign(e) == 0 and e.is_zero()
                        raise Unsettled


@quick
@given(families(2), st.integers(-9, 9), st.integers(-9, 9))
def test_balls_compute_as_elements_do(case: tuple[Tower, list[Element]], a: int, b: int) -> None:
    """Sums, products and quotients of balls overlap the balls of sums, products and quotients."""
    t, (e, f) = case
    sample = {0: fmpq(a, 7) + fmpq(1, 11), 1: fmpq(b, 5) + fmpq(1, 13)}
    with ball.precise():
        try:
            found = branches(t, sample)
        except Unsettled:
            assume(False)
        for branch in found:
            try:
                x, y = ball.ball_of(e, branch), ball.ball_of(f, branch)
            except Unsettled:
                continue
            pairs = [(x + y, e + f), (x - y, e - f), (x * y, e * f), (3 - x * 2, 3 - e * 2), (x**3, e**3)]
            if not f.is_zero() and y.sign():
                pairs.append((x / y, e / f))
            for got, right in pairs:
                true = branch.ball(right, ball.PREC)
                assert true.is_nan() or got.v.is_nan() or got.v.overlaps(true)


@quick
@given(families(1, cubic=False), st.integers(-9, 9))
def test_the_positive_root_is_positive(case: tuple[Tower, list[Element]], a: int) -> None:
    """Whatever square factors and denominators are taken out, "positive" means the value."""
    t, (e,) = case
    assume(not e.is_zero() and roots.sqrt(e, t) is None)
    longer, r = t.adjoin_sqrt(e, "positive", "length")
    sample = {0: fmpq(a, 7) + fmpq(1, 11), 1: fmpq(-a, 5) + fmpq(1, 13)}
    try:
        for branch in branches(longer, sample):
            assert branch.sign(e) == 1 and branch.sign(r) == 1
    except Unsettled:
        assume(False)


def test_a_sample_on_a_border_is_refused() -> None:
    t = Tower()
    u = t.param(0)
    longer, r = t.adjoin_sqrt(u * u - 2, "either", "")
    assert len(branches(longer, {0: fmpq(2)})) == 2 and branches(longer, {0: fmpq(1)}) == []
    square, _ = t.adjoin_sqrt(u * u - 4 * u + 3, "either", "")
    with pytest.raises(Unsettled):
        branches(square, {0: fmpq(3)})
    with pytest.raises(Unsettled):
        Branch({0: fmpq(3)}).sign(u - 3)
    with pytest.raises(Unsettled):
        Branch({0: fmpq(3)}).sign(1 / (u - 3))
    assert Branch({}).sign(t.constant(0)) == 0
    (plus, minus) = branches(longer, {0: fmpq(2)})
    assert {plus.sign(r), minus.sign(r)} == {1, -1}
    # r - sqrt(2) vanishes on one branch although it is not zero: refused, not guessed
    deeper, two = longer.adjoin_sqrt(longer.constant(2), "positive", "")
    with pytest.raises(Unsettled):
        for branch in branches(deeper, {0: fmpq(2)}):
            branch.sign(r - two)


@pytest.mark.parametrize(
    "cs",
    [[-2, 0, 0, 1], [1, -3, 0, 1], [-1, 3, -3, 1], [-5, 0, 1, 0, 0, 1], [1, 0, -10, 0, 1], [6, -5, -2, 1]],
)
def test_isolated_roots_are_sympys(cs: list[int]) -> None:
    x = sp.Symbol("x")
    theirs = sorted({sp.re(r.evalf(50)) for r in sp.Poly(cs[::-1], x).real_roots()})
    found = isolate(fmpz_poly(cs), 256)
    assert len(found) == len(theirs)
    with ctx.workprec(256), mpmath.workdps(50):
        assert all(near(b, mpmath.mpmathify(r)) for b, r in zip(found, theirs, strict=True))


@pytest.mark.parametrize("n", [4, 5, 6, 7])
def test_texts_of_general_roots_are_sympys_numbered_roots(n: int) -> None:
    """A cubic step, a square root above it, and sums of both, as text that SymPy reads."""
    c = Tower().constant
    t, g = Tower().adjoin_root([c(1), c(-n), c(0), c(1)], "")
    for branch in branches(t, {}):
        for e in (g, g * g - 3, 1 / (g + 1), g / 2 + g * g / 3):
            with ctx.workprec(200), mpmath.workdps(50):
                assert near(branch.ball(e, 200), printed(e, branch))
    longer, r = t.adjoin_sqrt(g * g + 1, "positive", "")
    for branch in branches(longer, {}):
        for e in (r, r + g, r * g - 2):
            with ctx.workprec(200), mpmath.workdps(50):
                assert near(branch.ball(e, 200), printed(e, branch))


@quick
@given(families(1, cubic=False), st.integers(-9, 9))
def test_texts_of_nested_roots(case: tuple[Tower, list[Element]], a: int) -> None:
    t, (e,) = case
    sample = {0: fmpq(2 * a + 1, 3), 1: fmpq(2 * a - 5, 7)}
    try:
        found = branches(t, sample)
    except Unsettled:
        assume(False)
    for branch in found:
        if ring.value_of(branch.at_sample(e.den)) == 0:
            continue
        with ctx.workprec(200), mpmath.workdps(50):
            assert near(branch.ball(e, 200), printed(e, branch))


def test_signs_known_at_a_glance() -> None:
    """True is a proof: the polynomial keeps its sign where the named parameters are positive."""
    u, v = ring.param(0), ring.param(1)
    none: frozenset[int] = frozenset()
    assert never_zero(u * u + 1, none) and never_zero(-u * u * v * v - 2, none)
    assert not never_zero(u * u + v * v, none) and not never_zero(u + 1, none)
    assert never_zero(u + 1, frozenset({0})) and never_zero(u * v * v + u**3, frozenset({0}))
    assert not never_zero(u * v * v, frozenset({0})) and not never_zero(u - 1, frozenset({0}))
    assert known_sign(-u - 1, frozenset({0})) == -1 and known_sign(u * u + v * v + 1, none) == 1
    assert known_sign(ring.gen(0) ** 2 + 1, none) == 0 and known_sign(ring.ZERO, none) == 0
