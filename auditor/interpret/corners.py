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
    raise NotImplementedError
