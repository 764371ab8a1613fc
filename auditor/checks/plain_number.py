"""Numbers without a decimal point: is X50 fifty millimetres or fifty thousandths?

What
    Marks length words without a decimal point where two ways of reading differ by a factor of 1000, numbers with
    more decimals than the control keeps, and blanks inside numbers.

Why
    Controls read a whole number as millimetres or as least increments, by a parameter. The same text then moves
    50 mm or 0.05 mm. A program proven on one machine crashes on the next.

Formula and source
    The text against control.whole_numbers. Stop where the reading in least increments is declared and a word comes
    out under 0.1 mm. Review where that setting is not declared. Note where it is, and for decimals and blanks. Common
    practice. The first block is named, with the number of others like it.

Remedy
    Write the point in every length word; it is read alike everywhere.
"""

from __future__ import annotations

from collections.abc import Iterator

from auditor.checks._remarks import finding_of, remarks_of
from auditor.findings import Finding, Level, NotJudged, Run
from auditor.interpret.moves import Remark

CHECK = "plain-number"
LIMITS = ()
HAIR = 0.1  # mm


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """The first block of each kind, with how many there are."""
    remarks = list(remarks_of(run, CHECK))
    for topic in dict.fromkeys(remark.topic for remark in remarks):
        alike = [remark for remark in remarks if remark.topic == topic]
        lines = {remark.line for remark in alike}
        more = f" {len(lines) - 1} more blocks are written like this." if len(lines) > 1 else ""
        hair = next((remark for remark in alike if _hair(run, remark)), None)
        if hair is not None:
            yield finding_of(CHECK, Level.STOP, hair, f"{hair.message}; a hair instead of a length.{more}")
        else:
            yield finding_of(CHECK, _level(run, topic), alike[0], f"{alike[0].message}.{more}")


def _hair(run: Run, remark: Remark) -> bool:
    """Whether the declared reading makes a hair of what was surely meant as millimetres."""
    plain = remark.topic == "plain-number" and run.job.control.whole_numbers == "increments"
    return plain and remark.value is not None and abs(remark.value) < HAIR


def _level(run: Run, topic: str) -> Level:
    if topic != "plain-number":
        return Level.NOTE
    assumed = any(item.about == "control.whole_numbers" for item in run.job.assumptions)
    return Level.REVIEW if assumed else Level.NOTE
