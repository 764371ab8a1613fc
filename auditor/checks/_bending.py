"""How soft work and tool are at a cut, for the checks that ask about push-off."""

from __future__ import annotations

import math

import numpy as np
import shapely

from auditor.checks._cuts import Cut
from auditor.declared.model import Tool
from auditor.findings import Run
from auditor.mechanics.bars import bar_compliance, bar_modulus, shank_compliance


def slenderness(run: Run, cut: Cut, row: int) -> float:
    """Distance from the jaws to the cut over the outer diameter of the work there."""
    loads = run.prediction.loads
    reach = run.job.workholding.stick_out + float(loads.z[row])
    across = _across(run, cut, row)
    diameter = 2.0 * (across[1] if across is not None else float(loads.outermost[row]))
    return max(reach, 0.0) / diameter if diameter > 0.0 else 0.0


def wall_share(run: Run, cut: Cut, row: int) -> float | None:
    """Wall thickness over outer diameter at the cut; None for solid work."""
    across = _across(run, cut, row)
    if across is None:
        return None
    inner, outer = across
    return (outer - inner) / (2.0 * outer) if inner > 1e-6 else None


def _across(run: Run, cut: Cut, row: int) -> tuple[float, float] | None:
    """Smallest and largest radius of the work where the cut is, mm before it; None in air."""
    stock = run.simulation.stock_before.get(cut.move.index)
    if stock is None:
        return None
    z = float(run.prediction.loads.z[row])
    _, _, _, top = stock.bounds
    across = stock.intersection(shapely.LineString([(z, 0.0), (z, top + 1.0)]))
    if across.is_empty:
        return None
    _, inner, _, outer = across.bounds
    return float(inner), float(outer)


def shank_give(tool: Tool) -> float | None:
    """Give of the tool's shank at its tip, mm/N; None without overhang and section."""
    if tool.overhang is None:
        return None
    modulus = bar_modulus(tool.bar_material)
    if tool.bar_diameter is not None:
        return float(bar_compliance(tool.overhang, tool.bar_diameter, modulus))
    if tool.shank_height is not None and tool.shank_width is not None:
        return float(shank_compliance(tool.overhang, tool.shank_height, tool.shank_width, modulus))
    return None


def bar_push_off(run: Run, cut: Cut) -> float:
    """Radial bending of a boring bar under the passive force, mm; 0 where it is not a bar or not declared."""
    give = shank_give(cut.tool)
    if cut.tool.kind != "boring" or give is None:
        return 0.0
    push = cut.largest(np.abs(run.prediction.loads.force_x))
    return give * push if math.isfinite(push) else 0.0
