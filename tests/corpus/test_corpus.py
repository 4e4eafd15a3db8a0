"""Every claim of the corpus: verdict, condition and equality case as expected, by proof and by
random figures; the whole vocabulary is used."""

from __future__ import annotations

import time
from collections import Counter
from collections.abc import Iterator
from functools import cache

import pytest

from surdwise import Decision, Verdict, decide
from surdwise.sheet.forms import FORMS
from surdwise.sheet.table import load_table
from surdwise.sheet.tree import (
    And,
    Binary,
    CentreOf,
    Comparison,
    Fact,
    Measure,
    Named,
    Not,
    Number,
    Or,
    Pt,
    Relation,
    Through,
    Unary,
)
from surdwise.sheet.walk import parts
from tests.attack.judge import complaints, in_frame

from .corpus import SHEETS, Entry, Expected, entries
from .same import condition, differences
from .tidy import tidy

FIGURES, SOME, THIN, SEED = 2000, 300, 100, 3
CASES = [
    pytest.param(e, i, id=f"{e.name}: {e.sheet.claims[i].text}")
    for e in entries()
    for i in range(len(e.expected))
]


@cache
def decisions(entry: Entry) -> tuple[Decision, ...]:
    """A sheet's decisions, made once."""
    return decide(entry.sheet, time_limit=30)


@pytest.fixture(scope="module", autouse=True)
def total_time() -> Iterator[None]:
    """Say how long the decisions took."""
    decisions.cache_clear()
    start = time.process_time()
    yield
    made = sum(d.seconds for e in entries() for d in decisions(e))
    print(f"\n{len(CASES)} claims: {made:.1f} s deciding, {time.process_time() - start:.1f} s in all")


@pytest.mark.parametrize(("entry", "index"), CASES)
def test_verdict(entry: Entry, index: int) -> None:
    d, x = decisions(entry)[index], entry.expected[index]
    assert d.verdict is x.verdict, d.reason
    assert d.seconds < 20  # 2 s at most on an idle machine
    if x.verdict in (Verdict.CONDITIONAL, Verdict.FAILS):
        assert d.condition is not None, d.reason
    if x.verdict is Verdict.EMPTY:
        assert d.reason


@pytest.mark.parametrize(("entry", "index"), CASES)
def test_words(entry: Entry, index: int) -> None:
    """The expected condition and equality case say what the claim says and what was printed."""
    assert not contradictions(entry, index, entry.expected[index], decisions(entry)[index])


def contradictions(entry: Entry, index: int, x: Expected, d: Decision) -> list[str]:
    """Figures that tell the claim, the expected and the printed conditions apart."""
    sheet, body = entry.sheet, entry.sheet.claims[index].body
    jobs = [(body, x.condition, d.condition)]
    if isinstance(body, Comparison):
        jobs.append((Comparison(body.items, ("=",)), x.equality, d.equality))
    out = []
    for claim, expected, printed in jobs:
        if expected is None:
            continue
        said = [("claim", claim), ("expected", condition(sheet, expected))]
        if printed is not None and not in_frame(printed):
            said.append(("printed", condition(sheet, printed)))
            if tidy(said[1][1]) == tidy(said[2][1]):
                continue
        out += differences(sheet, said, SOME, THIN)
    return out


@pytest.mark.parametrize(("entry", "index"), CASES)
def test_random_figures(entry: Entry, index: int) -> None:
    """The decision, its words and the figures it hands out against random figures."""
    found = complaints(entry.sheet, index, decisions(entry)[index], FIGURES, SEED)
    assert not found, found[:3]


def test_few_conditions_without_words() -> None:
    """Conditions in the frame's parameters: those that are known to have no words yet."""
    count = sum(d.in_frame for e in entries() for d in decisions(e))
    assert count <= 8


def test_size() -> None:
    """Enough claims of every kind, equalities and inequalities."""
    kinds = Counter(x.verdict for e in entries() for x in e.expected)
    assert kinds[Verdict.CONDITIONAL] >= 45
    assert kinds[Verdict.FAILS] >= 35
    assert kinds[Verdict.EMPTY] >= 12
    assert kinds[Verdict.HOLDS] >= 68
    ops = Counter(
        "=" if c.body.ops == ("=",) else "<"
        for e in entries()
        for c in e.sheet.claims
        if isinstance(c.body, Comparison)
    )
    assert min(ops.values()) >= 80


def test_names_differ() -> None:
    names = [e.name for e in entries()]
    assert len(set(names)) == len(names)


OPERATIONS = {"+": "add", "-": "sub", "*": "mul", "/": "div", "^": "pow"}
NODES: dict[type, str] = {
    Number: "number",
    Comparison: "comparison",
    Not: "not_",
    And: "and_",
    Or: "or_",
    Pt: "point",
    Through: "through",
    Named: "named",
    CentreOf: "centre_of",
}


def test_whole_vocabulary_is_used() -> None:
    """Every form that `surdwise words` lists."""
    used: Counter[str] = Counter()
    for e in entries():
        for line in (*e.sheet.given, *e.sheet.provided, *e.sheet.claims):
            for node in parts(line.body):
                if isinstance(node, Fact | Relation):
                    used[node.form] += 1
                elif isinstance(node, Measure):
                    used[node.kind] += 1
                elif isinstance(node, Unary):
                    used[node.op] += 1
                elif isinstance(node, Binary):
                    used[OPERATIONS[node.op]] += 1
                elif type(node) in NODES:
                    used[NODES[type(node)]] += 1
                if line.keyword == "given" and isinstance(node, Comparison):
                    used["equation"] += 1
    assert not [alias for alias in FORMS if not used[alias]]


def test_every_word_is_used() -> None:
    """Every word of the grammar, synonyms included."""
    text = " ".join(
        line
        for path in SHEETS.glob("*.claim")
        for line in path.read_text(encoding="utf-8").splitlines()
        if line.startswith(("given", "provided", "claim"))
    )
    for mark in "(),=|":
        text = text.replace(mark, f" {mark} ")
    words = set(text.split())
    assert not sorted(w for w in load_table().words if w[0].isalpha() and w not in words)
    assert "≤" in words and "≥" in words
