"""A figure under construction, and the builder through which constructions speak.

A component is one branch of the figure's algebra: a tower, the points and curves placed so
far, and the real conditions it must meet (`requires`).  Constructions are straight-line code
over a `Builder`; where a sign or a root is two-valued the builder forks, and the step is
replayed once for every sequence of choices.  A hypothesis that does not vanish identically
kills the component and reports the strata of parameter space where it can hold.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass, field
from typing import Any

from ..field import cells, ring, roots
from ..field.ring import Poly
from ..field.tower import Element, Tower
from ..sheet.tree import Pt, Through
from .plane import Curve, Round, Straight, Vec, square
from .reader import Reader

CHARTS = 16  # more than any step has missed positions
READ = "length"  # label of square roots adjoined by readers of a finished component


@dataclass(frozen=True)
class Require:
    """A real condition on an element: `op` is one of > >= != (against zero)."""

    element: Element
    op: str
    words: str = ""


@dataclass(frozen=True)
class Guard:
    """A denominator of the construction, with what its vanishing means in words."""

    element: Element
    words: str


class Dead(Exception):
    """This component admits no figure of full dimension; the reason is in words."""


class _Fork(Exception):
    """A choice is needed that the replay does not have yet."""


@dataclass
class Component:
    """One component of the figure so far; `asked` are the parameters that its steps used.

    `memo`, `kept`, `eliminations`, `boxes`, `factors` and `steady` keep what was found while the finished
    component is read; a component under construction has none of it, since its branches differ.
    """

    tower: Tower
    values: dict[int, Element]
    free: tuple[int, ...]
    points: dict[str, Vec] = field(default_factory=dict)
    curves: dict[str, Curve] = field(default_factory=dict)
    requires: tuple[Require, ...] = ()
    guards: tuple[Guard, ...] = ()
    positive: frozenset[int] = frozenset()
    folded: frozenset[int] = frozenset()
    asked: frozenset[int] = frozenset()
    memo: dict[str, Element] = field(default_factory=dict)
    kept: dict[object, Element] = field(default_factory=dict)
    eliminations: cells.Eliminations = field(default_factory=cells.Eliminations)
    boxes: dict[object, list[Any]] = field(default_factory=dict)
    factors: dict[str, dict[str, Poly]] = field(default_factory=dict)
    steady: dict[str, frozenset[str]] = field(default_factory=dict)

    def ground(self) -> Tower:
        """The tower of the figure itself, without lengths that readers adjoined since."""
        n = sum(1 for g in self.tower.gens if g.label != READ)
        return self.tower.lower(n)

    def copy(self) -> Component:
        """A component that can be built on without touching this one."""
        return Component(
            self.tower,
            self.values,
            self.free,
            dict(self.points),
            dict(self.curves),
            self.requires,
            self.guards,
            self.positive,
            self.folded,
            self.asked,
        )


@dataclass
class Frame:
    """What the placement of first points uses: parameters by step, and how scale is fixed.

    The first point goes to the origin and the second distinct one to (1, 0), or to (w, 0) with
    w > 0 where the sheet speaks of absolute lengths; the first point off that line has y > 0.
    Every figure is similar (congruent, for absolute lengths) to one so placed, since a
    similarity moves any two distinct points there and a reflection in the x-axis settles
    the sign of y: no figure is lost.
    """

    keeps_scale: bool
    kind: str = "cartesian"
    slots: dict[tuple[int, int], int] = field(default_factory=dict)
    labels: dict[int, str] = field(default_factory=dict)
    whole: set[int] = field(default_factory=set)
    halved: set[int] = field(default_factory=set)

    # `halved` are parameters that every run so far asked to be non-negative; `whole` the others

    def slot(self, step: int, j: int, label: str) -> int:
        """The parameter of the j-th request of a step, the same at every run."""
        k = self.slots.setdefault((step, j), len(self.slots))
        ring.param(k)
        self.labels.setdefault(k, label)
        return k


class Builder(Reader):
    """One step of one component along one sequence of choices."""

    def __init__(
        self, comp: Component, frame: Frame, step: int, choices: tuple[int, ...], missed: frozenset[int]
    ) -> None:
        self.comp = comp.copy()
        self.frame = frame
        self.step = step
        self._choices = choices
        self._taken = 0
        self._asked = 0
        self.missed = missed
        self.strata: dict[str, Poly] = {}
        self.charts: list[int] = []

    # ------------------------------------------------------------------ numbers

    def param(self, label: str, positive: bool = False, folded: bool = False) -> Element:
        """A new parameter of this step.  `positive`: it ranges over (0, oo); `folded`: over
        [0, oo), the point zero being examined as a stratum of its own."""
        k = self.frame.slot(self.step, self._asked, label)
        self._asked += 1
        self.comp.asked |= {k}
        (self.frame.halved if positive or folded else self.frame.whole).add(k)
        self.frame.halved -= self.frame.whole
        if k in self.comp.values:
            e = self.comp.values[k]
            if positive or folded:
                self.require(e, ">" if positive else ">=", f"{label} positive")
            return e
        if positive or folded:
            self.comp.positive |= {k}
        if folded:
            self.comp.folded |= {k}
        if k not in self.comp.free:
            self.comp.free = (*self.comp.free, k)
        return self.comp.tower.param(k)

    def known_sign(self, e: Element) -> int:
        """Sign of e where it is plain (a number, or coefficients of one sign); else 0."""
        if e.is_zero():
            return 0
        a = cells.known_sign(e.num, self.comp.positive)
        return a * cells.known_sign(e.den, self.comp.positive)

    def choose(self) -> int:
        """Fork: +1 on one replay, -1 on another."""
        if self._taken < len(self._choices):
            self._taken += 1
            return self._choices[self._taken - 1]
        raise _Fork

    def absolute(self, e: Element) -> Element:
        """|e|, forking on the sign of e unless it is plain."""
        if e.is_zero():
            return e
        s = self.known_sign(e)
        if s == 0:
            s = self.choose()
            self.require(e * s, ">=", "sign of a length")
        return e * s

    def root(self, q: Element) -> Element:
        """The non-negative square root of q, with q >= 0 required."""
        if q.is_zero():
            return q
        r = roots.sqrt(q, self.comp.tower)
        if r is not None:
            return self.absolute(r)
        s = self.known_sign(q)
        if s < 0:
            raise Dead("a square root of a negative quantity")
        self.comp.tower, r = self.comp.tower.adjoin_sqrt(q, "positive", f"step {self.step}")
        return r

    def nonnegative(self, q: Element) -> None:
        """Demand q >= 0."""
        self.require(q, ">=", "a square root of a negative quantity")

    def either_root(self, d: Element) -> Element:
        """Any real square root of d: two components if d is a square, else one extension."""
        if d.is_zero():
            return d
        r = roots.sqrt(d, self.comp.tower)
        if r is not None:
            return r * self.choose()
        if self.known_sign(d) < 0:
            raise Dead("two curves that do not meet in a real point")
        self.comp.tower, r = self.comp.tower.adjoin_sqrt(d, "either", f"step {self.step}")
        return r

    def divide(self, a: Element, b: Element, words: str) -> Element:
        """a/b; b is recorded as a guard, in words of the figure."""
        if b.is_zero():
            raise Dead(words)
        if not self.known_sign(b):
            self.comp.guards = (*self.comp.guards, Guard(b, words))
        return a / b

    def require(self, e: Element, op: str, words: str) -> None:
        """Demand a real condition; contradictions in numbers kill the component at once."""
        s = self.known_sign(e)
        if e.is_zero() or s:
            if {">": s > 0, ">=": s >= 0, "!=": s != 0}[op]:
                return
            raise Dead(words)
        self.comp.requires = (*self.comp.requires, Require(e, op, words))

    def vanish(self, e: Element, words: str) -> None:
        """A hypothesis e = 0: it holds identically, or the strata where it can are reported
        and the component dies."""
        if e.is_zero():
            return
        if not self.known_sign(e):
            for name, p in roots.norm_factors(Element(self.comp.tower, e.num, e.den)).items():
                if not cells.never_zero(p, self.comp.positive):
                    self.strata[name] = p
        raise Dead(words)

    # ------------------------------------------------------------------ figure

    def has(self, name: str) -> bool:
        """Whether a point of this name is placed."""
        return name in self.comp.points

    def put(self, ref: Pt, v: Vec) -> None:
        """Place a new point, or demand that a placed one lies there."""
        if ref.name in self.comp.points:
            d = self.comp.points[ref.name] - v
            self.vanish(d.x, f"{ref.name} is placed twice, at different places")
            self.vanish(d.y, f"{ref.name} is placed twice, at different places")
            return
        self.comp.points[ref.name] = v

    def free_point(self, ref: Pt, shape: Sequence[Pt] = (), off_line: bool = False) -> None:
        """Place a free point by the frame.

        It differs by hypothesis from the points of `shape` (its own shape's other vertices), and
        with `off_line` it is on no line through two of them; it may fall on any other point and line.
        """
        c = self.comp
        zero, one = self.number(0), self.number(1)
        origin = Vec(zero, zero)
        if not c.points:
            c.points[ref.name] = origin
            return
        mates = [c.points[q.name] for q in shape if q.name != ref.name and q.name in c.points]
        if all(square(v).is_zero() for v in c.points.values()):
            if not mates and self.at_missed_chart():
                c.points[ref.name] = origin
                return
            if self.frame.keeps_scale:
                one = self.param(f"|{next(iter(c.points))}{ref.name}|", positive=True)
            c.points[ref.name] = Vec(one, zero)
            return
        x = self.param(f"x of {ref.name}")
        if all(v.y.is_zero() for v in c.points.values()):
            off = off_line and any(not (v.x - mates[0].x).is_zero() for v in mates[1:])
            y = self.param(f"y of {ref.name}", positive=off, folded=not off)
        else:
            y = self.param(f"y of {ref.name}")
        c.points[ref.name] = Vec(x, y)

    def circle_through(self, a: Pt, b: Pt, c: Pt) -> Round:
        """Circumcircle of three points."""
        return self.circle(Through((a, b, c)))

    def line_of(self, pair: tuple[Pt, ...]) -> Straight:
        """The line through two points."""
        return self.line(Through(pair))

    def at_missed_chart(self) -> bool:
        """Whether this run takes the one position that a parametrisation leaves out.  A step may have
        several of them, each with a number of its own."""
        chart = self.step * CHARTS + len(self.charts)
        self.charts.append(chart)
        return chart in self.missed

    def differ(self, a: Vec, b: Vec, words: str) -> None:
        """Demand that two points differ (a line through them is meant)."""
        self.require(square(b - a), "!=", words)


def outcomes(
    comp: Component,
    frame: Frame,
    step: int,
    missed: frozenset[int],
    action: Callable[[Builder], None],
) -> Iterable[tuple[Builder, str | None]]:
    """All replays of one step: pairs of the builder and None, or the reason it died."""
    pending: list[tuple[int, ...]] = [()]
    while pending:
        choices = pending.pop()
        b = Builder(comp, frame, step, choices, missed)
        try:
            action(b)
        except _Fork:
            pending += [(*choices, -1), (*choices, 1)]
        except Dead as e:
            yield b, str(e)
        except ZeroDivisionError:
            yield b, "a denominator that vanishes identically"
        else:
            yield b, None
