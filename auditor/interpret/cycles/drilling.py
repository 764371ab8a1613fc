"""Drilling, tapping and boring on the spindle axis."""

from __future__ import annotations

from dataclasses import dataclass, replace

from auditor.declared.control_settings import amount, choice
from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleCall, CycleFault, Expansion, Stroke
from auditor.interpret.cycles.readings import (
    SAME,
    count_word,
    end_r,
    fine_word,
    moved,
    peck_remarks,
    point_remarks,
    thread_lead,
)
from auditor.interpret.moves import Feed, Kind

NAMES = ("drill", "tap", "bore")
MOST_REPEATS = 9_999
MOST_PECKS = 10_000


@dataclass(frozen=True, slots=True)
class _Hole:
    """Where a hole is and how it is made."""

    r: float
    level: float  # Z of the R level
    bottom: float
    initial: float
    peck: float  # 0: in one go
    dwell: float  # s

    def at(self, z: float) -> Point:
        return Point(z, self.r)


def expand(call: CycleCall) -> Expansion:
    """One hole, or as many as K says; Z, R, Q, P and the initial level hold for the blocks behind."""
    stored = _stored(call)
    hole = _hole(call, stored)
    repeats = count_word(call, "K")
    repeats = 1 if repeats is None else min(max(repeats, 0), MOST_REPEATS)
    strokes: list[Stroke] = []
    here = call.start
    for _ in range(repeats):
        here = moved(here, strokes, Kind.RAPID, hole.at(here.z))
        here = moved(here, strokes, Kind.RAPID, hole.at(hole.level))
        here = _make(call, hole, strokes)
        if call.return_to_initial:
            here = moved(here, strokes, Kind.RAPID, hole.at(hole.initial))
    stored |= {"initial": hole.initial, "left_at": here.z}
    remarks = (*point_remarks(call, "Q"), *peck_remarks("Q", hole.peck))
    return Expansion(tuple(strokes), remarks, stored, _leaned_on(call, hole))


def _leaned_on(call: CycleCall, hole: _Hole) -> tuple[str, ...]:
    settings = ["drill_level"] if "R" in call.words or "level" in call.stored else []
    if call.name == "drill" and hole.peck:
        settings += ["peck", "drill_retract"]
    if call.name == "bore":
        settings.append("bore_out_factor")
    return tuple(settings)


def _stored(call: CycleCall) -> dict[str, float]:
    """The words as they hold for this and the following blocks."""
    new = {
        "z": call.length("Z"),
        "w": call.length("W"),
        "level": call.length("R"),
        "peck": fine_word(call, "Q"),
        "dwell": _dwell(call),
    }
    stored = dict(call.stored)
    if new["z"] is not None:
        stored.pop("w", None)
    elif new["w"] is not None:
        stored.pop("z", None)
    stored.update({key: value for key, value in new.items() if value is not None})
    return stored


def _dwell(call: CycleCall) -> float | None:
    """P in milliseconds, or in seconds when written with a point."""
    number = call.words.get("P")
    if number is None:
        return None
    return abs(number.value) / (1.0 if number.has_point else 1000.0)


def _hole(call: CycleCall, stored: dict[str, float]) -> _Hole:
    initial = _initial(call)
    level = _level(call, stored.get("level"), initial)
    if "z" in stored:
        bottom = stored["z"] if call.absolute else level + stored["z"]
    elif "w" in stored:
        bottom = level + stored["w"]
    else:
        raise CycleFault("cycle-depth", "the drilling cycle has no depth Z", ("Z",))
    if abs(bottom - level) <= SAME:
        raise CycleFault("cycle-depth", "the bottom of the hole is its R level: nothing is drilled", ("Z", "R"))
    r = end_r(call)
    peck = abs(stored.get("peck", 0.0))
    if peck and abs(bottom - level) / peck > MOST_PECKS:
        raise CycleFault("cycle-peck", f"a peck of {peck:g} mm needs more than {MOST_PECKS} pecks", ("Q",))
    return _Hole(call.start.r if r is None else r, level, bottom, initial, peck, stored.get("dwell", 0.0))


def _initial(call: CycleCall) -> float:
    """Z where the first hole began, as long as nothing but the cycle has moved the tool since."""
    if "initial" in call.stored and abs(call.start.z - call.stored["left_at"]) <= SAME:
        return call.stored["initial"]
    return call.start.z


def _level(call: CycleCall, written: float | None, initial: float) -> float:
    """Z of the R level: from the initial level on, or a position of its own."""
    if written is None:
        return initial
    reading = choice(call.control, "drill_level")
    by_system = call.control.system != "A" and call.absolute
    absolute = reading == "absolute" or (reading == "by system" and by_system)
    return written if absolute else initial + written


def _make(call: CycleCall, hole: _Hole, strokes: list[Stroke]) -> Point:
    """From the R level to the bottom and back to the R level."""
    if call.name == "drill":
        return _drill(call, hole, strokes)
    if call.name == "tap":
        return _tap(call, hole, strokes)
    strokes.append(Stroke(Kind.FEED, hole.at(hole.bottom), dwell_after=hole.dwell))
    factor = amount(call.control, "bore_out_factor")
    out = None if call.feed is None else Feed(call.feed.mode, call.feed.value * factor)
    strokes.append(Stroke(Kind.FEED, hole.at(hole.level), feed=out))
    return hole.at(hole.level)


def _drill(call: CycleCall, hole: _Hole, strokes: list[Stroke]) -> Point:
    inwards = 1.0 if hole.bottom > hole.level else -1.0
    retract = amount(call.control, "drill_retract")
    full = choice(call.control, "peck") == "full retract"
    depth, number = hole.level, 1
    while hole.peck and abs(hole.bottom - depth) > hole.peck + SAME:
        depth += inwards * hole.peck
        strokes.append(Stroke(Kind.FEED, hole.at(depth), cycle_pass=number))
        if full:
            strokes.append(Stroke(Kind.RAPID, hole.at(hole.level), cycle_pass=number))
        strokes.append(Stroke(Kind.RAPID, hole.at(depth - inwards * retract), cycle_pass=number))
        number += 1
    strokes.append(Stroke(Kind.FEED, hole.at(hole.bottom), cycle_pass=number, dwell_after=hole.dwell))
    strokes.append(Stroke(Kind.RAPID, hole.at(hole.level), cycle_pass=number))
    return hole.at(hole.level)


def _tap(call: CycleCall, hole: _Hole, strokes: list[Stroke]) -> Point:
    lead = _tap_lead(call)
    way_in = Stroke(Kind.THREAD, hole.at(hole.bottom), lead=lead, dwell_after=hole.dwell)
    strokes += [way_in, replace(way_in, end=hole.at(hole.level), dwell_after=0.0, reversed_spindle=True)]
    return hole.at(hole.level)


def _tap_lead(call: CycleCall) -> float:
    """The pitch: the feed per turn, or the feed per minute over the spindle speed."""
    if call.feed is None or call.feed.mode == "rev":
        return thread_lead(call)
    speed = call.spindle.value
    if call.spindle.mode != "rpm" or not speed:
        raise CycleFault("feed-missing", "the pitch of a tap fed per minute needs a spindle speed in rpm", ("S",))
    return call.feed.value / speed
