"""Nose-radius compensation: from the programmed contour to the path of the imaginary tip."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Literal

from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleRemark, Stroke

Side = Literal["left", "right"]


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
    number of strokes may differ (links at acute corners).

    Parameters
    ----------
    start : Point
        Tip before the run, on the programmed point, mm, X as radius.
    contour : sequence of Stroke
        Programmed points; strokes without motion are left out by the function itself.
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

    Remarks
    -------
    Topics: ``compensation-in-arc`` (start-up or cancel in an arc), ``compensation-too-small`` (inside
    radius or step smaller than the nose, element reversed by the offset), ``compensation-blank-blocks``.
    """
    raise NotImplementedError
