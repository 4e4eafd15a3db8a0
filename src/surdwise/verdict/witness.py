"""Witness figures: exact coordinates of a place at which a statement is true or false."""

from __future__ import annotations

from collections.abc import Sequence

from ..field import exact, ring
from ..field.near import NearBranch
from ..field.real import Branch, branches
from ..figure.component import Component
from ..figure.program import Program
from .outcome import Figure, PlacedPoint
from .survey import Place


def figure(prog: Program, p: Place) -> Figure | None:
    """The witness figure of a place; None if its exact coordinates are out of reach."""
    comp, branch = p.comp, p.branch
    if isinstance(branch, NearBranch):
        same = exactly_there(prog, comp, branch)
        if same is None:
            return None
        comp, branch = same
    return {
        n: PlacedPoint(
            (exact.text(v.x, branch), exact.text(v.y, branch)), (branch.approx(v.x), branch.approx(v.y))
        )
        for n, v in comp.points.items()
    }


WITNESS_DEGREE = 24


def exactly_there(prog: Program, comp: Component, near: NearBranch) -> tuple[Component, Branch] | None:
    """The figure of an enclosed point over the number field of its coordinates: the equations
    of the point are solved exactly and the one figure within the enclosure is taken."""
    if max(p.total_degree() for p in near.system) > WITNESS_DEGREE:
        return None
    wanted = {n: (near.ball(v.x, 128), near.ball(v.y, 128)) for n, v in comp.points.items()}
    fit = []
    equations = [ring.primitive(p) for p in near.system]
    for c in prog.run(equations).components:
        if c.free:
            continue
        for b in branches(c.ground(), {}):
            here = {n: (b.ball(v.x, 128), b.ball(v.y, 128)) for n, v in c.points.items()}
            if all(here[n][i].overlaps(wanted[n][i]) for n in wanted for i in (0, 1)):
                fit.append((c, b))
    return fit[0] if len(fit) == 1 else None


def witness(prog: Program, places: Sequence[Place], i: int, value: bool) -> Figure | None:
    """A figure with the given truth: of full dimension if possible, then the plainest."""
    fit = [p for p in places if p.truths[i] == value]
    if not fit:
        return None
    top = max(p.dimension for p in fit)
    best = sorted((p for p in fit if p.dimension == top), key=lambda p: _plainness(p.branch))[:6]
    if isinstance(best[0].branch, NearBranch):
        best = best[:1]
    figures = [f for f in (figure(prog, p) for p in best) if f is not None]
    if not figures:
        return None
    return min(figures, key=lambda f: sum(len(q.exact[0]) + len(q.exact[1]) for q in f.values()))


def _plainness(b: Branch | NearBranch) -> int:
    if isinstance(b, NearBranch):
        return 1000 + sum(p.total_degree() for p in b.system)
    return 40 * len(b.path) + sum(len(str(v)) for v in b.values.values())
