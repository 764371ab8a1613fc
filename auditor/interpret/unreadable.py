"""Blocks that cannot be read: what they may have done, and what is no longer known behind them."""

from __future__ import annotations

import re

from auditor.interpret.run import Run
from auditor.interpret.systems import function_of, group_of
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
    run.settle()
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
