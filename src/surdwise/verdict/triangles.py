"""Sums of distances compared by the triangle inequality alone.

Lemma.  Let T(i, k, j) = |ik| + |kj| - |ij| >= 0 for all points of a figure, auxiliary ones among
them.  If the claim's difference is a combination of such T and of distances with coefficients >= 0,
modulo equations that hold on every figure (X on segment AC: |AX| + |XC| = |AC|), the claim holds;
equality needs every T used to be zero, that is k on segment ij.  Such a combination is a linear
program (Farkas); its vertex solution is made rational and checked exactly.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass, field
from fractions import Fraction
from itertools import combinations

from ..field.echelon import echelon
from ..figure.conditions import Judge
from ..figure.plane import Vec, cross, dot, square
from ..sheet.show import show
from ..sheet.tree import Binary, Comparison, Fact, Measure, Number, Pt, Quantity, Relation, Sheet, Unary
from .lemma import Lemma

Pair = tuple[str, str]
Row = dict[Pair, Fraction]
Place = Callable[[Judge], Vec]

MAX_POINTS = 12
CONVEX = {
    "square",
    "rectangle",
    "parallelogram",
    "rhombus",
    "kite",
    "trapezium",
    "cyclic_quadrilateral",
    "tangential_quadrilateral",
    "regular_pentagon",
    "regular_hexagon",
}


def pair(a: str, b: str) -> Pair:
    """Two points in order."""
    return (a, b) if a < b else (b, a)


@dataclass
class Facts:
    """What is known of distances on every admitted figure.

    `rows` are linear forms in distances that vanish; `bent` are triples that are never
    collinear; `apart` are pairs that are always distinct; `places` tells where a point is;
    `words` introduces the auxiliary ones.
    """

    places: dict[str, Place] = field(default_factory=dict)
    rows: list[Row] = field(default_factory=list)
    bent: set[frozenset[str]] = field(default_factory=set)
    apart: set[Pair] = field(default_factory=set)
    words: dict[str, str] = field(default_factory=dict)

    def point(self, name: str) -> None:
        """A point of the sheet."""
        self.places.setdefault(name, lambda j: j.at(Pt(name)))

    def on_segment(self, x: str, a: str, b: str) -> None:
        """|ax| + |xb| = |ab|."""
        self.rows.append(_row([(a, x, 1), (x, b, 1), (a, b, -1)]))

    def times(self, one: Pair, factor: Fraction, two: Pair) -> None:
        """|one| = factor |two|."""
        self.rows.append(_row([(*one, Fraction(1)), (*two, -factor)]))

    def no_line(self, *names: str) -> None:
        """No three of the points are collinear."""
        self.bent.update(frozenset(t) for t in combinations(names, 3))
        self.apart.update(pair(a, b) for a, b in combinations(names, 2))

    def crossing(self, a: str, c: str, b: str, d: str, *, inside: str = "") -> None:
        """A new point on segment ac and on the line bd: on the segment too for a convex
        quadrilateral abcd, beyond `inside` = d for a point d inside triangle abc."""
        x = next(f"X{n}" if n else "X" for n in range(99) if (f"X{n}" if n else "X") not in self.places)
        at = self.places
        pa, pb, pc, pd = at[a], at[b], at[c], at[d]

        def meet(j: Judge) -> Vec:
            u, v = pc(j) - pa(j), pd(j) - pb(j)
            return pa(j) + u * j.divide(cross(pb(j) - pa(j), v), cross(u, v), "parallel diagonals")

        self.places[x] = meet
        self.on_segment(x, a, c)
        if inside:
            self.on_segment(d, b, x)
        else:
            self.on_segment(x, b, d)
        for e in (a, c):
            for f in (b, d):
                self.bent.add(frozenset((e, f, x)))
        self.words[x] = f"{x} the meet of {a}{c} and {b}{d}"

    def middle(self, a: str, b: str) -> str:
        """A new point halfway between two."""
        name = next(f"Y{n}" if n else "Y" for n in range(99) if (f"Y{n}" if n else "Y") not in self.places)
        pa, pb = self.places[a], self.places[b]
        self.places[name] = lambda j: (pa(j) + pb(j)) * Fraction(1, 2)
        self.halves(name, a, b)
        self.words[name] = f"{name} the midpoint of {a}{b}"
        return name

    def halves(self, m: str, a: str, b: str) -> None:
        """m is the midpoint of ab."""
        self.times(pair(a, m), Fraction(1, 2), pair(a, b))
        self.times(pair(b, m), Fraction(1, 2), pair(a, b))


def _row(terms: Iterable[tuple[str, str, Fraction | int]]) -> Row:
    out: Row = {}
    for a, b, c in terms:
        if a != b:
            out[pair(a, b)] = out.get(pair(a, b), Fraction(0)) + c
    return {k: c for k, c in out.items() if c}


# ---------------------------------------------------------------- facts from the sheet's text


def facts_of(sheet: Sheet, names: Iterable[str]) -> Facts:
    """What the lines of a sheet say of distances, with the auxiliary points they call for."""
    f = Facts()
    for n in names:
        f.point(n)
    middles: list[tuple[str, str, str]] = []
    for line in sheet.given:
        body = line.body
        if not isinstance(body, Fact):
            continue
        args = [_names(a) for a in body.args]
        first = args[0] if args else ()
        if body.form == "points":
            f.apart.update(pair(a, b) for a, b in combinations(first, 2))
        if body.form.endswith("triangle") and body.form != "inside_triangle":
            f.no_line(*first)
        if body.form == "quadrilateral":
            f.no_line(*first)
        if body.form in CONVEX:
            _convex(f, first)
        if body.form == "inside_triangle":
            _inside(f, first[0], args[1])
        if body.form == "on_segment" and len(args[1]) == 2:
            f.on_segment(first[0], *args[1])
        if body.form == "midpoint" and len(args[1]) == 2:
            f.halves(first[0], *args[1])
            middles.append((first[0], args[1][0], args[1][1]))
    for line in sheet.provided:
        body = line.body
        if not isinstance(body, Relation):
            continue
        args = [_names(a) for a in body.args]
        if body.form == "convex":
            _convex(f, args[0])
        if body.form == "inside":
            _inside(f, args[0][0], args[1])
        if body.form == "between":
            f.on_segment(args[0][0], args[1][0], args[2][0])
            f.apart.update((pair(args[0][0], args[1][0]), pair(args[0][0], args[2][0])))
    for (m, a, b), (n, c, d) in combinations(middles, 2):
        for e, other in ((a, b), (b, a)):
            for g, last in ((c, d), (d, c)):
                if len({e, g}) == 2 and len(f.places) < MAX_POINTS:
                    k = f.middle(e, g)
                    f.times(pair(m, k), Fraction(1, 2), pair(other, g))
                    f.times(pair(n, k), Fraction(1, 2), pair(last, e))
    return f


def _names(arg: object) -> tuple[str, ...]:
    if isinstance(arg, Pt):
        return (arg.name,)
    if isinstance(arg, tuple):
        return tuple(p.name for p in arg if isinstance(p, Pt))
    return ()


def _convex(f: Facts, names: Sequence[str]) -> None:
    f.no_line(*names)
    for a, b, c, d in combinations(names, 4):
        if len(f.places) < MAX_POINTS:
            f.crossing(a, c, b, d)


def _inside(f: Facts, p: str, tri: Sequence[str]) -> None:
    f.no_line(p, *tri)
    for k in range(3):
        a, b, c = tri[k], tri[k - 1], tri[k - 2]
        if len(f.places) < MAX_POINTS:
            f.crossing(b, c, a, p, inside=p)


# ---------------------------------------------------------------- the claim


def linear(q: Quantity) -> Row | None:
    """A quantity as a linear form in distances, or None."""
    if isinstance(q, Measure):
        if not all(isinstance(p, Pt) for p in q.points):
            return None
        names = [str(p) for p in q.points]
        if q.kind == "length":
            return _row([(names[0], names[1], 1)])
        if q.kind == "perimeter":
            return _row([(a, b, 1) for a, b in zip(names, names[1:] + names[:1], strict=True)])
        return None
    if isinstance(q, Unary):
        inner = linear(q.arg) if q.op == "neg" else None
        return None if inner is None else {k: -c for k, c in inner.items()}
    if isinstance(q, Number):
        return {} if q.value == 0 else None
    assert isinstance(q, Binary)
    if q.op in "+-":
        a, b = linear(q.left), linear(q.right)
        if a is None or b is None:
            return None
        return _combined([(a, Fraction(1)), (b, Fraction(1 if q.op == "+" else -1))])
    if q.op == "*" and isinstance(q.left, Number):
        return _scaled(linear(q.right), q.left.value)
    if q.op == "*" and isinstance(q.right, Number):
        return _scaled(linear(q.left), q.right.value)
    if q.op == "/" and isinstance(q.right, Number):
        return _scaled(linear(q.left), 1 / q.right.value)
    return None


def _scaled(row: Row | None, factor: Fraction) -> Row | None:
    return None if row is None else {k: c * factor for k, c in row.items() if factor}


def _combined(parts: Iterable[tuple[Row, Fraction]]) -> Row:
    out: Row = {}
    for row, factor in parts:
        for k, c in row.items():
            out[k] = out.get(k, Fraction(0)) + c * factor
    return {k: c for k, c in out.items() if c}


# ---------------------------------------------------------------- the linear program


@dataclass(frozen=True)
class Bend:
    """T(i, k, j) = |ik| + |kj| - |ij|."""

    i: str
    k: str
    j: str

    @property
    def row(self) -> Row:
        """The linear form."""
        return _row([(self.i, self.k, 1), (self.k, self.j, 1), (self.i, self.j, -1)])


def prove(sheet: Sheet, names: Sequence[str], claim: Comparison, sign: int) -> Lemma | None:
    """That sign * (left - right) >= 0 follows from triangle inequalities, or None."""
    left, right = linear(claim.items[0]), linear(claim.items[1])
    if left is None or right is None:
        return None
    facts = facts_of(sheet, names)
    if len(facts.places) > MAX_POINTS:
        return None
    goal = _combined([(left, Fraction(sign)), (right, Fraction(-sign))])
    if any(n not in facts.places for p in goal for n in p):
        return None
    bends = [
        Bend(i, k, j)
        for i, j in combinations(sorted(facts.places), 2)
        for k in sorted(facts.places)
        if k not in (i, j)
    ]
    pairs = [{p: Fraction(1)} for p in combinations(sorted(facts.places), 2)]
    used = _combination(goal, [b.row for b in bends], pairs, facts)
    if used is None:
        return None
    tight = [bends[n] for n in used if n < len(bends)]
    zero = [next(iter(pairs[n - len(bends)])) for n in used if n >= len(bends)]
    strict = [b for b in tight if frozenset((b.i, b.k, b.j)) in facts.bent]
    away = [p for p in zero if p in facts.apart]
    equal = None if strict or away else _degenerate(facts, tight, zero)
    return Lemma(claim.items[0], claim.items[1], sign, equal, _said(claim, facts, tight, strict))


def _combination(goal: Row, slacks: list[Row], pairs: list[Row], facts: Facts) -> list[int] | None:
    """Indices into slacks + pairs of a combination with positive coefficients that gives the goal
    modulo the facts' rows, checked exactly; strict ones are preferred."""
    import numpy as np
    from scipy.optimize import linprog

    columns = [*slacks, *pairs, *facts.rows]
    index = {p: n for n, p in enumerate(sorted({p for r in (goal, *columns) for p in r}))}
    a = np.zeros((len(index), len(columns)))
    for n, row in enumerate(columns):
        for p, c in row.items():
            a[index[p], n] = float(c)
    b = np.zeros(len(index))
    for p, c in goal.items():
        b[index[p]] = float(c)
    free = len(slacks) + len(pairs)
    cost = np.ones(len(columns))
    cost[free:] = 0
    # a strict combination, where there is one: pay least for what is never zero
    bent = facts.bent
    for n, row in enumerate(slacks):
        if frozenset(x for p in row for x in p) in bent:
            cost[n] = 0.5
    for n, row in enumerate(pairs):
        cost[len(slacks) + n] = 0.5 if next(iter(row)) in facts.apart else 1.0
    bounds = [(0, None)] * free + [(None, None)] * len(facts.rows)
    out = linprog(cost, A_eq=a, b_eq=b, bounds=bounds, method="highs-ds")
    if not out.success:
        return None
    support = [n for n, x in enumerate(out.x) if abs(x) > 1e-9]
    exact = _solved([columns[n] for n in support], goal)
    if exact is None or any(x < 0 for n, x in zip(support, exact, strict=True) if n < free):
        return None
    return [n for n, x in zip(support, exact, strict=True) if n < free and x > 0]


def _solved(columns: Sequence[Row], goal: Row) -> list[Fraction] | None:
    """Exact coefficients with sum of coefficient * column = goal, free ones zero; or None."""
    keys = sorted({p for r in (*columns, goal) for p in r})
    rows = [[c.get(p, Fraction(0)) for c in columns] + [goal.get(p, Fraction(0))] for p in keys]
    lead = echelon(rows, len(columns))
    if any(r[-1] for r in rows[len(lead) :]):
        return None
    out = [Fraction(0)] * len(columns)
    for k, n in enumerate(lead):
        out[n] = rows[k][-1]
    return out


# ---------------------------------------------------------------- the equality case, and the words


def _degenerate(facts: Facts, tight: Sequence[Bend], zero: Sequence[Pair]) -> Callable[[Judge], bool]:
    """Every middle point on its segment, every distance left over zero."""
    at = facts.places

    def equal(j: Judge) -> bool:
        for b in tight:
            u, v = at[b.i](j) - at[b.k](j), at[b.j](j) - at[b.k](j)
            if not j.zero(cross(u, v)) or j.weak_sign(dot(u, v)) > 0:
                return False
        return all(j.zero(square(at[x](j) - at[y](j))) for x, y in zero)

    return equal


def _said(claim: Comparison, facts: Facts, tight: Sequence[Bend], strict: Sequence[Bend]) -> str:
    steps = [f"|{b.i}{b.j}| {'<' if b in strict else '<='} |{b.i}{b.k}| + |{b.k}{b.j}|" for b in tight]
    aux = [w for x, w in facts.words.items() if any(x in (b.i, b.k, b.j) for b in tight)]
    where = f", with {' and '.join(aux)}" if aux else ""
    return f"{show(claim)} follows from {', '.join(steps)}{where}"
