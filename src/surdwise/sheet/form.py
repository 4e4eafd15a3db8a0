"""What one form of the sheet language is: how it is written and what it means."""

from __future__ import annotations

from dataclasses import dataclass
from enum import Enum


class Kind(Enum):
    """The groups in which the forms are listed, in this order."""

    FREE = "free"
    SHAPE = "shapes"
    POINT_ON = "points on"
    MADE = "made points"
    MEET = "meets"
    CURVE = "curves"
    RELATION = "relations"
    CONDITION = "conditions"
    QUANTITY = "quantities"
    THESIS = "thesis"
    REFERENCE = "references"


GIVEN = ("given",)
ASKED = ("provided", "claim")
ANYWHERE = ("given", "provided", "claim")


@dataclass(frozen=True)
class Form:
    """One form, by the alias it has in the grammar.

    `args` says what each argument is: point (Pt), place (Pt or CentreOf), points (a list of
    Pt), pair, triple, quad, quint, hexa (runs of Pt), line, circle, curve (either), name (the
    new name of a curve), side, size, quantity, condition.  `pattern` is its spelling, with
    {0}, {1} ... for the arguments.  `new` gives the arguments whose points or name the form
    may bring in; with `fresh` they must not exist before.  `makes` is "line" or "circle" for
    a form that names one.  `corner` gives a triangle and a further argument whose points
    must be corners of it.  `under` are the keywords it may stand behind; quantities and
    references only stand inside other forms.
    """

    alias: str
    kind: Kind
    example: str
    meaning: str
    args: tuple[str, ...]
    pattern: str
    under: tuple[str, ...] = ()
    new: tuple[int, ...] = ()
    fresh: bool = False
    makes: str = ""
    corner: tuple[int, int] | None = None
