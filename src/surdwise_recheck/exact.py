"""Exact real numbers: expressions of rationals, + - * /, square roots and real roots of polynomials.

A sign is read off a dyadic interval as soon as that excludes 0.  That a number is 0 is proved by a separation
bound (Burnikel, Funke, Mehlhorn, Schirra, Schmitt, "A separation bound for real algebraic expressions",
2001).

Lemma.  Write each expression as U/L by the rules U1/L1 +- U2/L2 = (U1 L2 +- U2 L1)/(L1 L2), likewise for *
and /, sqrt(U/L) = sqrt(U L)/L or U/sqrt(U L), and a root of a polynomial with integers a_n, ..., a_0 as
(a_n root)/a_n.  Then U and L are algebraic integers: sums, products and square roots of such, and a_n root
is one.  They lie in the field that the roots generate, so their degree is at most D, the product of 2 for
every square root and n for every polynomial root in the expression.  All conjugates of U and L are at most
u and l, by the same rules with + for - and bounds for the roots.  If U is not 0 its norm is a non-zero
integer, so |U| >= u^(1-D), and |U/L| >= u^(1-D)/l.
"""

from __future__ import annotations

import time
from collections.abc import Callable
from dataclasses import dataclass
from fractions import Fraction
from math import isqrt

from .exact_roots import Coefficients, RealRoot, log16, root_bound_log16
from .protocol import Num, Undefined

_TRIED = 1 << 13  # bits spent on a sign that cannot be proved to be 0
_SMALL = 1000  # squares of numbers up to here are taken out of a root


class OutOfReach(Exception):
    """A sign that is not settled within the limits."""


@dataclass(frozen=True)
class Limits:
    """Bits of precision, and seconds for one task."""

    bits: int = 400_000
    seconds: float = 60.0


class _Coarse(Exception):
    """The precision does not tell a divisor from 0 yet."""


class Real:
    """A node of an expression.  Made by its `Reals`, which keeps equal nodes as one."""

    __slots__ = ("args", "box", "known", "l", "op", "root", "roots", "serial", "u", "value", "world")

    def __init__(self, world: Reals, op: str, args: tuple[Real, ...]) -> None:
        self.world = world
        self.op = op
        self.args = args
        self.value: Fraction | None = None
        self.root: RealRoot | None = None
        self.box: tuple[int, int, int] = (-1, 0, 0)  # precision and enclosure
        self.known: int | None = None  # sign
        self.serial = 0
        self.u = self.l = 0  # 16 log2 of the bounds of the lemma
        self.roots: frozenset[Real] = frozenset().union(*(a.roots for a in args)) if args else frozenset()

    def __add__(self, other: Num | int | Fraction) -> Real:
        return self.world.add(self, self.world.real(other))

    def __radd__(self, other: Num | int | Fraction) -> Real:
        return self.world.add(self.world.real(other), self)

    def __sub__(self, other: Num | int | Fraction) -> Real:
        return self.world.add(self, -self.world.real(other))

    def __rsub__(self, other: Num | int | Fraction) -> Real:
        return self.world.add(self.world.real(other), -self)

    def __mul__(self, other: Num | int | Fraction) -> Real:
        return self.world.multiply(self, self.world.real(other))

    def __rmul__(self, other: Num | int | Fraction) -> Real:
        return self.world.multiply(self.world.real(other), self)

    def __neg__(self) -> Real:
        return self.world.negative(self)

    def degree(self) -> int:
        """The bound D of the lemma."""
        d = 1
        for r in self.roots:
            d *= len(r.root.p) - 1 if r.root is not None else 2
        return d


class Reals:
    """An arithmetic of exact real numbers (an `Arithmetic` of protocol.py)."""

    def __init__(self, limits: Limits | None = None) -> None:
        self.limits = limits or Limits()
        self._end = time.monotonic() + self.limits.seconds
        self._nodes: dict[tuple[object, ...], Real] = {}
        self._rules: dict[str, Callable[[Real, int], tuple[int, int]]] = {
            "q": self._box_rational,
            "+": self._box_sum,
            "neg": self._box_negative,
            "*": self._box_product,
            "/": self._box_quotient,
            "sqrt": self._box_sqrt,
            "root": self._box_root,
        }

    # ------------------------------------------------------------ building

    def number(self, value: int | Fraction) -> Real:
        """A rational number."""
        q = Fraction(value)
        key: tuple[object, ...] = ("q", q)
        if key not in self._nodes:
            e = Real(self, "q", ())
            e.value = q
            e.u, e.l = log16(max(abs(q.numerator), 1)), log16(q.denominator)
            e.known = (q > 0) - (q < 0)
            self._enter(key, e)
        return self._nodes[key]

    def real(self, x: Num | int | Fraction) -> Real:
        """A number of this arithmetic from one that may be plain."""
        if isinstance(x, Real):
            return x
        if isinstance(x, (int, Fraction)):
            return self.number(x)
        raise TypeError(f"expected a real number, got {type(x).__name__}")

    def _enter(self, key: tuple[object, ...], e: Real) -> None:
        e.serial = len(self._nodes)
        self._nodes[key] = e

    def _node(self, op: str, *args: Real) -> Real:
        key: tuple[object, ...] = (op, *(a.serial for a in args))
        e = self._nodes.get(key)
        if e is None:
            e = Real(self, op, args)
            a, b = args[0], args[-1]
            if op == "+":
                e.u, e.l = _log_sum(a.u + b.l, a.l + b.u), a.l + b.l
            elif op == "*":
                e.u, e.l = a.u + b.u, a.l + b.l
            elif op == "/":
                e.u, e.l = a.u + b.l, a.l + b.u
            elif op == "neg":
                e.u, e.l = a.u, a.l
            elif a.u >= a.l:
                e.u, e.l = (a.u + a.l + 1) // 2, a.l
            else:
                e.u, e.l = a.u, (a.u + a.l + 1) // 2
            if op == "sqrt":
                e.roots |= {e}
            self._enter(key, e)
        return e

    def add(self, a: Real, b: Real) -> Real:
        """a + b."""
        if a.value is not None and b.value is not None:
            return self.number(a.value + b.value)
        if a.value == 0:
            return b
        if b.value == 0:
            return a
        if (a.op == "neg" and a.args[0] is b) or (b.op == "neg" and b.args[0] is a):
            return self.number(0)
        return self._node("+", *sorted((a, b), key=lambda e: e.serial))

    def negative(self, a: Real) -> Real:
        """-a."""
        if a.value is not None:
            return self.number(-a.value)
        return a.args[0] if a.op == "neg" else self._node("neg", a)

    def multiply(self, a: Real, b: Real) -> Real:
        """a b."""
        if a.value is not None and b.value is not None:
            return self.number(a.value * b.value)
        for x, y in ((a, b), (b, a)):
            if x.value == 0:
                return x
            if x.value is not None and abs(x.value) == 1:
                return y if x.value > 0 else -y
        if a is b and a.op == "sqrt":
            return a.args[0]
        return self._node("*", *sorted((a, b), key=lambda e: e.serial))

    def polynomial_root(self, p: Coefficients, index: int) -> Real:
        """The real root with `index` real roots to its left.  ValueError where there is none."""
        key: tuple[object, ...] = ("root", p, index)
        if key not in self._nodes:
            root = RealRoot(p, index)
            if root.rational is not None:
                return self.number(root.rational)
            e = Real(self, "root", ())
            e.root = root
            lead = log16(abs(root.p[-1]))
            e.u, e.l = lead + max(root_bound_log16(root.p), 0), lead
            e.roots = frozenset({e})
            self._enter(key, e)
        return self._nodes[key]

    # ------------------------------------------------------------ the arithmetic

    def divide(self, a: Num, b: Num, words: str) -> Real:
        """a/b; Undefined where b is 0."""
        x, y = self.real(a), self.real(b)
        if self.sign(y) == 0:
            raise Undefined(words)
        if y.value is not None:
            return self.multiply(x, self.number(1 / y.value))
        return x if x.value == 0 else self._node("/", x, y)

    def root(self, q: Num) -> Real:
        """The square root that is not negative; Undefined where q < 0."""
        x = self.real(q)
        s = self.sign(x)
        if s < 0:
            raise Undefined("a square root of a negative number")
        if s == 0:
            return self.number(0)
        if x.value is None:
            if x.op == "*" and x.args[0] is x.args[1]:
                return self.absolute(x.args[0])
            return self._node("sqrt", x)
        n, d = x.value.numerator, x.value.denominator
        outside, inside = _square_part(n * d)
        factor = self.number(Fraction(outside, d))
        return factor if inside == 1 else self.multiply(factor, self._node("sqrt", self.number(inside)))

    def absolute(self, e: Num) -> Real:
        """|e|."""
        x = self.real(e)
        return -x if self.sign(x) < 0 else x

    def sign(self, e: Num) -> int:
        """-1, 0 or 1, proved.  OutOfReach where the limits do not allow it."""
        x = self.real(e)
        if x.known is None:
            x.known = self._prove_sign(x)
        return x.known

    def weak_sign(self, e: Num) -> int:
        """The same."""
        return self.sign(e)

    def zero(self, e: Num) -> bool:
        """Whether e is 0."""
        return self.sign(e) == 0

    def same(self, e: Num) -> bool:
        """Whether e is 0."""
        return self.sign(e) == 0

    def _prove_sign(self, x: Real) -> int:
        separation = None
        p = 64
        while True:
            try:
                lo, hi = self._enclose(x, p)
            except _Coarse:
                pass
            else:
                if lo > 0 or hi < 0:
                    return 1 if lo > 0 else -1
                if separation is None:
                    separation = (x.degree() - 1) * max(x.u, 0) + max(x.l, 0)
                    separation = separation // 16 + 2
                if p >= separation and max(-lo, hi) < 1 << (p - separation):
                    return 0
            p *= 2
            if separation is not None and p > separation and p // 2 < separation:
                p = separation + 64
            hopeless = separation is not None and separation > self.limits.bits
            if p > (min(self.limits.bits, _TRIED) if hopeless else self.limits.bits):
                raise OutOfReach(f"a sign needs up to {separation} bits")

    # ------------------------------------------------------------ enclosures

    def _enclose(self, x: Real, p: int) -> tuple[int, int]:
        """Integers lo <= 2^p x <= hi, by interval arithmetic in order of the nodes."""
        stack = [x]
        while stack:
            e = stack[-1]
            if e.box[0] >= p:
                stack.pop()
                continue
            todo = [a for a in e.args if a.box[0] < p]
            if todo:
                stack += todo
                continue
            if time.monotonic() > self._end:
                raise OutOfReach(f"more than {self.limits.seconds} seconds")
            e.box = (p, *self._rules[e.op](e, p))
            stack.pop()
        return self._at(x, p)

    def _at(self, e: Real, p: int) -> tuple[int, int]:
        drop = e.box[0] - p
        return e.box[1] >> drop, -((-e.box[2]) >> drop)

    def _box_rational(self, e: Real, p: int) -> tuple[int, int]:
        assert e.value is not None
        n = e.value.numerator << p
        return n // e.value.denominator, -(-n // e.value.denominator)

    def _box_sum(self, e: Real, p: int) -> tuple[int, int]:
        a, b = (self._at(x, p) for x in e.args)
        return a[0] + b[0], a[1] + b[1]

    def _box_negative(self, e: Real, p: int) -> tuple[int, int]:
        lo, hi = self._at(e.args[0], p)
        return -hi, -lo

    def _box_product(self, e: Real, p: int) -> tuple[int, int]:
        a, b = (self._at(x, p) for x in e.args)
        ends = (a[0] * b[0],) if a[0] == a[1] and b[0] == b[1] else tuple(x * y for x in a for y in b)
        return min(ends) >> p, -((-max(ends)) >> p)

    def _box_quotient(self, e: Real, p: int) -> tuple[int, int]:
        a, b = (self._at(x, p) for x in e.args)
        if b[0] <= 0 <= b[1]:
            raise _Coarse
        floors = [(x << p) // y for x in a for y in b]
        return min(floors), max(floors) + 1

    def _box_sqrt(self, e: Real, p: int) -> tuple[int, int]:
        lo, hi = self._at(e.args[0], p)
        top = hi << p
        r = isqrt(top)
        return isqrt(max(lo, 0) << p), r + (r * r < top)

    def _box_root(self, e: Real, p: int) -> tuple[int, int]:
        assert e.root is not None
        return e.root.enclosure(p)


def _log_sum(a: int, b: int) -> int:
    """16 log2 of a sum from 16 log2 of its two terms, rounded up."""
    gap = abs(a - b) // 16
    return max(a, b) + (16, 10, 6, 3, 2)[gap] if gap < 5 else max(a, b) + 1


def _square_part(n: int) -> tuple[int, int]:
    """n = outside^2 inside, as far as small factors and a whole square tell."""
    r = isqrt(n)
    if r * r == n:
        return r, 1
    outside, k = 1, 2
    while k <= _SMALL and k * k <= n:
        while n % (k * k) == 0:
            n //= k * k
            outside *= k
        k += 1
    r = isqrt(n)
    return (outside * r, 1) if r * r == n else (outside, n)
