"""Gauss and Jordan's elimination in rational numbers.  Exact."""

from __future__ import annotations

from fractions import Fraction

Matrix = list[list[Fraction]]


def echelon(rows: Matrix, columns: int) -> list[int]:
    """Bring rows, in place, to reduced echelon form in their first `columns` columns; returns the
    pivot columns, that of row k at place k."""
    pivots: list[int] = []
    for col in range(columns):
        k = len(pivots)
        at = next((r for r in range(k, len(rows)) if rows[r][col]), None)
        if at is None:
            continue
        rows[k], rows[at] = rows[at], rows[k]
        rows[k] = [x / rows[k][col] for x in rows[k]]
        for r in range(len(rows)):
            if r != k and rows[r][col]:
                f = rows[r][col]
                rows[r] = [x - f * y for x, y in zip(rows[r], rows[k], strict=True)]
        pivots.append(col)
    return pivots
