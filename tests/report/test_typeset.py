"""Typesetting: what is set has the value of the text it was read from."""

from __future__ import annotations

import math
import random
import xml.etree.ElementTree as ElementTree

import pytest

from surdwise.report import mathml, texmath
from surdwise.report.formula import (
    Digits,
    Fence,
    Formula,
    Name,
    NotAnExpression,
    Op,
    Over,
    Power,
    Root,
    Row,
    expression,
    formula,
)
from surdwise.sheet import FORMS, Kind, read_line


def _number(f: Formula) -> float:
    """The value of a formula, read as a person reads it."""
    if isinstance(f, Digits):
        return float(f.text)
    if isinstance(f, Name):
        return {"u": 1.7, "v": 0.6}[f.text]
    if isinstance(f, Over):
        return _number(f.top) / _number(f.bottom)
    if isinstance(f, Power):
        return float(_number(f.base) ** _number(f.exponent))
    if isinstance(f, Root):
        return math.sqrt(_number(f.inner))
    if isinstance(f, Fence):
        return _number(f.inner)
    assert isinstance(f, Row)
    total, product, sign = 0.0, None, 1.0
    for x in f.items:
        if isinstance(x, Op) and x.kind in ("sum", "sign"):
            total += sign * (product if product is not None else 0.0)
            product, sign = None, -1.0 if x.text == "−" else 1.0
        elif not isinstance(x, Op):
            product = _number(x) * (1.0 if product is None else product)
    return total + sign * (product or 0.0)


def _random_text(chance: random.Random, depth: int) -> str:
    if depth == 0:
        return chance.choice(["2", "3", "17", "u", "v"])
    a, b = _random_text(chance, depth - 1), _random_text(chance, depth - 1)
    form = chance.choice(
        ["({} + {})", "({} - {})", "{}*{}", "({})/({})", "sqrt({}**2 + {}**2)", "({})**2*{}"]
    )
    return form.format(a, b)


def test_values_survive_typesetting() -> None:
    chance = random.Random(3)
    names = {"u": 1.7, "v": 0.6, "sqrt": math.sqrt}
    for _ in range(300):
        text = _random_text(chance, 3)
        try:
            wanted = eval(text, {"__builtins__": {}}, names)
        except (ZeroDivisionError, ValueError):
            continue  # no value: a zero divisor, the root of a negative number
        assert math.isclose(_number(expression(text)), wanted, rel_tol=1e-9, abs_tol=1e-9), text


def test_minus_and_fractions() -> None:
    assert _number(expression("-sqrt(3)/6 + 1/2")) == pytest.approx(0.5 - math.sqrt(3) / 6)
    assert texmath.value("-sqrt(3)/6 + 1/2") == r"$-\frac{\sqrt{3}}{6}{}+{}\frac{1}{2}$"


def test_unknown_text_stays_text() -> None:
    with pytest.raises(NotAnExpression):
        expression("a root & more")
    assert mathml.flowing("a < b & c") == "<code>a &lt; b &amp; c</code>"
    assert mathml.value("CRootOf(x**3 - 2, 0)").startswith("CRootOf(")


def test_every_form_of_the_language_is_set() -> None:
    """Each form's own example comes out as well-formed MathML and as balanced LaTeX."""
    words = {Kind.CONDITION: "provided", Kind.RELATION: "claim", Kind.QUANTITY: "claim", Kind.THESIS: "claim"}
    count = 0
    for form in FORMS.values():
        if form.kind is Kind.REFERENCE:
            continue
        keyword = words.get(form.kind, "given")
        text = form.example + (" = 1" if form.kind is Kind.QUANTITY else "")
        f = formula(read_line(keyword, text))
        page = mathml.math(f)
        ElementTree.fromstring(f"<p>{page}</p>")
        tex = texmath.math(f)
        assert tex.count("{") == tex.count("}") and tex.count("$") % 2 == 0
        count += 1
    assert count > 80


def test_text_of_a_title_is_safe() -> None:
    assert (
        texmath.text("50% & {x}_1 ~ é α ☃")
        == r"50\% \& \{x\}\_1 \textasciitilde{} é \ensuremath{\alpha} [U+2603]"
    )
