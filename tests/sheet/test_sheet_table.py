"""The shipped parse table is the grammar's, is rebuilt when it is not, and saves the import of lark."""

from __future__ import annotations

import logging
import os
import subprocess
import sys
from pathlib import Path

import pytest
from lark import Lark, logger

from surdwise.sheet import FORMS
from surdwise.sheet.build import STARTS, build_data, build_table, dump
from surdwise.sheet.lexer import RUNS
from surdwise.sheet.table import GRAMMAR_FILE, TABLE_FILE, fingerprint, load_table
from surdwise.sheet.terms import FUNCTIONS, RUN_WORDS, UNOFFERED

GRAMMAR = Path(GRAMMAR_FILE).read_text(encoding="utf-8")


def test_the_shipped_table_is_current() -> None:
    stored = Path(TABLE_FILE).read_text(encoding="utf-8")
    assert stored == dump(build_data(GRAMMAR)), "run python -m surdwise.sheet.build"


def test_an_absent_stale_or_broken_table_is_rebuilt(tmp_path: Path) -> None:
    right = load_table()
    assert build_table(GRAMMAR) == right
    path = tmp_path / "table.json"
    assert load_table(table_file=str(path)) == right
    for text in (
        "",
        "{}",
        "[]",
        "{",
        Path(TABLE_FILE).read_text(encoding="utf-8").replace(fingerprint(GRAMMAR), "0"),
    ):
        path.write_text(text, encoding="utf-8")
        assert load_table(table_file=str(path)) == right


def test_a_changed_grammar_is_noticed(tmp_path: Path) -> None:
    path = tmp_path / "grammar.lark"
    path.write_text(GRAMMAR.replace('"kite" QUAD', '"dart" QUAD'), encoding="utf-8")
    words = load_table(grammar_file=str(path)).words
    assert "dart" in words and "kite" not in words


def test_line_ends_of_the_grammar_do_not_matter() -> None:
    assert fingerprint(GRAMMAR.replace("\n", "\r\n")) == fingerprint(GRAMMAR)


def test_the_grammar_has_no_conflicts(caplog: pytest.LogCaptureFixture) -> None:
    level = logger.level
    logger.setLevel(logging.DEBUG)
    logger.addHandler(caplog.handler)
    try:
        Lark(GRAMMAR, parser="lalr", start=list(STARTS), debug=True, maybe_placeholders=False)
    finally:
        logger.removeHandler(caplog.handler)
        logger.setLevel(level)
    assert "onflict" not in caplog.text


def test_lark_itself_reads_the_examples() -> None:
    """The grammar file is a grammar in its own right, with its own terminals."""
    lark = Lark(GRAMMAR, parser="lalr", start=list(STARTS), maybe_placeholders=False)
    for form in FORMS.values():
        for keyword in form.under:
            lark.parse(form.example, start=keyword)


def test_words_of_messages_are_words_of_the_grammar() -> None:
    words = load_table().words
    assert words >= FUNCTIONS | UNOFFERED
    assert set(RUN_WORDS) == set(RUNS)


def test_reading_a_sheet_does_not_import_lark() -> None:
    code = (
        "import sys; from surdwise.sheet import read_text;"
        "read_text('given triangle ABC\\nclaim |AB| < |AC| + |BC|');"
        "sys.exit(any(m.split('.')[0] in ('lark', 'difflib', 'sympy', 'flint') for m in sys.modules))"
    )
    source = str(Path(GRAMMAR_FILE).parents[2])
    environment = {**os.environ, "PYTHONPATH": source}
    assert subprocess.run([sys.executable, "-c", code], env=environment, check=False).returncode == 0


def test_the_build_command_can_check() -> None:
    source = str(Path(GRAMMAR_FILE).parents[2])
    done = subprocess.run(
        [sys.executable, "-m", "surdwise.sheet.build", "--check"],
        env={**os.environ, "PYTHONPATH": source},
        check=False,
        capture_output=True,
        text=True,
    )
    assert (done.returncode, done.stdout) == (0, "table.json is current\n"), done.stderr
