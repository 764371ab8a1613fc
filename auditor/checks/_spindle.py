"""How spindle power and torque are judged against what the spindle can give."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import replace

import numpy as np
from numpy.typing import NDArray

from auditor.checks._judging import SMALL_FORCE, Excess, over_limit, worst_by_block
from auditor.declared.model import Machine
from auditor.findings import Run
from auditor.predict.loads import Loads
from auditor.predict.spindle import power_at

Floats = NDArray[np.float64]


def share_of_spindle(machine: Machine, loads: Loads, *, above_base: bool) -> Floats:
    """Motor power needed over motor power there, NaN on the other side of base speed and for tiny forces."""
    side = (loads.rpm > machine.base_speed) if above_base else (loads.rpm <= machine.base_speed)
    judged = side & (loads.cutting >= SMALL_FORCE)
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(judged, loads.motor_power / power_at(machine, loads.rpm), np.nan)


def overloads(run: Run, *, above_base: bool, allowed: float) -> Iterator[tuple[Excess, bool]]:
    """Blocks that ask for more than the allowed share of the spindle, and whether the short-time rating bears each.

    The values are shares of the continuous rating. The short-time rating turns a stop into a question as long as
    all such cuts of a part together stay within its time.
    """
    machine = run.job.machine
    share = share_of_spindle(machine, run.prediction.loads, above_base=above_base)
    excesses = list(over_limit(run, share, allowed, run.prediction.loads.scatter))
    minutes = sum(
        float(run.prediction.moves.cutting_time[excess.move.index]) for excess in excesses if excess.value > allowed
    ) / 60.0
    in_time = machine.peak_time is None or minutes <= machine.peak_time
    for excess in worst_by_block(excesses):
        borne = machine.peak_factor > 1.0 and allowed < excess.value <= allowed * machine.peak_factor and in_time
        yield excess, borne


def in_units(excess: Excess, unit_limit: float) -> Excess:
    """The same excess with its shares turned into kW or N m."""
    low, high = excess.band
    return replace(
        excess, value=excess.value * unit_limit, band=(low * unit_limit, high * unit_limit),
        limit=excess.limit * unit_limit,
    )
