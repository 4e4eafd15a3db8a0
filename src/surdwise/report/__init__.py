"""The sign-off page of a claim sheet: what an editor files.

`build` writes the page of one sheet as HTML or LaTeX, `write_report` reads, decides and writes a
file.  Templates and drawing libraries are loaded only when a page is built.
"""

from __future__ import annotations

from .page import Galley, build, build_all
from .parts import CertificateNote
from .write import write_report

__all__ = ["CertificateNote", "Galley", "build", "build_all", "write_report"]
