"""Slender part: does the work stand out too far for its thickness?

What
    Compares how soft the work is at the cut with a plain bar in the chuck, and says as how many diameters of
    stick-out that counts. Steps, bores and the tailstock are in it.

Why
    Softness grows with the cube of the length. Beyond a few diameters work in the chuck alone bends, climbs on
    the tool and chatters, whatever the forces.

Formula and source
    Length over diameter of the plain bar with the same give: (3 pi E d y / 64 F)^(1/3). Common practice: in the
    chuck alone up to 3, 4 with light cuts; with a tailstock 8 to 10, which at mid-span is as soft as a bar of 3
    diameters in the chuck. Review: over slender_equivalent. Stop: over slender_most, where practice refuses the cut.

Remedy
    Hold the work shorter, or bring up the tailstock or a steady rest.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np

from auditor.checks._cuts import cuts
from auditor.checks._judging import origin, threshold
from auditor.checks._words import figure, finding_at
from auditor.findings import Finding, Level, Limit, NotJudged, Run

CHECK = "slender-part"
LIMITS = (
    Limit("slender_equivalent", 4.0, "", "common practice", "largest stick-out in diameters"),
    Limit("slender_most", 6.0, "", "common practice", "stick-out in diameters that no cut is made at"),
)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """The cut of each tool where the work is softest for its diameter."""
    loads = run.prediction.loads
    worst: dict[int, tuple[float, int]] = {}
    modulus = run.job.workpiece.material.modulus
    across = 2.0 * np.nan_to_num(loads.outermost)
    ratios = np.cbrt(3.0 * math.pi * modulus * across * np.nan_to_num(loads.compliance) / 64.0)
    ratios = np.where(loads.depth > 0.0, ratios, 0.0)
    for cut in cuts(run):
        row = cut.row_of_largest(ratios)
        ratio = float(ratios[row])
        if ratio > threshold(run, LIMITS[0]) and ratio > worst.get(cut.tool.number, (0.0, 0))[0]:
            worst[cut.tool.number] = (ratio, row)
    for ratio, row in worst.values():
        passed = LIMITS[1] if ratio > threshold(run, LIMITS[1]) else LIMITS[0]
        message = f"The work is as soft here as a bar standing out {figure(ratio)} diameters: it bends, climbs on " \
                  f"the tool and chatters. {origin(run, [passed])}"
        level = Level.STOP if passed is LIMITS[1] else Level.REVIEW
        yield finding_at(run, CHECK, level, row, message, value=ratio, limit=threshold(run, passed), unit="",
                         remedy="Hold it shorter, or use a tailstock or a steady rest.")
