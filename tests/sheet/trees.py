"""Random trees of the sheet language, as the reader would make them."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction
from typing import Any

from hypothesis import strategies as st

from surdwise.sheet import (
    FORMS,
    And,
    Binary,
    CentreOf,
    Comparison,
    Condition,
    Curve,
    Fact,
    Form,
    Kind,
    Measure,
    Named,
    Not,
    Number,
    Or,
    Pt,
    Quantity,
    Relation,
    Through,
    Unary,
)
from surdwise.sheet.checks import FEWEST
from surdwise.sheet.table import load_table

RUN_LENGTHS = {"pair": 2, "triple": 3, "quad": 4, "quint": 5, "hexa": 6}
MEASURES = [
    form
    for form in FORMS.values()
    if form.kind is Kind.QUANTITY and form.args[:1] in (("pair",), ("triple",))
]
POLYGONS = {"area": (3, 4), "perimeter": (3, 4, 5, 6)}
WORDS = load_table().words

points = st.builds(
    lambda letter, tail: Pt(letter + tail),
    st.sampled_from("ABCDEFGHIJKLMNOPQRSTUVWXYZ"),
    st.sampled_from(["", "", "", "1", "20", "'", "''"]),
)
different_points = st.lists(points, min_size=14, max_size=14, unique=True)
names = (
    st.from_regex(r"[a-z][a-z0-9_]{0,4}", fullmatch=True).filter(lambda name: name not in WORDS).map(Named)
)


@st.composite
def lines(draw: st.DrawFn) -> Curve:
    """A named line, or the line through two points."""
    two = draw(st.lists(points, min_size=2, max_size=2, unique=True))
    return draw(st.one_of(names, st.just(Through(tuple(two)))))


@st.composite
def circles(draw: st.DrawFn) -> Curve:
    """A named circle, or the circle through three points."""
    three = draw(st.lists(points, min_size=3, max_size=3, unique=True))
    return draw(st.one_of(names, st.just(Through(tuple(three)))))


numbers = st.fractions(min_value=-50, max_value=50, max_denominator=60).map(Number)


@st.composite
def measures(draw: st.DrawFn) -> Measure:
    """A measured quantity of any kind."""
    if draw(st.integers(0, 4)) == 0:
        place = draw(st.one_of(points, st.builds(CentreOf, circles())))
        return Measure("dist", (place,), draw(lines()))
    form = draw(st.sampled_from(MEASURES))
    size = draw(st.sampled_from(POLYGONS.get(form.alias, (RUN_LENGTHS[form.args[0]],))))
    run = tuple(draw(different_points)[:size])
    return Measure(form.alias, (*run, draw(st.sampled_from(run))) if form.corner else run)


def negated(arg: Quantity) -> Quantity:
    """The reader puts the minus of a number into the number."""
    return Number(-arg.value) if isinstance(arg, Number) else Unary("neg", arg)


def divided(left: Quantity, right: Quantity) -> Quantity:
    """The reader makes a number of an integer divided by an integer; 0 is no divisor."""
    if isinstance(right, Number):
        if right.value == 0:
            return left
        if isinstance(left, Number) and left.value.denominator == right.value.denominator == 1:
            return Number(left.value / right.value)
    return Binary("/", left, right)


def rooted(arg: Quantity) -> Quantity:
    """No root of a negative number."""
    return Unary("sqrt", Number(abs(arg.value)) if isinstance(arg, Number) else arg)


def extended(inner: st.SearchStrategy[Quantity]) -> st.SearchStrategy[Quantity]:
    """A quantity made of smaller ones."""
    powers = st.integers(-64, 64).map(lambda power: Number(Fraction(power)))
    return st.one_of(
        st.builds(Binary, st.sampled_from("+-*"), inner, inner),
        st.builds(Binary, st.just("*"), numbers, inner),
        st.builds(divided, inner, inner),
        st.builds(Binary, st.just("^"), inner, powers),
        st.builds(negated, inner),
        st.builds(rooted, inner),
        st.builds(Unary, st.just("abs"), inner),
    )


quantities: st.SearchStrategy[Any] = st.recursive(st.one_of(numbers, measures()), extended, max_leaves=10)


@st.composite
def worded(draw: st.DrawFn, form: Form) -> Fact | Relation:
    """A fact or relation of the form, with different points and real corners."""
    supply = iter(draw(different_points))
    args: list[Any] = []
    for index, role in enumerate(form.args):
        if form.corner is not None and index == form.corner[1]:
            corners = draw(st.permutations(args[form.corner[0]]))
            args.append(tuple(corners[:2]) if role == "pair" else corners[0])
        else:
            args.append(_argument(draw, role, form, supply))
    if form.kind in (Kind.RELATION, Kind.CONDITION):
        return Relation(form.alias, tuple(args))
    return Fact(form.alias, tuple(args))


def _argument(draw: st.DrawFn, role: str, form: Form, supply: Iterator[Pt]) -> Any:
    if role in RUN_LENGTHS:
        return tuple(next(supply) for _ in range(RUN_LENGTHS[role]))
    if role == "points":
        return tuple(next(supply) for _ in range(draw(st.integers(FEWEST.get(form.alias, 1), 5))))
    if role == "point" or (role == "place" and draw(st.booleans())):
        return next(supply)
    if role == "quantity":
        return draw(quantities.filter(lambda q: not isinstance(q, Number) or q.value > 0))
    if role == "side":
        return draw(st.sampled_from(["away from", "towards"]))
    if role == "size":
        return draw(st.sampled_from(["acute", "right", "obtuse"]))
    if role in ("name", "place") or draw(st.booleans()):
        name = draw(names)
        return CentreOf(name) if role == "place" else name
    long = role == "circle" or (role == "curve" and draw(st.booleans()))
    return Through(tuple(next(supply) for _ in range(3 if long else 2)))


facts = st.sampled_from(
    [
        form
        for form in FORMS.values()
        if form.under and form.kind not in (Kind.RELATION, Kind.CONDITION, Kind.THESIS)
    ]
).flatmap(worded)
relations = st.sampled_from(
    [
        form
        for form in FORMS.values()
        if form.kind in (Kind.RELATION, Kind.CONDITION) and not {"quantity", "condition"} & set(form.args)
    ]
).flatmap(worded)


@st.composite
def comparisons(draw: st.DrawFn) -> Comparison:
    """A chain of two to four quantities."""
    items = draw(st.lists(quantities, min_size=2, max_size=4))
    ops = draw(
        st.lists(
            st.sampled_from(["=", "<", "<=", ">", ">="]), min_size=len(items) - 1, max_size=len(items) - 1
        )
    )
    return Comparison(tuple(items), tuple(ops))


def joined(inner: st.SearchStrategy[Condition]) -> st.SearchStrategy[Condition]:
    """A condition made of smaller ones."""
    several = st.lists(inner, min_size=2, max_size=3).map(tuple)
    return st.one_of(st.builds(Not, inner), st.builds(And, several), st.builds(Or, several))


conditions: st.SearchStrategy[Any] = st.recursive(st.one_of(comparisons(), relations), joined, max_leaves=6)
