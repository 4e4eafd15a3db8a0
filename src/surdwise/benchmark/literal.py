"""A status against the literal verdict: does algebra's answer say what is true of lengths?"""

from __future__ import annotations

from enum import Enum

from ..thesis.parts import Status
from ..verdict.outcome import Verdict


class Agreement(Enum):
    """How a formulation's status relates to the literal verdict.

    AGREES: generally true and the claim holds; generally false and it fails; true on parts and it is
    conditional.  PARTIAL: true on parts, and the claim holds or fails: the question stays open.
    WRONG: generally true, and the claim is false on some admitted figure; or generally false, and it is
    true on admitted figures of full dimension.  OPEN: one of the two is not known.
    """

    AGREES = "agrees"
    PARTIAL = "partial"
    WRONG = "wrong"
    OPEN = "open"


_TABLE = {
    (Status.TRUE, Verdict.HOLDS): Agreement.AGREES,
    (Status.TRUE, Verdict.CONDITIONAL): Agreement.WRONG,
    (Status.TRUE, Verdict.FAILS): Agreement.WRONG,
    (Status.FALSE, Verdict.HOLDS): Agreement.WRONG,
    (Status.FALSE, Verdict.CONDITIONAL): Agreement.WRONG,
    (Status.FALSE, Verdict.FAILS): Agreement.AGREES,
    (Status.PARTS, Verdict.HOLDS): Agreement.PARTIAL,
    (Status.PARTS, Verdict.CONDITIONAL): Agreement.AGREES,
    (Status.PARTS, Verdict.FAILS): Agreement.PARTIAL,
}


def agreement(status: Status | None, verdict: Verdict | None) -> Agreement:
    """The agreement of a status with a verdict; None stands for not known."""
    if status is None or verdict is None:
        return Agreement.OPEN
    return _TABLE.get((status, verdict), Agreement.OPEN)
