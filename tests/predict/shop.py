"""Small whole programs with the job they run on, written out and audited."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import fields
from pathlib import Path
from types import SimpleNamespace

from auditor.audit import audit_program
from auditor.findings import Audit

MATERIAL = """
[workpiece.material]
group = "P"
kc11 = "1800 N/mm^2"
mc = 0.25
reference_rake = "6 deg"
scatter = 0.15
source = "invented for this test"
"""
FRAME = """
{before}
[control]
system = "A"
units = "mm"
{control}
[machine]
speed_limit = "{limit} rpm"
power = "20 kW"
base_speed = "1000 rpm"
efficiency = 0.8
rapid = {{ x = "24 m/min", z = "30 m/min" }}
tool_change = ["300 mm", "200 mm"]
[workholding]
stick_out = "80 mm"
{holding}
[workpiece]
{workpiece}
{material}
{tools}
"""
BAR = 'diameter = "60 mm"\nlength = "120 mm"'


def audited(
    folder: Path, program: str, tools: str, *, workpiece: str = BAR, material: str = MATERIAL, limit: float = 4500,
    before: str = "", control: str = "", holding: str = 'kind = "chuck"',
) -> Audit:  # fmt: skip
    """Audit a program text under a job made from these parts."""
    (folder / "part.nc").write_text(program, encoding="utf-8")
    job = FRAME.format(
        workpiece=workpiece, material=material, tools=tools, limit=limit, before=before, control=control,
        holding=holding,
    )
    (folder / "part.job.toml").write_text(job, encoding="utf-8")
    return audit_program(folder / "part.nc")


def tool(number: int = 1, **declared: object) -> str:
    """A [tools.N] table: numbers and words as given."""
    rows = [f"[tools.{number}]"]
    rows += [f'{key} = "{value}"' if isinstance(value, str) else f"{key} = {value}" for key, value in declared.items()]
    return "\n".join(rows) + "\n"


def turning(number: int = 1, **changed: object) -> str:
    """An 80 degree corner at 95 degrees with a 0.8 nose in a flat seat."""
    usual: Mapping[str, object] = {
        "kind": "turning", "nose_radius": "0.8 mm", "cutting_edge_angle": "95 deg", "included_angle": "80 deg",
        "clearance_angle": "7 deg", "pocket_rake": "0 deg", "pocket_inclination": "0 deg", "face_rake": "0 deg",
        "land_width": "0 mm", "land_rake": "0 deg", "edge_radius": "30 um", "hand": "right", "insert_faces": "down",
        "overhang": "30 mm", "shank_height": "25 mm", "shank_width": "25 mm",
    }  # fmt: skip
    return tool(number, **{**usual, **changed})


def figures(audit: Audit, index: int) -> SimpleNamespace:
    """The figures of one move, by name."""
    moves = audit.run.prediction.moves
    return SimpleNamespace(**{column.name: float(getattr(moves, column.name)[index]) for column in fields(moves)})


def steady(audit: Audit, index: int) -> SimpleNamespace:
    """The loads at the first stored place behind the middle of a move."""
    rows = audit.run.prediction.loads
    own = (rows.move == index).nonzero()[0]
    middle = 0.5 * (rows.position[own].min() + rows.position[own].max())
    row = own[rows.position[own] >= middle][0]
    # positions are stored where something changes: up to there all runs straight from the one before
    return SimpleNamespace(
        **{column.name: float(getattr(rows, column.name)[row]) for column in fields(rows)},
        mean=float(rows.chip_mean[row]),
    )


def cutting_moves(audit: Audit) -> list[int]:
    """Indices of the moves that take something off."""
    return [index for index, volume in enumerate(audit.run.simulation.removed) if volume > 1e-6]
