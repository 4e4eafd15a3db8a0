"""Sheets for the attack: plain text, with the source beside each (theorems from memory)."""

from __future__ import annotations

SHEETS: tuple[str, ...] = (
    # H of a right triangle is the corner
    """
title right triangle H
given right triangle ABC with right angle at C
given H = orthocentre of ABC
claim |HA| = |CA|
claim |HC| = 0
claim |HA| + |HB| > |AB|
""",
    # Carnot: HA = 2R|cos A|
    """
title HA 2Rcos
given triangle ABC
given H = orthocentre of ABC
claim |HA| = 2circumradius(ABC)*cos(BAC)
claim |HA| = 2circumradius(ABC)*abs(cos(BAC))
claim |HA| + |HB| + |HC| = 2circumradius(ABC) + 2inradius(ABC)
""",
    # cevian order h <= l <= m
    """
title bisector median
given triangle ABC
claim bisector(ABC, A) < median(ABC, A)
claim altitude(ABC, A) <= bisector(ABC, A)
claim altitude(ABC, A) <= bisector(ABC, A) <= median(ABC, A)
claim bisector(ABC, A) >= median(ABC, A)
""",
    # made for the attack
    """
title quotient zero denominators
given points A, B
given P on line AB
claim |PA|/|PB| = 1
claim |PA|/|PB| > 0
claim |PA|/|PB| >= 0
claim |PA|*|PB| >= 0
""",
    # van Schooten
    """
title P on circle and chord quotient
given equilateral triangle ABC
given P on circle ABC
claim |PA|/|PB| + |PA|/|PC| >= 1
claim |PA|^2 + |PB|^2 + |PC|^2 = 2|AB|^2
claim |PA| <= |PB| + |PC|
claim |PA| < |PB| + |PC|
claim |PA| > |PB| + |PC|
""",
    # Pompeiu
    """
title P anywhere Pompeiu
given equilateral triangle ABC
given point P
claim |PA| <= |PB| + |PC|
claim |PA| = |PB| + |PC|
""",
    # made for the attack
    """
title tangent line meets
given points O, A
given k = circle with centre O through A
given l = tangent to k at A
given X = meet of l and k
claim |XA| = 0
claim |OX| = |OA|
claim |XA| > 0
""",
    # made for the attack
    """
title tangent other than
given points O, A
given k = circle with centre O through A
given l = tangent to k at A
given X = meet of l and k other than A
claim |XA| = 0
""",
    # an ellipse shrunk to its focal segment
    """
title segment left
given points A, B
given point P
given |PA| + |PB| = |AB|
claim |PA| <= |AB|
claim |PA| = |PB|
claim |PA| < |AB|
claim P on segment AB
""",
    # Leibniz: least sum of squares at the centroid
    """
title single point left
given triangle ABC
given point P
given |PA|^2 + |PB|^2 + |PC|^2 = (|AB|^2 + |BC|^2 + |CA|^2)/3
claim dist(P, BC) = altitude(ABC, A)/3
claim |PA| = 2median(ABC, A)/3
claim |PA| = |PB|
""",
    # made for the attack
    """
title meets coincide
given points O, A
given k = circle with centre O through A
given P on circle k
given l = line AP
given X = meet of l and k
given Y = meet of l and k other than X
claim |XA|*|YA| = 0
claim |XY| = |AP|
claim |XA| = 0
""",
    # made for the attack
    """
title either side squares
given triangle ABC
given D = apex of equilateral triangle on BC
given E = apex of equilateral triangle on CA
given F = apex of equilateral triangle on AB
claim |AD| = |BE|
claim |DE| = |EF|
""",
    # Euler, Steiner: relations of R, r and the exradii
    """
title excentres
given triangle ABC
given I = incentre of ABC
given J = excentre of ABC opposite A
claim |IJ| = 4circumradius(ABC)*sqrt((1 - cos(BAC))/2)
claim |AI|*|AJ| = |AB|*|AC|
claim |IB| = |IC|
claim |JA| > |IA|
claim exradius(ABC, A) > inradius(ABC)
claim exradius(ABC, A) + exradius(ABC, B) + exradius(ABC, C) = 4circumradius(ABC) + inradius(ABC)
""",
    # made for the attack
    """
title isosceles wrong inequality
given triangle ABC
claim abs(|AB| - |AC|) > 0
claim abs(|AB| - |AC|) < |BC|
claim |AB| < |AC| < |BC|
claim |AB|^2 + |AC|^2 > |BC|^2
claim |AB| + |AC| >= 2median(ABC, A) >= 2altitude(ABC, A)
""",
    # Stewart
    """
title P at a vertex segment
given triangle ABC
given P on segment BC
claim |AP| < |AB|
claim |AP| <= |AB| + |AC|
claim |AP|*|BC| <= |AB|*|PC| + |AC|*|PB|
claim |AP|^2*|BC| = |AB|^2*|PC| + |AC|^2*|PB| - |PB|*|PC|*|BC|
claim |PB| + |PC| = |BC|
claim |PB|*|PC| = 0
""",
    # b + c = 2a
    """
title hidden median equation
given triangle ABC
given |AB| + |AC| = 2|BC|
claim cos(BAC) >= 1/2
claim cos(BAC) > 1/2
claim inradius(ABC) = altitude(ABC, A)/3
""",
    # made for the attack
    """
title angle from equation
given triangle ABC
given |AB|^2 + |AC|^2 = |BC|^2
claim |BC| = 2circumradius(ABC)
claim |AB| = |AC|
""",
    # made for the attack
    """
title locus ellipse
given points E, F
given point P
given |PE| + |PF| = 2|EF|
claim |PE| >= |EF|/2
claim |PE| <= 3/2|EF|
claim |PE| > |EF|/2
""",
    # focal distances
    """
title hyperbola
given points E, F
given point P
given |PE| - |PF| = |EF|/2
claim |PE| > |PF|
claim |PE| >= 3/4|EF|
claim |PF| >= 3/4|EF|
""",
    # made for the attack
    """
title degenerate hyperbola
given points E, F
given point P
given |PE| - |PF| = |EF|
claim F between E and P
claim P on line EF
claim |PE| >= |EF|
""",
    # bisectors meet on the circumcircle
    """
title point twice
given triangle ABC
given l = perpendicular bisector of AB
given m = bisector of angle ACB
given X on line l
given X on line m
claim |XA| = |XB|
claim A, B, C, X concyclic
claim |XC| > |XA|
""",
    # made for the attack
    """
title point twice circle line
given points A, B
given k = circle with diameter AB
given P on circle k
given P on line AB
claim |PA|*|PB| = 0
claim |PA| = 0
""",
    # equilateral triangles in a square
    """
title zero parameter
given square ABCD
given E = apex of equilateral triangle on AB towards C
given F = apex of equilateral triangle on BC away from A
claim D, E, F collinear
claim |DE| = |EF|
claim |DE| < |EF|
claim |DE|^2 = (2 - sqrt(3))*|AB|^2
""",
    # the same on either side
    """
title zero parameter either
given square ABCD
given E = apex of equilateral triangle on AB
given F = apex of equilateral triangle on BC
claim D, E, F collinear
claim |DE| < |EF|
claim |DE| = |DF|
""",
    # golden section (Euclid XIII)
    """
title pentagon
given regular pentagon ABCDE
claim |AC|^2 = |AC|*|AB| + |AB|^2
claim |AC|/|AB| = (1 + sqrt(5))/2
claim |AC|/|AB| < 8/5
""",
    # Ptolemy on a hexagon
    """
title hexagon point
given regular hexagon ABCDEF
given P on circle ABC
claim |PA| + |PD| = |PB| + |PC|
claim |PD| + |PE| = |PA| + |PB| + |PC| + |PF|
claim |PA|^2 + |PC|^2 + |PE|^2 = |PB|^2 + |PD|^2 + |PF|^2
""",
    # Ptolemy on a pentagon
    """
title pentagon arc
given regular pentagon ABCDE
given P on circle ABC
claim |PA| + |PC| + |PE| = |PB| + |PD|
""",
    # incentre and the midpoint of an arc
    """
title midpoint arc
given triangle ABC
given I = incentre of ABC
given k = circle ABC
given M = meet of AI and k other than A
claim |MB| = |MC|
claim |MI| = |MB|
claim |MA| > |MB|
claim |AB| + |AC| = 2|AM|*cos(BAM)
""",
    # made for the attack
    """
title meet of line and circle either
given triangle ABC
given k = circle with diameter BC
given X = meet of AB and k
claim CX perpendicular to AB
claim |CX| = altitude(ABC, C)
claim |BX| + |XA| = |AB|
""",
    # made for the attack
    """
title meet other than B right angle
given triangle ABC
given k = circle with diameter BC
given X = meet of AB and k other than B
claim |CX| = altitude(ABC, C)
claim |BX| + |XA| = |AB|
claim X between A and B
""",
    # Ptolemy's inequality on kites
    """
title rhombus & kite
given kite ABCD
claim AC perpendicular to BD
claim |AB| = |CB|
claim |AB|*|CD| + |BC|*|DA| = |AC|*|BD|
claim |AB|*|CD| + |BC|*|DA| >= |AC|*|BD|
claim area(ABCD) = |AC|*|BD|/2
""",
    # Euler's quadrilateral theorem on trapezia
    """
title trapezium
given trapezium ABCD
claim |AC|^2 + |BD|^2 = |AD|^2 + |BC|^2 + 2|AB|*|CD|
claim |AC| + |BD| > |AD| + |BC|
claim |AB| > |CD|
""",
    # Ptolemy
    """
title Ptolemy cyclic
given cyclic quadrilateral ABCD
claim |AB|*|CD| + |BC|*|DA| = |AC|*|BD|
claim |AB|*|CD| + |AC|*|BD| = |BC|*|DA|
claim |AC| = |BD|
""",
    # Ptolemy, order not given
    """
title quadrilateral Ptolemy
given quadrilateral ABCD
given A, B, C, D concyclic
claim |AB|*|CD| + |BC|*|DA| = |AC|*|BD|
claim |AB|*|CD| + |BC|*|DA| >= |AC|*|BD|
""",
    # made for the attack
    """
title tangential
given tangential quadrilateral ABCD
claim |AB| + |CD| = |BC| + |DA|
claim |AB| = |BC|
""",
    # tangent lengths
    """
title touch points
given triangle ABC
given T = touch point of incircle of ABC on BC
given S = touch point of incircle of ABC on CA
claim |CT| = |CS|
claim |BT| + |CS| = |BC|
claim 2|BT| = |AB| + |BC| - |CA|
claim |BT| = |CT|
claim |BT|*|CT| = inradius(ABC)*exradius(ABC, A)
""",
    # Euclid VI.3, Stewart
    """
title foot of bisector
given triangle ABC
given D = foot of bisector of angle BAC on BC
claim |BD|*|AC| = |CD|*|AB|
claim |AD|^2 = |AB|*|AC| - |BD|*|CD|
claim |AD| = bisector(ABC, A)
claim |AD| < |AB|
claim |AD| < |AB| or |AD| < |AC|
""",
    # made for the attack
    """
title coinciding midpoint lines
given triangle ABC
given M = midpoint of BC
given D = foot of A on BC
given X = meet of AM and AD
claim |XA| = 0
""",
    # made for the attack
    """
title line through made points that coincide
given triangle ABC
given M = midpoint of BC
given D = foot of A on BC
given P on line MD
claim P on line BC
claim |PB| = |PC|
""",
    # made for the attack
    """
title euler line degenerate
given triangle ABC
given O = circumcentre of ABC
given H = orthocentre of ABC
given l = line OH
given X = meet of l and BC
claim |XB| >= 0
claim |OH| > 0
claim |OH| < 3circumradius(ABC)
claim |OH|^2 = 9circumradius(ABC)^2 - |AB|^2 - |BC|^2 - |CA|^2
""",
    # Euler: OI^2 = R^2 - 2Rr
    """
title euler triangle formula
given triangle ABC
given O = circumcentre of ABC
given I = incentre of ABC
claim |OI|^2 = circumradius(ABC)^2 - 2circumradius(ABC)*inradius(ABC)
claim circumradius(ABC) >= 2inradius(ABC)
claim circumradius(ABC) > 2inradius(ABC)
claim |OI| > 0
claim |OI| < circumradius(ABC)
""",
    # made for the attack
    """
title square either P on diagonal
given square ABCD
given P on line AC
claim |PA| + |PC| = sqrt(2)*|AB|
claim |PB| = |PD|
claim |PA|^2 + |PC|^2 = 2|PB|^2
claim |PA| <= |PB|
""",
    # made for the attack
    """
title two circles
given points A, B
given k = circle with centre A through B
given m = circle with centre B through A
given X = meet of k and m
given Y = meet of k and m other than X
claim |XY| = sqrt(3)*|AB|
claim XY perpendicular to AB
claim |AX| = |AB|
""",
    # made for the attack
    """
title two circles either
given points A, B
given k = circle with centre A through B
given m = circle with centre B through A
given X = meet of k and m
given Y = meet of k and m
claim |XY| = sqrt(3)*|AB|
claim |XY| = 0
claim |XY| > |AB|
""",
    # made for the attack
    """
title radii 1 2
given points O, Q
given |OQ| = 2
given k = circle with centre O and radius 1
given m = circle with centre Q and radius 1
given X = meet of k and m
claim |XO| = |XQ|
claim X between O and Q
claim |XO| = 1
""",
    # made for the attack
    """
title radii too far
given points O, Q
given |OQ| = 3
given k = circle with centre O and radius 1
given m = circle with centre Q and radius 1
given X = meet of k and m
claim |XO| = |XQ|
""",
    # made for the attack
    """
title scale variable
given points O, Q
given k = circle with centre O and radius 1
given m = circle with centre Q and radius 2
given X = meet of k and m
claim |OQ| <= 3
claim |OQ| < 3
claim |OQ| >= 1
claim XO perpendicular to XQ
""",
    # made for the attack
    """
title sum of sqrt
given points A, B
given |AB| = 1
given C on segment AB
claim sqrt(|AC|) + sqrt(|CB|) >= 1
claim sqrt(|AC|) + sqrt(|CB|) <= sqrt(2)
claim sqrt(|AC|) + sqrt(|CB|) > 1
claim sqrt(|AC| - |CB|) >= 0
""",
    # made for the attack
    """
title abs in claims
given points A, B
given P on line AB
claim abs(|PA| - |PB|) <= |AB|
claim abs(|PA| - |PB|) = |AB|
claim abs(abs(|PA| - |PB|) - |AB|) = |AB| - abs(|PA| - |PB|)
claim |PA|*|PB| <= |AB|^2/4
""",
    # made for the attack
    """
title foot on coincident
given square ABCD
given P on segment AC
given X = foot of P on AB
given Y = foot of P on BC
claim |XY| = |PB|
claim |PX| + |PY| = |AB|
claim |XY| = |DP|
claim XY perpendicular to DP
""",
    # Euclid III.36
    """
title power of point
given points O, A
given k = circle with centre O through A
given point P
given B on circle k
given X = meet of PB and k other than B
claim |PB|*|PX| = abs(|PO|^2 - |OA|^2)
claim |PB|*|PX| = |PO|^2 - |OA|^2
""",
    # Thales
    """
title Thales
given points A, B
given k = circle with diameter AB
given P on circle k
claim |PA|^2 + |PB|^2 = |AB|^2
claim PA perpendicular to PB
claim |PA| + |PB| <= sqrt(2)*|AB|
claim |PA| + |PB| >= |AB|
claim |PA| + |PB| > |AB|
""",
    # made for the attack
    """
title angle right
given points A, B
given k = circle with diameter AB
given P on circle k
claim angle APB right
claim cos(PAB) = |PA|/|AB|
claim sin(PAB) = |PB|/|AB|
""",
    # made for the attack
    """
title bisector point
given triangle ABC
given P on bisector of angle BAC
claim dist(P, AB) = dist(P, AC)
claim dist(P, AB) > 0
""",
    # made for the attack
    """
title line on tangent twice
given triangle ABC
given k = circle ABC
given l = tangent to k at A
given m = tangent to k at B
given T = meet of l and m
claim |TA| = |TB|
claim |TA| > |AB|
claim T and C on opposite sides of AB
""",
    # made for the attack
    """
title named reuse
given triangle XYZ
given W' = midpoint of YZ
given W2 = reflection of X in W'
claim |W2Y| = |XZ|
claim |XW2| >= |XY|
claim |XW'| = |YW'|
""",
    # made for the attack
    """
title late triangle
given points A, B
given point C
given triangle ABC
given |AC| = |BC|
claim angle CAB acute
claim |AC| > |AB|/2
""",
    # made for the attack
    """
title square on given points
given points A, B
given square ABCD
given point P
given square ABPQ
claim |PC| = 0
claim |PD| = |AC|
claim |PC| = 2|AB|
""",
    # made for the attack
    """
title square on four points
given points A, B, C
given square ABCD
claim angle ABC right
claim |AB| = |BC|
""",
    # made for the attack
    """
title equilateral on two
given points A, B
given equilateral triangle ABC
given equilateral triangle ABD
claim |CD| = 0
claim |CD| = sqrt(3)*|AB|
""",
    # made for the attack
    """
title isosceles in right
given right triangle ABC with right angle at C
given isosceles triangle ABC with apex C
claim |AB| = sqrt(2)*|AC|
""",
    # made for the attack
    """
title isosceles at two apices
given isosceles triangle ABC with apex C
given isosceles triangle ABC with apex A
claim |AB| = |AC|
claim |AB| < |AC|
""",
    # made for the attack
    """
title right angle twice empty
given right triangle ABC with right angle at C
given right triangle ABC with right angle at A
claim |AB| = |AC|
""",
    # made for the attack
    """
title parallel chord
given triangle ABC
given P on segment AB
given l = parallel to BC through P
given Q = meet of l and AC
claim |PQ|/|BC| = |AP|/|AB|
claim |PQ| < |BC|
claim |AQ|*|AB| = |AP|*|AC|
""",
    # Menelaus
    """
title line collinear hypothesis Menelaus
given triangle ABC
given D on line BC
given E on line CA
given F on line AB
given D, E, F collinear
claim |BD|*|CE|*|AF| = |DC|*|EA|*|FB|
""",
    # made for the attack
    """
title Ceva
given triangle ABC
given point P
given D = meet of AP and BC
given E = meet of BP and CA
given F = meet of CP and AB
claim |BD|*|CE|*|AF| = |DC|*|EA|*|FB|
""",
    # made for the attack
    """
title provided thin
given triangle ABC
provided |AB| = |AC|
claim median(ABC, A) = altitude(ABC, A)
claim |BC| < 2|AB|
""",
    # made for the attack
    """
title provided contradictory
given triangle ABC
provided ABC acute
provided angle BAC obtuse
claim |AB| = |AC|
""",
    # made for the attack
    """
title provided not strict
given points A, B, C
provided not C between A and B
claim |CA| + |CB| > |AB|
claim |CA| + |CB| >= |AB|
""",
    # made for the attack
    """
title A B C distinct collinear allowed
given points A, B, C
claim |CA| + |CB| > |AB|
claim |CA| + |CB| = |AB|
claim |AB| > 0
claim area(ABC) > 0
""",
    # Apollonius
    """
title median inequality
given points A, B, C
given M = midpoint of BC
claim |AM| <= (|AB| + |AC|)/2
claim |AM| < (|AB| + |AC|)/2
claim |AM| >= abs(|AB| - |AC|)/2
""",
    # Wallace's line
    """
title simson
given triangle ABC
given P on circle ABC
given D = foot of P on BC
given E = foot of P on CA
given F = foot of P on AB
claim D, E, F collinear
claim |DE| + |EF| = |DF|
claim |DE| = |AB|*|PC|/(2circumradius(ABC))
""",
    # Feuerbach's circle
    """
title nine point
given triangle ABC
given N = nine-point centre of ABC
given M = midpoint of BC
given D = foot of A on BC
claim |NM| = |ND|
claim |NM| = circumradius(ABC)/2
claim |NA| = |NM|
""",
    # made for the attack
    """
title excircle tangent
given triangle ABC
given k = excircle of ABC opposite A
given J = centre of k
given T = foot of J on AB
claim |AT| = perimeter(ABC)/2
claim |AT| > |AB|
claim T on circle k
""",
    # made for the attack
    """
title orthic in right
given triangle ABC
given D = foot of A on BC
given E = foot of B on CA
given H = meet of AD and BE
claim |HA|*|HD| = |HB|*|HE|
claim |DE| = |AB|*cos(ACB)
claim |DE| = |AB|*abs(cos(ACB))
claim D, E distinct
""",
    # made for the attack
    """
title sqrt zero hypothesis
given points A, B, C
given |AC|^2 + |BC|^2 = |AB|^2/2
claim |CA| = |CB|
claim C between A and B
""",
    # made for the attack
    """
title sum of squares empty
given points A, B, C
given |AC|^2 + |BC|^2 = |AB|^2/3
claim |CA| = |CB|
""",
    # made for the attack
    """
title abs product
given points A, B
given P on line AB
given |PA|*|PB| = |AB|^2/4
claim |PA| = |PB|
claim P between A and B
""",
    # made for the attack
    """
title Q quotient hypothesis
given points A, B
given P on line AB
given |PA|/|PB| = 2
claim P between A and B
claim |PA| = 2/3|AB|
claim |PA| = 2|AB|
""",
    # made for the attack
    """
title excentre sides swapped
given triangle ABC
given J = excentre of ABC opposite A
given K = excentre of ABC opposite B
claim C between J and K
claim |JK| = 4circumradius(ABC)*sqrt((1 + cos(ACB))/2)
claim |JB| < |JC|
claim |JA| < |KB|
""",
    # made for the attack
    """
title foot may be vertex
given triangle ABC
given D = foot of A on BC
given E = foot of D on AB
claim |DE|*|AB| = |AD|*|BD|
claim |DB| + |DC| = |BC|
claim E between A and B
claim not E between A and B
""",
    # made for the attack
    """
title D = B possible, angle undefined
given triangle ABC
given D = foot of A on BC
claim angle ADB right
claim sin(ABD)*|AB| = |AD|
claim cos(ABD)*|AB| = |BD|
claim |BD| = |AB|*cos(ABC)
""",
    # made for the attack
    """
title mirrored point equals itself
given points A, B, C
given A' = reflection of A in BC
claim |AA'| = 2dist(A, BC)
claim |A'B| = |AB|
claim A, A' distinct
claim AA' perpendicular to BC
""",
    # made for the attack
    """
title negative numbers
given points A, B
given P on segment AB
claim |PA| - |PB| >= -|AB|
claim |PA| - |PB| = |AB|
claim 2|PA| - 1/3|PB| < |AB|
""",
    # made for the attack
    """
title ray bound
given triangle ABC
given P on ray AB
given |AP| = |AC|
claim |PB| = abs(|AB| - |AC|)
claim |PB| = |AB| - |AC|
claim |PC| <= |PB| + |BC|
claim P on segment AB
""",
    # made for the attack
    """
title ray twice
given triangle ABC
given P on ray AB
given P on ray BA
claim |PA| + |PB| = |AB|
claim P between A and B
""",
    # made for the attack
    """
title ray and circle
given triangle ABC
given P on ray AB
given P on circle ABC
claim |PA|*|PB| = 0
claim |PB| = 0
""",
    # made for the attack
    """
title concentric
given points O, A, B
given k = circle with centre O through A
given m = circle with centre O through B
given X = meet of k and m
claim |XA| = 0
""",
    # made for the attack
    """
title two tangents
given points O, A, B
given k = circle with centre O through A
given B on circle k
given l = tangent to k at A
given m = tangent to k at B
given T = meet of l and m
claim |TA| = |TB|
claim |TO|*|AB| = 2|OA|*|TA|
claim |TA| = |OA|
""",
    # made for the attack
    """
title cyc quad from triangle
given triangle ABC
given P on circle ABC
claim |PA|*|BC| = |PB|*|CA| + |PC|*|AB|
claim |PA|*|BC| <= |PB|*|CA| + |PC|*|AB|
claim |PA|*|BC| + |PB|*|CA| > |PC|*|AB|
""",
    # made for the attack
    """
title isosceles arc
given isosceles triangle ABC with apex A
given P on circle ABC
claim |PB| + |PC| = 2|PA|*cos(ABC)
claim |PB| + |PC| >= 2|PA|*cos(ABC)
claim abs(|PB| - |PC|) = 2|PA|*cos(ABC)
""",
    # made for the attack
    """
title square and circle
given square ABCD
given P on circle ABC
claim |PA| + |PC| = sqrt(2)*|PB|
claim |PA| + |PC| = sqrt(2)*|PD|
claim (|PA| + |PC|)/|PD| = 1 + sqrt(2)
claim |PA|^2 + |PB|^2 + |PC|^2 + |PD|^2 = 4|AB|^2
claim |PA|^4 + |PB|^4 + |PC|^4 + |PD|^4 = 6|AB|^4
""",
    # made for the attack
    """
title rect diag
given rectangle ABCD
given X = meet of AC and BD
claim |XA| = |XB|
claim |AC| > |AB|
claim |AB| = |BC|
claim perimeter(ABCD) <= 2sqrt(2)*|AC|
claim area(ABCD) <= |AC|^2/2
claim area(ABCD) < |AC|^2/2
""",
    # made for the attack
    """
title Erdos like
given triangle ABC
claim median(ABC, A) + median(ABC, B) + median(ABC, C) < perimeter(ABC)
claim median(ABC, A)^2 + median(ABC, B)^2 + median(ABC, C)^2 = 3/4*(|AB|^2 + |BC|^2 + |CA|^2)
claim median(ABC, A) > altitude(ABC, A)
claim median(ABC, A) < median(ABC, B)
""",
    # medians of equal length
    """
title hypothesis equal medians
given triangle ABC
given median(ABC, A) = median(ABC, B)
claim |AC| = |BC|
""",
    # made for the attack
    """
title cos sum
given triangle ABC
claim cos(BAC) + cos(ABC) + cos(ACB) <= 3/2
claim cos(BAC) + cos(ABC) + cos(ACB) > 1
claim cos(BAC) + cos(ABC) + cos(ACB) = 1 + inradius(ABC)/circumradius(ABC)
claim sin(BAC) > cos(BAC)
""",
    # made for the attack
    """
title r over collinear
given points A, B, C
claim circumradius(ABC) >= 2inradius(ABC)
claim inradius(ABC) >= 0
claim inradius(ABC) > 0
claim exradius(ABC, A) > 0
claim 1/dist(A, BC) > 0
""",
    # made for the attack
    """
title const radius zero
given point O
given k = circle with centre O and radius 1
given P on circle k
given Q on circle k
given R on circle k
claim |PQ| <= 2
claim |PQ| < 2
claim |PQ| + |QR| >= |PR|
claim |PQ| + |QR| > |PR|
""",
    # made for the attack
    """
title radius of measure
given points A, B
given C on line AB
given k = circle with centre A and radius |AC|
claim C on circle k
""",
    # made for the attack
    """
title meet line circle misses
given points A, B
given point C
given k = circle with centre C and radius |AB|/2
given X = meet of AB and k
claim dist(C, AB) <= |AB|/2
claim dist(C, AB) < |AB|/2
claim |XC| = |AB|/2
claim X on segment AB
""",
    # made for the attack
    """
title Q made twice
given triangle ABC
given X = meet of AB and BC
given Y = meet of AB and circle ABC other than A
claim |XB| = 0
claim |YB| = 0
claim |XY| = 0
""",
    # Euclid I.20 and I.21, Bottema et al. chapters 12 and 15: sums of distances
    """
title point inside sums
given triangle ABC
given P inside triangle ABC
claim |PA| + |PB| < |CA| + |CB|
claim |PA| + |PB| + |PC| < perimeter(ABC)
claim |PA| + |PB| + |PC| > perimeter(ABC)/2
claim |PA| + |PB| < |CA|
""",
    """
title convex diagonals
given quadrilateral ABCD
provided ABCD convex
claim |AC| + |BD| > |AB| + |CD|
claim |AC| + |BD| < |AB| + |BC| + |CD| + |DA|
claim |AC| > |AB|
""",
    """
title broken line of four
given points A, B, C, D
claim |AD| <= |AB| + |BC| + |CD|
claim |AD| < |AB| + |BC| + |CD|
""",
    # Ptolemy's inequality; the area by the diagonals
    """
title quadrilateral products
given quadrilateral ABCD
claim |AC|*|BD| < |AB|*|CD| + |BC|*|DA|
claim 2area(ABCD) <= |AC|*|BD|
""",
    # half-angle and incircle frames
    """
title half angles
given cyclic quadrilateral ABCD
claim |AC| + |BD| > |AB| + |CD|
claim 4area(ABCD)^2 <= (|AB|*|CD| + |BC|*|DA|)^2
""",
    """
title circle through a triangle
given triangle ABC
given P on circle ABC
claim |PA| <= |PB| + |PC|
claim |PA|*|BC| <= |PB|*|CA| + |PC|*|AB|
""",
    """
title reaches
given point A
given point B
given point C
given A, B, C collinear
claim |AB| <= |AC| + |CB|
claim |AB| = |AC| + |CB|
""",
)
