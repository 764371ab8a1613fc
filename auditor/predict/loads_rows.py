"""Stretches of one position summed to one row of Loads."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import fields
from typing import Any

import numpy as np

from auditor.declared.model import Job
from auditor.interpret.moves import Kind, Move
from auditor.mechanics.factors import force_scatter
from auditor.mechanics.power import motor_power, power_from_torque
from auditor.predict.edge_integrals import EdgeTable
from auditor.predict.forces import StretchForces
from auditor.predict.loads import Floats, Ints, Loads
from auditor.simulate.pieces import path_length
from auditor.simulate.samples import Samples


def loads_rows(
    samples: Samples, forces: StretchForces, table: EdgeTable, moves: Sequence[Move], job: Job, compliance: Floats
) -> Loads:
    """One row a position; ``compliance`` (m,) is the work's radial give at each stretch, mm/N."""
    first = np.flatnonzero(samples.stretch == 0)
    leading = _leading(forces, first)
    dz, dr = table.direction[samples.edge[first]].T
    along, across = _sum(forces.along, first), _sum(forces.across, first)
    cutting, torque = _sum(forces.cutting, first), _sum(forces.torque, first)
    depth = _sum(forces.extent, first)
    feed, rpm = forces.feed[first], forces.rpm[first]
    power = power_from_torque(torque, rpm)
    run, offset = _runs(moves)
    move = samples.move[first]
    force_x = along * dr + across * dz
    give = compliance[first]
    diameter_speed = 2.0 * np.pi * rpm / 1000.0
    return Loads(
        move=move,
        position=samples.position[first],
        travel=samples.position[first] + offset[move],
        run=run[move],
        z=samples.z[first],
        r=samples.r[first],
        depth=depth,
        length=_sum(forces.length, first),
        area=np.where(np.isnan(samples.infeed[first]), feed, samples.infeed[first]) * depth,
        chip_max=_largest(forces.chip_max, first),
        chip_mean=forces.chip_mean[leading],
        chip_equivalent=forces.chip_equivalent[leading],
        rake=forces.rake[leading],
        feed=feed,
        rpm=rpm,
        speed_low=diameter_speed * np.abs(samples.r[first]),
        speed_high=diameter_speed * np.maximum(np.abs(samples.r[first]), _largest(forces.outermost, first)),
        cutting=cutting,
        feed_force=np.abs(along),
        passive=np.abs(across),
        force_z=along * dz - across * dr,
        force_x=force_x,
        torque=torque,
        power=power,
        motor_power=motor_power(power, job.machine.efficiency),
        scatter=force_scatter(job.workpiece.material.scatter, forces.chip_mean[leading], forces.rake[leading]),
        outermost=_largest(forces.outermost, first),
        compliance=give,
        bend=give * np.abs(force_x),
        bend_tangential=give * cutting,
    )


def _sum(values: Floats, first: Ints) -> Floats:
    total: Floats = np.add.reduceat(values, first)
    return total


def _largest(values: Floats, first: Ints) -> Floats:
    largest: Floats = np.fmax.reduceat(values, first)
    return largest


def _leading(forces: StretchForces, first: Ints) -> Ints:
    """Index of the stretch with the largest cutting force at each position (the longest where no force follows)."""
    weight = np.where(np.isnan(forces.cutting), 0.0, forces.cutting) + 1e-9 * forces.extent
    group = np.repeat(np.arange(len(first)), np.diff(np.append(first, len(weight))))
    order = np.lexsort((weight, group))
    last: Ints = np.append(first[1:], len(weight)) - 1
    return order[last]


def _runs(moves: Sequence[Move]) -> tuple[Ints, Floats]:
    """Number of the unbroken run of feed moves each move belongs to, and the path before it in that run."""
    run = np.zeros(len(moves), dtype=np.int64)
    offset = np.zeros(len(moves))
    number, path = 0, 0.0
    for index, move in enumerate(moves):
        broken = index == 0 or move.kind is Kind.RAPID or moves[index - 1].kind is Kind.RAPID
        if broken or move.tool != moves[index - 1].tool:
            number, path = number + 1, 0.0
        run[index], offset[index] = number, path
        path += path_length(move)
    return run, offset


def no_loads() -> Loads:
    """The loads of a program that never cuts."""
    columns: dict[str, Any] = {
        column.name: np.empty(0, dtype=np.int64 if column.name in ("move", "run") else np.float64)
        for column in fields(Loads)
    }
    return Loads(**columns)
