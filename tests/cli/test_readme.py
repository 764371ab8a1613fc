"""What the README promises is there: its commands, its job file, the files it names."""

from __future__ import annotations

import re
from pathlib import Path

import pytest
from click import Context

from auditor.cli import turnaudit
from auditor.declared.jobs import load_job

HOUSE = Path(__file__).parents[2]
README = (HOUSE / "README.md").read_text(encoding="utf-8")
COMMANDS = turnaudit.list_commands(Context(turnaudit))


def blocks(language: str) -> list[str]:
    return re.findall(rf"^```{language}\n(.*?)^```", README, re.DOTALL | re.MULTILINE)


def test_its_job_file_is_a_valid_one(tmp_path: Path) -> None:
    (job_file,) = blocks("toml")
    (tmp_path / "part.nc").write_text("G0 X1.\n", encoding="ascii")
    (tmp_path / "part.job.toml").write_text(job_file, encoding="utf-8")
    job = load_job(tmp_path / "part.job.toml")
    assert (job.batch, job.unattended, job.machine.speed_limit, set(job.tools)) == (60, True, 4500.0, {1})
    assert [(decision.check, decision.tool) for decision in job.accepted] == [("breaker-window", 1)]


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
