"""Feed, spindle and tool as a move carries them, and what is noticed when one is missing."""

from __future__ import annotations

import math

import pytest

from auditor.declared.model import Control, Point, Tool
from auditor.interpret.moves import Feed, Kind
from auditor.interpret.toolwords import ToolCall, read_tool_word
from auditor.parse.blocks import Number
from tests.interpret.programs import TURNING, carried_out, declared, not_audited, topics

START = "T0101\nG97 S500 M3 F.2\nG0 X50. Z2.\n"


def read(text: str, **settings: str | float | bool) -> ToolCall:
    return read_tool_word(Number(float(text), False, text), Control(settings=settings), {1, 2, 12})


@pytest.mark.parametrize(
    ("text", "tool", "offset"),
    [
        ("0101", 1, 1), ("101", 1, 1), ("0203", 2, 3), ("0100", 1, 0), ("0000", None, 0), ("1212", 12, 12),
        ("0", None, 0), ("5", 5, 5), ("12", 12, 12), ("010101", 1, 1), ("01001", 1, 1), ("00020002", 2, 2),
    ],
)  # fmt: skip
def test_tool_word_forms(text: str, tool: int | None, offset: int) -> None:
    call = read(text)
    assert (call.tool, call.offset) == (tool, offset)


def test_tool_word_settings() -> None:
    assert read("11", offset_digits=1.0) == ToolCall(1, 1)
    assert read("11", short_tool_word="offset") == ToolCall(None, 11)
    assert read("0102", offset_in_d_word=True) == ToolCall(102, None)


def test_offset_stays_behind_the_tool_word() -> None:
    found = carried_out("T0101\nG0 X50. Z2.\nT0100\nG0 X60.")
    assert [(move.tool, move.offset) for move in found.moves] == [(1, 1), (1, 0)]
    assert found.tools_called == ((1, 1),)


def test_undeclared_tool_is_said_once_and_its_moves_are_made() -> None:
    found = carried_out("T0505 M3 S500\nG0 X50. Z2.\nG1 Z0 F.2\nT0505\nG1 Z-2.")
    assert [remark.line for remark in found.remarks if remark.topic == "tool-undeclared"] == [1]
    assert {move.tool for move in found.moves} == {5}


def test_the_only_declared_tool_is_taken_when_none_is_called() -> None:
    found = carried_out("M3 S500\nG0 X50. Z2.\nG1 Z0 F.2")
    assert found.moves[-1].tool == 1
    assert "tools" in {assumption.about for assumption in found.assumptions}


def test_no_tool_called_among_several() -> None:
    job = declared(tools={1: TURNING, 2: Tool(2, "T2", "turning")})
    found = carried_out("M3 S500\nG0 X50. Z2.\nG1 Z0 F.2", job)
    assert found.moves[-1].tool is None
    assert "offset-missing" in topics(found)


def test_every_feed_move_of_a_drill_is_drilling() -> None:
    job = declared(tools={1: Tool(1, "T1", "drilling", diameter=10.0)})
    found = carried_out("T0101 M3 S500\nG0 X0 Z2.\nG1 Z-5. F.1\nG74 R1.\nG74 Z-20. Q8000", job)
    assert {move.kind for move in found.moves if move.feed} == {Kind.DRILL}


def test_feed_modes() -> None:
    found = carried_out(START + "G98 G1 Z0 F120.\nG99 Z-5. F.15")
    assert [move.feed for move in found.moves[1:]] == [Feed("min", 120.0), Feed("rev", 0.15)]
    assert not {"feed-mode-without-feed", "feed-implausible"} & topics(found)


def test_feed_not_given_again_changes_its_meaning_once() -> None:
    found = carried_out(START + "G1 Z0 F.2\nG98\nG1 Z-5.\nZ-6.")
    assert [remark.line for remark in found.remarks if remark.topic == "feed-mode-without-feed"] == [6]
    assert found.moves[-1].feed == Feed("min", 0.2)


def test_changing_the_feed_mode_to_and_fro_is_no_fault() -> None:
    assert "feed-mode-without-feed" not in topics(carried_out(START + "G1 Z0 F.2\nG98\nG99\nG1 Z-5."))


@pytest.mark.parametrize("feed", ["F0", "F-.2"])
def test_a_feed_that_moves_nothing(feed: str) -> None:
    found = carried_out(START + f"G1 Z0 {feed}")
    assert found.moves[-1].feed is None
    assert "feed-zero" in topics(found)


def test_feed_words_without_a_point_in_increments() -> None:
    found = carried_out(
        START + "G1 Z0 F25\nG98 Z-1. F120", whole_numbers="increments", settings={"feed_increment": 0.01}
    )
    assert [move.feed for move in found.moves[1:]] == [Feed("rev", 0.25), Feed("min", 120.0)]


def test_surface_speed_in_feet_per_minute() -> None:
    found = carried_out("G20\nT0101\nG50 S2000\nG96 S500 M3\nG0 X2. Z.1\nG1 Z0 F.01")
    assert found.moves[-1].spindle.value == pytest.approx(152.4)
    assert found.moves[-1].feed == Feed("rev", pytest.approx(0.254))


def test_a_rapid_under_surface_speed_runs_at_the_speed_of_its_end() -> None:
    text = "T0101\nG50 S2000\nG96 S200 M3\nG0 X50. Z2."
    assert carried_out(text).moves[0].spindle.fixed_diameter == 50.0
    assert carried_out(text, settings={"surface_speed_in_rapid": "continuous"}).moves[0].spindle.fixed_diameter is None


def test_limit_block_does_not_change_the_commanded_speed() -> None:
    found = carried_out(START + "G50 S2000\nG1 Z0")
    assert (found.moves[-1].spindle.value, found.moves[-1].spindle.clamp) == (500.0, 2000.0)


def test_spindle_speed_without_s_keeps_the_speed_reached() -> None:
    found = carried_out("T0101\nG50 S3000\nG96 S200 M3\nG0 X50. Z2.\nG97\nG1 Z0 F.2")
    assert found.moves[-1].spindle.mode == "rpm"
    assert found.moves[-1].spindle.value == pytest.approx(1000 * 200 / (math.pi * 50))
    assert "speed-mode-without-speed" in topics(found)


def test_limit_given_before_the_first_move_counts() -> None:
    assert "clamp-missing" not in topics(carried_out("T0101\nG96 S200 M3\nG50 S2000\nG0 X50. Z2."))


def test_limit_above_the_chuck() -> None:
    remark = next(r for r in carried_out("G50 S4500").remarks if r.topic == "clamp-too-high")
    assert (remark.value, remark.limit) == (4500, 4000)


def test_spindle_starts_with_its_block_and_stops_behind_it() -> None:
    found = carried_out("T0101\nG0 X50. Z2.\nG1 Z0 F.2 S500 M3\nZ-1. M5\nZ-2.")
    assert [move.spindle.direction for move in found.moves] == [0, 1, 1, 0]
    assert [remark.line for remark in found.remarks if remark.topic == "spindle-off"] == [5]


def test_a_bar_stop_feeds_with_the_spindle_still() -> None:
    job = declared(tools={1: Tool(1, "T1", "stop")})
    assert "spindle-off" not in topics(carried_out("T0101\nG0 X0 Z5.\nG98 G1 Z.5 F500.", job))


def test_spindle_without_any_speed() -> None:
    assert "speed-missing" in topics(carried_out("T0101 M3\nG0 X50. Z2.\nG1 Z0 F.2"))


def test_thread_lead_is_its_feed() -> None:
    move = carried_out(START + "G32 Z-20. F1.5").moves[-1]
    assert (move.kind, move.lead, move.feed) == (Kind.THREAD, 1.5, Feed("rev", 1.5))


def test_thread_under_surface_speed() -> None:
    assert "speed-in-thread" in topics(carried_out("T0101\nG50 S900\nG96 S100 M3\nG0 X20. Z5.\nG32 Z-9. F1."))


def test_dwell_hangs_behind_the_move_before_it() -> None:
    found = carried_out(START + "G1 Z0\nG4 P500\nG4 X1.\nG0 Z5.")
    assert [move.dwell_after for move in found.moves] == [0.0, 1.5, 0.0]
    assert found.dwell_time == 1.5


def test_dwell_in_revolutions() -> None:
    found = carried_out(START + "G4 X2.", settings={"dwell": "revolutions"})
    assert found.dwell_time == pytest.approx(0.24)  # 2 turns at 500 rpm


def test_stops_in_an_unattended_run() -> None:
    assert "stop-unattended" in topics(carried_out("M0", declared(unattended=True)))
    assert "stop-unattended" not in topics(carried_out("M0"))


def test_coolant_forgotten_for_one_tool() -> None:
    job = declared(tools={1: TURNING, 2: Tool(2, "T2", "turning")})
    wet = "M3 S500 F.2\nT0101\nG0 X50. Z2. M8\nG1 Z0\nM9\nT0202\nG0 X50. Z2.{}\nG1 Z-1."
    assert [r.line for r in carried_out(wet.format(""), job).remarks if r.topic == "coolant"] == [8]
    assert "coolant" not in topics(carried_out(wet.format(" M8"), job))


def test_number_without_a_point_and_its_two_readings() -> None:
    plain = carried_out("G0 X50 Z2.")
    fine = carried_out("G0 X50 Z2.", whole_numbers="increments")
    assert [remark.value for remark in plain.remarks if remark.topic == "plain-number"] == [50.0]
    assert [remark.value for remark in fine.remarks if remark.topic == "plain-number"] == [0.05]
    assert fine.moves[0].end == Point(2.0, 0.025)
    assert "plain-number" not in topics(carried_out("G0 X0 Z0\nG4 X1\nM98 P5 L2"))


def test_more_decimals_than_count() -> None:
    assert "too-many-decimals" in topics(carried_out("G0 X50.0005 Z2."))
    assert "too-many-decimals" not in topics(carried_out("G0 X50.125 Z2.\nG20\nG0 X2.0005"))


def test_units_neither_declared_nor_programmed() -> None:
    found = carried_out("G0 X50. Z2.", units=None)
    assert "units-missing" in topics(found)
    assert "control.units" in {assumption.about for assumption in found.assumptions}
    assert "units-missing" not in topics(carried_out("G21\nG0 X50. Z2.", units=None))


def test_units_switched_in_mid_program() -> None:
    found = carried_out("G21\nG0 X50.8 Z2.\nG20\nG0 X2.\nU.1")
    assert "units-switched" in topics(found)
    assert [move.end_r for move in found.moves] == pytest.approx([25.4, 25.4, 26.67])


def test_alarmed_blocks_are_not_counted_as_audited() -> None:
    assert not_audited(carried_out(START + "G1 Z0\nG3 X60. Z-10.")) == [5]
