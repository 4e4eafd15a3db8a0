"""Conditions in one spelling: what differs only in the order of symmetric parts comes out equal."""

from __future__ import annotations

from dataclasses import fields, is_dataclass, replace
from typing import Any

from surdwise.sheet.show import show
from surdwise.sheet.tree import And, Comparison, Measure, Not, Or, Relation, Through

FLIPPED = {"<": ">", "<=": ">=", ">": "<", ">=": "<=", "=": "="}


def tidy(node: Any) -> Any:
    """The condition with its symmetric parts in alphabetical order."""
    if isinstance(node, tuple):
        return tuple(tidy(x) for x in node)
    if not is_dataclass(node):
        return node
    new: Any = replace(node, **{f.name: tidy(getattr(node, f.name)) for f in fields(node)})  # type: ignore[type-var]
    match new:
        case And() | Or():
            return replace(new, args=_ordered(new.args))
        case Comparison():
            if show(new.items[0]) > show(new.items[-1]):
                return replace(new, items=new.items[::-1], ops=tuple(FLIPPED[x] for x in new.ops[::-1]))
        case Not(Comparison(items, ("<",))):
            return Comparison(items, (">=",))
        case Through():
            return replace(new, points=_ordered(new.points))
        case Measure("length"):
            return replace(new, points=_ordered(new.points))
        case Relation():
            return replace(new, args=_related(new))
    return new


def _ordered(xs: tuple[Any, ...]) -> tuple[Any, ...]:
    return tuple(sorted(xs, key=show))


def _related(r: Relation) -> tuple[Any, ...]:
    a: Any = r.args
    match r.form:
        case "collinear" | "concyclic" | "distinct":
            return (_ordered(a[0]),)
        case "parallel_lines" | "perpendicular_lines":
            return _ordered(a)
        case "between":
            return (a[0], *_ordered(a[1:]))
        case "same_side" | "opposite_sides":
            return (*_ordered(a[:2]), a[2])
        case "angle_size":
            p, q, s = a[0]
            return ((*_ordered((p, s)), q), a[1])
        case "inside" | "outside" | "on_segment":
            return (a[0], _ordered(a[1]))
        case "triangle_size":
            return (_ordered(a[0]), a[1])
    return a  # type: ignore[no-any-return]
