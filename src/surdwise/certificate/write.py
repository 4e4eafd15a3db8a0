"""Write the certificate of a file of claim sheets: its text and, for each verdict, a list of steps.

The format is described by `schema.json` beside `surdwise_recheck`.  The same decisions always give the
same bytes.  A figure without a free parameter is certified whole (`finite`); for others the figures handed
out are (`witness`), and the survey of all figures is stated without evidence (`survey`).
"""

from __future__ import annotations

import hashlib
import json
from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from ..verdict.outcome import Decision, Figure, Verdict

FORMAT, VERSION = "surdwise certificate", 1


@dataclass(frozen=True)
class CertificateFile:
    """A written certificate: its file and the SHA-256 digest of its bytes."""

    file: str
    digest: str


def write_certificate(path: Path, text: str, decisions: Sequence[Sequence[Decision]]) -> CertificateFile:
    """Write the certificate of a file's text; `decisions` are those of each of its sheets, in order."""
    claims = [_claim(i, j, d) for i, of_sheet in enumerate(decisions) for j, d in enumerate(of_sheet)]
    data = {"format": FORMAT, "version": VERSION, "sheet": text, "claims": claims}
    written = json.dumps(data, ensure_ascii=False, indent=1, sort_keys=True).encode() + b"\n"
    path.write_bytes(written)
    return CertificateFile(str(path), hashlib.sha256(written).hexdigest())


def _claim(i: int, j: int, d: Decision) -> dict[str, Any]:
    steps: list[dict[str, Any]] = []

    def step(rule: str, data: dict[str, Any]) -> None:
        steps.append({"id": f"s{len(steps) + 1}", "rule": rule, "uses": [], "data": data})

    if d.verdict is not Verdict.UNDECIDED:
        for figure, truth in ((d.holds_at, True), (d.fails_at, False)):
            if figure is not None:
                step("witness", {"figure": _points(figure), "truth": truth})
        if d.parameters or d.verdict is Verdict.EMPTY:
            survey = {"frame": d.frame, "parameters": list(d.parameters), "degenerate": list(d.degenerate)}
            step("survey", survey)
        else:
            step("finite", {})
    return {
        "sheet": i,
        "claim": j,
        "text": d.claim,
        "verdict": d.verdict.value,
        "condition": d.condition,
        "equality": d.equality,
        "steps": steps,
    }


def _points(figure: Figure) -> dict[str, list[str]]:
    return {name: list(p.exact) for name, p in figure.items()}
