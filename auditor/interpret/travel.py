"""From strokes to moves: the way of the tool, with what has to wait for the blocks behind it."""

from __future__ import annotations

from dataclasses import replace

from auditor.declared.model import Point
from auditor.interpret import corners
from auditor.interpret.compensated_run import joined
from auditor.interpret.cycles.call import CycleFault, Stroke
from auditor.interpret.moves import Kind, Move, Spindle
from auditor.interpret.run import NotUnderstood, Run


def travel(run: Run, stroke: Stroke) -> None:
    """Carry out one stroke from the programmed point; its end is the programmed point afterwards."""
    start, held = run.state.position, run.compensated
    if start is None:
        raise NotUnderstood(unknown_start(run), "position-unknown")
    begin_stroke(run)
    stroke = dressed(run, stroke)
    if run.state.compensation != "off" and stroke.kind is not Kind.THREAD:
        held.hold(start, stroke, run.state.compensation)
    elif held.open and held.cancelling:
        held.hold(start, stroke, held.side or "left")
        _release_compensated(run)
    else:
        write(run, *(held.tip or start), stroke)
        held.tip = None
    run.state.z, run.state.r = stroke.end


def begin_stroke(run: Run) -> None:
    """A motion begins: what has to be settled before the first, and counted for each."""
    run.strokes += 1
    run.units = run.units or ("in" if run.state.inch else "mm")
    if run.collected is None:
        run.log.motion_lines.add(run.words.line)
        check_limited(run)
    if not run.units_said and run.control.units is None and run.log.first_time("units-missing"):
        run.remark("units-missing", "neither the program nor the job says mm or inch: read as mm")
        run.log.assume("control.units", "mm", "not declared, and no unit code before the first motion")


def check_limited(run: Run) -> None:
    """Constant surface speed in motion that nothing limits, once for each G96."""
    spindle = run.state.spindle
    if spindle.unclamped_line is None:
        return
    run.remark(
        "clamp-missing",
        "constant surface speed with no speed limit before it: towards the centre the spindle goes to its maximum",
        "G",
        line=spindle.unclamped_line,
        limit=run.job.machine.speed_limit,
        unit="rpm",
        remedy="give a speed limit with S before G96",
    )
    spindle.unclamped_line = None


def rapid_partly_known(run: Run, end_z: float | None, end_r: float | None) -> None:
    """A rapid whose start or end is not wholly known: written axis by axis."""
    settle(run)
    begin_stroke(run)
    stroke = dressed(run, Stroke(Kind.RAPID, Point(end_z or 0.0, end_r or 0.0)))
    if end_r is None:
        stroke = replace(stroke, spindle=run.state.spindle.command())
    here = (run.state.z, run.state.r) if run.state.position is None else run.compensated.tip or run.state.position
    write(run, *here, stroke, (end_z, end_r))
    run.compensated.tip = None
    run.state.z, run.state.r = end_z, end_r


def unknown_start(run: Run) -> str:
    """Why a cut cannot be followed when its start is not known."""
    missing = " and ".join(name for name, value in (("X", run.state.r), ("Z", run.state.z)) if value is None)
    return f"the position in {missing} is not known here; a rapid with X and Z would restate it"


def dressed(run: Run, stroke: Stroke) -> Stroke:
    """The stroke with line, block, feed and spindle of the block that made it."""
    feed, spindle = stroke.feed, stroke.spindle or run.state.spindle.command()
    if stroke.kind is Kind.RAPID:
        if spindle.mode == "surface" and run.rapid_speed_at_end:
            spindle = replace(spindle, fixed_diameter=2.0 * abs(stroke.end.r))
    elif feed is None and run.state.feed.certain:
        feed = run.state.feed.command()
    return Stroke(  # not by replace: this runs for every move of a program
        stroke.kind,
        stroke.end,
        stroke.centre,
        stroke.clockwise,
        feed,
        stroke.lead,
        stroke.cycle_pass,
        stroke.thread_depth,
        stroke.dwell_after,
        spindle,
        stroke.line or run.words.line,
        stroke.block or run.words.label,
        stroke.reversed_spindle,
    )


def write(
    run: Run,
    start_z: float | None,
    start_r: float | None,
    stroke: Stroke,
    end: tuple[float | None, float | None] | None = None,
) -> None:
    """Put a dressed stroke on record as a move; ``end`` replaces an end that is not wholly known."""
    if run.collected is not None:
        if end is not None:
            raise NotUnderstood("a profile block leads to a point that is not known", "position-unknown")
        run.collected.append(stroke)
        return
    tool = run.state.tool
    end_z, end_r = stroke.end if end is None else end
    run.log.dwell_time += stroke.dwell_after
    run.moved = True
    move = Move(
        index=len(run.log.moves),
        line=stroke.line or run.words.line,
        block=stroke.block,
        tool=tool.number if tool.certain else None,
        kind=_kind_at_tool(run, stroke.kind),
        start_z=start_z,
        start_r=start_r,
        end_z=end_z,
        end_r=end_r,
        feed=stroke.feed,
        spindle=stroke.spindle or Spindle(),
        centre=stroke.centre,
        clockwise=stroke.clockwise,
        lead=stroke.lead,
        cycle=run.cycle,
        cycle_pass=stroke.cycle_pass,
        offset=tool.offset,
        compensation=run.cycle_side or run.compensated.side or run.state.compensation,
        thread_depth=stroke.thread_depth,
        dogleg=run.doglegs,
        dwell_after=stroke.dwell_after,
        provisional=_in_doubt(run, stroke.kind),
        new_stock_state=run.stock_in_doubt,
    )
    run.log.add_move(move)


def _kind_at_tool(run: Run, kind: Kind) -> Kind:
    """Every feed move of a drilling tool is drilling."""
    drills = run.tool is not None and run.tool.kind == "drilling"
    return Kind.DRILL if drills and kind is Kind.FEED else kind


def _in_doubt(run: Run, kind: Kind) -> bool:
    """Whether a move rests on something that was not understood."""
    state = run.state
    cut_in_doubt = kind is not Kind.RAPID and not (state.spindle.certain and state.feed.certain)
    return cut_in_doubt or run.flow_in_doubt or state.foreign_zero or not state.tool.certain


def settle(run: Run) -> None:
    """Carry out what still waits for a following move: corners, a compensated run.

    Raises
    ------
    CycleFault
        Inside a profile, where what cannot be carried out is a fault of the cycle.
    """
    close_chain(run)
    if run.compensated.open:
        run.compensated.cancelling = False  # the move that would have cancelled did not come
        _release_compensated(run)


def _release_compensated(run: Run) -> None:
    """Write the tip path of the compensated run."""
    held = run.compensated
    start, side = held.start, held.side
    assert start is not None
    path = held.release(run.control, run.tool)
    tip, held.side = held.tip, side
    run.note(*path.remarks)
    run.lean_on("compensation_start", "nose-radius compensation")
    for point, stroke in joined(start, path.strokes):
        write(run, *point, stroke)
    held.side, held.tip = None, tip


def close_chain(run: Run) -> None:
    """Draw the straight blocks that waited for their following move; raises as ``settle`` does."""
    chain, run.chain = run.chain, None
    if chain is None:
        return
    try:
        strokes = corners.draw(chain.start, chain.legs)
    except CycleFault as fault:
        if run.collected is not None:
            raise
        run.note(fault)
        for words in chain.words:
            run.log.add_not_audited(words.line, words.text, fault.message)
        run.stock_in_doubt = True
        return
    if run.collected is None:
        run.log.motion_lines.update(words.line for words in chain.words)
    run.state.z, run.state.r = chain.start
    for stroke in strokes:
        travel(run, stroke)
