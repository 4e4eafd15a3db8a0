"""Rule "finite": all admitted figures of a sheet without a free parameter, one after the other.

Every choice of every line is made both ways (two meets of a line and a circle, the two sides of an
apex, a free point on or off the point before it), in exact real numbers.  The list is complete, since
each form's placement loses no figure up to similarity and reflection; a line that asks for a
parameter makes the rule say `incomplete`.
"""

from __future__ import annotations

from collections.abc import Iterator

from .conditions import truth
from .exact import Limits, OutOfReach, Real, Reals
from .forms import admitted, run_step
from .forms_plane import Figure
from .protocol import Num, Undefined
from .tree import Condition, Sheet

MOST_FIGURES = 4096


class NotFinite(Exception):
    """The figure has a free parameter; the words name it."""


class _Dead(Exception):
    """This sequence of choices leads to no figure."""


class _Fork(Exception):
    """A choice beyond those of this replay."""


class Listing(Reals):
    """Exact real numbers as a `Placing` along one sequence of choices."""

    def __init__(self, choices: tuple[int, ...], limits: Limits | None) -> None:
        super().__init__(limits)
        self._choices = choices
        self._taken = 0

    def begin_step(self, i: int) -> None:
        """Nothing to prepare."""

    def choose(self) -> int:
        """The next choice of this replay."""
        if self._taken == len(self._choices):
            raise _Fork
        self._taken += 1
        return self._choices[self._taken - 1]

    def parameter(self, label: str, domain: str) -> Num:
        """There is none in a finite figure."""
        raise NotFinite(label)

    def at_missed(self) -> bool:
        """Both: the position that a placement leaves out is a figure of its own."""
        return self.choose() < 0

    def either_root(self, q: Num) -> Num:
        """A square root of either sign; no figure where q is negative."""
        if self.sign(q) < 0:
            raise _Dead
        if self.zero(q):
            return q
        r: Real = self.root(q)
        return r * self.choose()

    def require(self, e: Num, op: str, words: str) -> None:
        """e > 0, e >= 0 or e != 0."""
        s = self.sign(e)
        if not {">": s > 0, ">=": s >= 0, "!=": s != 0}[op]:
            raise _Dead

    def vanish(self, e: Num, words: str) -> None:
        """e = 0."""
        if not self.zero(e):
            raise _Dead


def truths(sheet: Sheet, statements: list[Condition], limits: Limits | None) -> Iterator[list[bool]]:
    """The truth of every statement on every admitted figure (a figure may come more than once).

    Raises NotFinite for a sheet with a free parameter, OutOfReach past the limits.  A statement that is
    undefined on a figure takes it out of the admitted ones if it is the first (the claim).
    """
    pending: list[tuple[int, ...]] = [()]
    count = 0
    while pending:
        choices = pending.pop()
        count += 1
        if count > MOST_FIGURES:
            raise OutOfReach(f"more than {MOST_FIGURES} sequences of choices")
        numbers = Listing(choices, limits)
        figure = Figure()
        try:
            for i in range(len(sheet.given)):
                run_step(sheet, i, numbers, "cartesian", figure)
            if admitted(sheet, figure, numbers):
                yield [truth(s, figure, numbers) for s in statements]
        except _Fork:
            pending += [(*choices, -1), (*choices, 1)]
        except (_Dead, Undefined):
            continue
