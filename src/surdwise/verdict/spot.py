"""One real figure of a component: literal signs, and a register of what they depend on.

A spot reads quantities with every length non-negative.  Each sign it settles is entered, by
the irreducible factors of the norm of the element, in the component's register: inside a cell
that avoids them all, every spot of the same branch settles every sign alike.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field
from fractions import Fraction
from typing import Any

from ..field import cells, ring, roots
from ..field.ball import ball_of, branch_parameters, number, polynomial
from ..field.definite import steady_factors
from ..field.near import NearBranch
from ..field.real import Branch, Unsettled
from ..field.ring import Poly
from ..field.tower import Element
from ..figure.base import Base, plug
from ..figure.component import READ, Component
from ..figure.conditions import Judge
from ..figure.plane import Curve, Round, Straight, Vec, square

# what a border that keeps the sign still is: an equation may hold on it, samples keep off it
_STEADY = {"open": "thin", "closed": "thin", "fold": "avoid", "domain": "avoid"}
CELL = frozenset({"figure", "domain", "fold", "open", "closed"})


class Undefined(Exception):
    """A quantity of the statement has no value on this figure; the words say why."""


@dataclass
class Register:
    """Border polynomials of a component by key, each with the kinds of its origins.

    `figure`: the construction changes; `domain`: a square root stops being defined; `fold`:
    the inside of an absolute value changes sign; `open`, `closed`: a strict or weak comparison
    does; `thin`: an equation holds there only; `avoid`: samples keep off it, no more.  All but
    the last two bound cells.
    """

    polys: dict[str, Poly] = field(default_factory=dict)
    kinds: dict[str, set[str]] = field(default_factory=dict)
    done: dict[tuple[str, str, int], Element] = field(default_factory=dict)

    def enter(self, kind: str, factors: dict[str, Poly]) -> None:
        """Add polynomials under a kind."""
        for name, p in factors.items():
            self.polys[name] = p
            self.kinds.setdefault(name, set()).add(kind)

    def borders(self) -> list[Poly]:
        """What cells must avoid."""
        return [p for n, p in self.polys.items() if self.kinds[n] & CELL]

    def count(self) -> int:
        """How many bounding polynomials are known."""
        return sum(1 for n in self.polys if self.kinds[n] & CELL)

    def read_by(self, origin: str) -> bool:
        """Whether anything was read for this origin (samples' own bans aside)."""
        return any(
            k.startswith(f"{origin}:") and k != f"{origin}:avoid" for ks in self.kinds.values() for k in ks
        )

    def of(self, kinds: Sequence[str]) -> dict[str, Poly]:
        """Polynomials with one of the kinds."""
        return {n: p for n, p in self.polys.items() if self.kinds[n] & set(kinds)}


class Spot(Judge):
    """A real figure: one branch of one component over one sample."""

    def __init__(self, comp: Component, branch: Branch, register: Register) -> None:
        self.comp = comp
        self.branch = branch
        self.register = register
        self.origin = "thesis"
        self._roots: dict[str, Element] = {}
        self._signs: dict[int, tuple[Element, int]] = {}
        self.doubts: dict[str, Element] = {}

    def doubtful(self) -> set[str]:
        """What the statements read so far must not meet, in words: divisors and coinciding points
        that the figure's own requirements do not exclude."""
        shut: set[str] = set()
        for r in self.comp.requires:
            if r.op in ("!=", ">"):
                shut |= set(self._factors(r.element))
        return {w for w, e in self.doubts.items() if not set(self._factors(e)) <= shut}

    def kept(self, name: object, make: Callable[[], Element]) -> Element:
        """An element that depends on no sign, computed once for the component."""
        if name not in self.comp.kept:
            self.comp.kept[name] = make()
        return self.comp.kept[name]

    # ------------------------------------------------------------------ signs

    def _enter(self, kind: str, e: Element) -> None:
        name = kind, self.origin, id(e)
        if name in self.register.done:
            return
        self.register.done[name] = e  # kept alive, so that its identity stays its own
        found = self._factors(e)
        if kind in _STEADY:
            steady = self._steady(e)
            calm = {n: p for n, p in found.items() if n in steady}
            found = {n: p for n, p in found.items() if n not in steady}
            self._register(_STEADY[kind], calm)
        self._register(kind, found)

    def _register(self, kind: str, found: dict[str, Poly]) -> None:
        self.register.enter(kind, found)
        self.register.enter(f"{self.origin}:{kind}", found)

    def _steady(self, e: Element) -> frozenset[str]:
        """Borders that an element without generators touches and keeps its sign."""
        if ring.has_gens(e.num):
            return frozenset()
        name = e.key()
        if name not in self.comp.steady:
            self.comp.steady[name] = steady_factors(e.num, e.den, self.comp.positive)
        return self.comp.steady[name]

    def _factors(self, e: Element) -> dict[str, Poly]:
        """Irreducible factors of the norm and the denominator that can vanish."""
        name = e.key()
        if name not in self.comp.factors:
            whole = Element(self.comp.tower, e.num, e.den)
            found = {**roots.norm_factors(whole), **roots.denominator_factors(whole)}
            self.comp.factors[name] = {
                n: p for n, p in found.items() if not cells.never_zero(p, self.comp.positive)
            }
        return self.comp.factors[name]

    def _sign(self, e: Element, kind: str) -> int:
        if e.is_zero():
            return 0
        if e.is_rational():
            return 1 if e.as_rational() > 0 else -1
        self._enter(kind, e)
        known = self._signs.get(id(e))
        if known is None:
            known = e, self.branch.sign(Element(self.comp.tower, e.num, e.den))
            self._signs[id(e)] = known
        return known[1]

    def sign(self, e: Element) -> int:
        """Sign on the whole cell."""
        return self._sign(e, "open")

    def weak_sign(self, e: Element) -> int:
        """Sign on the whole cell, for a comparison that admits equality."""
        return self._sign(e, "closed")

    def zero(self, e: Element) -> bool:
        """Whether e vanishes identically on the component (elsewhere only on a thin set)."""
        if e.is_zero():
            return True
        if not e.is_rational():
            self._enter("thin", e)
        return False

    # ------------------------------------------------------------------ reading

    def absolute(self, e: Element) -> Element:
        """|e| by the sign of e at the spot."""
        if e.is_zero():
            return e
        return e * self._sign(e, "fold")

    def root(self, q: Element) -> Element:
        """Literal square root; Undefined where q is negative."""
        if q.is_zero():
            return q
        name = q.key()
        if name not in self._roots:
            self._roots[name] = self._root(q)
        return self._roots[name]

    def nonnegative(self, q: Element) -> None:
        """Undefined where q is negative."""
        if self._sign(q, "domain") < 0:
            raise Undefined("a square root of a negative quantity")

    def _root(self, q: Element) -> Element:
        r = roots.sqrt(q, self.comp.tower)
        if r is not None:
            return self.absolute(r)
        self.comp.tower, r = self.comp.tower.adjoin_sqrt(q, "positive", READ)
        orient = self.comp.tower.gens[-1].orient
        if not ring.is_constant(orient):
            self._enter("fold", self.comp.tower.element(orient))
        return r

    def divide(self, a: Element, b: Element, words: str) -> Element:
        """a/b; Undefined where b vanishes identically."""
        if b.is_zero():
            raise Undefined(words)
        if b.is_rational():
            return a / b
        self._enter("thin", b)
        self.doubts[words] = b
        name = "1/" + b.key()
        if name not in self.comp.memo:
            self.comp.memo[name] = Element(self.comp.tower, b.num, b.den).inverse()
        return a * self.comp.memo[name]

    def differ(self, a: Vec, b: Vec, words: str) -> None:
        """Undefined where two points coincide."""
        d = square(a - b)
        if d.is_zero():
            raise Undefined(words)
        if not d.is_rational():
            self._enter("avoid", d)
            self.doubts[words] = d

    def polynomial(self, p: Poly) -> Element:
        """A polynomial of the frame's parameters; KeyError for one without a value here."""
        for k in ring.params_in(p):
            if k not in self.comp.free and k not in self.comp.values:
                raise KeyError(k)
        return plug(p, Base(self.comp.tower, self.comp.values))

    def admitted(self, conditions: Sequence[Callable[[Judge], bool]]) -> bool:
        """Whether the component's requirements and the sheet's conditions hold here."""
        self.origin = "admission"
        try:
            for r in self.comp.requires:
                e = r.element
                if r.op == "!=":
                    if e.is_zero():
                        return False
                    continue
                s = self._sign(e, "open" if r.op == ">" else "closed")
                if s < 0 or (s == 0 and r.op == ">"):
                    return False
            return all(c(self) for c in conditions)
        finally:
            self.origin = "thesis"


class Lone(Spot):
    """A spot that stands for itself and its near neighbours only: what its truth depends on is not
    registered.  Everything it meets is proved to be off zero at the sample itself."""

    def __init__(self, comp: Component, branch: Branch) -> None:
        super().__init__(comp, branch, Register())

    def _enter(self, kind: str, e: Element) -> None:
        """Unsettled where an element that is not identically zero vanishes at the sample."""
        if kind in ("thin", "avoid"):
            self.branch.sign(Element(self.comp.tower, e.num, e.den))

    def admitted(self, conditions: Sequence[Callable[[Judge], bool]]) -> bool:
        """Whether the figure itself is admitted."""
        for r in self.comp.requires:
            if r.op == "!=" and not r.element.is_zero():
                self._enter("avoid", r.element)
        return super().admitted(conditions)


class Hint(Judge):
    """A judge that guesses: the whole figure in approximate numbers.  For proposals that are
    proved afterwards, never for a verdict."""

    def __init__(self, comp: Component, value: Callable[[Element], Any], parameters: dict[int, Any]) -> None:
        def vec(v: Vec) -> Vec:
            return Vec(value(v.x), value(v.y))

        points = {n: vec(v) for n, v in comp.points.items()}
        curves: dict[str, Curve] = {}
        for n, c in comp.curves.items():
            if isinstance(c, Straight):
                curves[n] = Straight(vec(c.point), vec(c.direction))
            else:
                curves[n] = Round(vec(c.centre), value(c.radius2), vec(c.start))
        self.comp = Component(comp.tower, {}, (), points, curves)
        self._kept: dict[object, Any] = {}
        self.parameters = {**parameters, **{k: value(e) for k, e in comp.values.items()}}

    def kept(self, name: object, make: Callable[[], Any]) -> Any:
        """A number that depends on no sign, computed once."""
        if name not in self._kept:
            self._kept[name] = make()
        return self._kept[name]

    def zero(self, e: Any) -> bool:
        """Whether the number is taken for zero."""
        return self.sign(e) == 0

    def weak_sign(self, e: Any) -> int:
        """The same as `sign`."""
        return self.sign(e)

    def absolute(self, e: Any) -> Any:
        """|e|."""
        return e * self.sign(e)

    def divide(self, a: Any, b: Any, words: str) -> Any:
        """a/b."""
        if self.sign(b) == 0:
            raise Undefined(words)
        return a / b

    def differ(self, a: Vec, b: Vec, words: str) -> None:
        """Undefined where two points coincide."""
        if self.sign(square(a - b)) == 0:
            raise Undefined(words)


class BallHint(Hint):
    """Numbers are balls of some 150 digits; tiny balls about zero are taken for zero."""

    def __init__(self, comp: Component, branch: Branch | NearBranch) -> None:
        super().__init__(comp, lambda e: ball_of(e, branch), branch_parameters(branch))

    def number(self, value: int | Fraction) -> Any:
        """A rational constant."""
        return number(value)

    def sign(self, e: Any) -> int:
        """Sign by one ball."""
        s: int | None = e.sign()
        if s is None:
            raise Unsettled("too near zero to guess")
        return s

    def root(self, q: Any) -> Any:
        """Square root; Undefined for a negative number."""
        if self.sign(q) < 0:
            raise Undefined("a square root of a negative quantity")
        return q.root()

    def polynomial(self, p: Poly) -> Any:
        """A polynomial of the frame's parameters."""
        return polynomial(p, self.parameters)


class FloatHint(Hint):
    """Numbers are floats; what is below 1e-9 is taken for zero."""

    def number(self, value: int | Fraction) -> Any:
        """A rational constant."""
        return float(value)

    def sign(self, e: Any) -> int:
        """Sign of a float."""
        return 0 if abs(e) < 1e-9 else 1 if e > 0 else -1

    def root(self, q: Any) -> Any:
        """Square root; Undefined for a negative number."""
        if q < -1e-9:
            raise Undefined("a square root of a negative quantity")
        return math.sqrt(max(q, 0.0))

    def polynomial(self, p: Poly) -> Any:
        """Not read by a search."""
        raise KeyError(p)
