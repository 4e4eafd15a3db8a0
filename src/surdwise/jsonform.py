"""Decisions as JSON objects, field by field as documented in the README."""

from __future__ import annotations

from typing import Any

from .verdict.outcome import Decision, Figure, Verdict


def decision_object(d: Decision) -> dict[str, Any]:
    """One decision as plain data, ready for any JSON writer."""
    return {
        "file": d.file,
        "title": d.title,
        "claim": d.claim,
        "verdict": d.verdict.value,
        "condition": d.condition,
        "equality": d.equality,
        "sharp": d.sharp,
        "degenerate": list(d.degenerate),
        "algebraic": d.algebraic,
        "components": [
            {"degree": c.degree, "status": c.status, "signs": c.signs, "real": c.real} for c in d.components
        ],
        "variants": [
            {
                "claim": v.claim,
                "condition": v.condition,
                "exact": v.exact,
                "as_written": v.as_written,
                "admitted_by": list(v.admitted_by),
                "holds_at": _figure(v.holds_at),
            }
            for v in d.variants
        ],
        "links": [
            {
                "claim": x.claim,
                "verdict": x.verdict.value,
                "condition": x.condition,
                "equality": x.equality,
                "holds_at": _figure(x.holds_at),
                "fails_at": _figure(x.fails_at),
            }
            for x in d.links
        ],
        "holds_at": _figure(d.holds_at),
        "fails_at": _figure(d.fails_at),
        "parameters": list(d.parameters),
        "frame": d.frame,
        "seconds": d.seconds,
        "certificate": d.certificate,
        "reason": d.reason,
        "explanation": d.explanation,
    }


def _figure(f: Figure | None) -> dict[str, Any] | None:
    if f is None:
        return None
    return {n: {"exact": list(p.exact), "float": list(p.float)} for n, p in f.items()}


def worst(verdicts: list[Verdict]) -> int:
    """Exit code for several claims: 2 over 3 over 1 over 0 (2 is for bad sheets)."""
    codes = {v.exit_code for v in verdicts}
    return next((c for c in (3, 1) if c in codes), 0)
