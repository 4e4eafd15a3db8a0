"""A formulation as text for people and for other systems.

`text` is plain, `latex` for print, `sympy` a script for that library, `singular` one for that
program.  Coordinates are called xC, yC after their point, lengths d1, d2, ... with a legend.
"""

from __future__ import annotations

from collections.abc import Callable

from ..field import ring
from ..field.ring import Poly
from .formal import Thesis
from .formulations import Formulation


def names(t: Thesis) -> dict[int, str]:
    """Names of the ring's variables, by position."""
    out: dict[int, str] = {}
    for k, label in t.coordinates.items():
        out[ring.param_slot(k)] = _coordinate(label)
    for i, x in enumerate(t.lengths, start=1):
        out[x.gen.slot] = f"d{i}"
    i = 0
    for g in t.tower.gens:
        if g.label == "number":
            i += 1
            out[g.slot] = f"w{i}"
    return out


def _coordinate(label: str) -> str:
    if " of " in label:
        axis, point = label.split(" of ")
        return axis + point.replace("'", "_")
    return "w" + "".join(c for c in label if c.isalnum())


def legend(t: Thesis) -> list[str]:
    """What the symbols mean."""
    table = names(t)
    spots = [f"{n} = ({_spell(x, t)}, {_spell(y, t)})" for n, (x, y) in t.placed.items()]
    lengths = [f"{table[x.gen.slot]} = {x.label}" for x in t.lengths]
    return [", ".join(spots), *([", ".join(lengths)] if lengths else [])]


def _spell(text: str, t: Thesis) -> str:
    for k, label in sorted(t.coordinates.items(), reverse=True):
        text = text.replace(ring.PARAM_NAMES[k], _coordinate(label))
    return text


def terms(p: Poly, table: dict[int, str]) -> list[tuple[int, list[tuple[str, int]]]]:
    """Integer coefficients with their powers of named variables."""
    out = []
    for mono, c in p.terms():
        powers = [(table.get(k, f"v{k}"), e) for k, e in enumerate(mono) if e]
        out.append((int(c.p), powers))
    return out


def _signed(p: Poly, table: dict[int, str], times: str, power: str) -> list[tuple[str, str]]:
    """The sign and the rest of every term."""
    out: list[tuple[str, str]] = []
    for c, powers in terms(p, table):
        body = times.join(v if e == 1 else f"{v}{power}{e}" for v, e in powers)
        size = abs(c)
        piece = body if size == 1 and body else f"{size}{times}{body}" if body else str(size)
        out.append(("-" if c < 0 else "+", piece))
    return out


def plain(p: Poly, table: dict[int, str], times: str = "*", power: str = "^") -> str:
    """A polynomial on one line."""
    parts = _signed(p, table, times, power)
    if not parts:
        return "0"
    whole = " ".join(f"{sign} {piece}" for sign, piece in parts)
    return "-" + whole[2:] if whole.startswith("- ") else whole[2:]


LONG_SUM = 200


def _sum(p: Poly, table: dict[int, str]) -> str:
    """A polynomial in Python's notation; a long one as a list of terms, since a sum of thousands is
    nested too deeply for Python's own reader."""
    if len(p) <= LONG_SUM:
        return plain(p, table, "*", "**")
    rows = [("-" if sign == "-" else "") + piece for sign, piece in _signed(p, table, "*", "**")]
    return "Add(*[\n        " + ",\n        ".join(rows) + ",\n    ])"


def to_text(t: Thesis, f: Formulation) -> str:
    """Plain text: each polynomial set to zero."""
    table = names(t)
    return "\n".join(plain(p, table) + " = 0" for p in f.polynomials)


def to_latex(t: Thesis, f: Formulation) -> str:
    """LaTeX: an aligned display."""
    table = {k: _latex_name(v) for k, v in names(t).items()}
    rows = []
    for p in f.polynomials:
        body = plain(p, table, " ", "^").replace("  ", " ")
        rows.append(_braced(body) + " &= 0")
    return "\\begin{align*}\n" + " \\\\\n".join(rows) + "\n\\end{align*}"


def _latex_name(name: str) -> str:
    head, tail = name[0], name[1:]
    return f"{head}_{{{tail.replace('_', chr(39))}}}" if tail else head


def _braced(text: str) -> str:
    words = []
    for w in text.split(" "):
        if "^" in w:
            base, e = w.rsplit("^", 1)
            w = f"{base}^{{{e}}}"
        words.append(w)
    return " ".join(words)


def to_sympy(t: Thesis, f: Formulation) -> str:
    """A script that defines `polynomials`, a list of SymPy expressions."""
    table = names(t)
    used = sorted({table[k] for p in f.polynomials for k, d in enumerate(p.degrees()) if d > 0})
    rows = ",\n    ".join(_sum(p, table) for p in f.polynomials)
    long = any(len(p) > LONG_SUM for p in f.polynomials)
    head = f"from sympy import {'Add, ' if long else ''}symbols\n\n"
    if used:
        comma = "," if len(used) == 1 else ""
        head += f"{', '.join(used)}{comma} = symbols({' '.join(used)!r}{', seq=True' if comma else ''})\n"
    return head + f"polynomials = [\n    {rows},\n]"


def to_singular(t: Thesis, f: Formulation) -> str:
    """A script that defines the ideal `formulation` over the rationals."""
    table = names(t)
    used = sorted({table[k] for p in f.polynomials for k, d in enumerate(p.degrees()) if d > 0}) or ["x"]
    safe = {v: v.replace("_", "q") for v in used}
    table = {k: safe.get(v, v) for k, v in table.items()}
    rows = ",\n  ".join(plain(p, table) for p in f.polynomials)
    return f"ring r = 0, ({', '.join(safe.values())}), dp;\nideal formulation =\n  {rows};"


EXPORTS: dict[str, Callable[[Thesis, Formulation], str]] = {
    "text": to_text,
    "latex": to_latex,
    "sympy": to_sympy,
    "singular": to_singular,
}
