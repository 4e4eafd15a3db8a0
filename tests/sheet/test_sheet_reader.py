"""What the reader makes of sheets and files that are right, and of files that are not."""

from __future__ import annotations

import os
import pickle
from fractions import Fraction
from pathlib import Path

import pytest

from surdwise.sheet import (
    And,
    Binary,
    CentreOf,
    Comparison,
    Condition,
    Fact,
    Measure,
    Named,
    Not,
    Number,
    Or,
    Pt,
    Relation,
    Sheet,
    SheetError,
    Span,
    Through,
    Unary,
    read_file,
    read_line,
    read_text,
    show,
)
from surdwise.sheet.lessons import PLACES

CHORDS = """\
title    Sum of chords from a point of the circle
source   The Ruled Margin, number 7
given    equilateral triangle ABC   # the frame
given    P on circle ABC
provided P and A on opposite sides of BC
claim    |PA| = |PB| + |PC|
"""

AB = Measure("length", (Pt("A"), Pt("B")))
AC = Measure("length", (Pt("A"), Pt("C")))
ABC = (Pt("A"), Pt("B"), Pt("C"))


def test_a_sheet_in_full() -> None:
    (sheet,) = read_text(CHORDS, "chords.claim")
    assert sheet.file == "chords.claim"
    assert sheet.title == "Sum of chords from a point of the circle"
    assert sheet.source == "The Ruled Margin, number 7"
    assert sheet.text == CHORDS
    triangle, on_circle = sheet.given
    assert triangle.body == Fact("equilateral_triangle", (ABC,))
    assert triangle.text == "equilateral triangle ABC"
    assert triangle.span == Span(3, 10, 34)
    assert on_circle.body == Fact("on_circle", (Pt("P"), Through(ABC)))
    (condition,) = sheet.provided
    assert condition.body == Relation("opposite_sides", (Pt("P"), Pt("A"), Through((Pt("B"), Pt("C")))))
    (claim,) = sheet.claims
    lengths = [Measure("length", (Pt("P"), Pt(name))) for name in "ABC"]
    assert claim.body == Comparison((lengths[0], Binary("+", lengths[1], lengths[2])), ("=",))
    assert [line.keyword for line in (triangle, condition, claim)] == ["given", "provided", "claim"]


def test_places_of_nodes() -> None:
    (sheet,) = read_text(CHORDS)
    body = sheet.claims[0].body
    assert isinstance(body, Comparison)
    assert body.span == Span(6, 10, 28)
    total = body.items[1]
    assert isinstance(total, Binary)
    assert total.span == Span(6, 17, 28)
    assert isinstance(total.right, Measure)
    assert total.right.span == Span(6, 24, 28)
    assert total.right.points[1].span == Span(6, 26, 27)


def test_several_sheets_in_a_file_keep_their_lines() -> None:
    text = CHORDS + "--- # next\n\ngiven triangle ABC\nclaim |AB| < |AC| + |BC|\nclaim 1 = 1\n---\n"
    first, second = read_text(text)
    assert first.text == CHORDS
    assert second.text == "\ngiven triangle ABC\nclaim |AB| < |AC| + |BC|\nclaim 1 = 1\n"
    assert second.given[0].span.line == 9
    assert len(second.claims) == 2
    assert read_text(second.text)[0].claims == second.claims


def test_keywords_may_come_in_any_order() -> None:
    (sheet,) = read_text(
        "claim |PA| = |PB|\nprovided P inside ABC\n  given triangle ABC\n\tgiven point P\ntitle x"
    )
    assert [line.text for line in sheet.given] == ["triangle ABC", "point P"]
    assert sheet.title == "x"


@pytest.mark.parametrize("end", ["\n", "\r\n", "\r"])
def test_line_ends_do_not_matter(end: str) -> None:
    assert read_text(CHORDS.replace("\n", end), "chords")[0] == read_text(CHORDS, "chords")[0]


def test_constraints_may_follow_a_point() -> None:
    figure = ("triangle ABC", "X on line AB", "X on line BC", "triangle ABX", "|XA| = 1")
    (sheet,) = read_text("".join(f"given {line}\n" for line in figure) + "claim 1 = 1")
    assert tuple(line.text for line in sheet.given) == figure


def test_points_and_names_left_unused_are_fine() -> None:
    read_text("given triangle ABC\ngiven k = circle ABC\ngiven X on circle k\nclaim |AB| = |AC|")


READINGS: tuple[tuple[str, Condition], ...] = (
    ("|AB| < |AC| <= 2", Comparison((AB, AC, Number(Fraction(2))), ("<", "<="))),
    ("2|AB| = 1", Comparison((Binary("*", Number(Fraction(2)), AB), Number(Fraction(1))), ("=",))),
    ("1/2|AB| = 0.25", Comparison((Binary("*", Number(Fraction(1, 2)), AB), Number(Fraction(1, 4))), ("=",))),
    (
        "-|AB|^2 = -3/4",
        Comparison((Unary("neg", Binary("^", AB, Number(Fraction(2)))), Number(Fraction(-3, 4))), ("=",)),
    ),
    ("|AB|^-2 = 1", Comparison((Binary("^", AB, Number(Fraction(-2))), Number(Fraction(1))), ("=",))),
    (
        "|AB|/|AC|/2 = 1",
        Comparison((Binary("/", Binary("/", AB, AC), Number(Fraction(2))), Number(Fraction(1))), ("=",)),
    ),
    ("median(ABC, A) = 1", Comparison((Measure("median", (*ABC, Pt("A"))), Number(Fraction(1))), ("=",))),
    (
        "dist(centre of k, l) = 1",
        Comparison((Measure("dist", (CentreOf(Named("k")),), Named("l")), Number(Fraction(1))), ("=",)),
    ),
    (
        "not A, B, C collinear and AB parallel to l or ABC acute",
        Or(
            (
                And(
                    (
                        Not(Relation("collinear", (ABC,))),
                        Relation("parallel_lines", (Through((Pt("A"), Pt("B"))), Named("l"))),
                    )
                ),
                Relation("triangle_size", (ABC, "acute")),
            )
        ),
    ),
    ("(|AB| = 1)", Comparison((AB, Number(Fraction(1))), ("=",))),
    ("((|AB|)) = (1)", Comparison((AB, Number(Fraction(1))), ("=",))),
)


@pytest.mark.parametrize(("text", "tree"), READINGS)
def test_readings(text: str, tree: Condition) -> None:
    assert read_line("claim", text) == tree


def test_facts_take_their_arguments_in_order() -> None:
    fact = read_line("given", "D, E = corners of square on BC away from A")
    assert fact == Fact("square_corners", (Pt("D"), Pt("E"), (Pt("B"), Pt("C")), "away from", Pt("A")))
    fact = read_line("given", "k = circle with centre O and radius 2|AB|")
    assert fact == Fact("circle_centre_radius", (Named("k"), Pt("O"), Binary("*", Number(Fraction(2)), AB)))
    assert read_line("given", "points A, B, C") == Fact("points", (ABC,))
    assert read_line("given", "|AB| = |AC|") == Comparison((AB, AC), ("=",))
    meet = read_line("given", "X = meet of line l and circle ABC other than A")
    assert meet == Fact("meet_other", (Pt("X"), Named("l"), Through(ABC), Pt("A")))


def test_exact_numbers() -> None:
    long = "0." + "3" * 900
    body = read_line("claim", f"|AB| = {long}")
    assert isinstance(body, Comparison)
    assert body.items[1] == Number(Fraction(long))


def test_the_limits_themselves_are_allowed() -> None:
    read_line("claim", "(" * 200 + "1" + ")" * 200 + " = 1")
    read_line("claim", "1" + " + 1" * 190 + " = 1")
    body = read_line("claim", "not " * 190 + "|AB|^64 = 1")
    assert read_line("claim", show(body)) == body
    assert hash(body) == hash(read_line("claim", show(body)))


def test_read_line_takes_only_statements() -> None:
    with pytest.raises(SheetError, match="expected given, provided or claim"):
        read_line("title", "x")


# ---------------------------------------------------------------- files


def write(path: Path, data: bytes) -> Path:
    path.write_bytes(data)
    return path


def test_a_file_with_a_byte_order_mark(tmp_path: Path) -> None:
    path = write(tmp_path / "chords.claim", b"\xef\xbb\xbf" + CHORDS.encode())
    (sheet,) = read_file(path)
    assert sheet.file == str(path)
    assert sheet.given[0].span.column == 10


def failure(path: str | os.PathLike[str]) -> SheetError:
    with pytest.raises(SheetError) as caught:
        read_file(path)
    return caught.value


def test_files_that_cannot_be_read(tmp_path: Path) -> None:
    write(tmp_path / "chords.claim", CHORDS.encode())
    missing = failure(tmp_path / "chord.claim")
    assert str(missing).startswith(f"{tmp_path / 'chord.claim'}: expected a claim sheet, got no such file")
    assert f"did you mean {tmp_path / 'chords.claim'}?" in str(missing)
    assert "no such file" in str(failure(tmp_path / "nowhere" / "chords.claim"))
    assert "got a folder" in str(failure(tmp_path))
    assert "cannot be read" in str(failure(str(tmp_path / "a\0b")))
    assert "cannot be read" in str(failure(tmp_path / ("x" * 5000)))
    assert "cannot be read" in str(failure(tmp_path / "chords.claim" / "inner"))


@pytest.mark.skipif(
    not hasattr(os, "geteuid") or os.geteuid() == 0, reason="the superuser may read everything"
)
def test_a_file_without_permission(tmp_path: Path) -> None:
    path = write(tmp_path / "chords.claim", CHORDS.encode())
    path.chmod(0)
    assert "may not be read" in str(failure(path))


def test_bytes_that_are_not_utf8(tmp_path: Path) -> None:
    error = failure(write(tmp_path / "a.claim", b"given triangle ABC\r\ntitle caf\xe9 x\r\nclaim 1 = 1"))
    assert "got the byte 0xE9 at offset 29" in str(error)
    assert (error.line, error.column, error.source) == (2, 10, "title caf\ufffd x")
    assert str(error).splitlines()[2] == " " * 9 + "^"
    error = failure(write(tmp_path / "b.claim", CHORDS.encode("utf-16")))
    assert "this is UTF-16" in str(error)
    assert error.line == 1


def test_files_that_are_too_large(tmp_path: Path) -> None:
    for data in (b"#" * 1_000_001, "é".encode() * 1_000_001, b"\xff" * 5_000_000, "日".encode() * 2_000_000):
        error = failure(write(tmp_path / "a.claim", data))
        assert "at most 1000000 characters" in str(error)
        assert len(str(error).splitlines()) == 2
    with pytest.raises(SheetError, match="at most 1000000"):
        read_text("#" * 1_000_001)
    assert read_text(CHORDS + "#" * (1_000_000 - len(CHORDS)))[0].title


# ---------------------------------------------------------------- messages


def message(text: str) -> list[str]:
    with pytest.raises(SheetError) as caught:
        read_text(text, "issue.claim")
    return str(caught.value).splitlines()


def test_a_message_in_full() -> None:
    assert message("title Example\n\ngiven    triangle AB") == [
        "issue.claim:3:19: expected three points such as ABC, got `AB` (two points)",
        "given    triangle AB",
        "                  ^^",
    ]
    assert message("given trangle ABC") == [
        f"issue.claim:1:7: expected {PLACES[0].expected}, got `trangle`",
        "given trangle ABC",
        "      ^^^^^^^",
        "did you mean `triangle`?",
    ]


def test_carets_stand_under_their_place_behind_tabs_and_wide_characters() -> None:
    assert message("\tgiven\ttriangle\tAB")[1:3] == ["\tgiven\ttriangle\tAB", "\t     \t        \t^^"]
    assert message("given 日本 AB")[1:3] == ["given 日本 AB", "      ^^"]
    error = SheetError("x", "f", 1, 3, 5, "日本ab", "")
    assert str(error).splitlines()[2] == "    ^^"
    error = SheetError("x", "f", 1, 1, 3, "日本ab", "")
    assert str(error).splitlines()[2] == "^^^^"
    error = SheetError("x", "f", 1, 3, 4, "e\u0301x", "")
    assert str(error).splitlines()[2] == " ^"


def test_what_does_not_print_is_made_visible() -> None:
    lines = message("given triangle A\x1b[31mB")
    assert lines[1] == "given triangle A\ufffd[31mB"
    assert lines[2] == " " * 16 + "^"
    assert "\x1b" not in "\n".join(lines)
    "\n".join(message("given triangle \udcff")).encode()


def test_a_long_line_is_cut_round_its_place() -> None:
    text = "claim " + "|AB| + " * 100 + "x" + " + |AB|" * 100
    _, line, carets, *_ = message(f"given triangle ABC\n{text}")
    assert len(line) <= 162
    assert line.startswith("…") and line.endswith("…")
    assert line[carets.index("^")] == "x"


def test_an_error_survives_pickling() -> None:
    with pytest.raises(SheetError) as caught:
        read_text("given triangle AB", "issue.claim")
    again = pickle.loads(pickle.dumps(caught.value))
    assert str(again) == str(caught.value)
    assert again.column == 16


def test_a_sheet_survives_pickling() -> None:
    sheets = read_text(CHORDS)
    assert pickle.loads(pickle.dumps(sheets)) == sheets
    assert isinstance(sheets[0], Sheet)


def test_show_of_a_sheet_reads_as_the_same_sheet() -> None:
    (sheet,) = read_text(CHORDS)
    (again,) = read_text(show(sheet))
    assert show(sheet) == CHORDS.replace("   # the frame", "")
    assert [line.body for line in again.given] == [line.body for line in sheet.given]
    assert [line.body for line in again.claims] == [line.body for line in sheet.claims]
