"""Choose the frame in which a claim costs least, by a trial at one figure."""

from __future__ import annotations

from contextlib import suppress
from itertools import islice

from ..field.real import Unsettled, branches
from ..field.tower import Element
from ..figure.component import Component
from ..figure.conditions import truth
from ..figure.program import frames_for, program
from ..figure.vocabulary.placements import CARTESIAN, HALF_ANGLES, INCIRCLE
from ..sheet.tree import Condition, Sheet
from .samples import likely_samples
from .spot import Register, Spot, Undefined

SAMPLES = 200
NO_FIGURE = (1e30, 0)
# parameters that are tangents cost in the projection what they save in roots: their degrees count
# this much more (least total time over the triangle inequalities of the tests and bench/)
WEIGHT = {HALF_ANGLES: 24.0, INCIRCLE: 1.9}


class Trial(Spot):
    """Reads a statement at one figure and notes how large the borders would be: the degree in
    the parameters of the norm of each element read, without computing it."""

    def __init__(self, comp: Component, branch: object) -> None:
        super().__init__(comp, branch, Register())  # type: ignore[arg-type]
        self.worst = 0

    def _enter(self, kind: str, e: Element) -> None:
        size = self.comp.tower.degree * max(e.num.total_degree(), 1)
        self.worst = max(self.worst, size)


def frames_by_cost(sheet: Sheet, claim: Condition) -> list[str]:
    """The frames that can hold the sheet, that of least predicted cost first; Cartesian where
    nothing is gained."""
    kinds = frames_for(sheet)
    if len(kinds) == 1 or kinds[0] != CARTESIAN:
        # where the Cartesian frame is not the first it is dear: only on request
        return kinds[:1]
    return sorted(kinds, key=lambda k: (_cost(sheet, claim, k), kinds.index(k)))


def _cost(sheet: Sheet, claim: Condition, kind: str) -> tuple[float, int]:
    """Predicted degree of the largest border of the claim, weighted, and the degree of the tower that
    reading it needs; a trial, not a bound.  With more than two parameters roots count once more for
    each."""
    run = program(sheet, kind).run()
    if not run.components:
        return NO_FIGURE
    worst = (0, 0)
    for comp in run.components[:2]:
        trial = _trial(comp)
        if trial is None:
            return NO_FIGURE
        with suppress(Unsettled, Undefined):
            truth(claim, trial)
        worst = max(worst, (trial.worst, comp.tower.degree))
    more = max(max(len(c.free) for c in run.components) - 2, 0)
    return int(worst[0]) * WEIGHT.get(kind, 1.0) * int(worst[1]) ** more, int(worst[1])


def _trial(comp: Component) -> Trial | None:
    """A reader at some admitted figure without accidental symmetry: parameters all different."""
    plain = (s for s in likely_samples(comp) if len(set(s.values())) == len(s) and 0 not in s.values())
    for sample in islice(plain, SAMPLES):
        with suppress(Unsettled):
            for branch in branches(comp.ground(), sample)[:1]:
                trial = Trial(comp, branch)
                if trial.admitted([]):
                    trial.worst = 0
                    return trial
    return None
