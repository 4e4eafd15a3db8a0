"""The parse table: shipped ready-made as table.json, rebuilt when it is absent or stale."""

from __future__ import annotations

import json
import os
import zlib
from dataclasses import dataclass
from typing import Any

_HERE = os.path.dirname(os.path.abspath(__file__))
GRAMMAR_FILE = os.path.join(_HERE, "grammar.lark")
TABLE_FILE = os.path.join(_HERE, "table.json")


@dataclass(frozen=True)
class Rule:
    """One grammar rule: what it makes, under which alias, and which children count."""

    origin: str
    alias: str
    kept: tuple[bool, ...]


@dataclass(frozen=True)
class Table:
    """An LALR table.

    `actions[state][terminal]` is a state to shift to, or -1 - (number of a rule to reduce
    by); `gotos[state][origin]` is the state after a reduction.  A terminal spelled in the
    grammar goes by its spelling; the others are POINT to HEXA, NAME, NUMBER, FRACTION,
    COMPARE and $END.
    """

    start: dict[str, int]
    fraction: str
    words: frozenset[str]
    rules: tuple[Rule, ...]
    actions: tuple[dict[str, int], ...]
    gotos: tuple[dict[str, int], ...]


def fingerprint(grammar: str) -> str:
    """A short checksum of the grammar's text, blind to line endings."""
    data = grammar.replace("\r\n", "\n").encode()
    return f"{len(data)}-{zlib.crc32(data):08x}"


def table_from_data(data: dict[str, Any]) -> Table:
    """The table from its JSON data."""
    return Table(
        start=data["start"],
        fraction=data["fraction"],
        words=frozenset(data["words"]),
        rules=tuple(
            Rule(origin, alias, tuple(mark == "1" for mark in kept))
            for origin, alias, kept, _ in data["rules"]
        ),
        actions=tuple(row[0] for row in data["states"]),
        gotos=tuple(row[1] for row in data["states"]),
    )


def load_table(grammar_file: str = GRAMMAR_FILE, table_file: str = TABLE_FILE) -> Table:
    """The table of the grammar, from table_file if that is current, else built (slower)."""
    try:
        with open(grammar_file, encoding="utf-8") as file:
            grammar = file.read()
    except OSError:
        grammar = ""
    try:
        with open(table_file, encoding="utf-8") as file:
            data = json.load(file)
        if not grammar or data["fingerprint"] == fingerprint(grammar):
            return table_from_data(data)
    except (OSError, ValueError, LookupError, TypeError):
        pass
    from .build import build_table

    return build_table(grammar)
