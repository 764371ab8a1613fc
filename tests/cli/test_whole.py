"""The installed command on real files, through a process of its own."""

from __future__ import annotations

import json
import math
import subprocess
import sys
from pathlib import Path

import pytest

PROGRAM = """\
%
O0001 (STUB)
N10 G50 S3000
N20 T0101
N30 G96 S180 M3
N40 G0 X56. Z2.
N50 G1 Z-30. F0.25
N60 G2 X60. Z-32. R2.
N70 G0 X100. Z100. M5
N80 M30
%
"""
JOB = """\
[control]
system = "A"
units = "mm"
[machine]
speed_limit = "4500 rpm"
power = "{power}"
base_speed = "1150 rpm"
[workholding]
stick_out = "95 mm"
[workpiece]
material = "C45"
diameter = "60 mm"
length = "125 mm"
[tools.1]
kind = "turning"
insert = "CNMG 120408"
holder = "PCLNR 2525 M12"
"""


def run(folder: Path, *arguments: str) -> subprocess.CompletedProcess[bytes]:
    command = [sys.executable, "-W", "error", "-c", "from auditor.cli import main; main()", "check", *arguments]
    return subprocess.run(command, cwd=folder, capture_output=True, check=False, timeout=120)


@pytest.fixture(scope="module")
def folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    place = tmp_path_factory.mktemp("jobs")
    for name, power in (("strong", "15 kW"), ("weak", "1 kW"), ("weak-2", "1 kW")):
        (place / f"{name}.nc").write_text(PROGRAM, encoding="ascii")
        (place / f"{name}.job.toml").write_text(JOB.format(power=power), encoding="utf-8")
    return place


def _no_constant(name: str) -> float:
    raise AssertionError(f"{name} is no JSON number")


def test_a_spindle_of_one_kilowatt_stops_what_fifteen_carry(folder: Path) -> None:
    # 1660 N/mm2 x 2 mm x 0.25 mm x 180 m/min is beyond 2.4 kW before any correction: P = kc ap f vc / 60 000.
    strong, weak = (json.loads(run(folder, f"{name}.nc", "--format", "json").stdout) for name in ("strong", "weak"))
    assert "stop" not in {finding["level"] for finding in strong["findings"]}
    assert {finding["check"] for finding in weak["findings"] if finding["level"] == "stop"} & {
        "spindle-power", "spindle-torque",
    }
    assert (run(folder, "strong.nc").returncode, run(folder, "weak.nc").returncode) == (0, 1)


def test_figures_of_the_moves_agree_with_the_closed_forms(folder: Path) -> None:
    body = json.loads(run(folder, "strong.nc", "--format", "json").stdout, parse_constant=_no_constant)
    cut = next(move for move in body["moves"] if move["line"] == 7)
    assert (cut["kind"], cut["from"], cut["to"]) == ("feed", {"x": 56.0, "z": 2.0}, {"x": 56.0, "z": -30.0})
    assert cut["depth_of_cut_mm"] == pytest.approx(2.0, abs=2e-3)
    assert cut["chip_area_mm2"] == pytest.approx(0.5, abs=1e-3)
    assert cut["cutting_speed_m_per_min"] == pytest.approx([180.0, 180.0 * 60.0 / 56.0], rel=1e-3)
    assert cut["spindle_rpm"] == pytest.approx([1000.0 * 180.0 / (math.pi * 56.0)] * 2, rel=1e-3)
    # time = path / (feed x speed)
    assert cut["time_s"] == pytest.approx(32.0 / (0.25 * 1000.0 * 180.0 / (math.pi * 56.0)) * 60.0, rel=1e-3)
    # a ring of 2 mm depth over 30 mm, short by what the nose and the tail of the edge leave in front of the end
    assert cut["removed_mm3"] == pytest.approx(math.pi * (30.0**2 - 28.0**2) * 30.0, rel=0.01)
    arc = next(move for move in body["moves"] if move["line"] == 8)
    assert (arc["kind"], arc["centre"], arc["clockwise"]) == ("arc", {"x": 60.0, "z": -30.0}, True)


def test_workers_change_nothing(folder: Path) -> None:
    alone = run(folder, ".", "--format", "json")
    together = run(folder, ".", "--format", "json", "--workers", "3")
    assert together.stdout == alone.stdout
    assert together.returncode == alone.returncode == 1
    assert json.loads(alone.stdout)["report"] == "turnaudit-set/1"


def test_series_reach_the_figures_of_their_moves(folder: Path) -> None:
    body = json.loads(run(folder, "strong.nc", "--format", "json", "--series").stdout, parse_constant=_no_constant)
    (curve,) = [curve for curve in body["series"] if curve["line"] == 7]
    largest = max(force for force in curve["cutting_force_N"] if force is not None)
    assert largest == pytest.approx(body["moves"][curve["move"]]["cutting_force_N"], rel=1e-6)


def test_screen_says_what_the_json_says(folder: Path) -> None:
    body = json.loads(run(folder, "weak.nc", "--format", "json").stdout)
    text = run(folder, "weak.nc").stdout.decode("utf-8")
    assert text.split()[1] == body["verdict"].upper()
    assert all(finding["check"] in text for finding in body["findings"])
    assert all(item["check"] in text for item in body["not_judged"])
    assert max(map(len, text.splitlines())) <= 80


@pytest.mark.parametrize("content", [b"", b"\x00\xff\xfe" * 100, b"%\nM30\n%\n", b"hello world\n", b"G" * 20000])
def test_odd_programs_are_unreadable_or_incomplete_and_never_a_traceback(folder: Path, content: bytes) -> None:
    (folder / "odd").mkdir(exist_ok=True)
    (folder / "odd" / "odd.nc").write_bytes(content)
    (folder / "odd" / "odd.job.toml").write_text(JOB.format(power="15 kW"), encoding="utf-8")
    result = run(folder, "odd/odd.nc", "--format", "json")
    assert result.returncode == 2
    assert json.loads(result.stdout)["verdict"] == "unreadable"
    assert b"Traceback" not in result.stderr
    assert b"itself failed" not in result.stderr
    assert b"odd" in result.stderr
    (folder / "odd" / "odd.nc").unlink()
    (folder / "odd" / "odd.job.toml").unlink()
