"""``turnaudit compare`` as it is used."""

from __future__ import annotations

import json
from pathlib import Path

import pytest
from click.testing import CliRunner, Result

from auditor.cli import turnaudit
from tests.compare.stations import shop


@pytest.fixture
def program(tmp_path: Path) -> Path:
    return shop(tmp_path)


def compare(*arguments: object) -> Result:
    return CliRunner().invoke(turnaudit, ["compare", *map(str, arguments)])


def test_screen_fits_eighty_columns(program: Path) -> None:
    result = compare(program, "--tool", 1, "--with", "positive", "flat", "lasting", "--rake", "-12..18")
    assert result.exit_code == 0, result.output
    shown = result.stdout.replace(str(program.parent), "")
    assert max(map(len, shown.splitlines())) <= 80
    for word in ("positive", "flat", "lasting", "cutting force", "passive force", "torque", "roughness Ra", "rubs"):
        assert word in shown
    assert "eases stop to review spindle-torque in line 11" in shown


def test_one_with_takes_several_tools_and_so_do_several(program: Path) -> None:
    first = compare(program, "--tool", 1, "--with", "positive", "flat", "--format", "json")
    second = compare("--with", "positive", "--tool", 1, "--with", "flat", program, "--format", "json")
    assert first.exit_code == second.exit_code == 0
    assert json.loads(first.stdout) == json.loads(second.stdout)


def test_json_has_every_figure_with_its_unit(program: Path) -> None:
    body = json.loads(compare(program, "--tool", 1, "--with", "flat", "--rake=-6..6:6", "--format", "json").stdout)
    assert body["report"] == "turnaudit-compare/1"
    assert [tool["name"] for tool in body["tools"]] == ["as declared", "flat"]
    assert body["tools"][0]["changes"] == []
    figures = body["tools"][1]["figures"]
    assert figures["cutting_force_N"] > body["tools"][0]["figures"]["cutting_force_N"]
    assert figures["edges_per_part"] is None
    assert {change["what"] for change in body["tools"][1]["changes"]} <= {"new", "worse", "left", "eased", "fixed"}
    assert [row["effective_rake_deg"] for row in body["rake_study"]["rows"]] == [-6.0, 0.0, 6.0]


def test_output_is_written_and_an_input_is_not_overwritten(program: Path) -> None:
    target = program.with_name("compared.txt")
    assert compare(program, "--tool", 1, "--with", "flat", "--output", target).exit_code == 0
    assert "cutting force" in target.read_text(encoding="utf-8")
    before = program.read_bytes()
    assert compare(program, "--tool", 1, "--with", "flat", "--output", program).exit_code == 2
    assert program.read_bytes() == before


@pytest.mark.parametrize(
    ("arguments", "said"),
    [
        (("--tool", 1), "--with"),
        (("--with", "flat"), "--tool"),
        (("--tool", 1, "--with", "flot"), 'wanted "flat"'),
        (("--tool", 1, "--rake", "5..1"), "range of rakes"),
        (("--tool", 1, "--rake", "nothing"), "range of rakes"),
        (("--tool", 1, "--rake", "0..900"), "range of rakes"),
        (("--tool", 1, "--rake", "0..40"), "outside the model's range"),
        (("--tool", 3, "--rake", "0..6"), "not declared"),
    ],
)
def test_what_cannot_be_done_is_said(program: Path, arguments: tuple[object, ...], said: str) -> None:
    result = compare(program, *arguments)
    assert result.exit_code == 2
    assert said in result.stderr
    assert "Traceback" not in result.stderr


def test_a_program_without_a_job_is_sent_to_draft(program: Path) -> None:
    program.with_name("pin.job.toml").unlink()
    result = compare(program, "--tool", 1, "--with", "flat")
    assert result.exit_code == 2
    assert "turnaudit draft pin.nc" in result.stderr
    assert compare(program.with_name("no.nc"), "--tool", 1, "--with", "flat").exit_code == 2
    assert compare(program.parent, "--tool", 1, "--with", "flat").exit_code == 2
