"""Nose-radius compensation: does the path allow for the rounded corner?

What
    Checks compensation (G41, G42) for being left on, started in an arc, on the wrong side, asked to go where the
    nose does not fit, or confused by blocks without motion; and finished tapers and arcs that are cut without it.

Why
    The control steers the imaginary tip, the rounded corner cuts. On cylinders and faces both agree; on every
    slope and arc the part keeps up to 0.41 nose radii too much. A wrong side costs two nose radii and the part.

Formula and source
    Error of a slope at t degrees cut with the tip: r (sin t + cos t - 1), measured square to it; a convex arc comes
    out with R - r, a concave one with R + r (geometry). Stop: what the control refuses or what ruins the part.
    Review: doubtful use; or a missing compensation whose error is over the tolerance on a slope or arc longer than
    edge_break. Note: missing on short edge breaks, or where the finished outline is declared and judged anyway.

Remedy
    G42 for outside work towards the chuck, G41 for bores, started on a straight approach longer than the nose
    radius and cancelled on the way out; or the tip path shifted by hand.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

from auditor.checks._cuts import Cut, cuts, roughs
from auditor.checks._judging import origin, threshold
from auditor.checks._remarks import findings_of
from auditor.checks._words import figure, finding_at, thousandths
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Kind

CHECK = "nose-compensation"
LIMITS = (Limit("edge_break", 2.0, "mm", "common practice", "longest edge break left uncompensated"),)
LEVELS = {
    "compensation-left-on": Level.REVIEW,
    "compensation-in-arc": Level.STOP,
    "compensation-side": Level.STOP,
    "compensation-too-small": Level.STOP,
    "compensation-blank-blocks": Level.REVIEW,
    "compensation-tip": Level.REVIEW,
    "compensation-missing": Level.REVIEW,
    "compensation-change": Level.REVIEW,
}
UNCOMPENSATED_TIPS = (0, 9)  # the programmed point is the nose centre


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Faults of compensation, and finished slopes and arcs without it."""
    yield from findings_of(run, CHECK, LEVELS)
    for cut in cuts(run):
        if cut.move.compensation == "off" and not roughs(cut) and run.simulation.final_surface[cut.move.index]:
            finding = _uncompensated(run, cut)
            if finding is not None:
                yield finding


def form_error(cut: Cut) -> tuple[float, float]:
    """Error square to the surface and length of a slope or arc cut with the imaginary tip, mm."""
    move, radius = cut.move, cut.tool.nose_radius
    if move.start is None or move.end is None:
        return 0.0, 0.0
    across, along = abs(move.end.r - move.start.r), abs(move.end.z - move.start.z)
    length = math.hypot(across, along)
    if move.kind is Kind.ARC:
        return radius * (math.sqrt(2.0) - 1.0), length
    if length == 0.0:
        return 0.0, 0.0
    return radius * ((across + along) / length - 1.0), length


def _uncompensated(run: Run, cut: Cut) -> Finding | None:
    error, length = form_error(cut)
    if error < 0.005 or cut.tool.tip in UNCOMPENSATED_TIPS:
        return None
    tolerance = run.job.workpiece.diameter_tolerance
    long = length > threshold(run, LIMITS[0])
    grave = tolerance is not None and 2.0 * error > tolerance and long and not run.job.workpiece.finished
    shape = "arc" if cut.move.kind is Kind.ARC else "slope"
    message = f"This {shape} is finished without nose-radius compensation: the " \
              f"{figure(cut.tool.nose_radius, 2)} mm corner leaves up to {thousandths(run, error)} on it, unless the " \
              f"path is shifted already. {origin(run, LIMITS)}"
    return finding_at(
        run, CHECK, Level.REVIEW if grave else Level.NOTE, cut.row_of_largest(run.prediction.loads.depth), message,
        value=2.0 * error, limit=tolerance, unit="mm",
        remedy="G42 (outside) or G41 (bore) on the approach to the contour.",
    )
