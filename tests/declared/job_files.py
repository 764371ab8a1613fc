"""A small sound job file, and ways to write, change and read one in a test."""

from __future__ import annotations

from pathlib import Path

import pytest

from auditor.declared.jobs import load_job
from auditor.declared.model import Job
from auditor.errors import DeclarationError, Fault

MACHINE = '[machine]\nspeed_limit = "4500 rpm"\npower = "15 kW"\nbase_speed = "1150 rpm"\n'
WORKHOLDING = '[workholding]\nstick_out = "95 mm"\n'
WORKPIECE = '[workpiece]\nmaterial = "C45"\ndiameter = "60 mm"\nlength = "125 mm"\n'
TOOL = '[tools.1]\nkind = "turning"\ninsert = "CNMG 120408"\nholder = "PCLNR 2525 M12"\n'
EVERYTHING = """\
program = "pin.nc"
batch = 60
unattended = true
[control]
system = "B"
units = "in"
x_words = "radius"
whole_numbers = "increments"
increment = "0.0001 in"
block_skip = true
arcs = "mirrored"
rapid_path = "straight"
rough_retract = "0.3 mm"
thread_run_out = 1.0
thread_run_out_angle = "60 deg"
nested_comments = true
[machine]
speed_limit = "4500 rpm"
power_curve = [["500 rpm", "6.5 kW"], ["1150 rpm", "15 kW"], ["4500 rpm", "15 kW"]]
peak_power = "18.5 kW"
peak_time = "30 min"
efficiency = 0.9
thrust = { x = "5 kN", z = "8 kN" }
rapid = { x = "18 m/min", z = "24 m/min" }
turret = "front"
tool_change = ["200 mm", "150 mm"]
home = ["300 mm", "400 mm"]
second_home = ["10 in", "20 in"]
machine_zero = ["-10 mm", "-20 mm"]
[workholding]
kind = "chuck+tailstock"
stick_out = "95 mm"
speed_limit = "4000 rpm"
grip_force = "45 kN"
grip_diameter = "58 mm"
grip_inside = true
jaws = 4
jaw_mass = "1.8 kg"
jaw_radius = "70 mm"
friction = 0.15
tail = "900 mm"
tail_guided = true
tailstock = { point = ["4 mm", "-2 mm"], diameter = "20 mm" }
[workpiece]
material = "C45"
diameter = "60 mm"
length = "125 mm"
face = "1.5 mm"
bore = "10 mm"
skin = "hot rolled"
diameter_spread = "0.4 mm"
section = "hexagon"
interrupted = [["-22 mm", "-30 mm"]]
diameter_tolerance = "0.05 mm"
roughness = "Ra 1.6 um"
finished = [["0 mm", "28 mm"], ["-20 mm", "28 mm"]]
finished_bore = [["0 mm", "12 mm"], ["-20 mm", "12 mm"]]
[tools.1]
kind = "turning"
insert = "CNMG 120408"
holder = "PCLNR 2525 M12"
nose_radius = "0.8 mm"
cutting_edge_angle = "95 deg"
included_angle = "80 deg"
clearance_angle = "0 deg"
pocket_rake = "-6 deg"
pocket_inclination = "-6 deg"
face_rake = "18 deg"
land_width = "0.2 mm"
land_rake = "0 deg"
edge_radius = "40 um"
breaker_feed = ["0.15 mm", "0.50 mm"]
breaker_depth = ["1.0 mm", "5.0 mm"]
substrate = "coated carbide"
speed = ["150 m/min", "300 m/min"]
taylor = { speed = "320 m/min", exponent = 0.25 }
force_limit = "6 kN"
overhang = "35 mm"
shank_height = "25 mm"
shank_width = "25 mm"
bar_material = "steel"
hand = "right"
insert_faces = "up"
centre_height = "0 mm"
tip = 3
[limits]
power_share = 0.90
part_bend = "0.02 mm"
chip_speed = "180 m/min"
[model]
speed_correction = false
operation_factor = false
wear_factor = 1.2
[[accepted]]
check = "breaker-window"
line = 48
reason = "free-cutting bar, chips break by themselves"
until = 2027-06-30
[[accepted]]
check = "air-time"
tool = 1
reason = "as agreed"
"""
SOUND = MACHINE + WORKHOLDING + WORKPIECE + TOOL


def write(folder: Path, text: str | bytes, name: str = "pin.job.toml") -> Path:
    """A job file with its program beside it."""
    path = folder / name
    path.write_bytes(text.encode("utf-8") if isinstance(text, str) else text)
    (folder / "pin.nc").write_text("M30\n", encoding="utf-8")
    return path


def read(folder: Path, text: str | bytes) -> Job:
    return load_job(write(folder, text))


def faults(folder: Path, text: str | bytes) -> tuple[Fault, ...]:
    path = write(folder, text)
    with pytest.raises(DeclarationError) as caught:
        load_job(path)
    return caught.value.faults


def only_fault(folder: Path, text: str | bytes) -> Fault:
    found = faults(folder, text)
    assert len(found) == 1, [str(fault) for fault in found]
    return found[0]


def assumed(job: Job) -> dict[str, str]:
    return {entry.about: entry.value for entry in job.assumptions}
