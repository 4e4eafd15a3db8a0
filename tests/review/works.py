"""Work that goes wrong on purpose; the sheet's title says how."""

from __future__ import annotations

import faulthandler
import os
import time
from pathlib import Path
from typing import Any

from surdwise.review.work import Tell, decided
from surdwise.sheet import Sheet

SHEET = "given points A, B\nclaim |AB| = |BA|\n"
HOLDS = 0


def troubled(sheet: Sheet, seconds: float, tell: Tell) -> dict[str, Any]:
    """decided, but for the titles hang, crash, eat and err."""
    if sheet.title == "hang":
        while True:
            time.sleep(0.01)
    if sheet.title == "crash":
        faulthandler.disable()
        os.abort()
    if sheet.title == "eat":
        hoard = [bytearray(1 << 20)]
        while len(hoard) < 2000:
            hoard.append(bytearray(b"x" * (1 << 20)))
    if sheet.title == "err":
        raise ZeroDivisionError("a denominator of the test")
    return decided(sheet, seconds, tell)


def logged(sheet: Sheet, seconds: float, tell: Tell) -> dict[str, Any]:
    """decided, a little late; each start is written down in the file that STARTS names."""
    line = f"{sheet.title} {sheet.claims[0].span.line} {os.getpid()}\n"
    log = os.open(os.environ["STARTS"], os.O_WRONLY | os.O_APPEND | os.O_CREAT)
    os.write(log, line.encode())
    os.close(log)
    time.sleep(0.03)
    return decided(sheet, seconds, tell)


def folder_of(root: Path, **titles: str) -> Path:
    """A folder with one small sheet a title, each in the file NAME.claim."""
    root.mkdir(exist_ok=True)
    for name, title in titles.items():
        (root / f"{name}.claim").write_text(f"title {title}\n{SHEET}")
    return root
