"""Claim sheets: from text to a syntax tree, and back to text.

`read_file` and `read_text` give the sheets of a file, `show` prints any node again, `FORMS`
says what can be written and what it means.  Whatever is wrong with a sheet is a SheetError.
"""

from __future__ import annotations

from .errors import SheetError, SurdwiseError
from .form import Form, Kind
from .forms import FORMS, forms_of
from .reader import read_file, read_line, read_text
from .show import show
from .tree import (
    NOWHERE,
    And,
    Arg,
    Binary,
    CentreOf,
    Comparison,
    Condition,
    Curve,
    Fact,
    Line,
    Measure,
    Named,
    Not,
    Number,
    Or,
    PointRef,
    Pt,
    Quantity,
    Relation,
    Sheet,
    Span,
    Through,
    Unary,
)

__all__ = [
    "FORMS",
    "NOWHERE",
    "And",
    "Arg",
    "Binary",
    "CentreOf",
    "Comparison",
    "Condition",
    "Curve",
    "Fact",
    "Form",
    "Kind",
    "Line",
    "Measure",
    "Named",
    "Not",
    "Number",
    "Or",
    "PointRef",
    "Pt",
    "Quantity",
    "Relation",
    "Sheet",
    "SheetError",
    "Span",
    "SurdwiseError",
    "Through",
    "Unary",
    "forms_of",
    "read_file",
    "read_line",
    "read_text",
    "show",
]
