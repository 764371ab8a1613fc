"""Shallow depth: does the tool push the work aside more than it cuts?

What
    Marks cuts less deep than the nose radius, with the predicted force across the feed (passive force) beside the
    one along it.

Why
    A shallow cut runs on the nose alone. The edge then stands nearly along the feed, and most of the thrust pushes
    the work away instead of along: slender parts and thin walls come out thick in the middle. In work-hardening
    material a shallow cut runs in the skin that the last pass hardened.

Formula and source
    The thrust stands at right angles to the chord of the engaged edge (Colwell 1954), so passive over feed force
    rises as depth falls below the nose radius. A note for one block a tool and run of cuts; a review where the
    predicted bending makes the diameter more than a third of the tolerance larger on a surface that stays, or
    where the depth is under hardened_layer in work-hardening material (common practice).

Remedy
    A smaller nose radius, one cut instead of two, or a freer-cutting edge; in work-hardening material a deeper cut.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._cuts import SPRING_PASS, Cut, cuts, diameter_errors, roughs, tolerance_third, wipes_outwards
from auditor.checks._judging import origin, threshold
from auditor.checks._words import figure, finding_at, force, length, thousandths
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "shallow-depth"
LIMITS = (Limit("hardened_layer", 0.1, "mm", "common practice", "least depth in work-hardening material"),)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Reviews for every such block; notes for the shallowest block of each tool."""
    notes: dict[int, tuple[float, Cut]] = {}
    errors = diameter_errors(run)
    for cut in cuts(run):
        deep = cut.largest(run.prediction.loads.depth)
        if cut.tool.shape == "R" or roughs(cut) or wipes_outwards(cut):
            continue
        if not SPRING_PASS < deep < cut.tool.nose_radius:
            continue
        finding = _grave(run, cut, deep, cut.largest(errors))
        if finding is not None:
            yield finding
        elif cut.tool.number not in notes or deep < notes[cut.tool.number][0]:
            notes[cut.tool.number] = (deep, cut)
    for deep, cut in notes.values():
        yield finding_at(run, CHECK, Level.NOTE, cut.row_of_largest(run.prediction.loads.depth), _story(run, cut, deep),
                         value=deep, limit=cut.tool.nose_radius, unit="mm")


def _story(run: Run, cut: Cut, deep: float) -> str:
    loads = run.prediction.loads
    row = cut.row_of_largest(loads.depth)
    passive, along = float(loads.passive[row]), float(loads.feed_force[row])
    message = f"Depth {length(run, deep)} is less than the nose radius {figure(cut.tool.nose_radius, 2)} mm: "
    if passive > along:
        message += f"the tool pushes the work aside with {force(passive)} (passive force) against {force(along)} " \
                   "along the feed."
    else:
        message += "the cut runs on the nose."
    return message


def _grave(run: Run, cut: Cut, deep: float, error: float) -> Finding | None:
    """A review where the shallow cut spoils the part."""
    row = cut.row_of_largest(run.prediction.loads.depth)
    third, skin = tolerance_third(run), threshold(run, LIMITS[0])
    if run.job.workpiece.material.work_hardening and deep < skin:
        return finding_at(run, CHECK, Level.REVIEW, row, f"{_story(run, cut, deep)} It runs in the skin "
                          f"the last pass hardened. {origin(run, LIMITS)}", value=deep, limit=skin, unit="mm",
                          remedy=f"At least {length(run, skin)} deep.")
    if third is not None and run.simulation.final_surface[cut.move.index] and error > third:
        return finding_at(run, CHECK, Level.REVIEW, row, f"{_story(run, cut, deep)} That bends the work so "
                          f"that the diameter comes out {thousandths(run, error)} too large, more than a third of the "
                          "tolerance.", value=error, limit=third, unit="mm",
                          remedy="A smaller nose radius or a freer-cutting edge.")
    return None
