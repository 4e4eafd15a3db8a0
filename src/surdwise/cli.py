"""The command line; thin: it reads, calls the interface, prints, and sets the exit code."""

from __future__ import annotations

import json
import sys
import time
from pathlib import Path
from typing import TYPE_CHECKING, Annotated, Any

import typer

from . import __version__
from .sheet import Sheet, SurdwiseError, read_file

if TYPE_CHECKING:
    from .verdict.outcome import Decision

app = typer.Typer(
    name="surdwise",
    help="Statements about distances in plane figures, decided as written.",
    no_args_is_help=True,
    pretty_exceptions_enable=False,
    context_settings={"help_option_names": ["-h", "--help"]},
)

BAD_SHEET = 2
QUIET = 2.0  # seconds without a word about progress

Sheets = Annotated[list[Path], typer.Argument(help="Claim sheets.", show_default=False)]
TimeLimit = Annotated[
    float | None,
    typer.Option("--time-limit", help="Seconds for each claim; the work is killed then.", min=0.01),
]
FrameChoice = Annotated[
    str | None,
    typer.Option(
        "--frame", help="cartesian, sides, half-angles or incircle; the cheapest that fits if not given."
    ),
]
MemoryLimit = Annotated[int | None, typer.Option("--memory-limit", help="MiB for each sheet's work.", min=16)]


def _version(value: bool) -> None:
    if value:
        print(f"surdwise {__version__}")
        raise typer.Exit


@app.callback()
def main(
    version: Annotated[
        bool, typer.Option("--version", help="Print the version.", callback=_version, is_eager=True)
    ] = False,
) -> None:
    """Statements about distances in plane figures, decided as written."""


def _read(path: Path) -> tuple[Sheet, ...]:
    try:
        return read_file(path)
    except SurdwiseError as e:
        print(e, file=sys.stderr)
        raise typer.Exit(BAD_SHEET) from None


class _Watch:
    """Progress of work over two seconds, on a terminal; silence in a pipe."""

    def __init__(self) -> None:
        self.start = time.monotonic()
        self.status: Any = None

    def __call__(self, text: str) -> None:
        """Show a text with the seconds so far."""
        seconds = time.monotonic() - self.start
        if self.status is None and seconds > QUIET:
            from rich.console import Console

            self.status = Console(stderr=True).status("")
            self.status.start()
        if self.status is not None:
            self.status.update(f"{seconds:.0f} s, {text}")

    def stop(self) -> None:
        """Leave the terminal as it was."""
        if self.status is not None:
            self.status.stop()


@app.command()
def decide(
    sheets: Sheets,
    as_json: Annotated[bool, typer.Option("--json", help="One JSON object for each claim.")] = False,
    repair: Annotated[
        Path | None, typer.Option("--repair", help="Write the sheet with its side conditions to this file.")
    ] = None,
    certificate: Annotated[
        Path | None, typer.Option("--certificate", help="Write what a second arithmetic can recheck.")
    ] = None,
    frame: FrameChoice = None,
    time_limit: TimeLimit = None,
    memory_limit: MemoryLimit = None,
) -> None:
    """Decide every claim: does it hold as written, and exactly where?"""
    if certificate is not None and len(sheets) != 1:
        _usage(f"expected one file with --certificate, got {len(sheets)}")
    from dataclasses import replace

    from .jsonform import decision_object, worst
    from .printing import decision_text, wants_colour

    done = []
    mended = []
    for path in sheets:
        read = _read(path)
        answers = [_decided(sheet, time_limit, memory_limit, frame) for sheet in read]
        if certificate is not None:
            from .certificate import write_certificate

            note = write_certificate(certificate, path.read_text(encoding="utf-8-sig"), answers)
            answers = [[replace(d, certificate=note.file) for d in ds] for ds in answers]
        for sheet, decisions in zip(read, answers, strict=True):
            done += decisions
            if repair is not None:
                from .api import repair as mend

                mended.append(mend(sheet, decisions))
            if as_json:
                for d in decisions:
                    print(json.dumps(decision_object(d), ensure_ascii=False))
                continue
            print(f"{sheet.title or 'untitled'}  ({sheet.file})\n")
            for d in decisions:
                print(decision_text(d, wants_colour()) + "\n")
    if repair is not None:
        repair.write_text("---\n".join(mended), encoding="utf-8")
    raise typer.Exit(worst([d.verdict for d in done]))


def _decided(sheet: Sheet, seconds: float | None, mebibytes: int | None, frame: str | None) -> list[Decision]:
    """Decisions of one sheet, with progress on a terminal."""
    from .guarded import decided

    _check_frame(sheet, frame)
    watch = _Watch()
    try:
        return decided(sheet, seconds, mebibytes, frame, watch if sys.stderr.isatty() else None)
    finally:
        watch.stop()


def _check_frame(sheet: Sheet, frame: str | None) -> None:
    from .figure.program import frames_for

    if frame is not None and frame not in frames_for(sheet):
        _usage(f"expected one of {', '.join(frames_for(sheet))} after --frame, got {frame!r}")


@app.command()
def rewrite(
    sheet: Annotated[Path, typer.Argument(help="A claim sheet.", show_default=False)],
    form: Annotated[
        str | None,
        typer.Option(
            "--form", help="auxiliary, squared, sign_product, eliminant or minimal; all if not given."
        ),
    ] = None,
    to: Annotated[str, typer.Option("--to", help="text, latex, sympy or singular.")] = "text",
) -> None:
    """Rewrite every claim free of roots, in five formulations."""
    from dataclasses import replace

    from .guarded import rewritten
    from .printing import table
    from .thesis.export import EXPORTS
    from .thesis.parts import Form

    known = {f.value: f for f in Form}
    if form is not None and form.replace(" ", "_").replace("-", "_") not in known:
        _usage(f"expected one of {', '.join(known)} after --form, got {form!r}")
    if to not in EXPORTS:
        _usage(f"expected one of {', '.join(EXPORTS)} after --to, got {to!r}")
    forms = list(Form) if form is None else [known[form.replace(" ", "_").replace("-", "_")]]
    script = to in ("sympy", "singular")
    mark = {"sympy": "# ", "singular": "// ", "latex": "% ", "text": ""}[to]
    for s in _read(sheet):
        found = _decided(s, None, None, None) if form is None and to == "text" else []
        for i, r in enumerate(rewritten(s, forms)):
            if found:
                r = replace(r, statuses=found[i].algebraic, variants=found[i].variants)
            print(f"{mark}claim {r.claim}")
            if r.thesis is None:
                print(f"{mark}not rewritten: {r.why_not}")
                continue
            for text in r.legend():
                print(mark + text)
            for f in r.formulations:
                print(
                    f"\n{mark}{f.form.value.replace('_', ' ')}"
                    if script or to == "latex"
                    else f"\n{f.form.value}:"
                )
                print(r.export(f.form, to) if f.polynomials else f"{mark}not written down: {f.why_not}")
            if form is None and to == "text":
                head = ["formulation", "unknowns", "degree", "terms", "largest", "seconds", "status"]
                rows = [
                    [*_cost_row(f.form.value, f, f.seconds), r.statuses.get(f.form.value, "")]
                    for f in r.formulations
                ]
                print("\n" + table(head, rows))
                _print_foreign(r)
            print()


def _print_foreign(r: object) -> None:
    """The signed forms that a formulation lets in besides the claim, each with a figure."""
    from .api import Rewriting
    from .printing import points_text

    assert isinstance(r, Rewriting)
    for v in r.variants:
        if v.as_written or not v.admitted_by:
            continue
        names = ", ".join(n.replace("_", " ") for n in v.admitted_by)
        where = f" where {v.condition}" if v.condition else ""
        print(f"\nforeign: {v.claim}{where}\n  let in by {names}")
        if v.holds_at is not None:
            print(f"  for example {points_text(v.holds_at)}")


def _cost_row(name: str, f: object, seconds: float) -> list[str]:
    from .thesis.formulations import Formulation

    assert isinstance(f, Formulation)
    return [
        name.replace("_", " "),
        str(f.unknowns),
        str(f.degree),
        str(f.terms),
        str(f.largest) if f.largest < 10**9 else f"{float(f.largest):.1e}",
        f"{seconds:.6f}",
    ]


@app.command()
def compare(
    sheets: Sheets,
    engine: Annotated[
        list[str] | None,
        typer.Option(
            "--engine", help="tower, singular or sympy; may be repeated; all that are installed if not given."
        ),
    ] = None,
    repeat: Annotated[int, typer.Option("--repeat", help="Counted runs.", min=1)] = 5,
    warm_up: Annotated[int, typer.Option("--warm-up", help="Runs before them.", min=0)] = 1,
    time_limit: Annotated[float, typer.Option("--time-limit", help="Seconds for each run.", min=0.01)] = 10.0,
    memory_limit: Annotated[int, typer.Option("--memory-limit", help="MiB for each run.", min=16)] = 2048,
    csv: Annotated[Path | None, typer.Option("--csv", help="Write a table to this file.")] = None,
    jsonl: Annotated[Path | None, typer.Option("--jsonl", help="Write one JSON object a row.")] = None,
    html: Annotated[Path | None, typer.Option("--html", help="Write a page with charts.")] = None,
    resume: Annotated[bool, typer.Option("--resume", help="Go on from the journal beside --jsonl.")] = False,
) -> None:
    """What each formulation costs through each engine, and whether its answer is the literal truth."""
    from .benchmark import Options
    from .benchmark import compare as work

    every = [s for path in sheets for s in _read(path)]
    watch = _Watch()
    try:
        _, text = work(
            every,
            engine or [],
            Options(repeat, warm_up, time_limit, memory_limit),
            csv=csv,
            jsonl=jsonl,
            html_page=html,
            resume=resume,
            progress=watch if sys.stderr.isatty() else lambda text: None,
        )
    except SurdwiseError as e:
        _usage(str(e))
    finally:
        watch.stop()
    print(text)


@app.command()
def words() -> None:
    """Every form of the sheet language, with an example and what it means."""
    from .sheet.reference import listing

    print(listing())


@app.command()
def recheck(
    certificate: Annotated[Path, typer.Argument(help="A certificate.", show_default=False)],
    time_limit: TimeLimit = None,
) -> None:
    """Recheck a certificate with a second arithmetic that shares no code with this program."""
    from surdwise_recheck.__main__ import main as work

    raise typer.Exit(work([str(certificate), *(["--time-limit", str(time_limit)] if time_limit else [])]))


@app.command()
def report(
    sheet: Annotated[Path, typer.Argument(help="A claim sheet.", show_default=False)],
    out: Annotated[Path, typer.Option("--out", "-o", help="The page, .html or .tex.")],
    frame: FrameChoice = None,
    time_limit: TimeLimit = None,
    memory_limit: MemoryLimit = None,
) -> None:
    """Write the sign-off page of a sheet."""
    from .guarded import DEFAULT_SECONDS
    from .report import write_report

    for s in _read(sheet):
        _check_frame(s, frame)
    seconds = DEFAULT_SECONDS if time_limit is None else time_limit
    raise typer.Exit(write_report(sheet, out, seconds, memory_limit, frame=frame))


@app.command()
def review(
    folder: Annotated[Path, typer.Argument(help="A folder; every .claim file below it.", show_default=False)],
    junit: Annotated[Path | None, typer.Option("--junit", help="Write JUnit XML to this file.")] = None,
    jsonl: Annotated[Path | None, typer.Option("--jsonl", help="Write one JSON object a claim.")] = None,
    resume: Annotated[bool, typer.Option("--resume", help="Go on where a review was stopped.")] = False,
    workers: Annotated[
        int | None, typer.Option("--workers", help="Processes; all processors if not given.", min=1)
    ] = None,
    time_limit: TimeLimit = None,
    memory_limit: MemoryLimit = None,
    summary: Annotated[
        Path | None, typer.Option("--summary", help="Write a summary and report pages to this folder.")
    ] = None,
    scheduler: Annotated[
        str | None, typer.Option("--scheduler", help="Address of a dask scheduler to work on.")
    ] = None,
) -> None:
    """Decide every claim of every sheet below a folder."""
    from .guarded import DEFAULT_SECONDS
    from .review import review as work

    raise typer.Exit(
        work(
            folder,
            junit=junit,
            jsonl=jsonl,
            resume=resume,
            workers=workers,
            summary=summary,
            time_limit=DEFAULT_SECONDS if time_limit is None else time_limit,
            memory_limit=memory_limit,
            scheduler=scheduler,
        )
    )


@app.command()
def new(
    file: Annotated[Path, typer.Argument(help="The sheet to write.", show_default=False)],
    force: Annotated[bool, typer.Option("--force", help="Replace a file that exists.")] = False,
) -> None:
    """Write a commented sheet to start from."""
    from .template import new_sheet

    try:
        new_sheet(file, force)
    except SurdwiseError as e:
        _usage(str(e))


def _usage(text: str) -> None:
    print(text, file=sys.stderr)
    raise typer.Exit(BAD_SHEET)


if __name__ == "__main__":
    app()
