"""Program flow: does the text run from start to end as meant?

What
    Missing end, subprogram or jump target; loops that do not end; blocks that may be skipped; sequence numbers
    used twice; returns through an absolute point; words repeated in a block; travel limits; spindle, coolant and
    dwell habits; stops in an unattended run; positions and values that come from outside the text.

Why
    What the control does with such text depends on its parameters, its memory or a switch on the panel. The
    part-proven program then behaves differently one day.

Formula and source
    The text itself; common practice. A program with blocks to be skipped is judged with the switch in both positions,
    and what is wrong in the other one only is a review here. Stop: the control cannot go on (target missing, endless
    loop, beyond travel). Review: the outcome depends on something outside the program. Note: habits worth knowing.

Remedy
    As named in the message.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._remarks import findings_of
from auditor.findings import Finding, Level, NotJudged, Run

CHECK = "program-flow"
LIMITS = ()
STOPS = ("target-missing", "endless", "travel-limit")
REVIEWS = (
    "end-missing", "program-not-called", "subprogram-missing", "number-repeated",
    "return-through-point", "word-repeated", "code-group-repeated", "dwell", "preset", "data-input",
    "tool-in-motion",
)
NOTES = (
    "block-skip", "m-codes-many", "repeats-main", "spindle-left-on", "coolant", "work-zero-changed", "local-shift",
    "home-unknown", "paren", "semicolon", "safe-start",
)
LEVELS = {
    **dict.fromkeys(STOPS, Level.STOP),
    **dict.fromkeys(REVIEWS, Level.REVIEW),
    **dict.fromkeys(NOTES, Level.NOTE),
}


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Everything odd about the way the program runs."""
    stop_word = Level.REVIEW if run.job.unattended else Level.NOTE  # nobody is there to press the button
    yield from findings_of(run, CHECK, LEVELS | {"stop-unattended": stop_word})
