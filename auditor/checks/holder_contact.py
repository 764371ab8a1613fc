"""Holder contact: does anything but the edge touch the work?

What
    Looks for cuts in which the body of the insert, behind its two edges, meets stock; and for bars, drills and
    blades that go in deeper than they stand out, or into a bore they do not fit.

Why
    The shank meets the shoulder, the holder the face: the tool is torn out or the work out of its jaws. Nothing in the
    program's text shows it.

Formula and source
    Geometry of the half-section. Stop: the insert's body in the metal; deeper than the declared overhang; a bar thicker
    than its bore. Review: a bar over 0.8 of the bore, which leaves no room for chips (common practice).

Remedy
    A longer overhang, a slimmer bar or insert, or another way in.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._cuts import Cut, cuts
from auditor.checks._edges import engaged_lengths
from auditor.checks._judging import origin, threshold
from auditor.checks._words import figure, finding_at, length
from auditor.declared.model import ToolKind
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.simulate.samples import Part

CHECK = "holder-contact"
LIMITS = (Limit("bar_to_bore", 0.8, "", "common practice", "largest bar over bore diameter"),)
KINDS: tuple[ToolKind, ...] = ("turning", "boring", "grooving", "face grooving", "parting", "drilling")
TOUCH = 0.1  # mm of the insert's body in the metal


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts in which more than the edge touches."""
    body = engaged_lengths(run, Part.BACK)
    for cut in cuts(run, KINDS):
        finding = _body(run, cut, float(body[cut.move.index])) or _too_short(run, cut) or _bar_in_bore(run, cut)
        if finding is not None:
            yield finding


def _body(run: Run, cut: Cut, touching: float) -> Finding | None:
    if cut.tool.kind not in ("turning", "boring") or cut.tool.shape == "R" or touching <= TOUCH:
        return None
    message = f"The body of the insert, behind its edges, meets the metal over {length(run, touching, 1)}."
    return finding_at(run, CHECK, Level.STOP, cut.row_of_largest(run.prediction.loads.depth), message, value=touching,
                      limit=TOUCH, unit="mm", remedy="A slimmer insert, or come in from the other side.")


def _too_short(run: Run, cut: Cut) -> Finding | None:
    """Whether the shank's end would reach the face or surface that the tool goes in from."""
    tool, loads = cut.tool, run.prediction.loads
    deep = _depth_inside(run, cut)
    if tool.overhang is None or deep is None or deep <= tool.overhang:
        return None
    row = cut.row_of_largest(-loads.z) if tool.kind in ("boring", "drilling") else cut.row_of_largest(-loads.r)
    message = f"The tool goes {length(run, deep, 1)} in and stands out only {figure(tool.overhang)} mm (declared): " \
              "its holder meets the work."
    return finding_at(run, CHECK, Level.STOP, row, message, value=deep, limit=tool.overhang, unit="mm",
                      remedy=f"An overhang of more than {length(run, deep, 1)}.")


def _depth_inside(run: Run, cut: Cut) -> float | None:
    stock, loads = run.simulation.stock_before.get(cut.move.index), run.prediction.loads
    if stock is None or stock.is_empty:
        return None
    if cut.tool.kind in ("boring", "drilling"):
        return float(stock.bounds[2]) - float(loads.z[cut.rows].min())
    if cut.tool.kind in ("grooving", "parting"):
        return float(stock.bounds[3]) - max(float(loads.r[cut.rows].min()), 0.0)
    return None


def _bar_in_bore(run: Run, cut: Cut) -> Finding | None:
    tool, loads = cut.tool, run.prediction.loads
    start, end = cut.move.start, cut.move.end
    if tool.kind != "boring" or tool.bar_diameter is None or start is None or end is None:
        return None
    deep = _depth_inside(run, cut)
    if deep is None or deep < tool.nose_radius + 5.0:
        return None
    row = cut.row_of_largest(-loads.z)
    deepest = loads.z[cut.rows] <= loads.z[row] + 0.5
    bore = 2.0 * float(loads.r[cut.rows][deepest].max())
    share, most = tool.bar_diameter / bore if bore > 0.0 else 0.0, threshold(run, LIMITS[0])
    if share <= most:
        return None
    bar, hole = f"The {figure(tool.bar_diameter)} mm bar", f"a bore of {length(run, bore, 1)}"
    if share >= 1.0:
        return finding_at(run, CHECK, Level.STOP, row, f"{bar} does not go into {hole}.", value=share, limit=1.0,
                          unit="", remedy="A slimmer bar.")
    return finding_at(run, CHECK, Level.REVIEW, row, f"{bar} leaves no room for chips in {hole}. {origin(run, LIMITS)}",
                      value=share, limit=most, unit="", remedy="A slimmer bar.")
