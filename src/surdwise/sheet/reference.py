"""The language reference, from the table of forms: for the `words` command and the README."""

from __future__ import annotations

from .form import Kind
from .forms import forms_of


def listing() -> str:
    """Every form with an example and its meaning, as plain text in groups."""
    out: list[str] = []
    for kind in Kind:
        rows = [f for f in forms_of(kind) if f.example]
        if not rows:
            continue
        width = max(len(f.example) for f in rows)
        out.append(f"{kind.value}")
        out += [f"  {f.example.ljust(min(width, 58))}  {f.meaning}" for f in rows]
        out.append("")
    return "\n".join(out).rstrip()


def markdown() -> str:
    """The same as Markdown tables, one a group."""
    out: list[str] = []
    for kind in Kind:
        rows = [f for f in forms_of(kind) if f.example]
        if not rows:
            continue
        out += [f"**{kind.value}**", "", "| form | meaning |", "| --- | --- |"]
        for f in rows:
            cell = f.example.replace("|", "\\|")
            meaning = f.meaning.replace("|", "\\|")
            out.append(f"| `{cell}` | {meaning} |")
        out.append("")
    return "\n".join(out).rstrip()


if __name__ == "__main__":
    print(markdown())
