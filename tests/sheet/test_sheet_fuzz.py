"""Whatever the text: sheets or a SheetError with a place in it, and nothing else."""

from __future__ import annotations

from pathlib import Path

from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from surdwise.sheet import FORMS, SheetError, read_file, read_text, show
from surdwise.sheet.lexer import LONGEST_NUMBER
from surdwise.sheet.table import load_table

from .trees import conditions, facts

often = settings(max_examples=150, deadline=None, suppress_health_check=[HealthCheck.too_slow])

EXAMPLES = [form.example for form in FORMS.values()]
MORE = "A,B,C',AB,ABC,ABCD,P2,k,l,x,1,2,0,1/2,==,≤,√,(,),|,#,---,',Α,é"
PIECES = [*sorted(load_table().words), *MORE.split(","), "3,5"]
KEYWORDS = ["given", "provided", "claim", "title", "source", "Given", "", "---", "#"]


def survives(text: str) -> None:
    """Read the text; check the error, if any."""
    try:
        sheets = read_text(text)
    except SheetError as error:
        shown = str(error)
        lines = text.removeprefix("\ufeff").replace("\r\n", "\n").replace("\r", "\n").split("\n")
        assert 1 <= error.line <= len(lines), shown
        assert error.source == lines[error.line - 1]
        assert 1 <= error.column <= len(error.source) + 1, shown
        assert error.column < error.end <= max(len(error.source), error.column) + 1, shown
        assert "^" in shown.split("\n")[2], shown
        assert shown.isprintable() or shown.replace("\n", "").replace("\t", "").isprintable()
        shown.encode()
        assert error.message.startswith("expected")
    else:
        for sheet in sheets:
            assert sheet.given and sheet.claims
            again = read_text(show(sheet))[0]
            for before, after in zip(
                (*sheet.given, *sheet.provided, *sheet.claims),
                (*again.given, *again.provided, *again.claims),
                strict=True,
            ):
                assert before.body == after.body


@often
@given(st.text(max_size=200))
def test_any_text(text: str) -> None:
    survives(text)


@often
@given(
    st.lists(st.tuples(st.sampled_from(KEYWORDS), st.lists(st.sampled_from(PIECES), max_size=9)), max_size=5)
)
def test_heaps_of_words(heap: list[tuple[str, list[str]]]) -> None:
    survives("\n".join(f"{keyword} {' '.join(pieces)}" for keyword, pieces in heap))


@often
@given(
    st.sampled_from(["given", "provided", "claim"]),
    st.sampled_from(EXAMPLES),
    st.lists(
        st.tuples(st.integers(0, 60), st.integers(0, 3), st.sampled_from(PIECES)), min_size=1, max_size=3
    ),
)
def test_spoilt_examples(keyword: str, text: str, changes: list[tuple[int, int, str]]) -> None:
    for at, width, piece in changes:
        at = min(at, len(text))
        text = text[:at] + piece + text[at + width :]
    figure = "given points A, B, C, D, E, F\ngiven k = circle ABC\ngiven l = line AB\n"
    survives(f"{figure}{keyword} {text}\nclaim 1 = 1")


@often
@given(st.lists(facts, max_size=3), st.lists(conditions, min_size=1, max_size=2))
def test_right_statements_with_any_names(figure: list[object], claims: list[object]) -> None:
    lines = [f"given {show(fact)}" for fact in figure]  # type: ignore[arg-type]
    lines.extend(f"claim {show(claim)}" for claim in claims)  # type: ignore[arg-type]
    survives("\n".join(lines))


@settings(max_examples=150, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture])
@given(data=st.binary(max_size=200))
def test_any_bytes(tmp_path: Path, data: bytes) -> None:
    path = tmp_path / "any.claim"
    path.write_bytes(data)
    try:
        read_file(path)
    except SheetError as error:
        str(error).encode()


LONG = 60_000


def test_long_lines() -> None:
    for unit in (
        "A",
        "a",
        "1",
        " ",
        "(",
        ")",
        "|",
        "|AB|",
        "1+",
        "1*",
        "-",
        "not ",
        "A,",
        "AB ",
        "or ",
        "=1",
        "'",
        "1/",
        ".",
    ):
        for keyword in "given", "claim":
            survives(f"given triangle ABC\n{keyword} {unit * (LONG // len(unit))}")
    survives("given points " + ", ".join(f"A{i}" for i in range(8_000)) + "\nclaim 1 = 1")
    survives("given point A\nclaim 1" + " = 1" * 10_000)
    survives("given point A\nclaim " + " or ".join(["1 = 1 and 2 = 2"] * 3_000))
    survives("given point A\nclaim 1" + "/2" * 180 + " = " + "9" * LONGEST_NUMBER)


def test_many_lines() -> None:
    survives("given points A, B, C\nclaim |AB| < |AC|\n---\n" * 1_000)
    survives("given triangle ABC\n" * 2_000)
    survives("\n".join(f"given A{i} = midpoint of A{i - 1}A{i + 1}" for i in range(1_000)))
