"""Typeset mathematics as a small tree, apart from how it is written down.

A `Formula` is read from the sheet's syntax tree (`formula`), or from the text of an exact value
or polynomial (`expression`); mathml.py and texmath.py write it.  `pieces` breaks one where a
line may break, since neither form breaks lines inside a formula by itself.
"""

from __future__ import annotations

import re
from collections.abc import Callable
from dataclasses import dataclass
from fractions import Fraction
from itertools import pairwise

from ..sheet import FORMS
from ..sheet.tree import (
    And,
    Arg,
    Binary,
    CentreOf,
    Comparison,
    Fact,
    Measure,
    Named,
    Not,
    Number,
    Or,
    Pt,
    Quantity,
    Relation,
    Through,
    Unary,
)


@dataclass(frozen=True)
class Name:
    """An italic name: a point, a curve, a parameter; `sub` stands lower (B2, u0)."""

    text: str
    sub: str = ""


@dataclass(frozen=True)
class Digits:
    """A number without sign."""

    text: str


@dataclass(frozen=True)
class Op:
    """An operator; `kind` is one of relation, sum, product, sign, mark (comma)."""

    text: str
    kind: str


@dataclass(frozen=True)
class Word:
    """Upright words of the sheet's language, or the name of a measure."""

    text: str


@dataclass(frozen=True)
class Row:
    """Formulas side by side."""

    items: tuple[Formula, ...]


@dataclass(frozen=True)
class Over:
    """A fraction."""

    top: Formula
    bottom: Formula


@dataclass(frozen=True)
class Power:
    """A power."""

    base: Formula
    exponent: Formula


@dataclass(frozen=True)
class Root:
    """A square root."""

    inner: Formula


@dataclass(frozen=True)
class Fence:
    """Something between a pair of bars or parentheses."""

    left: str
    inner: Formula
    right: str


Formula = Name | Digits | Op | Word | Row | Over | Power | Root | Fence

RELATIONS = {"=": "=", "<": "<", ">": ">", "<=": "≤", ">=": "≥"}
_ITEM = re.compile(r"(\{\d\})")


def point_name(name: str) -> Name:
    """A point's name, its number as an index: B2, A'."""
    head = name[0]
    digits = "".join(c for c in name[1:] if c.isdigit())
    primes = "′" * name.count("'")
    return Name(head + primes, digits)


def _run(points: tuple[Pt, ...]) -> Formula:
    return Row(tuple(point_name(p.name) for p in points))


def row(*items: Formula) -> Row:
    """Formulas side by side, rows among them opened up."""
    out: list[Formula] = []
    for x in items:
        out += x.items if isinstance(x, Row) else (x,)
    return Row(tuple(out))


def formula(node: Fact | Relation | Comparison | Not | And | Or | Quantity | Arg) -> Formula:
    """A statement, condition or quantity of a sheet."""
    match node:
        case Comparison():
            out = [formula(node.items[0])]
            for op, item in zip(node.ops, node.items[1:], strict=True):
                out += [Op(RELATIONS[op], "relation"), formula(item)]
            return row(*out)
        case Not():
            return row(Word("not "), _guarded(node.arg, And, Or))
        case And():
            return _joined(" and ", [_guarded(x, Or) for x in node.args])
        case Or():
            return _joined(" or ", [_guarded(x, Or) for x in node.args])
        case Fact() | Relation():
            return _worded(node)
        case Pt():
            return point_name(node.name)
        case Named():
            return Name(node.name)
        case Through():
            return _run(node.points)
        case CentreOf():
            return row(Word("centre of "), formula(node.circle))
        case str():
            return Word(node)
        case tuple():
            return _run(node)
        case _:
            return _quantity(node)[0]


def _guarded(node: Relation | Comparison | Not | And | Or, *loose: type) -> Formula:
    inner = formula(node)
    return Fence("(", inner, ")") if isinstance(node, loose) else inner


def _joined(word: str, parts: list[Formula]) -> Formula:
    out = [parts[0]]
    for p in parts[1:]:
        out += [Word(word), p]
    return row(*out)


def _worded(node: Fact | Relation) -> Formula:
    form = FORMS[node.form]
    pattern = form.pattern
    if node.form == "points" and isinstance(node.args[0], tuple) and len(node.args[0]) == 1:
        pattern = "point {0}"
    out: list[Formula] = []
    for part in _ITEM.split(pattern):
        if not _ITEM.fullmatch(part):
            if part == " = ":
                out.append(Op("=", "relation"))
            elif part == ", ":
                out.append(Op(",", "mark"))
            elif part:
                out.append(Word(part))
            continue
        i = int(part[1])
        arg = node.args[i]
        if form.args[i] == "points" and isinstance(arg, tuple):
            names: list[Formula] = []
            for p in arg:
                names += [Op(",", "mark"), point_name(p.name)]
            out += names[1:]
        else:
            out.append(formula(arg))
    return row(*out)


_SUM, _PRODUCT, _ATOM = range(3)


def _quantity(q: Quantity) -> tuple[Formula, int]:
    """A quantity and how tightly it holds together."""
    match q:
        case Number():
            return _number(q.value), _PRODUCT if q.value < 0 else _ATOM
        case Measure():
            return _measure(q), _ATOM
        case Unary("sqrt", arg):
            return Root(formula(arg)), _ATOM
        case Unary("abs", arg):
            return Fence("|", formula(arg), "|"), _ATOM
        case Unary(_, arg):
            return row(Op("−", "sign"), _tight(arg, _PRODUCT)), _PRODUCT
        case Binary("^", base, power):
            return Power(_tight(base, _ATOM), formula(power)), _ATOM
        case Binary("/", top, bottom):
            return Over(formula(top), formula(bottom)), _ATOM
        case Binary("*", left, right):
            a, b = _tight(left, _PRODUCT), _tight(right, _ATOM)
            if isinstance(left, Number) and not isinstance(right, Number):
                return row(a, b), _PRODUCT
            return row(a, Op("·", "product"), b), _PRODUCT
        case Binary(op, left, right):
            sign = "−" if op == "-" else "+"
            return row(formula(left), Op(sign, "sum"), _tight(right, _PRODUCT)), _SUM
    raise TypeError(f"expected a quantity, got {type(q).__name__}")


def _tight(q: Quantity, wanted: int) -> Formula:
    f, own = _quantity(q)
    return f if own >= wanted else Fence("(", f, ")")


def _number(v: Fraction) -> Formula:
    size = abs(v)
    body: Formula = Digits(str(size.numerator))
    if size.denominator != 1:
        body = Over(body, Digits(str(size.denominator)))
    return row(Op("−", "sign"), body) if v < 0 else body


_CORNERED = ("exradius", "median", "altitude", "bisector")


def _measure(q: Measure) -> Formula:
    points = [formula(p) for p in q.points]
    if q.kind == "length":
        return Fence("|", Row(tuple(points)), "|")
    if q.kind == "dist" and q.line is not None:
        inner = row(points[0], Op(",", "mark"), formula(q.line))
    elif q.kind in _CORNERED:
        inner = row(*points[:-1], Op(",", "mark"), points[-1])
    else:
        inner = Row(tuple(points))
    return row(Word(q.kind), Fence("(", inner, ")"))


# ---------------------------------------------------------------- texts of values

_TOKEN = re.compile(r"\s*(\d+|[A-Za-z_]\w*'*|\*\*|<=|>=|!=|\|[A-Z][A-Z0-9']*\||[-+*/^(),=<>])")


_POINT = re.compile(r"[A-Z][0-9]*'*")


class NotAnExpression(Exception):
    """The text is not one this reader knows."""


def expression(text: str) -> Formula:
    """The text of an exact value, polynomial or comparison of these, or of several with commas
    between: numbers, names, lengths, pairs, + - * / ^ ** and calls such as sqrt(...).  Raises
    NotAnExpression."""
    tokens: list[str] = []
    at = 0
    while at < len(text.rstrip()):
        m = _TOKEN.match(text, at)
        if m is None:
            raise NotAnExpression(text)
        tokens.append(m[1])
        at = m.end()
    reader = _Reader(tokens)
    out = reader.listed(reader.comparison)
    if reader.tokens:
        raise NotAnExpression(text)
    return out


class _Reader:
    def __init__(self, tokens: list[str]) -> None:
        self.tokens = tokens

    def peek(self) -> str:
        return self.tokens[0] if self.tokens else ""

    def take(self, wanted: str = "") -> str:
        if not self.tokens or (wanted and self.tokens[0] != wanted):
            raise NotAnExpression(wanted)
        return self.tokens.pop(0)

    def listed(self, read: Callable[[], Formula]) -> Formula:
        out = [read()]
        while self.peek() == ",":
            self.take()
            out += [Op(",", "mark"), read()]
        return row(*out)

    def comparison(self) -> Formula:
        out = [self.sum()]
        while self.peek() in RELATIONS:
            out += [Op(RELATIONS[self.take()], "relation"), self.sum()]
        return row(*out)

    def sum(self) -> Formula:
        out: list[Formula] = []
        if self.peek() in ("-", "+"):
            out.append(Op("−" if self.take() == "-" else "+", "sign"))
        out.append(self.product())
        while self.peek() in ("-", "+"):
            out += [Op("−" if self.take() == "-" else "+", "sum"), self.product()]
        return row(*out)

    def product(self) -> Formula:
        top = [self.power()]
        bottom: list[Formula] = []
        while self.peek() in ("*", "/"):
            (top if self.take() == "*" else bottom).append(self.power())
        if not bottom:
            return _times(top)
        opened = [
            x.inner if isinstance(x, Fence) and len(part) == 1 else x for part in (top, bottom) for x in part
        ]
        return Over(_times(opened[: len(top)]), _times(opened[len(top) :]))

    def power(self) -> Formula:
        base = self.atom()
        if self.peek() in ("^", "**"):
            self.take()
            return Power(base, self.atom())
        return base

    def atom(self) -> Formula:
        word = self.take()
        if word.isdigit():
            return Digits(word)
        if word == "(":
            inner = self.listed(self.sum)
            self.take(")")
            return Fence("(", inner, ")")
        if word[0] == "|":
            return Fence("|", Row(tuple(point_name(n) for n in _POINT.findall(word))), "|")
        if not (word[0].isalpha() or word[0] == "_"):
            raise NotAnExpression(word)
        if self.peek() != "(":
            return _variable(word)
        self.take("(")
        args = self.listed(self.sum)
        self.take(")")
        return Root(args) if word == "sqrt" else row(Word(word), Fence("(", args, ")"))


def _times(factors: list[Formula]) -> Formula:
    out: list[Formula] = [factors[0]]
    for before, x in pairwise(factors):
        if (
            isinstance(x, Digits)
            or (isinstance(x, Power) and isinstance(x.base, Digits))
            or isinstance(before, Over)
        ):
            out.append(Op("·", "product"))
        out.append(x)
    return row(*out)


def _variable(word: str) -> Name:
    """u0, xC, d12: a letter with what follows it lower; B2, A': a point."""
    if _POINT.fullmatch(word):
        return point_name(word)
    return Name(word[0], word[1:].replace("_", ""))


# ---------------------------------------------------------------- breaking lines


def pieces(f: Formula) -> list[Formula | str]:
    """Parts between which a line may break; a string is words of running text."""
    items: list[Formula] = list(f.items) if isinstance(f, Row) else [f]
    words = any(isinstance(x, Word) and _is_running(x, items, i) for i, x in enumerate(items))
    out: list[Formula | str] = []
    current: list[Formula] = []

    def close() -> None:
        if current:
            out.append(Row(tuple(current)))
            current.clear()

    for i, x in enumerate(items):
        if isinstance(x, Word) and _is_running(x, items, i):
            close()
            out.append(x.text)
        elif isinstance(x, Fence) and words and _has_words(x):
            close()
            out += [x.left, *pieces(x.inner), x.right]
        elif isinstance(x, Op) and x.kind in ("relation", "sum"):
            close()
            current.append(x)
        elif isinstance(x, Op) and x.kind == "mark" and words:
            close()
            out.append(", ")
        else:
            current.append(x)
    close()
    return out


def _is_running(x: Word, items: list[Formula], i: int) -> bool:
    """Words of the text, as against the name of a measure before its parenthesis."""
    return not (i + 1 < len(items) and isinstance(items[i + 1], Fence) and x.text.strip() == x.text)


def _has_words(f: Fence) -> bool:
    inner = f.inner.items if isinstance(f.inner, Row) else (f.inner,)
    return any(isinstance(x, Word) and " " in x.text for x in inner)
