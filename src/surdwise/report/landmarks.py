"""What the maps of one and of two parameters share: words, and where the printed figures stand."""

from __future__ import annotations

import itertools
import math
from collections.abc import Sequence
from dataclasses import dataclass

from ..verdict.outcome import Decision, Figure
from .picture import XY, Picture
from .truth import Sampler, Truth

WIDTH = 380.0
NAMES = {
    Truth.TRUE: "true",
    Truth.FALSE: "false",
    Truth.MIXED: "true of some figures",
    Truth.NONE: "no admitted figure",
}
WITNESSES = (("true", "the figure where it holds"), ("false", "the figure where it fails"))


@dataclass(frozen=True)
class TruthMap:
    """A map with its caption."""

    picture: Picture
    caption: str


def extent(spots: Sequence[XY]) -> float:
    return max(math.dist(a, b) for a, b in itertools.product(spots, spots)) or 1.0


def middle(spots: Sequence[XY]) -> XY:
    return sum(p[0] for p in spots) / len(spots), sum(p[1] for p in spots) / len(spots)


def witnesses(s: Sampler, decision: Decision) -> list[tuple[XY, str]]:
    """The moving point of each printed figure, once its fixed points lie where the map has them."""
    out = []
    for kind, figure in (("true", decision.holds_at), ("false", decision.fails_at)):
        at = None if figure is None else _moved(s, figure)
        if at is not None:
            out.append((at, kind))
    return out


def _moved(s: Sampler, figure: Figure) -> XY | None:
    names = [n for n in s.fixed if n in figure]
    if len(names) < 2 or s.mover not in figure:
        return None
    spots = {n: complex(*figure[n].float) for n in (*names, s.mover)}
    a, b = (spots[n] for n in names[:2])
    p, q = (complex(*s.fixed[n]) for n in names[:2])
    if a == b:
        return None
    for mirror in (False, True):
        # a similarity, then one that reflects
        z = {n: v.conjugate() if mirror else v for n, v in spots.items()}
        k = (q - p) / (z[names[1]] - z[names[0]])
        image = {n: p + k * (v - z[names[0]]) for n, v in z.items()}
        fits = all(abs(image[n] - complex(*s.fixed[n])) < 1e-7 for n in names)
        found = image[s.mover]
        if fits and not (len(s.free) == 2 and s.positive(s.free[1]) and found.imag <= 0):
            return found.real, found.imag
    return None


def listed(names: list[str]) -> str:
    return names[0] if len(names) == 1 else ", ".join(names[:-1]) + " and " + names[-1]
