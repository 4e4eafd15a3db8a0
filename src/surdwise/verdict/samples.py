"""Small rational parameters, for figures that are found before anything is cut into cells."""

from __future__ import annotations

import itertools
import random
from collections.abc import Iterator
from fractions import Fraction

from ..field.ring import Rational, rational
from ..field.sketch import Sketch, quotient
from ..figure.component import Component

SMALL = [Fraction(s) for s in ("1", "2", "1/2", "3", "3/2", "1/3", "2/3", "4", "5/2", "1/4", "3/4", "5")]
GRID = 1500
SEED = 7
TINY = 1e-9


def small_samples(comp: Component) -> Iterator[dict[int, Rational]]:
    """Samples of small parameters, the smallest first; all different, to keep off symmetric
    figures as long as possible."""
    free = list(comp.free)
    signed = [x for s in SMALL for x in (s, -s)]
    choices = [SMALL if k in comp.positive else [Fraction(0), *signed] for k in free]
    n = len(free)
    if n == 0:
        yield {}
        return
    reach = 1
    while reach**n < GRID and reach < 12:
        reach += 1
    lists = [c[:reach] for c in choices]
    ranked = sorted(itertools.product(*(range(len(c)) for c in lists)), key=lambda t: (sum(t), max(t)))
    for t in ranked[:GRID]:
        yield {k: rational(c[i]) for k, c, i in zip(free, lists, t, strict=True)}
    chance = random.Random(SEED)
    for _ in range(GRID - len(ranked)):
        yield {k: rational(chance.choice(c)) for k, c in zip(free, choices, strict=True)}


def likely_samples(comp: Component) -> Iterator[dict[int, Rational]]:
    """The small samples at which, in floats, some figure meets the component's requirements."""
    requires = [(quotient(r.element), r.op) for r in comp.requires]
    sketch = Sketch(comp.ground())
    for sample in small_samples(comp):
        values = {k: int(x.p) / int(x.q) for k, x in sample.items()}
        for v in sketch.points(values):
            seen = [(f(v), op) for f, op in requires]
            if all(abs(x) > TINY if op == "!=" else x > (TINY if op == ">" else -TINY) for x, op in seen):
                yield sample
                break
