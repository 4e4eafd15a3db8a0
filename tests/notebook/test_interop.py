"""Claims to SymPy and back, against the reader and against SymPy's own numbers."""

from __future__ import annotations

import math
import subprocess
import sys
from fractions import Fraction
from pathlib import Path
from typing import Any

import pytest
import sympy
from hypothesis import HealthCheck, assume, given, settings

import surdwise
from surdwise.notebook import InteropError, from_sympy, to_sympy
from surdwise.sheet import Binary, Measure, Number, Quantity, SheetError, Unary, read_line
from surdwise.thesis.parts import Form

from ..sheet.trees import comparisons, quantities

SRC = Path(__file__).parents[2] / "src"

CLAIMS = [
    "|PA| = |PB| + |PC|",
    "|AB|^2 + |AC|^2 = 2(|BM|^2 + |AM|^2)",
    "dist(P, AB) + dist(P, l) + dist(centre of k, BC) <= altitude(ABC, A)",
    "circumradius(ABC) >= 2inradius(ABC)",
    "|AB| < |BC| <= |CA|",
    "area(ABCD) = 1/2|AC|*|BD|*sin(APB)",
    "|EI| - |SN| = sqrt(3)*abs(|OQ| - |CS|)/4",
    "-|AB| + 3/2 < cos(BAC)",
    "perimeter(ABCDE)/exradius(ABC, B) > |A'B2|^-2",
]


def normal(q: Quantity) -> Quantity:
    """a - b for a + (-b), -a for -1*a, a/b for a*b^(-1): SymPy has one expression for both."""
    match q:
        case Unary(op, arg):
            return Unary(op, normal(arg))
        case Binary("+", a, Unary("neg", b)):
            return Binary("-", normal(a), normal(b))
        case Binary("+", a, Binary("*", Number(Fraction(numerator=-1, denominator=1)), b)):
            return Binary("-", normal(a), normal(b))
        case Binary("*", Number(Fraction(numerator=-1, denominator=1)), b):
            return Unary("neg", normal(b))
        case Binary("*", a, Binary("^", b, Number(Fraction(numerator=-1, denominator=1)))):
            return Binary("/", normal(a), normal(b))
        case Binary(op, a, b):
            return Binary(op, normal(a), normal(b))
    return q


@pytest.mark.parametrize("text", CLAIMS)
def test_there_and_back(text: str) -> None:
    tree = read_line("claim", text)
    assert read_line("claim", from_sympy(to_sympy(text, evaluate=False), evaluate=False)) == tree
    e = to_sympy(text)
    assert to_sympy(from_sympy(e)) == e


@given(comparisons())
@settings(max_examples=100, deadline=None, suppress_health_check=list(HealthCheck))
def test_any_tree_comes_back_as_it_was(claim: Any) -> None:
    back = read_line("claim", from_sympy(to_sympy(claim, evaluate=False), evaluate=False))
    assert [normal(q) for q in back.items] == [normal(q) for q in claim.items]  # type: ignore[union-attr]
    assert back.ops == claim.ops  # type: ignore[union-attr]


def value(q: Quantity) -> float:
    """A quantity where every measure has a value of its own made of its text, in floats."""
    match q:
        case Number(v):
            return float(v)
        case Measure():
            return of_name(from_sympy(to_sympy(q)))
        case Unary("neg", a):
            return -value(a)
        case Unary("sqrt", a):
            return math.sqrt(value(a))
        case Unary(_, a):
            return abs(value(a))
        case Binary(op, a, b):
            x, y = value(a), value(b)
            return {"+": x + y, "-": x - y, "*": x * y}[op] if op in "+-*" else x / y if op == "/" else x**y
    raise AssertionError


def of_name(text: str) -> float:
    return 0.5 + sum(map(ord, text)) % 97 / 97


@given(quantities)
@settings(max_examples=100, deadline=None, suppress_health_check=list(HealthCheck))
def test_the_expression_has_the_value_of_the_tree(q: Any) -> None:
    try:
        wanted = value(q)
        e = to_sympy(q)
    except (ValueError, ZeroDivisionError, OverflowError, InteropError):
        assume(False)
    assume(math.isfinite(wanted) and 1e-6 < abs(wanted) < 1e9)
    functions = {f: sympy.Float(of_name(str(f))) for f in e.atoms(sympy.Function) if f.func is not sympy.Abs}
    got = complex(e.xreplace(functions).evalf())
    assert abs(got - wanted) < 1e-6 * abs(wanted)
    if not e.has(sympy.I):
        try:
            again = to_sympy(read_line("claim", f"{from_sympy(e)} = 0"))
        except SheetError as refused:
            # SymPy makes one power of a power; sheets have exponents up to 64
            assert "exponent" in str(refused)
            return
        assert complex(again.lhs.xreplace(functions).evalf()) == pytest.approx(wanted, rel=1e-6)


def test_sympy_knows_what_a_distance_is() -> None:
    ab, ba = to_sympy("|AB| = |BA|", evaluate=True).args
    assert ab == ba
    assert sympy.sqrt(ab**2) == ab
    assert sympy.simplify(to_sympy("(|AB| + |CD|)^2 = 0").lhs - ab**2).has(ab)
    assert str(ab) == "|AB|"
    assert sympy.latex(ab) == "|AB|"


@pytest.mark.parametrize(
    "e",
    [
        sympy.Symbol("x") + 1,
        sympy.Eq(sympy.Float(0.5), sympy.Symbol("x"), evaluate=False),
        sympy.sin(1),
        sympy.Rational(2) ** sympy.Rational(1, 3),
        sympy.true,
        sympy.Ne(sympy.Symbol("x"), 1),
        (),
    ],
)
def test_what_the_language_does_not_have(e: Any) -> None:
    with pytest.raises(InteropError, match="expected"):
        from_sympy(e)
    with pytest.raises(InteropError, match="expected"):
        from_sympy(e, evaluate=False)


def test_words_and_undefined_quantities_are_refused() -> None:
    with pytest.raises(InteropError):
        to_sympy("AB parallel to CD")
    with pytest.raises(InteropError):
        to_sympy("1/(|AB| - |AB|) = 1")
    with pytest.raises(surdwise.SheetError):
        to_sympy("|AB| = ")


def test_formulations_are_those_of_the_script() -> None:
    (sheet,) = surdwise.read("given triangle ABC\ngiven D on line BC\nclaim |AB|/sqrt(3) = |AD| + |DC|\n")
    (r,) = surdwise.rewrite(sheet)
    for form in Form:
        space: dict[str, Any] = {}
        exec(r.export(form, "sympy"), space)
        assert list(to_sympy(r, form)) == [sympy.sympify(p) for p in space["polynomials"]]
        assert to_sympy(r, form.value) == to_sympy(r, form)
    with pytest.raises(InteropError):
        to_sympy(r)


def test_sympy_is_loaded_late() -> None:
    code = (
        "import sys; sys.path.insert(0, sys.argv[1]); import surdwise.notebook; print('sympy' in sys.modules)"
    )
    done = subprocess.run([sys.executable, "-c", code, str(SRC)], capture_output=True, text=True)
    assert done.stdout.strip() == "False", done.stderr
