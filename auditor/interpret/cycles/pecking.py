"""Peck cycles along Z and along X: columns of pecks side by side (deep holes, face grooves, wide grooves)."""

from __future__ import annotations

import math
from dataclasses import dataclass

from auditor.declared.control_settings import amount
from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleCall, CycleFault, CycleRemark, Expansion, Stroke
from auditor.interpret.cycles.readings import SAME, end_r, end_z, fine_word, has, moved, peck_remarks, point_remarks
from auditor.interpret.moves import Kind

NAMES = ("peck along z", "peck along x")
MOST_STROKES = 10_000


@dataclass(frozen=True, slots=True)
class _Peck:
    """A peck cycle with its axes named by what they do: depth and side."""

    along_z: bool
    start: Point
    bottom: float  # on the depth axis
    last: float  # column, on the side axis
    peck: float  # 0: one stroke to the bottom
    step: float  # 0: one column
    relief: float
    retract: float

    def point(self, depth: float, side: float) -> Point:
        return Point(depth, side) if self.along_z else Point(side, depth)

    @property
    def top(self) -> float:
        return self.start.z if self.along_z else self.start.r

    @property
    def first(self) -> float:
        return self.start.r if self.along_z else self.start.z


def expand(call: CycleCall) -> Expansion:
    """Store the retract, or peck."""
    if not has(call, "X", "U", "Z", "W", "P", "Q"):
        retract = call.length("R")
        return Expansion((), stored=dict(call.stored) | ({} if retract is None else {"retract": abs(retract)}))
    cycle = _read(call)
    depths = _steps(cycle.top, cycle.bottom, cycle.peck)
    columns = _steps(cycle.first, cycle.last, cycle.step, with_first=True)
    if len(depths) * len(columns) > MOST_STROKES:
        raise CycleFault("cycle-peck", f"the cycle would need more than {MOST_STROKES} pecks", ("P", "Q"))
    strokes: list[Stroke] = []
    here = call.start
    for number, side in enumerate(columns, start=1):
        here = moved(here, strokes, Kind.RAPID, cycle.point(cycle.top, side), number)
        here = _column(cycle, strokes, side, depths, number)
    moved(here, strokes, Kind.RAPID, call.start, len(columns))
    leaned_on = () if "retract" in call.stored or len(depths) == 1 else ("peck_retract",)
    return Expansion(tuple(strokes), _remarks(call, cycle, len(columns)), dict(call.stored), leaned_on)


def _read(call: CycleCall) -> _Peck:
    along_z = call.name == "peck along z"
    z, r = end_z(call), end_r(call)
    z, r = call.start.z if z is None else z, call.start.r if r is None else r
    bottom, last = (z, r) if along_z else (r, z)
    across, deep = fine_word(call, "P") or 0.0, fine_word(call, "Q") or 0.0
    step, peck = (across, deep) if along_z else (deep, across)
    cycle = _Peck(
        along_z, call.start, bottom, last, abs(peck), abs(step), abs(call.length("R") or 0.0),
        call.stored.get("retract", amount(call.control, "peck_retract")),
    )
    if abs(cycle.bottom - cycle.top) <= SAME:
        raise CycleFault("cycle-peck", "the peck cycle has no depth", ("Z" if along_z else "X",))
    if abs(cycle.last - cycle.first) > SAME and cycle.step <= SAME:
        word = "P" if along_z else "Q"
        raise CycleFault("cycle-peck", f"the cycle goes sideways but {word} gives no step", (word,))
    return cycle


def _steps(start: float, end: float, step: float, *, with_first: bool = False) -> list[float]:
    """Positions from ``start`` by ``step``, the last one at ``end``."""
    travel = abs(end - start)
    count = 1 if step <= SAME else max(1, math.ceil(travel / step - SAME))
    found = [start + math.copysign(number * step, end - start) for number in range(1, count)]
    if travel > SAME or not with_first:
        found.append(end)
    return [start, *found] if with_first else found


def _column(cycle: _Peck, strokes: list[Stroke], side: float, depths: list[float], number: int) -> Point:
    """Pecks at one place, relief at the bottom, out again."""
    inwards = math.copysign(1.0, cycle.bottom - cycle.top)
    for depth in depths:
        strokes.append(Stroke(Kind.FEED, cycle.point(depth, side), cycle_pass=number))
        if depth != depths[-1]:
            strokes.append(Stroke(Kind.RAPID, cycle.point(depth - inwards * cycle.retract, side), cycle_pass=number))
    if cycle.relief and cycle.last != cycle.first:
        side -= math.copysign(cycle.relief, cycle.last - cycle.first)
        strokes.append(Stroke(Kind.RAPID, cycle.point(cycle.bottom, side), cycle_pass=number))
    out = cycle.point(cycle.top, side)
    strokes.append(Stroke(Kind.RAPID, out, cycle_pass=number))
    return out


def _remarks(call: CycleCall, cycle: _Peck, columns: int) -> tuple[CycleRemark, ...]:
    remarks = [*point_remarks(call, "P", "Q"), *peck_remarks("Q" if cycle.along_z else "P", cycle.peck)]
    if cycle.relief and columns > 1:
        remarks.append(
            CycleRemark(
                "cycle-relief",
                f"the relief R of {cycle.relief:g} mm is made at the bottom of the first column too, into the wall",
                ("R",),
            )
        )
    if call.tool_width is not None and columns > 1 and cycle.step > call.tool_width + SAME:
        word = "P" if cycle.along_z else "Q"
        remarks.append(
            CycleRemark(
                "cycle-groove-step",
                f"the step of {cycle.step:g} mm is wider than the tool of {call.tool_width:g} mm: ribs stay",
                (word,),
            )
        )
    return tuple(remarks)
