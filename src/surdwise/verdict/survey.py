"""The survey: every admitted figure, stratum by stratum, with the truth of given statements.

Over each component, parameter space is cut into open cells by the register's borders; over one
sample in each cell every real branch is judged, literally.  What a judgement depends on enters
the register and the cutting is repeated until nothing new turns up.  Then every border that
matters becomes one more equation on the same figure: the same engine runs one dimension less.
"""

from __future__ import annotations

import time
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field
from itertools import islice

from ..field import cells, ring
from ..field.near import NearBranch
from ..field.real import Branch, Unsettled, branches
from ..field.ring import Poly
from ..figure.component import Component
from ..figure.conditions import Judge
from ..figure.program import Program, Run, orientations, special_places
from .lift import heavy, lift
from .samples import likely_samples
from .spot import Register, Spot, Undefined

EXACT_SIZE = 40
MANY = 3  # parameters from which on cells are avoided where they can be
SAMPLES = 300

Statement = Callable[[Judge], bool]


class OutOfTime(Exception):
    """The time limit was reached."""


@dataclass(frozen=True)
class Place:
    """One real figure standing for its whole cell: `dimension` free parameters, the truth of
    every statement there (None: undefined)."""

    dimension: int
    comp: Component
    branch: Branch | NearBranch
    truths: tuple[bool | None, ...]
    depth: int


@dataclass
class Survey:
    """The result: all places, and what was left out."""

    places: list[Place] = field(default_factory=list)
    not_examined: list[str] = field(default_factory=list)
    undefined: set[str] = field(default_factory=set)
    top: Run | None = None
    components: list[Component] = field(default_factory=list)
    dead: list[tuple[int, str]] = field(default_factory=list)
    borders: dict[str, Poly] = field(default_factory=dict)
    strata: int = 0
    cells: int = 0


@dataclass
class Surveyor:
    """Surveys one figure for one list of statements; a `shallow` survey looks at open cells
    only and leaves their borders out."""

    program: Program
    conditions: Sequence[Statement]
    statements: Sequence[Statement]
    deadline: float
    closed: bool = False
    open_conditions: bool = True
    shallow: bool = False
    progress: Callable[[str], None] = lambda text: None
    result: Survey = field(default_factory=Survey)
    seen: set[tuple[frozenset[str], frozenset[int]]] = field(default_factory=set)

    def tick(self) -> None:
        """Stop when time is out."""
        if time.monotonic() > self.deadline:
            raise OutOfTime

    def run(self) -> Survey:
        """Survey everything."""
        self._stratum([], frozenset(), [], 0)
        return self.result

    # ------------------------------------------------------------------ strata

    def _stratum(
        self,
        eqs: list[Poly],
        missed: frozenset[int],
        excluded: list[Poly],
        depth: int,
        ceiling: int = 99,
        charts: frozenset[int] = frozenset(),
    ) -> None:
        """One stratum and all below it; missed positions `charts` are looked at elsewhere, without
        its last equations, with all strata of their own."""
        name = (frozenset(ring.key(p) for p in eqs), missed)
        if name in self.seen:
            return
        self.seen.add(name)
        self.tick()
        self.result.strata += 1
        run = self.program.run(eqs, missed, excluded, self.tick)
        if self.result.top is None:
            self.result.top = run
        if depth == 0:
            self.result.dead += run.dead
        points: list[tuple[Poly, ...]] = []
        todo: dict[str, tuple[Poly, int]] = {n: (p, 98) for n, p in run.strata.items()}
        self.result.components += run.components
        for comp, borders in zip(run.components, run.borders, strict=True):
            if len(comp.free) > ceiling:
                continue
            register = Register()
            register.enter("figure", borders)
            register.enter("fold", orientations(comp))
            register.enter("avoid", special_places(comp))
            before = len(self.result.places)
            self._component(comp, register, depth)
            found = self.result.places[before:]
            if found and len(comp.free) == max(p.dimension for p in self.result.places):
                self.result.borders.update(register.polys)
            if self.shallow:
                continue
            curves: list[Poly] = []
            exact: list[Poly] = list(register.of(["figure"]).values())
            for n, p in self._matters(register, found).items():
                if "figure" not in register.kinds[n] and heavy(p, comp):
                    if len(comp.free) <= 2:
                        curves.append(p)
                    else:
                        self.result.not_examined.append(f"a border of degree {p.total_degree()}")
                    continue
                exact.append(p)
                old = todo.get(n)
                todo[n] = (p, max(len(comp.free) - 1, old[1] if old else 0))
            if curves:
                points += self._lift(comp, register, curves, exact, depth)
        done = list(excluded)
        for _, (p, top) in sorted(todo.items(), key=lambda item: (len(item[1][0]), item[0])):
            self.progress(f"{self.result.strata} strata, {self.result.cells} cells")
            self._stratum([*eqs, p], missed, done, depth + 1, min(top, ceiling), charts | run.charts)
            done.append(p)
        for system in points:
            size = system[0].total_degree() * system[-1].total_degree()
            if size > EXACT_SIZE:
                self.result.not_examined.append("critical points of a border curve")
                continue
            self._stratum([*eqs, *system], missed, list(excluded), depth + 2, charts=charts | run.charts)
        for chart in sorted(run.charts - charts):
            if not missed or chart > max(missed):
                self._stratum(list(eqs), missed | {chart}, list(excluded), depth, ceiling)

    def _lift(
        self, comp: Component, register: Register, curves: list[Poly], exact: list[Poly], depth: int
    ) -> list[tuple[Poly, ...]]:
        """Examine curves of high degree in balls, `exact` borders being strata of their own;
        returns the points left, as equations."""
        order = self._order(comp, register)
        found, left, complete = lift(
            comp, register, curves, exact, order, self.conditions, self.statements, self.tick
        )
        self.result.places += [
            Place(x.dimension, comp, x.branch, x.truths, depth + 2 - x.dimension) for x in found
        ]
        if not complete:
            names = ", ".join(f"degree {p.total_degree()}" for p in curves)
            self.result.not_examined.append(f"points of a border curve ({names})")
        return left

    def _matters(self, register: Register, found: list[Place]) -> dict[str, Poly]:
        """Borders whose strata must be looked at.

        Lemma: let the thesis be closed (=, <=, >=) and true on every admitted open cell.  An
        admitted figure where the construction is regular is a limit of figures of its open
        cell, admitted too unless a weak or equational condition of admission is what vanishes;
        lengths are continuous, so the thesis holds in the limit.  Only figure borders and those
        conditions remain.  (Not so where the construction degenerates: x^2 = -u^2 has its only
        real figure at u = 0, a limit of none.)
        """
        if self.closed and all(all(p.truths) for p in found):
            kinds = ["figure", "domain", "admission:closed", "admission:thin"]
            return register.of(kinds if self.open_conditions else [*kinds, "admission:open"])
        return register.of(["figure", "domain", "open", "closed", "thin"])

    # ------------------------------------------------------------------ one component

    def _component(self, comp: Component, register: Register, depth: int) -> None:
        comp.eliminations.tick = self.tick
        if len(comp.free) >= MANY and self._uniform(comp, register, depth):
            return
        order = self._order(comp, register)
        tower = comp.ground()
        while True:
            count = register.count()
            places: list[Place] = []
            loose = 0
            thin = list(register.of(["thin", "avoid"]).values())
            for sample in cells.open_cells(register.borders(), order, comp.positive, thin, comp.eliminations):
                self.tick()
                self.result.cells += 1
                try:
                    for branch in branches(tower, sample):
                        place = self._judge(comp, branch, register, depth)
                        if place is not None:
                            places.append(place)
                except Unsettled:
                    loose += 1
            if register.count() == count and len(thin) == len(register.of(["thin", "avoid"])):
                if loose:
                    raise Unsettled("a sample lies on a special place that no border explains")
                self.result.places += places
                return
            order = self._order(comp, register)

    def _uniform(self, comp: Component, register: Register, depth: int) -> bool:
        """Whether the statements read no sign at all at some admitted figure of the component.

        Lemma: what is read without a sign is read alike on all its figures, so one admitted figure
        stands for the whole component and no cells are needed.  (|s| reads the sign of s; the
        squares of two lengths compare without one.)
        """
        for sample in islice(likely_samples(comp), SAMPLES):
            self.tick()
            try:
                for branch in branches(comp.ground(), sample):
                    place = self._judge(comp, branch, register, depth)
                    if place is None:
                        continue
                    if register.read_by("thesis"):
                        return False
                    if not any(ring.substitute(p, sample).is_zero() for p in register.polys.values()):
                        self.result.places.append(place)
                        return True
            except Unsettled:
                continue
        return False

    def _judge(self, comp: Component, branch: Branch, register: Register, depth: int) -> Place | None:
        spot = Spot(comp, branch, register)
        try:
            if not spot.admitted(self.conditions):
                return None
            truths = tuple(s(spot) for s in self.statements)
        except Undefined as e:
            self.result.undefined.add(str(e))
            return None
        if depth == 0:
            self.result.undefined |= spot.doubtful()
        return Place(len(comp.free), comp, branch, truths, depth)

    def _order(self, comp: Component, register: Register) -> list[int]:
        """Parameters in the order of lifting: those of low degree in the borders last."""

        def weight(k: int) -> tuple[int, int]:
            slot = ring.param_slot(k)
            return sum(max(p.degrees()[slot], 0) for p in register.borders()), -k

        return sorted(comp.free, key=weight, reverse=True)
