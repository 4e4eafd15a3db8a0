"""Names across the lines of a sheet: made once, made before use, of the right kind."""

from __future__ import annotations

from collections.abc import Iterable, Mapping, Sequence
from dataclasses import dataclass, field

from .errors import Problem
from .forms import FORMS
from .nearest import nearest
from .parser import Parsed
from .tree import Arg, CentreOf, Fact, Measure, Named, Pt, Relation, Through
from .walk import Part, children, parts


@dataclass
class Known:
    """What the lines read so far have brought in: the line of a point; kind and line of a curve."""

    points: dict[str, int] = field(default_factory=dict)
    curves: dict[str, tuple[str, int]] = field(default_factory=dict)


def check_names(given: Sequence[Parsed], asked: Sequence[Parsed]) -> None:
    """Raise a Problem at the first name of a sheet that is unknown, too early, doubled or misused.

    `given` in the order of the file; `asked` are the provided and claim lines.
    """
    later = _where_made(given)
    known = Known()
    for statement in given:
        if isinstance(statement.body, Fact):
            _check_fact(statement.body, known, later)
        else:
            _check_part(statement.body, "", known, later)
        _check_said(statement, known)
    for statement in asked:
        _check_part(statement.body, "", known, {})
        _check_said(statement, known)


def _where_made(given: Iterable[Parsed]) -> dict[str, int]:
    """The first line that brings in each name, for names used too early."""
    lines: dict[str, int] = {}
    for statement in given:
        if isinstance(statement.body, Fact):
            for item in _brought_in(statement.body):
                lines.setdefault(item.name, item.span.line)
    return lines


def _brought_in(fact: Fact) -> list[Pt | Named]:
    items: list[Pt | Named] = []
    for index in FORMS[fact.form].new:
        arg = fact.args[index]
        items.extend(
            part for part in (arg if isinstance(arg, tuple) else (arg,)) if isinstance(part, Pt | Named)
        )
    return items


def _check_fact(fact: Fact, known: Known, later: Mapping[str, int]) -> None:
    form = FORMS[fact.form]
    items = _brought_in(fact)
    if form.fresh:
        for item in items:
            _check_fresh(item, known)
    corner = form.corner[1] if form.corner is not None and form.corner[0] in form.new else -1
    unmade = {item.name for item in items} - known.points.keys() - known.curves.keys()
    for index, (role, arg) in enumerate(zip(form.args, fact.args, strict=True)):
        if index in form.new or index == corner:
            continue
        for part in parts(arg):
            if isinstance(part, Pt | Named) and part.name in unmade:
                raise Problem(part.span, f"expected what is known, but {part.name} cannot make itself")
        _check_part(arg, role, known, later)
    if fact.form == "meet_other":
        _check_other(fact, known)
    for item in items:
        if isinstance(item, Named):
            known.curves[item.name] = (form.makes, item.span.line)
        else:
            known.points.setdefault(item.name, item.span.line)


def _check_fresh(item: Pt | Named, known: Known) -> None:
    if isinstance(item, Pt):
        if item.name in known.points:
            hint = "take another name, or say where it also is, such as `X on line AB` or `|XA| = |XB|`"
            message = (
                f"expected a new point, but {item.name} is already made in line {known.points[item.name]}"
            )
            raise Problem(item.span, message, hint)
    elif item.name in known.curves:
        kind, line = known.curves[item.name]
        message = f"expected a new name, but {item.name} is already a {kind}, named in line {line}"
        raise Problem(item.span, message, "take another name")


def _check_part(part: Part, role: str, known: Known, later: Mapping[str, int]) -> None:
    """Check every name in the part, which stands where the role (a word of Form.args) is wanted."""
    match part:
        case Pt():
            _check_point(part, known, later)
        case Named():
            _check_curve(part, role, known, later)
        case Fact() | Relation():
            for inner_role, arg in zip(FORMS[part.form].args, part.args, strict=True):
                _check_part(arg, inner_role, known, later)
        case CentreOf():
            _check_part(part.circle, "circle", known, later)
        case Measure():
            for point in part.points:
                _check_part(point, "place", known, later)
            if part.line is not None:
                _check_part(part.line, "line", known, later)
        case Through():
            _check_part(part.points, role, known, later)
        case _:
            for child in children(part):
                _check_part(child, role, known, later)


def _check_point(point: Pt, known: Known, later: Mapping[str, int]) -> None:
    if point.name in known.points:
        return
    message = f"expected a point of the figure, got {point.name}"
    if point.name in later:
        raise Problem(
            point.span,
            message,
            f"{point.name} is made in line {later[point.name]}: move that line up before this one",
        )
    alike = [name for name in known.points if name[0] == point.name[0]]
    if alike:
        raise Problem(point.span, message, f"did you mean {alike[0]}?")
    if not known.points:
        raise Problem(
            point.span, message, f"first say what {point.name} is, such as `given point {point.name}`"
        )
    names = list(known.points)
    shown = ", ".join(names[:12]) + (", ..." if len(names) > 12 else "")
    raise Problem(point.span, message, f"the points so far: {shown}")


def _check_curve(curve: Named, role: str, known: Known, later: Mapping[str, int]) -> None:
    wanted = role if role in ("line", "circle") else "line or circle"
    message = f"expected the name of a {wanted}, got {curve.name}"
    if curve.name in known.curves:
        kind, line = known.curves[curve.name]
        if role in ("line", "circle") and kind != role:
            fitting = [name for name, (other, _) in known.curves.items() if other == role]
            hint = (
                f"did you mean {fitting[-1]}?"
                if fitting
                else f"name a {role} first, such as {_example(role)}"
            )
            raise Problem(curve.span, f"{message}, which is a {kind} (line {line})", hint)
        return
    if curve.name in later:
        raise Problem(
            curve.span,
            message,
            f"{curve.name} is made in line {later[curve.name]}: move that line up before this one",
        )
    if len(curve.name) in (2, 3) and set(curve.name.upper()) <= known.points.keys():
        raise Problem(curve.span, message, f"points are capitals: did you mean {curve.name.upper()}?")
    word = nearest(curve.name, known.curves) or nearest(curve.name, ("line", "circle", "segment", "ray"))
    hint = f"did you mean {word}?" if word else f"name it first, such as {_example(wanted, curve.name)}"
    raise Problem(curve.span, message, hint)


def _example(wanted: str, name: str = "") -> str:
    if wanted == "circle":
        return f"`given {name or 'k'} = circle ABC`"
    return f"`given {name or 'l'} = line AB`"


def _check_said(statement: Parsed, known: Known) -> None:
    """A name after the word `line` or `circle` must be one."""
    for curve, kind in statement.said:
        _check_curve(curve, kind, known, {})


def _check_other(fact: Fact, known: Known) -> None:
    """`other than` needs two common points: one of the two must be a circle."""
    one, two, point = fact.args[1:4]
    if _kind(one, known) == _kind(two, known) == "line" and isinstance(point, Pt):
        message = "expected a circle in a meet with `other than`, got two lines, which meet once"
        raise Problem(point.span, message, "leave out `other than`")


def _kind(curve: Arg, known: Known) -> str:
    if isinstance(curve, Through):
        return "line" if len(curve.points) == 2 else "circle"
    return known.curves[curve.name][0] if isinstance(curve, Named) and curve.name in known.curves else ""
