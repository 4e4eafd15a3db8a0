"""The repaired sheet: every conditional claim with its side condition as `provided`."""

from __future__ import annotations

from collections.abc import Sequence

from ..sheet.tree import Sheet
from .outcome import Decision, Verdict


def repaired(sheet: Sheet, decisions: Sequence[Decision]) -> str:
    """Text of one or more sheets, separated by `---`: the claims that hold as they are, and
    each conditional claim with the condition that makes it hold.  What cannot be repaired is
    left as a comment."""
    head = [f"title {sheet.title}"] if sheet.title else []
    if sheet.source:
        head.append(f"source {sheet.source}")
    figure = [f"given {line.text}" for line in sheet.given]
    figure += [f"provided {line.text}" for line in sheet.provided]
    out: list[str] = []
    holding = [d for d in decisions if d.verdict is Verdict.HOLDS]
    lost = [f"# not repaired ({d.verdict.value}): {d.claim}" for d in decisions if not _mendable(d)]
    if holding:
        out.append("\n".join([*head, *figure, *(f"claim {d.claim}" for d in holding)]))
    for d in decisions:
        if d.verdict is Verdict.CONDITIONAL and _mendable(d):
            out.append("\n".join([*head, *figure, f"provided {d.condition}", f"claim {d.claim}"]))
    return "\n---\n".join(out) + "\n" + "".join(x + "\n" for x in lost)


def _mendable(d: Decision) -> bool:
    if d.verdict is Verdict.HOLDS:
        return True
    return d.verdict is Verdict.CONDITIONAL and d.condition is not None and not d.in_frame
