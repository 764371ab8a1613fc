"""Offset missing or foreign: does the tool cut with its own offset?

What
    Looks at every cut for a tool offset: none called, cancelled (00), or one of another number than the tool's.

Why
    Without its offset the tool stands off by its whole length and overhang, often by a hundred millimetres. With
    a foreign offset the part comes out wrong, or the tool meets the chuck.

Formula and source
    Comparison of the T word's digits (common practice: tool number and offset number are the same). Stop: a cut
    with no offset or with offset 00. Review: the offset's number is not the tool's; sometimes a second offset for
    one tool is meant.

Remedy
    The T word with the tool's own offset (T0101) before the cut; accept a second offset with its reason.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from auditor.checks._judging import cutting_moves
from auditor.checks._remarks import findings_of
from auditor.checks._words import tool_name
from auditor.findings import Finding, Level, NotJudged, Run

CHECK = "offset-missing"
LIMITS = ()
LEVELS = {"offset-cancelled": Level.STOP, "offset-missing": Level.STOP, "offset-foreign": Level.REVIEW}


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts without the tool's offset."""
    told: set[int | None] = set()
    for finding in findings_of(run, CHECK, LEVELS):
        told.add(finding.tool)
        yield finding
    for index in np.flatnonzero(cutting_moves(run)):
        move = run.path.moves[int(index)]
        if move.offset == 0 and move.tool not in told:
            told.add(move.tool)
            message = f"{tool_name(run, move.tool)} cuts with its offset cancelled: the tool is not where " \
                      "the program believes it."
            yield run.finding(CHECK, Level.STOP, move, message, words=("T",), remedy="Call the tool with its offset.")
