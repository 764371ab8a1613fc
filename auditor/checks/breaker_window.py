"""Chip-breaker window: does the chip-breaker work at this feed and depth?

What
    Compares feed and depth of straight cuts (cylinders and faces) with the declared window of the chip-breaker,
    where the chip lasts. Entries, tapers, arcs and spring passes are left out: they are over before it matters.

Why
    Under the window the chip slides over the breaker and comes off as a string, which winds round work and chuck.
    Over it the chip is crushed and the breaker wall breaks.

Formula and source
    The window is the one declared for the tool. The unbroken chip's length is the cut length over the chip
    compression of about 2.5 (common practice); a review needs more than chip_length of it. Short-chip material
    is not judged below the window. Without a declared window there is no finding.

Remedy
    A feed or depth inside the window, or an insert whose window holds this cut.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from auditor.checks._cuts import SPRING_PASS, Cut, along_axis, cuts
from auditor.checks._judging import origin, threshold
from auditor.checks._words import feed_rate, figure, finding_at, length
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "breaker-window"
LIMITS = (Limit("chip_length", 1.0, "m", "common practice", "longest unbroken chip"),)
COMPRESSION = 2.5  # cut length over chip length; 1.5 to 3 for usual steels


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Straight cuts that run outside the declared window for long."""
    for cut in cuts(run):
        if not along_axis(cut.move):
            continue
        loads = run.prediction.loads
        for name, figures, window in (
            ("Feed", loads.feed, cut.tool.breaker_feed), ("Depth", loads.depth, cut.tool.breaker_depth),
        ):
            if window is not None:
                finding = _judge_side(run, cut, name, figures[cut.rows], window)
                if finding is not None:
                    yield finding


def _judge_side(
    run: Run, cut: Cut, name: str, figures: NDArray[np.float64], window: tuple[float, float]
) -> Finding | None:
    low, high = window
    real = run.prediction.loads.depth[cut.rows] > SPRING_PASS
    under = real & (figures < low * (1.0 - 1e-6))
    over = real & (figures > high * (1.0 + 1e-6))
    sides = [(over, high, "over")]
    if run.job.workpiece.material.chips == "long":
        sides.append((under, low, "under"))
    for outside, limit, side in sides:
        chip = chip_length(run, cut, outside)
        if chip > threshold(run, LIMITS[0]):
            row = cut.rows.start + _longest_stretch(run, cut, outside)
            return _finding(run, cut, name, float(figures[row - cut.rows.start]), limit, side, chip, row)
    return None


def _longest_stretch(run: Run, cut: Cut, outside: NDArray[np.bool_]) -> int:
    """Row of the cut at which the longest steady stretch outside the window begins."""
    steps = np.diff(run.prediction.loads.travel[cut.rows])
    return int(np.argmax(np.where(outside[:-1] & outside[1:], steps, -1.0)))


def chip_length(run: Run, cut: Cut, outside: NDArray[np.bool_]) -> float:
    """Length, m, of the chip made where the cut is outside the window."""
    loads = run.prediction.loads
    steps = np.diff(loads.travel[cut.rows])
    both = outside[:-1] & outside[1:]
    mean_r = 0.5 * (np.abs(loads.r[cut.rows][:-1]) + np.abs(loads.r[cut.rows][1:]))
    turns = steps / loads.feed[cut.rows][:-1]
    length = float(np.nansum(np.where(both, turns * 2.0 * math.pi * mean_r, 0.0)))
    return length / COMPRESSION / 1000.0


def _finding(
    run: Run, cut: Cut, name: str, value: float, limit: float, side: str, chip: float, row: int
) -> Finding:
    words = feed_rate if name == "Feed" else length
    fate = "the chip comes off as a string" if side == "under" else "the chip is crushed against the breaker"
    bound = "from" if side == "under" else "to"
    message = f"{name} {words(run, value)} is {side} the chip-breaker's window ({bound} {words(run, limit)}): " \
              f"{fate}, about {figure(chip)} m of it. {origin(run, LIMITS)}"
    side_word = "at least" if side == "under" else "at most"
    return finding_at(run, CHECK, Level.REVIEW, row, message, value=value, limit=limit,
                      unit="mm/rev" if name == "Feed" else "mm", words=("F",) if name == "Feed" else (),
                      remedy=f"{name} {side_word} {words(run, limit)}, or an insert for this cut.")
