"""The map of one parameter: the track of the moving point in true and false stretches."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from fractions import Fraction

from ..sheet.tree import Sheet
from ..verdict.outcome import Decision
from .draft import draft
from .fit import HEIGHT, View, finished, point_names, strokes, view
from .labels import Wish
from .landmarks import NAMES, WIDTH, WITNESSES, TruthMap, extent, listed, middle, witnesses
from .picture import XY, Dot, Ink, Stroke
from .truth import Sampler, Seen, Truth, summary

PLACES = 240


def _spread(s: Sampler, k: int, x: Fraction) -> Fraction | None:
    """A parameter's value from -1 < x < 1 (0 < x < 1 for a positive one): the tangent of the
    angle 2 arctan x, so that a point on a circle moves evenly."""
    if s.positive(k) and x <= 0:
        return None
    return 2 * x / (1 - x * x) if abs(x) < 1 else None


def track_map(sheet: Sheet, s: Sampler, decision: Decision) -> TruthMap | None:
    """The track of the moving point, in true and false stretches."""
    if s.mover is None or not s.fixed:
        return None
    k = s.free[0]

    def seen(x: Fraction) -> list[Seen] | None:
        v = _spread(s, k, x)
        return None if v is None else s.judge((v,))

    start = 0 if s.positive(k) else -PLACES
    walk: list[tuple[Fraction, list[Seen]]] = []
    for i in range(start, PLACES):
        if s.late():
            return None
        x = Fraction(2 * i + 1, 2 * PLACES)
        found = seen(x)
        if found:
            walk.append((x, found))
        elif found is not None:
            walk.append((x, []))
    if not any(f for _, f in walk):
        return None
    tracks, stops = _stretches(walk, seen)
    spots = list(s.fixed.values())
    size, centre = extent(spots), middle(spots)
    near = [p for _, t in tracks for p in t if math.dist(p, centre) < 1.7 * size]
    v = _track_view([*spots, *near])
    d = draft(sheet.given, s.fixed, None)
    marks, wishes = strokes(d, v)
    marks += [Stroke(tuple(run), Ink.CLEAR) for _, points in tracks for run in _inside(points, v)]
    for t, points in tracks:
        ink = {Truth.TRUE: Ink.TRUE, Truth.FALSE: Ink.FALSE, Truth.MIXED: Ink.MIXED}[t]
        marks += [Stroke(tuple(run), ink) for run in _inside(points, v)]
    names = point_names(s.fixed, size)
    wishes += [Wish(n, v.at(p)) for n, p in names]
    dots = [Dot(v.at(p)) for _, p in names]
    for p in stops:
        q = v.at(p)
        apart = min(math.dist(q, x.at) for x in dots) > 2
        if apart and 2 < q[0] < v.width - 2 and 2 < q[1] < v.height - 2:
            dots.append(Dot(q, "stop"))
    for at, kind in witnesses(s, decision):
        p = v.at(at)
        if 2 < p[0] < v.width - 2 and 2 < p[1] < v.height - 2:
            dots.append(Dot(p, kind))
            wishes.append(Wish(s.mover, p))
    shown = {t for t, _ in tracks}
    keys = {Truth.TRUE: "true", Truth.FALSE: "false", Truth.MIXED: "mixed"}
    legend = tuple((keys[t], NAMES[t]) for t in Truth if t in shown)
    if any(x.kind == "stop" for x in dots):
        legend += (("dot-stop", "the truth changes"),)
    kinds = {x.kind for x in dots}
    legend += tuple((f"dot-{k}", text) for k, text in WITNESSES if k in kinds)
    words = (
        f"The track of {s.mover}, drawn along its way in stretches: "
        + ", ".join(NAMES[t] for t in Truth if t in shown)
        + "."
    )
    fixed = listed(list(s.fixed))
    caption = (
        f"The track of {s.mover}, with {fixed} fixed. Judged exactly, sign by sign, at {s.count} sample "
        "places, closer together towards the ends of a stretch."
    )
    return TruthMap(finished(marks, wishes, dots, v, "Map of truth", words, legend), caption)


def _track_view(spots: Sequence[XY]) -> View:
    xs, ys = [p[0] for p in spots], [p[1] for p in spots]
    return view((min(xs), min(ys)), (max(xs), max(ys)), WIDTH, HEIGHT)


def _inside(points: Sequence[XY], v: View) -> list[list[XY]]:
    """The parts of a track on the page."""
    out: list[list[XY]] = []
    run: list[XY] = []
    for p in points:
        q = v.at(p)
        if 2 < q[0] < v.width - 2 and 2 < q[1] < v.height - 2:
            run.append(q)
        else:
            out.append(run)
            run = []
    out.append(run)
    return [r for r in out if len(r) > 1]


def _grouped(seen: Sequence[Seen]) -> list[tuple[XY, Truth]]:
    """Figures that put the moving point in one place, together."""
    out: list[tuple[XY, list[Seen]]] = []
    for s in seen:
        if s.at is None:
            continue
        for at, group in out:
            if math.dist(at, s.at) < 1e-9 * (1 + math.hypot(*at)):
                group.append(s)
                break
        else:
            out.append((s.at, [s]))
    return [(at, summary(group)) for at, group in out]


def _stretches(
    walk: Sequence[tuple[Fraction, list[Seen]]], seen: Callable[[Fraction], list[Seen] | None]
) -> tuple[list[tuple[Truth, list[XY]]], list[XY]]:
    """Runs of one truth along the track, and the places between them (by exact bisection)."""
    tracks: list[tuple[Truth, list[XY]]] = []
    stops: list[XY] = []
    before: tuple[Fraction, list[tuple[XY, Truth]]] | None = None
    current: list[tuple[Truth, list[XY]]] = []
    for x, figures in walk:
        here = _grouped(figures)
        if before is not None and [t for _, t in before[1]] == [t for _, t in here]:
            for (_, line), (at, _) in zip(current, here, strict=True):
                line.append(at)
        else:
            left, right = None, None
            if before is not None and before[1] and len(before[1]) == len(here):
                left, right = _narrowed(before, (x, here), seen)
                for (_, line), (at, _) in zip(current, left, strict=True):
                    line.append(at)
                stops += [a for (a, t), (_, u) in zip(left, right, strict=True) if t is not u]
            tracks += current
            current = [(t, [at]) for at, t in here]
            if right is not None:
                current = [(t, [old, at]) for (old, _), (at, t) in zip(right, here, strict=True)]
        before = (x, here)
    return [*tracks, *current], stops


def _narrowed(
    a: tuple[Fraction, list[tuple[XY, Truth]]],
    b: tuple[Fraction, list[tuple[XY, Truth]]],
    seen: Callable[[Fraction], list[Seen] | None],
) -> tuple[list[tuple[XY, Truth]], list[tuple[XY, Truth]]]:
    for _ in range(26):
        m = ((a[0] + b[0]) / 2).limit_denominator(10**9)
        if not a[0] < m < b[0]:
            break
        found = seen(m)
        if found is None:
            break
        here = _grouped(found)
        truths = [t for _, t in here]
        if truths == [t for _, t in a[1]]:
            a = (m, here)
        elif truths == [t for _, t in b[1]]:
            b = (m, here)
        else:
            break
    return a[1], b[1]
