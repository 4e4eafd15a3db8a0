"""The page: valid, complete, self-contained, with labels that do not touch."""

from __future__ import annotations

import itertools
import math
import re
import xml.etree.ElementTree as ElementTree

import pytest

from surdwise.report.picture import Dot, Label, Picture
from surdwise.report.write import write_report
from surdwise.sheet import read_text
from surdwise.verdict.outcome import PlacedPoint, Verdict
from tests.report.pages import EXAMPLES, NAMES, NOTE, Outline, page, parts


def _plain(text: str) -> str:
    """Letters, digits and signs alone, as a reader of the page sees them."""
    return re.sub(r"[\s*]", "", text.replace("−", "-").replace("≤", "<=").replace("≥", ">="))


@pytest.mark.parametrize("name", NAMES)
def test_page_is_valid_and_complete(name: str) -> None:
    text_of_page = page(name)
    outline = Outline(text_of_page)
    assert len(outline.ids) == len(set(outline.ids))
    assert set(outline.references) <= set(outline.ids)
    for picture in re.findall(r"<svg.*?</svg>|<math>.*?</math>", text_of_page, re.S):
        ElementTree.fromstring(picture)
    text = _plain(outline.text)
    for p in parts(name):
        d = p.decision
        assert f"{d.verdict.value.capitalize()}" in outline.text
        if d.condition not in (None, "never") and "/" not in d.condition and "^" not in d.condition:
            assert _plain(d.condition) in text, d.condition
        pictures = (d.holds_at is not None) + (d.fails_at is not None)
        assert len(p.figures) == pictures
        assert pictures or d.verdict in (Verdict.EMPTY, Verdict.UNDECIDED)
        for f in p.figures:
            assert f.picture.title in text_of_page
            assert [r[0] for r in f.rows] == list(d.holds_at or d.fails_at or {})
        if len(d.parameters) in (1, 2):
            assert p.map is not None, p.map_why_not
        for line in p.repaired.splitlines():
            assert d.verdict is not Verdict.CONDITIONAL or _plain(line) in text
    assert NOTE.digest in text_of_page and NOTE.recheck in text_of_page
    assert "tolerances, local codes" in text_of_page


@pytest.mark.parametrize("name", NAMES)
def test_page_asks_for_nothing_from_elsewhere(name: str) -> None:
    source = page(name)
    assert "<script" not in source and "@import" not in source
    for address in Outline(source).addresses:
        assert address.startswith("#") or address == "data:,", address
    assert set(re.findall(r"https?://[^\"' )]*", source)) <= {"http://www.w3.org/2000/svg"}
    assert all(u.startswith("#") for u in re.findall(r"url\(([^)]*)\)", source))


def _touch(a: Label, b: Label) -> bool:
    al, ab, ar, at = a.box
    bl, bb, br, bt = b.box
    return min(ar, br) > max(al, bl) and min(at, bt) > max(ab, bb)


def _pictures(name: str) -> list[Picture]:
    out = []
    for p in parts(name):
        out += [f.picture for f in p.figures] + ([p.map.picture] if p.map else [])
    return out


@pytest.mark.parametrize("name", NAMES)
def test_labels_keep_apart_and_inside(name: str) -> None:
    for picture in _pictures(name):
        for a, b in itertools.combinations(picture.labels(), 2):
            assert not _touch(a, b), (a, b)
        for label in picture.labels():
            left, low, right, top = label.box
            assert left > -1 and low > -1 and right < picture.width + 1 and top < picture.height + 1, label
            for dot in picture.marks:
                if isinstance(dot, Dot) and label.kind in ("point", "curve"):
                    x, y = dot.at
                    assert not (left < x < right and low < y < top), (label, dot)


@pytest.mark.parametrize("name", NAMES)
def test_every_point_is_named_once(name: str) -> None:
    for p in parts(name):
        for f, figure in zip(
            p.figures, [x for x in (p.decision.holds_at, p.decision.fails_at) if x is not None], strict=True
        ):
            named = [n for x in f.picture.labels() if x.kind == "point" for n in x.text.split(" = ")]
            assert sorted(named) == sorted(n.replace("'", "′") for n in figure)
            spots = {_rounded(q) for q in figure.values()}
            assert len([x for x in f.picture.marks if isinstance(x, Dot)]) == len(spots)


def _rounded(p: PlacedPoint) -> tuple[float, float]:
    return round(p.float[0], 9), round(p.float[1], 9)


def test_points_that_coincide_share_a_label() -> None:
    # the right angle at A makes the orthocentre fall on A: three centres of the printed witness
    labels = {x.text for p in _pictures("euler-line") for x in p.labels()}
    assert "A = H" in labels


def test_figures_are_similar_to_their_coordinates() -> None:
    """The dots of a drawing are a similar image of the exact points."""
    for name in NAMES:
        for p in parts(name):
            figures = [x for x in (p.decision.holds_at, p.decision.fails_at) if x is not None]
            for f, figure in zip(p.figures, figures, strict=True):
                spots = list(
                    dict.fromkeys((round(q.float[0], 9), round(q.float[1], 9)) for q in figure.values())
                )
                dots = [m.at for m in f.picture.marks if isinstance(m, Dot)]
                ratios = [
                    math.dist(a, b) / math.dist(c, d)
                    for (a, c), (b, d) in itertools.combinations(list(zip(dots, spots, strict=True)), 2)
                ]
                assert all(math.isclose(r, ratios[0], rel_tol=1e-6) for r in ratios)


def test_write_report_answers_with_the_verdicts_code(tmp_path, capsys) -> None:  # type: ignore[no-untyped-def]
    sheet = tmp_path / "two.claim"
    sheet.write_text(
        "title One\ngiven square ABCD\nclaim |AC| = |BD|\n---\ntitle Two\ngiven points P, Q, X\n"
        "given P, Q, X collinear\nclaim |PX| + |XQ| = |PQ|\n",
        encoding="utf-8",
    )
    out = tmp_path / "two.html"
    assert write_report(sheet, out, time_limit=20) == 1
    written = out.read_text(encoding="utf-8")
    assert written.count("<article id=") == 2 and "Claim 2 of 2" in written
    assert write_report(sheet, tmp_path / "two.pdf") == 2
    sheet.write_text("given square ABCD\nclaim |AC| = |BX|\n", encoding="utf-8")
    bad = tmp_path / "bad.html"
    assert write_report(sheet, bad) == 2 and not bad.exists()
    assert "two.claim:2" in capsys.readouterr().err


def test_a_distance_to_a_named_line_is_reported(tmp_path) -> None:  # type: ignore[no-untyped-def]
    sheet = tmp_path / "tangent.claim"
    sheet.write_text(
        "given points A, B\ngiven k = circle with diameter AB\ngiven t = tangent to k at A\n"
        "claim |AB| = dist(B, t)\n",
        encoding="utf-8",
    )
    out = tmp_path / "tangent.html"
    assert write_report(sheet, out, time_limit=20) == 0
    assert "Holds" in out.read_text(encoding="utf-8")


def test_repaired_text_reads_back() -> None:
    for name in ("chord-sum", "centre-distances"):
        (p,) = parts(name)
        (sheet,) = read_text(p.repaired)
        assert sheet.provided[-1].text == p.decision.condition


def test_all_examples_are_here() -> None:
    assert len(EXAMPLES) >= 19
