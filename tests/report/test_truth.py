"""Colours of the maps against theorems, by code of their own."""

from __future__ import annotations

import math
import random
from fractions import Fraction

import surdwise
from surdwise.report.grid import level_lines, outlines, refine, simplify
from surdwise.report.maps import truth_map
from surdwise.report.picture import Ink, Ring, Stroke
from surdwise.report.truth import Truth, sampler, summary

VIVIANI = (
    "given equilateral triangle ABC\ngiven point P\n"
    "claim dist(P, AB) + dist(P, BC) + dist(P, CA) = altitude(ABC, A)\n"
)
CHORDS = "given equilateral triangle ABC\ngiven P on circle ABC\nclaim |PA| = |PB| + |PC|\n"


def test_viviani_is_true_inside_the_triangle_only() -> None:
    """Viviani's theorem and its converse (from memory: outside, the sum exceeds the altitude)."""
    (sheet,) = surdwise.read(VIVIANI)
    s = sampler(sheet, sheet.claims[0].body, 20)
    assert s is not None and s.direct and s.mover == "P" and set(s.fixed) == {"A", "B", "C"}
    chance = random.Random(5)
    h = math.sqrt(3) / 2
    seen = set()
    for _ in range(300):
        x, y = Fraction(chance.randint(-999, 1999), 997), Fraction(chance.randint(-999, 1999), 991)
        fx, fy = float(x), float(y)
        distances = [fy, (math.sqrt(3) * fx - fy) / 2, (math.sqrt(3) * (1 - fx) - fy) / 2]
        if min(map(abs, distances)) < 1e-6:
            continue
        expected = Truth.TRUE if min(distances) > 0 else Truth.FALSE
        assert (sum(map(abs, distances)) < h + 1e-9) == (expected is Truth.TRUE)
        found = s.judge((x, y))
        assert found is not None and summary(found) is expected, (x, y)
        seen.add(expected)
    assert len(seen) == 2


def test_track_is_true_on_the_far_arc() -> None:
    """|PA| = |PB| + |PC| on the arc BC without A (Ptolemy): the track's green stretch."""
    (sheet,) = surdwise.read(CHORDS)
    (d,) = surdwise.decide(sheet)
    m = truth_map(sheet, sheet.claims[0], d)
    assert m is not None
    by_ink = {
        ink: [p for x in m.picture.marks if isinstance(x, Stroke) and x.ink is ink for p in x.points]
        for ink in (Ink.TRUE, Ink.FALSE)
    }
    names = {x.text: x for x in m.picture.labels()}
    assert {"A", "B", "C"} <= set(names)
    # the circle of the drawing, and the triangle's corners on it
    (ring,) = (x for x in m.picture.marks if isinstance(x, Ring) and x.ink is Ink.GIVEN)
    corners = {x.points for x in m.picture.marks if isinstance(x, Stroke) and x.ink is Ink.GIVEN}
    spots = {p for c in corners for p in c}
    assert len(spots) == 3
    a = min(spots, key=lambda p: math.dist(p, names["A"].centre))
    for ink, points in by_ink.items():
        assert len(points) > 20
        for p in points:
            assert math.isclose(math.dist(p, ring.centre), ring.radius, rel_tol=1e-6)
            # the far arc: more than a third of the circle away from A
            far = math.dist(p, a) > ring.radius * math.sqrt(3) - 0.05
            near = math.dist(p, a) < ring.radius * math.sqrt(3) + 0.05
            assert far if ink is Ink.TRUE else near


def test_right_angle_at_the_third_corner_bounds_the_map() -> None:
    """The circumcentre lies inside an acute triangle alone: the map's border is the circle on AB
    and the perpendiculars in its ends (Thales)."""
    (sheet,) = surdwise.read(
        "given triangle ABC\ngiven O = circumcentre of ABC\n"
        "claim dist(O, AB) + dist(O, BC) + dist(O, CA) = circumradius(ABC) + inradius(ABC)\n"
    )
    s = sampler(sheet, sheet.claims[0].body, 20)
    assert s is not None
    for x, y, true in ((1, 3, True), (1, 1, False), (-1, 5, False), (4, 5, False), (1, 2, True)):
        found = s.judge((Fraction(x, 2) + Fraction(1, 101), Fraction(y, 3)))
        assert found is not None
        cx, cy = x / 2 + 1 / 101, y / 3
        acute = 0 < cx < 1 and (cx - 0.5) ** 2 + cy**2 > 0.25
        assert acute == true
        assert summary(found) is (Truth.TRUE if true else Truth.FALSE)


def test_grid_finds_a_disc() -> None:
    def judge(x: float, y: float) -> Truth:
        return Truth.TRUE if math.hypot(x - 0.5, y - 0.5) < 0.3 else Truth.FALSE

    raster = refine(judge, 20, 20, 3, lambda: False)
    assert len(raster) == 160
    share = sum(t is Truth.TRUE for row in raster for t in row) / 160**2
    assert math.isclose(share, math.pi * 0.09, rel_tol=0.01)
    (loop,) = outlines(raster, Truth.TRUE)
    assert all(math.isclose(math.hypot(x - 0.5, y - 0.5), 0.3, abs_tol=0.01) for x, y in loop)
    area = abs(sum(a[0] * b[1] - a[1] * b[0] for a, b in zip(loop, loop[1:] + loop[:1], strict=True))) / 2
    assert math.isclose(area, math.pi * 0.09, rel_tol=0.02)
    lines = level_lines(lambda x, y: math.hypot(x - 0.5, y - 0.5) - 0.3, 24, 24)
    assert math.isclose(sum(math.dist(a, b) for a, b in lines), 0.6 * math.pi, rel_tol=0.01)


def test_simplify_keeps_corners() -> None:
    line = [(x / 10, 0.0) for x in range(11)] + [(1.0, y / 10) for y in range(1, 11)]
    assert simplify(line, 0.01) == [(0.0, 0.0), (1.0, 0.0), (1.0, 1.0)]
