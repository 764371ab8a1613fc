"""Trailing edge contact: does the back of the insert drag, or is it driven into the work?

What
    Looks at copying moves towards the axis that are steeper than the minor edge allows, copying moves away from
    the axis that are steeper than the main edge allows, plunging with a turning insert, and facing far past the
    centre.

Why
    An edge that was meant to trail free is driven into the work: it rubs or breaks, and the profile is not the one
    programmed. Past the centre the work runs backwards under the edge and tears it off.

Formula and source
    Plane geometry of ISO 3002-1: towards the axis up to the minor edge's angle, 180 degrees less cutting edge angle
    less included angle, less a margin of 2 degrees; away from the axis up to the cutting edge angle less 3 degrees
    (margins: common practice). Stop: the minor edge is in the metal beyond its angle, or the whole of it
    is in a move straight towards the axis. Review: inside the margin; a finishing path away from the axis that is
    steeper than the main edge. Past the centre: review from twice the nose radius, stop from that and 1 mm more.

Remedy
    A slimmer insert (55 or 35 degrees), a holder with another edge angle, a grooving tool for the plunge, or facing
    that ends about a nose radius past the centre.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from auditor.checks._cuts import Cut, cuts
from auditor.checks._edges import engaged_lengths, path_angle
from auditor.checks._judging import origin, threshold
from auditor.checks._words import figure, finding_at, length, x_word
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.mechanics.copying import minor_edge_angle, steepest_in_copy, steepest_out_copy
from auditor.simulate.samples import Part

CHECK = "trailing-edge-contact"
LIMITS = (Limit("past_centre", 0.8, "mm", "common practice", "longest way past the centre (or twice the nose radius)"),)
AIR = 0.005  # mm of depth; less is a tool that passes by
TOUCHES = 0.1  # mm of edge in the metal
WHOLE_EDGE = 0.9
STRAIGHT_IN = -85.0  # deg; steeper is facing or plunging, not copying


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Moves that drive the wrong part of the insert into the work."""
    minor, body = engaged_lengths(run, Part.MINOR), engaged_lengths(run, Part.BACK)
    depths = run.prediction.loads.depth
    for cut in cuts(run, ("turning", "boring", "parting", "grooving")):
        if not cut.largest(depths) > AIR:
            continue
        finding = _past_centre(run, cut)
        if finding is None and cut.tool.kind in ("turning", "boring") and cut.tool.shape != "R":
            index = cut.move.index
            finding = _judge_direction(run, cut, float(minor[index]), float(body[index]))
        if finding is not None:
            yield finding


def _past_centre(run: Run, cut: Cut) -> Finding | None:
    end, start = cut.move.end, cut.move.start
    if end is None or start is None or cut.tool.kind == "boring" or start.r <= end.r:
        return None
    allowed = max(2.0 * cut.tool.nose_radius, threshold(run, LIMITS[0]))
    loads = run.prediction.loads
    engaged = np.abs(loads.r[cut.rows][loads.depth[cut.rows] > AIR])
    if end.r >= -allowed - 1e-9 or not len(engaged) or engaged.min() > allowed:  # a bored face ends before the centre
        return None
    level = Level.STOP if -end.r > allowed + 1.0 else Level.REVIEW
    message = f"The tool runs {length(run, -end.r)} past the centre, to {x_word(run, end.r)}: there the work turns " \
              f"backwards under the edge. {origin(run, LIMITS)}"
    return run.finding(CHECK, level, cut.move, message, value=-end.r, limit=allowed, unit="mm", words=("X",),
                       remedy=f"End at {x_word(run, -max(cut.tool.nose_radius, 0.2))}.")


def _judge_direction(run: Run, cut: Cut, trailing: float, body: float) -> Finding | None:
    """``trailing`` and ``body``: engaged length of the minor edge and of what lies behind the edges, mm."""
    tool, angle = cut.tool, path_angle(cut)
    if angle is None:
        return None
    minor = float(minor_edge_angle(tool.cutting_edge_angle, tool.included_angle))
    if angle <= STRAIGHT_IN:
        whole = tool.minor_edge_length or tool.edge_length
        if body > TOUCHES or (whole is not None and trailing > WHOLE_EDGE * whole):
            return _finding(run, cut, Level.STOP, -angle, minor, "The insert is driven straight in with the whole of "
                            "its edge in the metal and no room beside it", "A grooving tool for this plunge.")
        return None
    if angle < 0.0:
        limit = float(steepest_in_copy(minor))
        if -angle > minor + 1e-6 and trailing > TOUCHES:
            return _finding(run, cut, Level.STOP, -angle, limit, f"The path goes in at {figure(-angle)} deg and the "
                            f"trailing edge, at {figure(minor)} deg, is driven into the work", "A slimmer insert.")
        if limit + 1e-6 < -angle <= minor + 1e-6:
            return _finding(run, cut, Level.REVIEW, -angle, limit, f"The path goes in at {figure(-angle)} deg and the "
                            f"trailing edge, at {figure(minor)} deg, drags", "A slimmer insert.")
        return None
    limit = float(steepest_out_copy(tool.cutting_edge_angle))
    if angle > tool.cutting_edge_angle + 1e-6 and run.simulation.final_surface[cut.move.index]:
        return _finding(run, cut, Level.REVIEW, angle, limit, f"The path leaves the axis at {figure(angle)} deg, "
                        f"steeper than the edge at {figure(tool.cutting_edge_angle)} deg: the wall keeps that angle",
                        "A holder with a larger edge angle (93 or 95 deg).")
    return None


def _finding(run: Run, cut: Cut, level: Level, angle: float, limit: float, what: str, remedy: str) -> Finding:
    row = cut.row_of_largest(run.prediction.loads.depth)
    return finding_at(run, CHECK, level, row, f"{what} (geometry; margins are common practice).", value=angle,
                      limit=limit, unit="deg", remedy=remedy)
