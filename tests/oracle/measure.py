"""Quantities, truth and residuals on given figures: the oracle's public measuring tools.

All of it is float evidence and never a proof.  With floats a quantity is good to about 1e-15 times its
sensitivity (see figure.py); with mpmath coordinates the same code works in 60 digits.
"""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

import mpmath  # type: ignore[import-untyped]
import numpy as np

from surdwise.sheet.tree import And, Comparison, Fact, Not, Or, Relation, Sheet

from .figure import Figure, value
from .parts import parts
from .plane import Num, finite

DIGITS = 60
TOL = 1e-9
YES, NO, OPEN = 1, 0, -1


def quantity(q: Any, fig: Figure) -> Any:
    """The value of a quantity: one number for one figure, a column for many; NaN where undefined."""
    with mpmath.workdps(DIGITS), np.errstate(all="ignore"):
        return _plain(value(q, fig)[0], fig)


def truth(cond: Any, fig: Figure, tol: Any = None) -> bool | None:
    """Whether a condition or thesis is literally true on one figure.

    None where it is undefined, or where a number that decides it is neither above the tolerance nor
    below a thousandth of it (with mpmath coordinates: above 1e-25 or below 1e-40).  A number below is
    taken for zero: a hint, as a true difference can be smaller still.
    """
    with mpmath.workdps(DIGITS), np.errstate(all="ignore"):
        code = int(truths(cond, fig, tol)[0])
    return None if code == OPEN else code == YES


def residual(body: Any, fig: Figure) -> Any:
    """How far a `given` line is from being met, as a share of the figure's size; 0 where it is.

    Lengths that ought to be zero and negative lengths that ought not to be are added up by squares; a
    shape that collapses counts 1, something undefined counts infinity.  Values up to about 1e-12
    (1e-45 in digits) mean "met" on figures that are not nearly degenerate.
    """
    with mpmath.workdps(DIGITS), np.errstate(all="ignore"):
        return _plain(residuals(body, fig), fig)


def figure(sheet: Sheet, coordinates: Mapping[str, Any]) -> Figure:
    """One figure of a sheet: point name -> (x, y) or a complex number, in floats or mpmath's numbers."""
    return Figure.of(sheet, coordinates)


def _plain(column: Num, fig: Figure) -> Any:
    column = column + 0 * fig.size
    return column[0] if len(column) == 1 else column


# ------------------------------------------------------------------------------ columns


def residuals(body: Any, fig: Figure) -> Num:
    """As `residual`, a column always; call it within `workdps` for digits."""
    p = parts(body, fig)
    total = 0 * fig.size
    for z in p.zero:
        total = total + z * z
    for v in (*p.at_least, *p.above):
        total = total + np.where(v < 0, v * v, 0 * v)
    total = np.sqrt(total) if not fig.digits else np.frompyfunc(mpmath.sqrt, 1, 1)(total)
    for v in p.above:
        total = total + np.where(v > fig.tiny, 0, 1)
    bad = ~finite(total)
    for v in p.needs:
        bad = bad | ~(v > fig.tiny)
    return np.where(bad, np.inf, total)


def truths(cond: Any, fig: Figure, tol: Any = None) -> Num:
    """YES, NO or OPEN on every figure; `tol` may be a column."""
    if isinstance(cond, Not):
        t = truths(cond.arg, fig, tol)
        return np.where(t == OPEN, OPEN, 1 - t)
    if isinstance(cond, And | Or):
        ts = [truths(c, fig, tol) for c in cond.args]
        decisive = NO if isinstance(cond, And) else YES
        out = ts[0]
        for t in ts[1:]:
            known = np.where((out == OPEN) | (t == OPEN), OPEN, 1 - decisive)
            out = np.where((out == decisive) | (t == decisive), decisive, known)
        return out
    assert isinstance(cond, Comparison | Relation | Fact)
    tol, band = (1e-25, 1e-40) if fig.digits else _bands(tol)
    p = parts(cond, fig)
    out = np.full(len(fig.size), YES, dtype=np.int8)
    open_ = np.zeros(len(out), dtype=bool)
    for z in p.zero:
        size = np.abs(z)
        out = np.where(size > tol, NO, out)
        open_ = open_ | ~((size > tol) | (size <= band))
    for v in p.at_least:
        out = np.where(v < -tol, NO, out)
        open_ = open_ | ~((v < -tol) | (v >= -band))
    for v in p.above:
        out = np.where(v <= band, NO, out)
        open_ = open_ | ~((v > tol) | (v <= band))
    out = np.where(open_ & (out == YES), OPEN, out)
    for v in p.needs:
        out = np.where(v > fig.tiny, out, OPEN)
    for v in (*p.zero, *p.at_least, *p.above):
        out = np.where(finite(v), out, OPEN)
    return out


def _bands(tol: Any) -> tuple[Any, Any]:
    tol = TOL if tol is None else tol
    return tol, tol * 1e-3
