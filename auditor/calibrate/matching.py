"""Lays a log beside the prediction: one point a cut, measured and predicted mean power of the same stretch."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass, replace
from typing import NamedTuple

import numpy as np
from numpy.typing import NDArray

from auditor.calibrate.log import LoadLog
from auditor.calibrate.timeline import Timeline
from auditor.declared.model import Machine
from auditor.errors import Fault, UsageError
from auditor.findings import Run
from auditor.interpret.moves import Kind
from auditor.predict.spindle import power_at

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]

SHORTEST = 0.5  # s; a shorter stretch is not seen by a load meter
SPEED_SPREAD = 1.25  # highest over lowest speed of a block: beyond, a mean percentage is not a mean power
STEADY = 0.3  # s to either side over which predicted power must hold still for a timed reading to count
CHANGE = 0.10  # of the power there, that it may still change
FEW = 2  # timed readings a cut needs
LATEST, EARLIEST = 60.0, -2.0  # s by which a tool's work may start later than reckoned (tool changes), or earlier
AGREEMENT = 0.8  # correlation of measured and predicted power from which a log counts as laid over


@dataclass(frozen=True, slots=True)
class Point:
    """One cut, or one stretch of feed in air: mean power over it, kW at the motor."""

    line: int
    tool: int | None
    predicted: float
    measured: float
    rpm: float


class LeftOut(NamedTuple):
    """Something of the log that was not used."""

    what: str  # "line 15", "T3"
    why: str


@dataclass(frozen=True, slots=True)
class Matched:
    """What of a log could be used, and why the rest could not."""

    points: tuple[Point, ...]
    left_out: tuple[LeftOut, ...]
    shifts: tuple[tuple[int, float], ...] = ()  # timed logs: tool, s by which its work began later than reckoned


def match(log: LoadLog, run: Run, timeline: Timeline, *, peak: bool) -> Matched:
    """Points of a log; ``peak`` says that a block's reading is its highest and not its mean.

    Raises
    ------
    UsageError
        Blocks that the program does not have, or a timed log that cannot be laid over the program.
    """
    if log.place == "time_s":
        if peak:
            raise UsageError(Fault("timed readings are momentary", key="--reading", wanted="mean, or a log by line"))
        return _by_time(log, run, timeline)
    return _by_line(log, run, timeline, _lines(log, run), peak)


def power_of(reading: Floats, quantity: str, machine: Machine, rpm: Floats) -> Floats:
    """Readings as kW at the motor."""
    if quantity == "power_kW":
        return reading
    if quantity == "rated_percent":
        return reading / 100.0 * max(power for _, power in machine.power_curve)
    return reading / 100.0 * power_at(machine, rpm)


def _lines(log: LoadLog, run: Run) -> Ints:
    """Source line of every reading."""
    if log.place == "line":
        known = {move.line for move in run.path.moves}
        strange = [int(line) for line in np.unique(log.where) if int(line) not in known]
        if len(strange) == len(np.unique(log.where)):
            raise UsageError(Fault("no reading belongs to a line that moves", file=log.path,
                                   found=f"line {strange[0]}", wanted=f"lines of {run.text.path}"))
        return log.where.astype(np.int64)
    numbers: dict[int, list[int]] = {}
    for block in run.text.blocks:
        if block.number is not None:
            numbers.setdefault(block.number, []).append(block.line)
    faults = []
    for number in (int(value) for value in np.unique(log.where)):
        if len(numbers.get(number, ())) != 1:
            what = "stands more than once in" if number in numbers else "is not in"
            faults.append(Fault(f"N{number} {what} the program", file=log.path, found=f"N{number}",
                                wanted="blocks with numbers of their own, or a log by line"))
    if faults:
        raise UsageError(*faults[:5])
    return np.array([numbers[int(value)][0] for value in log.where], dtype=np.int64)


def _by_line(log: LoadLog, run: Run, timeline: Timeline, lines: Ints, peak: bool) -> Matched:
    points: list[Point] = []
    left_out: list[LeftOut] = []
    for line in np.unique(lines):
        own = [move for move in run.path.moves if move.line == int(line)]
        moves = np.array([move.index for move in own], dtype=np.int64)
        why = _unfit(run, timeline, moves, log.quantity)
        if why:
            left_out.append(LeftOut(f"line {line}", why))
            continue
        mean, most, rpm, _ = timeline.mean(moves)
        reading = log.reading[lines == line]
        value = np.array([reading.max() if peak else reading.mean()])
        measured = float(power_of(value, log.quantity, run.job.machine, np.array([rpm]))[0])
        points.append(Point(int(line), own[0].tool, most if peak else mean, measured, rpm))
    return Matched(tuple(points), tuple(left_out))


def _unfit(run: Run, timeline: Timeline, moves: Ints, quantity: str) -> str | None:
    """Why a block's reading cannot be compared; None when it can."""
    own = [run.path.moves[int(index)] for index in moves]
    if not own:
        return "nothing moves there"
    if any(move.provisional or move.new_stock_state for move in own):
        return "it rests on blocks that were not audited"
    if all(move.kind is Kind.RAPID for move in own):
        return "rapid, where the spindle may still run up"
    mean, _, rpm, seconds = timeline.mean(moves)
    if not math.isfinite(mean) or rpm <= 0.0:
        return "no feed, speed or force is known"
    if seconds < SHORTEST:
        return f"shorter than {SHORTEST:g} s"
    if quantity == "load_percent" and _speed_spread(timeline, moves) > SPEED_SPREAD:
        return "the speed changes within it, and a percentage stands for another power at every speed"
    return None


def _speed_spread(timeline: Timeline, moves: Ints) -> float:
    spans = [np.searchsorted(timeline.time, (timeline.start[index], timeline.end[index])) for index in moves]
    speeds = np.concatenate([timeline.rpm[low : max(high, low + 1)] for low, high in spans])
    turning = speeds[speeds > 0.0]
    return float(turning.max() / turning.min()) if len(turning) else 1.0


def _by_time(log: LoadLog, run: Run, timeline: Timeline) -> Matched:
    if not timeline.complete or run.path.not_audited:
        raise UsageError(Fault("the time of some moves is not known, so a timed log cannot be laid over the program",
                               file=log.path, wanted="a log by line or block"))
    order = np.argsort(log.where, kind="stable")
    laid = replace(log, where=log.where[order], reading=log.reading[order])
    points: list[Point] = []
    left_out: list[LeftOut] = []
    shifts: list[tuple[int, float]] = []
    shift = 0.0
    for tool, first, last in _runs(run):
        found = _shift(laid, run.job.machine, timeline, (first, last), shift)
        if found is None:
            left_out.append(LeftOut(f"T{tool}", "the readings do not follow its predicted load at any shift"))
            continue
        shift = found
        shifts.append((tool, shift))
        points += _points(laid, run, timeline, (first, last), shift)
    if not points:
        raise UsageError(Fault("this log cannot be laid over the program: measured and predicted load do not rise and "
                               "fall together", file=log.path, wanted="a log by line or block, or one of this program"))
    return Matched(tuple(points), tuple(left_out), tuple(shifts))


def _runs(run: Run) -> Iterator[tuple[int, int, int]]:
    """Unbroken work of one tool that cuts anything: tool, first and last move."""
    moves = run.path.moves
    cutting = run.prediction.moves.cutting_time > 0.0
    first = 0
    for index in range(1, len(moves) + 1):
        if index == len(moves) or moves[index].tool != moves[first].tool:
            tool = moves[first].tool
            if tool is not None and bool(cutting[first:index].any()):
                yield tool, first, index - 1
            first = index


def _shift(
    log: LoadLog, machine: Machine, timeline: Timeline, span: tuple[int, int], before: float
) -> float | None:
    """By how much the tool's work began later than reckoned: where the readings follow the prediction best."""
    begin, end = timeline.start[span[0]], timeline.end[span[1]]
    step = float(np.clip(np.median(np.diff(log.where)) if len(log.where) > 1 else 0.1, 0.05, 0.5))
    best, found = AGREEMENT, None
    for shift in np.arange(before + EARLIEST, before + LATEST, step):
        low, high = np.searchsorted(log.where, (begin + shift, end + shift))
        if high - low < 10:
            continue
        time = log.where[low:high] - shift
        predicted = np.nan_to_num(timeline.power_at(time))
        measured = power_of(log.reading[low:high], log.quantity, machine, timeline.rpm_at(time))
        if predicted.std() <= 0.0 or measured.std() <= 0.0:
            continue
        agreement = float(np.corrcoef(predicted, measured)[0, 1])
        if agreement > best:
            best, found = agreement, float(shift)
    return found


def _points(
    log: LoadLog, run: Run, timeline: Timeline, span: tuple[int, int], shift: float
) -> Iterator[Point]:
    """One point a feed move: readings at times when the predicted power holds still."""
    time = log.where - shift
    move = timeline.move_at(time)
    power = timeline.power_at(time)
    early, late = timeline.power_at(time - STEADY), timeline.power_at(time + STEADY)
    swing = np.maximum(np.abs(early - power), np.abs(late - power))
    calm = np.isfinite(swing) & (swing <= CHANGE * np.nan_to_num(power))
    rpm = timeline.rpm_at(time)
    measured = power_of(log.reading, log.quantity, run.job.machine, rpm)
    for index in range(span[0], span[1] + 1):
        own = calm & (move == index)
        if timeline.feeds[index] and int(own.sum()) >= FEW:
            here = run.path.moves[index]
            yield Point(here.line, here.tool, float(power[own].mean()), float(measured[own].mean()),
                        float(rpm[own].mean()))
