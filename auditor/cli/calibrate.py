"""``turnaudit calibrate``: the material's force factor from a logged spindle load."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING

import click

from auditor.cli import EXIT_NOT_AUDITED
from auditor.errors import TurnauditError

if TYPE_CHECKING:
    from auditor.calibrate import Calibration, LoadLog
    from auditor.declared.model import Job

_FILE = click.Path(path_type=Path, dir_okay=False)


@click.command(short_help="Fit the material's force factor to a logged spindle load.")
@click.argument("program", type=_FILE)
@click.option("--log", "log_path", type=_FILE, required=True, metavar="LOG.csv", help="The log; its columns see above.")
@click.option("--reading", type=click.Choice(["mean", "peak"]), default="mean", show_default=True,
              help="What a block's reading in a log by line or block is.")
@click.option("--job", type=_FILE, metavar="FILE", help="Job file of the program (default: PART.job.toml beside it).")
@click.option("--format", "form", type=click.Choice(["screen", "json"]), default="screen", show_default=True,
              help="How the result is written.")
@click.option("--output", type=_FILE, metavar="FILE", help="Write it there instead of standard output.")
@click.option("--append", is_flag=True, help="Ask, and after a yes put the lines behind the nearest shop file's.")
def command(
    program: Path, log_path: Path, reading: str, job: Path | None, form: str, output: Path | None, append: bool
) -> None:
    """Compare a logged spindle load with the prediction for PROGRAM and fit the material's force factor.

    \b
    The log is a CSV with a line of column names:
      where     line (of the program file), block (N word) or time_s (from
                the start of the cycle)
      how much  power_kW, load_percent (of what the motor can give at that
                speed, as load meters show it) or rated_percent (of its
                largest continuous power)

    Nothing is written into any shop file without a yes: the lines for it are
    shown.

    Exit status: 0 fitted, 2 the log does not tell the factor.
    """
    try:
        _run(program, log_path, reading, job, form, output, append)
    except TurnauditError as problem:
        from auditor.cli._talk import complain

        complain(problem.faults)
        click.get_current_context().exit(EXIT_NOT_AUDITED)


def _run(
    program: Path, log_path: Path, reading: str, job: Path | None, form: str, output: Path | None, append: bool
) -> None:
    from auditor.cli import _files
    from auditor.cli._one import only_task

    task, declared = only_task(program, job)
    if output is not None:
        _files.refuse_inputs([output], [*task.files(), log_path])
    from auditor.audit import audit_program
    from auditor.calibrate import calibrate, read_log

    log = read_log(log_path)
    run = audit_program(task.program, declared).run
    calibration = calibrate(run, log, peak=reading == "peak")
    text = _text(calibration, run.job, log, form, output)
    if output is not None:
        _files.replace(output, text)
    else:
        click.echo(text, nl=False)
    if append:
        from auditor.cli._appending import append_lines

        append_lines(calibration, run.job, log)


def _text(calibration: Calibration, job: Job, log: LoadLog, form: str, output: Path | None) -> str:
    if form == "json":
        from auditor.calibrate.document import calibration_document

        return calibration_document(calibration, job, log)
    from auditor.calibrate.sheet import calibration_sheet
    from auditor.cli._talk import view_of

    return calibration_sheet(calibration, job, log, view_of(output, brief=False, series=False))
