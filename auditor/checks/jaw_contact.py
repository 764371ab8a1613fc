"""Jaw contact: does the tool run into the jaws?

What
    Follows the tool's outline against the zone of the jaws: behind the jaw face, up to the height of the jaws over the
    work. Looks as well where the point of a drill breaks through: its depth plus the length of its point.

Why
    Jaws at speed take the insert, the holder and the turret with them. A drill that breaks through behind the jaw
    face runs into the jaws of a ring or into the stop in the spindle's bore.

Formula and source
    Geometry. The jaw face lies at Z minus stick_out as declared; the jaws are taken to stand 30 mm over the gripped
    diameter (common size). Stop: the outline enters the zone; a drill whose point breaks through into jaws that hold
    from inside. Review: a drill that breaks through inside the chuck; a cut nearer to the jaw face than
    jaw_clearance. Common practice.

Remedy
    A longer stick-out, a shorter cut, or a Z that keeps the clearance.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import shapely
from shapely.geometry.base import BaseGeometry

from auditor.checks._judging import origin, threshold
from auditor.checks._solids import Floats, entered, jaw_zone, outlines, swept_area
from auditor.checks._words import length, tool_name, z_word
from auditor.declared.model import Tool
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Kind, Move

CHECK = "jaw-contact"
LIMITS = (Limit("jaw_clearance", 1.0, "mm", "common practice", "least distance from the jaws"),)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Moves that enter the jaw zone or come too near to it."""
    zone = jaw_zone(run)
    if zone is None:
        return
    face = -run.job.workholding.stick_out
    shapes = outlines(run)
    for move in run.path.moves:
        tool = run.job.tools.get(move.tool) if move.tool is not None else None
        if tool is None or tool.number not in shapes:
            continue
        shape = shapes[tool.number]
        low = min((z for z in (move.start_z, move.end_z) if z is not None), default=math.inf)
        if low + shape[:, 0].min() > face + threshold(run, LIMITS[0]):
            continue
        finding = _drill(run, move, tool, face) if tool.kind == "drilling" else _outline(run, move, tool, shape, zone)
        if finding is not None:
            yield finding


def _outline(run: Run, move: Move, tool: Tool, shape: Floats, zone: BaseGeometry) -> Finding | None:
    face = -run.job.workholding.stick_out
    inside = entered(shape, move, zone)
    if inside is not None:
        deepest = face - float(shapely.bounds(inside)[0])
        how = "at rapid" if move.kind is Kind.RAPID else "in the cut"
        return run.finding(
            CHECK, Level.STOP, move, f"{tool_name(run, tool.number)} runs into the jaws {how}: "
            f"{length(run, deepest, 1)} behind the jaw face at {z_word(run, face)}.",
            value=deepest, limit=0.0, unit="mm", words=("Z",),
            remedy=f"A stick-out {length(run, deepest + threshold(run, LIMITS[0]), 1)} longer, or a shorter cut.",
        )
    area, least = swept_area(shape, move), threshold(run, LIMITS[0])
    gap = float(shapely.distance(area, zone)) if area is not None else least
    if not 0.0 < gap < least or move.kind is Kind.RAPID:
        return None
    return run.finding(
        CHECK, Level.REVIEW, move, f"{tool_name(run, tool.number)} comes within {length(run, gap)} of the jaws. "
        f"{origin(run, LIMITS)}", value=gap, limit=least, unit="mm", words=("Z",),
        remedy=f"A stick-out {length(run, least - gap + 0.5, 1)} longer.",
    )


def _drill(run: Run, move: Move, tool: Tool, face: float) -> Finding | None:
    """A drill's corners lie behind its point; the point itself breaks through first."""
    holding, end = run.job.workholding, move.end
    if end is None or tool.diameter is None or move.kind is Kind.RAPID:
        return None
    stock_end = float(run.simulation.raw.bounds[0])
    beyond = stock_end - end.z
    if beyond <= 0.0 or stock_end > face:
        return None
    point = 0.5 * tool.diameter / math.tan(math.radians(0.5 * tool.point_angle))
    where = "into the jaws that hold it from inside" if holding.grip_inside else "inside the chuck"
    message = f"The drill breaks through {length(run, beyond, 1)} behind the end of the work (its point is " \
              f"{length(run, point, 1)} long), {where}."
    level = Level.STOP if holding.grip_inside else Level.REVIEW
    return run.finding(CHECK, level, move, message, value=beyond, limit=0.0, unit="mm", words=("Z",),
                       remedy="Make sure that nothing stands there, or end the hole earlier.")
