"""The parser's terminals in the words of the field."""

from __future__ import annotations

from collections.abc import Iterable

from .characters import letter_name
from .lexer import END, Token

RUN_WORDS = {
    "POINT": "a point such as A",
    "PAIR": "two points such as AB",
    "TRIPLE": "three points such as ABC",
    "QUAD": "four points such as ABCD",
    "QUINT": "five points such as ABCDE",
    "HEXA": "six points such as ABCDEF",
}
FUNCTIONS = frozenset(
    {
        "dist",
        "area",
        "perimeter",
        "circumradius",
        "inradius",
        "exradius",
        "median",
        "altitude",
        "bisector",
        "cos",
        "sin",
        "sqrt",
        "abs",
    }
)
QUANTITY_STARTS = FUNCTIONS | {"|", "(", "-", "NUMBER", "FRACTION"}
OPERATORS = frozenset("+-*/^")
# Spellings and small words that are understood but not offered.
UNOFFERED = frozenset(
    {
        "center",
        "circumcenter",
        "orthocenter",
        "incenter",
        "excenter",
        "trapezoid",
        "perp.",
        "toward",
        "intersection",
        "point",
        "the",
        "lies",
        "lie",
    }
)
MOST_SHOWN = 6
LONGEST_SHOWN = 40


def expected(kinds: Iterable[str]) -> str:
    """The terminals that could come next, as `a, b or c`."""
    left = set(kinds)
    words = [text for kind, text in RUN_WORDS.items() if kind in left]
    left -= RUN_WORDS.keys()
    if "NAME" in left:
        words.append("the name of a line or circle")
        left.discard("NAME")
    signs = []
    if "COMPARE" in left:
        signs.append("a comparison such as =")
        left -= {"COMPARE", "="}
    if {"*", "/"} <= left:
        signs.append("an operator such as +")
        left -= OPERATORS
    if {"|", "sqrt"} <= left:
        words.append("a quantity such as |AB|")
        left -= QUANTITY_STARTS
    elif "NUMBER" in left:
        words.append("a number")
        left -= {"NUMBER", "FRACTION"}
    elif "|" in left:
        signs.append("a closing `|`")
        left.discard("|")
    words.extend(signs)
    offered = left - UNOFFERED if left - UNOFFERED - {END} else left
    for mark in sorted(kind for kind in offered if not kind[0].isalpha() and kind != END):
        words.append(f"`{mark}`")
    words.extend(f"`{word}`" for word in sorted(kind for kind in offered if kind[0].isalpha()))
    if END in left:
        words.append("the end of the line")
    if len(words) > MOST_SHOWN:
        words = [*words[: MOST_SHOWN - 1], f"one of {len(words) - MOST_SHOWN + 1} other words"]
    return words[0] if len(words) == 1 else ", ".join(words[:-1]) + " or " + words[-1]


def got(token: Token) -> str:
    """What stands there instead."""
    if token.kind == END:
        return "the end of the line"
    text = token.text if len(token.text) <= LONGEST_SHOWN else token.text[: LONGEST_SHOWN - 1] + "…"
    if len(text) == 1 and not text.isascii():
        return f"`{text}` ({letter_name(text)})"
    return f"`{text}`"
