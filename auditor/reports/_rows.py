"""A move as figures under names that carry their unit: what the JSON and the CSV report have in common.

X is a diameter here; a figure that does not apply is None, never NaN.
"""

from __future__ import annotations

import math

from auditor.interpret.moves import Move
from auditor.predict.loads import MoveFigures

_DECIMALS = 6

# report key -> field of the figures per move
LARGEST = {
    "depth_of_cut_mm": "depth", "edge_engaged_mm": "length", "chip_thickness_mm": "chip_max", "chip_area_mm2": "area",
    "effective_rake_deg": "rake", "cutting_force_N": "cutting", "feed_force_N": "feed_force",
    "passive_force_N": "passive", "torque_Nm": "torque", "cutting_power_kW": "power", "motor_power_kW": "motor_power",
}


def number(value: float | None) -> float | None:
    """A plain finite number, or nothing.

    >>> number(float("nan")), number(-0.0), number(1.23456789)
    (None, 0.0, 1.234568)
    """
    if value is None or not math.isfinite(value):
        return None
    return round(float(value), _DECIMALS) + 0.0  # + 0.0 turns -0.0 into 0.0


def diameter(r: float | None) -> float | None:
    """The X of a radius."""
    return None if r is None else number(2.0 * r)


def between(low: float, high: float) -> tuple[float, float] | None:
    """A range along a move, or nothing."""
    first, last = number(low), number(high)
    return None if first is None or last is None else (first, last)


def largest(figures: MoveFigures, row: int) -> dict[str, float | None]:
    """The largest figures along a move, by report key."""
    return {key: number(getattr(figures, field)[row]) for key, field in LARGEST.items()}


def provisional(move: Move) -> bool:
    """Whether the move rests on something that was not understood."""
    return move.provisional or move.new_stock_state
