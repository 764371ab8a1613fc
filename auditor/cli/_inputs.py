"""From the paths on the command line to the programs to audit, each with its job file."""

from __future__ import annotations

import os
import re
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from pathlib import Path

from auditor.declared.jobs import JOB_SUFFIX, PROGRAM_SUFFIXES, job_beside, program_of
from auditor.errors import DeclarationError, Fault, UsageError

SHOP_FILE = "shop.toml"

# A .txt may be anything: it counts as a program when one of its first lines looks like a block.
_BLOCK = re.compile(rb"^\s*(%\s*$|[O:]\d+|/?\s*(N\d+\s*)?[GMTSXZ][-+.]?\d)", re.IGNORECASE | re.MULTILINE)
_LOOK_AT = 2048


@dataclass(frozen=True, slots=True)
class Task:
    """One program to audit; ``faults`` say why that is impossible, if it is."""

    program: Path
    job: Path | None = None
    faults: tuple[Fault, ...] = ()

    def files(self) -> Iterator[Path]:
        """Every file the audit may read: none of them may be overwritten."""
        yield self.program
        if self.job is not None:
            yield self.job
            yield from (folder / SHOP_FILE for folder in self.job.resolve().parents)


def tasks(paths: Sequence[Path], job: Path | None) -> list[Task]:
    """The programs that the paths name, each once, in the order given (folders alphabetically).

    Raises
    ------
    UsageError
        ``--job`` beside a folder or another job file.
    """
    found = [task for path in paths for task in _tasks_of(path, job)]
    return list({_identity(task): task for task in reversed(found)}.values())[::-1]


def _identity(task: Task) -> tuple[str, str]:
    return (os.path.realpath(task.program), "" if task.job is None else os.path.realpath(task.job))


def _tasks_of(path: Path, job: Path | None) -> list[Task]:
    folder, is_job = path.is_dir(), path.name.endswith(JOB_SUFFIX)
    if job is not None and (folder or is_job):
        raise UsageError(Fault("--job belongs to a program, and this is none", file=str(path), wanted="a program"))
    if folder:
        return _folder(path)
    if not path.exists():
        missing = Fault("no such file", file=str(path), wanted="a program, a job file or a folder")
        return [Task(path, faults=(missing,))]
    if is_job:
        return [_of_job(path)]
    return [_declared(path, job or job_beside(path) or _job_naming(path))]


def _of_job(job: Path) -> Task:
    """The program a job file is about; where the file does not tell, the one of its stem, and why it does not."""
    try:
        return Task(program_of(job), job)
    except DeclarationError as problem:
        beside = (job.with_name(job.name.removesuffix(JOB_SUFFIX) + suffix) for suffix in PROGRAM_SUFFIXES)
        return Task(next((path for path in beside if path.is_file()), job), job, problem.faults)


def _job_naming(program: Path) -> Path | None:
    """The job file of another stem in the same folder that names the program."""

    def names(job: Path) -> bool:
        try:
            return program_of(job).samefile(program)
        except (DeclarationError, OSError):
            return False

    return next(filter(names, sorted(program.parent.glob(f"*{JOB_SUFFIX}"))), None)


def _declared(program: Path, job: Path | None) -> Task:
    if job is not None:
        return Task(program, job)
    beside = program.stem + JOB_SUFFIX
    wanted = f"{beside} beside it, or --job FILE; `turnaudit draft {program.name}` writes one to fill in"
    missing = Fault("not declared: there is no job file for this program", file=str(program), wanted=wanted)
    return Task(program, faults=(missing,))


def _folder(folder: Path) -> list[Task]:
    files = sorted(_files_below(folder))
    declared = [_of_job(path) for path in files if path.name.endswith(JOB_SUFFIX)]
    known = {os.path.realpath(task.program) for task in declared}
    others = [_declared(path, None) for path in files if _is_program(path) and os.path.realpath(path) not in known]
    if not declared and not others:
        wanted = f"a job file, or a file ending in {', '.join(PROGRAM_SUFFIXES)}"
        return [Task(folder, faults=(Fault("no program in this folder", file=str(folder), wanted=wanted),))]
    return sorted(declared + others, key=lambda task: (task.program.parent, task.program.name))


def _files_below(folder: Path) -> Iterator[Path]:
    """Files of a folder and its subfolders; hidden ones are left out."""
    for root, folders, names in os.walk(folder):
        folders[:] = sorted(name for name in folders if not name.startswith("."))
        yield from (Path(root, name) for name in names if not name.startswith("."))


def _is_program(path: Path) -> bool:
    suffix = path.suffix.lower()
    if suffix == ".txt":
        try:
            with path.open("rb") as file:
                return _BLOCK.search(file.read(_LOOK_AT)) is not None
        except OSError:
            return False
    return suffix in PROGRAM_SUFFIXES


def shard(found: Sequence[Task], part: tuple[int, int]) -> list[Task]:
    """Part ``k`` of ``n`` of the programs: every n-th, from the k-th on (counted from 1)."""
    number, count = part
    return list(found[number - 1::count])
