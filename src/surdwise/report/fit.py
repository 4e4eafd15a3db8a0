"""From a figure's own coordinates to a page: the frame, clipped lines, lanes, labels."""

from __future__ import annotations

import itertools
import math
from collections.abc import Sequence
from dataclasses import dataclass

from .draft import CLAIMED, Draft
from .labels import Wish, place
from .picture import XY, Area, Dot, Fill, Ink, Label, Mark, Picture, Ring, Stroke

WIDTH, HEIGHT = 340.0, 300.0
MARGIN = 30.0
LANE = 5.0  # distance of two emphasised lengths that lie on each other
CORNER = 8.0  # side of a right-angle mark


@dataclass(frozen=True)
class View:
    """From figure to page: the scale of either axis (equal for figures), the figure's point at the
    page's lower left corner, and the size of the page."""

    scales: XY
    corner: XY
    width: float
    height: float

    @property
    def scale(self) -> float:
        """The scale of a view that is a similarity."""
        return self.scales[0]

    def at(self, p: XY) -> XY:
        """A point's place on the page."""
        return (p[0] - self.corner[0]) * self.scales[0], (p[1] - self.corner[1]) * self.scales[1]

    def back(self, p: XY) -> XY:
        """The figure's point at a place of the page."""
        return p[0] / self.scales[0] + self.corner[0], p[1] / self.scales[1] + self.corner[1]


def view(low: XY, high: XY, width: float = WIDTH, height: float = HEIGHT, margin: float = MARGIN) -> View:
    """The largest similar picture of a box that fits the page; a flat figure gets a flat page."""
    w, h = high[0] - low[0], high[1] - low[1]
    scale = min((width - 2 * margin) / w if w else math.inf, (height - 2 * margin) / h if h else math.inf)
    if not math.isfinite(scale):
        scale = 1.0
    tall = min(height, max(h * scale + 2 * margin, 110.0))
    middle = (low[0] + high[0]) / 2, (low[1] + high[1]) / 2
    return View((scale, scale), (middle[0] - width / 2 / scale, middle[1] - tall / 2 / scale), width, tall)


def framed(d: Draft) -> View:
    """A view of everything that has a size; circles far larger than the figure are cut off."""
    spots = [*d.points.values(), *itertools.chain.from_iterable((a, b) for a, b, _ in d.segments)]
    if not spots:
        spots = [(0.0, 0.0), (1.0, 1.0)]
    low, high = _box(spots)
    size = max(high[0] - low[0], high[1] - low[1]) or 1.0
    for (x, y), r, ink, _ in d.rings:
        if r <= (1.6 if ink is not Ink.HELPER else 0.9) * size:
            spots += [(x - r, y - r), (x + r, y + r)]
    low, high = _box(spots)
    if d.lines and high[1] - low[1] < 1e-9:
        low, high = (low[0] - 0.1 * size, low[1]), (high[0] + 0.1 * size, high[1])
    return view(low, high)


def _box(spots: Sequence[XY]) -> tuple[XY, XY]:
    xs, ys = [p[0] for p in spots], [p[1] for p in spots]
    return (min(xs), min(ys)), (max(xs), max(ys))


def clip(
    at: XY, way: XY, width: float, height: float, inset: float, start: float = -math.inf
) -> tuple[XY, XY] | None:
    """The part of a line (of a ray, with `start` 0) inside the page."""
    low, high = start, math.inf
    for p, d, end in ((at[0], way[0], width), (at[1], way[1], height)):
        if abs(d) < 1e-12:
            if not inset <= p <= end - inset:
                return None
            continue
        a, b = sorted(((inset - p) / d, (end - inset - p) / d))
        low, high = max(low, a), min(high, b)
    if not low < high:
        return None
    return (at[0] + low * way[0], at[1] + low * way[1]), (at[0] + high * way[0], at[1] + high * way[1])


def strokes(d: Draft, v: View) -> tuple[list[Mark], list[Wish]]:
    """Marks of a draft on the page, faint ones first, and labels wished for its named curves."""
    out: list[Mark] = []
    wishes: list[Wish] = []
    for loop, ink in d.areas:
        fill = Fill.LEFT if ink is Ink.LEFT else Fill.RIGHT
        out.append(Area((tuple(v.at(p) for p in loop),), fill))
        out.append(Stroke(tuple(v.at(p) for p in loop), ink, closed=True))
    for at, way, ink, name in d.lines:
        part = clip(v.at(at), way, v.width, v.height, 4)
        if part is not None:
            out.append(Stroke(part, ink))
            if name:
                wishes.append(Wish(name, _toward(part[1], part[0], 12), "curve"))
    for at, way, ink in d.rays:
        part = clip(v.at(at), way, v.width, v.height, 4, 0.0)
        if part is not None:
            out.append(Stroke(part, ink))
    for centre, r, ink, name in d.rings:
        c, radius = v.at(centre), r * v.scale
        out += _circle(c, radius, ink, v)
        if name:
            s = radius * math.sqrt(0.5)
            wishes.append(Wish(name, (c[0] + s, c[1] + s), "curve"))
    claimed = [s for s in d.segments if s[2] in CLAIMED]
    # a helper on a stroke of its own length would only thicken it
    covered = {(a, b) for a, b, ink in d.segments if ink is not Ink.HELPER}
    for a, b, ink in d.segments:
        if ink not in CLAIMED and not ((a, b) in covered and ink is Ink.HELPER):
            out.append(Stroke((v.at(a), v.at(b)), ink))
    out += [m for corner in d.squares for m in _square(corner, v)]
    out += [m for angle in d.angles for m in _arc(angle, v)]
    out += _lanes(claimed, v)
    return out, wishes


def _circle(c: XY, r: float, ink: Ink, v: View) -> list[Mark]:
    """A circle, as arcs of a polyline where it leaves the page."""
    if c[0] - r >= 1 and c[1] - r >= 1 and c[0] + r <= v.width - 1 and c[1] + r <= v.height - 1:
        return [Ring(c, r, ink)]
    out: list[Mark] = []
    run: list[XY] = []
    n = 720
    for k in range(n + 1):
        p = c[0] + r * math.cos(2 * math.pi * k / n), c[1] + r * math.sin(2 * math.pi * k / n)
        if 2 <= p[0] <= v.width - 2 and 2 <= p[1] <= v.height - 2:
            run.append(p)
        elif run:
            out.append(Stroke(tuple(run), ink))
            run = []
    if len(run) > 1:
        out.append(Stroke(tuple(run), ink))
    return [m for m in out if isinstance(m, Stroke) and len(m.points) > 1]


def _toward(a: XY, b: XY, by: float) -> XY:
    n = math.dist(a, b) or 1.0
    return a[0] + (b[0] - a[0]) * by / n, a[1] + (b[1] - a[1]) * by / n


def _square(corner: tuple[XY, XY, XY], v: View) -> list[Mark]:
    at, a, b = (v.at(p) for p in corner)
    side = min(CORNER, 0.4 * math.dist(at, a), 0.4 * math.dist(at, b))
    if side < 2:
        return []
    p, q = _toward(at, a, side), _toward(at, b, side)
    return [Stroke((p, (p[0] + q[0] - at[0], p[1] + q[1] - at[1]), q), Ink.LEADER)]


def _arc(angle: tuple[XY, XY, XY, Ink], v: View) -> list[Mark]:
    at, a, b = (v.at(p) for p in angle[:3])
    radius = min(22.0, 0.5 * math.dist(at, a), 0.5 * math.dist(at, b))
    start = math.atan2(a[1] - at[1], a[0] - at[0])
    turn = math.atan2(b[1] - at[1], b[0] - at[0]) - start
    turn = (turn + math.pi) % (2 * math.pi) - math.pi
    ring = [start + turn * k / 24 for k in range(25)]
    return [
        Stroke(tuple((at[0] + radius * math.cos(t), at[1] + radius * math.sin(t)) for t in ring), angle[3])
    ]


def _lanes(claimed: Sequence[tuple[XY, XY, Ink]], v: View) -> list[Mark]:
    """Emphasised lengths; those that lie on each other are set side by side, with end ticks."""
    drawn: list[tuple[XY, XY, int]] = []
    out: list[Mark] = []
    for a, b, ink in sorted(claimed, key=lambda s: math.dist(s[0], s[1])):
        p, q = v.at(a), v.at(b)
        taken = {lane for x, y, lane in drawn if _on_each_other(p, q, x, y)}
        lane = next(k for k in (0, 1, -1, 2, -2, 3, -3, 4, -4, 5, 6, 7, 8) if k not in taken or k == 8)
        drawn.append((p, q, lane))
        if not lane:
            out.append(Stroke((p, q), ink))
            continue
        n = math.dist(p, q)
        # one side for all directions: lanes of one line are told apart by their number alone
        nx, ny = -(q[1] - p[1]) / n, (q[0] - p[0]) / n
        if ((nx, ny) < (0, 0) and nx < -1e-9) or (abs(nx) <= 1e-9 and ny < 0):
            nx, ny = -nx, -ny
        by = lane * LANE
        s, t = (p[0] + nx * by, p[1] + ny * by), (q[0] + nx * by, q[1] + ny * by)
        out.append(Stroke((s, t), ink))
        for foot, tip in ((p, s), (q, t)):
            out.append(Stroke((foot, _toward(tip, foot, -3)), Ink.LEADER))
    return out


def _on_each_other(p: XY, q: XY, x: XY, y: XY) -> bool:
    """Whether two segments share more than a point."""
    n = math.dist(p, q)
    ux, uy = (q[0] - p[0]) / n, (q[1] - p[1]) / n
    if any(abs(ux * (z[1] - p[1]) - uy * (z[0] - p[0])) > 0.5 for z in (x, y)):
        return False
    s = sorted(ux * (z[0] - p[0]) + uy * (z[1] - p[1]) for z in (x, y))
    return min(s[1], n) - max(s[0], 0.0) > 0.5


def point_names(points: dict[str, XY], size: float) -> list[tuple[str, XY]]:
    """Labels for the points: those that coincide share one, as in A = H."""
    groups: list[tuple[list[str], XY]] = []
    for name, p in points.items():
        for names, at in groups:
            if math.dist(p, at) < 1e-9 * size:
                names.append(name)
                break
        else:
            groups.append(([name], p))
    return [(" = ".join(n.replace("'", "′") for n in names), at) for names, at in groups]


def obstacles(marks: Sequence[Mark]) -> list[tuple[XY, XY]]:
    """Everything drawn as short segments, for labels to keep off."""
    out: list[tuple[XY, XY]] = []
    for m in marks:
        if isinstance(m, Stroke):
            out += itertools.pairwise([*m.points, m.points[0]] if m.closed else m.points)
        elif isinstance(m, Ring):
            (x, y), r = m.centre, m.radius
            ring = [
                (x + r * math.cos(k * math.pi / 24), y + r * math.sin(k * math.pi / 24)) for k in range(49)
            ]
            out += itertools.pairwise(ring)
    return out


def finished(
    marks: list[Mark],
    wishes: list[Wish],
    dots: list[Dot],
    v: View,
    title: str,
    words: str,
    legend: tuple[tuple[str, str], ...] = (),
    fixed: Sequence[Label] = (),
) -> Picture:
    """The picture with its labels set; a label far from its point gets a leader."""
    size = (v.width, v.height)
    lines = [m for m in marks if not (isinstance(m, Stroke) and m.ink is Ink.FRAME)]
    labels = place(wishes, obstacles(lines), [d.at for d in dots], size, fixed)
    leaders: list[Mark] = []
    for w, label in zip(wishes, labels, strict=True):
        left, low, right, top = label.box
        near = (min(max(w.at[0], left), right), min(max(w.at[1], low), top))
        if w.kind == "point" and math.dist(near, w.at) > 15:
            leaders.append(Stroke((_toward(w.at, near, 4), _toward(near, w.at, 2)), Ink.LEADER))
    return Picture(v.width, v.height, (*marks, *leaders, *dots, *fixed, *labels), title, words, legend)


def figure_picture(d: Draft, title: str, words: str) -> Picture:
    """A figure with all its points named."""
    v = framed(d)
    marks, wishes = strokes(d, v)
    size = max(v.width, v.height) / v.scale
    names = point_names(d.points, size)
    wishes = [*(Wish(n, v.at(p)) for n, p in names), *wishes]
    inks = {m.ink for m in marks if isinstance(m, (Stroke, Ring))}
    legend = tuple((k.value, t) for k, t in ((Ink.LEFT, "left side"), (Ink.RIGHT, "right side")) if k in inks)
    return finished(marks, wishes, [Dot(v.at(p)) for _, p in names], v, title, words, legend)
