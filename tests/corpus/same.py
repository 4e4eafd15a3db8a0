"""Whether statements about one figure say the same: by random figures, on all of the figure and on
every thin set that one of the statements describes.

Figures are drawn and truths read by the float code of the attack, which knows nothing of the
program's algebra.  A statement with equations is added to the sheet, one alternative at a time, and
figures are drawn that meet it: there the others must be true too.
"""

from __future__ import annotations

import itertools
import warnings
from collections.abc import Iterator, Sequence
from dataclasses import replace
from typing import Any

import numpy as np

from surdwise import Sheet
from surdwise.sheet.tree import (
    And,
    Comparison,
    Fact,
    Line,
    Measure,
    Not,
    Number,
    Or,
    Pt,
    Relation,
    Through,
)
from tests.attack.figures import Drawing, Floats, random_figures
from tests.attack.judge import parsed, show_figure
from tests.attack.measure import truth

SEED = 3


def differences(sheet: Sheet, statements: Sequence[tuple[str, Any]], n: int, thin: int) -> list[str]:
    """Figures on which two of the named conditions differ: n of the sheet, and `thin` of each thin
    set that one of them describes."""
    with np.errstate(all="ignore"), warnings.catch_warnings():
        warnings.simplefilter("ignore", RuntimeWarning)
        found = [*_differ(statements, random_figures(sheet, n, SEED), "in general")]
        for name, c in statements:
            for one in _alternatives(c):
                narrowed = _narrowed(sheet, one)
                if narrowed is not None:
                    g = random_figures(narrowed, thin, SEED)
                    _keep_apart(g)
                    found += _differ(statements, g, f"where {name} holds")
    return found


def _keep_apart(g: Drawing) -> None:
    """Leave out figures with two points that are close and not clearly one: solved-for points are
    worth few digits there."""
    size = g.extent()
    for a, b in itertools.combinations(g.points.values(), 2):
        gap = abs(a - b) / size
        g.ok = g.ok & ~((gap > 1e-9) & (gap < 1e-2))


def condition(sheet: Sheet, text: str) -> Any:
    """The tree of a condition; `never` and `always` as comparisons of numbers."""
    if text in ("never", "always"):
        return Comparison((Number(0), Number(int(text == "never"))), ("=",))  # type: ignore[arg-type]
    return parsed(sheet, text)


def _differ(statements: Sequence[tuple[str, Any]], g: Drawing, where: str) -> Iterator[str]:
    g.ops = Floats(g.ops.lo, np.maximum(g.ops.hi, 1e-4))
    truths = [(name, truth(c, g) + np.zeros(g.n, dtype=np.int8)) for name, c in statements]
    (first, t), *others = truths
    for name, s in others:
        bad = g.ok & (s < 2) & (t < 2) & (s != t)
        if bad.any():
            i = int(np.argmax(bad))
            yield f"{where}: {first} is {t[i]}, {name} {s[i]} on {int(bad.sum())}: {show_figure(g, i)}"


def _alternatives(c: Any) -> Iterator[Any]:
    if isinstance(c, Or):
        for x in c.args:
            yield from _alternatives(x)
    else:
        yield c


def _narrowed(sheet: Sheet, c: Any) -> Sheet | None:
    """The sheet with a conjunction added: its equations are solved for, the rest is asked; None for
    one without equations."""
    given, asked, thin = [], [], False
    for x in c.args if isinstance(c, And) else (c,):
        equations = _equations(x)
        thin = thin or bool(equations)
        given += [Line("given", "", e) for e in equations]
        asked.append(Line("provided", "", x))
    if not thin:
        return None
    return replace(sheet, given=(*sheet.given, *given), provided=(*sheet.provided, *asked))


def _equations(c: Any) -> list[Any]:
    """Facts and equations that a condition amounts to, as far as figures can be drawn for them."""
    if isinstance(c, Comparison):
        if set(c.ops) != {"="} or any(isinstance(x, Number) for x in c.items[:1]):
            return []
        return [c]
    if isinstance(c, Not) and isinstance(c.arg, Relation) and c.arg.form == "distinct":
        first, *rest = c.arg.args[0]  # type: ignore[misc]
        return [_equal((first, p), (p, p)) for p in rest] if len(rest) == 1 else []  # type: ignore[has-type]
    if not isinstance(c, Relation):
        return []
    if c.form in ("collinear", "concyclic", "parallel_lines", "perpendicular_lines"):
        return [c]
    if c.form in ("on_line", "on_segment", "on_ray", "on_circle"):
        return [Fact(c.form, c.args)]
    if c.form == "between":
        return [Fact("on_line", (c.args[0], Through((c.args[1], c.args[2]))))]  # type: ignore[arg-type]
    if c.form == "angle_size" and c.args[-1] == "right":
        p, q, r = c.args[0]  # type: ignore[misc]
        return [Relation("perpendicular_lines", (Through((q, p)), Through((q, r))))]  # type: ignore[has-type]
    if c.form == "is_equilateral":
        p, q, r = c.args[0]  # type: ignore[misc]
        return [_equal((p, q), (q, r)), _equal((q, r), (r, p))]  # type: ignore[has-type]
    if c.form == "is_isosceles":
        p, q = (x for x in c.args[0] if x != c.args[1])  # type: ignore[union-attr]
        return [_equal((c.args[1], p), (c.args[1], q))]  # type: ignore[arg-type]
    return []


def _equal(one: tuple[Pt, Pt], two: tuple[Pt, Pt]) -> Comparison:
    return Comparison((Measure("length", one), Measure("length", two)), ("=",))
