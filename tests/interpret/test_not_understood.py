"""What is not followed: said, counted, and the rest goes on. The rules are the product's own contract."""

from __future__ import annotations

import pytest

from auditor.declared.model import Control
from auditor.interpret.detection import detect, marks_of
from auditor.parse import parse_text
from tests.interpret.programs import carried_out, declared, not_audited, rows, topics

CUT = "T0101\nG97 S500 M3 F.2\nG0 X50. Z2.\n"


def test_unreadable_block_leaves_position_and_its_words_unknown() -> None:
    found = carried_out(CUT + "G1 X--40. F.3 S900\nG1 Z-5.\nG0 X50. Z2.\nG1 Z-5.\nF.1 S700 Z-6.")
    assert not_audited(found) == [4, 5]
    assert rows(found)[1:] == [("R", 50, 2), ("F", 50, -5), ("F", 50, -6)]
    _, rapid, unsure, sure = found.moves
    assert (unsure.feed, unsure.provisional, rapid.provisional) == (None, True, False)
    assert (sure.feed and sure.feed.value, sure.spindle.value, sure.provisional) == (0.1, 700.0, False)
    assert all(move.new_stock_state for move in found.moves[1:])
    assert "feed-missing" not in topics(found)


def test_unreadable_block_without_axis_letters_keeps_the_position() -> None:
    found = carried_out(CUT + "S5.0.0\nG1 Z-5.")
    assert not_audited(found) == [4]
    assert rows(found)[-1] == ("F", 50, -5)
    assert found.moves[-1].provisional


def test_motion_code_that_can_be_made_out_still_counts() -> None:
    found = carried_out(CUT + "G1 X4O. Z0\nX40. Z1.\nZ-5.")
    assert not_audited(found) == [4, 5]
    assert rows(found)[-1] == ("F", 40, -5)


def test_motion_code_that_cannot_be_made_out_has_to_be_restated() -> None:
    found = carried_out(CUT + "GO X40. Z1.\nX40. Z1.\nG0 X40. Z1.")
    assert not_audited(found) == [4, 5]
    assert rows(found)[-1] == ("R", 40, 1)


def test_letters_without_a_meaning_are_said() -> None:
    assert "unsupported" in topics(carried_out(CUT + "G1 X40. Q3 F.2"))
    assert "unsupported" in topics(carried_out(CUT + "G1 X1E1"))
    for block in ("G1 X40. M98 P7", "G32 Z-9. F1. Q180000", "G54.1 P2 G0 X40."):
        assert "unsupported" not in topics(carried_out(CUT + block))


@pytest.mark.parametrize(
    "block",
    ["G83 X20. C90. Z-5. R-1. F.1", "G0 X40. C90.", "Y5.", "G1 X40. Z-1. B30.", "G0 A90.", "G87 X30. Z-5. R5. F.1"],
)
def test_words_of_other_axes_are_fenced_off(block: str) -> None:
    found = carried_out(CUT + block + "\nG0 X60. Z5.")
    assert not_audited(found) == [4]
    assert rows(found)[-1] == ("R", 60, 5)


def test_polar_interpolation_is_left_out_until_it_ends() -> None:
    found = carried_out(CUT + "G112\nG1 X40. C5.\nG1 X30.\nG113\nG0 X60. Z5.")
    assert not_audited(found) == [5, 6]
    assert rows(found)[-1] == ("R", 60, 5)


@pytest.mark.parametrize(
    "block", ["G1 X40. I2.", "G0 X40. R3.", "G1 X40. A30.", "G3 X40. Z-5. R5. ,C1.", "G32 Z-9. I1.", "G0 ,C2."]
)
def test_words_without_a_meaning_in_the_block_leave_it_out(block: str) -> None:
    found = carried_out(CUT + block)
    assert not_audited(found) == [4]
    assert {"unsupported", "axis-not-modelled"} & topics(found)


def test_u_and_w_belong_to_system_a() -> None:
    found = carried_out(CUT + "G1 U-2. W-1.", system="B")
    assert not_audited(found) == [4]


@pytest.mark.parametrize("block", ["G31 X40. F.1", "G29 X40. Z1.", "G35 X40. Z-5. R5. F1."])
def test_known_functions_that_are_no_plain_turning(block: str) -> None:
    assert not_audited(carried_out(CUT + block)) == [4]


def test_code_without_axis_words_is_only_said() -> None:
    found = carried_out(CUT + "G187 P2\nM137\nM137\nG1 Z-5.")
    assert found.not_audited == ()
    unknown = [remark.topic for remark in found.remarks if remark.topic.startswith("unknown")]
    assert unknown == ["unknown-g", "unknown-m"]


def test_a_motion_left_out_takes_no_call_and_no_end_away() -> None:
    found = carried_out("T0101 M3 S500 F.2\nG1 Z-5. M98 P7\nG187 X5. M30\nG0 X1. Z1.\nO7\nG0 X60. Z5.\nM99")
    assert not_audited(found) == [2, 3]
    assert rows(found) == [("R", 60, 5)]
    assert found.ended == "M30"


def test_depth_block_of_a_cycle_needs_no_position() -> None:
    found = carried_out("T0101\nG97 S500 M3 F.2\nG71 U2. R.5\nG0 X62. Z2.\nG71 P1 Q2 F.3\nN1 G0 X50.\nN2 G1 Z-9.")
    assert found.not_audited == ()
    assert not_audited(carried_out(CUT + "G28 U0 W0\nG74 R1.\nG74 Z-9. Q5000")) == [6]


def test_a_roughing_cycle_that_cannot_start_takes_its_profile_along() -> None:
    for start in ("G28 U0 W0", "G0 X40. Z2."):  # position unknown; no infeed to the profile
        found = carried_out(CUT + f"{start}\nG71 U2. R.5\nG71 P1 Q2 F.3\nN1 G0 X40.\nN2 G1 Z-9.\nG0 X70. Z5.")
        assert not_audited(found) == [6]
        assert [row for row in rows(found) if row[0] == "F"] == []
        assert rows(found)[-1] == ("R", 70, 5)


def test_unknown_code_with_axis_words_loses_the_motion_code() -> None:
    found = carried_out(CUT + "G187 X40. F.1\nZ-5.\nG1 X40. Z-5.\nZ-6.")
    assert not_audited(found) == [4, 5, 6]
    assert rows(found)[-1] == ("F", 40, -6)


def test_text_that_is_no_program() -> None:
    found = carried_out("Dear Sir,\nplease find enclosed\n\x00\xff")
    assert found.moves == ()
    assert found.not_audited
    assert carried_out("").moves == ()


def test_notes_of_the_reader_become_remarks() -> None:
    assert "text-after-end" in topics(carried_out("%\nO1\nG0 X9. Z9.\nM30\n%\nG0 X-99."))


def test_missing_end() -> None:
    assert "end-missing" in topics(carried_out("G0 X9. Z9."))
    for end in ("M30", "M2", "M99"):
        assert "end-missing" not in topics(carried_out(f"G0 X9. Z9.\n{end}"))


def test_repeated_words_and_codes() -> None:
    assert "word-repeated" in topics(carried_out("G0 X9. X8. Z2."))
    assert "word-repeated" in topics(carried_out("G0 X9. U8. Z2."))
    assert "code-group-repeated" in topics(carried_out("G0 G1 X9. Z2. F.1"))
    assert "m-codes-many" in topics(carried_out("M3 M8 M41 M10"))
    assert not {"word-repeated", "code-group-repeated", "m-codes-many"} & topics(
        carried_out("G65 P7 I1. I2.\nM30\nO7\nM99")
    )


# -- code systems --------------------------------------------------------------------------------------

SYSTEM_A = "G50 S2500\nG96 S200 M3\nG0 X62. Z2.\nG71 U2. R.5\nG71 P1 Q2 U.4 W.1 F.3\nN1 G0 X30.\nN2 G1 Z-20.\nG28 U0 W0"
SYSTEM_B = "G21\nG92 S2500\nG95 G96 S200 M3\nG90 G0 X62. Z2.\nG77 X58. Z-20. F.2\nG91 G28 X0 Z0"
SYSTEM_C = "G71\nG92 S2500\nG95 G96 S200 M3\nG90 G0 X62. Z2.\nG73 U2. R.5\nG73 P1 Q2 U.4 W.1 F.3\nG20 X58. Z-20. F.2"


@pytest.mark.parametrize(("text", "system"), [(SYSTEM_A, "A"), (SYSTEM_B, "B"), (SYSTEM_C, "C"), ("G0 X1. Z1.", "A")])
def test_code_system_is_found_by_its_marks(text: str, system: str) -> None:
    found = detect(marks_of(parse_text(text).blocks), "A")
    assert found.system == system
    assert found.conflict == ()
    job = declared(Control(units="mm"))
    interpretation = carried_out(text, job)
    assert interpretation.system == system
    assert next(a.value for a in interpretation.assumptions if a.about == "control.system") == system


def test_marks_of_two_systems_are_a_conflict() -> None:
    found = carried_out("G50 S2500\nG95 F.2\nG0 U2. W1.\nG32 Z-5. F1.", declared(Control(units="mm")))
    assert found.system == "A"
    assert "code-system-conflict" in topics(found)


def test_marks_against_the_declared_system() -> None:
    assert "code-systems-mixed" in topics(carried_out("G21 X58. Z-30. F1.5"))
    assert "code-systems-mixed" not in topics(carried_out(SYSTEM_A))
    assert "code-systems-mixed" not in topics(carried_out(SYSTEM_B, system="B"))
    assert "code-systems-mixed" not in topics(carried_out(SYSTEM_C, system="C"))
