"""Make the nodes of tree.py, one for every reduction of the grammar."""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction
from typing import Any

from .errors import Problem
from .lexer import Token, split_run
from .table import Rule
from .tree import (
    And,
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
    Relation,
    Span,
    Through,
    Unary,
)

HIGHEST_POWER = 64

_SIGN_OF = {"add": "+", "sub": "-", "mul": "*", "div": "/", "pow": "^"}
_POINT_LISTS = ("points", "collinear", "concyclic", "distinct")
_SIDES = {"toward": "towards"}


class Maker:
    """Makes the nodes of one statement in the given line of the file.

    `said` collects the curves that the statement itself calls a line or a circle.
    """

    def __init__(self, line: int) -> None:
        self.line = line
        self.said: list[tuple[Named, str]] = []

    def make(self, rule: Rule, children: list[Any], extents: Sequence[tuple[int, int, int]]) -> Any:
        """What the rule makes of its children; helper rules make plain lists."""
        kept: list[Any] = []
        for keep, child in zip(rule.kept, children, strict=True):
            if not keep:
                continue
            if isinstance(child, list):
                kept = child if not kept else kept + child
            else:
                kept.append(child)
        if rule.origin.startswith("_"):
            return kept
        span = Span(self.line, extents[0][0], extents[-1][1])
        name = rule.alias or rule.origin
        if name in ("number", "side", "size", "through", "named", "point"):
            node = self._leaf(name, kept, span)
            if isinstance(node, Named) and rule.origin == "meetable" and len(children) == 2:
                self.said.append((node, children[0].kind))
            return node
        if not rule.alias:
            return kept[0]
        if rule.origin == "fact":
            return Fact(name, self._arguments(name, kept), span)
        if rule.origin in ("relation", "property"):
            return Relation(name, self._arguments(name, kept), span)
        if name in ("and_", "or_"):
            if len(kept) == 1:
                return kept[0]
            return And(tuple(kept), span) if name == "and_" else Or(tuple(kept), span)
        if name == "not_":
            return Not(kept[0], span)
        if name == "comparison":
            return Comparison(tuple(kept[::2]), tuple(sign.text for sign in kept[1::2]), span)
        if name == "equation":
            return Comparison((kept[0], kept[1]), ("=",), span)
        if name == "centre_of":
            return CentreOf(kept[0], span)
        return self._quantity(name, kept, span, extents)

    def _leaf(self, name: str, kept: list[Token], span: Span) -> Any:
        text = kept[0].text
        if name == "number":
            return Number(self._value(text, span), span)
        if name == "side":
            words = " ".join(token.text for token in kept)
            return _SIDES.get(words, words)
        if name == "size":
            return text
        token = kept[0]
        place = Span(self.line, token.column, token.end)
        if name == "named":
            return Named(text, place)
        points = self._points(token)
        return Through(points, place) if name == "through" else points[0]

    def _value(self, text: str, span: Span) -> Fraction:
        above, _, below = text.partition("/")
        value = Fraction(above.strip())
        if not below:
            return value
        divisor = Fraction(below.strip())
        if divisor == 0:
            raise Problem(span, "expected a fraction, got one with denominator 0")
        return value / divisor

    def _points(self, token: Token) -> tuple[Pt, ...]:
        return tuple(Pt(name, Span(self.line, column, end)) for name, column, end in split_run(token))

    def _argument(self, child: Any) -> Any:
        """A run as a tuple of points, a single point as itself, a name as Named."""
        if not isinstance(child, Token):
            return child
        if child.kind == "NAME":
            return Named(child.text, Span(self.line, child.column, child.end))
        points = self._points(child)
        return points[0] if child.kind == "POINT" else points

    def _arguments(self, name: str, kept: list[Any]) -> tuple[Any, ...]:
        arguments = tuple(self._argument(child) for child in kept)
        return (arguments,) if name in _POINT_LISTS else arguments

    def _quantity(
        self, name: str, kept: list[Any], span: Span, extents: Sequence[tuple[int, int, int]]
    ) -> Number | Measure | Unary | Binary:
        arguments = [self._argument(child) for child in kept]
        if name in _SIGN_OF:
            left, right = arguments
            if name == "pow":
                self._check_power(right, Span(self.line, extents[-1][0], extents[-1][1]))
            if name == "div" and isinstance(right, Number):
                if right.value == 0:
                    raise Problem(span, "expected a divisor other than 0, got a division by 0")
                if isinstance(left, Number) and left.value.denominator == right.value.denominator == 1:
                    return Number(left.value / right.value, span)
            return Binary(_SIGN_OF[name], left, right, span)
        if name == "neg":
            if isinstance(arguments[0], Number):
                return Number(-arguments[0].value, span)
            return Unary("neg", arguments[0], span)
        if name in ("sqrt", "abs"):
            return Unary(name, arguments[0], span)
        if name == "dist":
            return Measure("dist", (arguments[0],), arguments[1], span)
        points: list[Pt] = []
        for argument in arguments:
            points.extend(argument if isinstance(argument, tuple) else (argument,))
        return Measure(name, tuple(points), None, span)

    def _check_power(self, power: Any, span: Span) -> None:
        if not isinstance(power, Number) or power.value.denominator != 1:
            hint = "for a square root write sqrt(...)"
            raise Problem(span, "expected a whole number as exponent, such as ^2 or ^-1", hint)
        if abs(power.value) > HIGHEST_POWER:
            text = str(power.value) if abs(power.value) < 10**12 else "a larger one"
            raise Problem(span, f"expected an exponent from -{HIGHEST_POWER} to {HIGHEST_POWER}, got {text}")
