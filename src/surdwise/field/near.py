"""Real points of a tower over algebraic parameter values given by certified enclosures.

Two kinds of point are needed on a curve g(u, v) = 0: a point of an arc (u rational, v a simple
root of g(u, .)), which can be refined at will, and a box about a critical point, of which only
an enclosure is known.  A sign read off an enclosure holds for every point in it.
"""

from __future__ import annotations

from collections.abc import Callable

from flint import arb, arb_poly, ctx, fmpq, fmpz_poly

from . import ring
from .real import START_PREC, Branch, Unsettled, isolate
from .ring import Poly, Rational
from .tower import Element, Gen, Tower

NEAR_PREC = 1024
Enclosure = Callable[[int], arb]


class NearBranch:
    """A branch of a tower over enclosed parameter values (`spots`: index to enclosure at a
    precision), which solve `system` exactly.  Has the reading methods of `real.Branch`."""

    __slots__ = ("_balls", "gens", "limit", "path", "spots", "system", "values")

    def __init__(
        self,
        spots: dict[int, Enclosure],
        limit: int,
        system: tuple[Poly, ...],
        gens: tuple[Gen, ...] = (),
        path: tuple[int, ...] = (),
    ) -> None:
        self.spots = spots
        self.limit = limit
        self.system = system
        self.gens = gens
        self.path = path
        self.values: dict[int, Rational] = {}
        self._balls: dict[int, list[arb]] = {}

    def value(self, p: Poly, prec: int, balls: list[arb]) -> arb:
        """A polynomial in parameters and generators."""
        return evaluate(p, {k: f(prec) for k, f in self.spots.items()}, balls)

    def sign(self, e: Element) -> int | None:
        """Certified sign, or None where the enclosure contains zero at every precision."""
        prec = START_PREC
        while prec <= self.limit:
            with ctx.workprec(prec):
                balls = self.balls(e.tower, prec)
                if balls is not None:
                    den = self.value(e.den, prec, balls)
                    num = self.value(e.num, prec, balls)
                    if not den.contains(0) and not num.contains(0):
                        return (1 if num > 0 else -1) * (1 if den > 0 else -1)
            prec *= 2
        return None

    def ball(self, e: Element, prec: int = START_PREC) -> arb:
        """Enclosure of the value of an element."""
        prec = min(prec, self.limit)
        with ctx.workprec(prec):
            balls = self.balls(e.tower, prec)
            if balls is None:
                raise Unsettled("a root is not separated")
            return self.value(e.num, prec, balls) / self.value(e.den, prec, balls)

    def approx(self, e: Element) -> float:
        """A float hint."""
        return float(self.ball(e, self.limit).mid())

    def balls(self, tower: Tower, prec: int) -> list[arb] | None:
        """Enclosures of all generators, or None where a step is not separated."""
        for g in tower.gens[len(self.gens) :]:
            if g.choice != "positive":
                raise ValueError("the branch does not choose a root for this step")
            self.gens, self.path = (*self.gens, g), (*self.path, 1)
        out = self._balls.setdefault(prec, [])
        while len(out) < len(self.gens):
            g = self.gens[len(out)]
            if g.radicand is None:
                return None
            d = self.value(g.radicand, prec, out)
            if d < 0:
                return None
            choice = self.path[g.index]
            if g.choice == "positive":
                o = self.value(g.orient, prec, out)
                # where the orientation vanishes the root itself does, whatever its sign
                choice = -1 if o < 0 else 1
                if o.contains(0) and not ring.is_constant(g.orient):
                    out.append(d.nonnegative_part().sqrt().union(-d.nonnegative_part().sqrt()))
                    continue
            out.append(d.nonnegative_part().sqrt() * choice)
        return out


def near_branches(
    tower: Tower, spots: dict[int, Enclosure], limit: int, system: tuple[Poly, ...]
) -> list[NearBranch]:
    """All real branches over an enclosed point; raises Unsettled where a two-valued step is
    not separated there, or is of higher degree."""
    out = [NearBranch(spots, limit, system)]
    for g in tower.gens:
        if g.radicand is None:
            raise Unsettled("a step of higher degree over an algebraic point")
        nxt: list[NearBranch] = []
        for b in out:
            signs = (1,) if g.choice == "positive" else (1, -1)
            if g.choice != "positive":
                s = _radicand_sign(b, g)
                if s is None:
                    raise Unsettled("a discriminant is not separated from zero")
                if s < 0:
                    continue
            nxt += [NearBranch(spots, limit, system, (*b.gens, g), (*b.path, c)) for c in signs]
        out = nxt
    return out


def _radicand_sign(b: NearBranch, g: Gen) -> int | None:
    assert g.radicand is not None
    prec = START_PREC
    while prec <= b.limit:
        with ctx.workprec(prec):
            below = b._balls.setdefault(prec, []) if not b.gens else b.balls(Tower(b.gens, ()), prec)
            if below is not None:
                d = b.value(g.radicand, prec, below)
                if not d.contains(0):
                    return 1 if d > 0 else -1
        prec *= 2
    return None


def follow(near: NearBranch, tower: Tower, values: dict[int, Rational]) -> Branch:
    """The branch of the same choices over a rational sample nearby."""
    b = Branch(values)
    path: list[int] = []
    for g in tower.gens[: len(near.gens)]:
        path.append(b._orientation(g) if g.choice == "positive" else near.path[g.index])
    return Branch(values, tower.gens[: len(path)], tuple(path))


def evaluate(p: Poly, params: dict[int, arb], gens: list[arb]) -> arb:
    """A polynomial at enclosures of parameters and generators."""
    total = arb(0)
    for mono, c in p.terms():
        term = arb(c)
        for slot, e in enumerate(mono):
            if e:
                x = params[slot - ring.MAX_GENS] if slot >= ring.MAX_GENS else gens[ring.MAX_GENS - 1 - slot]
                term = term * (x**e if e > 1 else x)
        total = total + term
    return total


def crossing_box(
    g: Poly, q: Poly, boxes: list[arb], at: dict[int, Enclosure], v: int, width: int
) -> int | None:
    """The position of the one box in which q can vanish, if g is monotone in v there; see
    verdict/lift.py for what that proves."""
    prec = 2 * width + 64
    with ctx.workprec(prec):
        fixed_ = {k: f(prec) for k, f in at.items()}
        near = [k for k, b in enumerate(boxes) if evaluate(q, {**fixed_, v: b}, []).contains(0)]
        if len(near) != 1:
            return None
        slope = evaluate(g.derivative(ring.PARAM_NAMES[v]), {**fixed_, v: boxes[near[0]]}, [])
        return None if slope.contains(0) else near[0]


def root_enclosure(p: fmpz_poly, index: int) -> Enclosure:
    """The index-th real root of an integer polynomial, at any precision."""
    known: dict[int, arb] = {}

    def at(prec: int) -> arb:
        if prec not in known:
            known[prec] = isolate(p, prec)[index]
        return known[prec]

    return at


def fixed(x: arb) -> Enclosure:
    """An enclosure that is what it is."""
    return lambda prec: x


def exactly(x: Rational) -> Enclosure:
    """A rational."""
    return lambda prec: arb(x)


def cover_zeros(p: Poly, slot: int, k: int, at: Enclosure, positive: bool, width: int) -> list[arb]:
    """Intervals of width 2^-width that together contain every real zero of p(alpha, v) (v > 0 if
    `positive`), for the enclosed value alpha of parameter k.  Certified by exclusion: an interval
    is dropped only when p, or p and a root bound, cannot vanish on it."""
    prec = 2 * width + 64
    with ctx.workprec(prec):
        alpha = at(prec)
        cs = [evaluate(c, {k: alpha}, []) for c in ring.coefficients(p, slot)]
        while cs and cs[-1].contains(0):
            if len(cs) == 1:
                raise Unsettled("a polynomial may vanish identically at a critical value")
            # the leading coefficient vanishes at alpha or cannot be told from zero: large roots
            # may exist; they are bounded only if it is zero, which the caller has checked
            cs = cs[:-1]
        if len(cs) <= 1:
            return []
        lead = cs[-1]
        # Cauchy's bound: every root is smaller than 1 + max |c_i / lead|
        bound = max((float(abs(c / lead).upper()) for c in cs[:-1]), default=0.0)
        top = fmpq(int(bound * 1.001) + 2)
        low = fmpq(0) if positive else -top
        whole = arb_poly(cs)
        crowd = 2 * len(cs) + 16
        active = [(low, top)]
        while active and active[0][1] - active[0][0] >= fmpq(1, 2**width):
            halves = [h for a, b in active for h in ((a, (a + b) / 2), ((a + b) / 2, b))]
            left = [(a, b) for a, b in halves if not _free_of_zeros(whole, (a + b) / 2, (b - a) / 2)]
            if len(left) > crowd:
                break  # about a root of high multiplicity the precision is used up
            active = left
        return _merged([arb(a).union(arb(b)) for a, b in active])


def _free_of_zeros(p: arb_poly, centre: Rational, radius: Rational) -> bool:
    """Whether |c_0| > sum |c_i| r^i for the Taylor coefficients at the centre: then p has no
    zero within r of it (the exclusion test of Pellet and Rouche)."""
    cs = p(arb_poly([arb(centre), arb(1)])).coeffs()
    r, power, total = arb(radius), arb(1), arb(0)
    for c in cs[1:]:
        power = power * r
        total = total + abs(c) * power
    return bool(abs(cs[0]) > total)


def _merged(boxes: list[arb]) -> list[arb]:
    boxes.sort(key=lambda b: b.mid())
    out: list[arb] = []
    for b in boxes:
        if out and out[-1].overlaps(b):
            out[-1] = out[-1].union(b)
        else:
            out.append(b)
    return out
