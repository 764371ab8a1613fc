"""A shift on one page, to hang beside the machine: what to do before leaving, and what runs when."""

from __future__ import annotations

from markupsafe import Markup

from auditor.reports._figures import duration
from auditor.reports.html.frame import steps
from auditor.reports.html.pages import fragment, page
from auditor.reports.html.svg import Drawing
from auditor.shift.judge import Shift
from auditor.shift.sheet import edge_words
from auditor.shift.worst import worst

WIDTH, _ROW, _LEFT, _RIGHT, _TOP = 1000.0, 34.0, 170.0, 14.0, 14.0


def shift_page(shift: Shift) -> str:
    """The page."""
    body = fragment(
        "shift.html", shift=shift, timeline=_timeline(shift), duration=duration, edge_words=edge_words,
        worst={job.name: worst(job.audit) for job in shift.jobs if job.audit is not None},
    )
    return page(f"{shift.verdict.upper()}: {shift.plan.name}", body)


def _timeline(shift: Shift) -> Markup:
    """The jobs along the shift's time; what runs past its end is set apart."""
    span = max(shift.plan.length, shift.time) or 1.0
    height = _TOP + len(shift.jobs) * _ROW + 34.0
    said = "; ".join(
        f"{job.name} from {duration(job.begin)} to {duration(job.end)}, {job.verdict}" for job in shift.jobs
    )
    drawing = Drawing("timeline", WIDTH, height, "The jobs along the shift",
                      f"The shift ends after {duration(shift.plan.length)}. {said}.")

    def x(second: float) -> float:
        return _LEFT + second / span * (WIDTH - _LEFT - _RIGHT)

    foot = _TOP + len(shift.jobs) * _ROW
    for hour in steps(0.0, span / 3600.0, 8):
        drawing.path([(x(3600.0 * hour), _TOP), (x(3600.0 * hour), foot)], "grid")
        drawing.text(x(3600.0 * hour), foot + 16, f"{hour:g} h", "tick-label", text_anchor="middle")
    for index, job in enumerate(shift.jobs):
        top = _TOP + index * _ROW
        drawing.text(_LEFT - 10, top + 21, job.name[:24], "tool-name", text_anchor="end")
        width = max(x(job.end) - x(job.begin), 2.0)
        drawing.add("rect", x=x(job.begin), y=top + 5, width=width, height=_ROW - 10, class_=f"job {job.verdict}")
        if width > 60.0:
            drawing.text(x(job.begin) + width / 2.0, top + 21, f"{job.batch} x {duration(job.cycle)}", "job-words",
                         text_anchor="middle")
    drawing.path([(x(shift.plan.length), 4), (x(shift.plan.length), foot + 4)], "limit")
    return drawing.svg("timeline")
