"""The map of truth: where the claim is true, over one or two parameters of its figure.

Two parameters: every place of a moving point (or of the parameter plane) is coloured by what the
claim says there.  One parameter: the track of the moving point in stretches.  Colours are judged
exactly at sample places (truth.py); only the pen between them is a matter of floats.
"""

from __future__ import annotations

import itertools
import math
from collections.abc import Sequence
from contextlib import suppress
from fractions import Fraction

from ..field.ring import PARAM_NAMES
from ..figure.conditions import truth
from ..sheet.tree import Condition, Line, Not, Or, Sheet
from ..verdict.outcome import Decision
from . import grid
from .draft import draft
from .fit import HEIGHT, View, finished, point_names, strokes, view
from .labels import SMALL_SIZE, Wish, text_width
from .landmarks import NAMES, WIDTH, WITNESSES, TruthMap, extent, listed, middle, witnesses
from .picture import XY, Area, Dot, Fill, Ink, Label, Mark, Stroke
from .plane import MISSING
from .thin import Field, atoms, count, descend, distance, finite, near, residues, stated
from .track import track_map
from .truth import Hints, Sampler, Truth, border_functions, sampler, summary

SECONDS = 12.0
COLUMNS = 38
LEVELS = 3
FILLS = {Truth.TRUE: Fill.TRUE, Truth.FALSE: Fill.FALSE, Truth.MIXED: Fill.MIXED, Truth.NONE: Fill.NONE}


def truth_map(sheet: Sheet, line: Line, decision: Decision, seconds: float = SECONDS) -> TruthMap | None:
    """The map of one claim, or None: no figure, another number of parameters, or out of time."""
    claim: Condition = line.body  # type: ignore[assignment]
    s = sampler(sheet, claim, seconds)
    if s is None:
        return None
    said = [c for c in (stated(decision.condition), stated(decision.equality)) if c is not None]
    if len(s.free) == 2:
        return _PlaneMap(sheet, s, decision, said).draw()
    return track_map(sheet, s, decision)


# ---------------------------------------------------------------- two parameters


class _Late(Exception):
    """The time for the picture is up; what is drawn so far must do."""


class _PlaneMap:
    def __init__(self, sheet: Sheet, s: Sampler, decision: Decision, said: list[Condition]) -> None:
        self.sheet, self.s, self.decision, self.said = sheet, s, decision, said
        self.known: dict[tuple[Fraction, Fraction], Truth | None] = {}
        # with the fixed points on one line the figure over (x, -y) is the mirror image of that over (x, y)
        self.mirrored = s.direct and s.positive(s.free[1]) and all(p[1] == 0 for p in s.fixed.values())
        self.witnesses = witnesses(s, decision) if s.direct else []
        self.view = self._window()
        self.odd: set[str] = set()  # what the thin sets drawn say

    def _window(self) -> View:
        low, high = [-1.0, -1.0], [2.0, 2.0]
        s = self.s
        if s.direct:
            spots = list(s.fixed.values())
            size = extent(spots)
            centre = middle(spots)
            seen = [p for p, _ in self.witnesses if math.dist(p, centre) < 2.4 * size]
            for k in (0, 1):
                low[k] = min(
                    min(p[k] for p in spots) - 0.8 * size, min((p[k] for p in seen), default=math.inf) - 0.2
                )
                high[k] = max(
                    max(p[k] for p in spots) + 0.8 * size, max((p[k] for p in seen), default=-math.inf) + 0.2
                )
            if self.mirrored:
                top = max(high[1], 1.15 * size)
                low[1], high[1] = -top, top
        for k in (0, 1):
            if s.positive(s.free[k]) and not (self.mirrored and k == 1):
                low[k] = 0.0
                high[k] = max(high[k], 1.5)
        return self._shaped(low, high)

    def _shaped(self, low: Sequence[float], high: Sequence[float]) -> View:
        if self.s.direct:
            return view((low[0], low[1]), (high[0], high[1]), WIDTH, HEIGHT + 40, 0.0)
        # two parameters have no common measure: each axis fills the page
        return View(
            (WIDTH / (high[0] - low[0]), HEIGHT / (high[1] - low[1])), (low[0], low[1]), WIDTH, HEIGHT
        )

    def _truth(self, u: float, v: float) -> Truth | None:
        x, y = self.view.back((u * self.view.width, v * self.view.height))
        if self.mirrored:
            y = abs(y)
        place = (Fraction(x).limit_denominator(10**6), Fraction(y).limit_denominator(10**6))
        if place not in self.known:
            if any(c <= 0 and self.s.positive(k) for c, k in zip(place, self.s.free, strict=True)):
                return Truth.NONE
            seen = self.s.judge(place)
            self.known[place] = None if seen is None else summary(seen)
        return self.known[place]

    def _crop(self) -> None:
        """Come closer where the admitted places fill a small part of the window."""
        n = 24
        spots: list[XY] = []
        for i, j in itertools.product(range(n), range(n)):
            t = self._truth((i + 0.5) / n, (j + 0.5) / n)
            if t not in (None, Truth.NONE):
                spots.append(
                    self.view.back(((i + 0.5) / n * self.view.width, (j + 0.5) / n * self.view.height))
                )
        if not spots or self.s.late():
            return
        if self.s.direct:
            spots += list(self.s.fixed.values())
        low = [min(p[k] for p in spots) for k in (0, 1)]
        high = [max(p[k] for p in spots) for k in (0, 1)]
        size = max(high[k] - low[k] for k in (0, 1)) or 1.0
        if (high[0] - low[0]) * (
            high[1] - low[1]
        ) * self.view.scale**2 < 0.5 * self.view.width * self.view.height:
            pad = 0.14 * size
            self.view = self._shaped([x - pad for x in low], [x + pad for x in high])

    def draw(self) -> TruthMap | None:
        self._crop()
        w, h = self.view.width, self.view.height
        rows = max(8, round(COLUMNS * h / w))
        raster = grid.refine(self._truth, COLUMNS, rows, LEVELS, self.s.late)
        found = [t for t in Truth if any(t in row for row in raster)]
        if found == [Truth.NONE]:
            return None
        marks: list[Mark] = []
        for t in found:
            loops = tuple(tuple((x * w, y * h) for x, y in loop) for loop in grid.outlines(raster, t))
            marks.append(Area(loops, FILLS[t]))
        borders = self._borders(raster)
        marks += borders
        only = self._only(raster)
        marks += only
        drawn, wishes, dots = self._figure()
        marks += drawn
        seen = self._witnesses()
        dots += [d for d, _ in seen]
        wishes += [x for _, x in seen if x.text]
        ticks = [] if self.s.direct else self._axes()
        marks.append(
            Stroke(((0.5, 0.5), (w - 0.5, 0.5), (w - 0.5, h - 0.5), (0.5, h - 0.5)), Ink.FRAME, closed=True)
        )
        areas = self._area_labels(raster, found, [*(d.at for d in dots), *(label.centre for label in ticks)])
        legend = self._legend(found, marks, dots)
        words = self._words(found)
        picture = finished(marks, wishes, dots, self.view, "Map of truth", words, legend, [*ticks, *areas])
        return TruthMap(picture, self._caption())

    # ------------------------------------------------------------------ borders

    def _place(self, p: XY) -> XY:
        """The parameters at a place of the unit square."""
        x, y = self.view.back((p[0] * self.view.width, p[1] * self.view.height))
        return x, abs(y) if self.mirrored else y

    def _unit(self, f: Field) -> Field:
        def at(x: float, y: float) -> float:
            if self.s.late():
                raise _Late
            with suppress(ArithmeticError, ValueError):
                return f(*self._place((x, y)))
            return math.nan

        return at

    def _lines(self, f: Field, columns: int) -> list[tuple[XY, XY]]:
        """The zero set of a function of the parameters; nothing for one that is zero up to rounding."""
        f = self._unit(f)
        with suppress(_Late):
            tries = [f((7 * k % 31 + 0.4) / 31, (11 * k % 29 + 0.6) / 29) for k in range(40)]
            if sum(abs(v) < 1e-9 for v in tries) < 10:
                return grid.level_lines(
                    f, columns, max(8, round(columns * self.view.height / self.view.width))
                )
        return []

    def _borders(self, raster: grid.Raster) -> list[Mark]:
        """Border curves of the program where truth differs on their two sides: solid where the
        claim is true on the border itself, open where it is not."""
        out: list[Mark] = []
        w, h = self.view.width, self.view.height
        hints = self.s.hints()
        cell = 1.3 / len(raster[0])
        covered: list[XY] = []
        for f in border_functions(self.s):
            groups: dict[Ink, list[tuple[XY, XY]]] = {}
            for a, b in self._lines(f, 84):
                m = ((a[0] + b[0]) / 2, (a[1] + b[1]) / 2)
                n = math.dist((a[0] * w, a[1] * h), (b[0] * w, b[1] * h)) or 1.0
                nx, ny = -(b[1] - a[1]) * h / n * cell, (b[0] - a[0]) * w / n * cell * w / h
                one = grid.lookup(raster, m[0] + nx, m[1] + ny)
                two = grid.lookup(raster, m[0] - nx, m[1] - ny)
                if one is two is not None and not self.s.late():
                    # perhaps a sliver that falls between the cells: judge close to the border
                    one = self._truth(m[0] + nx / 9, m[1] + ny / 9)
                    two = self._truth(m[0] - nx / 9, m[1] - ny / 9)
                if one is not None and two is not None and one is not two:
                    covered.append(m)
                    groups.setdefault(self._border_ink(hints, a), []).append((a, b))
            stray = sum(
                math.dist((a[0] * w, a[1] * h), (b[0] * w, b[1] * h)) for a, b in groups.get(Ink.OPEN, [])
            )
            if stray < 6:
                # next to a corner of the border only
                groups.setdefault(Ink.BORDER, []).extend(groups.pop(Ink.OPEN, []))
            for ink, segments in groups.items():
                for line in grid.chains(segments):
                    points = grid.simplify([(x * w, y * h) for x, y in line], 0.15)
                    out.append(Stroke(tuple(points), ink))
        if not covered:
            # no polynomial explains the change (or none was found in time): the raster's own edges
            for t in (Truth.TRUE, Truth.FALSE):
                for loop in grid.outlines(raster, t):
                    inner = [(x, y) for x, y in loop if 0.01 < x < 0.99 and 0.01 < y < 0.99]
                    if len(inner) > 1:
                        out.append(Stroke(tuple((x * w, y * h) for x, y in inner), Ink.BORDER))
        return out

    def _border_ink(self, hints: Hints, p: XY) -> Ink:
        """Whether the border belongs to the true places, by the printed condition."""
        condition = stated(self.decision.condition)
        if condition is None:
            return Ink.BORDER
        truths = set()
        for hint in hints.at(self._place(p)):
            with suppress(*MISSING):
                truths.add(truth(condition, hint))
        return Ink.OPEN if truths == {False} else Ink.BORDER

    # ------------------------------------------------------------------ thin sets

    def _only(self, raster: grid.Raster) -> list[Mark]:
        """Curves and points on which the claim differs from its surroundings, or on which the two
        sides are equal, drawn from the printed condition."""
        out: list[Mark] = []
        hints = self.s.hints()
        for c in self.said:
            with suppress(_Late):
                for part in c.args if isinstance(c, Or) else (c,):
                    # where a negated condition is met the printed one is false
                    inner = part.arg if isinstance(part, Not) and count(part.arg) else part
                    if count(inner) >= 2:
                        out += self._points(hints, c, inner, raster)
                        continue
                    for atom in atoms(part):
                        out += self._curves(hints, c, atom, raster)
        return out

    def _differs(self, hints: Hints, c: Condition, p: XY, raster: grid.Raster) -> bool:
        """Whether the printed condition says on a curve what is not said around it."""
        near = {
            grid.lookup(raster, p[0] + dx, p[1] + dy)
            for dx, dy in itertools.product((-0.012, 0.012), (-0.012, 0.012))
        } - {None, Truth.NONE}
        for hint in hints.at(self._place(p)):
            with suppress(*MISSING):
                here = truth(c, hint)
                odd = "equality" if c == stated(self.decision.equality) else f"{str(here).lower()} here only"
                if here if odd == "equality" else near == {Truth.FALSE if here else Truth.TRUE}:
                    self.odd.add(odd)
                    return True
                return False
        return False

    def _curves(self, hints: Hints, c: Condition, atom: Condition, raster: grid.Raster) -> list[Mark]:
        w, h = self.view.width, self.view.height

        def value(x: float, y: float) -> float:
            for hint in hints.at((x, y)):
                with suppress(*MISSING):
                    found = residues(atom, hint)
                    return found[0] if len(found) == 1 else math.nan
            return math.nan

        w, h = self.view.width, self.view.height
        segments = [(a, b) for a, b in self._lines(value, 60) if self._differs(hints, c, a, raster)]
        lines = grid.chains(segments)
        return [Stroke(tuple(grid.simplify([(x * w, y * h) for x, y in ln], 0.15)), Ink.ONLY) for ln in lines]

    def _points(self, hints: Hints, c: Condition, wanted: Condition, raster: grid.Raster) -> list[Mark]:
        """Isolated points: places where several equations meet, by a shrinking search."""
        out: list[Dot] = []
        f = self._unit(self._height(hints, wanted))
        n = 24
        table = {(i, j): finite(f((i + 0.5) / n, (j + 0.5) / n)) for i in range(n) for j in range(n)}
        starts = [k for k, v in table.items() if v < math.inf and v <= min(near(table, k))]
        for i, j in sorted(starts, key=lambda k: table[k])[:10]:
            p = descend(f, ((i + 0.5) / n, (j + 0.5) / n), 1 / n)
            if p is None or not self._is_met(hints, wanted, p) or not self._is_lone(f, p):
                continue
            at = (p[0] * self.view.width, p[1] * self.view.height)
            if all(math.dist(d.at, at) > 3 for d in out) and self._differs(hints, c, p, raster):
                out.append(Dot(at, "only"))
        return list(out)

    def _is_met(self, hints: Hints, c: Condition, p: XY) -> bool:
        for hint in hints.at(self._place(p)):
            with suppress(*MISSING):
                return truth(c, hint)
        return False

    def _height(self, hints: Hints, c: Condition) -> Field:
        def height(x: float, y: float) -> float:
            for hint in hints.at((x, y)):
                with suppress(*MISSING):
                    return distance(c, hint)
            return math.inf

        return height

    def _is_lone(self, f: Field, p: XY) -> bool:
        """Whether no curve of zeros runs through a zero, by the values on a small circle."""
        ways = [2 * math.pi * k / 64 for k in range(64)]
        around = [finite(f(p[0] + 0.01 * math.cos(a), p[1] + 0.01 * math.sin(a))) for a in ways]
        return min(around) > 5e-3 * max(around)

    # ------------------------------------------------------------------ the figure in the map

    def _figure(self) -> tuple[list[Mark], list[Wish], list[Dot]]:
        if not self.s.direct:
            return [], [], []
        d = draft(self.sheet.given, self.s.fixed, None)
        marks, wishes = strokes(d, self.view)
        names = point_names(self.s.fixed, 1.0)
        wishes += [Wish(n, self.view.at(p)) for n, p in names]
        return marks, wishes, [Dot(self.view.at(p)) for _, p in names]

    def _witnesses(self) -> list[tuple[Dot, Wish]]:
        """Where the two printed figures stand in the map."""
        out = []
        for at, kind in self.witnesses:
            p = self.view.at(at)
            if 6 < p[0] < self.view.width - 6 and 6 < p[1] < self.view.height - 6:
                out.append((Dot(p, kind), Wish(self.s.mover or "", p)))
        if len(out) == 2 and math.dist(out[0][0].at, out[1][0].at) < 4:
            # one place, two figures: one name
            return [(out[0][0], out[0][1]), (out[1][0], Wish("", out[1][1].at))]
        return out

    def _axes(self) -> list[Label]:
        """Numbers along the frame of a parameter plane."""
        out = []
        v = self.view
        (x0, y0), (x1, y1) = v.back((0, 0)), v.back((v.width, v.height))
        step = 0.5 if max(x1 - x0, y1 - y0) <= 3.5 else 1.0
        for k in range(math.ceil(x0 / step), math.floor(x1 / step) + 1):
            out.append(_tick(k * step, (v.at((k * step, 0))[0], 9.0)))
        for k in range(math.ceil(y0 / step), math.floor(y1 / step) + 1):
            out.append(_tick(k * step, (13.0, v.at((0, k * step))[1])))
        inside = [
            t
            for t in out
            if t.box[0] > 1 and t.box[2] < v.width - 1 and t.box[1] > 1 and t.box[3] < v.height - 1
        ]
        kept: list[Label] = []
        for t in inside:
            if all(not _touch(t, o) for o in kept):
                kept.append(t)
        return kept

    def _area_labels(self, raster: grid.Raster, found: list[Truth], off: list[XY]) -> list[Label]:
        out = []
        for t in found:
            p, room = grid.pole(raster, t, self.view.width, self.view.height, off)
            width = text_width(NAMES[t], SMALL_SIZE) + 6
            if room > 15 and room > 0.32 * width:
                half = width / 2 + 2
                p = (min(max(p[0], half), self.view.width - half), p[1])
                out.append(Label(NAMES[t], p, width, SMALL_SIZE * 1.3, "area"))
        return out

    def _legend(self, found: list[Truth], marks: list[Mark], dots: list[Dot]) -> tuple[tuple[str, str], ...]:
        out = [(f"area-{FILLS[t].value}", NAMES[t]) for t in found]
        inks = {m.ink for m in marks if isinstance(m, Stroke)}
        if Ink.BORDER in inks:
            out.append(("border", "border" if Ink.OPEN not in inks else "border, true on it"))
        if Ink.OPEN in inks:
            out.append(("open", "border, false on it"))
        thin = Ink.ONLY in inks or any(isinstance(m, Dot) and m.kind == "only" for m in marks)
        if thin:
            out.append(("only" if Ink.ONLY in inks else "dot-only", ", ".join(sorted(self.odd))))
        kinds = {d.kind for d in dots}
        for kind, text in WITNESSES:
            if kind in kinds:
                out.append((f"dot-{kind}", text))
        return tuple(out)

    def _words(self, found: list[Truth]) -> str:
        who = f"places of {self.s.mover}" if self.s.direct else "pairs of parameters"
        parts = ", ".join(NAMES[t] for t in found)
        return f"The plane of {who}, coloured by the truth of the claim: {parts}."

    def _caption(self) -> str:
        s = self.s
        if s.direct:
            fixed = listed(list(s.fixed))
            who = f"Every place of {s.mover}, with {fixed} fixed"
            if self.mirrored:
                who += "; the lower half mirrors the upper"
        else:
            who = "Across: " + _label(s, 0) + "; upwards: " + _label(s, 1)
        return (
            f"{who}. Judged exactly, sign by sign, at {s.count} sample places, closer together "
            "towards the borders; colours between them are filled in."
        )


def _label(s: Sampler, i: int) -> str:
    k = s.free[i]
    return f"{s.labels.get(k, '')} ({PARAM_NAMES[k]})"


def _touch(a: Label, b: Label) -> bool:
    al, ab, ar, at = a.box
    bl, bb, br, bt = b.box
    return min(ar, br) > max(al, bl) and min(at, bt) > max(ab, bb)


def _tick(value: float, at: XY) -> Label:
    text = f"{value:g}".replace("-", "−")
    return Label(text, at, text_width(text, SMALL_SIZE), SMALL_SIZE, "axis")
