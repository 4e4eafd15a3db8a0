"""Other systems asked for a second opinion, and the translation of our objects into theirs.

SymPy and mpmath are libraries; Singular is a program, run on a script.  Tests that need it carry
`needs_singular`, which skips them, with the reason, only where the program is absent.
"""

from __future__ import annotations

import shutil
import subprocess
from collections.abc import Mapping, Sequence
from typing import Any

import pytest
import sympy as sp  # type: ignore[import-untyped]

from surdwise.field import ring, roots
from surdwise.field.real import Branch
from surdwise.field.ring import Poly
from surdwise.field.tower import Element, Tower

PROGRAM = shutil.which("Singular")
needs_singular = pytest.mark.skipif(PROGRAM is None, reason="the program Singular is not installed")


def singular(script: str, seconds: float = 60.0) -> str:
    """What Singular prints for a script."""
    assert PROGRAM is not None
    run = subprocess.run(
        [PROGRAM, "-q", "--no-rc"],
        input=script + "\nquit;\n",
        capture_output=True,
        text=True,
        timeout=seconds,
        check=True,
    )
    out = run.stdout.strip()
    assert " error " not in out and "? " not in out, out
    return out


def symbol(slot: int) -> Any:
    """SymPy's symbol for one of our variables."""
    names = [*ring.GEN_NAMES[::-1], *ring.PARAM_NAMES]
    return sp.Symbol(names[slot])


def expression(p: Poly) -> Any:
    """A polynomial of ours as a SymPy expression, coefficient by coefficient."""
    total = sp.Integer(0)
    for mono, c in p.terms():
        term = sp.Rational(int(c.p), int(c.q))
        for slot, e in enumerate(mono):
            if e:
                term *= symbol(slot) ** e
        total += term
    return total


def parsed(text: str) -> Any:
    """A polynomial printed by another program, as a SymPy expression."""
    return sp.sympify(text.replace("^", "**").replace("\n", ""), rational=True)


def proportional(a: Any, b: Any) -> bool:
    """Whether two polynomial expressions agree up to a rational factor other than zero."""
    a, b = sp.expand(a), sp.expand(b)
    if a == 0 or b == 0:
        return bool(a == b)
    names = sorted(a.free_symbols | b.free_symbols, key=str)
    if not names:
        return True
    p, q = sp.Poly(a, *names), sp.Poly(b, *names)
    return bool((p * q.LC() - q * p.LC()).is_zero)


def factors(e: Any) -> set[Any]:
    """The irreducible factors over the rationals of a polynomial expression, each in a form that
    two systems can share: primitive with a positive leading coefficient, names in order."""
    names = sorted(e.free_symbols, key=str)
    if not names:
        return set()
    out = set()
    for f, _ in sp.Poly(e, *names).factor_list()[1]:
        f = f.primitive()[1]
        out.add((f if f.LC() > 0 else -f).as_expr())
    return out


def same_zeros(a: Any, b: Any) -> bool:
    """Whether two polynomial expressions have the same irreducible factors."""
    return factors(sp.expand(a)) == factors(sp.expand(b))


# ------------------------------------------------------------------ numeric radicals


class Radicals:
    """A tower over Q grown from real radicals, with the same numbers kept as SymPy expressions.

    `root` takes the non-negative square root of a number of the tower, whether or not it is a
    square there already.
    """

    def __init__(self) -> None:
        self.tower = Tower()

    def number(self, n: int) -> Element:
        """An integer."""
        return self.tower.constant(n)

    def root(self, e: Element) -> Element:
        """The non-negative square root."""
        r = roots.sqrt(e, self.tower)
        if r is None:
            self.tower, r = self.tower.adjoin_sqrt(e, "positive", "root")
            return r
        return r if r.is_zero() or Branch({}).sign(r) > 0 else -r

    def read(self, e: Any) -> Element:
        """A SymPy expression in integers, `+`, `*`, and square roots."""
        e = sp.sympify(e)
        if e.is_Rational:
            return self.tower.constant(1) * int(e.p) / int(e.q)
        if e.is_Pow and e.exp == sp.Rational(1, 2):
            return self.root(self.read(e.base))
        if e.is_Pow and e.exp.is_Integer:
            return self.read(e.base) ** int(e.exp)
        if e.is_Pow and e.exp == -sp.Rational(1, 2):
            return 1 / self.root(self.read(e.base))
        parts = [self.read(x) for x in e.args]
        out = parts[0]
        for x in parts[1:]:
            out = out + x if e.is_Add else out * x
        assert e.is_Add or e.is_Mul, e
        return out


def minimal_polynomial(e: Element, x: Any) -> Any:
    """Minimal polynomial over Q of a number of a tower: the one factor of the norm of u0 - e."""
    found = roots.norm_factors(e.tower.param(0) - e)
    assert len(found) == 1
    return expression(next(iter(found.values()))).subs(symbol(ring.param_slot(0)), x)


def script(polys: Sequence[Poly | str], ground: str = "0") -> str:
    """The start of a Singular script: a ring over all variables that occur, an ideal `i`."""
    used = [n for k, n in enumerate([*ring.GEN_NAMES[::-1], *ring.PARAM_NAMES]) if _occurs(polys, k, n)]
    rows = ",\n".join(str(p) for p in polys)
    return f"ring r = ({ground}), ({','.join(used)}), dp;\nideal i = {rows};\n"


def _occurs(polys: Sequence[Poly | str], slot: int, name: str) -> bool:
    return any(p.degrees()[slot] > 0 if not isinstance(p, str) else name in p for p in polys)


def at(e: Any, values: Mapping[str, Any]) -> Any:
    """A SymPy expression with named symbols replaced."""
    return e.subs({sp.Symbol(k): v for k, v in values.items()})
