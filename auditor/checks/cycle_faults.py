"""Cycle faults: will the control carry the fixed cycle out, and as meant?

What
    Checks the words of fixed cycles: profile blocks P to Q, profiles that turn back, signs of allowances, depths,
    values taken from the control's memory, the starting point, pecks, relief and corner words.

Why
    A cycle makes many moves from one line. A wrong sign leaves the shoulder undersize or the bore oversize, a
    depth of nothing never ends, a profile that is not found stops the machine in the middle of the job.

Formula and source
    The cycle's rules in the declared code system (the trade's code tables, from memory). Stop: the profile is
    missing or cannot be cut, the allowance points into the part, the depth is nothing or too much, a corner word
    cannot be drawn. Review: what differs between controls or depends on their memory.

Remedy
    As named in the message: each says which word is at fault and what it must be.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._remarks import findings_of
from auditor.findings import Finding, Level, NotJudged, Run

CHECK = "cycle-faults"
LIMITS = ()
LEVELS = {
    "cycle-profile-missing": Level.STOP,
    "cycle-profile-bad": Level.STOP,
    "cycle-profile-far": Level.REVIEW,
    "cycle-not-monotonic": Level.STOP,
    "cycle-allowance-sign": Level.STOP,
    "cycle-stored-value": Level.REVIEW,
    "cycle-depth": Level.STOP,
    "cycle-start": Level.REVIEW,
    "cycle-corner": Level.STOP,
    "cycle-peck": Level.REVIEW,
    "cycle-relief": Level.REVIEW,
    "cycle-word-with-point": Level.REVIEW,
    "cycle-groove-step": Level.REVIEW,
    "cycle-shift-with-pocket": Level.REVIEW,
}


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cycles that cannot be carried out, or not everywhere alike."""
    yield from findings_of(run, CHECK, LEVELS)
