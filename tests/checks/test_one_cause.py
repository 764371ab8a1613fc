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


def test_no_smaller_depth_is_asked_for_where_a_shoulder_lengthens_the_cut() -> None:
    run = audited(FOLDER / "depth-over-edge" / "into-a-shoulder.nc")
    remedies = {finding.line: finding.remedy or "" for finding in of_check(run, "depth-over-edge")}
    assert "feed out along the wall" in remedies[16]
    assert not any("epth" in remedy for remedy in remedies.values())


def test_where_the_turret_stands_is_not_guessed_after_a_block_not_understood() -> None:
    run = audited(FOLDER / "tool-change-clearance" / "home-not-understood.nc")
    assert [item.check for item in run.not_judged if item.check == "tool-change-clearance"] == ["tool-change-clearance"]


def test_the_diameter_of_a_wrong_speed_is_where_that_speed_occurs() -> None:
    """v = pi d n, so d = 1000 v / (pi n): told beside the speed."""
    run = audited(FOLDER / "cutting-speed" / "too-fast.nc")
    (finding,) = of_check(run, "cutting-speed")
    assert finding.value == pytest.approx(math.pi * 60.0 * 2000.0 / 1000.0, rel=1e-3)
    assert "X60 and 2000 rpm" in finding.message


def test_a_drill_is_told_where_half_of_its_thrust_comes_from() -> None:
    run = audited(FOLDER / "axis-thrust" / "wide-drill.nc")
    (finding,) = of_check(run, "axis-thrust")
    assert "chisel edge" in finding.message
    assert "split point" in (finding.remedy or "")


@pytest.mark.parametrize(("name", "deep"), [("gouge", 0.3), ("deep-taper", 0.3 * math.cos(math.pi / 4.0))])
def test_a_gouge_is_as_deep_as_it_is_square_to_the_outline(name: str, deep: float) -> None:
    """53.4 for 54 mm is 0.3 on the radius; a 45 degree taper 0.3 mm too late lies cos 45 of it away."""
    (finding,) = of_check(audited(FOLDER / "finished-shape" / f"{name}.nc"), "finished-shape")
    assert finding.value == pytest.approx(deep, abs=2e-3)


@pytest.mark.parametrize(("check", "name"), [("rapid-in-stock", "inch-graze"), ("first-cut", "inch-forging")])
def test_inch_programs_are_answered_in_inches(check: str, name: str) -> None:
    run = audited(FOLDER / check / f"{name}.nc")
    told = [f"{finding.message} {finding.remedy}" for finding in of_check(run, check)]
    assert told
    for text in told:
        assert " in" in text
        assert " mm deep" not in text
        assert " 0 in" not in text
        assert "-0 in" not in text
