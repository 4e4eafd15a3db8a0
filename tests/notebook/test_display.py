"""What a notebook shows: well-formed, escaped, and the answer is in it."""

from __future__ import annotations

import re
from collections.abc import Callable
from dataclasses import replace
from pathlib import Path
from typing import Any

import pytest
from lxml import etree

import surdwise
from surdwise.notebook import html, latex

EXAMPLES = Path(__file__).parents[2] / "examples"
NASTY = "<b onload=\"x\">&amp; \\input{x} $100% #1 _^~ 'quoted'"

# https://www.w3.org/TR/mathml-core/ (from memory): the elements of MathML Core used for formulas
CORE = set("math mrow mi mn mo mtext ms mspace mfrac msqrt mroot msub msup msubsup mstyle".split())
HTML = set("html body table thead tbody tr th td div p code em strong i sub sup span details summary".split())


def objects() -> list[Any]:
    out: list[Any] = []
    for name in ("chord-sum", "hypotenuse-legs", "no-such-figure", "stretched-string", "erected-three"):
        (sheet,) = surdwise.read(EXAMPLES / f"{name}.claim")
        rewritings = surdwise.rewrite(sheet)
        out += [sheet, *surdwise.decide(sheet), *rewritings, *rewritings[0].formulations]
    (sheet,) = surdwise.read(
        f"title {NASTY}\nsource {NASTY}\ngiven triangle ABC\ngiven l = line AB\ngiven k = circle ABC\n"
        "given A' = reflection of A in l\ngiven point B2\nprovided not (A, B, C collinear or ABC acute)\n"
        "claim dist(centre of k, BC) <= |A'B2|^2/|BC| < 3\nclaim AB parallel to B2A'\n"
    )
    decision = surdwise.Decision(NASTY, NASTY, NASTY, surdwise.Verdict.UNDECIDED, NASTY, NASTY, (NASTY,))
    out += [sheet, *surdwise.rewrite(sheet), decision, replace(decision, reason=NASTY, frame=NASTY)]
    return out


OBJECTS = objects()


@pytest.mark.parametrize("obj", OBJECTS, ids=lambda o: type(o).__name__)
def test_html_is_well_formed_and_plain(obj: Any) -> None:
    text = html(obj).replace("&nbsp;", "\u00a0")
    root = etree.fromstring(f"<div>{text}</div>")  # strict: every tag closed, every sign escaped
    for e in root.iter():
        assert etree.QName(e).localname in CORE | HTML
        assert not any(a.startswith("on") for a in e.attrib)
    assert len(text) < 40_000


@pytest.mark.parametrize("obj", OBJECTS, ids=lambda o: type(o).__name__)
def test_latex_balances(obj: Any) -> None:
    text = latex(obj)
    assert text.startswith("$") and text.endswith("$")
    bare = re.sub(r"\\[\\{}$#%&_]", "", text)
    depth = 0
    for c in bare:
        depth += (c == "{") - (c == "}")
        assert depth >= 0
    assert depth == 0
    assert bare.count("$") % 2 == 0
    assert "%" not in bare and "#" not in bare and r"\input" not in bare
    assert bare.count(r"\begin{aligned}") == bare.count(r"\end{aligned}") == 1


def read_aloud(text: str) -> str:
    root = etree.fromstring(f"<div>{text}</div>".replace("&nbsp;", " "))
    return re.sub(r"\s+", "", "".join(root.itertext()))


def test_the_answer_is_in_it() -> None:
    (sheet,) = surdwise.read(EXAMPLES / "chord-sum.claim")
    (decision,) = surdwise.decide(sheet)
    shown = read_aloud(html(decision))
    assert "claim|PA|=|PB|+|PC|" in shown
    assert "verdictconditional" in shown
    assert "holdsexactlywhennotAandPonthesamesideofBC" in shown
    assert "falseat" in shown
    assert "titleSumofchordsfromapointofthecircle" in read_aloud(html(sheet))
    assert "provided" not in read_aloud(html(sheet))


def test_formulations_show_cost_and_polynomial() -> None:
    (sheet,) = surdwise.read("given points A, B, C\nclaim |AB| = |BC|\n")
    (r,) = surdwise.rewrite(sheet)
    shown = read_aloud(html(r))
    for f in r.formulations:
        assert f.form.value.replace("_", "") in shown
        assert f"{f.seconds:.6f}" in shown
    assert "=0" in read_aloud(html(r.formulations[0]))


@pytest.mark.parametrize("show", [html, latex])
def test_other_objects_are_refused(show: Callable[[object], str]) -> None:
    with pytest.raises(TypeError, match="expected a Sheet"):
        show(3)
