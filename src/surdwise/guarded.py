"""Deciding and rewriting in processes that are killed when their time or memory is up."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import replace
from typing import TYPE_CHECKING, Any

from .limits import LimitReached, run_guarded
from .sheet import Sheet, show

if TYPE_CHECKING:
    from .api import Rewriting
    from .thesis.parts import Form
    from .verdict.outcome import Decision

DEFAULT_SECONDS = 60.0
GRACE = 0.5  # seconds that the work has to come to its own stop before it is killed
REWRITING_SECONDS = 4.0

Tell = Callable[[str, Any], None]


def decided(
    sheet: Sheet,
    seconds: float | None = None,
    mebibytes: int | None = None,
    frame: str | None = None,
    progress: Callable[[str], None] | None = None,
) -> list[Decision]:
    """Decisions of one sheet, each claim in a process of its own; what was proved before a limit was
    reached is kept."""
    from .verdict.outcome import Decision, Verdict

    soft = DEFAULT_SECONDS if seconds is None else seconds
    out: list[Decision] = []
    for line in sheet.claims:
        one = replace(sheet, claims=(line,))
        try:
            out += run_guarded(
                _decide, one, soft, frame, seconds=soft + GRACE, mebibytes=mebibytes, progress=progress
            )
        except LimitReached as e:
            why = f"{e} ({soft:g} s)" if "time" in str(e) else str(e)
            known = e.partial or Decision(sheet.file, sheet.title, show(line.body), Verdict.UNDECIDED)
            out.append(replace(known, reason=f"{known.reason}{why}", seconds=soft))
    return out


def _decide(one: Sheet, soft: float, frame: str | None, tell: Tell) -> tuple[Decision, ...]:
    from .api import decide

    return decide(
        one,
        time_limit=soft,
        progress=lambda text: tell("progress", text),
        frame=frame,
        report=lambda known: tell("partial", known),
    )


def rewritten(sheet: Sheet, forms: Sequence[Form], seconds: float = REWRITING_SECONDS) -> list[Rewriting]:
    """Every claim of a sheet in the formulations that are written down in time: each is tried in a
    process that can be killed, since a product of many roots may be too large to wait for."""
    out = []
    for line in sheet.claims:
        one = replace(sheet, claims=(line,))
        late = []
        for form in forms:
            try:
                run_guarded(_tried, one, form, seconds=seconds)
            except LimitReached:
                late.append(form)
        out.append(_with_gaps(one, forms, late, seconds))
    return out


def _with_gaps(one: Sheet, forms: Sequence[Form], late: Sequence[Form], seconds: float) -> Rewriting:
    from .api import rewrite
    from .thesis.formulations import Formulation

    (r,) = rewrite(one, [f for f in forms if f not in late])
    why = f"not written down within {seconds:g} s"
    rest = tuple(Formulation(f, (), 0, 0, 0, 0, seconds, why) for f in late)
    order = list(forms)
    both = sorted((*r.formulations, *rest), key=lambda f: order.index(f.form))
    return replace(r, formulations=tuple(both))


def _tried(one: Sheet, form: Form, tell: Tell) -> None:
    from .api import rewrite

    rewrite(one, [form])
