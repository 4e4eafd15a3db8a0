"""Look for figures where a claim is true and where it is false before anything is proved.

Small rational parameters first, then descent from many starts (Nelder and Mead, "A simplex method
for function minimization", 1965).  Candidates are floats; what is handed back is an exact
rational sample at which every sign was proved.
"""

from __future__ import annotations

import math
import random
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field
from fractions import Fraction

from ..field import ring
from ..field.real import Unsettled, branches
from ..field.ring import Poly, Rational, rational
from ..field.sketch import Evaluator, Sketch, quotient
from ..figure.component import Component
from ..figure.conditions import truth
from ..figure.program import figure_borders
from ..figure.quantities import value
from ..sheet.tree import Comparison, Condition
from .samples import small_samples
from .spot import FloatHint, Lone, Undefined
from .survey import Place

STARTS = 12
STEPS = 60  # evaluations for each parameter and start
DENOMINATORS = (1, 2, 3, 4, 5, 6, 8, 10, 12, 16, 24, 32, 64, 128, 1024, 10**5)
SEED = 7


@dataclass
class Found:
    """Exact figures of full dimension: one where the claim is true, one where it is false."""

    true: Place | None = None
    false: Place | None = None

    def lacks(self, truth_value: bool) -> bool:
        """Whether no figure of this truth is known."""
        return (self.true if truth_value else self.false) is None


@dataclass
class Search:
    """A search over the components of full dimension of one figure."""

    components: Sequence[Component]
    conditions: Sequence[Condition]
    claim: Condition
    tick: Callable[[], None]
    found: Found = field(default_factory=Found)
    borders: dict[int, list[Poly]] = field(default_factory=dict)

    def run(self) -> Found:
        """Search small parameters, then by descent; stop once both truths are seen."""
        full = max((len(c.free) for c in self.components), default=0)
        for comp in self.components:
            if len(comp.free) == full:
                self._component(comp)
        return self.found

    def _component(self, comp: Component) -> None:
        sheet = _Sketched(comp, self.conditions, self.claim)
        best: list[tuple[float, tuple[float, ...]]] = []
        for sample in small_samples(comp):
            self.tick()
            values = {k: int(x.p) / int(x.q) for k, x in sample.items()}
            seen = sheet.margins(values)
            for t, m in seen:
                best.append((m, tuple(values[k] for k in comp.free)))
                if self.found.lacks(t):
                    self._confirm(comp, sample)
            if not self.found.lacks(True) and not self.found.lacks(False):
                return
        if not isinstance(self.claim, Comparison) or len(self.claim.ops) != 1 or not comp.free:
            return
        for wanted in (True, False):
            if self.found.lacks(wanted):
                self._descend(comp, sheet, best, wanted)

    def _descend(
        self, comp: Component, sheet: _Sketched, seen: list[tuple[float, tuple[float, ...]]], wanted: bool
    ) -> None:
        """Push the margin of the claim up (to make it true) or down."""
        from scipy.optimize import minimize

        assert isinstance(self.claim, Comparison)
        way = -1.0 if (self.claim.ops[0] in (">", ">=")) == wanted else 1.0
        chance = random.Random(SEED)
        starts = [u for _, u in sorted(seen, key=lambda s: way * s[0])[: STARTS // 2]]
        while len(starts) < STARTS:
            starts.append(tuple(_anything(chance, k in comp.positive) for k in comp.free))

        def height(u: Sequence[float]) -> float:
            margins = sheet.margins(dict(zip(comp.free, u, strict=True)))
            return min((way * m for _, m in margins), default=10.0)

        for start in starts:
            self.tick()
            end = minimize(height, start, method="Nelder-Mead", options={"maxfev": STEPS * len(comp.free)})
            if end.fun < -1e-7:
                for d in DENOMINATORS:
                    sample = {k: Fraction(round(x * d), d) for k, x in zip(comp.free, end.x, strict=True)}
                    if any(x <= 0 for k, x in sample.items() if k in comp.positive):
                        continue
                    if any(t == wanted for t, _ in sheet.margins({k: float(x) for k, x in sample.items()})):
                        self._confirm(comp, {k: rational(x) for k, x in sample.items()})
                        if not self.found.lacks(wanted):
                            return

    def _confirm(self, comp: Component, sample: dict[int, Rational]) -> None:
        """Judge a sample exactly, on every real branch; places where the figure's own algebra changes
        are left out."""
        if id(comp) not in self.borders:
            self.borders[id(comp)] = list(figure_borders(comp).values())
        if any(ring.substitute(p, sample).is_zero() for p in self.borders[id(comp)]):
            return
        try:
            for branch in branches(comp.ground(), sample):
                spot = Lone(comp, branch)
                if not spot.admitted([lambda j, c=c: truth(c, j) for c in self.conditions]):  # type: ignore[misc]
                    continue
                t = truth(self.claim, spot)
                place = Place(len(comp.free), comp, branch, (t,), 0)
                if t and self.found.true is None:
                    self.found.true = place
                if not t and self.found.false is None:
                    self.found.false = place
        except (Unsettled, Undefined):
            return


class _Sketched:
    """A component's figure in floats, and what a claim says there."""

    def __init__(self, comp: Component, conditions: Sequence[Condition], claim: Condition) -> None:
        self.comp = comp
        self.conditions = conditions
        self.claim = claim
        self.sketch = Sketch(comp.ground())
        self.known: dict[int, Evaluator] = {}
        self.requires = [(quotient(r.element), r.op) for r in comp.requires]

    def margins(self, values: dict[int, float]) -> list[tuple[bool, float]]:
        """Truth of the claim and relative size of left minus right on every admitted branch."""
        if any(values[k] <= 0 for k in self.comp.positive if k in values):
            return []
        out = []
        try:
            for v in self.sketch.points(values):
                seen = self._margin(v)
                if seen is not None:
                    out.append(seen)
        except (OverflowError, ZeroDivisionError, ValueError):
            pass
        return out

    def _margin(self, v: list[float]) -> tuple[bool, float] | None:
        for f, op in self.requires:
            x = f(v)
            ok = abs(x) > 1e-9 if op == "!=" else x > 1e-9 if op == ">" else x > -1e-9
            if not ok:
                return None

        def number(e: object) -> float:
            if id(e) not in self.known:
                self.known[id(e)] = quotient(e)  # type: ignore[arg-type]
            return self.known[id(e)](v)

        hint = FloatHint(self.comp, number, {})
        try:
            if not all(truth(c, hint) for c in self.conditions):
                return None
            t = truth(self.claim, hint)
            if not isinstance(self.claim, Comparison) or len(self.claim.ops) != 1:
                return t, 0.0
            a, b = (float(value(q, hint)) for q in self.claim.items)  # type: ignore[arg-type]
        except (Undefined, KeyError):
            return None
        size = abs(a) + abs(b)
        margin = (a - b) / size if size else 0.0
        return None if math.isnan(margin) else (t, margin)


def _anything(chance: random.Random, positive: bool) -> float:
    """A number of any size."""
    x = math.exp(chance.gauss(0, 1.2))
    return x if positive or chance.random() < 0.5 else -x
