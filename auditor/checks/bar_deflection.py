"""Bar deflection: does the boring bar bend, or hang out too far?

What
    Compares the overhang of bars and shanks with what their material bears, and the push-off at the edge of a
    boring bar with the tolerance on the moves that make the finished bore.

Why
    A long bar springs away from the cut: the bore comes out small and tapered, and the bar sings.

Formula and source
    Round bar y = F L^3 / (3 E I) (Roark). Overhang over diameter, common practice: steel 4 at most, heavy metal
    and carbide 6; square shanks 2 heights at most. Review: over that. Stop: twice the expected push-off over the
    tolerance. Review: its band is, or it is over a third of the tolerance. The passive force is known to 50 %.

Remedy
    A shorter overhang, a thicker bar, or one of heavy metal or carbide; a smaller nose radius.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._bending import bar_push_off, shank_give
from auditor.checks._cuts import Cut, cuts
from auditor.checks._judging import THRUST_SCATTER, threshold
from auditor.checks._words import figure, finding_at, thousandths
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.mechanics.bars import overhang_limit

CHECK = "bar-deflection"
LIMITS = (Limit("shank_overhang", 2.0, "", "common practice", "largest overhang of a square shank in heights"),)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Bars that hang out too far or bend too much."""
    seen: set[int] = set()
    for cut in cuts(run, ("turning", "boring", "threading")):
        if cut.tool.number not in seen:
            seen.add(cut.tool.number)
            finding = _overhang(run, cut)
            if finding is not None:
                yield finding
        if cut.tool.kind != "boring":
            continue
        if shank_give(cut.tool) is None:
            yield NotJudged(CHECK, f"tools.{cut.tool.number}: overhang or bar_diameter is not declared")
        elif run.simulation.final_surface[cut.move.index]:
            finding = _push_off(run, cut)
            if finding is not None:
                yield finding


def _overhang(run: Run, cut: Cut) -> Finding | None:
    tool = cut.tool
    if tool.overhang is None:
        return None
    if tool.bar_diameter is not None:
        ratio, limit, size = tool.overhang / tool.bar_diameter, overhang_limit(tool.bar_material).high, "diameters"
    elif tool.shank_height is not None:
        ratio, limit, size = tool.overhang / tool.shank_height, threshold(run, LIMITS[0]), "shank heights"
    else:
        return None
    if ratio <= limit * (1.0 + 1e-9):
        return None
    message = f"{tool.name} hangs out {figure(ratio)} {size}; a {tool.bar_material} one bears {figure(limit)} " \
              "(common practice). It bends and sings."
    return finding_at(run, CHECK, Level.REVIEW, cut.row_of_largest(run.prediction.loads.depth), message, value=ratio,
                      limit=limit, unit="", remedy="Clamp it shorter, or take a thicker or stiffer bar.")


def _push_off(run: Run, cut: Cut) -> Finding | None:
    tolerance = run.job.workpiece.diameter_tolerance
    error = 2.0 * bar_push_off(run, cut)
    if tolerance is None or error <= tolerance / 3.0:
        return None
    low, high = run.prediction.band(error, THRUST_SCATTER)
    level = Level.STOP if error > tolerance else Level.REVIEW
    limit = tolerance if high > tolerance else tolerance / 3.0
    small, least, most, asked = (thousandths(run, part) for part in (error, low, high, tolerance))
    message = f"The bar springs away and the bore is {small} too small ({least} to {most}); the tolerance is " \
              f"{asked}, and bending should take a third of it at most."
    return finding_at(run, CHECK, level, cut.row_of_largest(run.prediction.loads.passive), message, value=error,
                      band=(low, high), limit=limit, unit="mm",
                      remedy="A shorter or stiffer bar, a smaller nose radius, or a spring pass.")
