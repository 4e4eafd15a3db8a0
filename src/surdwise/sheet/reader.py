"""Read claim sheets: text in, syntax trees out, or a SheetError that says what to mend."""

from __future__ import annotations

import os
import re
from collections.abc import Sequence
from dataclasses import dataclass, field

from .checks import check
from .errors import Problem, SheetError
from .names import check_names
from .parser import Parsed, Unexpected, parse
from .table import Table, load_table
from .tree import Condition, Fact, Line, Sheet, Span

KEYWORDS = ("title", "source", "given", "provided", "claim")
LARGEST = 1_000_000  # characters of a file

_LINE_END = re.compile(r"\r\n|\r|\n")
_CONTROL = re.compile("[\x00-\x08\x0b\x0c\x0e-\x1f\x7f-\x9f\ud800-\udfff]")
_SEPARATOR = re.compile(r"-{3,}")
_FIRST_WORD = re.compile(r"\S+")


@dataclass
class _Draft:
    """A sheet while its lines are read."""

    first: int
    texts: dict[str, tuple[str, int]] = field(default_factory=dict)
    lines: dict[str, list[Line]] = field(default_factory=lambda: {"given": [], "provided": [], "claim": []})
    given: list[Parsed] = field(default_factory=list)
    asked: list[Parsed] = field(default_factory=list)
    last: Span | None = None


def read_file(path: str | os.PathLike[str]) -> tuple[Sheet, ...]:
    """The sheets of a UTF-8 file (a byte order mark is accepted).

    Raises SheetError for whatever is wrong with the file or a line of it, and nothing else.
    """
    name = os.fspath(path)
    try:
        with open(name, "rb") as file:
            data = file.read(4 * LARGEST + 4)
    except FileNotFoundError:
        raise SheetError("expected a claim sheet, got no such file", name, hint=_similar_file(name)) from None
    except IsADirectoryError:
        hint = "name a file in it, or review the whole folder"
        raise SheetError("expected a claim sheet, got a folder", name, hint=hint) from None
    except PermissionError:
        raise SheetError("expected a claim sheet, got a file that may not be read", name) from None
    except (OSError, ValueError) as error:
        reason = error.strerror if isinstance(error, OSError) and error.strerror else str(error)
        raise SheetError(f"expected a claim sheet, got a file that cannot be read: {reason}", name) from None
    try:
        text = data.decode("utf-8")
    except UnicodeDecodeError as error:
        if len(data) > LARGEST:  # cut in the middle of a character, or no text at all
            raise _too_large(name) from None
        raise _not_utf8(data, error.start, name) from None
    return read_text(text, name)


def read_text(text: str, file: str = "<text>") -> tuple[Sheet, ...]:
    """The sheets of a text; `file` is the name used in messages.  Raises SheetError only."""
    if len(text) > LARGEST:
        raise _too_large(file)
    lines = _LINE_END.split(text.removeprefix("\ufeff"))
    try:
        return _read_lines(lines, file)
    except Problem as problem:
        raise _sheet_error(problem, lines, file) from None


def read_line(keyword: str, text: str) -> Fact | Condition:
    """The tree of one statement (what stands behind given, provided or claim), names unchecked.

    Raises SheetError.
    """
    if keyword not in KEYWORDS[2:]:
        raise SheetError(f"expected given, provided or claim, got {keyword}", "<text>")
    try:
        _check_characters([text])
        start, stop = _trim(text, 0)
        return _parse(load_table(), keyword, text, start, stop, 1).body
    except Problem as problem:
        raise _sheet_error(problem, [text], "<text>") from None


def _read_lines(lines: Sequence[str], file: str) -> tuple[Sheet, ...]:
    _check_characters(lines)
    table = load_table()
    sheets: list[Sheet] = []
    draft = _Draft(1)
    for number, source in enumerate(lines, 1):
        start, stop = _trim(source, 0)
        if start == stop:
            continue
        if _SEPARATOR.fullmatch(source, start, stop):
            if draft.last is not None:
                sheets.append(_finish(draft, lines, number, file))
            draft = _Draft(number + 1)
        else:
            _read_statement(draft, table, source, start, stop, number)
            draft.last = Span(number, start + 1, stop + 1)
    if draft.last is not None:
        sheets.append(_finish(draft, lines, len(lines) + 1, file))
    if not sheets:
        raise Problem(Span(1, 1, 2), "expected a claim sheet, got an empty file", _SHORTEST)
    return tuple(sheets)


_SHORTEST = "a sheet needs at least a `given` and a `claim` line"


def _check_characters(lines: Sequence[str]) -> None:
    for number, source in enumerate(lines, 1):
        found = _CONTROL.search(source)
        if found:
            code = ord(found.group())
            what = "a NUL character" if code == 0 else f"the control character U+{code:04X}"
            if 0xD800 <= code <= 0xDFFF:
                what = f"half a character, U+{code:04X}"
            span = Span(number, found.start() + 1, found.end() + 1)
            raise Problem(span, f"expected plain text, got {what}", "is this a claim sheet?")


def _trim(source: str, start: int) -> tuple[int, int]:
    """Where the text of a line begins and ends, spaces and comment left out."""
    comment = source.find("#", start)
    part = source[start : comment if comment >= 0 else len(source)]
    begin = start + (len(part) - len(part.lstrip()) if part.strip() else 0)
    return begin, max(begin, start + len(part.rstrip()))


def _read_statement(draft: _Draft, table: Table, source: str, start: int, stop: int, number: int) -> None:
    match = _FIRST_WORD.match(source, start, stop)
    keyword = match.group() if match else ""
    if keyword not in KEYWORDS:
        from .keywords import unknown_keyword

        raise unknown_keyword(table, source, start, stop, number)
    begin, stop = _trim(source, start + len(keyword))
    span = Span(number, begin + 1, stop + 1)
    text = source[begin:stop]
    if keyword in ("title", "source"):
        if not text:
            raise Problem(
                Span(number, stop + 1, stop + 2), f"expected a text behind `{keyword}`, got nothing"
            )
        if keyword in draft.texts:
            message = f"expected one `{keyword}` a sheet, got a second"
            hint = f"the first is in line {draft.texts[keyword][1]}; sheets are separated by a line ---"
            raise Problem(Span(number, start + 1, start + len(keyword) + 1), message, hint)
        draft.texts[keyword] = (text, number)
        return
    parsed = _parse(table, keyword, source, begin, stop, number)
    (draft.given if keyword == "given" else draft.asked).append(parsed)
    draft.lines[keyword].append(Line(keyword, text, parsed.body, span))


def _parse(table: Table, keyword: str, source: str, begin: int, stop: int, number: int) -> Parsed:
    try:
        parsed = parse(table, keyword, source, begin, stop, number)
    except Unexpected as failure:
        from .explain import Statement, explain

        raise explain(table, Statement(keyword, source, begin, stop, number), failure) from None
    check(parsed.body)
    return parsed


def _finish(draft: _Draft, lines: Sequence[str], end: int, file: str) -> Sheet:
    """The sheet of a draft that ends before line `end`."""
    assert draft.last is not None
    for keyword in ("given", "claim"):
        if not draft.lines[keyword]:
            last = draft.last
            message = f"expected a `{keyword}` line in this sheet, got none up to here"
            raise Problem(Span(last.line, last.end, last.end + 1), message, _SHORTEST)
    check_names(draft.given, draft.asked)
    return Sheet(
        file=file,
        title=draft.texts.get("title", ("", 0))[0],
        source=draft.texts.get("source", ("", 0))[0],
        given=tuple(draft.lines["given"]),
        provided=tuple(draft.lines["provided"]),
        claims=tuple(draft.lines["claim"]),
        text="\n".join(lines[draft.first - 1 : end - 1]).rstrip("\n") + "\n",
    )


def _sheet_error(problem: Problem, lines: Sequence[str], file: str) -> SheetError:
    span = problem.span
    source = lines[span.line - 1] if 0 < span.line <= len(lines) else ""
    return SheetError(problem.message, file, span.line, span.column, span.end, source, problem.hint)


def _too_large(file: str) -> SheetError:
    message = f"expected a sheet of at most {LARGEST} characters, got a larger file"
    return SheetError(message, file, hint="split it into several files")


def _not_utf8(data: bytes, offset: int, file: str) -> SheetError:
    before = _LINE_END.split(data[:offset].decode("utf-8", "replace").removeprefix("\ufeff"))
    rest = _LINE_END.split(data[offset:].decode("utf-8", "replace"), 1)[0]
    column = len(before[-1]) + 1
    message = f"expected UTF-8 text, got the byte 0x{data[offset]:02X} at offset {offset}"
    hint = "save the file as UTF-8"
    if data[:2] in (b"\xff\xfe", b"\xfe\xff"):
        hint = "this is UTF-16: save the file as UTF-8"
    return SheetError(message, file, len(before), column, column + 1, before[-1] + rest, hint)


def _similar_file(name: str) -> str:
    """A hint at a file of a similar name in the same folder, or ""."""
    from .nearest import nearest

    folder, base = os.path.split(name)
    try:
        names = os.listdir(folder or ".")
    except (OSError, ValueError):
        return ""
    found = nearest(base, names, 0.75)
    return f"did you mean {os.path.join(folder, found)}?" if found else ""
