"""What is not declared is said, not guessed; a worn edge widens the band; small forces raise nothing."""

from __future__ import annotations

from dataclasses import replace
from pathlib import Path

import pytest

from auditor.audit import audit
from auditor.declared.model import Job
from auditor.findings import Audit, Level
from tests.checks.cases import FOLDER, job_of, of_check


def job(check: str, name: str) -> Job:
    return job_of(FOLDER / check / f"{name}.nc")


def reasons(audit_: Audit, check: str) -> list[str]:
    return [item.why for item in audit_.not_judged if item.check == check]


@pytest.mark.parametrize(("check", "missing", "word"), [
    ("chuck-grip", {"grip_force": None}, "grip_force"),
    ("chuck-grip", {"grip_diameter": None}, "grip_diameter"),
    ("chuck-grip", {"jaw_mass": None}, "jaw_mass"),
    ("spindle-speed", {"speed_limit": None}, "speed_limit"),
    ("bar-whip", {"tail": None}, "tail"),
])  # fmt: skip
def test_workholding_not_declared(check: str, missing: dict[str, None], word: str) -> None:
    known = job("chuck-grip", "near-miss")
    run = audit(replace(known, workholding=replace(known.workholding, **missing)))
    assert any(word in why for why in reasons(run, check))


@pytest.mark.parametrize("axis", ["x", "z"])
def test_thrust_not_declared(axis: str) -> None:
    known = job("axis-thrust", "weak-slide")
    run = audit(replace(known, machine=replace(known.machine, **{f"thrust_{axis}": None})))
    assert reasons(run, "axis-thrust") == [f"machine.thrust.{axis} is not declared"]


def test_tolerance_not_declared() -> None:
    known = job("part-deflection", "long-and-thin")
    run = audit(replace(known, workpiece=replace(known.workpiece, diameter_tolerance=None)))
    assert of_check(run, "part-deflection") == []
    assert reasons(run, "part-deflection")
    assert reasons(run, "rake-too-blunt")


def test_plastics_have_no_forces_to_judge() -> None:
    run = audit(job("rake-for-material", "plastic"))
    for check in ("spindle-power", "spindle-torque", "axis-thrust", "chuck-grip"):
        assert of_check(run, check) == []
        assert any("force pair" in why for why in reasons(run, check))


def test_a_worn_edge_widens_the_band() -> None:
    """11.6 kW: sharp 11.6 x 1.25 = 14.5; worn 11.6 x (1 + sqrt(0.25^2 + 0.3^2)) = 16.1, over 15 kW."""
    known = job("spindle-power", "near-miss")
    assert of_check(audit(known), "spindle-power") == []
    worn = audit(replace(known, model=replace(known.model, wear_factor=1.3)))
    (finding,) = of_check(worn, "spindle-power")
    assert finding.level is Level.REVIEW
    assert finding.value is not None
    assert finding.band is not None
    assert finding.band[1] == pytest.approx(finding.value * (1.0 + (0.25**2 + 0.3**2) ** 0.5))


def test_small_forces_raise_nothing(tmp_path: Path) -> None:
    """0.05 mm x 0.03 mm in C45 is some ten newtons: no machine is too weak for that."""
    known = job("chip-too-thin", "rubbing")
    weak = replace(
        known.machine, power_curve=((1.0, 1e-6),), base_speed=1.0, thrust_x=1.0, thrust_z=1.0,
    )  # fmt: skip
    loose = replace(known.workholding, grip_force=10.0, jaw_mass=None)
    run = audit(replace(known, machine=weak, workholding=loose))
    for check in ("spindle-power", "spindle-torque", "axis-thrust", "chuck-grip"):
        assert [item for item in of_check(run, check) if item.level is not Level.NOTE] == []


def test_rapid_rates_assumed_make_a_question_of_the_bent_path() -> None:
    known = job("rapid-in-stock", "bent-path")
    (sure,) = of_check(audit(known), "rapid-in-stock")
    from auditor.declared.model import Assumption

    guessed = replace(known, assumptions=(Assumption("machine.rapid.x", "12 m/min", "not declared"),))
    (asked,) = of_check(audit(guessed), "rapid-in-stock")
    assert (sure.level, asked.level) == (Level.STOP, Level.REVIEW)


def test_unknown_tilt_stops_nothing() -> None:
    known = job("heel-clearance", "thick-insert-in-bore")
    tool = replace(known.tools[2], pocket_known=False)
    (finding,) = of_check(audit(replace(known, tools={2: tool})), "heel-clearance")
    assert finding.level is Level.REVIEW
