"""Fixed cycles called: the block and the state become a call, the strokes of the cycle become moves."""

from __future__ import annotations

from dataclasses import replace

from auditor.declared.model import Point
from auditor.interpret import cycles
from auditor.interpret.cutting_conditions import check_cut
from auditor.interpret.cycles.call import CycleCall, CycleFault, Expansion, Stroke
from auditor.interpret.moves import Kind
from auditor.interpret.profiles import Profile, carry_out_profile
from auditor.interpret.reference import leave_compensation
from auditor.interpret.registry import action, motion
from auditor.interpret.run import NotUnderstood, Run
from auditor.interpret.state import NOWHERE
from auditor.interpret.systems import DRILLING_CYCLES, MULTIPLE_CYCLES, PROFILE_CYCLES, SINGLE_CYCLES, code_for
from auditor.interpret.travel import begin_stroke, dressed, settle, unknown_start, write
from auditor.interpret.words import BlockWords


@motion(*SINGLE_CYCLES, *DRILLING_CYCLES)
def modal_cycle(run: Run, words: BlockWords) -> None:
    """A cycle that stays in force: every block with axis words repeats it."""
    name = run.state.drilling or run.state.motion
    assert name is not None
    try:
        _carry_out(run, words, name, None)
    except CycleFault:
        run.state.motion = run.state.drilling = None  # the blocks behind would repeat what was not understood
        raise


@action(*MULTIPLE_CYCLES)
def multiple_cycle(run: Run, words: BlockWords) -> None:
    """G70 to G76 (C: G72 to G78): the cycle and, where it has one, its profile."""
    name = next(function for function in reversed(words.functions) if function in MULTIPLE_CYCLES)
    if name not in PROFILE_CYCLES or not (name == "finishing" or words.has("P", "Q")):
        _carry_out(run, words, name, None)
        return
    settle(run)
    try:
        if run.state.position is None:
            raise NotUnderstood(unknown_start(run), "position-unknown")
        profile = carry_out_profile(run, words, finishing=name == "finishing")
    except (CycleFault, NotUnderstood):
        _leave_profile_out(run, words, name)
        raise
    try:
        _carry_out(run, words, name, profile)
        _check_start(run, words, name)
    finally:
        _go_on_behind(run, name, profile)


def _carry_out(run: Run, words: BlockWords, name: str, profile: Profile | None) -> None:
    if name != "finishing":
        leave_compensation(run, f"the cycle {code_for(run.system, name)}")
    settle(run)
    start = run.state.position or (NOWHERE if _only_stores(words, name) else None)
    if start is None:
        raise NotUnderstood(unknown_start(run), "position-unknown")
    expansion = cycles.find(name)(_call(run, words, name, start, profile))
    run.state.stored[name] = dict(expansion.stored)
    run.note(*expansion.remarks)
    for key in expansion.leaned_on:
        run.lean_on(key, name)
    _write(run, name, expansion, profile)


def _only_stores(words: BlockWords, name: str) -> bool:
    """The first of two blocks gives depths and retracts; nothing moves, wherever the tool stands."""
    if name in PROFILE_CYCLES:
        return name != "finishing" and not words.has("P", "Q")
    return name in MULTIPLE_CYCLES and not words.has("X", "Z", "U", "W")


def _call(run: Run, words: BlockWords, name: str, start: Point, profile: Profile | None) -> CycleCall:
    state, tool = run.state, run.tool
    return CycleCall(
        name=name,
        line=words.line,
        start=_moved(start, state.shift, -1),
        words=words.by_letter,
        control=run.control,
        inch=state.inch,
        feed=state.feed.command(),
        spindle=state.spindle.command(),
        rapid_mode=profile is None or profile.rapid_mode,
        profile=() if profile is None else tuple(_shifted(stroke, state.shift, -1) for stroke in profile.strokes),
        profile_spans=frozenset() if profile is None else profile.spans,
        stored=state.stored.get(name, {}),
        absolute=run.system == "A" or state.absolute,
        return_to_initial=state.return_to_initial,
        nose_radius=0.0 if tool is None else tool.nose_radius,
        tool_width=None if tool is None else tool.width,
    )


def _moved(point: Point, shift: Point, sign: int) -> Point:
    return Point(point.z + sign * shift.z, point.r + sign * shift.r)


def _shifted(stroke: Stroke, shift: Point, sign: int) -> Stroke:
    """A stroke between program coordinates, which cycles read, and part coordinates."""
    if shift == Point(0.0, 0.0):
        return stroke
    centre = None if stroke.centre is None else _moved(stroke.centre, shift, sign)
    return replace(stroke, end=_moved(stroke.end, shift, sign), centre=centre)


def _write(run: Run, name: str, expansion: Expansion, profile: Profile | None) -> None:
    cuts = [stroke.kind for stroke in expansion.strokes if stroke.kind is not Kind.RAPID]
    if cuts and name != "finishing":
        check_cut(run, thread=Kind.THREAD in cuts)
    run.cycle = name
    side = run.state.compensation
    try:
        for number, stroke in enumerate(expansion.strokes, start=1):
            if profile is not None and name == "finishing":
                run.cycle_side = "off" if number == len(expansion.strokes) else profile.side
            _one_stroke(run, stroke)
    finally:
        run.cycle, run.cycle_side = None, None
        run.state.compensation = side


def _one_stroke(run: Run, stroke: Stroke) -> None:
    start = run.state.position
    assert start is not None
    begin_stroke(run)
    own = dressed(run, replace(_shifted(stroke, run.state.shift, 1), line=run.words.line, block=run.words.label))
    if stroke.reversed_spindle and own.spindle is not None:
        own = replace(own, spindle=replace(own.spindle, direction=-own.spindle.direction))
    write(run, *(run.compensated.tip or start), own)
    run.compensated.tip = None
    run.state.z, run.state.r = own.end


def _check_start(run: Run, words: BlockWords, name: str) -> None:
    """A finishing cycle that begins elsewhere than its roughing goes home across the part."""
    profile, here = (words.integer("P"), words.integer("Q")), run.state.position
    if name != "finishing":
        run.rough_starts[profile] = here
        return
    start = run.rough_starts.get(profile)
    if start is not None and here is not None and start != here:
        run.remark(
            "cycle-start",
            f"the finishing cycle starts at X{2 * here.r:g} Z{here.z:g}, its roughing at X{2 * start.r:g} "
            f"Z{start.z:g}: the way back may cross the part",
            "P",
            "Q",
        )


def _leave_profile_out(run: Run, words: BlockWords, name: str) -> None:
    """A roughing cycle that fails leaves its profile behind: at full depth it is no move of the program."""
    if name == "finishing":
        return
    frame = run.flow.frame
    numbers = (words.integer("P"), words.integer("Q"))
    places = [place for number in numbers if number is not None for place in frame.program.places.get(number, ())]
    frame.index = max([frame.index, *(place + 1 for place in places)])


def _go_on_behind(run: Run, name: str, profile: Profile) -> None:
    """Behind a roughing cycle the program goes on behind its profile."""
    frame = run.flow.frame
    if name == "finishing":
        return
    if profile.first != frame.index:
        between = frame.program.blocks[frame.index : profile.first] if profile.first > frame.index else ()
        if any(block.words or block.statement for block in between):
            text = "blocks stand between the cycle and its profile: most controls leave them out"
            run.remark("cycle-profile-far", text, "P")
    if profile.last + 1 > frame.index:
        frame.index = profile.last + 1
