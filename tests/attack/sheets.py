"""Sheets for the attack: plain text, with the theorem behind each in a comment."""

from __future__ import annotations

SHEETS: tuple[str, ...] = ()
