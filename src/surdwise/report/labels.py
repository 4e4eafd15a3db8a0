"""Where the labels of a drawing go: near their points, off the strokes, never on each other.

Each label tries a ring of places about its point; all labels then improve in turn until none
can (coordinate descent on a cost that counts overlaps far above strokes, and strokes above
distance).  Sizes are upper bounds of common serif fonts, so that a page in another font stays
free of overlaps.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

from .picture import XY, Label

_WIDE = {"M": 0.95, "W": 1.0, "=": 0.72, ",": 0.3, " ": 0.28, "′": 0.32, "I": 0.42, "J": 0.5}
POINT_SIZE = 15.0
SMALL_SIZE = 12.0
CLEAR = 1.5  # least gap between boxes


@dataclass(frozen=True)
class Wish:
    """A label that wants a place near a point."""

    text: str
    at: XY
    kind: str = "point"


def text_width(text: str, size: float) -> float:
    """An upper bound of the width of a text."""
    out = 0.0
    for c in text:
        if c in _WIDE:
            out += _WIDE[c]
        elif c.isupper():
            out += 0.78
        elif c.isdigit():
            out += 0.56
        else:
            out += 0.54
    return out * size + 1.0


def size_of(kind: str) -> float:
    """Font size of a kind of label."""
    return POINT_SIZE if kind in ("point", "curve") else SMALL_SIZE


def place(
    wishes: Sequence[Wish],
    segments: Sequence[tuple[XY, XY]],
    dots: Sequence[XY],
    size: tuple[float, float],
    fixed: Sequence[Label] = (),
) -> list[Label]:
    """Labels for all wishes, inside a page of the given size where that is possible."""
    options = [_options(w, segments, dots, size) for w in wishes]
    for i, os in enumerate(options):
        options[i] = [(c + sum(1000 * _overlap(o, f) for f in fixed), o) for c, o in os]
    chosen = [min(os, key=lambda o: o[0])[1] for os in options]
    for _ in range(8):
        moved = False
        for i, os in enumerate(options):
            others = [c for j, c in enumerate(chosen) if j != i]
            best = min(os, key=lambda o: o[0] + sum(1000 * _overlap(o[1], x) for x in others))[1]
            if best != chosen[i]:
                chosen[i], moved = best, True
        if not moved:
            break
    return chosen


def _options(
    w: Wish, segments: Sequence[tuple[XY, XY]], dots: Sequence[XY], size: tuple[float, float]
) -> list[tuple[float, Label]]:
    font = size_of(w.kind)
    width, height = text_width(w.text, font), font * 1.02
    out = []
    for reach in (7.0, 10.0, 14.0, 20.0, 28.0, 40.0):
        for k in range(24):
            angle = 2 * math.pi * k / 24
            cx = w.at[0] + math.cos(angle) * (reach + width / 2)
            cy = w.at[1] + math.sin(angle) * (reach + height / 2)
            label = Label(w.text, (cx, cy), width, height, w.kind)
            out.append((_cost(label, reach, segments, dots, size), label))
    return out


def _cost(
    label: Label,
    reach: float,
    segments: Sequence[tuple[XY, XY]],
    dots: Sequence[XY],
    size: tuple[float, float],
) -> float:
    left, low, right, top = label.box
    cost = reach * 1.1
    cost += 40 * (
        max(0.0, 1 - left) + max(0.0, 1 - low) + max(0.0, right - size[0] + 1) + max(0.0, top - size[1] + 1)
    )
    box = (left - 1, low - 1, right + 1, top + 1)
    for a, b in segments:
        cost += 2.2 * _inside(a, b, box)
        if _inside(a, b, box) > 0:
            cost += 12
    for x, y in dots:
        if left - 4 < x < right + 4 and low - 4 < y < top + 4:
            cost += 120
    return cost


def _overlap(a: Label, b: Label) -> float:
    """How deep two boxes reach into each other, with the gap they should keep."""
    al, ab, ar, at = a.box
    bl, bb, br, bt = b.box
    x = min(ar, br) - max(al, bl) + CLEAR
    y = min(at, bt) - max(ab, bb) + CLEAR
    return min(x, y) if x > 0 and y > 0 else 0.0


def _inside(a: XY, b: XY, box: tuple[float, float, float, float]) -> float:
    """Length of the part of a segment inside a box (Liang and Barsky, 1984)."""
    left, low, right, top = box
    dx, dy = b[0] - a[0], b[1] - a[1]
    t0, t1 = 0.0, 1.0
    for p, q in ((-dx, a[0] - left), (dx, right - a[0]), (-dy, a[1] - low), (dy, top - a[1])):
        if p == 0:
            if q < 0:
                return 0.0
            continue
        t = q / p
        if p < 0:
            t0 = max(t0, t)
        else:
            t1 = min(t1, t)
    return (t1 - t0) * math.hypot(dx, dy) if t0 < t1 else 0.0
