"""The half-section: stock before and after, finished outline, what holds the work, the tool path and the findings."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from markupsafe import Markup

from auditor.declared.model import Point, Tool
from auditor.findings import Audit, Finding, Run
from auditor.interpret.moves import Kind
from auditor.reports._shares import Shares
from auditor.reports.html import path, setting
from auditor.reports.html.frame import Frame, steps
from auditor.reports.html.labels import Label, placed
from auditor.reports.html.svg import Drawing

WIDTH = 1000.0  # px
_MARGIN = (46.0, 30.0, 14.0, 34.0)  # px: left, top, right, foot
_TALLEST = 560.0  # px
_AROUND = 8.0  # mm of air in front of the work
_BESIDE = 14.0  # mm above it


@dataclass(frozen=True, slots=True)
class Mark:
    """A finding's number at its place."""

    number: int
    level: str
    accepted: bool
    at: Point
    tool: Tool | None
    words: str


def marks_of(numbered: Sequence[tuple[int, Finding]], run: Run) -> list[Mark]:
    """Marks of the findings that have a place."""
    return [
        Mark(number, str(finding.level), finding.accepted is not None, finding.at,
             None if finding.tool is None else run.job.tools.get(finding.tool), f"{finding.level} {finding.check}")
        for number, finding in numbered if finding.at is not None
    ]


def frame_of(run: Run) -> Frame:
    """The window that shows the work, what holds it and every cut."""
    job, loads = run.job, run.prediction.loads
    z_low, _, z_high, r_high = run.simulation.raw.bounds
    if setting.held(job):
        z_low = setting.jaw_face(job) - setting.JAW_LENGTH - 6.0
    else:
        z_low -= setting.CENTRE_LENGTH
    if job.workholding.tailstock_point is not None or job.workholding.kind == "centres":
        z_high += setting.CENTRE_LENGTH
    r_low = 0.0
    if loads.move.size:
        z_low, z_high = min(z_low, float(loads.z.min())), max(z_high, float(loads.z.max()))
        r_low, r_high = min(r_low, float(loads.r.min())), max(r_high, float(loads.r.max()))
    r_low, r_high, z_high = r_low - 2.0, r_high + _BESIDE, z_high + _AROUND
    left, top, right, foot = _MARGIN
    scale = min((WIDTH - left - right) / (z_high - z_low), (_TALLEST - top - foot) / (r_high - r_low))
    return Frame(z_low, z_high, r_low, r_high, scale, left, top, down=job.machine.turret == "front")


def draw(audit: Audit, shares: Shares, marks: Sequence[Mark], key: str) -> Markup:
    """The picture."""
    run = audit.run
    frame = frame_of(run)
    height = frame.top + frame.height + _MARGIN[3]
    width = max(frame.left + frame.width + _MARGIN[2], 420.0)
    title = "Half-section of the work with the tool path"
    drawing = Drawing(f"{key}section", width, height, title, _said(audit, marks))
    drawing.add("rect", x=frame.left, y=frame.top, width=frame.width, height=frame.height, class_="field")
    clip = f"{key}window"
    with drawing.inside("clipPath", id=clip):
        drawing.add("rect", x=frame.left, y=frame.top, width=frame.width, height=frame.height)
    with drawing.inside("pattern", id=hatch(key), width=7, height=7, patternUnits="userSpaceOnUse",
                        patternTransform="rotate(45)"):
        drawing.path([(0.0, 0.0), (0.0, 7.0)], "hatch")
    with drawing.inside("g", clip_path=f"url(#{clip})"):
        _layers(drawing, frame, run, shares, key)
    _axes(drawing, frame)
    _marks(drawing, frame, marks, key, clip)
    return drawing.svg("section", linked=True)


def hatch(key: str) -> str:
    """Name of the hatching that says: cut through."""
    return f"{key}hatch"


def _layers(drawing: Drawing, frame: Frame, run: Run, shares: Shares, key: str) -> None:
    frame.shape(drawing, run.simulation.raw, "raw")
    frame.shape(drawing, run.simulation.final, "left", hatch(key))
    setting.draw(drawing, frame, run.job)
    finished(drawing, frame, run)
    drawing.path(frame.points([(frame.z_low, 0.0), (frame.z_high, 0.0)]), "axis")
    for line in path.lines(run, shares.worst, frame):
        if line.style == path.CLASSES[-1]:
            drawing.add("path", d=line.data, class_="casing")
        drawing.add("path", d=line.data, class_=f"path {line.style}")


def finished(drawing: Drawing, frame: Frame, run: Run) -> None:
    """The declared finished outlines."""
    for outline in (run.job.workpiece.finished, run.job.workpiece.finished_bore):
        if outline:
            drawing.path(frame.points(outline), "finished")


def _axes(drawing: Drawing, frame: Frame) -> None:
    """Z along the foot, X as diameters along the left side."""
    foot = frame.top + frame.height
    for z in steps(frame.z_low, frame.z_high, 10):
        drawing.path([(frame.x(z), foot), (frame.x(z), foot + 5)], "tick")
        drawing.text(frame.x(z), foot + 17, f"{z:g}", "tick-label", text_anchor="middle")
    drawing.text(frame.left + frame.width, foot + 30, "Z mm", "tick-label", text_anchor="end")
    for x in steps(max(0.0, 2.0 * frame.r_low), 2.0 * frame.r_high, max(2, int(frame.height / 45.0))):
        y = frame.y(x / 2.0)
        drawing.path([(frame.left - 5, y), (frame.left, y)], "tick")
        drawing.text(frame.left - 8, y + 4, f"{x:g}", "tick-label", text_anchor="end")
    drawing.text(frame.left - 8, 14, "X mm", "tick-label", text_anchor="end")


def _marks(drawing: Drawing, frame: Frame, marks: Sequence[Mark], key: str, clip: str) -> None:
    """Numbered marks, with the tool's outline where each finding is; the gravest on top."""
    box = (frame.left, frame.top, frame.left + frame.width, frame.top + frame.height)
    anchors = [(min(max(frame.x(mark.at.z), box[0]), box[2]), min(max(frame.y(mark.at.r), box[1]), box[3]))
               for mark in marks]
    labels = placed(anchors, box)
    seen: set[tuple[int, float, float]] = set()
    known: set[int] = set()
    for mark, label in sorted(zip(marks, labels, strict=True), key=lambda pair: _grave(pair[0])):
        first = mark.number not in known
        known.add(mark.number)
        with drawing.inside("g", id=f"{key}m{mark.number}" if first else None, class_=f"mark {_style(mark)}"):
            _outline(drawing, frame, mark, seen, clip)
            _label(drawing, mark, label, key)


def _grave(mark: Mark) -> int:
    return -1 if mark.accepted else {"stop": 2, "review": 1, "note": 0}[mark.level]


def _style(mark: Mark) -> str:
    return "accepted" if mark.accepted else mark.level


def _outline(drawing: Drawing, frame: Frame, mark: Mark, seen: set[tuple[int, float, float]], clip: str) -> None:
    """The tool where it stands, once for each place."""
    if mark.tool is None:
        return
    place = (mark.tool.number, round(mark.at.z, 1), round(mark.at.r, 1))
    if place not in seen:
        seen.add(place)
        with drawing.inside("g", clip_path=f"url(#{clip})"):
            frame.tool(drawing, mark.tool, mark.at)


def _label(drawing: Drawing, mark: Mark, label: Label, key: str) -> None:
    """A sign in the shape of its level, on a leader line when it stands apart."""
    (x, y), (ax, ay) = label.at, label.anchor
    drawing.path([(ax, ay), (x, y)], "leader")
    drawing.add("circle", cx=ax, cy=ay, r=2.2, class_="spot")
    with drawing.inside("a", href=f"#{key}f{mark.number}"):
        drawing.hint(f"{mark.number}: {mark.words}")
        sign(drawing, x, y, mark.level)
        drawing.text(x, y + (5.4 if mark.level == "review" else 4.0), str(mark.number), "number", text_anchor="middle")


def sign(drawing: Drawing, x: float, y: float, level: str) -> None:
    """Square for stop, triangle for review, circle for note: told apart without colour."""
    if level == "stop":
        drawing.add("rect", x=x - 9, y=y - 9, width=18, height=18, class_="sign")
    elif level == "review":
        drawing.path([(x, y - 12), (x + 13, y + 9.5), (x - 13, y + 9.5)], "sign", closed=True)
    else:
        drawing.add("circle", cx=x, cy=y, r=9.5, class_="sign")


def _said(audit: Audit, marks: Sequence[Mark]) -> str:
    """The picture in words."""
    run = audit.run
    raw, left = run.simulation.raw.bounds, run.simulation.final.bounds
    cuts = sum(move.kind is not Kind.RAPID for move in run.path.moves)
    text = (
        f"Stock of diameter {2.0 * raw[3]:.4g} mm from Z{raw[2]:.4g} to Z{raw[0]:.4g}, jaw face at "
        f"Z{setting.jaw_face(run.job):.4g}."
    )
    if left:
        text += f" What is left reaches from Z{left[0]:.4g} to Z{left[2]:.4g}, diameter {2.0 * left[3]:.4g} mm."
    text += f" {len(run.path.moves)} moves, {cuts} of them at feed."
    if marks:
        places = (f"{mark.number} ({mark.words}) at X{2.0 * mark.at.r:.4g} Z{mark.at.z:.4g}" for mark in marks[:40])
        text += " Findings: " + "; ".join(places) + "."
    return text
