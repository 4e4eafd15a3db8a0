"""A placing that takes random rational parameters: a given figure in exact numbers, for tests."""

from __future__ import annotations

from fractions import Fraction
from random import Random

from surdwise_recheck.exact import Reals
from surdwise_recheck.forms import run_given
from surdwise_recheck.forms_plane import Figure
from surdwise_recheck.protocol import Num, Undefined
from surdwise_recheck.tree import Sheet


class Missed(Exception):
    """These parameters meet no figure of the sheet."""


class Constrained(Exception):
    """A hypothesis that random parameters do not meet."""


class Sampling(Reals):
    """Parameters at random, signs at random; what it was asked is in `labels`."""

    def __init__(self, random: Random) -> None:
        super().__init__()
        self.random = random
        self.labels: list[str] = []

    def begin_step(self, i: int) -> None:
        self.step = i

    def parameter(self, label: str, domain: str) -> Num:
        value = Fraction(self.random.randint(1, 30), self.random.choice((7, 20, 90, 200)))
        self.labels.append(label)
        return self.number(-value if domain == "free" and self.random.random() < 0.5 else value)

    def at_missed(self) -> bool:
        return False

    def choose(self) -> int:
        return self.random.choice((1, -1))

    def either_root(self, q: Num) -> Num:
        return self.root(q) * self.choose()

    def require(self, e: Num, op: str, words: str) -> None:
        s = self.sign(e)
        if not {">": s > 0, ">=": s >= 0, "!=": s != 0}[op]:
            raise Missed(words)

    def vanish(self, e: Num, words: str) -> None:
        if not self.zero(e):
            raise Constrained(words)


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
