"""From a table of places to the shortest condition that names the true ones.

Candidate conditions are read off at every place (a hint), and the cheapest Boolean function of
them that agrees with the truth is sought: one literal, two, three, then a cover by
conjunctions.  What comes out is a proposal; `decide` proves it equivalent, cell by cell, or
comes back with the place where it is not.
"""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from itertools import combinations

from ..field.ball import precise
from ..field.real import Unsettled
from ..figure.conditions import EQUATIONS, truth
from ..sheet.show import show
from ..sheet.tree import And, Comparison, Condition, Not, Or, Relation
from .candidates import Candidate, all_of, any_of, says_the_same
from .spot import BallHint, Hint, Undefined
from .survey import Place

NEGATION = 0.35


@dataclass(frozen=True)
class Literal:
    """A condition with the set of places (bits) where it is true, and its cost."""

    condition: Condition
    mask: int
    cost: float


class Lexicon:
    """The candidate conditions of one figure and what they say at every place seen so far."""

    def __init__(self, cands: Iterable[Candidate]) -> None:
        self.cands = list(cands)
        self._rows: dict[int, tuple[Place, tuple[bool | None, ...]]] = {}
        self._blurred: set[int] = set()

    def extend(self, cands: Iterable[Candidate]) -> None:
        """Learn more candidate conditions."""
        known = {str(c.condition) for c in self.cands}
        more = [c for c in cands if str(c.condition) not in known]
        if more:
            self.cands += more
            self._rows.clear()

    def row(self, p: Place) -> tuple[bool | None, ...]:
        """Truth of every candidate at a place; None where undefined or too near to guess."""
        if id(p) not in self._rows:
            with precise():
                hint = BallHint(p.comp, p.branch)
                self._rows[id(p)] = p, tuple(self._guess(c.condition, hint, p) for c in self.cands)
        return self._rows[id(p)][1]

    def blurred(self, p: Place) -> bool:
        """Whether some candidate could not be read at a place, which is known too roughly."""
        self.row(p)
        return id(p) in self._blurred

    def _guess(self, c: Condition, hint: Hint, p: Place) -> bool | None:
        try:
            return truth(c, hint)
        except Unsettled:
            self._blurred.add(id(p))
            return None
        except (Undefined, ZeroDivisionError, KeyError):
            return None

    def literals(self, places: Sequence[Place], but: Condition) -> list[Literal]:
        """Candidates and their negations defined at every place, the cheapest for each set;
        without the statement that is to be named."""
        whole = (1 << len(places)) - 1
        masks: list[int | None] = [0] * len(self.cands)
        for i, p in enumerate(places):
            for k, t in enumerate(self.row(p)):
                m = masks[k]
                if m is None:
                    continue
                masks[k] = None if t is None else m | (1 << i) if t else m
        best: dict[int, Literal] = {}
        for c, mask in zip(self.cands, masks, strict=True):
            if mask is None or mask in (0, whole) or says_the_same(c.condition, but):
                continue
            for lit in (Literal(c.condition, mask, c.cost), _negative(c, whole & ~mask)):
                old = best.get(lit.mask)
                if old is None or lit.cost < old.cost:
                    best[lit.mask] = lit
        return sorted(best.values(), key=lambda x: x.cost)


def _negative(c: Candidate, mask: int) -> Literal:
    """The negation; `not A, B distinct` says that two points coincide and costs no more."""
    form = c.condition.form if isinstance(c.condition, Relation) else ""
    extra = -0.15 if form == "distinct" else 1.0 if isinstance(c.condition, Or) else NEGATION
    return Literal(_deny(c.condition), mask, c.cost + extra)


def name(
    target: int, whole: int, lits: Sequence[Literal], codimension: int = 0, top: int = 0
) -> Condition | None:
    """The cheapest condition found that is true exactly on the target places, or None.

    `codimension` says how many dimensions the target falls short of all figures, those at the
    `top` places: a conjunction of fewer equations cannot be right, though no place seen may show it.
    """
    if codimension:
        thin = _thin(target, whole, lits, codimension, top)
        if thin is not None:
            return thin.condition
    best = _all(target, whole, lits)
    for found in (_any(target, lits), _cover(target, whole, lits)):
        if found is not None and (best is None or found.cost < best.cost):
            best = found
    if best is None or best.cost > 4:
        other = _cover(whole & ~target, whole, lits)
        if other is not None and (best is None or other.cost + 1 < best.cost):
            best = Literal(_deny(other.condition), target, other.cost + 1)
    return None if best is None else best.condition


def _deny(c: Condition) -> Condition:
    """The negation pushed inside."""
    if isinstance(c, Or):
        return And(tuple(_deny(x) for x in c.args))
    if isinstance(c, And):
        return Or(tuple(_deny(x) for x in c.args))
    if isinstance(c, Not):
        return c.arg
    if isinstance(c, Comparison) and len(c.ops) == 1 and c.ops[0] in _FLIPPED:
        return Comparison(c.items, (_FLIPPED[c.ops[0]],), c.span)
    return Not(c)


_FLIPPED = {"<": ">=", ">": "<=", "<=": ">", ">=": "<"}


def _all(target: int, whole: int, lits: Sequence[Literal]) -> Literal | None:
    """Cheapest conjunction of literals."""
    off = whole & ~target
    over = [Literal(x.condition, off & ~x.mask, x.cost) for x in lits if x.mask & target == target]
    parts = _cheapest_cover(off, over)
    if parts is None:
        return None
    return Literal(all_of([p.condition for p in parts]), target, _cost(parts))


def equations_in(c: Condition) -> int:
    """How many equations a condition amounts to at least."""
    if isinstance(c, And):
        return sum(equations_in(x) for x in c.args)
    if isinstance(c, Or):
        return min(equations_in(x) for x in c.args)
    if isinstance(c, Not):
        return 2 if isinstance(c.arg, Relation) and c.arg.form == "distinct" else 0
    if isinstance(c, Comparison):
        return int(c.ops[0] == "=")
    return int(c.form in EQUATIONS or c.args[-1] in ("right", "="))


def _in_line(x: Literal, top: int) -> int:
    c = x.condition
    return int(isinstance(c, Relation) and c.form in ("between", "on_segment") and not x.mask & top)


def _thin(target: int, whole: int, lits: Sequence[Literal], codimension: int, top: int) -> Literal | None:
    """Cheapest conjunction with enough equations, or (for several thin pieces) a disjunction.
    `C between A and B` or on a segment is an equation too where it is true at no top place."""
    off = whole & ~target
    over = [x for x in lits if x.mask & target == target]
    weight = {id(x): equations_in(x.condition) or _in_line(x, top) for x in over}
    exact = [x for x in over if weight[id(x)]][:14]
    best: Literal | None = None
    for n in (1, 2, 3):
        for some in combinations(exact, n):
            if sum(weight[id(x)] for x in some) < codimension:
                continue
            left = off
            for x in some:
                left &= x.mask
            rest = [Literal(x.condition, left & ~x.mask, x.cost) for x in over if x not in some]
            more = _cheapest_cover(left, rest) if left else []
            if more is None:
                continue
            cost = _cost(some) + sum(m.cost + 0.1 for m in more)
            if best is None or cost < best.cost:
                best = Literal(all_of([x.condition for x in (*some, *more)]), target, cost)
    return best


def _any(target: int, lits: Sequence[Literal]) -> Literal | None:
    """Cheapest disjunction of literals."""
    parts = _cheapest_cover(target, [x for x in lits if x.mask | target == target])
    if parts is None:
        return None
    return Literal(any_of([p.condition for p in parts]), target, _cost(parts))


def _cost(parts: Sequence[Literal]) -> float:
    return sum(p.cost for p in parts) + 0.1 * (len(parts) - 1)


def _cover(target: int, whole: int, lits: Sequence[Literal]) -> Literal | None:
    """Cheapest disjunction of conjunctions of at most three literals."""
    off = whole & ~target
    useful = [x for x in lits if x.mask & target][:160]
    terms = [x for x in useful if not x.mask & off]
    for a, b in combinations(useful, 2):
        m = a.mask & b.mask
        if m and not m & off:
            terms.append(Literal(And((a.condition, b.condition)), m, a.cost + b.cost + 0.1))
    covered = 0
    for t in terms:
        covered |= t.mask
    if covered & target != target:
        for a, b, c in combinations(useful[:70], 3):
            m = a.mask & b.mask & c.mask
            if m & ~covered and not m & off:
                both = And((a.condition, b.condition, c.condition))
                terms.append(Literal(both, m, a.cost + b.cost + c.cost + 0.2))
    parts = _cheapest_cover(target, terms)
    if parts is None:
        return None
    return Literal(any_of([t.condition for t in parts]), target, _cost(parts) + 0.4 * (len(parts) - 1))


NODES = 4000


def _cheapest_cover(universe: int, sets: Sequence[Literal]) -> list[Literal] | None:
    """A cheapest family of sets that covers the universe (branch and bound on the element in
    fewest sets; past NODES nodes the best found so far, greedy at worst)."""
    reach = 0
    for s in sets:
        reach |= s.mask
    if reach & universe != universe:
        return None
    best = _greedy(universe, sets)
    bound = _cost(best)
    nodes = 0
    by_bit: dict[int, list[Literal]] = {}
    left = universe
    while left:
        bit = left & -left
        by_bit[bit] = sorted((s for s in sets if s.mask & bit), key=lambda s: s.cost)
        left &= ~bit
    order = sorted(by_bit, key=lambda b: len(by_bit[b]))

    def search(left: int, chosen: list[Literal], cost: float) -> None:
        nonlocal best, bound, nodes
        nodes += 1
        if not left:
            best, bound = list(chosen), cost
            return
        if nodes > NODES:
            return
        bit = next(b for b in order if b & left)
        for s in by_bit[bit]:
            c = cost + s.cost + 0.1
            if c >= bound + 0.1:
                break
            search(left & ~s.mask, [*chosen, s], c)

    search(universe, [], -0.1)
    return best


def _greedy(universe: int, sets: Sequence[Literal]) -> list[Literal]:
    chosen: list[Literal] = []
    left = universe
    while left:
        s = max(sets, key=lambda s: (s.mask & left).bit_count() / (s.cost + 0.3))
        chosen.append(s)
        left &= ~s.mask
    return chosen


def said(c: Condition) -> str:
    """A condition in the sheet's language; polynomials of the frame as written."""
    if isinstance(c, Relation) and c.form == "frame_sign":
        return f"{c.args[0]} {c.args[1]} 0"
    if isinstance(c, Not):
        inner = said(c.arg)
        loose = isinstance(c.arg, (And, Or)) or in_frame(c.arg)
        return f"not ({inner})" if loose else f"not {inner}"
    if isinstance(c, And):
        return " and ".join(f"({said(x)})" if isinstance(x, Or) else said(x) for x in c.args)
    if isinstance(c, Or):
        return " or ".join(said(x) for x in c.args)
    return show(c)


def in_frame(c: Condition) -> bool:
    """Whether the condition speaks of the frame's polynomials."""
    if isinstance(c, Relation):
        return c.form == "frame_sign"
    if isinstance(c, Not):
        return in_frame(c.arg)
    return any(in_frame(x) for x in c.args) if isinstance(c, (And, Or)) else False
