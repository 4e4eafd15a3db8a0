"""Families of sheets that grow, each with the verdict that is known beforehand.

Every member is a sheet text, so that the truth can be checked by deciding it.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from itertools import pairwise

from ..sheet.errors import SurdwiseError
from ..verdict.outcome import Verdict


class FamilyError(SurdwiseError):
    """A family or a size that does not exist."""


@dataclass(frozen=True)
class Member:
    """One sheet of a family, its size, the verdict it must get and why."""

    family: str
    size: tuple[int, ...]
    text: str
    verdict: Verdict
    why: str

    @property
    def name(self) -> str:
        """A file name without suffix."""
        return "-".join([self.family.replace(" ", "-"), *map(str, self.size)])


def _sheet(title: str, lines: list[str]) -> str:
    return "\n".join([f"title    {title}", "source   The Ruled Margin, scaling tables", *lines]) + "\n"


# ------------------------------------------------------------------ points of a line


def line(n: int, ordered: bool) -> Member:
    """n points of a line: the n - 1 steps against the whole, with the order named or not."""
    names = [f"P{i}" for i in range(1, n + 1)]
    lines = [f"given    points {names[0]}, {names[1]}"]
    lines += [f"given    {x} on line {names[0]}{names[1]}" for x in names[2:]]
    if ordered:
        lines += [
            f"provided {b} between {a} and {c}" for a, b, c in zip(names, names[1:], names[2:], strict=False)
        ]
    steps = " + ".join(f"|{a}{b}|" for a, b in pairwise(names))
    lines.append(f"claim    {steps} = |{names[0]}{names[-1]}|")
    verdict = Verdict.HOLDS if ordered else Verdict.CONDITIONAL
    title = f"{n} points in a row" if ordered else f"{n} points of a line"
    why = "the steps of a walk add up to its length exactly when it never turns back"
    return Member("row" if ordered else "line", (n,), _sheet(title, lines), verdict, why)


# ------------------------------------------------------------------ chords of regular polygons

_POLYGONS = {
    3: "equilateral triangle ABC",
    4: "square ABCD",
    5: "regular pentagon ABCDE",
    6: "regular hexagon ABCDEF",
}
_CHORDS = {
    3: ("|PA| + |PC| = |PB|", "P and B on opposite sides of AC"),
    4: ("|PA| + |PC| = sqrt(2)*|PB|", "P and B on opposite sides of AC"),
    5: ("|PA| + |PC| + |PE| = |PB| + |PD|", "P and C on opposite sides of AE"),
    6: ("|PC| + |PD| = |PA| + |PB| + |PE| + |PF|", "P and C on opposite sides of AF"),
}


def chords(n: int, arc: bool) -> Member:
    """Distances of a point of the circle from the vertices of a regular polygon.

    Ptolemy's theorem on P and three vertices gives 3 and 4; the alternating sum over an odd polygon
    vanishes on the arc between the first and the last vertex; the hexagon is two triangles.
    """
    claim, where = _CHORDS[n]
    lines = [f"given    {_POLYGONS[n]}", "given    P on circle ABC"]
    lines += [f"provided {where}"] if arc else []
    lines.append(f"claim    {claim}")
    verdict = Verdict.HOLDS if arc else Verdict.CONDITIONAL
    title = f"Chords to {n} vertices" + (", with the arc named" if arc else "")
    return Member("arc" if arc else "chords", (n,), _sheet(title, lines), verdict, "Ptolemy's theorem")


# ------------------------------------------------------------------ independent roots

_GROUND = {
    1: ["given    regular hexagon ABCDEF", "given    P on line AB"],
    2: ["given    regular hexagon ABCDEF", "given    point P"],
    3: ["given    isosceles triangle ABC with apex A", "given    point P"],
    4: ["given    triangle ABC", "given    point P"],
}
_FROM = {1: ("C", "D", "E", "F"), 2: ("A", "B", "C", "D", "E", "F"), 3: ("A", "B", "C"), 4: ("A", "B", "C")}


def roots(r: int, d: int) -> Member:
    """A sum of r distances of P, in d parameters, against a fixed side: an equation of a curve or a
    surface, so it fails off a thin set."""
    claim = " + ".join(f"|P{x}|" for x in _FROM[d][:r]) + f" = {r + 1}|AB|"
    lines = [*_GROUND[d], f"claim    {claim}"]
    why = "the left side is not constant, so equality is met on a thin set at most"
    return Member("roots", (r, d), _sheet(f"{r} roots in {d} parameters", lines), Verdict.FAILS, why)


# ------------------------------------------------------------------ perimeters and diagonals


def perimeter(n: int) -> Member:
    """The perimeter of n free points against the n - 3 diagonals from the first (twice a side for n = 3):
    an equation between free parameters that is no identity, so it fails off a thin set."""
    names = "ABCDEF"[:n]
    shape = {3: "triangle", 4: "quadrilateral"}.get(n)
    given = f"{shape} {names}" if shape else f"points {', '.join(names)}"
    diagonals = " + ".join(f"|A{x}|" for x in names[2:-1]) or "2|AB|"
    lines = [f"given    {given}", f"claim    perimeter({names}) = {diagonals}"]
    why = "one equation between free parameters that is no identity"
    return Member("perimeter", (n,), _sheet(f"Perimeter of {n} points", lines), Verdict.FAILS, why)


def rhombus(n: int) -> Member:
    """Perimeters that are known: n = 3 equilateral, 4 rhombus, 5 and 6 regular, against one side."""
    shape = {**_POLYGONS, 4: "rhombus ABCD"}[n]
    names = "ABCDEF"[:n]
    lines = [f"given    {shape}", f"claim    perimeter({names}) = {n}|AB|"]
    return Member("sides", (n,), _sheet(f"{n} equal sides", lines), Verdict.HOLDS, "all sides are equal")


# ------------------------------------------------------------------ the table

Maker = Callable[..., Member]
_TABLE: dict[str, tuple[Maker, tuple[tuple[int, ...], ...]]] = {
    "line": (lambda n: line(n, False), tuple((n,) for n in range(3, 8))),
    "row": (lambda n: line(n, True), tuple((n,) for n in range(3, 8))),
    "chords": (lambda n: chords(n, False), tuple((n,) for n in range(3, 7))),
    "arc": (lambda n: chords(n, True), tuple((n,) for n in range(3, 7))),
    "roots": (
        roots,
        (
            *((r, 1) for r in range(1, 5)),
            *((r, 2) for r in range(1, 7)),
            *((r, d) for d in (3, 4) for r in range(1, 4)),
        ),
    ),
    "perimeter": (perimeter, tuple((n,) for n in range(3, 7))),
    "sides": (rhombus, tuple((n,) for n in range(3, 7))),
}
FAMILIES = tuple(_TABLE)


def families(name: str, *size: int) -> Member:
    """The member of a family with the given size.  Raises FamilyError."""
    if name not in _TABLE:
        raise FamilyError(f"expected one of {', '.join(FAMILIES)} as family, got {name}")
    maker, sizes = _TABLE[name]
    if size not in sizes:
        known = "; ".join(", ".join(map(str, s)) for s in sizes)
        raise FamilyError(f"expected one of the sizes {known} for {name}, got {', '.join(map(str, size))}")
    return maker(*size)


def members(name: str) -> Iterator[Member]:
    """All members of a family, small ones first."""
    for size in _TABLE[name][1]:
        yield families(name, *size)
