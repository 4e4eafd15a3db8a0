"""Pages of all examples, built once for all tests of this directory."""

from __future__ import annotations

from functools import cache
from html.parser import HTMLParser
from pathlib import Path

import surdwise
from surdwise.api import rewrite
from surdwise.report.page import render
from surdwise.report.parts import CertificateNote, ClaimPart, claim_parts
from surdwise.thesis.parts import Form

EXAMPLES = sorted((Path(__file__).parents[2] / "examples").glob("*.claim"))
NOTE = CertificateNote("winter.cert", "0123456789abcdef" * 4, 12)
MAP_SECONDS = 8.0

MORE = {
    "chain": "title Radii & a <chain>\n"
    "given triangle ABC\n"
    "claim inradius(ABC) < 2inradius(ABC) <= circumradius(ABC)\n"
    "claim bisector(ABC, A) < median(ABC, A)\n",
    "areas": "given triangle ABC\n"
    "given D, E = corners of square on BC away from A\n"
    "given B1 = foot of B on CA\n"
    "given A' = reflection of A in line BC\n"
    "claim area(ABC) = area(A'BC)\n"
    "claim cos(BAC) < cos(ABC)\n"
    "---\n"
    "title Curves by name\n"
    "given points A, B\n"
    "given k = circle with diameter AB\n"
    "given t = tangent to k at A\n"
    "given m = perpendicular bisector of AB\n"
    "given X = meet of m and k\n"
    "claim |AX| = |BX|\n"
    "claim |AX| < 2|BX|\n",
}


NAMES = [p.stem for p in EXAMPLES] + list(MORE)


@cache
def parts(name: str) -> tuple[ClaimPart, ...]:
    """The parts of the page of an example or of one of the texts above."""
    path = next((p for p in EXAMPLES if p.stem == name), None)
    out: list[ClaimPart] = []
    for sheet in surdwise.read(MORE[name] if path is None else path):
        # two of the five formulations: the others may take long, and the page sets them alike
        rewritings = rewrite(sheet, (Form.AUXILIARY, Form.SQUARED))
        out += claim_parts(sheet, surdwise.decide(sheet), rewritings, len(out) + 1, MAP_SECONDS)
    return tuple(out)


@cache
def page(name: str, to: str = "html") -> str:
    """The page as HTML or LaTeX."""
    return render(parts(name), to, NOTE)


VOID = set("area base br col embed hr img input link meta source track wbr".split())


class Outline(HTMLParser):
    """Reads a page strictly: every element is closed where it was opened (SVG and MathML may close
    themselves); keeps ids, references, addresses and text."""

    def __init__(self, text: str) -> None:
        super().__init__()
        self.open: list[str] = []
        self.ids: list[str] = []
        self.references: list[str] = []
        self.addresses: list[str] = []
        self.text = ""
        self.tags: list[str] = []
        self.feed(text)
        self.close()
        assert not self.open, self.open

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self._seen(tag, attrs)
        if tag not in VOID:
            self.open.append(tag)

    def handle_startendtag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        assert "svg" in self.open or "math" in self.open, f"<{tag}/> in HTML"
        self._seen(tag, attrs)

    def _seen(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.tags.append(tag)
        names = [n for n, _ in attrs]
        assert len(names) == len(set(names)), (tag, names)
        for name, value in attrs:
            assert value is not None, (tag, name)
            if name == "id":
                self.ids.append(value)
            if name in ("aria-labelledby", "aria-describedby"):
                self.references += value.split()
            if value.startswith("url(#"):
                self.references.append(value[5:-1])
            if name in ("href", "src", "srcset", "action", "data", "poster", "xlink:href"):
                self.addresses.append(value)

    def handle_endtag(self, tag: str) -> None:
        assert self.open, f"</{tag}> closes nothing"
        last = self.open.pop()
        assert last == tag, f"</{tag}> closes <{last}>"

    def handle_data(self, data: str) -> None:
        if self.open and self.open[-1] not in ("style", "title", "desc"):
            self.text += data
