"""Frames: where the first shape of a sheet is placed, so that its lengths are free of roots.

One function a frame and shape.  Each says what becomes rational, on which domain, and why no
figure is lost up to similarity (congruence, where the sheet keeps its scale) and reflection.
"""

from __future__ import annotations

from collections.abc import Callable

from ...field.tower import Element
from ...sheet.tree import Pt
from ..component import Builder
from ..plane import Vec, dot

CARTESIAN, SIDES, HALF_ANGLES, INCIRCLE = "cartesian", "sides", "half-angles", "incircle"


def triangle_by_sides(b: Builder, names: tuple[Pt, ...]) -> None:
    """A free triangle by the tangent lengths of its incircle: a = y + z, b = z + x, c = x + y.

    Three lengths a, b, c are the sides of a triangle exactly when x = (b + c - a)/2 and its like
    are positive, so with x, y, z > 0 (z = 1 up to similarity) no triangle is lost.  Sides are
    rational; the only root is 4 S = 4 sqrt(xyz(x + y + z)) (Heron).
    """
    p, q, r = names
    x = b.param(f"tangent length at {p}", positive=True)
    y = b.param(f"tangent length at {q}", positive=True)
    z = b.param(f"tangent length at {r}", positive=True) if b.frame.keeps_scale else b.number(1)
    side_a, side_b, side_c = y + z, z + x, x + y
    area = b.root(x * y * z * (x + y + z))
    zero = b.number(0)
    b.put(p, Vec(zero, zero))
    b.put(q, Vec(side_c, zero))
    along = (side_b * side_b + side_c * side_c - side_a * side_a) / (side_c * 2)
    b.put(r, Vec(along, area * 2 / side_c))


def triangle_by_incircle(b: Builder, names: tuple[Pt, ...]) -> None:
    """A free triangle about its incircle (radius 1 up to similarity).

    The tangent lengths x, y, z are the cotangents of the half angles, which are acute with sum 90
    degrees: x, y > 0 and z = (x + y)/(xy - 1) > 0, so xy > 1 is the only condition and no
    triangle is lost.  Sides, area, radii and the incentre are rational.
    """
    p, q, r = names
    x = b.param(f"cot of half the angle at {p}", positive=True)
    y = b.param(f"cot of half the angle at {q}", positive=True)
    radius = _size(b, "inradius")
    d = x * y - 1
    b.require(d, ">", "two half angles of more than 90 degrees")
    z = (x + y) / d
    zero = b.number(0)
    b.put(p, Vec(zero, zero))
    b.put(q, Vec((x + y) * radius, zero))
    # r lies at distance x + z from p, in the direction whose half angle has cotangent x
    k = (x + z) * radius / (x * x + 1)
    b.put(r, Vec((x * x - 1) * k, x * 2 * k))


def triangle_by_half_angles(b: Builder, names: tuple[Pt, ...]) -> None:
    """A free triangle by p = tan(A/4) and q = tan(B/4), with |AB| = 1 up to similarity.

    Quarters of the angles lie in (0, 45 degrees) and A/4 + B/4 < 45 degrees says that
    p + q + pq < 1: with p, q > 0 no triangle is lost.  Sides, radii, area, bisectors, incentre and
    excentres are rational.
    """
    a, c, r = names
    p = b.param(f"tan of a quarter of the angle at {a}", positive=True)
    q = b.param(f"tan of a quarter of the angle at {c}", positive=True)
    base = _size(b, f"|{a}{c}|")
    b.require(1 - p - q - p * q, ">", "two angles of more than 180 degrees")
    zero = b.number(0)
    b.put(a, Vec(zero, zero))
    b.put(c, Vec(base, zero))
    # tangents of the half angles; with m = 1/tan A, n = 1/tan B the height is 1/(m + n)
    s, t = p * 2 / (1 - p * p), q * 2 / (1 - q * q)
    m, n = (1 - s * s) / (s * 2), (1 - t * t) / (t * 2)
    height = base / (m + n)
    b.put(r, Vec(height * m, height))


def cyclic_by_half_angles(b: Builder, quad: tuple[Pt, ...]) -> None:
    """A cyclic quadrilateral on a circle of radius 1 (up to similarity): the first vertex at
    angle 0, the others at twice the angles 2 arctan t with 0 < t1 < t2 < t3.

    Read counterclockwise (a reflection sees to it) the vertices have angles 0 < v1 < v2 < v3 < 360
    degrees, and t = tan(v/4) maps that range to (0, oo): no quadrilateral is lost.  Every
    chord is 2R |sin((v - w)/2)|, rational in the tangents.
    """
    radius = _size(b, "circumradius")
    before: Element = b.number(0)
    b.put(quad[0], Vec(radius, b.number(0)))
    for x in quad[1:]:
        more = b.param(f"step of the tangent to {x}", positive=True)
        t = before + more
        k = 1 / (t * t + 1)
        # the half angle's cosine and sine, then the angle's
        c, s = (1 - t * t) * k, t * 2 * k
        b.put(x, Vec((c * c - s * s) * radius, c * s * 2 * radius))
        before = t


def tangential_by_incircle(b: Builder, quad: tuple[Pt, ...]) -> None:
    """A tangential quadrilateral about its incircle (radius 1 up to similarity).

    Let the touch points lie at angles 0, 2i, 2(i+j), 2(i+j+k); the four half angles i, j, k, l
    between them are acute with sum 180 degrees, a vertex is the pole of a chord of neighbouring
    touch points, and every tangent length is a tangent.  So tan i, tan j, tan k > 0 are
    parameters, tan l = -tan(i+j+k) > 0 the only condition, and no such quadrilateral is lost.
    """
    p, q, r, _s = quad
    t = [b.param(f"tangent length at {x}", positive=True) for x in (p, q, r)]
    x, y, z = t
    last = (x * y * z - x - y - z) * (1 - x * y - y * z - z * x)
    b.require(last, ">", "the tangents do not close")
    radius = _size(b, "inradius")
    zero, one = b.number(0), b.number(1)
    touch = [Vec(one, zero)]
    for e in t:
        k = 1 / (e * e + 1)
        cos, sin = (1 - e * e) * k, e * 2 * k
        d = touch[-1]
        touch.append(d * cos + d.turned() * sin)
    for name, u, v in zip(quad, touch, touch[1:] + touch[:1], strict=True):
        k = b.divide(radius, dot(u, v) + 1, "two sides parallel about a vertex")
        b.put(name, (u + v) * k)


def _size(b: Builder, label: str) -> Element:
    return b.param(label, positive=True) if b.frame.keeps_scale else b.number(1)


PLACEMENTS: dict[tuple[str, str], Callable[..., None]] = {
    (SIDES, "triangle"): triangle_by_sides,
    (INCIRCLE, "triangle"): triangle_by_incircle,
    (HALF_ANGLES, "triangle"): triangle_by_half_angles,
    (HALF_ANGLES, "cyclic_quadrilateral"): cyclic_by_half_angles,
    (INCIRCLE, "tangential_quadrilateral"): tangential_by_incircle,
}


# shapes that the Cartesian frame holds by an equation between lengths only: it serves on request
CONSTRAINED = {"tangential_quadrilateral"}


def placed_by(b: Builder, form: str, names: tuple[Pt, ...]) -> bool:
    """Place a sheet's first shape by the frame, if the frame knows how."""
    fn = PLACEMENTS.get((b.frame.kind, form))
    if fn is None or b.comp.points:
        return False
    fn(b, names)
    return True


def kinds_of(form: str) -> list[str]:
    """The frames that know how to place a shape, besides the Cartesian one."""
    return [kind for kind, shape in PLACEMENTS if shape == form]
