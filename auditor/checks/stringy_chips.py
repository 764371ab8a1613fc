"""Stringy chips: will a bird's nest wind round the work while nobody watches?

What
    In an unattended run on long-chip material, looks at straight cuts that make more than a metre of unbroken chip:
    no chip-breaker on the tool, feed under its window, or a chip that is too wide for its thickness.

Why
    A string of chip winds round chuck, work and tool, scratches the part, breaks the insert and stops the parts
    catcher. With a person beside it that is a nuisance, at night it is the end of the run.

Formula and source
    Common practice: depth over feed up to 15 breaks; chip length is cut length over 2.5. The material's chip form
    is the catalogue's or as declared. Review, in unattended runs only.

Remedy
    More feed, less depth, an insert with a chip-breaker for this cut, a peck or a dwell that breaks the chip.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from auditor.checks._cuts import SPRING_PASS, Cut, along_axis, cuts
from auditor.checks._judging import lasting, threshold
from auditor.checks._words import feed_rate, figure, finding_at
from auditor.checks.breaker_window import LIMITS as WINDOW_LIMITS
from auditor.checks.breaker_window import chip_length
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "stringy-chips"
LIMITS = (Limit("chip_aspect", 15.0, "", "common practice", "largest depth over feed"), *WINDOW_LIMITS)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Straight cuts that make strings in an unattended run."""
    if not run.job.unattended or run.job.workpiece.material.chips != "long":
        return
    loads = run.prediction.loads
    for cut in cuts(run):
        real = loads.depth[cut.rows] > SPRING_PASS
        if not along_axis(cut.move) or chip_length(run, cut, real) <= threshold(run, WINDOW_LIMITS[0]):
            continue
        why = _why(run, cut)
        if why is not None:
            message = f"The chip comes off as a string and nobody is there to clear it: {why}."
            yield finding_at(run, CHECK, Level.REVIEW, cut.row_of_largest(loads.depth), message, words=("F",),
                             remedy="More feed, or an insert with a chip-breaker for this cut.")


def _why(run: Run, cut: Cut) -> str | None:
    loads, tool = run.prediction.loads, cut.tool
    deep, used = lasting(loads, loads.depth, cut.move.index), float(np.nanmax(loads.feed[cut.rows]))
    if not tool.breaker_declared and tool.face_rake <= 0.0:
        return f"{tool.name} has no chip-breaker"
    if tool.breaker_feed is not None and used < tool.breaker_feed[0]:
        return f"feed {feed_rate(run, used)} is under the chip-breaker's window from " \
               f"{feed_rate(run, tool.breaker_feed[0])}"
    if used > 0.0 and deep / used > threshold(run, LIMITS[0]):
        return f"the chip is {figure(deep / used)} times as wide as thick, {figure(threshold(run, LIMITS[0]))} is " \
               f"the most ({LIMITS[0].provenance})"
    return None
