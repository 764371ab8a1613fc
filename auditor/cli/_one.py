"""Commands that work on one program: find it and its job file, or say why that is impossible."""

from __future__ import annotations

from pathlib import Path

from auditor.cli._inputs import Task, tasks
from auditor.errors import DeclarationError, Fault, UsageError


def only_task(program: Path, job: Path | None) -> tuple[Task, Path]:
    """The one program that a path names, and the job file that goes with it.

    Raises
    ------
    UsageError
        A folder or a file that is not there.
    DeclarationError
        There is no job file, or it does not say which program it is about.
    """
    if program.is_dir():
        raise UsageError(Fault("this is a folder", file=str(program), wanted="one program or job file"))
    task = tasks([program], job)[0]
    if task.job is None and not program.exists():
        raise UsageError(*task.faults)
    if task.faults or task.job is None:
        raise DeclarationError(*task.faults)
    return task, task.job
