"""The same move with another feed or a smaller depth: where remedies come from.

Nothing is scaled: the move's stretches are put through the same laws again, so a remedy holds exactly as far as
the prediction does.
"""

from __future__ import annotations

from dataclasses import fields, replace

import numpy as np

from auditor.declared.model import Job
from auditor.interpret.moves import Feed, Interpretation
from auditor.predict.edge_integrals import EdgeTable
from auditor.predict.forces import stretch_forces
from auditor.predict.loads import Loads
from auditor.predict.loads_rows import loads_rows, no_loads
from auditor.predict.stiffness import compliances
from auditor.simulate.samples import Samples, Simulation


def at_feed(job: Job, path: Interpretation, simulation: Simulation, move_index: int, feed_mm_per_rev: float) -> Loads:
    """Loads of one move at another feed per revolution."""
    return _loads(job, path, simulation, _rows_of(simulation.samples, move_index), move_index, feed_mm_per_rev)


def at_depth(job: Job, path: Interpretation, simulation: Simulation, move_index: int, depth_mm: float) -> Loads:
    """Loads of one move that leaves more standing, so that its edge is engaged ``depth_mm`` deep at most."""
    rows = _rows_of(simulation.samples, move_index)
    table = EdgeTable.of(simulation.edges)
    lowest, highest = table.across[table.first[rows.edge]], table.across[table.last[rows.edge]]
    # The finished surface lies at that end of the edge which the stretches reach.
    at_low_end = np.abs(rows.low - lowest) <= np.abs(highest - rows.high)
    low = np.where(at_low_end, rows.low, np.minimum(rows.high, np.maximum(rows.low, highest - depth_mm)))
    high = np.where(at_low_end, np.maximum(rows.low, np.minimum(rows.high, lowest + depth_mm)), rows.high)
    # The stock stays where it is: a shallower cut runs that much further out.
    outwards = (rows.high - high) - (low - rows.low)
    dz, dr = table.direction[rows.edge].T
    shallower = replace(rows, low=low, high=high, z=rows.z - outwards * dr, r=rows.r + outwards * dz)
    return _loads(job, path, simulation, shallower, move_index, None)


def _rows_of(samples: Samples, move_index: int) -> Samples:
    first, last = np.searchsorted(samples.move, (move_index, move_index + 1))
    return Samples(**{column.name: getattr(samples, column.name)[first:last] for column in fields(Samples)})


def _loads(
    job: Job, path: Interpretation, simulation: Simulation, rows: Samples, move_index: int, feed: float | None
) -> Loads:
    if len(rows.move) == 0:
        return no_loads()
    moves = list(path.moves)
    if feed is not None:
        moves[move_index] = replace(moves[move_index], feed=Feed("rev", feed))
    table = EdgeTable.of(simulation.edges)
    forces = stretch_forces(rows, table, moves, job)
    return loads_rows(rows, forces, table, moves, job, compliances(rows, simulation.stock_before, job))
