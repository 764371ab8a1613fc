"""Edge life: does the edge last the batch, and hold the size?

What
    Adds up how much of each tool's life one part uses, by its declared Taylor pair, and compares the run with it:
    parts an edge, the share an unattended run may use, and how far the diameter drifts as the edge wears.

Why
    Nobody hears a worn edge at night. Long before it breaks, the part grows out of tolerance.

Formula and source
    Life T = (C / v)^(1/n) min (Taylor); life used = sum of time / T over the cuts of a part, at the speed of each
    cut. Predictions of life scatter by a factor of two, so an unattended run may use 0.65 of it (common practice
    0.6 to 0.7). Drift of the diameter at the end of the run 2 VB tan a, with VB growing to 0.3 mm over the life
    (ISO 3685, from memory). Review: an unattended batch uses more than life_share of an edge; the drift is over the
    tolerance. Note: parts an edge, where a batch is declared. Without a declared pair nothing is said.

Remedy
    The number of parts after which the edge must be changed; a lower speed (a tenth less gives half as much life
    again at n = 0.25); sister tools.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np

from auditor.checks._judging import origin, threshold
from auditor.checks._words import percent, thousandths
from auditor.declared.model import Tool
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Move
from auditor.mechanics.clearance import normal_clearance
from auditor.mechanics.life import FLANK_WEAR_LIMIT, UNATTENDED_SHARE, size_drift, taylor_life

CHECK = "edge-life"
LIMITS = (Limit("life_share", UNATTENDED_SHARE, "", "common practice", "share of the life an unattended run may use"),)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Edges that do not last the batch."""
    undeclared = []
    for number, (used, last) in _used(run).items():
        tool = run.job.tools[number]
        if tool.taylor is None:
            undeclared.append(f"T{number}")
        elif used > 0.0:
            yield from _judge_tool(run, tool, used, last)
    if undeclared and run.job.unattended:
        yield NotJudged(CHECK, f"no Taylor pair is declared for {', '.join(undeclared)}")


def _used(run: Run) -> dict[int, tuple[float, Move]]:
    """Per tool: the share of an edge's life that one part uses, and its last cut."""
    moves = run.prediction.moves
    used: dict[int, tuple[float, Move]] = {}
    for index in np.flatnonzero(np.nan_to_num(moves.cutting_time) > 0.0):
        move = run.path.moves[int(index)]
        tool = run.job.tools.get(move.tool) if move.tool is not None else None
        speed = float(moves.speed_high[index])
        if tool is None or not math.isfinite(speed) or speed <= 0.0:
            continue
        minutes = float(moves.cutting_time[index]) / 60.0
        share = minutes / float(taylor_life(speed, *tool.taylor)) if tool.taylor is not None else 0.0
        used[tool.number] = (used.get(tool.number, (0.0, move))[0] + share, move)
    return used


def _judge_tool(run: Run, tool: Tool, used: float, last: Move) -> Iterator[Finding]:
    batch = run.job.batch
    if batch is None:
        return
    total, most = used * batch, threshold(run, LIMITS[0])
    parts = max(int(most / used), 0) if run.job.unattended else int(1.0 / used)
    drift = _drift(run, tool, min(total, 1.0))
    tolerance = run.job.workpiece.diameter_tolerance
    story = f"{tool.name} uses {percent(used)} of an edge's life for a part, {percent(total)} for {batch} parts."
    remedy = f"Change the edge after {parts} parts." if parts else "A lower speed: the edge does not last one part."
    if run.job.unattended and total > most:
        yield run.finding(CHECK, Level.REVIEW, last, f"The edge does not last the night: {story} {origin(run, LIMITS)}",
                          value=total, limit=most, unit="", remedy=remedy)
    elif tolerance is not None and drift > tolerance:
        yield run.finding(CHECK, Level.REVIEW, last, f"The part outgrows its tolerance: {story} The diameter drifts by "
                          f"{thousandths(run, drift)} as the edge wears, the tolerance is "
                          f"{thousandths(run, tolerance)}.", value=drift, limit=tolerance, unit="mm",
                          remedy="Correct the offset during the run.")
    elif total > 1.0:
        yield run.finding(CHECK, Level.NOTE, last, story, value=total, limit=1.0, unit="", remedy=remedy)


def _drift(run: Run, tool: Tool, share: float) -> float:
    """Drift of the diameter, mm, of a tool that makes finished surface; 0 for others."""
    finishes = any(
        run.simulation.final_surface[move.index] for move in run.path.moves if move.tool == tool.number
    )
    if not finishes or tool.kind not in ("turning", "boring"):
        return 0.0
    clearance = max(float(normal_clearance(tool.insert_clearance, tool.pocket_rake)), 0.0)
    return float(size_drift(FLANK_WEAR_LIMIT * share, min(clearance, 45.0)))
