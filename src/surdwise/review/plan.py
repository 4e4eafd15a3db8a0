"""What there is to do: the claim files below a folder, and their claims one by one."""

from __future__ import annotations

import hashlib
import os
from collections.abc import Sequence
from dataclasses import dataclass, replace
from pathlib import Path

from .. import __version__
from ..sheet import Sheet


@dataclass(frozen=True)
class Source:
    """One claim file: `path` as the user's folder spells it, `name` below the folder with
    forward slashes."""

    path: str
    name: str


@dataclass(frozen=True)
class Unit:
    """One claim to decide.

    `sheet` holds this claim alone.  `number` and `claim` count the sheets of the file and the
    claims of the sheet from 1.  `digest` is of the sheet's whole text and the program's version.
    """

    source: Source
    number: int
    claim: int
    digest: str
    sheet: Sheet

    @property
    def key(self) -> tuple[str, int, int, str]:
        """What makes this claim this claim, wherever the folder stands."""
        return (self.source.name, self.number, self.claim, self.digest)


@dataclass(frozen=True)
class Bad:
    """A file that cannot be read, and the message that says why."""

    source: Source
    text: str


def sources(folder: Path) -> list[Source]:
    """Every .claim file below the folder, sorted by the parts of its name; links to folders are
    not followed."""
    found = []
    for root, _, names in os.walk(folder):
        for name in names:
            path = Path(root, name)
            if path.suffix == ".claim" and not path.is_dir():
                below = path.relative_to(folder)
                found.append((below.parts, Source(str(path), below.as_posix())))
    return [source for _, source in sorted(found)]


def digest(sheet: Sheet) -> str:
    """SHA-256 of the program's version and the sheet's text, in hexadecimal digits."""
    data = f"{__version__}\0{sheet.text}".encode("utf-8", "surrogatepass")
    return hashlib.sha256(data).hexdigest()


def units(source: Source, sheets: Sequence[Sheet]) -> list[Unit]:
    """The claims of a file, in order."""
    return [
        Unit(source, i, j, digest(sheet), replace(sheet, claims=(line,)))
        for i, sheet in enumerate(sheets, 1)
        for j, line in enumerate(sheet.claims, 1)
    ]
