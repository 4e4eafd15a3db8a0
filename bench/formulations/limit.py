"""How close the sign product is to the limit of writing its result down.

Its last step is (X + Y r)(X - Y r) with r^2 replaced by the known square q.  That product, r kept as a
variable, is one multiplication in FLINT whose result is the same polynomial before the replacement; it is
timed beside the whole sign product, and both per term of what they write.
"""

from __future__ import annotations

import time
from collections.abc import Callable
from dataclasses import dataclass
from statistics import median

import surdwise
from surdwise.benchmark.families import families
from surdwise.benchmark.problem import problem
from surdwise.field import ring
from surdwise.field.ring import Poly
from surdwise.thesis.formal import Thesis
from surdwise.thesis.formulations import sign_product, square_of

CASES: dict[str, str | tuple[str, int, int]] = {
    "3 roots, 2 parameters": ("roots", 3, 2),
    "4 roots, 2 parameters": ("roots", 4, 2),
    "5 roots, 2 parameters": ("roots", 5, 2),
    "3 roots, 3 parameters": ("roots", 3, 3),
    "3 roots, 4 parameters": ("roots", 3, 4),
    "medians and sides": (
        "given triangle ABC\nclaim 4*(median(ABC, A) + median(ABC, B) + median(ABC, C)) = 3*perimeter(ABC)\n"
    ),
    "radii and distances from the sides": (
        "given triangle ABC\ngiven O = circumcentre of ABC\n"
        "claim dist(O, AB) + dist(O, BC) + dist(O, CA) = circumradius(ABC) + inradius(ABC)\n"
    ),
    "two bisectors": "given triangle ABC\nclaim bisector(ABC, A) + bisector(ABC, B) = |AB|\n",
}


@dataclass(frozen=True)
class Limit:
    """Seconds and terms of the whole sign product and of one multiplication."""

    seconds: float
    terms: int
    one: float
    one_terms: int

    @property
    def per_term(self) -> float:
        """Time per written term of the sign product over that of the multiplication."""
        return (self.seconds / self.terms) / (self.one / self.one_terms)


def limit(name: str, runs: int = 5) -> Limit:
    """One case; medians."""
    what = CASES[name]
    text = what if isinstance(what, str) else families(*what).text
    (sheet,) = surdwise.read(text)
    t = problem(sheet, sheet.claims[0].body).thesis
    f, g, r = last_factors(t)
    (p, *_) = sign_product(t)
    product = f * g
    # what is timed is what it says: with r^2 replaced the product is the sign product
    replaced = t.tower.reduce(product)
    assert ring.primitive(replaced) == p, name
    del r
    return Limit(_median(lambda: sign_product(t), runs), len(p), _median(lambda: f * g, runs), len(product))


def _median(work: Callable[[], object], runs: int) -> float:
    work()
    taken = []
    for _ in range(runs):
        start = time.perf_counter()
        work()
        taken.append(time.perf_counter() - start)
    return median(taken)


def last_factors(t: Thesis) -> tuple[Poly, Poly, Poly]:
    """The factors of the sign product's last multiplication, and its length."""
    p = t.equation
    out = None
    gens = [x.gen for x in t.lengths]
    for i, g in enumerate(reversed(gens)):
        if p.degrees()[g.slot] <= 0:
            continue
        a, b = ring.linear_parts(p, g.slot)
        r = ring.gen(g.index)
        last = i == len(gens) - 1
        if last and a.is_zero():
            p = b * square_of(g)
        elif not (last and b.is_zero()):
            out = a + b * r, a - b * r, r
            p = t.tower.reduce(a * a - b * b * square_of(g))
        p = ring.primitive(p)
    assert out is not None
    return out
