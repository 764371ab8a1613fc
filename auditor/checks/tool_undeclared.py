"""Tool not declared: what is in this turret station?

What
    Lists every T word that calls a station for which the job declares no tool, and T words that can be read in
    two ways.

Why
    Nothing can be said about the cuts of a tool that is not known; they are left out, and the stock they would
    have taken stands in the way of what follows.

Formula and source
    Comparison of the T words with the job file. Stop: no declaration. Review: the digits can mean two things
    (common practice: two digits of tool and two of offset).

Remedy
    A table [tools.N] in the job file, or the right number in the T word.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._remarks import findings_of
from auditor.findings import Finding, Level, NotJudged, Run

CHECK = "tool-undeclared"
LIMITS = ()
LEVELS = {"tool-undeclared": Level.STOP, "tool-ambiguous": Level.REVIEW}


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """T words without a declared tool."""
    yield from findings_of(run, CHECK, LEVELS)
    told = {finding.tool for finding in findings_of(run, CHECK, LEVELS)}
    blocks = {block.line: block.label for block in run.text.blocks}
    for number, line in run.path.tools_called:
        if number not in run.job.tools and number not in told:
            message = f"T{number} is called, but no tool {number} is declared; its cuts are not audited."
            yield Finding(CHECK, Level.STOP, line, blocks.get(line), number, message, words=("T",),
                          remedy=f"A table [tools.{number}] in the job file (turnaudit draft writes one to fill in).")
