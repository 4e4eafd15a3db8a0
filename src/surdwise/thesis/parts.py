"""The algebraic side of an equality: on which components it holds, in each formulation.

Algebra knows a length only by its square.  Over a component of the hypotheses every length is
adjoined in turn: where its square is a square s^2 in the field, two components arise, length =
s and length = -s; else the field grows and both signs are conjugate.  Exact zero tests decide
each formulation on each component; no polynomial is expanded.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from enum import Enum

from ..field import roots
from ..field.tower import Element
from ..figure.component import Component
from ..figure.conditions import equations
from ..figure.plane import Vec
from ..figure.quantities import value
from ..figure.reader import Reader
from ..sheet.tree import Comparison, Measure, PointRef, Relation

MAX_PARTS = 4096


class Form(Enum):
    """The five formulations of an equality."""

    AUXILIARY = "auxiliary"
    SQUARED = "squared"
    SIGN_PRODUCT = "sign_product"
    ELIMINANT = "eliminant"
    MINIMAL = "minimal"


class Status(Enum):
    """Over the components of the hypotheses that dominate the free parameters."""

    TRUE = "generally true"
    FALSE = "generally false"
    PARTS = "true on parts and false on parts"
    NONE = "no component dominates"


@dataclass(frozen=True)
class Part:
    """One component of the hypotheses with every length adjoined.

    `folds` are the dependent lengths as (s, sign): length = sign * s.  `true` says whether the
    equality holds identically on it, `opposite` whether left = -right does.
    """

    comp: Component
    degree: int
    folds: tuple[tuple[Element, int], ...]
    true: bool
    opposite: bool

    @property
    def signs(self) -> str:
        """The signs of the dependent lengths, in the order they are met."""
        return " ".join("+" if s > 0 else "-" for _, s in self.folds)


class _Fork(Exception):
    pass


class _Signed(Reader):
    """Reads quantities with a prescribed sign for every dependent length."""

    def __init__(self, comp: Component, choices: tuple[int, ...], separate: bool) -> None:
        self.comp = comp.copy()
        self.elements = comp.kept
        self.separate = separate
        self.name: object = None
        self.choices = choices
        self.folds: list[tuple[Element, int]] = []
        self.known: dict[object, Element] = {}

    def kept(self, name: object, make: Callable[[], Element]) -> Element:
        """An element that depends on no sign, computed once for the component."""
        if name not in self.elements:
            self.elements[name] = make()
        return self.elements[name]

    def span(self, a: PointRef, b: PointRef) -> Element:
        """A distance; with `separate` an unknown of its own even if its square is met before."""
        outer = self.name
        if self.separate:
            self.name = frozenset((str(a), str(b)))
        try:
            return super().span(a, b)
        finally:
            self.name = outer

    def measuring(self, q: Measure) -> None:
        """The same for every other measured quantity."""
        if self.separate:
            self.name = q.kind, q.points, q.line

    def _folded(self, s: Element) -> Element:
        if len(self.folds) == len(self.choices):
            raise _Fork
        sign = self.choices[len(self.folds)]
        self.folds.append((s, sign))
        return s * sign

    def absolute(self, e: Element) -> Element:
        """A length whose square is e^2."""
        if e.is_zero():
            return e
        name = self.name, (e * e).key()
        if name not in self.known:
            self.known[name] = self._folded(e)
        return self.known[name]

    def root(self, q: Element) -> Element:
        """A length whose square is q."""
        if q.is_zero():
            return q
        name = self.name, q.key()
        if name not in self.known:
            s = roots.sqrt(q, self.comp.tower)
            if s is not None:
                self.known[name] = self._folded(s)
            else:
                self.comp.tower, r = self.comp.tower.adjoin_sqrt(q, "either", "length")
                self.known[name] = r
        return self.known[name]

    def divide(self, a: Element, b: Element, words: str) -> Element:
        """a/b."""
        return a / b

    def differ(self, a: Vec, b: Vec, words: str) -> None:
        """Nothing to check in algebra."""


def parts(
    comp: Component,
    claim: Comparison | Relation,
    tick: Callable[[], None] = lambda: None,
    separate: bool = True,
) -> list[Part]:
    """All parts of one component for an equality.  With `separate` every distance is an unknown
    of its own; without, distances with the same square are one."""
    out: list[Part] = []
    pending: list[tuple[int, ...]] = [()]
    while pending and len(out) < MAX_PARTS:
        tick()
        choices = pending.pop()
        r = _Signed(comp, choices, separate)
        try:
            if isinstance(claim, Relation):
                true = opposite = all(e.is_zero() for e in equations(claim, r) or ())
            else:
                left, right = (value(q, r) for q in claim.items)
                true, opposite = (left - right).is_zero(), (left + right).is_zero()
        except _Fork:
            pending += [(*choices, -1), (*choices, 1)]
            continue
        except ZeroDivisionError:
            continue
        folds = tuple(r.folds)
        degree = r.comp.tower.degree
        out.append(Part(comp, degree, folds, true, opposite))
    return out


def statuses(all_parts: list[Part], minimal: list[Part]) -> dict[str, Status]:
    """Status of each formulation; `minimal` are the parts on which the minimal polynomial's own
    sign pattern lives."""
    by_comp: dict[int, list[Part]] = {}
    for p in all_parts:
        by_comp.setdefault(id(p.comp), []).append(p)
    product = [any(p.true for p in ps) or any(p.opposite for p in ps) for ps in by_comp.values()]
    return {
        Form.AUXILIARY.value: _status([p.true for p in all_parts]),
        Form.SQUARED.value: _status([p.true or p.opposite for p in all_parts]),
        Form.SIGN_PRODUCT.value: _status(product),
        Form.ELIMINANT.value: _status(product),
        Form.MINIMAL.value: _status([p.true for p in minimal]),
    }


def _status(truths: list[bool]) -> Status:
    if not truths:
        return Status.NONE
    if all(truths):
        return Status.TRUE
    return Status.PARTS if any(truths) else Status.FALSE
