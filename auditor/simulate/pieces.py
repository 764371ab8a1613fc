"""A move cut into straight pieces: one for a straight move, chords for an arc."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass
from itertools import pairwise

from auditor.declared.model import Point
from auditor.interpret.moves import Move

CHORD_SAGITTA = 0.001  # mm; half of it changes the peak force by a per cent at most
SHORTEST = 1e-9  # mm


@dataclass(frozen=True, slots=True)
class Piece:
    """A straight stretch of a move: from ``start`` along the unit ``direction`` for ``length`` mm."""

    start: Point
    direction: tuple[float, float]
    length: float
    offset: float  # mm of path from the start of the move

    @property
    def step(self) -> tuple[float, float]:
        """The displacement (dz, dr)."""
        return self.direction[0] * self.length, self.direction[1] * self.length


def pieces(move: Move) -> Iterator[Piece]:
    """The straight pieces of a move whose two ends are known."""
    start, end = move.start, move.end
    if start is None or end is None:
        return
    points = [start, *_arc_points(move, start, end), end] if move.centre is not None else [start, end]
    offset = 0.0
    for begin, finish in pairwise(points):
        piece = straight(begin, finish, offset)
        if piece is not None:
            offset += piece.length
            yield piece


def straight(begin: Point | None, finish: Point | None, offset: float = 0.0) -> Piece | None:
    """A straight piece between two points; None when they coincide or one is not known."""
    if begin is None or finish is None:
        return None
    dz, dr = finish.z - begin.z, finish.r - begin.r
    length = math.hypot(dz, dr)
    if length < SHORTEST:
        return None
    # Rounded so that parallel pieces of a program share one leading edge.
    return Piece(begin, (round(dz / length, 12), round(dr / length, 12)), length, offset)


def arc_sweep(move: Move) -> float:
    """Angle an arc runs through, rad: positive counter-clockwise."""
    start, end, centre = move.start, move.end, move.centre
    if start is None or end is None or centre is None:
        return 0.0
    begin = math.atan2(start.r - centre.r, start.z - centre.z)
    finish = math.atan2(end.r - centre.r, end.z - centre.z)
    if move.clockwise:
        return -((begin - finish) % math.tau or math.tau)
    return (finish - begin) % math.tau or math.tau


def path_length(move: Move) -> float:
    """True length of a move's path in the (z, r) plane, mm; 0 when an end is unknown."""
    start, end, centre = move.start, move.end, move.centre
    if start is None or end is None:
        return 0.0
    if centre is None:
        return math.hypot(end.z - start.z, end.r - start.r)
    return abs(arc_sweep(move)) * math.hypot(start.z - centre.z, start.r - centre.r)


def _arc_points(move: Move, start: Point, end: Point) -> list[Point]:
    """Inner nodes of the chorded arc; a radius that differs between the ends is blended along the way."""
    centre = move.centre
    if centre is None:
        return []
    first = math.hypot(start.z - centre.z, start.r - centre.r)
    last = math.hypot(end.z - centre.z, end.r - centre.r)
    sweep = arc_sweep(move)
    largest = max(first, last)
    if largest <= CHORD_SAGITTA:
        return []
    step = 2.0 * math.acos(1.0 - CHORD_SAGITTA / largest)
    count = max(1, math.ceil(abs(sweep) / step))
    begin = math.atan2(start.r - centre.r, start.z - centre.z)
    nodes = []
    for index in range(1, count):
        share = index / count
        radius = first + (last - first) * share
        angle = begin + sweep * share
        nodes.append(Point(centre.z + radius * math.cos(angle), centre.r + radius * math.sin(angle)))
    return nodes
