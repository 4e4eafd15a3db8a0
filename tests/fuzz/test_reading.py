"""Random sheets are read: each ends in sheets or in an error with its place, within bounds.

Twenty thousand by default; FUZZ_PARTS=10 in the environment reads a hundred thousand (some six minutes, most
of them for the advice that every error message gives).
"""

from __future__ import annotations

import multiprocessing
import os
import resource
from typing import Any

import pytest

from surdwise.sheet import SheetError, read_text, show

from .sheets import sheets

PARTS, EACH = int(os.environ.get("FUZZ_PARTS", "2")), 10_000
MIB = 1 << 20


def read_all(seed: int, out: Any) -> None:
    """Read a part in this process, whose memory is bounded."""
    resource.setrlimit(resource.RLIMIT_AS, (1500 * MIB, 1500 * MIB))
    read = refused = 0
    try:
        for n, (text, good) in enumerate(sheets(EACH, seed)):
            try:
                found = read_text(text)
            except SheetError as e:
                assert not good, (text, str(e))
                lines = text.removeprefix("\ufeff").replace("\r\n", "\n").replace("\r", "\n").split("\n")
                assert 1 <= e.line <= len(lines), text
                assert e.source == lines[e.line - 1], text
                assert 1 <= e.column <= len(e.source) + 1, text
                assert e.message.startswith("expected"), text
                if n % 10 == 0:
                    assert "^" in str(e), text
                refused += 1
            else:
                read += 1
                if n % 20 == 0:
                    for sheet in found:
                        again = read_text(show(sheet))[0]
                        assert [x.body for x in again.claims] == [x.body for x in sheet.claims], text
                        assert [x.body for x in again.given] == [x.body for x in sheet.given], text
        out.put((read, refused, ""))
    except BaseException as e:
        out.put((read, refused, f"{type(e).__name__}: {e!s:.500}"))


@pytest.mark.parametrize("part", range(PARTS))
def test_every_sheet_reads_or_is_refused_with_its_place(part: int) -> None:
    context = multiprocessing.get_context("spawn")
    out = context.Queue()
    child = context.Process(target=read_all, args=(part, out))
    child.start()
    read, refused, trouble = out.get(timeout=300)
    child.join(10)
    assert not trouble
    assert read + refused == EACH
    assert read > EACH // 5 and refused > EACH // 5
