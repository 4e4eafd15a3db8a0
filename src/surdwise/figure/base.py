"""The ground of a component: parameters, some of them dependent on others by equations.

A stratum of parameter space is a list of polynomial equations, each found as a factor of a
norm.  They are solved into triangular form anew for every stratum, the newest (in fewest
parameters) first: linear ones by division, others by factoring over the tower built so far,
each irreducible factor making a base of its own.  Exact.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from ..field import ring, roots
from ..field.ring import Poly
from ..field.tower import Element, Tower


@dataclass(frozen=True)
class Base:
    """A tower and the values of the dependent parameters in it.  `leads` are the elements that
    were divided by on the way: where one vanishes the base itself changes."""

    tower: Tower
    values: dict[int, Element]
    leads: tuple[Element, ...] = ()


def solve(equations: Sequence[Poly]) -> list[Base]:
    """Bases of full dimension of the common zeros of the equations (oldest first)."""
    bases = [Base(Tower(), {})]
    pending = list(reversed(equations))
    while pending:
        g = pending.pop(0)
        out: list[Base] = []
        for base in bases:
            e = plug(g, base)
            if e.is_zero():
                out.append(base)
                continue
            free = [k for k in ring.params_in(e.num) if k not in base.values]
            if not free:
                continue
            bound = _bound(base)
            choices = [k for k in free if k not in bound]
            if not choices:
                # only parameters that earlier steps depend on: go down by the norm first
                for f in roots.norm_factors(e).values():
                    out += solve([*equations, f]) if f not in equations else []
                continue
            out += _solved_for(e, base, choices)
        bases = out
    return bases


def _bound(base: Base) -> set[int]:
    """Free parameters that the base already speaks of."""
    elements = (*base.values.values(), *base.leads)
    polys = [s.modulus for s in base.tower.gens]
    polys += [e.num for e in elements] + [e.den for e in elements]
    return {k for p in polys for k in ring.params_in(p)}


def plug(p: Poly, base: Base) -> Element:
    """A polynomial in the parameters with the dependent ones replaced."""
    todo = [k for k in ring.params_in(p) if k in base.values]
    if not todo:
        return base.tower.element(p)
    k = todo[0]
    x = base.values[k]
    out = base.tower.constant(0)
    for c in reversed(ring.coefficients(p, ring.param_slot(k))):
        out = out * x + plug(c, base)
    return out


def _solved_for(e: Element, base: Base, choices: list[int]) -> list[Base]:
    """Make one of the parameters dependent so that e vanishes."""
    degs = ring.degrees(e.num)

    def cost(k: int) -> tuple[int, int, int]:
        lead = ring.coefficients(e.num, ring.param_slot(k))[-1]
        return degs[ring.param_slot(k)], 0 if ring.is_constant(lead) else len(lead), -k

    k = min(choices, key=cost)
    t = base.tower
    cs = [t.element(c) for c in ring.coefficients(e.num, ring.param_slot(k))]
    leads = base.leads if cs[-1].is_rational() else (*base.leads, cs[-1])
    if len(cs) == 2:
        return [Base(t, {**base.values, k: -cs[0] / cs[1]}, leads)]
    out = []
    for f, _ in roots.factor(cs, t):
        if len(f) == 2:
            out.append(Base(t, {**base.values, k: -f[0]}, leads))
            continue
        tower, root = t.adjoin_root(f, f"u{k}")
        out.append(Base(tower, {**base.values, k: root}, leads))
    return out
