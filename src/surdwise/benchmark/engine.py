"""What an engine is: a class that answers one question about one formulation.

The question.  Let K = Q(U) be the field of the free parameters and A the ring K[unknowns]/H, H the
hypotheses with the definitions of the lengths that the formulation keeps.  A is of finite dimension over
K, a product of local rings, one for each component that dominates U.  Of the thesis, the ideal N:

    generally true    N vanishes on every component: some power of each generator lies in H
    generally false   N vanishes on none: H + N is the whole ring
    true on parts     neither
    no component      H is the whole ring

A figure with several systems of hypotheses is the union of their components.  These are exactly the
components of full dimension of the ideal over Q[U], since localising at Q[U] minus 0 keeps those and no
others; non-degeneracy conditions in the parameters alone need no polynomial of their own.
"""

from __future__ import annotations

from abc import ABC, abstractmethod
from collections.abc import Sequence
from dataclasses import dataclass

from ..field.ring import Poly
from ..thesis.formulations import Formulation
from ..thesis.parts import Status
from .plain import Terms, terms, thesis_names
from .problem import Problem


@dataclass(frozen=True)
class Answer:
    """A status, the seconds from reading the polynomials to the answer by the engine's own clock, the
    peak of memory of a process that the engine started (KiB, None if it started none)."""

    status: Status
    seconds: float
    peak: int | None = None


@dataclass(frozen=True)
class Eliminated:
    """A thesis that the engine made root-free by itself: polynomials, seconds, peak of memory."""

    polynomials: tuple[Terms, ...]
    seconds: float
    peak: int | None = None


class OutOfMemory(Exception):
    """The engine's own process ran out of memory."""


class Engine(ABC):
    """One engine.  `load` is called before any clock starts."""

    name: str
    eliminates = True

    @abstractmethod
    def version(self) -> str | None:
        """Version, or None where the engine is not installed."""

    def load(self) -> None:  # noqa: B027
        """Import what is needed."""

    @abstractmethod
    def decide(self, p: Problem, f: Formulation, mebibytes: int | None) -> Answer:
        """The status of a formulation over the problem's hypotheses."""

    def decide_plain(self, p: Problem, thesis: Sequence[Terms], mebibytes: int | None) -> Answer:
        """The status of polynomials that `eliminate` returned."""
        raise NotImplementedError

    def eliminate(self, p: Problem, f: Formulation, mebibytes: int | None) -> Eliminated:
        """The lengths eliminated from the auxiliary formulation `f`."""
        raise NotImplementedError


def split(p: Problem, polys: Sequence[Poly]) -> tuple[list[Terms], list[Terms]]:
    """The thesis of a formulation and the definitions of what it keeps, as plain data."""
    names = thesis_names(p)
    first, *rest = (terms(q, names) for q in polys)
    return [first], rest


def together(statuses: Sequence[Status]) -> Status:
    """The status over the union of several systems' components."""
    known = {s for s in statuses if s is not Status.NONE}
    if not known:
        return Status.NONE
    return known.pop() if len(known) == 1 else Status.PARTS
