"""What the prediction hands on: forces, power and the cutting situation along every cutting move."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]


@dataclass(frozen=True, slots=True)
class Loads:
    """One row per position of the simulation, stretches summed; shape (k,), NaN where a figure does not apply.

    Forces in N, lengths in mm, speeds as named. ``travel`` runs on over consecutive cutting moves, so that
    "at least one feed of travel" can be judged across the joints of short moves.
    """

    move: Ints
    position: Floats  # mm of path from the start of the move
    travel: Floats  # mm of path from the start of the unbroken run of feed moves
    run: Ints  # number of that unbroken run
    z: Floats  # programmed point
    r: Floats
    depth: Floats  # extent of the engaged edge across the feed, summed over stretches
    length: Floats  # engaged edge length
    area: Floats  # mm2, feed x depth
    chip_max: Floats  # largest local uncut chip thickness
    chip_mean: Floats  # area / length of the stretch with the largest force
    chip_equivalent: Floats  # Woxen/Bromssen thickness of that stretch
    rake: Floats  # deg, effective, of that stretch
    feed: Floats  # mm/rev
    rpm: Floats
    speed_low: Floats  # m/min at the tip
    speed_high: Floats  # m/min at the outermost engaged radius
    cutting: Floats  # Fc
    feed_force: Floats  # along the feed, net
    passive: Floats  # across the feed in the z-r plane, net
    force_z: Floats  # on the tool along machine Z, signed
    force_x: Floats  # on the tool along machine X (radial), signed
    torque: Floats  # N m
    power: Floats  # kW at the cutting edge
    motor_power: Floats  # kW
    scatter: Floats  # one-sided relative uncertainty of Fc, power, torque
    outermost: Floats  # largest engaged radius, mm
    compliance: Floats  # mm/N, radial, of the work at the cut (mechanics I1)
    bend: Floats  # mm, radial push-off of the work by the nominal passive force on the work
    bend_tangential: Floats  # mm, by the cutting force


@dataclass(frozen=True, slots=True)
class MoveFigures:
    """Per move, shape (moves,): times and the largest figures along it; NaN where none applies."""

    time: Floats  # s
    cutting_time: Floats  # s with the edge engaged
    feed_rev: Floats  # mm/rev, largest along the move
    rpm_low: Floats
    rpm_high: Floats
    speed_low: Floats  # m/min
    speed_high: Floats
    depth: Floats
    length: Floats
    chip_max: Floats
    area: Floats
    rake: Floats  # at the largest cutting force
    cutting: Floats
    feed_force: Floats
    passive: Floats
    torque: Floats
    power: Floats
    motor_power: Floats


@dataclass(frozen=True, slots=True)
class Prediction:
    """Loads along the program and the figures of every move."""

    loads: Loads
    moves: MoveFigures
    wear_factor: float

    def band(self, value: float, scatter: float) -> tuple[float, float]:
        """Lower and upper edge of a predicted figure, worn edge included ([model] of the job file)."""
        upper = (scatter**2 + (self.wear_factor - 1.0) ** 2) ** 0.5
        return value * (1.0 - scatter), value * (1.0 + upper)
