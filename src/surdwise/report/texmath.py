"""Formulas and text as LaTeX source for plain engines (no fonts or packages beyond the base)."""

from __future__ import annotations

from .formula import (
    Digits,
    Fence,
    Formula,
    Name,
    NotAnExpression,
    Op,
    Over,
    Power,
    Root,
    Row,
    Word,
    expression,
    pieces,
)

_SPECIAL = {
    "\\": r"\textbackslash{}",
    "{": r"\{",
    "}": r"\}",
    "$": r"\$",
    "&": r"\&",
    "#": r"\#",
    "%": r"\%",
    "_": r"\_",
    "^": r"\textasciicircum{}",
    "~": r"\textasciitilde{}",
    "<": r"\textless{}",
    ">": r"\textgreater{}",
    "|": r"\textbar{}",
    '"': r"\textquotedbl{}",
    "−": r"\ensuremath{-}",
    "≤": r"\ensuremath{\leq}",
    "≥": r"\ensuremath{\geq}",
    "·": r"\ensuremath{\cdot}",
    "×": r"\ensuremath{\times}",
    "′": r"\ensuremath{'}",
    "√": r"\ensuremath{\surd}",
    "°": r"\ensuremath{^\circ}",
    "…": r"\ldots{}",
    "–": "--",
    "—": "---",
    "‘": "`",
    "’": "'",
    "“": "``",
    "”": "''",
    "\N{NO-BREAK SPACE}": "~",
}
_GREEK = (
    "alpha beta gamma delta epsilon zeta eta theta iota kappa lambda mu nu xi . pi rho . sigma tau "
    "upsilon phi chi psi omega"
)
_OPS = {"=": "=", "<": "<", ">": ">", "≤": r"\leq ", "≥": r"\geq ", "·": r"\cdot ", "−": "-", "+": "+"}


def text(s: str) -> str:
    """Plain text; a character that the base fonts lack is given by its number."""
    return "".join(_letter(c) for c in s)


def _letter(c: str) -> str:
    if c in _SPECIAL:
        return _SPECIAL[c]
    if ord(c) < 128:
        return c
    greek = dict(zip((chr(k) for k in range(0x3B1, 0x3CA)), _GREEK.split(), strict=True))
    if greek.get(c, ".") != ".":
        return rf"\ensuremath{{\{greek[c]}}}"
    # letters of western Europe, which the base encodings have
    if 0xC0 <= ord(c) <= 0x17E and c not in "ĦħĸŊŋŦŧÐðÞþĲĳĿŀŉ":
        return c
    return f"[U+{ord(c):04X}]"


def math(f: Formula) -> str:
    """A formula in running text; lines break between its pieces."""
    out = ""
    for p in pieces(f):
        if isinstance(p, str):
            out += text(p)
        else:
            out += (" " if out and not out.endswith((" ", "(")) else "") + f"${_tex(p)}$"
    return out


def _tex(f: Formula) -> str:
    match f:
        case Name(name, sub):
            base = name.replace("′", "'")
            base = rf"\mathit{{{base}}}" if len(name) > 1 and name.isalpha() else base
            return f"{base}_{{{sub}}}" if sub else base
        case Digits(digits):
            return digits
        case Op(op, kind):
            if kind == "mark":
                return rf"{op}\;"
            body = _OPS[op]
            return f"{{}}{body}{{}}" if kind in ("relation", "sum") else body
        case Word(word):
            return rf"\mathrm{{{word}}}"
        case Row(items):
            return "".join(_tex(x) for x in items)
        case Over(top, bottom):
            return rf"\frac{{{_tex(top)}}}{{{_tex(bottom)}}}"
        case Power(base, exponent):
            return f"{{{_tex(base)}}}^{{{_tex(exponent)}}}"
        case Root(inner):
            return rf"\sqrt{{{_tex(inner)}}}"
        case Fence(left, inner, right):
            return rf"{left}{_tex(inner)}{right}"


def value(s: str) -> str:
    """An exact value or polynomial in running text; it breaks at its signs."""
    try:
        return f"${_tex(expression(s))}$"
    except NotAnExpression:
        return rf"\texttt{{{text(s)}}}"
