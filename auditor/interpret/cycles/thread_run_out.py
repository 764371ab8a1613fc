"""The end of a thread stroke: straight to the end point, or lifting out of the work before it."""

from __future__ import annotations

import math
from dataclasses import dataclass

from auditor.declared.model import Point


@dataclass(frozen=True, slots=True)
class RunOut:
    """The lift at the end of a thread: its length along Z (mm) and its angle to Z (degrees)."""

    length: float = 0.0
    angle: float = 45.0


def thread_points(start: Point, end: Point, clear_r: float, run_out: RunOut) -> tuple[Point, ...]:
    """End points of the synchronous strokes from ``start`` to the programmed ``end``.

    The lift begins its own length before the end, on the line of the thread, and goes towards
    ``clear_r`` (the radius of the start point of the cycle), but never past it.

    Examples
    --------
    >>> thread_points(Point(6.0, 9.6), Point(-25.0, 9.6), 13.0, RunOut(1.5))
    (Point(z=-23.5, r=9.6), Point(z=-25.0, r=11.1))
    """
    travel = end.z - start.z
    length = min(run_out.length, abs(travel))
    if length <= 0.0:
        return (end,)
    share = 1.0 - length / abs(travel)
    lift_from = Point(end.z - math.copysign(length, travel), start.r + share * (end.r - start.r))
    rise = length * math.tan(math.radians(run_out.angle))
    room = clear_r - lift_from.r
    lifted = clear_r if rise >= abs(room) else lift_from.r + math.copysign(rise, room)
    return lift_from, Point(end.z, lifted)
