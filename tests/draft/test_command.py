"""``turnaudit draft`` as it is used: nothing is overwritten, nothing is written by halves."""

from __future__ import annotations

import shutil
import tomllib
from pathlib import Path

import pytest
from click.testing import CliRunner, Result

from auditor.cli import turnaudit

PROGRAMS = Path(__file__).parents[2] / "fixtures" / "draft"


@pytest.fixture(autouse=True)
def own_shop(tmp_path: Path) -> None:
    """An empty shop file, so that none further up the folders is found."""
    (tmp_path / "shop.toml").write_text("", encoding="utf-8")


@pytest.fixture
def program(tmp_path: Path) -> Path:
    return Path(shutil.copy(PROGRAMS / "welle.nc", tmp_path))


def draft(*arguments: object, answers: str | None = None) -> Result:
    return CliRunner().invoke(turnaudit, ["draft", *map(str, arguments)], input=answers)


def test_a_job_file_is_written_beside_the_program(program: Path) -> None:
    result = draft(program)
    assert result.exit_code == 0, result.output
    job = program.with_name("welle.job.toml")
    assert tomllib.loads(job.read_text(encoding="utf-8"))["tools"]["2"]["insert"] == "CNMG 120412"
    assert "machine.power" in result.stdout
    assert f"turnaudit check {program}" in result.stdout


def test_check_then_says_what_is_still_to_be_decided(program: Path) -> None:
    draft(program)
    result = CliRunner().invoke(turnaudit, ["check", str(program)])
    assert result.exit_code == 2
    told = [line for line in result.stderr.splitlines() if "wanted" in line]
    assert [line.split(": ")[2] for line in told] == ["machine.speed_limit", "machine.power"]


def test_nothing_is_overwritten_without_being_told(program: Path) -> None:
    job = program.with_name("welle.job.toml")
    job.write_text("# mine\n", encoding="utf-8")
    result = draft(program)
    assert result.exit_code == 2
    assert "--force" in result.stderr
    assert job.read_text(encoding="utf-8") == "# mine\n"
    assert draft(program, "--force").exit_code == 0
    assert "[tools.2]" in job.read_text(encoding="utf-8")


def test_a_draft_that_fails_leaves_the_old_file(program: Path) -> None:
    job = program.with_name("welle.job.toml")
    job.write_text("# mine\n", encoding="utf-8")
    program.write_text("NOTHING HERE\n", encoding="utf-8")
    assert draft(program, "--force").exit_code == 2
    assert job.read_text(encoding="utf-8") == "# mine\n"
    assert sorted(path.name for path in program.parent.iterdir()) == ["shop.toml", "welle.job.toml", "welle.nc"]


def test_output_elsewhere_names_the_program(program: Path, tmp_path: Path) -> None:
    target = tmp_path / "jobs" / "night.job.toml"
    target.parent.mkdir()
    result = draft(program, "--output", target)
    assert result.exit_code == 0, result.output
    assert tomllib.loads(target.read_text(encoding="utf-8"))["program"] == "../welle.nc"
    assert f"--job {target}" in result.stdout


@pytest.mark.parametrize(
    ("name", "said"),
    [("absent.nc", "no such file"), (".", "folder"), ("a.job.toml", "this is a job file"), ("empty.nc", "motion")],
)
def test_what_cannot_be_drafted_is_said(tmp_path: Path, name: str, said: str) -> None:
    (tmp_path / "a.job.toml").write_text("", encoding="utf-8")
    (tmp_path / "empty.nc").write_text("", encoding="utf-8")
    result = draft(tmp_path / name)
    assert result.exit_code == 2
    assert said in result.stderr
    assert "Traceback" not in result.stderr


def test_the_program_itself_is_never_the_target(program: Path) -> None:
    before = program.read_bytes()
    assert draft(program, "--output", program, "--force").exit_code == 2
    assert program.read_bytes() == before


def test_asking_needs_somebody_to_ask(program: Path) -> None:
    result = draft(program, "--ask")
    assert result.exit_code == 2
    assert "terminal" in result.stderr
    assert not program.with_name("welle.job.toml").exists()


@pytest.fixture
def at_a_terminal(monkeypatch: pytest.MonkeyPatch) -> None:
    """The test runner's input passes for a keyboard."""
    monkeypatch.setattr("auditor.cli.draft._somebody_is_there", lambda: True)


@pytest.mark.usefixtures("at_a_terminal")
def test_answers_are_checked_and_kept(tmp_path: Path) -> None:
    program = Path(shutil.copy(PROGRAMS / "silent.nc", tmp_path))
    answers = [
        "unobtainium", "C45", "80 mm", "", "", "4500", "4500 rpm", "15 kW", "?", "", "95 mm", "?", "?",  # work, machine
        "", "", "", "face grooving", "",  # kinds of the tools
        "CNMG 120408", "PCLNR 2525 M12", "nonsense", "CCMT 09T304", "S20S-SCLCR 09", "3 mm", "?",
    ]  # fmt: skip
    result = draft(program, "--ask", answers="\n".join(answers) + "\n")
    assert result.exit_code == 0, result.output
    found = tomllib.loads(program.with_name("silent.job.toml").read_text(encoding="utf-8"))
    assert found["workpiece"]["material"] == "C45"
    assert found["workpiece"]["diameter"] == "80 mm"
    assert found["machine"] == {"speed_limit": "4500 rpm", "power": "15 kW"}
    assert found["tools"]["1"]["holder"] == "PCLNR 2525 M12"
    assert found["tools"]["4"] == {"kind": "face grooving", "width": "3 mm"}
    assert found["tools"]["5"]["width"] == "?"
    asked = ("workpiece.material", "machine.power", "workholding.stick_out", "tools.4.kind", "tools.1.insert")
    order = [result.output.find(key) for key in asked]
    assert order == sorted(order)
    assert "the unit is missing" in result.output


@pytest.mark.usefixtures("at_a_terminal")
def test_broken_off_questions_write_nothing(program: Path) -> None:
    assert draft(program, "--ask", answers="C45\n").exit_code != 0
    assert not program.with_name("welle.job.toml").exists()
