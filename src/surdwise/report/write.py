"""From a file of claim sheets to a file with their sign-off page."""

from __future__ import annotations

import sys
from collections.abc import Callable
from pathlib import Path

from ..guarded import REWRITING_SECONDS, Tell, decided, rewritten
from ..jsonform import worst
from ..limits import LimitReached, run_guarded
from ..sheet import Sheet, SurdwiseError, read_file
from ..thesis.parts import Form
from ..verdict.outcome import Decision
from .maps import SECONDS
from .page import Galley, build_all
from .parts import CertificateNote

BAD_SHEET = 2
Answers = list[tuple[Sheet, tuple[Decision, ...]]]
SUFFIXES = {".html": "html", ".htm": "html", ".tex": "tex"}


def write_report(
    sheet_path: Path,
    out_path: Path,
    time_limit: float = 60.0,
    memory_limit: int | None = None,
    *,
    frame: str | None = None,
    certificate: CertificateNote | None = None,
    progress: Callable[[str], None] = lambda text: None,
) -> int:
    """Decide every claim of a file and write one page for them all; the exit code of the verdicts.

    `time_limit` is in seconds for each claim, `memory_limit` in MiB for each claim's work.  A bad
    sheet or an unknown suffix is told on stderr and gives 2; nothing is written then.
    """
    to = SUFFIXES.get(Path(out_path).suffix.lower())
    if to is None:
        print(f"expected a file name ending in .html or .tex, got {out_path}", file=sys.stderr)
        return BAD_SHEET
    try:
        sheets = read_file(Path(sheet_path))
    except SurdwiseError as e:
        print(e, file=sys.stderr)
        return BAD_SHEET
    answers: Answers = []
    for sheet in sheets:
        progress(f"deciding {sheet.title or sheet.file}")
        answers.append((sheet, tuple(decided(sheet, time_limit, memory_limit, frame))))
    progress("drawing")
    Path(out_path).write_text(_page(answers, to, certificate, time_limit, memory_limit), encoding="utf-8")
    return worst([d.verdict for _, ds in answers for d in ds])


def _page(
    answers: Answers, to: str, certificate: CertificateNote | None, time_limit: float, mebibytes: int | None
) -> str:
    """The page; formulations and maps are made in a process that can be killed, and left out if
    they take too long."""
    claims = sum(len(ds) for _, ds in answers)
    drawing = min(SECONDS, max(time_limit, 1.0))
    seconds = claims * (3 * drawing + (len(Form) + 1) * REWRITING_SECONDS)
    try:
        page: str = run_guarded(
            _whole, answers, to, certificate, drawing, seconds=seconds, mebibytes=mebibytes
        )
    except LimitReached:
        galleys = [Galley(sheet, ds) for sheet, ds in answers]
        page = build_all(galleys, to, certificate, map_seconds=0)
    return page


def _whole(answers: Answers, to: str, certificate: CertificateNote | None, drawing: float, tell: Tell) -> str:
    galleys = []
    for sheet, decisions in answers:
        rewritings = tuple(rewritten(sheet, list(Form)))
        galleys.append(Galley(sheet, decisions, rewritings))
    return build_all(galleys, to, certificate, map_seconds=drawing)
