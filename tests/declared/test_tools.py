"""Declared tools: what the codes give, what stands over them, and what is taken for granted.

Angles and sizes by ISO 1832, ISO 5608 and ISO 6261 as commonly reprinted (from memory); the defaults
by letter 4 are this project's own choice and are written down here as promised to users.
"""

from __future__ import annotations

from pathlib import Path

import pytest

from auditor.declared.model import Tool
from tests.declared.job_files import MACHINE, SOUND, WORKHOLDING, WORKPIECE, assumed, faults, only_fault, read

REST = MACHINE + WORKHOLDING + WORKPIECE
OUTRIGHT = 'nose_radius = "0.8 mm"\nincluded_angle = "80 deg"\ncutting_edge_angle = "95 deg"\n'


def tool_text(kind: str, text: str) -> str:
    return REST + f'[tools.7]\nkind = "{kind}"\n{text}'


def tool(folder: Path, kind: str, text: str) -> Tool:
    return read(folder, tool_text(kind, text)).tools[7]


def test_codes_give_the_geometry(tmp_path: Path) -> None:
    found = tool(tmp_path, "turning", 'insert = "DNMG 150608"\nholder = "PDJNL 2525 M15"\n')
    assert (found.shape, found.included_angle, found.nose_radius) == ("D", 55.0, 0.8)
    assert (found.cutting_edge_angle, found.hand, found.edge_faces_end) == (93.0, "left", False)
    assert (found.shank_height, found.shank_width, found.insert_clearance) == (25.0, 25.0, 0.0)
    assert found.edge_length == pytest.approx(15.5, abs=0.01)
    assert found.name == "T7 DNMG 150608"
    assert found.breaker_declared


def test_a_boring_bar(tmp_path: Path) -> None:
    found = tool(tmp_path, "boring", 'insert = "CCMT 060204"\nholder = "C12M-SCLCR 06"\n')
    assert (found.bar_diameter, found.bar_material, found.cutting_edge_angle) == (12.0, "carbide", 95.0)
    assert (found.insert_clearance, found.pocket_rake, found.pocket_inclination) == (7.0, 0.0, 0.0)
    assert found.pocket_known is False
    assert found.tip == 2


def test_a_boring_bar_of_declared_tilt_is_known(tmp_path: Path) -> None:
    text = 'insert = "CCMT 060204"\nholder = "C12M-SCLCR 06"\npocket_rake = "-5 deg"\npocket_inclination = "-8 deg"\n'
    found = tool(tmp_path, "boring", text)
    assert (found.pocket_known, found.pocket_rake, found.pocket_inclination) == (True, -5.0, -8.0)


def test_a_bar_with_one_angle_declared_is_not_known(tmp_path: Path) -> None:
    text = 'insert = "CCMT 060204"\nholder = "C12M-SCLCR 06"\npocket_rake = "-5 deg"\n'
    assert tool(tmp_path, "boring", text).pocket_known is False


@pytest.mark.parametrize(
    ("holder", "faces_end"),
    [("PCLNR 2525 M12", False), ("PCKNR 2525 M12", True), ("PCBNR 2525 M12", False), ("PCFNR 2525 M12", True)],
)
def test_end_styles_measure_from_the_x_feed(tmp_path: Path, holder: str, faces_end: bool) -> None:
    assert tool(tmp_path, "turning", f'insert = "CNMG 120408"\nholder = "{holder}"\n').edge_faces_end is faces_end


@pytest.mark.parametrize(
    ("insert", "face_rake", "land_width", "edge_radius", "breaker"),
    [
        ("CNMG 120408", 12.0, 0.15, 0.040, True),
        ("CNMM 120408", 12.0, 0.15, 0.040, True),
        ("CNMA 120408", 0.0, 0.0, 0.025, False),
        ("CCMT 120408", 12.0, 0.15, 0.040, True),
        ("CCMW 120408", 0.0, 0.0, 0.025, False),
        ("CNMX 120408", 0.0, 0.0, 0.025, False),
    ],
)
def test_defaults_by_letter_four(
    tmp_path: Path, insert: str, face_rake: float, land_width: float, edge_radius: float, breaker: bool
) -> None:
    text = tool_text("turning", f'insert = "{insert}"\ncutting_edge_angle = "95 deg"\n')
    job = read(tmp_path, text)
    found = job.tools[7]
    assert (found.face_rake, found.land_width, found.land_rake) == (face_rake, land_width, 0.0)
    assert (found.edge_radius, found.breaker_declared) == (edge_radius, breaker)
    keys = {"face_rake", "land_width", "land_rake", "edge_radius"}
    assert {f"tools.7.{key}" for key in keys} <= set(assumed(job))


@pytest.mark.parametrize(("insert", "tilt"), [("CNMG 120408", -6.0), ("CCMT 120408", 0.0), ("CPMT 120408", 0.0)])
def test_an_insert_without_clearance_is_tilted(tmp_path: Path, insert: str, tilt: float) -> None:
    found = tool(tmp_path, "turning", f'insert = "{insert}"\ncutting_edge_angle = "95 deg"\n')
    assert (found.pocket_rake, found.pocket_inclination, found.pocket_known) == (tilt, tilt, True)


def test_values_given_outright_need_no_codes(tmp_path: Path) -> None:
    found = tool(tmp_path, "turning", OUTRIGHT)
    assert (found.nose_radius, found.included_angle, found.cutting_edge_angle) == (0.8, 80.0, 95.0)
    assert (found.face_rake, found.land_width, found.edge_radius) == (0.0, 0.0, 0.025)
    assert found.pocket_known is False  # nobody said what clearance the insert has
    assert found.breaker_declared is False


def test_a_declared_window_declares_the_breaker(tmp_path: Path) -> None:
    found = tool(tmp_path, "turning", OUTRIGHT + 'breaker_feed = ["0.15 mm", "0.50 mm"]\n')
    assert (found.breaker_declared, found.breaker_feed, found.breaker_depth) == (True, (0.15, 0.5), None)


def test_what_is_written_stands_over_the_code_and_the_contradiction_is_listed(tmp_path: Path) -> None:
    job = read(tmp_path, SOUND + 'nose_radius = "0.4 mm"\ncutting_edge_angle = "95 deg"\nhand = "left"\n')
    assert (job.tools[1].nose_radius, job.tools[1].hand, job.tools[1].tip) == (0.4, "left", 4)
    notes = {(entry.about, entry.value): entry.why for entry in job.assumptions}
    assert "nose_radius 0.8 mm" in notes["tools.1.insert", "CNMG 120408"]
    assert "hand right" in notes["tools.1.holder", "PCLNR 2525 M12"]
    assert "tools.1.nose_radius" not in assumed(job)
    assert "tools.1.cutting_edge_angle" not in assumed(job)


def test_an_insert_in_a_holder_made_for_another_is_listed(tmp_path: Path) -> None:
    job = read(tmp_path, SOUND.replace("CNMG 120408", "DNMG 150608"))
    assert job.tools[1].included_angle == 55.0
    assert any("made for shape C" in entry.why for entry in job.assumptions)


def test_a_code_not_understood_needs_every_value_outright(tmp_path: Path) -> None:
    own = 'insert = "HOUSE-7"\n' + OUTRIGHT
    fault = only_fault(tmp_path, tool_text("turning", own))
    assert (fault.key, fault.found) == ("tools.7.insert", '"HOUSE-7", there S')
    assert "clearance_angle" in (fault.wanted or "")
    job = read(tmp_path, tool_text("turning", own + 'clearance_angle = "7 deg"\n'))
    assert job.tools[7].insert_clearance == 7.0
    assert assumed(job)["tools.7.insert"] == "HOUSE-7"


def test_a_holder_not_understood_needs_every_value_outright(tmp_path: Path) -> None:
    own = 'insert = "CNMG 120408"\nholder = "OURS 25"\ncutting_edge_angle = "95 deg"\nhand = "right"\n'
    assert only_fault(tmp_path, tool_text("turning", own)).key == "tools.7.holder"
    square = own + 'shank_height = "25 mm"\nshank_width = "25 mm"\n'
    assert tool(tmp_path, "turning", square).shank_height == 25.0
    assert tool(tmp_path, "turning", own + 'bar_diameter = "25 mm"\n').bar_diameter == 25.0


def test_a_style_that_fixes_no_angle_wants_it_outright(tmp_path: Path) -> None:
    text = 'insert = "CNMG 120408"\nholder = "PCXNR 2525 M12"\n'
    assert only_fault(tmp_path, tool_text("turning", text)).key == "tools.7.cutting_edge_angle"
    assert tool(tmp_path, "turning", text + 'cutting_edge_angle = "91 deg"\n').cutting_edge_angle == 91.0


def test_every_missing_value_is_named(tmp_path: Path) -> None:
    found = {fault.key for fault in faults(tmp_path, tool_text("turning", ""))}
    assert found == {"tools.7.nose_radius", "tools.7.included_angle", "tools.7.cutting_edge_angle"}


def test_a_chamfered_edge_gives_its_land(tmp_path: Path) -> None:
    # T02020: chamfer 0.20 mm at 20 deg (ISO 1832, positions 8 to 10)
    found = tool(tmp_path, "turning", 'insert = "CNGA 120408 T02020"\ncutting_edge_angle = "95 deg"\n')
    assert (found.land_width, found.land_rake) == (pytest.approx(0.20), -20.0)


def test_a_round_insert(tmp_path: Path) -> None:
    found = tool(tmp_path, "turning", 'insert = "RCMT 1204M0"\nholder = "SRDCN 2525 M12"\n')
    assert (found.shape, found.nose_radius, found.tip) == ("R", 6.0, 8)


def test_a_parting_blade(tmp_path: Path) -> None:
    found = tool(tmp_path, "parting", 'width = "3 mm"\ninsert = "BLADE-3"\nnose_radius = "0.2 mm"\n')
    assert (found.width, found.nose_radius, found.tip) == (3.0, 0.2, 3)
    assert (found.cutting_edge_angle, found.edge_faces_end) == (90.0, True)


def test_a_threading_tool_is_symmetric(tmp_path: Path) -> None:
    found = tool(tmp_path, "threading", "")
    assert (found.included_angle, found.cutting_edge_angle, found.tip) == (60.0, 60.0, 8)
    whitworth = tool(tmp_path, "threading", 'included_angle = "55 deg"\n')
    assert whitworth.cutting_edge_angle == pytest.approx(62.5)


def test_a_drill(tmp_path: Path) -> None:
    job = read(tmp_path, tool_text("drilling", 'diameter = "12 mm"\npoint_angle = "140 deg"\n'))
    found = job.tools[7]
    assert (found.diameter, found.point_angle, found.flutes, found.tip) == (12.0, 140.0, 2, 7)
    assert "tools.7.flutes" in assumed(job)
    assert "tools.7.point_angle" not in assumed(job)


def test_a_bar_stop_needs_nothing(tmp_path: Path) -> None:
    job = read(tmp_path, tool_text("stop", ""))
    assert job.tools[7].kind == "stop"
    assert not [about for about in assumed(job) if about.startswith("tools.7")]


@pytest.mark.parametrize(
    ("kind", "text", "tip"),
    [
        ("turning", OUTRIGHT, 3),
        ("turning", OUTRIGHT + 'hand = "left"\n', 4),
        ("turning", OUTRIGHT + 'hand = "neutral"\n', 8),
        ("turning", OUTRIGHT + "tip = 6\n", 6),
        ("boring", OUTRIGHT, 2),
        ("grooving", 'width = "3 mm"\n', 3),
        ("grooving", 'width = "3 mm"\nholder = "A20Q-SCLCR 09"\n', 2),
        ("face grooving", 'width = "3 mm"\n', 3),
        ("threading", 'holder = "A20Q-SCLCR 09"\n', 6),
        ("drilling", 'diameter = "9 mm"\n', 7),
    ],
)
def test_the_usual_tip_number(tmp_path: Path, kind: str, text: str, tip: int) -> None:
    # numbers by the usual picture: 3 outside towards the chuck, 2 inside, 4 outside away, 7 and 8 along Z and X;
    # a blade by its corner nearer the chuck, in the face nearer the axis (contract: programmed point = corner)
    assert tool(tmp_path, kind, text).tip == tip


def test_words_and_windows_arrive(tmp_path: Path) -> None:
    text = OUTRIGHT + (
        'breaker_depth = ["1.0 mm", "5.0 mm"]\nsubstrate = "cbn"\nspeed = ["150 m/min", "300 m/min"]\n'
        'taylor = { speed = "320 m/min", exponent = 0.25 }\nforce_limit = "6 kN"\noverhang = "35 mm"\n'
        'bar_diameter = "25 mm"\nbar_material = "heavy metal"\ninsert_faces = "down"\ncentre_height = "-0.1 mm"\n'
        'land_rake = "-15 deg"\nface_rake = "18 deg"\nedge_radius = "40 um"\nclearance_angle = "11 deg"\n'
    )
    found = tool(tmp_path, "turning", text)
    assert (found.breaker_depth, found.substrate, found.speed) == ((1.0, 5.0), "cbn", (150.0, 300.0))
    assert (found.taylor, found.force_limit, found.overhang) == ((320.0, 0.25), 6000.0, 35.0)
    assert (found.bar_diameter, found.bar_material, found.insert_faces) == (25.0, "heavy metal", "down")
    assert (found.centre_height, found.land_rake, found.face_rake) == (-0.1, -15.0, 18.0)
    assert (found.edge_radius, found.insert_clearance) == (pytest.approx(0.04), 11.0)


@pytest.mark.parametrize(
    "line",
    [
        'breaker_feed = ["0.5 mm", "0.15 mm"]', 'breaker_feed = "0.5 mm"', 'speed = ["150 m/min"]',
        'taylor = { speed = "320 m/min" }', 'hand = "both"', "tip = 10", "tip = 3.0", 'edge_radius = "-1 um"',
        'cutting_edge_angle = "180 deg"', 'clearance_angle = "-3 deg"', 'face_rake = "80 deg"', 'substrate = "steel"',
    ],
)  # fmt: skip
def test_values_out_of_their_bounds(tmp_path: Path, line: str) -> None:
    key = line.partition(" ")[0]
    text = "".join(each + "\n" for each in OUTRIGHT.splitlines() if not each.startswith(key)) + line + "\n"
    assert (only_fault(tmp_path, tool_text("turning", text)).key or "").startswith(f"tools.7.{key}")
