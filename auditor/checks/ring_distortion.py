"""Ring distortion: do the jaws squeeze a thin ring out of round?

What
    For a thin ring in jaws, works out by how much the jaws press its wall into a clover leaf, and compares it with
    the diameter tolerance.

Why
    A ring bored round in the jaws springs back when they open and measures three lobes. A two-point gauge does not
    even show it.

Formula and source
    (0.0159 + 0.0143) P R^3 / (E I) for three equal radial forces P (Roark, from memory): radius between the jaws less
    radius under them; R mean radius, I = length x wall^3 / 12 of the finished ring at its thinnest bored section. Only
    for walls under a tenth of the diameter. The diameter error is twice that. Stop: over the tolerance. Review: over
    half of it, since where and how wide the jaws hold is not declared.

Remedy
    The grip force at which the same formula meets half the tolerance; pie jaws, an end clamp, or a mandrel.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
import shapely

from auditor.checks._cuts import Cut, cuts
from auditor.checks._words import figure, finding_at, length, thousandths
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.mechanics.bending import ring_lobing

CHECK = "ring-distortion"
LIMITS: tuple[Limit, ...] = ()
THIN = 0.1  # wall over diameter


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """The last boring cut of a ring that the jaws press out of round."""
    holding, tolerance = run.job.workholding, run.job.workpiece.diameter_tolerance
    wall = _thinnest_wall(run)
    if wall is None or holding.kind not in ("chuck", "chuck+tailstock"):
        return
    if holding.grip_force is None or tolerance is None:
        yield NotJudged(CHECK, "workholding.grip_force or workpiece.diameter_tolerance is not declared")
        return
    last = _last_cut(run)
    inner, outer = wall
    low, _, high, _ = run.simulation.final.bounds
    moment = (high - low) * (outer - inner) ** 3 / 12.0
    force = holding.grip_force / holding.jaws
    lobes = 2.0 * float(ring_lobing(force, 0.5 * (inner + outer), run.job.workpiece.material.modulus, moment))
    if last is None or holding.jaws != 3 or lobes <= 0.5 * tolerance:
        return
    level, limit = (Level.STOP, tolerance) if lobes > tolerance else (Level.REVIEW, 0.5 * tolerance)
    message = f"The jaws press the ring (wall {length(run, outer - inner)}) out of round by " \
              f"{thousandths(run, lobes)} on the diameter; it springs back when they open. " \
              f"The tolerance is {thousandths(run, tolerance)}."
    remedy = f"At most {figure(holding.grip_force * 0.5 * tolerance / lobes / 1000)} kN of grip, pie jaws or a mandrel."
    row = last.row_of_largest(run.prediction.loads.depth)
    yield finding_at(run, CHECK, level, row, message, value=lobes, limit=limit, unit="mm", remedy=remedy)


def _thinnest_wall(run: Run) -> tuple[float, float] | None:
    """Inner and outer radius of the finished part where its wall is thinnest for its size; None when nowhere thin."""
    final = run.simulation.final
    if final.is_empty:
        return None
    low, _, high, top = final.bounds
    thinnest: tuple[float, float] | None = None
    for z in np.linspace(low, high, 22)[1:-1]:
        across = shapely.intersection(final, shapely.linestrings([(z, 0.0), (z, top + 1.0)]))
        if shapely.is_empty(across):
            continue
        _, inner, _, outer = shapely.bounds(across)
        share = (outer - inner) / (2.0 * outer)
        if inner > 1e-6 and share < THIN and (thinnest is None or share < 0.5 * (1.0 - thinnest[0] / thinnest[1])):
            thinnest = float(inner), float(outer)
    return thinnest


def _last_cut(run: Run) -> Cut | None:
    found = None
    for cut in cuts(run):
        if run.simulation.final_surface[cut.move.index]:
            found = cut
    return found
