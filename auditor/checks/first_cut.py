"""First cut: does it get under the skin of the raw stock?

What
    Looks at the first cuts into raw surfaces: the depth at the smallest and the largest raw size that is declared,
    and the depth under the skin of rolled, cast or forged stock.

Why
    Scale and cast skin are hard and sandy: an edge that runs in them is ground away. Where the raw piece is smaller
    than thought, the tool runs in the skin or in air; where it is larger, it takes that much more.

Formula and source
    Depth on the radius = nominal depth less or plus half the declared spread of the diameter. Common practice: under
    a skin at least skin_depth. Review: the least depth is under it; or the largest raw size brings more than the
    usable edge (2/3 of it) into the cut.

Remedy
    A first cut of at least the skin plus half the spread; or raw stock of known size.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._cuts import Cut, cuts, raw_radius
from auditor.checks._judging import lasting, origin, threshold
from auditor.checks._words import finding_at, length
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "first-cut"
LIMITS = (Limit("skin_depth", 0.5, "mm", "common practice", "least depth under a rolled, cast or forged skin"),)
SKINS = ("hot rolled", "cast", "forged")
RAW = 0.05  # mm; an edge that reaches this close to the raw size cuts the raw surface
USABLE = 2.0 / 3.0


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """First cuts that may run in the skin, or take far more than meant."""
    work = run.job.workpiece
    if work.skin not in SKINS and work.diameter_spread <= 0.0:
        return
    for cut in cuts(run, ("turning",)):
        move = cut.move
        along = move.start is not None and move.end is not None and abs(move.end.z - move.start.z) > 1e-6
        if along and _reaches_raw(run, cut):
            finding = _judge_cut(run, cut)
            if finding is not None:
                yield finding


def _reaches_raw(run: Run, cut: Cut) -> bool:
    loads = run.prediction.loads
    row = cut.row_of_largest(loads.depth)
    return float(loads.outermost[row]) >= raw_radius(run, float(loads.z[row])) - RAW


def _judge_cut(run: Run, cut: Cut) -> Finding | None:
    loads, work = run.prediction.loads, run.job.workpiece
    deep = lasting(loads, loads.depth, cut.move.index)
    half = 0.5 * work.diameter_spread
    row = cut.row_of_largest(loads.depth)
    least = threshold(run, LIMITS[0]) if work.skin in SKINS else 0.0
    if deep - half < least - 1e-9:
        takes = f"is {length(run, deep - half)} deep" if deep - half > 0.005 else "takes nothing"
        skin = f"the {work.skin} skin" if work.skin in SKINS else "air"
        message = f"On the smallest raw piece the first cut {takes} (nominal {length(run, deep)}, spread " \
                  f"{length(run, work.diameter_spread)} on the diameter) and runs in {skin}."
        if least:
            message += f" {origin(run, LIMITS)}"
        return finding_at(run, CHECK, Level.REVIEW, row, message, value=deep - half, limit=least, unit="mm",
                          remedy=f"A first cut of {length(run, least + half)} or more.")
    return _largest_raw(run, cut, row, deep, half)


def _largest_raw(run: Run, cut: Cut, row: int, deep: float, half: float) -> Finding | None:
    """Whether only the largest raw piece brings too much of the edge into the cut."""
    edge, engaged = cut.tool.edge_length, float(run.prediction.loads.length[row])
    if edge is None or half <= 0.0:
        return None
    usable, most = USABLE * edge, engaged * (deep + half) / deep
    if not engaged <= usable < most:
        return None
    message = f"On the largest raw piece the first cut is {length(run, deep + half)} deep and uses " \
              f"{length(run, most, 1)} of the edge; {length(run, usable, 1)} are usable (common practice: two thirds)."
    return finding_at(run, CHECK, Level.REVIEW, row, message, value=most, limit=usable, unit="mm",
                      remedy="Less depth in the first cut.")
