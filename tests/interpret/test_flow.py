"""Subprograms, macros, jumps and loops: which blocks run, in which order, and what stops them."""

from __future__ import annotations

from pathlib import Path

import pytest

from auditor.declared.model import Control
from auditor.interpret import interpret
from auditor.parse import read_program
from tests.interpret.programs import carried_out, declared, not_audited, rows, topics

CUT = "T0101\nG97 S500 M3 F.2\nG0 X50. Z2.\n"


def ends(text: str) -> list[float | None]:
    """Z of all moves."""
    return [z for _, _, z in rows(carried_out(text))]


def test_call_with_count_before_four_digits_unless_such_a_program_exists() -> None:
    assert ends("G0 X9. Z9.\nM98 P20007\nM30\nO7\nG0 W-1.\nM99") == [9, 8, 7]
    assert ends("G0 X9. Z9.\nM98 P20007\nM30\nO20007\nG0 W-5.\nM99") == [9, 4]


def test_call_within_the_program_and_from_a_block_of_another() -> None:
    assert ends("G0 X9. Z9.\nM98 H100\nM30\nN100 G0 W-1.\nM99") == [9, 8]
    assert ends("G0 X9. Z9.\nM98 P7 Q20\nM30\nO7\nG0 W-5.\nN20 G0 W-1.\nM99") == [9, 8]


def test_call_by_name() -> None:
    assert ends("G0 X9. Z9.\nM98 <NECK>\nM30\n<NECK>\nG0 W-1.\nM99") == [9, 8]


def test_return_to_a_block_of_the_caller_and_dropped_repeats() -> None:
    assert ends("G0 X9. Z9.\nM98 P7\nG0 Z1.\nN50 G0 Z0\nM30\nO7\nG0 W-1.\nM99 P50") == [9, 8, 0]
    assert ends("G0 X9. Z9.\nM98 P7 L5\nM30\nO7\nG0 W-1.\nM99 L0") == [9, 8]


def test_nested_calls() -> None:
    text = "G0 X9. Z9.\nM98 P1 L2\nG0 Z0\nM30\nO1\nG0 W-1.\nM98 P2\nM99\nO2\nG0 W-.5\nM99"
    assert ends(text) == [9, 8, 7.5, 6.5, 6, 0]


def test_macro_after_every_motion_block() -> None:
    text = "G0 X9. Z9.\nG66 P7 A2.\nG0 Z5.\nS500\nG0 Z4.\nG67\nG0 Z3.\nM30\nO7\nG0 W-#1\nM99"
    assert ends(text) == [9, 5, 3, 4, 2, 3]


def test_arguments_of_a_macro() -> None:
    text = "G65 P7 X30. Z-4. Q2. F.3\nM30\nO7\nG0 X#24 Z#26\nW-#17\nX[#24+#9*10.]\nM99"
    assert rows(carried_out(text)) == [("R", 30, -4), ("R", 30, -6), ("R", 33, -6)]


def test_a_missing_subprogram_is_not_audited_and_the_rest_is_when_restated() -> None:
    found = carried_out(CUT + "G1 Z0\nM98 P77\nG1 Z-5.\nG0 X50. Z2.\nG1 Z-5.\nM30")
    assert not_audited(found) == [5, 6]
    assert rows(found)[-2:] == [("R", 50, 2), ("F", 50, -5)]
    assert found.moves[-1].new_stock_state
    assert found.moves[-1].provisional


def test_subprogram_file_beside_the_program(tmp_path: Path) -> None:
    main = tmp_path / "part.nc"
    main.write_text("O1\nG0 X9. Z9.\nN40 M98 P1234\nG65 P9010 W-3.\nM30\n", encoding="utf-8")
    (tmp_path / "O1234").write_text("%\nO1234\nN5 G0 W-1.\nG0 W-1.\nM99\n%", encoding="utf-8")
    (tmp_path / "o9010.NC").write_text("O9010\nG0 W#23\nM99\n", encoding="utf-8")
    found = interpret(read_program(main, Control()), declared(program=str(main)))
    assert [z for _, _, z in rows(found)] == [9, 8, 7, 4]
    assert [(move.line, move.block) for move in found.moves] == [
        (2, None), (3, "O1234 N5"), (3, "O1234 line 4"), (4, "O9010 line 2"),
    ]  # fmt: skip


def test_a_subprogram_standing_first_is_not_the_main_program() -> None:
    assert ends("O7\nG0 W-1.\nM99\nO1\nG0 X9. Z9.\nM98 P7\nM30") == [9, 8]


def test_a_program_that_nothing_calls_is_said() -> None:
    found = carried_out("O1\nG0 X9. Z9.\nM30\nO2\nG0 X-9.\nM30")
    assert rows(found) == [("R", 9, 9)]
    assert [remark.line for remark in found.remarks if remark.topic == "program-not-called"] == [4]


def test_bar_work_that_starts_over_is_audited_for_one_pass() -> None:
    for end in ("M99", "M99 P10", "IF[#3901LT100]GOTO10\nM30"):
        found = carried_out(f"N10 G0 X9. Z9.\nG0 X8.\n{end}")
        assert rows(found) == [("R", 9, 9), ("R", 8, 9)]
        assert {"repeats-main", "unknown-variable"} & topics(found)
        assert "endless" not in topics(found)


def test_a_loop_over_what_only_the_control_knows_runs_once() -> None:
    found = carried_out("G0 X9. Z9.\nWHILE[#500LT9]DO1\nG0 W-1.\nEND1\nG0 W-1.")
    assert [z for _, _, z in rows(found)] == [9, 8, 7]
    assert found.moves[-1].provisional


def test_nested_loops_with_one_label_in_sequence() -> None:
    text = "G0 X9. Z0\n#1=0\nWHILE[#1LT2]DO1\n#2=0\nWHILE[#2LT2]DO2\nG0 W1.\n#2=#2+1\nEND2\n#1=#1+1\nEND1\n"
    text += "#1=0\nWHILE[#1LT1]DO1\nG0 W10.\n#1=#1+1\nEND1"
    assert ends(text) == [0, 1, 2, 3, 4, 14]


def test_jumps() -> None:
    assert ends("G0 X9. Z9.\n#1=20\nGOTO#1\nG0 Z5.\nN20 G0 Z1.") == [9, 1]
    assert ends("G0 X9. Z9.\n#1=0\nN10 #1=#1+1\nG0 W-1.\nIF[#1LT3]GOTO10\nG0 Z0") == [9, 8, 7, 6, 0]
    assert ends("G0 X9. Z9.\nGOTO0\nG0 Z1.") == [9, 1]


def test_a_number_used_as_a_target_twice_in_the_text() -> None:
    found = carried_out("GOTO10\nN10 G0 X9. Z9.\nN10 G0 X8.")
    assert "number-repeated" in topics(found)
    assert "number-repeated" not in topics(carried_out("N10 G0 X9. Z9.\nN10 G0 X8."))


@pytest.mark.parametrize("text", ["DO1\nEND1", "WHILE[1EQ1]DO1\nG0 X1. Z1.\nEND1", "O1\nM98 P1\nM99", "N1\nGOTO1"])
def test_what_does_not_end_is_stopped(text: str) -> None:
    found = carried_out(text)
    assert "endless" in topics(found)
    assert found.not_audited


def test_loop_without_its_end() -> None:
    assert "target-missing" in topics(carried_out("WHILE[1EQ1]DO1\nG0 X9. Z9."))
    assert "target-missing" in topics(carried_out("END1\nG0 X9. Z9."))


def test_alarm_of_the_program_ends_it() -> None:
    found = carried_out("G0 X9. Z9.\n#3000=5(NO BAR)\nG0 X1.")
    assert rows(found) == [("R", 9, 9)]
    assert found.ended == "alarm"
    assert any("NO BAR" in remark.message for remark in found.remarks)


def test_block_skip_both_ways() -> None:
    text = "G0 X9. Z9.\n/G0 X1.\nG0 Z5."
    assert len(carried_out(text).moves) == 3
    assert rows(carried_out(text, block_skip=True)) == [("R", 9, 9), ("R", 9, 5)]
    assert "block-skip" in topics(carried_out(text))
    assert "block-skip" not in topics(carried_out("/M8\nG0 X9. Z9."))


def test_a_variable_that_only_the_control_knows_leaves_the_block_out() -> None:
    found = carried_out(CUT + "G1 X#500\nG1 Z-5.\nG0 X40. Z1.\n#1=#501\nG0 X#1")
    assert not_audited(found) == [4, 5, 8]
    assert not_audited(carried_out(CUT + "G1 Z0 F#500\nZ-1.")) == []
    assert "unknown-variable" in topics(found)


def test_values_of_the_control_that_follow_from_the_text() -> None:
    found = carried_out("T0102\nG0 X50. Z2. S600 F.3\nG0 X[#5001+1.] Z[#5002-1.]\nG0 X[#4119/10] Z#4109\nX#4120")
    assert rows(found)[1:] == [("R", 51, 1), ("R", 60, 0.3), ("R", 102, 0.3)]
