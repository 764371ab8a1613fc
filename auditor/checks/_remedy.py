"""Computed ways out: the feed or depth at which the force law itself brings a figure to its limit."""

from __future__ import annotations

import math
from collections.abc import Callable

import numpy as np
from numpy.typing import NDArray

from auditor.checks._judging import Excess, lasting, rows_of
from auditor.checks._words import INCH, feed, length
from auditor.findings import Run
from auditor.interpret.moves import Kind, Move
from auditor.predict.loads import Loads

Floats = NDArray[np.float64]
Figure = Callable[[Loads], Floats]

FEED_STEP = 0.005  # mm/rev
DEPTH_STEP = 0.05  # mm
LEAST_FEED = 0.05  # mm/rev; what is slower rubs and is no way out (common practice)
MOST_FEED = 2.0  # mm/rev; beyond it the feed itself is the mistake
LEAST_DEPTH = 0.2  # mm, likewise


def feed_within(run: Run, move: Move, figure: Figure, limit: float) -> float | None:
    """The largest feed, mm/rev, rounded down to 0.005, at which the lasting figure meets the limit, if any."""
    from auditor.predict.what_if import at_feed

    now = _largest(run.prediction.loads.feed, run, move)
    if move.kind is Kind.THREAD or now is None:
        return None

    def value(steps: int) -> float:
        loads = at_feed(run.job, run.path, run.simulation, move.index, steps * FEED_STEP)
        return lasting(loads, figure(loads), move.index)

    steps = _last_within(value, math.ceil(now / FEED_STEP - 1e-9) - 1, limit)
    return steps * FEED_STEP if LEAST_FEED <= steps * FEED_STEP <= MOST_FEED else None


def depth_within(run: Run, move: Move, figure: Figure, limit: float) -> float | None:
    """The largest depth, mm, rounded down to 0.05, at which the lasting figure meets the limit, if any."""
    from auditor.predict.what_if import at_depth

    now = _largest(run.prediction.loads.depth, run, move)
    tool = run.job.tools.get(move.tool) if move.tool is not None else None
    if now is None or tool is None or tool.kind not in ("turning", "boring") or move.kind is Kind.THREAD:
        return None

    def value(steps: int) -> float:
        loads = at_depth(run.job, run.path, run.simulation, move.index, steps * DEPTH_STEP)
        return lasting(loads, figure(loads), move.index)

    steps = _last_within(value, math.ceil(now / DEPTH_STEP - 1e-9) - 1, limit)
    return steps * DEPTH_STEP if steps * DEPTH_STEP >= LEAST_DEPTH else None


def _largest(column: Floats, run: Run, move: Move) -> float | None:
    own = column[rows_of(run.prediction.loads, move.index)]
    known = own[np.isfinite(own)]
    return float(known.max()) if len(known) and known.max() > 0.0 else None


def _last_within(value: Callable[[int], float], most: int, limit: float) -> int:
    """The largest whole number up to ``most`` whose value is within the limit, 0 when none is; value rises."""
    low, high = 0, most + 1
    while high - low > 1:
        middle = (low + high) // 2
        if value(middle) <= limit:
            low = middle
        else:
            high = middle
    return low


def cure(run: Run, excess: Excess, share: Figure) -> str | None:
    """Feed or depth that brings ``share`` (figure over limit) to 1, and what clears the band as well."""
    move = excess.move
    if move.kind is Kind.THREAD or not excess.curable:
        return None
    spread = max(excess.band[1] / excess.value, 1.0)
    targets = [("Within the limit at ", 1.0)] if excess.value > excess.limit else []
    targets.append(("clear of the prediction's uncertainty at ", 1.0 / spread))
    parts = [lead + ways for lead, target in targets if (ways := way_out(run, move, share, target))]
    if not parts:
        return None
    sentence = "; ".join(parts)
    return f"{sentence[0].upper()}{sentence[1:]}."


def way_out(run: Run, move: Move, figure: Figure, limit: float) -> str:
    """The feed or the depth that brings a figure to its limit, in words; empty when neither does."""
    slower, shallower = feed_within(run, move, figure, limit), depth_within(run, move, figure, limit)
    ways = [feed_word(run, move, slower)] if slower is not None else []
    if shallower is not None:
        ways.append(f"depth {length(run, shallower)}")
    return " or at ".join(ways)


def feed_word(run: Run, move: Move, per_rev: float) -> str:
    """The F word that gives this feed, in the program's own units and feed mode."""
    scale = INCH if run.path.units == "in" else 1.0
    if move.feed is not None and move.feed.mode == "min":
        rpm = _largest(run.prediction.loads.rpm, run, move)
        return f"F{per_rev * rpm / scale:.0f}" if rpm else f"{length(run, per_rev, 3)} a turn"
    return f"F{math.floor(per_rev / scale * 1e4) / 1e4:.4f}" if scale != 1.0 else f"F{feed(per_rev)}"
