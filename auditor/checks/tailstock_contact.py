"""Tailstock contact: does the tool meet the centre?

What
    Follows the tool's outline against the centre in the work, and looks for parting or facing to the axis while the
    centre is in.

Why
    The insert breaks, the centre is scored, the work jumps out. A part that is parted off with the centre in is
    pinched and thrown.

Formula and source
    Geometry: a 60 degree centre with its point where declared, up to its diameter, and its body behind. Stop: the
    outline enters it; a cut that ends at the axis with the centre in. Common practice.

Remedy
    Face to just above the centre's diameter, or draw the tailstock back before (a stop, M0, or the machine's code).
"""

from __future__ import annotations

from collections.abc import Iterator

import shapely

from auditor.checks._judging import cutting_moves
from auditor.checks._solids import entered, outlines, tailstock_zone
from auditor.checks._words import tool_name, x_word, z_word
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "tailstock-contact"
LIMITS: tuple[Limit, ...] = ()
AXIS = 0.5  # mm of radius


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Moves that meet the centre, and cuts to the axis while it is in."""
    holding = run.job.workholding
    if holding.kind not in ("chuck+tailstock", "centres"):
        return
    zone = tailstock_zone(holding)
    if zone is None:
        yield NotJudged(CHECK, "workholding.tailstock is not declared")
        return
    cutting = cutting_moves(run)
    shapes = outlines(run)
    for move in run.path.moves:
        tool = run.job.tools.get(move.tool) if move.tool is not None else None
        if tool is None or tool.number not in shapes or move.start is None:
            continue
        inside = entered(shapes[tool.number], move, zone)
        name = tool_name(run, tool.number)
        if inside is not None:
            low, _, _, top = (float(edge) for edge in shapely.bounds(inside))
            message = f"{name} runs into the centre at {x_word(run, top)} {z_word(run, low)}."
            yield run.finding(CHECK, Level.STOP, move, message, words=("X", "Z"),
                              remedy=f"Stay above {x_word(run, top + 1.0)} there, or draw the tailstock back before.")
        elif cutting[move.index] and move.end is not None and abs(move.end.r) < AXIS:
            yield run.finding(CHECK, Level.STOP, move, f"{name} cuts to the axis while the centre is in the work: the "
                              "piece is pinched and thrown.", words=("X",), remedy="Draw the tailstock back before.")
