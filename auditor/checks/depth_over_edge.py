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
    The depth at which the engaged edge meets the share, computed for the block; or a larger insert.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._cuts import Cut, cuts
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
    message = f"{fate}: {figure(engaged)} mm of a {figure(edge)} mm edge, usable {figure(share * edge)} mm " \
              f"({figure(share, 2)} of it, {limit.provenance})."
    shallower = depth_within(run, cut.move, lambda what: what.length, share * edge)
    remedy = f"Depth {length(run, shallower)} keeps to it." if shallower else "A larger insert."
    return finding_at(run, CHECK, level, cut.row_of_largest(loads.length), message, value=engaged,
                      limit=end if level is Level.STOP else share * edge, unit="mm", remedy=remedy)


def _judge_round(run: Run, cut: Cut) -> Finding | None:
    loads = run.prediction.loads
    diameter = 2.0 * cut.tool.nose_radius
    usable = threshold(run, LIMITS[3]) * diameter
    deep = lasting(loads, loads.depth, cut.move.index, over=usable)
    if deep <= usable:
        return None
    level = Level.STOP if deep > 0.5 * diameter else Level.REVIEW
    message = f"The round insert of {figure(diameter)} mm cuts {figure(deep)} mm deep, usable {figure(usable)} mm " \
              f"({LIMITS[3].provenance})."
    return finding_at(run, CHECK, level, cut.row_of_largest(loads.depth), message, value=deep, limit=usable, unit="mm",
                      remedy=f"Depth {length(run, usable)} keeps to it.")
