"""Thread passes: will the thread come out right, and the insert live?

What
    Looks at each thread's passes: the spindle's speed from pass to pass, depth against lead, first and last pass,
    the force of the heaviest pass, run-in, the speed of the slide, the hand that the thread gets, and the flank's
    clearance at the helix.

Why
    The slide needs a few turns to catch up with the spindle: without a run-in the first turns have the wrong lead.
    A heavy pass breaks the tip, a feather-light one only rubs. A backward spindle or feed cuts the other hand.
    Another speed shifts a pass along the thread: under constant surface speed each pass wrecks the one before.

Formula and source
    Depth of a metric thread 0.61 of the pitch outside, 0.54 inside (ISO 68-1, from memory); review outside 0.5 to
    0.7. Review: a first pass over half the depth; a pass under thread_least (under 0.08 in work-hardening material)
    that is no spring pass; a run-in under thread_run_in leads; a spindle sense and feed that give a left-hand
    thread (M3 towards the chuck gives a right-hand one); less than 2 degrees of flank clearance left at the helix
    where the clearance is declared (side clearance = atan(tan a x sin of half the flank angle)); a speed changed
    between passes. Stop: passes at different speeds under constant surface speed; lead x speed over the slide's rapid
    rate; a pass whose force is over the tool's declared limit (no pass tables are used).
    Common practice where nothing else is named.

Remedy
    As named in the message.
"""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator
from dataclasses import dataclass

import numpy as np

from auditor.checks._judging import rows_of, threshold
from auditor.checks._remarks import findings_of
from auditor.checks._thread import Thread, threads
from auditor.checks._words import figure, finding_at, force, length
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.mechanics.clearance import feed_angle

CHECK = "thread-passes"
LIMITS = (
    Limit("thread_run_in", 2.0, "", "common practice", "least run-in in leads"),
    Limit("thread_least", 0.05, "mm", "common practice", "thinnest pass"),
    Limit("thread_flank", 2.0, "deg", "common practice", "least flank clearance left at the helix"),
)
SAME_SPEED = 0.005  # share of the speed that drive and encoder even out
SPRING = 0.005  # mm; a pass thinner than this is a spring pass
HARDENING_PASS = 0.08  # mm, work-hardening material
DEPTH_RANGE = (0.5, 0.7)  # of the lead, one start


@dataclass(frozen=True, slots=True)
class Doubt:
    """One thing wrong with a thread."""

    level: Level
    message: str
    remedy: str
    value: float | None = None
    limit: float | None = None
    unit: str | None = None


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """The gravest doubt about each thread."""
    asks: tuple[Callable[[Run, Thread], Doubt | None], ...] = (
        _slide, _heaviest, _speed, _hand, _run_in, _depth, _first, _thinnest, _flank,
    )  # fmt: skip
    yield from findings_of(run, CHECK, {"speed-in-thread": Level.REVIEW})
    for thread in threads(run):
        doubts = [doubt for ask in asks if (doubt := ask(run, thread)) is not None]
        if doubts:
            yield _finding(run, thread, doubts)


def _finding(run: Run, thread: Thread, doubts: list[Doubt]) -> Finding:
    doubts.sort(key=lambda doubt: doubt.level is not Level.STOP)
    worst = doubts[0]
    move = thread.passes[0]
    message = " Also: ".join(doubt.message for doubt in doubts)
    figures = {"value": worst.value, "limit": worst.limit, "unit": worst.unit, "remedy": worst.remedy}
    rows = rows_of(run.prediction.loads, move.index)
    if rows.stop > rows.start:
        return finding_at(run, CHECK, worst.level, rows.start, message, **figures)
    return run.finding(CHECK, worst.level, move, message, **figures)


def _slide(run: Run, thread: Thread) -> Doubt | None:
    speed = thread.lead * thread.rpm
    most = run.job.machine.rapid_z
    if not speed > most:
        return None
    return Doubt(Level.STOP, f"The slide would have to run {speed / 1000:.1f} m/min, its rapid is {most / 1000:.1f}: "
                 "the thread loses its lead.", f"At most S{math.floor(most / thread.lead):d}.", speed, most, "mm/min")


def _heaviest(run: Run, thread: Thread) -> Doubt | None:
    tool = run.job.tools.get(thread.tool)
    if tool is None or tool.force_limit is None or not thread.force > tool.force_limit:
        return None
    return Doubt(Level.STOP, f"The heaviest pass loads the tip with {force(thread.force)} (chip "
                 f"{figure(thread.area, 3)} mm2); it is declared for {force(tool.force_limit)}.",
                 "More and thinner passes.", thread.force, tool.force_limit, "N")


def _speed(run: Run, thread: Thread) -> Doubt | None:
    figures, rows = run.prediction.moves, [move.index for move in thread.passes]
    low, high = float(np.fmin.reduce(figures.rpm_low[rows])), float(np.fmax.reduce(figures.rpm_high[rows]))
    if not high > low * (1.0 + SAME_SPEED):
        return None
    surface = any(move.spindle.mode == "surface" for move in thread.passes)
    why = "under constant surface speed" if surface else "from pass to pass"
    level = Level.STOP if surface else Level.REVIEW
    return Doubt(level, f"The speed changes {why}, from {low:.0f} to {high:.0f} rpm: each pass starts at another place "
                 "of the thread.", "One speed under G97 for all passes.", high, low, "rpm")


def _hand(run: Run, thread: Thread) -> Doubt | None:
    first = thread.passes[0]
    if first.start is None or first.end is None or abs(first.end.z - first.start.z) < 1e-6:
        return None
    towards_chuck = first.end.z < first.start.z
    if not first.spindle.direction or towards_chuck == (first.spindle.direction > 0):
        return None
    return Doubt(Level.REVIEW, f"This cuts a left-hand thread: {'M4' if towards_chuck else 'M3'} with the feed "
                 f"{'towards' if towards_chuck else 'away from'} the chuck.", "Accept it if that is meant.")


def _run_in(run: Run, thread: Thread) -> Doubt | None:
    least = threshold(run, LIMITS[0]) * thread.lead
    if thread.run_in is None or thread.run_in >= least - 1e-6:
        return None
    return Doubt(Level.REVIEW, f"The thread starts {length(run, thread.run_in, 1)} before the metal, "
                 f"{length(run, least, 1)} are wanted: the first turns get the wrong lead (common practice).",
                 f"Start {length(run, least, 1)} or more before the thread.", thread.run_in, least, "mm")


def _depth(run: Run, thread: Thread) -> Doubt | None:
    if thread.depth is None:
        return None
    share = thread.depth / thread.lead
    if DEPTH_RANGE[0] <= share <= DEPTH_RANGE[1] or thread.starts > 1:
        return None
    return Doubt(Level.REVIEW, f"The thread is {length(run, thread.depth, 3)} deep at a lead of "
                 f"{length(run, thread.lead, 3)}, {figure(share, 2)} of it; a metric thread has 0.61 outside, "
                 "0.54 inside.",
                 "Check depth and lead.", share, DEPTH_RANGE[0 if share < DEPTH_RANGE[0] else 1], "")


def _first(run: Run, thread: Thread) -> Doubt | None:
    if thread.depth is None or len(thread.infeeds) < 2 or thread.infeeds[0] <= 0.5 * thread.depth:
        return None
    return Doubt(Level.REVIEW, f"The first pass takes {length(run, thread.infeeds[0], 3)}, more than half of the "
                 "depth (common practice).", "A thinner first pass.", thread.infeeds[0], 0.5 * thread.depth, "mm")


def _thinnest(run: Run, thread: Thread) -> Doubt | None:
    hardening = run.job.workpiece.material.work_hardening
    least = max(threshold(run, LIMITS[1]), HARDENING_PASS if hardening else 0.0)
    thin = [infeed for infeed in thread.infeeds if SPRING < infeed < least - 1e-6]
    if not thin:
        return None
    closing = [infeed for infeed in thread.infeeds if infeed > SPRING][-1]
    level = Level.REVIEW if hardening and min(thin) < closing else Level.NOTE  # a light last pass is common
    return Doubt(level, f"A pass takes only {length(run, min(thin), 3)} and rubs; {length(run, least, 3)} are wanted "
                 "(common practice).", "Fewer passes, or a larger least pass in the cycle.", min(thin), least, "mm")


def _flank(run: Run, thread: Thread) -> Doubt | None:
    tool = run.job.tools.get(thread.tool)
    about = f"tools.{thread.tool}.clearance_angle"
    if tool is None or thread.diameter <= 0.0 or any(item.about == about for item in run.job.assumptions):
        return None
    half = math.radians(0.5 * tool.included_angle)
    side = math.degrees(math.atan(math.tan(math.radians(tool.insert_clearance)) * math.sin(half)))
    helix = float(feed_angle(thread.lead, thread.diameter))
    left, least = side - helix, threshold(run, LIMITS[2])
    if left >= least:
        return None
    level = Level.REVIEW if left <= 0.0 else Level.NOTE
    return Doubt(level, f"The leading flank has {figure(left)} deg of clearance left at a helix of "
                 f"{figure(helix)} deg, unless the seat is tilted (common practice: 2).",
                 "A seat tilted by the helix angle.", left, least, "deg")
