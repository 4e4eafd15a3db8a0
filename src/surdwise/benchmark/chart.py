"""Scatter charts as inline SVG, readable without colour: the shape of a mark is the formulation, its
filling the engine; every mark carries its data as a title."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from html import escape
from math import floor, log10

from .choice import CHOICES
from .engines import ENGINES
from .row import Row
from .show import seconds

WIDTH, HEIGHT = 720, 400
LEFT, RIGHT, TOP, BOTTOM = 70, 20, 40, 50
SIZE = 5.0
CROWDED = 150
FILLS = dict(zip(ENGINES, ("#1c1c1c", "#fffdf8", "url(#hatch)"), strict=False))

_SHAPES: dict[str, list[tuple[float, float]]] = {
    "squared": [(-1, -1), (1, -1), (1, 1), (-1, 1)],
    "sign_product": [(0, -1.2), (1.2, 0), (0, 1.2), (-1.2, 0)],
    "eliminant": [(0, -1.2), (1.1, 0.9), (-1.1, 0.9)],
    "minimal": [(-1.1, -0.9), (1.1, -0.9), (0, 1.2)],
    "elimination": [(-0.4, -1.2), (0.4, -1.2), (0.4, -0.4), (1.2, -0.4), (1.2, 0.4), (0.4, 0.4), (0.4, 1.2),
                    (-0.4, 1.2), (-0.4, 0.4), (-1.2, 0.4), (-1.2, -0.4), (-0.4, -0.4)],
}  # fmt: skip


@dataclass(frozen=True)
class Axis:
    """A quantity along the bottom: its name, how to read it off a row, whether its scale is
    logarithmic."""

    name: str
    read: Callable[[Row], int | None]
    logarithmic: bool


AXES = (
    Axis("terms of the formulation", lambda r: r.terms, True),
    Axis("lengths in the claim", lambda r: r.radicals, False),
    Axis("free parameters of the figure", lambda r: r.parameters, False),
)


def mark(choice: str, engine: str, x: float, y: float, title: str = "") -> str:
    """One mark."""
    style = f'fill="{FILLS.get(engine, "none")}" stroke="#1c1c1c" stroke-width="1"'
    inside = f"<title>{escape(title)}</title>" if title else ""
    if choice not in _SHAPES:
        return f'<circle cx="{x:.1f}" cy="{y:.1f}" r="{SIZE}" {style}>{inside}</circle>'
    points = " ".join(f"{x + a * SIZE:.1f},{y + b * SIZE:.1f}" for a, b in _SHAPES[choice])
    return f'<polygon points="{points}" {style}>{inside}</polygon>'


HATCH = (
    '<svg width="0" height="0" aria-hidden="true"><defs><pattern id="hatch" width="3" height="3" '
    'patternUnits="userSpaceOnUse" patternTransform="rotate(45)"><rect width="3" height="3" fill="#fffdf8"/>'
    '<line x1="0" y1="0" x2="0" y2="3" stroke="#1c1c1c" stroke-width="1.4"/></pattern></defs></svg>'
)


def legend() -> str:
    """What the shapes and fillings mean."""
    items = [f"{_small(c, 'singular')} {escape(c.replace('_', ' '))}" for c in CHOICES]
    items += [f"{_small('auxiliary', e)} {escape(e)}" for e in ENGINES]
    return '<p class="legend">' + " ".join(f'<span class="item">{i}</span>' for i in items) + "</p>"


def _small(choice: str, engine: str) -> str:
    body = mark(choice, engine, 8, 8)
    return f'<svg width="16" height="16" aria-hidden="true">{body}</svg>'


def charts(axis: Axis, rows: Sequence[Row], limit: float) -> str:
    """One chart of all engines, or one of each where there are too many marks to tell apart."""
    if len(rows) <= CROWDED:
        return chart(axis, rows, limit)
    names = dict.fromkeys(r.engine for r in rows)
    return "".join(chart(axis, [r for r in rows if r.engine == e], limit, f", {e}") for e in names)


def chart(axis: Axis, rows: Sequence[Row], limit: float, which: str = "") -> str:
    """Seconds to write down and answer, against one quantity; runs that met the time limit stand on
    the line at the top."""
    data = [
        (x, r) for r in rows if (x := axis.read(r)) is not None and (r.seconds is not None or r.end == "time")
    ]
    if not data:
        return ""
    across = _Scale(
        [max(x, 1) if axis.logarithmic else x for x, _ in data], axis.logarithmic, LEFT, WIDTH - RIGHT
    )
    times = [r.seconds for _, r in data if r.seconds is not None]
    up = _Scale([*times, limit], True, HEIGHT - BOTTOM, TOP)
    body = [_frame(axis, across, up, limit)]
    for x, r in data:
        px = across.at(max(x, 1) if axis.logarithmic else x)
        if not axis.logarithmic:
            # beside each other: by formulation, then by engine
            px += 9 * (CHOICES.index(r.formulation) - 2.5) + 2 * (list(ENGINES).index(r.engine) - 1)
        at = limit if r.seconds is None else r.seconds
        words = f"over {limit:g} s" if r.seconds is None else seconds(r.seconds)
        name = r.formulation.replace("_", " ")
        body.append(
            mark(
                r.formulation,
                r.engine,
                px,
                up.at(at),
                f"{r.claim}: {name}, {r.engine}, {x} {axis.name}, {words}",
            )
        )
    title = f"Seconds against {axis.name}{which}"
    words = (
        f"{len(data)} marks; times from {seconds(min(times, default=limit))} to "
        f"{seconds(max(times, default=limit))}; {sum(r.seconds is None for _, r in data)} at the time limit. "
        "All numbers are in the table below."
    )
    return (
        f'<figure><svg viewBox="0 0 {WIDTH} {HEIGHT}" role="img" aria-label="{escape(title)}">'
        f"<title>{escape(title)}</title><desc>{escape(words)}</desc>\n" + "\n".join(body) + "</svg>"
        f"<figcaption>{escape(title)}. {escape(words)}</figcaption></figure>"
    )


class _Scale:
    """Numbers to places along an axis."""

    def __init__(self, values: Sequence[float], logarithmic: bool, start: float, end: float) -> None:
        self.logarithmic = logarithmic
        self.start, self.end = start, end
        low, high = min(values), max(values)
        if logarithmic:
            self.low: float = floor(log10(low))
            self.high: float = max(-floor(-log10(high)), self.low + 1)
        else:
            self.low, self.high = low - 0.6, high + 0.6

    def at(self, x: float) -> float:
        """The place of a number."""
        x = log10(x) if self.logarithmic else x
        return self.start + (x - self.low) / (self.high - self.low) * (self.end - self.start)

    def ticks(self) -> list[float]:
        """Numbers to write at the axis."""
        if self.logarithmic:
            return [10.0**k for k in range(int(self.low), int(self.high) + 1)]
        return [float(k) for k in range(floor(self.low) + 1, floor(self.high) + 1)]


def _frame(axis: Axis, across: _Scale, up: _Scale, limit: float) -> str:
    out = []
    for t in across.ticks():
        x = across.at(t)
        out.append(f'<line class="grid" x1="{x:.1f}" y1="{TOP}" x2="{x:.1f}" y2="{HEIGHT - BOTTOM}"/>')
        out.append(f'<text x="{x:.1f}" y="{HEIGHT - BOTTOM + 16}" text-anchor="middle">{t:g}</text>')
    for t in up.ticks():
        y = up.at(t)
        out.append(f'<line class="grid" x1="{LEFT}" y1="{y:.1f}" x2="{WIDTH - RIGHT}" y2="{y:.1f}"/>')
        out.append(f'<text x="{LEFT - 6}" y="{y + 4:.1f}" text-anchor="end">{seconds(t)}</text>')
    y = up.at(limit)
    out.append(f'<line class="limit" x1="{LEFT}" y1="{y:.1f}" x2="{WIDTH - RIGHT}" y2="{y:.1f}"/>')
    out.append(f'<text x="{WIDTH - RIGHT}" y="{y - 6:.1f}" text-anchor="end">time limit {limit:g} s</text>')
    middle = (LEFT + WIDTH - RIGHT) / 2
    out.append(f'<text x="{middle:.0f}" y="{HEIGHT - 12}" text-anchor="middle">{escape(axis.name)}</text>')
    return "\n".join(out)
