"""Where a frame other than the Cartesian one places the first shape of a sheet, on which domain.

Every placement reaches each figure of its shape up to similarity and reflection (congruence, where the
sheet keeps its scale); why stands with each.
"""

from __future__ import annotations

from collections.abc import Callable

from .forms_drawing import HALF_ANGLES, INCIRCLE, SIDES, Drawing
from .forms_plane import Vec, dot
from .protocol import Num


def _by_sides(d: Drawing, triangle: tuple[str, ...]) -> None:
    """Tangent lengths x, y, z > 0 of the incircle: a = y + z, b = z + x, c = x + y satisfy the triangle
    inequalities for all of them, and every triangle has such.  4S = 4 sqrt(xyz(x + y + z)) (Heron)."""
    n = d.numbers
    p, q, r = triangle
    x = n.parameter(f"tangent length at {p}", "positive")
    y = n.parameter(f"tangent length at {q}", "positive")
    z = d.scale(f"tangent length at {r}")
    a, b, c = y + z, z + x, x + y
    area = n.root(x * y * z * (x + y + z))
    zero = n.number(0)
    d.put(p, Vec(zero, zero))
    d.put(q, Vec(c, zero))
    # |pr| = b and |qr| = a give the first coordinate, 2S/c is the second
    along = n.divide(b * b + c * c - a * a, c * 2, f"{p} = {q}")
    d.put(r, Vec(along, n.divide(area * 2, c, f"{p} = {q}")))


def _by_incircle(d: Drawing, triangle: tuple[str, ...]) -> None:
    """Cotangents x, y, z of the half angles, which are acute with sum 90 degrees: z = (x + y)/(xy - 1), so
    x, y > 0 with xy > 1 reach every triangle (inradius 1 up to similarity)."""
    n = d.numbers
    p, q, r = triangle
    x = n.parameter(f"cot of half the angle at {p}", "positive")
    y = n.parameter(f"cot of half the angle at {q}", "positive")
    radius = d.scale("inradius")
    over = x * y - 1
    n.require(over, ">", "two half angles make 90 degrees or more")
    z = n.divide(x + y, over, "two half angles make 90 degrees")
    zero = n.number(0)
    d.put(p, Vec(zero, zero))
    d.put(q, Vec((x + y) * radius, zero))
    # r is x + z from p; an angle with cot of its half x has cosine (x^2 - 1)/(x^2 + 1), sine 2x/(x^2 + 1)
    k = n.divide((x + z) * radius, x * x + 1, "1 + x^2 = 0")
    d.put(r, Vec((x * x - 1) * k, x * 2 * k))


def _by_half_angles(d: Drawing, triangle: tuple[str, ...]) -> None:
    """Tangents of a quarter of the angles at A and B, p and q: the quarters make less than 45 degrees, so
    p, q > 0 with p + q + pq < 1 reach every triangle (|AB| = 1 up to similarity)."""
    n = d.numbers
    a, b, c = triangle
    p = n.parameter(f"tan of a quarter of the angle at {a}", "positive")
    q = n.parameter(f"tan of a quarter of the angle at {b}", "positive")
    base = d.scale(f"|{a}{b}|")
    n.require(-(p + q + p * q) + 1, ">", "two angles make 180 degrees or more")
    zero = n.number(0)
    d.put(a, Vec(zero, zero))
    d.put(b, Vec(base, zero))

    def cot(t: Num) -> Num:
        """Cotangent of four times an angle of tangent t, by doubling twice."""
        half = n.divide(t * 2, -(t * t) + 1, "a quarter of 45 degrees")
        return n.divide(-(half * half) + 1, half * 2, "an angle of 0")

    x, y = cot(p), cot(q)
    height = n.divide(base, x + y, "the sides do not meet")
    d.put(c, Vec(height * x, height))


def _cyclic_by_half_angles(d: Drawing, quad: tuple[str, ...]) -> None:
    """On a circle about the origin, the first corner to the right, the others at angles 4 arctan t with
    0 < t1 < t2 < t3: read anticlockwise (a reflection sees to it), this is every such quadrilateral."""
    n = d.numbers
    radius = d.scale("circumradius")
    t = n.number(0)
    d.put(quad[0], Vec(radius, n.number(0)))
    for p in quad[1:]:
        t = t + n.parameter(f"step of the tangent to {p}", "positive")
        c, s = _turn(d, t)
        d.put(p, Vec((c * c - s * s) * radius, c * s * 2 * radius))


def _turn(d: Drawing, t: Num) -> tuple[Num, Num]:
    """Cosine and sine of twice an angle of tangent t."""
    k = d.numbers.divide(d.numbers.number(1), t * t + 1, "1 + t^2 = 0")
    return (-(t * t) + 1) * k, t * 2 * k


def _tangential_by_incircle(d: Drawing, quad: tuple[str, ...]) -> None:
    """Touch points of the incircle about the origin at angles 0, 2i, 2(i + j), 2(i + j + k); i, j, k and
    l = 180 degrees - i - j - k are acute, so their tangents (the tangent lengths) are positive: tan i, tan j,
    tan k are parameters, and tan l = (xyz - x - y - z)/(1 - xy - yz - zx) > 0 is demanded.  A corner is the
    pole of the chord of two touch points."""
    n = d.numbers
    x, y, z = (n.parameter(f"tangent length at {p}", "positive") for p in quad[:3])
    closes = (x * y * z - x - y - z) * (-(x * y + y * z + z * x) + 1)
    n.require(closes, ">", "the tangents do not close")
    radius = d.scale("inradius")
    touch = [Vec(n.number(1), n.number(0))]
    for t in (x, y, z):
        c, s = _turn(d, t)
        touch.append(touch[-1] * c + touch[-1].turned() * s)
    for p, u, v in zip(quad, touch, touch[1:] + touch[:1], strict=True):
        d.put(p, (u + v) * n.divide(radius, dot(u, v) + 1, "two sides are parallel"))


_PLACEMENTS: dict[tuple[str, str], Callable[[Drawing, tuple[str, ...]], None]] = {
    (SIDES, "triangle"): _by_sides,
    (INCIRCLE, "triangle"): _by_incircle,
    (HALF_ANGLES, "triangle"): _by_half_angles,
    (HALF_ANGLES, "cyclic_quadrilateral"): _cyclic_by_half_angles,
    (INCIRCLE, "tangential_quadrilateral"): _tangential_by_incircle,
}


def framed(d: Drawing, shape: str, names: tuple[str, ...]) -> bool:
    """Place the shape by the frame if it is the first and the frame knows how; whether it did."""
    place = _PLACEMENTS.get((d.frame.kind, shape))
    if place is None or d.figure.points:
        return False
    place(d, names)
    return True
