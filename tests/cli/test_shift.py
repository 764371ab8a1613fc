"""``turnaudit shift``: the plan is read strictly, times and edges add up, and what is left open is said."""

from __future__ import annotations

import json
import math
from pathlib import Path
from typing import Any

import pytest
from click.testing import CliRunner, Result

from auditor.cli import turnaudit

PROGRAM = """\
%
O0001 (STUB)
N10 G21 G40 G50 S3000
N20 T0101
N30 G97 S800 M3
N40 G0 X56. Z2.
N50 G1 Z-30. F0.25
N60 G0 X100. Z100. M5
N70 M30
%
"""
JOB = """\
batch = {batch}
[control]
system = "A"
units = "mm"
[machine]
speed_limit = "4500 rpm"
power = "{power}"
base_speed = "1150 rpm"
rapid = {{ x = "10 m/min", z = "10 m/min" }}
[workholding]
stick_out = "95 mm"
speed_limit = "4500 rpm"
grip_force = "60 kN"
jaw_mass = "1 kg"
jaw_radius = "60 mm"
[workpiece]
material = "C45"
diameter = "60 mm"
length = "125 mm"
[tools.1]
kind = "turning"
insert = "CNMG 120408"
holder = "PCLNR 2525 M12"
{taylor}
"""
TAYLOR = 'taylor = { speed = "400 m/min", exponent = 0.25 }'


@pytest.fixture
def shop(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    monkeypatch.chdir(tmp_path)
    for name, power, taylor in (("good", "15 kW", TAYLOR), ("weak", "1 kW", TAYLOR), ("open", "15 kW", "")):
        Path(f"{name}.nc").write_text(PROGRAM, encoding="ascii")
        Path(f"{name}.job.toml").write_text(JOB.format(batch=10, power=power, taylor=taylor), encoding="utf-8")
    Path("part.nc").write_text(PROGRAM.replace("N60", "N55 G65 P9100 Z-5.\nN60"), encoding="ascii")
    Path("part.job.toml").write_text(JOB.format(batch=1, power="15 kW", taylor=TAYLOR), encoding="utf-8")
    return tmp_path


def shift(text: str, *options: str) -> Result:
    Path("night.toml").write_text(text, encoding="utf-8")
    return CliRunner().invoke(turnaudit, ["shift", "night.toml", *options])


def answer(text: str) -> Any:
    return json.loads(shift(text, "--format", "json").stdout)


def job(name: str, **keys: object) -> str:
    return "\n".join(["[[jobs]]", f'job = "{name}"', *(f"{key} = {value}" for key, value in keys.items())]) + "\n"


@pytest.mark.usefixtures("shop")
def test_times_add_up() -> None:
    body = answer('shift = "8 h"\nchange_over = "10 min"\n' + job("good.job.toml", part_change='"20 s"')
                  + job("good.nc", batch=3))
    first, second = body["jobs"]
    # 32 mm at 0.25 mm x 800 rpm; rapids of 70 mm in Z against 10 m/min, the slower axis
    cut, rapid = 32.0 / (0.25 * 800.0) * 60.0, 0.0
    rapid += max(22.0, 130.0) / 10_000.0 * 60.0
    assert first["part_time_s"] == pytest.approx(cut + rapid + 20.0, rel=0.02)
    assert first["end_s"] == pytest.approx(10 * first["part_time_s"])
    assert second["begin_s"] == pytest.approx(first["end_s"] + 600.0)
    assert second["end_s"] == body["time_s"] == pytest.approx(second["begin_s"] + 3 * second["part_time_s"])


@pytest.mark.usefixtures("shop")
def test_edges_follow_taylor() -> None:
    plan = 'shift = "8 h"\nunattended = {}\n' + job("good.job.toml", batch=4000, edges="{{ 1 = 2 }}")
    # T = (C / v)^(1/n) at the outermost engaged diameter, 60 mm: v = pi 60 800 / 1000 = 150.8 m/min
    life = (400.0 / (math.pi * 60.0 * 0.8)) ** 4.0
    minutes = 30.8 / (0.25 * 800.0)  # the nose meets the work its radius early
    (edge,) = answer(plan.format("false"))["jobs"][0]["edges"]
    assert edge["edges_per_part"] == pytest.approx(minutes / life, rel=0.03)
    assert edge["parts_per_edge"] == int(1.0 / edge["edges_per_part"])
    assert edge["edges_needed"] == math.ceil(4000 / edge["parts_per_edge"])
    (watched,) = answer(plan.format("true"))["jobs"][0]["edges"]
    # common practice: an unattended run uses 0.6 to 0.7 of the predicted life
    assert 0.6 <= watched["parts_per_edge"] * watched["edges_per_part"] <= 0.7
    assert watched["edges_needed"] > edge["edges_needed"]


@pytest.mark.usefixtures("shop")
def test_short_edges_long_shifts_and_open_questions_must_be_decided() -> None:
    body = answer('shift = "30 min"\n' + job("good.job.toml", batch=100000, part_change='"1 s"') + job("open.job.toml"))
    told = [decision["text"] for decision in body["decisions"]]
    assert any("100000 parts need" in text and "1 at hand" in text for text in told)
    assert any("will not be finished" in text and "good, open" in text for text in told)
    assert any("T1" in text and "no Taylor pair" in text for text in told)
    assert body["verdict"] == "review"


@pytest.mark.parametrize(("jobs", "options", "status", "verdict"), [
    (["good"], [], 0, {"clear", "review"}), (["weak"], [], 1, {"stop"}),
    (["weak"], ["--fail-on", "never"], 0, {"stop"}),
    (["open"], ["--fail-on", "review"], 1, {"review"}), (["part"], [], 2, {"incomplete", "stop"}),
    (["lost", "good"], [], 2, {"incomplete"}), (["good", "weak"], [], 1, {"stop"}),
])
@pytest.mark.usefixtures("shop")
def test_status_and_verdict(jobs: list[str], options: list[str], status: int, verdict: set[str]) -> None:
    text = 'shift = "8 h"\n' + "".join(job(f"{name}.job.toml") for name in jobs)
    result = shift(text, "--format", "json", *options)
    assert json.loads(result.stdout)["verdict"] in verdict
    assert result.exit_code == status
    assert "Traceback" not in result.output


@pytest.mark.parametrize(("text", "found"), [
    ("", "shift"), ('shift = "8 h"\n', "no job is planned"), ('shift = "8"\n' + job("good.nc"), "shift"),
    ('shift = "8 mm"\n' + job("good.nc"), "shift"), ('shift = "-8 h"\n' + job("good.nc"), "negative"),
    ('shift = "8 h"\nlenght = 3\n' + job("good.nc"), "lenght"), ('shift = "8 h"\n[[jobs]]\nbatch = 3\n', "job"),
    ('shift = "8 h"\n' + job("good.nc", bach=3), "bach"), ('shift = "8 h"\n' + job("good.nc", batch=0), "batch"),
    ('shift = "8 h"\n' + job("good.nc", edges='{ one = 2 }'), "edges"),
    ('shift = "8 h"\n' + job("good.nc", edges="{ 1 = 0 }"), "edges"), ('shift = "8 h"\njobs = 3\n', "jobs"),
    ("shift = = 3\n", "not TOML"),
])
@pytest.mark.usefixtures("shop")
def test_wrong_plans_are_explained(text: str, found: str) -> None:
    result = shift(text)
    assert result.exit_code == 2
    assert "night.toml" in result.stderr
    assert found in result.stderr
    assert "Traceback" not in result.output


@pytest.mark.usefixtures("shop")
def test_several_faults_come_at_once() -> None:
    result = shift('shift = "8 mm"\nlenght = 3\n' + job("good.nc", batch=0))
    assert len(result.stderr.strip().splitlines()) == 3


@pytest.mark.usefixtures("shop")
def test_screen_starts_with_the_verdict_and_keeps_its_width() -> None:
    text = 'shift = "8 h"\nname = "Friday"\n' + job("weak.job.toml") + job("open.job.toml")
    lines = shift(text).stdout.splitlines()
    assert lines[0].startswith("■ STOP  Friday   ")
    assert max(map(len, lines)) <= 80
    assert shift(text, "--quiet").stdout == lines[0] + "\n"
    assert CliRunner(charset="cp437").invoke(turnaudit, ["shift", "night.toml"]).stdout_bytes.isascii()


@pytest.mark.usefixtures("shop")
def test_page_holds_what_the_screen_holds() -> None:
    body = answer('shift = "1 min"\nname = "<b>Friday"\n' + job("weak.job.toml") + job("open.job.toml"))
    result = shift(Path("night.toml").read_text(encoding="utf-8"), "--html", "night.html", "--quiet")
    assert result.exit_code == 1
    page = Path("night.html").read_text(encoding="utf-8")
    assert "&lt;b&gt;Friday" in page
    assert "<b>Friday" not in page
    assert page.count('class="box"') == len(body["decisions"])
    assert "http" not in page.replace("http://www.w3.org/2000/svg", "").replace("http-equiv", "")


@pytest.mark.usefixtures("shop")
def test_inputs_are_never_overwritten() -> None:
    for target in ("night.toml", "good.job.toml", "good.nc"):
        before = Path("good.nc").read_bytes()
        result = shift('shift = "8 h"\n' + job("good.job.toml"), "--output", target)
        assert result.exit_code == 2, target
        assert Path("good.nc").read_bytes() == before
