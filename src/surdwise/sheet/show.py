"""Print any node of the tree as sheet language, with as few parentheses as it takes.

What `show` prints reads back as an equal tree.
"""

from __future__ import annotations

from fractions import Fraction

from .forms import FORMS
from .tree import (
    And,
    Arg,
    Binary,
    CentreOf,
    Comparison,
    Fact,
    Line,
    Measure,
    Named,
    Not,
    Number,
    Or,
    Pt,
    Relation,
    Sheet,
    Through,
    Unary,
)

Node = Sheet | Line | Fact | Relation | Comparison | Not | And | Or | Arg

# How tightly a printed quantity holds together; a looser one goes into parentheses.
_SUM, _PRODUCT, _LEAD, _POWER, _ATOM = range(5)
_CORNERED = ("exradius", "median", "altitude", "bisector")


def show(node: Node) -> str:
    """The node as text in the unified (British) spelling."""
    match node:
        case Sheet():
            return _sheet(node)
        case Line():
            return f"{node.keyword:<8} {show(node.body)}"
        case Fact() | Relation():
            return _worded(node)
        case Comparison():
            parts = [show(node.items[0])]
            for op, item in zip(node.ops, node.items[1:], strict=True):
                parts.append(f"{op} {show(item)}")
            return " ".join(parts)
        case Not():
            return f"not {_inside(node.arg, And, Or)}"
        case And():
            return " and ".join(_inside(arg, And, Or) for arg in node.args)
        case Or():
            return " or ".join(_inside(arg, Or) for arg in node.args)
        case Pt() | Named():
            return node.name
        case Through():
            return show(node.points)
        case CentreOf():
            return f"centre of {show(node.circle)}"
        case str():
            return node
        case tuple():
            return "".join(point.name for point in node)
        case Number() | Measure() | Unary() | Binary():
            return _quantity(node)[0]
    raise TypeError(f"expected a node of a sheet's tree, got {type(node).__name__}")


def _sheet(sheet: Sheet) -> str:
    lines = []
    if sheet.title:
        lines.append(f"title    {sheet.title}")
    if sheet.source:
        lines.append(f"source   {sheet.source}")
    lines.extend(show(line) for line in (*sheet.given, *sheet.provided, *sheet.claims))
    return "\n".join(lines) + "\n"


def _worded(node: Fact | Relation) -> str:
    form = FORMS[node.form]
    if node.form == "points" and node.args and isinstance(node.args[0], tuple) and len(node.args[0]) == 1:
        return f"point {show(node.args[0])}"
    parts = []
    for role, arg in zip(form.args, node.args, strict=True):
        if role == "points" and isinstance(arg, tuple):
            parts.append(", ".join(point.name for point in arg))
        else:
            parts.append(show(arg))
    return form.pattern.format(*parts)


def _inside(condition: Node, *loose: type) -> str:
    """The condition, in parentheses if it is one of the loose kinds."""
    text = show(condition)
    return f"({text})" if isinstance(condition, loose) and _parts(condition) > 1 else text


def _parts(condition: Node) -> int:
    return len(condition.args) if isinstance(condition, And | Or) else 1


def _quantity(node: Node) -> tuple[str, int]:
    """The text of a quantity, and how tightly it holds together."""
    match node:
        case Number():
            return _number(node.value)
        case Measure():
            return _measure(node), _ATOM
        case Unary("neg", arg):
            return "-" + _at_least(arg, _LEAD), _LEAD
        case Unary(op, arg):
            return f"{op}({show(arg)})", _ATOM
        case Binary("^", base, power):
            return f"{_at_least(base, _ATOM)}^{_power(power)}", _POWER
        case Binary("*", Number() as factor, right) if factor.value >= 0 and not _starts_with_number(right):
            number = _number(factor.value)[0]
            return number + _at_least(right, _POWER), _LEAD
        case Binary("*", left, right):
            return f"{_at_least(left, _PRODUCT)}*{_at_least(right, _POWER)}", _PRODUCT
        case Binary("/", left, right):
            return f"{_at_least(left, _PRODUCT)}/{_at_least(right, _POWER)}", _PRODUCT
        case Binary(op, left, right):
            return f"{_at_least(left, _SUM)} {op} {_at_least(right, _PRODUCT)}", _SUM
    raise TypeError(f"expected a quantity, got {type(node).__name__}")


def _number(value: Fraction) -> tuple[str, int]:
    tightness = _ATOM if value >= 0 else _LEAD
    return str(value), tightness if value.denominator == 1 else _PRODUCT


def _power(power: Node) -> str:
    """An exponent; only an integer needs no parentheses."""
    if isinstance(power, Number) and power.value.denominator == 1:
        return str(power.value)
    return f"({show(power)})"


def _measure(node: Measure) -> str:
    pattern = FORMS[node.kind].pattern
    if node.kind == "dist" and node.line is not None:
        return pattern.format(show(node.points[0]), show(node.line))
    names = [show(point) for point in node.points]
    if node.kind in _CORNERED:
        return pattern.format("".join(names[:-1]), names[-1])
    return pattern.format("".join(names))


def _at_least(node: Node, tightness: int) -> str:
    """The quantity, in parentheses if it is looser than asked or starts with a minus in the middle."""
    text, own = _quantity(node)
    if own < tightness or (text.startswith("-") and tightness != _SUM):
        return f"({text})"
    return text


def _starts_with_number(node: Node) -> bool:
    """Whether the printed factor would start with a digit, so that a sign is needed before it."""
    return isinstance(node, Number) or (
        isinstance(node, Binary) and node.op == "^" and isinstance(node.left, Number)
    )
