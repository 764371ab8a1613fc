"""A job's tool exchanged for tools of the shop's library, each audited on the same program."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from pathlib import Path

from auditor.audit import audit
from auditor.compare.changes import Change, changes
from auditor.compare.figures import ToolFigures, figures_of
from auditor.declared.faults import Place
from auditor.declared.model import Job
from auditor.declared.notes import Notes
from auditor.declared.shops import Shop, read_tool
from auditor.declared.tools import tool_of
from auditor.errors import DeclarationError, Fault, UsageError
from auditor.findings import Audit

DECLARED = "as declared"


@dataclass(frozen=True, slots=True)
class Variant:
    """One tool in the station that is compared."""

    name: str  # its name in the shop file; "as declared" for the job's own
    audit: Audit
    figures: ToolFigures
    changes: tuple[Change, ...]  # against the job's own tool; empty for that one


@dataclass(frozen=True, slots=True)
class Comparison:
    """One station of a job with its own tool, and with others."""

    number: int
    base: Variant
    others: tuple[Variant, ...]


def compare_tools(job: Job, number: int, names: Sequence[str]) -> Comparison:
    """Audit the job as declared, and again with every named tool of the shop file in station ``number``.

    Raises
    ------
    UsageError
        The program does not call that tool, or it is not declared.
    DeclarationError
        A name that the shop file does not have, or an entry that does not hold together.
    """
    jobs = [with_library_tool(job, number, name) for name in dict.fromkeys(names)]
    base = audit(job)
    check_called(base, number)
    others = []
    for name, changed in zip(dict.fromkeys(names), jobs, strict=True):
        other = audit(changed)
        others.append(Variant(name, other, figures_of(other.run, number), changes(base.findings, other.findings)))
    return Comparison(number, Variant(DECLARED, base, figures_of(base.run, number), ()), tuple(others))


def check_called(audited: Audit, number: int) -> None:
    """Complain about a station that the job does not declare or the program does not call."""
    job, called = audited.run.job, dict(audited.run.path.tools_called)
    moved = {move.tool for move in audited.run.path.moves}
    if number not in job.tools:
        known = ", ".join(str(key) for key in sorted(job.tools)) or "none"
        raise UsageError(Fault("this tool is not declared in the job file", file=job.path, key=f"tools.{number}",
                               wanted=f"one of the declared tools: {known}"))
    if number not in called and number not in moved:
        known = ", ".join(f"T{key}" for key in sorted(called)) or "no tool at all"
        raise UsageError(Fault(f"the program never calls T{number}", file=job.program, found=known,
                               wanted="a tool the program works with"))


def with_library_tool(job: Job, number: int, name: str) -> Job:
    """The job with a tool of the nearest shop file in that station, and what is taken for granted about it."""
    faults: list[Fault] = []
    about = f"tools.{number}"
    notes = Notes(about)
    written = Shop(Path(job.path or job.program)).take("tools", name, Place("--with", "", {}), faults)
    row = read_tool(written.raw, written.place, faults) if written else None
    tool = tool_of(number, row, name, written.place, notes, faults) if written and row else None
    if tool is None:
        raise DeclarationError(*dict.fromkeys(faults))
    kept = [entry for entry in job.assumptions if entry.about != about and not entry.about.startswith(f"{about}.")]
    return replace(job, tools={**job.tools, number: tool}, assumptions=(*kept, *notes.entries))
