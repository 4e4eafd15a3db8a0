"""Sums of squares: an exact proof that a polynomial is nowhere negative.

Peyrl and Parrilo, "Computing sum of squares decompositions with rational coefficients", 2008: a
Gram matrix from a convex solver is rounded to rationals, put back onto the affine space of Gram
matrices of p, and its LDL^T decomposition is computed exactly; only that is believed.  Zeros of
p at small rational points are used to cut the matrix down to the face it must lie on.
"""

from __future__ import annotations

import itertools
from collections.abc import Sequence
from fractions import Fraction
from typing import Any

from . import ring
from .echelon import Matrix, echelon
from .ring import Poly

Mono = tuple[int, ...]
Coefficients = dict[Mono, Fraction]

LARGEST_BASIS = 24
GRID = (0, 1, -1, 2, -2)
LARGEST_GRID = 700
ROUNDINGS = (10, 100, 10**4, 10**7)


Squares = list[tuple[Fraction, Coefficients]]


def sum_of_squares(p: Poly, positive: frozenset[int] = frozenset()) -> Squares | None:
    """Positive weights and polynomials with p = sum of weight * polynomial^2, or None if none was
    found.  For parameters of `positive` p is read at their squares: then p >= 0 where they are
    not negative.  Coefficients by monomial, exponents in the order of `params_in(p)`."""
    used = ring.params_in(p)
    cs: Coefficients = {}
    for mono, c in p.terms():
        tail = mono[ring.MAX_GENS :]
        m = tuple(int(tail[k]) * (2 if k in positive else 1) for k in used)
        cs[m] = Fraction(int(c.p), int(c.q))
    basis = _basis(cs)
    if not basis or len(basis) > LARGEST_BASIS:
        return None
    face = _face(cs, basis, len(used))
    if not face:
        return None
    gram = _gram(cs, basis, face)
    return None if gram is None else _squares(gram, basis)


def _basis(cs: Coefficients) -> list[Mono]:
    """Monomials that squares of p can contain: halves of the degrees, then those whose own square
    can be made are kept until nothing changes."""
    n = len(next(iter(cs)))
    top = [max(m[i] for m in cs) for i in range(n)]
    low, high = min(map(sum, cs)), max(map(sum, cs))
    if high % 2 or any(t % 2 for t in top):
        return []
    out = [m for m in itertools.product(*(range(t // 2 + 1) for t in top)) if low <= 2 * sum(m) <= high]
    while True:
        pairs = {_plus(a, b) for a, b in itertools.combinations(out, 2)}
        kept = [m for m in out if _plus(m, m) in cs or _plus(m, m) in pairs]
        if len(kept) == len(out):
            return out
        out = kept


def _plus(a: Mono, b: Mono) -> Mono:
    return tuple(x + y for x, y in zip(a, b, strict=True))


def _value(cs: Coefficients, at: Sequence[int]) -> Fraction:
    total = Fraction(0)
    for m, c in cs.items():
        for x, e in zip(at, m, strict=True):
            c = c * x**e
        total += c
    return total


def _face(cs: Coefficients, basis: list[Mono], n: int) -> Matrix:
    """Rows spanning the vectors orthogonal to the basis at every small integer zero of p: a Gram
    matrix of p maps those to zero.  Empty if p is negative somewhere small."""
    zeros: list[list[Fraction]] = []
    for at in itertools.islice(itertools.product(GRID, repeat=n), LARGEST_GRID):
        v = _value(cs, at)
        if v < 0:
            return []
        if v == 0:
            zeros.append([_value({m: Fraction(1)}, at) for m in basis])
    return _null_space(zeros, len(basis))


def _null_space(rows: Matrix, n: int) -> Matrix:
    """A basis of the vectors orthogonal to all rows."""
    rows = [list(r) for r in rows]
    lead = echelon(rows, n)
    out = []
    for col in range(n):
        if col not in lead:
            v = [Fraction(0)] * n
            v[col] = Fraction(1)
            for k, c in enumerate(lead):
                v[c] = -rows[k][col]
            out.append(v)
    return out


def _gram(cs: Coefficients, basis: list[Mono], face: Matrix) -> Matrix | None:
    """A positive semidefinite rational Gram matrix of p, from the solver's by rounding: S in the
    coordinates of the face, with basis^T (face^T S face) basis = p."""
    r = len(face)
    entries = [(i, j) for i in range(r) for j in range(i, r)]
    # coefficient of every product monomial as a linear form in the entries of S
    forms: dict[Mono, dict[int, Fraction]] = {}
    for e, (i, j) in enumerate(entries):
        for a, x in enumerate(face[i]):
            for b, y in enumerate(face[j]):
                if x and y:
                    m = _plus(basis[a], basis[b])
                    row = forms.setdefault(m, {})
                    row[e] = row.get(e, Fraction(0)) + x * y * (1 if i == j else 2)
    if any(m not in forms for m in cs):
        return None
    rows = [[f.get(e, Fraction(0)) for e in range(len(entries))] for f in forms.values()]
    goal = [cs.get(m, Fraction(0)) for m in forms]
    rough = _solve(rows, goal, entries, r)
    if rough is None:
        return None
    for d in ROUNDINGS:
        s = _put_back(rows, goal, [Fraction(round(x * d), d) for x in rough])
        if s is None:
            return None
        small = [[Fraction(0)] * r for _ in range(r)]
        for (i, j), x in zip(entries, s, strict=True):
            small[i][j] = small[j][i] = x
        if _ldl(small) is not None:
            return _unfolded(small, face)
    return None


def _unfolded(small: Matrix, face: Matrix) -> Matrix:
    """face^T small face."""
    r, n = len(face), len(face[0])
    half = [
        [sum((small[i][j] * face[j][b] for j in range(r)), Fraction(0)) for b in range(n)] for i in range(r)
    ]
    return [
        [sum((face[i][a] * half[i][b] for i in range(r)), Fraction(0)) for b in range(n)] for a in range(n)
    ]


def _solve(rows: Matrix, goal: list[Fraction], entries: list[tuple[int, int]], r: int) -> list[float] | None:
    """A Gram matrix as far inside the cone as the solver gets: maximise t with S - t I >= 0."""
    import clarabel
    import numpy as np
    from scipy import sparse

    n = len(entries) + 1
    equal = np.array([[float(x) for x in row] + [0.0] for row in rows])
    cone = np.zeros((r * (r + 1) // 2, n))
    # the solver's triangle: columns of the upper triangle, off-diagonal entries times sqrt 2
    order = {(i, j): k for k, (j, i) in enumerate((j, i) for j in range(r) for i in range(j + 1))}
    for e, (i, j) in enumerate(entries):
        cone[order[i, j], e] = -1.0 if i == j else -(2**0.5)
        if i == j:
            cone[order[i, j], n - 1] = 1.0
    bound = np.zeros((1, n))
    bound[0, n - 1] = 1.0
    a = sparse.csc_matrix(np.vstack([equal, bound, cone]))
    b = np.concatenate([[float(x) for x in goal], [1.0], np.zeros(cone.shape[0])])
    cones: list[Any] = [
        clarabel.ZeroConeT(len(rows)),
        clarabel.NonnegativeConeT(1),
        clarabel.PSDTriangleConeT(r),
    ]
    settings = clarabel.DefaultSettings()
    settings.verbose = False
    settings.time_limit = 2.0
    cost = np.zeros(n)
    cost[n - 1] = -1.0
    out = clarabel.DefaultSolver(sparse.csc_matrix((n, n)), cost, a, b, cones, settings).solve()
    x = list(out.x)
    if str(out.status) not in ("Solved", "AlmostSolved") or x[-1] < -1e-6:
        return None
    return [float(v) for v in x[:-1]]


def _put_back(rows: Matrix, goal: list[Fraction], s: list[Fraction]) -> list[Fraction] | None:
    """The rounded entries changed as little as the equations ask (each row in turn changes only
    what no earlier row has fixed)."""
    m = []
    for row, g in zip(rows, goal, strict=True):
        m.append([*row, g - sum((x * y for x, y in zip(row, s, strict=True)), Fraction(0))])
    lead = echelon(m, len(s))
    if any(r[-1] for r in m[len(lead) :]):
        return None
    out = list(s)
    for k, col in enumerate(lead):
        out[col] += m[k][-1]
    return out


def _ldl(a: Matrix) -> list[tuple[Fraction, list[Fraction]]] | None:
    """Pivots and rows of a = sum of pivot * row^T row with positive pivots, or None if a is not
    positive semidefinite.  Exact."""
    a = [list(r) for r in a]
    n = len(a)
    out = []
    for k in range(n):
        d = a[k][k]
        if d < 0 or (d == 0 and any(a[k][j] for j in range(k, n))):
            return None
        if d == 0:
            continue
        row = [Fraction(0)] * k + [a[k][j] / d for j in range(k, n)]
        out.append((d, row))
        for i in range(k, n):
            for j in range(k, n):
                a[i][j] -= d * row[i] * row[j]
    return out


def _squares(gram: Matrix, basis: list[Mono]) -> Squares | None:
    parts = _ldl(gram)
    if parts is None:
        return None
    return [(d, {m: x for m, x in zip(basis, row, strict=True) if x}) for d, row in parts]


def expanded(squares: Sequence[tuple[Fraction, Coefficients]]) -> Coefficients:
    """The sum of weight * polynomial^2, to be compared with what it should be."""
    out: Coefficients = {}
    for w, q in squares:
        for (a, x), (b, y) in itertools.product(q.items(), repeat=2):
            m = _plus(a, b)
            out[m] = out.get(m, Fraction(0)) + w * x * y
    return {m: c for m, c in out.items() if c}
