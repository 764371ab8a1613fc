"""What the README promises is there: its commands, its job file, the files it names."""

from __future__ import annotations

import json
import re
import shutil
import subprocess
from collections.abc import Iterator
from pathlib import Path
from typing import Any
from xml.etree import ElementTree

import pytest
from click import Context
from click.testing import CliRunner

from auditor.cli import turnaudit
from auditor.declared.jobs import load_job
from auditor.declared.schemas import job_schema
from auditor.reports import formats
from auditor.shift import read_plan

HOUSE = Path(__file__).parents[2]
README = (HOUSE / "README.md").read_text(encoding="utf-8")
COMMANDS = turnaudit.list_commands(Context(turnaudit))


def blocks(language: str) -> list[str]:
    return re.findall(rf"^```{language}\n(.*?)^```", README, re.DOTALL | re.MULTILINE)


def test_its_job_file_is_a_valid_one(tmp_path: Path) -> None:
    job_file, _ = blocks("toml")
    (tmp_path / "part.nc").write_text("G0 X1.\n", encoding="ascii")
    (tmp_path / "part.job.toml").write_text(job_file, encoding="utf-8")
    job = load_job(tmp_path / "part.job.toml")
    assert (job.batch, job.unattended, job.machine.speed_limit, set(job.tools)) == (60, True, 4500.0, {1})
    assert [(decision.check, decision.tool) for decision in job.accepted] == [("breaker-window", 1)]


def test_its_plan_of_a_shift_is_a_valid_one(tmp_path: Path) -> None:
    _, plan_file = blocks("toml")
    (tmp_path / "night.toml").write_text(plan_file, encoding="utf-8")
    plan = read_plan(tmp_path / "night.toml")
    assert (plan.length, plan.name, plan.unattended, plan.change_over) == (9 * 3600.0, "Friday night", True, 720.0)
    (job,) = plan.jobs
    assert (job.batch, job.part_change, dict(job.edges)) == (120, 25.0, {1: 4, 2: 2})


def _keys(schema: Any) -> Iterator[str]:
    """Every key that any table of a schema knows."""
    if isinstance(schema, dict):
        yield from schema.get("properties", {})
        for part in schema.values():
            yield from _keys(part)
    elif isinstance(schema, list):
        for part in schema:
            yield from _keys(part)


def test_its_reference_holds_every_key_of_a_job_file() -> None:
    written = {text for line in README.splitlines() for text in re.findall(r"`([^`]+)`", line)}
    words = {word for text in written for word in re.findall(r"[A-Za-z0-9_]+", text)}
    assert set(_keys(job_schema())) - words == set()


def test_its_table_of_formats_holds_every_format() -> None:
    assert set(re.findall(r"^\| `(\w+)` \|", README.split("| `--format` |")[1].split("\n\n")[0], re.MULTILINE)) == (
        set(formats()) - {"html"}
    )


# in the order of each tour
TOURS = {
    # drafted, left open, stop, explained, compared, corrected
    "Who writes or proves out a program": [0, 2, 1, 0, 0, 0],
    # stop, kept, nothing new, the same for code hosts
    "Who keeps the programs in a repository": [1, 1, 0, 1],
    # something to decide but no stop, signed, fitted
    "Who answers for the shift": [0, 0, 0],
}


@pytest.mark.parametrize("heading", TOURS)
def test_its_tours_can_be_taken(heading: str, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    for name in ("demo", "calibrate"):
        shutil.copytree(HOUSE / "fixtures" / name, tmp_path / "fixtures" / name)
    monkeypatch.chdir(tmp_path)
    tour = re.split(r"\n###? ", README.split(f"### {heading}\n")[1])[0]
    commands = re.findall(r"`turnaudit ([^`]+)`", tour)
    assert [CliRunner().invoke(turnaudit, command.split()).exit_code for command in commands] == TOURS[heading]
    written = re.findall(r"--(?:output|html) ([\w.-]+\.\w+)", tour)
    assert set(written) <= {path.name for path in tmp_path.iterdir()}


def test_its_night_has_the_decisions_it_tells_of(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(HOUSE)
    night = CliRunner().invoke(turnaudit, ["shift", "fixtures/demo/night.toml"]).output
    assert "3 to decide" in night
    assert all(f"drive-stub-corrected: {what}" in night for what in ("Line 119, stringy-chips", "T1", "T2"))


def test_its_log_gives_back_the_factor_it_was_made_with(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(HOUSE)
    log = "fixtures/calibrate/drive-stub-corrected.csv"
    fitted = json.loads(CliRunner().invoke(
        turnaudit, ["calibrate", "fixtures/demo/drive-stub-corrected.nc", "--log", log, "--format", "json"]).output)
    low, high = fitted["factor_95_percent"]
    assert low < 1.12 < high  # as the head of the log says
    assert fitted["idle_power_kW"] == pytest.approx(0.45, abs=0.05)
    assert "MADE UP" in (HOUSE / log).read_text(encoding="utf-8")


def test_its_recipe_for_ci_is_a_sound_script() -> None:
    (recipe,) = blocks("bash")
    shell = shutil.which("bash")
    if shell is None:
        pytest.skip("no bash here to read the script")
    subprocess.run([shell, "-n"], input=recipe, text=True, check=True)


def test_its_pictures_stand_alone() -> None:
    pictures = re.findall(r"!\[(.+?)\]\((.+?)\)", README)
    assert len(pictures) == 2
    for said, name in pictures:
        assert len(said) > 20
        text = (HOUSE / name).read_text(encoding="utf-8")
        root = ElementTree.fromstring(text)
        assert root.tag == "{http://www.w3.org/2000/svg}svg"
        assert len(list(root.iter())) > 50
        assert not re.search(r"https?:(?!//www\.w3\.org/2000/svg)|@import|<script|<image", text)


def test_hook_for_users_runs_a_command_that_exists() -> None:
    hooks = (HOUSE / ".pre-commit-hooks.yaml").read_text(encoding="utf-8")
    (entry,) = re.findall(r"^  entry: turnaudit (\w+)$", hooks, re.MULTILINE)
    (pattern,) = re.findall(r"^  files: (.+)$", hooks, re.MULTILINE)
    assert entry in COMMANDS
    assert all(re.search(pattern, name) for name in ("a.nc", "b/c.TAP", "d.cnc", "e.job.toml"))
    assert not re.search(pattern, "pyproject.toml")


def test_two_commands_set_up_everything() -> None:
    demo, tests = blocks("sh")
    assert README.index("<!-- command: demo -->") < README.index(demo)
    assert README.index("<!-- command: tests -->") < README.index(tests)
    assert all(command.startswith("python3 -m venv ") and command.count("\n") == 1 for command in (demo, tests))


@pytest.mark.parametrize("name", sorted(set(re.findall(r"`turnaudit (\w+)", README))))
def test_every_command_it_names_exists(name: str) -> None:
    assert name in COMMANDS


@pytest.mark.parametrize("name", COMMANDS)
def test_it_names_every_command(name: str) -> None:
    assert f"| `turnaudit {name}" in README


@pytest.mark.parametrize("name", sorted(set(re.findall(r"fixtures/[\w./-]+\w", README))))
def test_every_file_it_names_exists(name: str) -> None:
    assert (HOUSE / name).exists()
