"""Every engine answers the same, what `decide` says, and what is known of published statements."""

from __future__ import annotations

import pytest
import sympy as sp  # type: ignore[import-untyped]

import surdwise
from surdwise.benchmark.by_singular import SingularEngine, read
from surdwise.benchmark.by_sympy import SympyEngine
from surdwise.benchmark.by_tower import TowerEngine
from surdwise.benchmark.engine import Engine, split, together
from surdwise.benchmark.engines import ENGINES, EngineError, engines
from surdwise.benchmark.plain import Terms, terms, text, thesis_names
from surdwise.benchmark.problem import NoProblem, problem
from surdwise.field.ring import TooLarge
from surdwise.thesis.formulations import formulate
from surdwise.thesis.parts import Form, Status

from ..field.outside import needs_singular
from .sheets import CASES, EXAMPLES, sheet
from .sheets import text as sheet_text

LETTERS = {"T": Status.TRUE, "F": Status.FALSE, "P": Status.PARTS}
every = pytest.mark.parametrize("name", CASES)
ENGINE = {
    "singular": pytest.param(SingularEngine(), marks=needs_singular, id="singular"),
    "sympy": pytest.param(SympyEngine(), id="sympy"),
}


@every
def test_the_tower_engine_knows_published_statements(name: str) -> None:
    s = sheet(name)
    p = problem(s, s.claims[0].body)
    got = [
        TowerEngine().decide(p, formulate(p.thesis, f), None).status
        for f in (Form.AUXILIARY, Form.SQUARED, Form.SIGN_PRODUCT, Form.ELIMINANT)
    ]
    expected = [LETTERS[x] for x in CASES[name][2]]
    assert got == [*expected, expected[-1]]


@pytest.mark.parametrize("engine", ENGINE.values())
@every
def test_general_engines_answer_like_the_towers(name: str, engine: Engine) -> None:
    s = sheet(name)
    p = problem(s, s.claims[0].body)
    for form in Form:
        if form is Form.ELIMINANT and name in ("Ptolemy, free", "third of a side"):
            continue  # high powers of the sign product: minutes for a general engine
        f = formulate(p.thesis, form)
        assert engine.decide(p, f, None).status is TowerEngine().decide(p, f, None).status, form


def equalities() -> list[tuple[str, int]]:
    """Equalities of the examples that have a problem and whose parts are soon found."""
    out = []
    for path in sorted(EXAMPLES.glob("*.claim")):
        if path.stem in ("centre-distances", "three-distances", "no-such-figure", "square-and-midpoint"):
            # seconds each, measured by the bench; no figure; lengths that are numbers, which stand as
            # positive numbers here and with both signs in `decide`
            continue
        (s,) = surdwise.read(path)
        out += [
            (path.name, i)
            for i, line in enumerate(s.claims)
            if "parallel" not in line.text and "perpendicular" not in line.text
        ]
    return out


@pytest.mark.parametrize(("file", "number"), equalities())
def test_statuses_are_those_of_decide(file: str, number: int) -> None:
    """`decide` works on the claim in the figure's field, the engine on the formulation's polynomials: two
    ways to one status.  The minimal polynomial is left out: `decide` follows the signs of a real figure,
    the polynomial in plain coordinates does not know them."""
    (s,) = surdwise.read(EXAMPLES / file)
    line = s.claims[number]
    p = problem(s, line.body)
    (d,) = surdwise.decide(surdwise.read(one_claim(file, number))[0], frame="cartesian")
    for form in (Form.AUXILIARY, Form.SQUARED, Form.SIGN_PRODUCT):
        status = TowerEngine().decide(p, formulate(p.thesis, form), None).status
        assert status.value == d.algebraic[form.value], form


def one_claim(file: str, number: int) -> str:
    """An example's text with one of its claims."""
    lines = (EXAMPLES / file).read_text("utf-8").splitlines()
    claims = [x for x in lines if x.startswith("claim")]
    return "\n".join([*(x for x in lines if not x.startswith("claim")), claims[number]]) + "\n"


def as_sympy(p: Terms) -> sp.Expr:
    """Plain data as an expression."""
    return sp.Add(*(sp.Mul(c, *(sp.Symbol(v) ** e for v, e in powers)) for c, powers in p))


@pytest.mark.parametrize("engine", ENGINE.values())
@pytest.mark.parametrize(
    "name", ["chords", "point of a line", "three free points", "Euler line", "two circles"]
)
def test_elimination_finds_the_sign_product(name: str, engine: Engine) -> None:
    """The lengths eliminated by another system leave the factors of our sign product."""
    s = sheet(name)
    p = problem(s, s.claims[0].body)
    done = engine.eliminate(p, formulate(p.thesis, Form.AUXILIARY), None)
    ours = terms(formulate(p.thesis, Form.SIGN_PRODUCT).polynomials[0], thesis_names(p))
    if not ours:
        assert all(not as_sympy(q) for q in done.polynomials)
        return
    (theirs,) = done.polynomials
    assert factors(theirs) == factors(ours)
    product = formulate(p.thesis, Form.SIGN_PRODUCT)
    assert (
        engine.decide_plain(p, done.polynomials, None).status is TowerEngine().decide(p, product, None).status
    )


def factors(p: Terms) -> set[sp.Expr]:
    """Irreducible factors, up to sign."""
    return {max(f, sp.expand(-f), key=str) for f, _ in sp.factor_list(as_sympy(p))[1]}


@needs_singular
def test_what_singular_prints_is_read_back() -> None:
    p: Terms = ((3, (("c5", 2), ("u0", 1))), (-1, (("u0", 3),)), (7, ()))
    assert set(read("3*c5^2*u0-u0^3+7")) == set(p)
    assert text(p) == "3*c5^2*u0+(-1)*u0^3+7"


def test_a_thesis_that_is_nilpotent_is_generally_true() -> None:
    """Where two points coincide on every figure their distance d has d^2 = 0: d is no zero of the ring and
    yet vanishes on every component."""
    s = sheet_text("given points A, B\ngiven M = midpoint of AB\ngiven N = midpoint of BA\nclaim |MN| = 0\n")
    p = problem(s, s.claims[0].body)
    f = formulate(p.thesis, Form.AUXILIARY)
    chosen = [e for e in engines() if e.name in ENGINES]
    assert {e.decide(p, f, None).status for e in chosen} == {Status.TRUE}


def test_what_is_no_problem_says_so() -> None:
    s = sheet_text("given points P, Q, X\nclaim |PX| + |XQ| >= |PQ|\n")
    with pytest.raises(NoProblem, match="not an equality"):
        problem(s, s.claims[0].body)
    s = sheet_text("given triangle ABC\ngiven A, B, C collinear\nclaim |AB| = |AC|\n")
    with pytest.raises(NoProblem, match="no component"):
        problem(s, s.claims[0].body)
    many = "".join(f"given Q{i} = meet of l and AP{i}\n" for i in range(1, 6))
    points = ", ".join(f"P{i}" for i in range(1, 6))
    s = sheet_text(
        f"given points A, B, {points}\ngiven l = perpendicular to AB through B\n{many}"
        "claim |Q1P2| + |Q2P3| + |Q3P4| = |Q4P5| + |Q5P1|\n"
    )
    with pytest.raises(TooLarge):
        problem(s, s.claims[0].body)


def test_named_curves_stand_in_claims() -> None:
    s = sheet_text(
        "given triangle ABC\ngiven k = circle ABC\ngiven l = line AB\nclaim dist(C, l) = altitude(ABC, C)\n"
    )
    p = problem(s, s.claims[0].body)
    assert TowerEngine().decide(p, formulate(p.thesis, Form.SIGN_PRODUCT), None).status is Status.TRUE


def test_a_status_over_several_systems() -> None:
    assert together([]) is Status.NONE
    assert together([Status.TRUE, Status.NONE]) is Status.TRUE
    assert together([Status.TRUE, Status.FALSE]) is Status.PARTS
    assert together([Status.FALSE, Status.FALSE]) is Status.FALSE


def test_engines_are_named() -> None:
    assert [e.name for e in engines(("tower",))] == ["tower"]
    with pytest.raises(EngineError, match="expected one of tower, singular, sympy as engine, got abacus"):
        engines(("abacus",))


def test_definitions_come_apart_from_the_thesis() -> None:
    s = sheet("chords")
    p = problem(s, s.claims[0].body)
    thesis, definitions = split(p, formulate(p.thesis, Form.AUXILIARY).polynomials)
    assert len(thesis) == 1 and len(definitions) == 3
