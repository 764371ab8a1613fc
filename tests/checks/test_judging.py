"""What lasts a revolution, the band, and one finding a block; expected values by geometry of straight lines."""

from __future__ import annotations

from dataclasses import fields

import numpy as np
import pytest

from auditor.checks._judging import lasting, one_per_block
from auditor.findings import Finding, Level, NotJudged
from auditor.predict.loads import Loads


def loads(travel: list[float], move: list[int] | None = None, feed: float = 0.4, run: list[int] | None = None) -> Loads:
    count = len(travel)
    columns = {column.name: np.full(count, np.nan) for column in fields(Loads)}
    columns["travel"] = np.array(travel)
    columns["move"] = np.array(move or [0] * count)
    columns["run"] = np.array(run or [0] * count)
    columns["feed"] = np.full(count, feed)
    return Loads(**columns)


def test_a_plateau_counts_whole() -> None:
    assert lasting(loads([0.0, 1.0]), np.array([5.0, 5.0]), 0) == pytest.approx(5.0)


def test_a_peak_shorter_than_a_feed_counts_what_is_beside_it() -> None:
    figure = np.array([2.0, 2.0, 9.0, 9.0, 2.0, 2.0])
    assert lasting(loads([0.0, 1.0, 1.0, 1.3, 1.3, 3.0]), figure, 0) == pytest.approx(2.0, rel=1e-3)


def test_a_peak_of_one_feed_counts() -> None:
    figure = np.array([2.0, 2.0, 9.0, 9.0, 2.0, 2.0])
    assert lasting(loads([0.0, 1.0, 1.0, 1.4, 1.4, 3.0]), figure, 0) == pytest.approx(9.0, rel=1e-3)


def test_a_triangle_counts_half_of_it_when_two_feeds_wide() -> None:
    """Base 0.8, height 10: at half height it is 0.4 wide, one feed."""
    assert lasting(loads([0.0, 0.4, 0.8]), np.array([0.0, 10.0, 0.0]), 0) == pytest.approx(5.0, rel=1e-3)


def test_short_moves_of_one_run_are_one_cut() -> None:
    travel, move = [0.0, 0.1, 0.1, 0.2, 0.2, 0.5], [0, 0, 1, 1, 2, 2]
    assert lasting(loads(travel, move), np.full(6, 7.0), 1) == pytest.approx(7.0)


def test_a_run_ends_at_a_rapid() -> None:
    travel, move, run = [0.0, 1.0, 0.0, 0.1, 0.1, 3.0], [0, 0, 1, 1, 2, 2], [0, 0, 1, 1, 1, 1]
    figure = np.array([9.0, 9.0, 9.0, 9.0, 1.0, 1.0])
    assert lasting(loads(travel, move, run=run), figure, 1) == pytest.approx(1.0, rel=1e-3)


def test_a_move_that_cuts_nothing_breaks_the_cut() -> None:
    travel, move = [0.0, 0.3, 5.0, 5.3], [0, 0, 2, 2]
    figure = np.array([6.0, 6.0, 6.0, 6.0])
    assert lasting(loads(travel, move), figure, 0) == 0.0


def test_feed_longer_than_the_run_takes_the_run() -> None:
    assert lasting(loads([0.0, 1.0], feed=200.0), np.array([3.0, 3.0]), 0) == pytest.approx(3.0)
    assert lasting(loads([0.0, 1.0], feed=200.0), np.array([0.0, 3.0]), 0) == pytest.approx(0.0, abs=1e-3)


def test_unknown_figures_are_nothing() -> None:
    assert lasting(loads([0.0, 1.0]), np.array([np.nan, np.nan]), 0) == 0.0
    assert lasting(loads([0.0, 1.0]), np.array([1.0, 1.0]), 7) == 0.0


def finding(level: Level, line: int, value: float = 0.0) -> Finding:
    return Finding("spindle-power", level, line, None, None, "…", value=value, limit=1.0)


def test_one_finding_a_block_is_the_gravest() -> None:
    found = list(one_per_block([
        finding(Level.NOTE, 3), finding(Level.STOP, 2, 1.1), finding(Level.STOP, 2, 1.5), finding(Level.REVIEW, 3),
    ]))  # fmt: skip
    assert [(item.line, item.level, item.value) for item in found] == [(2, Level.STOP, 1.5), (3, Level.REVIEW, 0.0)]


def test_a_reason_for_not_judging_is_said_once() -> None:
    reason = NotJudged("chuck-grip", "workholding.grip_force is not declared")
    assert list(one_per_block([reason, reason])) == [reason]
