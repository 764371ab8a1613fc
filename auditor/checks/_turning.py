"""How fast constant surface speed wants to turn, and what speed does to the grip."""

from __future__ import annotations

import math

from auditor.declared.model import Workholding
from auditor.interpret.moves import Kind, Move

NEAR_CENTRE = 0.5  # mm of radius; nearer the axis the speed asked for grows without bound and means nothing


def asked_speed(move: Move) -> tuple[float | None, float | None]:
    """The speed, rpm, that surface speed asks for at the smallest radius of a move, and that radius, mm."""
    start, end, surface = move.start_r, move.end_r, move.spindle.value
    radii = [end] if move.kind is Kind.RAPID else [start, end]
    known = [abs(radius) for radius in radii if radius is not None]
    if start is not None and end is not None and start * end < 0.0:
        known.append(0.0)
    if not known or surface is None:
        return None, None
    smallest = min(known)
    return 1000.0 * surface / (2.0 * math.pi * max(smallest, NEAR_CENTRE)), smallest


def has_flying_jaws(holding: Workholding) -> bool:
    """Whether speed takes grip away: a collet has no jaws to fly, an inside grip gains by it."""
    return holding.kind != "collet" and not holding.grip_inside
