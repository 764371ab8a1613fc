"""What the geometry rules ask about a cut: which moves, which way, in what part of the stock."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from auditor.checks._judging import cutting_moves
from auditor.declared.model import Tool, ToolKind
from auditor.findings import Run
from auditor.interpret.moves import Kind, Move
from auditor.mechanics.bending import diameter_error as bent_diameter
from auditor.predict.loads import Loads

Floats = NDArray[np.float64]

SPRING_PASS = 0.02  # mm; a cut shallower than this takes off what an earlier one left standing, no chip is meant
SMALLEST_DIAMETER = 1.0  # mm; bending at the axis itself makes no diameter
SIDEWAYS: tuple[ToolKind, ...] = ("turning", "boring")


@dataclass(frozen=True, slots=True)
class Cut:
    """One feed or arc move of a declared tool that takes stock off, with its rows of Loads."""

    move: Move
    tool: Tool
    rows: slice

    def largest(self, figure: Floats) -> float:
        """The largest value along the cut; NaN when it is not known anywhere."""
        return float(np.fmax.reduce(figure[self.rows]))

    def row_of_largest(self, figure: Floats) -> int:
        """The row where it is largest."""
        own = figure[self.rows]
        return int(self.rows.start) + int(np.argmax(np.where(np.isnan(own), -np.inf, own)))


def cuts(run: Run, kinds: tuple[ToolKind, ...] = SIDEWAYS) -> Iterator[Cut]:
    """The cuts of tools of these kinds in order of execution; rapids and threads left out."""
    loads = run.prediction.loads
    cutting = np.flatnonzero(cutting_moves(run))
    begin, behind = np.searchsorted(loads.move, cutting), np.searchsorted(loads.move, cutting + 1)
    for index, low, high in zip(cutting.tolist(), begin.tolist(), behind.tolist(), strict=True):
        move = run.path.moves[index]
        tool = run.job.tools.get(move.tool) if move.tool is not None else None
        if tool is None or tool.kind not in kinds or move.kind in (Kind.RAPID, Kind.THREAD):
            continue
        if high > low:
            yield Cut(move, tool, slice(low, high))


def along_axis(move: Move) -> bool:
    """Whether the move is straight and parallel to Z or X: a cylinder or a face."""
    if move.kind is Kind.ARC or move.start is None or move.end is None:
        return False
    return abs(move.end.z - move.start.z) < 1e-6 or abs(move.end.r - move.start.r) < 1e-6


def wipes_outwards(cut: Cut) -> bool:
    """Whether the tool only draws out of the cut along a shoulder, away from the surface it made."""
    start, end = cut.move.start, cut.move.end
    if start is None or end is None or abs(end.z - start.z) > 1e-6:
        return False
    away = end.r - start.r if cut.tool.kind == "turning" else start.r - end.r
    return away > 0.0


def roughs(cut: Cut) -> bool:
    """Whether a roughing cycle makes this move; what its steps leave between them is its own business."""
    return cut.move.cycle is not None and cut.move.cycle.startswith("rough")


def raw_radius(run: Run, z: float) -> float:
    """Outer radius of the raw stock at a length, mm; 0 beyond its ends."""
    outline = run.job.workpiece.outline
    reached = [0.0]
    for start, end in zip(outline, (*outline[1:], outline[0]), strict=True):
        low, high = min(start.z, end.z), max(start.z, end.z)
        if low <= z <= high:
            share = (z - start.z) / (end.z - start.z) if high > low else 0.0
            reached.append(max(start.r, end.r) if high == low else start.r + share * (end.r - start.r))
    return max(reached)


def interrupted(run: Run, cut: Cut) -> bool:
    """Whether the work strikes the edge in this cut: keyways, cross holes, flats of hexagon and square bar."""
    loads, work = run.prediction.loads, run.job.workpiece
    z = loads.z[cut.rows][loads.depth[cut.rows] > 0.0]
    if not len(z):
        return False
    if any(low <= z.max() and z.min() <= high for low, high in work.interrupted):
        return True
    flats = {"hexagon": math.cos(math.pi / 6.0), "square": math.cos(math.pi / 4.0)}.get(work.section)
    return flats is not None and cut.largest(loads.outermost) > 0.5 * work.diameter * flats + 1e-3


def in_skin(run: Run, cut: Cut) -> bool:
    """Whether the cut goes through a rolled, cast or forged skin."""
    if run.job.workpiece.skin not in ("hot rolled", "cast", "forged"):
        return False
    loads = run.prediction.loads
    for row in range(cut.rows.start, cut.rows.stop):
        raw = raw_radius(run, float(loads.z[row]))
        if loads.depth[row] > 0.0 and raw > 0.0 and loads.outermost[row] >= raw - 0.05:
            return True
    return False


def wedge_angle(tool: Tool) -> float:
    """Normal wedge angle of the insert behind its land, deg: 90 less clearance less chip-breaker face."""
    return 90.0 - tool.insert_clearance - tool.face_rake


def tolerance_third(run: Run) -> float | None:
    """A third of the diameter tolerance, mm; None when no tolerance is declared."""
    tolerance = run.job.workpiece.diameter_tolerance
    return None if tolerance is None else tolerance / 3.0


def diameter_errors(run: Run) -> Floats:
    """Diameter the work comes out larger by at every row of the program's Loads, mm."""
    return bending_errors(run.prediction.loads)


def bending_errors(loads: Loads) -> Floats:
    """Diameter the work comes out larger by at every row, mm: 2y + 2 y_t^2/d, NaN where not known.

    y is the push-off by the passive force, y_t the bend downwards by the cutting force.
    """
    known = np.isfinite(loads.bend) & np.isfinite(loads.bend_tangential)
    across = np.maximum(2.0 * np.abs(loads.r), SMALLEST_DIAMETER)
    errors = np.full(len(loads.r), np.nan)
    errors[known] = bent_diameter(loads.bend[known], loads.bend_tangential[known], across[known])
    return errors
