"""``turnaudit compare``: the same program with another tool, or with another rake."""

from __future__ import annotations

import re
from pathlib import Path
from typing import TYPE_CHECKING

import click

from auditor.cli import EXIT_NOT_AUDITED
from auditor.errors import TurnauditError

if TYPE_CHECKING:
    from auditor.compare import Comparison, RakeStudy
    from auditor.declared.model import Job

_FILE = click.Path(path_type=Path, dir_okay=False)
_RANGE = re.compile(r"([-+]?\d+(?:\.\d+)?)\.\.([-+]?\d+(?:\.\d+)?)(?::(\d+(?:\.\d+)?))?")
_USUAL_STEP, _MOST_ROWS = 3.0, 60


def _rakes(ctx: click.Context, param: click.Parameter, value: str | None) -> tuple[float, ...]:
    """``FROM..TO`` or ``FROM..TO:STEP`` as the rakes it names."""
    if value is None:
        return ()
    match = _RANGE.fullmatch(value.replace(" ", ""))
    first, last, step = (float(match[1]), float(match[2]), float(match[3] or _USUAL_STEP)) if match else (0.0, 0.0, 0.0)
    if not match or step <= 0.0 or last < first or (last - first) / step > _MOST_ROWS:
        raise click.BadParameter(f"{value!r} is no range of rakes in degrees, such as -12..18 or -6..12:2.")
    count = int((last - first) / step + 1e-9) + 1
    return tuple(first + step * number for number in range(count))


@click.command(short_help="Compare tools, or rakes, on the same program.")
@click.argument("program", type=_FILE)
@click.argument("more", nargs=-1, metavar="")
@click.option("--tool", type=click.IntRange(min=1), required=True, metavar="N", help="The number of the T word.")
@click.option("--with", "names", multiple=True, metavar="LIBRARY_TOOL...",
              help="Tools of the nearest shop.toml, [tools.LIBRARY_TOOL], to put there instead.")
@click.option("--rake", "rakes", callback=_rakes, metavar="FROM..TO[:STEP]",
              help="Vary the effective rake, in degrees, on the tool's heaviest cut: -12..18.")
@click.option("--job", type=_FILE, metavar="FILE", help="Job file of the program (default: PART.job.toml beside it).")
@click.option("--format", "form", type=click.Choice(["screen", "json"]), default="screen", show_default=True,
              help="How the comparison is written.")
@click.option("--output", type=_FILE, metavar="FILE", help="Write it there instead of standard output.")
def command(
    program: Path, more: tuple[str, ...], tool: int, names: tuple[str, ...], rakes: tuple[float, ...],
    job: Path | None, form: str, output: Path | None,
) -> None:  # fmt: skip
    """Audit PROGRAM again with other tools of the shop file in one station, and set the figures side by side.

    \b
    turnaudit compare part.nc --tool 1 --with positive wiper
    turnaudit compare part.nc --tool 1 --rake -12..18

    Exit status: 0 compared, 2 something could not be audited.
    """
    if (more and not names) or not (names or rakes):
        raise click.UsageError("say what to compare with: --with LIBRARY_TOOL... or --rake FROM..TO")
    try:
        _run(program, job, tool, (*names, *more), rakes, form, output)
    except TurnauditError as problem:
        from auditor.cli._talk import complain

        complain(problem.faults)
        click.get_current_context().exit(EXIT_NOT_AUDITED)


def _run(
    program: Path, job_path: Path | None, number: int, names: tuple[str, ...], rakes: tuple[float, ...], form: str,
    output: Path | None,
) -> None:  # fmt: skip
    from auditor.cli._files import refuse_inputs
    from auditor.cli._one import only_task

    task, declared = only_task(program, job_path)
    if output is not None:
        refuse_inputs([output], task.files())
    from auditor.compare import compare_tools
    from auditor.declared.jobs import load_job

    job = load_job(declared, program=task.program)
    comparison = compare_tools(job, number, names) if names else None
    study = _study(job, number, rakes, comparison) if rakes else None
    _write(job, number, comparison, study, form, output)


def _study(job: Job, number: int, rakes: tuple[float, ...], comparison: Comparison | None) -> RakeStudy:
    from auditor.audit import audit
    from auditor.compare import study_rake
    from auditor.compare.library import check_called

    audited = comparison.base.audit if comparison is not None else audit(job)
    check_called(audited, number)
    return study_rake(audited.run, number, rakes)


def _write(
    job: Job, number: int, comparison: Comparison | None, study: RakeStudy | None, form: str, output: Path | None
) -> None:
    from auditor.cli import _files, _talk

    if form == "json":
        from auditor.compare.document import comparison_document

        text = comparison_document(job.program, job.path, number, comparison, study)
    else:
        from auditor.compare.sheet import comparison_sheet

        text = comparison_sheet(comparison, study, _talk.view_of(output, brief=False, series=False))
    if output is not None:
        _files.replace(output, text)
    else:
        click.echo(text, nl=False)
