"""Straight lines and circles of the half-section, and where they cross."""

from __future__ import annotations

import math
from dataclasses import dataclass

from auditor.declared.model import Point

CLOSE = 1e-9  # mm; radii or distances nearer than this are one


@dataclass(frozen=True, slots=True)
class Line:
    """An endless straight line: a point of it and its unit direction (z, r)."""

    point: Point
    direction: Point


@dataclass(frozen=True, slots=True)
class Circle:
    """A whole circle."""

    centre: Point
    radius: float


def along(point: Point, direction: Point, distance: float) -> Point:
    """The point ``distance`` further along a unit direction."""
    return Point(point.z + distance * direction.z, point.r + distance * direction.r)


def dot(one: Point, two: Point) -> float:
    """Scalar product of two directions."""
    return one.z * two.z + one.r * two.r


def cross(one: Point, two: Point) -> float:
    """Positive when ``two`` is turned counter-clockwise against ``one`` (Z to the right, X up)."""
    return one.z * two.r - one.r * two.z


def between(tail: Point, head: Point) -> Point:
    """Vector from ``tail`` to ``head``."""
    return Point(head.z - tail.z, head.r - tail.r)


def unit(vector: Point) -> Point:
    """The vector with length one; its length must not be zero."""
    length = math.hypot(*vector)
    return Point(vector.z / length, vector.r / length)


def left_of(direction: Point) -> Point:
    """The direction turned by 90 degrees counter-clockwise."""
    return Point(-direction.r, direction.z)


def sweep(centre: Point, start: Point, end: Point, clockwise: bool) -> float:
    """Angle in radians, 0 <= angle < 2 pi, of the arc from ``start`` to ``end`` in the given sense."""
    first = math.atan2(start.r - centre.r, start.z - centre.z)
    last = math.atan2(end.r - centre.r, end.z - centre.z)
    return ((first - last) if clockwise else (last - first)) % math.tau


def crossings(one: Line | Circle, two: Line | Circle) -> list[Point]:
    """Common points of two endless lines or whole circles; none for parallels.

    Examples
    --------
    >>> crossings(Line(Point(0, 1), Point(1, 0)), Circle(Point(0, 0), 1.0))
    [Point(z=0, r=1)]
    """
    if isinstance(one, Line):
        return _line_line(one, two) if isinstance(two, Line) else _line_circle(one, two)
    return _line_circle(two, one) if isinstance(two, Line) else _circle_circle(one, two)


def _line_line(one: Line, two: Line) -> list[Point]:
    turn = cross(one.direction, two.direction)
    if abs(turn) < CLOSE:
        return []
    return [along(one.point, one.direction, cross(between(one.point, two.point), two.direction) / turn)]


def _line_circle(line: Line, circle: Circle) -> list[Point]:
    to_centre = between(line.point, circle.centre)
    foot = along(line.point, line.direction, dot(to_centre, line.direction))
    distance = abs(cross(line.direction, to_centre))
    if distance > circle.radius + CLOSE:
        return []
    half = math.sqrt(max(0.0, circle.radius**2 - distance**2))
    if half == 0.0:
        return [foot]
    return [along(foot, line.direction, -half), along(foot, line.direction, half)]


def _circle_circle(one: Circle, two: Circle) -> list[Point]:
    """Crossings of two circles, by way of their common chord."""
    apart = math.dist(one.centre, two.centre)
    if apart < CLOSE or apart > one.radius + two.radius + CLOSE or apart < abs(one.radius - two.radius) - CLOSE:
        return []
    axis = unit(between(one.centre, two.centre))
    to_chord = (apart**2 + one.radius**2 - two.radius**2) / (2 * apart)
    half = math.sqrt(max(0.0, one.radius**2 - to_chord**2))
    foot = along(one.centre, axis, to_chord)
    return [along(foot, left_of(axis), -half), along(foot, left_of(axis), half)]
