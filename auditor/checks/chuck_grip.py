"""Chuck grip: does the chuck hold the work against this cut?

What
    Compares the grip left at the speed of each cut with what its torque, its axial pull and its tilting moment
    need, at the expected forces.

Why
    Work that slips in the jaws scores, stops or flies. Far from the jaws the tilting moment pulls it out long
    before the torque turns it.

Formula and source
    Grip left = static grip less the jaws' centrifugal force (VDI 3106); a collet has no flying jaws; a grip from
    inside gains by speed, which is not credited. Need = the larger of sqrt((2 M / D)^2 + Fz^2) / friction for
    slipping (VDI 3106; Fz is the pull out of the chuck, a push is taken by its face) and
    3 x sqrt(Fc^2 + Fp^2) x distance from the jaws / D for tilting (estimate, 2 to 4 without an end stop). In a
    collet, with a tailstock or a centre nothing tilts. Stop: under grip_safety times the need (1.5, VDI 3106).
    Review: under grip_safety_squared (2.25: 1.5 for the cut times 1.5 for the chuck). Cutting forces under 50 N are
    not judged. A collet whose grip_diameter is not declared grips the bar's diameter.

Remedy
    The feed or depth at which the same formulas keep the safety; more grip; a shorter stick-out; a lower speed.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np
from numpy.typing import NDArray

from auditor.checks._judging import MOST_CURED, SMALL_FORCE, lasting, rows_of, threshold
from auditor.checks._remedy import way_out
from auditor.checks._turning import has_flying_jaws
from auditor.checks._words import figure, finding_at
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.mechanics.clamping import centrifugal_force, grip_for_cut, grip_for_tilting, grip_left
from auditor.predict.loads import Loads

CHECK = "chuck-grip"
LIMITS = (
    Limit("grip_safety", 1.5, "", "published", "least grip left over grip needed (VDI 3106)"),
    Limit("grip_safety_squared", 2.25, "", "published", "better grip left over grip needed (VDI 3106, both factors)"),
)

Floats = NDArray[np.float64]

USUAL_FRICTION = 0.15  # smooth jaws on raw stock


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts that the chuck hardly holds."""
    holding = run.job.workholding
    if holding.kind == "centres":
        return
    if holding.grip_force is None:
        yield NotJudged(CHECK, "workholding.grip_force is not declared")
        return
    if holding.grip_diameter is None and holding.kind != "collet":
        yield NotJudged(CHECK, "workholding.grip_diameter is not declared")
        return
    if run.job.workpiece.material.kc11 is None:
        yield NotJudged(CHECK, f"no force pair is known for {run.job.workpiece.material.name}")
        return
    if has_flying_jaws(holding) and (holding.jaw_mass is None or holding.jaw_radius is None):
        yield NotJudged(CHECK, "workholding.jaw_mass or jaw_radius is not declared: the grip lost by speed is left out")
    yield from _judge_moves(run)


def _judge_moves(run: Run) -> Iterator[Finding]:
    loads = run.prediction.loads
    share = used_share(run, loads)
    least, better = (threshold(run, limit) for limit in LIMITS)
    worst: dict[int, tuple[float, int]] = {}
    for index in np.unique(loads.move[np.nan_to_num(share) > 1.0 / better]):
        used = lasting(loads, share, int(index))
        line = run.path.moves[int(index)].line
        if used > max(1.0 / better, worst.get(line, (0.0, 0))[0]):
            worst[line] = (used, int(index))
    gravest = sorted(worst.values(), reverse=True)[:MOST_CURED]
    for used, index in worst.values():
        yield _finding(run, index, used, share, limits=(least, better), curable=(used, index) in gravest)


def used_share(run: Run, loads: Loads) -> Floats:
    """Grip needed over grip left, NaN where the force is too small to judge."""
    needed, left = _grips(run, loads)
    with np.errstate(divide="ignore", invalid="ignore"):
        share = np.where(left > 0.0, needed / np.maximum(left, 1e-9), np.inf)
    return np.where(loads.cutting >= SMALL_FORCE, share, np.nan)


def _grips(run: Run, loads: Loads) -> tuple[Floats, Floats]:
    """Grip needed and grip left, N."""
    holding = run.job.workholding
    grip = holding.grip_diameter or run.job.workpiece.diameter  # a collet grips the bar
    friction = holding.friction or USUAL_FRICTION
    turning = np.nan_to_num(loads.torque) * 2000.0 / grip  # N at the gripped diameter
    pull = np.maximum(-np.nan_to_num(loads.force_z), 0.0)  # a push is taken by the chuck's face
    slip = grip_for_cut(turning, pull, grip, grip, friction)
    tilt = _tilting(run, loads, grip) if holding.kind == "chuck" else 0.0 * slip
    lost = 0.0 * slip
    if has_flying_jaws(holding) and holding.jaw_mass is not None and holding.jaw_radius is not None:
        lost = centrifugal_force(holding.jaw_mass, holding.jaw_radius, np.nan_to_num(loads.rpm), holding.jaws)
    left = grip_left(holding.grip_force or 0.0, lost, inside=holding.grip_inside)
    return np.where(np.isfinite(loads.cutting), np.maximum(slip, tilt), np.nan), np.asarray(left)


def _tilting(run: Run, loads: Loads, grip: float) -> Floats:
    """Grip needed against tilting, N; the lips of a drill balance each other and tilt nothing."""
    drills = {number for number, tool in run.job.tools.items() if tool.kind == "drilling"}
    balanced = np.isin(loads.move, [move.index for move in run.path.moves if move.tool in drills])
    across = np.where(balanced, 0.0, np.nan_to_num(loads.cutting))
    radial = np.where(balanced, 0.0, np.abs(np.nan_to_num(loads.force_x)))
    lever = np.maximum(run.job.workholding.stick_out + loads.z, 0.0)
    return np.asarray(grip_for_tilting(across, radial, lever, grip))


def _finding(
    run: Run, index: int, used: float, share: Floats, *, limits: tuple[float, float], curable: bool
) -> Finding:
    loads, move = run.prediction.loads, run.path.moves[index]
    own = rows_of(loads, index)
    row = own.start + int(np.nanargmax(share[own]))
    needed, left = (float(column[row]) for column in _grips(run, loads))
    safety, (least, better) = 1.0 / used, limits
    level, limit = (Level.STOP, least) if safety < least else (Level.REVIEW, better)
    holder = "slip in the collet" if run.job.workholding.kind == "collet" else "slip or tilt out of the jaws"
    fate = f"The work can {holder}" if level is Level.STOP else "The grip is thin for this cut"
    message = f"{fate}: {figure(left / 1000)} kN of grip are left at {float(loads.rpm[row]):.0f} rpm, the cut needs " \
              f"{figure(needed / 1000)} kN; that is {figure(safety, 2)} times, {figure(limit, 2)} is wanted (VDI 3106)."
    ways = way_out(run, move, lambda what: used_share(run, what), 1.0 / limit) if curable else ""
    remedy = f"Held at {ways}; or with more grip." if ways else "More grip, or a shorter stick-out."
    return finding_at(run, CHECK, level, row, message, value=safety, limit=limit, unit="", remedy=remedy)
