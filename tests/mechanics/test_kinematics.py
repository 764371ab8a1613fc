"""Times at constant surface speed against step-by-step integration of the spindle's turning."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.mechanics.kinematics import (
    cutting_speed,
    feed_time,
    rapid_time,
    spindle_speed,
    surface_speed_acceleration,
    surface_speed_arc_time,
    surface_speed_line_time,
)

radius = st.floats(-40.0, 60.0)
limit = st.floats(400.0, 6000.0)


def stepwise(radii: np.ndarray, length: float, feed: float, vc: float, rpm_limit: float) -> float:
    """Path cut into equal steps, each at the speed of its middle (s)."""
    rpm = np.minimum(1000.0 * vc / (2.0 * np.pi * np.maximum(np.abs(radii), 1e-12)), rpm_limit)
    return float(np.sum(length / len(radii) / (feed * rpm)) * 60.0)


def middles(count: int) -> np.ndarray:
    return (np.arange(count) + 0.5) / count


@given(radius, radius, limit)
def test_line_at_surface_speed(start, end, rpm_limit):
    exact = float(surface_speed_line_time(start, end, 30.0, 0.2, 180.0, rpm_limit))
    radii = start + (end - start) * middles(4000)
    assert exact == pytest.approx(stepwise(radii, 30.0, 0.2, 180.0, rpm_limit), rel=1e-5)


@given(st.floats(-20.0, 60.0), st.floats(0.5, 30.0), st.floats(-360.0, 360.0), st.floats(-360.0, 360.0), limit)
def test_arc_at_surface_speed(centre, arc, start, sweep, rpm_limit):
    exact = float(surface_speed_arc_time(centre, arc, start, start + sweep, 0.15, 180.0, rpm_limit))
    radii = centre + arc * np.sin(np.radians(start + sweep * middles(4000)))
    length = abs(np.radians(sweep)) * arc
    assert exact == pytest.approx(stepwise(radii, length, 0.15, 180.0, rpm_limit), rel=2e-5, abs=1e-9)


def test_arc_of_more_than_a_turn_is_refused():
    with pytest.raises(ValueError, match="more than one turn"):
        surface_speed_arc_time(20.0, 5.0, 0.0, 400.0, 0.1, 100.0, 3000.0)


def test_clamped_all_the_way_is_constant_speed():
    """Below the clamp diameter of 21.2 mm a move takes as long as at 3000 rpm."""
    clamped = surface_speed_line_time(5.0, 0.0, 5.0, 0.2, 200.0, 3000.0)
    assert float(clamped) == pytest.approx(float(feed_time(5.0, 0.2, 3000.0)))


@given(st.floats(0.5, 80.0), limit)
def test_splitting_a_line_changes_nothing(split, rpm_limit):
    whole = float(surface_speed_line_time(80.0, 0.0, 80.0, 0.2, 150.0, rpm_limit))
    first = surface_speed_line_time(80.0, split, 80.0 - split, 0.2, 150.0, rpm_limit)
    rest = surface_speed_line_time(split, 0.0, split, 0.2, 150.0, rpm_limit)
    assert float(first + rest) == pytest.approx(whole, rel=1e-9)


def test_standing_spindle_or_feed_has_no_time():
    assert np.isnan(feed_time(10.0, 0.0, 1000.0))
    assert np.isnan(surface_speed_line_time(10.0, 5.0, 5.0, 0.2, 0.0, 1000.0))


@given(st.floats(0.0, 400.0), limit)
def test_spindle_speed_keeps_surface_speed_or_the_limit(diameter, rpm_limit):
    rpm = float(spindle_speed(180.0, diameter, rpm_limit))
    assert rpm <= rpm_limit
    assert rpm == pytest.approx(rpm_limit) or float(cutting_speed(diameter, rpm)) == pytest.approx(180.0)


def test_spindle_acceleration_is_the_slope_of_the_speed():
    """Finite difference over a ten-thousandth of a revolution, facing at 0.2 mm/rev from r = 30."""
    r, turns = 30.0, 1e-4
    rpm = [float(spindle_speed(200.0, 2.0 * at, 1e6)) for at in (r, r - 0.2 * turns)]
    seconds = turns / rpm[0] * 60.0
    assert float(surface_speed_acceleration(200.0, 0.2, r)) == pytest.approx((rpm[1] - rpm[0]) / seconds, rel=1e-3)


@given(st.floats(0.0, 500.0), st.floats(100.0, 10_000.0))
def test_rapid_against_its_speed_profile(distance, acceleration):
    """Area under the trapezoid or triangle of speed over time is the distance."""
    top = 24_000.0 / 60.0
    total = float(rapid_time(distance, 24_000.0, acceleration))
    reached = min(top, acceleration * total / 2.0)
    covered = reached * (total - reached / acceleration)
    assert covered == pytest.approx(distance, rel=1e-9, abs=1e-9)


def test_rapid_without_ramps_and_with_impossible_ones():
    assert float(rapid_time(-150.0, 30_000.0)) == pytest.approx(0.3)
    with pytest.raises(ValueError, match="acceleration"):
        rapid_time(10.0, 1000.0, 0.0)
