"""Exact values at a branch as text: nested square roots, or a numbered root of a polynomial.

The text is that of common computer algebra (`sqrt(...)`, `**`, `CRootOf(poly, k)`), so that a
reader can paste it.  Exact.
"""

from __future__ import annotations

from flint import fmpq, fmpz

from . import ring
from .real import Branch, isolate
from .ring import Poly, Rational
from .tower import Element, Tower


def text(e: Element, branch: Branch) -> str:
    """The value of e at the branch."""
    den = ring.value_of(branch.at_sample(e.den))
    num = branch.at_sample(e.num)
    if any(g.radicand is None and num.degrees()[g.slot] > 0 for g in e.tower.gens) or _deep(num, e.tower):
        return _as_root(e, branch)
    branch.ball(e)
    names: dict[int, tuple[Rational, str]] = {}
    for g in e.tower.gens:
        if g.radicand is None:
            continue
        inner = _substituted(branch.at_sample(g.radicand), names)
        sign = branch.path[g.index]
        names[g.index] = _root_text(inner, sign)
    return _polynomial_text(_substituted(num, names), 1 / den)


Terms = dict[tuple[str, ...], Rational]


def _deep(num: Poly, tower: Tower) -> bool:
    """Whether a root of a general step hides under a square root."""
    for g in tower.gens:
        if num.degrees()[g.slot] > 0 and g.radicand is not None:
            if any(h.radicand is None and g.radicand.degrees()[h.slot] > 0 for h in tower.gens):
                return True
            if _deep(g.radicand, tower):
                return True
    return False


def _substituted(p: Poly, names: dict[int, tuple[Rational, str]]) -> Terms:
    """p as a sum of rational multiples of products of root texts."""
    out: Terms = {}
    for mono, c in p.terms():
        factor = c
        words: list[str] = []
        for k, (scale, word) in names.items():
            e = mono[ring.gen_slot(k)]
            if e:
                factor = factor * scale**e
                if word:
                    words += [word] * e
        factor, name = _paired(factor, words)
        out[name] = out.get(name, fmpq(0)) + factor
    return {k: v for k, v in out.items() if v != 0} or {(): fmpq(0)}


def _paired(factor: Rational, words: list[str]) -> tuple[Rational, tuple[str, ...]]:
    """Square roots of integers that occur twice in a product, multiplied out."""
    left: list[str] = []
    for w in words:
        body = w[5:-1]
        if w in left and body.lstrip("-").isdigit():
            left.remove(w)
            factor = factor * int(body)
        else:
            left.append(w)
    return factor, tuple(left)


def _root_text(inner: Terms, sign: int) -> tuple[Rational, str]:
    """Square root of a sum as (rational factor, text of the remaining root)."""
    if set(inner) == {()}:
        v = inner[()]
        n, d = int(v.p), int(v.q)
        scale, free = 1, n * d
        for q, m in fmpz(abs(free)).factor() if free else []:
            scale *= int(q) ** (int(m) // 2)
        free //= scale * scale
        factor = fmpq(sign * scale, d)
        if free == 1 or free == 0:
            return factor * free, ""
        return factor, f"sqrt({free})"
    return fmpq(sign), f"sqrt({_polynomial_text(inner, fmpq(1))})"


def _polynomial_text(terms: Terms, scale: Rational) -> str:
    parts: list[str] = []
    for words, c in terms.items():
        v = c * scale
        if v == 0:
            continue
        body = "*".join(words)
        size = -v if v < 0 else v
        if not body:
            piece = str(size)
        elif size == 1:
            piece = body
        elif size.q == 1:
            piece = f"{size}*{body}"
        elif size.p == 1:
            piece = f"{body}/{size.q}"
        else:
            piece = f"{size.p}*{body}/{size.q}"
        parts.append(("-" if v < 0 else "+") + piece)
    if not parts:
        return "0"
    whole = "".join(f" {p[0]} {p[1:]}" for p in parts).strip()
    return "-" + whole[2:] if whole.startswith("- ") else whole[2:]


def _as_root(e: Element, branch: Branch) -> str:
    """The value as a root of an irreducible polynomial over Q, found by a norm."""
    t = e.tower
    x = ring.gen(len(t.gens))
    slot = ring.gen_slot(len(t.gens))
    low = [branch.at_sample(g.modulus) for g in t.gens]
    p = branch.at_sample(e.den) * x - branch.at_sample(e.num)
    for k in reversed(range(len(t.gens))):
        if p.degrees()[t.gens[k].slot] > 0:
            p = low[k].resultant(p, ring.GEN_NAMES[k])
    for f, _ in ring.irreducible_factors(p):
        found = _which(f, slot, e, branch)
        if found is not None:
            return found
    raise ArithmeticError("no factor of the norm vanishes at the value")


def _in_x(cs: list[int]) -> str:
    """A polynomial in x from its ascending coefficients."""
    out = ""
    for i, c in reversed(list(enumerate(cs))):
        if c:
            size = "" if abs(c) == 1 and i else str(abs(c))
            power = "" if i == 0 else "x" if i == 1 else f"x**{i}"
            body = size + ("*" if size and power else "") + power
            sign = (" - " if c < 0 else " + ") if out else ("-" if c < 0 else "")
            out += sign + body
    return out


def _which(f: Poly, slot: int, e: Element, branch: Branch) -> str | None:
    """Text of the root of f that equals e at the branch; None if f does not vanish there."""
    u = ring.univariate(f, slot)
    prec = 64
    while prec <= 4096:
        ball = branch.ball(e, prec)
        roots = isolate(u, prec)
        near = [i for i, r in enumerate(roots) if r.overlaps(ball)]
        if not near:
            return None
        if len(near) == 1 and prec >= 512:
            cs = [int(c) for c in u.coeffs()]
            if len(cs) == 2:
                return str(fmpq(-cs[0], cs[1]))
            return f"CRootOf({_in_x(cs)}, {near[0]})"
        prec *= 2
    return None
