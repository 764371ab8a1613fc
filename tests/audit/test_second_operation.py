"""Stock taken from the simulated part of an earlier job."""

from __future__ import annotations

import math
from pathlib import Path

import pytest

from auditor.audit import audit_program
from auditor.errors import DeclarationError

FIRST = """O10
G21 G40 G99
G50 S3000
T0101
G97 S800 M3
G0 X62. Z0
G1 X-1.6 F0.2
G0 Z2.
X50.
G1 Z-30. F0.2
G1 X62.
G0 X200. Z100.
M5
M30
"""
SECOND = """O20
G21 G40 G99
G50 S3000
T0101
G97 S800 M3
G0 X62. Z0
G1 X-1.6 F0.2
G0 X200. Z100.
M5
M30
"""
DECLARED = """
[machine]
speed_limit = "4500 rpm"
power = "15 kW"
[workholding]
kind = "chuck"
stick_out = "60 mm"
[tools.1]
kind = "turning"
insert = "CNMG 120408"
holder = "PCLNR 2525 M12"
[workpiece]
material = "C45"
"""
RAW = 'diameter = "60 mm"\nlength = "100 mm"\nface = "2 mm"\n'


def shop(folder: Path, second: str, first: str = FIRST) -> Path:
    (folder / "op10.nc").write_text(first, encoding="utf-8")
    (folder / "op10.job.toml").write_text(DECLARED + RAW, encoding="utf-8")
    (folder / "op20.nc").write_text(SECOND, encoding="utf-8")
    (folder / "op20.job.toml").write_text(DECLARED + second, encoding="utf-8")
    return folder / "op20.nc"


def test_the_flipped_part_is_the_stock(tmp_path: Path) -> None:
    program = shop(tmp_path, 'face = "1 mm"\nstock = {from = "op10.job.toml", flipped = true}\n')
    run = audit_program(program).run
    # By hand: 98 mm are left behind the first face; turned round, its far end stands 1 mm before Z0 and the
    # 50 mm shoulder of 30 mm length points to the chuck.
    low, _, high, outermost = run.simulation.raw.bounds
    assert (low, high, outermost) == pytest.approx((-97.0, 1.0, 30.0), abs=1e-6)
    facing = math.pi * 30.0**2 * 1.0  # a disc of 1 mm
    assert run.simulation.removed.sum() == pytest.approx(facing, rel=2e-4)


def test_as_it_stands(tmp_path: Path) -> None:
    program = shop(tmp_path, 'stock = {from = "op10.job.toml"}\n')
    assert audit_program(program).run.simulation.raw.bounds[2] == pytest.approx(0.0, abs=1e-6)


def test_a_doubtful_first_operation_leaves_no_clear_verdict(tmp_path: Path) -> None:
    spindle_off = FIRST.replace(" M3", "")
    program = shop(tmp_path, 'stock = {from = "op10.job.toml"}\n', spindle_off)
    audit = audit_program(program)
    assert audit.verdict == "review"
    assert any("op10.job.toml" in finding.message for finding in audit.findings)


@pytest.mark.parametrize(
    ("second", "told"),
    [
        ('stock = {from = "op10.job.toml"}\ndiameter = "60 mm"\n', "stock and diameter"),
        ('stock = {from = "op09.job.toml"}\n', "no such job file"),
        ('stock = {from = "op20.job.toml"}\n', "from each other"),
        ("stock = {flipped = true}\n", "from"),
    ],
)
def test_faults(tmp_path: Path, second: str, told: str) -> None:
    with pytest.raises(DeclarationError, match=told):
        audit_program(shop(tmp_path, second))
