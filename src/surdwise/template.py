"""A new claim sheet to start from."""

from __future__ import annotations

import os
from importlib.resources import files
from pathlib import Path

from .sheet import SurdwiseError


class TemplateError(SurdwiseError):
    """A new sheet that cannot be written."""


def new_sheet(path: str | os.PathLike[str], force: bool = False) -> None:
    """Write a commented sheet, ready to be decided, to a new file.

    A file that exists is replaced only with `force`.  Raises TemplateError.
    """
    path = Path(path)
    text = files(__package__).joinpath("template.claim").read_text(encoding="utf-8")
    try:
        with open(path, "w" if force else "x", encoding="utf-8") as f:
            f.write(text)
    except FileExistsError:
        raise TemplateError(f"expected a new file, got {path}, which exists; --force replaces it") from None
    except OSError as e:
        raise TemplateError(f"expected to write {path}, got: {e.strerror}") from None
