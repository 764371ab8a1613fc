"""Pattern repeating: the whole profile several times, each time nearer to its finished place."""

from __future__ import annotations

from dataclasses import dataclass, replace

from auditor.declared.control_settings import choice
from auditor.declared.model import Point
from auditor.interpret.cycles.call import CycleCall, CycleFault, CycleRemark, Expansion, Stroke
from auditor.interpret.cycles.profile import allowance, cut_strokes, shifted
from auditor.interpret.cycles.readings import count_word
from auditor.interpret.moves import Kind

NAMES = ("pattern repeating",)
MOST_PASSES = 999


@dataclass(frozen=True, slots=True)
class _Repeats:
    """Whole roughing shift (radius and length, from the profile towards the start) and number of passes."""

    shift: Point
    passes: int


def expand(call: CycleCall) -> Expansion:
    """Store the shift and the number of passes, or run the passes."""
    if "P" not in call.words:
        return Expansion((), stored=_stored(call, "U", "W", "R"))
    stored = _stored(call, "I", "K", "D")
    repeats = _repeats(stored)
    if not call.profile:
        raise CycleFault("cycle-profile-missing", "pattern repeating needs P and Q of a profile", ("P", "Q"))
    left = allowance(call)
    first = Kind.RAPID if call.rapid_mode else Kind.FEED
    strokes: list[Stroke] = []
    for number in range(1, repeats.passes + 1):
        share = _share(call, number, repeats.passes)
        by = Point(left.z + share * repeats.shift.z, left.r + share * repeats.shift.r)
        one_pass = [
            Stroke(Kind.RAPID, shifted(call.start, by)),
            Stroke(first, shifted(call.profile[0].end, by)),
            *cut_strokes(call.profile[1:], by),
        ]
        strokes += [replace(stroke, cycle_pass=number) for stroke in one_pass]
    strokes.append(Stroke(Kind.RAPID, call.start, cycle_pass=repeats.passes))
    return Expansion(tuple(strokes), _sign_remarks(call, repeats), stored, ("pattern_first_pass",))


def _sign_remarks(call: CycleCall, repeats: _Repeats) -> tuple[CycleRemark, ...]:
    """Shift and allowance along X have to lead from the profile towards the start point."""
    out = call.start.r - call.profile[0].end.r
    shift = CycleRemark(
        "cycle-allowance-sign",
        "the roughing shift along X points into the part: the first passes lie deeper than the last one",
    )
    left = CycleRemark(
        "cycle-allowance-sign", "the allowance U points into the part: it cuts past the finished size", ("U",)
    )
    wrong = ((repeats.shift.r, shift), (allowance(call).r, left))
    return tuple(remark for value, remark in wrong if value * out < 0.0)


def _stored(call: CycleCall, along_x: str, along_z: str, count: str) -> dict[str, float]:
    """What the program has said so far about shift and passes."""
    stored = dict(call.stored)
    new = {"shift_r": call.length(along_x), "shift_z": call.length(along_z), "passes": count_word(call, count)}
    stored.update({key: float(value) for key, value in new.items() if value is not None})
    return stored


def _repeats(stored: dict[str, float]) -> _Repeats:
    passes = round(stored.get("passes", 0))
    if not 1 <= passes <= MOST_PASSES or ("shift_r" not in stored and "shift_z" not in stored):
        raise CycleFault(
            "cycle-depth",
            "pattern repeating needs a block before it with the shift U, W and the number of passes R",
            ("U", "W", "R"),
        )
    return _Repeats(Point(stored.get("shift_z", 0.0), stored.get("shift_r", 0.0)), passes)


def _share(call: CycleCall, number: int, passes: int) -> float:
    """Share of the shift that is left in a pass."""
    if choice(call.control, "pattern_first_pass") == "one step in":
        return (passes - number) / passes
    return 0.0 if passes == 1 else (passes - number) / (passes - 1)
