"""Arc ends: do start, end, centre and radius of the arc agree?

What
    Checks every arc: whether its radius reaches both ends, whether centre and end point agree, whether it sweeps
    more than half a circle, and whether most arcs of the program look as if clockwise and counter-clockwise were
    swapped.

Why
    New controls alarm on an arc that does not close; old ones run a spiral or a flat tail into the part. A centre
    given as a diameter instead of a radius is the usual slip.

Formula and source
    Geometry. The distances centre-start and centre-end may differ by the control's tolerance (0.02 mm unless
    declared; controls have 0.002 to 0.02, common practice). Stop: the radius is too small for the chord, or the
    ends differ. Review: an arc over half a circle, or a suspect sense.

Remedy
    I is measured as a radius from the start point, K along Z from the start point; or give R.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._remarks import findings_of
from auditor.findings import Finding, Level, NotJudged, Run

CHECK = "arc-ends"
LIMITS = ()
LEVELS = {
    "arc-impossible": Level.STOP,
    "arc-ends-differ": Level.STOP,
    "arc-over-half": Level.REVIEW,
    "arc-sense-suspect": Level.REVIEW,
}


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Arcs that do not close, or hardly can be meant."""
    yield from findings_of(run, CHECK, LEVELS)
