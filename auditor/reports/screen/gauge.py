"""A figure with its band against its limit, drawn in one line."""

from __future__ import annotations

import math

from auditor.reports.screen.paper import Paper

CELLS = 24


def draw(paper: Paper, value: float, band: tuple[float, float] | None, limit: float) -> str:
    """The gauge: sure up to the band, the band, the predicted figure in it, and the limit.

    The predicted figure always stands on its own side of the limit, however close they are.
    """
    low, high = band if band is not None and all(map(math.isfinite, band)) else (value, value)
    bottom = min(0.0, low, value, limit)
    top = max(0.0, high, value, limit)
    span = (top - bottom) * 1.08 or 1.0

    def cell(figure: float) -> int:
        return min(CELLS - 1, max(0, int((figure - bottom) / span * CELLS)))

    row = [paper.sign("none")] * CELLS
    zero = cell(0.0)
    for index in range(min(zero, cell(low)), max(zero, cell(low))):
        row[index] = paper.sign("sure")
    for index in range(cell(low), cell(high) + 1):
        row[index] = paper.sign("band")
    mark, wall = cell(value), cell(limit)
    if mark == wall:
        mark, wall = _apart(mark, 1 if value > limit else -1)
    row[mark] = paper.sign("value")
    row[wall] = paper.sign("limit")
    return "".join(row)


def _apart(cell: int, side: int) -> tuple[int, int]:
    """Cells of figure and limit, side by side."""
    if 0 <= cell + side < CELLS:
        return cell + side, cell
    return cell, cell - side
