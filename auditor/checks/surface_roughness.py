"""Surface roughness: is the feed low enough for the surface that is asked for?

What
    Works out the roughness that feed and nose radius leave on the moves that make the finished surface, with what
    the real cut adds to it, and compares it with what the drawing asks.

Why
    The tool leaves a fine thread. Its height grows with the square of the feed, and no care at the machine makes
    it lower. At low speeds the built-up edge doubles it.

Formula and source
    Ideal profile of nose arc and edges, exact (Ra about f^2 / (18 sqrt(3) r) for the arc alone), times real over
    ideal: 1.25 at 100 m/min on ductile metal, 2 at 50 (Groover; Ghosh and Mallik, seen at second hand). Rz is
    compared with the ideal height times the same factor. Review at most, since wiper edges and burnishing are
    not modelled. Arcs, and moves the outline does not follow, are judged by the tool's nominal edge angles.

Remedy
    The feed at which the same formula meets the demand, or a larger nose radius.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from auditor.checks._cuts import Cut, cuts
from auditor.checks._remedy import feed_word
from auditor.checks._words import figure, finding_at
from auditor.findings import Finding, Level, NotJudged, Run
from auditor.mechanics.copying import minor_edge_angle
from auditor.mechanics.roughness import average_roughness, peak_to_valley, real_to_ideal

CHECK = "surface-roughness"
LIMITS = ()
NO_CUT = 0.001  # mm of depth: the tool only follows a surface that is there already
LEAST_MINOR = 1.0  # deg; a trailing edge along the surface itself would leave no thread at all


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Finishing moves that leave a rougher surface than asked."""
    asked = run.job.workpiece.roughness
    if asked is None:
        yield NotJudged(CHECK, "workpiece.roughness is not declared")
        return
    depths = run.prediction.loads.depth
    for cut in cuts(run):
        if not cut.largest(depths) > NO_CUT:
            continue
        if run.simulation.final_surface[cut.move.index] and cut.tool.nose_radius > 0.0:
            finding = _judge_cut(run, cut, *asked)
            if finding is not None:
                yield finding


def _judge_cut(run: Run, cut: Cut, measure: str, asked: float) -> Finding | None:
    loads = run.prediction.loads
    row = cut.row_of_largest(loads.feed)
    used, speed = float(loads.feed[row]), cut.largest(loads.speed_high)
    if not np.isfinite(used) or not np.isfinite(speed):
        return None
    free = run.job.workpiece.material.chips == "short"
    factor = float(real_to_ideal(speed, free_cutting=free))
    ideal = _ideal(cut, measure, used)
    real = ideal * factor
    if real <= asked:
        return None
    message = f"The feed leaves {measure} {figure(real, 2)} um on the surface ({figure(ideal, 2)} ideal times " \
              f"{figure(factor, 2)} at {speed:.0f} m/min); asked for is {figure(asked, 2)} um."
    slower = _feed_for(cut, measure, asked / factor, used)
    remedy = f"{feed_word(run, cut.move, slower)} meets it, or a larger nose." if slower else "A larger nose radius."
    return finding_at(run, CHECK, Level.REVIEW, row, message, value=real, limit=asked, unit="um", words=("F",),
                      remedy=remedy)


def _ideal(cut: Cut, measure: str, used: float) -> float:
    kappa = cut.tool.cutting_edge_angle
    minor = max(float(minor_edge_angle(kappa, cut.tool.included_angle)), LEAST_MINOR) if cut.tool.shape != "R" else 60.0
    if measure == "Ra":
        return float(average_roughness(used, cut.tool.nose_radius, kappa, minor))
    return float(peak_to_valley(used, cut.tool.nose_radius, kappa, minor))


def _feed_for(cut: Cut, measure: str, ideal: float, used: float) -> float:
    """The largest feed, rounded down to 0.005 mm, that leaves at most that ideal roughness; 0 when none does."""
    steps = int(used / 0.005)
    while steps > 0 and _ideal(cut, measure, steps * 0.005) > ideal:
        steps -= 1
    return steps * 0.005
