"""Hold a decision against random figures and check the figures it hands out."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import mpmath
import sympy

from surdwise import Decision, Sheet, Verdict, read
from surdwise.verdict.outcome import Figure

from .plane import Canvas, NoFigure, build, constrain, fact, figures, truth


def complaints(sheet: Sheet, i: int, d: Decision, n: int, seed: int = 1) -> Iterator[str]:
    """What is wrong with a decision, as far as n random figures show."""
    claim = sheet.claims[i].body
    drawn = figures(sheet, n, seed)
    condition: Any = None
    if d.condition not in (None, "never", "always") and not d.in_frame:
        text = "\n".join(f"given {line.text}" for line in sheet.given)
        text += f"\nprovided {d.condition}\nclaim {sheet.claims[i].text}\n"
        condition = read(text)[0].provided[-1].body
    true = false = 0
    for c in drawn:
        try:
            t = truth(claim, c)
            s = truth(condition, c) if condition is not None else None
        except NoFigure:
            continue
        if t is None:
            continue
        true += t
        false += not t
        if d.verdict is Verdict.EMPTY:
            yield f"not empty: {c.points}"
        if d.verdict is Verdict.HOLDS and not t:
            yield f"does not hold: {c.points}"
        if condition is not None and s is not None and s != t:
            yield f"condition {d.condition} is {s} but the claim {t}: {c.points}"
        if d.condition == "never" and d.equality is None and t:
            yield f"not never: {c.points}"
    if d.verdict is Verdict.FAILS and condition is None and true > 0.02 * len(drawn) + 3:
        yield f"true on {true} of {len(drawn)} figures"
    for name, figure, value in (("holds_at", d.holds_at, True), ("fails_at", d.fails_at, False)):
        if figure is not None:
            yield from (f"{name}: {x}" for x in witness_complaints(sheet, claim, figure, value))
    if d.verdict is Verdict.CONDITIONAL and (d.holds_at is None or d.fails_at is None):
        yield "a figure of each kind is missing"


def witness_complaints(sheet: Sheet, claim: Any, figure: Figure, value: bool) -> Iterator[str]:
    """Check a figure's exact coordinates against every line of the sheet."""
    c = Canvas([], [1])
    for n, p in figure.items():
        x, y = (mpmath.mpf(sympy.N(sympy.sympify(t), 40)) for t in p.exact)
        if max(abs(x - p.float[0]), abs(y - p.float[1])) > 1e-12 * (1 + abs(x) + abs(y)):
            yield f"{n}: exact {p.exact} is not float {p.float}"
        c.points[n] = complex(float(x), float(y))
    for line in sheet.given:
        known = dict(c.points)
        size = 1 + max(abs(z) for z in known.values())
        best: float | None = None
        for choice in (1, -1):
            trial = Canvas([0.5] * 40, [choice])
            trial.points, trial.curves = dict(known), c.curves
            trial.residuals = []
            try:
                if hasattr(line.body, "form") and type(line.body).__name__ == "Fact":
                    fact(trial, line.body)  # type: ignore[arg-type]
                else:
                    constrain(trial, line.body)
            except NoFigure:
                continue
            r = max(map(abs, trial.residuals), default=0.0)
            best = r if best is None else min(best, r)
            c.curves.update(trial.curves)
        if best is None or best > 1e-7 * size:
            yield f"line `{line.text}` is off by {best}"
    for line in sheet.provided:
        if truth(line.body, c) is False:
            yield f"`provided {line.text}` is not met"
    t = truth(claim, c)
    if t is not None and t is not value:
        yield f"the claim is {t} there"


__all__ = ["build", "complaints"]
