"""Squares, norms and factors over a tower.

Norms go down one step at a time, taking contents in Q[U] out as they appear; square roots by
the classical descent through quadratic steps; factorisation by norms, Trager, "Algebraic
factoring and rational function integration", 1976.  All exact; no Groebner basis anywhere.
"""

from __future__ import annotations

from . import ring
from .ring import ONE, Poly
from .tower import Element, ElementPoly, Tower, poly_divmod, poly_gcd, trim


def norm_step(p: Poly, tower: Tower, k: int) -> Poly:
    """Norm of a ring element over step k: a^2 - d b^2 for a square root, else a resultant."""
    g = tower.gens[k]
    if p.degrees()[g.slot] <= 0:
        return tower.reduce(p**g.degree)
    if g.radicand is not None:
        a, b = ring.linear_parts(p, g.slot)
        return tower.reduce(a * a - b * b * g.radicand)
    return tower.reduce(g.modulus.resultant(p, ring.GEN_NAMES[k]))


def norm(e: Element) -> tuple[Poly, Poly]:
    """The norm of e to Q(U) as numerator and denominator (not reduced)."""
    p = e.num
    t = e.tower
    for k in reversed(range(len(t.gens))):
        p = norm_step(p, t, k)
    return p, e.den**t.degree


def norm_factors(e: Element) -> dict[str, Poly]:
    """Irreducible factors in Q[U] of the norm of e's numerator, by key.

    Steps in which e does not involve the generator are skipped and contents are split off on
    the way, so the factors are found without writing the full norm down.
    """
    out: dict[str, Poly] = {}
    _collect(e.num, e.tower, out)
    return out


def _collect(p: Poly, t: Tower, out: dict[str, Poly]) -> None:
    while True:
        k = ring.top_gen(p)
        if k < 0:
            for f, _ in ring.irreducible_factors(p):
                out[ring.key(f)] = f
            return
        c = ring.content_over_gens(p)
        if not ring.is_constant(c):
            for f, _ in ring.irreducible_factors(c):
                out[ring.key(f)] = f
            p = p / c
        p = ring.primitive(norm_step(p, t, k))


def denominator_factors(e: Element) -> dict[str, Poly]:
    """Irreducible factors of the denominator, by key."""
    return {ring.key(f): f for f, _ in ring.irreducible_factors(e.den)}


# ------------------------------------------------------------------ square roots


def sqrt(e: Element, tower: Tower | None = None) -> Element | None:
    """A square root of e in the tower (e's own by default), or None if it is not a square
    there.  Exact.

    Non-squares are first sought by residues (each a proof); the descent decides the rest.
    """
    if e.is_zero():
        return e
    if tower is not None and tower is not e.tower:
        e = Element(tower, e.num, e.den)
    t = e.tower
    name = e.key()
    if name not in t._roots:
        t._roots[name] = None if t.surely_not_square(e) else _sqrt(e, len(t.gens))
    return t._roots[name]


def _sqrt(e: Element, k: int) -> Element | None:
    """Square root in the first k steps of e's tower."""
    t = e.tower
    if k == 0:
        root = ring.square_root(e.num * e.den)
        return None if root is None else t.element(root, e.den)
    g = t.gens[k - 1]
    if g.radicand is None:
        return _sqrt_by_factoring(e, k)
    cs = ring.coefficients(e.num, g.slot)
    x = t.element(ring.gen(g.index))
    q = t.element(g.radicand)
    if len(cs) == 1:
        r = _sqrt(e, k - 1)
        if r is not None:
            return r
        r = _sqrt(e * q, k - 1)
        return None if r is None else r / q * x
    a, b = t.element(cs[0], e.den), t.element(cs[1], e.den)
    n = _sqrt(a * a - b * b * q, k - 1)
    if n is None:
        return None
    for half in ((a + n) / 2, (a - n) / 2):
        c = _sqrt(half, k - 1) if not half.is_zero() else None
        if c is not None:
            return c + b / (c * 2) * x
    return None


def _sqrt_by_factoring(e: Element, k: int) -> Element | None:
    """Square root where the top step is not quadratic: factor x^2 - e over the tower.

    Lemma: an extension of odd degree makes no non-square of the field below a square, since
    x^2 - e stays irreducible where 2 does not divide the degree.
    """
    top = e.tower.gens[k - 1]
    if top.degree % 2 and e.num.degrees()[top.slot] <= 0:
        return _sqrt(e, k - 1)
    t = e.tower.lower(k)
    p, _ = norm(Element(t, e.num, e.den))
    q = ring.square_root(p * e.den**t.degree)
    if q is None and ring.square_root(-(p * e.den**t.degree)) is None:
        return None
    f = [-Element(t, e.num, e.den), t.constant(0), t.constant(1)]
    for h in _split_by_norm(f, t):
        if len(h) == 2:
            r = -h[0]
            return Element(e.tower, r.num, r.den)
    return None


# ------------------------------------------------------------------ factoring


def factor(f: ElementPoly, tower: Tower) -> list[tuple[ElementPoly, int]]:
    """Monic irreducible factors over the tower, with multiplicities, of a polynomial given by
    ascending coefficients (Trager's method)."""
    f = trim(f)
    out: list[tuple[ElementPoly, int]] = []
    for h, m in _squarefree(f):
        for part in _split(h, tower):
            out.append((part, m))
    return out


def _squarefree(f: ElementPoly) -> list[tuple[ElementPoly, int]]:
    """Squarefree decomposition (Yun) in characteristic zero."""
    inv = f[-1].inverse()
    f = [c * inv for c in f]
    if len(f) <= 2:
        return [(f, 1)] if len(f) == 2 else []
    d = trim([c * i for i, c in enumerate(f)][1:])
    g = poly_gcd(f, d)
    if len(g) == 1:
        return [(f, 1)]
    out: list[tuple[ElementPoly, int]] = []
    w = poly_divmod(f, g)[0]
    m = 1
    while len(w) > 1:
        y = poly_gcd(w, g)
        z = poly_divmod(w, y)[0]
        if len(z) > 1:
            out.append((z, m))
        w, g = y, poly_divmod(g, y)[0]
        m += 1
    return out


def _split(f: ElementPoly, tower: Tower) -> list[ElementPoly]:
    """Irreducible factors of a monic squarefree polynomial over the tower."""
    if len(f) <= 2:
        return [f]
    if len(f) == 3:
        half = f[1] / 2
        disc = half * half - f[0]
        r = sqrt(disc, tower)
        return [f] if r is None else [[half - r, f[2]], [half + r, f[2]]]
    return _split_by_norm(f, tower)


def _split_by_norm(f: ElementPoly, tower: Tower) -> list[ElementPoly]:
    """Trager's method proper: shift, norm to Q[U, x], factor, gcd back."""
    slot_index = len(tower.gens)
    x = ring.gen(slot_index)
    slot = ring.gen_slot(slot_index)
    den = ONE
    for c in f:
        den = den * (c.den / den.gcd(c.den))
    whole = ring.ZERO
    for i, c in enumerate(f):
        whole = whole + c.num * (den / c.den) * x**i
    if not tower.gens:
        return [_monic(h, slot, tower) for h, _ in ring.irreducible_factors(whole) if h.degrees()[slot] > 0]
    for trial in range(1, 40):
        shift = ring.ZERO
        for j, g in enumerate(tower.gens):
            shift = shift + ring.gen(g.index) * (trial if j == 0 else (trial + 2) ** j)
        moved = tower.reduce(_compose(whole, slot, x - shift))
        n = moved
        for k in reversed(range(len(tower.gens))):
            n = _norm_with(n, tower, k)
        facs = [(h, m) for h, m in ring.irreducible_factors(n) if h.degrees()[slot] > 0]
        if all(m == 1 for _, m in facs):
            if len(facs) == 1:
                return [f]
            out: list[ElementPoly] = []
            rest = f
            for h, _ in facs:
                back = tower.reduce(_compose(h, slot, x + shift))
                cs = [tower.element(c) for c in ring.coefficients(back, slot)]
                part = poly_gcd(rest, trim(cs))
                out.append(part)
                rest = poly_divmod(rest, part)[0]
            return out
    raise ring.TooLarge("no shift makes the norm squarefree")


def _monic(h: Poly, slot: int, tower: Tower) -> ElementPoly:
    cs = [tower.element(c) for c in ring.coefficients(h, slot)]
    inv = cs[-1].inverse()
    return [c * inv for c in cs]


def _compose(p: Poly, slot: int, value: Poly) -> Poly:
    """p with one variable replaced by a polynomial (Horner)."""
    out = ring.ZERO
    for c in reversed(ring.coefficients(p, slot)):
        out = out * value + c
    return out


def _norm_with(p: Poly, tower: Tower, k: int) -> Poly:
    """Norm over step k of a polynomial that also involves the free variable x."""
    g = tower.gens[k]
    low = tower.lower(k)
    if p.degrees()[g.slot] <= 0:
        return low.reduce(p**g.degree)
    if g.radicand is not None:
        a, b = ring.linear_parts(p, g.slot)
        return low.reduce(a * a - b * b * g.radicand)
    return low.reduce(g.modulus.resultant(p, ring.GEN_NAMES[k]))
