"""Pages in a real browser: nothing overflows, nothing is blank, nothing is asked for."""

from __future__ import annotations

import base64
import json
from collections.abc import Iterator
from pathlib import Path

import pytest

from tests.report.browser import PROGRAM, Browser
from tests.report.pages import NAMES, page

pytestmark = pytest.mark.skipif(PROGRAM is None, reason="no Chromium is installed")

BOXES = """JSON.stringify([...document.querySelectorAll('svg.picture')].map(e => {
  const b = e.getBoundingClientRect();
  return {x: b.x + scrollX, y: b.y + scrollY, width: b.width, height: b.height}}))"""
LABELS = """JSON.stringify([...document.querySelectorAll('svg.picture')].map(s =>
  [...s.querySelectorAll('text')].map(t => {
    const b = t.getBBox(); return [t.textContent, b.x, b.y, b.width, b.height]})))"""
SCROLL = """JSON.stringify([document.documentElement.scrollWidth, innerWidth,
  ...[...document.querySelectorAll('body *')].filter(e => {
    if (e.closest('.scroll, svg, math, dd')) return false;
    const b = e.getBoundingClientRect(); return b.width > 0 && (b.right > innerWidth + 1 || b.left < -1)})
    .map(e => e.outerHTML.slice(0, 90))])"""


@pytest.fixture(scope="module")
def browser() -> Iterator[Browser]:
    with Browser() as b:
        yield b


@pytest.fixture(scope="module")
def folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    out = tmp_path_factory.mktemp("pages")
    for name in NAMES:
        (out / f"{name}.html").write_text(page(name), encoding="utf-8")
    return out


@pytest.mark.parametrize("name", NAMES)
def test_page_in_a_browser(name: str, browser: Browser, folder: Path) -> None:
    path = folder / f"{name}.html"
    browser.events.clear()
    for width in (375, 1280):
        browser.open(path, width)
        scroll, window, *wide = json.loads(browser.value(SCROLL))
        assert scroll <= window and not wide, (width, scroll, wide)
        for texts in json.loads(browser.value(LABELS)):
            for i, (a, ax, ay, aw, ah) in enumerate(texts):
                for b, bx, by, bw, bh in texts[:i]:
                    # boxes of a line of text are taller than its letters: a quarter is air
                    x = min(ax + aw, bx + bw) - max(ax, bx)
                    y = min(ay + ah, by + bh) - max(ay, by) - 0.25 * min(ah, bh)
                    assert x <= 0 or y <= 0, (a, b, x, y)
    bad = [e for e in browser.events if e["method"] in ("Runtime.exceptionThrown", "Log.entryAdded")]
    asked = [
        e["params"]["request"]["url"] for e in browser.events if e["method"] == "Network.requestWillBeSent"
    ]
    assert not bad, bad
    assert all(u.startswith(("file:", "data:")) for u in asked), asked


@pytest.mark.parametrize("name", ["chord-sum", "three-distances", "areas"])
def test_pictures_are_not_blank(name: str, browser: Browser, folder: Path) -> None:
    for dark in (False, True):
        browser.open(folder / f"{name}.html", 1280, dark)
        boxes = json.loads(browser.value(BOXES))
        assert len(boxes) >= 2
        shots = [browser.picture(b) for b in boxes]
        browser.value(
            "document.querySelectorAll('svg.picture > *').forEach(e => e.style.visibility = 'hidden')"
        )
        for box, shot in zip(boxes, shots, strict=True):
            blank = browser.picture(box)
            assert box["width"] > 100 and box["height"] > 60
            assert len(shot) > len(blank) + 1000


def test_dark_paper_is_dark(browser: Browser, folder: Path) -> None:
    def light(what: str) -> float:
        text = browser.value(f"getComputedStyle(document.body).{what}")
        return sum(float(x) for x in text[text.index("(") + 1 : -1].split(",")[:3]) / 765

    browser.open(folder / "chord-sum.html", 1280)
    assert light("backgroundColor") > 0.9 and light("color") < 0.3
    browser.open(folder / "chord-sum.html", 1280, dark=True)
    assert light("backgroundColor") < 0.2 and light("color") > 0.7


@pytest.mark.parametrize("name", ["chord-sum", "parallelogram-law"])
def test_page_prints(name: str, browser: Browser, folder: Path) -> None:
    browser.open(folder / f"{name}.html", 1280)
    data = base64.b64decode(browser.call("Page.printToPDF", printBackground=True)["data"])
    assert data.startswith(b"%PDF") and len(data) > 20_000
