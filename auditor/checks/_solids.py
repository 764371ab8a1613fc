"""Where a tool's outline goes, and the bodies it must not meet: jaws and tailstock."""

from __future__ import annotations

import numpy as np
import shapely
from numpy.typing import NDArray
from shapely.geometry.base import BaseGeometry

from auditor.declared.model import Workholding
from auditor.findings import Run
from auditor.interpret.moves import Move
from auditor.simulate.stock import swept
from auditor.simulate.tool_outline import tool_outline

Floats = NDArray[np.float64]

TOUCH = 0.01  # mm2; a smaller overlap is the chording of a nose
JAW_HEIGHT = 30.0  # mm the jaws stand out beyond the work they grip, where only the grip is known (common size)
CENTRE_ANGLE = 60.0  # deg, included, of a lathe centre (common size)
TAIL_BEHIND = 200.0  # mm of tailstock that is watched behind its centre


def outlines(run: Run) -> dict[int, Floats]:
    """The outline of every declared tool, as nodes (z, r) about its programmed point; bar stops left out."""
    return {number: tool_outline(tool).hull() for number, tool in run.job.tools.items() if tool.kind != "stop"}


def swept_area(outline: Floats, move: Move) -> BaseGeometry | None:
    """What an outline covers along a move, arcs taken as their chord; None where the way is not known."""
    start, end = move.start, move.end
    if start is None or end is None:
        return None
    return swept(outline, (end.z - start.z, end.r - start.r), start)


def entered(outline: Floats, move: Move, zone: BaseGeometry) -> BaseGeometry | None:
    """Where an outline comes into a body during a move; None where it does not, or stood in it before."""
    area = swept_area(outline, move)
    if area is None:
        return None
    inside = shapely.intersection(area, zone)
    if shapely.area(inside) <= TOUCH:
        return None
    standing = shapely.convex_hull(shapely.multipoints(outline + np.asarray(move.start)))
    return None if shapely.area(shapely.intersection(standing, zone)) > TOUCH else inside


def jaw_zone(run: Run) -> BaseGeometry | None:
    """Half-section of the jaws: behind the jaw face, from the gripped radius outwards (inwards for an inside grip)."""
    holding = run.job.workholding
    if holding.kind == "centres":
        return None
    face = -holding.stick_out
    gripped = 0.5 * (holding.grip_diameter or run.job.workpiece.diameter)
    if holding.grip_inside:
        return shapely.box(face - 100.0, max(gripped - JAW_HEIGHT, 0.0), face, gripped)
    return shapely.box(face - 100.0, gripped, face, gripped + JAW_HEIGHT)


def tailstock_zone(holding: Workholding) -> BaseGeometry | None:
    """Half-section of the centre: a 60 degree point up to its diameter, and its body behind."""
    point, diameter = holding.tailstock_point, holding.tailstock_diameter
    if point is None:
        return None
    radius = 0.5 * (diameter or 20.0)
    cone = radius / 0.57735  # tan of half the centre's angle
    end = point.z + cone + TAIL_BEHIND
    return shapely.polygons([(point.z, 0.0), (end, 0.0), (end, radius), (point.z + cone, radius)])
