"""A calibration for a person at a terminal: the factor, the cuts about it, the new band, the lines to paste."""

from __future__ import annotations

from collections import Counter
from collections.abc import Sequence

from auditor.calibrate.calibration import Calibration, ToolResidual, grouped
from auditor.calibrate.log import LoadLog
from auditor.calibrate.shop_lines import material_name, shop_lines
from auditor.declared.model import Job
from auditor.reports import View
from auditor.reports._figures import plain
from auditor.reports.screen.paper import Paper

MIDDLE, REACH = 20, 0.30  # columns to either side of the fit in the plot, and the share they stand for


def calibration_sheet(calibration: Calibration, job: Job, log: LoadLog, view: View) -> str:
    """The whole sheet, no wider than the view."""
    paper = Paper(view)
    low, high = calibration.interval
    paper.paragraph((f"Force factor {calibration.factor:.2f}   (95 %: {low:.2f} to {high:.2f})", "bold"))
    paper.paragraph(_rests_on(calibration, job, log), margin=2)
    paper.paragraph(_idle(calibration), margin=2)
    paper.gap()
    paper.paragraph(("Measured against fitted, cut by cut", "bold"))
    _plot(paper, calibration.tools)
    for text in calibration.warnings:
        paper.gap()
        paper.paragraph(text, margin=2)
    if calibration.matched.left_out:
        paper.gap()
        paper.paragraph(("Not used", "bold"))
    for text in grouped(calibration.matched.left_out):
        paper.paragraph(text, margin=2, hang=4)
    paper.gap()
    paper.paragraph((_band(calibration), "bold"))
    paper.paragraph(f"{calibration.scatter_why}.", margin=2)
    paper.gap()
    paper.paragraph(f'For shop.toml, to be pasted by hand; then material = "{material_name(job)}" in the job file:')
    paper.gap()
    lines = shop_lines(calibration, job, log)
    return paper.text() + (plain_lines(lines) if view.plain else lines)


def plain_lines(text: str) -> str:
    """The lines in ASCII."""
    return "".join(f"{plain(line)}\n" for line in text.splitlines())


def _rests_on(calibration: Calibration, job: Job, log: LoadLog) -> str:
    held = calibration.held_down
    outliers = f", {len(held)} held down as outliers (in line {_some(held)})" if held else ""
    shifts = [f"T{tool} {shift:+.1f} s" for tool, shift in calibration.matched.shifts]
    laid = f"; laid over the program with {', '.join(shifts)}" if shifts else ""
    what = f"{counted(calibration.cuts, 'cut')} and {counted(calibration.air_cuts, 'feed')} in air"
    return (f"{job.workpiece.material.name}, {what} of {job.program}{outliers}; {log.quantity} by {log.place} from "
            f"{log.path}{laid}.")


def counted(number: int, what: str) -> str:
    """One cut, two cuts."""
    return f"{number} {what}{'' if number == 1 else 's'}"


def _some(lines: Sequence[int], most: int = 8) -> str:
    told = ", ".join(str(line) for line in list(dict.fromkeys(lines))[:most])
    return told if len(set(lines)) <= most else f"{told} ..."


def _idle(calibration: Calibration) -> str:
    slope = f", {calibration.idle_slope:+.2f} kW per 1000 rpm" if calibration.idle_slope else ""
    source = "from the feeds in air" if calibration.air_cuts else "from cuts of different weight, there being no air"
    return f"Idle power {calibration.idle:.2f} kW{slope}, {source}."


def _plot(paper: Paper, tools: Sequence[ToolResidual]) -> None:
    """One line a tool: how far its cuts lie below and above the fit."""
    for one in tools:
        name = "no T" if one.tool is None else f"T{one.tool}"
        paper.row(f"  {name:<6}{_strip(one.residuals)}  {100 * one.mean:+.0f} %, {counted(len(one.residuals), 'cut')}")
    share = f"{100 * REACH:.0f} %"
    scale = f"{'-' + share:<{MIDDLE - 1}}fit{'+' + share:>{MIDDLE - 1}}"
    paper.row(f"  {'':<6}{scale}")


def _strip(residuals: Sequence[float]) -> str:
    """Cuts as signs on a line: . one, : two or three, # more; | is the fit, < and > lie beyond."""
    places = Counter(
        max(0, min(2 * MIDDLE, round(MIDDLE + MIDDLE * residual / REACH))) for residual in residuals
    )
    signs = [" "] * (2 * MIDDLE + 1)
    signs[MIDDLE] = "|"
    for place, count in places.items():
        signs[place] = "." if count == 1 else ":" if count < 4 else "#"
    if any(residual < -REACH for residual in residuals):
        signs[0] = "<"
    if any(residual > REACH for residual in residuals):
        signs[-1] = ">"
    return "".join(signs)


def _band(calibration: Calibration) -> str:
    before, after = 100 * calibration.scatter_before, 100 * calibration.scatter
    word = "narrows" if after < before else "widens" if after > before else "stays"
    return f"The band of the prediction {word}: {before:.0f} % before, {after:.0f} % from now on"
