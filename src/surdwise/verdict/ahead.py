"""Before a figure of three or more parameters is surveyed: look for examples, try the lemmas.

Two exact figures, one where the claim is true on an open set and one where it is false, prove
`conditional`.  Where no counterexample turns up, a lemma may prove the inequality and leave
only its equality case, in plainer terms, to the survey.
"""

from __future__ import annotations

from dataclasses import replace

from ..sheet.tree import Comparison, Condition
from . import triangles
from .lemma import Lemma
from .naming import Case, links_of
from .outcome import Decision, Verdict
from .search import Found, Search
from .survey import Place
from .witness import witness

MANY = 3


def look_ahead(case: Case, claim: Condition, blank: Decision) -> None:
    """Note in the case what is known of the claim before its survey."""
    comps = case.program.run(tick=case.tick).components
    if max((len(c.free) for c in comps), default=0) < MANY:
        return
    links = links_of(claim)
    if not any(isinstance(c, Comparison) and c.ops[0] != "=" for c in links):
        return
    conditions: list[Condition] = [line.body for line in case.sheet.provided]  # type: ignore[misc]
    case.progress("looking for a counterexample")
    for c in links:
        if isinstance(c, Comparison) and c.ops[0] != "=":
            found = Search(comps, conditions, c, case.tick).run()
            lemma = _proved(case, c, found)
            if lemma is not None:
                case.lemmas.append(lemma)
    whole = Search(comps, conditions, claim, case.tick).run() if len(links) > 1 else found
    case.known = _known(case, whole, blank)


def _proved(case: Case, c: Comparison, found: Found) -> Lemma | None:
    """The claim or its reverse by a lemma, whichever has no counterexample."""
    up = 1 if c.ops[0] in (">", ">=") else -1
    names = list(case.program.run().components[0].points)
    for truth_value, sign in ((False, up), (True, -up)):
        if found.lacks(truth_value):
            case.tick()
            lemma = triangles.prove(case.sheet, names, c, sign)
            if lemma is not None:
                return lemma
    return None


def _known(case: Case, found: Found, blank: Decision) -> Decision:
    """What two figures say, should the survey not come to an end."""
    places: list[Place] = [p for p in (found.true, found.false) if p is not None]
    out = replace(
        blank,
        holds_at=witness(case.program, places, 0, True),
        fails_at=witness(case.program, places, 0, False),
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
