"""The `given` lines of the claim-sheet language: what builds the figure."""

from __future__ import annotations

from collections.abc import Callable

from .text_statements import Statements
from .text_tokens import Unreadable
from .tree import Arg, Build, Compare, CurveRef, Name, Run, Says

_SHAPES = {
    ("triangle",): ("triangle", 3),
    ("quadrilateral",): ("quadrilateral", 4),
    ("equilateral", "triangle"): ("equilateral_triangle", 3),
    ("square",): ("square", 4),
    ("rectangle",): ("rectangle", 4),
    ("parallelogram",): ("parallelogram", 4),
    ("rhombus",): ("rhombus", 4),
    ("kite",): ("kite", 4),
    ("trapezium",): ("trapezium", 4),
    ("trapezoid",): ("trapezium", 4),
    ("cyclic", "quadrilateral"): ("cyclic_quadrilateral", 4),
    ("tangential", "quadrilateral"): ("tangential_quadrilateral", 4),
    ("regular", "pentagon"): ("regular_pentagon", 5),
    ("regular", "hexagon"): ("regular_hexagon", 6),
}
_CENTRES = {
    "centroid": "centroid",
    "circumcentre": "circumcentre",
    "circumcenter": "circumcentre",
    "orthocentre": "orthocentre",
    "orthocenter": "orthocentre",
    "incentre": "incentre",
    "incenter": "incentre",
}


class Given(Statements):
    """Reads one `given` line."""

    def statement(self) -> Build | Says | Compare:
        """The whole line."""
        found: Build | Says | Compare | None = (
            self._shape() or self._of_points() or self._named() or self.relation()
        )
        if isinstance(found, Says) and found.form == "distinct":
            raise Unreadable(1, "`distinct` is a condition and stands under `provided`")
        if found is None:
            left = self.quantity()
            self.need("=")
            found = Compare((left, self.quantity()), ("=",))
        self.end()
        return found

    # ------------------------------------------------------------ shapes

    def _shape(self) -> Build | None:
        if self.skip_one("point", "points"):
            names = [self.point()]
            while self.skip(","):
                names.append(self.point())
            if len(set(names)) != len(names):
                raise Unreadable(self.here.column, "expected different points")
            return Build("points", (tuple(names),))
        if self.skip("isosceles", "triangle"):
            triple = self.run(3)
            self.need("with", "apex")
            return Build("isosceles_triangle", (triple, self.corner(triple)))
        if self.skip("right", "triangle"):
            triple = self.run(3)
            self.need("with", "right", "angle", "at")
            return Build("right_triangle", (triple, self.corner(triple)))
        for words, (form, size) in _SHAPES.items():
            if self.skip(*words):
                return Build(form, (self.run(size),))
        return None

    # ------------------------------------------------------------ points

    def _of_points(self) -> Build | None:
        if not self.is_run(1):
            return None
        if self.peek(1).text == ",":
            return self._corners() if self.is_run(1, 2) and self.peek(3).text == "=" else None
        p = self.point()
        if self.skip("="):
            return self._made(p)
        if self.on():
            return self._on(p)
        self.skip("lies")
        self.need("inside")
        self.skip("triangle")
        triple = self.run(3)
        self._other_than(p, triple)
        return Build("inside_triangle", (p, triple))

    def _other_than(self, p: str, taken: tuple[str, ...]) -> None:
        if p in taken:
            raise Unreadable(self.here.column, f"expected a point other than {', '.join(taken)}, got {p}")

    def _corners(self) -> Build:
        d = self.point()
        self.need(",")
        e = self.point()
        self._other_than(e, (d,))
        self.need("=", "corners", "of", "square", "on")
        pair = self.run(2)
        side = self._side()
        mark = self.point()
        self._other_than(mark, pair)
        return Build("square_corners", (d, e, pair, side, mark))

    def _side(self) -> str:
        if self.skip("away", "from"):
            return "away"
        if self.skip_one("towards", "toward"):
            return "towards"
        raise self.wrong("`away from` or `towards`")

    def _on(self, p: str) -> Build:
        if self.skip("segment"):
            return Build("on_segment", (p, self.run(2)))
        if self.skip("ray"):
            return Build("on_ray", (p, self.run(2)))
        if self.skip("circle"):
            return Build("on_circle", (p, self.circle()))
        the = self.skip("the")
        if self.skip_one("perpendicular", "perp."):
            self.need("bisector", "of")
            return Build("on_perpendicular_bisector", (p, self.run(2)))
        if self.skip("bisector"):
            self.need("of", "angle")
            return Build("on_angle_bisector", (p, self.run(3)))
        if the:
            raise self.wrong("`bisector` or `perpendicular bisector`")
        return Build("on_line", (p, self.line()))

    def _made(self, p: str) -> Build:
        for word, form in _CENTRES.items():
            if self.skip(word):
                self.need("of")
                return Build(form, (p, self.run(3)))
        if self.skip_one("centre", "center"):
            self.need("of")
            self.skip("circle")
            return Build("centre", (p, self.circle()))
        if self.skip_one("meet", "intersection"):
            return self._meet(p)
        forms: dict[tuple[str, ...], Callable[[str], Build]] = {
            ("midpoint", "of"): lambda p: Build("midpoint", (p, self.run(2))),
            ("foot", "of"): self._foot,
            ("reflection", "of"): self._reflection,
            ("excentre", "of"): self._excentre,
            ("excenter", "of"): self._excentre,
            ("nine-point",): self._nine_point,
            ("touch", "point", "of", "incircle", "of"): self._touch,
            ("apex", "of", "equilateral", "triangle", "on"): self._apex,
        }
        for words, read in forms.items():
            if self.skip(*words):
                return read(p)
        raise self.wrong("a construction such as `midpoint of AB`")

    def _foot(self, p: str) -> Build:
        if self.skip("bisector"):
            self.need("of", "angle")
            triple = self.run(3)
            self.need("on")
            return Build("foot_of_bisector", (p, triple, self.run(2)))
        if self.skip_one("perpendicular", "perp."):
            self.need("from")
        q = self.place()
        self.need("on")
        return Build("foot", (p, q, self.line()))

    def _reflection(self, p: str) -> Build:
        q = self.place()
        self.need("in")
        centre = self.peek(1).text if self.is_next("(") else self.here.text
        if self.is_run(1) or centre in ("centre", "center"):
            return Build("reflection_in_point", (p, q, self.place()))
        return Build("reflection_in_line", (p, q, self.line()))

    def _excentre(self, p: str) -> Build:
        triple = self.run(3)
        self.need("opposite")
        return Build("excentre", (p, triple, self.corner(triple)))

    def _nine_point(self, p: str) -> Build:
        if not self.skip_one("centre", "center"):
            raise self.wrong("`centre`")
        self.need("of")
        return Build("nine_point_centre", (p, self.run(3)))

    def _touch(self, p: str) -> Build:
        triple = self.run(3)
        self.need("on")
        pair = self.run(2)
        if not set(pair) <= set(triple):
            raise Unreadable(self.here.column, f"expected a side of {''.join(triple)}")
        return Build("touch_point", (p, triple, pair))

    def _apex(self, p: str) -> Build:
        pair = self.run(2)
        if self.here.kind == "end":
            return Build("equilateral_apex", (p, pair))
        side = self._side()
        mark = self.point()
        self._other_than(mark, pair)
        return Build("equilateral_apex_sided", (p, pair, side, mark))

    def _meet(self, p: str) -> Build:
        self.need("of")
        one = self._meetable()
        self.need("and")
        two = self._meetable()
        if isinstance(one, Run) and isinstance(two, Run) and set(one.points) == set(two.points):
            raise Unreadable(self.here.column, "expected two different curves")
        if self.skip("other"):
            self.need("than")
            return Build("meet_other", (p, one, two, self.point()))
        return Build("meet", (p, one, two))

    said: tuple[tuple[str, str], ...] = ()

    def _meetable(self) -> CurveRef:
        word = self.skip_one("line", "circle")
        if self.here.kind == "name":
            name = self.name()
            if word:
                self.said += ((name, word),)
            return Name(name)
        return Run(self.run(*{"line": (2,), "circle": (3,), "": (2, 3)}[word]))

    # ------------------------------------------------------------ curves

    def _named(self) -> Build | None:
        if self.here.kind != "name" or self.peek(1).text != "=":
            return None
        k = self.name()
        self.need("=")
        form, args = self._curve()
        return Build(form, (k, *args))

    def _curve(self) -> tuple[str, tuple[Arg, ...]]:
        if self.skip("circle", "with"):
            return self._circle_with()
        if self.skip("circle") or self.skip("circumcircle", "of"):
            return "circle_through", (self.run(3),)
        if self.skip("incircle", "of"):
            return "incircle", (self.run(3),)
        if self.skip("excircle", "of"):
            triple = self.run(3)
            self.need("opposite")
            return "excircle", (triple, self.corner(triple))
        if self.skip("line"):
            return "line_through", (self.run(2),)
        if self.skip("bisector", "of", "angle"):
            return "angle_bisector", (self.run(3),)
        if self.skip("tangent", "to"):
            self.skip("circle")
            k = self.circle()
            self.need("at")
            return "tangent", (k, self.point())
        way = self.skip_one("parallel", "perpendicular", "perp.")
        if way and way != "parallel" and self.skip("bisector", "of"):
            return "perpendicular_bisector", (self.run(2),)
        if way:
            self.need("to")
            line = self.line()
            self.need("through")
            return "parallel" if way == "parallel" else "perpendicular", (line, self.place())
        raise self.wrong("a line or circle such as `circle ABC`")

    def _circle_with(self) -> tuple[str, tuple[Arg, ...]]:
        if self.skip("diameter"):
            return "circle_diameter", (self.run(2),)
        if not self.skip_one("centre", "center"):
            raise self.wrong("`centre` or `diameter`")
        o = self.place()
        if self.skip("through"):
            return "circle_centre_through", (o, self.point())
        self.need("and", "radius")
        return "circle_centre_radius", (o, self.quantity())
