"""A picture as inline SVG: classes only, so that the page's style sheet sets every ink."""

from __future__ import annotations

import re
from html import escape

from .labels import size_of
from .picture import XY, Area, Dot, Fill, Ink, Label, Mark, Picture, Ring, Stroke

_HATCH = {
    Fill.FALSE: '<path class="hatch" d="M-2,2 l4,-4 M0,10 l10,-10 M8,12 l4,-4"/>',
    Fill.MIXED: '<path class="hatch" d="M0,0 l10,10 M0,10 l10,-10"/>',
    Fill.NONE: '<circle class="speck" cx="3" cy="3" r="0.9"/><circle class="speck" cx="8" cy="8" r="0.9"/>',
    Fill.LEFT: '<path class="hatch" d="M0,2.5 h10 M0,7.5 h10"/>',
    Fill.RIGHT: '<path class="hatch" d="M2.5,0 v10 M7.5,0 v10"/>',
}


def svg(p: Picture, ident: str) -> str:
    """One `<svg>` element; `ident` keeps its inner ids apart from other pictures of the page."""
    fills = {m.fill for m in p.marks if isinstance(m, Area)}
    defs = "".join(_pattern(f, ident) for f in Fill if f in fills)
    body = "".join(_mark(m, p.height, ident) for m in p.marks)
    return (
        f'<svg class="picture" viewBox="0 0 {_n(p.width)} {_n(p.height)}" role="img" '
        f'aria-labelledby="{ident}-t {ident}-d" xmlns="http://www.w3.org/2000/svg">'
        f'<title id="{ident}-t">{escape(p.title)}</title><desc id="{ident}-d">{escape(p.words)}</desc>'
        + (f"<defs>{defs}</defs>" if defs else "")
        + body
        + "</svg>"
    )


def sample(key: str, ident: str) -> str:
    """A small swatch for a legend: a stroke or an area as it looks in the picture."""
    if key.startswith("area-"):
        fill = Fill(key[5:])
        area = _mark(Area((((1, 1), (29, 1), (29, 15), (1, 15)),), fill), 16, ident)
        body = f"<defs>{_pattern(fill, ident)}</defs>{area}"
    elif key.startswith("dot-"):
        body = _mark(Dot((15, 8), key[4:]), 16, ident)
    else:
        body = _mark(Stroke(((2, 8), (28, 8)), Ink(key)), 16, ident)
    return f'<svg class="swatch" viewBox="0 0 30 16" aria-hidden="true">{body}</svg>'


def _pattern(fill: Fill, ident: str) -> str:
    return (
        f'<pattern id="{ident}-{fill.value}" class="fill-{fill.value}" width="10" height="10" '
        'patternUnits="userSpaceOnUse"><rect class="tint" width="10" height="10"/>'
        f"{_HATCH.get(fill, '')}</pattern>"
    )


def _n(x: float) -> str:
    return f"{x:.2f}".rstrip("0").rstrip(".")


def _path(points: tuple[XY, ...], height: float, closed: bool) -> str:
    return "M" + " ".join(f"{_n(x)},{_n(height - y)}" for x, y in points) + ("Z" if closed else "")


def _mark(m: Mark, height: float, ident: str) -> str:
    match m:
        case Stroke(points, ink, closed):
            path = _path(points, height, closed)
            line = f'<path class="ink {ink.value}" d="{path}"/>'
            if ink is Ink.RIGHT:
                line += f'<path class="hollow" d="{path}"/>'
            return line
        case Ring((x, y), r, ink):
            where = f'cx="{_n(x)}" cy="{_n(height - y)}" r="{_n(r)}"'
            line = f'<circle class="ink {ink.value}" {where}/>'
            if ink is Ink.RIGHT:
                line += f'<circle class="hollow" {where}/>'
            return line
        case Area(loops, fill):
            path = "".join(_path(loop, height, True) for loop in loops)
            return f'<path class="area" fill="url(#{ident}-{fill.value})" fill-rule="evenodd" d="{path}"/>'
        case Dot((x, y), kind):
            return _dot(x, height - y, kind)
        case Label():
            return _label(m, height)


def _dot(x: float, y: float, kind: str) -> str:
    if kind == "false":
        arm = 4.2
        return (
            f'<path class="ink cross" d="M{_n(x - arm)},{_n(y - arm)} l{2 * arm},{2 * arm} '
            f'M{_n(x - arm)},{_n(y + arm)} l{2 * arm},{-2 * arm}"/>'
        )
    if kind == "stop":
        return f'<rect class="stop" x="{_n(x - 3)}" y="{_n(y - 3)}" width="6" height="6"/>'
    r = {"point": 2.6, "true": 4.6, "only": 4.6}[kind]
    return f'<circle class="dot {kind}" cx="{_n(x)}" cy="{_n(y)}" r="{r}"/>'


def _label(m: Label, height: float) -> str:
    size = size_of(m.kind)
    x, y = m.centre[0], height - m.centre[1] + size * 0.34
    text = ""
    shift = 0.0
    for run in re.findall(r"\d+|\D+", m.text) if m.kind == "point" else [m.text]:
        # digits of a point's name stand lower
        low = 3.2 if m.kind == "point" and run.isdigit() else 0.0
        style = ' class="low"' if low else ""
        text += f'<tspan{style} dy="{_n(low - shift)}">{escape(run)}</tspan>'
        shift = low
    return f'<text class="label {m.kind}" x="{_n(x)}" y="{_n(y)}">{text}</text>'
