"""Values of quantities and truth of conditions on a drawing, with a margin.

A value comes with its size, the scale on which rounding errors are to be judged.  A truth is 1, 0,
or 9 where the figure is too near to a border to call, or 8 where something is undefined.
"""

from __future__ import annotations

import itertools
from typing import Any

from surdwise.sheet.tree import And, Binary, Comparison, Measure, Not, Number, Or, Relation, Unary

Pair = tuple[Any, Any]
TINY = 1e-300


def cross(a: Any, b: Any) -> Any:
    return a.real * b.imag - a.imag * b.real


def dot(a: Any, b: Any) -> Any:
    return a.real * b.real + a.imag * b.imag


def value(q: Any, g: Any) -> Pair:
    """A quantity and its size; NaN where undefined."""
    ops = g.ops
    if isinstance(q, Number):
        v = ops.number(q.value)
        return v, abs(v)
    if isinstance(q, Measure):
        return _measure(q, g)
    if isinstance(q, Unary):
        x, s = value(q.arg, g)
        if q.op == "neg":
            return -x, s
        if q.op == "abs":
            return abs(x), s
        sg = ops.sign(x, s)
        x = ops.where(sg == 0, 0 * x, x)
        root = ops.sqrt(x)
        return root, ops.where(sg == 1, s / ops.where(sg == 1, root, 1), ops.sqrt(s))
    assert isinstance(q, Binary)
    x, s = value(q.left, g)
    if q.op == "^":
        n = _exponent(q.right)
        if n >= 0:
            return x**n, n * abs(x) ** (n - 1) * s if n else 1 + 0 * s
        x, s = _over(g, (1, 1), (x, s))
        return x ** (-n), -n * abs(x) ** (-n - 1) * s
    y, t = value(q.right, g)
    if q.op == "+":
        return x + y, s + t
    if q.op == "-":
        return x - y, s + t
    if q.op == "*":
        return _times((x, s), (y, t))
    return _over(g, (x, s), (y, t))


def _exponent(q: Any) -> int:
    if isinstance(q, Number):
        return int(q.value)
    assert isinstance(q, Unary) and q.op == "neg"
    return -_exponent(q.arg)


def _over(g: Any, a: Pair, b: Pair) -> Pair:
    (x, s), (y, t) = a, b
    sg = g.ops.sign(y, t + TINY)
    nan = float("nan")
    good = (sg == 1) | (sg == -1)
    safe = g.ops.where(good, y, 1 + 0 * y)
    return g.ops.where(good, x / safe, nan), g.ops.where(good, s / abs(safe) + abs(x) * t / (safe * safe), 1)


def _len(g: Any, a: Any, b: Any) -> Pair:
    return abs(a - b), g.extent()


def _area2(g: Any, a: Any, b: Any, c: Any) -> Pair:
    return cross(b - a, c - a), (abs(b - a) + abs(c - a)) * g.extent() + TINY


def _plus(*xs: Pair) -> Pair:
    return sum(x for x, _s in xs), sum(s for _x, s in xs)


def _minus(a: Pair, b: Pair) -> Pair:
    return a[0] - b[0], a[1] + b[1]


def _times(a: Pair, b: Pair) -> Pair:
    return a[0] * b[0], abs(a[0]) * b[1] + abs(b[0]) * a[1]


def _measure(q: Measure, g: Any) -> Pair:
    p = [g.at(x) for x in q.points]
    kind = q.kind
    if kind == "length":
        return _len(g, p[0], p[1])
    if kind == "dist":
        a, d = g_line(g, q.line)
        size = g.extent() * abs(d) + TINY
        return _over(g, (abs(cross(d, p[0] - a)), size), (abs(d), g.extent()))
    if kind == "area":
        parts = [_area2(g, p[0], p[i], p[i + 1]) for i in range(1, len(p) - 1)]
        x, s = _plus(*parts)
        return abs(x) / 2, s / 2
    if kind == "perimeter":
        return _plus(*(_len(g, p[i], p[(i + 1) % len(p)]) for i in range(len(p))))
    if kind in ("cos", "sin"):
        b, a, c = p
        both = _times(_len(g, a, b), _len(g, a, c))
        if kind == "cos":
            return _over(g, (dot(b - a, c - a), both[1]), both)
        x, s = _area2(g, a, b, c)
        return _over(g, (abs(x), both[1]), both)
    a, b, c = p[:3]
    if len(p) == 4:
        i = [str(x) for x in q.points[:3]].index(str(q.points[3]))
        a, b, c = p[i], p[(i + 1) % 3], p[(i + 2) % 3]
    la, lb, lc = _len(g, b, c), _len(g, c, a), _len(g, a, b)
    x, s = _area2(g, a, b, c)
    twice = abs(x), s
    if kind == "circumradius":
        top = _times(la, _times(lb, lc))
        return _over(g, top, (2 * twice[0], 2 * s))
    if kind == "inradius":
        return _over(g, twice, _plus(la, lb, lc))
    if kind == "exradius":
        return _over(g, twice, _minus(_plus(lb, lc), la))
    if kind == "median":
        return abs(a - (b + c) / 2), g.extent()
    if kind == "altitude":
        return _over(g, twice, la)
    assert kind == "bisector"
    # to the point that divides the side in the ratio of the sides at a; flat angles included
    w = lb[0] + lc[0]
    sg = g.ops.sign(lb[0], lb[1]) * g.ops.sign(lc[0], lc[1])
    foot = (b * lb[0] + c * lc[0]) / g.ops.where(w > 0, w, 1)
    return g.ops.where(sg == 1, abs(a - foot), float("nan")), g.extent()


def g_line(g: Any, line: Any) -> Pair:
    """A line without asking that it exists; direction 0 makes quantities undefined."""
    if hasattr(line, "points"):
        a, b = (g.at(x) for x in line.points)
        return a, b - a
    _kind, a, d = g.curves[line.name]
    return a, d


# ---------------------------------------------------------------- truth


def truth(c: Any, g: Any) -> Any:
    """1, 0, 9 (too near to call) or 8 (undefined)."""
    ops = g.ops
    if isinstance(c, Not):
        return deny(truth(c.arg, g), ops)
    if isinstance(c, And | Or):
        out = truth(c.args[0], g)
        for x in c.args[1:]:
            out = (both if isinstance(c, And) else either)(out, truth(x, g), ops)
        return out
    if isinstance(c, Comparison):
        values = [value(q, g) for q in c.items]
        result: Any = None
        for i, op in enumerate(c.ops):
            (x, s), (y, t) = values[i], values[i + 1]
            sg = ops.sign(x - y, s + t + TINY)
            one = called(sg, _matches(sg, op), ops)
            result = one if result is None else both(result, one, ops)
        return result
    assert isinstance(c, Relation)
    return TRUTHS[c.form](g, *c.args)


def _matches(s: Any, op: str) -> Any:
    return {
        "=": s == 0,
        "<": s == -1,
        ">": s == 1,
        "<=": (s == -1) | (s == 0),
        ">=": (s == 1) | (s == 0),
    }[op]


def called(s: Any, yes: Any, ops: Any) -> Any:
    return ops.where(s >= 8, s, ops.where(yes, 1, 0))


def deny(a: Any, ops: Any) -> Any:
    return ops.where(a >= 8, a, 1 - a)


def both(a: Any, b: Any, ops: Any) -> Any:
    return ops.where((a == 0) | (b == 0), 0, ops.larger(a, b))


def either(a: Any, b: Any, ops: Any) -> Any:
    return ops.where((a == 1) | (b == 1), 1, ops.larger(a, b))


def turn(g: Any, a: Any, b: Any, c: Any) -> Any:
    """Sign of the orientation of three points."""
    return g.ops.sign(*_area2(g, a, b, c))


def lean(g: Any, a: Any, b: Any, c: Any) -> Any:
    """Sign of the scalar product of b - a and c - a."""
    return g.ops.sign(dot(b - a, c - a), (abs(b - a) + abs(c - a)) * g.extent() + TINY)


def same(g: Any, a: Any, b: Any) -> Any:
    s = g.ops.sign(*_len(g, a, b))
    return called(s, s == 0, g.ops)


def _all(g: Any, parts: list[Any]) -> Any:
    out = parts[0]
    for p in parts[1:]:
        out = both(out, p, g.ops)
    return out


def _zero(g: Any, s: Any) -> Any:
    return called(s, s == 0, g.ops)


def _collinear(g: Any, names: Any) -> Any:
    p = [g.at(x) for x in names]
    n = len(p)
    return _all(
        g, [_zero(g, turn(g, p[i], p[j], p[k])) for i in range(n) for j in range(i) for k in range(j)]
    )


def _concyclic(g: Any, names: Any) -> Any:
    """On some circle; coinciding points count once.  Three that are not in line decide the circle; where
    no three are, two of every three must coincide."""
    p = [g.at(x) for x in names]
    triples = list(itertools.combinations(p, 3))
    out = _all(
        g, [either(either(same(g, a, b), same(g, b, c), g.ops), same(g, a, c), g.ops) for a, b, c in triples]
    )
    for base in reversed(triples):
        flat = turn(g, *base)
        on = _on_circle_of(g, base, p)
        out = g.ops.where(flat == 0, out, g.ops.where(flat >= 8, flat, on))
    return out


def _on_circle_of(g: Any, base: Any, rest: Any) -> Any:
    """On the circle through three points; false where they are in line."""
    a, b, c = base
    flat = turn(g, a, b, c)
    u, v = b - a, c - a
    w = 2 * cross(u, v)
    w = g.ops.where(flat == 0, 1 + 0 * w, w)
    uu, vv = dot(u, u), dot(v, v)
    o = a + (v.imag * uu - u.imag * vv) / w + 1j * ((u.real * vv - v.real * uu) / w)
    r2 = dot(a - o, a - o)
    parts = []
    for x in rest:
        y2 = dot(x - o, x - o)
        parts.append(_zero(g, g.ops.sign(y2 - r2, y2 + r2 + dot(o, o) + TINY)))
    out = _all(g, parts)
    return g.ops.where(flat == 0, 0, g.ops.where(flat >= 8, flat, out))


def _directions(g: Any, one: Any, two: Any, what: Any) -> Any:
    (_p, d), (_q, e) = g_line(g, one), g_line(g, two)
    null = (g.ops.sign(abs(d), g.extent()) != 1) | (g.ops.sign(abs(e), g.extent()) != 1)
    s = g.ops.sign(what(d, e), abs(d) * abs(e) + TINY)
    return g.ops.where(null, 8, _zero(g, s))


def _between(g: Any, c: Any, a: Any, b: Any) -> Any:
    c, a, b = g.at(c), g.at(a), g.at(b)
    s = lean(g, c, a, b)
    return both(_zero(g, turn(g, a, b, c)), called(s, s == -1, g.ops), g.ops)


def _inside(g: Any, p: Any, tri: Any) -> Any:
    z = g.at(p)
    a, b, c = (g.at(x) for x in tri)
    whole = turn(g, a, b, c)
    parts = [called(whole, whole != 0, g.ops)]
    for x, y in ((a, b), (b, c), (c, a)):
        s = turn(g, x, y, z)
        parts.append(called(g.ops.larger(s, whole), s * whole == 1, g.ops))
    return _all(g, parts)


def _outside(g: Any, p: Any, tri: Any) -> Any:
    z = g.at(p)
    a, b, c = (g.at(x) for x in tri)
    whole = turn(g, a, b, c)
    out: Any = None
    for x, y in ((a, b), (b, c), (c, a)):
        s = turn(g, x, y, z)
        one = called(g.ops.larger(s, whole), s * whole == -1, g.ops)
        out = one if out is None else either(out, one, g.ops)
    return out


def _offset(g: Any, p: Any, line: Any) -> Any:
    a, d = g_line(g, line)
    z = g.at(p)
    return g.ops.sign(cross(d, z - a), g.extent() * abs(d) + TINY)


def _sides(sign: int) -> Any:
    def check(g: Any, p: Any, q: Any, line: Any) -> Any:
        s, t = _offset(g, p, line), _offset(g, q, line)
        out = called(g.ops.larger(s, t), s * t == sign, g.ops)
        return g.ops.where((s == 0) | (t == 0), 0, out)

    return check


_SIZES = {"acute": 1, "right": 0, "obtuse": -1}


def _angle(g: Any, triple: Any, size: str) -> Any:
    b, a, c = (g.at(x) for x in triple)
    s = lean(g, a, b, c)
    out = called(s, s == _SIZES[size], g.ops)
    null = either(same(g, a, b), same(g, a, c), g.ops)
    return g.ops.where(null == 0, out, g.ops.where(null == 1, 8, null))


def _triangle(g: Any, tri: Any, size: str) -> Any:
    a, b, c = tri
    parts = [_angle(g, t, size) for t in ((c, a, b), (a, b, c), (b, c, a))]
    if size == "acute":
        return _all(g, parts)
    return either(either(parts[0], parts[1], g.ops), parts[2], g.ops)


def _convex(g: Any, quad: Any) -> Any:
    v = [g.at(x) for x in quad]
    n = len(v)
    s = [turn(g, v[i], v[(i + 1) % n], v[(i + 2) % n]) for i in range(n)]
    parts = [called(s[0], s[0] != 0, g.ops)]
    parts += [called(g.ops.larger(s[0], x), s[0] == x, g.ops) for x in s[1:]]
    return _all(g, parts)


def _distinct(g: Any, names: Any) -> Any:
    p = [g.at(x) for x in names]
    return _all(g, [deny(same(g, p[i], p[j]), g.ops) for i in range(len(p)) for j in range(i)])


def _on_line(g: Any, p: Any, line: Any) -> Any:
    return _zero(g, _offset(g, p, line))


def _on_segment(g: Any, p: Any, pair: Any) -> Any:
    a, b, c = g.at(pair[0]), g.at(pair[1]), g.at(p)
    s = lean(g, c, a, b)
    inner = both(_zero(g, turn(g, a, b, c)), called(s, (s == -1) | (s == 0), g.ops), g.ops)
    return either(either(same(g, a, c), same(g, b, c), g.ops), inner, g.ops)


def _on_ray(g: Any, p: Any, pair: Any) -> Any:
    a, b, c = g.at(pair[0]), g.at(pair[1]), g.at(p)
    s = lean(g, a, c, b)
    inner = both(_zero(g, turn(g, a, b, c)), called(s, (s == 1) | (s == 0), g.ops), g.ops)
    return either(same(g, a, c), inner, g.ops)


def _on_circle(g: Any, p: Any, k: Any) -> Any:
    if hasattr(k, "points"):
        return _on_circle_of(g, [g.at(x) for x in k.points], [g.at(p)])
    _kind, o, r2 = g.curves[k.name]
    y2 = dot(g.at(p) - o, g.at(p) - o)
    return _zero(g, g.ops.sign(y2 - r2, y2 + r2 + dot(o, o) + TINY))


def _equal(g: Any, a: Any, b: Any, c: Any, d: Any) -> Any:
    s = g.ops.sign(abs(a - b) - abs(c - d), g.extent())
    return _zero(g, s)


def _is_equilateral(g: Any, tri: Any) -> Any:
    a, b, c = (g.at(x) for x in tri)
    return both(_equal(g, a, b, b, c), _equal(g, b, c, c, a), g.ops)


def _is_isosceles(g: Any, tri: Any, apex: Any) -> Any:
    b, c = (g.at(x) for x in tri if x.name != apex.name)
    return _equal(g, g.at(apex), b, g.at(apex), c)


TRUTHS: dict[str, Any] = {
    "collinear": _collinear,
    "concyclic": _concyclic,
    "parallel_lines": lambda g, x, y: _directions(g, x, y, cross),
    "perpendicular_lines": lambda g, x, y: _directions(g, x, y, dot),
    "between": _between,
    "inside": _inside,
    "outside": _outside,
    "same_side": _sides(1),
    "opposite_sides": _sides(-1),
    "angle_size": _angle,
    "triangle_size": _triangle,
    "convex": _convex,
    "distinct": _distinct,
    "on_line": _on_line,
    "on_segment": _on_segment,
    "on_ray": _on_ray,
    "on_circle": _on_circle,
    "is_equilateral": _is_equilateral,
    "is_isosceles": _is_isosceles,
}
