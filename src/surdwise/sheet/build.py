"""Turn grammar.lark into the parse table the reader runs on.

Run `python -m surdwise.sheet.build` after every change of the grammar; it writes
table.json beside it.  With --check it only says whether that is current.  Only this module
needs lark: reading a sheet with a current table does not import it.
"""

from __future__ import annotations

import json
import os
import sys
from collections.abc import Sequence
from typing import Any

from .table import GRAMMAR_FILE, TABLE_FILE, Table, fingerprint, table_from_data

STARTS = ("given", "provided", "claim")
END = "$END"


def build_data(grammar: str) -> dict[str, Any]:
    """The table of the given grammar as plain JSON data, the same on every run."""
    from lark import Lark
    from lark.grammar import Rule
    from lark.lexer import TerminalDef

    parser = Lark(grammar, parser="lalr", start=list(STARTS), maybe_placeholders=False)
    data, memo = parser.memo_serialize([TerminalDef, Rule])
    raw = data["parser"]["parser"]
    terminals = {t["name"]: t["pattern"] for t in memo.values() if t["__type__"] == "TerminalDef"}
    spelled = {
        name: pattern["value"] for name, pattern in terminals.items() if pattern["__type__"] == "PatternStr"
    }
    rules = {key: _rule(rule) for key, rule in memo.items() if rule["__type__"] == "Rule"}
    rule_order = sorted(rules, key=lambda key: json.dumps(rules[key]))
    rule_number = {key: i for i, key in enumerate(rule_order)}
    terminal_names = set(terminals) | {END}

    # Renumber the states in the order in which a walk from the starts meets them.
    numbers: dict[int, int] = {}
    queue = [raw["start_states"][name] for name in STARTS]
    rows: list[list[dict[str, int]]] = []
    while queue:
        state = queue.pop(0)
        if state in numbers:
            continue
        numbers[state] = len(numbers)
        named = {raw["tokens"][key]: move for key, move in raw["states"][state].items()}
        queue.extend(named[symbol][1] for symbol in sorted(named) if named[symbol][0] == 0)
    for state, number in numbers.items():
        actions: dict[str, int] = {}
        gotos: dict[str, int] = {}
        named = {raw["tokens"][key]: move for key, move in raw["states"][state].items()}
        for symbol in sorted(named):
            is_reduce, target = named[symbol]
            action = -1 - rule_number[target["@"]] if is_reduce else numbers[target]
            if symbol in terminal_names:
                actions[spelled.get(symbol, symbol)] = action
            else:
                gotos[symbol] = action
        if state in raw["end_states"].values():
            actions[END] = number  # nothing is left to read: the statement is whole
        rows.append([actions, gotos])
    return {
        "fingerprint": fingerprint(grammar),
        "start": {name: numbers[raw["start_states"][name]] for name in STARTS},
        "fraction": terminals["FRACTION"]["value"],
        "words": sorted(spelled.values()),
        "rules": [rules[key] for key in rule_order],
        "states": rows,
    }


def _rule(rule: dict[str, Any]) -> list[Any]:
    """[origin, alias or "", which of its symbols are kept as children (a string of 0 and 1)]."""
    keep_all = rule["options"]["keep_all_tokens"]
    kept = "".join("1" if keep_all or not symbol.get("filter_out") else "0" for symbol in rule["expansion"])
    names = [symbol["name"] for symbol in rule["expansion"]]
    return [rule["origin"]["name"], rule["alias"] or "", kept, " ".join(names)]


def build_table(grammar: str) -> Table:
    """Build the table in memory (about a tenth of a second)."""
    return table_from_data(build_data(grammar))


def dump(data: dict[str, Any]) -> str:
    """The text of table.json: one rule or state a line, so that changes show in a diff."""
    parts = []
    for key, value in data.items():
        if isinstance(value, list) and key != "words":
            inner = ",\n".join(json.dumps(item, separators=(",", ":"), ensure_ascii=False) for item in value)
            parts.append(f'"{key}":[\n{inner}\n]')
        else:
            parts.append(f'"{key}":' + json.dumps(value, separators=(",", ":"), ensure_ascii=False))
    return "{\n" + ",\n".join(parts) + "\n}\n"


def main(arguments: Sequence[str]) -> int:
    """Write table.json next to grammar.lark; with --check only say whether it is current (0 or 1)."""
    with open(GRAMMAR_FILE, encoding="utf-8") as file:
        text = dump(build_data(file.read()))
    name = os.path.basename(TABLE_FILE)
    if list(arguments) == ["--check"]:
        with open(TABLE_FILE, encoding="utf-8") as file:
            current = file.read() == text
        sys.stdout.write(f"{name} is {'current' if current else 'stale'}\n")
        return 0 if current else 1
    with open(TABLE_FILE, "w", encoding="utf-8", newline="\n") as file:
        file.write(text)
    sys.stdout.write(f"wrote {name}, {len(text)} characters\n")
    return 0


if __name__ == "__main__":
    sys.exit(main(sys.argv[1:]))
