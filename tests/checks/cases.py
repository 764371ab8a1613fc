"""Fixture programs of the checks: read from fixtures/checks/NAME/cases.toml, audited once each."""

from __future__ import annotations

import tomllib
from dataclasses import dataclass, replace
from functools import cache
from pathlib import Path

from auditor.audit import audit
from auditor.checks import rules
from auditor.declared.jobs import load_job
from auditor.declared.model import Job, LimitValue
from auditor.findings import Audit, Finding

FOLDER = Path(__file__).parents[2] / "fixtures" / "checks"
DIMENSIONS = {  # unit of a limit -> dimension in [limits], base units in it
    "": ("number", 1.0), "mm": ("length", 1.0), "um": ("length", 0.001), "m": ("length", 1000.0),
    "deg": ("angle", 1.0), "N": ("force", 1.0), "kW": ("power", 1.0), "m/min": ("speed", 1.0),
    "rpm": ("rotation", 1.0), "min": ("time", 1.0), "s": ("time", 1.0 / 60.0),
}  # fmt: skip


@dataclass(frozen=True)
class Case:
    """One program and what the check must say about it."""

    check: str
    name: str
    level: str
    line: int | None
    trips_with: dict[str, float]

    @property
    def program(self) -> Path:
        return FOLDER / self.check / f"{self.name}.nc"


def cases() -> list[Case]:
    found = []
    for file in sorted(FOLDER.glob("*/cases.toml")):
        table = tomllib.loads(file.read_text(encoding="utf-8"))
        found += [
            Case(file.parent.name, name, case["level"], case.get("line"), case.get("trips_with", {}))
            for name, case in table.items()
        ]
    return found


@cache
def job_of(program: Path) -> Job:
    return replace(load_job(program.with_suffix("").with_suffix(".job.toml")), program=str(program))


@cache
def audited(program: Path) -> Audit:
    return audit(job_of(program))


def audited_with(program: Path, limits: dict[str, float]) -> Audit:
    known = {limit.name: limit for rule in rules().values() for limit in rule.limits}
    given = {}
    for name, value in limits.items():
        dimension, size = DIMENSIONS[known[name].unit]
        given[name] = LimitValue(value * size, dimension, str(value))
    job = job_of(program)
    return audit(replace(job, limits={**job.limits, **given}))


def of_check(audit_: Audit, check: str) -> list[Finding]:
    return [finding for finding in audit_.findings if finding.check == check]
