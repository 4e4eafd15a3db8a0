"""A drawing as a short list of marks in points of the page, written by svg.py or tikz.py.

Why not a plotting library: a figure here is a dozen strokes and letters whose inks must follow
the page (dark paper, print without colour), whose labels must not touch, and which is wanted as
SVG with titles for readers who cannot see it and as TikZ in the journal's own fonts.  A display
list with two short writers gives all of that; a plotting library gives axes.

Units: 1 = 1/96 inch (a CSS pixel); x runs right, y runs up, the origin is the lower left corner.
"""

from __future__ import annotations

from dataclasses import dataclass, field
from enum import Enum

XY = tuple[float, float]


class Ink(Enum):
    """What a stroke means; the writers say how it looks."""

    GIVEN = "given"  # lines, segments and circles that the sheet names
    PRODUCED = "produced"  # a line beyond the points that name it
    HELPER = "helper"  # what a construction is made of
    LEFT = "left"  # lengths on the left of the claim
    RIGHT = "right"  # lengths on the right of the claim
    BORDER = "border"  # where the truth of the claim changes
    OPEN = "open"  # such a border on which the claim is false
    TRUE = "true"
    FALSE = "false"
    MIXED = "mixed"
    ONLY = "only"  # a thin set where the claim differs from all around it
    CLEAR = "clear"  # room under a stroke that lies on another
    FRAME = "frame"
    LEADER = "leader"


class Fill(Enum):
    """What an area means."""

    TRUE = "true"
    FALSE = "false"
    MIXED = "mixed"
    NONE = "none"
    LEFT = "left"
    RIGHT = "right"


@dataclass(frozen=True)
class Stroke:
    """A polyline, closed or open."""

    points: tuple[XY, ...]
    ink: Ink
    closed: bool = False


@dataclass(frozen=True)
class Ring:
    """A circle."""

    centre: XY
    radius: float
    ink: Ink


@dataclass(frozen=True)
class Area:
    """An area bounded by loops, inside by the even-odd rule."""

    loops: tuple[tuple[XY, ...], ...]
    fill: Fill


@dataclass(frozen=True)
class Dot:
    """A point; `kind` is one of point, true, false, only, stop."""

    at: XY
    kind: str = "point"


@dataclass(frozen=True)
class Label:
    """Text centred in a box of the given width and height; `kind` is one of point, curve, axis,
    area."""

    text: str
    centre: XY
    width: float
    height: float
    kind: str = "point"

    @property
    def box(self) -> tuple[float, float, float, float]:
        """Left, bottom, right, top."""
        (x, y), w, h = self.centre, self.width / 2, self.height / 2
        return x - w, y - h, x + w, y + h


Mark = Stroke | Ring | Area | Dot | Label


@dataclass(frozen=True)
class Picture:
    """A finished drawing: `title` names it, `words` tell it to a reader who cannot see it."""

    width: float
    height: float
    marks: tuple[Mark, ...]
    title: str
    words: str
    legend: tuple[tuple[str, str], ...] = field(default=())

    def labels(self) -> list[Label]:
        """All labels."""
        return [m for m in self.marks if isinstance(m, Label)]
