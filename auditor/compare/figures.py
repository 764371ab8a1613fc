"""The figures by which tools are compared: the largest over every cut of one station."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from auditor.checks._bending import bar_push_off
from auditor.checks._cuts import Cut, cuts, diameter_errors, wedge_angle
from auditor.declared.model import Tool, ToolKind
from auditor.findings import Run
from auditor.mechanics.clearance import normal_clearance, orthogonal_clearance
from auditor.mechanics.copying import minor_edge_angle
from auditor.mechanics.rake import normal_rake
from auditor.mechanics.roughness import average_roughness, real_to_ideal
from auditor.predict.edge_use import edge_use
from auditor.predict.spindle import power_at

# A drill's lips balance each other, so that it bends nothing aside.
BENDING: tuple[ToolKind, ...] = ("turning", "boring", "grooving", "face grooving", "parting", "threading")
LEAST_MINOR = 1.0  # deg; below, feed marks are no longer set by the trailing edge
ROUND_MINOR = 60.0  # deg, stands in for the trailing edge a round insert has not

Floats = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class ToolFigures:
    """Largest figures of one tool over the program; None where one does not apply or is not declared."""

    rake: float | None  # deg, effective, where the cutting force is largest
    clearance: float | None  # deg, of the seated insert, before the feed takes its share
    wedge: float | None  # deg, behind the land
    cutting: float | None  # N
    feed_force: float | None  # N
    passive: float | None  # N
    torque: float | None  # N m
    motor_power: float | None  # kW
    spindle_share: float | None  # of what the spindle can give at that speed
    work_bend: float | None  # mm of diameter, by which the work comes out larger
    tool_bend: float | None  # mm, push-off of a boring bar
    roughness: float | None  # um Ra, on the finished surface
    edges: float | None  # of an edge's life used by one part; with a declared Taylor pair
    time: float  # s


def figures_of(run: Run, number: int) -> ToolFigures:
    """The figures of tool ``number`` in an audited program."""
    tool = run.job.tools[number]
    mine = np.array([move.tool == number for move in run.path.moves], dtype=bool)
    figures, loads = run.prediction.moves, run.prediction.loads
    rows = mine[loads.move]
    with np.errstate(divide="ignore", invalid="ignore"):
        share = loads.motor_power / power_at(run.job.machine, loads.rpm)
    errors = diameter_errors(run)
    own = [cut for cut in cuts(run, BENDING) if cut.tool.number == number]
    seated = tool.kind not in ("drilling", "stop")
    return ToolFigures(
        rake=_at_heaviest(loads.rake[rows], loads.cutting[rows]),
        clearance=seated_clearance(tool) if seated else None,
        wedge=wedge_angle(tool) if seated else None,
        cutting=largest(figures.cutting[mine]),
        feed_force=largest(figures.feed_force[mine]),
        passive=largest(figures.passive[mine]),
        torque=largest(figures.torque[mine]),
        motor_power=largest(figures.motor_power[mine]),
        spindle_share=largest(share[rows]),
        work_bend=largest(np.array([cut.largest(errors) for cut in own])),
        tool_bend=largest(np.array([bar_push_off(run, cut) for cut in own])) if tool.kind == "boring" else None,
        roughness=_roughness(run, own),
        edges=edge_use(tool, run.path.moves, figures),
        time=float(np.nansum(figures.time[mine])),
    )


def largest(values: Floats) -> float | None:
    """The largest finite value, if there is one."""
    finite = values[np.isfinite(values)]
    return float(finite.max()) if finite.size else None


def seated_clearance(tool: Tool) -> float:
    """Orthogonal clearance of the insert in its pocket, deg."""
    pocket = float(normal_rake(tool.pocket_rake, tool.pocket_inclination))
    return float(orthogonal_clearance(normal_clearance(tool.insert_clearance, pocket), tool.pocket_inclination))


def _at_heaviest(values: Floats, force: Floats) -> float | None:
    if not np.isfinite(force).any():
        return largest(values)
    value = float(values[int(np.nanargmax(force))])
    return value if math.isfinite(value) else None


def _roughness(run: Run, own: list[Cut]) -> float | None:
    """The roughest stretch of the finished surface, um Ra: exact cusp of nose and edges times real over ideal."""
    loads, short = run.prediction.loads, run.job.workpiece.material.chips == "short"
    found = []
    for cut in own:
        if not run.simulation.final_surface[cut.move.index] or cut.tool.nose_radius <= 0.0:
            continue
        feed, speed = cut.largest(loads.feed), cut.largest(loads.speed_high)
        if math.isfinite(feed) and math.isfinite(speed):
            kappa = cut.tool.cutting_edge_angle
            ideal = average_roughness(feed, cut.tool.nose_radius, kappa, _minor(cut.tool))
            found.append(float(ideal) * float(real_to_ideal(speed, free_cutting=short)))
    return max(found, default=None)


def _minor(tool: Tool) -> float:
    if tool.shape == "R":
        return ROUND_MINOR
    return max(float(minor_edge_angle(tool.cutting_edge_angle, tool.included_angle)), LEAST_MINOR)
