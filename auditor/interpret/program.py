"""A whole program carried out on paper: Blocks in, Moves out."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace

from auditor.declared.model import Control, Job
from auditor.interpret.control_values import known_control_values
from auditor.interpret.detection import Mark, against, detect, marks_of
from auditor.interpret.endless import LoopWatch
from auditor.interpret.execute import carry_out
from auditor.interpret.flow import EndlessError, Flow
from auditor.interpret.library import Library
from auditor.interpret.log import Log
from auditor.interpret.moves import Interpretation, Kind, Remark
from auditor.interpret.run import Run
from auditor.interpret.state import State
from auditor.interpret.travel import check_limited, settle
from auditor.interpret.words import BlockWords
from auditor.parse.blocks import Block, Number, ProgramText

_NOTE_TOPICS = {
    "encoding": "encoding",
    "control-bytes": "encoding",
    "after-end": "text-after-end",
    "comment": "comment-unclosed",
    "paren": "paren",
    "blank-in-number": "blank-in-number",
    "semicolon": "semicolon",
}


def interpret(text: ProgramText, job: Job) -> Interpretation:
    """Carry out a program as the declared control would, with what was noticed on the way.

    Nothing in the program raises: what cannot be followed is listed in ``not_audited``.
    """
    log = Log()
    for note in text.notes:
        log.add_remark(Remark(_NOTE_TOPICS[note.topic], note.line, None, note.message))
    run = _run_for(text, job, log)
    _work_through(run)
    _close(run)
    _leave_out_unknown_tools(run, text)
    return Interpretation(
        moves=tuple(log.moves),
        remarks=tuple(log.remarks),
        not_audited=tuple(log.not_audited.values()),
        motion_lines=frozenset(log.motion_lines),
        system=run.system,
        units=run.units or ("in" if run.state.inch else "mm"),
        assumptions=tuple(log.assumptions.values()),
        dwell_time=log.dwell_time,
        ended=run.ended,
        tools_called=tuple(log.tools_called.items()),
    )


def _run_for(text: ProgramText, job: Job, log: Log) -> Run:
    start = job.machine.tool_change
    state = State(inch=job.control.units == "in")
    if start is not None:
        state.z, state.r = start
    job = replace(job, control=_with_system(text, job.control, log))
    flow = Flow(Library(text, job.control), job.control)
    run = Run(job, job.control.system, state, log, BlockWords(1, None, "", ()), flow)
    _take_only_tool(run, text)
    run.variables.control_values = known_control_values(run)
    return run


def _take_only_tool(run: Run, text: ProgramText) -> None:
    """A program that calls no tool at all runs with the only one declared."""
    if len(run.job.tools) != 1 or any(word.letter == "T" for block in text.blocks for word in block.words):
        return
    number = next(iter(run.job.tools))
    run.state.tool.number = number
    run.log.assume("tools", f"tool {number}", "the program calls no tool; the only declared one is taken")


def _with_system(text: ProgramText, control: Control, log: Log) -> Control:
    """The control with the code system that the program is read in."""
    marks = marks_of(text.blocks)
    if control.system_declared:
        foreign = [mark for mark in against(marks, control.system)]
        if foreign:
            message = f"{_listed(foreign)}: marks of another code system than the declared {control.system}"
            log.add_remark(Remark("code-systems-mixed", foreign[0].line, None, message, ("G",)))
        return control
    found = detect(marks, control.system)
    log.assume("control.system", found.system, found.why)
    if found.conflict:
        message = f"read as system {found.system}, but {_listed(found.conflict)} belong to another code system"
        remedy = "declare control.system"
        log.add_remark(Remark("code-system-conflict", found.conflict[0].line, None, message, ("G",), remedy=remedy))
    return replace(control, system=found.system)


def _listed(marks: Sequence[Mark]) -> str:
    texts = dict.fromkeys(f"{mark.text} (line {mark.line})" for mark in marks)
    return ", ".join(list(texts)[:4])


def _work_through(run: Run) -> None:
    main = run.flow.library.main()
    if main is None:
        return
    run.flow.begin(main)
    watch = LoopWatch()
    try:
        while run.ended is None:
            block = run.flow.next_block()
            if block is None:
                if not _end_of_text(run):
                    break
            elif not _skipped(run, block):
                carry_out(run, block)
            if run.flow.went_back:
                run.flow.went_back = False
                watch.came_back(run)
    except EndlessError:
        reason = "the program does not come to an end here: what lies behind was not reached"
        run.remark("endless", reason)
        run.log.add_not_audited(run.words.line, run.words.text, reason)
        settle(run)
        del run.log.moves[watch.moves_to_keep() :]


def _end_of_text(run: Run) -> bool:
    """A program that ends without M30, M2 or M99; True when its caller goes on."""
    settle(run)
    run.remark("end-missing", f"{run.flow.frame.program.title} ends without M30, M2 or M99")
    if len(run.flow.frames) == 1:
        return False
    if run.flow.frame.macro:
        run.variables.leave()
    run.flow.back(drop_repeats=True)
    return True


def _skipped(run: Run, block: Block) -> bool:
    """Whether block skip leaves the block out."""
    if block.skip is None:
        return False
    out = run.control.block_skip
    if _changes_the_path(block) and run.log.first_time("block-skip"):
        text = f"blocks that begin with / are {'left out' if out else 'carried out'}: the path differs with the switch"
        run.log.add_remark(Remark("block-skip", block.line, block.label, text))
    return out


def _changes_the_path(block: Block) -> bool:
    """Whether the way through the program or of the tool depends on the block."""
    if block.statement is not None or block.fault is not None:
        return True
    plain = [(word.letter, word.value.value) for word in block.words if isinstance(word.value, Number)]
    if ("G", 4) in plain:
        return False
    jumps = any(letter == "M" and code in (2, 30, 98, 99) for letter, code in plain)
    return jumps or any(word.letter in "XZUWT" for word in block.words)


def _close(run: Run) -> None:
    """What is only known at the end."""
    settle(run)
    check_limited(run)
    _check_arc_sense(run)
    _check_coolant(run)
    _note_uncalled(run)


def _leave_out_unknown_tools(run: Run, text: ProgramText) -> None:
    """Cuts of a tool that is not declared are not audited; the stock they would have taken stands."""
    moves, tools = run.log.moves, run.job.tools
    texts = {block.line: block.text for block in text.blocks}
    in_doubt = False
    for place, move in enumerate(moves):
        if in_doubt:
            moves[place] = replace(move, new_stock_state=True)
        if move.kind is not Kind.RAPID and move.tool not in tools:
            unknown = "which tool stands at work is not known"
            reason = unknown if move.tool is None else f"tool {move.tool} is not declared"
            run.log.add_not_audited(move.line, texts.get(move.line, ""), reason)
            in_doubt = True


def _check_arc_sense(run: Run) -> None:
    """Arcs by centre that mostly turn the long way round: the control may swap G2 and G3."""
    sweeps = run.log.arc_sweeps
    long_ones = sum(sweep > 180.0 + 1e-6 for sweep in sweeps)
    if len(sweeps) >= 2 and 2 * long_ones > len(sweeps):
        run.remark(
            "arc-sense-suspect",
            f"{long_ones} of {len(sweeps)} arcs turn through more than half a circle",
            remedy='some controls swap G2 and G3: control.arcs = "mirrored"',
        )


def _check_coolant(run: Run) -> None:
    """Tools that cut dry in a program whose other tools have coolant."""
    log = run.log
    if not log.wet_tools or log.has_been("unknown coolant"):
        return
    for tool, line in log.dry_tools.items():
        if tool not in log.wet_tools:
            run.remark("coolant", f"tool {tool} cuts without coolant, other tools of the program have it", line=line)


def _note_uncalled(run: Run) -> None:
    """Programs in the file that nothing called."""
    uncalled = [program for program in run.flow.library.programs if program not in run.flow.started]
    for program in uncalled:
        if any(block.words for block in program.blocks):
            first = program.blocks[0]
            message = f"{program.title} in this file was not called and is not audited"
            run.log.add_remark(Remark("program-not-called", first.line, first.label, message))
