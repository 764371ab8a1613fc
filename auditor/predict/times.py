"""How long moves take, and how much of it the edge is engaged."""

from __future__ import annotations

import math
from collections.abc import Sequence

import numpy as np

from auditor.declared.model import Machine
from auditor.interpret.moves import Kind, Move
from auditor.mechanics.kinematics import feed_time, rapid_time, surface_speed_arc_time, surface_speed_line_time
from auditor.predict.kinematics import Commands
from auditor.predict.loads import Floats, Ints, Loads
from auditor.simulate.pieces import arc_sweep, path_length


def move_times(moves: Sequence[Move], machine: Machine, commands: Commands) -> Floats:
    """Seconds per move; NaN where feed, speed or a position is not known."""
    times = np.full(len(moves), math.nan)
    known = [move for move in moves if move.start is not None and move.end is not None]
    for move in known:
        times[move.index] = _rapid(move, machine) if move.kind is Kind.RAPID else _arc(move, commands)
    lines = np.array(
        [move.index for move in known if move.kind is not Kind.RAPID and move.centre is None], dtype=np.int64
    )
    times[lines] = _lines([moves[index] for index in lines], lines, commands)
    return times


def _rapid(move: Move, machine: Machine) -> float:
    start, end = move.start, move.end
    if start is None or end is None:
        return math.nan
    return max(
        float(rapid_time(end.z - start.z, machine.rapid_z)), float(rapid_time(end.r - start.r, machine.rapid_x))
    )


def _lines(moves: Sequence[Move], index: Ints, commands: Commands) -> Floats:
    length = np.array([path_length(move) for move in moves])
    start = np.array([move.start_r for move in moves], dtype=np.float64)
    end = np.array([move.end_r for move in moves], dtype=np.float64)
    feed, value, ceiling = commands.feed[index], commands.value[index], commands.ceiling[index]
    surface = commands.surface[index]
    turning = surface_speed_line_time(start, end, length, feed, np.where(surface, value, np.nan), ceiling)
    steady = feed_time(length, feed, np.minimum(np.where(surface, np.nan, value), ceiling))
    per_rev = np.where(surface, turning, steady)
    return np.where(commands.per_rev[index], per_rev, _per_minute(length, feed))


def _arc(move: Move, commands: Commands) -> float:
    if move.centre is None or move.start is None:
        return math.nan
    index = move.index
    length, feed = path_length(move), commands.feed[index]
    if not commands.per_rev[index]:
        return float(_per_minute(length, feed))
    value, ceiling = commands.value[index], commands.ceiling[index]
    if not commands.surface[index]:
        return float(feed_time(length, feed, min(value, ceiling)))
    radius = math.hypot(move.start.r - move.centre.r, move.start.z - move.centre.z)
    begin = math.degrees(math.atan2(move.start.r - move.centre.r, move.start.z - move.centre.z))
    end = begin + math.degrees(arc_sweep(move))
    return float(surface_speed_arc_time(move.centre.r, radius, begin, end, feed, value, ceiling))


def _per_minute(length: Floats | float, feed: Floats | float) -> Floats:
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(np.asarray(feed) > 0.0, 60.0 * np.asarray(length) / np.asarray(feed), np.nan)


def cutting_times(loads: Loads, piece: Ints, moves: int) -> Floats:
    """Seconds per move with the edge engaged; the pace between two positions is the mean of both.

    ``piece`` (k,) is the straight piece that each row of Loads lies on.
    """
    with np.errstate(divide="ignore", invalid="ignore"):
        pace = 60.0 / (loads.feed * loads.rpm)
    engaged = (loads.depth[:-1] > 0.0) | (loads.depth[1:] > 0.0)
    counted = engaged & (piece[:-1] == piece[1:]) & np.isfinite(pace[:-1]) & np.isfinite(pace[1:])
    spans = np.diff(loads.position) * 0.5 * (pace[:-1] + pace[1:])
    return np.bincount(loads.move[:-1][counted], weights=spans[counted], minlength=moves).astype(np.float64)
