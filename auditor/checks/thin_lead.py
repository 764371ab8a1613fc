"""Thin lead: does the edge wipe along the work instead of cutting?

What
    Looks for cuts where a long piece of the main edge stands nearly along the motion, and for the depth jumping at
    a shoulder or an entry.

Why
    A 95 degree tool drawn outwards along a shoulder works at 5 degrees: a chip of tissue as long as the shoulder is
    deep, heat, vibration, a wedge of metal pushed before the edge. A depth that jumps loads the far end of the edge
    at full feed.

Formula and source
    Working edge angle = edge angle less path angle (ISO 3002-1). Review: more than wiping_edge of the main edge leans
    less than 15 degrees to the motion, under more than 1 mm of stock. Finishing a square shoulder outwards with a 93
    to 95 degree tool is good practice and stays under that. Note: the depth rises to more than depth_jump times the
    cut's usual depth and more than half of the edge is then in the cut. Common practice.

Remedy
    Face the shoulder inwards, leave less on it, or stop the longitudinal cut short of it and take the rest apart.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from auditor.checks._cuts import Cut, cuts
from auditor.checks._edges import engaged_lengths
from auditor.checks._judging import lasting, origin, threshold
from auditor.checks._words import finding_at, length
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.simulate.samples import Part

CHECK = "thin-lead"
LIMITS = (
    Limit("wiping_edge", 3.0, "mm", "common practice", "longest edge that may lean under 15 deg"),
    Limit("depth_jump", 2.0, "", "common practice", "largest depth at the shoulder over the usual"),
)
LEAN = 15.0  # deg
WEDGE = 1.0  # mm; what the edge itself left standing at a shoulder is thinner
AIR = 0.01  # mm; less depth is none
HALF_EDGE = 0.5


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Wiping edges and jumps of depth."""
    wiping = engaged_lengths(run, Part.MAIN, leaner_than=LEAN)
    for cut in cuts(run):
        if cut.tool.shape == "R":
            continue
        finding = _wiping(run, cut, float(wiping[cut.move.index])) or _jump(run, cut)
        if finding is not None:
            yield finding


def _wiping(run: Run, cut: Cut, wiping: float) -> Finding | None:
    loads = run.prediction.loads
    limit = threshold(run, LIMITS[0])
    if wiping <= limit or lasting(loads, loads.depth, cut.move.index, over=WEDGE) <= WEDGE:
        return None
    row = cut.row_of_largest(loads.length)
    message = f"The edge wipes along the work: {length(run, wiping, 1)} of it lean less than {LEAN:.0f} deg to the " \
              f"motion. {origin(run, LIMITS[:1])}"
    return finding_at(run, CHECK, Level.REVIEW, row, message, value=wiping, limit=limit, unit="mm",
                      remedy="Face inwards instead, or leave less on the shoulder.")


def _jump(run: Run, cut: Cut) -> Finding | None:
    loads, edge = run.prediction.loads, cut.tool.edge_length
    depths = loads.depth[cut.rows]
    if edge is None or not cut.largest(loads.length) > HALF_EDGE * edge:
        return None
    usual = _usual_depth(loads.travel[cut.rows], depths)
    deepest = lasting(loads, loads.depth, cut.move.index)
    used = lasting(loads, loads.length, cut.move.index)
    if deepest <= threshold(run, LIMITS[1]) * usual or used <= HALF_EDGE * edge:
        return None
    row = cut.row_of_largest(loads.depth)
    before = length(run, usual) if usual > AIR else "air"
    message = f"The depth jumps from {before} to {length(run, deepest)} at full feed, with " \
              f"{length(run, used, 1)} of the edge in the cut. {origin(run, LIMITS[1:])}"
    return finding_at(run, CHECK, Level.NOTE, row, message, value=deepest, limit=threshold(run, LIMITS[1]) * usual,
                      unit="mm", remedy="Half the feed over the jump, or take the shoulder apart.")


def _usual_depth(travel: NDArray[np.float64], depths: NDArray[np.float64]) -> float:
    """The depth that half of the travel does not exceed."""
    steps = np.diff(travel)
    middle = 0.5 * (depths[:-1] + depths[1:])
    order = np.argsort(middle)
    run_of = np.cumsum(steps[order])
    if not len(run_of) or run_of[-1] <= 0.0:
        return float(depths.max())
    return float(middle[order][np.searchsorted(run_of, 0.5 * run_of[-1])])
