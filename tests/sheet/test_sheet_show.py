"""What show prints reads as an equal tree, with no more parentheses than it takes."""

from __future__ import annotations

import pytest
from hypothesis import given, settings

from surdwise.sheet import Fact, Quantity, Relation, read_line, show

from .trees import conditions, facts, quantities

often = settings(max_examples=200, deadline=None)


@often
@given(quantities)
def test_a_quantity_prints_and_reads_as_itself(tree: Quantity) -> None:
    body = read_line("claim", f"{show(tree)} = 1")
    assert body == read_line("claim", f"({show(tree)}) = 1")
    assert getattr(body, "items")[0] == tree  # noqa: B009


@often
@given(conditions)
def test_a_condition_prints_and_reads_as_itself(tree: Relation) -> None:
    text = show(tree)
    assert read_line("claim", text) == tree
    assert read_line("provided", f"({text})") == tree


@often
@given(facts)
def test_a_fact_prints_and_reads_as_itself(tree: Fact) -> None:
    assert read_line("given", show(tree)) == tree


PARENTHESES = (
    "(|AB| + |CD|)*|EF|",
    "|AB| + |CD|*|EF|",
    "|AB| - (|CD| - |EF|)",
    "|AB| - |CD| - |EF|",
    "|AB|/(|CD|*|EF|)",
    "|AB|/|CD|/|EF|",
    "(|AB|/2)^2",
    "|AB|^2/3",
    "2(|AB| + |CD|)",
    "1/2|AB|",
    "1/2|AB|^2",
    "|AB|*(1/2)",
    "-2|AB|",
    "-|AB| + |CD|",
    "-(|AB| + |CD|)",
    "|AB| + (-|CD|)",
    "2*3",
    "2*3^2",
    "(-2)^3",
    "(1/2)^3",
    "2/(1/3)",
    "sqrt(|AB| + 1)",
    "abs(-|AB|)",
)


@pytest.mark.parametrize("text", PARENTHESES)
def test_parentheses_where_they_are_needed(text: str) -> None:
    assert show(read_line("claim", f"{text} = 1")) == f"{text} = 1"
    assert show(read_line("claim", f"(({text})) = 1")) == f"{text} = 1"


LOGIC = (
    "A, B distinct and C, D distinct or A, C distinct",
    "A, B distinct and (C, D distinct or A, C distinct)",
    "not (A, B distinct and C, D distinct)",
    "not A, B distinct and C, D distinct",
    "not not A, B distinct",
    "(A, B distinct and C, D distinct) and A, C distinct",
    "A, B distinct or (C, D distinct or A, C distinct)",
)


@pytest.mark.parametrize("text", LOGIC)
def test_parentheses_of_conditions(text: str) -> None:
    assert show(read_line("claim", text)) == text


def test_show_refuses_what_is_no_node() -> None:
    with pytest.raises(TypeError, match="expected a node of a sheet's tree, got float"):
        show(1.5)  # type: ignore[arg-type]
