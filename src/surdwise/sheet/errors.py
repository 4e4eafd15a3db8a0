"""What goes wrong, said so that it can be put right: place, expectation, next step."""

from __future__ import annotations

import unicodedata

from .tree import Span

WIDEST = 160  # columns of a source line shown in a message


class SurdwiseError(Exception):
    """Base of every error that surdwise raises on purpose."""


class SheetError(SurdwiseError):
    """A claim sheet that cannot be read.

    Line and columns count characters from 1; `end` is the column after the place.  Line 0
    means the file as a whole.  `source` is the line itself, `hint` what to do next.
    """

    def __init__(
        self,
        message: str,
        file: str = "",
        line: int = 0,
        column: int = 0,
        end: int = 0,
        source: str = "",
        hint: str = "",
    ) -> None:
        super().__init__(message, file, line, column, end, source, hint)
        self.message = message
        self.file = file
        self.line = line
        self.column = column
        self.end = end
        self.source = source
        self.hint = hint

    def __str__(self) -> str:
        where = f"{self.file}:{self.line}:{self.column}" if self.line else self.file
        parts = [visible(f"{where}: {self.message}" if where else self.message)]
        if self.line:
            parts.extend(excerpt(self.source, self.column, self.end))
        if self.hint:
            parts.append(visible(self.hint))
        return "\n".join(parts)


class Problem(SurdwiseError):
    """Something wrong at a place of a statement; reader.py makes a SheetError of it."""

    def __init__(self, span: Span, message: str, hint: str = "") -> None:
        super().__init__(message)
        self.span = span
        self.message = message
        self.hint = hint


def visible(text: str) -> str:
    """The text with everything that would not print as itself replaced by U+FFFD."""
    return "".join(c if c.isprintable() or c == "\t" else "\ufffd" for c in text)


def excerpt(source: str, column: int, end: int) -> tuple[str, str]:
    """The source line and a line of carets under columns column..end-1, cut to fit a screen."""
    line = visible(source)
    start = min(max(column - 1, 0), len(line))
    stop = min(max(end - 1, start + 1), max(len(line), start + 1))
    lead, tail = "", ""
    if len(line) > WIDEST:
        first = max(0, min(start - WIDEST // 3, len(line) - WIDEST))
        last = first + WIDEST
        lead, tail = "…" if first else "", "…" if last < len(line) else ""
        line = line[first:last]
        start, stop = start - first, min(stop - first, WIDEST + 1)
    indent = "".join(c if c == "\t" else " " * width(c) for c in lead + line[:start])
    carets = "^" * max(1, sum(width(c) for c in line[start:stop]))
    return lead + line + tail, indent + carets


def width(character: str) -> int:
    """Columns a character takes on a terminal: 0, 1 or 2 (a tab counts as 1 under a caret)."""
    if unicodedata.category(character) in ("Mn", "Me"):
        return 0
    return 2 if unicodedata.east_asian_width(character) in "WF" else 1
