"""The nose against a contour: its centre path along an element and round a corner."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Literal

from auditor.declared.model import Point
from auditor.interpret.cycles.call import Stroke
from auditor.interpret.plane import Circle, Line, along, between, cross, crossings, dot, left_of, unit

Side = Literal["left", "right"]
SMALL = 1e-6  # mm; shorter motions are none
SAME_DIRECTION = 1e-7  # sine of the angle up to which a joint is tangent


@dataclass(frozen=True, slots=True)
class Nose:
    """The rounded nose on its side of the contour."""

    radius: float
    side: Side
    tip: Point  # nose centre to imaginary tip, mm
    corner: Literal["line", "arc"]

    def normal(self, tangent: Point) -> Point:
        """Unit direction from the contour to the nose centre."""
        left = left_of(tangent)
        return left if self.side == "left" else Point(-left.z, -left.r)

    def centre(self, point: Point, tangent: Point) -> Point:
        """Nose centre that touches the contour at ``point``."""
        return along(point, self.normal(tangent), self.radius)


@dataclass(frozen=True, slots=True)
class Element:
    """A contour stroke with its start point and its place in the run."""

    stroke: Stroke
    start: Point
    blind: bool = False  # the control could not look ahead to it

    @property
    def end(self) -> Point:
        """Programmed end point."""
        return self.stroke.end

    @property
    def radius(self) -> float:
        """Radius of the programmed arc."""
        assert self.stroke.centre is not None
        return math.dist(self.stroke.centre, self.stroke.end)

    def tangent(self, point: Point) -> Point:
        """Direction of motion at the start or end point."""
        if self.stroke.centre is None:
            return unit(between(self.start, self.end))
        outwards = unit(between(self.stroke.centre, point))
        left = left_of(outwards)
        return Point(-left.z, -left.r) if self.stroke.clockwise else left

    def offset_radius(self, nose: Nose) -> float:
        """Radius of the nose centre's arc; zero or less when the nose does not fit in."""
        tool_outside = (nose.side == "left") == bool(self.stroke.clockwise)
        return self.radius + nose.radius if tool_outside else self.radius - nose.radius

    def carrier(self, nose: Nose) -> Line | Circle:
        """The endless line or circle on which the nose centre runs."""
        if self.stroke.centre is None:
            direction = self.tangent(self.start)
            return Line(nose.centre(self.start, direction), direction)
        return Circle(self.stroke.centre, self.offset_radius(nose))


@dataclass(frozen=True, slots=True)
class Joint:
    """How the centre path goes from one element to the next: end of the first, links, start of the second."""

    points: tuple[Point, ...]
    arc_centre: Point | None = None  # the single link is an arc round the corner


def outside(element: Element, following: Element, nose: Nose) -> bool:
    """Whether the contour turns away from the tool."""
    before, after = element.tangent(element.end), following.tangent(following.start)
    turn = cross(before, after)
    if abs(turn) < SAME_DIRECTION:
        return dot(before, after) < 0
    return (turn > 0) == (nose.side == "right")


def joint_of(element: Element, following: Element, nose: Nose) -> Joint:
    """How the nose goes from an element to the one behind it."""
    before, after = element.tangent(element.end), following.tangent(following.start)
    square_end = nose.centre(element.end, before)
    square_start = nose.centre(following.start, after)
    if following.blind:
        return Joint((square_end, square_start) if following.stroke.centre is not None else (square_end,))
    if math.dist(square_end, square_start) < SMALL:
        return Joint((square_end,))
    if math.dist(element.end, following.start) < SMALL and outside(element, following, nose):
        return _outside_joint(element, following, nose)
    found = crossings(element.carrier(nose), following.carrier(nose))
    if not found:  # nowhere to turn: the fault is told where the neighbours were dropped
        return Joint((square_end, square_start))
    return Joint((min(found, key=lambda point: math.dist(point, element.end)),))


def _outside_joint(element: Element, following: Element, nose: Nose) -> Joint:
    corner = element.end
    before, after = element.tangent(corner), following.tangent(corner)
    leave, arrive = nose.centre(corner, before), nose.centre(corner, after)
    if dot(before, after) < -SAME_DIRECTION:
        if nose.corner == "arc":
            return Joint((leave, arrive), arc_centre=corner)
        points = [along(leave, before, nose.radius), along(arrive, after, -nose.radius)]
    else:
        for point in crossings(element.carrier(nose), following.carrier(nose)):
            ahead = dot(between(leave, point), before) > 0 > dot(between(arrive, point), after)
            if ahead and math.dist(point, corner) < 2 * nose.radius:
                return Joint((point,))
        points = crossings(Line(leave, before), Line(arrive, after))
    # an arc is not extended itself: straight pieces lead from its end and to its start
    if element.stroke.centre is not None:
        points.insert(0, leave)
    if following.stroke.centre is not None:
        points.append(arrive)
    return Joint(tuple(points))
