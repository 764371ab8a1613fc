"""Clamping, bars and chatter against statics, each other and a scanned frequency response."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.mechanics.bars import bar_compliance, bar_modulus, overhang_limit, shank_compliance
from auditor.mechanics.chatter import dynamic_coefficient, limiting_width
from auditor.mechanics.clamping import (
    centrifugal_force,
    centrifugal_limit,
    grip_for_cut,
    grip_for_tilting,
    grip_left,
    grip_with_safety,
    permitted_speed,
    static_grip,
)
from auditor.mechanics.kienzle import cutting_force

grip = st.floats(1000.0, 2e5)


@given(grip, st.floats(100.0, 2e4), st.floats(0.2, 6.0), st.floats(30.0, 200.0))
def test_permitted_speed_is_where_static_grip_is_just_enough(static, need, mass, radius):
    n = float(permitted_speed(static, need, mass, radius))
    lost = float(centrifugal_force(mass, radius, n, 3))
    if n > 0.0:
        assert float(static_grip(need, lost)) == pytest.approx(static, rel=1e-9)
    else:
        assert float(static_grip(need, 0.0)) >= static * (1.0 - 1e-9)


@given(grip, st.floats(0.0, 2e5))
def test_speed_never_adds_to_a_grip(static, lost):
    """Outside it takes away, inside the gain is not credited."""
    assert 0.0 <= float(grip_left(static, lost)) <= static
    assert float(grip_left(static, lost, inside=True)) == static
    assert float(static_grip(static, lost, inside=True)) <= float(static_grip(static, lost))


def test_friction_cone_of_turning_and_pulling():
    """Torque and axial force make one slip direction: 3-4-5 triangle, mu 0.1."""
    assert float(grip_for_cut(300.0, 400.0, 50.0, 50.0, 0.1)) == pytest.approx(5000.0)
    assert float(grip_for_cut(300.0, -400.0, 50.0, 50.0, 0.1)) == pytest.approx(5000.0)


def test_tilting_takes_both_forces_across_the_axis():
    """3-4-5 triangle at one grip diameter of overhang, C = 3."""
    assert float(grip_for_tilting(300.0, 400.0, 50.0, 50.0)) == pytest.approx(1500.0)
    assert float(grip_for_tilting(300.0, 0.0, 50.0, 50.0)) < float(grip_for_tilting(300.0, 400.0, 50.0, 50.0))


def test_safety_below_which_the_norms_do_not_go():
    assert float(grip_with_safety(1000.0)) == 1500.0
    assert float(centrifugal_limit(1000.0)) == pytest.approx(670.0)


@given(st.floats(20.0, 200.0), st.floats(8.0, 50.0), st.sampled_from(["steel", "heavy metal", "carbide"]))
def test_bar_gives_with_the_cube_of_its_overhang_and_the_fourth_power_of_its_diameter(length, d, material):
    e = bar_modulus(material)
    base = float(bar_compliance(length, d, e))
    assert float(bar_compliance(2.0 * length, d, e)) == pytest.approx(8.0 * base)
    assert float(bar_compliance(length, 2.0 * d, e)) == pytest.approx(base / 16.0)


def test_square_shank_is_stiffer_than_the_bar_inside_it():
    """I of a square is 16/(3 pi) = 1.698 of the circle's (closed form)."""
    ratio = bar_compliance(50.0, 20.0, 210_000.0) / shank_compliance(50.0, 20.0, 20.0, 210_000.0)
    assert float(ratio) == pytest.approx(16.0 / (3.0 * np.pi))


def test_stiffer_bars_may_hang_out_further_and_unknown_ones_are_refused():
    limits = [overhang_limit(material).high for material in ("steel", "heavy metal", "carbide")]
    assert limits == sorted(limits)
    for law in (bar_modulus, overhang_limit):
        with pytest.raises(ValueError, match="steel, heavy metal, carbide"):
            law("brass")


@pytest.mark.parametrize("zeta", [0.01, 0.03, 0.1])
def test_stability_limit_by_scanning_the_frequency_response(zeta):
    """-1 / (2 K min Re G) with G of one mode scanned over frequency."""
    k, coefficient = 2e4, 2000.0
    ratio = np.linspace(1.0, 1.5, 500_001)
    real = (1.0 - ratio**2) / ((1.0 - ratio**2) ** 2 + (2.0 * zeta * ratio) ** 2) / k
    assert float(limiting_width(k, zeta, coefficient)) == pytest.approx(
        -1.0 / (2.0 * coefficient * real.min()), rel=1e-6
    )


def test_dynamic_coefficient_is_the_slope_of_the_force():
    step = 1e-6
    slope = (cutting_force(1659.0, 0.21, 0.2 + step, 1.0) - cutting_force(1659.0, 0.21, 0.2 - step, 1.0)) / (2 * step)
    assert float(dynamic_coefficient(1659.0, 0.21, 0.2, 1.0)) == pytest.approx(float(slope), rel=1e-6)
