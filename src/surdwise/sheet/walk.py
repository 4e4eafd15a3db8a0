"""Go through the parts of a statement's tree, from left to right."""

from __future__ import annotations

from collections.abc import Iterator

from .tree import (
    And,
    Arg,
    Binary,
    CentreOf,
    Comparison,
    Condition,
    Fact,
    Measure,
    Not,
    Or,
    Relation,
    Through,
    Unary,
)

Part = Fact | Condition | Arg


def children(node: Part) -> tuple[Part, ...]:
    """The parts directly below a node."""
    match node:
        case Fact() | Relation():
            return node.args
        case Not() | Unary():
            return (node.arg,)
        case And() | Or():
            return node.args
        case Comparison():
            return node.items
        case Binary():
            return (node.left, node.right)
        case Measure():
            return (*node.points, node.line) if node.line is not None else node.points
        case CentreOf():
            return (node.circle,)
        case Through():
            return node.points
        case tuple():
            return node
    return ()


def parts(node: Part) -> Iterator[Part]:
    """The node and everything below it, each before its own parts."""
    waiting: list[Part] = [node]
    while waiting:
        part = waiting.pop()
        yield part
        waiting.extend(reversed(children(part)))
