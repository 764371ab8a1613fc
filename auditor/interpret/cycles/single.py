"""The single cycles: turning, facing and thread, each four motions around one cut.

The end point and the taper hold for the blocks behind (``stored``) until another motion code cancels
the cycle; clearing them then is the caller's part.
"""

from __future__ import annotations

from dataclasses import dataclass, replace

from auditor.declared.control_settings import amount, choice, switch
from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleCall, CycleFault, Expansion, Stroke
from auditor.interpret.cycles.readings import end_r, end_z, has, moved, thread_lead
from auditor.interpret.cycles.thread_run_out import RunOut, thread_points
from auditor.interpret.moves import Kind

NAMES = ("turning cycle", "facing cycle", "thread cycle")


@dataclass(frozen=True, slots=True)
class _Box:
    """Where the cut ends and how much its start lies off it."""

    end: Point
    taper: float


def expand(call: CycleCall) -> Expansion:
    """One box from the start point and back to it."""
    box = _box(call)
    stored = {"end_r": box.end.r, "end_z": box.end.z, "taper": box.taper}
    if call.name == "turning cycle":
        return Expansion(_turning(call, box), stored=stored, leaned_on=_leaned_on(call))
    if call.name == "facing cycle":
        return Expansion(_facing(call, box), stored=stored, leaned_on=_leaned_on(call))
    lead = thread_lead(call)
    settings = ("thread_run_out", "thread_run_out_angle", *_leaned_on(call))
    return Expansion(_thread(call, box, lead), stored=stored | {"lead": lead}, leaned_on=settings)


def _leaned_on(call: CycleCall) -> tuple[str, ...]:
    carried = call.stored.get("taper", 0.0) and not has(call, "R", "I", "K")
    return ("taper_stays",) if carried else ()


def _box(call: CycleCall) -> _Box:
    r, z = end_r(call), end_z(call)
    r = call.stored.get("end_r", call.start.r) if r is None else r
    z = call.stored.get("end_z", call.start.z) if z is None else z
    taper = _taper(call)
    if taper is None:
        taper = call.stored.get("taper", 0.0) if switch(call.control, "taper_stays") else 0.0
    if Point(z, r) == call.start:
        raise CycleFault("cycle-depth", "the cycle ends where it starts: it cuts nothing", ("X", "Z"))
    return _Box(Point(z, r), taper)


def _taper(call: CycleCall) -> float | None:
    """The taper as R, in older programs as I (along X) or K (along Z), which are the only ones some controls know."""
    older = call.length("K" if call.name == "facing cycle" else "I")
    taper = call.length("R")
    if choice(call.control, "taper_letter") == "R":
        return older if taper is None else taper
    if taper is not None:
        raise CycleFault("cycle-depth", "R is no word of this cycle where the taper is written as I or K", ("R",))
    return older


def _turning(call: CycleCall, box: _Box) -> tuple[Stroke, ...]:
    strokes: list[Stroke] = []
    here = moved(call.start, strokes, Kind.RAPID, Point(call.start.z, box.end.r + box.taper))
    here = moved(here, strokes, Kind.FEED, box.end)
    here = moved(here, strokes, Kind.FEED, Point(box.end.z, call.start.r))
    moved(here, strokes, Kind.RAPID, call.start)
    return tuple(strokes)


def _facing(call: CycleCall, box: _Box) -> tuple[Stroke, ...]:
    strokes: list[Stroke] = []
    here = moved(call.start, strokes, Kind.RAPID, Point(box.end.z + box.taper, call.start.r))
    here = moved(here, strokes, Kind.FEED, box.end)
    here = moved(here, strokes, Kind.FEED, Point(call.start.z, box.end.r))
    moved(here, strokes, Kind.RAPID, call.start)
    return tuple(strokes)


def _thread(call: CycleCall, box: _Box, lead: float) -> tuple[Stroke, ...]:
    run_out = RunOut(amount(call.control, "thread_run_out") * lead, amount(call.control, "thread_run_out_angle"))
    strokes: list[Stroke] = []
    start = Point(call.start.z, box.end.r + box.taper)
    here = moved(call.start, strokes, Kind.RAPID, start)
    for end in thread_points(start, box.end, call.start.r, run_out):
        here = moved(here, strokes, Kind.THREAD, end)
    here = moved(here, strokes, Kind.RAPID, Point(box.end.z, call.start.r))
    moved(here, strokes, Kind.RAPID, call.start)
    return tuple(replace(stroke, lead=lead) if stroke.kind is Kind.THREAD else stroke for stroke in strokes)
