"""Claims to SymPy and back.  SymPy is imported when one of these functions is called.

The convention: a quantity of the sheet language becomes a function of points (symbols.py), as
`Distance(A, B)` for `|AB|`; a claim becomes a relation between expressions of them, a chain a
tuple of relations.  Exact: floats are refused.

SymPy simplifies and reorders what it is given, so text that went there and back may be another
text for the same claim, with `to_sympy(from_sympy(e)) == e`.  With `evaluate=False` in both
directions nothing is simplified, and the text reads to the very tree that was given (but for
`a + (-b)`, `-1*a` and `a*b^(-1)`, which come back as `a - b`, `-a` and `a/b`).
"""

from __future__ import annotations

from typing import Any

from ..api import Rewriting
from ..sheet import SurdwiseError, read_line
from ..sheet.tree import Comparison, Line, Quantity
from ..thesis.parts import Form


class InteropError(SurdwiseError):
    """Something that the other side cannot say."""


def to_sympy(
    what: str | Line | Comparison | Quantity | Rewriting,
    form: Form | str | None = None,
    *,
    evaluate: bool = True,
) -> Any:
    """A claim, a quantity or a formulation in SymPy's terms.

    Text, a line or a comparison gives a relation (a tuple of them for a chain), a quantity an
    expression.  A Rewriting with a form gives that formulation's polynomials, each meaning `= 0`,
    as a tuple of expressions in symbols named as `Rewriting.legend` says.  Raises InteropError.
    """
    from . import convert

    if isinstance(what, Rewriting):
        return convert.polynomials(what, form)
    if isinstance(what, str):
        what = _comparison(read_line("claim", what))
    elif isinstance(what, Line):
        what = _comparison(what.body)
    if isinstance(what, Comparison):
        return convert.relation(what, evaluate)
    return convert.expression(what, evaluate)


def from_sympy(expr: Any, *, evaluate: bool = True) -> str:
    """The text, in the sheet language, of a relation, a tuple of relations that form a chain, or
    an expression.  With `evaluate=False` the order of the arguments is kept as it stands.
    Raises InteropError for what the language does not have."""
    from . import convert

    return convert.text(expr, evaluate)


def _comparison(body: object) -> Comparison:
    if not isinstance(body, Comparison):
        raise InteropError("expected a claim between quantities, got a relation in words")
    return body
