"""Exports are run by the systems they are written for, and say what the polynomials say."""

from __future__ import annotations

import re
from typing import Any

import pytest
import sympy as sp  # type: ignore[import-untyped]

import surdwise
from surdwise.field.ring import Poly
from surdwise.thesis.export import EXPORTS, names
from surdwise.thesis.formal import Thesis
from surdwise.thesis.formulations import formulate
from surdwise.thesis.parts import Form

from ..field.outside import needs_singular, parsed, proportional, singular
from .claims import comparison, formal

CLAIMS = [
    "|PX| + |XQ| = |PQ|",
    "2|AC| + 3|BC| = 4|AB|",
    "|AC| = |BC|",
    "|AC| + |BC| = 2",
    "|AC|/|BC| = 2",
    "area(ABC) = |AB|*|BC|/2",
    "circumradius(ABC) = 2inradius(ABC)",
    "altitude(ABC, A) = altitude(ABC, B)",
    "median(ABC, A) = median(ABC, B)",
    "median(ABC, A) + median(ABC, B) = 3/2*|AC|",
    "bisector(ABC, A) = |AB|/2",
    "cos(BAC) = 1/3",
    "|AC| = sqrt(3)*|BC|",
    "area(ABC) = sqrt(3)/4*|AC|^2",
    "sqrt(2)*|AC| + sqrt(3)*|BC| = sqrt(6)*|AB|",
]

every = pytest.mark.parametrize("claim", CLAIMS)
forms = pytest.mark.parametrize("form", Form)


def named(t: Thesis, p: Poly) -> Any:
    """A polynomial with the exported names, coefficient by coefficient."""
    table = names(t)
    total = sp.Integer(0)
    for mono, c in p.terms():
        term = sp.Rational(int(c.p), int(c.q))
        for slot, e in enumerate(mono):
            if e:
                term *= sp.Symbol(table[slot]) ** e
        total += term
    return total


def run_sympy(script: str) -> list[Any]:
    scope: dict[str, Any] = {}
    exec(script, scope)
    return [sp.sympify(p) for p in scope["polynomials"]]


@every
@forms
def test_the_sympy_script_runs(claim: str, form: Form) -> None:
    t, _ = formal(claim)
    f = formulate(t, form)
    found = run_sympy(EXPORTS["sympy"](t, f))
    assert len(found) == len(f.polynomials)
    for mine, p in zip(found, f.polynomials, strict=True):
        assert proportional(mine, named(t, p))


@needs_singular
@every
@forms
def test_the_singular_script_runs_and_agrees_with_the_sympy_script(claim: str, form: Form) -> None:
    t, _ = formal(claim)
    f = formulate(t, form)
    out = singular(EXPORTS["singular"](t, f) + "\nstring(formulation);")
    found = [parsed(text) for text in out.split(",")]
    theirs = run_sympy(EXPORTS["sympy"](t, f))
    assert len(found) == len(theirs)
    for mine, p in zip(found, theirs, strict=True):
        assert sp.expand(mine - p) == 0


@every
@forms
def test_text_says_the_same(claim: str, form: Form) -> None:
    t, _ = formal(claim)
    f = formulate(t, form)
    rows = EXPORTS["text"](t, f).splitlines()
    theirs = run_sympy(EXPORTS["sympy"](t, f))
    assert all(row.endswith(" = 0") for row in rows)
    for row, p in zip(rows, theirs, strict=True):
        assert sp.expand(parsed(row.removesuffix(" = 0")) - p) == 0


@every
@forms
def test_latex_is_balanced_and_says_the_same(claim: str, form: Form) -> None:
    t, _ = formal(claim)
    f = formulate(t, form)
    text = EXPORTS["latex"](t, f)
    assert text.startswith("\\begin{align*}\n") and text.endswith("\n\\end{align*}")
    depth = 0
    for c in text:
        depth += (c == "{") - (c == "}")
        assert depth >= 0
    assert depth == 0
    body = text.removeprefix("\\begin{align*}\n").removesuffix("\n\\end{align*}")
    rows = body.split(" \\\\\n")
    theirs = run_sympy(EXPORTS["sympy"](t, f))
    assert len(rows) == len(theirs)
    for row, p in zip(rows, theirs, strict=True):
        assert row.endswith(" &= 0") and row.count("&") == 1 and "*" not in row
        assert sp.expand(_read_latex(row.removesuffix(" &= 0")) - p) == 0


def _read_latex(row: str) -> Any:
    """Our small part of LaTeX: subscripts, exponents, factors side by side."""
    plain = re.sub(r"_\{(\w+)\}", r"\1", row)
    plain = re.sub(r"\^\{(\d+)\}", r"**\1", plain)
    assert not set(plain) & set("\\{}^_")
    plain = re.sub(r"(?<=\w) (?=\w)", "*", plain)
    return sp.sympify(plain)


@every
def test_the_legend_defines_every_name(claim: str) -> None:
    sheet, _ = comparison(claim)
    (r,) = surdwise.rewrite(sheet)
    legend = " ".join(r.legend())
    for f in r.formulations:
        for p in run_sympy(r.export(f.form, "sympy")):
            for s in p.free_symbols:
                name = str(s)
                # numeric roots are defined by their own equation
                assert re.search(rf"\b{name}\b", legend) or name.startswith("w"), name


def test_primed_and_numbered_points_get_names_of_their_own() -> None:
    (sheet,) = surdwise.read("given points A, B, C', C2, C\nclaim |AB| + |AC'| = |BC2| + |AC|\n")
    (r,) = surdwise.rewrite(sheet)
    (p,) = run_sympy(r.export(Form.SIGN_PRODUCT, "sympy"))
    assert len(p.free_symbols) == 2 * 5 - 4
    latex = r.export(Form.SIGN_PRODUCT, "latex")
    assert "_{C'}" in latex and "_{C2}" in latex


@needs_singular
def test_primed_points_in_singular() -> None:
    (sheet,) = surdwise.read("given points A, B, C', C2\nclaim |AC'| + |BC2| = |AB|\n")
    (r,) = surdwise.rewrite(sheet)
    out = singular(r.export(Form.SIGN_PRODUCT, "singular") + "\nsize(formulation[1]);")
    assert int(out) == r.formulations[2].terms
