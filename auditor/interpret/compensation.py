"""Nose-radius compensation: from the programmed contour to the path of the imaginary tip.

Every element of the contour is moved by the nose radius to the tool's side; that gives the path of the
nose centre. The tip path is the same path moved by a constant vector, so cylinders and faces keep their
programmed size while slopes and arcs move.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Literal

from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleRemark, Stroke
from auditor.interpret.moves import Kind
from auditor.interpret.nose import SMALL, Element, Joint, Nose, joint_of, outside
from auditor.interpret.nose import Side as Side
from auditor.interpret.plane import between, dot, sweep

# from the nose centre to the imaginary tip, in nose radii, by tip number
TIP_VECTORS: dict[int, Point] = {
    0: Point(0, 0), 1: Point(1, 1), 2: Point(-1, 1), 3: Point(-1, -1), 4: Point(1, -1),
    5: Point(1, 0), 6: Point(0, 1), 7: Point(-1, 0), 8: Point(0, -1), 9: Point(0, 0),
}
REVERSED = 1e-5  # mm; by so much an element may run backwards before it counts as reversed


@dataclass(frozen=True, slots=True)
class OffsetPath:
    """The tip path of a compensated run and what a reviewer should know about it."""

    strokes: tuple[Stroke, ...]
    remarks: tuple[CycleRemark, ...] = ()


def offset_path(
    start: Point,
    contour: Sequence[Stroke],
    side: Side,
    nose_radius: float,
    tip: int,
    *,
    cancelled: bool = True,
    blind: frozenset[int] = frozenset(),
    startup: Literal["perpendicular", "intersection"] = "perpendicular",
    acute: Literal["line", "arc"] = "line",
) -> OffsetPath:
    """Path of the imaginary tip for a run of programmed strokes under G41 or G42.

    ``contour[0]`` is the start-up move (the first with motion after G41/G42), the last stroke the cancel
    move (the one of G40) when ``cancelled``; without a cancel the run ends square to its last element.
    Every stroke of the result carries feed, line and block of the contour stroke it came from; the
    number of strokes may differ (links at acute corners, elements into which the nose does not fit).

    Parameters
    ----------
    start : Point
        Tip before the run, on the programmed point, mm, X as radius.
    contour : sequence of Stroke
        Programmed points; strokes without motion are left out.
    side : {"left", "right"}
        Side of the tool looking along the motion: left = G41, right = G42.
    nose_radius : float
        mm, > 0.
    tip : int
        Imaginary tip number 0 to 9.
    cancelled : bool
        Whether the last stroke is the cancel move.
    blind : frozenset of int
        Indices of strokes that stand behind two or more blocks without motion: the control cannot look
        ahead to them, so the stroke before ends square.
    startup, acute
        Settings ``compensation_start`` and ``compensation_corner`` of the control.

    Returns
    -------
    OffsetPath
        Remarks have the topics ``compensation-in-arc`` (start-up or cancel in an arc),
        ``compensation-too-small`` (inside arc or step smaller than the nose: most controls stop there;
        the path goes on as near to the contour as the nose gets) and ``compensation-blank-blocks``.

    Examples
    --------
    >>> contour = [Stroke(Kind.FEED, Point(0.0, 10.0)), Stroke(Kind.FEED, Point(-20.0, 10.0))]
    >>> path = offset_path(Point(2.0, 10.0), contour, "right", 0.8, 3, cancelled=False)
    >>> [(round(stroke.end.z, 3), round(stroke.end.r, 3)) for stroke in path.strokes]
    [(-0.8, 10.0), (-20.8, 10.0)]
    """
    direction = TIP_VECTORS[tip]
    nose = Nose(nose_radius, side, Point(direction.z * nose_radius, direction.r * nose_radius), acute)
    elements = _elements(start, contour, blind)
    if not elements:
        return OffsetPath(())
    remarks = _arc_remarks(elements, cancelled)
    body = elements[1:-1] if cancelled else elements[1:]
    body, small = _fitting(body, nose)
    run = [elements[0], *body, *(elements[-1:] if cancelled and len(elements) > 1 else [])]
    joints = _joints(run, nose, cancelled, startup)
    blank = [_blank_remark(element) for element in run if element.blind]
    return OffsetPath(_tip_strokes(run, joints, nose, cancelled), (*remarks, *small, *blank))


def _elements(start: Point, contour: Sequence[Stroke], blind: frozenset[int]) -> list[Element]:
    elements: list[Element] = []
    here = start
    for index, stroke in enumerate(contour):
        if math.dist(here, stroke.end) > SMALL or stroke.centre is not None:
            elements.append(Element(stroke, here, index in blind))
            here = stroke.end
    return elements


def _arc_remarks(elements: Sequence[Element], cancelled: bool) -> tuple[CycleRemark, ...]:
    ends = {"start-up": elements[0].stroke}
    if cancelled:
        ends["cancel"] = elements[-1].stroke
    return tuple(
        CycleRemark("compensation-in-arc", f"{which} of nose-radius compensation in an arc: it needs a straight move",
                    line=stroke.line)
        for which, stroke in ends.items()
        if stroke.centre is not None
    )


def _blank_remark(element: Element) -> CycleRemark:
    return CycleRemark(
        "compensation-blank-blocks",
        "two or more blocks without motion before this one under nose-radius compensation:"
        " the control cannot look ahead and ends the move before square to itself, which over- or undercuts the corner",
        line=element.stroke.line,
    )


def _fitting(elements: list[Element], nose: Nose) -> tuple[list[Element], tuple[CycleRemark, ...]]:
    """The elements the nose can reach, and a remark for each that it cannot."""
    remarks: list[CycleRemark] = []
    kept = []
    for element in elements:
        room = math.inf if element.stroke.centre is None else element.offset_radius(nose)
        if room > SMALL:
            kept.append(element)
        elif room < -SMALL:
            remarks.append(_small(element, f"inside radius {element.radius:.4g} mm is smaller than"
                                           f" the nose radius {nose.radius:.4g} mm"))
    while len(kept) > 1:
        lost = _reversed(kept, nose)
        if lost is None:
            break
        remarks.append(_small(kept[lost], f"the nose of radius {nose.radius:.4g} mm does not fit between the neighbours"
                                          " of this element: its offset runs backwards"))
        del kept[lost]
    return kept, tuple(remarks)


def _small(element: Element, message: str) -> CycleRemark:
    return CycleRemark("compensation-too-small", message, line=element.stroke.line)


def _reversed(elements: Sequence[Element], nose: Nose) -> int | None:
    """Index of the element that the offset turns round most, None when all keep their sense."""
    joints = _joints(elements, nose, cancelled=False, startup=None)
    worst, where = -REVERSED, None
    for index, element in enumerate(elements):
        first = joints[index - 1].points[-1] if index else nose.centre(element.start, element.tangent(element.start))
        length = _signed_length(element, first, joints[index].points[0], nose)
        if length < worst:
            worst, where = length, index
    return where


def _signed_length(element: Element, first: Point, last: Point, nose: Nose) -> float:
    """Length of an offset element in its own sense; below zero when it runs backwards."""
    if element.stroke.centre is None:
        return dot(between(first, last), element.tangent(element.start))
    clockwise = bool(element.stroke.clockwise)
    whole = sweep(element.stroke.centre, element.start, element.end, clockwise) or math.tau
    new = sweep(element.stroke.centre, first, last, clockwise)
    # trimming makes an arc shorter, an outside corner longer by less than a quarter turn at each end
    backwards = new > min(whole + math.pi, (math.tau + whole) / 2)
    return element.offset_radius(nose) * (new - math.tau if backwards else new)


def _joints(
    run: Sequence[Element],
    nose: Nose,
    cancelled: bool,
    startup: Literal["perpendicular", "intersection"] | None,
) -> list[Joint]:
    """Joint behind every element; ``startup`` None: the run begins with an ordinary element."""
    joints: list[Joint] = []
    for index, element in enumerate(run):
        if index + 1 == len(run):
            joints.append(Joint((nose.centre(element.end, element.tangent(element.end)),)))
            continue
        following = run[index + 1]
        at_start = startup is not None and index == 0
        at_cancel = cancelled and index + 2 == len(run)
        if (at_start or at_cancel) and (startup != "intersection" or not outside(element, following, nose)):
            touching = following if at_start else element
            point = following.start if at_start else element.end
            joints.append(Joint((nose.centre(point, touching.tangent(point)),)))
        else:
            joints.append(joint_of(element, following, nose))
    return joints


def _tip_strokes(
    run: Sequence[Element], joints: Sequence[Joint], nose: Nose, cancelled: bool
) -> tuple[Stroke, ...]:
    """Strokes of the imaginary tip: the centre path moved by the tip vector."""
    strokes: list[Stroke] = []
    for index, (element, joint) in enumerate(zip(run, joints, strict=True)):
        stroke = element.stroke
        if cancelled and index and index + 1 == len(run):
            strokes.append(stroke)  # ends with the tip on the programmed point
            break
        centre = None if stroke.centre is None else _shifted(stroke.centre, nose.tip)
        strokes.append(replace(stroke, end=_shifted(joint.points[0], nose.tip), centre=centre))
        for point in joint.points[1:]:
            kind = Kind.FEED if stroke.kind is Kind.ARC else stroke.kind
            link = replace(stroke, kind=kind, end=_shifted(point, nose.tip), centre=None, clockwise=None)
            if joint.arc_centre is not None:
                around = _shifted(joint.arc_centre, nose.tip)
                link = replace(link, kind=Kind.ARC, centre=around, clockwise=nose.side == "left")
            strokes.append(link)
    return tuple(strokes)


def _shifted(point: Point, by: Point) -> Point:
    return Point(point.z + by.z, point.r + by.r)
