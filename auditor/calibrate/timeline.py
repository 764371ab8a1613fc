"""The predicted motor power over the time of the program, so that a log can be laid beside it."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from auditor.findings import Run
from auditor.interpret.moves import Kind
from auditor.predict.kinematics import Commands

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]

INSTANT = 1e-9  # s, between the two nodes of a jump


@dataclass(frozen=True, slots=True)
class Timeline:
    """Nodes of predicted power over time; straight between them. Moves follow each other without a gap."""

    time: Floats  # (nodes,) s from the start of the program, rising
    power: Floats  # (nodes,) kW at the motor; NaN where it is not known
    rpm: Floats  # (nodes,)
    start: Floats  # (moves,) s
    end: Floats  # (moves,) s, dwell not included
    feeds: NDArray[np.bool_]  # (moves,) a feed move with the spindle turning
    complete: bool  # every move's time is known

    def power_at(self, time: Floats) -> Floats:
        """Predicted power at any time."""
        return np.interp(time, self.time, self.power, left=0.0, right=0.0)

    def rpm_at(self, time: Floats) -> Floats:
        """Spindle speed at any time."""
        return np.interp(time, self.time, self.rpm)

    def move_at(self, time: Floats) -> Ints:
        """The move under way at any time, -1 before the first and in dwells."""
        index = np.searchsorted(self.start, time, side="right") - 1
        return np.where((index >= 0) & (time <= self.end[np.maximum(index, 0)]), index, -1)

    def mean(self, moves: Ints) -> tuple[float, float, float, float]:
        """Mean power, largest power, mean speed and time of some moves together."""
        work = turns = duration = most = 0.0
        for index in moves:
            low, high = np.searchsorted(self.time, (self.start[index], self.end[index] + INSTANT))
            t = self.time[low:high]
            if len(t) < 2:
                continue
            work += _area(self.power[low:high], t)
            turns += _area(self.rpm[low:high], t)
            duration += float(t[-1] - t[0])
            most = max(most, float(np.nanmax(self.power[low:high], initial=0.0)))
        if duration <= 0.0:
            return math.nan, math.nan, math.nan, 0.0
        return work / duration, most, turns / duration, duration


def _area(values: Floats, over: Floats) -> float:
    return float(np.sum(0.5 * (values[1:] + values[:-1]) * np.diff(over)))


def timeline_of(run: Run) -> Timeline:
    """The predicted power of an audited program, move after move."""
    moves, figures, loads = run.path.moves, run.prediction.moves, run.prediction.loads
    commands = Commands.of(moves, run.job.machine)
    rows_of = {int(move): rows for move, rows in _rows(loads.move)}
    nodes: list[tuple[Floats, Floats, Floats]] = []
    start, end = np.zeros(len(moves)), np.zeros(len(moves))
    clock = 0.0
    for move in moves:
        length = float(figures.time[move.index])
        length = length if math.isfinite(length) else 0.0
        start[move.index], end[move.index] = clock, clock + length
        rows = rows_of.get(move.index)
        if rows is not None and length > 0.0 and move.kind is not Kind.RAPID:
            local = _local_time(loads.position[rows], loads.feed[rows] * loads.rpm[rows], length)
            nodes.append((clock + local, loads.motor_power[rows], loads.rpm[rows]))
        else:
            index = np.array([move.index, move.index])
            radii = np.array([move.start_r or 0.0, move.end_r or 0.0])
            nodes.append((np.array([clock, clock + length]), np.zeros(2), commands.rpm(index, radii)))
        clock += length + move.dwell_after
    time = np.concatenate([node[0] for node in nodes]) if nodes else np.zeros(1)
    turning = np.array([move.spindle.direction != 0 and move.kind is not Kind.RAPID for move in moves], dtype=bool)
    return Timeline(
        time=np.maximum.accumulate(time + INSTANT * np.arange(len(time)) / max(len(time), 1)),
        power=np.concatenate([node[1] for node in nodes]) if nodes else np.zeros(1),
        rpm=np.nan_to_num(np.concatenate([node[2] for node in nodes])) if nodes else np.zeros(1),
        start=start, end=end, feeds=turning,
        complete=bool(np.isfinite(figures.time).all()),
    )  # fmt: skip


def _rows(move: Ints) -> list[tuple[int, slice]]:
    owners, first = np.unique(move, return_index=True)
    ends = np.append(first[1:], len(move))
    return [(int(owner), slice(int(low), int(high))) for owner, low, high in zip(owners, first, ends, strict=True)]


def _local_time(position: Floats, speed: Floats, length: float) -> Floats:
    """Seconds from the start of a move at its positions; the pace follows the speed, the whole takes ``length``."""
    with np.errstate(divide="ignore", invalid="ignore"):
        pace = np.where(speed > 0.0, 1.0 / speed, np.nan)
    pace = np.where(np.isfinite(pace), pace, np.nanmean(pace) if np.isfinite(pace).any() else 1.0)
    steps = np.concatenate(([0.0], np.cumsum(np.diff(position) * 0.5 * (pace[1:] + pace[:-1]))))
    whole = steps[-1]
    return steps * (length / whole) if whole > 0.0 else np.linspace(0.0, length, len(position))
