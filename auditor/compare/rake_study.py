"""Rake, and nothing else, varied on a tool's heaviest cut: what a sharper or a stronger edge would do there.

The chip is reckoned with one shear plane (Merchant): friction angle as the force model has it, machining constant
by material group. Such shear angles are known to some five degrees; their direction with rake is firm.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from auditor.declared.model import Material, Tool
from auditor.errors import Fault, UsageError
from auditor.findings import Run
from auditor.interpret.moves import Kind, Move
from auditor.mechanics.rake import EFFECTIVE_RAKE, normal_rake
from auditor.mechanics.shear import IDEAL_CONSTANT, merchant_shear_angle
from auditor.mechanics.thrust import friction_angle
from auditor.predict.loads import Loads
from auditor.predict.what_if import at_feed

# Machining constant 2 phi + beta - g, deg: middle of the steels 65 to 76, stainless 304; from the table that
# `merchant_shear_angle` names. Other groups: the ideal 90.
CONSTANTS = {"P": 70.0, "H": 70.0, "M": 82.0}


@dataclass(frozen=True, slots=True)
class RakeRow:
    """The heaviest cut at one effective rake; forces None where the material has no force pair."""

    rake: float  # deg
    shear_angle: float  # deg
    chip_ratio: float  # uncut over cut thickness
    chip_thickness: float  # mm, of the chip that leaves
    cutting: float | None  # N
    feed_force: float | None  # N
    passive: float | None  # N
    motor_power: float | None  # kW
    wedge: float  # deg, when the rake is ground or pressed into the face and the clearance stays
    clearance: float  # deg, when the same insert is tilted to that rake instead


@dataclass(frozen=True, slots=True)
class RakeStudy:
    """A tool's heaviest cut as it is, and over a range of rakes."""

    move: Move
    depth: float  # mm
    feed: float  # mm/rev
    speed: float  # m/min
    chip: float  # mm, mean uncut chip thickness
    now: RakeRow
    rows: tuple[RakeRow, ...]


def study_rake(run: Run, number: int, rakes: Sequence[float]) -> RakeStudy:
    """Vary the effective rake on the heaviest cut of tool ``number``.

    Raises
    ------
    UsageError
        The tool has no insert whose rake could be changed, cuts nothing, or a rake is outside the model's range.
    """
    tool = run.job.tools[number]
    wild = [rake for rake in rakes if not EFFECTIVE_RAKE.low <= rake <= EFFECTIVE_RAKE.high]
    if wild:
        wanted = f"{EFFECTIVE_RAKE.low:g} to {EFFECTIVE_RAKE.high:g} deg"
        raise UsageError(Fault("a rake outside the model's range", key="--rake", found=f"{wild[0]:g}", wanted=wanted))
    if tool.kind in ("drilling", "stop"):
        raise UsageError(Fault(f"{tool.name} has no insert whose rake could be changed", key="--tool",
                               wanted="a turning, boring, grooving, parting or threading tool"))
    row = _heaviest(run, number)
    loads = run.prediction.loads
    here = float(loads.rake[row])
    return RakeStudy(
        move=run.path.moves[int(loads.move[row])],
        depth=float(loads.depth[row]),
        feed=float(loads.feed[row]),
        speed=float(loads.speed_high[row]),
        chip=float(loads.chip_mean[row]),
        now=_row(run, tool, row, here, here),
        rows=tuple(_row(run, tool, row, rake, here) for rake in rakes),
    )


def _heaviest(run: Run, number: int) -> int:
    """The row with the largest cutting force (or depth, where no force follows) of the tool's feed moves."""
    loads = run.prediction.loads
    own = np.array([move.tool == number and move.kind is not Kind.RAPID for move in run.path.moves], dtype=bool)
    judged = own[loads.move] & (loads.depth > 0.0) & np.isfinite(loads.rake) & np.isfinite(loads.feed)
    if not judged.any():
        message = f"T{number} cuts nothing in this program, or no feed or speed is known"
        raise UsageError(Fault(message, file=run.text.path, wanted="a tool that takes stock off"))
    weight = np.where(np.isfinite(loads.cutting), loads.cutting, loads.depth)
    return int(np.argmax(np.where(judged, weight, -np.inf)))


def _row(run: Run, tool: Tool, row: int, rake: float, here: float) -> RakeRow:
    """``here`` is the effective rake the tool has in this cut."""
    material, chip = run.job.workpiece.material, float(run.prediction.loads.chip_mean[row])
    shear = _shear_angle(material, rake)
    ratio = math.sin(math.radians(shear)) / math.cos(math.radians(shear - rake))  # Groover ch. 20, r = sin / cos
    pocket = float(normal_rake(tool.pocket_rake, tool.pocket_inclination))
    loads = _at_rake(run, tool, row, rake)
    heaviest = int(np.argmax(np.where(np.isfinite(loads.cutting), loads.cutting, loads.depth)))
    return RakeRow(
        rake=rake, shear_angle=shear, chip_ratio=ratio, chip_thickness=chip / ratio,
        cutting=_known(loads.cutting[heaviest]), feed_force=_known(loads.feed_force[heaviest]),
        passive=_known(loads.passive[heaviest]), motor_power=_known(loads.motor_power[heaviest]),
        wedge=90.0 - rake - (tool.insert_clearance - pocket),
        clearance=tool.insert_clearance - (pocket + rake - here),
    )  # fmt: skip


def _shear_angle(material: Material, rake: float) -> float:
    friction = friction_angle(material.friction_angle, rake, material.reference_rake)
    return float(merchant_shear_angle(friction, rake, CONSTANTS.get(material.group, IDEAL_CONSTANT)))


def _at_rake(run: Run, tool: Tool, row: int, rake: float) -> Loads:
    """Loads of the cut with a flat face at exactly that rake: no land blends it with another."""
    pocket = float(normal_rake(tool.pocket_rake, tool.pocket_inclination))
    flat = replace(tool, face_rake=rake - pocket, land_width=0.0)
    job = replace(run.job, tools={**run.job.tools, tool.number: flat})
    loads = run.prediction.loads
    return at_feed(job, run.path, run.simulation, int(loads.move[row]), float(loads.feed[row]))


def _known(value: float) -> float | None:
    return float(value) if math.isfinite(value) else None
