"""The engine of our own: a formulation's polynomials evaluated in the figure's field towers.

The lengths that a formulation keeps are adjoined one by one; where a square is a square in the
field already the two signs are two components.  A polynomial is plugged in without fractions and
reduced; no Groebner basis.  Exact.
"""

from __future__ import annotations

import time

from .. import __version__
from ..field import ring, roots
from ..field.ring import ONE, Poly
from ..field.tower import Element, Tower
from ..thesis.formulations import Formulation
from ..thesis.parts import Status
from .engine import Answer, Engine, together
from .problem import Figure, Problem

Images = dict[int, Element]


class TowerEngine(Engine):
    """Zero tests in towers."""

    name = "tower"
    eliminates = False

    def version(self) -> str | None:
        """The program's own version."""
        return __version__

    def decide(self, p: Problem, f: Formulation, mebibytes: int | None) -> Answer:
        """Evaluate on every component with the kept lengths adjoined."""
        start = time.perf_counter()
        status = together([_status(p, x, f) for x in p.figures])
        return Answer(status, time.perf_counter() - start)


def _status(p: Problem, figure: Figure, f: Formulation) -> Status:
    shift = {g.slot: ring.gen(_moved(g.index)) for g in p.thesis.tower.gens}
    thesis, *definitions = (ring.replaced(q, shift) for q in f.polynomials)
    kept = sorted({max(_thesis_gens(q, len(shift))) for q in definitions})
    start: Images = {ring.param_slot(k): e for k, e in figure.coordinates.items()}
    leaves: list[tuple[Tower, Images]] = [(figure.tower, start)]
    gens = {g.index: g for g in p.thesis.tower.gens}
    for i in kept:
        radicand = gens[i].radicand
        assert radicand is not None
        square = ring.replaced(radicand, shift)
        leaves = [x for t, images in leaves for x in _adjoined(square, i, t, images)]
    truths = {_numerator(thesis, images, t)[0].is_zero() for t, images in leaves}
    if len(truths) == 2:
        return Status.PARTS
    return Status.TRUE if truths == {True} else Status.FALSE


def _moved(index: int) -> int:
    """Generators of the thesis stand at the far end of the ring, away from the figure's."""
    return ring.MAX_GENS - 1 - index


def _thesis_gens(p: Poly, count: int) -> list[int]:
    degrees = p.degrees()
    return [i for i in range(count) if degrees[ring.gen_slot(_moved(i))] > 0]


def _adjoined(square: Poly, i: int, t: Tower, images: Images) -> list[tuple[Tower, Images]]:
    """The towers in which a length with the given square is known."""
    num, den = _numerator(square, images, t)
    q = t.element(num, den)
    slot = ring.gen_slot(_moved(i))
    if q.is_zero():
        return [(t, {**images, slot: q})]
    s = roots.sqrt(q, t)
    if s is not None:
        return [(t, {**images, slot: x}) for x in (s, -s)]
    if len(t.gens) >= ring.MAX_GENS - 1 - i:
        raise ring.TooLarge("more algebraic steps than the ring has room for")
    t, r = t.adjoin_sqrt(q, "either", "length")
    return [(t, {**images, slot: r})]


def _numerator(p: Poly, images: Images, t: Tower) -> tuple[Poly, Poly]:
    """Numerator and denominator of p at the images, one variable at a time: with x = a/b,
    b^n p = sum c_i a^i b^(n-i), reduced in the tower."""
    den = ONE
    # the thesis' own generators first: their images hold none of the coordinates
    for slot in sorted(images):
        n = p.degrees()[slot]
        if n <= 0:
            continue
        e = images[slot]
        out = ring.ZERO
        power = ONE
        for c in reversed(ring.coefficients(p, slot)):
            out = t.reduce(out * e.num + c * power)
            power = power * e.den
        p = out
        den = den * e.den**n
    return t.reduce(p), den
