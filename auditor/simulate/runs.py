"""Dense point programs: neighbouring straight cuts that lie on one line within a micrometre are cut as one."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence

from auditor.declared.model import Point
from auditor.interpret.moves import Kind, Move

STRAIGHT_WITHIN = 0.001  # mm a merged point may lie off the common line
DENSE = 1.0  # mm: longer moves gain nothing by merging and are cut each for itself


class _Cone:
    """Directions from a start point whose ray passes every point so far within STRAIGHT_WITHIN."""

    def __init__(self, apex: Point, first: Point) -> None:
        self.apex = apex
        self.axis = math.atan2(first.r - apex.r, first.z - apex.z)
        self.low, self.high = -math.pi, math.pi
        self.reach = 0.0
        self.admit(first)

    def admit(self, point: Point) -> bool:
        """Take the point in if the line to it passes all earlier ones; False leaves the cone as it was."""
        dz, dr = point.z - self.apex.z, point.r - self.apex.r
        distance = math.hypot(dz, dr)
        turn = (math.atan2(dr, dz) - self.axis + math.pi) % math.tau - math.pi
        if not self.low <= turn <= self.high or distance < self.reach:
            return False
        width = math.asin(min(1.0, STRAIGHT_WITHIN / distance)) if distance > 0.0 else math.pi
        self.low, self.high = max(self.low, turn - width), min(self.high, turn + width)
        self.reach = distance
        return True


def runs(moves: Sequence[Move]) -> Iterator[tuple[Move, ...]]:
    """Moves grouped in order: a run of mergeable cuts, or a single move."""
    run: list[Move] = []
    cone: _Cone | None = None
    for move in moves:
        if run and cone is not None and _continues(run[-1], move) and cone.admit(_known(move.end)):
            run.append(move)
            continue
        if run:
            yield tuple(run)
        run = [move]
        cone = _Cone(_known(move.start), _known(move.end)) if _mergeable(move) else None
    if run:
        yield tuple(run)


def _mergeable(move: Move) -> bool:
    start, end = move.start, move.end
    if move.kind is not Kind.FEED or move.centre is not None or start is None or end is None:
        return False
    return 0.0 < math.dist(start, end) <= DENSE


def _continues(before: Move, move: Move) -> bool:
    return (
        _mergeable(move)
        and (before.tool, before.feed, before.spindle) == (move.tool, move.feed, move.spindle)
        and before.end == move.start
        and before.dwell_after == 0.0
    )


def _known(point: Point | None) -> Point:
    """A point that _mergeable has made sure of."""
    assert point is not None
    return point
