"""Quantities and conditions of the claim-sheet language, by recursive descent."""

from __future__ import annotations

from fractions import Fraction

from .text_tokens import Cursor, Unreadable
from .tree import (
    And,
    Applied,
    Centre,
    Compare,
    Condition,
    Constant,
    CurveRef,
    Joined,
    Measure,
    Name,
    Not,
    Or,
    PointRef,
    Power,
    Quantity,
    Run,
    Says,
)

PARENTHESES = 100  # nested; the recursion of this reader is some five calls for each
HIGHEST_POWER = 64
FEWEST = {"collinear": 3, "concyclic": 4, "distinct": 2}
_OF_RUN = {
    "area": (3, 4),
    "perimeter": (3, 4, 5, 6),
    "circumradius": (3,),
    "inradius": (3,),
    "cos": (3,),
    "sin": (3,),
}
_OF_CORNER = ("exradius", "median", "altitude", "bisector")
_FUNCTIONS = (*_OF_RUN, *_OF_CORNER, "dist", "sqrt", "abs")


class Statements(Cursor):
    """A cursor that reads references, quantities and conditions."""

    depth = 0

    def enter(self) -> None:
        """One level deeper."""
        self.depth += 1
        if self.depth > PARENTHESES:
            raise Unreadable(self.here.column, f"more than {PARENTHESES} levels")

    # ------------------------------------------------------------ references

    def line(self) -> CurveRef:
        """AB, l, `line AB` or `line l`."""
        self.skip("line")
        return Name(self.name()) if self.here.kind == "name" else Run(self.run(2))

    def circle(self) -> CurveRef:
        """ABC or k."""
        return Name(self.name()) if self.here.kind == "name" else Run(self.run(3))

    def place(self) -> PointRef:
        """A point, or `centre of k`."""
        closed = self.is_next("(") and self.peek(1).text in ("centre", "center") and self.skip("(")
        if not self.skip_one("centre", "center"):
            return self.point()
        self.need("of")
        self.skip("circle")
        c = Centre(self.circle())
        if closed:
            self.need(")")
        return c

    # ------------------------------------------------------------ quantities

    def quantity(self) -> Quantity:
        """A sum of products."""
        q = self._product()
        while self.is_next("+") or self.is_next("-"):
            op = self.skip_one("+", "-")
            q = Joined(op, q, self._product())
        return q

    def _product(self) -> Quantity:
        q = self._factor()
        while self.is_next("*") or self.is_next("/"):
            if self.skip("*"):
                q = Joined("*", q, self._factor())
                continue
            column = self.here.column
            self.need("/")
            q = _quotient(q, self._power(self._atom()), column)
        return q

    def _factor(self) -> Quantity:
        """A power; or a minus, or a number, before one: -|AB|, 2|AB|, 1/2(|AB| + |CD|)."""
        if self.skip("-"):
            self.enter()
            q = self._factor()
            self.depth -= 1
            return Constant(-q.value) if isinstance(q, Constant) else Applied("neg", q)
        if self.here.kind == "number":
            if self._starts_quantity(1):
                k = self._number()
                return Joined("*", k, self._power(self._measured()))
            bar, below = self.peek(1), self.peek(2)
            if bar.text == "/" and below.kind == "number" and self._starts_quantity(3):
                column = below.column
                above = self._number()
                self.need("/")
                k = Constant(_ratio(above.value, self._number().value, column))
                return Joined("*", k, self._power(self._measured()))
        return self._power(self._atom())

    def _starts_quantity(self, ahead: int) -> bool:
        t = self.peek(ahead)
        return t.kind in ("sign", "word") and t.text in ("|", "(", *_FUNCTIONS)

    def _number(self) -> Constant:
        t = self.here
        if t.kind != "number":
            raise self.wrong("a number")
        self.at += 1
        return Constant(Fraction(t.text))

    def _power(self, base: Quantity) -> Quantity:
        if not self.skip("^"):
            return base
        column = self.here.column
        if self.skip("("):
            self.enter()
            n = self.quantity()
            self.need(")")
            self.depth -= 1
        else:
            sign = -1 if self.skip("-") else 1
            n = Constant(sign * self._number().value)
        if not isinstance(n, Constant) or n.value.denominator != 1 or abs(n.value) > HIGHEST_POWER:
            raise Unreadable(column, f"expected a whole number up to {HIGHEST_POWER} as exponent")
        return Power(base, int(n.value))

    def _atom(self) -> Quantity:
        return self._number() if self.here.kind == "number" else self._measured()

    def _measured(self) -> Quantity:
        if self.skip("("):
            self.enter()
            q = self.quantity()
            self.need(")")
            self.depth -= 1
            return q
        if self.skip("|"):
            pair = self.run(2)
            self.need("|")
            return Measure("length", pair)
        kind = self.skip_one(*_FUNCTIONS)
        if not kind:
            raise self.wrong("a quantity")
        self.need("(")
        self.enter()
        q = self._function(kind)
        self.need(")")
        self.depth -= 1
        return q

    def _function(self, kind: str) -> Quantity:
        if kind in ("sqrt", "abs"):
            column = self.here.column
            arg = self.quantity()
            if kind == "sqrt" and isinstance(arg, Constant) and arg.value < 0:
                raise Unreadable(column, "expected a number that is not negative under a square root")
            return Applied(kind, arg)
        if kind == "dist":
            p = self.place()
            self.need(",")
            return Measure("dist", (p,), self.line())
        if kind in _OF_RUN:
            return Measure(kind, self.run(*_OF_RUN[kind]))
        triangle = self.run(3)
        self.need(",")
        return Measure(kind, (*triangle, self.corner(triangle)))

    def corner(self, triangle: tuple[str, ...]) -> str:
        """One of the corners of a triangle."""
        if not (self.is_run(1) and self.here.points()[0] in triangle):
            raise self.wrong(f"a corner of {''.join(triangle)}")
        return self.point()

    # ------------------------------------------------------------ conditions

    def condition(self) -> Condition:
        """Conjunctions joined by `or`."""
        parts = [self._conjunction()]
        while self.skip("or"):
            parts.append(self._conjunction())
        return parts[0] if len(parts) == 1 else Or(tuple(parts))

    def _conjunction(self) -> Condition:
        parts = [self._negation()]
        while self.skip("and"):
            parts.append(self._negation())
        return parts[0] if len(parts) == 1 else And(tuple(parts))

    def _negation(self) -> Condition:
        if self.skip("not"):
            self.enter()
            c = self._negation()
            self.depth -= 1
            return Not(c)
        if self.is_next("("):
            return self._in_parentheses()
        return self.single()

    def _in_parentheses(self) -> Condition:
        """A parenthesis opens a quantity, or else a condition."""
        start, depth = self.at, self.depth
        try:
            return self.comparison()
        except Unreadable as first:
            reached = self.at, first
            self.at, self.depth = start, depth
        self.need("(")
        self.enter()
        try:
            c = self.condition()
            self.need(")")
        except Unreadable:
            if reached[0] > self.at:
                raise reached[1] from None
            raise
        self.depth -= 1
        return c

    def single(self) -> Condition:
        """A relation, a condition in words, or a comparison."""
        found = self.relation() or self._property()
        return found if found is not None else self.comparison()

    def comparison(self) -> Compare:
        """A chain of quantities."""
        items, ops = [self.quantity()], []
        while self.here.kind == "compare" or self.is_next("="):
            ops.append(self.here.text)
            self.at += 1
            items.append(self.quantity())
        if not ops:
            raise self.wrong("a comparison such as =")
        return Compare(tuple(items), tuple(ops))

    def relation(self) -> Says | None:
        """Collinear, concyclic, parallel, perpendicular; None where the text is another form."""
        if self.is_run(1) and self.peek(1).text == ",":
            return self._listed()
        n = 1 if self.is_next("line") else 0
        if not (self.is_run(2, n) or self.peek(n).kind == "name"):
            return None
        a = self.line()
        way = self.skip_one("parallel", "perpendicular", "perp.")
        if not way:
            raise self.wrong("`parallel` or `perpendicular`")
        self.need("to")
        return Says("parallel_lines" if way == "parallel" else "perpendicular_lines", (a, self.line()))

    def _listed(self) -> Says:
        column = self.here.column
        names = [self.point()]
        while self.skip(","):
            names.append(self.point())
        form = self.skip_one("collinear", "concyclic", "distinct")
        if not form:
            raise self.wrong("`collinear`, `concyclic` or `distinct`")
        if len(names) < FEWEST[form] or len(set(names)) != len(names):
            raise Unreadable(column, f"expected at least {FEWEST[form]} different points that are {form}")
        return Says(form, (tuple(names),))

    def on(self) -> bool:
        """Take `on` or `lies on` if it comes next."""
        return self.skip("on") or self.skip("lies", "on") or self.skip("lie", "on")

    def _property(self) -> Condition | None:
        if self.is_run(1):
            return self._of_point()
        if self.skip("angle"):
            triple = self.run(3)
            return Says("angle_size", (triple, self._size()))
        if self.is_next("triangle") or self.is_run(3):
            self.skip("triangle")
            return self._of_triangle(self.run(3))
        if self.is_run(4):
            quad = self.run(4)
            self.need("convex")
            return Says("convex", (quad,))
        return None

    def _size(self) -> str:
        size = self.skip_one("acute", "right", "obtuse")
        if not size:
            raise self.wrong("`acute`, `right` or `obtuse`")
        return size

    def _of_triangle(self, triple: tuple[str, ...]) -> Condition:
        if self.skip("equilateral"):
            return Says("is_equilateral", (triple,))
        if self.skip("isosceles"):
            self.need("with", "apex")
            return Says("is_isosceles", (triple, self.corner(triple)))
        return Says("triangle_size", (triple, self._size()))

    def _of_point(self) -> Condition:
        column = self.here.column
        p = self.point()
        if self.skip("and"):
            return self._sides(p, column)
        if self.on():
            if self.skip("segment"):
                return Says("on_segment", (p, self.run(2)))
            if self.skip("ray"):
                return Says("on_ray", (p, self.run(2)))
            if self.skip("circle"):
                return Says("on_circle", (p, self.circle()))
            return Says("on_line", (p, self.line()))
        self.skip("lies")
        if self.skip("between"):
            a = self.point()
            self.need("and")
            b = self.point()
            if len({p, a, b}) < 3:
                raise Unreadable(column, "expected three different points")
            return Says("between", (p, a, b))
        form = self.skip_one("inside", "outside")
        if not form:
            raise self.wrong("`on`, `between`, `inside` or `outside`")
        self.skip("triangle")
        triple = self.run(3)
        if p in triple:
            raise Unreadable(column, f"expected a point other than the corners of {''.join(triple)}")
        return Says(form, (p, triple))

    def _sides(self, p: str, column: int) -> Condition:
        q = self.point()
        if not self.on():
            raise self.wrong("`on`")
        self.skip("the")
        form = "same_side"
        if self.skip("same"):
            self.need("side")
        else:
            self.need("opposite")
            form = "opposite_sides"
            if not self.skip_one("side", "sides"):
                raise self.wrong("`sides`")
        self.need("of")
        line = self.line()
        if p == q or (isinstance(line, Run) and {p, q} & set(line.points)):
            raise Unreadable(column, "expected two different points off the line")
        return Says(form, (p, q, line))


def _ratio(a: Fraction, b: Fraction, column: int) -> Fraction:
    if b == 0:
        raise Unreadable(column, "expected a divisor other than 0")
    return a / b


def _quotient(a: Quantity, b: Quantity, column: int) -> Quantity:
    """a/b; whole numbers make one fraction."""
    if isinstance(b, Constant):
        ratio = _ratio(Fraction(1), b.value, column)
        if isinstance(a, Constant) and a.value.denominator == b.value.denominator == 1:
            return Constant(a.value * ratio)
    return Joined("/", a, b)
