"""Where the tool is, and where it is not known: reference points, presets, zeros, blocks left out.

The rules tested are the product's own contract (what is audited from an unknown position); numbers by hand.
"""

from __future__ import annotations

import pytest

from auditor.declared.model import Control, Point
from auditor.interpret.moves import Kind
from tests.interpret.programs import carried_out, declared, not_audited, rows, topics

FIXED = Point(150.0, 100.0)  # X200 Z150
CUT = "G97 S500 M3 F.2\nT0101\n"


def test_first_move_starts_at_the_tool_change_position_or_nowhere() -> None:
    assert carried_out("G0 X50. Z2.").moves[0].start is None
    assert carried_out("G0 X50. Z2.", declared(start=FIXED)).moves[0].start == FIXED


def test_axis_not_yet_stated_is_unknown_axis_by_axis() -> None:
    move = carried_out("G0 X50.").moves[0]
    assert (move.start_r, move.end_r, move.start_z, move.end_z) == (None, 25.0, None, None)


def test_an_unknown_end_has_no_spindle_speed_of_its_own() -> None:
    found = carried_out("G50 S2000\nG96 S200 M3\nG0 X50. Z2.\nG28 U0")
    assert [move.spindle.fixed_diameter for move in found.moves] == [50.0, None]


def test_return_to_an_undeclared_reference_point_is_a_move_to_nowhere() -> None:
    found = carried_out("G0 X50. Z2.\nG28 U0\nG0 Z5.\nG0 X40. Z1.\nG28 U0 W0")
    assert rows(found) == [("R", 50, 2), ("R", None, 2), ("R", None, 5), ("R", 40, 1), ("R", None, None)]
    assert found.not_audited == ()
    assert "home-unknown" in topics(found)


def test_return_through_an_absolute_point_goes_there_first() -> None:
    found = carried_out("G0 X50. Z2.\nG28 X60. Z5.", declared(fixed=FIXED))
    assert rows(found)[1:] == [("R", 60, 5), ("R", 200, 150)]
    assert "return-through-point" in topics(found)


def test_straight_return_in_systems_b_and_c() -> None:
    job = declared(Control(system="B", system_declared=True, units="mm"), fixed=FIXED)
    found = carried_out("G90 G0 X50. Z2.\nG91 G28 X0 Z0\nG90 G0 X40. Z2.", job)
    assert rows(found) == [("R", 50, 2), ("R", 200, 150), ("R", 40, 2)]
    assert "return-through-point" not in topics(found)


def test_second_reference_point_and_machine_coordinates() -> None:
    found = carried_out("G0 X50. Z2.\nG30 U0 W0\nG0 X50. Z2.\nG53 X-20. Z-10.", declared(fixed=FIXED))
    assert rows(found)[1] == ("R", 200, 150)
    assert rows(found)[3] == ("R", 180, 140)


def test_further_reference_points_are_unknown() -> None:
    found = carried_out("G0 X50. Z2.\nG30 P3 U0 W0", declared(fixed=FIXED))
    assert rows(found)[1] == ("R", None, None)
    assert "home-unknown" in topics(found)


def test_a_cut_from_an_unknown_point_is_not_audited_and_restates_its_end() -> None:
    found = carried_out(CUT + "G0 X50. Z2.\nG28 U0 W0\nG1 X40. Z1.\nG1 Z-5.")
    assert not_audited(found) == [5]
    assert rows(found)[-1] == ("F", 40, -5)
    assert found.moves[-1].new_stock_state


def test_an_arc_from_an_unknown_point_is_not_audited() -> None:
    found = carried_out(CUT + "G0 X50.\nG3 X60. Z-5. R5.\nG1 Z-9.")
    assert not_audited(found) == [4]
    assert rows(found)[-1] == ("F", 60, -9)


def test_preset_renames_the_point() -> None:
    found = carried_out("G0 X100. Z50.\nG50 X120. Z60.\nG0 U-10. W-10.")
    assert rows(found)[-1] == ("R", 110, 50)
    assert "preset" in topics(found)


def test_system_a_shifts_the_coordinates_by_u_and_w() -> None:
    assert rows(carried_out("G0 X100. Z50.\nG50 U2. W-1.\nG0 W0"))[-1] == ("R", 102, 49)


def test_local_zero_shifts_what_is_programmed_not_the_part() -> None:
    found = carried_out(CUT + "G0 X50. Z2.\nG52 Z-30.\nG0 Z2.\nG1 W-1.\nG52 Z0\nG0 Z2.")
    assert [z for _, _, z in rows(found)] == [2, -28, -29, 2]
    assert "local-shift" in topics(found)


def test_cycles_read_their_words_from_the_local_zero() -> None:
    plain = carried_out(CUT + "G0 X62. Z2.\nG90 X58. Z-10. F.2")
    moved = carried_out(CUT + "G52 Z-20.\nG0 X62. Z2.\nG90 X58. Z-10. F.2")
    assert [(x, z - 20) for _, x, z in rows(plain)] == [(x, z) for _, x, z in rows(moved)]


def test_the_first_work_zero_is_the_declared_one_any_other_is_unknown() -> None:
    found = carried_out("G54\nG0 X50. Z2.\nG55\nG0 Z0\nG0 X40. Z1.\nG54 G0 X30. Z2.\nX20.")
    assert rows(found) == [("R", 50, 2), ("R", None, 0), ("R", 40, 1), ("R", 30, 2), ("R", 20, 2)]
    assert [move.provisional for move in found.moves] == [False, True, True, False, False]
    assert "work-zero-changed" in topics(found)


def test_a_single_work_zero_is_nothing_to_speak_of() -> None:
    assert "work-zero-changed" not in topics(carried_out("G55\nG0 X50. Z2.\nG55\nG0 X40."))


def test_data_input_moves_nothing() -> None:
    found = carried_out("G0 X50. Z2.\nG10 P1 X0.1 Z0.2\nG10 L50\nN1401 P1 R100\nG11\nG0 X40.")
    assert rows(found) == [("R", 50, 2), ("R", 40, 2)]
    assert "data-input" in topics(found)


@pytest.mark.parametrize("code", ["G4 X5.", "G4 U1.", "G28", "G50 S2000", "G10 P1 X1. Z1."])
def test_functions_that_use_axis_words_themselves_move_nothing(code: str) -> None:
    assert len(carried_out(f"G0 X50. Z2.\n{code}").moves) == 1


def test_radius_words() -> None:
    found = carried_out("G0 X25. Z2.\nG0 U5.", x_words="radius")
    assert rows(found) == [("R", 50, 2), ("R", 60, 2)]


def test_mirrored_arcs_turn_the_other_way() -> None:
    text = CUT + "G0 X20. Z0\nG2 X30. Z-5. I0 K-5."
    assert carried_out(text.replace("G2", "G3")).moves[-1].clockwise is False
    mirrored = carried_out(text, arcs="mirrored").moves[-1]
    assert mirrored.clockwise is False
    assert mirrored.centre == Point(-5.0, 10.0)


def test_an_impossible_arc_is_left_out_and_the_path_goes_on_from_its_end() -> None:
    found = carried_out(CUT + "G0 X20. Z0\nG3 X40. Z-10. R5.\nG1 Z-20.")
    assert not_audited(found) == [4]
    assert rows(found)[-1] == ("F", 40, -20)
    assert found.moves[-1].new_stock_state


def test_centre_of_an_arc_whose_ends_differ_within_the_tolerance_lies_between_them() -> None:
    move = carried_out(CUT + "G0 X20. Z0\nG3 X29.99 Z-5. I0 K-5.").moves[-1]
    assert move.centre is not None
    assert move.start is not None
    assert move.end is not None
    near, far = (
        ((point.z - move.centre.z) ** 2 + (point.r - move.centre.r) ** 2) ** 0.5 for point in (move.start, move.end)
    )
    assert near == pytest.approx(far)
    assert near == pytest.approx(5.0, abs=0.01)


def test_negative_radius_is_refused_or_the_long_way_round() -> None:
    text = CUT + "G0 X20. Z0\nG3 X20. Z-6. R-5."
    assert "arc-impossible" in topics(carried_out(text))
    move = carried_out(text, settings={"negative_arc_radius": "over half"}).moves[-1]
    assert move.centre == Point(-3.0, 14.0)  # 3-4-5 triangle, the far centre
    assert move.kind is Kind.ARC


def test_most_arcs_the_long_way_round_are_suspect() -> None:
    text = CUT + "G0 X20. Z0\nG2 X30. Z-5. I0 K-5.\nG1 Z-10.\nG2 X40. Z-15. I0 K-5."
    assert {"arc-over-half", "arc-sense-suspect"} <= topics(carried_out(text))
