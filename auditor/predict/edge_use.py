"""How much of an edge's life one part uses up."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from auditor.declared.model import Tool
from auditor.interpret.moves import Move
from auditor.mechanics.life import taylor_life
from auditor.predict.loads import MoveFigures


def edge_use(tool: Tool, moves: Sequence[Move], figures: MoveFigures) -> float | None:
    """Share of an edge of this tool per part: cutting time over life at every move's highest speed, summed.

    None where the tool has no declared Taylor pair.
    """
    if tool.taylor is None:
        return None
    mine = np.array([move.tool == tool.number for move in moves], dtype=bool)
    cutting = mine & (figures.cutting_time > 0.0) & (figures.speed_high > 0.0)
    life = taylor_life(figures.speed_high[cutting], *tool.taylor)
    return float(np.sum(figures.cutting_time[cutting] / 60.0 / life))
