"""Nose-radius compensation and corner words inside whole programs.

The offset itself is judged in ``test_compensation``; here the programs around it. Numbers by hand or from
the worked example T1 of the fixture (source there).
"""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from auditor.declared.model import Point, Tool
from auditor.interpret.moves import Kind
from tests.interpret.programs import carried_out, declared, not_audited, rows, topics

FIXTURE = Path(__file__).parents[2] / "fixtures" / "language" / "cycle_examples.json"
T1 = json.loads(FIXTURE.read_text(encoding="utf-8"))["examples"]["T1"]["path"]
CUT = "T0101\nG97 S500 M3 F.2\n"
CONTOUR = "X26. Z-3.\nZ-20.\nG2 X34. Z-24. R4.\nG1 X42.\nG3 X46. Z-26. R2.\nG1 Z-36.\n"


def test_worked_example_as_a_program() -> None:
    found = carried_out(CUT + "G0 X16. Z4.\nG42 G1 X16. Z2.\n" + CONTOUR + "G40 G1 X54.\nG0 Z5.")
    moves = found.moves[1:8]
    for move, point in zip(moves, T1, strict=True):
        assert move.end_r is not None
        assert (2 * move.end_r, move.end_z) == pytest.approx((point["tx"], point["tz"]), abs=1e-4)
        assert move.compensation == "right"
    assert [move.line for move in moves] == [4, 5, 6, 7, 8, 9, 10]
    assert rows(found)[-2:] == [("F", 54, -36), ("R", 54, 5)]
    assert found.moves[-1].compensation == "off"
    assert not {topic for topic in topics(found) if topic.startswith("compensation")}


def test_cancelled_in_a_block_of_its_own() -> None:
    one = carried_out(CUT + "G0 X16. Z4.\nG42 G1 X16. Z2.\n" + CONTOUR + "G40 G1 X54.")
    two = carried_out(CUT + "G0 X16. Z4.\nG42\nG1 X16. Z2.\n" + CONTOUR + "G40\nG1 X54.")
    assert rows(one) == rows(two)


def test_finishing_cycle_follows_the_compensated_profile() -> None:
    profile = "N1 G0 G42 X16. Z2.\nG1 " + CONTOUR.removesuffix("G1 Z-36.\n") + "N2 G1 Z-36.\n"
    text = CUT + "G0 X54. Z4.\nG71 U2. R.5\nG71 P1 Q2 U.6 W.1 F.3\n" + profile + "G70 P1 Q2\nG40 G0 X60.\nM30"
    found = carried_out(text)
    finishing = [move for move in found.moves if move.cycle == "finishing"]
    for move, point in zip(finishing, T1, strict=False):
        assert move.end_r is not None
        assert (2 * move.end_r, move.end_z) == pytest.approx((point["tx"], point["tz"]), abs=1e-4)
    assert [move.compensation for move in finishing] == ["right"] * 7 + ["off"]
    assert rows(found)[-2:] == [("R", 54, 4), ("R", 60, 4)]
    rough = [move for move in found.moves if move.cycle == "rough turning"]
    assert {move.compensation for move in rough} == {"off"}


def test_left_on_at_a_tool_call_and_at_the_end() -> None:
    text = CUT + "G0 X20. Z2.\nG42 G1 Z0\nZ-9.\n{}\nM30"
    for block in ("T0101", "G28 U0 W0", "M30", "G90 X10. Z-5."):
        assert "compensation-left-on" in topics(carried_out(text.format(block)))


def test_path_left_on_ends_square_and_the_next_move_starts_there() -> None:
    found = carried_out(CUT + "G0 X20. Z2.\nG42 G1 Z0\nZ-9.\nT0101\nG40 G0 X30.")
    assert found.moves[2].end == pytest.approx((-9.8, 10.0))  # tip 3, nose 0.8: square to a cylinder
    assert found.moves[3].start == pytest.approx((-9.8, 10.0))
    assert rows(found)[-1] == ("R", 30, -9)


def test_cancelled_on_the_way_to_the_reference_point() -> None:
    found = carried_out(CUT + "G0 X20. Z2.\nG42 G1 Z0\nZ-9.\nG40 G28 U0 W0", declared(fixed=Point(150.0, 100.0)))
    assert found.moves[2].end == pytest.approx((-9.8, 10.0))
    assert found.moves[3].start == pytest.approx((-9.8, 10.0))
    assert rows(found)[-1] == ("R", 200, 150)
    assert "compensation-left-on" not in topics(found)


def test_wrong_side_of_an_outside_tool_and_right_side_of_a_boring_bar() -> None:
    text = CUT + "G0 X20. Z2.\n{} G1 Z0\nZ-9.\nG40 G0 X{}."
    assert "compensation-side" in topics(carried_out(text.format("G41", 30)))
    assert "compensation-side" not in topics(carried_out(text.format("G42", 30)))
    bar = declared(tools={1: Tool(1, "T1", "boring", nose_radius=0.4, tip=2)})
    assert "compensation-side" not in topics(carried_out(text.format("G41", 10), bar))
    assert "compensation-side" in topics(carried_out(text.format("G42", 10), bar))


def test_side_changed_without_cancelling() -> None:
    found = carried_out(CUT + "G0 X20. Z2.\nG42 G1 Z0\nZ-9.\nG41 Z-5.\nZ0\nG40 G0 X30.")
    assert "compensation-change" in topics(found)


def test_blocks_without_motion_under_compensation() -> None:
    text = CUT + "G0 X20. Z2.\nG42 G1 Z0\nZ-9.\n{}X30. Z-15.\nG40 G0 X40."
    assert "compensation-blank-blocks" in topics(carried_out(text.format("M8\nS600\n")))
    assert "compensation-blank-blocks" not in topics(carried_out(text.format("M8\n")))


def test_tool_without_a_nose_runs_on_the_programmed_path() -> None:
    drill = declared(tools={1: Tool(1, "T1", "drilling", diameter=8.0)})
    found = carried_out(CUT + "G0 X20. Z2.\nG42 G1 Z0\nZ-9.\nG40 G0 X30.", drill)
    assert rows(found) == [("R", 20, 2), ("F", 20, 0), ("F", 20, -9), ("R", 30, -9)]


# -- corner words --------------------------------------------------------------------------------------


def test_corner_lines_keep_their_own_lines_and_feeds() -> None:
    found = carried_out(CUT + "G0 X20. Z2.\nG1 Z-20.,R3. F.3\nM8\nX40. F.1")
    assert [(move.line, move.feed and move.feed.value) for move in found.moves[1:]] == [(4, 0.3), (4, 0.3), (6, 0.1)]


def test_a_corner_that_no_straight_move_follows() -> None:
    found = carried_out(CUT + "G0 X20. Z2.\nG1 Z-20.,R3.\nG0 X40.")
    assert not_audited(found) == [4]
    assert rows(found)[-1] == ("R", 40, -20)
    assert found.moves[-1].new_stock_state


def test_plain_corner_words_where_the_control_reads_them() -> None:
    setting = {"corner_words": "comma or plain"}
    chamfer = carried_out(CUT + "G0 X20. Z2.\nG1 Z-20. I2.\nX40.", settings=setting)
    assert rows(chamfer)[1:] == [("F", 20, -18), ("F", 24, -20), ("F", 40, -20)]
    rounding = carried_out(CUT + "G0 X20. Z2.\nG1 Z-20. R3.\nX40.", settings=setting)
    assert rows(rounding)[1:] == [("F", 20, -17), ("CW", 26, -20), ("F", 40, -20)]
    wrong = carried_out(CUT + "G0 X20. Z2.\nG1 Z-20. I-2.\nX40.", settings=setting)
    assert "cycle-corner" in topics(wrong)


def test_angle_words() -> None:
    found = carried_out(CUT + "G0 X20. Z0\nG1 ,A180.\nX40. Z-20. ,A135.\nU2.,A150.")
    # 45 degrees up from Z-10 to X40 Z-20; then 1 mm up at 30 degrees
    assert rows(found)[1:3] == [("F", pytest.approx(20), pytest.approx(-10)), ("F", 40, -20)]
    assert found.moves[-1].end == pytest.approx((-20 - 3**0.5, 21.0))


def test_distance_from_a_corner_known_by_its_angle_only() -> None:
    found = carried_out(CUT + "G0 X20. Z0\nG1 ,A180.\nU20. W-10. ,A135.")
    assert "cycle-corner" in topics(found)
    assert found.not_audited


def test_corners_inside_a_profile() -> None:
    text = CUT + "G0 X42. Z2.\nG70 P1 Q2\nM30\nN1 G0 X20.\nG1 Z-10.,C2.\nN2 X40."
    assert [row for row in rows(carried_out(text)) if row[0] == "F"] == [("F", 20, -8), ("F", 24, -10), ("F", 40, -10)]
    last = carried_out(CUT + "G0 X42. Z2.\nG70 P1 Q2\nM30\nN1 G0 X20.\nN2 G1 Z-10.,C2.")
    assert "cycle-corner" in topics(last)
    assert not_audited(last) == [4]


def test_corner_words_compensated() -> None:
    found = carried_out(CUT + "G0 X16. Z4.\nG42 G1 X16. Z2.\nX26. Z-3.\nZ-24.,R4.\nX44.\nG40 G0 X50.")
    arc = next(move for move in found.moves if move.kind is Kind.ARC)
    assert arc.centre is not None
    assert arc.end is not None
    # the fillet of the worked example: nose centre on R - r = 3.2
    assert ((arc.end.z - arc.centre.z) ** 2 + (arc.end.r - arc.centre.r) ** 2) ** 0.5 == pytest.approx(3.2)
