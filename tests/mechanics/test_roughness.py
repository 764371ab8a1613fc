"""Kinematic roughness against a profile drawn point by point from neighbouring tool positions."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.mechanics.roughness import (
    arc_limit_feed,
    average_roughness,
    brammertz_peak,
    parabola_average,
    parabola_peak,
    peak_to_valley,
    real_to_ideal,
)


def outline(x: np.ndarray, r: float, kr: float, kn: float) -> np.ndarray:
    """Height of the tool's edge over x (mm), corner at its lowest at 0; main edge at x > 0, trailing edge at x < 0."""
    return np.maximum.reduce([side(x, r, kr), side(-x, r, kn)])


def side(x: np.ndarray, r: float, k: float) -> np.ndarray:
    k = np.radians(k)
    reach = r * np.sin(min(k, np.pi / 2.0))
    arc = r - np.sqrt(np.maximum(r**2 - np.clip(x, 0.0, reach) ** 2, 0.0))
    if k >= np.pi / 2.0:  # beyond the arc the edge leans back over: no height under it
        return np.where(x > reach, np.inf, arc)
    return np.where(x > reach, r * (1.0 - np.cos(k)) + (x - reach) * np.tan(k), arc)


def drawn(f: float, r: float, kr: float, kn: float) -> tuple[float, float]:
    """Rt and Ra (um) of the lower envelope of tools one feed apart, 200,001 points over one feed."""
    x = np.linspace(0.0, f, 200_001)
    profile = np.minimum.reduce([outline(x - shift * f, r, kr, kn) for shift in (-1.0, 0.0, 1.0, 2.0)])
    mean = np.trapezoid(profile, x) / f
    return 1000.0 * float(np.ptp(profile)), 1000.0 * float(np.trapezoid(np.abs(profile - mean), x) / f)


@given(st.floats(0.02, 0.6), st.floats(0.2, 1.6), st.floats(30.0, 95.0), st.floats(3.0, 80.0))
def test_exact_forms_follow_the_drawn_profile(f, r, kr, kn):
    """Arc alone, arc and trailing edge, both edges: whichever the feed asks for."""
    rt, ra = drawn(f, r, kr, kn)
    assert float(peak_to_valley(f, r, kr, kn)) == pytest.approx(rt, rel=1e-3)
    assert float(average_roughness(f, r, kr, kn)) == pytest.approx(ra, rel=1e-3)


def test_sharp_corner():
    """A triangle: Rt = f / (cot kr + cot kr'), Ra a quarter of it (closed form)."""
    rt = 1000.0 * 0.2 / (1.0 / np.tan(np.radians(60.0)) + 1.0 / np.tan(np.radians(7.0)))
    assert float(peak_to_valley(0.2, 0.0, 60.0, 7.0)) == pytest.approx(rt)
    assert float(average_roughness(0.2, 0.0, 60.0, 7.0)) == pytest.approx(rt / 4.0)


def test_parabola_is_as_near_as_published():
    """Within 1.6 % for f/r below 0.5 (Qu and Shih 2003)."""
    f = np.linspace(0.02, 0.4, 20)
    assert parabola_peak(f, 0.8) == pytest.approx(peak_to_valley(f, 0.8, 95.0, 60.0), rel=0.016)
    assert parabola_average(f, 0.8) == pytest.approx(average_roughness(f, 0.8, 95.0, 60.0), rel=0.016)


@given(st.floats(0.1, 1.6), st.floats(3.0, 60.0))
def test_forms_join_without_a_step(r, kn):
    limit = float(arc_limit_feed(r, kn))
    below, above = peak_to_valley([0.99999 * limit, 1.00001 * limit], r, 95.0, kn)
    assert float(above) == pytest.approx(float(below), rel=1e-3)


def test_no_feed_no_roughness():
    assert float(peak_to_valley(0.0, 0.8, 95.0, 5.0)) == 0.0
    assert float(average_roughness(0.0, 0.8, 95.0, 5.0)) == 0.0


def test_angles_that_close_the_corner_are_refused():
    with pytest.raises(ValueError, match="less than 180 deg together"):
        peak_to_valley(0.2, 0.8, 120.0, 70.0)


def test_lowest_roughness_is_not_at_the_lowest_feed():
    """Brammertz: smallest near f = sqrt(2 r h_min)."""
    feeds = np.linspace(0.02, 0.4, 3801)
    best = feeds[np.argmin(brammertz_peak(feeds, 0.8, 0.01))]
    assert best == pytest.approx(np.sqrt(2.0 * 0.8 * 0.01), rel=0.01)


@given(st.floats(0.0, 400.0))
def test_free_cutting_work_comes_out_smoother(vc):
    assert float(real_to_ideal(vc, free_cutting=True)) <= float(real_to_ideal(vc))
