"""The whole benchmark: rows, limits, files, resuming, order."""

from __future__ import annotations

import csv
import json
import os
import subprocess
import sys
import time
import xml.etree.ElementTree as ET
from html.parser import HTMLParser
from pathlib import Path
from typing import Any

import pytest

from surdwise.benchmark import Benchmark, Options, benchmark, compare
from surdwise.benchmark.chart import AXES, chart
from surdwise.benchmark.choice import CHOICES
from surdwise.benchmark.command import OutputError
from surdwise.benchmark.guard import Send, guarded
from surdwise.benchmark.journal import Journal
from surdwise.benchmark.literal import Agreement, agreement
from surdwise.benchmark.row import COLUMNS, Row
from surdwise.benchmark.show import csv_text, json_lines
from surdwise.thesis.parts import Status
from surdwise.verdict.outcome import Verdict

from .sheets import sheet, text

QUICK = Options(repeat=2, warm_up=0, time_limit=20.0, decide_limit=20.0)


@pytest.fixture(scope="module")
def done() -> Benchmark:
    """Two claims and one that is left out, through two engines."""
    s = [sheet("chords"), text("given points P, Q, X\nclaim |PX| + |XQ| >= |PQ|\n"), sheet("Euler line")]
    return benchmark(s, ("tower", "sympy"), QUICK)


def test_rows_stand_in_order(done: Benchmark) -> None:
    names = [(r.claim, r.formulation, r.engine) for r in done.rows]
    expected = [
        (claim, c, e)
        for claim in ("|PA| = |PB| + |PC|", "|OH| = 3|OG|")
        for c in CHOICES
        for e in ("tower", "sympy")
        if (c, e) != ("elimination", "tower")
    ]
    assert names == expected
    assert [x[1:] for x in done.left_out] == [
        ("|PX| + |XQ| >= |PQ|", "not an equality between two quantities")
    ]


def test_numbers_make_sense(done: Benchmark) -> None:
    for r in done.rows:
        assert r.end == "done" and r.runs == 2 and r.memory is not None
        assert r.answer_least is not None and r.answer is not None and r.answer_most is not None
        assert 0 <= r.answer_least <= r.answer <= r.answer_most
        assert r.seconds is not None and r.seconds > 0
        assert r.literal == ("conditional" if r.claim.startswith("|PA|") else "holds")
    product = next(r for r in done.rows if r.formulation == "sign_product")
    # the sign product of the README's example has 19 terms in degree 4 over free coordinates of P and C
    assert (product.parameters, product.components, product.radicals, product.terms) == (1, 1, 3, 19)
    assert product.status == "generally true" and product.agreement == "wrong"
    euler = next(r for r in done.rows if r.claim.startswith("|OH|"))
    assert euler.formulation == "auxiliary" and euler.agreement == "partial"


def test_agreement_is_what_it_says() -> None:
    assert agreement(Status.TRUE, Verdict.HOLDS) is Agreement.AGREES
    assert agreement(Status.PARTS, Verdict.HOLDS) is Agreement.PARTIAL
    assert agreement(Status.TRUE, Verdict.CONDITIONAL) is Agreement.WRONG
    assert agreement(Status.FALSE, Verdict.CONDITIONAL) is Agreement.WRONG
    assert agreement(Status.TRUE, Verdict.UNDECIDED) is Agreement.OPEN
    assert agreement(None, Verdict.HOLDS) is Agreement.OPEN
    for s in (Status.TRUE, Status.FALSE, Status.PARTS):
        found = {agreement(s, v) for v in (Verdict.HOLDS, Verdict.CONDITIONAL, Verdict.FAILS)}
        assert Agreement.AGREES in found and len(found) == 2


def test_data_says_what_the_rows_say(done: Benchmark) -> None:
    lines = [json.loads(x) for x in json_lines(done).splitlines()]
    assert lines[0]["machine"]["engine sympy"] and lines[0]["repeat"] == 2
    assert [Row.of(x) for x in lines[1:-1]] == list(done.rows)
    assert lines[-1]["left_out"].startswith("not an equality")
    table = list(csv.DictReader(csv_text(done).splitlines()))
    assert list(table[0]) == list(COLUMNS) and len(table) == len(done.rows)
    assert [float(x["answer"]) for x in table] == [r.answer for r in done.rows]


class _Page(HTMLParser):
    """Tags that stay open, and addresses."""

    def __init__(self) -> None:
        super().__init__()
        self.open: list[str] = []
        self.addresses: list[str] = []

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.addresses += [v or "" for k, v in attrs if k in ("href", "src")]
        if tag not in ("meta", "circle", "polygon", "line", "rect"):
            self.open.append(tag)

    def handle_endtag(self, tag: str) -> None:
        if tag not in ("circle", "polygon", "line", "rect"):
            assert self.open.pop() == tag


def test_files_and_page(tmp_path: Path) -> None:
    names = {"csv": tmp_path / "a.csv", "jsonl": tmp_path / "a.jsonl", "html_page": tmp_path / "a.html"}
    b, shown = compare([sheet("chords")], ("tower",), QUICK, **names)
    assert sorted(p.name for p in tmp_path.iterdir()) == ["a.csv", "a.html", "a.jsonl"]
    assert "literally conditional; parameters 1, components 1, lengths 3" in shown
    page = _Page()
    source = names["html_page"].read_text("utf-8")
    page.feed(source)
    assert not page.open and not page.addresses and "http" not in source and "<script" not in source
    for axis in AXES:
        figure = chart(axis, b.rows, 20.0)
        tree = ET.fromstring(figure)
        marks = [x for x in tree.iter() if x.tag in ("circle", "polygon")]
        assert len(marks) == len(b.rows)
        assert all((x.findtext("title") or "").startswith("|PA| = |PB| + |PC|: ") for x in marks)


def test_shapes_differ_by_formulation_and_fillings_by_engine(done: Benchmark) -> None:
    tree = ET.fromstring(chart(AXES[1], done.rows, 20.0))
    marks = [x for x in tree.iter() if x.tag in ("circle", "polygon")]
    first, claims = marks[:11], {r.claim for r in done.rows}
    assert len(marks) == 11 * len(claims)
    assert len({x.get("fill") for x in first}) == 2
    corners = [len((x.get("points") or "").split()) for x in first]
    assert set(corners) == {0, 3, 4, 12}


def test_a_stopped_run_goes_on(tmp_path: Path) -> None:
    """Killed in the middle, it measures only what is missing, and the files are those of a whole run."""
    journal = tmp_path / "a.jsonl.journal"
    code = (
        "import sys\nfrom pathlib import Path\nfrom surdwise.benchmark import *\n"
        "import surdwise\n(s,) = surdwise.read('given equilateral triangle ABC\\ngiven P on circle ABC\\n"
        "claim |PA| = |PB| + |PC|\\n')\n"
        "b, _ = compare([s], ['tower'], Options(repeat=2, time_limit=20.0, decide_limit=20.0), "
        f"jsonl=Path({str(tmp_path / 'a.jsonl')!r}), resume=True)\nprint(len(b.rows))\n"
    )
    child = subprocess.Popen([sys.executable, "-c", code], stdout=subprocess.PIPE)
    while child.poll() is None and not (journal.exists() and journal.read_bytes().count(b"\n") >= 2):
        time.sleep(0.002)
    child.kill()
    child.wait()
    assert journal.exists(), "the run was over before it could be stopped"
    with open(journal, "ab") as f:
        f.write(b'{"key": "cut o')
    before = journal.read_bytes().splitlines()[:2]
    kept = Journal(journal, resume=True)
    assert 2 <= len(kept.entries) < 6
    # a measurement that no run would give: it must be taken over as it stands
    name, fields = list(kept.entries.items())[1]
    kept.add(name, {**fields, "write": 123.0})
    out = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert out.stdout.strip() == "5"
    assert not journal.exists()
    rows = [json.loads(x) for x in (tmp_path / "a.jsonl").read_text("utf-8").splitlines()[1:]]
    assert [r["write"] for r in rows].count(123.0) == 1
    assert [r["formulation"] for r in rows] == list(CHOICES[:-1])
    assert len(before) == 2


def test_a_journal_of_other_limits_is_not_taken_over(tmp_path: Path) -> None:
    journal = tmp_path / "j"
    s = [sheet("point of a line")]
    one = benchmark(s, ("tower",), QUICK, journal)
    count = journal.read_bytes().count(b"\n")
    assert benchmark(s, ("tower",), QUICK, journal, resume=True) == one
    assert journal.read_bytes().count(b"\n") == count
    benchmark(s, ("tower",), Options(repeat=1, decide_limit=20.0), journal, resume=True)
    assert journal.read_bytes().count(b"\n") == 2 * count


def test_time_is_a_hard_limit() -> None:
    """A started program dies with the work, and what was said before is kept."""

    def work(send: Send) -> None:
        child = subprocess.Popen(["sleep", "60"])
        send({"child": child.pid})
        child.wait()

    start = time.monotonic()
    out = guarded(work, 0.5, None)
    assert time.monotonic() - start < 5
    assert out.end == "time" and out.peak is not None
    pid = out.said[0]["child"]
    for _ in range(100):
        if not _alive(pid):
            break
        time.sleep(0.02)
    assert not _alive(pid)


def _alive(pid: int) -> bool:
    try:
        state = Path(f"/proc/{pid}/stat").read_text("ascii").rsplit(")", 1)[1].split()[0]
    except OSError:
        return False
    return state != "Z"


def test_memory_is_a_hard_limit() -> None:
    def work(send: Send) -> None:
        send({"size": len(bytearray(300 << 20))})

    assert guarded(work, 20, 100).end == "memory"
    whole = guarded(work, 20, 1000)
    assert whole.end == "done" and whole.said == ({"size": 300 << 20},)
    assert whole.peak is not None and whole.start is not None
    assert 290 << 10 < whole.peak - whole.start < 330 << 10


def test_an_error_is_told() -> None:
    def work(send: Send) -> None:
        raise ValueError("no such thing")

    out = guarded(work, 20, None)
    assert (out.end, out.words) == ("error", "ValueError: no such thing")
    out = guarded(lambda send: os._exit(3), 20, None)
    assert out.end == "error"


def test_limits_show_in_the_rows() -> None:
    s = text("given points A, B, C, D, E\nclaim perimeter(ABCDE) = |AC| + |AD|\n")
    b = benchmark([s], ("tower",), Options(repeat=1, warm_up=0, time_limit=1.0, decide_limit=1.0))
    rows = {r.formulation: r for r in b.rows}
    assert rows["auxiliary"].end == "done" and rows["auxiliary"].status == "generally false"
    assert rows["eliminant"].end in ("time", "memory") and rows["eliminant"].status is None
    assert rows["eliminant"].agreement == "open" and "while writing it down" in rows["eliminant"].words


def test_known_verdicts_are_not_decided(monkeypatch: pytest.MonkeyPatch) -> None:
    def never(*args: Any) -> str:
        raise AssertionError

    monkeypatch.setattr("surdwise.benchmark.run.verdict", never)
    s = sheet("point of a line")
    b = benchmark([s], ("tower",), Options(repeat=1), known={s.file: Verdict.CONDITIONAL})
    assert {r.literal for r in b.rows} == {"conditional"}


def test_bad_outputs_are_told_before_the_work(tmp_path: Path) -> None:
    with pytest.raises(OutputError, match="expected a folder"):
        compare([], (), QUICK, csv=tmp_path / "none" / "a.csv")
    with pytest.raises(OutputError, match="expected --jsonl FILE with --resume"):
        compare([], (), QUICK, resume=True)
