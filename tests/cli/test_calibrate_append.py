"""``turnaudit calibrate --append``: nothing without a yes, and then the whole of it behind what stood there."""

from __future__ import annotations

import shutil
import tomllib
from pathlib import Path

import pytest
from click.testing import CliRunner, Result

from auditor.cli import turnaudit

FIXTURES = Path(__file__).parents[2] / "fixtures"
LOG = FIXTURES / "calibrate" / "drive-stub-corrected.csv"


@pytest.fixture
def demo(tmp_path: Path) -> Path:
    return Path(shutil.copytree(FIXTURES / "demo", tmp_path / "demo"))


def _append(demo: Path, answer: str) -> Result:
    arguments = ["calibrate", str(demo / "drive-stub-corrected.nc"), "--log", str(LOG), "--append"]
    return CliRunner().invoke(turnaudit, arguments, input=answer)


@pytest.mark.parametrize("answer", ["n\n", "\n", ""])
def test_without_a_yes_nothing_is_written(demo: Path, answer: str) -> None:
    before = (demo / "shop.toml").read_bytes()
    result = _append(demo, answer)
    assert (result.exit_code, (demo / "shop.toml").read_bytes()) == (0, before)
    assert "Nothing is written" in result.output


def test_after_a_yes_the_lines_stand_behind_and_can_be_used(demo: Path) -> None:
    before = (demo / "shop.toml").read_text(encoding="utf-8")
    assert _append(demo, "y\n").exit_code == 0
    after = (demo / "shop.toml").read_text(encoding="utf-8")
    assert after.startswith(before)
    assert "C45-fitted" in tomllib.loads(after)["materials"]
    job = demo / "drive-stub-corrected.job.toml"
    job.write_text(job.read_text(encoding="utf-8").replace('"C45"', '"C45-fitted"'), encoding="utf-8")
    assert CliRunner().invoke(turnaudit, ["check", str(demo / "drive-stub-corrected.nc")]).exit_code in (0, 1)


def test_a_material_that_is_there_is_not_written_twice(demo: Path) -> None:
    _append(demo, "y\n")
    before = (demo / "shop.toml").read_bytes()
    again = _append(demo, "y\n")
    assert (again.exit_code, (demo / "shop.toml").read_bytes()) == (2, before)
    assert "there already" in again.output


def test_line_ends_of_the_shop_file_are_kept(demo: Path) -> None:
    shop = demo / "shop.toml"
    shop.write_bytes(shop.read_bytes().replace(b"\r\n", b"\n").replace(b"\n", b"\r\n"))
    _append(demo, "y\n")
    assert shop.read_bytes().count(b"\n") == shop.read_bytes().count(b"\r\n")
    assert b"C45-fitted" in shop.read_bytes()
