"""The plan of a shift: a small file, read as strictly as a job file."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from pathlib import Path
from typing import Annotated, Any

from pydantic import Field

from auditor.declared.faults import Place, nearest, read_table, shown
from auditor.declared.fields import Reads, Table, Text, Time
from auditor.declared.model import Assumption
from auditor.declared.toml_text import read_toml
from auditor.errors import DeclarationError, Fault

_Pause = Annotated[float, Reads("time", least=0.0)]  # min
_Station = Annotated[str, Field(pattern=r"^[1-9][0-9]{0,3}$")]


class PlanHead(Table):
    """The keys above the first [[jobs]]."""

    shift: Time
    name: Text | None = None
    unattended: bool | None = None
    change_over: _Pause | None = None
    jobs: Any = None


class JobRow(Table):
    """[[jobs]]: one job of the shift."""

    job: Text
    batch: Annotated[int, Field(ge=1)] | None = None
    part_change: _Pause | None = None
    edges: dict[_Station, Annotated[int, Field(ge=1)]] | None = None


@dataclass(frozen=True, slots=True)
class PlannedJob:
    """A job in the order of the shift; times in s."""

    path: Path  # job file or program
    batch: int | None  # None: the job file's own
    part_change: float
    edges: Mapping[int, int]  # edges at hand by tool number


@dataclass(frozen=True, slots=True)
class Plan:
    """A shift, planned; times in s."""

    path: str
    name: str
    length: float
    unattended: bool
    change_over: float  # between two jobs
    jobs: tuple[PlannedJob, ...]
    assumptions: tuple[Assumption, ...]


def read_plan(path: Path) -> Plan:
    """Read a plan.

    Raises
    ------
    DeclarationError
        With every fault that was found.
    """
    toml = read_toml(path)
    faults: list[Fault] = []
    place = Place(toml.path, "", toml.lines)
    head = read_table(PlanHead, _known(PlanHead, dict(toml.content), place, faults), place, faults)
    rows = _rows(toml.content.get("jobs"), place, faults)
    if faults or head is None:
        raise DeclarationError(*faults)
    return Plan(
        path=toml.path, name=head.name or path.stem, length=60.0 * head.shift,
        unattended=True if head.unattended is None else head.unattended, change_over=60.0 * (head.change_over or 0.0),
        jobs=tuple(_planned(row, path.parent) for row in rows), assumptions=tuple(_assumed(head, rows)),
    )


def _rows(raw: object, place: Place, faults: list[Fault]) -> list[JobRow]:
    if not isinstance(raw, list) or not raw:
        found, wanted = None if raw is None else shown(raw), '[[jobs]] with job = "PART.job.toml"'
        faults.append(place.fault("no job is planned", "jobs", found=found, wanted=wanted))
        return []
    rows = []
    for number, entry in enumerate(raw, start=1):
        own = Place(place.file, f"jobs.{number}", place.lines)
        known = _known(JobRow, entry, own, faults) if isinstance(entry, dict) else entry
        row = read_table(JobRow, known, own, faults)
        if row is not None:
            rows.append(row)
    return rows


def _known(model: type[Table], raw: dict[str, object], place: Place, faults: list[Fault]) -> dict[str, object]:
    """The keys a plan has; of the others it is said what was probably meant."""
    for key in raw.keys() - model.model_fields.keys():
        close = nearest(key, model.model_fields)
        wanted = close or "one of " + ", ".join(model.model_fields)
        faults.append(place.fault("unknown key", key, found=key, wanted=wanted))
    return {key: value for key, value in raw.items() if key in model.model_fields}


def _planned(row: JobRow, folder: Path) -> PlannedJob:
    return PlannedJob(
        path=folder / row.job.replace("\\", "/"), batch=row.batch, part_change=60.0 * (row.part_change or 0.0),
        edges={int(number): count for number, count in (row.edges or {}).items()},
    )


def _assumed(head: PlanHead, rows: list[JobRow]) -> list[Assumption]:
    """What the plan leaves open."""
    found = []
    if head.unattended is None:
        found.append(Assumption("unattended", "yes", "not declared; nobody watches"))
    if head.change_over is None and len(rows) > 1:
        found.append(Assumption("change_over", "0 s", "not declared; a job follows the one before at once"))
    for number, row in enumerate(rows, start=1):
        if row.part_change is None:
            found.append(Assumption(f"jobs.{number}.part_change", "0 s", "not declared; a part follows at once"))
        if row.edges is None:
            found.append(Assumption(f"jobs.{number}.edges", "1 each", "not declared; one edge in every station"))
    return found
