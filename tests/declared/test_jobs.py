"""What a sound job file becomes: plain numbers, defaults listed, codes explained."""

from __future__ import annotations

import datetime
import hashlib
from pathlib import Path

import pytest

from auditor.declared.jobs import job_beside, load_job, program_of
from auditor.declared.model import LimitValue, Point
from auditor.errors import DeclarationError
from tests.declared.job_files import EVERYTHING, MACHINE, SOUND, TOOL, WORKHOLDING, WORKPIECE, assumed, read, write


def test_every_declared_value_arrives_in_the_programs_own_units(tmp_path: Path) -> None:
    job = read(tmp_path, EVERYTHING)
    assert (job.batch, job.unattended) == (60, True)
    control = job.control
    assert (control.system, control.system_declared, control.units) == ("B", True, "in")
    assert (control.x_words, control.whole_numbers, control.arcs) == ("radius", "increments", "mirrored")
    assert control.increment == pytest.approx(0.00254)
    assert control.block_skip is True
    assert control.settings == {
        "rapid_path": "straight", "rough_retract": 0.3, "thread_run_out": 1.0, "thread_run_out_angle": 60.0,
        "nested_comments": True,
    }  # fmt: skip
    machine = job.machine
    assert machine.speed_limit == 4500.0
    assert machine.power_curve == ((500.0, 6.5), (1150.0, 15.0), (4500.0, 15.0))
    assert machine.base_speed == 1150.0
    assert machine.peak_factor == pytest.approx(18.5 / 15.0)
    assert (machine.peak_time, machine.efficiency, machine.turret) == (30.0, 0.9, "front")
    assert (machine.thrust_x, machine.thrust_z) == (5000.0, 8000.0)
    assert (machine.rapid_x, machine.rapid_z) == (18_000.0, 24_000.0)
    assert machine.tool_change == Point(z=150.0, r=100.0)
    assert machine.home == Point(z=400.0, r=150.0)
    assert machine.second_home == Point(z=508.0, r=127.0)
    assert machine.machine_zero == Point(z=-20.0, r=-5.0)
    holding = job.workholding
    assert (holding.kind, holding.stick_out, holding.speed_limit) == ("chuck+tailstock", 95.0, 4000.0)
    assert (holding.grip_force, holding.grip_diameter, holding.grip_inside) == (45_000.0, 58.0, True)
    assert (holding.jaws, holding.jaw_mass, holding.jaw_radius, holding.friction) == (4, 1.8, 70.0, 0.15)
    assert (holding.tail, holding.tail_guided) == (900.0, True)
    assert (holding.tailstock_point, holding.tailstock_diameter) == (Point(z=-2.0, r=2.0), 20.0)
    work = job.workpiece
    assert (work.skin, work.diameter_spread, work.section) == ("hot rolled", 0.4, "hexagon")
    assert (work.interrupted, work.diameter_tolerance) == (((-30.0, -22.0),), 0.05)
    assert work.roughness == ("Ra", pytest.approx(1.6))
    assert work.finished == (Point(0.0, 14.0), Point(-20.0, 14.0))
    assert work.finished_bore == (Point(0.0, 6.0), Point(-20.0, 6.0))
    assert (job.model.speed_correction, job.model.operation_factor, job.model.wear_factor) == (False, False, 1.2)
    assert job.limits == {
        "power_share": LimitValue(0.9, "number", "0.9"),
        "part_bend": LimitValue(0.02, "length", "0.02 mm"),
        "chip_speed": LimitValue(180.0, "speed", "180 m/min"),
    }
    first, second = job.accepted
    assert (first.check, first.line, first.tool) == ("breaker-window", 48, None)
    assert first.until == datetime.date(2027, 6, 30)
    assert (second.check, second.line, second.tool, second.until) == ("air-time", None, 1, None)


def test_where_everything_is_declared_nothing_is_assumed(tmp_path: Path) -> None:
    assert read(tmp_path, EVERYTHING).assumptions == ()


def test_every_default_is_listed_under_its_key(tmp_path: Path) -> None:
    found = assumed(read(tmp_path, SOUND))
    assert found == {
        "unattended": "no",
        "control.x_words": "diameter", "control.whole_numbers": "units", "control.increment": "0.001 mm",
        "control.block_skip": "no", "control.arcs": "standard",
        "machine.efficiency": "0.85", "machine.rapid.x": "12 m/min", "machine.rapid.z": "16 m/min",
        "workholding.kind": "chuck",
        "workpiece.bore": "0 mm", "workpiece.face": "0 mm", "workpiece.skin": "bright",
        "workpiece.diameter_spread": "0 mm", "workpiece.section": "round",
        "tools.1.pocket_rake": "-6 deg", "tools.1.pocket_inclination": "-6 deg", "tools.1.face_rake": "12 deg",
        "tools.1.land_width": "0.15 mm", "tools.1.land_rake": "0 deg", "tools.1.edge_radius": "0.04 mm",
        "tools.1.substrate": "coated carbide", "tools.1.centre_height": "0 mm", "tools.1.tip": "3",
        "model.speed_correction": "yes", "model.operation_factor": "yes", "model.wear_factor": "1",
    }  # fmt: skip


def test_the_code_system_and_the_units_are_left_to_the_program(tmp_path: Path) -> None:
    control = read(tmp_path, SOUND).control
    assert (control.system_declared, control.units) == (False, None)


def test_an_unattended_run_is_judged_with_a_worn_edge(tmp_path: Path) -> None:
    job = read(tmp_path, "unattended = true\n" + SOUND)
    assert job.model.wear_factor == 1.3
    assert assumed(job)["model.wear_factor"] == "1.3"


def test_a_base_speed_not_declared_is_a_quarter_of_the_speed_limit(tmp_path: Path) -> None:
    job = read(tmp_path, SOUND.replace('base_speed = "1150 rpm"\n', ""))
    assert job.machine.base_speed == pytest.approx(4500.0 / 4.0)
    assert assumed(job)["machine.base_speed"] == "1125 rpm"


def test_a_declared_grip_takes_what_it_needs_as_assumed(tmp_path: Path) -> None:
    text = MACHINE + WORKHOLDING + 'grip_force = "45 kN"\n' + WORKPIECE + TOOL
    job = read(tmp_path, text)
    assert (job.workholding.grip_diameter, job.workholding.jaws) == (60.0, 3)
    assert {"workholding.grip_diameter", "workholding.friction", "workholding.jaws"} <= set(assumed(job))


def test_inch_files_equal_their_metric_twins(tmp_path: Path) -> None:
    metric = SOUND.replace('"60 mm"', '"50.8 mm"').replace('"95 mm"', '"88.9 mm"').replace('"125 mm"', '"127 mm"')
    inch = SOUND.replace('"60 mm"', '"2 in"').replace('"95 mm"', '"3.5 in"').replace('"125 mm"', '"5 inch"')
    twin, job = read(tmp_path, metric), read(tmp_path, inch)
    assert job.workpiece.diameter == pytest.approx(twin.workpiece.diameter)
    assert job.workpiece.length == pytest.approx(twin.workpiece.length)
    assert job.workholding.stick_out == pytest.approx(twin.workholding.stick_out)


def test_the_job_knows_its_file(tmp_path: Path) -> None:
    path = write(tmp_path, SOUND)
    job = load_job(str(path))
    assert job.path == str(path)
    assert job.sha256 == hashlib.sha256(SOUND.encode()).hexdigest()
    assert Path(job.program) == tmp_path / "pin.nc"


@pytest.mark.parametrize("suffix", [".nc", ".cnc", ".tap", ".txt", ".NC"])
def test_the_program_of_the_same_stem(tmp_path: Path, suffix: str) -> None:
    path = tmp_path / "bolt.job.toml"
    path.write_text(SOUND, encoding="utf-8")
    program = tmp_path / f"bolt{suffix}"
    program.write_text("M30\n", encoding="utf-8")
    assert program_of(path) == program
    assert job_beside(program) == path


def test_the_first_extension_goes_first(tmp_path: Path) -> None:
    path = tmp_path / "bolt.job.toml"
    path.write_text(SOUND, encoding="utf-8")
    for suffix in (".txt", ".tap", ".cnc", ".nc"):
        (tmp_path / f"bolt{suffix}").write_text("M30\n", encoding="utf-8")
        assert program_of(path).suffix == suffix


@pytest.mark.parametrize("written", ["sub/pin.mpf", "sub\\\\pin.mpf"])
def test_a_declared_program_of_any_extension(tmp_path: Path, written: str) -> None:
    (tmp_path / "sub").mkdir()
    (tmp_path / "sub" / "pin.mpf").write_text("M30\n", encoding="utf-8")
    job = read(tmp_path, f'program = "{written}"\n' + SOUND)
    assert Path(job.program) == tmp_path / "sub" / "pin.mpf"


def test_a_program_given_by_hand_stands_over_the_jobs_own(tmp_path: Path) -> None:
    path = write(tmp_path, 'program = "gone.nc"\n' + SOUND)
    assert load_job(path, program="other.nc").program == "other.nc"
    with pytest.raises(DeclarationError):
        program_of(path)


def test_no_job_beside(tmp_path: Path) -> None:
    assert job_beside(tmp_path / "pin.nc") is None
