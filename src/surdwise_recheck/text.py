"""The whole claim-sheet language, read by recursive descent: text in, trees out, or a TextError.

A file holds sheets separated by lines `---`; `#` starts a comment; every other line starts with title,
source, given, provided or claim.  `parse_condition` also reads comparisons of polynomials in the frame's
parameters u0, u1, ... with 0, which certificates use where the borders have no name.
"""

from __future__ import annotations

import re
from dataclasses import fields, is_dataclass
from fractions import Fraction

from .text_given import Given
from .text_names import Misnamed, Names
from .text_statements import Statements
from .text_tokens import Cursor, Unreadable, tokens
from .tree import Build, Condition, FrameSign, Line, Sheet

LARGEST = 1_000_000  # characters
DEEPEST = 200  # levels of a tree
HIGHEST_DEGREE = 400  # of one parameter
MOST_TERMS = 5000
KEYWORDS = ("title", "source", "given", "provided", "claim")

_CONTROL = re.compile("[\x00-\x08\x0b\x0c\x0e-\x1f\x7f-\x9f\ud800-\udfff]")
_PARAMETER = re.compile(r"u(0|[1-9][0-9]{0,3})")

Terms = dict[tuple[tuple[int, int], ...], Fraction]


class TextError(Exception):
    """A text that is not of the language; line and column from 1."""

    def __init__(self, line: int, column: int, message: str) -> None:
        super().__init__(f"line {line}, column {column}: {message}")
        self.line = line
        self.column = column


def read_sheets(text: str) -> tuple[Sheet, ...]:
    """The sheets of a file's text.  Raises TextError."""
    if len(text) > LARGEST:
        raise TextError(1, 1, f"more than {LARGEST} characters")
    sheets: list[Sheet] = []
    lines = re.split(r"\r\n|\r|\n", text.removeprefix("\ufeff"))
    block: list[tuple[int, str]] = []
    for number, source in enumerate([*lines, "---"], 1):
        bad = _CONTROL.search(source)
        if bad:
            raise TextError(number, bad.start() + 1, "a control character")
        if not re.fullmatch(r"-{3,}", source.partition("#")[0].strip()):
            block.append((number, source))
            continue
        if any(s.partition("#")[0].strip() for _, s in block):
            sheets.append(_sheet(block))
        block = []
    if not sheets:
        raise TextError(1, 1, "no sheet")
    return tuple(sheets)


def _sheet(block: list[tuple[int, str]]) -> Sheet:
    texts: dict[str, str] = {}
    found: dict[str, list[Line]] = {"given": [], "provided": [], "claim": []}
    asked: list[tuple[int, Condition]] = []
    names = Names()
    for number, source in block:
        stripped = source.partition("#")[0].rstrip()
        body = stripped.lstrip()
        if not body:
            continue
        keyword = body.split(maxsplit=1)[0]
        said = body[len(keyword) :].lstrip()
        column = len(stripped) - len(said) + 1
        if keyword not in KEYWORDS:
            raise TextError(number, column, f"expected {', '.join(KEYWORDS)}, got {keyword[:40]}")
        if keyword in ("title", "source"):
            if not said or keyword in texts:
                raise TextError(number, column, f"expected one text behind one `{keyword}`")
            texts[keyword] = said
            continue
        try:
            if keyword == "given":
                node = _given(said, column, names)
            else:
                node = _condition(Statements(tokens(said, column)))
                asked.append((number, node))
        except Unreadable as e:
            raise TextError(number, e.column, str(e)) from None
        except Misnamed as e:
            raise TextError(number, column, str(e)) from None
        found[keyword].append(Line(keyword, said, node))
    for number, c in asked:
        try:
            names.condition(c)
        except Misnamed as e:
            raise TextError(number, 1, str(e)) from None
    if not (found["given"] and found["claim"]):
        raise TextError(block[-1][0], 1, "a sheet needs a `given` and a `claim` line")
    return Sheet(
        texts.get("title", ""),
        texts.get("source", ""),
        tuple(found["given"]),
        tuple(found["provided"]),
        tuple(found["claim"]),
        "\n".join(s for _, s in block),
    )


def _given(said: str, column: int, names: Names) -> Build | Condition:
    reader = Given(tokens(said, column))
    node = reader.statement()
    _shallow(node, column)
    if isinstance(node, Build):
        names.build(node, reader.said)
    else:
        names.condition(node)
    return node


def _condition(reader: Statements) -> Condition:
    c = reader.condition()
    column = reader.here.column
    reader.end()
    _shallow(c, column)
    return c


def _shallow(root: object, column: int) -> None:
    """No formula of more levels than can be evaluated by recursion."""
    stack = [(root, 0)]
    while stack:
        node, level = stack.pop()
        if level > DEEPEST:
            raise Unreadable(column, f"a formula of more than {DEEPEST} levels")
        if isinstance(node, tuple):
            stack += [(x, level) for x in node]
        elif is_dataclass(node):
            stack += [(getattr(node, f.name), level + 1) for f in fields(node)]


def parse_condition(text: str) -> Condition:
    """A condition of a certificate.  Raises TextError; names are left unchecked (see `Names`)."""
    if len(text) > LARGEST:
        raise TextError(1, 1, f"more than {LARGEST} characters")
    try:
        return _condition(_Framed(tokens(text)))
    except Unreadable as e:
        raise TextError(1, e.column, str(e)) from None


def points_of(sheet: Sheet) -> frozenset[str]:
    """The points that a sheet's given lines make."""
    return frozenset(_names(sheet).points)


def _names(sheet: Sheet) -> Names:
    names = Names()
    for line in sheet.given:
        if isinstance(line.body, Build):
            names.build(line.body, ())
    return names


def check_condition(sheet: Sheet, c: Condition) -> None:
    """Every name of a condition is one of the sheet's figure.  Raises TextError."""
    try:
        _names(sheet).condition(c)
    except Misnamed as e:
        raise TextError(1, 1, str(e)) from None


# ---------------------------------------------------------------- polynomials in the frame's parameters


class _Framed(Statements):
    """Conditions that may speak of the frame's parameters."""

    def single(self) -> Condition:
        """A comparison of a polynomial with 0 where a parameter stands in it before the next comparison."""
        return self._frame_sign() if self._speaks_of_frame() else super().single()

    def _in_parentheses(self) -> Condition:
        if self._speaks_of_frame():
            start = self.at
            try:
                return self._frame_sign()
            except Unreadable:
                self.at = start
        return super()._in_parentheses()

    def _speaks_of_frame(self) -> bool:
        for t in self.items[self.at :]:
            if t.kind == "name" and _PARAMETER.fullmatch(t.text):
                return True
            if not (t.kind == "number" or t.text in ("+", "-", "*", "/", "^", "(", ")")):
                return False
        return False

    def _frame_sign(self) -> Condition:
        left = _Polynomial(self).sum()
        op = self.here.text
        if not (self.here.kind == "compare" or op == "="):
            raise self.wrong("a comparison such as >")
        self.at += 1
        right = _Polynomial(self).sum()
        return FrameSign(tuple(sorted(_add(left, right, Fraction(-1)).items())), op)


class _Polynomial:
    """Reads + - * / ^ over numbers and u0, u1, ..."""

    def __init__(self, cursor: Cursor) -> None:
        self.c = cursor
        self.depth = 0

    def sum(self) -> Terms:
        """A sum of products."""
        self.depth += 1
        if self.depth > 50:
            raise self.c.wrong("fewer parentheses")
        total: Terms = {}
        sign = self.c.skip_one("+", "-") or "+"
        while sign:
            total = _add(total, self._product(), Fraction(1 if sign == "+" else -1))
            sign = self.c.skip_one("+", "-")
        self.depth -= 1
        return total

    def _product(self) -> Terms:
        p = self._power()
        while self.c.is_next("*") or self.c.is_next("/"):
            if self.c.skip("*"):
                p = self._times(p, self._power())
                continue
            self.c.need("/")
            d = self._power()
            if set(d) != {()}:
                raise self.c.wrong("a number other than 0 as divisor")
            p = {m: v / d[()] for m, v in p.items()}
        return p

    def _power(self) -> Terms:
        p = self._atom()
        if not self.c.skip("^"):
            return p
        n = self._natural()
        if len(p) == 1:
            ((mono, v),) = p.items()
            if any(e * n > HIGHEST_DEGREE for _, e in mono) or (n > HIGHEST_DEGREE):
                raise self.c.wrong(f"a degree of at most {HIGHEST_DEGREE}")
            return {tuple((k, e * n) for k, e in mono) if n else (): v**n}
        out: Terms = {(): Fraction(1)}
        if n > HIGHEST_DEGREE:
            raise self.c.wrong(f"a degree of at most {HIGHEST_DEGREE}")
        for _ in range(n):
            out = self._times(out, p)
        return out

    def _natural(self) -> int:
        t = self.c.here
        if t.kind != "number" or "." in t.text:
            raise self.c.wrong("a whole number")
        self.c.at += 1
        return int(t.text)

    def _atom(self) -> Terms:
        t = self.c.here
        if self.c.skip("("):
            p = self.sum()
            self.c.need(")")
            return p
        found = _PARAMETER.fullmatch(t.text)
        if not (t.kind == "number" or found):
            raise self.c.wrong("a number or one of u0, u1, ...")
        self.c.at += 1
        if found:
            return {((int(found.group(1)), 1),): Fraction(1)}
        v = Fraction(t.text)
        return {(): v} if v else {}

    def _times(self, p: Terms, q: Terms) -> Terms:
        out: Terms = {}
        for m, v in p.items():
            for n, w in q.items():
                powers = dict(m)
                for k, e in n:
                    powers[k] = powers.get(k, 0) + e
                mono = tuple(sorted(powers.items()))
                out[mono] = out.get(mono, Fraction(0)) + v * w
            if len(out) > MOST_TERMS:
                raise self.c.wrong(f"at most {MOST_TERMS} terms")
        if any(e > HIGHEST_DEGREE for mono in out for _, e in mono):
            raise self.c.wrong(f"a degree of at most {HIGHEST_DEGREE}")
        return {m: v for m, v in out.items() if v}


def _add(p: Terms, q: Terms, factor: Fraction) -> Terms:
    out = dict(p)
    for m, v in q.items():
        out[m] = out.get(m, Fraction(0)) + factor * v
    return {m: v for m, v in out.items() if v}
