"""Axis thrust: can the slides push the tool through the cut?

What
    Compares the force on the tool along machine X and along machine Z with the thrust of that axis.

Why
    A slide that cannot push stops with a following error, or the drive trips, with the tool in the work. Drilling
    large holes and wide plunging ask most.

Formula and source
    The thrust in the plane of the insert stands at right angles to the chord of the engaged edge (Colwell 1954)
    and is shared out to the two axes; drilling thrust by the lips and the chisel edge. Thrust is known far less
    well than the cutting force: two published ways differ by 1.5 to 1.7, so the band is 50 % either way.
    Stop: the expected force, lasting one turn, is over the axis thrust times thrust_share. Review: the upper
    edge of the band is. Forces under 50 N are not judged. The thrust is the machine's, as declared.

Remedy
    The feed or depth at which the same law meets the thrust, computed for the block; for a drill a smaller
    pilot-drilled web or a split point.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from auditor.checks._judging import SMALL_FORCE, THRUST_SCATTER, over_limit, threshold, worst_by_block
from auditor.checks._remedy import cure
from auditor.checks._words import finding_over, force
from auditor.findings import Finding, Limit, NotJudged, Run
from auditor.interpret.moves import Kind
from auditor.predict.loads import Loads

CHECK = "axis-thrust"
LIMITS = (Limit("thrust_share", 1.0, "", "declared", "share of the axis thrust that a job may use"),)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Every block that pushes harder against an axis than the axis can push."""
    if run.job.workpiece.material.kc11 is None:
        yield NotJudged(CHECK, f"no force pair is known for {run.job.workpiece.material.name}")
        return
    for axis, thrust in (("X", run.job.machine.thrust_x), ("Z", run.job.machine.thrust_z)):
        if thrust is None:
            yield NotJudged(CHECK, f"machine.thrust.{axis.lower()} is not declared")
        else:
            yield from _judge_axis(run, axis, thrust * threshold(run, LIMITS[0]))


def push(loads: Loads, axis: str) -> NDArray[np.float64]:
    """Force along the axis, N; NaN where it is too small to judge."""
    along = np.abs(loads.force_x if axis == "X" else loads.force_z)
    return np.where(along >= SMALL_FORCE, along, np.nan)


def _judge_axis(run: Run, axis: str, limit: float) -> Iterator[Finding]:
    figure = push(run.prediction.loads, axis)
    for excess in worst_by_block(over_limit(run, figure, limit, THRUST_SCATTER)):
        low, high = excess.band
        sure = "pushes" if excess.value > limit else "may push"
        message = f"The cut {sure} back harder than the {axis} slide can: {force(excess.value)} " \
                  f"({force(low)} to {force(high)}) along {axis} against {force(limit)} of thrust (as declared)."
        remedy = cure(run, excess, lambda loads: push(loads, axis) / limit)
        if excess.move.kind is Kind.DRILL:
            message += " About half of a drill's thrust comes from its chisel edge (common practice)."
            ways = "A split point or a pilot hole as wide as the web takes most of that half away."
            remedy = f"{remedy} {ways}" if remedy else ways
        yield finding_over(run, CHECK, excess, message, "N", remedy)
