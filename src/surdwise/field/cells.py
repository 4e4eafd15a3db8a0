"""Open cells of parameter space by projection and lifting.

Collins, "Quantifier elimination for real closed fields by cylindrical algebraic
decomposition", 1975, in its open form (only full-dimensional cells): McCallum's projection
(leading coefficients, discriminants, pairwise resultants of irreducible factors) suffices
there, and every sample is rational.  Exact up to root isolation, which is certified.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator
from itertools import combinations, pairwise
from math import comb

from flint import arb, fmpq, fmpz_poly

from . import ring
from .real import START_PREC, isolate, simplest_between
from .ring import Poly, Rational

Sample = dict[int, Rational]


LARGEST_ELIMINATION = 400_000


class TooManyCells(Exception):
    """The decomposition outgrew its limit."""


def never_zero(p: Poly, positive: frozenset[int]) -> bool:
    """A cheap proof that p has no zero with the `positive` parameters positive: all its
    coefficients have one sign and every monomial is a square times positive parameters, one
    of them (a constant, say) having no zero.  False says nothing."""
    sign = 0
    safe = False
    for mono, c in p.terms():
        s = 1 if c > 0 else -1
        if sign and s != sign:
            return False
        sign = s
        exps = [(k, e) for k, e in enumerate(mono[ring.MAX_GENS :]) if e]
        if any(e % 2 and k not in positive for k, e in exps):
            return False
        if all(k in positive for k, _ in exps):
            safe = True
    return safe


def known_sign(p: Poly, positive: frozenset[int]) -> int:
    """The sign of p where all `positive` parameters are positive, if `never_zero` can tell
    it at a glance; 0 says nothing."""
    if p.is_zero() or ring.has_gens(p) or not never_zero(p, positive):
        return 0
    return 1 if p.leading_coefficient() > 0 else -1


def open_cells(
    polys: Iterable[Poly],
    order: list[int],
    positive: frozenset[int],
    avoid: Iterable[Poly] = (),
    known: Eliminations | None = None,
    limit: int = 200_000,
) -> Iterator[Sample]:
    """One rational sample in every open cell of the polynomials' complement.

    `order` lists the parameters, first the one decided first; those in `positive` range over
    (0, oo) only.  No sample is a zero of a polynomial of `avoid`, which bound no cell.  Raises
    TooManyCells past `limit` samples.
    """
    levels = project(polys, order, positive, known if known is not None else Eliminations())
    for count, s in enumerate(_lift(levels, order, positive, 0, {}, list(avoid))):
        if count >= limit:
            raise TooManyCells(f"more than {limit} cells")
        yield s


class Eliminations:
    """Discriminants and resultants of one component, factored, computed once; `tick` is called
    between them, to stop when time is out."""

    def __init__(self) -> None:
        self.tick: Callable[[], None] = lambda: None
        self._known: dict[tuple[str, str, int], list[tuple[Poly, int]]] = {}

    def discriminant(self, p: Poly, k: int) -> list[tuple[Poly, int]]:
        """Irreducible factors of the discriminant in parameter k, with multiplicities."""
        self._check(p, p)
        return self._get((ring.key(p), "", k), lambda: p.discriminant(ring.PARAM_NAMES[k]))

    def resultant(self, p: Poly, q: Poly, k: int) -> list[tuple[Poly, int]]:
        """Irreducible factors of the resultant in parameter k, with multiplicities."""
        self._check(p, q)
        a, b = sorted((ring.key(p), ring.key(q)))
        return self._get((a, b, k), lambda: p.resultant(q, ring.PARAM_NAMES[k]))

    def _check(self, p: Poly, q: Poly) -> None:
        """Refuse an elimination whose result may have too many terms (Bezout's bound)."""
        others = len(set(ring.params_in(p)) | set(ring.params_in(q))) - 1
        size = comb(p.total_degree() * q.total_degree() + others, others)
        if size > LARGEST_ELIMINATION:
            raise TooManyCells(f"an elimination with up to {size} terms in {others} parameters")

    def _get(self, name: tuple[str, str, int], make: Callable[[], Poly]) -> list[tuple[Poly, int]]:
        self.tick()
        if name not in self._known:
            p = make()
            self._known[name] = [] if p.is_zero() else ring.irreducible_factors(p)
        return self._known[name]


def project(
    polys: Iterable[Poly], order: list[int], positive: frozenset[int], known: Eliminations
) -> list[list[Poly]]:
    """Projection sets: levels[i] involves order[i] and only earlier parameters besides."""
    levels: list[dict[str, Poly]] = [{} for _ in order]

    def enter(factors: Iterable[tuple[Poly, int]]) -> None:
        for f, _ in factors:
            if never_zero(f, positive):
                continue
            used = set(ring.params_in(f))
            top = max(i for i, k in enumerate(order) if k in used)
            levels[top][ring.key(f)] = f

    for p in polys:
        enter(ring.irreducible_factors(p))
    for i in range(len(order) - 1, 0, -1):
        k = order[i]
        slot = ring.param_slot(k)
        here = list(levels[i].values())
        for p in here:
            cs = ring.coefficients(p, slot)
            enter(ring.irreducible_factors(cs[-1]))
            if len(cs) > 2:
                enter(known.discriminant(p, k))
            if k in positive and not cs[0].is_zero():
                enter(ring.irreducible_factors(cs[0]))
        for p, q in combinations(here, 2):
            enter(known.resultant(p, q, k))
    return [list(level.values()) for level in levels]


def _lift(
    levels: list[list[Poly]],
    order: list[int],
    positive: frozenset[int],
    i: int,
    sample: Sample,
    avoid: list[Poly],
) -> Iterator[Sample]:
    if i == len(order):
        yield dict(sample)
        return
    k = order[i]
    slot = ring.param_slot(k)
    polys = [ring.univariate(ring.substitute(p, sample), slot) for p in levels[i]]
    for low, high in gaps([p for p in polys if p.degree() > 0], k in positive):
        value = _pick(low, high, k, avoid)
        sample[k] = value
        left = [ring.substitute(p, {k: value}) for p in avoid]
        yield from _lift(levels, order, positive, i + 1, sample, left)
    sample.pop(k, None)


def _pick(low: Rational | None, high: Rational | None, k: int, avoid: list[Poly]) -> Rational:
    """A plain rational in the interval at which no polynomial of `avoid` vanishes for good."""
    while True:
        value = simplest_between(low, high)
        if not any(ring.substitute(p, {k: value}).is_zero() for p in avoid):
            return value
        # finitely many values are bad: go on in the part nearer to the middle
        if high is None or (low is not None and value - low > high - value):
            high, low = (value, low) if low is not None else (high, value)
        else:
            low = value


Gap = tuple[Rational | None, Rational | None]


def gaps(polys: list[fmpz_poly], positive: bool) -> list[Gap]:
    """The open intervals cut out by the real roots of integer polynomials (of the positive
    half-line, if so asked), shrunk to rational ends; None stands for infinity."""
    whole = fmpz_poly([1])
    for p in polys:
        g = whole.gcd(p)
        whole = whole * (p // g if g.degree() > 0 else p)
    if positive and whole[0] == 0:
        shift = next(i for i in range(whole.degree() + 1) if whole[i] != 0)
        whole = whole.right_shift(shift)
    prec = START_PREC
    whole = _squarefree(whole)
    while True:
        roots = isolate(whole, prec) if whole.degree() > 0 else []
        if positive:
            if any(r.contains(0) for r in roots):
                prec *= 2
                continue
            roots = [r for r in roots if r > 0]
        if all(a < b for a, b in pairwise(roots)):
            break
        prec *= 2
    low: Rational | None = fmpq(0) if positive else None
    out: list[Gap] = []
    for r in roots:
        # ends as exact rationals: a ball's own bounds would be rounded at the ambient precision
        middle, radius = _rational(r.mid()), _rational(r.rad())
        out.append((low, middle - radius))
        low = middle + radius
    out.append((low, None))
    return out


def _squarefree(p: fmpz_poly) -> fmpz_poly:
    if p.degree() < 2:
        return p
    g = p.gcd(p.derivative())
    return p // g if g.degree() > 0 else p


def _rational(x: arb) -> Rational:
    """An exact ball as a rational."""
    man, exp = x.mid().man_exp()
    return fmpq(int(man)) * fmpq(2) ** int(exp) if exp >= 0 else fmpq(int(man), 2 ** -int(exp))
