"""Say what is wrong with a line that starts with no keyword."""

from __future__ import annotations

import re

from .errors import Problem
from .nearest import nearest
from .parser import Unexpected, parse
from .table import Table
from .tree import Span

KEYWORDS = ("title", "source", "given", "provided", "claim")
_MEANT = {
    "given": "let suppose assume hypothesis hypotheses figure construct draw take with",
    "provided": "where when if condition conditions assuming case such restrict",
    "claim": "prove show thesis then conclusion theorem statement proposition goal conclude so therefore",
    "title": "name heading",
    "source": "from printed reference origin",
}
_LIKE_SEPARATOR = re.compile(r"[-=_*–—]+")
_WORD = re.compile(r"[^\W\d_]+")


def unknown_keyword(table: Table, source: str, start: int, stop: int, line: int) -> Problem:
    """The problem with a line whose first word is not a keyword."""
    first = source[start:stop].split(maxsplit=1)[0]
    shown = first if len(first) <= 40 else first[:39] + "…"
    span = Span(line, start + 1, start + len(first) + 1)
    message = f"expected title, source, given, provided or claim, got `{shown}`"
    return Problem(span, message, _hint(table, source, start, stop, first))


def _hint(table: Table, source: str, start: int, stop: int, first: str) -> str:
    if _LIKE_SEPARATOR.fullmatch(first):
        return "sheets are separated by a line ---"
    match = _WORD.match(first)
    word = match.group().lower() if match else ""
    if word in KEYWORDS:
        rest = first[len(word) :]
        if not rest:
            return f"did you mean `{word}`? (keywords are lower case)"
        return (
            f"write `{word}` and a space, without {rest[0]}"
            if not rest[0].isalnum()
            else f"did you mean `{word}`?"
        )
    text = source[start:stop]
    fitting = [
        f"`{keyword} {text}`" for keyword in ("given", "provided", "claim") if _reads(table, keyword, text)
    ]
    if fitting and len(text) <= 80:
        return "the keyword is missing: write " + " or ".join(fitting)
    if first in table.words or not word:
        return "every line starts with a keyword, such as `given triangle ABC`"
    for keyword, meant in _MEANT.items():
        if word in meant.split():
            return f"did you mean `{keyword}`?"
    close = nearest(word, KEYWORDS)
    if close:
        return f"did you mean `{close}`?"
    return "every line starts with a keyword, such as `given triangle ABC`"


def _reads(table: Table, keyword: str, text: str) -> bool:
    try:
        parse(table, keyword, text, 0, len(text), 1)
    except (Unexpected, Problem):
        return False
    return True
