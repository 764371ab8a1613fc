"""What stands around the work: chuck or collet, centres, as far as they are declared."""

from __future__ import annotations

from auditor.declared.model import Job
from auditor.reports.html.frame import Frame
from auditor.reports.html.svg import Drawing
from auditor.simulate.stock import raw_stock

JAW_LENGTH = 26.0  # mm shown in front of the chuck's body; not declared, drawn as usual
JAW_HEIGHT = 22.0  # mm
CENTRE_LENGTH = 26.0  # mm shown of a tailstock centre
HALF_POINT = 30.0  # deg, half the point angle of a centre


def held(job: Job) -> bool:
    """Whether jaws or a collet hold the work."""
    return job.workholding.kind != "centres"


def jaw_face(job: Job) -> float:
    """Where the jaws end."""
    return -job.workholding.stick_out


def draw(drawing: Drawing, frame: Frame, job: Job) -> None:
    """Jaws and centres."""
    if held(job):
        _jaws(drawing, frame, job)
    else:
        low = raw_stock(job.workpiece).bounds[0]
        _centre(drawing, frame, low, 10.0, towards=-1.0)
    work = job.workholding
    if work.tailstock_point is not None or work.kind == "centres":
        point = work.tailstock_point.z if work.tailstock_point else raw_stock(job.workpiece).bounds[2]
        _centre(drawing, frame, point, (work.tailstock_diameter or 20.0) / 2.0, towards=1.0)


def _jaws(drawing: Drawing, frame: Frame, job: Job) -> None:
    work, face = job.workholding, jaw_face(job)
    radius = (work.grip_diameter or job.workpiece.diameter) / 2.0
    back = max(frame.z_low, face - JAW_LENGTH)
    low, high = (max(0.0, radius - JAW_HEIGHT * 0.5), radius) if work.grip_inside else (radius, radius + JAW_HEIGHT)
    if work.kind == "collet":
        outline = [(face, low), (face, low + 5.0), (back, low + 5.0 + 0.4 * JAW_LENGTH), (back, low)]
    else:
        step = low + 0.45 * (high - low)
        outline = [(face, low), (face, step), (face - 0.3 * JAW_LENGTH, step), (face - 0.3 * JAW_LENGTH, high),
                   (back, high), (back, low)]
    drawing.path(frame.points(outline), "jaw", closed=True)
    if frame.z_low < back:
        body = [(back, low), (back, frame.r_high), (frame.z_low, frame.r_high), (frame.z_low, low)]
        drawing.path(frame.points(body), "chuck", closed=True)


def _centre(drawing: Drawing, frame: Frame, point: float, radius: float, towards: float) -> None:
    """A 60 deg centre: above the axis only, as the half-section shows it."""
    shoulder = point + towards * radius * 1.732
    back = frame.z_high if towards > 0.0 else frame.z_low
    outline = [(point, 0.0), (shoulder, radius), (back, radius), (back, 0.0)]
    drawing.path(frame.points(outline), "centre", closed=True)
