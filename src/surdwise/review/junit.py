"""The answers as JUnit XML: one test case a claim.

Attributes and elements are those that the published schemas of the format have in common: a
`testsuite` a file with properties, test cases, system-out and system-err in this order.
"""

from __future__ import annotations

import re
from collections.abc import Sequence
from datetime import UTC, datetime
from xml.etree import ElementTree as ET

from .result import Kind, Result

_NOT_XML = re.compile("[^\t\n\r\x20-\ud7ff\ue000-\ufffd\U00010000-\U0010ffff]")


def junit_text(results: Sequence[Result]) -> str:
    """The whole XML document, one suite a file in the order of the results."""
    root = ET.Element("testsuites")
    when = datetime.now(UTC).strftime("%Y-%m-%dT%H:%M:%S")
    suites: dict[str, list[Result]] = {}
    for r in results:
        suites.setdefault(r.name, []).append(r)
    for i, (name, cases) in enumerate(suites.items()):
        suite = ET.SubElement(
            root,
            "testsuite",
            {
                "id": str(i),
                "package": "surdwise",
                "name": _plain(name),
                "timestamp": when,
                "hostname": "localhost",
                "tests": str(len(cases)),
                "failures": str(sum(c.kind is Kind.FAILURE for c in cases)),
                "errors": str(sum(c.kind is Kind.ERROR for c in cases)),
                "time": f"{sum(c.seconds for c in cases):.3f}",
            },
        )
        ET.SubElement(suite, "properties")
        for c in cases:
            _case(suite, c)
        ET.SubElement(suite, "system-out")
        ET.SubElement(suite, "system-err")
    ET.indent(root)
    return '<?xml version="1.0" encoding="UTF-8"?>\n' + ET.tostring(root, encoding="unicode") + "\n"


def _case(suite: ET.Element, r: Result) -> None:
    attributes = {"name": _plain(r.label), "classname": _plain(r.name), "time": f"{r.seconds:.3f}"}
    case = ET.SubElement(suite, "testcase", attributes)
    if r.kind is Kind.PASS:
        return
    tag = "failure" if r.kind is Kind.FAILURE else "error"
    what = ET.SubElement(case, tag, {"type": r.verdict, "message": _plain(r.message)})
    what.text = _plain(r.details)


def _plain(text: str) -> str:
    """The text with every character that XML cannot hold replaced."""
    return _NOT_XML.sub("\ufffd", text)
