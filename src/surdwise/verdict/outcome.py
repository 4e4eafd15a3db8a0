"""What a decision consists of: verdicts, witness figures, links, variants."""

from __future__ import annotations

from dataclasses import dataclass, field
from enum import Enum


class Verdict(Enum):
    """The answer to one claim."""

    HOLDS = "holds"
    CONDITIONAL = "conditional"
    FAILS = "fails"
    EMPTY = "empty"
    UNDECIDED = "undecided"

    @property
    def exit_code(self) -> int:
        """Process exit code of the verdict."""
        return {"holds": 0, "undecided": 3}.get(self.value, 1)


@dataclass(frozen=True)
class PlacedPoint:
    """A point of a witness figure: exact coordinates as text, and floats (17 digits)."""

    exact: tuple[str, str]
    float: tuple[float, float]


Figure = dict[str, PlacedPoint]


@dataclass(frozen=True)
class ComponentReport:
    """One component of the hypotheses: degree over the parameters, algebraic status of the
    claim on it, how lengths are signed on its real figures, whether it has real figures."""

    degree: int
    status: str
    signs: str
    real: bool


@dataclass(frozen=True)
class Variant:
    """A signed form of the claim that holds on a set of full dimension, and where.

    `as_written` marks the claim itself; `admitted_by` names the formulations that cannot tell
    the form from the claim: for them it is a foreign solution, `holds_at` a real figure of it.
    """

    claim: str
    condition: str | None
    exact: bool
    holds_at: Figure | None
    as_written: bool
    admitted_by: tuple[str, ...]


@dataclass(frozen=True)
class Link:
    """One link of a chain, with its own answer."""

    claim: str
    verdict: Verdict
    condition: str | None
    equality: str | None
    holds_at: Figure | None
    fails_at: Figure | None


@dataclass(frozen=True)
class Decision:
    """The full answer to one claim; fields as in the command's JSON."""

    file: str
    title: str
    claim: str
    verdict: Verdict
    condition: str | None = None
    equality: str | None = None
    degenerate: tuple[str, ...] = ()
    algebraic: dict[str, str] = field(default_factory=dict)
    components: tuple[ComponentReport, ...] = ()
    variants: tuple[Variant, ...] = ()
    links: tuple[Link, ...] = ()
    holds_at: Figure | None = None
    fails_at: Figure | None = None
    parameters: tuple[str, ...] = ()
    frame: str = ""
    seconds: float = 0.0
    certificate: str | None = None
    reason: str = ""
    explanation: str = ""
    in_frame: bool = False
    sharp: str | None = None
