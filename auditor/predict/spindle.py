"""What the declared spindle can give at a speed."""

from __future__ import annotations

import numpy as np

from auditor.declared.model import Machine
from auditor.mechanics.power import torque_from_power
from auditor.predict.loads import Floats


def power_at(machine: Machine, rpm: Floats) -> Floats:
    """Motor power, kW, for as long as one likes: as the curve has it, constant torque below its first point."""
    speeds, powers = (np.array(column) for column in zip(*machine.power_curve, strict=True))
    inside = np.interp(rpm, speeds, powers)
    power: Floats = np.where(rpm < speeds[0], powers[0] * rpm / speeds[0], inside)
    return power


def torque_at(machine: Machine, rpm: Floats) -> Floats:
    """Torque at the spindle nose, N m, that belongs to that power; NaN with the spindle at rest."""
    turning = np.where(rpm > 0.0, rpm, np.nan)
    return torque_from_power(power_at(machine, turning) * machine.efficiency, turning)
