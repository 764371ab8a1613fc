"""Depth against usable edge: is more of the edge in the cut than the insert can stand?

What
    Compares the engaged length of the cutting edge, round the nose and along the straight part, with the usable
    part of the insert's edge.

Why
    The far part of an edge has no backing and no chip-breaker. Cut to its end, the insert breaks across.

Formula and source
    Common practice, engaged length over edge length: square and 80 degree rhombic 2/3, triangle and 55 degree
    rhombic 1/2, trigon 1/2 of its short edge, 35 degree rhombic 1/4; round inserts to a depth of 0.4 diameters.
    Review: over that share. Stop: over the edge length less the nose radius (a round insert: over its radius).

Remedy
    The depth at which the engaged edge meets the share, computed for the block; or a larger insert. Where a shoulder
    lengthens the engagement: stop short of it and feed out along the wall.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from auditor.checks._cuts import Cut, cuts, wipes_outwards
from auditor.checks._judging import lasting, threshold
from auditor.checks._remedy import depth_within
from auditor.checks._words import figure, finding_at, length
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "depth-over-edge"
LIMITS = (
    Limit("edge_share_strong", 2.0 / 3.0, "", "common practice", "usable share of the edge, 75 to 90 degree inserts"),
    Limit("edge_share_medium", 0.5, "", "common practice", "usable share of the edge, triangles, trigons, 55 degrees"),
    Limit("edge_share_slender", 0.25, "", "common practice", "usable share of the edge, 35 degree inserts"),
    Limit("round_share", 0.4, "", "common practice", "largest depth over diameter, round inserts"),
)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts that use too much of the edge."""
    for cut in cuts(run):
        if cut.tool.shape == "R":
            finding = _judge_round(run, cut)
        elif cut.tool.edge_length is None:
            yield NotJudged(CHECK, f"tools.{cut.tool.number}: neither insert code nor edge length is declared")
            continue
        else:
            finding = _judge_straight(run, cut, cut.tool.edge_length)
        if finding is not None:
            yield finding


def _limit_for(cut: Cut) -> Limit:
    strong, medium, slender, _ = LIMITS
    if cut.tool.shape in ("W", "T"):
        return medium
    angle = cut.tool.included_angle
    return strong if angle >= 75.0 else medium if angle >= 55.0 else slender


def _judge_straight(run: Run, cut: Cut, edge: float) -> Finding | None:
    loads = run.prediction.loads
    limit = _limit_for(cut)
    share = threshold(run, limit)
    engaged = lasting(loads, loads.length, cut.move.index, over=share * edge)
    if engaged <= share * edge:
        return None
    end = edge - cut.tool.nose_radius
    level = Level.STOP if engaged > end else Level.REVIEW
    fate = "The cut reaches past the end of the edge" if level is Level.STOP else "Too much of the edge is in the cut"
    message = f"{fate}: {length(run, engaged, 1)} of a {length(run, edge, 1)} edge, usable " \
              f"{length(run, share * edge, 1)} " \
              f"({figure(share, 2)} of it, {limit.provenance})."
    remedy = _remedy(run, cut, share * edge)
    return finding_at(run, CHECK, level, cut.row_of_largest(loads.length), message, value=engaged,
                      limit=end if level is Level.STOP else share * edge, unit="mm", remedy=remedy)


def _remedy(run: Run, cut: Cut, usable: float) -> str:
    """A smaller depth, unless the length comes from a shoulder that the cut runs into or along."""
    if wipes_outwards(cut):
        return "Leave less on the shoulder, or face it inwards in steps."
    if _usual_length(run, cut) <= usable:
        return "Stop short of the shoulder and feed out along the wall."
    shallower = depth_within(run, cut.move, lambda what: what.length, usable)
    return f"Depth {length(run, shallower)} keeps to it." if shallower else "A larger insert."


def _usual_length(run: Run, cut: Cut) -> float:
    """Engaged length, mm, over most of the way: half of the way lies under it."""
    loads = run.prediction.loads
    where = np.linspace(loads.position[cut.rows.start], loads.position[cut.rows.stop - 1], 101)
    return float(np.median(np.interp(where, loads.position[cut.rows], np.nan_to_num(loads.length[cut.rows]))))


def _judge_round(run: Run, cut: Cut) -> Finding | None:
    loads = run.prediction.loads
    diameter = 2.0 * cut.tool.nose_radius
    usable = threshold(run, LIMITS[3]) * diameter
    deep = lasting(loads, loads.depth, cut.move.index, over=usable)
    if deep <= usable:
        return None
    level = Level.STOP if deep > 0.5 * diameter else Level.REVIEW
    message = f"The round insert of {length(run, diameter, 1)} cuts {length(run, deep, 1)} deep, usable " \
              f"{length(run, usable, 1)} ({LIMITS[3].provenance})."
    return finding_at(run, CHECK, level, cut.row_of_largest(loads.depth), message, value=deep, limit=usable, unit="mm",
                      remedy=f"Depth {length(run, usable)} keeps to it.")
