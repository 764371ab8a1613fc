"""A small sound job file, and ways to write, change and read one in a test."""

from __future__ import annotations

from pathlib import Path

import pytest

from auditor.declared.jobs import load_job
from auditor.declared.model import Job
from auditor.errors import DeclarationError, Fault

MACHINE = '[machine]\nspeed_limit = "4500 rpm"\npower = "15 kW"\nbase_speed = "1150 rpm"\n'
WORKHOLDING = '[workholding]\nstick_out = "95 mm"\n'
WORKPIECE = '[workpiece]\nmaterial = "C45"\ndiameter = "60 mm"\nlength = "125 mm"\n'
TOOL = '[tools.1]\nkind = "turning"\ninsert = "CNMG 120408"\nholder = "PCLNR 2525 M12"\n'
SOUND = MACHINE + WORKHOLDING + WORKPIECE + TOOL


def write(folder: Path, text: str | bytes, name: str = "pin.job.toml") -> Path:
    """A job file with its program beside it."""
    path = folder / name
    path.write_bytes(text.encode("utf-8") if isinstance(text, str) else text)
    (folder / "pin.nc").write_text("M30\n", encoding="utf-8")
    return path


def read(folder: Path, text: str | bytes) -> Job:
    return load_job(write(folder, text))


def faults(folder: Path, text: str | bytes) -> tuple[Fault, ...]:
    path = write(folder, text)
    with pytest.raises(DeclarationError) as caught:
        load_job(path)
    return caught.value.faults


def only_fault(folder: Path, text: str | bytes) -> Fault:
    found = faults(folder, text)
    assert len(found) == 1, [str(fault) for fault in found]
    return found[0]


def assumed(job: Job) -> dict[str, str]:
    return {entry.about: entry.value for entry in job.assumptions}
