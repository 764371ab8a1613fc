"""Edge too weak: will the corner chip under blows, scale or heavy chips?

What
    Looks at interrupted cuts, cuts through a rolled, cast or forged skin, and heavy cuts for an edge that is too
    slim: high effective rake or a small wedge; and at interrupted cuts for two or more habits that hit the corner.

Why
    Every interruption is a blow. A slim wedge, a corner that is struck first, an edge square to the feed, a small
    nose or a full feed each make it worse; together the corner chips in the first minutes.

Formula and source
    Common practice. Review: effective rake over high_rake or normal wedge under small_wedge, in an interrupted
    cut, in skin, or with a chip of more than heavy_chip (mm2) in steel, stainless or cast iron. Review, interrupted
    cuts: two of these together: inclination positive (corner struck first), cutting edge angle 95 degrees or more,
    feed over 0.7 of half the nose radius, nose radius under 0.8 mm. The wedge is 90 degrees less insert clearance
    less chip-breaker face.

Remedy
    A stronger insert (larger nose, negative basic shape, land), an entry at half feed, or a 45 to 75 degree edge.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._cuts import Cut, cuts, in_skin, interrupted, wedge_angle
from auditor.checks._judging import lasting, origin, threshold
from auditor.checks._words import angle, figure, finding_at
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "edge-too-weak"
LIMITS = (
    Limit("high_rake", 10.0, "deg", "common practice", "largest effective rake"),
    Limit("small_wedge", 70.0, "deg", "common practice", "smallest wedge"),
    Limit("heavy_chip", 1.5, "", "common practice", "largest chip section in mm2"),
)
TOUGH = ("P", "M", "K")
REMEDY = "A larger nose or a stronger basic shape, and half the feed over the interruption."


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Slim edges in rough surroundings."""
    for cut in cuts(run):
        struck = interrupted(run, cut)
        where = "an interrupted cut" if struck else "a scaly skin" if in_skin(run, cut) else _heavy(run, cut)
        if where is None:
            continue
        finding = _slim(run, cut, where) or (_struck(run, cut) if struck else None)
        if finding is not None:
            yield finding


def _heavy(run: Run, cut: Cut) -> str | None:
    loads = run.prediction.loads
    area = lasting(loads, loads.area, cut.move.index, over=threshold(run, LIMITS[2]))
    if run.job.workpiece.material.group in TOUGH and area > threshold(run, LIMITS[2]):
        return f"a heavy chip ({figure(area, 2)} mm2)"
    return None


def _slim(run: Run, cut: Cut, where: str) -> Finding | None:
    loads = run.prediction.loads
    rake_limit, wedge_limit = (threshold(run, limit) for limit in LIMITS[:2])
    row = cut.row_of_largest(loads.cutting if run.job.workpiece.material.kc11 else loads.area)
    rake, wedge = float(loads.rake[row]), wedge_angle(cut.tool)
    if rake > rake_limit:
        what, value, limit, which = f"an effective rake of {angle(rake)}", rake, rake_limit, LIMITS[:1]
    elif wedge < wedge_limit:
        what, value, limit, which = f"a wedge of {wedge:.0f} deg", wedge, wedge_limit, LIMITS[1:2]
    else:
        return None
    message = f"A slim edge meets {where}: {what} chips there. {origin(run, which)}"
    return finding_at(run, CHECK, Level.REVIEW, row, message, value=value, limit=limit, unit="deg", remedy=REMEDY)


def _struck(run: Run, cut: Cut) -> Finding | None:
    loads, tool = run.prediction.loads, cut.tool
    habits = {
        "the corner is struck first (positive inclination)": tool.pocket_inclination > 0.0,
        f"the edge stands square to the feed ({tool.cutting_edge_angle:.0f} deg)": tool.cutting_edge_angle >= 95.0,
        "the feed is nearly the corner's full share": cut.largest(loads.feed) > 0.7 * 0.5 * tool.nose_radius,
        f"the nose is small ({figure(tool.nose_radius, 2)} mm)": tool.nose_radius < 0.8,
    }
    found = [text for text, true in habits.items() if true]
    if len(found) < 2:
        return None
    message = f"Every interruption hits the edge hard: {'; '.join(found)} (common practice: two of these are too many)."
    return finding_at(run, CHECK, Level.REVIEW, cut.row_of_largest(loads.area), message, remedy=REMEDY)
