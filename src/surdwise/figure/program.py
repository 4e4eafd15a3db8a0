"""A sheet's figure as a program: its `given` lines, run over any stratum of parameters.

`run` takes equations between the parameters (and missed chart positions) and returns every
component of the figure there, with the borders at which the figure's own algebra changes
(denominators, discriminants, leading coefficients) and the strata where a hypothesis that
fails in general can still be met.
"""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass, field

from ..field import cells, ring, roots
from ..field.real import branches
from ..field.ring import Poly
from ..field.tower import Element
from ..sheet.tree import Comparison, Condition, Fact, Line, Relation, Sheet
from .base import Base, plug, solve
from .component import Builder, Component, Frame, Require, outcomes
from .conditions import equations
from .quantities import difference
from .scale import keeps_scale
from .vocabulary import CONSTRUCTIONS
from .vocabulary.placements import CARTESIAN, CONSTRAINED, HALF_ANGLES, kinds_of


@dataclass
class Run:
    """What one run of the program found."""

    components: list[Component] = field(default_factory=list)
    borders: list[dict[str, Poly]] = field(default_factory=list)
    strata: dict[str, Poly] = field(default_factory=dict)
    charts: set[int] = field(default_factory=set)
    dead: list[tuple[int, str]] = field(default_factory=list)


@dataclass
class Program:
    """The given lines of a sheet and the frame they are placed in."""

    lines: tuple[Line, ...]
    frame: Frame
    runs: dict[object, Run] = field(default_factory=dict)

    def run(
        self,
        eqs: Sequence[Poly] = (),
        missed: frozenset[int] = frozenset(),
        excluded: Sequence[Poly] = (),
        tick: Callable[[], None] = lambda: None,
    ) -> Run:
        """All components over the stratum where `eqs` vanish and `excluded` do not; a stratum
        is run once in the life of the program."""
        name = tuple(map(ring.key, eqs)), missed, frozenset(map(ring.key, excluded))
        if name not in self.runs:
            self.runs[name] = self._run(eqs, missed, excluded, tick)
        return self.runs[name]

    def _run(
        self,
        eqs: Sequence[Poly],
        missed: frozenset[int],
        excluded: Sequence[Poly],
        tick: Callable[[], None],
    ) -> Run:
        out = Run()
        bound = {k for p in eqs for k in ring.params_in(p)}
        for base in solve(eqs):
            tick()
            comp = self._ground(base, excluded)
            if comp is None or not self._is_real(base):
                continue
            lead_borders: dict[str, Poly] = {}
            for e in base.leads:
                lead_borders.update(roots.norm_factors(e))
            alive = [comp]
            for step, line in enumerate(self.lines):
                tick()
                nxt: list[Component] = []
                for c in alive:
                    for b, why in outcomes(c, self.frame, step, missed, _action(line)):
                        out.strata.update(b.strata)
                        out.charts.update(b.charts)
                        if why is None:
                            nxt.append(b.comp)
                        else:
                            out.dead.append((step, why))
                            out.strata.update({ring.key(ring.param(k)): ring.param(k) for k in b.comp.folded})
                alive = nxt
            for c in alive:
                if not bound <= c.asked:
                    # at a missed position a later point takes the frame's place and its parameters are
                    # not used: equations between them say nothing here, and the position is a stratum
                    # without them
                    continue
                out.components.append(c)
                out.borders.append({**lead_borders, **figure_borders(c)})
        return out

    def _is_real(self, base: Base) -> bool:
        """Whether a base without free parameters has a real point with every parameter in its
        range; True for any other base."""
        bound = {k for g in base.tower.gens for k in ring.params_in(g.modulus)}
        if not base.tower.gens or bound or any(ring.params_in(e.num) for e in base.values.values()):
            return True
        for branch in branches(base.tower, {}):
            signs = {k: branch.sign(e) for k, e in base.values.items() if k in self.frame.halved}
            if all(s >= 0 for s in signs.values()):
                return True
        return False

    def _ground(self, base: Base, excluded: Sequence[Poly]) -> Component | None:
        requires = []
        for g in excluded:
            e = plug(g, base)
            if e.is_zero():
                return None
            if not e.is_rational():
                requires.append(Require(e, "!=", ""))
        return Component(base.tower, base.values, (), requires=tuple(requires))


def demands(sheet: Sheet) -> list[Condition]:
    """Conditions of admission: the `provided` lines, and concyclic points as a condition besides their
    equation, which points in line satisfy too."""
    circles = [line.body for line in sheet.given if isinstance(line.body, Relation)]
    given: list[Condition] = [c for c in circles if c.form == "concyclic"]
    return [*given, *(line.body for line in sheet.provided)]  # type: ignore[list-item]


def frames_for(sheet: Sheet) -> list[str]:
    """The frames that can hold a sheet, by the shape that is placed first; half angles serve
    points anywhere on a circle too."""
    facts = [line.body for line in sheet.given if isinstance(line.body, Fact)]
    first = sheet.given[0].body if sheet.given else None
    kinds = kinds_of(first.form) if isinstance(first, Fact) else []
    if HALF_ANGLES not in kinds and any(f.form == "on_circle" for f in facts):
        kinds = [*kinds, HALF_ANGLES]
    if isinstance(first, Fact) and first.form in CONSTRAINED:
        return [*kinds, CARTESIAN]
    return [CARTESIAN, *kinds]


def program(sheet: Sheet, kind: str = "cartesian") -> Program:
    """The program of a sheet in a frame."""
    return Program(sheet.given, Frame(keeps_scale(sheet), kind))


def _action(line: Line) -> Callable[[Builder], None]:
    body = line.body
    if isinstance(body, Fact):
        fn = CONSTRUCTIONS[body.form]
        return lambda b: fn(b, *body.args)
    if isinstance(body, Relation):
        rel = body
        return lambda b: _relate(b, rel, line.text)
    assert isinstance(body, Comparison)
    left, right = body.items
    return lambda b: b.vanish(difference(left, right, b), f"{line.text} cannot hold")


def _relate(b: Builder, rel: Relation, text: str) -> None:
    eqs = equations(rel, b)
    assert eqs is not None, rel.form
    for e in eqs:
        b.vanish(e, f"{text} cannot hold")


def orientations(c: Component) -> dict[str, Poly]:
    """Irreducible factors of the polynomials whose signs orient positive roots, lengths that
    earlier readers adjoined included."""
    out: dict[str, Poly] = {}
    for step in c.tower.gens:
        if not ring.is_constant(step.orient):
            out.update({ring.key(f): f for f, _ in ring.irreducible_factors(step.orient)})
    return {n: p for n, p in out.items() if not cells.never_zero(p, c.positive)}


def special_places(c: Component) -> dict[str, Poly]:
    """Irreducible polynomials that no sample should be a zero of: where points coincide that must
    not, or a length that the figure is built on vanishes."""
    out: dict[str, Poly] = {}
    for r in c.requires:
        if r.op == "!=":
            out.update(roots.norm_factors(Element(c.tower, r.element.num, r.element.den)))
    for step in c.tower.gens:
        if step.choice == "positive" and step.radicand is not None and not ring.is_constant(step.radicand):
            out.update(roots.norm_factors(Element(c.tower, step.radicand, ring.ONE)))
    return out


def figure_borders(c: Component) -> dict[str, Poly]:
    """Irreducible polynomials whose zeros are the only places where the figure's algebra can
    change: denominators, guards, discriminants of two-valued steps, folded parameters."""
    out: dict[str, Poly] = {}

    def add(e: Element) -> None:
        for name, p in roots.norm_factors(Element(c.tower, e.num, e.den)).items():
            if not cells.never_zero(p, c.positive - c.folded):
                out[name] = p

    for k in c.folded:
        p = ring.param(k)
        out[ring.key(p)] = p
    for g in c.guards:
        add(g.element)
    for v in c.points.values():
        for e in (v.x, v.y):
            out.update(roots.denominator_factors(e))
    for step in c.tower.gens:
        if step.choice != "positive" and step.radicand is not None:
            add(Element(c.tower, step.radicand, ring.ONE))
        elif step.radicand is None:
            d = c.tower.reduce(step.modulus.discriminant(ring.GEN_NAMES[step.index]))
            add(Element(c.tower, d, ring.ONE))
        if not ring.is_constant(step.orient):
            add(Element(c.tower, step.orient, ring.ONE))
    return {n: p for n, p in out.items() if not cells.never_zero(p, c.positive - c.folded)}
