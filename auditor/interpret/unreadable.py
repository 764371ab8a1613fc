"""Blocks that cannot be read: what they may have done, and what is no longer known behind them."""

from __future__ import annotations

import re

from auditor.interpret.run import Run
from auditor.parse.blocks import Block

_COMMENT = re.compile(r"\([^)]*\)")
_MAY_MOVE = re.compile(r"[XZUWYVCHB]|M0*1?98|G0*6[56]", re.IGNORECASE)
_MAY_CHANGE = re.compile(r"[FSTGM]", re.IGNORECASE)


def skip_unreadable(run: Run, block: Block) -> None:
    """A block with a fault in its text: not audited, and what it may have changed is not known behind it."""
    fault = block.fault
    assert fault is not None
    hint = f" ({fault.hint})" if fault.hint else ""
    run.settle()
    topic = "comment-unclosed" if "comment" in fault.message and "(" in block.text else "syntax"
    run.remark(topic, f"{fault.message}{hint}")
    run.log.add_not_audited(run.words.line, block.text, f"the block cannot be read: {fault.message}")
    text = _COMMENT.sub("", block.text)
    if _MAY_MOVE.search(text):
        run.state.forget_position()
        run.stock_in_doubt = True
    if _MAY_CHANGE.search(text):
        run.state.forget_readings()
