"""Before a figure of three or more parameters is surveyed: look for examples, try the lemmas.

Two exact figures, one where the claim is true on an open set and one where it is false, prove
`conditional`.  Where no counterexample turns up, a lemma may prove the inequality and leave
only its equality case, in plainer terms, to the survey.  Lemmas speak of figures, not of frames:
they are proved in the Cartesian frame and serve in every other.
"""

from __future__ import annotations

from collections.abc import Callable
from contextlib import suppress
from dataclasses import dataclass, field, replace
from itertools import islice

from ..field import cells
from ..field.real import Unsettled, branches
from ..figure.component import Component
from ..figure.program import Program, demands, frames_for, program
from ..sheet.tree import Comparison, Condition, Sheet
from . import three_terms, triangles
from .lemma import Lemma
from .naming import links_of
from .outcome import Decision, Verdict
from .search import Found, Search
from .spot import Lone
from .survey import Place
from .witness import witness

MANY = 3


@dataclass(frozen=True)
class Ahead:
    """What is known of a claim before its survey."""

    lemmas: tuple[Lemma, ...] = ()
    known: Decision | None = None


@dataclass
class _Look:
    sheet: Sheet
    program: Program
    components: list[Component]
    tick: Callable[[], None]
    lemmas: list[Lemma] = field(default_factory=list)


def look_ahead(sheet: Sheet, claim: Condition, blank: Decision, tick: Callable[[], None]) -> Ahead:
    """Examples and lemmas for a claim with an inequality in three or more parameters."""
    links = links_of(claim)
    if not any(isinstance(c, Comparison) and c.ops[0] != "=" for c in links):
        return Ahead()
    for kind in frames_for(sheet):
        prog = program(sheet, kind)
        comps = prog.run(tick=tick).components
        if comps:
            break
    if max((len(c.free) for c in comps), default=0) < MANY:
        return Ahead()
    look = _Look(sheet, prog, comps, tick)
    conditions = demands(sheet)
    found = Found()
    for c in links:
        if isinstance(c, Comparison) and c.ops[0] != "=":
            found = Search(comps, conditions, c, tick).run()
            lemma = _proved(look, c, found)
            if lemma is not None:
                look.lemmas.append(lemma)
    if len(links) > 1:
        found = Search(comps, conditions, claim, tick).run()
    return Ahead(tuple(look.lemmas), _known(prog, found, blank))


def _proved(look: _Look, c: Comparison, found: Found) -> Lemma | None:
    """The claim or its reverse by a lemma, whichever has no counterexample."""
    up = 1 if c.ops[0] in (">", ">=") else -1
    names = list(look.components[0].points)
    for truth_value, sign in ((False, up), (True, -up)):
        if not found.lacks(truth_value):
            continue
        look.tick()
        lemma = triangles.prove(look.sheet, names, c, sign)
        if lemma is None:
            lemma = three_terms.prove(look.components, _reader, c, sign)
        if lemma is not None:
            return lemma
    return None


def _reader(comp: Component) -> Lone | None:
    """A reader of the component at some figure of it."""
    for sample in islice(cells.open_cells([], list(comp.free), comp.positive), 5):
        with suppress(Unsettled):
            for branch in branches(comp.ground(), sample):
                return Lone(comp, branch)
    return None


def _known(prog: Program, found: Found, blank: Decision) -> Decision:
    """What two figures say, should the survey not come to an end."""
    places: list[Place] = [p for p in (found.true, found.false) if p is not None]
    out = replace(
        blank,
        holds_at=witness(prog, places, 0, True),
        fails_at=witness(prog, places, 0, False),
    )
    if found.true is not None and found.false is not None:
        return replace(
            out,
            verdict=Verdict.CONDITIONAL,
            reason="the verdict is proved by the two figures; where the claim holds was not settled: ",
        )
    if found.true is not None:
        return replace(out, reason="no figure was found where the claim fails; ")
    if found.false is not None:
        return replace(out, reason="no figure was found where the claim holds; ")
    return out
