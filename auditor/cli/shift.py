"""``turnaudit shift``: the jobs of one shift together."""

from __future__ import annotations

from pathlib import Path

import click

from auditor.cli import EXIT_CLEAN, EXIT_FINDINGS, EXIT_NOT_AUDITED
from auditor.errors import TurnauditError

_FILE = click.Path(path_type=Path, dir_okay=False)
_FAILING = {"stop": ("stop",), "review": ("stop", "review"), "never": ()}


@click.command(short_help="Judge the jobs of one shift together.")
@click.argument("plan", type=_FILE, metavar="PLAN.toml")
@click.option("--format", "form", type=click.Choice(["screen", "json"]), default="screen", show_default=True,
              help="How the answer is written.")
@click.option("--output", type=_FILE, metavar="FILE", help="Write it there instead of standard output.")
@click.option("--html", type=_FILE, metavar="FILE", help="Write a page to hang beside the machine besides.")
@click.option("--fail-on", type=click.Choice(list(_FAILING)), default="stop", show_default=True,
              help="From which level on something to see to gives exit status 1.")
@click.option("--quiet", is_flag=True, help="Only the verdict on the screen.")
def command(plan: Path, form: str, output: Path | None, html: Path | None, fail_on: str, quiet: bool) -> None:
    """Audit the jobs that a PLAN names: what may run, what runs out, what must be decided before leaving.

    Exit status: 0 nothing at or above --fail-on, 1 something, 2 something could not be audited.
    """
    try:
        status = _run(plan, form, output, html, fail_on, quiet)
    except TurnauditError as problem:
        from auditor.cli._talk import complain

        complain(problem.faults)
        status = EXIT_NOT_AUDITED
    click.get_current_context().exit(status)


def _run(path: Path, form: str, output: Path | None, html: Path | None, fail_on: str, quiet: bool) -> int:
    from auditor.cli import _files, _inputs, _talk
    from auditor.shift import judge_shift, read_plan

    plan = read_plan(path)
    tasks = [task for job in plan.jobs for task in _inputs.tasks([job.path], None)]
    inputs = [path, *(file for task in tasks for file in task.files())]
    _files.refuse_inputs([target for target in (output, html) if target is not None], inputs)
    shift = judge_shift(plan)
    if html is not None:
        from auditor.shift.page import shift_page

        _files.replace(html, shift_page(shift))
    if form == "json":
        from auditor.shift.document import shift_document

        text = shift_document(shift)
    else:
        from auditor.shift.sheet import shift_sheet

        text = shift_sheet(shift, _talk.view_of(output, quiet, series=False))
    if output is not None:
        _files.replace(output, text)
    else:
        click.echo(text, nl=False)
    for job in shift.jobs:
        _talk.complain(job.faults)
    if any(job.verdict == "unreadable" or (job.audit and job.audit.coverage.not_audited) for job in shift.jobs):
        return EXIT_NOT_AUDITED
    return EXIT_FINDINGS if {each.level for each in shift.decisions} & set(_FAILING[fail_on]) else EXIT_CLEAN
