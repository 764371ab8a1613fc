"""Corner and angle words of straight blocks: chamfers, roundings, lines given by their direction.

The caller collects a chain of straight feed blocks: every block that carries a corner word, or that is
a line known by its angle alone, and the straight block behind it. ``draw`` turns the chain into strokes.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace

from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleFault, Stroke
from auditor.interpret.moves import Feed, Kind

TOPIC = "cycle-corner"
SHORTEST = 1e-6  # mm; below it two points are the same point
FLAT = 1e-9  # sine below which two directions are one


@dataclass(frozen=True, slots=True)
class Leg:
    """One straight feed block as written, its words already made absolute, X as radius, mm.

    A coordinate that the block leaves out is None. ``chamfer`` and ``rounding`` stand at the end of the
    leg and are sizes along each side (``,C``) or a radius (``,R``). ``turn`` is the sign of the old
    words ``I K C R`` without a comma: the sense of the second side along its axis.
    """

    end_z: float | None = None
    end_r: float | None = None
    angle: float | None = None  # degrees from +Z, counter-clockwise with X up
    chamfer: float | None = None
    rounding: float | None = None
    turn: int | None = None
    feed: Feed | None = None
    line: int | None = None
    block: str | None = None

    @property
    def needs_following(self) -> bool:
        """Whether the block behind this one has to be known before this one can be carried out."""
        return self.chamfer is not None or self.rounding is not None or self.angle_only

    @property
    def angle_only(self) -> bool:
        """Whether only the direction of the line is given."""
        return self.angle is not None and self.end_z is None and self.end_r is None


def draw(start: Point, legs: Sequence[Leg]) -> tuple[Stroke, ...]:
    """Strokes of a chain of straight legs, each stroke with the line of its leg.

    A chamfer or rounding belongs to the leg that carries the word. The last leg must not need a
    following one.

    Parameters
    ----------
    start : Point
        Where the first leg begins, mm, X as radius.
    legs : sequence of Leg
        The chain in program order.

    Raises
    ------
    CycleFault
        Topic ``cycle-corner``: no following move, a side shorter than its cut-backs, an angle with the
        wrong coordinate left out, sides that do not turn.

    Examples
    --------
    >>> path = draw(Point(2.0, 10.0), [Leg(end_z=-20.0, chamfer=2.0), Leg(end_r=20.0)])
    >>> [(round(s.end.z, 3), round(s.end.r, 3)) for s in path]
    [(-18.0, 10.0), (-20.0, 12.0), (-20.0, 20.0)]
    """
    ends = _theoretical_ends(start, legs)
    points = [start, *ends]
    cuts = [0.0] * len(points)  # cut-back at each point, both sides alike
    corners: list[Stroke | None] = [None] * len(points)
    for index, leg in enumerate(legs):
        if leg.chamfer is None and leg.rounding is None:
            continue
        if index + 1 == len(legs):
            raise _fault(leg, "no straight move follows the block with the corner word")
        _check_turn(leg, points[index + 1], points[index + 2])
        cuts[index + 1], corners[index + 1] = _break(leg, points[index], points[index + 1], points[index + 2])
    strokes: list[Stroke] = []
    for index, leg in enumerate(legs):
        strokes += _leg_strokes(leg, points[index], points[index + 1], cuts[index], cuts[index + 1], corners[index + 1])
    return tuple(strokes)


def _fault(leg: Leg, message: str) -> CycleFault:
    named = {",C": leg.chamfer, ",R": leg.rounding, ",A": leg.angle}
    return CycleFault(TOPIC, message, tuple(word for word, value in named.items() if value is not None), leg.line)


def _theoretical_ends(start: Point, legs: Sequence[Leg]) -> list[Point]:
    """Sharp end point of every leg, angles solved."""
    ends: list[Point] = []
    here = start
    for index, leg in enumerate(legs):
        if leg.angle_only:
            if index + 1 == len(legs):
                raise _fault(leg, "a line given by its angle alone needs a following line with X, Z and an angle")
            here = _crossing(here, leg, legs[index + 1])
        else:
            here = sharp_end(here, leg)
        ends.append(here)
    return ends


def sharp_end(start: Point, leg: Leg) -> Point:
    """End of a leg, its corner not yet broken, of which at most one coordinate follows from the angle.

    Raises
    ------
    CycleFault
        Topic ``cycle-corner``: the coordinate left out does not follow from the angle.
    """
    if leg.angle is None or (leg.end_z is not None and leg.end_r is not None):
        return Point(start.z if leg.end_z is None else leg.end_z, start.r if leg.end_r is None else leg.end_r)
    sine, cosine = math.sin(math.radians(leg.angle)), math.cos(math.radians(leg.angle))
    if leg.end_r is not None:
        if abs(sine) < FLAT:
            raise _fault(leg, f"Z cannot follow from X along a line at {leg.angle:g} degrees: give Z")
        return Point(start.z + (leg.end_r - start.r) * cosine / sine, leg.end_r)
    assert leg.end_z is not None  # angle alone is solved by _crossing
    if abs(cosine) < FLAT:
        raise _fault(leg, f"X cannot follow from Z along a line at {leg.angle:g} degrees: give X")
    return Point(leg.end_z, start.r + (leg.end_z - start.z) * sine / cosine)


def _crossing(start: Point, leg: Leg, following: Leg) -> Point:
    """Where the line from ``start`` meets the line of the following leg, both known by their angles."""
    if leg.angle is None or following.angle is None or following.end_z is None or following.end_r is None:
        raise _fault(leg, "a line given by its angle alone needs a following line with X, Z and an angle")
    one, two = math.radians(leg.angle), math.radians(following.angle)
    turn = math.sin(two - one)
    if abs(turn) < FLAT:
        raise _fault(leg, "the two lines given by their angles are parallel: they do not meet")
    dz, dr = following.end_z - start.z, following.end_r - start.r
    along = (dz * math.sin(two) - dr * math.cos(two)) / turn
    return Point(start.z + along * math.cos(one), start.r + along * math.sin(one))


def _check_turn(leg: Leg, corner: Point, after: Point) -> None:
    """The sign of an old corner word has to agree with the move behind it."""
    if leg.turn is None:
        return
    dz, dr = after.z - corner.z, after.r - corner.r
    if abs(dz) > SHORTEST and abs(dr) > SHORTEST:
        raise _fault(leg, "a corner word without a comma stands between a pure Z and a pure X move only")
    if (dz + dr) * leg.turn < 0:
        raise _fault(leg, "the sign of the corner word points away from the move that follows")


def _break(leg: Leg, before: Point, corner: Point, after: Point) -> tuple[float, Stroke]:
    """Cut-back along both sides and the stroke that joins them."""
    to_back, to_front = _direction(corner, before), _direction(corner, after)
    if to_back is None or to_front is None:
        raise _fault(leg, "one side of the corner has no length")
    cross = to_back[0] * to_front[1] - to_back[1] * to_front[0]
    inside = math.atan2(abs(cross), to_back[0] * to_front[0] + to_back[1] * to_front[1])
    if inside > math.pi - FLAT or inside < FLAT:
        raise _fault(leg, "the two sides lie on one line: there is no corner to break")
    if leg.chamfer is not None:
        cut = leg.chamfer
        return cut, _stroke(leg, Kind.FEED, _along(corner, to_front, cut))
    assert leg.rounding is not None
    cut = leg.rounding / math.tan(inside / 2)
    bisector = (to_back[0] + to_front[0], to_back[1] + to_front[1])
    reach = leg.rounding / math.sin(inside / 2) / math.hypot(*bisector)
    arc = _stroke(leg, Kind.ARC, _along(corner, to_front, cut))
    # sides seen from the corner, back before front counter-clockwise, make the path turn right
    return cut, replace(arc, centre=_along(corner, bisector, reach), clockwise=cross > 0)


def _direction(tail: Point, head: Point) -> tuple[float, float] | None:
    length = math.dist(tail, head)
    return None if length < SHORTEST else ((head.z - tail.z) / length, (head.r - tail.r) / length)


def _along(point: Point, direction: tuple[float, float], distance: float) -> Point:
    return Point(point.z + distance * direction[0], point.r + distance * direction[1])


def _stroke(leg: Leg, kind: Kind, end: Point) -> Stroke:
    return Stroke(kind, end, feed=leg.feed, line=leg.line, block=leg.block)


def _leg_strokes(
    leg: Leg, start: Point, end: Point, cut_start: float, cut_end: float, corner: Stroke | None
) -> list[Stroke]:
    """The straight part of a leg and the corner at its end."""
    length = math.dist(start, end)
    if length < cut_start + cut_end - SHORTEST:
        raise _fault(leg, f"the side is {length:.4g} mm long, the corners take {cut_start + cut_end:.4g} mm of it")
    strokes: list[Stroke] = []
    if length > cut_start + cut_end + SHORTEST or not cut_start + cut_end:
        direction = _direction(start, end)
        strokes.append(_stroke(leg, Kind.FEED, end if direction is None else _along(end, direction, -cut_end)))
    return strokes if corner is None else [*strokes, corner]
