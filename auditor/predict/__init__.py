"""Mechanics applied to Samples: Loads."""

from __future__ import annotations

from auditor.declared.model import Job
from auditor.interpret.moves import Interpretation
from auditor.predict.edge_integrals import EdgeTable
from auditor.predict.figures import move_figures
from auditor.predict.forces import stretch_forces
from auditor.predict.loads import Loads, Prediction
from auditor.predict.loads_rows import loads_rows, no_loads
from auditor.predict.stiffness import compliances
from auditor.simulate.samples import Simulation

__all__ = ["predict"]


def predict(path: Interpretation, simulation: Simulation, job: Job) -> Prediction:
    """Forces, power and bending along every cutting move of a simulated program."""
    loads = _loads(path, simulation, job)
    samples = simulation.samples
    piece = samples.piece[samples.stretch == 0]
    figures = move_figures(path.moves, loads, piece, job)
    return Prediction(loads=loads, moves=figures, wear_factor=job.model.wear_factor)


def _loads(path: Interpretation, simulation: Simulation, job: Job) -> Loads:
    samples = simulation.samples
    if len(samples.move) == 0:
        return no_loads()
    table = EdgeTable.of(simulation.edges)
    forces = stretch_forces(samples, table, path.moves, job)
    compliance = compliances(samples, simulation.stock_before, job)
    return loads_rows(samples, forces, table, path.moves, job, compliance)
