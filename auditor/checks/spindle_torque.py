"""Spindle torque: does the spindle turn the work through the cut, at and below base speed?

What
    Compares the torque that each cut puts on the spindle nose with the torque there, at and below base speed,
    where the drive's torque and not its power is the bound. Above base speed see spindle-power.

Why
    Heavy cuts on large diameters run slowly. There the motor has only part of its power, and a cut that looks
    harmless in kilowatts stalls the spindle with the tool in the work.

Formula and source
    Torque = sum of cutting force x radius along the engaged edge. Torque there = motor power at that speed x
    efficiency / angular speed; constant below base speed. Forces by Kienzle's law; what counts is the load that
    lasts one turn. Stop: the expected torque is over the limit times power_share. Review: only the upper edge of
    the band is, or the short-time rating carries it for its time. Cutting forces under 50 N are not judged.

Remedy
    The feed or depth at which the same law meets the torque, computed for the block; a lower gear; or a higher
    speed, if the tool allows it.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np

from auditor.checks._judging import Excess, threshold
from auditor.checks._remedy import cure
from auditor.checks._spindle import in_units, overloads, share_of_spindle
from auditor.checks._words import finding_over, percent
from auditor.checks.spindle_power import LIMITS as POWER_LIMITS
from auditor.findings import Finding, Level, NotJudged, Run
from auditor.predict.spindle import torque_at

CHECK = "spindle-torque"
LIMITS = POWER_LIMITS


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Every block at or below base speed that asks for more torque than there is."""
    if run.job.workpiece.material.kc11 is None:
        yield NotJudged(CHECK, f"no force pair is known for {run.job.workpiece.material.name}")
        return
    allowed = threshold(run, LIMITS[0])
    for excess, borne in overloads(run, above_base=False, allowed=allowed):
        yield _finding(run, excess, borne, allowed)


def _finding(run: Run, excess: Excess, borne: bool, allowed: float) -> Finding:
    machine = run.job.machine
    rpm = float(run.prediction.loads.rpm[excess.row])
    told = in_units(excess, float(torque_at(machine, np.array([rpm]))[0]))
    remedy = cure(run, excess, lambda loads: share_of_spindle(machine, loads, above_base=False) / allowed)
    sure = "stalls" if excess.value > excess.limit else "may stall"
    message = f"The cut {sure} the spindle at {rpm:.0f} rpm, about {percent(excess.value)} of its torque there. " \
              f"It needs {told.value:.0f} N m ({told.band[0]:.0f} to {told.band[1]:.0f}) at the spindle nose and may " \
              f"use {told.limit:.0f} N m (machine as declared)."
    if borne:
        message += " The short-time rating carries it."
    finding = finding_over(run, CHECK, told, message, "N m", remedy)
    return replace(finding, level=Level.REVIEW) if borne else finding
