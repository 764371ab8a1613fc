"""Blocks that are not carried out: why, and what is no longer known behind them."""

from __future__ import annotations

import re

from auditor.interpret.motion import has_axis_words, millimetres, x_factor
from auditor.interpret.reading import UnknownValues, read_block
from auditor.interpret.run import NotUnderstood, Run
from auditor.interpret.systems import function_of, group_of
from auditor.interpret.travel import close_chain, settle
from auditor.interpret.words import BlockWords
from auditor.parse.blocks import Block

_COMMENT = re.compile(r"\([^)]*\)?")
_MAY_MOVE = re.compile(r"[XZUWYVCHB]|M0*1?98|G0*6[56]")
_READINGS = {letter: re.compile(letter + r"\s*[-+.0-9#\[]") for letter in "FST"}
_CODE = re.compile(r"G(?=(?P<code>[0-9]{1,3}(?:\.[0-9])?)?)")


def skip_unreadable(run: Run, block: Block) -> None:
    """A block with a fault in its text: not audited, and what it may have changed is not known behind it."""
    fault = block.fault
    assert fault is not None
    hint = f" ({fault.hint})" if fault.hint else ""
    settle(run)
    unclosed = "never closed" in fault.message and "comment" in fault.message
    run.remark("comment-unclosed" if unclosed else "syntax", f"{fault.message}{hint}")
    run.log.add_not_audited(run.words.line, block.text, f"the block cannot be read: {fault.message}")
    text = _COMMENT.sub("", block.text).upper()
    state = run.state
    state.motion = _motion_behind(run, text)
    if _MAY_MOVE.search(text):
        state.forget_position()
        run.stock_in_doubt = run.stock_in_doubt or state.motion != "rapid"
    # a comment that was never closed may hold words for the control: there the whole line counts
    readable = block.text.upper() if unclosed else text
    for letter, held in (("F", state.feed), ("S", state.spindle), ("T", state.tool)):
        if _READINGS[letter].search(readable):
            held.certain = False


def _motion_behind(run: Run, text: str) -> str | None:
    """The motion code in force behind the block, when all its G codes can still be made out."""
    motion = run.state.motion
    for found in _CODE.finditer(text):
        function = None if found["code"] is None else function_of(run.system, float(found["code"]))
        if function is None:
            return None
        if group_of(function) == "motion":
            motion = function
        elif group_of(function) == "drilling":
            return None
    return motion


def not_understood(run: Run, problem: NotUnderstood) -> None:
    """A block with motion that is not followed; what it states in absolute words is known behind it."""
    close_chain(run)
    if problem.topic is not None:
        run.remark(problem.topic, f"the block is not audited: {problem.reason}", *problem.words)
    run.not_audited(problem.reason)
    if problem.topic != "position-unknown":
        _restate(run)


def _restate(run: Run) -> None:
    state, words = run.state, run.words
    plain = state.motion in ("rapid", "feed") and not words.unknown_codes
    absolute = plain and (run.system == "A" or state.absolute)
    x, z = millimetres(run, words, "X"), millimetres(run, words, "Z")
    if words.has("X", "U") or not plain:
        state.r = x * x_factor(run) + state.shift.r if absolute and x is not None else None
    if words.has("Z", "W") or not plain:
        state.z = z + state.shift.z if absolute and z is not None else None


def known_words(run: Run, block: Block) -> BlockWords | None:
    """The words of a block; None when it cannot be carried out for want of values that only the control knows."""
    try:
        return read_block(run, block)
    except UnknownValues as missing:
        return _without_unknown(run, missing)


def _without_unknown(run: Run, missing: UnknownValues) -> BlockWords | None:
    words, letters = missing.words, set(missing.letters)
    run.words = words
    run.remark("unknown-variable", f"the block needs {missing.named}, which only the control knows", *missing.letters)
    for letter, held in (("F", run.state.feed), ("S", run.state.spindle), ("T", run.state.tool)):
        if letter in letters:
            held.certain = False
    if letters <= {"F", "S", "T"}:
        return words
    settle(run)
    if "G" in letters or words.functions:
        run.state.motion = run.state.drilling = None
    if has_axis_words(words) or letters - {"F", "S", "T", "M", "L", "Q", "D", "E"}:
        run.not_audited(str(missing))
        run.stock_in_doubt = True
        run.state.forget_position()
    return None


def without_value(run: Run, block: Block, reason: str) -> None:
    """An expression that has no value: a control stops there."""
    run.remark("arithmetic", reason)
    if block.statement is None:
        settle(run)
        run.not_audited(reason)
        run.state.forget_position()
    else:
        run.flow_in_doubt = True
