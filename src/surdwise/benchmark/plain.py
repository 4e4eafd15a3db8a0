"""Polynomials as plain data with names, for engines that know nothing of our rings.

Names: u0, u1, ... free parameters; c... unknown coordinates; f0, f1, ... the algebraic steps of the
figure; d0, d1, ... lengths of the thesis and its numeric roots.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from ..field import ring
from ..field.ring import Poly
from .problem import Figure, Problem

Term = tuple[int, tuple[tuple[str, int], ...]]
Terms = tuple[Term, ...]


@dataclass(frozen=True)
class System:
    """One component: free parameters, unknowns (the later built, the earlier named) and the
    hypotheses, triangular in that order of the unknowns."""

    parameters: tuple[str, ...]
    unknowns: tuple[str, ...]
    hypotheses: tuple[Terms, ...]


def thesis_names(p: Problem) -> dict[int, str]:
    """Names of the thesis' variables, by position in the ring."""
    unknown = {k for f in p.figures for k in f.coordinates}
    out = {
        ring.param_slot(k): f"c{k}" if k in unknown else f"u{k}"
        for k in {*unknown, *(k for f in p.figures for k in f.free)}
    }
    return {**out, **{g.slot: f"d{g.index}" for g in p.thesis.tower.gens}}


def terms(p: Poly, names: dict[int, str]) -> Terms:
    """A polynomial over the integers, up to a constant factor."""
    return tuple(
        (int(c.p), tuple((names[k], int(e)) for k, e in enumerate(mono) if e))
        for mono, c in ring.primitive(p).terms()
    )


def text(p: Terms, power: str = "^") -> str:
    """A polynomial on one line."""
    parts = [
        "*".join([f"({c})" if c < 0 else str(c), *(v if e == 1 else f"{v}{power}{e}" for v, e in powers)])
        for c, powers in p
    ]
    return "+".join(parts) or "0"


def variables(polys: Sequence[Terms]) -> set[str]:
    """Names that occur."""
    return {v for p in polys for _, powers in p for v, _ in powers}


def system(p: Problem, figure: Figure, thesis: Sequence[Terms], definitions: Sequence[Terms]) -> System:
    """The hypotheses of one component that the given polynomials need."""
    steps = {g.slot: f"f{g.index}" for g in figure.tower.gens}
    names = {**steps, **{ring.param_slot(k): f"u{k}" for k in figure.free}}
    used = variables([*thesis, *definitions])
    lengths = [f"d{g.index}" for g in reversed(p.thesis.tower.gens) if f"d{g.index}" in used]
    hypotheses = []
    coordinates = []
    for k in sorted(figure.coordinates, reverse=True):
        if f"c{k}" in used:
            e = figure.coordinates[k]
            x = ring.param(k)
            hypotheses.append(terms(e.den * x - e.num, {**names, ring.param_slot(k): f"c{k}"}))
            coordinates.append(f"c{k}")
    needed = variables(hypotheses)
    gens = []
    for g in reversed(figure.tower.gens):
        if f"f{g.index}" in needed:
            m = terms(g.modulus, names)
            needed |= variables([m])
            hypotheses.append(m)
            gens.append(f"f{g.index}")
    free = sorted((x for x in used | needed if x[0] == "u"), key=lambda x: int(x[1:]))
    return System(tuple(free), (*lengths, *coordinates, *gens), (*definitions, *hypotheses))
