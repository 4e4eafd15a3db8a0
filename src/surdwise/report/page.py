"""The sign-off page as HTML or LaTeX text, from its parts and the templates beside this file."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from html import escape
from typing import TYPE_CHECKING, Any

from .. import __version__
from ..api import Rewriting
from ..sheet.tree import Sheet
from ..verdict.outcome import Decision
from . import mathml, svg, texmath, tikz
from .maps import SECONDS
from .parts import CertificateNote, ClaimPart, Said, claim_parts

if TYPE_CHECKING:
    from jinja2 import Environment

CAUTION = (
    "This page speaks of the ideal figure in exact mathematics. Where a result may steer physical work "
    "(linkages, guy ropes, layout on site), tolerances, local codes and licensed practice decide the rest."
)
VERDICT_MARKS = {
    "holds": "stet",
    "conditional": "insert",
    "fails": "delete",
    "empty": "query",
    "undecided": "query",
}


@dataclass(frozen=True)
class Galley:
    """One sheet with its answers: a decision and (where there is one) a rewriting for each claim."""

    sheet: Sheet
    decisions: tuple[Decision, ...]
    rewritings: tuple[Rewriting, ...] = ()


def build(
    sheet: Sheet,
    decisions: Sequence[Decision],
    rewritings: Sequence[Rewriting],
    to: str,
    certificate: CertificateNote | None = None,
    *,
    map_seconds: float = SECONDS,
) -> str:
    """The page of one sheet; `to` is html or tex, `map_seconds` the time for each map of truth (0
    for none)."""
    galley = Galley(sheet, tuple(decisions), tuple(rewritings))
    return build_all([galley], to, certificate, map_seconds=map_seconds)


def build_all(
    galleys: Sequence[Galley],
    to: str,
    certificate: CertificateNote | None = None,
    *,
    map_seconds: float = SECONDS,
) -> str:
    """One page with a part for every claim of every sheet."""
    parts: list[ClaimPart] = []
    for g in galleys:
        parts += claim_parts(g.sheet, g.decisions, g.rewritings, len(parts) + 1, map_seconds)
    return render(parts, to, certificate)


def render(parts: Sequence[ClaimPart], to: str, certificate: CertificateNote | None = None) -> str:
    """The page of finished parts; ValueError for a form other than html and tex."""
    if to not in ("html", "tex"):
        raise ValueError(f"expected html or tex, got {to!r}")
    titles = list(dict.fromkeys(p.title for p in parts))
    data = {
        "parts": parts,
        "title": titles[0]
        if len(titles) == 1
        else "Sign-off of " + ", ".join(dict.fromkeys(p.file for p in parts)),
        "sources": list(dict.fromkeys(p.source for p in parts if p.source)),
        "files": list(dict.fromkeys(p.file for p in parts)),
        "certificate": certificate,
        "caution": CAUTION,
        "version": __version__,
        "marks": VERDICT_MARKS,
    }
    return _html(data) if to == "html" else _tex(data)


def _environment(**options: Any) -> Environment:
    from jinja2 import Environment, PackageLoader, StrictUndefined

    return Environment(
        loader=PackageLoader("surdwise.report"),
        trim_blocks=True,
        lstrip_blocks=True,
        undefined=StrictUndefined,
        **options,
    )


# ---------------------------------------------------------------- HTML


def _html(data: dict[str, Any]) -> str:
    from markupsafe import Markup

    env = _environment(autoescape=True)
    env.filters.update(
        said=lambda s: Markup(_said_html(s)),
        display=lambda s: Markup(_said_html(s, True)),
        value=lambda t: Markup(mathml.value(t)),
        flowing=lambda t: Markup(mathml.flowing(t)),
        point=lambda n: Markup(mathml.flowing(n)),
        picture=lambda p, ident: Markup(svg.svg(p, ident)),
        swatch=lambda key, ident: Markup(svg.sample(key, ident)),
        ticked=lambda t: Markup(_ticked(t)),
    )
    return env.get_template("page.html.j2").render(data)


def _said_html(s: Said, display: bool = False) -> str:
    return mathml.flowing(s.text) if s.formula is None else mathml.math(s.formula, display)


def _ticked(text: str) -> str:
    """Running text in which statements stand between backticks."""
    out = []
    for i, part in enumerate(text.split("`")):
        out.append(f'<span class="sheet">{escape(part)}</span>' if i % 2 else escape(part))
    return "".join(out)


# ---------------------------------------------------------------- LaTeX


def _tex(data: dict[str, Any]) -> str:
    env = _environment(
        autoescape=False,
        block_start_string="((*",
        block_end_string="*))",
        variable_start_string="(((",
        variable_end_string=")))",
        comment_start_string="((#",
        comment_end_string="#))",
    )
    env.filters.update(
        text=texmath.text,
        said=_said_tex,
        value=texmath.value,
        picture=tikz.tikz,
        swatch=tikz.sample,
        ticked=_ticked_tex,
    )
    return env.get_template("page.tex.j2").render(data)


def _said_tex(s: Said) -> str:
    return texmath.value(s.text) if s.formula is None else texmath.math(s.formula)


def _ticked_tex(text: str) -> str:
    out = []
    for i, part in enumerate(text.split("`")):
        out.append(rf"\textit{{{texmath.text(part)}}}" if i % 2 else texmath.text(part))
    return "".join(out)
