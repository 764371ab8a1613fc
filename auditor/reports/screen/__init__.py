"""The report for a person at a terminal: may this run, what must change, why believe it; in that order."""

from __future__ import annotations

import re
from collections.abc import Sequence

from auditor.findings import Audit
from auditor.reports import Outcome, Unreadable, View
from auditor.reports._figures import duration
from auditor.reports._grounds import by_weight, counts
from auditor.reports.screen import findings, grounds, tools
from auditor.reports.screen.paper import COLOURS, Paper, signs

__all__ = ["join", "render", "signs"]

_NAME = 24  # columns a program's name keeps in the first line
_STYLING = re.compile(r"\x1b\[[0-9;]*m")


def render(outcome: Outcome, view: View) -> str:
    """One program's sheet; its first line is the verdict and can stand alone."""
    paper = Paper(view)
    if isinstance(outcome, Unreadable):
        _unreadable(paper, outcome)
        return paper.text()
    _verdict(paper, outcome)
    if not view.brief:
        _heading(paper, outcome)
        findings.write(paper, outcome)
        tools.write(paper, outcome)
        grounds.write(paper, outcome)
    return paper.text()


def join(parts: Sequence[str], several: bool) -> str:
    """A single sheet as it stands; several behind an overview of their verdicts."""
    if not several:
        return "".join(parts)
    heads = "\n".join(part.split("\n", 1)[0] for part in parts)
    sheets = [part for part in parts if len(_STYLING.sub("", part).strip().splitlines()) > 1]
    return "\n\n".join([f"{heads}\n", *sheets]) if parts else "no program\n"


def _verdict(paper: Paper, audit: Audit) -> None:
    """Shape, word, program, and how many findings of which level."""
    word = audit.verdict.upper()
    lead = f"{paper.sign(audit.verdict)} {word}"
    told = _told(audit, paper.view.width - len(lead) - _NAME - 5)
    room = paper.view.width - len(lead) - len(told) - 5
    name = paper.fit_path(audit.run.text.path, max(room, 12))
    paper.row((lead, COLOURS[audit.verdict]), "  ", name, "   ", told)
    if audit.verdict == "clear" and not paper.view.brief:
        _beside_clear(paper, audit)


def _told(audit: Audit, room: int) -> str:
    """What there is to see to; beside the word clear, by name as far as the line holds it, what was not judged."""
    told = counts(audit)
    names = list(dict.fromkeys(item.check for item in by_weight(audit.not_judged)))
    if audit.verdict != "clear" or not names:
        return told
    for kept in range(len(names), 0, -1):
        more = f" and {len(names) - kept} more" if kept < len(names) else ""
        longer = told.replace(f"{len(names)} not judged", f"not judged: {', '.join(names[:kept])}{more}")
        if len(longer) <= room:
            return longer
    return told


def _beside_clear(paper: Paper, audit: Audit) -> None:
    """What the word clear does not cover stands right beside it."""
    if audit.not_judged:
        names = ", ".join(dict.fromkeys(item.check for item in by_weight(audit.not_judged)))
        paper.paragraph(("clear of what was judged; not judged: ", "bold"), names, margin=2)
    else:
        paper.paragraph("clear of what was judged: a prediction, no promise", margin=2)


def _heading(paper: Paper, audit: Audit) -> None:
    """What was read with what, how much of it was understood, how long it runs."""
    run, coverage, totals = audit.run, audit.coverage, audit.totals
    job = f"job {run.job.path}" if run.job.path else "no job file"
    paper.paragraph(f"{job}, system {run.path.system}, {run.path.units}", margin=2)
    if coverage.not_audited:
        missing = coverage.motion_blocks - coverage.audited
        checked = f"{missing} of {coverage.motion_blocks} motion blocks NOT checked"
    else:
        checked = f"all {coverage.motion_blocks} motion blocks checked"
    paper.paragraph(f"{checked}; cutting {duration(totals.cutting_time)} of {duration(totals.time)}", margin=2)


def _unreadable(paper: Paper, outcome: Unreadable) -> None:
    lead = f"{paper.sign('unreadable')} UNREADABLE"
    paper.row(
        (lead, COLOURS["unreadable"]), "  ", paper.fit_path(outcome.path, paper.view.width - len(lead) - 20),
        "   not audited",
    )
    for fault in () if paper.view.brief else outcome.faults:
        paper.paragraph(str(fault), margin=2, hang=4)
