"""Path of the imaginary tip under nose radius compensation (trade knowledge, from memory).

Offset each element, meet at the corners, link acute outside corners by a straight piece, then shift by r v.
"""

from __future__ import annotations

from collections.abc import Sequence
from math import hypot, sqrt

from tests.interpret.reference.steps import Piece, Step

Vector = tuple[float, float]  # z, r
TIPS: dict[int, Vector] = {
    0: (0, 0), 1: (1, 1), 2: (-1, 1), 3: (-1, -1), 4: (1, -1), 5: (1, 0), 6: (0, 1), 7: (-1, 0), 8: (0, -1), 9: (0, 0),
}  # fmt: skip


def tangent(piece: Piece, at_end: bool) -> Vector:
    """Unit direction of motion at the start or the end of an element."""
    if not piece.is_arc:
        way = (piece.z1 - piece.z0, piece.r1 - piece.r0)
    else:
        spoke = (piece.z1 - piece.cz, piece.r1 - piece.cr) if at_end else (piece.z0 - piece.cz, piece.r0 - piece.cr)
        way = (-spoke[1], spoke[0]) if piece.kind == "CCW" else (spoke[1], -spoke[0])
    length = hypot(*way)
    return way[0] / length, way[1] / length


def aside(way: Vector, side: int, radius: float) -> Vector:
    """Offset to the tool's side (+1 left of the motion, -1 right)."""
    return -way[1] * side * radius, way[0] * side * radius


def compensated(pieces: Sequence[Piece], side: int, radius: float, tip: int) -> tuple[Step, list[list[Step]]]:
    """End of the start-up move, then the tip path along each element; a cancel move may follow."""
    shift = (radius * TIPS[tip][0], radius * TIPS[tip][1])
    opening = aside(tangent(pieces[0], False), side, radius)
    start = Step("F", 2 * (pieces[0].r0 + opening[1] + shift[1]), pieces[0].z0 + opening[0] + shift[0])
    path = []
    for number, piece in enumerate(pieces):
        after = pieces[number + 1] if number + 1 < len(pieces) else None
        steps = [Step("F", 2 * (r + shift[1]), z + shift[0]) for z, r in _joint(piece, after, side, radius)]
        if piece.is_arc:
            centre = 2 * (piece.cr + shift[1]), piece.cz + shift[0]
            steps[0] = Step(piece.kind, steps[0].x, steps[0].z, *centre)
        path.append(steps)
    return start, path


def _joint(piece: Piece, after: Piece | None, side: int, radius: float) -> list[Vector]:
    """Where the centre path leaves an element: one point, or the links round an acute outside corner."""
    leaving = tangent(piece, True)
    out = aside(leaving, side, radius)
    corner = (piece.z1, piece.r1)
    if after is None:
        return [(corner[0] + out[0], corner[1] + out[1])]
    arriving = tangent(after, False)
    turn = leaving[0] * arriving[1] - leaving[1] * arriving[0]
    along = leaving[0] * arriving[0] + leaving[1] * arriving[1]
    if abs(turn) < 1e-6 and along > 0:
        return [(corner[0] + out[0], corner[1] + out[1])]
    if turn * side < 0 and along < -1e-9:  # acute outside
        entry = aside(arriving, side, radius)
        points = [
            (corner[0] + out[0] + radius * leaving[0], corner[1] + out[1] + radius * leaving[1]),
            (corner[0] + entry[0] - radius * arriving[0], corner[1] + entry[1] - radius * arriving[1]),
        ]
        before = [(corner[0] + out[0], corner[1] + out[1])] if piece.is_arc else []
        behind = [(corner[0] + entry[0], corner[1] + entry[1])] if after.is_arc else []
        return [*before, *points, *behind]
    return [_meeting(piece, after, side, radius)]


def _meeting(piece: Piece, after: Piece, side: int, radius: float) -> Vector:
    """The common point of two offset elements nearest to the corner."""
    first, second = _offset(piece, side, radius, True), _offset(after, side, radius, False)
    corner = (piece.z1, piece.r1)
    points = _common(first, second)
    return min(points, key=lambda point: hypot(point[0] - corner[0], point[1] - corner[1]))


Straight = tuple[Vector, Vector]  # a point and a direction
Round = tuple[Vector, float]  # centre and radius


def _offset(piece: Piece, side: int, radius: float, at_end: bool) -> Straight | Round:
    if piece.is_arc:
        inwards = (piece.kind == "CCW") == (side > 0)  # left of an anticlockwise arc lies its centre
        return (piece.cz, piece.cr), piece.radius - radius if inwards else piece.radius + radius
    way = tangent(piece, at_end)
    out = aside(way, side, radius)
    return (piece.z1 + out[0], piece.r1 + out[1]) if at_end else (piece.z0 + out[0], piece.r0 + out[1]), way


def _common(first: Straight | Round, second: Straight | Round) -> list[Vector]:
    if isinstance(first[1], tuple) and isinstance(second[1], tuple):
        (p, u), (q, v) = (first[0], first[1]), (second[0], second[1])
        cross = u[0] * v[1] - u[1] * v[0]
        t = ((q[0] - p[0]) * v[1] - (q[1] - p[1]) * v[0]) / cross
        return [(p[0] + t * u[0], p[1] + t * u[1])]
    if isinstance(first[1], tuple):
        assert not isinstance(second[1], tuple)
        return _line_circle(first[0], first[1], second[0], second[1])
    if isinstance(second[1], tuple):
        return _line_circle(second[0], second[1], first[0], first[1])
    return _circles(first[0], first[1], second[0], second[1])


def _line_circle(point: Vector, way: Vector, centre: Vector, radius: float) -> list[Vector]:
    dz, dr = centre[0] - point[0], centre[1] - point[1]
    foot = dz * way[0] + dr * way[1]
    away = dz * dz + dr * dr - foot * foot
    half = sqrt(max(0.0, radius * radius - away))
    return [(point[0] + t * way[0], point[1] + t * way[1]) for t in (foot - half, foot + half)]


def _circles(a: Vector, ra: float, b: Vector, rb: float) -> list[Vector]:
    dz, dr = b[0] - a[0], b[1] - a[1]
    gap = hypot(dz, dr)
    foot = (gap * gap + ra * ra - rb * rb) / (2 * gap)
    half = sqrt(max(0.0, ra * ra - foot * foot))
    mz, mr = a[0] + foot * dz / gap, a[1] + foot * dr / gap
    return [(mz + sign * half * -dr / gap, mr + sign * half * dz / gap) for sign in (1, -1)]
