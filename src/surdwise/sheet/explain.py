"""Say what is wrong with a statement that the grammar does not take."""

from __future__ import annotations

import re
from dataclasses import dataclass

from .characters import sign_hint
from .errors import Problem
from .forms import FORMS
from .lessons import LESSONS, PLACES
from .lexer import BAD, END, RUNS
from .nearest import nearest
from .parser import Parsed, Unexpected, acceptable, after, parse, resting
from .show import show
from .table import Table
from .terms import RUN_WORDS, expected, got
from .tree import And, Comparison, Relation, Span

_SHAPE_OF = {
    "is_equilateral": "equilateral triangle {0}",
    "is_isosceles": "isosceles triangle {0} with apex {1}",
}
_HOW_MANY = {"POINT": "one point", "PAIR": "two points", "TRIPLE": "three points", "QUAD": "four points"} | {
    "QUINT": "five points",
    "HEXA": "six points",
    "RUN": "more than six points",
}
_SHORT = 80  # longer statements are not repeated in a hint


@dataclass(frozen=True)
class Statement:
    """The statement source[start:stop] in a line of the file, with the keyword before it."""

    keyword: str
    source: str
    start: int
    stop: int
    line: int


def explain(table: Table, statement: Statement, failure: Unexpected) -> Problem:
    """The problem with a statement that failed to parse under its keyword.

    Tried in this order: advice from a lesson; the statement belongs under another keyword, or
    gets further under that; a word misspelled one step earlier; what was expected here.
    """
    if _advice(table, statement, failure):
        return _explain_here(table, statement, failure)
    other = "provided" if statement.keyword == "given" else "given"
    try:
        parsed = parse(table, other, statement.source, statement.start, statement.stop, statement.line)
    except Problem:
        return _explain_here(table, statement, failure)
    except Unexpected as elsewhere:
        if elsewhere.count <= failure.count:
            return _explain_here(table, statement, failure)
        problem = _explain_here(table, statement, elsewhere)
        belongs = (
            "conditions belong under `provided`"
            if other == "provided"
            else "constructions belong under `given`"
        )
        return Problem(
            problem.span, problem.message, f"{problem.hint} ({belongs})" if problem.hint else belongs
        )
    return _misplaced(statement, parsed)


def _misplaced(statement: Statement, parsed: Parsed) -> Problem:
    """A whole statement under the wrong keyword."""
    body = parsed.body
    span = Span(statement.line, statement.start + 1, statement.stop + 1)
    text = (
        statement.source[statement.start : statement.stop]
        if statement.stop - statement.start <= _SHORT
        else "..."
    )
    if statement.keyword != "given":
        what = "condition" if statement.keyword == "provided" else "statement to decide"
        message = f"expected a {what} under `{statement.keyword}`, got a construction"
        return Problem(span, message, f"constructions belong under `given`: given {text}")
    if isinstance(body, Comparison) and set(body.ops) == {"="}:
        message = "expected one equation under `given`, got a chain"
        return Problem(span, message, "write one given line for each link")
    if isinstance(body, And) and all(_is_relation(arg) for arg in body.args):
        return Problem(
            span, "expected one relation under `given`, got several", "write one given line for each"
        )
    message = "expected a construction or relation under `given`, got a condition"
    hint = f"conditions belong under `provided`: provided {text}"
    if isinstance(body, Relation) and body.form in _SHAPE_OF:
        hint = "write `given " + _SHAPE_OF[body.form].format(*(show(arg) for arg in body.args)) + "`"
    return Problem(span, message, hint)


def _is_relation(node: object) -> bool:
    if isinstance(node, Comparison):
        return node.ops == ("=",)
    return isinstance(node, Relation) and "given" in FORMS[node.form].under


def _explain_here(table: Table, statement: Statement, failure: Unexpected) -> Problem:
    token, states = failure.token, failure.states
    span = Span(statement.line, token.column, token.end)
    kinds = acceptable(table, states)
    if token.kind == BAD:
        message, hint = token.problem
        message = message or f"expected {_wanted(table, states, kinds)}, got {got(token)}"
        return Problem(span, message, hint or (sign_hint(token.text) if not token.problem[0] else ""))
    reserved = _reserved_name(table, statement, failure)
    if reserved is not None:
        return reserved
    advice = _advice(table, statement, failure)
    if not advice:
        earlier = _misspelled_before(table, failure, statement.line)
        if earlier is not None:
            return earlier
    message = f"expected {_wanted(table, states, kinds)}, got {got(token)}"
    if token.kind in _HOW_MANY and any(kind in RUNS for kind in kinds):
        message += f" ({_HOW_MANY[token.kind]})"
    return Problem(span, message, advice or _next_step(table, statement, failure, kinds))


def _wanted(table: Table, states: tuple[int, ...], kinds: frozenset[str]) -> str:
    state = resting(table, states)[-1]
    for place in PLACES:
        stopped = _stopped(table, place.keyword, place.beginning)
        if stopped is not None and stopped.token.kind == END and resting(table, stopped.states)[-1] == state:
            return place.expected
    return expected(kinds)


def _advice(table: Table, statement: Statement, failure: Unexpected) -> str:
    """The advice of the first lesson that goes wrong at the same place on the same word, or ""."""
    token = failure.token
    before = failure.before.text if failure.before else ""
    last, state = failure.states[-1], resting(table, failure.states)[-1]
    for lesson in LESSONS:
        if lesson.look and not re.compile(lesson.look).match(
            statement.source, token.column - 1, statement.stop
        ):
            continue
        if lesson.behind and not re.fullmatch(lesson.behind, before):
            continue
        for example in lesson.examples:
            stopped = _stopped(table, lesson.keyword, example)
            if stopped is None or stopped.token.kind != token.kind:
                continue
            same = lesson.loose or stopped.states[-1] == last
            if same and resting(table, stopped.states)[-1] == state:
                return lesson.advice
    return ""


def _stopped(table: Table, keyword: str, example: str) -> Unexpected | None:
    """Where reading the example stops, or None if it does not."""
    try:
        parse(table, keyword, example, 0, len(example), 1)
    except Unexpected as failure:
        return failure
    return None


def _reserved_name(table: Table, statement: Statement, failure: Unexpected) -> Problem | None:
    """A word of the language taken as the name of a curve, as in `area = circle ABC`."""
    token, before = failure.token, failure.before
    word = token
    if failure.count == 1 and token.kind == "=" and before is not None:
        word = before
    elif failure.count or not re.compile(r"\s*=").match(statement.source, token.end - 1):
        return None
    if word.kind != word.text or word.text not in table.words or not word.text[0].isalpha():
        return None
    message = f"expected a new name for a line or circle, got `{word.text}`, a word of the language"
    return Problem(Span(statement.line, word.column, word.end), message, "take another name")


def _misspelled_before(table: Table, failure: Unexpected, line: int) -> Problem | None:
    """A misspelled word one token earlier, taken for the name of a curve."""
    before = failure.before
    if before is None or before.kind != "NAME":
        return None
    states = failure.states[:-1]
    kinds = acceptable(table, states)
    word = nearest(before.text, _words(kinds))
    if not word:
        return None
    message = f"expected {_wanted(table, states, kinds - {'NAME'})}, got {got(before)}"
    return Problem(Span(line, before.column, before.end), message, f"did you mean `{word}`?")


def _words(kinds: frozenset[str]) -> list[str]:
    return [kind for kind in kinds if kind[0].islower()]


def _next_step(table: Table, statement: Statement, failure: Unexpected, kinds: frozenset[str]) -> str:
    """A hint without a lesson: a similar word, something missing, something too much."""
    token = failure.token
    word = nearest(token.text, _words(kinds)) if token.text[:1].islower() else ""
    if not word and token.kind == "NAME":
        word = nearest(token.text, _words(table.words), 0.75)
    if word:
        return f"did you mean `{word}`?"
    if kinds == {"|"}:
        return "a length has a bar on either side: |AB|"
    if token.kind == "NAME" and any(kind in RUN_WORDS for kind in kinds) and token.text.isalnum():
        fits = token.text.isalpha() and len(token.text) <= len(RUNS) and RUNS[len(token.text) - 1] in kinds
        return "points are capitals" + (
            f": did you mean {token.text.upper()}?" if fits else ", such as A, B2 or C'"
        )
    if token.kind == ")":
        text = statement.source[statement.start : token.column - 1]
        return "a parenthesis too many" if text.count("(") <= text.count(")") else ""
    if token.kind == END and ")" in kinds:
        return "a parenthesis is not closed"
    missing = _missing(table, failure, kinds)
    if missing:
        return f"write `{missing}` before {got(token)}"
    if END in kinds and token.kind in (",", "and"):
        return "one statement a line"
    if END in kinds and token.kind == "with":
        return "say more on a line of its own"
    if token.text[:1].islower() and _superfluous(table, statement, failure):
        return f"leave out {got(token)}"
    return ""


def _missing(table: Table, failure: Unexpected, kinds: frozenset[str]) -> str:
    """The only word or sign after which the unexpected token could stand, or ""."""
    if failure.token.kind == END:
        return ""
    fitting = []
    for kind in sorted(kinds):
        if kind in table.words and failure.token.kind in acceptable(
            table, after(table, failure.states, kind)
        ):
            fitting.append(kind)
    return fitting[0] if len(fitting) == 1 else ""


def _superfluous(table: Table, statement: Statement, failure: Unexpected) -> bool:
    """Whether the statement gets further without the unexpected token."""
    token, source = failure.token, statement.source
    without = source[: token.column - 1] + " " * (token.end - token.column) + source[token.end - 1 :]
    try:
        parse(table, statement.keyword, without, statement.start, statement.stop, statement.line)
    except Problem:
        return True
    except Unexpected as later:
        return later.count > failure.count
    return True
