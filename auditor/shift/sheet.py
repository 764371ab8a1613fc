"""A shift on a screen: may they all run, what must be decided before leaving, and why."""

from __future__ import annotations

from auditor.reports import View
from auditor.reports._figures import duration
from auditor.reports._grounds import CAUTION
from auditor.reports._uses import called
from auditor.reports.screen.paper import COLOURS, Paper
from auditor.shift.judge import EdgeNeed, JobAnswer, Shift
from auditor.shift.worst import worst


def shift_sheet(shift: Shift, view: View) -> str:
    """The sheet; its first line is the verdict and can stand alone."""
    paper = Paper(view)
    counts = shift.counts
    lead = f"{paper.sign(shift.verdict)} {shift.verdict.upper()}"
    room = view.width - len(lead) - len(counts) - 5
    paper.row((lead, COLOURS[shift.verdict]), "  ", paper.fit_path(shift.plan.name, max(room, 12)), "   ", counts)
    if view.brief:
        return paper.text()
    watch = "unattended" if shift.plan.unattended else "attended"
    jobs = "1 job takes" if len(shift.jobs) == 1 else f"{len(shift.jobs)} jobs take"
    paper.paragraph(f"{jobs} {duration(shift.time)} of {duration(shift.plan.length)}, {watch}",
                    margin=2)
    _decisions(paper, shift)
    for job in shift.jobs:
        _job(paper, job)
    _assumptions(paper, shift)
    paper.gap()
    paper.row(paper.sign("rule") * view.width)
    paper.paragraph(CAUTION)
    return paper.text()


def _decisions(paper: Paper, shift: Shift) -> None:
    if shift.decisions:
        paper.gap()
        paper.paragraph(("Before anybody leaves", "bold"))
    for decision in sorted(shift.decisions, key=lambda each: each.level != "stop"):
        about = f"{decision.job}: " if decision.job else ""
        paper.paragraph((paper.sign(decision.level), COLOURS[decision.level]), f" {about}{decision.text}", margin=2,
                        hang=4)
        if decision.remedy:
            paper.paragraph(("Way out: ", "bold"), decision.remedy, margin=4)


def _job(paper: Paper, job: JobAnswer) -> None:
    paper.gap()
    paper.paragraph((f"{paper.sign(job.verdict)} {job.verdict.upper()}", COLOURS[job.verdict]), f"  {job.name}")
    if job.audit is None:
        return
    paper.paragraph(f"{job.batch} parts of {duration(job.cycle)}: from {duration(job.begin)} to {duration(job.end)}",
                    margin=4)
    figures = worst(job.audit)
    if figures:
        told = ", ".join(f"{each.what} {100.0 * each.share:.0f} % (line {each.line})" for each in figures)
        paper.paragraph(f"largest shares of a limit: {told}", margin=4)
    for need in job.edges:
        paper.paragraph(edge_words(need, job.batch), margin=4, hang=6)
    chips = job.chip_hazards()
    if chips:
        paper.paragraph("chips: " + ", ".join(f"line {each.line} {each.check}" for each in chips), margin=4, hang=6)


def edge_words(need: EdgeNeed, batch: int) -> str:
    """What a tool's edges must bear, in words."""
    if need.per_part is None:
        return f"{called(need.tool)}: edge life not declared"
    if need.needed is None:
        return f"{called(need.tool)}: hardly used"
    lasts = f"an edge lasts {need.parts_an_edge} parts" if need.parts_an_edge else "an edge lasts no whole part"
    return f"{called(need.tool)}: {lasts}, {batch} parts need {need.needed}, {need.at_hand} at hand"


def _assumptions(paper: Paper, shift: Shift) -> None:
    if shift.plan.assumptions:
        paper.gap()
        paper.paragraph(("Assumed", "bold"))
    for each in shift.plan.assumptions:
        paper.paragraph(f"{each.about} = {each.value} ({each.why})", margin=2, hang=4)
