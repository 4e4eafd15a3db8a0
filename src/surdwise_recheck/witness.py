"""Rule "witness": one figure in exact coordinates on which a statement is literally true, or false.

Every given line and every provided line is checked on the figure, then the statement, in exact real numbers.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from enum import Enum

from .conditions import truth
from .exact import Limits, OutOfReach, Real, Reals
from .exact_text import BadNumber, parse_real
from .forms import admitted, run_step
from .forms_plane import Figure, Vec
from .protocol import Num, Undefined
from .text import points_of
from .tree import Condition, Sheet


class Outcome(Enum):
    """What a check found."""

    ACCEPTED = "accepted"
    REJECTED = "rejected"
    INCOMPLETE = "incomplete"


@dataclass(frozen=True)
class Finding:
    """An outcome, with what was expected and what was found, in words."""

    outcome: Outcome
    expected: str
    found: str


class _Refused(Exception):
    """The figure does not meet a demand; the words say which."""


class _Fork(Exception):
    """A choice beyond those of this replay."""


class Checking(Reals):
    """Exact real numbers as a `Placing` over a figure whose points are all known: nothing is placed.

    Where a form may go two ways, the line is replayed for each (`ways`).
    """

    def __init__(self, limits: Limits | None = None) -> None:
        super().__init__(limits)
        self._choices: tuple[int, ...] = ()
        self._taken = 0

    def ways(self, action: Callable[[], None]) -> None:
        """Run the action along every sequence of choices until one meets all demands; the last refusal of
        a way if none does."""
        pending: list[tuple[int, ...]] = [()]
        refused: Exception | None = None
        while pending:
            self._choices, self._taken = pending.pop(), 0
            try:
                action()
                return
            except _Fork:
                pending += [(*self._choices, -1), (*self._choices, 1)]
            except (_Refused, Undefined) as e:
                refused = e
        assert refused is not None
        raise refused

    def begin_step(self, i: int) -> None:
        """Nothing to prepare."""

    def parameter(self, label: str, domain: str) -> Num:
        """No point of the figure may be missing."""
        raise _Refused(f"no {label}: a point is missing")

    def at_missed(self) -> bool:
        """As `parameter`."""
        raise _Refused("a point is missing")

    def choose(self) -> int:
        """The next choice of this replay."""
        if self._taken == len(self._choices):
            raise _Fork
        self._taken += 1
        return self._choices[self._taken - 1]

    def either_root(self, q: Num) -> Num:
        """A square root of either sign."""
        r: Real = self.root(q)
        return r * self.choose()

    def require(self, e: Num, op: str, words: str) -> None:
        """e > 0, e >= 0 or e != 0."""
        s = self.sign(e)
        if not {">": s > 0, ">=": s >= 0, "!=": s != 0}[op]:
            raise _Refused(words)

    def vanish(self, e: Num, words: str) -> None:
        """e = 0."""
        if not self.zero(e):
            raise _Refused(words)


def check_witness(
    sheet: Sheet,
    claim: Condition,
    points: Mapping[str, Sequence[str]],
    expected: bool,
    limits: Limits | None = None,
) -> Finding:
    """Whether the figure with these coordinates (point to the texts of x and y) is admitted by the sheet, and
    the claim is literally true (or false, as `expected` says) on it."""
    wanted = f"a figure of the sheet on which the claim is {_word(expected)}"
    try:
        found = _examine(sheet, claim, points, limits)
    except OutOfReach as e:
        return Finding(Outcome.INCOMPLETE, wanted, str(e))
    if found in ("true", "false"):
        outcome = Outcome.ACCEPTED if found == _word(expected) else Outcome.REJECTED
        return Finding(outcome, wanted, f"the claim is {found} on it")
    return Finding(Outcome.REJECTED, wanted, found)


def _word(t: bool) -> str:
    return "true" if t else "false"


def _examine(
    sheet: Sheet, claim: Condition, points: Mapping[str, Sequence[str]], limits: Limits | None
) -> str:
    """`true` or `false`; or in words what is wrong with the figure."""
    numbers = Checking(limits)
    wanted = points_of(sheet)
    if set(points) != wanted:
        return f"the points {', '.join(sorted(set(points) ^ wanted))} are missing or not of the sheet"
    placed: dict[str, Vec] = {}
    for name, texts in points.items():
        if len(texts) != 2:
            return f"{name} has {len(texts)} coordinates"
        try:
            x, y = (parse_real(t, numbers) for t in texts)
        except BadNumber as e:
            return f"{name}: {e}"
        placed[name] = Vec(x, y)
    figure = Figure(placed)
    for i, line in enumerate(sheet.given):
        try:
            numbers.ways(_step(sheet, i, numbers, figure))
        except (_Refused, Undefined) as e:
            return f"given {line.text}: {e}"
    try:
        if not admitted(sheet, figure, numbers):
            return "a provided line does not hold"
    except Undefined as e:
        return f"a provided line is not defined: {e}"
    try:
        return _word(truth(claim, figure, numbers))
    except Undefined as e:
        return f"the claim is not defined: {e}"


def _step(sheet: Sheet, i: int, numbers: Checking, figure: Figure) -> Callable[[], None]:
    def run() -> None:
        trial = figure.copy()
        run_step(sheet, i, numbers, "cartesian", trial)
        figure.curves.update(trial.curves)

    return run
