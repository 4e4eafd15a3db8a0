"""Points on curves, made points, meets."""

from __future__ import annotations

from .forms_drawing import HALF_ANGLES, Drawing, form
from .forms_plane import HALF, Round, Straight, Vec, cross, dot, orientation, square
from .protocol import Num
from .tree import CurveRef, PointRef

# ---------------------------------------------------------------- points on curves


@form("on_line")
def on_line(d: Drawing, p: str, line: CurveRef) -> None:
    """Point + t direction."""
    d.along(p, d.line(line), f"place of {p} on the line")


def _along_pair(d: Drawing, p: str, pair: tuple[str, ...]) -> Num:
    """Coordinate of p along AB, 0 at A and 1 at B."""
    a, b = pair
    d.apart(a, b)
    return d.along(p, Straight(d.at(a), d.at(b) - d.at(a)), f"|{a}{p}| over |{a}{b}|")


@form("on_segment")
def on_segment(d: Drawing, p: str, pair: tuple[str, ...]) -> None:
    """0 <= t <= 1."""
    t = _along_pair(d, p, pair)
    d.numbers.require(t, ">=", f"{p} is before {pair[0]}")
    d.numbers.require(-t + 1, ">=", f"{p} is beyond {pair[1]}")


@form("on_ray")
def on_ray(d: Drawing, p: str, pair: tuple[str, ...]) -> None:
    """t >= 0."""
    d.numbers.require(_along_pair(d, p, pair), ">=", f"{p} is before {pair[0]}")


def on_round(d: Drawing, p: str, k: Round) -> None:
    """The second point of the chord from the circle's known point s in the direction w + t turned(w), w
    from s to the centre: s + 2 (w + t turned(w)) / (1 + t^2).  The tangent's direction is missed: there
    p = s.  In the half-angle frame t = (1 - h^2)/(2h) with h > 0: the cotangent of an angle between 0 and
    180 degrees, by the tangent of its half."""
    n = d.numbers
    if d.has(p):
        n.vanish(square(d.at(p) - k.centre) - k.radius2, f"{p} is not on the circle")
        return
    if n.at_missed():
        d.put(p, k.start)
        return
    if d.frame.kind == HALF_ANGLES:
        h = n.parameter(f"tan of half the chord angle of {p}", "positive")
        t = n.divide(-(h * h) + 1, h * 2, "the half of a chord angle is 0")
    else:
        t = n.parameter(f"cot of the chord angle of {p}", "free")
    w = k.centre - k.start
    d.put(p, k.start + (w + w.turned() * t) * n.divide(n.number(2), t * t + 1, "1 + t^2 = 0"))


@form("on_circle")
def on_circle(d: Drawing, p: str, k: CurveRef) -> None:
    """Anywhere on the circle."""
    on_round(d, p, d.circle(k))


@form("on_perpendicular_bisector")
def on_perpendicular_bisector(d: Drawing, p: str, pair: tuple[str, ...]) -> None:
    """Middle + t turned(AB)."""
    a, b = d.at(pair[0]), d.at(pair[1])
    d.apart(*pair)
    d.along(p, Straight((a + b) * HALF, (b - a).turned()), f"place of {p} on the bisector")


@form("on_angle_bisector")
def on_angle_bisector(d: Drawing, p: str, triple: tuple[str, ...]) -> None:
    """On the ray inside the angle."""
    t = d.along(p, d.bisector(triple), f"place of {p} on the bisector")
    d.numbers.require(t, ">=", f"{p} is behind {triple[1]}")


@form("inside_triangle")
def inside_triangle(d: Drawing, p: str, triangle: tuple[str, ...]) -> None:
    """On the inner side of every side."""
    if not d.has(p):
        d.free(p)
    d.proper(triangle)
    a, b, c = triangle
    whole = d.turn(a, b, c)
    for s, e in ((a, b), (b, c), (c, a)):
        d.numbers.require(d.turn(s, e, p) * whole, ">", f"{p} is not inside")


# ---------------------------------------------------------------- made points


@form("midpoint")
def midpoint(d: Drawing, m: str, pair: tuple[str, ...]) -> None:
    """(A + B)/2."""
    d.put(m, (d.at(pair[0]) + d.at(pair[1])) * HALF)


@form("foot")
def foot(d: Drawing, p: str, a: PointRef, line: CurveRef) -> None:
    """Foot of the perpendicular."""
    d.put(p, d.foot(d.at(a), d.line(line)))


def cut(d: Drawing, m: Straight, n: Straight, words: str) -> tuple[Vec, Num]:
    """Meet of two lines and its coordinate along the first."""
    t = d.numbers.divide(cross(n.point - m.point, n.direction), cross(m.direction, n.direction), words)
    return m.point + m.direction * t, t


@form("foot_of_bisector")
def foot_of_bisector(d: Drawing, p: str, triple: tuple[str, ...], pair: tuple[str, ...]) -> None:
    """Where the bisector ray meets the line."""
    ray = d.bisector(triple)
    at, t = cut(d, ray, d.line_of(pair), "the bisector is parallel to the line")
    d.numbers.require(t, ">=", "the bisector ray misses the line")
    d.put(p, at)


@form("reflection_in_line")
def reflection_in_line(d: Drawing, p: str, a: PointRef, line: CurveRef) -> None:
    """2 F - A with F the foot of A."""
    d.put(p, d.foot(d.at(a), d.line(line)) * 2 - d.at(a))


@form("reflection_in_point")
def reflection_in_point(d: Drawing, p: str, a: PointRef, m: PointRef) -> None:
    """2 M - A."""
    d.put(p, d.at(m) * 2 - d.at(a))


def third_corner(d: Drawing, a: Vec, b: Vec, root3: Num) -> Vec:
    """Apex of an equilateral triangle on ab: to the left for a positive root of 3."""
    return (a + b) * HALF + (b - a).turned() * (root3 * HALF)


@form("equilateral_apex")
def equilateral_apex(d: Drawing, p: str, pair: tuple[str, ...]) -> None:
    """To either side."""
    d.apart(*pair)
    if d.has(p):
        side2 = d.gap2(*pair)
        for q in pair:
            d.numbers.vanish(d.gap2(p, q) - side2, f"|{p}{q}| is not the side")
        return
    root3 = d.numbers.either_root(d.numbers.number(3))
    d.put(p, third_corner(d, d.at(pair[0]), d.at(pair[1]), root3))


def _on_side(d: Drawing, pair: tuple[str, ...], made: Vec, side: str, mark: str) -> None:
    """`made` lies away from or towards the marked point, as seen from the line of the pair."""
    a, b = d.at(pair[0]), d.at(pair[1])
    product = orientation(a, b, made) * orientation(a, b, d.at(mark))
    d.numbers.require(product if side == "towards" else -product, ">", f"the side of {mark}")


@form("equilateral_apex_sided")
def equilateral_apex_sided(d: Drawing, p: str, pair: tuple[str, ...], side: str, mark: str) -> None:
    """To the side named."""
    equilateral_apex(d, p, pair)
    _on_side(d, pair, d.at(p), side, mark)


@form("square_corners")
def square_corners(d: Drawing, p: str, q: str, pair: tuple[str, ...], side: str, mark: str) -> None:
    """D beside C and E beside B, at right angles to BC."""
    d.apart(*pair)
    b, c = d.at(pair[0]), d.at(pair[1])
    up = (c - b).turned() * d.numbers.choose()
    d.put(p, c + up)
    d.put(q, b + up)
    _on_side(d, pair, c + up, side, mark)


# ---------------------------------------------------------------- centres


@form("centre")
def centre(d: Drawing, o: str, k: CurveRef) -> None:
    """Centre of a circle."""
    d.put(o, d.circle(k).centre)


@form("centroid")
def centroid(d: Drawing, g: str, triangle: tuple[str, ...]) -> None:
    """(A + B + C)/3."""
    n = d.numbers
    d.put(g, d.weighted(triangle, [n.number(1)] * 3))


@form("circumcentre")
def circumcentre(d: Drawing, o: str, triangle: tuple[str, ...]) -> None:
    """As far from all corners."""
    d.put(o, d.circumcentre(triangle))


def _orthocentre(d: Drawing, triangle: tuple[str, ...]) -> Vec:
    """H = A + B + C - 2 O (Euler)."""
    a, b, c = (d.at(p) for p in triangle)
    return a + b + c - d.circumcentre(triangle) * 2


@form("orthocentre")
def orthocentre(d: Drawing, h: str, triangle: tuple[str, ...]) -> None:
    """Meet of the altitudes."""
    d.put(h, _orthocentre(d, triangle))


@form("nine_point_centre")
def nine_point_centre(d: Drawing, n: str, triangle: tuple[str, ...]) -> None:
    """Middle of circumcentre and orthocentre (Euler)."""
    d.put(n, (d.circumcentre(triangle) + _orthocentre(d, triangle)) * HALF)


def _centre_of_touching(d: Drawing, p: str, triangle: tuple[str, ...], opposite: str) -> None:
    if d.has(p):
        d.touches_sides(p, triangle, opposite)
    else:
        d.put(p, d.touching(triangle, opposite))


@form("incentre")
def incentre(d: Drawing, i: str, triangle: tuple[str, ...]) -> None:
    """Centre of the inscribed circle."""
    _centre_of_touching(d, i, triangle, "")


@form("excentre")
def excentre(d: Drawing, j: str, triangle: tuple[str, ...], opposite: str) -> None:
    """Centre of the escribed circle beyond the side opposite a corner."""
    _centre_of_touching(d, j, triangle, opposite)


@form("touch_point")
def touch_point(d: Drawing, t: str, triangle: tuple[str, ...], pair: tuple[str, ...]) -> None:
    """On PQ at distance (|PQ| + |PR| - |QR|)/2 from P."""
    d.proper(triangle)
    p, q = pair
    (r,) = (x for x in triangle if x not in pair)
    x, y, z = d.sides((p, q, r))
    k = d.numbers.divide(y + z - x, z * 2, f"{p} = {q}")
    d.put(t, d.at(p) + (d.at(q) - d.at(p)) * k)


# ---------------------------------------------------------------- meets


@form("meet")
def meet(d: Drawing, x: str, one: CurveRef, two: CurveRef) -> None:
    """Any common point of two curves."""
    if d.is_circle(one) and not d.is_circle(two):
        one, two = two, one
    if not d.is_circle(two):
        m, n = d.line(one), d.line(two)
        d.put(x, cut(d, m, n, "the lines are parallel")[0])
    elif not d.is_circle(one):
        _line_circle(d, x, d.line(one), d.circle(two))
    else:
        _two_circles(d, x, d.circle(one), d.circle(two))


def _line_circle(d: Drawing, x: str, line: Straight, k: Round) -> None:
    """|P + s u - O|^2 = r^2, a quadratic equation for s."""
    n = d.numbers
    if d.has(x):
        v = d.at(x)
        n.vanish(cross(line.direction, v - line.point), f"{x} is not on the line")
        n.vanish(square(v - k.centre) - k.radius2, f"{x} is not on the circle")
        return
    u, w = line.direction, line.point - k.centre
    uu, uw = square(u), dot(u, w)
    root = n.either_root(uw * uw - uu * (square(w) - k.radius2))
    d.put(x, line.point + u * n.divide(root - uw, uu, "the line is not defined"))


def _two_circles(d: Drawing, x: str, k: Round, m: Round) -> None:
    """On the radical axis, which is at right angles to the line of the centres."""
    n = d.numbers
    u = m.centre - k.centre
    uu = square(u)
    s = n.divide(uu + k.radius2 - m.radius2, uu * 2, "the circles have one centre")
    if d.has(x):
        for c in (k, m):
            n.vanish(square(d.at(x) - c.centre) - c.radius2, f"{x} is not on both circles")
        return
    _line_circle(d, x, Straight(k.centre + u * s, u.turned()), k)


@form("meet_other")
def meet_other(d: Drawing, x: str, one: CurveRef, two: CurveRef, than: str) -> None:
    """The common point that is not the named one."""
    meet(d, x, one, two)
    d.differ(d.at(x), d.at(than), f"no meet other than {than}")
