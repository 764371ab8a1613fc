"""Cutting speed: does the edge run inside its own range?

What
    Compares the speed that each cut really reaches, after every limit of the spindle, with the range declared for
    the tool.

Why
    Too fast, the edge burns in minutes; too slow, the chip welds to it. A speed limit at the spindle often makes a
    small diameter run far slower than the program seems to say.

Formula and source
    Speed = pi x diameter x spindle speed; the range is the one declared for the tool. What counts is the speed
    that lasts one turn, and for the lower end the fastest place of the cut: facing and parting to the centre slow
    down by nature and are not blamed for it. Review.

Remedy
    The S word that brings the cut into the range, where the spindle can give it.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from auditor.checks._cuts import Cut, cuts, wipes_outwards
from auditor.checks._judging import lasting
from auditor.checks._words import finding_at, x_word
from auditor.declared.model import ToolKind
from auditor.findings import Finding, Level, NotJudged, Run

CHECK = "cutting-speed"
LIMITS = ()
CENTRE = 2.5  # mm of radius: a cut that ends there slows down by nature
KINDS: tuple[ToolKind, ...] = ("turning", "boring", "grooving", "face grooving", "parting", "drilling")


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts outside the declared speed range of their tool."""
    undeclared: list[str] = []
    loads = run.prediction.loads
    speeds = np.where(loads.depth > 0.0, loads.speed_high, np.nan)
    for cut in cuts(run, KINDS):
        if cut.tool.kind == "turning" and wipes_outwards(cut):
            continue
        if cut.tool.speed is None:
            undeclared.append(f"T{cut.tool.number}")
            continue
        finding = _judge_cut(run, cut, speeds, *cut.tool.speed)
        if finding is not None:
            yield finding
    if undeclared:
        yield NotJudged(CHECK, f"no speed range is declared for {', '.join(dict.fromkeys(undeclared))}")


def _judge_cut(run: Run, cut: Cut, speeds: NDArray[np.float64], low: float, high: float) -> Finding | None:
    loads = run.prediction.loads
    reached = cut.largest(speeds)
    if reached > high:
        reached = lasting(loads, speeds, cut.move.index, over=high) or high
    row = cut.rows.start + int(np.argmin(np.nan_to_num(np.abs(speeds[cut.rows] - reached), nan=np.inf)))
    if reached > high * (1.0 + 1e-6):
        limit, fate = high, "the edge burns off early"
    elif 0.0 < reached < low * (1.0 - 1e-6) and not _to_centre(cut):
        limit, fate = low, "the chip welds to the edge"
    else:
        return None
    rpm = float(loads.rpm[row])
    held = " (the spindle's limit holds it there)" if limit == low and _held(run, cut, rpm) else ""
    place = f"{x_word(run, float(loads.outermost[row]))} and {rpm:.0f} rpm"
    message = f"The edge runs at {reached:.0f} m/min, at {place}{held}; its range " \
              f"as declared is {low:.0f} to {high:.0f}: {fate}."
    wanted = limit if cut.move.spindle.mode == "surface" else rpm * limit / reached
    rounded = math.floor(wanted) if limit == high else math.ceil(wanted)
    remedy = "A larger speed limit, if safe." if held else f"S{rounded:d}, if the spindle can give it."
    return finding_at(run, CHECK, Level.REVIEW, row, message, value=reached, limit=limit, unit="m/min", words=("S",),
                      remedy=remedy)


def _to_centre(cut: Cut) -> bool:
    """Facing, parting: no spindle keeps the speed up to the axis."""
    return cut.tool.kind != "drilling" and cut.move.end is not None and abs(cut.move.end.r) < CENTRE


def _held(run: Run, cut: Cut, rpm: float) -> bool:
    clamp = cut.move.spindle.clamp
    top = min(clamp, run.job.machine.speed_limit) if clamp is not None else run.job.machine.speed_limit
    return cut.move.spindle.mode == "surface" and rpm >= top * (1.0 - 1e-6)
