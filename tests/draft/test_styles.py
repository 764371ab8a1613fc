"""Comments in styles that a draft once misread; the programs are invented, expected values as a setter reads them."""

from __future__ import annotations

from pathlib import Path

import pytest

from auditor.declared.jobs import load_job
from auditor.draft import draft_job
from auditor.errors import DeclarationError

CUT = "T0101\nG97 S900 M3\nG0 X38. Z2.\nG1 Z-20. F.2\nX40.\nG0 X100. Z100.\n"


def _values(folder: Path, comments: str, units: str = "G21", body: str = CUT) -> dict[str, str]:
    (folder / "shop.toml").write_text("", encoding="utf-8")  # no other shop file above counts
    program = folder / "part.nc"
    program.write_text(f"%\nO1\n{comments}{units} G40 G99\n{body}M30\n%\n", encoding="ascii")
    return {path: entry.value for path, entry in draft_job(program, folder / "part.job.toml").entries()}


def test_comment_below_a_bare_tool_number_is_about_that_tool(tmp_path: Path) -> None:
    heads = "(TOOL - 1 OFFSET - 1)\n(OD ROUGH - 80 DEG. INSERT - CNMG 432)\n(TOOL - 5 OFFSET - 5)\n(OD THREAD 16 TPI)\n"
    thread = "T0505\nG97 S500 M3\nG0 X40. Z5.\nG32 Z-10. F1.5\nG0 X100. Z100.\n"
    values = _values(tmp_path, heads, body=CUT + thread)
    assert (values["tools.1.kind"], values["tools.1.insert"]) == ('"turning"', '"CNMG 432"')
    assert values["tools.5.kind"] == '"threading"'


def test_comment_about_the_work_below_a_bare_tool_number_stays_about_the_work(tmp_path: Path) -> None:
    assert _values(tmp_path, "(T1)\n(MATERIAL: C45)\n")["workpiece.material"] == '"C45"'


@pytest.mark.parametrize("units", ["G20", "G21"])
def test_blade_of_an_eighth_is_in_inches_in_any_program(tmp_path: Path, units: str) -> None:
    groove = "T0101\nG97 S400 M3\nG0 X3. Z-.2\nG1 X2. F.05\nG0 X3.\n"
    assert _values(tmp_path, "(T1 = .125W GROOVE)\n", units, groove)["tools.1.width"] == '"0.125 in"'


def test_grade_of_four_digits_in_an_inch_program(tmp_path: Path) -> None:
    inch = "T0101\nG97 S900 M3\nG0 X1.3 Z.1\nG1 Z-1.5 F.01\nX1.5\n"
    values = _values(tmp_path, "(1.5 DIA 4140 X 4.0)\n", "G20", inch)
    assert values["workpiece.material"] == '"42CrMo4"'  # AISI 4140 is 42CrMo4
    assert (values["workpiece.diameter"], values["workpiece.length"]) == ('"1.5 in"', '"4 in"')


def test_family_before_a_grade(tmp_path: Path) -> None:
    assert _values(tmp_path, "(AL 6061 60 OD X 50L)\n")["workpiece.material"] == '"EN AW-6061"'


def test_inch_insert_with_a_broken_thickness(tmp_path: Path) -> None:
    assert _values(tmp_path, "(T1 CCMT 32.51)\n")["tools.1.insert"] == '"CCMT 32.51"'


def test_live_centre_said_after_the_chuck(tmp_path: Path) -> None:
    assert _values(tmp_path, "(CHUCK ON 40)\n(USE LIVE CENTER)\n")["workholding.kind"] == '"chuck+tailstock"'


def test_feed_to_the_face_is_no_boring(tmp_path: Path) -> None:
    body = "T0101\nG97 S900 M3\nG0 X40. Z2.\nG1 Z0. F.2\nX-1.\nG0 Z2.\n"
    assert _values(tmp_path, "", body=body)["tools.1.kind"] == '"turning"'


def test_stock_is_not_taken_for_the_size_it_is_turned_to(tmp_path: Path) -> None:
    body = "T0101\nG97 S900 M3\nG0 X42. Z2.\nG1 Z-30. F.2\nG0 X80. Z50.\n"
    assert _values(tmp_path, "", body=body)["workpiece.diameter"] == '"?"'  # a cut through air else, found clear


def test_what_a_draft_leaves_open_is_told_as_undecided(tmp_path: Path) -> None:
    program, job = tmp_path / "part.nc", tmp_path / "part.job.toml"
    program.write_text(f"%\nO1\nG21\n{CUT}M30\n%\n", encoding="ascii")
    job.write_text(draft_job(program, job).text(), encoding="utf-8")
    with pytest.raises(DeclarationError) as refused:
        load_job(job)
    left = {fault.key for fault in refused.value.faults if fault.message == "still to be decided"}
    assert {"workpiece.material", "tools.1.insert", "tools.1.holder"} <= left
    assert not any(fault.found for fault in refused.value.faults if fault.key in left)
    (material,) = (fault for fault in refused.value.faults if fault.key == "workpiece.material")
    assert "turnaudit materials" in (material.wanted or "")


def test_shop_file_of_a_folder_above_is_named(tmp_path: Path) -> None:
    lathe = '[machines.lathe]\nspeed_limit = "4000 rpm"\npower = "9 kW"\nbase_speed = "1000 rpm"\n'
    (tmp_path / "shop.toml").write_text(lathe, encoding="utf-8")
    folder = tmp_path / "parts"
    folder.mkdir()
    (folder / "part.nc").write_text(f"%\nO1\nG21\n{CUT}M30\n%\n", encoding="ascii")
    assert "the only one in ../shop.toml" in draft_job(folder / "part.nc", folder / "part.job.toml").text()
