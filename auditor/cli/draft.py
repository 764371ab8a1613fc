"""``turnaudit draft``: a job file to fill in, from what the program already says."""

from __future__ import annotations

import sys
from pathlib import Path
from typing import TYPE_CHECKING

import click

from auditor.cli import EXIT_NOT_AUDITED
from auditor.errors import Fault, TurnauditError, UsageError

if TYPE_CHECKING:
    from auditor.draft import Draft

_FILE = click.Path(path_type=Path)


@click.command(short_help="Write a job file to fill in for a program.")
@click.argument("program", type=_FILE)
@click.option("--output", type=_FILE, metavar="FILE", help="Write it there (default: PART.job.toml beside it).")
@click.option("--force", is_flag=True, help="Replace a job file that is there already.")
@click.option("--ask", is_flag=True, help="Ask for what the program does not say, one question after the other.")
def command(program: Path, output: Path | None, force: bool, ask: bool) -> None:
    """Read PROGRAM and write a job file with all that it says of itself: tools, stock, material, units.

    Every guess is marked with the line it comes from and how sure it is; what nobody can guess stands as "?".

    Exit status: 0 written, 2 not written.
    """
    try:
        _run(program, output, force, ask)
    except TurnauditError as problem:
        from auditor.cli._talk import complain

        complain(problem.faults)
        click.get_current_context().exit(EXIT_NOT_AUDITED)


def _run(program: Path, output: Path | None, force: bool, ask: bool) -> None:
    from auditor.cli._files import refuse_inputs, replace
    from auditor.declared.jobs import JOB_SUFFIX
    from auditor.declared.shops import SHOP_FILE

    _check_program(program, JOB_SUFFIX)
    target = output or program.with_name(program.stem + JOB_SUFFIX)
    refuse_inputs([target], [program, *(folder / SHOP_FILE for folder in target.absolute().parents)])
    if target.exists() and not force:
        wanted = "--force to replace it, or --output FILE"
        raise UsageError(Fault("there is a job file already, and it is left as it is", file=str(target), wanted=wanted))
    if ask and not _somebody_is_there():
        raise UsageError(Fault("nobody can be asked: standard input is no terminal", key="--ask", wanted="a terminal"))
    from auditor.draft import draft_job

    draft = draft_job(program, target)
    if ask:
        from auditor.cli._questions import asked

        draft = asked(draft, program, target)
    replace(target, draft.text())
    _tell(draft, program, target)


def _somebody_is_there() -> bool:
    return sys.stdin.isatty()


def _check_program(program: Path, job_suffix: str) -> None:
    if program.is_dir() or not program.exists():
        message = "this is a folder" if program.is_dir() else "no such file"
        raise UsageError(Fault(message, file=str(program), wanted="one program"))
    if program.name.endswith(job_suffix):
        raise UsageError(Fault("this is a job file", file=str(program), wanted="the program it is to be drafted for"))


def _tell(draft: Draft, program: Path, target: Path) -> None:
    """What was written, what is open, and what comes next."""
    from auditor.cli._talk import tell
    from auditor.declared.jobs import job_beside

    said = sum(entry.state == "said" for _, entry in draft.entries())
    tell(f"{target}: {said} values read or guessed, {len(draft.open)} to be decided")
    for path in draft.open:
        tell(f"  {path}")
    beside = "" if job_beside(program) == target else f" --job {target}"
    then = "decide these" if draft.open else "look through it"
    tell(f"Next: {then}, then `turnaudit check {program}{beside}`")
