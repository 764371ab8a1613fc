"""The worked cycle examples as whole programs: text in, ordered moves out.

Source of the expected moves: ``provenance`` in the fixture (a separate reference script).
"""

from __future__ import annotations

import itertools
import json
from pathlib import Path
from typing import Any

import pytest

from auditor.declared.model import Control, Point
from auditor.interpret import interpret
from auditor.interpret.moves import Interpretation, Kind
from auditor.parse import parse_text
from tests.interpret.programs import declared, row

FIXTURE = Path(__file__).parents[2] / "fixtures" / "language" / "cycle_examples.json"
EXAMPLES: dict[str, dict[str, Any]] = json.loads(FIXTURE.read_text(encoding="utf-8"))["examples"]
PROGRAMS = [name for name, example in EXAMPLES.items() if "code" in example]
WITH_MOVES = [name for name in PROGRAMS if "moves" in EXAMPLES[name]]


def interpreted(example: dict[str, Any]) -> Interpretation:
    x, z = example["start"]
    control = Control(system_declared=True, units="mm", settings=example.get("settings", {}))
    return interpret(parse_text(example["code"]), declared(control, start=Point(z, x / 2)))


def wanted_moves(example: dict[str, Any]) -> list[dict[str, Any]]:
    return [move for move in example["moves"] if move["kind"] != "D"]


@pytest.mark.parametrize("name", WITH_MOVES)
def test_moves(name: str) -> None:
    found, wanted = interpreted(EXAMPLES[name]), wanted_moves(EXAMPLES[name])
    assert found.not_audited == ()
    assert [row(move)[0] for move in found.moves] == [move["kind"] for move in wanted]
    for move, expected in zip(found.moves, wanted, strict=True):
        assert row(move)[1:] == pytest.approx((expected["x"], expected["z"]), abs=1e-4)
        if "f" in expected:
            assert move.feed is not None
            assert move.feed.value == pytest.approx(expected["f"])
            assert (move.lead is not None) == (move.kind is Kind.THREAD)
        if "cx" in expected:
            assert move.centre is not None
            assert (2 * move.centre.r, move.centre.z) == pytest.approx((expected["cx"], expected["cz"]), abs=1e-4)


@pytest.mark.parametrize("name", PROGRAMS)
def test_every_move_starts_where_the_last_one_ended(name: str) -> None:
    moves = interpreted(EXAMPLES[name]).moves
    for before, after in itertools.pairwise(moves):
        assert before.end == pytest.approx(after.start)


def test_all_moves_of_a_cycle_carry_its_line() -> None:
    found = interpreted(EXAMPLES["C06"])
    assert {move.line for move in found.moves if move.cycle == "rough turning"} == {7}
    assert {move.line for move in found.moves if move.cycle == "finishing"} == {15}
    assert found.motion_lines == {5, 7, 15}


def test_finishing_uses_the_feeds_of_the_profile() -> None:
    finishing = [move for move in interpreted(EXAMPLES["C06"]).moves if move.cycle == "finishing"]
    assert {move.feed.value for move in finishing if move.feed} == {0.12}


def test_dwell_of_a_drilling_cycle_hangs_behind_its_move() -> None:
    found = interpreted(EXAMPLES["C17"])
    assert [move.dwell_after for move in found.moves if move.dwell_after] == [0.2]
    assert found.dwell_time == pytest.approx(0.2)


def test_tap_comes_out_with_the_spindle_reversed() -> None:
    threads = [move for move in interpreted(EXAMPLES["C19"]).moves if move.kind is Kind.THREAD]
    assert [move.spindle.direction for move in threads] == [1, -1]


def test_settings_that_a_cycle_rests_on_are_assumptions() -> None:
    about = {assumption.about for assumption in interpreted(EXAMPLES["C06"]).assumptions}
    assert {"control.rough_levels_from", "control.rough_escape"} <= about
