"""Feed against nose radius: is the corner too small for the feed?

What
    Compares the feed a turn with the nose radius in sideways cuts (turning, facing, boring and the side strokes
    of a grooving tool). Plunges, threads and drills have no such bound.

Why
    Above about half the nose radius the surface turns into a thread and the corner alone carries the chip; near
    the whole radius the corner breaks off.

Formula and source
    Common practice: up to 0.5 of the nose radius in general; 0.8 only for a strong corner in roughing. Review:
    over feed_share_of_nose. Stop: over feed_share_of_nose_at_most.

Remedy
    The feed that these shares allow, or an insert with a larger corner.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._cuts import Cut, cuts, wipes_outwards
from auditor.checks._judging import origin, threshold
from auditor.checks._remedy import feed_word
from auditor.checks._words import feed_rate, figure, finding_at
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Kind

CHECK = "feed-over-nose"
LIMITS = (
    Limit("feed_share_of_nose", 0.5, "", "common practice", "largest feed over nose radius in general"),
    Limit("feed_share_of_nose_at_most", 0.8, "", "common practice", "feed over nose radius at the very most"),
)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Sideways cuts with too much feed for the corner."""
    for cut in cuts(run, ("turning", "boring", "grooving", "face grooving")):
        if cut.tool.nose_radius > 0.0 and _sideways(cut) and not wipes_outwards(cut):
            finding = _judge_cut(run, cut)
            if finding is not None:
                yield finding


def _sideways(cut: Cut) -> bool:
    """A grooving tool cuts sideways along Z, a face grooving tool along X; a turning tool always."""
    start, end = cut.move.start, cut.move.end
    if cut.tool.kind in ("turning", "boring") or start is None or end is None or cut.move.kind is Kind.ARC:
        return cut.tool.kind in ("turning", "boring")
    across = abs(end.z - start.z), abs(end.r - start.r)
    return across[0] > across[1] if cut.tool.kind == "grooving" else across[1] > across[0]


def _judge_cut(run: Run, cut: Cut) -> Finding | None:
    loads = run.prediction.loads
    used, radius = cut.largest(loads.feed), cut.tool.nose_radius
    general, most = (threshold(run, limit) * radius for limit in LIMITS)
    if not used > general * (1.0 + 1e-9):
        return None
    level, limit = (Level.STOP, most) if used > most * (1.0 + 1e-9) else (Level.REVIEW, general)
    fate = "the corner breaks off" if level is Level.STOP else "the surface turns into a thread, the corner carries " \
        "the whole chip"
    message = f"Feed {feed_rate(run, used)} is {figure(used / radius, 2)} of the {figure(radius, 2)} mm nose radius: " \
              f"{fate}. {origin(run, LIMITS[1:] if level is Level.STOP else LIMITS[:1])}"
    remedy = f"At most {feed_word(run, cut.move, general)} with this insert" + (
        f"; {feed_word(run, cut.move, most)} is the very most." if level is Level.STOP else ".")
    return finding_at(run, CHECK, level, cut.row_of_largest(loads.depth), message, value=used, limit=limit,
                      unit="mm/rev", remedy=remedy, words=("F",))
