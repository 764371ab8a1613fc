"""Units or code systems mixed: millimetres or inches, and whose G codes?

What
    Says when neither the job nor the program names the unit, when the unit changes after motion, and when the
    program shows marks of two of the lathe code systems A, B and C.

Why
    An inch read as a millimetre is a factor of 25. A cycle number of one code system is another cycle in the
    next: the same text roughs, threads or parts.

Formula and source
    The text against the code tables; common practice: one unit, named once before the first motion. Review.

Remedy
    G20 or G21 (G70 or G71 in system C) at the head of the program, and control.units and control.system in the
    job file.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._remarks import findings_of
from auditor.findings import Finding, Level, NotJudged, Run

CHECK = "units-mixed"
LIMITS = ()
LEVELS = {"units-missing": Level.REVIEW, "units-switched": Level.REVIEW, "code-systems-mixed": Level.REVIEW}


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Doubts about the unit and the code system."""
    yield from findings_of(run, CHECK, LEVELS)
