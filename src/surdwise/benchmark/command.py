"""What the command `surdwise compare` does with a benchmark: print, write files."""

from __future__ import annotations

import os
from collections.abc import Callable, Sequence
from pathlib import Path

from ..sheet.errors import SurdwiseError
from ..sheet.tree import Sheet
from .measure import Options
from .page import html
from .run import Benchmark, benchmark
from .show import csv_text, json_lines, text


class OutputError(SurdwiseError):
    """A file that cannot be written."""


def compare(
    sheets: Sequence[Sheet],
    engines: Sequence[str],
    options: Options,
    *,
    csv: Path | None = None,
    jsonl: Path | None = None,
    html_page: Path | None = None,
    resume: bool = False,
    progress: Callable[[str], None] = lambda text: None,
) -> tuple[Benchmark, str]:
    """Run a benchmark, write the files asked for, return it with its text for a terminal.

    The journal stands beside the JSON lines as FILE.journal and is removed when all is measured.
    Raises EngineError, JournalError, OutputError.
    """
    if resume and jsonl is None:
        raise OutputError("expected --jsonl FILE with --resume: the journal stands beside it, got none")
    for path in (csv, jsonl, html_page):
        if path is not None and not path.parent.is_dir():
            raise OutputError(f"expected a folder {path.parent} to write {path.name} in, got none")
    journal = None if jsonl is None else jsonl.with_name(jsonl.name + ".journal")
    b = benchmark(sheets, engines, options, journal, resume, progress)
    for path, make in ((csv, csv_text), (jsonl, json_lines), (html_page, html)):
        if path is not None:
            _write(path, make(b))
    if journal is not None:
        journal.unlink(missing_ok=True)
    return b, text(b)


def _write(path: Path, content: str) -> None:
    new = path.with_name(f".{path.name}.new")
    try:
        new.write_text(content, encoding="utf-8")
        os.replace(new, path)
    except OSError as e:
        raise OutputError(f"expected to write {path}, got: {e.strerror}") from None
