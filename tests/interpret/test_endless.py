"""Programs that never end: said, cut short, and quickly so."""

from __future__ import annotations

import time

import pytest

from tests.interpret.programs import carried_out, not_audited, rows, topics

TURN = "G97 S500 M3 F.2\nG0 X62. Z2.\n"
BOX = "G1 Z-5.\nX63.\nG0 Z2.\nX62.\n"


def test_a_loop_in_which_nothing_changes_is_carried_out_once() -> None:
    found = carried_out(TURN + "WHILE[1EQ1]DO1\n" + BOX + "END1\nG0 X70.\nM30")
    assert "endless" in topics(found)
    assert len(found.moves) == 1 + 4
    assert not_audited(found) == [8]


@pytest.mark.parametrize(
    "loop",
    [
        "N10 #1=#1+1\nG0 X[60+#1/1000]\nGOTO10",  # something changes, and still no end
        "WHILE[1EQ1]DO1\nG1 W-.001\nEND1",
        "DO1\n#100=#100+1\nM98 P5\nEND1\nM30\nO5\n" + BOX * 10 + "M99",
        "WHILE[#3LT0]DO1\nEND1\nDO1\n#1=#1+1\n#2=#1*2\n#3=SIN[#2]\nEND1",
    ],
)
def test_a_loop_that_moves_on_for_ever_is_cut_short(loop: str) -> None:
    before = time.perf_counter()
    found = carried_out(TURN + loop)
    assert "endless" in topics(found)
    assert found.not_audited
    assert len(found.moves) < 1000
    assert time.perf_counter() - before < 20  # a second or so; a loaded machine takes longer


def test_long_loops_that_end_are_left_whole() -> None:
    text = TURN + "#1=0\nWHILE[#1LT1500]DO1\n" + BOX + "#1=#1+1\nEND1\nG0 X70.\nM30"
    found = carried_out(text)
    assert "endless" not in topics(found)
    assert len(found.moves) == 1 + 1500 * 4 + 1
    assert rows(found)[-1] == ("R", 70.0, 2.0)


def test_nested_loops_over_the_same_blocks_are_no_repetition() -> None:
    # the inner loop finds X and Z as they were, its counter reset: only the outer counter tells the rounds apart
    inner = "#2=0\nWHILE[#2LT2]DO2\n" + BOX + "#2=#2+1\nEND2\n"
    found = carried_out(TURN + "#1=0\nWHILE[#1LT3]DO1\n" + inner + "#1=#1+1\nEND1\nM30")
    assert "endless" not in topics(found)
    assert len(found.moves) == 1 + 3 * 2 * 4
