"""Real roots of square-free integer polynomials, numbered from the left and enclosed to any precision.

Numbering by Sturm's theorem; enclosures by quadratic interval refinement (Abbott 2006): the interval is cut
in 2^k parts, the secant's part is tried, k doubles on success and halves on failure.  All in integers.
"""

from __future__ import annotations

from fractions import Fraction
from itertools import pairwise
from math import gcd

Coefficients = tuple[int, ...]  # lowest first, the last one not zero


def _primitive(p: list[int]) -> list[int]:
    g = gcd(*p) if p else 1
    return [c // g for c in p] if g > 1 else p


def _remainder(p: list[int], q: list[int]) -> list[int]:
    """A positive multiple of the remainder of p by q."""
    p = list(p)
    lead = q[-1]
    while len(p) >= len(q):
        head = p[-1]
        factor = abs(lead)
        top = head if lead > 0 else -head
        shift = len(p) - len(q)
        p = [c * factor for c in p]
        for i, c in enumerate(q):
            p[shift + i] -= top * c
        p.pop()
        while p and p[-1] == 0:
            p.pop()
        p = _primitive(p)
    return p


def sturm_sequence(p: Coefficients) -> list[list[int]]:
    """p, p' and the negated remainders, each up to a positive factor."""
    seq = [list(p), _primitive([i * c for i, c in enumerate(p)][1:])]
    while True:
        r = _remainder(seq[-2], seq[-1])
        if not r:
            return seq
        seq.append([-c for c in r])


def sign_at(p: Coefficients | list[int], m: int, s: int) -> int:
    """Sign of p at m / 2^s, by Horner's rule in truncated numbers and, where these leave it open, in full."""
    guard = 64 + max(abs(m).bit_length() - s, 1) * len(p)
    w = s + guard
    lo = hi = 0
    for c in reversed(p):
        a, b = lo * m, hi * m
        if m < 0:
            a, b = b, a
        lo, hi = (a >> s) + (c << w), -((-b) >> s) + (c << w)
    if lo > 0 or hi < 0:
        return 1 if lo > 0 else -1
    total, scale = 0, 1
    for c in reversed(p):
        total = total * m + c * scale
        scale <<= s
    return (total > 0) - (total < 0)


def _variations(seq: list[list[int]], m: int, s: int) -> int:
    signs = [x for x in (sign_at(p, m, s) for p in seq) if x]
    return sum(1 for a, b in pairwise(signs) if a != b)


def root_bound_log16(p: Coefficients) -> int:
    """16 log2 of a bound of all complex roots, rounded up: 2 max |a_(n-k) / a_n|^(1/k) (Fujiwara 1916)."""
    n = len(p) - 1
    lead = log16_below(abs(p[-1]))
    parts = [-((lead - log16(abs(p[n - k]))) // k) for k in range(1, n + 1) if p[n - k]]
    return 16 + max(parts, default=0)


def log16(n: int) -> int:
    """16 log2 n, rounded up, for n >= 1."""
    shift = max(n.bit_length() - 64, 0)
    top = (n >> shift) + (1 if shift else 0)
    return 16 * shift + (top**16 - 1).bit_length() if top > 1 else 16 * shift


def log16_below(n: int) -> int:
    """16 log2 n, rounded down, for n >= 1."""
    shift = max(n.bit_length() - 64, 0)
    return 16 * shift + ((n >> shift) ** 16).bit_length() - 1


class RealRoot:
    """The root of a square-free polynomial that has `index` real roots to its left.

    `rational` is its value where the search meets it; else p changes sign in the enclosure.
    Raises ValueError where there is no such root, or the polynomial is not square-free.
    """

    def __init__(self, p: Coefficients, index: int) -> None:
        self.p = tuple(_primitive(list(p)))
        self.rational: Fraction | None = None
        if len(p) < 2:
            raise ValueError("a polynomial without roots")
        if len(p) == 2 and index == 0:
            self.rational = Fraction(-p[0], p[1])
            return
        seq = sturm_sequence(self.p)
        if len(seq[-1]) > 1:
            raise ValueError("a polynomial that is not square-free")
        k = max(root_bound_log16(self.p) // 16 + 1, 0)
        lo, hi, s = -1 << k, 1 << k, 0
        left = _variations(seq, lo, 0)
        count = left - _variations(seq, hi, 0)
        if not 0 <= index < count:
            raise ValueError(f"a polynomial with {count} real roots has no root number {index}")
        below, above = 0, count
        while above - below > 1 or sign_at(self.p, lo, s) == 0:
            lo, hi, s = 2 * lo, 2 * hi, s + 1
            mid = (lo + hi) // 2
            here = left - _variations(seq, mid, s)
            if here <= index:
                lo, below = mid, here
            else:
                hi, above = mid, here
        if sign_at(self.p, hi, s) == 0:
            self.rational = Fraction(hi, 1 << s)
        self._lo, self._hi, self._s = lo, hi, s
        self._step = 2

    def enclosure(self, precision: int) -> tuple[int, int]:
        """Integers a <= b with a <= 2^precision root <= b, at most two apart."""
        if self.rational is not None:
            n = self.rational.numerator << precision
            return n // self.rational.denominator, -(-n // self.rational.denominator)
        # up to here the interval may be wide: its width becomes 2^-s
        while self.rational is None and (self._hi - self._lo > 1 or self._s < precision):
            self._refine(precision)
        if self.rational is not None:
            return self.enclosure(precision)
        drop = self._s - precision
        return self._lo >> drop, -((-self._hi) >> drop)

    def _refine(self, precision: int) -> None:
        lo, hi, s = self._lo, self._hi, self._s
        width = hi - lo
        if width > 1:
            self._halve()
            return
        k = min(self._step, max(precision - s, 1))
        lo, s = lo << k, s + k
        hi = lo + (1 << k)
        fa, fb = self._value(lo, s), self._value(hi, s)
        j = (fa << k) // (fa - fb) if fa != fb else 0
        j = min(max(j, 0), (1 << k) - 1)
        for cell in (j, j - 1, j + 1):
            if 0 <= cell < 1 << k and self._changes(lo + cell, s):
                self._lo, self._hi, self._s = lo + cell, lo + cell + 1, s
                self._step = min(2 * self._step, 1 << 22)
                return
            if self.rational is not None:
                return
        self._step = max(self._step // 2, 1)
        if self._step == 1:
            self._halve()

    def _value(self, m: int, s: int) -> int:
        """p at m / 2^s, times some power of two, roughly (for the secant only)."""
        w = 2 * s + 64 * len(self.p)
        total = 0
        for c in reversed(self.p):
            total = ((total * m) >> s) + (c << w)
        return total

    def _changes(self, m: int, s: int) -> bool:
        a, b = sign_at(self.p, m, s), sign_at(self.p, m + 1, s)
        for x, at in ((a, m), (b, m + 1)):
            if x == 0:
                self.rational = Fraction(at, 1 << s)
                return False
        return a != b

    def _halve(self) -> None:
        lo, hi, s = 2 * self._lo, 2 * self._hi, self._s + 1
        mid = (lo + hi) // 2
        here = sign_at(self.p, mid, s)
        if here == 0:
            self.rational = Fraction(mid, 1 << s)
        elif here == sign_at(self.p, lo, s):
            lo = mid
        else:
            hi = mid
        if lo % 2 == 0 and hi % 2 == 0 and s > 0:
            lo, hi, s = lo // 2, hi // 2, s - 1
        self._lo, self._hi, self._s = lo, hi, s
