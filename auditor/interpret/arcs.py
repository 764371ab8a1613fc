"""Where the centre of an arc lies, from R or from I and K, and what can be wrong with it."""

from __future__ import annotations

import math
from dataclasses import dataclass

from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleFault

SAME = 1e-9  # mm, below it two points are one


@dataclass(frozen=True, slots=True)
class Arc:
    """A circle arc from ``start`` to ``end``; ``clockwise`` in the picture with Z right and X up."""

    start: Point
    end: Point
    centre: Point
    clockwise: bool

    @property
    def sweep(self) -> float:
        """Angle travelled, degrees, above 0 and up to 360."""
        one = math.atan2(self.start.r - self.centre.r, self.start.z - self.centre.z)
        two = math.atan2(self.end.r - self.centre.r, self.end.z - self.centre.z)
        turned = math.degrees(one - two if self.clockwise else two - one) % 360.0
        return turned if turned > 1e-6 else 360.0


def arc_by_radius(start: Point, end: Point, clockwise: bool, radius: float, tolerance: float) -> Arc:
    """The arc of radius R: up to half a circle for R > 0, beyond it for R < 0.

    Example
    -------
    >>> arc_by_radius(Point(0, 10), Point(-5, 15), False, 5.0, 0.02).centre
    Point(z=-5.0, r=10.0)
    """
    dz, dr = end.z - start.z, end.r - start.r
    chord = math.hypot(dz, dr)
    if chord < SAME:
        raise CycleFault("arc-impossible", "an arc with R cannot end where it starts", ("R",))
    if chord / 2 - abs(radius) > tolerance:
        raise CycleFault(
            "arc-impossible",
            f"R {abs(radius):g} mm cannot span the {chord:.4g} mm from start to end: at least {chord / 2:.4g} mm",
            ("R",),
        )
    height = math.sqrt(max(radius * radius - chord * chord / 4, 0.0))
    to_the_left = (not clockwise) == (radius > 0)
    side = height if to_the_left else -height
    middle = Point((start.z + end.z) / 2, (start.r + end.r) / 2)
    centre = Point(_tidy(middle.z - side * dr / chord), _tidy(middle.r + side * dz / chord))
    return Arc(start, end, centre, clockwise)


def arc_by_centre(start: Point, end: Point, clockwise: bool, centre: Point, tolerance: float) -> Arc:
    """The arc about a centre given by I and K; start and end may differ in radius by ``tolerance``."""
    one, two = math.dist(start, centre), math.dist(end, centre)
    if one < SAME:
        raise CycleFault("arc-impossible", "I and K put the centre on the start point", ("I", "K"))
    if abs(one - two) > tolerance:
        raise CycleFault("arc-ends-differ", _ends_differ(start, end, centre, one, two, tolerance), ("I", "K"))
    return Arc(start, end, _balanced(start, end, centre), clockwise)


def _tidy(value: float) -> float:
    """A coordinate without the dust of the square root."""
    return round(value, 10) + 0.0


def _ends_differ(start: Point, end: Point, centre: Point, one: float, two: float, tolerance: float) -> str:
    text = f"the arc starts at radius {one:.4g} mm and ends at {two:.4g} mm"
    for factor, hint in ((0.5, "I is a radius value, here it looks like a diameter"), (2.0, "I looks halved twice")):
        other = Point(centre.z, start.r + factor * (centre.r - start.r))
        if abs(math.dist(start, other) - math.dist(end, other)) <= tolerance:
            return f"{text}; {hint}"
    return text


def _balanced(start: Point, end: Point, centre: Point) -> Point:
    """The centre moved (within the tolerance) to where both ends have one radius."""
    dz, dr = end.z - start.z, end.r - start.r
    chord = math.hypot(dz, dr)
    if chord < SAME:
        return centre
    along = ((centre.z - (start.z + end.z) / 2) * dz + (centre.r - (start.r + end.r) / 2) * dr) / chord
    if abs(along) < SAME or abs(along) > 1.0:  # exact already, or nearly a full circle
        return centre
    return Point(centre.z - along * dz / chord, centre.r - along * dr / chord)
