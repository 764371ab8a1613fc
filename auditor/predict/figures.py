"""The figures of every move: ranges of speed, largest loads, times."""

from __future__ import annotations

import math
from collections.abc import Sequence
from itertools import pairwise

import numpy as np

from auditor.declared.model import Job, Point
from auditor.interpret.moves import Kind, Move
from auditor.predict.kinematics import Commands
from auditor.predict.loads import Floats, Ints, Loads, MoveFigures
from auditor.predict.times import cutting_times, move_times
from auditor.simulate.pieces import arc_sweep


def move_figures(moves: Sequence[Move], loads: Loads, piece: Ints, job: Job) -> MoveFigures:
    """Ranges and largest values along each move; a feed move in air has zero loads, a rapid or unknown tool none.

    ``piece`` (k,) is the straight piece of each row of Loads.
    """
    commands = Commands.of(moves, job.machine)
    index = np.arange(len(moves))
    near, far = np.array([_radius_range(move) for move in moves]).reshape(-1, 2).T
    rpm_high, rpm_low = commands.rpm(index, near), commands.rpm(index, far)
    feed = np.fmax(commands.feed_per_rev(index, rpm_high), commands.feed_per_rev(index, rpm_low))
    rapid = np.array([move.kind is Kind.RAPID for move in moves], dtype=bool)
    known = np.array([move.tool in job.tools for move in moves], dtype=bool)
    air = np.where(rapid | ~known, np.nan, 0.0)
    first, owner = _first_rows(loads)

    def largest(values: Floats, otherwise: Floats) -> Floats:
        return _per_move(np.fmax.reduceat(values, first) if len(first) else values, owner, otherwise)

    tip = 2.0 * math.pi / 1000.0
    speeds = np.stack((tip * near * rpm_high, tip * far * rpm_low))
    nothing = np.full(len(moves), np.nan)
    return MoveFigures(
        time=move_times(moves, job.machine, commands),
        cutting_time=cutting_times(loads, piece, len(moves)),
        feed_rev=np.where(rapid, np.nan, feed),
        rpm_low=np.fmin(rpm_low, rpm_high),
        rpm_high=np.fmax(rpm_low, rpm_high),
        speed_low=np.fmin(*speeds),
        speed_high=np.fmax(np.fmax(*speeds), largest(loads.speed_high, nothing)),
        depth=largest(loads.depth, air),
        length=largest(loads.length, air),
        chip_max=largest(loads.chip_max, nothing),
        area=largest(loads.area, air),
        rake=_per_move(_at_largest_force(loads, first), owner, nothing),
        cutting=largest(loads.cutting, air),
        feed_force=largest(loads.feed_force, air),
        passive=largest(loads.passive, air),
        torque=largest(loads.torque, air),
        power=largest(loads.power, air),
        motor_power=largest(loads.motor_power, air),
    )


def _first_rows(loads: Loads) -> tuple[Ints, Ints]:
    """First row of every move that cuts, and those moves."""
    owner, first = np.unique(loads.move, return_index=True)
    return first.astype(np.int64), owner.astype(np.int64)


def _per_move(values: Floats, owner: Ints, otherwise: Floats) -> Floats:
    result = otherwise.copy()
    result[owner] = values
    return result


def _at_largest_force(loads: Loads, first: Ints) -> Floats:
    """Effective rake where each cutting move meets its largest cutting force."""
    weight = np.where(np.isnan(loads.cutting), loads.depth, loads.cutting)
    bounds = np.append(first, len(weight))
    rows = [begin + int(np.argmax(weight[begin:end])) for begin, end in pairwise(bounds)]
    return loads.rake[np.array(rows, dtype=np.int64)]


def _radius_range(move: Move) -> tuple[float, float]:
    """Smallest and largest |X| (as radius) that the programmed point passes, NaN when unknown."""
    start, end = move.start, move.end
    if end is None:
        return math.nan, math.nan
    radii = [end.r] if start is None else [start.r, end.r]
    if start is not None and move.centre is not None:
        radii += _arc_extremes(move, start, move.centre)
    low, high = min(radii), max(radii)
    nearest = 0.0 if low <= 0.0 <= high else min(abs(low), abs(high))
    return nearest, max(abs(low), abs(high))


def _arc_extremes(move: Move, start: Point, centre: Point) -> list[float]:
    """Radii of the arc's highest and lowest point where the arc passes them."""
    sweep = arc_sweep(move)
    begin = math.atan2(start.r - centre.r, start.z - centre.z)
    radius = math.hypot(start.r - centre.r, start.z - centre.z)
    turn = 1.0 if sweep > 0.0 else -1.0
    return [
        centre.r + radius * math.sin(pole)
        for pole in (math.pi / 2.0, -math.pi / 2.0)
        if (turn * (pole - begin)) % math.tau <= abs(sweep)
    ]
