"""The structure of the program: imports flow one way, tables agree."""

from __future__ import annotations

import ast
import subprocess
import sys
from pathlib import Path

from surdwise.figure.conditions import CONDITIONS, EQUATIONS
from surdwise.figure.quantities import MEASURES
from surdwise.figure.vocabulary import CONSTRUCTIONS
from surdwise.sheet import FORMS

SRC = Path(__file__).parents[1] / "src" / "surdwise"
ORDER = ["sheet", "field", "figure", "thesis", "verdict", "report", "notebook", "review", "benchmark"]


def _imports(path: Path) -> set[str]:
    """Top rooms of the program, and outside packages, that a module imports."""
    out: set[str] = set()
    depth = len(path.relative_to(SRC).parts) - 1
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.ImportFrom) and node.level:
            parts = [
                *path.relative_to(SRC).parts[:depth][: depth - node.level + 1],
                *(node.module or "").split("."),
            ]
            out.add("." + parts[0] if parts and parts[0] else ".")
        elif isinstance(node, ast.ImportFrom):
            out.add((node.module or "").split(".")[0])
        elif isinstance(node, ast.Import):
            out.update(a.name.split(".")[0] for a in node.names)
    return out


def test_data_flows_one_way() -> None:
    for room in ORDER:
        files = list((SRC / room).rglob("*.py"))
        assert files
        for path in files:
            for name in _imports(path):
                if name.startswith(".") and name[1:] in ORDER:
                    assert ORDER.index(name[1:]) <= ORDER.index(room), (path, name)
                assert not (room == "field" and name == ".sheet"), path


def test_only_field_imports_flint() -> None:
    for path in SRC.rglob("*.py"):
        if "flint" in _imports(path):
            assert path.relative_to(SRC).parts[0] == "field", path


def test_decide_loads_no_general_system() -> None:
    code = (
        "import sys, surdwise\n"
        "(s,) = surdwise.read('given points P, Q\\nclaim |PQ| = |QP|\\n')\n"
        "surdwise.decide(s)\n"
        "print(sorted({m.split('.')[0] for m in sys.modules} & {'sympy', 'numpy', 'scipy', 'lark'}))"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True)
    assert done.stdout.strip() == "[]", done.stderr


def test_every_form_is_built() -> None:
    built = set(CONSTRUCTIONS) | set(CONDITIONS) | set(EQUATIONS) | set(MEASURES)
    for alias, form in FORMS.items():
        if form.kind.value in ("free", "shapes", "points on", "made points", "meets", "curves"):
            assert alias in CONSTRUCTIONS, alias
        if form.kind.value == "relations" and alias != "equation":
            assert alias in EQUATIONS, alias
    unknown = set(CONSTRUCTIONS) - set(FORMS)
    assert not unknown, unknown
    assert built
