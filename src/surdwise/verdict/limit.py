"""Is an inequality without equality cases sharp in the limit?

Up to similarity the figures of finitely many points form a compact space (let the greatest
distance be 1), and a sheet's figures tend to its edge only where a shape that must not
degenerate does.  So the least value of (left - right)/(left + right) is reached on an
admitted figure or on one with three vertices collinear (two of them coinciding included).  Those are
figures of a relaxed sheet, surveyed by the same engine: equality there, with lengths that are
not all zero, means that no better constant exists.  Nothing is said where a quantity of the claim or
a made point loses its meaning on the way to the edge.
"""

from __future__ import annotations

from dataclasses import replace
from fractions import Fraction
from itertools import combinations

from ..field.cells import TooManyCells
from ..field.real import Unsettled
from ..field.ring import TooLarge
from ..figure.conditions import Judge, compare, truth
from ..figure.program import program
from ..figure.quantities import difference
from ..figure.scale import keeps_scale
from ..sheet.tree import Comparison, Condition, Fact, Line, Not, Number, Pt, Relation, Sheet
from .naming import Case
from .spot import BallHint, Undefined
from .survey import Place, Statement

# shapes whose vertices may be anywhere but in line, and lines that stay continuous at the edge
SHAPES = ("triangle", "quadrilateral")
STEADY = ("midpoint", "centroid", "on_segment", "point", "points", "reflection_in_point")
ZERO = Number(Fraction(0))


def sharpness(case: Case, claim: Comparison) -> str | None:
    """`as C tends to segment AB` or the like where the claim is sharp, "no" where a better
    constant exists, None where neither is shown."""
    edges = _edges(case.sheet)
    if edges is None:
        return None
    complete = True
    for triple, sheet in edges:
        edge = Case(sheet, program(sheet), case.deadline, case.progress)
        try:
            found = edge.survey([_equal(claim)], closed=False)
        except (TooLarge, TooManyCells, Unsettled):
            return None
        hits = [p for p in found.places if p.truths[0]]
        if hits:
            return _said(max(hits, key=lambda p: p.dimension), triple)
        complete = complete and not (found.not_examined or found.undefined)
    return "no" if complete else None


def _edges(sheet: Sheet) -> list[tuple[tuple[Pt, ...], Sheet]] | None:
    """The sheet with its shapes relaxed to points, three of them collinear, for every three; None
    for a sheet that does more than place free shapes."""
    if keeps_scale(sheet) or sheet.provided:
        return None
    given: list[Line] = []
    triples: list[tuple[Pt, ...]] = []
    for line in sheet.given:
        body = line.body
        if not isinstance(body, Fact) or body.form not in (*SHAPES, *STEADY):
            return None
        points = body.args[0]
        if body.form in (*SHAPES, "points") and isinstance(points, tuple):
            given += [replace(line, body=Fact("points", ((p,),))) for p in points if _new(p, given)]
            if body.form in SHAPES:
                triples += combinations(points, 3)
        else:
            given.append(line)
    if not triples:
        return None
    first = given[: sum(isinstance(x.body, Fact) and x.body.form == "points" for x in given)]
    out = []
    for t in triples:
        row = replace(first[0], text="three vertices collinear", body=Relation("collinear", (t,)))
        out.append((t, replace(sheet, given=(*first, row, *given[len(first) :]))))
    return out


def _new(p: Pt, given: list[Line]) -> bool:
    return all(not isinstance(x.body, Fact) or x.body.args[0] != (p,) for x in given)


def _equal(claim: Comparison) -> Statement:
    """Equality of the two sides, neither being zero."""

    def judge(j: Judge) -> bool:
        left, right = claim.items
        return compare(left, "=", right, j) and not j.zero(difference(left, ZERO, j))

    return judge


def _said(p: Place, triple: tuple[Pt, ...]) -> str:
    """The degenerate figure in words."""
    hint = BallHint(p.comp, p.branch)
    for a, b in combinations(triple, 2):
        if _true(Not(Relation("distinct", ((a, b),))), hint):
            return f"as {a} and {b} come together"
    for c in reversed(triple):
        a, b = (x for x in triple if x is not c)
        if _true(Relation("between", (c, a, b)), hint):
            return f"as {c} tends to segment {a}{b}"
    return "as " + ", ".join(map(str, triple)) + " come into line"


def _true(c: Condition, hint: BallHint) -> bool:
    try:
        return truth(c, hint)
    except (Undefined, Unsettled, ZeroDivisionError):
        return False
