"""Every mistake is answered at its place, in words that help.

The wrong part of each text stands between « and », which are taken out before reading.
"""

from __future__ import annotations

import re
from dataclasses import dataclass

import pytest

from surdwise.sheet import SheetError, read_text

FIGURE = """\
given    triangle ABC
given    points D, E
given    P on line AB
given    k = circle ABC
given    l = line AB
"""


@dataclass(frozen=True)
class Row:
    """One wrong statement under a keyword, and what the message must say of it."""

    keyword: str
    text: str
    said: tuple[str, ...]


def row(keyword: str, text: str, *said: str) -> Row:
    """A row of the table below."""
    return Row(keyword, text, said)


STATEMENTS = (
    # ------------------------------------------------ under the wrong keyword
    row("given", "«C between A and B»", "got a condition", "conditions belong under `provided`"),
    row("given", "«A, B distinct»", "provided A, B distinct"),
    row("given", "«|AB| < |AC|»", "got a condition", "conditions belong under `provided`"),
    row("given", "«not A, B, C collinear»", "conditions belong under `provided`"),
    row("given", "«ABC equilateral»", "write `given equilateral triangle ABC`"),
    row("given", "«triangle ABC isosceles with apex A»", "write `given isosceles triangle ABC with apex A`"),
    row("given", "«|AB| = |AC| = 2»", "one equation", "one given line for each link"),
    row("given", "«AB parallel to CD and A, B, P collinear»", "one relation", "one given line for each"),
    row("given", "P and C on the same «sid» of AB", "did you mean `side`? (conditions belong under"),
    row("provided", "«M = midpoint of AB»", "got a construction", "given M = midpoint of AB"),
    row("claim", "«m = circle ABD»", "expected a statement", "constructions belong under `given`"),
    row("claim", "M = «midpont» of AB", "did you mean `midpoint`?", "constructions belong under `given`"),
    # ------------------------------------------------ number of points
    row("given", "triangle «AB»", "expected three points such as ABC", "(two points)"),
    row("given", "triangle «ABCD»", "expected three points", "(four points)"),
    row("given", "square «ABC»", "expected four points such as ABCD", "(three points)"),
    row("given", "triangle «ABCDEFG»", "(more than six points)"),
    row("given", "M = midpoint of «ABC»", "expected two points such as AB"),
    row("given", "regular pentagon «ABCD»", "expected five points such as ABCDE"),
    row("claim", "|«ABC»| = 1", "expected two points such as AB", "(three points)"),
    row("claim", "|«A»| = 1", "expected two points", "(one point)"),
    row("claim", "area(«AB») = 1", "expected three points such as ABC or four points such as ABCD"),
    row("claim", "cos(«A») = 1", "expected three points", "vertex in the middle"),
    row("claim", "angle «A» acute", "expected three points", "vertex in the middle"),
    row("given", "X on bisector of angle «A»", "vertex in the middle"),
    row("claim", "«A, B» collinear", "at least three points", "got two"),
    row("claim", "«A, B, C» concyclic", "at least four points", "got three"),
    # ------------------------------------------------ repeated points and wrong corners
    row("given", "triangle X«X»Y", "expected three different points, got X twice"),
    row("claim", "|«AA»| = 1", "the distance of A to itself"),
    row("claim", "cos(AB«A») = 1", "three different points, got A twice"),
    row("claim", "A, B, «A» distinct", "got A twice"),
    row("claim", "A between «A» and B", "three different points"),
    row("claim", "«A» inside ABC", "other than the corners of ABC"),
    row("given", "points X, «X»", "got X twice"),
    row("given", "X, «X» = corners of square on BC away from A", "two different corners"),
    row("given", "l2 = line A«A»", "two different points, got A twice"),
    row("claim", "median(ABC, «D») = 1", "expected a corner of ABC, got D", "write A, B or C"),
    row("claim", "exradius(ABC, «P») = 1", "expected a corner of ABC, got P"),
    row("given", "isosceles triangle ABC with apex «D»", "expected a corner of ABC, got D"),
    row("given", "right triangle ABC with right angle at «D»", "expected a corner of ABC, got D"),
    row("given", "J = excentre of ABC opposite «D»", "expected a corner of ABC"),
    row("given", "T = touch point of incircle of ABC on B«D»", "expected a corner of ABC, got D"),
    row("claim", "P and «A» on the same side of AB", "expected a point off the line AB"),
    row("claim", "P and «P» on the same side of CD", "two different points"),
    row("given", "X = apex of equilateral triangle on BC away from «B»", "a point off the line BC"),
    row("given", "X = meet of AB and «BA»", "two different curves"),
    row("given", "k2 = circle with centre A and radius «0»", "a positive radius"),
    # ------------------------------------------------ lengths and other quantities
    row("claim", "|AB «=» 3", "expected a closing `|`", "bar on either side: |AB|"),
    row("claim", "AB «=» CD", "between bars: |AB|"),
    row("claim", "|AB| = «CD»", "expected a quantity", "between bars: |AB|"),
    row("claim", "2«AB» = 3", "between bars: |AB|"),
    row("claim", "sqrt(«AB») = 3", "expected a quantity"),
    row("claim", "|«A» B| = 3", "write the points of one figure together"),
    row("claim", "|AB|/2«|»CD| = 3", "can be read in two ways: write (|AB|/2)*|CD| or |AB|/(2|CD|)"),
    row("claim", "|AB|/2«(»|CD|) = 3", "can be read in two ways"),
    row("claim", "|AB|/2«sqrt»(3) = 3", "can be read in two ways"),
    row("claim", "|AB|«|»CD| = 3", "write * between two factors"),
    row("claim", "|AB| «2» = 3", "write * between two factors"),
    row("claim", "|AB| = |AC|«sqrt»(3)", "write * between two factors"),
    row("claim", "|«|»AB| - |CD|| = 3", "abs(...)"),
    row("claim", "|AB|^2«^»3 = 1", "(|AB|^2)^2"),
    row("claim", "|AB|^«(1/2)» = 1", "whole number as exponent", "sqrt(...)"),
    row("claim", "|AB|^«1.5» = 1", "whole number as exponent"),
    row("claim", "|AB|^«65» = 1", "an exponent from -64 to 64, got 65"),
    row("claim", "|AB|^«-65» = 1", "an exponent from -64 to 64, got -65"),
    row("claim", "|AB|^«x» = 1", "expected a number"),
    row("claim", "«|AB|/0» = 1", "a divisor other than 0"),
    row("claim", "«1/0»|AB| = 1", "denominator 0"),
    row("claim", "sqrt(«-1») = 1", "not negative under a square root"),
    row("claim", "|AB| = «x»", "letters do not stand for numbers"),
    row("claim", "|AB| = 2«R»", "letters do not stand for numbers"),
    row("claim", "|AB| = «tan»(BAC)", "the functions are"),
    row("claim", "|AB| = 3«,»5", "decimals are written with a point: 3.5"),
    row("claim", "|AB| = «.»5", "decimals are written 0.5"),
    row("claim", "|AB| = |CD|«.»", "no full stop"),
    row("claim", "|AB| = 3 «cm»", "no unit"),
    row("claim", "angle BAC «=» 60", "cos(BAC) = 1/2"),
    row("claim", "area «ABC» = 1", "expected `(`", "area(ABC)"),
    row("claim", "dist(A, «B») = 1", "between points write |AB|"),
    row("claim", "|AB|«»", "a comparison such as =", "got the end of the line"),
    row("claim", "|AB| + «=» 3", "expected a quantity such as |AB|"),
    row("claim", "(|AB| = 1«»", "a parenthesis is not closed"),
    row("claim", "|AB|«)» = 1", "a parenthesis too many"),
    row("claim", "|AB| = 1«)»", "a parenthesis too many"),
    # ------------------------------------------------ signs
    row("claim", "|AB| «==» |AC|", "write a single ="),
    row("claim", "|AB| «!=» |AC|", "write `not ... = ...`"),
    row("claim", "|AB| «≠» |AC|", "not equal to", "write `not ... = ...`"),
    row("claim", "|AB| «=<» |AC|", "write <="),
    row("claim", "|AB| «**»2 = 1", "write ^ for a power"),
    row("claim", "|AB|«²» = 1", "write ^2"),
    row("claim", "«√»3 = 1", "write sqrt(...)"),
    row("claim", "|AB| «:» |CD| = 1", "a ratio is written with /"),
    row("claim", "AB «⊥» CD", "write `AB perpendicular to CD`"),
    row("claim", "AB «|»| CD", "write `AB parallel to CD`"),
    row("claim", "AB parallel to CD«;»", "one statement a line"),
    row("claim", "«[»|AB| + 1] = 2", "round parentheses"),
    row("claim", "«\\»sqrt(3) = 1", "plain text"),
    row("claim", "|«AΒ»| = 1", "greek capital letter beta", "the capitals A to Z"),
    row("claim", "«日»本 = 1", "the letters a to z"),
    row("claim", "«「»AB = 1", "left corner bracket"),
    row("claim", "|AB| = 1\u200b".replace("\u200b", "«\u200b»"), "invisible space"),
    # ------------------------------------------------ words
    row("given", "«trangle» XYZ", "did you mean `triangle`?"),
    row("given", "«Triangle» XYZ", "lower case: triangle"),
    row("given", "X on «circel» ABC", "did you mean `circle`?"),
    row("given", "X on «lnie» AB", "did you mean `line`?"),
    row("given", "O = «circumcnter» of ABC", "did you mean `circumcenter`?"),
    row("claim", "AB «paralel» to CD", "did you mean `parallel`?"),
    row("claim", "AB parallel «CD»", "write `to` before `CD`"),
    row("given", "M = midpoint «AB»", "write `of` before `AB`"),
    row("given", "M «midpoint» of AB", "write `=` before `midpoint`"),
    row("given", "M «is» midpoint of AB", "write M = midpoint of AB"),
    row("given", "let «M» = midpoint of AB", "start with what the line says"),
    row("claim", "ABC «is» acute", "leave out `is`"),
    row("claim", "P inside «of» ABC", "leave out `of`"),
    row("claim", "P «not» on line AB", "stands before the whole condition"),
    row("claim", "P «in» triangle ABC", "write `inside`"),
    row("claim", "P inside «circle» ABC", "|OP| < |OA|"),
    row("given", "X on arc «AB»", "for an arc write"),
    row("given", "X on «incircle» of ABC", "name the curve first"),
    row("given", "X on the «circle» ABC", "leave out `the`"),
    row("given", "X, Y «on» circle ABC", "one point a line"),
    row("given", "X and Y on «circle» ABC", "one point a line"),
    row("given", "points X «Y»", "separate the points by commas"),
    row("claim", "ABC «collinear»", "separate the points by commas"),
    row("given", "triangle «X», Y, Z", "write the points of one figure together"),
    row("given", "triangle «xyz»", "points are capitals: did you mean XYZ?"),
    row("given", "triangle XYZ«,» W on XY", "one statement a line"),
    row("given", "square WXYZ «with» side 2", "say more on a line of its own"),
    row("given", "right triangle XYZ«»", "with right angle at C"),
    row("given", "isosceles triangle XYZ«»", "with apex A"),
    row("given", "«circle» ABD", "give it a name: k = circle ABC"),
    row("given", "«ABC» triangle", "first what it is, then its points"),
    row("given", "«midpoint» of AB = M", "first the name, then what it is"),
    row("given", "«area» = circle ABC", "a word of the language", "take another name"),
    row("given", "«on» = line AB", "a word of the language"),
    row("given", "m = circle with centre A«,» radius 3", "write `and` before the radius"),
    row("given", "X «onAB»", "a space is missing: on AB"),
    row("given", "triangle «X1'YZ»", "digits (B2) or primes"),
    row("claim", "P «=» A", "for points that coincide write |AB| = 0"),
    row("claim", "if «|»AB| = 1 then |AC| = 1", "write the assumption behind `provided`"),
    row("given", "«»", "expected a construction or relation"),
    row("claim", "«»", "expected a statement"),
    row("provided", "«»", "expected a condition"),
    row("given", "X =«»", "expected the construction of a point such as `midpoint of AB`"),
    row("given", "m =«»", "expected a line or circle such as `line AB`"),
    row("claim", "not«»", "expected a condition"),
    # ------------------------------------------------ names
    row("claim", "|A«Q»| = 1", "expected a point of the figure, got Q", "the points so far: A, B, C"),
    row("claim", "|C«B1»| = 1", "did you mean B?"),
    row("given", "X = midpoint of A«Q»", "expected a point of the figure, got Q"),
    row("given", "X = midpoint of A«X»", "X cannot make itself"),
    row("given", "X on line A«X»", "X cannot make itself"),
    row("given", "k2 = circle with centre A and radius dist(B, «k2»)", "k2 cannot make itself"),
    row("given", "«P» = midpoint of AB", "P is already made in line 3"),
    row("given", "points X, «A»", "A is already made in line 1"),
    row("given", "«k» = circle ABD", "k is already a circle, named in line 4"),
    row("given", "«l» = circle ABD", "l is already a line, named in line 5"),
    row("given", "X on circle «l»", "the name of a circle, got l, which is a line", "did you mean k?"),
    row("given", "X on line «k»", "expected the name of a line, got k, which is a circle", "did you mean l?"),
    row("given", "X = meet of circle «l» and AC", "expected the name of a circle"),
    row("given", "X = meet of line «k» and AC", "expected the name of a line"),
    row("given", "O = centre of «l»", "expected the name of a circle"),
    row("given", "t = tangent to «l» at A", "expected the name of a circle"),
    row("given", "X = foot of centre of «l» on BC", "expected the name of a circle"),
    row("claim", "dist(P, «k») = 1", "expected the name of a line"),
    row("claim", "«k» parallel to AB", "expected the name of a line"),
    row("given", "X on circle «m»", "got m", "name it first, such as `given m = circle ABC`"),
    row("given", "X on line «bc»", "points are capitals: did you mean BC?"),
    row("given", "X on «circel»", "did you mean circle?"),
    row("given", "X = meet of AB and CD other than «A»", "two lines, which meet once"),
)  # fmt: skip


def cut(text: str) -> tuple[str, int, int]:
    """The text without its marks, the column of the wrong part and the column after."""
    start, stop = text.index("«"), text.index("»") - 1
    return text.replace("«", "").replace("»", ""), start + 1, max(stop, start + 1) + 1


@pytest.mark.parametrize("wrong", STATEMENTS, ids=lambda wrong: f"{wrong.keyword} {wrong.text}")
def test_a_wrong_statement_is_answered_at_its_place(wrong: Row) -> None:
    text, column, end = cut(wrong.text)
    line = f"{wrong.keyword:<9}{text}" if text else wrong.keyword
    shift = len(line) - len(text)
    sheet = FIGURE + line + "  # a comment\nclaim    |AB| = |AC|\n"
    with pytest.raises(SheetError) as caught:
        read_text(sheet, "issue.claim")
    error = caught.value
    shown = str(error)
    assert shown.startswith(f"issue.claim:6:{column + shift}: "), shown
    assert (error.line, error.column, error.end) == (6, column + shift, end + shift), shown
    assert error.source == line + "  # a comment"
    for words in wrong.said:
        assert words in shown, shown


FILES = (
    ("", 1, 1, ("got an empty file", "at least a `given` and a `claim` line")),
    ("\n# only a comment\n\n", 1, 1, ("got an empty file",)),
    ("---\n---\n", 1, 1, ("got an empty file",)),
    ("given triangle ABC\n", 1, 19, ("expected a `claim` line",)),
    ("claim 1 = 1\n", 1, 12, ("expected a `given` line",)),
    ("title A title\n", 1, 14, ("expected a `given` line",)),
    ("title\ngiven triangle ABC\n", 1, 6, ("expected a text behind `title`",)),
    ("title one\ntitle two\n", 2, 1, ("got a second", "line 1")),
    ("given triangle ABC\nclaim |AB| = 1\n---\ngiven triangle ABC\n", 4, 19, ("expected a `claim` line",)),
    ("given triangle ABC\ngivn P on line AB\n", 2, 1, ("got `givn`", "did you mean `given`?")),
    ("Given triangle ABC\n", 1, 1, ("did you mean `given`?",)),
    ("given: triangle ABC\n", 1, 1, ("without :",)),
    ("let P on line AB\n", 1, 1, ("did you mean `given`?",)),
    ("prove |AB| = |AC|\n", 1, 1, ("did you mean `claim`?",)),
    ("where ABC acute\n", 1, 1, ("did you mean `provided`?",)),
    ("triangle ABC\n", 1, 1, ("the keyword is missing: write `given triangle ABC`",)),
    ("C between A and B\n", 1, 1, ("`provided C between A and B` or `claim C between A and B`",)),
    ("triangl ABC\n", 1, 1, ("every line starts with a keyword",)),
    ("?? what\n", 1, 1, ("expected title, source, given, provided or claim",)),
    ("--\n", 1, 1, ("separated by a line ---",)),
    ("given triangle ABC\n===\n", 2, 1, ("separated by a line ---",)),
    ("given triangle ABC\x00\n", 1, 19, ("NUL character",)),
    ("given triangle ABC # \x07\n", 1, 22, ("control character U+0007",)),
    ("given triangle \ud800\n", 1, 16, ("half a character",)),
    ("given M = midpoint of AB\ngiven triangle ABC\nclaim 1 = 1\n", 1, 23, ("line 2: move that line up",)),
    ("given P on circle k\ngiven triangle ABC\ngiven k = circle ABC\nclaim 1 = 1", 1, 19, ("line 3: move",)),
    ("given P on line AB\nclaim 1 = 1\n", 1, 17, ("first say what A is, such as `given point A`",)),
    ("given triangle ABC\r\nclaim |AB| = |AD|\r\n", 2, 16, ("got D",)),
    ("given triangle ABC\rclaim |AB| = |AD|\r", 2, 16, ("got D",)),
    ("\ufeffgiven triangle AB\n", 1, 16, ("expected three points",)),
    ("given triangle ABC\nclaim " + "(" * 201 + "1", 2, 207, ("at most 200 nested parentheses",)),
    ("given triangle ABC\nclaim " + "not " * 300 + "1 = 1", 2, 411, ("at most 200 levels",)),
    ("given triangle ABC\nclaim 1 = 1" + " + 1" * 300, 2, 11, ("at most 200 levels",)),
    ("given triangle ABC\nclaim " + "-" * 5000 + "|AB| = 1", 2, 1607, ("at most 200 levels",)),
    ("given triangle ABC\nclaim 1 = " + "1" * 1001, 2, 11, ("at most 1000 digits, got 1001",)),
)


@pytest.mark.parametrize(("text", "line", "column", "said"), FILES, ids=lambda value: repr(value)[:60])
def test_a_wrong_file_is_answered_at_its_place(
    text: str, line: int, column: int, said: tuple[str, ...]
) -> None:
    with pytest.raises(SheetError) as caught:
        read_text(text)
    error = caught.value
    for words in said:
        assert words in str(error), str(error)
    assert (error.line, error.column) == (line, column), str(error)


def test_the_table_is_long_and_says_something_everywhere() -> None:
    assert len(STATEMENTS) + len(FILES) >= 80
    assert all(wrong.said for wrong in STATEMENTS)
    assert len({(wrong.keyword, wrong.text) for wrong in STATEMENTS}) == len(STATEMENTS)


def test_a_message_has_no_jargon() -> None:
    """No name of the grammar's own leaks out."""
    jargon = re.compile(r"\b(POINT|PAIR|TRIPLE|QUAD|QUINT|HEXA|NAME|NUMBER|FRACTION|COMPARE|LPAR)\b|\$END")
    for wrong in STATEMENTS:
        text = cut(wrong.text)[0]
        with pytest.raises(SheetError) as caught:
            read_text(f"{FIGURE}{wrong.keyword} {text}\nclaim 1 = 1")
        assert not jargon.search(caught.value.message + caught.value.hint), str(caught.value)
