"""The same move with another feed or a smaller depth: where remedies come from.

Nothing is scaled: the move's stretches are put through the same laws again, so a remedy holds exactly as far as
the prediction does.
"""

from __future__ import annotations

from dataclasses import fields, replace

import numpy as np

from auditor.declared.model import Job
from auditor.interpret.moves import Feed, Interpretation, Move
from auditor.predict.edge_integrals import EdgeTable
from auditor.predict.forces import stretch_forces
from auditor.predict.loads import Loads
from auditor.predict.loads_rows import loads_rows, no_loads
from auditor.predict.stiffness import compliances
from auditor.simulate.samples import Samples, Simulation


def at_feed(job: Job, path: Interpretation, simulation: Simulation, move_index: int, feed_mm_per_rev: float) -> Loads:
    """Loads of one move at another feed per revolution."""
    move = replace(path.moves[move_index], feed=Feed("rev", feed_mm_per_rev))
    return _loads(job, move, simulation, _rows_of(simulation.samples, move_index))


def at_depth(job: Job, path: Interpretation, simulation: Simulation, move_index: int, depth_mm: float) -> Loads:
    """Loads of one move set back from the finished surface until it cuts ``depth_mm`` deep.

    The raw surface stays where it is, so the tool runs at another radius.
    """
    rows = _rows_of(simulation.samples, move_index)
    ends = np.array([(edge.across[0], edge.across[-1]) for edge in simulation.edges]).reshape(-1, 2)
    lowest, highest = ends[rows.edge].T
    # The finished surface lies at that end of the edge which the stretches reach.
    at_low_end = np.abs(rows.low - lowest) <= np.abs(highest - rows.high)
    set_back = max(float((rows.high - rows.low).max(initial=0.0)) - depth_mm, 0.0)
    across_r = np.array([edge.direction[0] for edge in simulation.edges])[rows.edge]
    shallower = replace(
        rows,
        r=rows.r + np.where(at_low_end, set_back, -set_back) * across_r,
        low=np.where(at_low_end, rows.low, np.minimum(rows.high, np.maximum(rows.low, highest - depth_mm))),
        high=np.where(at_low_end, np.maximum(rows.low, np.minimum(rows.high, lowest + depth_mm)), rows.high),
    )
    return _loads(job, path.moves[move_index], simulation, shallower)


def _rows_of(samples: Samples, move_index: int) -> Samples:
    first, last = np.searchsorted(samples.move, (move_index, move_index + 1))
    return Samples(**{column.name: getattr(samples, column.name)[first:last] for column in fields(Samples)})


def _loads(job: Job, move: Move, simulation: Simulation, rows: Samples) -> Loads:
    """Loads of the rows of one move, as if it were the whole program."""
    if len(rows.move) == 0:
        return no_loads()
    compliance = compliances(rows, simulation.stock_before, job)
    used, edge = np.unique(rows.edge, return_inverse=True)
    table = EdgeTable.of([simulation.edges[number] for number in used])
    alone = replace(rows, move=np.zeros_like(rows.move), edge=edge)
    loads = loads_rows(alone, stretch_forces(alone, table, [move], job), table, [move], job, compliance)
    return replace(loads, move=np.full_like(loads.move, move.index))
