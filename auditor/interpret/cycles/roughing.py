"""Rough turning and rough facing: level after level down to the profile, then once along it."""

from __future__ import annotations

from dataclasses import dataclass, field

from auditor.declared.control_settings import amount, choice
from auditor.interpret.cycles.call import CycleCall, CycleFault, CycleRemark, Expansion
from auditor.interpret.cycles.frame import Spot
from auditor.interpret.cycles.pockets import rough_pockets
from auditor.interpret.cycles.profile import (
    RoughProfile,
    check_rising,
    rough_profile,
    sign_remarks,
    start_remarks,
    two_axis_start,
    unmodelled_words,
)
from auditor.interpret.cycles.readings import depth_word, has, point_remarks
from auditor.interpret.cycles.roughing_path import RoughingPath
from auditor.interpret.cycles.stretches import floor_before, open_stretches

NAMES = ("rough turning", "rough facing")
FACING = "rough facing"
MOST_LEVELS = 10_000
HAIR = 2e-7  # mm; above a level piece by this counts as above it


@dataclass(slots=True)
class _Depth:
    """Depth of a pass and retract, where they came from, and what to say about it."""

    depth: float
    retract: float
    stored: dict[str, float]
    remarks: tuple[CycleRemark, ...] = ()
    leaned_on: list[str] = field(default_factory=list)


def expand(call: CycleCall) -> Expansion:
    """Store depth and retract, or rough the profile."""
    if not has(call, "P", "Q"):
        return Expansion((), stored=_first_block(call))
    unmodelled_words(call)
    depth = _depth(call)
    profile = rough_profile(call, facing=call.name == FACING)
    second_type = two_axis_start(call)
    check_rising(profile, height=not second_type)
    path = RoughingPath(call, profile, depth.retract)
    levels = _levels(call, profile, depth.depth, lowest=second_type)
    if second_type:
        settings = rough_pockets(path, levels)
    else:
        _straight_levels(path, levels)
        settings = ("rough_last_layer",)
    path.finish(call.start)
    remarks = (
        *depth.remarks, *sign_remarks(call, profile.frame), *start_remarks(profile),
        *_pocket_shift(profile, second_type),
    )
    leaned_on = (*depth.leaned_on, "rough_levels_from", "rough_escape", *settings)
    return Expansion(tuple(path.strokes), remarks, depth.stored, leaned_on)


def _first_block(call: CycleCall) -> dict[str, float]:
    """Depth and retract of the block without P and Q; they hold until said otherwise."""
    stored = dict(call.stored)
    depth = call.length("W" if call.name == FACING else "U")
    retract = call.length("R")
    if depth is not None:
        stored["depth"] = abs(depth)
    if retract is not None:
        stored["retract"] = abs(retract)
    return stored


def _depth(call: CycleCall) -> _Depth:
    one_block = "D" in call.words
    depth = abs(depth_word(call) or 0.0) if one_block else call.stored.get("depth")
    if not depth:
        word = "D" if one_block else "W" if call.name == FACING else "U"
        message = "the depth of a pass is zero" if depth is not None else (
            f"no depth of a pass: no block before with {word} and R, no D; what the control has stored is not known"
        )
        raise CycleFault("cycle-depth", message, (word,))
    found = _Depth(depth, 0.0, dict(call.stored), point_remarks(call, "D") if one_block else ())
    if one_block and not call.words["D"].has_point:
        found.leaned_on.append("cycle_depth_word")
    if "retract" in call.stored and not one_block:
        found.retract = call.stored["retract"]
        return found
    found.retract = amount(call.control, "rough_retract")
    found.leaned_on.append("rough_retract")
    if not one_block:
        remark = CycleRemark(
            "cycle-stored-value",
            f"the retract R is not in the program: the control uses its stored one, here {found.retract:g} mm is taken",
        )
        found.remarks = (*found.remarks, remark)
    return found


def _levels(call: CycleCall, profile: RoughProfile, depth: float, *, lowest: bool) -> list[float]:
    """Heights of the passes above the floor of the profile."""
    top = profile.origin.height
    if choice(call.control, "rough_levels_from") == "start":
        top = profile.frame.spot(call.start).height
    floor = profile.first.height
    if lowest:
        floor = min(floor, *(min(piece.start.height, piece.end.height) for piece in profile.pieces))
    if (top - floor) / depth > MOST_LEVELS:
        message = f"a depth of {depth:g} mm needs more than {MOST_LEVELS} passes"
        raise CycleFault("cycle-depth", message, ("U", "W", "D"))
    levels: list[float] = []
    while (height := top - (len(levels) + 1) * depth) > floor + HAIR:
        levels.append(height)
    return levels


def _straight_levels(path: RoughingPath, levels: list[float]) -> None:
    """Type I: every level from the start to the first point of the profile, out at 45 degrees."""
    profile = path.profile
    pieces = floor_before(profile.pieces, profile.origin, profile.first)
    heights = [(height, height) for height in levels]
    if choice(path.call.control, "rough_last_layer") == "own pass":
        heights.append((profile.first.height, profile.first.height + HAIR))
    for height, measured_at in heights:
        stretches = open_stretches(pieces, measured_at, profile.origin.along)
        if not stretches or stretches[0].start > profile.origin.along + HAIR:
            continue
        path.next_pass()
        path.infeed(height)
        path.feed(Spot(stretches[0].end, height))
        path.escape(Spot(stretches[0].end - path.retract, height + path.retract))
        path.rapid(Spot(profile.origin.along, height + path.retract))


def _pocket_shift(profile: RoughProfile, second_type: bool) -> tuple[CycleRemark, ...]:
    dips = any(piece.end.height < piece.start.height - HAIR for piece in profile.pieces)
    along = profile.by.r if profile.frame.facing else profile.by.z
    if not (second_type and dips and along):
        return ()
    word = "U" if profile.frame.facing else "W"
    return (
        CycleRemark(
            "cycle-shift-with-pocket",
            f"the allowance {word} is not zero but the profile has a pocket: shifting it along the cut takes metal off"
            " one flank of the pocket",
            (word,),
        ),
    )
