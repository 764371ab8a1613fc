"""Grooving and parting: is the blade asked for more than it can do?

What
    Compares the depth of a groove with the blade's width, the depth of a side stroke with the width, and looks at
    the feed of plunges and near the centre when parting.

Why
    A blade is slim in the one direction in which the chip has no room. Too deep it bends sideways and jams; too
    deep a side stroke tears the insert out of its seat; at the centre the speed falls to nothing and a full feed
    breaks the corner.

Formula and source
    Common practice: depth up to 10 widths (16 with a reinforced blade), plunges at 0.05 to 0.2 mm a turn, side
    strokes up to 0.75 width, the feed halved or quartered for the last 2 to 3 mm of diameter. Review: over
    groove_depth, plunge_feed or side_stroke; a note: full feed to the centre.

Remedy
    A wider blade, several side strokes, or a block of its own with half the feed for the last 3 mm of diameter.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._cuts import Cut, cuts
from auditor.checks._judging import lasting, origin, threshold
from auditor.checks._remedy import feed_word
from auditor.checks._words import feed_rate, figure, finding_at, length, x_word
from auditor.declared.model import ToolKind
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "groove-and-part"
LIMITS = (
    Limit("groove_depth", 10.0, "", "common practice", "largest depth over blade width"),
    Limit("side_stroke", 0.75, "", "common practice", "largest side stroke over blade width"),
    Limit("plunge_feed", 0.2, "mm", "common practice", "largest feed of a plunge"),
)
KINDS: tuple[ToolKind, ...] = ("grooving", "face grooving", "parting")
CENTRE = 1.5  # mm of radius in which parting slows its feed
BRISK = 0.06  # mm/rev; slower than this is slow enough at the centre


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Blades that go too deep, sideways or too fast at the centre."""
    for cut in cuts(run, KINDS):
        width = cut.tool.width
        if width is None or cut.move.start is None or cut.move.end is None:
            continue
        plunges, travel = _plunge(cut)
        if plunges:
            finding = _too_fast(run, cut) or _too_deep(run, cut, width, travel) or _at_centre(run, cut)
        else:
            finding = _side_stroke(run, cut, width)
        if finding is not None:
            yield finding


def _plunge(cut: Cut) -> tuple[bool, float]:
    """Whether the blade feeds along its own length, and how deep it has gone below the surface beside it."""
    start, end = cut.move.start, cut.move.end
    assert start is not None
    assert end is not None
    across = (abs(end.z - start.z), abs(end.r - start.r))
    if cut.tool.kind == "face grooving":
        return across[0] > across[1], across[0]
    return across[1] > across[0], across[1]


def _too_fast(run: Run, cut: Cut) -> Finding | None:
    loads = run.prediction.loads
    used, most = cut.largest(loads.feed), threshold(run, LIMITS[2])
    if not used > most * (1.0 + 1e-9):
        return None
    message = f"The blade is plunged at feed {feed_rate(run, used)}: the chip fills the groove and the blade breaks. " \
              f"{origin(run, LIMITS[2:])}"
    return finding_at(run, CHECK, Level.REVIEW, cut.row_of_largest(loads.depth), message, value=used, limit=most,
                      unit="mm/rev", words=("F",), remedy=f"At most {feed_word(run, cut.move, most)}.")


def _too_deep(run: Run, cut: Cut, width: float, travel: float) -> Finding | None:
    loads = run.prediction.loads
    if cut.tool.kind == "face grooving":
        deep = travel
    else:
        surface = max(run.simulation.raw.bounds[3], 0.0) if cut.move.start is None else _surface(run, cut)
        deep = surface - float(loads.r[cut.rows].min()) if loads.r[cut.rows].min() > 0.0 else surface
    limit = threshold(run, LIMITS[0]) * width
    if deep <= limit:
        return None
    message = f"The {figure(width)} mm blade goes {length(run, deep, 1)} deep, {figure(deep / width)} widths: it " \
              f"bends aside and jams. {origin(run, LIMITS[:1])}"
    return finding_at(run, CHECK, Level.REVIEW, cut.row_of_largest(loads.depth), message, value=deep / width,
                      limit=threshold(run, LIMITS[0]), unit="",
                      remedy=f"A blade of {length(run, deep / threshold(run, LIMITS[0]), 1)} or more.")


def _surface(run: Run, cut: Cut) -> float:
    """Radius of the stock beside the blade before it goes in."""
    stock = run.simulation.stock_before.get(cut.move.index)
    assert cut.move.end is not None
    if stock is None or stock.is_empty:
        return 0.0
    import shapely

    width = cut.tool.width or 0.0
    beside = shapely.box(cut.move.end.z - 1.0, 0.0, cut.move.end.z + width + 1.0, stock.bounds[3] + 1.0)
    here = stock.intersection(beside)
    return 0.0 if here.is_empty else float(here.bounds[3])


def _side_stroke(run: Run, cut: Cut, width: float) -> Finding | None:
    loads = run.prediction.loads
    deep, limit = lasting(loads, loads.depth, cut.move.index), threshold(run, LIMITS[1]) * width
    if deep <= limit * (1.0 + 1e-6):
        return None
    message = f"The side stroke is {length(run, deep)} deep with a {figure(width)} mm insert: it is torn from its " \
              f"seat. {origin(run, LIMITS[1:2])}"
    return finding_at(run, CHECK, Level.REVIEW, cut.row_of_largest(loads.depth), message, value=deep, limit=limit,
                      unit="mm", remedy=f"Side strokes of {length(run, limit)} at most.")


def _at_centre(run: Run, cut: Cut) -> Finding | None:
    loads, start, end = run.prediction.loads, cut.move.start, cut.move.end
    if cut.tool.kind != "parting" or end is None or start is None or end.r > 0.1 or start.r < 2.0 * CENTRE:
        return None
    used = cut.largest(loads.feed)
    if not used > BRISK:
        return None
    message = f"The blade parts to the centre at full feed {feed_rate(run, used)}: the speed falls to nothing there " \
              "and the corner breaks (common practice: a quarter to a half for the last 3 mm of diameter)."
    return finding_at(run, CHECK, Level.NOTE, cut.row_of_largest(loads.depth), message, words=("F",),
                      remedy=f"From {x_word(run, CENTRE)} on {feed_word(run, cut.move, max(0.5 * used, 0.03))}.")
