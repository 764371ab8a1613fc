"""Reads a job file: everything declared about one program, or every fault in it at once."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

from auditor.declared.toml_text import TomlFile, read_toml
from auditor.errors import DeclarationError, Fault

if TYPE_CHECKING:
    from auditor.declared.model import Job

JOB_SUFFIX = ".job.toml"
PROGRAM_SUFFIXES = (".nc", ".cnc", ".tap", ".txt")


def load_job(path: str | Path, program: str | Path | None = None) -> Job:
    """Read a job file and the shop entries it names; ``program`` stands over the one the job file means.

    Raises
    ------
    DeclarationError
        With every fault that was found: syntax, unknown keys, wrong values, missing ones, codes not understood.
    """
    from auditor.declared.job_reader import JobReader  # pydantic is woken only when there is a file to read

    toml = read_toml(Path(path))
    return JobReader(toml).job(str(path), Path(program) if program is not None else _program(toml))


def job_beside(program_path: str | Path) -> Path | None:
    """The job file that stands beside a program under the same name, if there is one."""
    program = Path(program_path)
    job = program.with_name(program.stem + JOB_SUFFIX)
    return job if job.is_file() else None


def program_of(job_path: str | Path) -> Path:
    """The program that a job file is about.

    Raises
    ------
    DeclarationError
        The job file cannot be read, or its program is not there.
    """
    found = _program(read_toml(Path(job_path)))
    if isinstance(found, Fault):
        raise DeclarationError(found)
    return found


def _program(toml: TomlFile) -> Path | Fault:
    """The declared program, else the first of the same stem."""
    job = Path(toml.path)
    declared = toml.content.get("program")
    line = toml.lines.get("program")
    if isinstance(declared, str) and declared.strip():
        path = job.parent / declared.replace("\\", "/")
        if path.is_file():
            return path
        return Fault("no such program", file=toml.path, line=line, key="program", found=str(path))
    stem = job.name.removesuffix(JOB_SUFFIX) if job.name.endswith(JOB_SUFFIX) else job.stem
    for suffix in PROGRAM_SUFFIXES:
        for name in (stem + suffix, stem + suffix.upper()):
            if (job.parent / name).is_file():
                return job.parent / name
    wanted = f'program = "…", or {" or ".join(stem + suffix for suffix in PROGRAM_SUFFIXES)} beside the job file'
    return Fault("no program found for this job", file=toml.path, line=line, key="program", wanted=wanted)
