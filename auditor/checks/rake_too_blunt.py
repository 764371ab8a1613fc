"""Rake too blunt: does a negative edge bend slender work out of tolerance?

What
    Looks at the moves that leave the finished surface on slender work, thin walls and long boring bars, where the
    chip meets a negative effective rake and the predicted bending takes more than a third of the tolerance.

Why
    A negative edge pushes. On a stiff part that only costs power; on a slender one, or at the end of a long bar,
    it bends the work or the bar away, and the part comes out thick, tapered or chattered.

Formula and source
    Effective rake: land and chip-breaker face weighted by their share of the contact (model, about 3 degrees
    uncertain). Bending: the beam formulas on what is left of the stock, plus the bar's own. The thrust falls about
    4.5 % for each degree of rake (Klocke, 4 to 5 %). Slender: stick-out over diameter above slender_chuck, with
    tailstock or centres above slender_tailstock; bar overhang over diameter above long_bar; wall over diameter
    under thin_wall. Common practice. Review.

Remedy
    The effective rake, or the feed or depth, at which the same law brings the bending to a third of the tolerance.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._bending import bar_push_off, slenderness, wall_share
from auditor.checks._cuts import Cut, bending_errors, cuts, diameter_errors, tolerance_third
from auditor.checks._judging import MOST_CURED, threshold
from auditor.checks._remedy import way_out
from auditor.checks._words import angle, figure, finding_at, thousandths
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "rake-too-blunt"
LIMITS = (
    Limit("slender_chuck", 3.0, "", "common practice", "largest length over diameter in the chuck alone"),
    Limit("slender_tailstock", 8.0, "", "common practice", "largest length over diameter with tailstock or centres"),
    Limit("long_bar", 3.0, "", "common practice", "largest overhang over diameter of a boring bar"),
    Limit("thin_wall", 0.1, "", "common practice", "smallest wall over diameter"),
)
THRUST_PER_DEGREE = 0.045


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Finishing cuts whose blunt rake costs the tolerance."""
    third = tolerance_third(run)
    if third is None:
        yield NotJudged(CHECK, "workpiece.diameter_tolerance is not declared")
        return
    errors, cured = diameter_errors(run), 0
    for cut in cuts(run):
        if not run.simulation.final_surface[cut.move.index]:
            continue
        row = cut.row_of_largest(run.prediction.loads.bend)
        rake = float(run.prediction.loads.rake[row])
        if not rake < 0.0:
            continue
        error = cut.largest(errors) + 2.0 * bar_push_off(run, cut)
        weak = _weakness(run, cut, row) if error > third else None
        if weak is not None:
            ways = "" if cured >= MOST_CURED else way_out(run, cut.move, bending_errors, third)
            cured += 1
            yield _finding(run, row, rake, weak, error, third, ways)


def _weakness(run: Run, cut: Cut, row: int) -> str | None:
    """What makes this cut soft, in words; None when it is stiff."""
    chuck, tailstock, bar, wall = (threshold(run, limit) for limit in LIMITS)
    ratio = slenderness(run, cut, row)
    held_both = run.job.workholding.kind in ("chuck+tailstock", "centres")
    if ratio > (tailstock if held_both else chuck):
        return f"the work stands out {figure(ratio)} diameters"
    tool = cut.tool
    if tool.kind == "boring" and tool.overhang and tool.bar_diameter and tool.overhang / tool.bar_diameter > bar:
        return f"the bar stands out {figure(tool.overhang / tool.bar_diameter)} diameters"
    share = wall_share(run, cut, row)
    if share is not None and share < wall:
        return f"the wall is {figure(share, 2)} of the diameter"
    return None


def _finding(run: Run, row: int, rake: float, weak: str, error: float, third: float, ways: str) -> Finding:
    steps = (1.0 - third / error) / THRUST_PER_DEGREE
    message = f"The blunt edge (effective rake {angle(rake)}) pushes where it matters: {weak}, and the diameter " \
              f"comes out {thousandths(run, error)} too large, more than a third of the tolerance (common practice)."
    return finding_at(run, CHECK, Level.REVIEW, row, message, value=error, limit=third, unit="mm",
                      remedy=f"A freer-cutting edge with about {angle(rake + steps)} of effective rake"
                             f"{f'; or {ways}' if ways else ''}.")
