"""Drill depth: does the drill clear its chips, and turn as a drill must?

What
    Looks at how deep a drill goes without coming up, at its feed, at constant surface speed while drilling, and at
    drilling off the axis.

Why
    Chips jam in the flutes and twist the drill off in the hole. Under constant surface speed the control sees X0
    and lets the spindle run up to its limit.

Formula and source
    Common practice: high-speed steel 4 diameters in one go, carbide 8; feed up to 0.03 diameters (0.3 mm for high-speed
    steel); on the axis within 0.05 mm. Review: over these. Constant surface speed is a stop where the limit that the
    spindle goes to is no speed for this drill, else a review.

Remedy
    A peck cycle (first 3 diameters, then 1), G97 with a speed for the drill, X0.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np

from auditor.checks._cuts import Cut, cuts
from auditor.checks._judging import origin, threshold
from auditor.checks._remedy import feed_word
from auditor.checks._words import feed_rate, figure, finding_at, length, x_word
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Kind

CHECK = "drill-depth"
LIMITS = (
    Limit("drill_depth_steel", 4.0, "", "common practice", "largest depth in one go over diameter, high-speed steel"),
    Limit("drill_depth_carbide", 8.0, "", "common practice", "largest depth in one go over diameter, carbide"),
    Limit("drill_feed", 0.03, "", "common practice", "largest feed over diameter"),
    Limit("drill_off_axis", 0.05, "mm", "common practice", "largest distance of the drill from the axis"),
)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Drills that go too deep in one go, too fast, or off the axis."""
    begun: dict[int, float] = {}
    for cut in cuts(run, ("drilling",)):
        diameter = cut.tool.diameter
        if diameter is None or cut.move.start is None or cut.move.end is None:
            continue
        before = run.path.moves[cut.move.index - 1] if cut.move.index else None
        if before is None or before.kind is Kind.RAPID or before.tool != cut.move.tool:
            begun[cut.tool.number] = _first_metal(run, cut)
        deep = begun[cut.tool.number] - cut.move.end.z
        for finding in (_surface_speed(run, cut), _too_deep(run, cut, deep, diameter), _too_fast(run, cut, diameter),
                        _off_axis(run, cut)):
            if finding is not None:
                yield finding


def _first_metal(run: Run, cut: Cut) -> float:
    """Length at which the point meets metal in this go."""
    loads = run.prediction.loads
    touching = np.flatnonzero(loads.depth[cut.rows] > 0.0)
    before = max(int(touching[0]) - 1, 0) if len(touching) else 0  # depth begins to rise at the row before
    return float(loads.z[cut.rows][before])


def _surface_speed(run: Run, cut: Cut) -> Finding | None:
    if cut.move.spindle.mode != "surface":
        return None
    rim = math.pi * (cut.tool.diameter or 0.0) * float(run.prediction.moves.rpm_high[cut.move.index]) / 1000.0
    range_ = cut.tool.speed
    suits = cut.move.spindle.clamp is not None and range_ is not None and range_[0] <= rim <= range_[1]
    message = f"The drill runs under constant surface speed: at X0 the spindle goes to its limit, {rim:.0f} m/min at " \
              "the rim."
    return run.finding(CHECK, Level.REVIEW if suits else Level.STOP, cut.move, message, words=("S",),
                       remedy="G97 with a speed before the drill.")


def _too_deep(run: Run, cut: Cut, deep: float, diameter: float) -> Finding | None:
    steel = cut.tool.substrate == "high-speed steel"
    limit = LIMITS[0] if steel else LIMITS[1]
    most = threshold(run, limit)
    if deep <= most * diameter:
        return None
    message = f"The drill goes {length(run, deep, 1)} deep in one go, {figure(deep / diameter)} diameters: chips jam " \
              f"in the flutes. {origin(run, [limit])}"
    return finding_at(run, CHECK, Level.REVIEW, cut.row_of_largest(-run.prediction.loads.z), message,
                      value=deep / diameter, limit=most, unit="", remedy="A peck cycle: first 3 diameters, then 1.")


def _too_fast(run: Run, cut: Cut, diameter: float) -> Finding | None:
    used, most = cut.largest(run.prediction.loads.feed), threshold(run, LIMITS[2]) * diameter
    if not used > most * (1.0 + 1e-9):
        return None
    message = f"Feed {feed_rate(run, used)} is {figure(used / diameter, 3)} of the drill's {figure(diameter)} mm: " \
              f"it splits. {origin(run, LIMITS[2:3])}"
    return finding_at(run, CHECK, Level.REVIEW, cut.row_of_largest(run.prediction.loads.feed), message, value=used,
                      limit=most, unit="mm/rev", words=("F",), remedy=f"At most {feed_word(run, cut.move, most)}.")


def _off_axis(run: Run, cut: Cut) -> Finding | None:
    assert cut.move.end is not None
    aside, most = abs(cut.move.end.r), threshold(run, LIMITS[3])
    if aside <= most:
        return None
    message = f"The drill stands at {x_word(run, cut.move.end.r)}, beside the axis the work turns about: it bends " \
              f"and breaks. {origin(run, LIMITS[3:])}"
    return run.finding(CHECK, Level.REVIEW, cut.move, message, value=aside, limit=most, unit="mm", words=("X",),
                       remedy="X0 for a standing drill.")
