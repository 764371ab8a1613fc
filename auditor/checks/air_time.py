"""Air time: how long does the tool feed without cutting?

What
    Adds up the time of feed moves that take nothing off, and names the block that wastes most.

Why
    Feeding through air costs minutes a batch; often it is a clearance set for another blank, or a G1 left standing
    where G0 was meant.

Formula and source
    Time = path / (feed x speed), for feed moves without engagement; simulation. A note when it passes both
    air_seconds and air_share of the program's feeding time. Common practice.

Remedy
    Rapid to a clearance of 1 to 2 mm before the cut, and back in rapid after it.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from auditor.checks._judging import cutting_moves, threshold
from auditor.checks._words import percent
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Kind

CHECK = "air-time"
LIMITS = (
    Limit("air_seconds", 5.0, "s", "common practice", "longest feeding time without cutting"),
    Limit("air_share", 0.10, "", "common practice", "largest share of the feeding time without cutting"),
)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """One note at the block that feeds longest through air."""
    times = np.nan_to_num(run.prediction.moves.time)
    known = run.job.tools  # what an undeclared tool cuts is not known
    feeding = np.array([move.kind is not Kind.RAPID and move.tool in known for move in run.path.moves], dtype=bool)
    air = np.where(feeding & ~cutting_moves(run), times, 0.0)
    total, feed_time = float(air.sum()), float(times[feeding].sum())
    most, share = (threshold(run, limit) for limit in LIMITS)
    if total <= most or total <= share * feed_time:
        return
    longest = run.path.moves[int(np.argmax(air))]
    message = f"The tool feeds {total:.0f} s through air, {percent(total / feed_time)} of its feeding time; longest " \
              f"here, {float(air.max()):.0f} s."
    yield run.finding(CHECK, Level.NOTE, longest, message, value=total, limit=most, unit="s",
                      remedy="Rapid up to 1 to 2 mm before the cut.")
