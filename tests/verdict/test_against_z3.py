"""The published triangle inequalities by z3 (general nonlinear real arithmetic): wherever it answers
within its limit, the verdicts agree."""

from __future__ import annotations

from fractions import Fraction
from typing import Any

import pytest
import z3

from surdwise import Verdict, read
from surdwise.sheet.tree import Binary, Comparison, Measure, Number, Quantity, Unary

from .test_triangle_inequalities import TABLE

MILLISECONDS = 400


class Triangle:
    """Side lengths as unknowns; every other length is a non-negative unknown with an equation."""

    def __init__(self) -> None:
        a, b, c = z3.Reals("a b c")
        self.side = {"A": a, "B": b, "C": c}
        self.facts: list[Any] = [a > 0, b > 0, c == 1, a + b > c, b + c > a, c + a > b]
        self.known: dict[str, Any] = {}

    def root(self, square: Any, name: str) -> Any:
        """A non-negative number with this square."""
        if name not in self.known:
            x = z3.Real(f"x{len(self.known)}")
            self.known[name] = x
            self.facts += [x >= 0, x * x == square]
        return self.known[name]

    def area(self) -> Any:
        a, b, c = self.side.values()
        return self.root((a + b + c) * (a + b - c) * (b + c - a) * (c + a - b) / 16, "area")

    def measure(self, m: Measure) -> Any:
        a, b, c = self.side.values()
        names = [str(p) for p in m.points]
        if m.kind == "length":
            (left,) = set("ABC") - set(names)
            return self.side[left]
        s = a + b + c
        if m.kind == "perimeter":
            return s
        if m.kind == "area":
            return self.area()
        if m.kind == "inradius":
            return 2 * self.area() / s
        if m.kind == "circumradius":
            return a * b * c / (4 * self.area())
        at = names[-1] if m.kind != "cos" else names[1]
        x = self.side[at]
        y, z = (v for n, v in self.side.items() if n != at)
        if m.kind == "exradius":
            return 2 * self.area() / (y + z - x)
        if m.kind == "altitude":
            return 2 * self.area() / x
        if m.kind == "median":
            return self.root((2 * y * y + 2 * z * z - x * x) / 4, f"median {at}")
        if m.kind == "bisector":
            return self.root(y * z * (1 - x * x / ((y + z) * (y + z))), f"bisector {at}")
        assert m.kind == "cos"
        return (y * y + z * z - x * x) / (2 * y * z)

    def value(self, q: Quantity) -> Any:
        if isinstance(q, Number):
            return z3.RealVal(str(Fraction(q.value)))
        if isinstance(q, Measure):
            return self.measure(q)
        if isinstance(q, Unary):
            x = self.value(q.arg)
            if q.op == "neg":
                return -x
            return z3.If(x < 0, -x, x) if q.op == "abs" else self.root(x, f"sqrt {x}")
        assert isinstance(q, Binary)
        x = self.value(q.left)
        if q.op == "^":
            assert isinstance(q.right, Number)
            out = x
            for _ in range(int(q.right.value) - 1):
                out = out * x
            return out
        y = self.value(q.right)
        return {"+": x + y, "-": x - y, "*": x * y}[q.op] if q.op != "/" else x / y

    def claim(self, c: Comparison) -> Any:
        left, right = (self.value(q) for q in c.items)
        return {"<": left < right, "<=": left <= right, ">": left > right, ">=": left >= right}[c.ops[0]]


def answer(claim: str, negated: bool) -> str:
    (sheet,) = read(f"given triangle ABC\nclaim {claim}\n")
    t = Triangle()
    body = sheet.claims[0].body
    assert isinstance(body, Comparison)
    statement = t.claim(body)
    solver = z3.Solver()
    solver.set("timeout", MILLISECONDS)
    solver.add(*t.facts, z3.Not(statement) if negated else statement)
    return str(solver.check())


@pytest.mark.parametrize(("claim", "verdict", "_equality"), TABLE, ids=[row[0] for row in TABLE])
def test_z3_agrees_where_it_answers(claim: str, verdict: Verdict, _equality: str | None) -> None:
    false_somewhere, true_somewhere = answer(claim, True), answer(claim, False)
    if false_somewhere != "unknown":
        assert (false_somewhere == "unsat") == (verdict is Verdict.HOLDS)
    if true_somewhere == "unsat":
        assert verdict is Verdict.FAILS
    if true_somewhere == "sat" and verdict is Verdict.FAILS:
        # true on a thin set only: z3 found one of its figures, e.g. the equilateral one
        assert "=" in claim


def test_z3_answers_enough_to_be_a_check() -> None:
    found = [row[0] for row in TABLE if answer(row[0], True) != "unknown"]
    assert len(found) >= 20, found
