"""Built-up edge: does the chip weld to the edge at this speed?

What
    Compares the cutting speed of turning and boring cuts with the range in which the work material builds up on the
    edge, where the rake is too small to keep it off.

Why
    Welded metal takes over the cutting, grows and tears off with bits of the edge: a torn surface, a size that
    jumps, a crumbling edge.

Formula and source
    The range is the material's (catalogue or declared); it vanishes above it and with rakes over bue_rake (common
    practice; the speeds show in published roughness curves, seen at second hand). What counts is the fastest place of a
    cut, so facing to the centre is not blamed. Review on a surface that stays and where roughness is asked for;
    else a note, once a tool.

Remedy
    A speed above the range, a freer-cutting edge, or cooling with oil.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from auditor.checks._cuts import Cut, cuts, wipes_outwards
from auditor.checks._judging import origin, threshold
from auditor.checks._words import angle, finding_at
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "built-up-edge"
LIMITS = (Limit("bue_rake", 15.0, "deg", "common practice", "least rake that keeps the edge clean"),)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts inside the range in which the chip welds on."""
    band = run.job.workpiece.material.built_up_edge
    if band is None:
        return
    noted: set[int] = set()
    loads = run.prediction.loads
    speeds = np.where(loads.depth > 0.0, loads.speed_high, np.nan)
    for cut in cuts(run):
        if wipes_outwards(cut):
            continue
        finding = _judge_cut(run, cut, speeds, *band)
        if finding is None or (finding.level is Level.NOTE and cut.tool.number in noted):
            continue
        noted.add(cut.tool.number)
        yield finding


def _judge_cut(run: Run, cut: Cut, speeds: NDArray[np.float64], low: float, high: float) -> Finding | None:
    loads = run.prediction.loads
    speed = cut.largest(speeds)
    row = cut.row_of_largest(speeds)
    rake = float(loads.rake[row])
    if not low <= speed < high or not rake < threshold(run, LIMITS[0]):
        return None
    asked = run.job.workpiece.roughness is not None and run.simulation.final_surface[cut.move.index]
    message = f"At {speed:.0f} m/min the chip welds to the edge ({low:.0f} to {high:.0f} m/min in " \
              f"{run.job.workpiece.material.name}, rake {angle(rake)}). {origin(run, LIMITS)}"
    return finding_at(run, CHECK, Level.REVIEW if asked else Level.NOTE, row, message, value=speed, limit=high,
                      unit="m/min", words=("S",), remedy=f"Over {high:.0f} m/min, or a freer-cutting edge.")
