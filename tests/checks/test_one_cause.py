"""One cause, one finding: what a setter would put right with one word is said once, where that word stands."""

from __future__ import annotations

import math
from dataclasses import replace

import pytest

from auditor.audit import audit
from auditor.findings import Level
from tests.checks.cases import FOLDER, audited, job_of, of_check


def test_a_limit_too_high_is_told_once_and_where_it_stands() -> None:
    run = audited(FOLDER / "spindle-speed" / "limit-over-chuck.nc")
    (finding,) = of_check(run, "spindle-speed")
    assert finding.line == 5
    assert of_check(run, "speed-unclamped") == []


def test_speed_without_a_limit_names_the_speed_asked_for() -> None:
    """1000 v / (pi d), at 0.5 mm of radius where the way leads over the axis."""
    run = audited(FOLDER / "speed-unclamped" / "face-to-centre.nc")
    (finding,) = of_check(run, "speed-unclamped")
    surface = next(move.spindle.value for move in run.run.path.moves if move.spindle.mode == "surface")
    assert surface is not None
    assert finding.value == pytest.approx(1000.0 * surface / math.pi)


def test_a_collet_needs_neither_jaws_nor_a_diameter() -> None:
    run = audited(FOLDER / "chuck-grip" / "strong-collet.nc")
    assert [item for item in run.not_judged if item.check == "chuck-grip"] == []
    known = job_of(FOLDER / "chuck-grip" / "strong-collet.nc")
    heavy = audit(replace(known, workholding=replace(known.workholding, jaw_mass=5.0, jaw_radius=70.0)))
    assert of_check(heavy, "chuck-grip") == []


def test_a_bend_under_the_tolerance_is_left_to_the_edge_that_makes_it() -> None:
    run = audited(FOLDER / "rake-too-blunt" / "blunt-on-slender.nc")
    blunt = {finding.line for finding in of_check(run, "rake-too-blunt")}
    assert blunt
    bent = [item for item in of_check(run, "part-deflection") if item.line in blunt and item.level is not Level.STOP]
    assert bent == []
