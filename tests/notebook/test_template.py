"""The sheet to start from."""

from __future__ import annotations

from pathlib import Path

import pytest

import surdwise
from surdwise.template import TemplateError, new_sheet


def test_decides_as_it_stands(tmp_path: Path) -> None:
    path = tmp_path / "new.claim"
    new_sheet(path)
    (sheet,) = surdwise.read(path)
    assert {d.verdict.value for d in surdwise.decide(sheet)} == {"holds"}
    # what its comments promise
    without = "".join(x for x in path.open(encoding="utf-8") if not x.startswith("provided"))
    assert {d.verdict.value for d in surdwise.decide(surdwise.read(without)[0])} == {"conditional"}
    second = path.read_text(encoding="utf-8")
    for line in second.splitlines():
        if line.startswith("# ---"):
            second = second.replace("# ---", "---").replace("# given", "given").replace("# claim", "claim")
    assert len(surdwise.read(second)) == 2


def test_an_existing_file_is_kept(tmp_path: Path) -> None:
    path = tmp_path / "mine.claim"
    path.write_text("mine\n")
    with pytest.raises(TemplateError, match="which exists"):
        new_sheet(path)
    assert path.read_text() == "mine\n"
    new_sheet(path, force=True)
    assert surdwise.read(path)
    with pytest.raises(TemplateError, match="expected to write"):
        new_sheet(tmp_path / "none" / "new.claim")
