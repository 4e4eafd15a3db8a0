"""A folder of sheets: the same answers as one by one, and no sheet harms another."""

from __future__ import annotations

import json
import shutil
import subprocess
import sys
from pathlib import Path
from typing import Any

import pytest
from lxml import etree

from surdwise.review import review

from .works import SHEET, folder_of, troubled

EXAMPLES = Path(__file__).parents[2] / "examples"
LONG = {"centre-distances", "three-distances"}  # two seconds each
BAD = "given triangle AB\nclaim |AB| = |BC|\n"


def lines(path: Path) -> list[dict[str, Any]]:
    return [json.loads(line) for line in path.read_text(encoding="utf-8").splitlines()]


def cases(path: Path) -> list[Any]:
    """The test cases of a JUnit file that the schema accepts."""
    schema = etree.XMLSchema(etree.parse(Path(__file__).with_name("junit.xsd")))
    document = etree.parse(path)
    schema.assertValid(document)
    for suite in document.iter("testsuite"):
        found = suite.findall("testcase")
        assert int(suite.get("tests")) == len(found)
        assert int(suite.get("failures")) == sum(c.find("failure") is not None for c in found)
        assert int(suite.get("errors")) == sum(c.find("error") is not None for c in found)
    return list(document.iter("testcase"))


def test_same_as_one_by_one(tmp_path: Path) -> None:
    folder = tmp_path / "issue"
    (folder / "part 2" / "deeper").mkdir(parents=True)
    for i, path in enumerate(sorted(EXAMPLES.glob("*.claim"))):
        if path.stem not in LONG:
            shutil.copy(path, folder / ("", "part 2", "part 2/deeper")[i % 3])
    (folder / "two.claim").write_text(f"{SHEET}---\ntitle again\n{SHEET}claim |AB| < |BA|\n")
    (folder / "notes.txt").write_text("not a sheet")
    out, junit = tmp_path / "out.jsonl", tmp_path / "out.xml"
    code = review(folder, jsonl=out, junit=junit, workers=2)

    files = sorted(folder.rglob("*.claim"), key=lambda p: p.relative_to(folder).parts)
    done = subprocess.run(
        [sys.executable, "-m", "surdwise", "decide", "--json", *map(str, files)],
        capture_output=True,
        text=True,
        timeout=120,
    )
    assert code == done.returncode == 1
    alone = [json.loads(line) for line in done.stdout.splitlines()]
    together = lines(out)
    assert [d.pop("sheet") for d in together[-3:]] == [1, 2, 2]
    for d in (*together, *alone):
        d.pop("sheet", None)
        assert d.pop("seconds") >= 0
    assert together == alone
    assert len(alone) >= 30

    found = cases(junit)
    assert len(found) == len(alone)
    for case, d in zip(found, alone, strict=True):
        assert case.get("name").endswith(d["claim"])
        assert (case.find("failure") is None) == (d["verdict"] == "holds")
        assert case.find("error") is None
        if d["verdict"] == "conditional" and d["condition"]:
            assert d["condition"] in case.find("failure").get("message")


def test_order_does_not_depend_on_the_workers(tmp_path: Path) -> None:
    folder = folder_of(tmp_path / "issue", **{f"s{i}": "plain" for i in range(12)})
    for workers in (1, 3):
        assert review(folder, jsonl=tmp_path / f"{workers}.jsonl", workers=workers) == 0
    one, three = (lines(tmp_path / f"{w}.jsonl") for w in (1, 3))
    assert [d["file"] for d in one] == [d["file"] for d in three] == sorted(d["file"] for d in one)


@pytest.mark.parametrize("mebibytes", [None, 96])
def test_no_sheet_harms_another(
    tmp_path: Path, mebibytes: int | None, capsys: pytest.CaptureFixture[str]
) -> None:
    names = {"a": "plain", "b": "hang", "c": "plain", "d": "crash", "e": "plain", "f": "err", "g": "plain"}
    if mebibytes is not None:
        names |= {"h": "eat", "i": "plain"}
    folder = folder_of(tmp_path / "issue", **names)
    (folder / "z.claim").write_text(BAD)
    (folder / "y.claim").write_bytes(b"\xff\xfe\x00")
    out, junit = tmp_path / "out.jsonl", tmp_path / "out.xml"
    code = review(
        folder, jsonl=out, junit=junit, workers=2, time_limit=0.5, memory_limit=mebibytes, work=troubled
    )
    assert code == 2
    by_name = {Path(d["file"]).stem: d for d in lines(out)}
    assert list(by_name) == [*names, "y", "z"]
    for name, title in names.items():
        assert by_name[name]["verdict"] == ("holds" if title == "plain" else "undecided"), name
    assert by_name["b"]["reason"] == "the time limit was reached (0.5 s)"
    assert "ZeroDivisionError: a denominator of the test" in by_name["f"]["reason"]
    memory = f"the memory limit of {mebibytes} MiB was reached"
    assert by_name["d"]["reason"] == ("the process that did the work died" if mebibytes is None else memory)
    if mebibytes is not None:
        assert by_name["h"]["reason"] == memory
    assert by_name["z"]["sheet"] is None
    assert by_name["z"]["error"].startswith(f"{folder / 'z.claim'}:1:16: expected three points")
    told = capsys.readouterr()
    assert by_name["z"]["error"] in told.err
    assert "\x1b" not in told.out + told.err
    assert "2 files cannot be read" in told.out

    found = {c.get("classname"): c for c in cases(junit)}
    for name, title in names.items():
        assert (found[f"{name}.claim"].find("error") is None) == (title == "plain")
    assert found["z.claim"].find("error").get("type") == "unreadable"
    assert found["z.claim"].find("error").text == by_name["z"]["error"]


def test_one_long_computation_is_stopped(tmp_path: Path) -> None:
    """An elimination that never looks at the clock, and a sheet after it in the same worker."""
    folder = folder_of(tmp_path / "issue", b="plain")
    (folder / "a.claim").write_text(
        "given triangle ABC\ngiven triangle ABD\nclaim inradius(ABC) + inradius(ABD) = |CD|\n"
    )
    out = tmp_path / "out.jsonl"
    assert review(folder, jsonl=out, workers=1, time_limit=1.0) == 3
    first, second = lines(out)
    assert (first["verdict"], second["verdict"]) == ("undecided", "holds")
    assert first["reason"]


@pytest.mark.parametrize(
    ("texts", "code"),
    [
        ([SHEET], 0),
        ([SHEET, SHEET.replace("=", "<")], 1),
        ([SHEET.replace("=", "<"), f"title crash\n{SHEET}"], 3),
        ([f"title crash\n{SHEET}", BAD, SHEET], 2),
    ],
)
def test_exit_codes(tmp_path: Path, texts: list[str], code: int) -> None:
    for i, text in enumerate(texts):
        (tmp_path / f"{i}.claim").write_text(text)
    assert review(tmp_path, workers=1, work=troubled) == code


def test_wrong_use_is_said(tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    (tmp_path / "empty").mkdir()
    folder = folder_of(tmp_path / "issue", a="plain")
    assert review(tmp_path / "none") == 2
    assert review(tmp_path / "empty") == 2
    assert review(folder, resume=True) == 2
    assert review(folder, jsonl=tmp_path / "none" / "out.jsonl") == 2
    assert review(folder, junit=tmp_path) == 2
    assert review(folder, workers=0) == 2
    told = capsys.readouterr().err.splitlines()
    assert len(told) == 6
    assert all(line.startswith("expected ") for line in told)


def test_summary_lists_every_claim(tmp_path: Path) -> None:
    folder = folder_of(tmp_path / "issue", a="plain", b="<script>")
    (folder / "z.claim").write_text(BAD)
    assert review(folder, summary=tmp_path / "pages", workers=1, time_limit=20) == 2
    page = (tmp_path / "pages" / "index.html").read_text(encoding="utf-8")
    root = etree.HTML(page)
    rows = root.findall(".//tbody/tr")
    assert [r.get("class") for r in rows] == ["holds", "holds", "unreadable"]
    assert ["".join(r[0].itertext()) for r in rows] == ["a.claim", "b.claim", "z.claim"]
    assert "<script>" in "".join(rows[1][1].itertext())
    for link in root.iter("a"):
        assert (tmp_path / "pages" / link.get("href")).is_file()
    assert not list(root.iter("script", "link", "img"))
