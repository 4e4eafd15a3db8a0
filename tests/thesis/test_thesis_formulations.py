"""The five formulations: that they agree, and that they vanish where a claim holds."""

from __future__ import annotations

import random
from collections.abc import Iterator
from fractions import Fraction
from itertools import product
from typing import Any

import mpmath  # type: ignore[import-untyped]
import pytest
import sympy as sp  # type: ignore[import-untyped]

import surdwise
from surdwise.field import ring
from surdwise.field.ring import Poly
from surdwise.sheet.tree import Comparison
from surdwise.thesis.formal import Thesis
from surdwise.thesis.formulations import Formulation, equal_up_to_powers, formulate
from surdwise.thesis.parts import Form

from ..field.outside import expression, factors, needs_singular, parsed, singular
from .claims import CLAIMS, formal
from .plainly import Places, two_sides

Point = dict[int, Any]


def value(p: Poly, point: Point) -> Any:
    """A polynomial at numbers, by slot."""
    total = mpmath.mpf(0)
    for mono, c in p.terms():
        term = mpmath.mpf(int(c.p)) / int(c.q)
        for slot, e in enumerate(mono):
            if e:
                term *= point[slot] ** int(e)
        total += term
    return total


def size(p: Poly, point: Point) -> Any:
    """Sum of the absolute values of the terms of a polynomial."""
    return sum((abs(value(ring.CTX.from_dict({m: c}), point)) for m, c in p.terms()), mpmath.mpf(0))


def vanishes(p: Poly, point: Point) -> bool:
    return bool(abs(value(p, point)) < mpmath.mpf(10) ** -40 * (size(p, point) + mpmath.mpf(10) ** -20))


def places(t: Thesis, point: Point) -> Places:
    """The points of a thesis at numeric parameters."""
    names = {n: point.get(ring.param_slot(k), mpmath.mpf(0)) for k, n in enumerate(ring.PARAM_NAMES)}
    return {
        n: (mpmath.mpf(1) * eval(x, {}, names), mpmath.mpf(1) * eval(y, {}, names))
        for n, (x, y) in t.placed.items()
    }


def drawn(t: Thesis, rng: random.Random) -> Point:
    """Random parameters; figures of every shape come up."""
    out: Point = {}
    for k, label in t.coordinates.items():
        out[ring.param_slot(k)] = mpmath.mpf(rng.randint(-300, 300)) / 100
        if " of " not in label:
            # the scale of the frame
            out[ring.param_slot(k)] = mpmath.mpf(rng.randint(10, 300)) / 100
    return out


def real(t: Thesis, point: Point) -> Point:
    """The point with every generator at its non-negative value."""
    return with_signs(t, point, tuple(1 for _ in t.tower.gens))


def with_signs(t: Thesis, point: Point, signs: tuple[int, ...]) -> Point:
    """The point with generators (complex, if need be) at chosen roots of their moduli."""
    out = dict(point)
    for g, s in zip(t.tower.gens, signs, strict=True):
        assert g.radicand is not None
        out[g.slot] = s * mpmath.sqrt(value(g.radicand, out))
    return out


def defect(t: Thesis, body: Comparison, point: Point) -> Any:
    left, right = two_sides(body, places(t, point))
    return left - right


def figures_where_it_holds(claim: str, count: int, seed: int = 5) -> list[tuple[Thesis, Point]]:
    """Random real figures on which a claim holds, to 60 digits: one coordinate is moved until the
    two sides change order, then their crossing is bisected."""
    t, body = formal(claim)
    rng = random.Random(seed)
    out: list[tuple[Thesis, Point]] = []
    for _ in range(400):
        if len(out) == count:
            break
        a = drawn(t, rng)
        k = rng.choice(list(t.coordinates))
        slot = ring.param_slot(k)
        b = {**a, slot: drawn(t, rng)[slot]}
        try:
            x, y = defect(t, body, a), defect(t, body, b)
            if not (mpmath.isfinite(x) and mpmath.isfinite(y)) or x * y >= 0:
                continue
            p = _crossing(t, body, a, b, slot, x)
        except ZeroDivisionError:
            continue
        if p is not None:
            out.append((t, p))
    return out


def _crossing(t: Thesis, body: Comparison, a: Point, b: Point, slot: int, x: Any) -> Point | None:
    low, high = a[slot], b[slot]
    for _ in range(230):
        mid = (low + high) / 2
        d = defect(t, body, {**a, slot: mid})
        if d * x > 0:
            low = mid
        else:
            high = mid
    p = {**a, slot: low}
    return p if abs(defect(t, body, p)) < mpmath.mpf(10) ** -55 else None


# claims that hold on a thin set only, where the two sides touch and do not cross: figures by hand
TOUCHING: dict[str, list[dict[str, Fraction | str]]] = {
    "|PX| + |XQ| = |PQ|": [{"x of Q": Fraction(3, 2), "y of Q": Fraction(0)}],
    "|PX| - |XQ| = |PQ|": [{"x of Q": Fraction(1, 3), "y of Q": Fraction(0)}],
    "|PA| = |PB| + |PC|": [
        {
            "x of B": Fraction(3, 10),
            "y of B": Fraction(2, 5),
            "x of C": Fraction(-1, 2),
            "y of C": Fraction(0),
        },
        {
            "x of B": Fraction(0),
            "y of B": Fraction(1, 4),
            "x of C": Fraction(9, 20),
            "y of C": Fraction(-3, 5),
        },
    ],
    "|AB|*|CD| + |BC|*|DA| = |AC|*|BD|": [
        # on the circle x^2 + y^2 = x + y, in order
        {"x of C": Fraction(1), "y of C": Fraction(1), "x of D": Fraction(0), "y of D": Fraction(1)},
        {
            "x of C": Fraction(6, 5),
            "y of C": Fraction(3, 5),
            "x of D": Fraction(3, 5),
            "y of D": Fraction(6, 5),
        },
    ],
    "circumradius(ABC) = 2inradius(ABC)": [{"x of C": Fraction(1, 2), "y of C": "sqrt(3)/2"}],
    "area(ABC) = |AB|*|BC|/2": [{"x of C": Fraction(1), "y of C": Fraction(n, 2)} for n in (1, 6)],
    "4*area(ABC) = |AB|^2 + |AC|^2": [{"x of C": Fraction(0), "y of C": Fraction(1)}],
}


def by_hand(claim: str) -> list[tuple[Thesis, Point]]:
    t, body = formal(claim)
    out = []
    for given in TOUCHING[claim]:
        names = {label: ring.param_slot(k) for k, label in t.coordinates.items()}
        point = {names[n]: mpmath.mpmathify(sp.sympify(str(v)).evalf(70)) for n, v in given.items()}
        assert abs(defect(t, body, point)) < mpmath.mpf(10) ** -50
        out.append((t, point))
    return out


@pytest.fixture(autouse=True)
def many_digits() -> Iterator[None]:
    with mpmath.workdps(70):
        yield


@pytest.mark.parametrize("claim", CLAIMS)
def test_the_literal_equation_is_the_claim(claim: str) -> None:
    """left - right over lengths, at random figures, is the claim's defect times a denominator: it
    vanishes with it and has its sign up to one sign for the whole claim."""
    t, body = formal(claim)
    rng = random.Random(1)
    for _ in range(8):
        p = drawn(t, rng)
        try:
            left, right = two_sides(body, places(t, p))
        except ZeroDivisionError:
            continue
        full = real(t, p)
        a, b = value(t.left, full), value(t.right, full)
        # a : b = left : right
        assert abs(a * right - b * left) < mpmath.mpf(10) ** -50 * (1 + abs(a * right) + abs(b * left))


@pytest.mark.parametrize("claim", CLAIMS)
def test_sign_product_and_eliminant_agree(claim: str) -> None:
    """The same irreducible factors (numeric roots, which stay, are multiplied out first)."""
    t, _ = formal(claim)
    product_, eliminant = (formulate(t, f) for f in (Form.SIGN_PRODUCT, Form.ELIMINANT))
    p, q = (_rational(t, f) for f in (product_, eliminant))
    assert equal_up_to_powers(p, q)
    if len(q) <= 40:
        assert factors(expression(p)) == factors(expression(q))
    assert product_.degree <= eliminant.degree


def _rational(t: Thesis, f: Formulation) -> Poly:
    """The thesis polynomial of a formulation without numeric roots: its norm over them."""
    p, *moduli = f.polynomials
    for m in reversed(moduli):
        g = next(g for g in t.tower.gens if m.degrees()[g.slot] == 2)
        if p.degrees()[g.slot] > 0:
            p = m.resultant(p, ring.GEN_NAMES[g.index])
    return p


@pytest.mark.parametrize("claim", CLAIMS)
def test_the_eliminant_is_the_product_over_all_signs(claim: str) -> None:
    """At random figures, up to one constant: every length takes both roots of its square."""
    t, _ = formal(claim)
    lengths = {x.gen.index for x in t.lengths}
    p = formulate(t, Form.ELIMINANT).polynomials[0]
    rng = random.Random(2)
    ratios = []
    for _ in range(3):
        point = drawn(t, rng)
        whole = mpmath.mpf(1)
        for signs in product((1, -1), repeat=len(lengths)):
            it = iter(signs)
            full = with_signs(t, point, tuple(next(it) if g.index in lengths else 1 for g in t.tower.gens))
            whole *= value(t.left - t.right, full)
        ratios.append(value(p, real(t, point)) / whole)
    for r in ratios[1:]:
        assert abs(r / ratios[0] - 1) < mpmath.mpf(10) ** -40


@pytest.mark.parametrize("claim", CLAIMS)
def test_every_formulation_vanishes_where_the_claim_holds(claim: str) -> None:
    """The minimal form follows one sign pattern of the lengths whose squares are squares of
    polynomials: it is asked only on figures where these polynomials are positive."""
    found = by_hand(claim) if claim in TOUCHING else figures_where_it_holds(claim, 3)
    assert found, claim
    forms = [formulate(found[0][0], form) for form in Form]
    for t, point in found:
        full = real(t, point)
        roots = [ring.square_root(x.square.num) for x in t.lengths]
        own = all(s is None or value(s, full) > 0 for s in roots)
        for f in forms:
            for p in f.polynomials:
                assert vanishes(p, full) or (f.form is Form.MINIMAL and not own), (f.form, str(p)[:200])


@pytest.mark.parametrize("claim", CLAIMS)
def test_formulations_vanish_nowhere_in_general(claim: str) -> None:
    """On random figures where no choice of signs satisfies the equation."""
    t, _ = formal(claim)
    rng = random.Random(3)
    for form in (Form.SIGN_PRODUCT, Form.ELIMINANT, Form.MINIMAL):
        p = formulate(t, form).polynomials[0]
        assert not p.is_zero() and not vanishes(p, real(t, drawn(t, rng)))


@pytest.mark.parametrize("claim", CLAIMS)
def test_the_minimal_form_keeps_to_the_sign_product(claim: str) -> None:
    t, _ = formal(claim)
    mine = _factors(_rational(t, formulate(t, Form.MINIMAL)))
    assert mine and mine <= _factors(_rational(t, formulate(t, Form.SIGN_PRODUCT)))


def _factors(p: Poly) -> set[str]:
    return {ring.key(f) for f, _ in ring.irreducible_factors(p)}


@pytest.mark.parametrize("form", Form)
@pytest.mark.parametrize("claim", [*CLAIMS, "sqrt(1 + |AC|) + sqrt(1 - |AC|) = |BC|"])
def test_every_symbol_of_a_formulation_is_defined_in_it(claim: str, form: Form) -> None:
    t, _ = formal(claim)
    f = formulate(t, form)
    used = {g.index for p in f.polynomials for g in t.tower.gens if p.degrees()[g.slot] > 0}
    defined = {ring.top_gen(p) for p in f.polynomials[1:]}
    assert used <= defined
    if form in (Form.SIGN_PRODUCT, Form.ELIMINANT, Form.MINIMAL):
        assert used <= {g.index for g in t.tower.gens if g.label == "number"}


@pytest.mark.parametrize("claim", CLAIMS)
def test_the_cost_is_counted_on_the_polynomials(claim: str) -> None:
    t, _ = formal(claim)
    for form in Form:
        f = formulate(t, form)
        terms = [(mono, c) for p in f.polynomials for mono, c in p.terms()]
        assert f.form is form and f.seconds >= 0
        assert f.unknowns == len({k for mono, _ in terms for k, e in enumerate(mono) if e})
        assert f.degree == max(sum(map(int, mono)) for mono, _ in terms)
        assert f.terms == len(terms)
        assert all(c.q == 1 for _, c in terms)
        assert f.largest == max(abs(int(c.p)) for _, c in terms)


# ------------------------------------------------------------------ single lengths

ALONE = ["|AC|^3 = 2|AC|", "|AC|*|BC| = 0", "|AC|*|BC| = |AC|", "|AB|*|AC| = |AB|*|BC|"]


@pytest.mark.parametrize("claim", ALONE)
def test_a_length_alone_is_not_lost(claim: str) -> None:
    """Where a length is a factor of the equation, its zero solves the claim and stays a zero of
    every formulation."""
    t, _ = formal(claim)
    product_, eliminant = (formulate(t, f).polynomials[0] for f in (Form.SIGN_PRODUCT, Form.ELIMINANT))
    assert equal_up_to_powers(product_, eliminant)
    assert not ring.is_constant(product_)


# ------------------------------------------------------------------ the medians

MEDIANS = "4*(median(ABC, A) + median(ABC, B) + median(ABC, C)) = 3*perimeter(ABC)"


def test_the_medians_norm() -> None:
    """2(p + q + r) = 3(a + b + 1) with medians p/2, q/2, r/2 and sides a, b, 1."""
    t, _ = formal(MEDIANS)
    f = formulate(t, Form.SIGN_PRODUCT)
    assert len(t.lengths) == 5
    assert (f.degree, f.terms, f.unknowns) == (28, 169, 2)
    assert formulate(t, Form.ELIMINANT).terms == 169


@needs_singular
def test_the_medians_norm_is_singulars() -> None:
    t, _ = formal(MEDIANS)
    out = singular(
        "ring r = 0, (p,q,r1,a,b,u0,u1), dp;\n"
        "ideal i = a^2-u0^2-u1^2, b^2-(u0-1)^2-u1^2, p^2-(u0+1)^2-u1^2, q^2-(u0-2)^2-u1^2,"
        " r1^2-(2*u0-1)^2-4*u1^2, 2*(p+q+r1)-3*(a+b+1);\n"
        "ideal j = eliminate(i, p*q*r1*a*b); size(j); size(j[1]); j[1];"
    )
    count, terms, text = out.split("\n", 2)
    assert (count, terms) == ("1", "169")
    mine = formulate(t, Form.SIGN_PRODUCT).polynomials[0]
    assert factors(expression(mine)) == factors(parsed(text))


@needs_singular
@pytest.mark.parametrize(
    "claim",
    [
        "|AC| + |BC| = 2|AB|",
        "|AB|*|CD| + |BC|*|DA| = |AC|*|BD|",
        "circumradius(ABC) = 2inradius(ABC)",
        "bisector(ABC, A) = |AB|/2",
        "median(ABC, A) + median(ABC, B) = 3/2*|AC|",
    ],
)
def test_the_auxiliary_form_eliminates_to_the_sign_product(claim: str) -> None:
    """Singular, given the auxiliary ideal, finds the same curve or surface."""
    t, _ = formal(claim)
    ideal = [*formulate(t, Form.AUXILIARY).polynomials]
    names = [ring.PARAM_NAMES[k] for k in t.coordinates]
    gens = [f"g{x.gen.index}" for x in t.lengths]
    out = singular(
        f"ring r = 0, ({','.join([*gens, *names])}), dp;\nideal i = {','.join(map(str, ideal))};\n"
        f"ideal j = eliminate(i, {'*'.join(gens)}); size(j); j[1];"
    )
    count, text = out.split("\n", 1)
    assert count == "1"
    mine = formulate(t, Form.SIGN_PRODUCT).polynomials[0]
    assert factors(expression(mine)) == factors(parsed(text))


def test_foreign_claims_share_one_sign_product() -> None:
    """|PX| + |XQ| = |PQ| and |PX| - |XQ| = |PQ|: algebra cannot tell them apart."""
    one, two = (formulate(formal(c)[0], Form.SIGN_PRODUCT) for c in CLAIMS[1:3])
    assert one.polynomials == two.polynomials


def test_the_interface_rewrites_only_single_comparisons() -> None:
    sheets = surdwise.read("given triangle ABC\nclaim |AB| < |BC| < |CA|\nclaim AB parallel to CA\n")
    for r in surdwise.rewrite(sheets[0]):
        assert r.thesis is None and r.why_not and r.formulations == () and r.legend() == []


@pytest.mark.parametrize(
    "claim",
    [
        # products of dependent lengths: one length is a product of others over a denominator
        "bisector(ABC, A) + bisector(ABC, B) + bisector(ABC, C) = |AB|",
        "sqrt(area(ABC)*|AD|) + sqrt(area(ABC)*|BD|) = sqrt(|AD|*|BD|)",
    ],
)
def test_the_minimal_form_is_found_or_refused_in_words(claim: str) -> None:
    names = "A, B, C, D" if "D" in claim else "A, B, C"
    (sheet,) = surdwise.read(f"given points {names}\nclaim {claim}\n")
    (r,) = surdwise.rewrite(sheet)
    assert {f.form for f in r.formulations} >= {Form.SIGN_PRODUCT, Form.ELIMINANT} or r.why_not
