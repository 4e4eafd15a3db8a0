"""Signed forms of an equality: each term of non-negative lengths may change its sign."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import product

from ..sheet.tree import Binary, Comparison, Measure, Number, Quantity, Unary

MAX_TERMS = 7


@dataclass(frozen=True)
class Term:
    """One summand of left - right: its sign as written, and what it is."""

    sign: int
    quantity: Quantity
    flips: bool


def terms(c: Comparison) -> list[Term] | None:
    """Summands of left - right, or None if there are too many sign patterns."""
    if len(c.ops) != 1 or c.ops[0] != "=":
        return None
    out = _flat(c.items[0], 1) + _flat(c.items[1], -1)
    return out if 2 <= sum(t.flips for t in out) <= MAX_TERMS or sum(t.flips for t in out) == 1 else None


def _flat(q: Quantity, sign: int) -> list[Term]:
    if isinstance(q, Binary) and q.op in "+-":
        return _flat(q.left, sign) + _flat(q.right, sign if q.op == "+" else -sign)
    if isinstance(q, Unary) and q.op == "neg":
        return _flat(q.arg, -sign)
    if isinstance(q, Number):
        return [Term(sign, q, False)] if q.value else []
    return [Term(sign, q, _odd(q))]


def _odd(q: Quantity) -> bool:
    """Whether the sign of a length in the term matters (an even power has none)."""
    if isinstance(q, Measure):
        return q.kind != "cos"
    if isinstance(q, Number):
        return False
    if isinstance(q, Unary):
        return True
    if q.op == "^":
        return isinstance(q.right, Number) and int(q.right.value) % 2 == 1 and _odd(q.left)
    return _odd(q.left) or _odd(q.right)


def signed(ts: list[Term], pattern: tuple[int, ...]) -> Comparison | None:
    """The equality with the pattern's signs on the terms that flip, written without minus signs
    where possible; None if one side would be empty (a sum of lengths that is zero)."""
    left: list[Quantity] = []
    right: list[Quantity] = []
    i = 0
    for t in ts:
        s = t.sign
        if t.flips:
            s *= pattern[i]
            i += 1
        (left if s > 0 else right).append(t.quantity)
    if not left or not right:
        return None
    if len(left) > len(right):
        left, right = right, left
    return Comparison((_sum(left), _sum(right)), ("=",))


def _sum(qs: list[Quantity]) -> Quantity:
    out = qs[0]
    for q in qs[1:]:
        out = Binary("+", out, q)
    return out


def patterns(ts: list[Term]) -> list[tuple[int, ...]]:
    """Sign patterns of the terms that flip, up to a common sign of all terms; the first is the
    statement as written."""
    n = sum(t.flips for t in ts)
    if all(t.flips for t in ts) and n:
        return [(1, *rest) for rest in product((1, -1), repeat=n - 1)]
    return list(product((1, -1), repeat=n))
