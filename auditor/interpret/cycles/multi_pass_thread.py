"""The multi-pass thread cycle: an infeed law, and one synchronous stroke a pass."""

from __future__ import annotations

import math
from dataclasses import dataclass

from auditor.declared.control_settings import amount, choice
from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleCall, CycleFault, CycleRemark, Expansion, Stroke
from auditor.interpret.cycles.readings import (
    SAME,
    count_word,
    depth_word,
    end_r,
    end_z,
    fine_word,
    has,
    moved,
    point_remarks,
    thread_lead,
)
from auditor.interpret.cycles.thread_run_out import RunOut, thread_points
from auditor.interpret.moves import Kind

NAMES = ("multi-pass thread",)
MOST_PASSES = 2_000
ANGLE_UNKNOWN = 60.0  # degrees, when no first block says it
METHODS = (1, 2, 3, 4)
ZIGZAG = (2, 4)
EQUAL_DEPTH = (3, 4)


@dataclass(frozen=True, slots=True)
class Infeed:
    """How the depth of a thread is divided into passes, mm on radius."""

    height: float
    first: float
    least: float = 0.0
    allowance: float = 0.0
    finishing: int = 1
    method: int = 1  # 1 equal area one flank, 2 equal area zig-zag, 3 equal depth one flank, 4 equal depth zig-zag


@dataclass(frozen=True, slots=True)
class _Thread:
    """A multi-pass thread, read."""

    start: Point
    end: Point  # root at the end of the thread
    taper: float
    lead: float
    angle: float  # included, degrees
    infeed: Infeed
    run_out: RunOut
    shift: str

    @property
    def outwards(self) -> int:
        """Sense from the root to the crest along the radius."""
        return 1 if self.start.r > self.end.r else -1


def depths(infeed: Infeed) -> list[float]:
    """Depth reached by each pass, mm on radius.

    Equal chip area makes the depth grow with the square root of the pass number; a pass never takes less
    than ``least``. Roughing stops ``allowance`` above the full height; then come ``finishing`` passes at
    the full height.

    Examples
    --------
    >>> [round(depth, 3) for depth in depths(Infeed(height=0.92, first=0.3, allowance=0.02))]
    [0.3, 0.424, 0.52, 0.6, 0.671, 0.735, 0.794, 0.849, 0.9, 0.92]
    """
    rough = infeed.height - infeed.allowance
    found: list[float] = []
    reached = 0.0
    while reached < rough - SAME:
        number = len(found) + 1
        law = infeed.first * (number if infeed.method in EQUAL_DEPTH else math.sqrt(number))
        reached = min(max(law, reached + infeed.least), rough)
        found.append(reached)
        if number > MOST_PASSES:
            raise CycleFault("cycle-depth", f"the thread would need more than {MOST_PASSES} passes", ("Q", "D"))
    return [*found, *[infeed.height] * infeed.finishing]


def expand(call: CycleCall) -> Expansion:
    """Store the words of the first block, or cut the thread."""
    if not has(call, "X", "U", "Z", "W"):
        return Expansion((), stored=_first_block(call))
    one_block = has(call, "K", "D")
    thread = _read(call, one_block=one_block)
    strokes: list[Stroke] = []
    for number, depth in enumerate(depths(thread.infeed), start=1):
        _pass(thread, strokes, number, depth)
    fine = ("D",) if one_block else ("P", "Q")
    remarks = (*point_remarks(call, *fine), *_remarks(call, thread, one_block=one_block))
    return Expansion(tuple(strokes), remarks, dict(call.stored), _leaned_on(call, thread, one_block=one_block))


def _first_block(call: CycleCall) -> dict[str, float]:
    """P (finishing passes, run-out, angle in two digits each), Q and R; they hold until said otherwise."""
    stored = dict(call.stored)
    if "P" in call.words:
        digits = f"{round(call.words['P'].value):06d}"
        if len(digits) > 6 or digits.startswith("-"):
            raise CycleFault("cycle-depth", f"P{digits} is not made of three pairs of digits", ("P",))
        stored |= {"finishing": float(digits[:2]), "run_out": float(digits[2:4]) / 10, "angle": float(digits[4:])}
    least, allowance = fine_word(call, "Q"), call.length("R")
    if least is not None:
        stored["least"] = abs(least)
    if allowance is not None:
        stored["allowance"] = abs(allowance)
    return stored


def _read(call: CycleCall, *, one_block: bool) -> _Thread:
    r, z = end_r(call), end_z(call)
    end = Point(call.start.z if z is None else z, call.start.r if r is None else r)
    if abs(end.z - call.start.z) <= SAME or abs(end.r - call.start.r) <= SAME:
        raise CycleFault("cycle-depth", "the thread has to end away from its start in X and Z", ("X", "Z"))
    lead = thread_lead(call)
    infeed = _one_block_infeed(call) if one_block else _two_block_infeed(call)
    if infeed.height <= 0.0 or infeed.first <= 0.0 or infeed.allowance >= infeed.height:
        raise CycleFault(
            "cycle-depth",
            f"thread height {infeed.height:g} mm, first depth {infeed.first:g} mm, finishing allowance"
            f" {infeed.allowance:g} mm: the first two must be above zero, the allowance below the height",
            ("K", "D") if one_block else ("P", "Q"),
        )
    run_out = amount(call.control, "thread_run_out") if one_block else _held(call, "run_out", "thread_run_out")
    if one_block:
        angle, taper = call.words["A"].value if "A" in call.words else 0.0, call.length("I") or 0.0
    else:
        angle, taper = call.stored.get("angle", ANGLE_UNKNOWN), call.length("R") or 0.0
    return _Thread(
        call.start, end, taper, lead, angle, infeed,
        RunOut(run_out * lead, amount(call.control, "thread_run_out_angle")), choice(call.control, "thread_shift"),
    )


def _held(call: CycleCall, key: str, setting: str) -> float:
    """A value of the first block, or what the control is taken to have stored."""
    return call.stored[key] if key in call.stored else amount(call.control, setting)


def _two_block_infeed(call: CycleCall) -> Infeed:
    return Infeed(
        height=abs(fine_word(call, "P") or 0.0),
        first=abs(fine_word(call, "Q") or 0.0),
        least=_held(call, "least", "thread_least_infeed"),
        allowance=_held(call, "allowance", "thread_finish_allowance"),
        finishing=max(1, round(_held(call, "finishing", "thread_finish_passes"))),
    )


def _one_block_infeed(call: CycleCall) -> Infeed:
    method = count_word(call, "P")
    method = round(amount(call.control, "thread_method")) if method is None else method
    if method not in METHODS:
        raise CycleFault("cycle-depth", f"P{method} is no infeed method: 1 to 4 are known", ("P",))
    return Infeed(
        height=abs(call.length("K") or 0.0),
        first=abs(depth_word(call) or 0.0),
        least=amount(call.control, "thread_least_infeed"),
        allowance=amount(call.control, "thread_finish_allowance"),
        finishing=round(amount(call.control, "thread_finish_passes")),
        method=method,
    )


def _flank_shift(thread: _Thread, number: int, depth: float) -> float:
    """How far the start of a pass is moved in the cutting direction, so that one flank cuts."""
    if thread.shift == "none":
        return 0.0
    other_flank = thread.infeed.method in ZIGZAG and number % 2 == 0
    left = thread.infeed.height - depth
    from_root = left if other_flank else -left
    reach = from_root if thread.shift == "root" else thread.infeed.height + from_root
    return reach * math.tan(math.radians(thread.angle / 2))


def _pass(thread: _Thread, strokes: list[Stroke], number: int, depth: float) -> None:
    """Shift, infeed, thread, off, back."""
    travel = thread.end.z - thread.start.z
    start_z = thread.start.z + math.copysign(1.0, travel) * _flank_shift(thread, number, depth)
    end = Point(thread.end.z, thread.end.r + thread.outwards * (thread.infeed.height - depth))
    # the taper keeps its slope over the programmed length whatever the shift
    start = Point(start_z, end.r + thread.taper * (thread.end.z - start_z) / travel)
    here = moved(thread.start, strokes, Kind.RAPID, Point(start_z, thread.start.r), number)
    here = moved(here, strokes, Kind.RAPID, start, number)
    for point in thread_points(start, end, thread.start.r, thread.run_out):
        strokes.append(Stroke(Kind.THREAD, point, lead=thread.lead, cycle_pass=number, thread_depth=depth))
        here = point
    here = moved(here, strokes, Kind.RAPID, Point(thread.end.z, thread.start.r), number)
    moved(here, strokes, Kind.RAPID, thread.start, number)


def _remarks(call: CycleCall, thread: _Thread, *, one_block: bool) -> tuple[CycleRemark, ...]:
    remarks = []
    if not one_block and "angle" not in call.stored:
        remarks.append(
            CycleRemark(
                "cycle-stored-value",
                "no block before with P, Q, R of the thread: finishing passes, run-out, angle and least infeed are"
                " what the control has stored; one pass at full depth and 60 degrees are taken",
            )
        )
    crest = thread.end.r + thread.outwards * thread.infeed.height
    if (thread.start.r - crest) * thread.outwards < -SAME:
        remarks.append(
            CycleRemark(
                "cycle-start",
                f"the start point X{2 * thread.start.r:g} lies inside the thread, whose crest is X{2 * crest:g}:"
                " the way back runs through the thread",
                ("X",),
            )
        )
    return tuple(remarks)


def _leaned_on(call: CycleCall, thread: _Thread, *, one_block: bool) -> tuple[str, ...]:
    settings = ["thread_shift"] if thread.angle else []
    if thread.run_out.length:
        settings.append("thread_run_out_angle")
    if one_block:
        settings += ["thread_run_out", "thread_finish_passes", "thread_least_infeed", "thread_finish_allowance"]
        settings += [] if "P" in call.words else ["thread_method"]
        settings += [] if "D" not in call.words or call.words["D"].has_point else ["cycle_depth_word"]
        return tuple(settings)
    held = {
        "run_out": "thread_run_out",
        "least": "thread_least_infeed",
        "allowance": "thread_finish_allowance",
        "finishing": "thread_finish_passes",
    }
    return (*settings, *(name for key, name in held.items() if key not in call.stored))
