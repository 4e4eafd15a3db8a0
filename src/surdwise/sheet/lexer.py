"""Cut one statement into tokens: runs of points, words, numbers, signs."""

from __future__ import annotations

import re
from dataclasses import dataclass

from .table import Table

DEEPEST = 200  # parentheses, and levels of any formula
LONGEST_NUMBER = 1000  # characters

RUNS = ("POINT", "PAIR", "TRIPLE", "QUAD", "QUINT", "HEXA")
END = "$END"
BAD = "$BAD"

PRIMES = "'’′"
_SPACE = frozenset(" \t\u00a0\u1680\u202f\u205f\u3000" + "".join(map(chr, range(0x2000, 0x200B))))
_SIGNS = {"−": "-", "·": "*", "×": "*", "⋅": "*", "∣": "|"}
_COMPARE = {"≤": "<=", "≥": ">=", "⩽": "<=", "⩾": ">=", "<=": "<=", ">=": ">=", "<": "<", ">": ">"}

_POINT = re.compile(rf"[A-Z](?:[0-9]+|[{PRIMES}]+)?")
_TOKEN = re.compile(
    rf"(?P<run>(?:[A-Z](?:[0-9]+|[{PRIMES}]+)?)+)"
    r"|(?P<word>nine-point\b|perp\.|[a-z][a-z0-9_]*)"
    r"|(?P<number>[0-9]+(?:\.[0-9]+)?)"
    r"|(?P<wrong>==|!=|<>|=<|=>|\*\*|&&)"
    r"|(?P<compare><=|>=|[<>≤≥⩽⩾])"
    r"|(?P<sign>[=+\-*/^|(),−·×⋅∣])"
)
_REST_OF_NAME = re.compile(rf"[A-Za-z0-9_{PRIMES}]+")


@dataclass(frozen=True)
class Token:
    """A token with its columns (from 1; `end` is the column after).

    `kind` is a terminal of the table, or END, or BAD with what is wrong in `problem`: a
    message and a hint (both may be empty).
    """

    kind: str
    text: str
    column: int
    end: int
    problem: tuple[str, str] = ("", "")


class Lexer:
    """The tokens of source[position:stop], one by one."""

    def __init__(self, table: Table, source: str, position: int, stop: int) -> None:
        self._table = table
        self._source = source
        self._position = position
        self._stop = stop
        self._depth = 0

    def next(self, fraction_allowed: bool) -> Token:
        """The next token; a fraction before a quantity (as in `1/2|AB|`) only where allowed."""
        source, stop = self._source, self._stop
        at = self._position
        while at < stop and source[at] in _SPACE:
            at += 1
        if at >= stop:
            self._position = stop
            return Token(END, "", at + 1, at + 2)
        match = _TOKEN.match(source, at, stop)
        if match is None:
            return self._bad(at, at + 1)
        end = match.end()
        text = match.group()
        kind = match.lastgroup
        after = source[end] if end < stop else ""
        if kind == "run":
            if after and (after in PRIMES or after == "_" or after.isalnum()):
                return self._bad_run(at, end)
            count = len(_POINT.findall(text))
            return self._good(RUNS[count - 1] if count <= len(RUNS) else "RUN", text, at, end)
        if kind == "word":
            if after and after.isalpha():
                return self._bad_word(at, end)
            if text not in self._table.words:
                return self._good("NAME", text, at, end)
            return self._good(text, text, at, end)
        if kind == "number":
            if end - at > LONGEST_NUMBER:
                problem = (f"expected a number of at most {LONGEST_NUMBER} digits, got {end - at}", "")
                return Token(BAD, text, at + 1, end + 1, problem)
            if fraction_allowed:
                fraction = re.compile(self._table.fraction, re.ASCII).match(source, at, stop)
                if fraction and fraction.end() - at <= LONGEST_NUMBER:
                    return self._good("FRACTION", fraction.group(), at, fraction.end())
            return self._good("NUMBER", text, at, end)
        if kind == "wrong":
            return self._bad(at, end)
        if kind == "compare":
            return self._good("COMPARE", _COMPARE[text], at, end)
        text = _SIGNS.get(text, text)
        if text == "(":
            self._depth += 1
            if self._depth > DEEPEST:
                problem = (f"expected at most {DEEPEST} nested parentheses, got more", "")
                return Token(BAD, text, at + 1, end + 1, problem)
        elif text == ")":
            self._depth -= 1
        return self._good(text, text, at, end)

    def _good(self, kind: str, text: str, at: int, end: int) -> Token:
        self._position = end
        return Token(kind, text, at + 1, end + 1)

    def _bad(self, at: int, end: int) -> Token:
        """A character or sign that no statement has; its hint is looked up by explain.py."""
        return Token(BAD, self._source[at:end], at + 1, end + 1)

    def _bad_run(self, at: int, end: int) -> Token:
        match = _REST_OF_NAME.match(self._source, at, self._stop)
        end = max(end + 1, match.end() if match else end)
        text = self._source[at:end]
        if not text.isascii() and text.strip(PRIMES).isalpha():
            hint = ""  # explain.py names the letter
        elif text[1:].islower():
            hint = f"words are written in lower case: {text.lower()}"
        elif any(c.islower() for c in text):
            hint = "words are lower case, points are capitals, with a space between them"
        elif any(c in PRIMES for c in text):
            hint = "a point is a capital with digits (B2) or primes (B''), not both"
        else:
            hint = "a point is a capital letter, with digits (B2) or primes (B') if need be"
        return Token(BAD, text, at + 1, end + 1, ("", hint))

    def _bad_word(self, at: int, end: int) -> Token:
        match = _REST_OF_NAME.match(self._source, at, self._stop)
        stop = max(end + 1, match.end() if match else end)
        hint = "words and names are lower case, points are capitals, with a space between them"
        word, rest = self._source[at:end], self._source[end:stop]
        if word in self._table.words:
            hint = f"a space is missing: {word} {rest}"
        return Token(BAD, self._source[at:stop], at + 1, stop + 1, ("", hint))


def split_run(token: Token) -> list[tuple[str, int, int]]:
    """The points of a run: name (primes written '), column, column after."""
    points = []
    for match in _POINT.finditer(token.text):
        name = match.group()
        for prime in PRIMES[1:]:
            name = name.replace(prime, "'")
        points.append((name, token.column + match.start(), token.column + match.end()))
    return points
