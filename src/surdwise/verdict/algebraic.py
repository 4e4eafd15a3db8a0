"""The algebraic side of a decision: statuses of the five formulations and the components."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

from ..field.near import NearBranch
from ..field.real import Unsettled
from ..field.tower import Element
from ..figure.component import Component
from ..sheet.tree import Comparison, Relation
from ..thesis.parts import Form, Part, Status, parts, statuses
from .outcome import ComponentReport
from .survey import Place

LISTED = 64


@dataclass(frozen=True)
class AlgebraicSide:
    """Statuses by formulation, and the components with every length adjoined."""

    statuses: dict[str, str]
    components: tuple[ComponentReport, ...]
    total: int
    true: int
    minimal_on: frozenset[int]

    def admitting(self, comps: set[int]) -> tuple[str, ...]:
        """Formulations that vanish on all of the given components' figures (by identity)."""
        whole = [f.value for f in Form if f is not Form.MINIMAL]
        return tuple(whole + ([Form.MINIMAL.value] if comps & self.minimal_on else []))


def algebraic_side(
    comps: Sequence[Component],
    claim: Comparison | Relation,
    places: Sequence[Place],
    tick: Callable[[], None],
) -> AlgebraicSide:
    """Statuses over the components of full dimension; a component is called real when a real
    figure of the survey has its lengths signed as the component has them."""
    found: list[Part] = []
    whole: list[Part] = []
    minimal: list[Part] = []
    reports: list[ComponentReport] = []
    for c in comps:
        mine = parts(c, claim, tick, separate=False)
        whole += parts(c, claim, tick)
        here = sorted((p for p in places if p.comp is c), key=lambda p: not p.truths[0])
        real = [any(_literal(part, p) for p in here) for part in mine]
        found += mine
        if mine:
            signed = (part for p in here for part in mine if _literal(part, p))
            minimal.append(next(signed, mine[0]))
        for part, r in zip(mine, real, strict=True):
            status = Status.TRUE if part.true else Status.FALSE
            reports.append(ComponentReport(part.degree, status.value, part.signs, r))
    named = {k: v.value for k, v in statuses(whole, minimal).items()}
    on = frozenset(id(p.comp) for p in minimal if p.true)
    return AlgebraicSide(named, tuple(reports[:LISTED]), len(found), sum(p.true for p in found), on)


def _literal(part: Part, place: Place) -> bool:
    """Whether the part's signs make every length non-negative at the place."""
    try:
        return all(_sign(place, s) * sign >= 0 for s, sign in part.folds)
    except (Unsettled, ValueError):
        return False


def _sign(place: Place, e: Element) -> int:
    if isinstance(place.branch, NearBranch):
        raise ValueError("an enclosed point")
    if len(e.tower.gens) > len(place.comp.tower.gens):
        raise ValueError("a length beyond the place's tower")
    return place.branch.sign(Element(place.comp.tower, e.num, e.den))


def dominant(comps: Sequence[Component]) -> list[Component]:
    """The components with the most free parameters."""
    full = max((len(c.free) for c in comps), default=0)
    return [c for c in comps if len(c.free) == full]
