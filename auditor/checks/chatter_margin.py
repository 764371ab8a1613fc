"""Chatter margin: is the cut wider than what surely runs quietly?

What
    For boring bars with declared overhang and section, compares the engaged width of the edge with the width below
    which no chatter can start at any speed.

Why
    A bar that sings leaves waves, chips the edge and tells the whole shop.

Formula and source
    Width b = 2 k z (1 + z) / K (Tlusty and Polacek 1963), with the bar's stiffness k = 3 E I / L^3, a damping z of
    0.02 (steel bars 0.01 to 0.03, common practice) and K = 0.45 (1 - mc) kc. Between the lobes more can be stable,
    so it is an indicator: a note, never more, since stiffness and damping are not measured.

Remedy
    A shorter or thicker bar, less depth, a smaller nose radius, another speed, a damped bar.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._bending import shank_give
from auditor.checks._cuts import Cut, cuts
from auditor.checks._judging import lasting, origin, threshold
from auditor.checks._words import finding_at, length
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.mechanics.chatter import dynamic_coefficient, limiting_width

CHECK = "chatter-margin"
LIMITS = (Limit("bar_damping", 0.02, "", "common practice", "damping ratio of the bar"),)
DIRECTION = 0.45  # directional factor of a radial mode, 0.3 to 0.6


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """The widest cut of each boring bar that is wider than surely quiet."""
    widest: dict[int, tuple[float, Finding]] = {}
    for cut in cuts(run, ("boring",)):
        judged = _judge_cut(run, cut)
        if judged is not None and (cut.tool.number not in widest or judged[0] > widest[cut.tool.number][0]):
            widest[cut.tool.number] = judged
    for _, finding in widest.values():
        yield finding


def _judge_cut(run: Run, cut: Cut) -> tuple[float, Finding] | None:
    loads, material, give = run.prediction.loads, run.job.workpiece.material, shank_give(cut.tool)
    row = cut.row_of_largest(loads.length)
    thick = float(loads.chip_mean[row])
    if give is None or material.kc11 is None or material.mc is None or not thick > 0.0:
        return None
    rigid = float(dynamic_coefficient(material.kc11, material.mc, thick, DIRECTION))
    quiet = float(limiting_width(1.0 / give, threshold(run, LIMITS[0]), rigid))
    wide = lasting(loads, loads.length, cut.move.index)
    if wide <= quiet:
        return None
    message = f"The bar may sing: {length(run, wide)} of edge are in the cut, up to {length(run, quiet)} surely " \
              f"run quietly. {origin(run, LIMITS)}"
    return wide / quiet, finding_at(run, CHECK, Level.NOTE, row, message, value=wide, limit=quiet, unit="mm",
                                    remedy="A shorter or thicker bar, less depth, or another speed.")
