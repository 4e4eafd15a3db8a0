"""Certificates: what the second arithmetic accepts, leaves open and rejects."""

from __future__ import annotations

import ast
import json
import random
from pathlib import Path
from typing import Any

import pytest

from surdwise import decide, read
from surdwise.certificate import write_certificate
from surdwise_recheck import check
from surdwise_recheck.__main__ import main
from surdwise_recheck.check import Refused, outcome_of, recheck
from surdwise_recheck.witness import Outcome

ROOT = Path(__file__).parents[2]
SEED, CHANGES = 11, 2000

# sheets without a free parameter, which are rechecked whole (elementary facts, from memory)
FINITE = [
    "given square ABCD\ngiven M = midpoint of AB\ngiven N = midpoint of BC\nclaim AN perpendicular to DM\n"
    "claim |AN| = |DM|\nclaim |AM| = 2|BM|\n",
    "given equilateral triangle ABC\ngiven O = circumcentre of ABC\nclaim |OA| = |AB|/sqrt(3)\n"
    "claim |OA| > |AB|/2\n",
    "given square ABCD\ngiven D1 = apex of equilateral triangle on AB\nclaim |CD1| > |AB|\n"
    "claim D1 and C on the same side of AB\n",
    "given regular pentagon ABCDE\nclaim |AC| = |AB|*(1 + sqrt(5))/2\nclaim |AC| = |AB|*(1 - sqrt(5))/2\n",
    "given regular hexagon ABCDEF\ngiven k = circle with diameter AB\ngiven X = meet of BC and k\n"
    "claim |AX| <= |AB|\nclaim |XB| = |AB|/2\n",
]


def certificate(text: str, path: Path) -> dict[str, Any]:
    write_certificate(path, text, [decide(s) for s in read(text)])
    return json.loads(path.read_text(encoding="utf-8"))  # type: ignore[no-any-return]


@pytest.mark.parametrize("text", FINITE, ids=[t.splitlines()[0] for t in FINITE])
def test_finite_figures_are_rechecked_whole(text: str, tmp_path: Path) -> None:
    certificate(text, tmp_path / "c.json")
    reports = recheck(tmp_path / "c.json")
    assert [r.outcome for r in reports] == [Outcome.ACCEPTED] * len(reports), reports
    assert main([str(tmp_path / "c.json")]) == 0


@pytest.mark.parametrize("name", ["chord-sum", "stretched-string", "parallelogram-law", "euler-line"])
def test_a_survey_is_left_open_and_its_figures_are_checked(name: str, tmp_path: Path) -> None:
    text = (ROOT / "examples" / f"{name}.claim").read_text(encoding="utf-8")
    data = certificate(text, tmp_path / "c.json")
    reports = recheck(tmp_path / "c.json")
    assert {r.outcome for r in reports} == {Outcome.INCOMPLETE}
    assert all("survey" in r.step for r in reports)
    assert any(s["rule"] == "witness" for c in data["claims"] for s in c["steps"])
    assert main([str(tmp_path / "c.json")]) == 3


def test_the_same_decisions_give_the_same_bytes(tmp_path: Path) -> None:
    certificate(FINITE[0], tmp_path / "a.json")
    certificate(FINITE[0], tmp_path / "b.json")
    assert (tmp_path / "a.json").read_bytes() == (tmp_path / "b.json").read_bytes()


WRONG = [
    ("verdict", "holds", "fails"),
    ("verdict", "fails", "conditional"),
    ("verdict", "conditional", "holds"),
    ("condition", "never", "A, B distinct"),
]


@pytest.mark.parametrize(("field", "before", "after"), WRONG)
def test_wrong_answers_are_rejected(field: str, before: str, after: str, tmp_path: Path) -> None:
    seen = 0
    for text in FINITE:
        data = certificate(text, tmp_path / "c.json")
        for c in data["claims"]:
            if c[field] == before:
                seen += 1
                kept, c[field] = c[field], after
                (tmp_path / "c.json").write_text(json.dumps(data))
                assert outcome_of(recheck(tmp_path / "c.json")) is Outcome.REJECTED
                c[field] = kept
    assert seen


def test_a_moved_point_is_rejected(tmp_path: Path) -> None:
    text = (ROOT / "examples" / "chord-sum.claim").read_text(encoding="utf-8")
    data = certificate(text, tmp_path / "c.json")
    data["claims"][0]["steps"][0]["data"]["figure"]["P"][0] = "1/2"
    (tmp_path / "c.json").write_text(json.dumps(data))
    (r,) = recheck(tmp_path / "c.json")
    assert r.outcome is Outcome.REJECTED
    assert "witness" in r.step


def test_a_wrong_side_condition_is_rejected_at_a_witness(tmp_path: Path) -> None:
    text = (ROOT / "examples" / "chord-sum.claim").read_text(encoding="utf-8")
    data = certificate(text, tmp_path / "c.json")
    data["claims"][0]["condition"] = "A and P on the same side of BC"
    (tmp_path / "c.json").write_text(json.dumps(data))
    (r,) = recheck(tmp_path / "c.json")
    assert r.outcome is Outcome.REJECTED


def _spots(x: Any, path: tuple[Any, ...] = ()) -> list[tuple[Any, ...]]:
    """Paths of everything that can be changed."""
    out = [path] if path else []
    if isinstance(x, dict):
        out += [p for k, v in x.items() for p in _spots(v, (*path, k))]
    if isinstance(x, list):
        out += [p for k, v in enumerate(x) for p in _spots(v, (*path, k))]
    return out


def _changed(x: Any, chance: random.Random) -> Any:
    if isinstance(x, bool):
        return not x
    if isinstance(x, int):
        return x + chance.choice((-1, 1, 7))
    if isinstance(x, str):
        at = chance.randrange(len(x) + 1)
        return x[:at] + chance.choice("0123456789+-*/|ABCDMPX sqrt") + x[at + chance.randrange(2) :]
    if isinstance(x, list):
        out = list(x)
        if out and chance.random() < 0.5:
            out.pop(chance.randrange(len(out)))
        else:
            out.append(out[0] if out else 0)
        return out
    if isinstance(x, dict):
        return {k: v for k, v in x.items() if chance.random() < 0.7}
    return "0" if x is None else None


def test_no_random_change_is_accepted_with_a_changed_meaning(tmp_path: Path) -> None:
    """A change that is accepted must leave true answers: the program is asked again."""
    chance = random.Random(SEED)
    path = tmp_path / "c.json"
    kinds: dict[Outcome | None, int] = {}
    for n in range(CHANGES):
        text = FINITE[n % len(FINITE)]
        data = json.loads(json.dumps(_kept(text, path)))
        spot = chance.choice(_spots(data))
        inner = data
        for k in spot[:-1]:
            inner = inner[k]
        inner[spot[-1]] = _changed(inner[spot[-1]], chance)
        path.write_text(json.dumps(data))
        try:
            outcome: Outcome | None = outcome_of(recheck(path))
        except Refused:
            outcome = None
        kinds[outcome] = kinds.get(outcome, 0) + 1
        if outcome is Outcome.ACCEPTED:
            answers = [d for s in read(data["sheet"]) for d in decide(s)]
            said = [c["verdict"] for c in data["claims"]]
            assert said == [d.verdict.value for d in answers], (spot, data)
    assert kinds[Outcome.REJECTED] + kinds[None] > CHANGES // 2, kinds


KEPT: dict[str, dict[str, Any]] = {}


def _kept(text: str, path: Path) -> dict[str, Any]:
    if text not in KEPT:
        KEPT[text] = certificate(text, path)
    return KEPT[text]


HOSTILE = [
    "",
    "[]",
    "[" * 100_000,
    '{"format": "surdwise certificate"}',
    '{"format": "surdwise certificate", "version": 1, "sheet": "given", "claims": []}',
    '{"format": "surdwise certificate", "version": 2, "sheet": "", "claims": []}',
    '{"format": "surdwise certificate", "version": 1, "sheet": 3, "claims": NaN}',
]


@pytest.mark.parametrize("text", HOSTILE, ids=range(len(HOSTILE)))
def test_hostile_files_are_refused(text: str, tmp_path: Path) -> None:
    (tmp_path / "c.json").write_text(text)
    with pytest.raises(Refused):
        recheck(tmp_path / "c.json")
    assert main([str(tmp_path / "c.json")]) == 1


def test_the_rechecker_stands_alone() -> None:
    """It imports nothing of the program, nor its arithmetic."""
    files = list((ROOT / "src" / "surdwise_recheck").rglob("*.py"))
    assert len(files) > 10
    for f in files:
        for node in ast.walk(ast.parse(f.read_text(encoding="utf-8"))):
            names = [a.name for a in node.names] if isinstance(node, ast.Import) else []
            if isinstance(node, ast.ImportFrom) and node.level == 0:
                names = [node.module or ""]
            assert not {n.split(".")[0] for n in names} & {"surdwise", "flint", "lark"}, f


def test_every_rule_is_in_the_schema() -> None:
    schema = json.loads((ROOT / "src" / "surdwise_recheck" / "schema.json").read_text(encoding="utf-8"))
    assert set(schema["$defs"]["step"]["properties"]["rule"]["enum"]) == set(check.RULES)
