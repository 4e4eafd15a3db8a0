"""The engine Singular, by its command: normal forms and standard bases over Q(U).

Degree reverse lexicographic order.  A thesis that does not reduce to zero is joined to the hypotheses
(generally false if that gives 1).  If not, it may still be nilpotent: it is squared until its exponent
passes the dimension of the ring over Q(U) (generally true if that gives 0).
"""

from __future__ import annotations

import os
import re
import resource
import shutil
import subprocess
import tempfile
from collections.abc import Sequence
from pathlib import Path

from ..field.ring import Poly
from ..thesis.formulations import Formulation
from ..thesis.parts import Status
from .engine import Answer, Eliminated, Engine, OutOfMemory, split, together
from .memory import peak_of
from .plain import Terms, system, terms, text, thesis_names, variables
from .problem import Problem

TICKS = 1_000_000
MIB = 1 << 20
HEAD = f'system("--ticks-per-sec", {TICKS});\nint start; option(redSB); option(noredefine);\n'
END = "surdwise-end"

ASK = """
start = rtimer;
ideal h = {h};
ideal e = {e};
ideal g = std(h);
ideal n = simplify(reduce(e, g), 2);
ideal f;
int k;
string s = "parts";
if (dim(g) < 0) {{ s = "none"; }}
else {{ if (size(n) == 0) {{ s = "true"; }}
else {{
  f = slimgb(g + n);
  if (dim(f) < 0) {{ s = "false"; }}
  else {{
    for (k = 1; k < vdim(g); k = 2 * k) {{
      n = simplify(reduce(n^2, g), 2);
      if (size(n) == 0) {{ s = "true"; break; }}
    }}
  }}
}} }}
print(s); rtimer - start;
"""
STATUS = {"true": Status.TRUE, "false": Status.FALSE, "parts": Status.PARTS, "none": Status.NONE}


class SingularEngine(Engine):
    """The program Singular."""

    name = "singular"

    def version(self) -> str | None:
        """What the program says of itself, on one line."""
        program = shutil.which("Singular")
        if program is None:
            return None
        try:
            out = subprocess.run(
                [program, "--version"], capture_output=True, text=True, timeout=20, check=False
            )
        except (OSError, subprocess.TimeoutExpired):
            return None
        found = re.search(r"version ([\d.]+)", out.stdout)
        return found.group(1) if found else "unknown"

    def decide(self, p: Problem, f: Formulation, mebibytes: int | None) -> Answer:
        """Ask about each component in a ring of its own."""
        return self._ask(p, *split(p, f.polynomials), mebibytes)

    def decide_plain(self, p: Problem, thesis: Sequence[Terms], mebibytes: int | None) -> Answer:
        """The same for polynomials that were eliminated here."""
        defined = [q for q in _numbers(p) if variables([q]) & variables(thesis)]
        return self._ask(p, thesis, defined, mebibytes)

    def _ask(
        self, p: Problem, thesis: Sequence[Terms], definitions: Sequence[Terms], mebibytes: int | None
    ) -> Answer:
        script = HEAD
        for i, figure in enumerate(p.figures):
            s = system(p, figure, thesis, definitions)
            script += _ring(f"r{i}", s.parameters, s.unknowns)
            script += ASK.format(h=_ideal(s.hypotheses), e=_ideal(thesis))
            script += "kill h, e, g, n, f, k, s;\n"
        lines, peak = run(script, mebibytes)
        names, ticks = lines[0::2], lines[1::2]
        seconds = sum(int(x) for x in ticks) / TICKS
        return Answer(together([STATUS[x] for x in names]), seconds, peak)

    def eliminate(self, p: Problem, f: Formulation, mebibytes: int | None) -> Eliminated:
        """`eliminate` of the lengths from the auxiliary ideal over the rationals, degree reverse
        lexicographic order; numeric roots stay unknowns."""
        thesis, definitions = split(p, f.polynomials)
        lengths = [f"d{x.gen.index}" for x in reversed(p.thesis.lengths)]
        used = variables([*thesis, *definitions])
        lengths = [x for x in lengths if x in used]
        if not lengths:
            return Eliminated(tuple(thesis), 0.0)
        rest = sorted(used - set(lengths))
        script = HEAD + f"ring r = 0, ({','.join([*lengths, *rest])}), dp;\nshort = 0;\n"
        script += f"start = rtimer;\nideal i = {_ideal([*thesis, *definitions])};\n"
        script += f"ideal j = eliminate(i, {'*'.join(lengths)});\nint used = rtimer - start; used;\n"
        script += "int k; for (k = 1; k <= ncols(j); k++) { print(string(j[k])); }\n"
        lines, peak = run(script, mebibytes)
        polys = tuple(read(x) for x in lines[1:])
        known = {frozenset(q) for q in _numbers(p)}
        own = tuple(q for q in polys if q and frozenset(q) not in known)
        return Eliminated(own, int(lines[0]) / TICKS, peak)


def _numbers(p: Problem) -> list[Terms]:
    """Equations of the thesis' numeric roots."""
    polys: list[Poly] = [g.modulus for g in p.thesis.tower.gens if g.label == "number"]
    return [terms(q, thesis_names(p)) for q in polys]


def _ring(name: str, parameters: Sequence[str], unknowns: Sequence[str]) -> str:
    field = "0" if not parameters else f"(0,{','.join(parameters)})"
    return f"ring {name} = {field}, ({','.join(unknowns) or 'c'}), dp;\n"


def _ideal(polys: Sequence[Terms]) -> str:
    return ",\n".join(text(q) for q in polys) or "0"


def read(line: str) -> Terms:
    """A polynomial that Singular printed with `short = 0`."""
    out = []
    for piece in re.findall(r"[+-]?[^+-]+", line.replace(" ", "")):
        sign = -1 if piece[0] == "-" else 1
        factors = piece.lstrip("+-").split("*")
        numbers = [x for x in factors if x[0].isdigit()]
        powers = [x.split("^") for x in factors if not x[0].isdigit()]
        c = sign * (int(numbers[0]) if numbers else 1)
        out.append((c, tuple(sorted((x[0], int(x[1]) if len(x) > 1 else 1) for x in powers))))
    return tuple(t for t in out if t[0])


def run(script: str, mebibytes: int | None) -> tuple[list[str], int | None]:
    """The lines that Singular prints for a script, and its peak of memory in KiB.  Raises
    OutOfMemory, and RuntimeError with its words for any error of the script."""
    program = shutil.which("Singular")
    assert program is not None
    handle, name = tempfile.mkstemp(suffix=".sing")
    try:
        with os.fdopen(handle, "w", encoding="ascii") as file:
            file.write(script + f'print("{END}");\n')
        process = subprocess.Popen(
            [program, "-q", "--no-rc", name],
            stdin=subprocess.PIPE,
            stdout=subprocess.PIPE,
            stderr=subprocess.DEVNULL,
            text=True,
        )
        if mebibytes is not None and hasattr(resource, "prlimit"):
            resource.prlimit(process.pid, resource.RLIMIT_AS, (mebibytes * MIB, mebibytes * MIB))
        assert process.stdout is not None and process.stdin is not None
        lines = []
        for line in process.stdout:
            if line.strip() == END:
                break
            if line.lstrip().startswith("? "):
                process.kill()
                raise RuntimeError(f"Singular: {line.strip()[2:]}")
            if line.strip() and not line.startswith("//"):
                lines.append(line.strip())
        else:
            process.wait()
            raise OutOfMemory
        peak = peak_of(process.pid)
        process.stdin.close()
        process.kill()
        process.wait()
        return lines, peak
    finally:
        Path(name).unlink(missing_ok=True)
