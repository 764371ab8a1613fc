"""Chip too thin: does the edge cut, or only rub?

What
    Compares the chip thickness of each cut with the smallest chip that a rounded edge can form, with the rounding
    itself, and with the land in front of the chip-breaker.

Why
    Under the smallest chip the edge ploughs: heat, glazing, wear without cutting. Under the edge rounding the rake
    is strongly negative whatever the insert looks like. A chip that never leaves the land never reaches the
    chip-breaker: the positive insert works like a blunt one.

Formula and source
    Smallest chip 0.33 x edge radius (0.25 to 0.33: de Oliveira et al. 2015, seen at second hand). The chip touches
    the face over about twice its thickness (after Poletika, from memory), so it leaves the land from half the
    land's width on (model). Review: a whole cut under the smallest chip; a tool declared for its chip-breaker whose
    thickest chip never leaves the land. Note: equivalent thickness under the edge radius, or a defaulted land
    that is not left. Spring passes are not judged.

Remedy
    More feed, a sharper edge, or a geometry with a narrower land.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._cuts import SPRING_PASS, Cut, cuts, roughs, wipes_outwards
from auditor.checks._judging import origin, threshold
from auditor.checks._words import figure, finding_at, length
from auditor.declared.model import ToolKind
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "chip-too-thin"
LIMITS = (Limit("smallest_chip", 0.33, "", "published", "smallest chip over edge radius"),)
CONTACT_RATIO = 2.0  # contact length over chip thickness
KINDS: tuple[ToolKind, ...] = ("turning", "boring", "grooving", "face grooving", "parting")


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts that rub, and tools whose chip-breaker is never reached."""
    loads = run.prediction.loads
    main: dict[int, Cut] = {}
    for cut in cuts(run, KINDS):
        if wipes_outwards(cut) or not cut.largest(loads.depth) > SPRING_PASS:
            continue
        finding = None if roughs(cut) else _rubbing(run, cut)
        if finding is not None:
            yield finding
        known = main.get(cut.tool.number)
        if known is None or cut.largest(loads.chip_max) > known.largest(loads.chip_max):
            main[cut.tool.number] = cut
    for cut in main.values():
        finding = _on_land(run, cut)
        if finding is not None:
            yield finding


def _rubbing(run: Run, cut: Cut) -> Finding | None:
    loads = run.prediction.loads
    thickest, rounding = cut.largest(loads.chip_max), cut.tool.edge_radius
    least = threshold(run, LIMITS[0]) * rounding
    row = cut.row_of_largest(loads.chip_max)
    if thickest < least:
        message = f"The edge rubs instead of cutting: the thickest chip is {figure(thickest * 1000)} um, and an edge " \
                  f"rounded by {figure(rounding * 1000)} um forms none under {figure(least * 1000)} um. " \
                  f"{origin(run, LIMITS)}"
        return finding_at(run, CHECK, Level.REVIEW, row, message, value=thickest, limit=least, unit="mm",
                          words=("F",), remedy="More feed or depth, or a sharper edge.")
    equivalent = cut.largest(loads.chip_equivalent)
    if equivalent < rounding:
        message = f"The chip ({figure(equivalent * 1000)} um) is thinner than the edge is rounded " \
                  f"({figure(rounding * 1000)} um): the edge works blunt."
        return finding_at(run, CHECK, Level.NOTE, row, message, value=equivalent, limit=rounding, unit="mm")
    return None


def _on_land(run: Run, cut: Cut) -> Finding | None:
    loads, tool = run.prediction.loads, cut.tool
    thickest, least = cut.largest(loads.chip_max), tool.land_width / CONTACT_RATIO
    if tool.face_rake <= tool.land_rake or not thickest < least:
        return None
    assumed = any(item.about == f"tools.{tool.number}.land_width" for item in run.job.assumptions)
    level = Level.REVIEW if tool.breaker_declared and not assumed else Level.NOTE
    message = f"The chip never leaves the land: the thickest is {length(run, thickest, 3)}, the land " \
              f"{figure(tool.land_width, 2)} mm wide, so no cut of {tool.name} reaches the chip-breaker (model)."
    return finding_at(run, CHECK, level, cut.row_of_largest(loads.chip_max), message, value=thickest, limit=least,
                      unit="mm", words=("F",), remedy=f"A chip of {length(run, least, 3)} or more, or a narrower land.")
