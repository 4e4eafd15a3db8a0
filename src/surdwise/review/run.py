"""Review a folder: read every sheet, decide every claim, write what was asked for."""

from __future__ import annotations

import os
import sys
from collections import Counter
from collections.abc import Callable, Iterator, Sequence
from contextlib import ExitStack
from dataclasses import dataclass
from importlib import import_module
from pathlib import Path
from typing import Any

from ..jsonform import decision_object
from ..sheet import SheetError, SurdwiseError, show
from ..verdict.outcome import Decision, Verdict
from .journal import Entry, Journal
from .junit import junit_text
from .output import OutputError, check, is_plain, write
from .page import summary_html
from .plan import Bad, Source, Unit, sources, units
from .pool import Job, Outcome, Pool
from .result import BAD_SHEET, Result, answered, settled, unreadable, worst
from .show import Bar, closing
from .work import GRACE, Stopped, Work, decided, guarded, read

INTERRUPTED = 130
LATE = 2.0  # seconds past a claim's limit at which its whole worker is killed
PAGE_SECONDS = 60.0  # that a report page may take beyond the time of its claims

PathLike = str | os.PathLike[str]


class ReviewError(SurdwiseError):
    """A review that cannot be done as asked."""


@dataclass(frozen=True)
class Asked:
    """What a review is asked for; see `review`."""

    folder: Path
    workers: int
    seconds: float
    mebibytes: int | None
    junit: Path | None
    jsonl: Path | None
    resume: bool
    summary: Path | None
    scheduler: str | None
    progress: bool
    work: Work

    @property
    def limits(self) -> tuple[float, int | None]:
        """What bounds each claim."""
        return (self.seconds, self.mebibytes)


def review(
    folder: PathLike,
    *,
    workers: int | None = None,
    time_limit: float = 60.0,
    memory_limit: int | None = None,
    junit: PathLike | None = None,
    jsonl: PathLike | None = None,
    resume: bool = False,
    summary: PathLike | None = None,
    scheduler: str | None = None,
    progress: bool = True,
    work: Work = decided,
) -> int:
    """Decide every claim of every .claim file below a folder; returns the exit code.

    The claims go to `workers` processes (as many as there are processors for this one, if not
    given), or to the dask cluster whose scheduler has the address `scheduler`.  A claim is killed
    after `time_limit` seconds or when it needs more than `memory_limit` MiB; it is then undecided.
    A file that cannot be read becomes an entry of its own.

    `junit` and `jsonl` are files, `summary` a folder, for the answers; their order is that of the
    files, sheets and claims.  What is done is kept in a journal beside the first of them, its name
    followed by `.journal`; with `resume` the claims in it are not decided again unless their sheet
    or the program's version has changed, or they were not settled and the limits are others.

    `work(sheet, seconds, tell)` gives the JSON object of the single claim of a sheet, see
    `work.decided`.  Exit codes: 2 for
    a bad sheet or usage (said on stderr) over 3 for undecided over 1 over 0; 130 after Ctrl-C.
    """
    asked = Asked(
        folder=Path(folder),
        workers=len(os.sched_getaffinity(0)) if workers is None else workers,
        seconds=time_limit,
        mebibytes=memory_limit,
        junit=None if junit is None else Path(junit),
        jsonl=None if jsonl is None else Path(jsonl),
        resume=resume,
        summary=None if summary is None else Path(summary),
        scheduler=scheduler,
        progress=progress,
        work=work,
    )
    try:
        return _reviewed(asked)
    except SurdwiseError as e:
        print(e, file=sys.stderr)
        return BAD_SHEET
    except KeyboardInterrupt:
        more = "; --resume goes on from here" if _outputs(asked) else ""
        print(f"stopped{more}", file=sys.stderr)
        return INTERRUPTED


def _reviewed(asked: Asked) -> int:
    files = _checked(asked)
    with ExitStack() as stack:
        journal = _journal(asked, stack)
        pool = stack.enter_context(Pool(asked.workers))
        plan = _read(files, pool, asked)
        done = _kept(plan, journal, asked)
        todo = [u for u in plan if isinstance(u, Unit) and u.key not in done]
        bar = stack.enter_context(Bar(sum(isinstance(u, Unit) for u in plan), asked.progress))
        for answer in done.values():
            bar.add(str(answer["verdict"]))
        for unit, answer in _decided(todo, pool, journal, asked, bar):
            done[unit.key] = answer
    results = [unreadable(u) if isinstance(u, Bad) else answered(u, done[u.key]) for u in plan]
    _write(asked, plan, results)
    for r in results:
        if r.exit_code == BAD_SHEET:
            print(r.details, file=sys.stderr)
    print(closing(results))
    return worst(results)


# ---------------------------------------------------------------- before


def _checked(asked: Asked) -> list[Source]:
    """The files to read; raises SurdwiseError for anything that would stop the review later."""
    if not asked.folder.is_dir():
        raise ReviewError(f"expected a folder with .claim files, got {asked.folder}")
    files = sources(asked.folder)
    if not files:
        raise ReviewError(f"expected .claim files below {asked.folder}, got none")
    if asked.workers < 1:
        raise ReviewError(f"expected one worker or more, got {asked.workers}")
    for path in (asked.junit, asked.jsonl):
        if path is not None:
            check(path)
    if asked.summary is not None:
        try:
            asked.summary.mkdir(parents=True, exist_ok=True)
        except OSError as e:
            raise OutputError(f"expected to make the folder {asked.summary}, got: {e.strerror}") from None
        check(asked.summary / "index.html")
    return files


def _outputs(asked: Asked) -> list[Path]:
    """The files that a journal can stand beside."""
    index = None if asked.summary is None else asked.summary / "index.html"
    return [p for p in (asked.jsonl, asked.junit, index) if p is not None and is_plain(p)]


def _journal(asked: Asked, stack: ExitStack) -> Journal | None:
    outputs = _outputs(asked)
    if outputs:
        path = outputs[0].with_name(outputs[0].name + ".journal")
        return stack.enter_context(Journal(path, asked.resume))
    if asked.resume:
        raise ReviewError("expected a file after --jsonl or --junit to resume from its journal, got none")
    return None


def _read(files: Sequence[Source], pool: Pool, asked: Asked) -> list[Unit | Bad]:
    """Every claim of every file, and the files that cannot be read, in order."""
    found: dict[Source, list[Unit | Bad]] = {}
    limit = asked.seconds + GRACE
    for done in pool.run(Job(f, read, (f.path,), limit) for f in files):
        source: Source = done.job.of
        if isinstance(done.answer, Stopped):
            found[source] = [Bad(source, f"{source.path}: {done.answer.reason}")]
        elif isinstance(done.answer, SheetError):
            found[source] = [Bad(source, str(done.answer))]
        else:
            found[source] = [*units(source, done.answer)]
    return [entry for f in files for entry in found[f]]


def _kept(
    plan: Sequence[Unit | Bad], journal: Journal | None, asked: Asked
) -> dict[tuple[str, int, int, str], dict[str, Any]]:
    """The answers of the journal that still stand."""
    entries = journal.entries if journal is not None else {}
    kept = {}
    for u in plan:
        entry = entries.get(u.key) if isinstance(u, Unit) else None
        if entry is not None and (entry.settled or entry.limits == asked.limits):
            kept[entry.key] = entry.result
    return kept


# ---------------------------------------------------------------- the work


def _decided(
    todo: Sequence[Unit], pool: Pool, journal: Journal | None, asked: Asked, bar: Bar
) -> Iterator[tuple[Unit, dict[str, Any]]]:
    """Every claim with its answer, as they come in; what comes in at once is flushed to the
    journal at once."""
    limit = asked.seconds + GRACE + LATE
    jobs = [Job(u, guarded, (asked.work, u.sheet, *asked.limits), limit) for u in todo]
    fresh: list[Entry] = []
    for done in _runs(jobs, pool, asked, bar.tick):
        unit: Unit = done.job.of
        stopped = isinstance(done.answer, Stopped)
        answer = _undecided(unit, done.answer, done.seconds) if stopped else done.answer
        fresh.append(Entry(unit.key, answer, asked.limits, settled(answer)))
        if not done.more:
            _keep(fresh, journal)
        bar.add(str(answer["verdict"]))
        yield unit, answer
    _keep(fresh, journal)


def _keep(fresh: list[Entry], journal: Journal | None) -> None:
    if journal is not None and fresh:
        journal.add(fresh)
    fresh.clear()


def _runs(jobs: Sequence[Job], pool: Pool, asked: Asked, tick: Callable[[], None]) -> Iterator[Outcome]:
    if asked.scheduler is None or not jobs:
        return pool.run(jobs, tick)
    try:
        from .cluster import run
    except ImportError:
        hint = "pip install 'surdwise[cluster]'"
        raise ReviewError(f"expected dask.distributed for --scheduler, got no such package: {hint}") from None
    return run(asked.scheduler, jobs, tick)


def _undecided(unit: Unit, stopped: Stopped, seconds: float) -> dict[str, Any]:
    """The answer to a claim whose work was stopped: what it had found out, and why it was."""
    answer = stopped.partial
    if answer is None:
        sheet = unit.sheet
        claim = show(sheet.claims[0].body)
        answer = decision_object(Decision(sheet.file, sheet.title, claim, Verdict.UNDECIDED))
    return answer | {"reason": answer["reason"] + stopped.reason, "seconds": round(seconds, 6)}


# ---------------------------------------------------------------- after


def _write(asked: Asked, plan: Sequence[Unit | Bad], results: Sequence[Result]) -> None:
    if asked.jsonl is not None:
        write(asked.jsonl, "".join(r.json() + "\n" for r in results))
    if asked.junit is not None:
        write(asked.junit, junit_text(results))
    if asked.summary is not None:
        pages = _pages(asked, asked.summary, plan)
        write(asked.summary / "index.html", summary_html(str(asked.folder), results, pages))


def _pages(asked: Asked, folder: Path, plan: Sequence[Unit | Bad]) -> dict[str, str]:
    """The report page of every file that can be read, by the file's name.

    With `resume` a page that is younger than its file is kept as it is.
    """
    if not hasattr(import_module("..report", __package__), "write_report"):
        return {}
    counts = Counter(u.source for u in plan if isinstance(u, Unit))
    made = {}
    jobs = []
    for source, n in counts.items():
        out = folder / f"{source.name}.html"
        made[source.name] = out.relative_to(folder).as_posix()
        if not (asked.resume and out.is_file() and out.stat().st_mtime > os.stat(source.path).st_mtime):
            limit = n * (asked.seconds + GRACE) + PAGE_SECONDS
            jobs.append(Job(source, _page, (source.path, out, *asked.limits), limit))
    with Pool(asked.workers) as pool, Bar(len(jobs), asked.progress) as bar:
        for done in pool.run(jobs, bar.tick):
            bar.add("")
            if done.answer is not True:
                del made[done.job.of.name]
    return made


def _page(path: str, out: Path, seconds: float, mebibytes: int | None) -> bool:
    """Write the report page of a file, whole or not at all; whether there is one."""
    write_report = import_module("..report", __package__).write_report
    out.parent.mkdir(parents=True, exist_ok=True)
    new = out.with_name(f".new-{out.name}")
    new.unlink(missing_ok=True)
    write_report(Path(path), new, time_limit=seconds, memory_limit=mebibytes)
    if new.is_file():
        os.replace(new, out)
        return True
    return False
