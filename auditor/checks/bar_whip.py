"""Bar whip: does the bar behind the spindle begin to swing?

What
    Compares the spindle's highest speed with the speed at which the free tail of the bar behind the spindle
    begins to whirl.

Why
    A bar that swings bends at the spindle's end within seconds and beats the machine to pieces. Slender bars do
    so at speeds nobody thinks of as fast: a 10 mm steel bar with 1 m free at 434 rpm.

Formula and source
    First bending frequency of a bar held at one end, 3.516 / (2 pi) x sqrt(E I / (rho A L^4)); the whirling speed
    is the same. Stop: the spindle reaches it. Review: the spindle reaches whip_share of it (common practice: half).
    A tail in a guide tube or feeder is not judged.

Remedy
    A speed limit under that share, a shorter bar, or a guide tube.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np

from auditor.checks._judging import origin, threshold
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.mechanics.bending import whipping_speed

CHECK = "bar-whip"
LIMITS = (Limit("whip_share", 0.5, "", "common practice", "largest share of the whirling speed"),)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """The block that turns an unguided bar fastest."""
    holding, work = run.job.workholding, run.job.workpiece
    if holding.tail is None:
        if holding.kind in ("chuck", "collet"):
            yield NotJudged(CHECK, "workholding.tail is not declared (the bar behind the spindle; \"0 mm\" for none)")
        return
    if holding.tail <= 0.0 or holding.tail_guided:
        return
    critical = float(whipping_speed(holding.tail, work.diameter, work.material.modulus, work.material.density))
    turning = np.array([move.spindle.direction != 0 for move in run.path.moves], dtype=bool)
    speeds = np.where(turning, np.nan_to_num(run.prediction.moves.rpm_high), 0.0)
    if not len(speeds) or speeds.max() <= threshold(run, LIMITS[0]) * critical:
        return
    move = run.path.moves[int(np.argmax(speeds))]
    reached = float(speeds.max())
    level = Level.STOP if reached > critical else Level.REVIEW
    fate = "swings out" if level is Level.STOP else "comes near swinging out"
    message = f"The bar behind the spindle {fate}: {holding.tail:.0f} mm of {work.diameter:g} mm bar whirl from " \
              f"{critical:.0f} rpm on, the spindle turns {reached:.0f} rpm. {origin(run, LIMITS)}"
    limit = critical if level is Level.STOP else threshold(run, LIMITS[0]) * critical
    safe = math.floor(threshold(run, LIMITS[0]) * critical)
    yield run.finding(CHECK, level, move, message, value=reached, limit=limit, unit="rpm", words=("S",),
                      remedy=f"Limit the speed to S{safe:d}, cut the bar shorter, or guide its tail.")
