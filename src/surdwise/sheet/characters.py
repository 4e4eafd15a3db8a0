"""Signs that a sheet does not use, and what to write instead."""

from __future__ import annotations

import unicodedata

_ONE_STATEMENT = "one statement a line"
_ROUND = "use round parentheses ( )"

SIGNS = {
    "==": "write a single =",
    "!=": "write `not ... = ...`",
    "≠": "write `not ... = ...`",
    "<>": "write `not ... = ...`",
    "=<": "write <=",
    "=>": "write >= for greater or equal",
    "**": "write ^ for a power",
    "&&": "write `and`",
    "&": "write `and`",
    "∥": "write `AB parallel to CD`",
    "‖": "write `AB parallel to CD`",
    "⊥": "write `AB perpendicular to CD`",
    "⟂": "write `AB perpendicular to CD`",
    "!": "write `not` before a condition",
    "¬": "write `not` before a condition",
    "∧": "write `and`",
    "∨": "write `or`",
    "∩": "write `meet of AB and CD`",
    "∈": "write `P on line AB`, `P on circle k` or `P inside ABC`",
    "√": "write sqrt(...)",
    "∠": "write `angle BAC`",
    "∡": "write `angle BAC`",
    "△": "write `triangle ABC`",
    "Δ": "write `triangle ABC`",
    "∆": "write `triangle ABC`",
    "⊙": "write `circle`",
    "°": "sizes of angles in degrees are not used: write cos(BAC) = 1/2, or `angle BAC right`",
    "π": "pi is not used: lengths and areas of a figure of points need none",
    "∞": "only numbers are used",
    "²": "write ^2",
    "³": "write ^3",
    "½": "write 1/2",
    "⅓": "write 1/3",
    "¼": "write 1/4",
    "¾": "write 3/4",
    "⅔": "write 2/3",
    "÷": "write / for a quotient",
    "⁄": "write / for a quotient",
    "–": "write - for minus",
    "—": "write - for minus",
    "‐": "write - for minus",
    "‑": "write - for minus",
    "±": "write two claims, one for each sign",
    "∓": "write two claims, one for each sign",
    "″": "write two primes: A''",
    "′": "a prime stands directly behind a capital, as in A'",
    "’": "a prime stands directly behind a capital, as in A'",
    "'": "a prime stands directly behind a capital, as in A'",
    "‘": "write a prime as ', as in A'",
    "`": "write a prime as ', as in A'",
    "´": "write a prime as ', as in A'",
    "ʹ": "write a prime as ', as in A'",
    '"': "write two primes as '', and no quotation marks",
    "“": "no quotation marks are needed",
    "”": "no quotation marks are needed",
    ":": "no colon is needed; a ratio is written with /, a name with =",
    ";": _ONE_STATEMENT,
    ".": "decimals are written 0.5, and no full stop is needed at the end",
    "?": "no question mark is needed",
    "…": "write the whole list",
    "[": _ROUND,
    "]": _ROUND,
    "{": _ROUND,
    "}": _ROUND,
    "⟨": _ROUND,
    "⟩": _ROUND,
    "$": "plain text, without formula marks",
    "\\": "plain text, without formula marks",
    "_": "a point is a capital with digits, such as A1",
    "%": "a comment starts with #",
    "@": "",
    "~": "similar figures are not a statement of their own: compare ratios of lengths",
    "∼": "similar figures are not a statement of their own: compare ratios of lengths",
    "≅": "write equal lengths: |AB| = |CD|",
    "≡": "write =",
    "≈": "write =; numbers are exact",
    "→": "write the assumption behind `provided`",
    "⇒": "write the assumption behind `provided`",
    "⇔": "write two claims",
    "\u00ad": "an invisible soft hyphen: delete it",
    "\u200b": "an invisible space: delete it",
    "\u200e": "an invisible mark: delete it",
    "\u200f": "an invisible mark: delete it",
    "\ufeff": "an invisible mark: delete it",
}


def letter_name(character: str) -> str:
    """The published name of a character, in lower case."""
    return unicodedata.name(character, f"U+{ord(character):04X}").lower()


def sign_hint(sign: str) -> str:
    """What to write instead of a sign or character that no statement has, or ""."""
    if sign in SIGNS:
        return SIGNS[sign]
    foreign = [c for c in sign if not c.isascii() and c.isalpha()]
    if foreign and len(sign) > 1:
        return f"{foreign[0]} is a {letter_name(foreign[0])}: {sign_hint(foreign[0])}"
    plain = unicodedata.normalize("NFKC", sign)
    if plain != sign and plain.isascii():
        return f"write {plain}"
    kind = unicodedata.category(sign[:1])
    if kind == "Lu":
        return "points are the capitals A to Z"
    if kind in ("Ll", "Lo", "Lm", "Lt"):
        return "words and names are written with the letters a to z"
    if kind in ("Nd", "Nl", "No"):
        return "numbers are written with the digits 0 to 9"
    if kind in ("Zs", "Cf", "Zl", "Zp"):
        return "a space or mark that is not plain text: delete it"
    return ""
