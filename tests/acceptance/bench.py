"""A bench for whole programs: declarations and program text in, the JSON report and the exit status out.

Everything here is written from the public form of the job file and the report; nothing is taken from the code
under test.
"""

from __future__ import annotations

import json
import math
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from click.testing import CliRunner

from auditor.cli import turnaudit

CONTROL = {"system": "A", "units": "mm"}
MACHINE = {
    "speed_limit": "4000 rpm",
    "power": "15 kW",
    "base_speed": "1000 rpm",
    "efficiency": 0.85,
    "thrust": {"x": "6 kN", "z": "9 kN"},
    "rapid": {"x": "20 m/min", "z": "24 m/min"},
    "turret": "behind",
    "tool_change": ["240 mm", "160 mm"],
    "home": ["240 mm", "160 mm"],
}
WORKHOLDING = {
    "kind": "chuck",
    "stick_out": "90 mm",
    "speed_limit": "4500 rpm",
    "grip_force": "90 kN",
    "grip_diameter": "60 mm",
    "jaws": 3,
    "jaw_mass": "1.4 kg",
    "jaw_radius": "62 mm",
    "friction": 0.2,
    "tail": "0 mm",
}
WORKPIECE: dict[str, Any] = {
    "diameter": "60 mm",
    "length": "130 mm",
    "face": "1.5 mm",
    "bore": "0 mm",
    "skin": "bright",
    "material": {
        "group": "P",
        "kc11": "1700 N/mm^2",
        "mc": 0.22,
        "reference_rake": "6 deg",
        "kn11": "800 N/mm^2",
        "mn": 0.4,
        "scatter": 0.15,
        "source": "invented for these tests",
        "tensile_strength": "650 MPa",
        "modulus": "210 GPa",
        "density": "7.85 g/cm^3",
        "chips": "long",
    },
}
ROUGHER = {
    "kind": "turning",
    "insert": "CNMG 120408",
    "holder": "PCLNR 2525 M12",
    "hand": "right",
    "insert_faces": "down",
    "pocket_rake": "-6 deg",
    "pocket_inclination": "-6 deg",
    "face_rake": "18 deg",
    "land_width": "0.2 mm",
    "land_rake": "0 deg",
    "edge_radius": "40 um",
    "substrate": "coated carbide",
    "speed": ["100 m/min", "350 m/min"],
    "overhang": "32 mm",
    "centre_height": "0 mm",
    "tip": 3,
}
BAR = {
    "kind": "boring",
    "insert": "CCMT 09T304",
    "holder": "S20R-SCLCR 09",
    "insert_faces": "down",
    "pocket_rake": "0 deg",
    "pocket_inclination": "0 deg",
    "face_rake": "12 deg",
    "land_width": "0.05 mm",
    "land_rake": "0 deg",
    "edge_radius": "25 um",
    "speed": ["80 m/min", "300 m/min"],
    "overhang": "60 mm",
    "bar_diameter": "20 mm",
    "tip": 2,
}
GROOVER = {
    "kind": "grooving",
    "width": "3 mm",
    "nose_radius": "0.2 mm",
    "cutting_edge_angle": "90 deg",
    "clearance_angle": "7 deg",
    "pocket_rake": "0 deg",
    "pocket_inclination": "0 deg",
    "face_rake": "12 deg",
    "land_width": "0 mm",
    "edge_radius": "30 um",
    "insert_faces": "down",
    "speed": ["60 m/min", "200 m/min"],
    "overhang": "30 mm",
}
DRILL = {
    "kind": "drilling",
    "diameter": "12 mm",
    "point_angle": "140 deg",
    "flutes": 2,
    "substrate": "coated carbide",
    "speed": ["40 m/min", "140 m/min"],
    "overhang": "60 mm",
}
THREADER = {"kind": "threading", "insert_faces": "down", "nose_radius": "0.2 mm", "clearance_angle": "7 deg",
            "pocket_rake": "0 deg", "overhang": "30 mm"}  # fmt: skip
NO_CORRECTIONS = {"speed_correction": False, "operation_factor": False, "wear_factor": 1.0}


@dataclass(frozen=True)
class Report:
    """What one run of the command gave."""

    status: int
    document: dict[str, Any]
    words: str

    @property
    def verdict(self) -> str:
        return str(self.document["verdict"])

    @property
    def moves(self) -> list[dict[str, Any]]:
        return list(self.document["moves"])

    @property
    def findings(self) -> list[dict[str, Any]]:
        return list(self.document["findings"])

    def of(self, check: str, level: str | None = None) -> list[dict[str, Any]]:
        return [f for f in self.findings if f["check"] == check and level in (None, f["level"])]

    @property
    def stops(self) -> list[tuple[str, int, str]]:
        return [(f["check"], f["line"], f["message"]) for f in self.findings if f["level"] == "stop"]

    def cuts(self) -> list[dict[str, Any]]:
        return [m for m in self.moves if m["kind"] != "rapid"]

    def only_cut(self) -> dict[str, Any]:
        (cut,) = [m for m in self.cuts() if m["removed_mm3"]]
        return cut


def toml(value: object) -> str:
    """A value in TOML's own words."""
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, str):
        return json.dumps(value)
    if isinstance(value, Mapping):
        return "{ " + ", ".join(f"{key} = {toml(item)}" for key, item in value.items()) + " }"
    if isinstance(value, list | tuple):
        return "[" + ", ".join(toml(item) for item in value) + "]"
    return str(value)


def job_text(
    tools: Mapping[int, Mapping[str, object]],
    control: Mapping[str, object] | None = None,
    machine: Mapping[str, object] | None = None,
    workholding: Mapping[str, object] | None = None,
    workpiece: Mapping[str, object] | None = None,
    model: Mapping[str, object] | None = None,
    limits: Mapping[str, object] | None = None,
    head: Mapping[str, object] | None = None,
    accepted: list[Mapping[str, object]] | None = None,
) -> str:
    """A job file: the declarations above with what a test wants otherwise (None as a value leaves a key out)."""
    tables: dict[str, Mapping[str, object]] = {
        "control": {**CONTROL, **(control or {})},
        "machine": {**MACHINE, **(machine or {})},
        "workholding": {**WORKHOLDING, **(workholding or {})},
        "workpiece": {**WORKPIECE, **(workpiece or {})},
        **{f"tools.{number}": tool for number, tool in tools.items()},
        "model": model or {},
        "limits": limits or {},
    }
    lines = [f"{key} = {toml(value)}" for key, value in (head or {}).items()]
    for name, table in tables.items():
        if table:
            lines += [f"[{name}]", *_keys(table)]
    for entry in accepted or []:
        lines += ["[[accepted]]", *_keys(entry)]
    return "\n".join(lines) + "\n"


def _keys(table: Mapping[str, object]) -> Iterator[str]:
    for key, value in table.items():
        if value is not None:
            yield f"{key} = {toml(value)}"


def check(folder: Path, program: str, job: str | None, *options: str, name: str = "part") -> Report:
    """Run `turnaudit check --format json` on a program written to a folder."""
    path = folder / f"{name}.nc"
    path.write_text(program, encoding="utf-8")
    if job is not None:
        (folder / f"{name}.job.toml").write_text(job, encoding="utf-8")
    return run("check", str(path), "--format", "json", *options)


def run(*arguments: str) -> Report:
    """Run the command line in this process; the report is what went to standard output."""
    outcome = CliRunner().invoke(turnaudit, list(arguments))
    if outcome.exception is not None and not isinstance(outcome.exception, SystemExit):
        raise outcome.exception
    document = json.loads(outcome.stdout, parse_constant=_no_constant) if outcome.stdout.strip() else {}
    return Report(outcome.exit_code, document, outcome.stderr)


def _no_constant(word: str) -> float:
    raise AssertionError(f"{word} in the JSON report")


def numbers(value: object) -> Iterator[float]:
    """Every number in a document."""
    if isinstance(value, bool) or value is None or isinstance(value, str):
        return
    if isinstance(value, int | float):
        yield value
    elif isinstance(value, Mapping):
        for item in value.values():
            yield from numbers(item)
    elif isinstance(value, list):
        for item in value:
            yield from numbers(item)


def finite(document: object) -> bool:
    return all(math.isfinite(number) for number in numbers(document))
