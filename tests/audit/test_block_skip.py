"""A program must be safe with the block-skip switch on and off (language of the trade: common practice)."""

from __future__ import annotations

from pathlib import Path

from auditor.audit import audit_program
from auditor.findings import Level

DECLARED = """
[control]
{setting}
[machine]
speed_limit = "4500 rpm"
power = "15 kW"
[workholding]
kind = "chuck"
stick_out = "60 mm"
[workpiece]
material = "C45"
diameter = "60 mm"
length = "100 mm"
face = "0 mm"
[tools.1]
kind = "turning"
insert = "CNMG 120408"
holder = "PCLNR 2525 M12"
"""
PROGRAM = """O1
G21 G40 G99
G50 S3000
T0101
G97 S800 M3
G0 X58. Z2.
{skipped}
G0 X100.
M5
M30
"""


def findings(folder: Path, skipped: str, setting: str = "") -> list[tuple[str, Level, int]]:
    program = folder / "part.nc"
    program.write_text(PROGRAM.format(skipped=skipped), encoding="utf-8")
    (folder / "part.job.toml").write_text(DECLARED.format(setting=setting), encoding="utf-8")
    found = audit_program(program).findings
    return [(finding.check, finding.level, finding.line) for finding in found if finding.level is not Level.NOTE]


def test_a_fault_with_the_switch_on_is_told(tmp_path: Path) -> None:
    # With the retract skipped, the last rapid leaves from the middle of the bar's end face.
    other_way = findings(tmp_path, "/G0 X64.\nG0 Z-20.\nX70.\nZ2.")
    assert ("rapid-in-stock", Level.STOP, 8) not in other_way
    assert ("program-flow", Level.REVIEW, 8) in other_way
    declared = findings(tmp_path, "/G0 X64.\nG0 Z-20.\nX70.\nZ2.", "block_skip = true")
    assert ("rapid-in-stock", Level.STOP, 8) in declared


def test_harmless_either_way(tmp_path: Path) -> None:
    assert not [found for found in findings(tmp_path, "/G1 Z-20. F0.2\nG0 U2.\nZ2.") if found[2] == 8]
