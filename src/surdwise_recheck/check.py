"""Recheck a certificate: read the sheet again, repeat every step, say what is proved.

Three outcomes for each claim: `accepted` (everything the verdict says was repeated), `incomplete` (nothing
is wrong, the named step stands without full evidence), `rejected` (the named step is false; what was
expected and what was found).  Files are data: sizes, depths and times are limited and nothing is run.
"""

from __future__ import annotations

import json
from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from .exact import Limits, OutOfReach
from .finite import NotFinite, truths
from .text import TextError, check_condition, parse_condition, read_sheets
from .tree import Compare, Condition, Sheet
from .witness import Finding, Outcome, check_witness

FORMAT, VERSION = "surdwise certificate", 1
LARGEST_FILE = 20_000_000
MOST_STEPS = 1000
VERDICTS = ("holds", "conditional", "fails", "empty", "undecided")
CLAIM_FIELDS = {"sheet", "claim", "text", "verdict", "condition", "equality", "steps"}
STEP_FIELDS = {"id", "rule", "uses", "data"}


class Refused(Exception):
    """A certificate that is not well formed; the words say where."""


@dataclass(frozen=True)
class ClaimReport:
    """What was found of one claim; `step` is the step that decides the outcome."""

    text: str
    verdict: str
    outcome: Outcome
    step: str
    expected: str
    found: str


@dataclass(frozen=True)
class Job:
    """One claim under examination, everything read from the sheet's own text."""

    sheet: Sheet
    claim: Condition
    verdict: str
    condition: Condition | None  # where the claim holds; None if not said
    never: bool  # the condition says: nowhere
    equality: str | None
    limits: Limits


Rule = Callable[[Job, dict[str, Any]], Finding]


# ---------------------------------------------------------------- the rules


def rule_witness(job: Job, data: dict[str, Any]) -> Finding:
    """A figure of the sheet on which the claim is true (or false), and where the side condition says so."""
    figure, expected = _exactly(data, {"figure", "truth"}, "witness")
    if not isinstance(figure, dict) or not isinstance(expected, bool):
        raise Refused("witness: expected a figure and a truth value")
    points = {str(n): tuple(map(str, c)) for n, c in figure.items() if isinstance(c, list)}
    if len(points) != len(figure):
        raise Refused("witness: expected two coordinates for each point")
    found = check_witness(job.sheet, job.claim, points, expected, job.limits)
    if found.outcome is not Outcome.ACCEPTED or not _speaks_of_points(job.condition):
        if found.outcome is Outcome.ACCEPTED and job.never and expected:
            return Finding(Outcome.REJECTED, "no figure on which the claim is true", found.found)
        return found
    assert job.condition is not None
    said = check_witness(job.sheet, job.condition, points, expected, job.limits)
    if said.outcome is Outcome.ACCEPTED:
        return found
    return Finding(said.outcome, f"the side condition is {str(expected).lower()} too", said.found)


def rule_finite(job: Job, data: dict[str, Any]) -> Finding:
    """The verdict and the side condition on every one of finitely many figures."""
    _exactly(data, set(), "finite")
    statements = [job.claim]
    if job.condition is not None and _speaks_of_points(job.condition):
        statements.append(job.condition)
    equal = _equality(job)
    if equal is not None:
        statements += equal
    seen: list[list[bool]] = []
    try:
        for row in truths(job.sheet, statements, job.limits):
            if row not in seen:
                seen.append(row)
    except NotFinite as e:
        return Finding(Outcome.INCOMPLETE, "finitely many figures", f"a free parameter: {e}")
    except OutOfReach as e:
        return Finding(Outcome.INCOMPLETE, "every figure", str(e))
    first = {row[0] for row in seen}
    verdict = "empty" if not first else "conditional"
    if len(first) == 1:
        verdict = "holds" if True in first else "fails"
    if verdict != job.verdict:
        return Finding(Outcome.REJECTED, f"the verdict {job.verdict}", f"{verdict} on all figures")
    if job.never and True in first:
        return Finding(Outcome.REJECTED, "the claim true nowhere", "a figure on which it is true")
    if job.condition is not None and len(statements) > 1 and any(row[0] != row[1] for row in seen):
        return Finding(Outcome.REJECTED, "the side condition where the claim holds", "a figure of difference")
    if equal is not None and any(row[-2] != row[-1] for row in seen):
        return Finding(Outcome.REJECTED, "equality as said", "a figure of difference")
    if job.condition is not None and not _speaks_of_points(job.condition):
        return Finding(Outcome.INCOMPLETE, "a side condition in words", "one in the frame's parameters")
    return Finding(Outcome.ACCEPTED, f"the verdict {job.verdict}", f"{job.verdict} on all figures")


def rule_survey(job: Job, data: dict[str, Any]) -> Finding:
    """Every admitted figure, cell by cell: stated, its evidence is not part of this format yet."""
    _exactly(data, {"frame", "parameters", "degenerate"}, "survey")
    return Finding(Outcome.INCOMPLETE, "evidence for every cell", "a statement without evidence")


RULES: dict[str, Rule] = {"witness": rule_witness, "finite": rule_finite, "survey": rule_survey}


# ---------------------------------------------------------------- helpers of the rules


def _exactly(data: Any, fields: set[str], where: str) -> list[Any]:
    if not isinstance(data, dict) or set(data) != fields:
        raise Refused(f"{where}: expected the fields {', '.join(sorted(fields)) or 'none'}")
    return [data[f] for f in sorted(fields)]


def _speaks_of_points(c: Condition | None) -> bool:
    """Whether a condition is one of the sheet language, without the frame's parameters."""
    return c is not None and "FrameSign" not in repr(c)


def _equality(job: Job) -> list[Condition] | None:
    """The equality of the claim's sides and where it is said to be; None if nothing can be compared."""
    c = job.claim
    if job.equality is None or not isinstance(c, Compare) or len(c.ops) != 1 or c.ops[0] == "=":
        return None
    if job.equality in ("never", "always"):
        return None
    where = parse_condition(job.equality)
    return [Compare(c.items, ("=",)), where] if _speaks_of_points(where) else None


# ---------------------------------------------------------------- the whole file


def load(path: Path) -> dict[str, Any]:
    """The certificate as plain data; Refused for one that is not well formed."""
    if path.stat().st_size > LARGEST_FILE:
        raise Refused(f"expected at most {LARGEST_FILE} bytes")
    try:
        data = json.loads(path.read_text(encoding="utf-8"), parse_constant=_no_constant)
    except (ValueError, RecursionError) as e:
        raise Refused(f"expected JSON: {e}") from None
    if not isinstance(data, dict) or set(data) != {"format", "version", "sheet", "claims"}:
        raise Refused("expected the fields claims, format, sheet, version")
    if data["format"] != FORMAT or data["version"] != VERSION:
        raise Refused(f"expected {FORMAT} version {VERSION}")
    if not isinstance(data["sheet"], str) or not isinstance(data["claims"], list):
        raise Refused("expected the sheet's text and a list of claims")
    return data


def _no_constant(name: str) -> None:
    raise ValueError(f"{name} is no number")


def recheck(path: Path, limits: Limits | None = None) -> list[ClaimReport]:
    """Every claim of a certificate, and whether all claims of its sheet are there.  Raises Refused."""
    data = load(path)
    try:
        sheets = read_sheets(data["sheet"])
    except TextError as e:
        raise Refused(f"the sheet's text: {e}") from None
    wanted = [(i, j) for i, s in enumerate(sheets) for j in range(len(s.claims))]
    places = []
    for c in data["claims"]:
        if not isinstance(c, dict) or set(c) != CLAIM_FIELDS:
            raise Refused(f"expected a claim with the fields {', '.join(sorted(CLAIM_FIELDS))}")
        places.append((c["sheet"], c["claim"]))
    if places != wanted:
        raise Refused("expected every claim of the sheet once, in order")
    return [_claim(sheets[c["sheet"]], c, limits or Limits(seconds=30.0)) for c in data["claims"]]


def _claim(sheet: Sheet, c: dict[str, Any], limits: Limits) -> ClaimReport:
    line = sheet.claims[c["claim"]]
    verdict = c["verdict"]
    if verdict not in VERDICTS:
        raise Refused(f"expected a verdict, got {verdict!r}")
    said = {k: c[k] for k in ("condition", "equality")}
    if any(v is not None and not isinstance(v, str) for v in said.values()):
        raise Refused("expected the condition and the equality as text or null")

    def report(outcome: Outcome, step: str, expected: str, found: str) -> ClaimReport:
        return ClaimReport(line.text, verdict, outcome, step, expected, found)

    if _read(c["text"]) != line.body:
        return report(Outcome.REJECTED, "text", f"the claim {line.text}", str(c["text"]))
    if verdict == "undecided":
        return report(Outcome.INCOMPLETE, "verdict", "a decision", "undecided")
    condition = None
    try:
        if said["condition"] not in (None, "never", "always"):
            condition = parse_condition(said["condition"])
            check_condition(sheet, condition)
        if said["equality"] not in (None, "never", "always"):
            check_condition(sheet, parse_condition(said["equality"]))
    except TextError as e:
        return report(Outcome.REJECTED, "condition", "a condition on the figure", str(e))
    assert not isinstance(line.body, tuple)
    job = Job(
        sheet,
        line.body,
        verdict,
        condition,
        said["condition"] == "never",
        said["equality"],
        limits,
    )
    return _steps(job, c["steps"], report)


def _read(text: Any) -> Condition | None:
    try:
        return parse_condition(text) if isinstance(text, str) else None
    except TextError:
        return None


def _steps(job: Job, steps: Any, report: Callable[[Outcome, str, str, str], ClaimReport]) -> ClaimReport:
    if not isinstance(steps, list) or len(steps) > MOST_STEPS:
        raise Refused("expected a list of steps")
    shown: set[bool] = set()
    open_step: ClaimReport | None = None
    whole = False
    names: set[str] = set()
    for s in steps:
        if not isinstance(s, dict) or set(s) != STEP_FIELDS or s["rule"] not in RULES:
            raise Refused(
                f"expected a step with a known rule and the fields {', '.join(sorted(STEP_FIELDS))}"
            )
        name = str(s["id"])
        if name in names or s["uses"] != []:
            raise Refused(f"step {name}: expected a name of its own that uses no other step")
        names.add(name)
        found = RULES[s["rule"]](job, s["data"])
        where = f"{name} ({s['rule']})"
        if found.outcome is Outcome.REJECTED:
            return report(found.outcome, where, found.expected, found.found)
        if found.outcome is Outcome.INCOMPLETE:
            open_step = open_step or report(found.outcome, where, found.expected, found.found)
        elif s["rule"] == "witness":
            shown.add(s["data"]["truth"])
        else:
            whole = True
    wrong = {"holds": {False}, "fails": set(), "conditional": set(), "empty": {True, False}}[job.verdict]
    if shown & wrong:
        return report(Outcome.REJECTED, "verdict", job.verdict, "a figure against it")
    if open_step is not None:
        return open_step
    if not whole:
        return report(Outcome.INCOMPLETE, "steps", "a step on all figures", "single figures only")
    return report(Outcome.ACCEPTED, "", "", "")


def outcome_of(reports: list[ClaimReport]) -> Outcome:
    """Rejected over incomplete over accepted."""
    found = {r.outcome for r in reports}
    order = (Outcome.REJECTED, Outcome.INCOMPLETE)
    return next((o for o in order if o in found), Outcome.ACCEPTED)
