"""Real points of a tower over a rational sample, with certified balls.

A branch fixes one real root for every generator.  Values are Arb balls, recomputed at twice
the precision until the question is settled; a sign is reported only when the ball excludes
zero, and zero itself is only ever known algebraically (by the caller's exact zero test).
"""

from __future__ import annotations

import itertools

from flint import acb, acb_poly, arb, ctx, fmpq, fmpz_poly

from . import ring
from .ring import Poly, Rational
from .tower import Element, Gen, Tower

START_PREC = 64
MAX_PREC = 8192


class Unsettled(Exception):
    """A sign could not be proved: the sample lies on a special place, or precision ran out."""


class Branch:
    """One real point of a tower over a sample.

    `values` gives the sample (parameter index to rational); `path` holds, for every generator,
    which real root is meant: the sign for square roots, the position in ascending order else.
    """

    __slots__ = ("_balls", "gens", "path", "values")

    def __init__(
        self, values: dict[int, Rational], gens: tuple[Gen, ...] = (), path: tuple[int, ...] = ()
    ) -> None:
        self.values = values
        self.gens = gens
        self.path = path
        self._balls: dict[int, list[arb]] = {}

    def at_sample(self, p: Poly) -> Poly:
        """p with the sample put in (exact)."""
        return ring.substitute(p, self.values)

    def sign(self, e: Element) -> int:
        """Proved sign of a non-zero element; 0 only for the zero element.

        Raises Unsettled where no precision up to the limit separates it from zero.
        """
        num = self.at_sample(e.num)
        den = ring.value_of(self.at_sample(e.den))
        if den == 0:
            raise Unsettled("denominator vanishes at the sample")
        flip = 1 if den > 0 else -1
        if ring.is_constant(num):
            v = ring.value_of(num)
            if v == 0 and not e.is_zero():
                raise Unsettled("the sample lies on the zero set")
            return flip * (1 if v > 0 else -1 if v < 0 else 0)
        prec = START_PREC
        while prec <= MAX_PREC:
            try:
                ball = self._ball(num, e.tower, prec)
            except Unsettled:
                ball = arb(0, 1)
            if ball > 0:
                return flip
            if ball < 0:
                return -flip
            prec *= 2
        raise Unsettled("no precision separates the value from zero")

    def ball(self, e: Element, prec: int = START_PREC) -> arb:
        """Certified enclosure of the value of e."""
        with ctx.workprec(prec):
            den = ring.value_of(self.at_sample(e.den))
            return self._ball(self.at_sample(e.num), e.tower, prec) / den

    def approx(self, e: Element) -> float:
        """The value of e as a float (a float hint: the middle of a ball of 17 digits or more)."""
        for prec in (64, 256, 1024):
            b = self.ball(e, prec)
            if b.rel_accuracy_bits() >= 53:
                break
        return float(b.mid())

    def _ball(self, p: Poly, tower: Tower, prec: int) -> arb:
        """Value of a polynomial in the generators alone."""
        with ctx.workprec(prec):
            if ring.is_constant(p):
                return arb(ring.value_of(p))
            return _evaluate(p, self._roots(tower, prec))

    def _roots(self, tower: Tower, prec: int) -> list[arb]:
        """Balls of all generators of the tower; new ones must be positive roots."""
        for g in tower.gens[len(self.gens) :]:
            if g.choice != "positive":
                raise ValueError("the branch does not choose a root for this step")
            self.path = (*self.path, self._orientation(g))
            self.gens = (*self.gens, g)
        return self.known(prec)

    def known(self, prec: int) -> list[arb]:
        """Balls of the generators chosen so far."""
        balls = self._balls.setdefault(prec, [])
        while len(balls) < len(self.gens):
            g = self.gens[len(balls)]
            balls.append(self._root(g, self.path[g.index], balls, prec))
        return balls

    def _orientation(self, g: Gen) -> int:
        v = ring.value_of(self.at_sample(g.orient))
        if v == 0:
            raise Unsettled("orientation vanishes at the sample")
        return 1 if v > 0 else -1

    def _root(self, g: Gen, choice: int, below: list[arb], prec: int) -> arb:
        if g.radicand is not None:
            d = self._radicand(g, below, prec)
            return d.sqrt() * choice
        return _real_roots(g, self, below, prec)[choice]

    def _radicand(self, g: Gen, below: list[arb], prec: int) -> arb:
        assert g.radicand is not None
        p = self.at_sample(g.radicand)
        if ring.is_constant(p):
            return arb(ring.value_of(p))
        b = _evaluate(p, below)
        # the sign was settled when the branch was made; a wide ball is only imprecise
        return b if b > 0 else b.nonnegative_part()


def branches(tower: Tower, values: dict[int, Rational]) -> list[Branch]:
    """All real branches of the tower over a sample.

    Raises Unsettled where a discriminant vanishes at the sample (or too nearly to tell).
    """
    out = [Branch(values)]
    for g in tower.gens:
        out = [c for b in out for c in _continued(b, g)]
    return out


def _continued(b: Branch, g: Gen) -> list[Branch]:
    prec = START_PREC
    while prec <= MAX_PREC:
        with ctx.workprec(prec):
            below = b.known(prec)
            if g.radicand is not None:
                s = _sign_of_radicand(b, g, below)
                if s is None:
                    prec *= 2
                    continue
                if s < 0:
                    return []
                if g.choice == "positive":
                    return [_child(b, g, b._orientation(g))]
                return [_child(b, g, 1), _child(b, g, -1)]
            try:
                n = len(_real_roots(g, b, below, prec))
            except Unsettled:
                prec *= 2
                continue
            return [_child(b, g, i) for i in range(n)]
    raise Unsettled("a step of the figure degenerates at the sample")


def _child(b: Branch, g: Gen, choice: int) -> Branch:
    c = Branch(b.values, (*b.gens, g), (*b.path, choice))
    c._balls = {prec: list(balls) for prec, balls in b._balls.items()}
    return c


def _sign_of_radicand(b: Branch, g: Gen, below: list[arb]) -> int | None:
    assert g.radicand is not None
    p = b.at_sample(g.radicand)
    if ring.is_constant(p):
        v = ring.value_of(p)
        if v == 0:
            raise Unsettled("a radicand vanishes at the sample")
        return 1 if v > 0 else -1
    ball = _evaluate(p, below)
    return 1 if ball > 0 else -1 if ball < 0 else None


def _real_roots(g: Gen, b: Branch, below: list[arb], prec: int) -> list[arb]:
    """Real roots of a general step in ascending order, all simple."""
    cs = [b.at_sample(c) for c in ring.coefficients(g.modulus, g.slot)]
    if all(ring.is_constant(c) for c in cs):
        rats = [ring.value_of(c) for c in cs]
        return isolate(_integer_poly(rats), prec)
    balls = [arb(ring.value_of(c)) if ring.is_constant(c) else _evaluate(c, below) for c in cs]
    try:
        found = acb_poly(balls).roots(tol=arb(2) ** -(prec // 2))
    except ValueError as e:
        raise Unsettled(str(e)) from e
    real: list[arb] = []
    for i, r in enumerate(found):
        if not r.imag.contains(0):
            continue
        # a root whose conjugate ball meets no other root's ball is its own conjugate
        if any(j != i and s.overlaps(r.conjugate()) for j, s in enumerate(found)):
            raise Unsettled("roots not separated from their conjugates")
        real.append(r.real)
    real.sort(key=lambda r: float(r.mid()))
    if any(not (x < y) for x, y in itertools.pairwise(real)):
        raise Unsettled("real roots not separated")
    return real


def _integer_poly(cs: list[Rational]) -> fmpz_poly:
    den = 1
    for c in cs:
        den = den * int(c.q) // _gcd(den, int(c.q))
    return fmpz_poly([int(c.p) * (den // int(c.q)) for c in cs])


def _gcd(a: int, b: int) -> int:
    while b:
        a, b = b, a % b
    return a


def isolate(p: fmpz_poly, prec: int = START_PREC) -> list[arb]:
    """Distinct real roots of an integer polynomial, ascending, as disjoint certified balls."""
    with ctx.workprec(prec):
        pairs: list[tuple[acb, int]] = list(p.complex_roots())  # type: ignore[arg-type]
        roots = [r.real for r, _ in pairs if r.imag.is_zero()]
    roots.sort(key=lambda r: r.mid())
    return roots


def _evaluate(p: Poly, gens: list[arb]) -> arb:
    """p at the generators' balls; p involves no parameter."""
    total = arb(0)
    powers: dict[tuple[int, int], arb] = {}
    for mono, c in p.terms():
        term = arb(c)
        for k, x in enumerate(gens):
            e = mono[ring.MAX_GENS - 1 - k]
            if e == 1:
                term = term * x
            elif e > 1:
                name = (k, e)
                if name not in powers:
                    powers[name] = x**e
                term = term * powers[name]
        total = total + term
    return total


def simplest_between(low: Rational | None, high: Rational | None) -> Rational:
    """The rational of smallest denominator (then size) strictly between two rationals
    (None: unbounded)."""
    if low is None and high is None:
        return fmpq(0)
    if low is None:
        assert high is not None
        return fmpq(0) if high > 0 else fmpq(int(high.ceil()) - 1)
    if high is None:
        return fmpq(0) if low < 0 else fmpq(int(low.floor()) + 1)
    if low < 0 < high:
        return fmpq(0)
    if high <= 0:
        return -simplest_between(-high, -low)
    n = int(low.floor())
    if fmpq(n + 1) < high:
        return fmpq(n + 1)
    inner = simplest_between(1 / (high - n), 1 / (low - n) if low > n else None)
    return n + 1 / inner
