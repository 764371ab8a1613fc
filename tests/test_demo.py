"""The demo: five planted mistakes are found where they stand, and putting them right clears the job.

What is expected was written down when the mistakes were put in: each line is the block or the tool that was
spoilt, and the law it breaks is worked out beside it.
"""

from __future__ import annotations

import difflib
import json
import subprocess
import sys
import tomllib
from functools import cache
from pathlib import Path
from typing import Any

import pytest

DEMO = Path(__file__).parent.parent / "fixtures" / "demo"
FAULTY, CORRECTED = DEMO / "drive-stub.nc", DEMO / "drive-stub-corrected.nc"

EXPECTED = {
    # G50 S3000 stands in brackets: the facing cut runs up to all the machine has
    ("N110 G96 S240 M3", "speed-unclamped", "stop"),
    # C45: 1659 x 0.55^-0.21 N/mm2 x 3.5 x 0.55 mm2 x about 270 m/min / 0.85 is 19 kW, the spindle has 15
    ("N160 G1 Z-94.9 F0.55", "spindle-power", "stop"),
    # 0.35 mm on a 0.4 mm corner: more than 0.8 of it (common practice)
    ("N520 G1 Z-17.9 F0.35", "feed-over-nose", "stop"),
    # VNMG in a flat seat: 0 deg from the letter, 0 deg from the pocket
    ("N725 X40.4 Z-81. F0.12", "heel-clearance", "stop"),
    # a negative insert without chip-breaker on 20 mm diameter: 117 N at 4.6e-5 mm/N bend 11 um into the diameter,
    # a third of the tolerance is 8.3 um; one finding, for the edge that makes the bend, since it is under the tolerance
    ("N845 Z-58.", "rake-too-blunt", "review"),
}


@cache
def run(program: Path) -> tuple[int, dict[str, Any]]:
    """Exit status and report of the command itself."""
    command = [sys.executable, "-W", "error", "-c", "from auditor.cli import main; main()", "check", str(program)]
    ended = subprocess.run([*command, "--format", "json"], capture_output=True, encoding="utf-8", check=False)
    return ended.returncode, json.loads(ended.stdout)


def serious(report: dict[str, Any], program: Path) -> set[tuple[str, str, str]]:
    lines = program.read_text(encoding="utf-8").splitlines()
    return {
        (lines[finding["line"] - 1], finding["check"], finding["level"])
        for finding in report["findings"]
        if finding["level"] != "note"
    }


def test_the_planted_mistakes_and_nothing_else_are_found() -> None:
    status, report = run(FAULTY)
    assert serious(report, FAULTY) == EXPECTED
    assert (status, report["verdict"]) == (1, "stop")


def test_every_finding_says_what_to_do() -> None:
    _, report = run(FAULTY)
    assert all(finding["remedy"] for finding in report["findings"] if finding["level"] != "note")


def test_the_corrected_job_is_clear() -> None:
    status, report = run(CORRECTED)
    assert serious(report, CORRECTED) == set()
    assert (status, report["verdict"]) == (0, "clear")


@pytest.mark.parametrize("program", [FAULTY, CORRECTED])
def test_every_block_is_audited_and_every_check_has_what_it_needs(program: Path) -> None:
    _, report = run(program)
    assert report["coverage"]["not_audited"] == []
    assert report["coverage"]["motion_blocks"] >= 60
    assert report["not_judged"] == []


def test_the_programs_differ_in_the_faulty_blocks_alone() -> None:
    before, after = (path.read_text(encoding="utf-8").splitlines() for path in (FAULTY, CORRECTED))
    changed = [line[2:] for line in difflib.ndiff(before, after) if line.startswith("- ")]
    assert changed == ["(N105 G50 S3000)", "N160 G1 Z-94.9 F0.55", "N520 G1 Z-17.9 F0.35"]
    assert len(before) == len(after)


def test_the_job_files_differ_in_the_faulty_tools_alone() -> None:
    before, after = (tomllib.loads(path.with_suffix(".job.toml").read_text(encoding="utf-8"))
                     for path in (FAULTY, CORRECTED))
    assert {number for number in before["tools"] if before["tools"][number] != after["tools"][number]} == {"7", "9"}
    del before["tools"], after["tools"]
    assert before == after
