"""Feed missing, zero, or in the wrong mode: does the tool move as meant?

What
    Looks at every cut for a feed that was never given, is zero, was carried over a change between feed a turn and
    feed a minute, or is implausible for a cut.

Why
    Without a feed the control alarms or stands. A number meant as mm a minute read as mm a turn drives the tool
    through the work in one turn; the other way round the tool rubs for hours.

Formula and source
    Common practice: no single-point cut but a thread advances more than 2 mm a turn, and none creeps below 5 mm a
    minute. Stop: no feed, feed zero, more than the largest feed a turn, or less than the least a minute and a turn.
    Review: the mode changed without a new F, or the feed is slower than the least a minute alone.

Remedy
    An F word in the block, in the mode that is in force (a turn: G99 in system A, G95 in B and C; a minute: G98
    in A, G94 in B and C).
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np

from auditor.checks._judging import cutting_moves, origin, rows_of, threshold
from auditor.checks._remarks import findings_of
from auditor.checks._words import length
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Feed, Kind, Move

CHECK = "feed-missing"
LIMITS = (
    Limit("largest_feed", 2.0, "mm", "common practice", "largest feed a turn"),
    Limit("least_feed_per_minute", 5.0, "mm", "common practice", "least feed a minute"),
    Limit("least_feed", 0.005, "mm", "common practice", "least feed a turn"),
)
LEVELS = {
    "feed-missing": Level.STOP,
    "feed-zero": Level.STOP,
    "feed-mode-without-feed": Level.REVIEW,
    "feed-implausible": Level.REVIEW,
}


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts whose feed cannot be meant."""
    yield from findings_of(run, CHECK, LEVELS)
    told: set[Feed | None] = set()
    for index in np.flatnonzero(cutting_moves(run)):
        move = run.path.moves[int(index)]
        if move.kind in (Kind.RAPID, Kind.THREAD) or move.feed in told:
            continue
        finding = _unfed(run, move) if move.feed is None or move.feed.value <= 0.0 else _implausible(run, move)
        if finding is not None:
            told.add(move.feed)
            yield finding


def _unfed(run: Run, move: Move) -> Finding:
    missing = "No feed has been given" if move.feed is None else "The feed is zero"
    message = f"{missing} for this cut: the control alarms, or the tool stands in the work."
    return run.finding(CHECK, Level.STOP, move, message, words=("F",), remedy="An F word in this block.")


def _implausible(run: Run, move: Move) -> Finding | None:
    largest, least, rubbing = (threshold(run, limit) for limit in LIMITS)
    assert move.feed is not None
    rows = run.prediction.loads.feed[rows_of(run.prediction.loads, move.index)]
    per_rev = float(np.nanmax(rows)) if np.isfinite(rows).any() else math.nan
    if per_rev > largest:
        message = f"The tool advances {length(run, per_rev, 3)} in one turn of the work; no edge cuts that. " \
                  f"{origin(run, LIMITS[:1])}"
        return run.finding(CHECK, Level.STOP, move, message, value=per_rev, limit=largest, unit="mm/rev", words=("F",),
                           remedy="Check the feed mode: the number may be meant for a minute.")
    if move.feed.mode == "min" and move.feed.value < least:
        message = f"The tool creeps at {length(run, move.feed.value, 3)} a minute and rubs. {origin(run, LIMITS[1:2])}"
        level = Level.STOP if per_rev < rubbing else Level.REVIEW
        return run.finding(CHECK, level, move, message, value=move.feed.value, limit=least, unit="mm/min",
                           words=("F",), remedy="Check the feed mode: the number may be meant for a turn.")
    return None
