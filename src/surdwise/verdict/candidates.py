"""Conditions of the sheet language that could name where a statement holds.

The figure's own predicates, cheapest words first.  Nothing here is proved: a proposal made of
these is decided afterwards like any other statement.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from fractions import Fraction
from itertools import combinations, permutations

from ..field.tower import Element
from ..figure.component import Component
from ..figure.plane import Straight, orientation
from ..sheet.tree import (
    And,
    Binary,
    Comparison,
    Condition,
    Fact,
    Measure,
    Named,
    Not,
    Number,
    Or,
    Pt,
    Quantity,
    Relation,
    Sheet,
    Through,
    Unary,
)

MAX_POINTS = 9


@dataclass(frozen=True)
class Candidate:
    """A condition with its cost in words."""

    condition: Condition
    cost: float


def length(a: Pt, b: Pt) -> Measure:
    """|ab|."""
    return Measure("length", (a, b))


def candidates(sheet: Sheet, comps: Sequence[Component], claim: Condition) -> Iterator[Candidate]:
    """Candidate conditions on the figure's points."""
    names = sorted({n for c in comps for n in c.points}, key=lambda n: (n not in _mentioned(sheet), n))
    pts = [Pt(n) for n in names[:MAX_POINTS]]
    straight: set[tuple[str, ...]] = {
        tri for tri in combinations(sorted(p.name for p in pts), 3) if all(_collinear(c, tri) for c in comps)
    }
    shapes = _triangles(sheet)
    used = _lengths(claim)
    yield from _coincidences(pts)
    yield from _betweens(pts, straight)
    yield from _sides(pts, straight, _lines(sheet))
    yield from _angles(pts, straight, shapes, _corners(sheet))
    yield from _insides(pts, straight, shapes)
    yield from _lengths_compared(pts, used, shapes, _constants(sheet))
    yield from _convexes(sheet, pts)
    yield from _named_curves(pts, comps)
    if len(pts) <= 6:
        yield from _incidences(pts, straight)


def _incidences(pts: list[Pt], straight: set[tuple[str, ...]]) -> Iterator[Candidate]:
    for tri in combinations(pts, 3):
        if tuple(sorted(p.name for p in tri)) not in straight:
            yield Candidate(Relation("collinear", (tri,)), 1.8)
    for quad in combinations(pts, 4):
        yield Candidate(Relation("concyclic", (quad,)), 2.2)
        a, b, c, d = quad
        for one, two in (((a, b), (c, d)), ((a, c), (b, d)), ((a, d), (b, c))):
            yield Candidate(Relation("perpendicular_lines", (Through(one), Through(two))), 2.3)
            yield Candidate(Relation("parallel_lines", (Through(one), Through(two))), 2.3)


def _named_curves(pts: list[Pt], comps: Sequence[Component]) -> Iterator[Candidate]:
    """Points on the sheet's named lines and circles, and on the same side of a named line."""
    for name, curve in comps[0].curves.items() if comps else ():
        ref = Named(name)
        form = "on_line" if isinstance(curve, Straight) else "on_circle"
        for p in pts:
            yield Candidate(Relation(form, (p, ref)), 1.2)
        if isinstance(curve, Straight):
            for p, q in combinations(pts, 2):
                yield Candidate(Relation("same_side", (p, q, ref)), 1.3)
                yield Candidate(Relation("opposite_sides", (p, q, ref)), 1.3)


def says_the_same(c: Condition, claim: Condition) -> bool:
    """Whether a condition compares just what the claim compares: no news as a side condition."""
    if isinstance(c, (And, Or)):
        return any(says_the_same(x, claim) for x in c.args)
    if isinstance(c, Relation) and isinstance(claim, Relation):
        return c.form == claim.form and _places(c) == _places(claim)
    if not isinstance(c, Comparison) or not isinstance(claim, Comparison):
        return c == claim
    return _sides_of(c) == _sides_of(claim)


SYMMETRIC = ("parallel_lines", "perpendicular_lines", "collinear", "concyclic")


def _places(c: Relation) -> object:
    """The arguments of a relation, without order where the order says nothing."""
    if c.form not in SYMMETRIC:
        return c.args
    return frozenset(
        frozenset(map(str, a.points))
        if isinstance(a, Through)
        else frozenset(map(str, a))
        if isinstance(a, tuple)
        else a
        for a in c.args
    )


def _sides_of(c: Comparison) -> set[object]:
    return {_turned(q) for q in c.items}


def _turned(q: Quantity) -> object:
    """A length without the order of its ends."""
    if isinstance(q, Measure) and q.kind == "length":
        return frozenset(str(p) for p in q.points)
    return q


def _collinear(c: Component, tri: Sequence[str]) -> bool:
    if any(n not in c.points for n in tri):
        return False
    e: Element = orientation(*(c.points[n] for n in tri))
    return e.is_zero()


def _coincidences(pts: list[Pt]) -> Iterator[Candidate]:
    for a, b in combinations(pts, 2):
        yield Candidate(Relation("distinct", ((a, b),)), 1.2)


def _betweens(pts: list[Pt], straight: set[tuple[str, ...]]) -> Iterator[Candidate]:
    if len(pts) <= 5:
        for mid in pts:
            for u, v in combinations([p for p in pts if p != mid], 2):
                if tuple(sorted((u.name, v.name, mid.name))) not in straight:
                    yield Candidate(Relation("between", (mid, u, v)), 1.7)
                    yield Candidate(Relation("on_segment", (mid, (u, v))), 1.75)
    for tri in straight:
        for c in tri:
            a, b = (x for x in tri if x != c)
            inner = Relation("between", (Pt(c), Pt(a), Pt(b)))
            yield Candidate(inner, 1.0)
            ends = [Not(Relation("distinct", ((Pt(x), Pt(c)),))) for x in (a, b)]
            yield Candidate(Or((inner, *ends)), 1.35)
            for end in ends:
                yield Candidate(Or((inner, end)), 1.25)


def _sides(pts: list[Pt], straight: set[tuple[str, ...]], lines: set[tuple[str, ...]]) -> Iterator[Candidate]:
    for a, b in combinations(pts, 2):
        extra = 0.0 if tuple(sorted((a.name, b.name))) in lines else 0.4
        rest = [p for p in pts if p.name not in (a.name, b.name)]
        line = Through((a, b))
        for p, q in combinations(rest, 2):
            if any(tuple(sorted((a.name, b.name, x.name))) in straight for x in (p, q)):
                continue
            in_row = any(tuple(sorted((p.name, q.name, x.name))) in straight for x in (a, b))
            cost = 1.1 + extra + (2.2 if in_row else 0.0)
            yield Candidate(Relation("same_side", (p, q, line)), cost)
            yield Candidate(Relation("opposite_sides", (p, q, line)), cost)


def _angles(
    pts: list[Pt],
    straight: set[tuple[str, ...]],
    shapes: list[tuple[Pt, ...]],
    corners: set[tuple[str, ...]],
) -> Iterator[Candidate]:
    for tri in shapes:
        for size in ("acute", "obtuse", "right"):
            yield Candidate(Relation("triangle_size", (tri, size)), 0.9)
    named = {frozenset(p.name for p in tri) for tri in shapes}
    for tri in combinations(pts, 3):
        if tuple(sorted(p.name for p in tri)) in straight:
            continue
        extra = 0.0 if frozenset(p.name for p in tri) in named else 1.1
        for i in range(3):
            a = tri[i]
            b, c = tri[(i + 1) % 3], tri[(i + 2) % 3]
            more = 0.0 if {(b.name, a.name, c.name), (c.name, a.name, b.name)} & corners else extra
            for size in ("acute", "right", "obtuse"):
                yield Candidate(Relation("angle_size", ((b, a, c), size)), 1.0 + more)


def _insides(
    pts: list[Pt], straight: set[tuple[str, ...]], shapes: list[tuple[Pt, ...]]
) -> Iterator[Candidate]:
    named = {frozenset(p.name for p in tri) for tri in shapes}
    for tri in combinations(pts, 3):
        if tuple(sorted(p.name for p in tri)) in straight:
            continue
        extra = 0.0 if frozenset(p.name for p in tri) in named else 1.6
        for p in pts:
            if p in tri:
                continue
            on_side = any(tuple(sorted((p.name, *pair))) in straight for pair in _pairs(tri))
            cost = 0.9 + extra + (1.5 if on_side else 0.0)
            yield Candidate(Relation("inside", (p, tri)), cost)
            yield Candidate(Relation("outside", (p, tri)), cost)


def _pairs(tri: Sequence[Pt]) -> list[tuple[str, str]]:
    return [(a.name, b.name) for a, b in combinations(tri, 2)]


def _lengths_compared(
    pts: list[Pt], used: set[tuple[str, str]], shapes: list[tuple[Pt, ...]], numbers: set[Fraction]
) -> Iterator[Candidate]:
    sides = {tuple(sorted((a.name, b.name))) for tri in shapes for a, b in combinations(tri, 2)}
    pairs = list(combinations(pts, 2))
    if len(pairs) > 15:
        known = sides | used
        pairs = [p for p in pairs if (p[0].name, p[1].name) in known] or pairs[:10]
    for one, two in combinations(pairs, 2):
        extra = sum(0.3 for p in (one, two) if (p[0].name, p[1].name) not in sides)
        one_l, two_l = length(*one), length(*two)
        yield Candidate(Comparison((one_l, two_l), ("=",)), 1.3 + extra)
        yield Candidate(Comparison((one_l, two_l), ("<",)), 1.3 + extra)
        yield Candidate(Comparison((one_l, two_l), (">",)), 1.3 + extra)
    for k in sorted(numbers):
        for one, two in permutations(pairs, 2):
            if len({one[0].name, one[1].name, two[0].name, two[1].name}) == 4 and len(pairs) > 6:
                continue
            right = (
                Binary("/", length(*two), Number(1 / k))
                if (1 / k).denominator == 1
                else Binary("*", Number(k), length(*two))
            )
            yield Candidate(Comparison((length(*one), right), ("=",)), 1.9)


def _convexes(sheet: Sheet, pts: list[Pt]) -> Iterator[Candidate]:
    quads = [f.args[0] for f in _facts(sheet) if f.form == "quadrilateral"]
    if len(pts) == 4:
        quads.append(tuple(pts))
    for q in quads:
        assert isinstance(q, tuple)
        a, b, c, d = q
        for order in ((a, b, c, d), (a, c, b, d), (a, b, d, c)):
            yield Candidate(Relation("convex", (order,)), 0.9 if order == q else 1.2)


# ---------------------------------------------------------------- what the sheet mentions


def _facts(sheet: Sheet) -> list[Fact]:
    return [line.body for line in sheet.given if isinstance(line.body, Fact)]


def _mentioned(sheet: Sheet) -> set[str]:
    """Points of the claims."""
    out: set[str] = set()
    for line in sheet.claims:
        _names(line.body, out)
    return out


def _names(node: object, out: set[str]) -> None:
    if isinstance(node, Pt):
        out.add(node.name)
    elif isinstance(node, tuple):
        for x in node:
            _names(x, out)
    elif hasattr(node, "__dataclass_fields__"):
        for f in node.__dataclass_fields__:
            _names(getattr(node, f), out)


def _triangles(sheet: Sheet) -> list[tuple[Pt, ...]]:
    return [
        f.args[0]
        for f in _facts(sheet)
        if f.form.endswith("triangle") and f.form != "inside_triangle" and isinstance(f.args[0], tuple)
    ]


def _corners(sheet: Sheet) -> set[tuple[str, ...]]:
    """Corners of the sheet's polygons: neighbour, vertex, neighbour."""
    out: set[tuple[str, ...]] = set()
    for f in _facts(sheet):
        q = f.args[0]
        if isinstance(q, tuple) and len(q) >= 4 and f.form != "points":
            names = [p.name for p in q]
            out.update((names[i - 2], names[i - 1], names[i]) for i in range(len(names)))
    return out


def _lines(sheet: Sheet) -> set[tuple[str, ...]]:
    """Pairs of points that the sheet joins."""
    out: set[tuple[str, ...]] = set()

    def walk(node: object) -> None:
        if isinstance(node, tuple) and node and all(isinstance(p, Pt) for p in node):
            names = [p.name for p in node]
            if len(names) == 2:
                out.add(tuple(sorted(names)))
            if len(names) in (3, 4):
                ring = zip(names, names[1:] + names[:1], strict=True)
                out.update(tuple(sorted(x)) for x in ring)
        elif isinstance(node, tuple):
            for x in node:
                walk(x)
        elif hasattr(node, "__dataclass_fields__"):
            for f in node.__dataclass_fields__:
                walk(getattr(node, f))

    for line in (*sheet.given, *sheet.claims):
        walk(line.body)
    return out


def _lengths(node: object) -> set[tuple[str, str]]:
    """Lengths measured in a statement."""
    out: set[tuple[str, str]] = set()

    def walk(n: object) -> None:
        if isinstance(n, Measure) and n.kind == "length":
            a, b = sorted(str(p) for p in n.points)
            out.add((a, b))
        elif isinstance(n, tuple):
            for x in n:
                walk(x)
        elif hasattr(n, "__dataclass_fields__"):
            for f in n.__dataclass_fields__:
                walk(getattr(n, f))

    walk(node)
    return out


def _constants(sheet: Sheet) -> set[Fraction]:
    """Ratios written in the sheet, and their reciprocals."""
    out: set[Fraction] = set()

    def walk(q: Quantity) -> None:
        if isinstance(q, Binary):
            if q.op in "*/" and isinstance(q.right, Number) and q.right.value > 0:
                out.add(1 / q.right.value if q.op == "/" else q.right.value)
            if q.op == "*" and isinstance(q.left, Number) and q.left.value > 0:
                out.add(q.left.value)
            walk(q.left)
            walk(q.right)
        elif isinstance(q, Unary):
            walk(q.arg)

    for line in (*sheet.given, *sheet.claims):
        if isinstance(line.body, Comparison):
            for item in line.body.items:
                walk(item)
            if _repeats(line.body):
                out.add(Fraction(2))
    out.discard(Fraction(1))
    return out | {1 / k for k in out}


def _repeats(c: Comparison) -> bool:
    """Whether a length is written twice."""
    seen: list[object] = []

    def walk(q: Quantity) -> None:
        if isinstance(q, Measure):
            seen.append(_turned(q))
        elif isinstance(q, Binary):
            walk(q.left)
            walk(q.right)
        elif isinstance(q, Unary):
            walk(q.arg)

    for q in c.items:
        walk(q)
    return len(seen) != len(set(seen))


def all_of(cs: Sequence[Condition]) -> Condition:
    """Conjunction."""
    return cs[0] if len(cs) == 1 else And(tuple(cs))


def any_of(cs: Sequence[Condition]) -> Condition:
    """Disjunction."""
    return cs[0] if len(cs) == 1 else Or(tuple(cs))
