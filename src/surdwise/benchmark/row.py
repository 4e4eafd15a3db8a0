"""One line of the result: a claim, a formulation, an engine, what it cost and what it answered."""

from __future__ import annotations

from dataclasses import asdict, dataclass, fields, replace
from typing import Any

from ..thesis.parts import Status
from ..verdict.outcome import Verdict
from .literal import Agreement, agreement


@dataclass(frozen=True)
class Row:
    """Seconds are medians over the counted runs with the least and the greatest: `write` to write
    the formulation down (for elimination: the engine's own elimination), `answer` for the engine's answer.
    `memory` is the peak of a run beyond its start, in MiB.  `end` is done, time, memory, error or none
    (the claim cannot be put to an engine); `words` say what went wrong; `runs` were counted."""

    file: str
    title: str
    sheet: int
    claim: str
    number: int
    formulation: str
    engine: str
    end: str
    words: str
    runs: int
    parameters: int | None = None
    components: int | None = None
    radicals: int | None = None
    unknowns: int | None = None
    degree: int | None = None
    terms: int | None = None
    digits: int | None = None
    write: float | None = None
    write_least: float | None = None
    write_most: float | None = None
    answer: float | None = None
    answer_least: float | None = None
    answer_most: float | None = None
    memory: float | None = None
    status: str | None = None
    literal: str | None = None
    agreement: str = Agreement.OPEN.value

    @property
    def seconds(self) -> float | None:
        """Writing down and answering together."""
        return None if self.write is None or self.answer is None else self.write + self.answer

    def against(self, literal: str | None) -> Row:
        """The row with the literal verdict beside it."""
        status = None if self.status is None else Status(self.status)
        verdict = None if literal is None else Verdict(literal)
        return replace(self, literal=literal, agreement=agreement(status, verdict).value)

    def data(self) -> dict[str, Any]:
        """Plain data, in the order of the fields."""
        return asdict(self)

    @staticmethod
    def of(data: dict[str, Any]) -> Row:
        """A row of plain data; raises TypeError for other data."""
        return Row(**data)


COLUMNS = tuple(f.name for f in fields(Row))
