"""What the table says, in sentences computed from its rows."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable, Sequence
from math import exp, log
from statistics import median

from surdwise.benchmark.choice import CHOICES, ELIMINATION
from surdwise.benchmark.engines import ENGINES
from surdwise.benchmark.row import Row
from surdwise.benchmark.show import seconds

Name = tuple[str, int, int]
SAID = {"holds": "holds", "fails": "fails", "conditional": "is conditional"}


def by_claim(rows: Sequence[Row]) -> dict[Name, dict[tuple[str, str], Row]]:
    """Rows of each claim by formulation and engine."""
    out: dict[Name, dict[tuple[str, str], Row]] = {}
    for r in rows:
        out.setdefault((r.file, r.sheet, r.number), {})[r.formulation, r.engine] = r
    return out


def mean(values: Iterable[float]) -> float:
    """Geometric mean."""
    logs = [log(v) for v in values]
    return exp(sum(logs) / len(logs))


def words(choice: str) -> str:
    """A formulation as it is called in text."""
    return choice.replace("_", " ")


def findings(rows: Sequence[Row], limit: float) -> list[str]:
    """The sentences, in Markdown."""
    table = by_claim(rows)
    return [
        *_answered(table, limit),
        *_winners(table),
        *_statuses(table),
        *_truth(table),
        *_elimination(table, limit),
        *_eliminant(table),
        *_without_norms(table, limit),
    ]


def _without_norms(table: dict[Name, dict[tuple[str, str], Row]], limit: float) -> list[str]:
    """Where the sign product is too large to write, and the lengths adjoined one by one are not."""
    found = []
    for t in table.values():
        product, kept = t["sign_product", "tower"], t["auxiliary", "tower"]
        if product.terms is None and product.end in ("time", "memory") and kept.seconds is not None:
            found.append(kept)
    if not found:
        return []
    most = max(found, key=lambda r: r.seconds or 0.0)
    lengths = [r.radicals or 0 for r in found]
    return [
        f"- The sign product itself met a limit ({limit:g} s) on {len(found)} claims, with {min(lengths)} to "
        f"{max(lengths)} lengths. The towers, which adjoin lengths and write no norm, answered the auxiliary "
        f"formulation of each in {seconds(most.seconds)} at most."
    ]


def largest(rows: Sequence[Row], sizes: dict[str, tuple[str, tuple[int, ...]]]) -> list[list[str]]:
    """For each family, the members that were answered through each formulation and engine, of all."""
    out = []
    for family in dict.fromkeys(f for f, _ in sizes.values()):
        mine = [r for r in rows if r.file in sizes and sizes[r.file][0] == family]
        count = len({r.file for r in mine})
        if not count:
            continue
        cells = []
        for c in CHOICES:
            parts = []
            for e in ENGINES:
                asked = [r for r in mine if r.formulation == c and r.engine == e]
                if asked:
                    parts.append(str(sum(r.status is not None for r in asked)))
            cells.append(" / ".join(parts))
        out.append([family, str(count), *cells])
    return out


def _answered(table: dict[Name, dict[tuple[str, str], Row]], limit: float) -> list[str]:
    out = []
    for e in ENGINES:
        parts = []
        for c in CHOICES:
            mine = [t[c, e] for t in table.values() if (c, e) in t]
            if mine:
                parts.append(f"{words(c)} {sum(r.status is not None for r in mine)}")
        if parts:
            out.append(f"- Claims answered within {limit:g} s by {e}, of {len(table)}: {', '.join(parts)}.")
    return out


def _winners(table: dict[Name, dict[tuple[str, str], Row]]) -> list[str]:
    out = []
    for e in ENGINES:
        first: Counter[str] = Counter()
        loss: dict[str, list[float]] = {}
        for t in table.values():
            times = {c: r.seconds for c in CHOICES if (r := t.get((c, e))) is not None and r.seconds}
            if len(times) < 2:
                continue
            best = min(times.values())
            first[min(times, key=lambda c: times[c])] += 1
            for c, s in times.items():
                loss.setdefault(c, []).append(s / best)
        if not first:
            continue
        fastest = ", ".join(f"{words(c)} {n}" for c, n in first.most_common())
        factors = ", ".join(
            f"{words(c)} {mean(v):.1f} (at most {max(v):.0f})"
            for c, v in sorted(loss.items(), key=lambda x: mean(x[1]))
        )
        out.append(
            f"- Through {e} the fastest formulation (writing and answering) is: {fastest}. Time over the "
            f"fastest, geometric mean over the claims that the formulation answers: {factors}."
        )
    return out


def _statuses(table: dict[Name, dict[tuple[str, str], Row]]) -> list[str]:
    compared = different = 0
    for t in table.values():
        for c in CHOICES:
            found = {r.status for (x, _), r in t.items() if x == c and r.status is not None}
            several = sum(1 for (x, _), r in t.items() if x == c and r.status is not None)
            compared += several > 1
            different += len(found) > 1
    return [
        f"- Two engines or more answered the same formulation {compared} times; they differed "
        f"{different} times."
    ]


def _truth(table: dict[Name, dict[tuple[str, str], Row]]) -> list[str]:
    out = []
    for c in CHOICES:
        counts: Counter[str] = Counter()
        wrong: Counter[str] = Counter()
        for t in table.values():
            known = [r for (x, _), r in t.items() if x == c and r.status is not None]
            if not known:
                counts["open"] += 1
                continue
            r = known[0]
            counts[r.agreement] += 1
            if r.agreement == "wrong":
                wrong[f"{r.status} of a claim that {SAID[str(r.literal)]}"] += 1
        why = "; ".join(f"{n} {k}" for k, n in wrong.most_common())
        out.append(
            f"- {words(c).capitalize()}: agrees with the literal verdict on {counts['agrees']} claims, "
            f"partial on {counts['partial']}, wrong on {counts['wrong']}{f' ({why})' if why else ''}, "
            f"open on {counts['open']}."
        )
    return out


def _elimination(table: dict[Name, dict[tuple[str, str], Row]], limit: float) -> list[str]:
    out = []
    for e in ENGINES:
        ratios: list[tuple[float, Row]] = []
        lost = []
        for t in table.values():
            one, two = t.get((ELIMINATION, e)), t.get(("sign_product", "tower"))
            if one is None or two is None or two.write is None or not two.terms:
                continue
            if one.write:
                ratios.append((one.write / two.write, one))
            elif one.end in ("time", "memory"):
                lost.append(two)
        if not ratios:
            continue
        worst, row = max(ratios, key=lambda x: x[0])
        text = (
            f"- Lengths eliminated by {e} itself, against our sign product (writing only, {len(ratios)} "
            f"claims that both write): median factor {median(x for x, _ in ratios):.1f}, the largest "
            f"{worst:.0f} (`{row.claim}`)."
        )
        if lost:
            most = max(x.write or 0.0 for x in lost)
            biggest = max(lost, key=lambda x: x.terms or 0)
            text += (
                f" On {len(lost)} more it met a limit ({limit:g} s); the sign product of each was written in "
                f"{seconds(most)} at most (the largest: {biggest.terms} terms of degree {biggest.degree} in "
                f"{seconds(biggest.write)})."
            )
        out.append(text)
    return out


def _eliminant(table: dict[Name, dict[tuple[str, str], Row]]) -> list[str]:
    ratios = []
    lost = 0
    for t in table.values():
        one, two = t["eliminant", "tower"], t["sign_product", "tower"]
        if two.terms and one.terms:
            ratios.append(one.terms / two.terms)
        elif two.terms and one.write is None and one.end in ("time", "memory"):
            lost += 1
    if not ratios:
        return []
    return [
        f"- The eliminant by resultants has {median(ratios):.1f} times the terms of the sign product in the "
        f"median, {max(ratios):.0f} times at most, over the {len(ratios)} claims where both are written and "
        f"not 0; on {lost} more only the sign product was written. It multiplies over every sign pattern, "
        "the sign product over those up to a common sign."
    ]
