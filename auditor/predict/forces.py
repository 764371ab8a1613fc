"""Forces on every engaged stretch, and their sum at every position.

Per stretch: Kienzle's law integrated along the edge, with the rake that the stretch's mean chip thickness
makes effective; a thrust at right angles to the chord through its ends (contract of the JSON report).
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from auditor.declared.model import Job, Material, Tool
from auditor.interpret.moves import Move
from auditor.mechanics.chip import equivalent_thickness
from auditor.mechanics.factors import operation_factor, rake_factor, speed_factor, tool_material_factor
from auditor.mechanics.rake import effective_rake, normal_rake
from auditor.mechanics.thrust import bounded_thrust, friction_thrust, pair_thrust, resultant_thrust
from auditor.predict.edge_integrals import EdgeTable, Integrals, integrate
from auditor.predict.kinematics import Commands
from auditor.predict.loads import Floats
from auditor.simulate.samples import Samples

FINISHED_END = 1e-6  # mm: a stretch that begins this close to the end of the edge reaches the finished surface


@dataclass(frozen=True, slots=True)
class ToolFigures:
    """Per tool of the program, looked up by position in a common array; shape (tools,)."""

    number: Mapping[int, int]  # tool number -> position
    normal_rake: Floats
    face_rake: Floats
    land_rake: Floats
    land_width: Floats
    factor: Floats  # tool material times operation
    flutes: Floats  # edges that share the feed
    drills: NDArray[np.bool_]

    @classmethod
    def of(cls, tools: Mapping[int, Tool], *, operation: bool) -> ToolFigures:
        """The figures of the declared tools."""
        ordered = list(tools.values())
        return cls(
            number={tool.number: index for index, tool in enumerate(ordered)},
            normal_rake=np.array([float(normal_rake(t.pocket_rake, t.pocket_inclination)) for t in ordered]),
            face_rake=np.array([t.face_rake for t in ordered]),
            land_rake=np.array([t.land_rake for t in ordered]),
            land_width=np.array([t.land_width for t in ordered]),
            factor=np.array(
                [
                    tool_material_factor(t.substrate) * (operation_factor(t.kind) if operation else 1.0)
                    for t in ordered
                ]
            ),
            flutes=np.array([float(t.flutes) if t.kind == "drilling" else 1.0 for t in ordered]),
            drills=np.array([t.kind == "drilling" for t in ordered], dtype=bool),
        )


@dataclass(frozen=True, slots=True)
class StretchForces:
    """One row per stretch (as Samples), shape (m,); NaN where no force follows."""

    feed: Floats  # mm/rev of the spindle
    rpm: Floats
    extent: Floats
    length: Floats
    chip_max: Floats
    chip_mean: Floats
    chip_equivalent: Floats
    rake: Floats
    cutting: Floats
    along: Floats  # on the tool, in the direction of motion (so negative)
    across: Floats  # on the tool, across it
    torque: Floats  # N m
    outermost: Floats  # largest engaged radius, mm


def stretch_forces(samples: Samples, table: EdgeTable, moves: Sequence[Move], job: Job) -> StretchForces:
    """Forces on the stretches of the given samples."""
    material = job.workpiece.material
    tools = ToolFigures.of(job.tools, operation=job.model.operation_factor)
    commands = Commands.of(moves, job.machine)
    mc = material.mc if material.mc is not None else 0.0
    tool = np.array([tools.number.get(move.tool or 0, 0) for move in moves], dtype=np.int64)[samples.move]
    rpm = commands.rpm(samples.move, samples.r)
    feed = commands.feed_per_rev(samples.move, rpm)
    flutes = tools.flutes[tool]
    advance = np.where(np.isnan(samples.infeed), feed / flutes, np.where(np.isnan(feed), np.nan, samples.infeed))
    edge = integrate(table, samples.edge, samples.low, samples.high, mc)
    area = advance * edge.extent
    mean = _ratio(area, edge.length)
    rake = effective_rake(
        tools.normal_rake[tool], tools.face_rake[tool], tools.land_rake[tool], tools.land_width[tool], mean
    )
    inner, outer = _radii(table, samples, edge)
    speed = np.pi * rpm * (inner + outer) / 1000.0  # at the middle of the stretch
    factor = tools.factor[tool] * (speed_factor(speed) if job.model.speed_correction else 1.0)
    cutting, torque = _cutting_force(material, samples, table, edge, advance, rake, factor * flutes)
    thrust = _thrust(material, cutting / flutes, mean, edge.length, rake, factor) * flutes
    # A drill's lips balance each other; its chisel edge adds about as much thrust again as they make.
    drills = tools.drills[tool]
    along, across = _resolved(table, samples, edge, advance, np.where(drills, cutting, thrust))
    across = np.where(drills, 0.0, across)
    # An edge in air carries nothing, but what cannot be known of the cut is not known beside it either.
    idle = (edge.extent <= 0.0) & np.isfinite(advance) & (material.kc11 is not None)
    cutting, torque, along, across = (np.where(idle, 0.0, figure) for figure in (cutting, torque, along, across))
    return StretchForces(
        feed=feed, rpm=rpm, extent=edge.extent, length=edge.length,
        chip_max=advance * edge.sine_max, chip_mean=mean,
        chip_equivalent=equivalent_thickness(area, edge.length, advance), rake=rake,
        cutting=cutting, along=along, across=across, torque=torque, outermost=outer,
    )  # fmt: skip


def _ratio(numerator: Floats, denominator: Floats) -> Floats:
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(denominator > 0.0, numerator / denominator, np.nan)


def _radii(table: EdgeTable, samples: Samples, edge: Integrals) -> tuple[Floats, Floats]:
    """Smallest and largest radius of each stretch, from its ends (mm)."""
    dz, dr = table.direction[samples.edge].T
    low = np.abs(samples.r + edge.low_along * dr + samples.low * dz)
    high = np.abs(samples.r + edge.high_along * dr + samples.high * dz)
    return np.minimum(low, high), np.maximum(low, high)


def _cutting_force(
    material: Material, samples: Samples, table: EdgeTable, edge: Integrals, advance: Floats, rake: Floats,
    factor: Floats,
) -> tuple[Floats, Floats]:  # fmt: skip
    """Cutting force (N) and torque (N m): Kienzle integrated along the edge, first moment about the axis."""
    if material.kc11 is None or material.mc is None:
        nothing = np.full(len(advance), np.nan)
        return nothing, nothing
    scale = factor * rake_factor(rake, material.reference_rake) * material.kc11 * advance ** (1.0 - material.mc)
    dz, dr = table.direction[samples.edge].T
    moment = samples.r * edge.kienzle + dr * edge.moment_along + dz * edge.moment_across
    return scale * edge.kienzle, scale * np.abs(moment) / 1000.0


def _thrust(
    material: Material, cutting: Floats, mean: Floats, length: Floats, rake: Floats, factor: Floats
) -> Floats:
    """In-plane thrust of each stretch, N: declared pair, catalogue pairs or friction angle, in this order."""
    reference = material.reference_rake
    if material.kn11 is not None and material.mn is not None:
        return pair_thrust(material.kn11, material.mn, mean, length, rake, reference) * factor
    if None not in (material.kf11, material.mf, material.kp11, material.mp):
        free = resultant_thrust(
            material.kf11 or 0.0, material.mf or 0.0, material.kp11 or 0.0, material.mp or 0.0,
            mean, length, rake, reference,
        )  # fmt: skip
        return bounded_thrust(free * factor, cutting)
    return friction_thrust(cutting, material.friction_angle, rake, reference)


def _resolved(
    table: EdgeTable, samples: Samples, edge: Integrals, advance: Floats, thrust: Floats
) -> tuple[Floats, Floats]:
    """Thrust on the tool along and across the motion: at right angles to the chord of the stretch.

    Where the stretch reaches the finished surface on a rounded nose its end lies half a feed behind the tip.
    """
    low_round = _finished_radius(samples.low, table.across[table.first[samples.edge]], table.round_low[samples.edge])
    high_round = _finished_radius(samples.high, table.across[table.last[samples.edge]], table.round_high[samples.edge])
    chord_along = edge.high_along - edge.low_along
    chord_across = samples.high - samples.low
    half = 0.5 * np.where(np.isnan(advance), 0.0, advance)
    low_half, high_half = np.minimum(half, low_round), np.minimum(half, high_round)
    chord_along = chord_along + low_half - high_half
    chord_across = chord_across - _rise(low_round, low_half) - _rise(high_round, high_half)
    chord = np.hypot(chord_along, chord_across)
    return -thrust * _ratio(chord_across, chord), thrust * _ratio(chord_along, chord)


def _finished_radius(end: Floats, edge_end: Floats, radius: Floats) -> Floats:
    return np.where(np.abs(end - edge_end) < FINISHED_END, radius, 0.0)


def _rise(radius: Floats, half: Floats) -> Floats:
    return radius - np.sqrt(np.maximum(radius**2 - half**2, 0.0))


