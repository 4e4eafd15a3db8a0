"""What `surdwise rewrite` prints for two systems is run by them, and gives the same polynomials."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest
import sympy as sp  # type: ignore[import-untyped]

from ..field.outside import needs_singular, parsed, singular
from .sheets import EXAMPLES

SHEETS = ["chord-sum", "euler-line", "stretched-string", "three-distances", "square-and-midpoint"]
CASES = [(name, form) for name in SHEETS for form in ("auxiliary", "sign_product")]
LONG = ("three-distances", "sign_product")


def printed(sheet: Path, form: str, to: str) -> str:
    """The output of the command."""
    run = subprocess.run(
        [sys.executable, "-m", "surdwise", "rewrite", str(sheet), "--form", form, "--to", to],
        capture_output=True,
        text=True,
        timeout=60,
        check=True,
    )
    return run.stdout


def by_sympy(script: str) -> list[list[sp.Expr]]:
    """The polynomials of each claim."""
    out = []
    for piece in script.split("from sympy import ")[1:]:
        scope: dict[str, object] = {}
        exec("from sympy import " + piece, scope)
        polynomials = scope["polynomials"]
        assert isinstance(polynomials, list)
        out.append([sp.sympify(p) for p in polynomials])
    return out


@needs_singular
@pytest.mark.parametrize(("name", "form"), [c for c in CASES if c != LONG])
def test_both_systems_run_the_script_and_agree(name: str, form: str) -> None:
    sheet = EXAMPLES / f"{name}.claim"
    theirs = by_sympy(printed(sheet, form, "sympy"))
    script = printed(sheet, form, "singular")
    pieces = script.split("ring r = ")[1:]
    assert len(pieces) == len(theirs) > 0
    for piece, polynomials in zip(pieces, theirs, strict=True):
        out = singular("ring r = " + piece + "\nshort = 0;\nstring(formulation);")
        found = [parsed(x) for x in out.split(",")]
        assert len(found) == len(polynomials)
        assert all(sp.expand(a - b) == 0 for a, b in zip(found, polynomials, strict=True))


@needs_singular
def test_a_long_script_runs_in_both() -> None:
    """Some 26,000 terms."""
    sheet = EXAMPLES / f"{LONG[0]}.claim"
    out = singular(printed(sheet, LONG[1], "singular") + "\nsize(formulation[1]);")
    (polynomials,) = by_sympy(printed(sheet, LONG[1], "sympy"))
    assert int(out) == len(polynomials[0].args)
