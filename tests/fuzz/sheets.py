"""A plain seeded generator of claim sheets, valid ones and broken ones: fast enough for a hundred thousand
(hypothesis, which shrinks what it finds, does a few hundred in tests/sheet)."""

from __future__ import annotations

import random
from collections.abc import Iterator

from surdwise.sheet import FORMS
from surdwise.sheet.table import load_table

FIGURES = [
    "given triangle ABC\ngiven point D\n",
    "given points A, B, C, D\ngiven k = circle ABC\n",
    "given square ABCD\ngiven l = line AC\n",
    "given equilateral triangle ABC\ngiven D on circle ABC\n",
]
LENGTHS = ["|AB|", "|BC|", "|CA|", "|DA|", "|DB|", "|DC|"]
MEASURES = [*LENGTHS, "area(ABC)", "dist(D, AB)", "perimeter(ABC)", "cos(BAC)", "sqrt(2)", "3/2", "0.25"]
OPS = ["=", "<", "<=", ">", ">="]
CONDITIONS = [
    "C between A and B",
    "D inside ABC",
    "angle BAC acute",
    "A and D on the same side of BC",
    "ABC obtuse",
]
WORDS = sorted(load_table().words)
ODD = [
    *["10^400", "9^9^9", "(" * 300, "sqrt(" * 200, "|A", "AB|", "1/0", "-", "..", "'", "#", "---"],
    *["\uff21", "\u0410", "\x00", "\ufeff", "\u2264", "\U0001d538"],  # look-alikes and marks
]


def quantity(chance: random.Random, depth: int = 0) -> str:
    """A quantity in the points A, B, C, D."""
    if depth > 2 or chance.random() < 0.5:
        return chance.choice(MEASURES)
    a, b = quantity(chance, depth + 1), quantity(chance, depth + 1)
    return chance.choice(
        [f"{a} + {b}", f"{a} - {b}", f"2{chance.choice(LENGTHS)}", f"({a})*({b})", f"abs({a})"]
    )


def valid(chance: random.Random) -> str:
    """A sheet that reads."""
    out = chance.choice(FIGURES)
    if chance.random() < 0.4:
        out += f"provided {chance.choice(CONDITIONS)}\n"
    if chance.random() < 0.2:
        out += f"given {chance.choice(LENGTHS)} = {chance.choice(LENGTHS)}\n"
    for _ in range(chance.randint(1, 2)):
        left, right = quantity(chance), quantity(chance)
        out += f"claim {left} {chance.choice(OPS)} {right}\n"
    return out


def spoilt(chance: random.Random) -> str:
    """A sheet with a few changes of characters, words or lines."""
    text = valid(chance)
    for _ in range(chance.randint(1, 3)):
        at = chance.randrange(len(text))
        kind = chance.random()
        if kind < 0.3:
            text = text[:at] + chance.choice(WORDS) + text[at + chance.randrange(3) :]
        elif kind < 0.5:
            text = text[:at] + chance.choice(ODD) + text[at:]
        elif kind < 0.7:
            text = text[:at] + text[at + chance.randint(1, 9) :]
        elif kind < 0.8:
            text = text[:at]
        elif kind < 0.9:
            lines = text.split("\n")
            chance.shuffle(lines)
            text = "\n".join(lines)
        else:
            form = chance.choice(list(FORMS.values())).example
            text = f"{text}{chance.choice(['given', 'provided', 'claim'])} {form}\n"
        text = text or "\n"
    return text.replace("\n", "\r\n") if chance.random() < 0.02 else text


def sheets(count: int, seed: int) -> Iterator[tuple[str, bool]]:
    """Texts, and whether they are valid by construction."""
    chance = random.Random(seed)
    for _ in range(count):
        good = chance.random() < 0.3
        yield (valid(chance), True) if good else (spoilt(chance), False)
