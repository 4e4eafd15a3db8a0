"""Exact real numbers from text: integers, + - * / ** ^, sqrt(...), CRootOf(polynomial in x, index).

CRootOf numbers the real roots of a square-free polynomial from 0 on, the smallest first.
"""

from __future__ import annotations

import re
from collections.abc import Callable

from .exact import Real, Reals
from .protocol import Undefined

LONGEST = 400_000  # characters
DEEPEST = 100
HIGHEST = 400  # exponent and degree
_TOKEN = re.compile(r"\s*(?:(\d+)|(\*\*|[-+*/^(),])|(sqrt|CRootOf|x))")


class BadNumber(Exception):
    """A text that is no exact real number."""


class _Reader:
    def __init__(self, text: str, reals: Reals) -> None:
        if len(text) > LONGEST:
            raise BadNumber(f"more than {LONGEST} characters")
        self.reals = reals
        self.tokens: list[str] = []
        self.at = 0
        self.depth = 0
        end = 0
        while end < len(text.rstrip()):
            m = _TOKEN.match(text, end)
            if m is None:
                raise BadNumber(f"expected a number, got {text[end : end + 20]!r}")
            self.tokens.append(m.group().strip())
            end = m.end()

    def skip(self, *signs: str) -> str:
        """Take one of the signs if it is next."""
        if self.at < len(self.tokens) and self.tokens[self.at] in signs:
            self.at += 1
            return self.tokens[self.at - 1]
        return ""

    def need(self, sign: str) -> None:
        if not self.skip(sign):
            raise self.wrong(f"`{sign}`")

    def wrong(self, expected: str) -> BadNumber:
        got = self.tokens[self.at] if self.at < len(self.tokens) else "the end"
        return BadNumber(f"expected {expected}, got {got[:20]}")

    def natural(self) -> int:
        if self.at == len(self.tokens) or not self.tokens[self.at].isdecimal():
            raise self.wrong("a whole number")
        self.at += 1
        return int(self.tokens[self.at - 1])

    def exponent(self) -> int:
        closed = self.skip("(")
        n = -self.natural() if self.skip("-") else self.natural()
        if closed:
            self.need(")")
        if abs(n) > HIGHEST:
            raise BadNumber(f"an exponent above {HIGHEST}")
        return n

    # ------------------------------------------------------------ numbers

    def sum(self) -> Real:
        self.depth += 1
        if self.depth > DEEPEST:
            raise BadNumber(f"more than {DEEPEST} levels")
        total = self.reals.number(0)
        sign = self.skip("+", "-") or "+"
        while sign:
            p = self.product()
            total = total + p if sign == "+" else total - p
            sign = self.skip("+", "-")
        self.depth -= 1
        return total

    def product(self) -> Real:
        p = self.power()
        while sign := self.skip("*", "/"):
            q = self.power()
            p = p * q if sign == "*" else self.reals.divide(p, q, "a division by 0")
        return p

    def power(self) -> Real:
        if self.skip("-"):
            return -self.power()
        x = self.atom()
        if not self.skip("**", "^"):
            return x
        n = self.exponent()
        out = self.reals.number(1)
        for _ in range(abs(n)):
            out = out * x
        return out if n >= 0 else self.reals.divide(self.reals.number(1), out, "a division by 0")

    def atom(self) -> Real:
        if self.skip("("):
            x = self.sum()
        elif self.skip("sqrt"):
            self.need("(")
            x = self.reals.root(self.sum())
        elif self.skip("CRootOf"):
            self.need("(")
            p = self.polynomial()
            self.need(",")
            index = self.natural()
            try:
                x = self.reals.polynomial_root(p, index)
            except ValueError as e:
                raise BadNumber(str(e)) from None
        else:
            return self.reals.number(self.natural())
        self.need(")")
        return x

    # ------------------------------------------------------------ polynomials in x

    def polynomial(self) -> tuple[int, ...]:
        """A sum of terms c*x**k with integers c; lowest coefficient first."""
        cs: dict[int, int] = {}
        sign = self.skip("+", "-") or "+"
        while sign:
            c, k = self.term()
            cs[k] = cs.get(k, 0) + (c if sign == "+" else -c)
            sign = self.skip("+", "-")
        top = max((k for k, c in cs.items() if c), default=0)
        return tuple(cs.get(k, 0) for k in range(top + 1))

    def term(self) -> tuple[int, int]:
        c, k = 1, 0
        while True:
            if self.skip("x"):
                n = self.exponent() if self.skip("**", "^") else 1
                if n < 0 or k + n > HIGHEST:
                    raise BadNumber(f"a degree outside 0 to {HIGHEST}")
                k += n
            else:
                c *= self.natural()
            if not self.skip("*"):
                return c, k


def parse_real(text: str, reals: Reals) -> Real:
    """The number that the text means.  BadNumber where it means none; OutOfReach where a sign in it is."""
    r = _Reader(text, reals)
    read: Callable[[], Real] = r.sum
    try:
        x = read()
    except Undefined as e:
        raise BadNumber(str(e)) from None
    if r.at < len(r.tokens):
        raise r.wrong("the end")
    return x
