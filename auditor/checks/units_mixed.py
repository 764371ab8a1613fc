"""Units or code systems mixed: millimetres or inches, and whose G codes?

What
    Says when neither the job nor the program names the unit, when the unit changes after motion, and when the
    program shows marks of two of the lathe code systems A, B and C.

Why
    An inch read as a millimetre is a factor of 25. A cycle number of one code system is another cycle in the
    next: the same text roughs, threads or parts.

Formula and source
    The text against the code tables; common practice: one unit, named once before the first motion. Review. A note:
    G90 out of habit in the safety line of a system A program, where it is the box cycle and does nothing as long as
    no X, Z, U, W or F stands with it and the next block that moves names its own G code.

Remedy
    G20 or G21 (G70 or G71 in system C) at the head of the program, and control.units and control.system in the
    job file.
"""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import replace

from auditor.checks._remarks import finding_of, remarks_of
from auditor.findings import Finding, Level, NotJudged, Run
from auditor.interpret.detection import against, marks_of
from auditor.interpret.moves import Remark
from auditor.interpret.systems import canonical_code
from auditor.parse.blocks import Block, Number

CHECK = "units-mixed"
LIMITS = ()
LEVELS = {"units-missing": Level.REVIEW, "units-switched": Level.REVIEW, "code-systems-mixed": Level.REVIEW}
BOX_CYCLE = 90.0  # in system A
AXES = frozenset("XZUW")
OWN_WAY = frozenset({0.0, 1.0, 2.0, 3.0, 4.0, 10.0, 28.0, 30.0, 32.0, 50.0, 53.0, 92.0, 94.0})  # end or bypass G90


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Doubts about the unit and the code system."""
    for remark in remarks_of(run, CHECK):
        if remark.topic == "code-systems-mixed":
            yield _mixed(run, remark)
        else:
            yield finding_of(CHECK, LEVELS[remark.topic], remark)


def _mixed(run: Run, remark: Remark) -> Finding:
    """Marks of another code system: a note where all of them are G90 standing idle."""
    foreign = against(marks_of(run.text.blocks), run.path.system)
    at_line = [mark.text.partition(" ")[0] for mark in foreign if mark.line == remark.line]
    remark = replace(remark, words=tuple(at_line) or remark.words)
    if run.path.system != "A" or not all(_idle(run.text.blocks, mark.line) for mark in foreign):
        remedy = "declare control.system as the program is written, or correct the block"
        return finding_of(CHECK, Level.REVIEW, replace(remark, remedy=remark.remedy or remedy))
    return finding_of(CHECK, Level.NOTE, replace(remark, remedy="leave it out"),
                      "G90 does nothing here: in system A it is the box cycle, not absolute words; the next X or Z "
                      "without a G code of its own would start that cycle")


def _idle(blocks: Sequence[Block], line: int) -> bool:
    """Whether a system A block says G90 without a word to act on, and no later block falls into the box cycle."""
    behind = [block for block in blocks if block.line >= line and block.words]
    if BOX_CYCLE not in _codes(behind[0]) or _letters(behind[0]) & (AXES | {"F"}):
        return False
    for block in behind[1:]:
        if _codes(block) & OWN_WAY:
            return True
        if _letters(block) & AXES:
            return False
    return True


def _letters(block: Block) -> frozenset[str]:
    return frozenset(word.letter for word in block.words)


def _codes(block: Block) -> frozenset[float]:
    """The G codes of a block."""
    return frozenset(canonical_code(word.value.value) for word in block.words
                     if word.letter == "G" and isinstance(word.value, Number))
