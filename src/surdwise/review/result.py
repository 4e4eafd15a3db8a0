"""One line of a review's outcome, as every output needs it."""

from __future__ import annotations

import json
from dataclasses import dataclass
from enum import Enum
from typing import Any

from ..verdict.outcome import Verdict
from .plan import Bad, Unit

BAD_SHEET = 2


class Kind(Enum):
    """How a claim counts where only passing or not matters."""

    PASS = "pass"
    FAILURE = "failure"
    ERROR = "error"


@dataclass(frozen=True)
class Result:
    """A claim with its answer, or a file that cannot be read.

    `name` is the file's name below the folder, `label` the claim (with what tells it from others of
    the file), `verdict` a verdict's word or `unreadable`, `message` one line and `details` a few on
    where the claim holds or why it is not settled; `data` is the JSON object.
    """

    name: str
    label: str
    verdict: str
    message: str
    details: str
    seconds: float
    data: dict[str, Any]

    @property
    def kind(self) -> Kind:
        """Pass for `holds`, failure for what is settled otherwise, error for what is not."""
        if self.verdict == "holds":
            return Kind.PASS
        return Kind.ERROR if self.verdict in ("undecided", UNREADABLE) else Kind.FAILURE

    @property
    def exit_code(self) -> int:
        """By the contract: 2 for a bad sheet, else the verdict's."""
        return BAD_SHEET if self.verdict == UNREADABLE else Verdict(self.verdict).exit_code

    def json(self) -> str:
        """The JSON object on one line."""
        return json.dumps(self.data, ensure_ascii=False)


UNREADABLE = "unreadable"


def answered(unit: Unit, answer: dict[str, Any]) -> Result:
    """The result of a claim whose answer is the object of `decide --json`."""
    data = {"file": unit.source.path, "sheet": unit.number}
    data.update({k: v for k, v in answer.items() if k != "file"})
    message = _message(answer)
    details = [message]
    if answer.get("explanation"):
        details.append(answer["explanation"])
    if answer.get("fails_at"):
        at = ", ".join(f"{n} = ({', '.join(p['exact'])})" for n, p in answer["fails_at"].items())
        details.append(f"false at {at}")
    details += [f"degenerate: {w}" for w in answer.get("degenerate", ())]
    title = unit.sheet.title or f"sheet {unit.number}"
    return Result(
        unit.source.name,
        f"{unit.number}.{unit.claim} {title}: {answer['claim']}",
        str(answer["verdict"]),
        message,
        "\n".join(details),
        float(answer["seconds"]),
        data,
    )


def _message(answer: dict[str, Any]) -> str:
    """Where the claim holds, or why that is not known, on one line."""
    condition, verdict = answer["condition"], answer["verdict"]
    if verdict == "conditional":
        return f"holds exactly when {condition}" if condition else "holds on a part of the figures only"
    if verdict == "fails":
        if condition == "never":
            return "holds on no admitted figure"
        return f"holds only when {condition}" if condition else "holds at most on a thin set"
    return str(answer["reason"])


def unreadable(bad: Bad) -> Result:
    """The result of a file that cannot be read."""
    data = {"file": bad.source.path, "sheet": None, "error": bad.text}
    first = bad.text.splitlines()[0] if bad.text else ""
    return Result(bad.source.name, "the sheet can be read", UNREADABLE, first, bad.text, 0.0, data)


def settled(answer: dict[str, Any]) -> bool:
    """Whether an answer would be the same under wider limits."""
    if answer["verdict"] == "undecided" or (answer["reason"] and answer["verdict"] != "empty"):
        return False
    return not any("not examined" in w for w in answer["degenerate"])


def worst(results: list[Result]) -> int:
    """Exit code for all results: 2 over 3 over 1 over 0."""
    codes = {r.exit_code for r in results}
    return next((c for c in (BAD_SHEET, 3, 1) if c in codes), 0)
