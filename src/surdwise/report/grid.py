"""Regions and curves on a grid: refinement, outlines, level lines.  Floats, for drawing only."""

from __future__ import annotations

import itertools
import math
from collections.abc import Callable, Sequence

from .picture import XY
from .thin import Field
from .truth import Truth

Raster = list[list[Truth | None]]  # rows from below, cells from the left


def refine(
    judge: Callable[[float, float], Truth | None],
    columns: int,
    rows: int,
    levels: int,
    late: Callable[[], bool],
) -> Raster:
    """Truth at the middle of every cell of a grid over the unit square; a cell next to another
    truth is cut in four and judged anew, `levels` times or until it is late."""
    raster: Raster = [
        [judge((i + 0.5) / columns, (j + 0.5) / rows) if not late() else None for i in range(columns)]
        for j in range(rows)
    ]
    _fill(raster)
    for _ in range(levels):
        edge = [
            (i, j) for j, row in enumerate(raster) for i, t in enumerate(row) if _is_edge(raster, i, j, t)
        ]
        raster = [[t for t in row for _ in (0, 1)] for row in raster for _ in (0, 1)]
        columns, rows = columns * 2, rows * 2
        for i, j in edge:
            if late():
                return raster
            for x, y in itertools.product((2 * i, 2 * i + 1), (2 * j, 2 * j + 1)):
                found = judge((x + 0.5) / columns, (y + 0.5) / rows)
                raster[y][x] = raster[y][x] if found is None else found
    return raster


def _fill(raster: Raster) -> None:
    """Cells that could not be judged take a neighbour's truth."""
    for j, row in enumerate(raster):
        for i, t in enumerate(row):
            if t is None:
                near = [raster[y][x] for x, y in _around(raster, i, j) if raster[y][x] is not None]
                row[i] = near[0] if near else Truth.NONE


def _around(raster: Raster, i: int, j: int) -> list[tuple[int, int]]:
    return [
        (x, y)
        for x in (i - 1, i, i + 1)
        for y in (j - 1, j, j + 1)
        if (x, y) != (i, j) and 0 <= y < len(raster) and 0 <= x < len(raster[0])
    ]


def _is_edge(raster: Raster, i: int, j: int, t: Truth | None) -> bool:
    return any(raster[y][x] is not t for x, y in _around(raster, i, j))


def lookup(raster: Raster, x: float, y: float) -> Truth | None:
    """The truth at a place of the unit square; None outside."""
    i, j = int(x * len(raster[0])), int(y * len(raster))
    if not (0 <= x < 1 and 0 <= y < 1):
        return None
    return raster[j][i]


def outlines(raster: Raster, wanted: Truth) -> list[tuple[XY, ...]]:
    """The boundary of one truth's cells as closed loops in the unit square."""
    rows, columns = len(raster), len(raster[0])

    def isin(i: int, j: int) -> bool:
        return 0 <= i < columns and 0 <= j < rows and raster[j][i] is wanted

    ways: dict[tuple[int, int], list[tuple[int, int]]] = {}
    for j in range(rows):
        for i in range(columns):
            if not isin(i, j):
                continue
            # edges with the region on the left
            for beside, a, b in (
                ((i, j - 1), (i, j), (i + 1, j)),
                ((i + 1, j), (i + 1, j), (i + 1, j + 1)),
                ((i, j + 1), (i + 1, j + 1), (i, j + 1)),
                ((i - 1, j), (i, j + 1), (i, j)),
            ):
                if not isin(*beside):
                    ways.setdefault(a, []).append(b)
    loops = []
    while ways:
        start = next(iter(ways))
        loop = [start]
        at = start
        while True:
            ends = ways[at]
            nxt = ends.pop()
            if not ends:
                del ways[at]
            if nxt == start:
                break
            loop.append(nxt)
            at = nxt
        loops.append(loop)
    return [tuple((x / columns, y / rows) for x, y in _smooth(loop, columns, rows)) for loop in loops]


def _smooth(loop: list[tuple[int, int]], columns: int, rows: int) -> list[XY]:
    """A staircase loop without its steps; corners of the frame stay."""
    points: list[XY] = [(float(x), float(y)) for x, y in loop]
    far = max(range(len(points)), key=lambda k: math.dist(points[k], points[0]))
    first = simplify(points[: far + 1], 0.75)
    second = simplify([*points[far:], points[0]], 0.75)
    return [*first[:-1], *second[:-1]]


def simplify(points: Sequence[XY], by: float) -> list[XY]:
    """Fewer points, none of the others farther than `by` (Douglas and Peucker, 1973)."""
    if len(points) < 3:
        return list(points)
    keep = {0, len(points) - 1}
    todo = [(0, len(points) - 1)]
    while todo:
        a, b = todo.pop()
        if b - a < 2:
            continue
        far = max(range(a + 1, b), key=lambda k: _off(points[k], points[a], points[b]))
        if _off(points[far], points[a], points[b]) > by:
            keep.add(far)
            todo += [(a, far), (far, b)]
    return [points[k] for k in sorted(keep)]


def _off(p: XY, a: XY, b: XY) -> float:
    n = math.dist(a, b)
    if n == 0:
        return math.dist(p, a)
    t = max(0.0, min(1.0, ((p[0] - a[0]) * (b[0] - a[0]) + (p[1] - a[1]) * (b[1] - a[1])) / n**2))
    return math.dist(p, (a[0] + t * (b[0] - a[0]), a[1] + t * (b[1] - a[1])))


def level_lines(f: Field, columns: int, rows: int) -> list[tuple[XY, XY]]:
    """Segments of the zero set of a function on the unit square: a crossing on each grid edge by
    bisection, joined within each triangle of the halved cells."""
    values: dict[tuple[int, int], float] = {
        (i, j): f(i / columns, j / rows) for i in range(columns + 1) for j in range(rows + 1)
    }
    crossings: dict[tuple[tuple[int, int], tuple[int, int]], XY] = {}

    def crossing(a: tuple[int, int], b: tuple[int, int]) -> XY | None:
        a, b = min(a, b), max(a, b)
        va, vb = values[a], values[b]
        if not (math.isfinite(va) and math.isfinite(vb)) or (va < 0) == (vb < 0):
            return None
        if (a, b) not in crossings:
            p, q = (a[0] / columns, a[1] / rows), (b[0] / columns, b[1] / rows)
            crossings[a, b] = _bisect(f, p, q, va < 0)
        return crossings[a, b]

    out = []
    for i in range(columns):
        for j in range(rows):
            c = [(i, j), (i + 1, j), (i + 1, j + 1), (i, j + 1)]
            for tri in ((c[0], c[1], c[2]), (c[0], c[2], c[3])):
                found = [crossing(tri[k], tri[(k + 1) % 3]) for k in range(3)]
                ends = [x for x in found if x is not None]
                if len(ends) == 2 and ends[0] != ends[1]:
                    out.append((ends[0], ends[1]))
    return out


def _bisect(f: Field, p: XY, q: XY, negative: bool) -> XY:
    for _ in range(48):
        m = ((p[0] + q[0]) / 2, (p[1] + q[1]) / 2)
        if (f(*m) < 0) == negative:
            p = m
        else:
            q = m
    return ((p[0] + q[0]) / 2, (p[1] + q[1]) / 2)


def chains(segments: Sequence[tuple[XY, XY]]) -> list[list[XY]]:
    """Segments joined end to end."""
    ends: dict[XY, list[int]] = {}
    for k, (a, b) in enumerate(segments):
        ends.setdefault(a, []).append(k)
        ends.setdefault(b, []).append(k)
    used: set[int] = set()
    out: list[list[XY]] = []

    def walk(at: XY) -> list[XY]:
        line = [at]
        while True:
            nxt = [k for k in ends[at] if k not in used]
            if not nxt or (len(ends[at]) > 2 and len(line) > 1):
                return line
            used.add(nxt[0])
            a, b = segments[nxt[0]]
            at = b if a == at else a
            line.append(at)

    starts = sorted(ends, key=lambda p: (len(ends[p]) == 2, p))
    for p in starts:
        while any(k not in used for k in ends[p]):
            out.append(walk(p))
    return out


def pole(
    raster: Raster, wanted: Truth, width: float, height: float, keep_off: Sequence[XY]
) -> tuple[XY, float]:
    """The middle of the roomiest spot of a truth (page units) and how far it is from anything."""
    rows, columns = len(raster), len(raster[0])
    cw, ch = width / columns, height / rows
    step = max(1, columns // 72)
    edges: list[XY] = list(keep_off)
    cells: list[XY] = []
    for j in range(0, rows, step):
        for i in range(0, columns, step):
            p = ((i + 0.5) * cw, (j + 0.5) * ch)
            (cells if raster[j][i] is wanted else edges).append(p)
    best, room = (0.0, 0.0), 0.0
    for p in cells[:: max(1, len(cells) // 700)]:
        r = min(p[0], p[1], width - p[0], height - p[1])
        if r > room:
            r = min(r, min((math.dist(p, e) for e in edges), default=r))
        if r > room:
            best, room = p, r
    return best, room
