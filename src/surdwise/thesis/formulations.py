"""The five formulations of an equality between lengths, as polynomials, with their cost.

auxiliary: every length an unknown, its square a hypothesis; squared: both sides squared once;
sign product: the product over all sign choices, one radical at a time, E = X + Y r giving
X^2 - q Y^2; eliminant: the same by resultants; minimal: the product over the distinct
conjugates only.  Exact; no Groebner basis.
"""

from __future__ import annotations

import time
from collections.abc import Callable
from dataclasses import dataclass

from ..field import ring, roots
from ..field.ring import Poly
from ..field.tower import Element, Gen, Tower
from .formal import Thesis
from .parts import Form


@dataclass(frozen=True)
class Formulation:
    """One formulation: its polynomials (the first is the thesis, the others define lengths),
    and what they cost; without polynomials `why_not` says what was too large."""

    form: Form
    polynomials: tuple[Poly, ...]
    unknowns: int
    degree: int
    terms: int
    largest: int
    seconds: float
    why_not: str = ""


def formulate(t: Thesis, form: Form, tick: Callable[[], None] = lambda: None) -> Formulation:
    """One formulation of a thesis, with the seconds it took."""
    start = time.perf_counter()
    try:
        polys = MAKERS[form](t, tick)
    except ring.TooLarge as e:
        return Formulation(form, (), 0, 0, 0, 0, time.perf_counter() - start, str(e))
    seconds = time.perf_counter() - start
    used = {k for p in polys for k, d in enumerate(p.degrees()) if d > 0}
    largest = max((abs(int(c.p)) for p in polys for c in p.coeffs()), default=0)
    return Formulation(
        form,
        polys,
        len(used),
        max((p.total_degree() for p in polys), default=0),
        sum(len(p) for p in polys),
        largest,
        seconds,
    )


def _definitions(t: Thesis) -> tuple[Poly, ...]:
    return tuple(ring.primitive(x.gen.modulus) for x in t.lengths)


def auxiliary(t: Thesis, tick: Callable[[], None]) -> tuple[Poly, ...]:
    """E with each length an unknown, and the equations that give the lengths' squares."""
    return (ring.primitive(t.equation), *_definitions(t), *_numbers(t))


def squared(t: Thesis, tick: Callable[[], None]) -> tuple[Poly, ...]:
    """left^2 - right^2 with squares of lengths replaced; lengths that remain are unknowns."""
    p = ring.primitive(t.tower.reduce(t.left * t.left - t.right * t.right))
    needed: list[Poly] = []
    used = p
    for x, d in reversed(list(zip(t.lengths, _definitions(t), strict=True))):
        # a nested length is defined by others, which are needed then
        if any(q.degrees()[x.gen.slot] > 0 for q in (used, *needed)):
            needed.insert(0, d)
    return (p, *needed, *_numbers(t))


def _numbers(t: Thesis) -> tuple[Poly, ...]:
    """Equations of numeric roots such as sqrt(3)."""
    return tuple(g.modulus for g in t.tower.gens if g.label == "number")


def sign_product(t: Thesis, tick: Callable[[], None] = lambda: None) -> tuple[Poly, ...]:
    """Product of E over all signs of the lengths, up to a common sign.

    Lemma: if E(-l) = +-E(l), the product over all but one length's sign is, as a polynomial in
    that length r, even or odd: X or Y r.  Then X, or q Y (to keep the zeros of r), vanishes just
    where the product over the patterns up to a common sign does, for X^2 - q Y^2 counts every
    pattern twice.
    """
    gens = [x.gen for x in t.lengths]
    p = t.equation
    for i, g in enumerate(reversed(gens)):
        tick()
        if p.degrees()[g.slot] <= 0:
            continue
        a, b = ring.linear_parts(p, g.slot)
        last = i == len(gens) - 1
        if last and a.is_zero():
            p = b * square_of(g)
        elif not (last and b.is_zero()):
            p = t.tower.reduce(a * a - b * b * square_of(g))
        p = ring.primitive(p)
    return (p, *_numbers(t))


def square_of(g: Gen) -> Poly:
    """The square of a length symbol."""
    assert g.radicand is not None
    return g.radicand


def eliminant(t: Thesis, tick: Callable[[], None]) -> tuple[Poly, ...]:
    """The same polynomial by resultants with r^2 - q, lengths as plain variables throughout."""
    p = t.left - t.right
    for x in reversed(t.lengths):
        tick()
        p = ring.primitive(x.gen.modulus.resultant(p, ring.GEN_NAMES[x.gen.index]))
    numbers = Tower(tuple(g for g in t.tower.gens if g.label == "number"), ())
    return (ring.primitive(numbers.reduce(p)), *_numbers(t))


def minimal(t: Thesis, tick: Callable[[], None]) -> tuple[Poly, ...]:
    """Product over the distinct conjugates of E: lengths are adjoined as a field, so that a
    product of earlier roots is recognised and its sign follows theirs."""
    field = Tower(())
    images: dict[int, Element] = {}
    names: dict[int, Gen] = {}
    for g in t.tower.gens:
        tick()
        assert g.radicand is not None
        q = _at(g.radicand, t, images, field)
        s = roots.sqrt(q, field)
        if s is None:
            numeric = g.label == "number"
            field, s = field.adjoin_sqrt(q, "positive" if numeric else "either", g.label)
            if numeric:
                names[field.gens[-1].slot] = g
        images[g.slot] = s
    p = _at(t.equation, t, images, field).num
    for g in reversed([g for g in field.gens if g.label != "number"]):
        tick()
        if p.degrees()[g.slot] <= 0:
            continue
        a, b = ring.linear_parts(p, g.slot)
        p = ring.primitive(field.reduce(a * a - b * b * square_of(g)))
    back = {slot: ring.gen(g.index) for slot, g in names.items()}
    return (ring.replaced(_without_powers(p, field), back), *_numbers(t))


def _at(p: Poly, t: Thesis, images: dict[int, Element], field: Tower) -> Element:
    """A polynomial in coordinates and symbols at the symbols' images (Horner)."""
    k = ring.top_gen(p)
    if k < 0:
        return field.element(p)
    slot = ring.gen_slot(k)
    out = field.constant(0)
    for c in reversed(ring.coefficients(p, slot)):
        out = out * images[slot] + _at(c, t, images, field)
    return out


def _without_powers(p: Poly, field: Tower) -> Poly:
    """p as the product of its distinct conjugate factors (the root of a perfect power)."""
    if p.is_zero() or ring.has_gens(p):
        return p
    out = ring.ONE
    for f, _ in ring.irreducible_factors(p):
        out = out * f
    return ring.primitive(out)


MAKERS: dict[Form, Callable[[Thesis, Callable[[], None]], tuple[Poly, ...]]] = {
    Form.AUXILIARY: auxiliary,
    Form.SQUARED: squared,
    Form.SIGN_PRODUCT: sign_product,
    Form.ELIMINANT: eliminant,
    Form.MINIMAL: minimal,
}


def equal_up_to_powers(p: Poly, q: Poly) -> bool:
    """Whether two polynomials have the same irreducible factors."""
    if p.is_zero() or q.is_zero():
        return bool(p.is_zero() and q.is_zero())
    one = {ring.key(f) for f, _ in ring.irreducible_factors(p)}
    two = {ring.key(f) for f, _ in ring.irreducible_factors(q)}
    return one == two
