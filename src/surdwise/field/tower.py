"""Towers of simple extensions over Q(U), and their elements.

A tower is a chain of generators, each with a monic modulus over what lies below, irreducible
there, so every tower is a field.  A generator also remembers *which real root* it is: the
`positive` one (a length), or `either` (a two-valued meet).  An element is a numerator in the
ring, reduced, over a denominator in Q[U]; it is zero exactly when its numerator is: the zero
test is exact.  Towers grow and never change: a longer one contains the shorter ones, and
elements of both mix freely.
"""

from __future__ import annotations

import random
from collections.abc import Sequence
from dataclasses import dataclass
from fractions import Fraction

from . import ring
from .ring import ONE, ZERO, Poly, Rational

_SEED = 20
_POINTS = 10
_PRIMES = (32749, 32719, 32717, 32713, 32707, 32693, 32687, 32653, 32647, 32633, 32621, 32611)


@dataclass(frozen=True)
class Gen:
    """One step of a tower.

    `modulus` is monic in g_index over the ring below.  `radicand` is set for square roots
    (modulus g^2 - radicand).  With `choice` "positive" the generator stands for the real
    root whose sign is that of `orient` (a polynomial in the parameters); with "either" every
    real root of the modulus is meant.  In both cases `orient` holds the square factors taken out
    of the radicand: at its zeros the figure may be real though the radicand left is negative.
    """

    index: int
    modulus: Poly
    degree: int
    radicand: Poly | None
    choice: str
    orient: Poly
    label: str

    @property
    def slot(self) -> int:
        """Position among the variables of the ring."""
        return ring.gen_slot(self.index)


class Tower:
    """A field Q(U)(g0)(g1)...; see the module.  Build with `Tower()` and the adjoin methods."""

    __slots__ = ("_roots", "gens", "points")

    def __init__(self, gens: tuple[Gen, ...] = (), points: tuple[_Point, ...] | None = None) -> None:
        self.gens = gens
        self.points = points if points is not None else _first_points()
        self._roots: dict[str, Element | None] = {}

    @property
    def degree(self) -> int:
        """Degree over Q(U)."""
        out = 1
        for g in self.gens:
            out *= g.degree
        return out

    # ------------------------------------------------------------------ elements

    def constant(self, value: Fraction | int | Rational) -> Element:
        """A rational number as an element."""
        return Element(self, ring.constant(value), ONE)

    def param(self, k: int) -> Element:
        """A parameter as an element."""
        return Element(self, ring.param(k), ONE)

    def element(self, num: Poly, den: Poly = ONE) -> Element:
        """num/den, reduced; den lies in Q[U] and is not zero."""
        return _normal(self, self.reduce(num), den)

    def reduce(self, p: Poly) -> Poly:
        """Remainder modulo the moduli, from the top step down."""
        if not self.gens:
            return p
        degs = p.degrees()
        for g in reversed(self.gens):
            if degs[g.slot] >= g.degree:
                p = divmod(p, g.modulus)[1]
                degs = p.degrees()
        return p

    def lower(self, count: int) -> Tower:
        """The tower of the first `count` steps."""
        return Tower(self.gens[:count], self.points)

    # ------------------------------------------------------------------ growing

    def adjoin_sqrt(self, radicand: Element, choice: str, label: str) -> tuple[Tower, Element]:
        """Adjoin a square root of a non-square; returns the tower and the root itself.

        With choice "positive" the returned element is the non-negative real root wherever
        the radicand is positive.  Square factors of the radicand in Q[U] and its denominator
        are taken out: sqrt(s^2 d / e) = s sqrt(d e) / e with the sign of the generator chosen
        so that the whole is positive.
        """
        whole = radicand.num * radicand.den
        if ring.has_gens(whole):
            content = ring.content_over_gens(whole)
            scale = _rational_content(whole)
            rest = whole / (content * scale) if not ring.is_constant(content) else whole * (1 / scale)
            s, free = ring.split_square(content * scale)
            rest = rest * free
        else:
            s, rest = ring.split_square(whole)
        k = len(self.gens)
        g = ring.gen(k)
        # where s vanishes the radicand does, whatever the sign of the rest: a place of its own
        orient = s * radicand.den
        step = Gen(k, g * g - rest, 2, rest, choice, orient, label)
        tower = self._extended(step)
        return tower, tower.element(s * g, radicand.den)

    def adjoin_symbol(self, square: Element) -> tuple[Tower, Element]:
        """Adjoin a symbol with a given square without asking whether it is one already: the
        result is a ring, a field only if it was not.  Denominators are taken out."""
        k = len(self.gens)
        g = ring.gen(k)
        whole = self.reduce(square.num * square.den)
        step = Gen(k, g * g - whole, 2, whole, "either", ONE, "symbol")
        tower = Tower((*self.gens, step), self.points)
        return tower, tower.element(g, square.den)

    def adjoin_root(self, coefficients: Sequence[Element], label: str) -> tuple[Tower, Element]:
        """Adjoin a root (any real one) of an irreducible polynomial given by its ascending
        coefficients; degree at least 2.  Degree 2 becomes a square root by completing the square.
        """
        n = len(coefficients) - 1
        lead = coefficients[-1]
        cs = [c / lead for c in coefficients[:-1]]
        if n == 2:
            half = cs[1] / 2
            tower, d = self.adjoin_sqrt(half * half - cs[0], "either", label)
            return tower, d - half
        den = ONE
        for c in cs:
            den = den * (c.den / den.gcd(c.den))
        k = len(self.gens)
        g = ring.gen(k)
        modulus = g**n
        for i, c in enumerate(cs):
            modulus = modulus + c.num * (den / c.den) * den ** (n - 1 - i) * g**i
        step = Gen(k, self.reduce(modulus), n, None, "either", ONE, label)
        tower = self._extended(step)
        return tower, tower.element(g, den)

    def _extended(self, step: Gen) -> Tower:
        points = tuple(q for q in (p.extended(step) for p in self.points) if q is not None)
        return Tower((*self.gens, step), points)

    # ------------------------------------------------------------------ residues

    def residues(self) -> tuple[_Point, ...]:
        """Points of the tower over small prime fields; grown on demand, the same at every run."""
        if len(self.points) < _POINTS:
            rng = random.Random(_SEED + len(self.gens))
            found = list(self.points)
            for _ in range(40 * _POINTS * 2 ** min(len(self.gens), 6)):
                point: _Point | None = _Point.drawn(rng)
                for step in self.gens:
                    point = point.extended(step) if point is not None else None
                if point is not None:
                    found.append(point)
                if len(found) >= _POINTS:
                    break
            self.points = tuple(found)
        return self.points

    def surely_not_square(self, e: Element) -> bool:
        """True is a proof that e is not a square in the tower: at some place of the tower over
        a prime field it is a non-residue.  False says nothing."""
        whole = e.num * e.den
        for p in self.residues():
            r = p.value(whole)
            if r is not None and r != 0 and pow(r, (p.prime - 1) // 2, p.prime) != 1:
                return True
        return False


@dataclass(frozen=True)
class _Point:
    """A homomorphism from (a localisation of) the tower's ring to a prime field."""

    prime: int
    values: tuple[int, ...]

    @staticmethod
    def drawn(rng: random.Random) -> _Point:
        prime = rng.choice(_PRIMES)
        vals = [0] * ring.MAX_GENS + [rng.randrange(prime) for _ in range(ring.MAX_PARAMS)]
        return _Point(prime, tuple(vals))

    def value(self, p: Poly) -> int | None:
        """p at the point, or None where its denominator vanishes there."""
        v = p(*self.values)
        den = int(v.q) % self.prime
        if den == 0:
            return None
        return int(v.p) * pow(den, -1, self.prime) % self.prime

    def extended(self, step: Gen) -> _Point | None:
        """The point continued over one more step, if the step has a root there."""
        if step.radicand is not None:
            d = self.value(step.radicand)
            root = _sqrt_mod(d, self.prime) if d is not None else None
        else:
            root = self._root_of(step)
        if root is None:
            return None
        vals = list(self.values)
        vals[step.slot] = root
        return _Point(self.prime, tuple(vals))

    def _root_of(self, step: Gen) -> int | None:
        from flint import nmod_poly

        cs = [self.value(c) for c in ring.coefficients(step.modulus, step.slot)]
        if any(c is None for c in cs):
            return None
        for f, m in nmod_poly([int(c) for c in cs if c is not None], self.prime).factor()[1]:
            # a multiple root is no place of the tower: squares need not stay residues there
            if f.degree() == 1 and m == 1:
                return int(-f[0] / f[1]) % self.prime
        return None


def _first_points() -> tuple[_Point, ...]:
    rng = random.Random(_SEED)
    return tuple(_Point.drawn(rng) for _ in range(3 * _POINTS))


def _sqrt_mod(a: int, p: int) -> int | None:
    """A non-zero square root modulo a prime, or None (Tonelli, Shanks)."""
    if a % p == 0 or pow(a, (p - 1) // 2, p) != 1:
        return None
    if p % 4 == 3:
        return pow(a, (p + 1) // 4, p)
    q, s = p - 1, 0
    while q % 2 == 0:
        q //= 2
        s += 1
    z = next(z for z in range(2, p) if pow(z, (p - 1) // 2, p) == p - 1)
    m, c, t, r = s, pow(z, q, p), pow(a, q, p), pow(a, (q + 1) // 2, p)
    while t != 1:
        i, t2 = 0, t
        while t2 != 1:
            t2 = t2 * t2 % p
            i += 1
        b = pow(c, 1 << (m - i - 1), p)
        m, c, t, r = i, b * b % p, t * b * b % p, r * b % p
    return r


class Element:
    """An element of a tower: num/den with num reduced and den in Q[U]; arithmetic is exact."""

    __slots__ = ("den", "num", "tower")

    def __init__(self, tower: Tower, num: Poly, den: Poly) -> None:
        self.tower = tower
        self.num = num
        self.den = den

    def is_zero(self) -> bool:
        """Exact: the representation is canonical."""
        return bool(self.num.is_zero())

    def is_rational(self) -> bool:
        """Whether the element is a rational number."""
        return ring.is_constant(self.num) and ring.is_constant(self.den)

    def as_rational(self) -> Rational:
        """The rational number; call only when is_rational()."""
        return ring.value_of(self.num) / ring.value_of(self.den)

    def key(self) -> str:
        """Hashable name, canonical within towers of one chain."""
        return ring.key(self.num) + "|" + ring.key(self.den)

    def __repr__(self) -> str:
        return f"<{self.num}>" if ring.is_constant(self.den) else f"<({self.num})/({self.den})>"

    def _other(self, b: Element | int | Fraction) -> Element:
        return b if isinstance(b, Element) else self.tower.constant(b)

    def __add__(self, b: Element | int | Fraction) -> Element:
        b = self._other(b)
        t = _longer(self, b)
        if self.den == b.den:
            num = self.num + b.num
            return Element(t, num, ONE) if self.den.is_one() else _normal(t, num, self.den)
        return _normal(t, self.num * b.den + b.num * self.den, self.den * b.den)

    __radd__ = __add__

    def __neg__(self) -> Element:
        return Element(self.tower, -self.num, self.den)

    def __sub__(self, b: Element | int | Fraction) -> Element:
        return self + -self._other(b)

    def __rsub__(self, b: int | Fraction) -> Element:
        return self._other(b) + -self

    def __mul__(self, b: Element | int | Fraction) -> Element:
        if not isinstance(b, Element):
            return Element(self.tower, self.num * ring.rational(b), self.den) if b else self.tower.constant(0)
        t = _longer(self, b)
        num = t.reduce(self.num * b.num)
        if self.den.is_one() and b.den.is_one():
            return Element(t, num, ONE)
        return _normal(t, num, self.den * b.den)

    __rmul__ = __mul__

    def __truediv__(self, b: Element | int | Fraction) -> Element:
        if not isinstance(b, Element):
            return Element(self.tower, self.num * ring.rational(Fraction(1) / b), self.den)
        return self * b.inverse()

    def __rtruediv__(self, b: int | Fraction) -> Element:
        return self._other(b) * self.inverse()

    def __pow__(self, n: int) -> Element:
        if n < 0:
            return self.inverse() ** -n
        out = self.tower.constant(1)
        base = self
        while n:
            if n & 1:
                out = out * base
            n >>= 1
            if n:
                base = base * base
        return out

    def inverse(self) -> Element:
        """1/self; raises ZeroDivisionError for zero.  Conjugates for square roots, the
        extended Euclidean algorithm for higher steps."""
        if self.num.is_zero():
            raise ZeroDivisionError("division by zero in the tower")
        t = self.tower
        k = ring.top_gen(self.num)
        if k < 0:
            return _normal(t, self.den, self.num)
        g = t.gens[k]
        if g.radicand is not None:
            a, b = ring.linear_parts(self.num, g.slot)
            x = ring.gen(k)
            below = t.reduce(a * a - b * b * g.radicand)
            return t.element((a - b * x) * self.den) * Element(t, below, ONE).inverse()
        return t.element(self.den) * _inverse_by_euclid(t, self.num, g)


def _longer(a: Element, b: Element) -> Tower:
    return a.tower if len(a.tower.gens) >= len(b.tower.gens) else b.tower


def _normal(t: Tower, num: Poly, den: Poly) -> Element:
    """num/den in lowest terms with a primitive denominator; num is reduced."""
    if num.is_zero():
        return Element(t, ZERO, ONE)
    if ring.is_constant(den):
        c = ring.value_of(den)
        return Element(t, num if c == 1 else num * (1 / c), ONE)
    g = num.gcd(den)
    if not ring.is_constant(g):
        num, den = num / g, den / g
    d = ring.primitive(den)
    scale = den.leading_coefficient() / d.leading_coefficient()
    if scale != 1:
        num = num * (1 / scale)
    return Element(t, num, d if not ring.is_constant(d) else ONE)


def _rational_content(p: Poly) -> Rational:
    """The positive rational content of p."""
    q = ring.primitive(p)
    c = p.leading_coefficient() / q.leading_coefficient()
    return c if c > 0 else -c


def _inverse_by_euclid(t: Tower, num: Poly, g: Gen) -> Element:
    """1/num modulo a general step: extended Euclid over the tower below."""
    r0 = [t.element(c) for c in ring.coefficients(g.modulus, g.slot)]
    r1 = [t.element(c) for c in ring.coefficients(num, g.slot)]
    s0: list[Element] = []
    s1: list[Element] = [t.constant(1)]
    while len(r1) > 1:
        q, rest = poly_divmod(r0, r1)
        r0, r1 = r1, rest
        s0, s1 = s1, poly_sub(s0, poly_mul(q, s1))
    if not r1:
        raise ZeroDivisionError("modulus is not irreducible")
    inv = r1[0].inverse()
    x = t.element(ring.gen(g.index))
    out = t.constant(0)
    for c in reversed(s1):
        out = out * x + c
    return out * inv


# -------------------------------------------------- dense polynomials over a tower, ascending

ElementPoly = list[Element]


def trim(f: ElementPoly) -> ElementPoly:
    """Without zero leading coefficients."""
    while f and f[-1].is_zero():
        f = f[:-1]
    return f


def poly_sub(f: ElementPoly, g: ElementPoly) -> ElementPoly:
    """f - g."""
    n = max(len(f), len(g))
    out = []
    for i in range(n):
        if i >= len(g):
            out.append(f[i])
        elif i >= len(f):
            out.append(-g[i])
        else:
            out.append(f[i] - g[i])
    return trim(out)


def poly_mul(f: ElementPoly, g: ElementPoly) -> ElementPoly:
    """f g."""
    if not f or not g:
        return []
    zero = f[0] * 0
    out = [zero] * (len(f) + len(g) - 1)
    for i, a in enumerate(f):
        for j, b in enumerate(g):
            out[i + j] = out[i + j] + a * b
    return trim(out)


def poly_divmod(f: ElementPoly, g: ElementPoly) -> tuple[ElementPoly, ElementPoly]:
    """Quotient and remainder; g is not zero."""
    f = trim(f)
    inv = g[-1].inverse()
    q: ElementPoly = [inv * 0] * max(len(f) - len(g) + 1, 0)
    while len(f) >= len(g):
        c = f[-1] * inv
        shift = len(f) - len(g)
        q[shift] = c
        f = trim([a - c * g[i - shift] if i >= shift else a for i, a in enumerate(f[:-1])])
    return q, f


def poly_gcd(f: ElementPoly, g: ElementPoly) -> ElementPoly:
    """Monic greatest common divisor by Euclid over the field."""
    f, g = trim(f), trim(g)
    while g:
        f, g = g, poly_divmod(f, g)[1]
    inv = f[-1].inverse()
    return [c * inv for c in f]
