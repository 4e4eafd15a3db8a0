"""What a lemma gives a decision: an inequality that needs no further proof, and a plain statement
of its equality case."""

from __future__ import annotations

from dataclasses import dataclass

from ..figure.conditions import Judge
from ..sheet.tree import Comparison, Condition, Quantity
from .survey import Statement


@dataclass(frozen=True)
class Lemma:
    """`sign` times (left - right) is never negative on an admitted figure, and zero exactly
    where `equal` is true (None: never).  `words` is the proof in a sentence."""

    left: Quantity
    right: Quantity
    sign: int
    equal: Statement | None
    words: str

    def statement(self, c: Condition) -> Statement | None:
        """A statement equivalent to a comparison of the same two quantities, else None."""
        if not isinstance(c, Comparison) or c.items != (self.left, self.right) or len(c.ops) != 1:
            return None
        op = c.ops[0]
        if op == "=":
            return self._equal
        if op in ("<=", ">="):
            return _always if (op == ">=") == (self.sign > 0) else self._equal
        return self._unequal if (op == ">") == (self.sign > 0) else _never

    def _equal(self, j: Judge) -> bool:
        return self.equal is not None and self.equal(j)

    def _unequal(self, j: Judge) -> bool:
        return not self._equal(j)


def _always(j: Judge) -> bool:
    return True


def _never(j: Judge) -> bool:
    return False
