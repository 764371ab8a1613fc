"""Settings of the control that refuse something, or change what is said: each with and without."""

from __future__ import annotations

from typing import Any

import pytest

from auditor.declared.model import Control, Point, Tool
from auditor.interpret.moves import Interpretation
from auditor.parse import parse_text
from tests.interpret.programs import carried_out, declared, not_audited, rows, topics

TURN = "T0101\nG97 S500 M3 F.2\nG0 X42. Z2.\n"


def under(text: str, **settings: Any) -> Interpretation:
    """A text read by a control with these settings; the reference point lies at X300 Z200."""
    control = Control(system_declared=True, units="mm", settings=settings)
    return carried_out(text, declared(control, start=Point(100.0, 100.0), fixed=Point(200.0, 150.0)))


def test_a_word_that_stands_twice() -> None:
    text = TURN + "G0 X40. X38.\nG1 Z0 F.1 F.2\nZ-5."
    assert rows(under(text))[-2:] == [("F", 38.0, 0.0), ("F", 38.0, -5.0)]
    refused = under(text, repeated_words="refuse")
    assert not_audited(refused) == [4, 5]
    assert rows(refused)[-1] == ("F", 38.0, -5.0)  # G1 is in force behind the refused block


def test_a_taper_in_the_other_letter() -> None:
    text = TURN + "G90 X40. Z-10. R-1.\nX38."
    assert under(text).not_audited == ()
    # without its taper the cycle is another one; nothing behind may repeat it
    assert not_audited(under(text, taper_letter="I or K")) == [4, 5]


@pytest.mark.parametrize(("setting", "said"), [("next move", False), ("at once", True)])
def test_an_offset_that_moves_the_axes_at_once(setting: str, said: bool) -> None:
    at_work = under("T0101\nG0 X42. Z2.\nT0100\nG28 U0 W0", offset_acts=setting)
    assert ("tool-in-motion" in topics(at_work)) is said
    at_home = under("T0101\nG0 X42. Z2.\nG28 U0 W0\nT0100", offset_acts=setting)
    assert "tool-in-motion" not in topics(at_home)


def test_compensated_roughing_ignores_the_move_that_leaves_the_path() -> None:
    # nose 0.8, tip 3: X of cylinders and Z of faces stay, a 45 degree slope moves by 0.8 * (1 - tan 22.5) = 0.4686
    profile = "N10 G0 G42 X30.\nG1 Z-10.\nX34. Z-12.\nN20 G40 X42."
    found = under(TURN + "G71 U3. R.5\nG71 P10 Q20 U0 W0 F.3\n" + profile, rough_compensation=True)
    assert found.not_audited == ()
    ends = [row for row in rows(found) if row[0] == "F"]
    assert ends[-3] == ("F", 30.0, pytest.approx(-10.4686, abs=1e-4))
    assert [row[2] for row in ends[-2:]] == pytest.approx([-12.0, -12.0])


def test_a_cut_in_machine_coordinates_that_cannot_be_placed() -> None:
    text = "M3 S9 F.2\nG0 X40. Z2.\nG1 G53 X-20. Z-10.\nX5.\nG0 X9. Z3."
    found = carried_out(text, declared(Control(settings={"machine_position_move": "active"}), start=Point(1.0, 1.0)))
    assert not_audited(found) == [3, 4]
    assert rows(found)[-1] == ("R", 9.0, 3.0)


def test_m_codes_in_a_block() -> None:
    text = "G0 X5. M3 M8 S100"
    assert "m-codes-many" not in topics(under(text))
    assert "m-codes-many" in topics(under(text, m_codes_per_block=1))


def test_where_a_block_number_is_searched() -> None:
    text = "N5 G0 X1.\nIF[#1EQ1]GOTO9\n#1=1\nGOTO5\nG0 X2.\nN5 G0 X3.\nM30\nN9 G0 X4."
    assert [x for _, x, _ in rows(under(text))] == [1.0, 3.0]
    assert [x for _, x, _ in rows(under(text, sequence_search="from start"))] == [1.0, 1.0, 4.0]


def test_where_a_profile_is_searched() -> None:
    first, second = ("N10 G0 X40.\nN20 G1 Z-5.\n", "N10 G0 X38.\nN20 G1 Z-9.\n")
    text = TURN + "G70 P10 Q20\nGOTO5\n" + first + "N5 G70 P10 Q20\nM30\n" + second
    assert [z for kind, _, z in rows(under(text)) if kind == "F"] == [-5.0, -9.0]
    assert [z for kind, _, z in rows(under(text, sequence_search="from start")) if kind == "F"] == [-5.0, -5.0]


def test_arc_ends_apart() -> None:
    text = TURN + "G1 X30. Z-40.\nG2 X40. Z-45.1 I5. K0"
    assert not_audited(under(text)) == [5]
    assert rows(under(text, arc_tolerance=0.2))[-1] == ("CW", 40.0, -45.1)


def test_arc_centres_as_points() -> None:
    found = under(TURN + "G1 X30. Z-40.\nG2 X40. Z-45. I20. K-40.", arc_centres="absolute")
    assert found.moves[-1].centre == Point(-40.0, 20.0)


def test_an_acute_corner_by_an_arc() -> None:
    # T3 of the worked examples: face outwards to X40, back along a flank to X36 Z-10; the tip goes round the corner
    text = "T0101\nG97 S500 M3 F.2\nG0 X16. Z4.\nG42 G1 X16. Z0.\nX40.\nX36. Z-10.\nZ-20.\nG40 X50."
    found = under(text, compensation_corner="arc")
    assert rows(found)[2] == ("F", pytest.approx(38.4), 0.0)
    kind, x, z = rows(found)[3]
    arc = found.moves[3]
    assert kind == "CCW"
    assert arc.centre == Point(pytest.approx(-0.8), pytest.approx(19.2))
    # 0.8 at right angles to the flank (2 down in r on 10 of z), seen from the centre
    assert (x, z) == (pytest.approx(2 * (19.2 + 0.8 * 10 / 104**0.5)), pytest.approx(-0.8 - 0.8 * 2 / 104**0.5))


def test_the_start_of_compensation_round_an_outside_corner() -> None:
    # from X10 Z4 to X20 Z2, then along the cylinder: offset by 0.8 to the right, the first line meets r = 10.8 at
    # t = (10.8 - 5 - 0.8 * 2 / sqrt(29)) / 5 of its way, at Z = 4 + 0.8 * 5 / sqrt(29) - 2 t; the tip lies 0.8 before
    text = "T0101\nG97 S500 M3 F.2\nG0 X10. Z4.\nG42 G1 X20. Z2.\nZ-10.\nG40 X50."
    way = (10.8 - 5.0 - 0.8 * 2 / 29**0.5) / 5.0
    assert rows(under(text))[1] == ("F", pytest.approx(20.0), pytest.approx(1.2))
    met = ("F", pytest.approx(20.0), pytest.approx(4.0 + 0.8 * 5 / 29**0.5 - 2.0 * way - 0.8))
    assert rows(under(text, compensation_start="intersection"))[1] == met


def test_one_block_thread_with_declared_passes() -> None:
    # D_n = 0.3 sqrt(n), from the third pass on the least step of 0.1, up to 0.9 - 0.1; then two passes at 0.9
    text = "M3 S500\nG0 X26. Z5.\nG76 X20. Z-20. K.9 D300 A0 F1.5"
    found = under(text, thread_finish_passes=2, thread_least_infeed=0.1, thread_finish_allowance=0.1)
    depths = [0.9 - (x - 20.0) / 2 for kind, x, _ in rows(found) if kind == "T" and x is not None]
    second = 0.3 * 2**0.5
    wanted = [0.3, second, second + 0.1, second + 0.2, second + 0.3, 0.8, 0.9, 0.9]
    assert depths == pytest.approx(wanted, abs=1e-9)


def test_nested_comments() -> None:
    text = "G0 X5. (A (B) C)\nZ1."
    assert parse_text(text).blocks[0].fault is not None
    assert parse_text(text, comment_nesting=True).blocks[0].fault is None


def test_tools_with_one_offset_digit() -> None:
    control = Control(system_declared=True, units="mm", settings={"offset_digits": 1.0})
    job = declared(control, {2: Tool(2, "T2", "turning")}, start=Point(1.0, 1.0))
    found = carried_out("T21\nG0 X5.", job)
    assert (found.moves[0].tool, found.moves[0].offset) == (2, 1)


@pytest.mark.parametrize("behind", ["G32 Z-30. F2.", "G90 X18. Z-30. F.1", "G75 X18. P500 F.1", "G28 U0 W0"])
def test_compensation_left_on_leaves_no_gap_and_keeps_the_order(behind: str) -> None:
    found = under("T0101\nG97 S500 M3 F.2\nG0 X30. Z4.\nG42 G1 X20. Z2.\nZ-10.\n" + behind)
    assert "compensation-left-on" in topics(found)
    lines = [move.line for move in found.moves]
    assert lines == sorted(lines)
    for move, after in zip(found.moves, found.moves[1:], strict=False):
        assert (after.start_z, after.start_r) == (move.end_z, move.end_r)
