"""Run the parse table over the tokens of one statement."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

from .errors import Problem, SurdwiseError
from .lexer import DEEPEST, END, Lexer, Token
from .nodes import Maker
from .table import Table
from .tree import Condition, Fact, Named, Span


class Unexpected(SurdwiseError):
    """No statement goes on like this; explain.py turns it into a Problem.

    `states` is the stack of the table's states before the token, `count` the number of
    tokens before it, `before` the last of them.
    """

    def __init__(self, token: Token, states: tuple[int, ...], count: int, before: Token | None) -> None:
        super().__init__(token.text)
        self.token = token
        self.states = states
        self.count = count
        self.before = before


@dataclass(frozen=True)
class Parsed:
    """A statement's tree, and the names it calls a line or a circle in so many words."""

    body: Fact | Condition
    said: tuple[tuple[Named, str], ...]


def parse(table: Table, start: str, source: str, position: int, stop: int, line: int) -> Parsed:
    """The tree of source[position:stop] read from the given start rule.

    Raises Unexpected where the tokens cannot go on, Problem where they make no sense.
    """
    lexer = Lexer(table, source, position, stop)
    maker = Maker(line)
    states = [table.start[start]]
    values: list[Any] = []
    extents: list[tuple[int, int, int]] = []  # column, column after, levels of the tree
    count = 0
    before: Token | None = None
    while True:
        token = lexer.next("FRACTION" in table.actions[states[-1]])
        settled = tuple(states)
        if len(settled) > 8 * DEEPEST:
            raise _too_deep(Span(line, token.column, token.end))
        while True:
            action = table.actions[states[-1]].get(token.kind)
            if action is None:
                raise Unexpected(token, settled, count, before)
            if action >= 0:
                break
            rule = table.rules[-1 - action]
            size = len(rule.kept)
            children, parts = values[-size:], extents[-size:]
            del states[-size:], values[-size:], extents[-size:]
            first, last, depth = parts[0][0], parts[-1][1], max(part[2] for part in parts)
            made = maker.make(rule, children, parts)
            if not rule.origin.startswith("_") and not any(made is child for child in children):
                depth += 1
                if depth > DEEPEST:
                    raise _too_deep(Span(line, first, last))
            values.append(made)
            extents.append((first, last, depth))
            states.append(table.gotos[states[-1]][rule.origin])
        if token.kind == END:
            return Parsed(values[-1], tuple(maker.said))
        states.append(action)
        values.append(token)
        extents.append((token.column, token.end, 0))
        count += 1
        before = token


def _too_deep(span: Span) -> Problem:
    message = f"expected a formula of at most {DEEPEST} levels, got a deeper one"
    return Problem(span, message, "write it shorter")


def acceptable(table: Table, states: tuple[int, ...]) -> frozenset[str]:
    """The terminals that can really come next, the table's states being `states`."""
    return frozenset(kind for kind in table.actions[states[-1]] if after(table, states, kind))


def after(table: Table, states: tuple[int, ...], kind: str) -> tuple[int, ...]:
    """The states after one more terminal, or () if it cannot come next."""
    stack = list(states)
    while True:
        action = table.actions[stack[-1]].get(kind)
        if action is None:
            return ()
        if action >= 0:
            return (*stack, action)
        _reduce(table, stack, action)


def resting(table: Table, states: tuple[int, ...]) -> tuple[int, ...]:
    """The states after all reductions that do not depend on what comes next."""
    stack = list(states)
    while True:
        actions = set(table.actions[stack[-1]].values())
        if len(actions) != 1 or min(actions) >= 0:
            return tuple(stack)
        _reduce(table, stack, actions.pop())


def _reduce(table: Table, stack: list[int], action: int) -> None:
    rule = table.rules[-1 - action]
    del stack[-len(rule.kept) :]
    stack.append(table.gotos[stack[-1]][rule.origin])
