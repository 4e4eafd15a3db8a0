"""The engine SymPy: its Groebner bases over Q(U), by the same steps as for Singular.

Lexicographic order, later unknowns larger: the hypotheses are a Groebner basis in it as they stand,
which spares this engine most of its time."""

from __future__ import annotations

import time
from collections.abc import Sequence
from importlib.metadata import PackageNotFoundError, version
from importlib.util import find_spec
from math import prod
from typing import Any

from ..thesis.formulations import Formulation
from ..thesis.parts import Status
from .engine import Answer, Eliminated, Engine, split, together
from .plain import Terms, system, terms, thesis_names, variables
from .problem import Problem


class SympyEngine(Engine):
    """The library SymPy."""

    name = "sympy"

    def version(self) -> str | None:
        """The installed version."""
        if find_spec("sympy") is None:
            return None
        try:
            return version("sympy")
        except PackageNotFoundError:
            return "unknown"

    def load(self) -> None:
        """The modules that take most of a second to import."""
        import sympy.polys.groebnertools
        import sympy.polys.rings  # noqa: F401

    def decide(self, p: Problem, f: Formulation, mebibytes: int | None) -> Answer:
        """Ask about each component in a ring of its own."""
        return self._ask(p, *split(p, f.polynomials))

    def decide_plain(self, p: Problem, thesis: Sequence[Terms], mebibytes: int | None) -> Answer:
        """The same for polynomials that were eliminated here."""
        defined = [q for q in _numbers(p) if variables([q]) & variables(thesis)]
        return self._ask(p, thesis, defined)

    def _ask(self, p: Problem, thesis: Sequence[Terms], definitions: Sequence[Terms]) -> Answer:
        seconds = 0.0
        found = []
        for figure in p.figures:
            s = system(p, figure, thesis, definitions)
            start = time.perf_counter()
            found.append(_status(s.parameters, s.unknowns, s.hypotheses, thesis))
            seconds += time.perf_counter() - start
        return Answer(together(found), seconds)

    def eliminate(self, p: Problem, f: Formulation, mebibytes: int | None) -> Eliminated:
        """A lexicographic basis of the auxiliary ideal with the lengths first."""
        from sympy.polys.groebnertools import groebner

        thesis, definitions = split(p, f.polynomials)
        used = variables([*thesis, *definitions])
        lengths = [f"d{x.gen.index}" for x in reversed(p.thesis.lengths) if f"d{x.gen.index}" in used]
        if not lengths:
            return Eliminated(tuple(thesis), 0.0)
        start = time.perf_counter()
        ring, made = _ring((), (*lengths, *sorted(used - set(lengths))))
        given = [q for q in (_built(made, x) for x in [*thesis, *definitions]) if q]
        basis = groebner(given, ring)
        rest = [b for b in basis if all(m[: len(lengths)] == (0,) * len(lengths) for m in b)]
        seconds = time.perf_counter() - start
        known = {frozenset(q) for q in _numbers(p)}
        polys = [_plain(b, [str(x) for x in ring.symbols]) for b in rest]
        return Eliminated(tuple(q for q in polys if frozenset(q) not in known), seconds)


def _numbers(p: Problem) -> list[Terms]:
    """Equations of the thesis' numeric roots."""
    names = thesis_names(p)
    return [terms(g.modulus, names) for g in p.thesis.tower.gens if g.label == "number"]


def _ring(parameters: Sequence[str], unknowns: Sequence[str]) -> tuple[Any, dict[str, Any]]:
    """SymPy's ring Q(parameters)[unknowns] and its variables by name."""
    from sympy import QQ
    from sympy.polys.orderings import lex
    from sympy.polys.rings import ring

    domain = QQ.frac_field(*parameters) if parameters else QQ
    names = list(unknowns) or ["c"]
    r, *gens = ring(names, domain, lex)
    made = dict(zip(names, gens, strict=True))
    if parameters:
        made.update(zip(parameters, map(r.ground_new, domain.gens), strict=True))
    return r, made


def _built(made: dict[str, Any], p: Terms) -> Any:
    """A polynomial term by term."""
    ring = next(iter(made.values())).ring
    out = ring.zero
    for c, powers in p:
        term = ring.ground_new(c)
        for v, e in powers:
            term = term * made[v] ** e
        out += term
    return out


def _plain(p: Any, names: Sequence[str]) -> Terms:
    _, p = p.clear_denoms()
    _, p = p.primitive()
    return tuple((int(c), tuple((names[k], e) for k, e in enumerate(m) if e)) for m, c in p.terms())


def _status(
    parameters: Sequence[str], unknowns: Sequence[str], hypotheses: Sequence[Terms], thesis: Sequence[Terms]
) -> Status:
    from sympy.polys.groebnertools import groebner

    ring, made = _ring(parameters, unknowns)
    basis = groebner([_built(made, q) for q in hypotheses], ring) if hypotheses else []
    if ring.one in basis:
        return Status.NONE
    rests = [_built(made, q).rem(basis) if basis else _built(made, q) for q in thesis]
    rests = [n for n in rests if n]
    if not rests:
        return Status.TRUE
    if ring.one in groebner([*basis, *rests], ring):
        return Status.FALSE
    # a nilpotent element is 0 in every power past the dimension of the ring over Q(U)
    power = 1
    while power < _dimension(hypotheses):
        rests = [n for n in ((n * n).rem(basis) for n in rests) if n]
        if not rests:
            return Status.TRUE
        power *= 2
    return Status.PARTS


def _dimension(hypotheses: Sequence[Terms]) -> int:
    """A bound: of a triangular system the product of the degrees in the unknowns defined."""
    return prod(max((e for _, powers in q for _, e in powers), default=1) for q in hypotheses)
