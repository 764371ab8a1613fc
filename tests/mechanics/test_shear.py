"""The shear plane against energy: what goes in as power comes out as shear and friction."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from auditor.mechanics.force_circle import (
    face_stress,
    force_from_shear,
    friction_energy_share,
    friction_force,
    measured_friction_angle,
    shear_force,
    shear_stress,
)
from auditor.mechanics.oblique import (
    TITANIUM_EDGE_FORCES,
    TITANIUM_SHEAR_STRENGTH,
    oblique_coefficients,
    titanium_friction_angle,
    titanium_shear_angle,
)
from auditor.mechanics.shear import lee_shaffer_shear_angle, merchant_shear_angle, shear_angle, shear_strain

rake = st.floats(-10.0, 30.0)
friction = st.floats(15.0, 45.0)


@given(rake, friction)
def test_merchant_has_the_least_force(g, beta):
    """At constant shear strength no other shear angle needs less cutting force (Merchant's premise)."""
    best = float(merchant_shear_angle(beta, g))
    others = np.linspace(max(best - 10.0, 1.0), best + 10.0, 41)
    forces, _ = force_from_shear(400.0, 0.2, 2.0, others, beta, g)
    least, _ = force_from_shear(400.0, 0.2, 2.0, best, beta, g)
    assert float(least) <= float(forces.min()) * (1.0 + 1e-9)


@given(rake, friction, st.floats(15.0, 40.0))
def test_energy_of_shear_and_friction_is_the_energy_of_the_cut(g, beta, phi):
    """Fc = Fs gamma_s h b sin(phi) / (h b) …: shear work tau * strain plus friction share adds up to the whole."""
    assume(phi + beta - g < 89.0)  # at a right angle the force has no bound, and the law refuses
    fc, ft = force_from_shear(400.0, 0.2, 2.0, phi, beta, g)
    strain = shear_strain(phi, g)
    ratio = np.sin(np.radians(phi)) / np.cos(np.radians(phi - g))  # uncut over cut thickness, from the geometry
    shear_share = 400.0 * 0.2 * 2.0 * strain / fc
    assert float(shear_share + friction_energy_share(fc, ft, g, ratio)) == pytest.approx(1.0)


@given(rake, friction, st.floats(15.0, 40.0))
def test_force_circle_closes(g, beta, phi):
    """From shear to forces and back: friction angle, shear stress, shear force."""
    assume(phi + beta - g < 89.0)  # at a right angle the force has no bound, and the law refuses
    fc, ft = force_from_shear(400.0, 0.2, 2.0, phi, beta, g)
    assert float(measured_friction_angle(fc, ft, g)) == pytest.approx(beta)
    assert float(shear_stress(fc, ft, phi, 0.2, 2.0)) == pytest.approx(400.0)
    assert float(shear_force(fc, ft, phi)) == pytest.approx(400.0 * 0.2 * 2.0 / np.sin(np.radians(phi)))


@given(st.floats(0.2, 0.9), rake)
def test_shear_angle_gives_the_chip_ratio_back(ratio, g):
    phi = np.radians(float(shear_angle(ratio, g)))
    assert np.sin(phi) / np.cos(phi - np.radians(g)) == pytest.approx(ratio)


@given(friction, rake, st.floats(0.1, 10.0))
def test_more_rake_makes_the_chip_thinner(beta, g, more):
    for law in (merchant_shear_angle, lee_shaffer_shear_angle):
        blunt, sharp = law(beta, [g, g + more])
        assert blunt < sharp


def test_stress_on_a_face_without_contact_is_no_figure():
    assert np.isnan(face_stress(900.0, 600.0, 0.0, 0.0, 2.5))
    assert float(friction_force(900.0, 600.0, 90.0 - 1e-9)) == pytest.approx(900.0)


@given(rake, friction, st.floats(15.0, 40.0))
def test_oblique_without_inclination_is_orthogonal(g, beta, phi):
    k = oblique_coefficients(400.0, phi, beta, g, 0.0)
    fc, ft = force_from_shear(400.0, 1.0, 1.0, phi, beta, g)
    assert (float(k.cutting), float(k.thrust), float(k.radial)) == pytest.approx((float(fc), float(ft), 0.0))


@given(rake, friction, st.floats(15.0, 40.0), st.floats(0.0, 25.0))
def test_oblique_is_symmetrical_in_the_inclination(g, beta, phi, i):
    left, right = (oblique_coefficients(400.0, phi, beta, g, sign * i) for sign in (-1.0, 1.0))
    assert float(left.cutting) == pytest.approx(float(right.cutting))
    assert float(left.thrust) == pytest.approx(float(right.thrust))
    assert float(left.radial) == pytest.approx(-float(right.radial))


@given(rake, friction, st.floats(15.0, 40.0), st.floats(-25.0, 25.0))
def test_oblique_force_is_normal_force_and_friction_along_the_chip(g, beta_n, phi, i):
    """Force on an inclined rake face put together as a vector: speed x, thrust y; chip flows at the inclination."""
    rake_n, lean, normal_friction = np.radians([g, i, beta_n])
    along_edge = np.array([np.sin(lean), 0.0, np.cos(lean)])
    into_tool = np.array([np.cos(lean), 0.0, -np.sin(lean)])  # in the normal plane, across the edge
    up = np.array([0.0, 1.0, 0.0])
    face_up = np.cos(rake_n) * up + np.sin(rake_n) * into_tool
    face_normal = np.cos(rake_n) * into_tool - np.sin(rake_n) * up
    flow = np.cos(lean) * face_up + np.sin(lean) * along_edge
    friction_coefficient = np.tan(normal_friction) / np.cos(lean)  # tan(beta_n) = tan(beta_a) cos(flow angle)
    force = face_normal + friction_coefficient * flow
    k = oblique_coefficients(400.0, phi, beta_n, g, i)
    assert float(k.thrust / k.cutting) == pytest.approx(force[1] / force[0], abs=1e-9)
    assert float(k.radial / k.cutting) == pytest.approx(-force[2] / force[0], abs=1e-9)


def test_titanium_edge_share_and_rake_slope():
    """At h 0.1 the edge takes about an eighth of the force per mm; Ktc falls by 1.2 % a degree (published database)."""
    ktc = [
        float(
            oblique_coefficients(
                TITANIUM_SHEAR_STRENGTH, titanium_shear_angle(g, 0.1), titanium_friction_angle(g), g, 0.0
            ).cutting
        )
        for g in (0.0, 10.0)
    ]
    assert (ktc[0] - ktc[1]) / ktc[0] / 10.0 == pytest.approx(0.012, abs=0.001)
    cutting, feed = TITANIUM_EDGE_FORCES
    assert 0.10 < cutting / (0.1 * ktc[0] + cutting) < 0.14
    assert feed > cutting
