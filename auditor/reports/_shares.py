"""How much of what machine and tool allow a cut uses, and when in the program it does so."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from auditor.findings import Run
from auditor.predict.spindle import power_at

Floats = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Shares:
    """Per row of the loads: the share of each declared limit; NaN where none is declared. ``worst`` is the largest."""

    spindle: Floats
    thrust: Floats
    tool: Floats
    worst: Floats


def shares(run: Run) -> Shares:
    """Shares of spindle power and torque (one figure, as torque is power over speed), axis thrust and tool force."""
    loads, machine = run.prediction.loads, run.job.machine
    nothing = np.full(loads.move.shape, np.nan)
    allowed = run.limits.get("power_share", 1.0)
    with np.errstate(divide="ignore", invalid="ignore"):
        spindle = loads.motor_power / (allowed * power_at(machine, loads.rpm))
        thrust = np.fmax(
            np.abs(loads.force_x) / machine.thrust_x if machine.thrust_x else nothing,
            np.abs(loads.force_z) / machine.thrust_z if machine.thrust_z else nothing,
        )
        tool = np.sqrt(loads.cutting**2 + loads.feed_force**2 + loads.passive**2) / force_limits(run)
    return Shares(spindle, thrust, tool, np.fmax(np.fmax(spindle, thrust), tool))


def force_limits(run: Run) -> Floats:
    """The declared force limit of the tool in each row of the loads, N; NaN where none is declared."""
    limits = {number: tool.force_limit for number, tool in run.job.tools.items() if tool.force_limit is not None}
    per_move = np.array([limits.get(-1 if move.tool is None else move.tool, np.nan) for move in run.path.moves])
    return np.asarray(per_move[run.prediction.loads.move], dtype=np.float64)


def starts(run: Run) -> Floats:
    """Second of the program at which each move starts, and the end of the last; shape (moves + 1,)."""
    spans = np.nan_to_num(run.prediction.moves.time) + np.array([move.dwell_after for move in run.path.moves])
    return np.concatenate(([0.0], np.cumsum(spans)))


def seconds(run: Run) -> Floats:
    """Second of the program at each row of the loads."""
    loads, begin = run.prediction.loads, starts(run)
    if not loads.move.size:
        return np.zeros(0)
    with np.errstate(divide="ignore", invalid="ignore"):
        pace = np.nan_to_num(60.0 / (loads.feed * loads.rpm), posinf=0.0)
    first = np.concatenate(([True], np.diff(loads.move) != 0))
    before = np.concatenate(([0.0], loads.position[:-1]))
    pace_before = np.concatenate((pace[:1], pace[:-1]))
    steps = np.where(first, loads.position * pace, (loads.position - before) * 0.5 * (pace + pace_before))
    running = np.cumsum(steps)
    owner = np.cumsum(first) - 1
    base = (running - steps)[first][owner]
    return np.asarray(np.minimum(begin[loads.move] + running - base, begin[loads.move + 1]))
