"""Power, torque and removal rate are one and the same figure seen three ways."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.mechanics.kinematics import cutting_speed
from auditor.mechanics.power import (
    cutting_power,
    motor_power,
    power_from_removal,
    power_from_torque,
    removal_rate,
    ring_removal_rate,
    specific_energy,
    spindle_torque,
    torque_from_power,
)

force = st.floats(1.0, 2e4)
diameter = st.floats(0.1, 500.0)
rpm = st.floats(10.0, 6000.0)


@given(force, diameter, rpm)
def test_torque_times_speed_is_force_times_cutting_speed(fc, d, n):
    by_force = cutting_power(fc, cutting_speed(d, n))
    by_torque = power_from_torque(spindle_torque(fc, d), n)
    assert float(by_force) == pytest.approx(float(by_torque), rel=1e-9)
    assert float(torque_from_power(by_torque, n)) == pytest.approx(float(spindle_torque(fc, d)), rel=1e-9)


@given(st.floats(0.1, 5.0), st.floats(0.05, 0.6), st.floats(20.0, 400.0), st.floats(500.0, 4000.0))
def test_removal_rate_times_specific_force_is_power(ap, f, vc, kc):
    by_rate = power_from_removal(removal_rate(ap, f, vc), kc)
    assert float(by_rate) == pytest.approx(float(cutting_power(kc * ap * f, vc)), rel=1e-9)


@given(st.floats(10.0, 200.0), st.floats(0.05, 4.0), st.floats(0.05, 0.5), rpm)
def test_ring_and_mean_diameter_give_the_same_rate(d, ap, f, n):
    by_ring = ring_removal_rate(d, d - 2.0 * ap, f * n)
    assert float(by_ring) == pytest.approx(float(removal_rate(ap, f, cutting_speed(d - ap, n))), rel=1e-9)


def test_standstill_has_no_torque_figure_and_nothing_cut_no_energy():
    assert np.isnan(torque_from_power(5.0, 0.0))
    assert np.isnan(specific_energy(100.0, 0.0))


def test_a_motor_gives_no_more_than_it_takes():
    assert float(motor_power(4.0, 1.0)) == 4.0
    with pytest.raises(ValueError, match="efficiency"):
        motor_power(4.0, 1.2)


def test_a_ring_needs_its_larger_diameter_outside():
    with pytest.raises(ValueError, match="inner diameter"):
        ring_removal_rate(10.0, 12.0, 100.0)
