"""Floating-point values of tower elements at many sample points: a hint, never a proof.

Every polynomial is turned into one Python expression in the parameters and generators, so that
a search over thousands of figures costs microseconds a figure.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence

from . import ring
from .ring import Poly
from .tower import Element, Gen, Tower

Point = list[float]  # values of all variables of the ring, by slot
Evaluator = Callable[[Sequence[float]], float]


def evaluator(p: Poly) -> Evaluator:
    """p as a function of the variables' values."""
    terms = []
    for mono, c in p.terms():
        factors = [repr(float(int(c.p)) / float(int(c.q)))]
        factors += [f"v[{k}]" + (f"**{e}" if e > 1 else "") for k, e in enumerate(mono) if e]
        terms.append("*".join(factors))
    # the text is made of numbers and v[...] alone
    return eval("lambda v: " + ("+".join(terms) or "0.0"))  # type: ignore[no-any-return]


def quotient(e: Element) -> Evaluator:
    """An element as a function of the variables' values; nan where its denominator vanishes."""
    num, den = evaluator(e.num), evaluator(e.den)

    def value(v: Sequence[float]) -> float:
        d = den(v)
        return num(v) / d if d else math.nan

    return value


class Sketch:
    """All real figures of a tower over float parameters."""

    def __init__(self, tower: Tower) -> None:
        self.gens = tower.gens
        self.steps = [_step(g) for g in tower.gens]

    def points(self, values: dict[int, float]) -> list[Point]:
        """Variables' values of every real branch over the given parameters."""
        first = [0.0] * (ring.MAX_GENS + ring.MAX_PARAMS)
        for k, x in values.items():
            first[ring.param_slot(k)] = x
        out = [first]
        for g, step in zip(self.gens, self.steps, strict=True):
            nxt = []
            for v in out:
                for x in step(v):
                    w = list(v)
                    w[g.slot] = x
                    nxt.append(w)
            out = nxt
        return out


def _step(g: Gen) -> Callable[[Point], list[float]]:
    if g.radicand is None:
        cs = [evaluator(c) for c in ring.coefficients(g.modulus, g.slot)]
        return lambda v: _real_roots([c(v) for c in cs])
    radicand, orient = evaluator(g.radicand), evaluator(g.orient)

    def roots(v: Point) -> list[float]:
        d = radicand(v)
        if not d > 0:
            return []
        r = math.sqrt(d)
        if g.choice == "positive":
            return [math.copysign(r, orient(v))]
        return [r, -r]

    return roots


def _real_roots(cs: list[float]) -> list[float]:
    import numpy as np

    found = np.roots(cs[::-1])
    return sorted(float(r.real) for r in found if abs(r.imag) < 1e-9 * (1 + abs(r)))
