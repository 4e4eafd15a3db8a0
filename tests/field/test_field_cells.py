"""Open cells against brute force: no sign vector that random points find may be missing."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest
from flint import fmpq, fmpz_poly

from surdwise.field import cells, ring
from surdwise.field.ring import Poly

U, V, W = ring.param(0), ring.param(1), ring.param(2)
POINTS = 20_000
ANY: frozenset[int] = frozenset()


def _floats(p: Poly, xs: list[Any]) -> tuple[Any, Any]:
    """Values of p at many points, and the size of its largest term there (to judge rounding)."""
    total = np.zeros(POINTS)
    size = np.zeros(POINTS)
    for mono, c in p.terms():
        term = np.full(POINTS, float(int(c.p)) / float(int(c.q)))
        for k, x in enumerate(xs):
            term = term * x ** int(mono[ring.param_slot(k)])
        total += term
        size = np.maximum(size, np.abs(term))
    return total, size


def brute(polys: list[Poly], count: int, positive: frozenset[int], seed: int) -> set[tuple[int, ...]]:
    """Sign vectors at random points of many sizes; points too near to a zero are left out."""
    rng = np.random.default_rng(seed)
    xs = []
    for k in range(count):
        x = rng.standard_normal(POINTS) * 10.0 ** rng.uniform(-1, 0.8, POINTS)
        xs.append(np.abs(x) if k in positive else x)
    signs = []
    clear = np.ones(POINTS, dtype=bool)
    for p in polys:
        total, size = _floats(p, xs)
        clear &= np.abs(total) > 1e-9 * size
        signs.append(np.sign(total).astype(int))
    table = np.array(signs).T[clear]
    return {tuple(int(s) for s in row) for row in np.unique(table, axis=0)}


def vector(polys: list[Poly], sample: cells.Sample) -> tuple[int, ...]:
    """Exact signs at a sample."""
    values = [ring.value_of(ring.substitute(p, sample)) for p in polys]
    return tuple(1 if v > 0 else -1 if v < 0 else 0 for v in values)


def distance2(a: tuple[Poly, Poly], b: tuple[Poly, Poly]) -> Poly:
    return (a[0] - b[0]) ** 2 + (a[1] - b[1]) ** 2


ONE = ring.ONE
P = (U, V)
A, B = (ring.ZERO, ring.ZERO), (ONE, ring.ZERO)

PLANE: dict[str, list[Poly]] = {
    "two lines": [U - V, U + V - 1],
    "circle and line": [U * U + V * V - 1, U - 2 * V],
    "circle and its tangent": [U * U + V * V - 1, U - 1],
    "circles that touch": [U * U + V * V - 1, (U - 2) ** 2 + V * V - 1],
    "circles that nearly touch": [U * U + V * V - 1, (U - 2) ** 2 + V * V - ring.constant(fmpq(1001, 1000))],
    "cubic with an oval": [V * V - U**3 + U],
    "cusp and circle": [V * V - U**3, U * U + V * V - 1],
    "node": [V * V - U**3 - U * U, V - U],
    "hyperbola and asymptotes": [U * V - 1, U, V],
    "vanishing lead": [U * V * V - V + 1, U + V],
    "shape of a triangle": [
        distance2(P, A) - distance2(P, B),
        distance2(P, A) - 1,
        distance2(P, B) - 1,
        distance2(P, A) + distance2(P, B) - 1,
        U,
        U - 1,
        V,
    ],
    "four-line star": [U - V, U + V, U - 2 * V + 1, 2 * U + V - 1, U],
    "quartic": [(U * U + V * V) ** 2 - 2 * (U * U - V * V), U - ring.constant(fmpq(1, 3))],
}

SPACE: dict[str, list[Poly]] = {
    "planes": [U - V, V - W, U + V + W - 1],
    "sphere and plane": [U * U + V * V + W * W - 4, U - V + W],
    "triangle inequalities": [U + V - W, V + W - U, W + U - V],
    "Heron's quartic": [2 * (U**2 * V**2 + V**2 * W**2 + W**2 * U**2) - U**4 - V**4 - W**4, U - V],
    "cone and sphere": [U * U + V * V - W * W, U * U + V * V + W * W - 1],
    "saddle": [W - U * V, U + V + W],
}


@pytest.mark.parametrize("order", [[0, 1], [1, 0]])
@pytest.mark.parametrize("positive", [ANY, frozenset({0}), frozenset({1}), frozenset({0, 1})])
@pytest.mark.parametrize("name", PLANE)
def test_every_sign_vector_of_the_plane_is_found(
    name: str, positive: frozenset[int], order: list[int]
) -> None:
    polys = PLANE[name]
    samples = list(cells.open_cells(polys, order, positive))
    found = {vector(polys, s) for s in samples}
    assert all(0 not in v for v in found)
    assert all(s[k] > 0 for s in samples for k in positive)
    assert brute(polys, 2, positive, 3) <= found


@pytest.mark.parametrize("order", [[0, 1, 2], [2, 0, 1]])
@pytest.mark.parametrize("positive", [ANY, frozenset({0, 1, 2})])
@pytest.mark.parametrize("name", SPACE)
def test_every_sign_vector_of_space_is_found(name: str, positive: frozenset[int], order: list[int]) -> None:
    polys = SPACE[name]
    samples = list(cells.open_cells(polys, order, positive))
    found = {vector(polys, s) for s in samples}
    assert all(0 not in v for v in found)
    assert brute(polys, 3, positive, 4) <= found


@pytest.mark.parametrize("seed", range(25))
def test_random_curves(seed: int) -> None:
    rng = np.random.default_rng(seed)
    polys = []
    for _ in range(int(rng.integers(1, 4))):
        p = ring.ZERO
        for i in range(3):
            for j in range(3 - i):
                p = p + ring.constant(int(rng.integers(-4, 5))) * U**i * V**j
        if not ring.is_constant(p):
            polys.append(p)
    found = {vector(polys, s) for s in cells.open_cells(polys, [0, 1], ANY)}
    assert brute(polys, 2, ANY, seed) <= found


@pytest.mark.parametrize(
    ("polys", "count"),
    [
        ([], 1),
        ([U], 2),
        ([U * U - 2], 3),
        ([U * U + 1], 1),
        ([U * U * (U - 1) ** 3], 3),
        ([(U - 1) * (U - 2) * (U - 3), U * U - 3], 6),
    ],
)
def test_cells_of_a_line(polys: list[Poly], count: int) -> None:
    assert len(list(cells.open_cells(polys, [0], ANY))) == count


def test_samples_avoid_what_bounds_no_cell() -> None:
    avoid = [U, U - 1, U + 1, V, V - U - 1, U * U + V * V - 5]
    samples = list(cells.open_cells([U * U + V * V - 9], [0, 1], ANY, avoid))
    plain = list(cells.open_cells([U * U + V * V - 9], [0, 1], ANY))
    assert len(samples) == len(plain)
    assert all(0 not in vector(avoid, s) for s in samples)


def test_too_many_cells_are_refused() -> None:
    polys = [U - k for k in range(12)] + [V - k for k in range(12)]
    assert len(list(cells.open_cells(polys, [0, 1], ANY))) == 169
    with pytest.raises(cells.TooManyCells):
        list(cells.open_cells(polys, [0, 1], ANY, limit=100))


def _between(gap: cells.Gap, f: Callable[[Any], Any]) -> tuple[int, ...]:
    low, high = gap
    return tuple(f(x) for x in (low, high) if x is not None)


@pytest.mark.parametrize("bits", [8, 40, 52, 53, 60, 70, 130, 300])
@pytest.mark.parametrize("at", [0, 1, 10**6])
def test_gaps_between_roots_however_close(bits: int, at: int) -> None:
    """Two roots 2^-bits apart leave three gaps, none empty, in order, on the right sides."""
    n = 2**bits
    f = fmpz_poly([-at, 1]) * fmpz_poly([-at * n - 1, n])
    found = cells.gaps([f], False)
    assert len(found) == 3
    one, two = fmpq(at), fmpq(at * n + 1, n)
    (_, a), (b, c), (d, _) = found
    assert a is not None and b is not None and c is not None and d is not None
    assert a <= one <= b < c <= two <= d


@pytest.mark.parametrize("bits", [8, 60, 130])
def test_cells_between_curves_however_close(bits: int) -> None:
    n = 2**bits
    polys = [U - 1, U * n - n - 1]
    found = [vector(polys, s) for s in cells.open_cells(polys, [0], ANY)]
    assert sorted(found) == [(-1, -1), (1, -1), (1, 1)]
