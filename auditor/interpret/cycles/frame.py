"""One frame for all roughing: cuts run *along*, depth is taken off the *height*.

Turning and facing, outside and inside, towards the chuck and away from it differ by an exchange of the
axes and by signs only.
"""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from typing import NamedTuple

from auditor.declared.model import Point
from auditor.interpret.cycles.call import Stroke
from auditor.interpret.moves import Kind
from auditor.interpret.plane import sweep

SAME = 1e-7  # mm


class Spot(NamedTuple):
    """A point in the frame: rising ``along`` the cut, ``height`` from the finished side to the start."""

    along: float
    height: float


@dataclass(frozen=True, slots=True)
class Frame:
    """How the half-section lies in the frame."""

    facing: bool  # cuts along X, depth along Z
    cut: int  # sense of the cut on its axis
    out: int  # sense from the part to the start point on the depth axis

    def spot(self, point: Point) -> Spot:
        """A point of the half-section in the frame."""
        along, height = (point.r, point.z) if self.facing else (point.z, point.r)
        return Spot(self.cut * along, self.out * height)

    def point(self, spot: Spot) -> Point:
        """A point of the frame in the half-section."""
        along, height = self.cut * spot.along, self.out * spot.height
        return Point(height, along) if self.facing else Point(along, height)

    def clockwise(self, sense: bool | None) -> bool:
        """The sense of an arc on the other side of the exchange; works both ways."""
        mirrored = (self.cut * self.out < 0) != self.facing
        return bool(sense) != mirrored


@dataclass(frozen=True, slots=True)
class Piece:
    """A stretch of the profile in the frame that neither turns along nor in height."""

    start: Spot
    end: Spot
    centre: Spot | None = None
    clockwise: bool = False

    def along_at(self, height: float) -> float:
        """Where the piece has the given height, which must lie between its ends."""
        rise = self.end.height - self.start.height
        if self.centre is None:
            share = (height - self.start.height) / rise
            return self.start.along + share * (self.end.along - self.start.along)
        reach = math.sqrt(max(0.0, math.dist(self.centre, self.end) ** 2 - (height - self.centre.height) ** 2))
        middle = (self.start.along + self.end.along) / 2
        found = self.centre.along + math.copysign(reach, middle - self.centre.along)
        low, high = sorted((self.start.along, self.end.along))
        return min(max(found, low), high)

    def stroke(self, frame: Frame, end: Spot) -> Stroke:
        """A feed stroke along the piece up to ``end``."""
        if self.centre is None:
            return Stroke(Kind.FEED, frame.point(end))
        return Stroke(
            Kind.ARC, frame.point(end), centre=frame.point(self.centre), clockwise=frame.clockwise(self.clockwise)
        )


def pieces_of(
    frame: Frame, start: Point, strokes: Sequence[Stroke], lines: Sequence[int | None]
) -> tuple[tuple[Piece, ...], tuple[int | None, ...]]:
    """The strokes in the frame, arcs cut at their quadrants, and the source line of each piece."""
    pieces: list[Piece] = []
    sources: list[int | None] = []
    here = frame.spot(start)
    for stroke, line in zip(strokes, lines, strict=True):
        end = frame.spot(stroke.end)
        if stroke.centre is None:
            found = [Piece(here, end)] if math.dist(here, end) > SAME else []
        else:
            found = list(_quadrants(here, end, frame.spot(stroke.centre), frame.clockwise(stroke.clockwise)))
        pieces += found
        sources += [line] * len(found)
        here = end
    return tuple(pieces), tuple(sources)


def _quadrants(start: Spot, end: Spot, centre: Spot, clockwise: bool) -> Iterator[Piece]:
    """Parts of an arc between the points where it is level or upright."""
    total = sweep(Point(*centre), Point(*start), Point(*end), clockwise) or math.tau
    first = math.atan2(start.height - centre.height, start.along - centre.along)
    radius = math.dist(centre, end)
    quarter = math.pi / 2
    sense = -1 if clockwise else 1
    position = sense * first / quarter  # in quarter turns, rising
    here, turn = start, math.floor(position + 1e-9) + 1
    while (turn - position) * quarter < total - 1e-9:
        angle = sense * turn * quarter
        there = Spot(centre.along + radius * math.cos(angle), centre.height + radius * math.sin(angle))
        yield Piece(here, there, centre, clockwise)
        here, turn = there, turn + 1
    yield Piece(here, end, centre, clockwise)
