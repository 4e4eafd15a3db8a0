"""The figure of a sheet, run line by line in any arithmetic that can place points.

A form is one function of the table FORMS (forms_points, forms_curves, forms_shapes): it places its new points
by the frame's parametrisation, or demands of points that are placed already what the form says.
"""

from __future__ import annotations

from . import forms_curves, forms_points, forms_shapes
from .conditions import circle_test, equations, truth
from .forms_drawing import FORMS, Drawing, Frame, perform
from .forms_plane import Figure
from .forms_scale import keeps_scale
from .protocol import Arithmetic, Placing
from .quantities import difference
from .tree import Build, Compare, Says, Sheet

__all__ = ["FORMS", "admitted", "keeps_scale", "run_given", "run_step"]

ROOMS = (forms_curves, forms_points, forms_shapes)


def run_given(
    sheet: Sheet, placing: Placing, frame: str = "cartesian", figure: Figure | None = None
) -> Figure:
    """All given lines in order, in `figure`, which is extended; points that it holds already are checked."""
    figure = Figure() if figure is None else figure
    for i in range(len(sheet.given)):
        run_step(sheet, i, placing, frame, figure)
    return figure


def run_step(sheet: Sheet, i: int, placing: Placing, frame: str, figure: Figure) -> None:
    """One given line; `placing.begin_step(i)` comes first."""
    placing.begin_step(i)
    d = Drawing(figure, placing, Frame(frame, keeps_scale(sheet)))
    line = sheet.given[i]
    body = line.body
    words = f"{line.text} does not hold"
    if isinstance(body, Build):
        perform(d, body.form, body.args)
    elif isinstance(body, Compare):
        placing.vanish(difference(body.items[0], body.items[1], d), words)
    elif isinstance(body, Says) and body.form == "concyclic":
        _concyclic(d, body, words)
    else:
        assert isinstance(body, Says)
        for e in equations(body, d):
            placing.vanish(e, words)


def _concyclic(d: Drawing, body: Says, words: str) -> None:
    """A hypothesis: the first three points are not on one line, and the others on their circle."""
    names = body.args[0]
    assert isinstance(names, tuple)
    d.proper(names[:3])
    for p in names[3:]:
        d.numbers.vanish(circle_test(d, names[0], names[1], names[2], p), words)


def admitted(sheet: Sheet, figure: Figure, arithmetic: Arithmetic) -> bool:
    """Whether every provided line holds.  Undefined where one of them has no meaning."""
    return all(
        truth(line.body, figure, arithmetic) for line in sheet.provided if not isinstance(line.body, Build)
    )
