"""Nine inequalities by surdwise, by two SMT solvers from the registries (z3, cvc5) and by QEPCAD
from Debian, where it is installed.

The solvers get the negation over the reals, lengths as non-negative unknowns with their squares
as equations, each in a process of its own with a hard time limit.
"""

from __future__ import annotations

import multiprocessing
import resource
import shutil
import time
from collections.abc import Callable
from queue import Empty
from typing import Any

from surdwise import decide, read

SIDES = """(declare-const a Real)(declare-const b Real)(declare-const c Real)
(assert (> a 0))(assert (> b 0))(assert (= c 1))
(assert (> (+ a b) c))(assert (> (+ b c) a))(assert (> (+ c a) b))
"""
MEDIANS = (
    SIDES
    + """(declare-const p Real)(declare-const q Real)(declare-const r Real)
(assert (>= p 0))(assert (>= q 0))(assert (>= r 0))
(assert (= (* 4 p p) (- (+ (* 2 b b) (* 2 c c)) (* a a))))
(assert (= (* 4 q q) (- (+ (* 2 c c) (* 2 a a)) (* b b))))
(assert (= (* 4 r r) (- (+ (* 2 a a) (* 2 b b)) (* c c))))
"""
)
# bisector p to side a: p^2 (b+c)^2 = bc((b+c)^2 - a^2)
BISECTORS = (
    SIDES
    + """(declare-const p Real)(declare-const q Real)(declare-const r Real)
(assert (>= p 0))(assert (>= q 0))(assert (>= r 0))
(assert (= (* p p (+ b c) (+ b c)) (* b c (- (* (+ b c) (+ b c)) (* a a)))))
(assert (= (* q q (+ c a) (+ c a)) (* c a (- (* (+ c a) (+ c a)) (* b b)))))
(assert (= (* r r (+ a b) (+ a b)) (* a b (- (* (+ a b) (+ a b)) (* c c)))))
"""
)
AREA = (
    SIDES
    + """(declare-const s Real)(assert (> s 0))
(assert (= (* 16 s s) (* (+ a b c) (- (+ a b) c) (- (+ b c) a) (- (+ c a) b))))
"""
)
CASES = [
    ("a + b > c", "given triangle ABC\nclaim |AB| + |BC| > |CA|", SIDES + "(assert (<= (+ a b) c))"),
    (
        "median sum < perimeter",
        "given triangle ABC\nclaim median(ABC, A) + median(ABC, B) + median(ABC, C) < perimeter(ABC)",
        MEDIANS + "(assert (>= (+ p q r) (+ a b c)))",
    ),
    (
        "median sum > 3/4 perimeter",
        "given triangle ABC\nclaim median(ABC, A) + median(ABC, B) + median(ABC, C) > 3/4 perimeter(ABC)",
        MEDIANS + "(assert (<= (* 4 (+ p q r)) (* 3 (+ a b c))))",
    ),
    (
        "R >= 2r",
        "given triangle ABC\nclaim circumradius(ABC) >= 2inradius(ABC)",
        # R = abc/4s, r = 2s/(a+b+c): abc (a+b+c) < 16 s^2
        AREA + "(assert (< (* a b c (+ a b c)) (* 16 s s)))",
    ),
    (
        "Ptolemy's inequality",
        "given points A, B, C, D\nclaim |AB|*|CD| + |BC|*|DA| >= |AC|*|BD|",
        """(declare-const x Real)(declare-const y Real)(declare-const u Real)(declare-const v Real)
(declare-const bc Real)(declare-const ca Real)(declare-const ad Real)(declare-const bd Real)
(declare-const cd Real)
(assert (>= bc 0))(assert (>= ca 0))(assert (>= ad 0))(assert (>= bd 0))(assert (>= cd 0))
(assert (= (* bc bc) (+ (* (- x 1) (- x 1)) (* y y))))
(assert (= (* ca ca) (+ (* x x) (* y y))))
(assert (= (* ad ad) (+ (* u u) (* v v))))
(assert (= (* bd bd) (+ (* (- u 1) (- u 1)) (* v v))))
(assert (= (* cd cd) (+ (* (- u x) (- u x)) (* (- v y) (- v y)))))
(assert (< (+ cd (* bc ad)) (* ca bd)))""",
    ),
    (
        "altitude sum >= 9r",
        "given triangle ABC\nclaim altitude(ABC, A) + altitude(ABC, B) + altitude(ABC, C) >= 9inradius(ABC)",
        # 2s/a + 2s/b + 2s/c < 18 s/(a+b+c)
        SIDES + "(assert (< (* (+ (* b c) (* c a) (* a b)) (+ a b c)) (* 9 a b c)))",
    ),
    (
        "bisector sum <= sqrt(3) s",
        "given triangle ABC\n"
        "claim bisector(ABC, A) + bisector(ABC, B) + bisector(ABC, C) <= sqrt(3)*perimeter(ABC)/2",
        BISECTORS
        + "(declare-const w Real)(assert (> w 0))(assert (= (* w w) 3))"
        + "(assert (> (* 2 (+ p q r)) (* w (+ a b c))))",
    ),
    (
        "median >= bisector",
        "given triangle ABC\nclaim median(ABC, A) >= bisector(ABC, A)",
        SIDES
        + """(declare-const p Real)(declare-const m Real)(assert (>= p 0))(assert (>= m 0))
(assert (= (* p p (+ b c) (+ b c)) (* b c (- (* (+ b c) (+ b c)) (* a a)))))
(assert (= (* 4 m m) (- (+ (* 2 b b) (* 2 c c)) (* a a))))
(assert (< m p))""",
    ),
    (
        "PA + PB + PC + PD >= 2 diagonals",
        "given square ABCD\ngiven point P\nclaim |PA| + |PB| + |PC| + |PD| >= 2|AC|",
        """(declare-const x Real)(declare-const y Real)(declare-const w Real)
(declare-const p Real)(declare-const q Real)(declare-const r Real)(declare-const t Real)
(assert (>= p 0))(assert (>= q 0))(assert (>= r 0))(assert (>= t 0))(assert (> w 0))(assert (= (* w w) 2))
(assert (= (* p p) (+ (* x x) (* y y))))
(assert (= (* q q) (+ (* (- x 1) (- x 1)) (* y y))))
(assert (= (* r r) (+ (* (- x 1) (- x 1)) (* (- y 1) (- y 1)))))
(assert (= (* t t) (+ (* x x) (* (- y 1) (- y 1)))))
(assert (< (+ p q r t) (* 2 w)))""",
    ),
]


def _z3(text: str) -> str:
    import z3

    solver = z3.Solver()
    solver.from_string(text)
    return str(solver.check())


def _cvc5(text: str) -> str:
    import cvc5

    tm = cvc5.TermManager()
    solver = cvc5.Solver(tm)
    solver.setLogic("QF_NRA")
    parser = cvc5.InputParser(solver)
    parser.setStringInput(cvc5.InputLanguage.SMT_LIB_2_6, text + "\n(check-sat)\n", "claim")
    symbols = parser.getSymbolManager()
    out = ""
    while True:
        command = parser.nextCommand()
        if command.isNull():
            return out.strip()
        out += str(command.invoke(solver, symbols))


def _qepcad(text: str) -> str:
    """The same formula by cylindrical algebraic decomposition: all unknowns bound by `exists`."""
    import subprocess

    unknowns, facts = _infix(text)
    inner = " /\\ ".join(facts)
    bound = "".join(f"(E {v})" for v in unknowns)
    script = f"[ claim ]\n({','.join(unknowns)})\n0\n{bound}[{inner}].\nfinish\n"
    command = ["timeout", "61", "qepcad", "+N50000000"]
    run = subprocess.run(command, input=script, capture_output=True, text=True, check=False)
    words = run.stdout.split("An equivalent quantifier-free formula:")
    if len(words) < 2:
        return "failed: " + (run.stdout.strip().splitlines() or ["no output"])[-1][:40]
    return {"FALSE": "unsat", "TRUE": "sat"}.get(words[1].split()[0], words[1].split()[0])


def _infix(text: str) -> tuple[list[str], list[str]]:
    """Unknowns and facts of SMT-LIB text in the notation of QEPCAD (polynomials expanded)."""
    import re

    import sympy as sp

    tokens = re.findall(r"[()]|[^\s()]+", text)

    def tree(at: int) -> tuple[object, int]:
        if tokens[at] != "(":
            return tokens[at], at + 1
        out = []
        at += 1
        while tokens[at] != ")":
            x, at = tree(at)
            out.append(x)
        return out, at + 1

    def value(x: object) -> sp.Expr:
        if isinstance(x, str):
            return sp.Rational(x) if x.isdigit() else sp.Symbol(x)
        assert isinstance(x, list)
        args = [value(y) for y in x[1:]]
        if x[0] == "+":
            return sp.Add(*args)
        if x[0] == "*":
            return sp.Mul(*args)
        return -args[0] if len(args) == 1 else args[0] - args[1]

    unknowns, facts = [], []
    at = 0
    while at < len(tokens):
        node, at = tree(at)
        assert isinstance(node, list)
        if node[0] == "declare-const":
            unknowns.append(node[1])
        elif node[0] == "assert":
            op, left, right = node[1]
            p = sp.expand(value(left) - value(right))
            facts.append(str(p).replace("**", "^").replace("*", " ") + f" {op} 0")
    return unknowns, facts


def _surdwise(text: str) -> str:
    (sheet,) = read(text + "\n")
    (d,) = decide(sheet)
    return f"{d.verdict.value}; equality {d.equality}"


def _worker(work: Callable[[str], str], text: str, out: Any) -> None:
    start = time.perf_counter()
    try:
        answer = work(text)
    except Exception as e:
        answer = type(e).__name__
    peak = resource.getrusage(resource.RUSAGE_SELF).ru_maxrss // 1024
    out.put((answer, time.perf_counter() - start, peak))


def limited(work: Callable[[str], str], text: str, seconds: float) -> tuple[str, float, int]:
    """Answer, seconds and peak MiB, in a process of its own."""
    context = multiprocessing.get_context("spawn")
    out = context.Queue()
    p = context.Process(target=_worker, args=(work, text, out))
    p.start()
    try:
        answer: tuple[str, float, int] = out.get(timeout=seconds + 5)
    except Empty:
        answer = ("no answer", seconds, 0)
    p.kill()
    p.join()
    return answer


def inequality_table(seconds: float) -> list[str]:
    """A table of the nine, one run."""
    rows = [
        "## Nine inequalities",
        "",
        f"Seconds; solvers from the registries, {seconds:g} s each (`unsat` means proved).",
        "",
        "| statement | surdwise | MiB | answer | z3 | cvc5 | QEPCAD |",
        "| --- | --- | --- | --- | --- | --- | --- |",
    ]
    for name, sheet, smt in CASES:
        answer, s, mib = limited(_surdwise, sheet, 120)
        cells = [name, f"{s:.2f}", str(mib), answer]
        for solver in (_z3, _cvc5, *([_qepcad] if shutil.which("qepcad") else [])):
            if seconds <= 0:
                cells.append("not run")
                continue
            found, t, _ = limited(solver, smt, seconds)
            cells.append(f"no answer in {seconds:g} s" if found == "no answer" else f"{found}, {t:.2f}")
        cells += ["not installed"] * (7 - len(cells))
        rows.append("| " + " | ".join(cells) + " |")
    return [*rows, ""]
