"""Choose the frame in which a claim costs least: fewest roots left, then lowest degrees."""

from __future__ import annotations

from ..field import cells, ring
from ..field.real import Unsettled, branches
from ..figure.conditions import truth
from ..figure.program import frames_for, program
from ..sheet.tree import Condition, Sheet
from .spot import Register, Spot, Undefined


def cheapest_frame(sheet: Sheet, claim: Condition) -> str:
    """The frame of least predicted cost; Cartesian where nothing is gained."""
    kinds = frames_for(sheet)
    if len(kinds) == 1:
        return kinds[0]
    return min(kinds, key=lambda k: (_cost(sheet, claim, k), kinds.index(k)))


def _cost(sheet: Sheet, claim: Condition, kind: str) -> tuple[int, int]:
    """Degree of the tower that reading the claim at one figure needs, and the total degree of
    the radicands; a trial, not a bound."""
    run = program(sheet, kind).run()
    worst = (0, 0)
    for comp in run.components[:2]:
        sample = next(iter(cells.open_cells([], list(comp.free), comp.positive, _spoilers(comp))), {})
        try:
            for branch in branches(comp.ground(), sample)[:1]:
                truth(claim, Spot(comp, branch, Register()))
        except (Unsettled, Undefined):
            pass
        size = sum(g.radicand.total_degree() for g in comp.tower.gens if g.radicand is not None)
        worst = max(worst, (comp.tower.degree, size))
    return worst


def _spoilers(comp: object) -> list[ring.Poly]:
    """Differences of parameters: a sample that avoids them has no accidental symmetry."""
    from ..figure.component import Component

    assert isinstance(comp, Component)
    free = list(comp.free)
    return [ring.param(a) - ring.param(b) for a in free for b in free if a < b] + [
        ring.param(a) for a in free
    ]
