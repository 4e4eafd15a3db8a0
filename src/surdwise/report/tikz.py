"""A picture as TikZ source; the styles are set once in the page's preamble."""

from __future__ import annotations

from .labels import size_of
from .picture import XY, Area, Dot, Fill, Ink, Label, Mark, Picture, Ring, Stroke
from .texmath import text

POINT = 0.75  # a CSS pixel in points


def tikz(p: Picture) -> str:
    """One tikzpicture; 1 = 0.75 pt as on screen."""
    body = "\n".join(_mark(m) for m in p.marks)
    return (
        f"\\begin{{tikzpicture}}[x={POINT}pt,y={POINT}pt,surdwise]\n"
        f"\\useasboundingbox (0,0) rectangle ({_n(p.width)},{_n(p.height)});\n"
        f"\\clip (-1,-1) rectangle ({_n(p.width + 1)},{_n(p.height + 1)});\n"
        f"{body}\n\\end{{tikzpicture}}"
    )


def sample(key: str) -> str:
    """A swatch for a legend."""
    mark: Mark
    if key.startswith("area-"):
        mark = Area((((0, 0), (28, 0), (28, 12), (0, 12)),), Fill(key[5:]))
    elif key.startswith("dot-"):
        mark = Dot((14, 6), key[4:])
    else:
        mark = Stroke(((0, 6), (28, 6)), Ink(key))
    return f"\\tikz[x={POINT}pt,y={POINT}pt,surdwise]{{{_mark(mark)}}}"


def _n(x: float) -> str:
    return f"{x:.2f}".rstrip("0").rstrip(".")


def _path(points: tuple[XY, ...], closed: bool) -> str:
    # a line break now and then keeps lines of the source within what editors and mail bear
    joined = ""
    for k, (x, y) in enumerate(points):
        joined += ("" if k == 0 else "\n--" if k % 8 == 0 else "--") + f"({_n(x)},{_n(y)})"
    return joined + ("--cycle" if closed else "")


def _mark(m: Mark) -> str:
    match m:
        case Stroke(points, ink, closed):
            return f"\\draw[ink {ink.value}] {_path(points, closed)};"
        case Ring((x, y), r, ink):
            return f"\\draw[ink {ink.value}] ({_n(x)},{_n(y)}) circle[radius={_n(r)}];"
        case Area(loops, fill):
            path = "\n".join(_path(loop, True) for loop in loops)
            plain = f"\\fill[fill {fill.value}] {path};"
            return plain if fill is Fill.TRUE else f"{plain}\n\\fill[hatch {fill.value}] {path};"
        case Dot((x, y), kind):
            return f"\\pic at ({_n(x)},{_n(y)}) {{dot {kind}}};"
        case Label(words, (x, y), _, _, kind):
            size = size_of(kind) * POINT
            body = text(words) if kind in ("area", "axis") else _names(words)
            font = f"\\fontsize{{{_n(size * 0.92)}}}{{{_n(size)}}}\\selectfont"
            return f"\\node[label {kind},font={font}] at ({_n(x)},{_n(y)}) {{{body}}};"


def _names(words: str) -> str:
    out = []
    for name in words.split(" = "):
        digits = "".join(c for c in name if c.isdigit())
        body = "".join(c for c in name if not c.isdigit()).replace("′", "'")
        out.append(body + (f"_{{{digits}}}" if digits else ""))
    return "$" + "=".join(out) + "$"
