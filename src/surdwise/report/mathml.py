"""Formulas as presentation MathML inside HTML text.

Each piece of a formula is a `<math>` element of its own, so that lines break between them; long
polynomials and exact values are written as HTML text instead (`flowing`), which wraps anywhere
a sign stands.
"""

from __future__ import annotations

from html import escape

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


def math(f: Formula, display: bool = False) -> str:
    """A formula as HTML: words as text, the rest as MathML."""
    out = []
    for p in pieces(f):
        out.append(escape(p) if isinstance(p, str) else f"<math>{_mrow(p, display)}</math>")
    text = ""
    for i, part in enumerate(out):
        glued = not part.startswith("<") or i == 0 or not out[i - 1].startswith("<")
        text += part if glued else " " + part
    return text


def _mrow(f: Formula, display: bool) -> str:
    items = f.items if isinstance(f, Row) else (f,)
    # the space before a piece is that of the text
    first = items[0]
    inner = "".join(_xml(x) for x in items)
    if isinstance(first, Op) and first.kind in ("relation", "sum"):
        inner = inner.replace('lspace="0.28em"', 'lspace="0"', 1)
    return f'<mrow displaystyle="true">{inner}</mrow>' if display else f"<mrow>{inner}</mrow>"


def _xml(f: Formula) -> str:
    match f:
        case Name(text, sub):
            style = ' mathvariant="normal"' if len(text) > 1 and text.isalpha() else ""
            base = f"<mi{style}>{escape(text)}</mi>"
            if text.endswith("′"):
                marks = len(text) - 1
                base = f"<msup><mi>{escape(text[:1])}</mi><mo>{'′' * marks}</mo></msup>"
            return f"<msub>{base}<mn>{escape(sub)}</mn></msub>" if sub else base
        case Digits(text):
            return f"<mn>{text}</mn>"
        case Op(text, kind):
            form = {"relation": "infix", "sum": "infix", "product": "infix", "sign": "prefix"}.get(kind)
            extra = f' form="{form}"' if form else ' separator="true"'
            if kind in ("relation", "sum"):
                extra += ' lspace="0.28em" rspace="0.28em"'
            return f"<mo{extra}>{escape(text)}</mo>"
        case Word(text):
            return f"<mtext>{escape(text)}</mtext>"
        case Row(items):
            return "".join(_xml(x) for x in items)
        case Over(top, bottom):
            return f"<mfrac><mrow>{_xml(top)}</mrow><mrow>{_xml(bottom)}</mrow></mfrac>"
        case Power(base, exponent):
            return f"<msup><mrow>{_xml(base)}</mrow><mrow>{_xml(exponent)}</mrow></msup>"
        case Root(inner):
            return f"<msqrt><mrow>{_xml(inner)}</mrow></msqrt>"
        case Fence(left, inner, right):
            fence = '<mo form="{}" fence="true" stretchy="true" lspace="0" rspace="0">{}</mo>'
            return f"<mrow>{fence.format('prefix', left)}{_xml(inner)}{fence.format('postfix', right)}</mrow>"


def value(text: str) -> str:
    """An exact value, short ones as MathML, long ones as text that wraps."""
    try:
        f = expression(text)
    except NotAnExpression:
        return f"<code>{escape(text)}</code>"
    return math(f) if len(text) <= 40 and "(" not in text.replace("sqrt(", "") else flowing(text)


def flowing(text: str) -> str:
    """A polynomial or value as running HTML text."""
    try:
        return _flow(expression(text))
    except NotAnExpression:
        return f"<code>{escape(text)}</code>"


def _flow(f: Formula) -> str:
    match f:
        case Name(text, sub):
            return f"<i>{escape(text)}</i>" + (f"<sub>{escape(sub)}</sub>" if sub else "")
        case Digits(text):
            return text
        case Op(text, kind):
            if kind in ("relation", "sum"):
                return f" {escape(text)}\N{NO-BREAK SPACE}"
            return ", " if kind == "mark" else escape(text)
        case Word(text):
            return escape(text)
        case Row(items):
            return "".join(_flow(x) for x in items)
        case Over(top, bottom):
            return f"{_flow_factor(top)}/{_flow_factor(bottom)}"
        case Power(base, exponent):
            return f"{_flow(base)}<sup>{_flow(exponent)}</sup>"
        case Root(inner):
            return f"√({_flow(inner)})"
        case Fence(left, inner, right):
            return f"{left}{_flow(inner)}{right}"


def _flow_factor(f: Formula) -> str:
    loose = isinstance(f, Row) and len(f.items) > 1
    return f"({_flow(f)})" if loose else _flow(f)
