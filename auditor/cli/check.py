"""``turnaudit check``: audits programs and says whether they may run."""

from __future__ import annotations

import sys
from collections.abc import Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING

import click

from auditor.cli import EXIT_CLEAN, EXIT_NOT_AUDITED
from auditor.errors import Fault, TurnauditError, UsageError

if TYPE_CHECKING:
    from auditor.cli._answers import Answer, Views
    from auditor.cli._inputs import Task


def _shard(ctx: click.Context, param: click.Parameter, value: str | None) -> tuple[int, int] | None:
    """``K/N`` as two numbers."""
    if value is None:
        return None
    number, _, count = value.partition("/")
    if number.isdecimal() and count.isdecimal() and 1 <= int(number) <= int(count):
        return int(number), int(count)
    raise click.BadParameter(f"{value!r} is no part K/N with K from 1 to N, such as 2/4.")


def _format(ctx: click.Context, param: click.Parameter, value: str) -> str:
    """The name of a format there is; pictures have an option of their own."""
    from auditor.reports import formats

    known = [name for name in formats() if name != "html"]
    if value in known:
        return value
    raise click.BadParameter(f"{value!r} is no format; there are {', '.join(known)}.")


@dataclass(frozen=True, slots=True)
class Choices:
    """The options of one run."""

    paths: tuple[Path, ...]
    job: Path | None
    format: str
    output: Path | None
    html: Path | None
    fail_on: str
    against: Path | None
    workers: int
    shard: tuple[int, int] | None
    allow_incomplete: bool
    series: bool
    quiet: bool


_FAILING = {"stop": frozenset({"stop"}), "review": frozenset({"stop", "review"}), "never": frozenset[str]()}
_FILE = click.Path(path_type=Path, dir_okay=False)


@click.command(short_help="Audit programs and say whether they may run.")
@click.argument("paths", nargs=-1, required=True, metavar="PATH...", type=click.Path(path_type=Path))
@click.option("--job", type=_FILE, metavar="FILE", help="Job file of the program (default: PART.job.toml beside it).")
@click.option("--format", callback=_format, default="screen", show_default=True,
              help="screen, json, sarif, junit, gnu or csv.")
@click.option("--output", type=_FILE, metavar="FILE", help="Write the report there instead of standard output.")
@click.option("--html", type=_FILE, metavar="FILE", help="Write a report with pictures besides.")
@click.option("--fail-on", type=click.Choice(list(_FAILING)), default="stop", show_default=True,
              help="From which level on a finding gives exit status 1.")
@click.option("--against", type=_FILE, metavar="REPORT.json",
              help="Only what is new or worse than in that earlier JSON report counts for the exit status.")
@click.option("--workers", type=click.IntRange(min=1), default=1, show_default=True, help="Programs audited at a time.")
@click.option("--shard", callback=_shard, metavar="K/N", help="Audit only part K of N of the programs.")
@click.option("--allow-incomplete", is_flag=True, help="Motion blocks that were not audited do not give exit status 2.")
@click.option("--series", is_flag=True, help="Add the curves along every cut to the JSON report.")
@click.option("--quiet", is_flag=True, help="Only the verdict on the screen; no progress.")
def command(**options: object) -> None:
    """Audit programs.

    A PATH is a program, a job file (*.job.toml), or a folder: every job file below it, and every program there that
    has none (reported as not declared).

    Exit status: 0 nothing at or above --fail-on, 1 something, 2 something could not be audited.
    """
    choices = Choices(**options)  # type: ignore[arg-type]
    try:
        status = run(choices)
    except TurnauditError as problem:
        from auditor.cli._talk import complain

        complain(problem.faults)
        status = EXIT_NOT_AUDITED
    click.get_current_context().exit(status)


def run(choices: Choices) -> int:
    """Audit everything asked for, write the reports, and give the exit status."""
    from auditor.cli import _answers, _earlier, _files, _inputs

    earlier = None if choices.against is None else _earlier.read(choices.against)
    found = _inputs.tasks(choices.paths, choices.job)
    several = len(found) > 1
    inputs = [file for task in found for file in task.files()]
    inputs += [] if choices.against is None else [choices.against]
    _files.refuse_inputs([path for path in (choices.output, choices.html) if path is not None], inputs)
    mine = found if choices.shard is None else _inputs.shard(found, choices.shard)
    answers = _audit(mine, _views(choices), choices)
    _write(answers, several, choices)
    rating = _answers.Rating(choices.fail_on, choices.allow_incomplete, earlier)
    return max((rating.status(answer) for answer in answers), default=EXIT_CLEAN)


def _views(choices: Choices) -> Views:
    from auditor.cli._talk import view_of
    from auditor.reports import View, formats

    failing = _FAILING[choices.fail_on]
    views = {choices.format: view_of(choices.output, choices.quiet, choices.series, failing)}
    if choices.html is not None:
        if "html" not in formats():
            raise UsageError(Fault("this installation has no report with pictures", key="--html"))
        views["html"] = View()
    return views


def _audit(mine: Sequence[Task], views: Views, choices: Choices) -> list[Answer]:
    from auditor.cli._answers import answers
    from auditor.cli._talk import progress

    come: dict[int, Answer] = {}
    with progress(len(mine), choices.quiet) as step:
        for number, answer in answers(mine, views, choices.workers):
            come[number] = answer
            step(answer.path)
    return [come[number] for number in sorted(come)]


def _write(answers: Sequence[Answer], several: bool, choices: Choices) -> None:
    """The reports to their places, and the same in short words to standard error."""
    from auditor.cli import _files, _talk
    from auditor.reports import report

    def document(name: str) -> str:
        return report(name).join([answer.parts[name] for answer in answers], several)

    text = document(choices.format)
    on_screen = choices.format == "screen" and choices.output is None
    if choices.html is not None:
        _files.replace(choices.html, document("html"))
    if choices.output is not None:
        _files.replace(choices.output, text)
    elif on_screen:
        click.echo(text, nl=False)
    else:
        click.echo(text.encode("utf-8", "replace"), nl=False)
    for answer in answers:
        if not (on_screen and sys.stdout.isatty()) or choices.quiet:  # else the report on the terminal has told why
            _talk.complain(answer.faults)
        if not (on_screen or choices.quiet or answer.faults):
            _talk.say(answer.in_words())
