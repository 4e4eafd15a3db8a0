"""Relations and conditions in words: what must vanish, and what sign must be what.

`equations` serves hypotheses (each element must vanish) and `truth` serves conditions and
theses at one real figure, through a `Judge` that proves signs.  Exact.
"""

from __future__ import annotations

from abc import abstractmethod
from collections.abc import Callable
from itertools import combinations
from typing import Any

from ..field.tower import Element
from ..sheet.tree import And, Comparison, Condition, Not, Or, Pt, Relation
from .plane import Vec, cross, dot, square
from .quantities import difference
from .reader import Reader


class Judge(Reader):
    """A reader that can tell the sign of an element at its figure."""

    @abstractmethod
    def sign(self, e: Element) -> int:
        """Proved sign of e: -1, 0 or 1."""

    @abstractmethod
    def weak_sign(self, e: Element) -> int:
        """The same, for a comparison that admits equality."""

    @abstractmethod
    def polynomial(self, p: Any) -> Element:
        """The value of a polynomial in the frame's parameters."""

    @abstractmethod
    def zero(self, e: Element) -> bool:
        """Whether e vanishes on the whole cell of the figure."""


# ---------------------------------------------------------------- what must vanish


def _collinear(r: Reader, pts: tuple[Pt, ...]) -> list[Element]:
    return [r.turn(a, b, c) for a, b, c in combinations(pts, 3)]


def _concyclic(r: Reader, pts: tuple[Pt, ...]) -> list[Element]:
    return [r.circle_test(pts[0], pts[1], pts[2], d) for d in pts[3:]]


def _parallel(r: Reader, a: Any, b: Any) -> list[Element]:
    return [r.kept(("cross", a, b), lambda: cross(r.line(a).direction, r.line(b).direction))]


def _perpendicular(r: Reader, a: Any, b: Any) -> list[Element]:
    return [r.kept(("dot", a, b), lambda: dot(r.line(a).direction, r.line(b).direction))]


EQUATIONS: dict[str, Callable[..., list[Element]]] = {
    "collinear": _collinear,
    "concyclic": _concyclic,
    "parallel_lines": _parallel,
    "perpendicular_lines": _perpendicular,
    "on_line": lambda r, p, line: [r.offset(p, line)],
    "on_circle": lambda r, p, k: _on_circle(r, r.at(p), r.circle(k)),
}


def _on_circle(r: Reader, p: Vec, k: Any) -> list[Element]:
    return [square(p - k.centre) - k.radius2]


def equations(rel: Relation, r: Reader) -> list[Element] | None:
    """Elements that vanish exactly when the relation holds; None if it is not of this kind."""
    fn = EQUATIONS.get(rel.form)
    return None if fn is None else fn(r, *rel.args)


# ---------------------------------------------------------------- truth at a figure


def truth(c: Condition, j: Judge) -> bool:
    """Whether the condition holds on the judge's figure."""
    if isinstance(c, Not):
        return not truth(c.arg, j)
    if isinstance(c, And):
        return all(truth(x, j) for x in c.args)
    if isinstance(c, Or):
        return any(truth(x, j) for x in c.args)
    if isinstance(c, Comparison):
        return all(compare(c.items[i], op, c.items[i + 1], j) for i, op in enumerate(c.ops))
    if c.form == "concyclic":
        return _on_some_circle(j, c.args[0])
    eqs = equations(c, j)
    if eqs is not None:
        return all(j.zero(e) for e in eqs)
    return CONDITIONS[c.form](j, *c.args)


def _on_some_circle(j: Judge, pts: Any) -> bool:
    """Whether some circle carries all the points.

    Coinciding points count once: where the first three are in line, those left are looked at, of
    which one or two always have a circle and three in line have none.
    """
    if j.zero(j.turn(*pts[:3])):
        apart: list[Pt] = []
        for p in pts:
            if not any(j.zero(j.gap2(p, q)) for q in apart):
                apart.append(p)
        if len(apart) < 3:
            return True
        if j.zero(j.turn(*apart[:3])):
            return False
        pts = apart
    return all(j.zero(j.circle_test(pts[0], pts[1], pts[2], d)) for d in pts[3:])


def compare(left: Any, op: str, right: Any, j: Judge) -> bool:
    """One link of a comparison."""
    e = difference(left, right, j)
    if op == "=":
        return j.zero(e)
    if op in ("<", ">"):
        return j.sign(e) == (1 if op == ">" else -1)
    return j.weak_sign(e) != (-1 if op == ">=" else 1)


_OPEN = {
    "between",
    "inside",
    "outside",
    "same_side",
    "opposite_sides",
    "convex",
    "distinct",
}
# concyclic points may tend to points in line, which are on no circle
_CLOSED = {*EQUATIONS, "on_segment", "on_ray", "is_equilateral", "is_isosceles"} - {"concyclic"}


def is_open(c: Condition) -> bool:
    """Whether small movements of a figure keep the condition true (within the equations that
    hold identically)."""
    if isinstance(c, Not):
        return is_closed(c.arg)
    if isinstance(c, (And, Or)):
        return all(is_open(x) for x in c.args)
    if isinstance(c, Comparison):
        return all(op in ("<", ">") for op in c.ops)
    return c.form in _OPEN or c.args[-1] in ("acute", "obtuse")


def is_closed(c: Condition) -> bool:
    """Whether the condition passes to limits of figures on which everything in it is defined."""
    if isinstance(c, Not):
        return is_open(c.arg) and not (isinstance(c.arg, Relation) and c.arg.form == "between")
    if isinstance(c, (And, Or)):
        return all(is_closed(x) for x in c.args)
    if isinstance(c, Comparison):
        return all(op in ("=", "<=", ">=") for op in c.ops)
    return c.form in _CLOSED


def _between(j: Judge, c: Pt, a: Pt, b: Pt) -> bool:
    return j.zero(j.turn(a, b, c)) and j.sign(j.lean(c, a, b)) < 0


def _orients(j: Judge, p: Pt, tri: tuple[Pt, ...]) -> tuple[int, list[int]]:
    a, b, c = tri
    whole = j.sign(j.turn(a, b, c))
    return whole, [j.sign(j.turn(x, y, p)) * whole for x, y in ((a, b), (b, c), (c, a))]


def _inside(j: Judge, p: Pt, tri: tuple[Pt, ...]) -> bool:
    whole, signs = _orients(j, p, tri)
    return whole != 0 and all(s > 0 for s in signs)


def _outside(j: Judge, p: Pt, tri: tuple[Pt, ...]) -> bool:
    whole, signs = _orients(j, p, tri)
    return whole != 0 and any(s < 0 for s in signs)


def _side_product(j: Judge, p: Pt, q: Pt, line: Any) -> int:
    a = j.sign(j.offset(p, line))
    return a and a * j.sign(j.offset(q, line))


def _apart(j: Judge, a: Pt, b: Pt) -> None:
    j.differ(j.at(a), j.at(b), f"{a} = {b}")


def _angle(j: Judge, b: Pt, a: Pt, c: Pt) -> str:
    _apart(j, a, b)
    _apart(j, a, c)
    return {1: "acute", 0: "right", -1: "obtuse"}[j.sign(j.lean(a, b, c))]


def _triangle_size(j: Judge, tri: tuple[Pt, ...], size: str) -> bool:
    a, b, c = tri
    corners = ((c, a, b), (a, b, c), (b, c, a))
    if size == "acute":
        return all(_angle(j, *x) == "acute" for x in corners)
    return any(_angle(j, *x) == size for x in corners)


def _convex(j: Judge, quad: tuple[Pt, ...]) -> bool:
    n = len(quad)
    signs = {j.sign(j.turn(quad[i], quad[(i + 1) % n], quad[(i + 2) % n])) for i in range(n)}
    return len(signs) == 1 and 0 not in signs


def _distinct(j: Judge, pts: tuple[Pt, ...]) -> bool:
    return not any(j.zero(j.gap2(a, b)) for a, b in combinations(pts, 2))


def _on_segment(j: Judge, p: Pt, pair: tuple[Pt, ...]) -> bool:
    a, b = pair
    return j.zero(j.turn(a, b, p)) and j.weak_sign(j.lean(p, a, b)) <= 0


def _on_ray(j: Judge, p: Pt, pair: tuple[Pt, ...]) -> bool:
    a, b = pair
    _apart(j, a, b)
    return j.zero(j.turn(a, b, p)) and j.weak_sign(j.lean(a, p, b)) >= 0


def _is_equilateral(j: Judge, tri: tuple[Pt, ...]) -> bool:
    a, b, c = tri
    return j.zero(j.gap2(a, b) - j.gap2(b, c)) and j.zero(j.gap2(b, c) - j.gap2(c, a))


def _is_isosceles(j: Judge, tri: tuple[Pt, ...], apex: Pt) -> bool:
    b, c = (x for x in tri if x.name != apex.name)
    return j.zero(j.gap2(apex, b) - j.gap2(apex, c))


def _frame_sign(j: Judge, p: Any, op: str) -> bool:
    """A comparison of a polynomial in the frame's parameters with zero; false where a parameter
    has no value, at the one position that a parametrisation leaves out."""
    try:
        e = j.polynomial(p)
    except KeyError:
        return False
    if op == "=":
        return j.zero(e)
    return j.sign(e) == (1 if op == ">" else -1)


CONDITIONS: dict[str, Callable[..., bool]] = {
    "frame_sign": _frame_sign,
    "between": _between,
    "inside": _inside,
    "outside": _outside,
    "same_side": lambda j, p, q, line: _side_product(j, p, q, line) > 0,
    "opposite_sides": lambda j, p, q, line: _side_product(j, p, q, line) < 0,
    "angle_size": lambda j, tri, size: _angle(j, *tri) == size,
    "triangle_size": _triangle_size,
    "convex": _convex,
    "distinct": _distinct,
    "on_segment": _on_segment,
    "on_ray": _on_ray,
    "is_equilateral": _is_equilateral,
    "is_isosceles": _is_isosceles,
}
