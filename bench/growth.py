"""How the sign product of a sum of r independent roots in d parameters grows.

Run by itself, `python growth.py R D` measures one case and prints it as JSON.
"""

from __future__ import annotations

import json
import random
import subprocess
import sys
import time
from dataclasses import asdict, dataclass
from itertools import product
from pathlib import Path

from measure import ROOT, environment, python


@dataclass(frozen=True)
class Case:
    """One measurement: terms and bits of the result, seconds, and seconds of one multiplication
    of two polynomials of half its degree and half its coefficients' length."""

    roots: int
    params: int
    terms: int
    degree: int
    bits: int
    seconds: float
    multiplication: float
    product_terms: int


def measured(roots: int, params: int) -> Case:
    """The sum of the distances of one point of d-space from r fixed points (in one dimension: of a
    moving point of a line from points off it)."""
    from surdwise.field import ring
    from surdwise.field.tower import Tower
    from surdwise.thesis.formal import Length, Thesis
    from surdwise.thesis.formulations import sign_product

    rng = random.Random(roots * 10 + params)
    t = Tower()
    lengths = []
    left = ring.ZERO
    for i in range(roots):
        q = t.constant(i * i + 1 if params == 1 else i)
        for k in range(params):
            q = q + (t.param(k) - rng.randint(-9, 9)) ** 2
        t, r = t.adjoin_symbol(q)
        lengths.append(Length(t.gens[-1], q, f"root {i}"))
        left = left + r.num
    thesis = Thesis(left, ring.ZERO, t, tuple(lengths), {}, {})
    start = time.perf_counter()
    (p,) = sign_product(thesis)
    seconds = time.perf_counter() - start
    bits = max(abs(int(c.p)).bit_length() for c in p.coeffs())
    degree = int(p.total_degree())
    half = degree // 2
    f, g = (_dense(half, params, bits // 2, rng) for _ in range(2))
    start = time.perf_counter()
    fg = f * g
    multiplication = time.perf_counter() - start
    return Case(roots, params, len(p), degree, bits, seconds, multiplication, len(fg))


def _dense(degree: int, params: int, bits: int, rng: random.Random):  # type: ignore[no-untyped-def]
    from flint import fmpq

    from surdwise.field import ring

    terms = {}
    for powers in product(range(degree + 1), repeat=params):
        if sum(powers) <= degree:
            mono = [0] * (ring.MAX_GENS + ring.MAX_PARAMS)
            for k, e in enumerate(powers):
                mono[ring.param_slot(k)] = e
            terms[tuple(mono)] = fmpq(rng.getrandbits(max(bits, 1)) + 1)
    return ring.CTX.from_dict(terms)


def case(roots: int, params: int, seconds: float) -> Case | None:
    """One case in a process of its own; None where the time was out."""
    try:
        run = subprocess.run(
            python(str(Path(__file__)), str(roots), str(params)),
            capture_output=True,
            text=True,
            cwd=ROOT,
            env=environment(),
            timeout=seconds,
            check=True,
        )
    except subprocess.TimeoutExpired:
        return None
    return Case(**json.loads(run.stdout))


if __name__ == "__main__":
    print(json.dumps(asdict(measured(int(sys.argv[1]), int(sys.argv[2])))))
