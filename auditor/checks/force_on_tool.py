"""Force on the tool: does the holder or seat stand the load?

What
    Compares the whole force on the tool (cutting, feed and passive force together) with the force its insert seat
    or holder is declared to stand.

Why
    Small holders, thread inserts and parting blades break at the seat long before the spindle stalls.

Formula and source
    Resultant of the three components; the cutting force by Kienzle's law with the material's scatter, the other
    two with 50 %, joined by their share in the resultant. Stop: the expected resultant, lasting one turn, is over
    force_limit times tool_force_share. Review: the band is. Without a declared force_limit there is no finding.

Remedy
    The feed or depth at which the same law meets the limit, computed for the block.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from auditor.checks._judging import SMALL_FORCE, THRUST_SCATTER, over_limit, threshold, worst_by_block
from auditor.checks._remedy import cure
from auditor.checks._words import finding_over, force, tool_name
from auditor.findings import Finding, Limit, NotJudged, Run
from auditor.predict.loads import Loads

CHECK = "force-on-tool"
LIMITS = (Limit("tool_force_share", 1.0, "", "declared", "share of the tool's force limit that a job may use"),)

Floats = NDArray[np.float64]


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Blocks that load a tool over its declared limit."""
    loads = run.prediction.loads
    bounds = {
        number: tool.force_limit for number, tool in run.job.tools.items()
        if tool.force_limit is not None and tool.kind != "drilling"  # the lips of a drill balance each other
    }
    if not bounds or not len(loads.move):
        return
    tools = [bounds.get(move.tool, np.inf) if move.tool is not None else np.inf for move in run.path.moves]
    limit = np.array(tools)[loads.move] * threshold(run, LIMITS[0])
    for excess in worst_by_block(over_limit(run, resultant(loads), limit, _scatter(loads))):
        low, high = excess.band
        name = tool_name(run, excess.move.tool)
        sure = "is" if excess.value > excess.limit else "may be"
        message = f"The load on {name} {sure} more than its seat stands: {force(excess.value)} ({force(low)} to " \
                  f"{force(high)}) against {force(excess.limit)} (as declared)."
        bound = excess.limit
        yield finding_over(run, CHECK, excess, message, "N",
                           cure(run, excess, lambda what, bound=bound: resultant(what) / bound))  # type: ignore[misc]


def resultant(loads: Loads) -> Floats:
    """The whole force on the tool, N; NaN where it is too small to judge."""
    whole = np.sqrt(loads.cutting**2 + loads.feed_force**2 + loads.passive**2)
    return np.where(whole >= SMALL_FORCE, whole, np.nan)


def _scatter(loads: Loads) -> Floats:
    """Relative uncertainty of the resultant, from those of its components."""
    thrust = loads.feed_force**2 + loads.passive**2
    square = loads.cutting**2 + thrust
    with np.errstate(divide="ignore", invalid="ignore"):
        both = np.sqrt((loads.cutting**2 * loads.scatter) ** 2 + (thrust * THRUST_SCATTER) ** 2) / square
    return np.nan_to_num(both)
