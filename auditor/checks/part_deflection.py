"""Part deflection: how far does the work bend away from the tool?

What
    Works out how far the tool pushes the work aside, on what is left of the stock at that moment, as the error of
    the diameter that stays: on finishing moves against the tolerance, on roughing moves against the allowance
    left for finishing.

Why
    Work that stands out far gives way. It comes back behind the tool and comes out thick, most at its free end;
    measuring at the chuck shows nothing. In roughing the bend takes the finishing allowance away on one side.

Formula and source
    Stepped beam in chuck, chuck and tailstock, or between centres (Roark); error of the diameter 2y + 2 y_t^2 / d
    with y by the passive and y_t by the cutting force. The passive force is known to 50 %. Stop: the expected
    error is over the tolerance, or over 2 x part_bend where the job sets it. Review: the upper edge of its band is,
    or the expected error is over bend_share of the tolerance (common practice: a third); a block that
    rake-too-blunt already names for the same bending is left to it. Bending is judged however small the force, but
    never below 2 um, where no figure means anything (common practice).

Remedy
    The feed or depth at which the same law bends no more than bend_share of the tolerance, computed for the block; a
    smaller nose radius; a freer-cutting edge; a tailstock.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from auditor.checks import rake_too_blunt
from auditor.checks._cuts import Cut, bending_errors, cuts, diameter_errors
from auditor.checks._judging import MOST_CURED, THRUST_SCATTER, threshold
from auditor.checks._remedy import way_out
from auditor.checks._words import finding_at, thousandths
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.mechanics.bending import CERTAINTY

CHECK = "part-deflection"
LIMITS = (
    Limit("part_bend", 0.05, "mm", "common practice", "largest push-off of the work (where the job sets it)"),
    Limit("bend_share", 1.0 / 3.0, "", "common practice", "largest share of the tolerance that bending may take"),
)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts that bend the work too far."""
    allowed = allowed_error(run)
    if allowed is None:
        yield NotJudged(CHECK, "neither workpiece.diameter_tolerance nor limits.part_bend is declared")
        return
    errors, cured = diameter_errors(run), 0
    blunt = {finding.line for finding in rake_too_blunt.judge(run) if isinstance(finding, Finding)}
    for cut in cuts(run):
        error = cut.largest(errors)
        if not error > CERTAINTY:
            continue
        if run.simulation.final_surface[cut.move.index]:
            if error <= allowed and cut.move.line in blunt:
                continue
            finding = _finishing(run, cut, error, allowed, curable=cured < MOST_CURED)
            cured += finding is not None
        else:
            finding = _roughing(run, cut, error)
        if finding is not None:
            yield finding


def allowed_error(run: Run) -> float | None:
    """Error of the diameter that the job allows, mm: its own part_bend on the radius, else the tolerance."""
    if "part_bend" in run.job.limits:
        return 2.0 * threshold(run, LIMITS[0])
    return run.job.workpiece.diameter_tolerance


def _finishing(run: Run, cut: Cut, error: float, allowed: float, *, curable: bool) -> Finding | None:
    low, high = run.prediction.band(error, THRUST_SCATTER)
    share = threshold(run, LIMITS[1]) * allowed
    if error <= share and high <= allowed:
        return None
    level = Level.STOP if error > allowed else Level.REVIEW
    out, least, most, tolerance, wanted = (thousandths(run, part) for part in (error, low, high, allowed, share))
    message = f"The work bends away and comes out {out} too large ({least} to {most}); {tolerance} is allowed on the " \
              f"diameter, and bending should take {wanted} of it at most."
    row = cut.row_of_largest(run.prediction.loads.bend)
    others = "a smaller nose radius, a freer-cutting edge or a tailstock"
    ways = way_out(run, cut.move, bending_errors, share) if curable else ""
    remedy = f"Bent by no more than that at {ways}; or {others}." if ways else f"{others[0].upper()}{others[1:]}."
    return finding_at(run, CHECK, level, row, message, value=error, band=(low, high), limit=allowed,
                      unit="mm", remedy=remedy)


def _roughing(run: Run, cut: Cut, error: float) -> Finding | None:
    """Whether the bend of an outside roughing cut is larger than what it leaves for finishing."""
    loads = run.prediction.loads
    row = cut.row_of_largest(loads.bend)
    left = float(loads.r[row]) - _final_radius(run, float(loads.z[row]))
    if cut.tool.kind != "turning" or not 0.0 < 2.0 * left < error:
        return None
    message = f"The work bends away by {thousandths(run, error)} on the diameter while roughing; only " \
              f"{thousandths(run, 2.0 * left)} is left on it for finishing."
    return finding_at(run, CHECK, Level.REVIEW, row, message, value=error, limit=2.0 * left, unit="mm",
                      remedy="More allowance, or less depth in the last roughing cut.")


def _final_radius(run: Run, z: float) -> float:
    """Outer radius of the part as the program leaves it, at a length; infinite where there is none."""
    import shapely

    final = run.simulation.final
    if final.is_empty:
        return np.inf
    across = final.intersection(shapely.LineString([(z, 0.0), (z, final.bounds[3] + 1.0)]))
    return float(across.bounds[3]) if not across.is_empty else np.inf
