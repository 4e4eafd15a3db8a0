"""Sign products here against eliminations by Singular, on the same ideals."""

from __future__ import annotations

import re
import shutil
import subprocess
import time
from dataclasses import dataclass

import surdwise
from measure import Timing, alternating, calls, python
from surdwise.api import points_of
from surdwise.field import ring
from surdwise.figure.scale import keeps_scale
from surdwise.sheet.tree import Comparison
from surdwise.thesis.formal import Thesis, thesis
from surdwise.thesis.formulations import formulate
from surdwise.thesis.parts import Form

PROGRAM = shutil.which("Singular")
TARGET = 100.0

CLAIMS = {
    "medians": "4*(median(ABC, A) + median(ABC, B) + median(ABC, C)) = 3*perimeter(ABC)",
    "medians, scale kept": "4*(median(ABC, A) + median(ABC, B) + median(ABC, C)) = 3*perimeter(ABC) + 1",
    "four distances": "|PA| + |PB| = |PC| + |BC|",
    "Ptolemy": "|AB|*|CD| + |BC|*|DA| = |AC|*|BD|",
    "two bisectors": "bisector(ABC, A) + bisector(ABC, B) = |AB|",
}

CODE = """
import surdwise
from surdwise.thesis.parts import Form
(s,) = surdwise.read({text!r})
(r,) = surdwise.rewrite(s, [Form.SIGN_PRODUCT])
print(r.formulations[0].terms)
"""


@dataclass(frozen=True)
class Contest:
    """One claim: terms, times inside each system, whole processes; None where the time was out."""

    name: str
    terms: int
    mine: Timing
    theirs: Timing | None
    whole_mine: Timing
    whole_theirs: Timing | None


def sheet_text(claim: str) -> str:
    """A sheet over free points."""
    names = sorted(set(re.findall(r"[A-Z]", claim)))
    return f"given points {', '.join(names)}\nclaim {claim}\n"


def formal(claim: str) -> Thesis:
    """The thesis in coordinates."""
    (sheet,) = surdwise.read(sheet_text(claim))
    body = sheet.claims[0].body
    assert isinstance(body, Comparison)
    return thesis(body, points_of(body), keeps_scale(sheet))


def script(t: Thesis, runs: int, times: int = 1) -> str:
    """The auxiliary ideal, eliminated `runs` times (each time `times` times over, for short ones);
    Singular's own clock, in milliseconds."""
    ideal = ",\n".join(str(p) for p in formulate(t, Form.AUXILIARY).polynomials)
    gens = [f"g{x.gen.index}" for x in t.lengths]
    names = [ring.PARAM_NAMES[k] for k in t.coordinates]
    work = f"for (k = 1; k <= {times}; k++) {{ j = eliminate(i, {'*'.join(gens)}); }}"
    one = f"start = rtimer; {work} rtimer - start;\n"
    return (
        'system("--ticks-per-sec", 1000);\n'
        f"ring r = 0, ({','.join([*gens, *names])}), dp;\nideal i = {ideal};\nideal j; int start; int k;\n"
        + one * runs
        + "size(j[1]);\nquit;\n"
    )


def singular(t: Thesis, runs: int, seconds: float, times: int = 1) -> list[int] | None:
    """Milliseconds of each elimination, then the number of terms."""
    assert PROGRAM is not None
    try:
        out = subprocess.run(
            [PROGRAM, "-q", "--no-rc"],
            input=script(t, runs, times),
            capture_output=True,
            text=True,
            timeout=seconds,
            check=True,
        )
    except subprocess.TimeoutExpired:
        return None
    return [int(n) for n in out.stdout.split()]


def contest(name: str, runs: int, seconds: float) -> Contest:
    """Both systems on one claim."""
    t = formal(CLAIMS[name])
    mine = calls(lambda: formulate(t, Form.SIGN_PRODUCT), runs)
    terms = formulate(t, Form.SIGN_PRODUCT).terms
    code = python("-c", CODE.format(text=sheet_text(CLAIMS[name])))
    (whole,) = alternating([code], 5)
    first = singular(t, 1, seconds) if PROGRAM is not None else None
    if first is None:
        return Contest(name, terms, mine, None, whole, None)
    times = 50 if first[0] < 20 else 1
    many = singular(t, 5, 6 * seconds, times)
    assert many is not None
    return Contest(name, terms, mine, Timing.of([ms / 1000 / times for ms in many[:-1]]), whole, _whole(t))


def _whole(t: Thesis) -> Timing:
    taken = []
    for _ in range(5):
        start = time.perf_counter()
        singular(t, 1, 600.0)
        taken.append(time.perf_counter() - start)
    return Timing.of(taken)
