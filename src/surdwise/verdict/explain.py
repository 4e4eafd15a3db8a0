"""The closing paragraph of a decision, in plain words."""

from __future__ import annotations

from .outcome import Decision, Verdict


def explain(d: Decision, total: int, true: int) -> str:
    """Why the algebraic status differs from the literal one, which signs are to blame, what the
    naive squared form would have let in, and what the text should say."""
    out = [_opening(d, total, true)]
    others = [v for v in d.variants if not v.as_written]
    if d.algebraic and d.verdict is not Verdict.HOLDS and others:
        listed = "; ".join(
            f"`{v.claim}`" + (f" where {v.condition}" if v.condition else "") for v in others[:4]
        )
        more = f" and {len(others) - 4} more" if len(others) > 4 else ""
        out.append(f"The same squares also fit {listed}{more}: only the signs of lengths tell them apart.")
    if d.algebraic.get("squared") == "true on parts and false on parts" and others:
        out.append("Squaring both sides once does not separate them: it lets these forms in as well.")
    out.append(_advice(d))
    return " ".join(x for x in out if x)


def _opening(d: Decision, total: int, true: int) -> str:
    if not d.algebraic:
        return ""
    aux, product = d.algebraic.get("auxiliary"), d.algebraic.get("sign_product")
    if d.verdict is Verdict.HOLDS:
        if aux == "generally true":
            return "The claim holds on every component of the hypotheses, whatever the signs of the lengths."
        return (
            f"With lengths as unknowns the claim is {aux} ({true} of {total} components); on the real "
            "figures admitted here lengths are not negative, and only components where it holds remain."
        )
    if aux == "generally false" and product == "generally false":
        return (
            "No choice of signs makes the claim true on a component of the hypotheses: it fails "
            "already in algebra, and holds at most on thin sets."
        )
    return (
        f"Algebra knows a length only by its square: with lengths as unknowns the claim is {aux} "
        f"({true} of {total} components), and its sign product, the product over all sign choices, "
        f"is {product}."
    )


def _advice(d: Decision) -> str:
    if d.verdict is Verdict.HOLDS:
        return "The text may stand as written."
    if d.verdict is Verdict.CONDITIONAL:
        if d.condition is None:
            return "The text needs a condition; the sheet's language has no short name for it."
        return f"The text should add: provided {d.condition}."
    if d.verdict is Verdict.FAILS:
        if d.condition in (None, "never"):
            where = "on no admitted figure" if d.condition == "never" else "at most on a thin set"
            return f"The text should not be printed: the claim is true {where}."
        return f"The text should not be printed: the claim is true only where {d.condition}."
    return ""
