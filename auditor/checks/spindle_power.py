"""Spindle power: does the motor carry the cut above base speed?

What
    Compares the motor power that each cut needs with the power the spindle gives at the speed it then runs,
    above base speed, where power and not torque is the bound. Below base speed see spindle-torque; a cut is
    never counted by both.

Why
    An overloaded spindle slows down under load, the feed per turn stays, the insert is crushed; or the drive
    trips in the middle of the cut with the tool standing in the work.

Formula and source
    Motor power = cutting force x cutting speed / 60 000 / efficiency (kW; N and m/min). The force follows
    Kienzle's law with the factors named in the report. What counts is the load that lasts one turn of the work.
    Stop: the expected power is over the continuous rating times power_share. Review: only the upper edge of the
    band is over it, or the short-time rating carries the cut and all such cuts of a part together stay within
    its time. Cutting forces under 50 N are not judged. The rating is the machine's, as declared.

Remedy
    The feed or the depth at which the same law meets the rating, computed for the block; or a freer-cutting
    chip-breaker (1.5 % less force for each degree of effective rake), or a lower cutting speed.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np

from auditor.checks._judging import Excess, threshold
from auditor.checks._remedy import cure
from auditor.checks._spindle import in_units, overloads, share_of_spindle
from auditor.checks._words import figure, finding_over, percent
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.predict.spindle import power_at

CHECK = "spindle-power"
LIMITS = (
    Limit("power_share", 1.0, "", "declared", "share of the spindle's power and torque that a job may use"),
)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Every block that needs more motor power than there is."""
    if run.job.workpiece.material.kc11 is None:
        yield NotJudged(CHECK, f"no force pair is known for {run.job.workpiece.material.name}")
        return
    allowed = threshold(run, LIMITS[0])
    for excess, borne in overloads(run, above_base=True, allowed=allowed):
        yield _finding(run, excess, borne, allowed)


def _finding(run: Run, excess: Excess, borne: bool, allowed: float) -> Finding:
    machine = run.job.machine
    rpm = float(run.prediction.loads.rpm[excess.row])
    there = float(power_at(machine, np.array([rpm]))[0])
    told = in_units(excess, there)
    remedy = cure(run, excess, lambda loads: share_of_spindle(machine, loads, above_base=True) / allowed)
    if excess.value > excess.limit:
        lead = f"The cut takes more than the spindle gives at this speed; the load meter would read about " \
               f"{percent(excess.value)}."
    else:
        lead = f"The cut may take more than the spindle gives at this speed; the load meter would read " \
               f"{percent(excess.band[0])} to {percent(excess.band[1])}."
    message = f"{lead} It needs {figure(told.value)} kW ({figure(told.band[0])} to {figure(told.band[1])}) of motor " \
              f"power and may use {figure(told.limit)} kW at {rpm:.0f} rpm (machine as declared)."
    if borne:
        message += f" The short-time rating carries it ({figure(there * machine.peak_factor)} kW)."
    finding = finding_over(run, CHECK, told, message, "kW", remedy)
    return replace(finding, level=Level.REVIEW) if borne else finding
