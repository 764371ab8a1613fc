"""Not understood: what could not be read, and was therefore not audited?

What
    Lists codes, words and constructs that are not modelled, text that cannot be read, values that come from
    outside the program, and motion blocks that could not be followed.

Why
    A block that is not understood may move the tool anywhere. Nothing behind it is certain until both positions
    are given afresh. Silence here would be taken for approval.

Formula and source
    Comparison with the code table in force (systems A, B, C). A motion block that is not audited keeps the whole
    program from being called clear. Review: an unknown G code, unreadable text, a position or value that is not
    known. Note: an unknown M code (often a door, a chuck, a conveyor), text after the end, odd bytes.

Remedy
    Spell the block with codes of the declared system, declare the reference points, or check the block by hand
    and accept the finding with a reason.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._remarks import findings_of
from auditor.findings import Finding, Level, NotJudged, Run
from auditor.interpret.moves import Kind

CHECK = "not-understood"
LIMITS = ()
LEVELS = {
    "syntax": Level.REVIEW,
    "earlier-part": Level.REVIEW,
    "arithmetic": Level.REVIEW,
    "unknown-g": Level.REVIEW,
    "unknown-m": Level.NOTE,
    "unsupported": Level.REVIEW,
    "unknown-variable": Level.REVIEW,
    "position-unknown": Level.REVIEW,
    "axis-not-modelled": Level.REVIEW,
    "text-after-end": Level.NOTE,
    "encoding": Level.NOTE,
    "comment-unclosed": Level.REVIEW,
    "alarm": Level.STOP,
    "code-system-conflict": Level.REVIEW,
}


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Everything that was not understood, and every motion block not audited."""
    told: set[int] = set()
    for finding in findings_of(run, CHECK, LEVELS):
        told.add(finding.line)
        yield finding
    told |= _cut_by_unknown_tools(run)
    blocks = {block.line: block.label for block in run.text.blocks}
    for missed in run.path.not_audited:
        if missed.line not in told:
            message = f"This block moves the tool and was not audited: {missed.reason}."
            yield Finding(CHECK, Level.REVIEW, missed.line, blocks.get(missed.line), None, message)


def _cut_by_unknown_tools(run: Run) -> set[int]:
    """Lines left out for want of a declared tool: tool-undeclared speaks of the tool, once."""
    return {
        move.line
        for move in run.path.moves
        if move.kind is not Kind.RAPID and move.tool not in run.job.tools and not move.provisional
    }
