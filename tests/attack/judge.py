"""Hold a decision against random figures, and every figure handed out against its sheet."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import mpmath  # type: ignore[import-untyped]
import numpy as np
import sympy  # type: ignore[import-untyped]

from surdwise import Decision, Sheet, Verdict
from surdwise.sheet import SurdwiseError, read_text
from surdwise.sheet.tree import Comparison

from .figures import Drawing, Floats, given_figure, random_figures, walk
from .measure import truth

DIGITS = 40
WORDS = (None, "never", "always")


def parsed(sheet: Sheet, condition: str) -> Any:
    """The tree of a condition of the sheet's language; None for one in the frame's parameters."""
    lines = [f"given {x.text}" for x in sheet.given]
    lines += [f"provided {condition}", f"claim {sheet.claims[0].text}"]
    return read_text("\n".join(lines) + "\n", "condition")[0].provided[-1].body


def complaints(sheet: Sheet, index: int, d: Decision, n: int, seed: int = 1) -> list[str]:
    """What is wrong with a decision, as far as n random figures and many digits show."""
    with np.errstate(all="ignore"), mpmath.workdps(DIGITS + 10):
        g = random_figures(sheet, n, seed)
        return [*_against(sheet, sheet.claims[index].body, d, g), *_witnesses(sheet, index, d)]


def show_figure(g: Drawing, i: int) -> str:
    return ", ".join(f"{k}=({z[i].real:.6g}, {z[i].imag:.6g})" for k, z in g.points.items())


def _against(sheet: Sheet, claim: Any, d: Decision, g: Drawing) -> Iterator[str]:
    admitted = int(g.ok.sum())
    if d.verdict is Verdict.EMPTY:
        if admitted:
            yield f"empty, but admitted: {show_figure(g, int(np.argmax(g.ok)))}"
        return
    if d.verdict is Verdict.UNDECIDED or not admitted:
        return
    t = truth(claim, g) + np.zeros(g.n, dtype=np.int8)
    known = g.ok & (t < 2)
    plain = known & ~g.special if not g.residuals else known
    false_at = known & (t == 0)
    true_at = known & (t == 1)
    if d.verdict is Verdict.HOLDS and false_at.any():
        yield f"holds, but false on {int(false_at.sum())} of {admitted}: {_first(g, false_at)}"
    if d.verdict is Verdict.FAILS and (plain & true_at).sum() > 0.02 * plain.sum() + 2:
        yield f"fails, but true on {int(true_at.sum())} of {admitted}: {_first(g, true_at)}"
    if d.verdict is Verdict.CONDITIONAL and plain.sum() > 50 and not (plain & true_at).any():
        yield f"conditional, but never true on {int(plain.sum())} general figures"
    yield from _agrees(sheet, g, known, t, d.condition, d.in_frame, "condition")
    if isinstance(claim, Comparison) and len(claim.ops) == 1 and claim.ops[0] != "=":
        e = truth(Comparison(claim.items, ("=",)), g) + np.zeros(g.n, dtype=np.int8)
        yield from _agrees(sheet, g, g.ok & (e < 2), e, d.equality, False, "equality")
    for v in d.variants:
        if v.condition is None:
            continue
        variant = truth(parsed(sheet, v.claim), g) + np.zeros(g.n, dtype=np.int8)
        keep = g.ok & (variant < 2)
        if not v.exact:
            keep = keep & ~g.special
        yield from _agrees(sheet, g, keep, variant, v.condition, False, f"variant {v.claim}", v.exact)
    for x in d.links:
        one = parsed(sheet, x.claim)
        u = truth(one, g) + np.zeros(g.n, dtype=np.int8)
        keep = g.ok & (u < 2)
        if x.verdict is Verdict.HOLDS and (keep & (u == 0)).any():
            yield f"link {x.claim} holds, but false at {_first(g, keep & (u == 0))}"
        yield from _agrees(sheet, g, keep, u, x.condition, False, f"link {x.claim}")
        if isinstance(one, Comparison) and one.ops[0] != "=":
            e = truth(Comparison(one.items, ("=",)), g) + np.zeros(g.n, dtype=np.int8)
            yield from _agrees(sheet, g, g.ok & (e < 2), e, x.equality, False, f"equality of {x.claim}")


def _first(g: Drawing, mask: Any) -> str:
    return show_figure(g, int(np.argmax(mask)))


def in_frame(condition: str) -> bool:
    """Whether a condition speaks of the frame's parameters."""
    return any(c.isdigit() and condition[i - 1 : i] == "u" for i, c in enumerate(condition))


def _agrees(
    sheet: Sheet,
    g: Drawing,
    known: Any,
    t: Any,
    condition: str | None,
    frame: bool,
    what: str,
    full: bool = True,
) -> Iterator[str]:
    """Whether a condition is true exactly where the truths t are 1."""
    if condition is None or frame or in_frame(condition):
        return
    if condition in ("never", "always"):
        bad = known & (t == (1 if condition == "never" else 0))
        if bad.any():
            yield f"{what} {condition}, but not at {_first(g, bad)}"
        return
    try:
        tree = parsed(sheet, condition)
    except SurdwiseError as error:
        yield f"{what} `{condition}` cannot be read: {error}"
        return
    narrow = g.ops
    g.ops = Floats(narrow.lo, np.maximum(narrow.hi, 1e-4))  # a root of E may be a double one
    s = truth(tree, g) + np.zeros(g.n, dtype=np.int8)
    g.ops = narrow
    bad = known & (s < 2) & (s != t)
    if bad.any() and (full or bad.sum() > 0.01 * known.sum()):
        i = int(np.argmax(bad))
        yield f"{what} `{condition}` is {s[i]}, the statement {t[i]} on {int(bad.sum())}: {show_figure(g, i)}"
    unset = known & (s == 8)
    if unset.any() and full:
        yield f"{what} `{condition}` is undefined on {int(unset.sum())}: {_first(g, unset)}"


def _witnesses(sheet: Sheet, index: int, d: Decision) -> Iterator[str]:
    claim = sheet.claims[index].body
    if d.verdict is Verdict.CONDITIONAL and (d.holds_at is None or d.fails_at is None):
        yield "conditional, but a figure is missing"
    if d.verdict is Verdict.FAILS and d.fails_at is None:
        yield "fails, but the figure is missing"
    if d.verdict is Verdict.HOLDS and d.holds_at is None:
        yield "holds, but the figure is missing"
    jobs: list[tuple[str, Any, Any, int]] = [
        ("holds_at", claim, d.holds_at, 1),
        ("fails_at", claim, d.fails_at, 0),
    ]
    jobs += [(f"variant {v.claim}", parsed(sheet, v.claim), v.holds_at, 1) for v in d.variants]
    for x in d.links:
        one = parsed(sheet, x.claim)
        jobs += [(f"link {x.claim} holds_at", one, x.holds_at, 1)]
        jobs += [(f"link {x.claim} fails_at", one, x.fails_at, 0)]
    for what, body, figure, wanted in jobs:
        if figure is None:
            continue
        points = {}
        for name, p in figure.items():
            z = mpmath.mpc(*(_exact(text) for text in p.exact))
            points[name] = z
            if abs(z - mpmath.mpc(*p.float)) > 1e-14 * (1 + abs(z)):
                yield f"{what}: exact {p.exact} is not {p.float} at {name}"
        g = given_figure(points)
        walk(g, sheet)
        for why in g.why:
            yield f"{what}: {why}"
        for line in sheet.provided:
            if truth(line.body, g) != 1:
                yield f"{what}: `provided {line.text}` is {truth(line.body, g)}"
        if truth(body, g) != wanted:
            yield f"{what}: claim is {truth(body, g)}, wanted {wanted}"


def _exact(text: str) -> Any:
    value = sympy.N(sympy.sympify(text), DIGITS + 10)
    re, im = value.as_real_imag()
    assert abs(im) < 1e-30, text
    return mpmath.mpf(str(re))
