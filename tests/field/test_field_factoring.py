"""Factors over towers, norms and counts of components, against SymPy and Singular."""

from __future__ import annotations

from itertools import product
from typing import Any

import pytest
import sympy as sp  # type: ignore[import-untyped]
from hypothesis import given, settings
from hypothesis import strategies as st

from surdwise.field import ring, roots
from surdwise.field.ring import Poly
from surdwise.field.tower import Element, ElementPoly, Tower, poly_divmod, poly_gcd, poly_mul

from .made import elements_of, families, quick, towers
from .outside import Radicals, expression, factors, needs_singular, parsed, same_zeros, script, singular

X = sp.Symbol("x")


def dense(t: Tower, *cs: int | Element) -> ElementPoly:
    """A polynomial from its coefficients, highest first."""
    return [t.constant(c) if isinstance(c, int) else c for c in reversed(cs)]


def multiplied(t: Tower, found: list[tuple[ElementPoly, int]], lead: Element) -> ElementPoly:
    out: ElementPoly = [lead]
    for f, m in found:
        for _ in range(m):
            out = poly_mul(out, f)
    return out


def equal(f: ElementPoly, g: ElementPoly) -> bool:
    return len(f) == len(g) and all((a - b).is_zero() for a, b in zip(f, g, strict=True))


# ------------------------------------------------------------------ against SymPy

# polynomial, the radicals of the field, coefficients highest first
CASES = [
    ([], [1, 0, 0, 0, 4]),
    ([], [1, 0, -10, 0, 1]),
    ([], [2, -3, -3, 2]),
    (["sqrt(2)"], [1, 0, 0, 0, 1]),
    (["sqrt(2)"], [1, 0, -10, 0, 1]),
    (["sqrt(3)"], [1, 0, -10, 0, 1]),
    (["sqrt(5)"], [1, 0, -10, 0, 1]),
    (["sqrt(2)", "sqrt(3)"], [1, 0, -10, 0, 1]),
    (["sqrt(2)", "sqrt(3)"], [1, 0, -4, 0, 1]),
    (["sqrt(5)"], [1, 1, 1, 1, 1]),
    (["sqrt(2)"], [1, 0, 0, -2]),
    (["sqrt(2)"], [1, 0, 0, 0, 0, 0, -8]),
    (["sqrt(2)"], [1, 0, -4, 0, 4]),
    (["sqrt(2)"], [1, 0, -2, -1, 0, 2]),
    (["sqrt(3)"], [1, 3, 3, -2, 0, 9, 0, -27]),
    (["sqrt(6)"], [1, 0, 0, 0, -5, 0, 0, 0, 6]),
    (["sqrt(2)", "sqrt(3)"], [1, 0, -11, 0, 31, 0, -30]),
]


@pytest.mark.parametrize(("field", "cs"), CASES)
def test_factors_over_number_fields_are_sympys(field: list[str], cs: list[int]) -> None:
    made = Radicals()
    for text in field:
        made.read(sp.sympify(text))
    t = made.tower
    f = dense(t, *cs)
    found = roots.factor(f, t)
    assert equal(multiplied(t, found, f[-1]), f)
    poly = sp.Poly(cs, X)
    ext = [sp.sympify(s) for s in field]
    theirs = sp.factor_list(poly.as_expr(), X, **({"extension": ext} if ext else {}))[1]
    assert sorted((len(h) - 1, m) for h, m in found) == sorted((int(sp.degree(h, X)), m) for h, m in theirs)
    mine = {(_as_sympy(h, made), m) for h, m in found}
    assert mine == {(sp.expand(sp.Poly(h, X).monic().as_expr()), m) for h, m in theirs}


def _as_sympy(h: ElementPoly, made: Radicals) -> Any:
    """A factor with its generators replaced by the radicals they stand for."""
    values: dict[Any, Any] = {}
    for g in made.tower.gens:
        assert g.radicand is not None
        values[sp.Symbol(f"g{g.index}")] = sp.sqrt(expression(g.radicand).subs(values))
    total = sum(expression(c.num).subs(values) * X**i for i, c in enumerate(h))
    return sp.expand(total)


@pytest.mark.parametrize("n", [2, 3, 5])
def test_over_a_cubic_field(n: int) -> None:
    """x^3 - n over its own field splits once; x^6 - n^2 into two lines and two quadratics."""
    c = Tower().constant
    t, g = Tower().adjoin_root([c(-n), c(0), c(0), c(1)], "cube root")
    found = roots.factor(dense(t, 1, 0, 0, -n), t)
    assert sorted(len(h) for h, _ in found) == [2, 3]
    line = next(h for h, _ in found if len(h) == 2)
    assert (line[0] + g).is_zero()
    found = roots.factor(dense(t, 1, 0, 0, 0, 0, 0, -n * n), t)
    theirs = sp.factor_list(X**6 - n * n, X, extension=sp.cbrt(n))[1]
    assert sorted(len(h) - 1 for h, _ in found) == sorted(int(sp.degree(h, X)) for h, _ in theirs)
    s = roots.sqrt(g * g * (g + 1) * (g + 1), t)
    assert s is not None and roots.sqrt(g, t) is None
    assert roots.sqrt(t.constant(2), t) is None


def test_a_square_root_over_a_cubic_over_a_square_root() -> None:
    """Radicands that do not use the top step of the tower are looked for all the same."""
    c = Tower().constant
    t, a = Tower().adjoin_sqrt(c(2), "positive", "a")
    t, b = t.adjoin_root([c(-3), c(0), c(0), c(1)], "b")
    for e in (a + 1, b, a * b + 2, b * b - a):
        r = roots.sqrt(e * e, t)
        assert r is not None and (r * r - e * e).is_zero()
    assert roots.sqrt(a, t) is None and roots._sqrt(Element(t, a.num, a.den), 2) is None
    assert roots.sqrt(3 + 2 * a, t) is not None
    p, _ = roots.norm(Element(t, a.num, a.den))
    assert p == ring.constant(-8)


@settings(parent=quick, max_examples=40)
@given(st.data())
def test_a_product_gives_its_factors_back(data: st.DataObject) -> None:
    """(x - a)^2 (x^2 - b): the roots are found with their multiplicities, the product is whole."""
    t, params = data.draw(towers(2, cubic=False))
    a, b = data.draw(elements_of(t, params)), data.draw(elements_of(t, params))
    f = poly_mul(poly_mul([-a, t.constant(1)], [-a, t.constant(1)]), [-b, t.constant(0), t.constant(1)])
    found = roots.factor(f, t)
    assert equal(multiplied(t, found, f[-1]), f)
    times = sum(m for h, m in found if len(h) == 2 and (h[0] + a).is_zero())
    more = 0 if not (a * a - b).is_zero() else 2 if b.is_zero() else 1
    assert times == 2 + more
    for h, _ in found:
        assert poly_divmod(f, h)[1] == []


@settings(parent=quick, max_examples=40)
@given(families(4, steps=2))
def test_gcd_of_products(case: tuple[Tower, list[Element]]) -> None:
    t, (a, b, c, d) = case
    one = t.constant(1)
    common = [a, b, one]
    g = poly_gcd(poly_mul(common, [c, one]), poly_mul(common, [d, one]))
    same = (c - d).is_zero()
    assert len(g) == (4 if same else 3) and poly_divmod(g, common)[1] == []


# ------------------------------------------------------------------ against Singular


def towers_by_hand() -> list[tuple[str, Element]]:
    """Elements of towers over Q(u0, u1) whose norms are compared with eliminations."""
    out = []
    t = Tower()
    u, v = t.param(0), t.param(1)
    t1, a = t.adjoin_sqrt(u * u + v * v, "positive", "")
    t2, b = t1.adjoin_sqrt((u - 1) * (u - 1) + v * v, "positive", "")
    c = t2.adjoin_sqrt(u * u + (v - 2) * (v - 2), "positive", "")[1]
    out += [
        ("one root", a + u - 3),
        ("two roots", a + b - 2),
        ("two roots, product", a * b + u * a - v),
        ("three roots", a + b - c),
        ("three roots and a number", a + b + c - 1),
        ("three roots, weighted", a * 2 + b * u - c + 1),
    ]
    d = t1.adjoin_sqrt(a * u + v, "either", "")[1]
    out += [("nested", d + a - 1), ("nested, product", d * a + u)]
    e = t1.adjoin_root([a - v, u, t1.constant(0), t1.constant(1)], "")[1]
    out += [("cubic over a root", e + a), ("cubic over a root, square", e * e - u * a)]
    return out


@needs_singular
@pytest.mark.parametrize(("name", "e"), towers_by_hand())
def test_norms_are_eliminations(name: str, e: Element) -> None:
    t = e.tower
    moduli: list[Poly | str] = [g.modulus for g in t.gens]
    gens = "*".join(f"g{g.index}" for g in t.gens)
    out = singular(script([e.num, *moduli]) + f"ideal j = eliminate(i, {gens}); size(j); j[1];")
    size, text = out.split("\n", 1)
    mine, _ = roots.norm(Element(t, e.num, ring.ONE))
    assert size.strip() == "1"
    assert same_zeros(expression(mine), parsed(text))


COMPONENTS = [
    # ground field, generators adjoined as squares, the new polynomial in x (ascending)
    ("u0, u1", ["u0^2+u1^2"], ["-u0^2-u1^2", "0", "1"]),
    ("u0, u1", ["u0^2+u1^2"], ["-2*u0^2-2*u1^2", "0", "1"]),
    ("u0, u1", ["u0", "u1"], ["-u0*u1", "0", "1"]),
    ("u0, u1", ["u0", "u1"], ["u0^2+u1^2-2*u0*u1", "0", "-2*u0-2*u1", "0", "1"]),
    ("u0, u1", ["u0", "u1"], ["-u0*u1", "0", "0", "0", "1"]),
    ("u0, u1", ["u0", "u0+1"], ["-u0", "0", "0", "0", "1"]),
    ("u0", ["u0"], ["-u0", "0", "0", "0", "0", "0", "1"]),
    ("u0", ["u0^2-1"], ["1", "0", "-2*u0", "0", "1"]),
    ("u0", ["-3"], ["-u0^3", "0", "0", "1"]),
    ("u0", ["-3"], ["-u0", "0", "0", "1"]),
]


def _tower(squares: list[str]) -> Tower:
    t = Tower()
    for text in squares:
        q = t.element(_poly(text))
        assert roots.sqrt(q, t) is None
        t, _ = t.adjoin_sqrt(q, "either", "")
    return t


def _poly(text: str) -> Poly:
    """A polynomial in the parameters from its text."""
    names = {f"u{k}": ring.param(k) for k in range(2)}
    out: Poly = eval(text.replace("^", "**"), {}, names) * ring.ONE
    return out


@needs_singular
@pytest.mark.parametrize(("ground", "squares", "cs"), COMPONENTS)
def test_factors_are_the_components_of_the_ideal(ground: str, squares: list[str], cs: list[str]) -> None:
    """Over the tower of the given square roots: one irreducible factor, one component."""
    t = _tower(squares)
    found = roots.factor([t.element(_poly(c)) for c in cs], t)
    gens = [f"g{k}" for k in range(len(squares))]
    ideal = [f"{g}^2-({q})" for g, q in zip(gens, squares, strict=True)]
    ideal.append("+".join(f"({c})*x^{i}" for i, c in enumerate(cs)))
    out = singular(
        'LIB "primdec.lib";\n'
        f"ring r = (0,{ground}), (x,{','.join(gens)}), dp;\nideal i = {','.join(ideal)};\n"
        "list l = minAssGTZ(i); size(l); int k; for (k=1; k<=size(l); k++) { vdim(std(l[k])); }"
    )
    count, *dims = [int(n) for n in out.split()]
    assert len(found) == count
    assert sorted((len(h) - 1) * t.degree for h, _ in found) == sorted(dims)


def _choices(t: Tower, q: Element) -> list[Tower]:
    """The towers over which x^2 = q is solved: two copies of t where q is a square, else one
    longer tower."""
    r = roots.sqrt(q, t)
    return [t, t] if r is not None else [t.adjoin_sqrt(q, "either", "")[0]]


@needs_singular
def test_eight_components_of_three_collinear_points() -> None:
    """P = 0, Q = u, X = v on one line, three lengths: every square is a square in Q(u, v)."""
    u, v = Tower().param(0), Tower().param(1)
    ends = [Tower()]
    for q in (v * v, (u - v) * (u - v), u * u):
        ends = [longer for t in ends for longer in _choices(t, q)]
    out = singular(
        'LIB "primdec.lib";\nring r = 0, (a,b,c,u,v), dp;\n'
        "ideal i = a^2-v^2, b^2-(u-v)^2, c^2-u^2;\nsize(minAssGTZ(i));"
    )
    assert len(ends) == int(out) == 8


@needs_singular
def test_four_components_of_apexes_on_three_sides() -> None:
    """A = (0,0), B = (1,0), C = (u,v): the first apex adjoins sqrt(3), the other two split."""
    t = Tower()
    u, v = t.param(0), t.param(1)
    sides = [((t.constant(0), t.constant(0)), (t.constant(1), t.constant(0)))]
    sides += [((t.constant(1), t.constant(0)), (u, v)), ((u, v), (t.constant(0), t.constant(0)))]
    ends = [t]
    for (px, py), (qx, qy) in sides:
        # the apex has coordinates (p + q)/2 + h (p - q) turned by a right angle, h^2 = 3/4; its
        # first coordinate that is not settled yet solves a quadratic with this discriminant
        d = (qy - py) if not (qy - py).is_zero() else (qx - px)
        ends = [longer for s in ends for longer in _choices(s, d * d * 3 / 4)]
    ideal = []
    for k, ((px, py), (qx, qy)) in enumerate(sides):
        x, y = f"x{k}", f"y{k}"
        one = f"({x}-({px.num}))^2+({y}-({py.num}))^2"
        two = f"({x}-({qx.num}))^2+({y}-({qy.num}))^2"
        ideal += [f"{one}-({two})", f"{one}-(({px.num})-({qx.num}))^2-(({py.num})-({qy.num}))^2"]
    out = singular(
        'LIB "primdec.lib";\nring r = (0,u0,u1), (x0,y0,x1,y1,x2,y2), dp;\n'
        f"ideal i = {','.join(ideal)};\nlist l = minAssGTZ(i); size(l); vdim(std(l[1]));"
    )
    count, dimension = map(int, out.split())
    assert len(ends) == count == 4
    assert {s.degree for s in ends} == {dimension} == {2}


@needs_singular
@pytest.mark.parametrize("seed", range(6))
def test_irreducible_factors_are_singulars(seed: int) -> None:
    """The ring's factorisation over Q, as the rest relies on it."""
    u, v = ring.param(0), ring.param(1)
    pool = [u - v, u * u + v * v, u * u - 2 * v * v, u**3 - v, u * v - 1, u + 2]
    pairs = list(product(range(len(pool)), repeat=2))
    i, j = pairs[(seed * 7 + 1) % len(pairs)]
    p = pool[i] ** 2 * pool[j] * pool[(i + j) % len(pool)]
    out = singular(f"ring r = 0, (u0,u1), dp;\npoly p = {p};\nlist l = factorize(p, 1); l[1];")
    texts = [line.split("=", 1)[1] for line in out.splitlines() if "=" in line]
    theirs = set().union(*(factors(parsed(text)) for text in texts))
    mine = set().union(*(factors(expression(f)) for f, _ in ring.irreducible_factors(p)))
    assert mine == theirs and len(mine) == len(texts)
