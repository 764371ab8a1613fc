"""``turnaudit schema``: what the command prints judges real files, and lets no wrong one pass."""

from __future__ import annotations

import copy
import json
import tomllib
from collections.abc import Callable
from pathlib import Path
from typing import Any

import pytest
from click.testing import CliRunner
from jsonschema import Draft202012Validator, ValidationError

from auditor.cli import turnaudit
from auditor.errors import Fault
from auditor.reports import Unreadable, View, report
from tests.reports import builders

DEMO = Path(__file__).parents[2] / "fixtures" / "demo"


def schema(name: str) -> Draft202012Validator:
    result = CliRunner().invoke(turnaudit, ["schema", name])
    assert result.exit_code == 0
    body = json.loads(result.stdout)
    Draft202012Validator.check_schema(body)
    return Draft202012Validator(body)


def written(*outcomes: Any, several: bool = False, **view: bool) -> Any:
    module = report("json")
    return json.loads(module.join([module.render(outcome, View(**view)) for outcome in outcomes], several))


LOST = Unreadable("lost.nc", (Fault("no such file", file="lost.nc"),))


@pytest.mark.parametrize("body", [
    written(builders.faulty()), written(builders.faulty(), series=True), written(LOST),
    written(builders.audit(not_audited=[builders.NOT_AUDITED], verdict="incomplete")),
    written(builders.audit([builders.power_finding(accepted=builders.ACCEPTED)])),
    written(builders.audit(), LOST, several=True), written(several=True),
])
def test_reports_fit_their_schema(body: Any) -> None:
    schema("report").validate(body)


@pytest.mark.parametrize("options", [[], ["--series"]])
def test_the_demo_s_report_fits(options: list[str]) -> None:
    program = str(DEMO / "drive-stub.nc")
    result = CliRunner().invoke(turnaudit, ["check", program, "--format", "json", *options])
    assert result.exit_code == 1
    schema("report").validate(json.loads(result.stdout))


def _unknown_key(body: Any) -> None:
    body["speed"] = 1


def _missing_verdict(body: Any) -> None:
    del body["verdict"]


def _word_for_a_number(body: Any) -> None:
    body["moves"][1]["torque_Nm"] = "38 N m"


def _half_a_range(body: Any) -> None:
    body["moves"][1]["spindle_rpm"] = [1000.0]


def _odd_level(body: Any) -> None:
    body["findings"][0]["level"] = "warning"


@pytest.mark.parametrize("spoil", [_unknown_key, _missing_verdict, _word_for_a_number, _half_a_range, _odd_level])
def test_wrong_reports_do_not_fit(spoil: Callable[[Any], None]) -> None:
    body = copy.deepcopy(written(builders.faulty()))
    spoil(body)
    with pytest.raises(ValidationError):
        schema("report").validate(body)


@pytest.mark.parametrize(("name", "file"), [("job", "drive-stub.job.toml"), ("shop", "shop.toml")])
def test_the_demo_s_files_fit(name: str, file: str) -> None:
    schema(name).validate(tomllib.loads((DEMO / file).read_text(encoding="utf-8")))


def test_unknown_file_is_refused() -> None:
    assert CliRunner().invoke(turnaudit, ["schema", "program"]).exit_code == 2
