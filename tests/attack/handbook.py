"""Handbook statements for the comparison with random figures; sources beside each, all from
memory."""

HANDBOOK = [
    # Apollonius: the median's length
    "given triangle ABC\nclaim 4median(ABC, A)^2 = 2|AB|^2 + 2|AC|^2 - |BC|^2",
    # Ptolemy
    "given cyclic quadrilateral ABCD\nclaim |AC|*|BD| = |AB|*|CD| + |BC|*|DA|",
    "given points A, B, C, D\nclaim |AB|*|CD| + |BC|*|DA| >= |AC|*|BD|",
    # Pitot
    "given tangential quadrilateral ABCD\nclaim |AB| + |CD| = |BC| + |DA|",
    # Varignon
    "given quadrilateral ABCD\ngiven M = midpoint of AB\ngiven N = midpoint of BC\n"
    "claim 2|MN| = |AC|",
    # Euclid III.35, power of a point; the ray continued may meet on either side
    "given triangle ABC\ngiven k = circle ABC\ngiven D = midpoint of BC\n"
    "given E = meet of AD and k other than A\nclaim |AD|*|DE| = |BD|*|DC|",
    # Euler: distance of circumcentre and incentre
    "given triangle ABC\ngiven O = circumcentre of ABC\ngiven I = incentre of ABC\n"
    "claim |OI|^2 = circumradius(ABC)*(circumradius(ABC) - 2inradius(ABC))",
    # Feuerbach, as a distance of centres
    "given triangle ABC\ngiven N = nine-point centre of ABC\ngiven I = incentre of ABC\n"
    "claim |NI| = circumradius(ABC)/2 - inradius(ABC)",
    # Carnot with the orthocentre: acute triangles only
    "given triangle ABC\ngiven H = orthocentre of ABC\n"
    "claim |AH| + |BH| + |CH| = 2circumradius(ABC) + 2inradius(ABC)",
    # Euclid VI.3
    "given triangle ABC\ngiven D = foot of bisector of angle BAC on BC\nclaim |BD|*|AC| = |DC|*|AB|",
    # reflection in a side lies on the circumcircle
    "given triangle ABC\ngiven H = orthocentre of ABC\ngiven K = reflection of H in line BC\n"
    "claim A, B, C, K concyclic",
    # Simson line of a point of the circumcircle
    "given triangle ABC\ngiven P on circle ABC\ngiven D = foot of P on BC\ngiven E = foot of P on CA\n"
    "given F = foot of P on AB\nclaim D, E, F collinear",
    # British flag theorem with the square roots left on: false in general
    "given rectangle ABCD\ngiven point P\nclaim |PA| + |PC| = |PB| + |PD|",
    # golden section in the pentagon
    "given regular pentagon ABCDE\nclaim |AC| = (1 + sqrt(5))/2*|AB|",
    "given regular hexagon ABCDEF\ngiven P on circle ABC\n"
    "claim |PA|^2 + |PC|^2 + |PE|^2 = |PB|^2 + |PD|^2 + |PF|^2",
    # the ellipse by its string (gardener's construction)
    "given points F, G\ngiven point P\ngiven |PF| + |PG| = 4\nclaim |FG| <= 4",
    # Apollonius circle
    "given points A, B\ngiven point P\ngiven |PA| = 2|PB|\nclaim |PA| > |PB|",
    # a hypothesis that leaves a segment
    "given points A, B, P\ngiven |PA| + |PB| = |AB|\nclaim dist(P, AB) < |AB|/10",
    # empty: the triangle inequality
    "given triangle ABC\ngiven |AB| = |AC| + |BC|\nclaim |AB| = |AC|",
    # three regions of a line for two fixed points
    "given points A, B\ngiven P on line AB\nclaim abs(|PA| - |PB|) = |AB|",
    "given points A, B\ngiven P on ray AB\nclaim |AP| = |AB| + |BP|",
    "given points A, B\ngiven P on segment AB\nclaim |AP| + |PB| = |AB|",
    # isosceles triangles and their converse
    "given isosceles triangle ABC with apex A\ngiven M = midpoint of BC\nclaim AM perpendicular to BC",
    "given triangle ABC\ngiven M = midpoint of BC\nprovided |AB| = |AC|\nclaim AM perpendicular to BC",
    # a right triangle's median to the hypotenuse
    "given right triangle ABC with right angle at C\nclaim median(ABC, C) = |AB|/2",
    "given triangle ABC\nclaim median(ABC, C) = |AB|/2",
    # Stewart, in the case of a third
    "given points B, C\ngiven D on segment BC\ngiven |BD| = |BC|/3\ngiven point A\n"
    "claim 3|AD|^2 = 2|AB|^2 + |AC|^2 - 2/3|BC|^2",
    # law of cosines and of sines
    "given triangle ABC\nclaim |BC|^2 = |AB|^2 + |AC|^2 - 2|AB|*|AC|*cos(BAC)",
    "given triangle ABC\nclaim |BC| = 2circumradius(ABC)*sin(BAC)",
    # Heron
    "given triangle ABC\nclaim 16area(ABC)^2 = perimeter(ABC)*(perimeter(ABC) - 2|AB|)"
    "*(perimeter(ABC) - 2|BC|)*(perimeter(ABC) - 2|CA|)",
    # radii of the touching circles
    "given triangle ABC\nclaim exradius(ABC, A) + exradius(ABC, B) + exradius(ABC, C)"
    " = 4circumradius(ABC) + inradius(ABC)",
    # unequal sides stand opposite unequal altitudes
    "given triangle ABC\nclaim altitude(ABC, A) < altitude(ABC, B)",
    # medians: shorter to the longer side
    "given triangle ABC\nprovided |AB| < |AC|\nclaim median(ABC, C) > median(ABC, B)",
    # tangents of a circle from a point made as meets
    "given points O, A, P\ngiven k = circle with centre O through A\ngiven m = circle with diameter OP\n"
    "given T = meet of k and m\nclaim |PT|^2 = |OP|^2 - |OA|^2",
    # erected squares: equal joins (Bottema)
    "given triangle ABC\ngiven D, E = corners of square on BC away from A\n"
    "given F, G = corners of square on CA away from B\nclaim |AD| = |BG|",
    # apexes on two sides of a square
    "given square ABCD\ngiven E = apex of equilateral triangle on AB towards C\n"
    "given F = apex of equilateral triangle on BC away from A\nclaim D, E, F collinear",
    # midline of a trapezium
    "given trapezium ABCD\ngiven M = midpoint of AD\ngiven N = midpoint of BC\nclaim 2|MN| = |AB| + |CD|",
    # diagonals
    "given rhombus ABCD\nclaim AC perpendicular to BD",
    "given kite ABCD\nclaim AC perpendicular to BD",
    "given quadrilateral ABCD\nclaim area(ABCD) = area(ABC) + area(CDA)",
    # a strict inequality false on isosceles triangles only
    "given triangle ABC\nclaim bisector(ABC, A) < median(ABC, A)",
    "given triangle ABC\nclaim circumradius(ABC) >= 2inradius(ABC)",
    "given triangle ABC\nclaim |AB|^2 + |BC|^2 > |CA|^2",
    "given square ABCD\ngiven point P\nclaim |PA| + |PC| >= |AC|",
    "given equilateral triangle ABC\ngiven P inside ABC\nclaim |PA| + |PB| > |PC|",
    # an excentre is never the incentre
    "given triangle ABC\ngiven J = excentre of ABC opposite A\nclaim dist(J, AB) = inradius(ABC)",
    "given triangle ABC\ngiven T = touch point of incircle of ABC on BC\n"
    "claim |BT| + |AC| = perimeter(ABC)/2",
    "given points A, B, C\ngiven k = circle with diameter AB\ngiven m = circle with diameter AC\n"
    "given X = meet of k and m other than A\nclaim B, C, X collinear",
]
