"""A placing that takes random rational parameters: a given figure in exact numbers, for tests."""

from __future__ import annotations

from fractions import Fraction
from random import Random

from surdwise_recheck.forms import run_given, run_step
from surdwise_recheck.forms_plane import Figure
from surdwise_recheck.protocol import Num, Undefined
from surdwise_recheck.tree import Sheet
from surdwise_recheck.witness import Checking


class Missed(Exception):
    """These parameters meet no figure of the sheet."""


class Constrained(Exception):
    """A hypothesis that random parameters do not meet."""


class Sampling(Checking):
    """Parameters and signs at random; once the figure is `done`, it is only checked.

    What was asked is in `labels`.
    """

    def __init__(self, random: Random) -> None:
        super().__init__()
        self.random = random
        self.labels: list[str] = []
        self.done = False

    def parameter(self, label: str, domain: str) -> Num:
        if self.done:
            return super().parameter(label, domain)
        value = Fraction(self.random.randint(1, 30), self.random.choice((7, 20, 90, 200)))
        self.labels.append(label)
        return self.number(-value if domain == "free" and self.random.random() < 0.5 else value)

    def at_missed(self) -> bool:
        return super().at_missed() if self.done else False

    def choose(self) -> int:
        return super().choose() if self.done else self.random.choice((1, -1))

    def require(self, e: Num, op: str, words: str) -> None:
        s = self.sign(e)
        if not self.done and not {">": s > 0, ">=": s >= 0, "!=": s != 0}[op]:
            raise Missed(words)
        super().require(e, op, words)

    def vanish(self, e: Num, words: str) -> None:
        if not self.done and not self.zero(e):
            raise Constrained(words)
        super().vanish(e, words)


def sample(sheet: Sheet, frame: str, random: Random, tries: int = 200) -> tuple[Figure, Sampling] | None:
    """A random figure of the sheet's given lines; None where a hypothesis or bad luck prevents it."""
    for _ in range(tries):
        numbers = Sampling(random)
        try:
            return run_given(sheet, numbers, frame), numbers
        except (Missed, Undefined):
            continue
        except Constrained:
            return None
    return None


def recheck(sheet: Sheet, figure: Figure, numbers: Sampling) -> None:
    """Check the points of a sampled figure against every given line; raises where one does not hold."""
    numbers.done = True
    bare = Figure(dict(figure.points))
    for i in range(len(sheet.given)):

        def step(i: int = i) -> None:
            trial = bare.copy()
            run_step(sheet, i, numbers, "cartesian", trial)
            bare.curves.update(trial.curves)

        numbers.ways(step)
