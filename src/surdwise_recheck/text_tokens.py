"""One statement of a claim sheet cut into tokens, and a cursor over them."""

from __future__ import annotations

import re
from dataclasses import dataclass

LONGEST_NUMBER = 1000  # characters
MOST_TOKENS = 20_000  # of one statement

PRIMES = "'’′"
_POINT = re.compile(rf"[A-Z](?:[0-9]+|[{PRIMES}]+)?")
_TOKEN = re.compile(
    rf"""
    (?P<points>(?:[A-Z](?:[0-9]+|[{PRIMES}]+)?)+) (?![A-Za-z0-9_{PRIMES}])
  | (?P<word>nine-point\b|perp\.|[a-z][a-z0-9_]*) (?![A-Za-z0-9_{PRIMES}])
  | (?P<number>[0-9]+(?:\.[0-9]+)?)
  | (?P<compare><=|>=|[<>≤≥⩽⩾])
  | (?P<sign>=(?!=)|[+\-*/^|(),−·×⋅∣])
    """,
    re.VERBOSE,
)
_SAME = {"−": "-", "·": "*", "×": "*", "⋅": "*", "∣": "|", "≤": "<=", "⩽": "<=", "≥": ">=", "⩾": ">="}

# Words of the language: none of them can name a line or circle.
RESERVED = frozenset(
    """
    abs acute and angle apex area at away between bisector center centre centroid circle circumcenter
    circumcentre circumcircle circumradius collinear concyclic convex corners cos cyclic diameter dist
    distinct
    equilateral excenter excentre excircle exradius foot from hexagon in incenter incentre incircle inradius
    inside intersection isosceles kite lie lies line median meet midpoint nine-point not obtuse of on opposite
    or orthocenter orthocentre other outside parallel parallelogram pentagon perimeter perp. perpendicular
    point points quadrilateral radius ray rectangle reflection regular rhombus right same segment side sides
    sin sqrt square tangent tangential than the through to touch toward towards trapezium trapezoid triangle
    altitude with
    """.split()
)


class Unreadable(Exception):
    """A statement that is not of the language: where (column, from 1) and what was expected."""

    def __init__(self, column: int, message: str) -> None:
        super().__init__(message)
        self.column = column


@dataclass(frozen=True)
class Token:
    """`kind` is points, word, name, number, compare, sign or end; column from 1."""

    kind: str
    text: str
    column: int

    def points(self) -> tuple[str, ...]:
        """The points of a run, primes written '."""
        names = (m.group() for m in _POINT.finditer(self.text))
        return tuple(re.sub(f"[{PRIMES}]", "'", n) for n in names)


def tokens(text: str, column: int = 1) -> list[Token]:
    """The tokens of a statement whose first character stands in the given column."""
    out: list[Token] = []
    at = 0
    while True:
        while at < len(text) and text[at].isspace():
            at += 1
        if at == len(text):
            out.append(Token("end", "", column + at))
            return out
        m = _TOKEN.match(text, at)
        if m is None:
            raise Unreadable(column + at, f"no statement has {text[at]!r} here")
        kind = m.lastgroup or ""
        word = _SAME.get(m.group(), m.group())
        if kind == "word" and word not in RESERVED:
            kind = "name"
        if kind == "number" and len(word) > LONGEST_NUMBER:
            raise Unreadable(column + at, f"a number of more than {LONGEST_NUMBER} digits")
        out.append(Token(kind, word, column + at))
        if len(out) > MOST_TOKENS:
            raise Unreadable(column + at, f"a statement of more than {MOST_TOKENS} words and signs")
        at = m.end()


class Cursor:
    """A place in the tokens of one statement."""

    def __init__(self, items: list[Token]) -> None:
        self.items = items
        self.at = 0

    @property
    def here(self) -> Token:
        """The token that comes next."""
        return self.items[self.at]

    def peek(self, n: int) -> Token:
        """The n-th token from here; the end token where there are fewer."""
        return self.items[min(self.at + n, len(self.items) - 1)]

    def is_next(self, *words: str) -> bool:
        """Whether these words or signs come next."""
        ahead = zip(self._ahead(), words, strict=False)
        return all(t.kind in ("word", "sign") and t.text == w for t, w in ahead)

    def _ahead(self) -> list[Token]:
        left = self.items[self.at :][:6]
        return left + [self.items[-1]] * (6 - len(left))

    def skip(self, *words: str) -> bool:
        """Take these words or signs if they come next."""
        if not self.is_next(*words):
            return False
        self.at += len(words)
        return True

    def skip_one(self, *words: str) -> str:
        """Take one of these words if it comes next; "" if none does."""
        for w in words:
            if self.skip(w):
                return w
        return ""

    def need(self, *words: str) -> None:
        """Take these words or signs."""
        for w in words:
            if not self.skip(w):
                raise self.wrong(f"`{w}`")

    def wrong(self, expected: str) -> Unreadable:
        """The error of this place."""
        got = f"`{self.here.text}`" if self.here.text else "the end of the line"
        return Unreadable(self.here.column, f"expected {expected}, got {got}")

    def run(self, *sizes: int) -> tuple[str, ...]:
        """A run of as many different points as one of the sizes."""
        t = self.here
        names = t.points() if t.kind == "points" else ()
        if len(names) not in sizes:
            raise self.wrong(" or ".join(map(str, sizes)) + " points")
        if len(set(names)) != len(names):
            raise Unreadable(t.column, f"expected different points, got {t.text}")
        self.at += 1
        return names

    def point(self) -> str:
        """One point."""
        return self.run(1)[0]

    def is_run(self, size: int, ahead: int = 0) -> bool:
        """Whether a run of so many points comes next."""
        t = self.peek(ahead)
        return t.kind == "points" and len(t.points()) == size

    def name(self) -> str:
        """The name of a line or circle."""
        t = self.here
        if t.kind != "name":
            raise self.wrong("the name of a line or circle")
        self.at += 1
        return t.text

    def end(self) -> None:
        """Nothing may come any more."""
        if self.here.kind != "end":
            raise self.wrong("the end of the line")
