"""The Python interface: read, decide, rewrite, compare, repair.

Everything returns typed, frozen objects; errors are `SurdwiseError`s whose text names file,
line, column and what to do.
"""

from __future__ import annotations

import os
from collections.abc import Callable, Sequence
from dataclasses import dataclass, field, replace
from pathlib import Path
from statistics import median

from .figure.program import frames_for
from .sheet import Sheet, SurdwiseError, read_file, read_text, show
from .sheet.tree import CentreOf, Comparison, Line, Named
from .thesis.export import EXPORTS, legend
from .thesis.formal import Thesis, thesis
from .thesis.formulations import Formulation, formulate
from .thesis.parts import Form
from .verdict.decide import decide_claim
from .verdict.outcome import Decision, Variant
from .verdict.repair import repaired


def read(source: str | os.PathLike[str]) -> tuple[Sheet, ...]:
    """Claim sheets from a path, or from text that contains a line break.

    Raises SurdwiseError for a sheet that cannot be read.
    """
    if isinstance(source, str) and "\n" in source:
        return read_text(source)
    return read_file(Path(source))


def decide(
    sheet: Sheet,
    *,
    time_limit: float = 60.0,
    progress: Callable[[str], None] = lambda text: None,
    frame: str | None = None,
    report: Callable[[Decision], None] = lambda known: None,
) -> tuple[Decision, ...]:
    """Decide every claim of a sheet; `time_limit` is in seconds for each claim, `frame` one of
    `frames_for(sheet)` or None for the cheapest; `report` is given what is proved early, for
    callers that may have to stop the work."""
    if frame is not None and frame not in frames_for(sheet):
        raise FrameError(f"expected one of {', '.join(frames_for(sheet))} as frame, got {frame}")
    return tuple(decide_claim(sheet, line, time_limit, progress, frame, report) for line in sheet.claims)


class FrameError(SurdwiseError):
    """A frame that cannot hold the sheet."""


def repair(sheet: Sheet, decisions: Sequence[Decision]) -> str:
    """The sheet with its side conditions added as `provided` lines; see verdict/repair.py."""
    return repaired(sheet, decisions)


@dataclass(frozen=True)
class Rewriting:
    """A claim in its formulations; `why_not` says why there are none."""

    claim: str
    thesis: Thesis | None
    formulations: tuple[Formulation, ...]
    why_not: str = ""
    statuses: dict[str, str] = field(default_factory=dict)
    variants: tuple[Variant, ...] = ()

    def foreign(self, form: Form) -> tuple[Variant, ...]:
        """Signed forms other than the claim that the formulation cannot tell from it, each with
        a real figure."""
        return tuple(v for v in self.variants if not v.as_written and form.value in v.admitted_by)

    def export(self, form: Form, to: str = "text") -> str:
        """One formulation as text, latex, sympy or singular."""
        assert self.thesis is not None
        return EXPORTS[to](self.thesis, next(f for f in self.formulations if f.form is form))

    def legend(self) -> list[str]:
        """What the symbols stand for."""
        return [] if self.thesis is None else legend(self.thesis)


def rewrite(
    sheet: Sheet, forms: Sequence[Form] = tuple(Form), *, decided: bool = False, time_limit: float = 60.0
) -> tuple[Rewriting, ...]:
    """Every claim of a sheet rewritten free of roots.  With `decided` the figure is decided too,
    and every formulation's algebraic status and foreign solutions are added."""
    out = []
    for line in sheet.claims:
        r = _rewritten(sheet, line, forms)
        if decided and r.thesis is not None:
            d = decide_claim(sheet, line, time_limit)
            r = replace(r, statuses=d.algebraic, variants=d.variants)
        out.append(r)
    return tuple(out)


def _rewritten(sheet: Sheet, line: Line, forms: Sequence[Form]) -> Rewriting:
    claim = line.body
    if not isinstance(claim, Comparison) or len(claim.ops) != 1:
        return Rewriting(show(claim), None, (), "not a single equality or inequality between quantities")
    from .figure.scale import keeps_scale

    if _names_a_curve(claim):
        # the polynomials are written over free points, which know no curve by its name
        return Rewriting(show(claim), None, (), "the claim speaks of a line or circle by its name")
    t = thesis(claim, points_of(claim), keeps_scale(sheet))
    return Rewriting(show(claim), t, tuple(formulate(t, f) for f in forms))


def _names_a_curve(node: object) -> bool:
    if isinstance(node, (Named, CentreOf)):
        return True
    if isinstance(node, tuple):
        return any(_names_a_curve(x) for x in node)
    if hasattr(node, "__dataclass_fields__"):
        return any(_names_a_curve(getattr(node, f)) for f in node.__dataclass_fields__)
    return False


def points_of(claim: Comparison) -> list[str]:
    """Names of the points of a claim, in order of appearance."""
    out: list[str] = []

    def walk(node: object) -> None:
        if isinstance(node, tuple):
            for x in node:
                walk(x)
        elif hasattr(node, "__dataclass_fields__"):
            name = getattr(node, "name", None)
            if isinstance(name, str) and type(node).__name__ == "Pt" and name not in out:
                out.append(name)
            for f in node.__dataclass_fields__:
                walk(getattr(node, f))

    walk(claim.items)
    return out


@dataclass(frozen=True)
class Cost:
    """Cost of one formulation: medians of repeated runs."""

    claim: str
    formulation: Formulation
    seconds: float
    spread: float


def compare(sheet: Sheet, repeat: int = 5) -> tuple[Cost, ...]:
    """Cost of every formulation of every equality of a sheet; seconds are medians of `repeat`
    runs in this process, spread is the largest minus the smallest."""
    out = []
    for line in sheet.claims:
        r = _rewritten(sheet, line, tuple(Form))
        if r.thesis is None:
            continue
        for f in r.formulations:
            runs = sorted(formulate(r.thesis, f.form).seconds for _ in range(repeat))
            out.append(Cost(r.claim, f, median(runs), runs[-1] - runs[0]))
    return tuple(out)


def _shown(name: str) -> Callable[[object], str]:
    """A display hook that loads the notebook room when it is called."""

    def hook(self: object) -> str:
        from . import notebook

        return str(getattr(notebook, name)(self))

    return hook


for _cls in (Sheet, Decision, Rewriting, Formulation):
    for _name, _kind in (("_repr_html_", "html"), ("_repr_latex_", "latex")):
        setattr(_cls, _name, _shown(_kind))
