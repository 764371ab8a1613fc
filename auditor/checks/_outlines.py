"""Declared outlines: points that draw an arc with chords are read as the arc."""

from __future__ import annotations

import math
from dataclasses import dataclass

from auditor.declared.model import Point

ON_CIRCLE = 0.01  # mm; drawings give a hundredth
LEAST_POINTS = 4  # on one circle: three always are
TANGENT = 3.0  # deg between an arc of three points and the side it joins
UNEVEN = 2.0  # longest chord over shortest of an arc of three points
SHARPEST = 60.0  # deg of arc between two neighbouring points; coarser is a corner, not an arc
FINE = 2.0  # deg between the points put in
LARGEST = 1e4  # mm of radius; flatter is straight


@dataclass(frozen=True, slots=True)
class _Circle:
    z: float
    r: float
    radius: float

    def holds(self, point: Point) -> bool:
        return abs(math.hypot(point.z - self.z, point.r - self.r) - self.radius) <= ON_CIRCLE

    def angle(self, point: Point) -> float:
        return math.atan2(point.r - self.r, point.z - self.z)

    def step(self, begin: Point, end: Point) -> float:
        """Signed angle, rad, from one point to the next the short way round."""
        return math.remainder(self.angle(end) - self.angle(begin), 2.0 * math.pi)


def with_round_arcs(outline: tuple[Point, ...]) -> tuple[Point, ...]:
    """The outline with further points on every arc that it draws with chords.

    Example
    -------
    >>> quarter = [Point(-4.0 * math.sin(a), 10.0 - 4.0 * math.cos(a)) for a in (0.0, 0.5236, 1.0472, 1.5708)]
    >>> round_ = with_round_arcs(tuple(quarter))
    >>> len(round_) > 40
    True
    >>> max(abs(math.hypot(p.z, p.r - 10.0) - 4.0) for p in round_) < 1e-3
    True
    """
    points: list[Point] = [outline[0]]
    at = 0
    while at < len(outline) - 1:
        circle, last = _arc_from(outline, at)
        for begin, end in zip(outline[at:last], outline[at + 1 : last + 1], strict=True):
            points += [*(_between(circle, begin, end) if circle is not None else ()), end]
        at = last
    return tuple(points)


def _arc_from(outline: tuple[Point, ...], at: int) -> tuple[_Circle | None, int]:
    """The arc that begins at a point and the point it ends at; None and the next point for a straight side."""
    if at + 2 >= len(outline):
        return None, at + 1
    circle = _circle(*outline[at : at + 3])
    if circle is None:
        return None, at + 1
    sense = circle.step(outline[at], outline[at + 1])
    last = at
    while last + 1 < len(outline) and circle.holds(outline[last + 1]):
        step = circle.step(outline[last], outline[last + 1])
        if step * sense <= 0.0 or abs(step) > math.radians(SHARPEST):
            break
        last += 1
    enough = last - at + 1 >= LEAST_POINTS or (last - at == 2 and _joins(outline, at, last, circle, sense))
    return (circle, last) if enough else (None, at + 1)


def _joins(outline: tuple[Point, ...], first: int, last: int, circle: _Circle, sense: float) -> bool:
    """Whether the arc runs on tangentially into the side before or behind it."""
    chords = [math.dist(outline[number], outline[number + 1]) for number in range(first, last)]
    if max(chords) > UNEVEN * min(chords):
        return False
    turn = math.copysign(math.pi / 2.0, sense)
    if first > 0:
        before = math.atan2(outline[first].r - outline[first - 1].r, outline[first].z - outline[first - 1].z)
        if _close(before, circle.angle(outline[first]) + turn):
            return True
    if last + 1 < len(outline):
        behind = math.atan2(outline[last + 1].r - outline[last].r, outline[last + 1].z - outline[last].z)
        return _close(behind, circle.angle(outline[last]) + turn)
    return False


def _close(one: float, other: float) -> bool:
    return abs(math.remainder(one - other, 2.0 * math.pi)) < math.radians(TANGENT)


def _circle(first: Point, second: Point, third: Point) -> _Circle | None:
    """The circle through three points; None where they are nearly in line."""
    az, ar = second.z - first.z, second.r - first.r
    bz, br = third.z - first.z, third.r - first.r
    cross = 2.0 * (az * br - ar * bz)
    if cross == 0.0:
        return None
    a, b = az * az + ar * ar, bz * bz + br * br
    z, r = (br * a - ar * b) / cross, (az * b - bz * a) / cross
    radius = math.hypot(z, r)
    return _Circle(first.z + z, first.r + r, radius) if radius < LARGEST else None


def _between(circle: _Circle, begin: Point, end: Point) -> list[Point]:
    """Points on the arc between two of its points, both left out."""
    step, start = circle.step(begin, end), circle.angle(begin)
    count = math.ceil(abs(math.degrees(step)) / FINE)
    angles = (start + step * number / count for number in range(1, count))
    return [Point(circle.z + circle.radius * math.cos(a), circle.r + circle.radius * math.sin(a)) for a in angles]
