"""``turnaudit materials``: the list, one material with its sources, and a name that is not there."""

from __future__ import annotations

import pytest
from click.testing import CliRunner

from auditor.cli import turnaudit
from auditor.declared import materials


def run(*arguments: str, charset: str = "utf-8") -> tuple[int, str]:
    result = CliRunner(charset=charset).invoke(turnaudit, ["materials", *arguments])
    return result.exit_code, " ".join(result.output.split())


def test_lists_every_material_by_group() -> None:
    status, text = run()
    assert status == 0
    assert all(name in text for name in materials.names())
    assert text.index("P steel") < text.index("K cast iron") < text.index("O plastics")


@pytest.mark.parametrize("name", ["C45", "ck45", "1.0503", "aisi 1045"])
def test_one_material_with_sources_and_disagreements(name: str) -> None:
    status, text = run(name)
    assert status == 0
    assert "1659 N/mm^2 from memory" in text
    assert "König and Essel 1973" in text
    # Published comparison at h = 0.2 mm: classic pair 2781 against 2326 N/mm2, 20 % apart.
    assert "specific force 2781 N/mm^2 at h = 0.2 mm, 20 % more than here" in text


@pytest.mark.parametrize(
    ("name", "force"),
    [("C45", 2 * 465.2), ("42CrMo4", 2 * 466.2), ("EN-GJL-300", 2 * 347.8)],  # printed N per mm of width at h = 0.2 mm
)
def test_worked_figure(name: str, force: float) -> None:
    _, text = run(name)
    shown = float(text.partition(") = ")[2].split()[0])
    assert shown == pytest.approx(force, rel=0.003)


def test_plastics_say_that_forces_stay_open() -> None:
    status, text = run("POM")
    assert status == 0
    assert "No force pair is published" in text


def test_an_unknown_name_is_helped() -> None:
    status, text = run("42CrMo5")
    assert status == 2
    assert "did you mean 42CrMo4" in text
    assert run("xyzzy")[0] == 2


def test_poor_encoding_gets_ascii() -> None:
    status, text = run("C45", charset="ascii")
    assert status == 0
    assert "Konig and Essel" in text
