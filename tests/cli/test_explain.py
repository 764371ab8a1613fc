"""``turnaudit explain``: the list, one check, and a slip of the pen."""

from __future__ import annotations

import pytest
from click.testing import CliRunner

import auditor.checks
from auditor.cli import turnaudit
from auditor.findings import Rule
from tests.reports import builders


@pytest.fixture(autouse=True)
def two_rules(monkeypatch: pytest.MonkeyPatch) -> dict[str, Rule]:
    known = {name: builders.rule(name) for name in ("spindle-power", "axis-thrust")}
    monkeypatch.setattr(auditor.checks, "rules", lambda: known)
    return known


def run(*arguments: str) -> tuple[int, str]:
    result = CliRunner().invoke(turnaudit, ["explain", *arguments])
    return result.exit_code, result.output


def test_lists_every_check_with_its_title() -> None:
    status, text = run()
    assert status == 0
    assert [line.split()[0] for line in text.splitlines()[:2]] == ["axis-thrust", "spindle-power"]
    assert "does the spindle carry the cut?" in text


@pytest.mark.parametrize("name", ["spindle-power", "spindle_power", "Spindle-Power"])
def test_one_check_with_its_thresholds_and_their_provenance(name: str) -> None:
    status, text = run(name)
    assert status == 0
    assert "What\n" in text
    assert "power_share = 1 (common practice): share of the spindle's power that may be used" in " ".join(text.split())
    assert max(map(len, text.splitlines())) <= 80


def test_slip_of_the_pen_is_helped() -> None:
    status, text = run("spindel-power")
    assert status == 2
    assert "did you mean spindle-power?" in text
    assert run("xyzzy")[0] == 2


def test_poor_encoding_gets_ascii() -> None:
    assert CliRunner(charset="ascii").invoke(turnaudit, ["explain"]).exit_code == 0
