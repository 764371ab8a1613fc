"""Drilling by three published routes, thread sections by polygons, grooves by geometry."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.mechanics import drilling, parting, power_law, threading
from auditor.mechanics.kienzle import cutting_force, specific_force


def kienzle_drill(d: float, f: float) -> tuple[float, float]:
    kc = specific_force(1659.0, 0.21, drilling.drill_chip_thickness(f, 118.0))
    return float(drilling.drill_torque(kc, f, d)), float(drilling.drill_thrust(kc, f, d, 118.0))


@pytest.mark.parametrize("d", [8.0, 9.5, 12.5])
def test_three_routes_to_a_drill(d):
    """Steel, f 0.2: Kienzle, handbook (Kd 16500) and power law. Published at 10 mm: 6.95, 7.1 and 9.5 N m."""
    torque, thrust = kienzle_drill(d, 0.2)
    assert float(drilling.handbook_torque(d, 0.2, 16_500.0)) == pytest.approx(torque, rel=0.25)
    assert float(drilling.handbook_thrust(d, 0.2, 16_500.0)) == pytest.approx(thrust, rel=0.30)
    assert float(power_law.power_law_drill_torque(d, 0.2)) == pytest.approx(torque, rel=0.45)
    assert float(power_law.power_law_drill_thrust(d, 0.2)) == pytest.approx(thrust, rel=0.30)


@given(st.floats(3.3, 21.9), st.floats(0.06, 0.38), st.floats(1.01, 1.05))
def test_handbook_figures_grow_with_diameter_and_feed(d, f, more):
    for law in (drilling.handbook_torque, drilling.handbook_thrust):
        base, wider, faster = law([d, min(d * more, 22.0), d], [f, f, min(f * more, 0.4)], 16_500.0)
        assert base < wider
        assert base < faster


def test_a_split_point_pushes_less():
    """Chisel edge 0.03 of the diameter against 0.18: published factors."""
    standard = float(drilling.handbook_thrust(9.5, 0.2, 16_500.0))
    split = float(drilling.handbook_thrust(9.5, 0.2, 16_500.0, drilling.SPLIT_POINT))
    assert split < 0.8 * standard
    assert float(drilling.handbook_torque(9.5, 0.2, 16_500.0, drilling.SPLIT_POINT)) < 7.11


def test_outside_the_handbooks_tables_there_is_no_figure():
    assert np.isnan(drilling.feed_factor([0.04, 0.41])).all()
    assert np.isnan(drilling.torque_factor([3.0, 25.0])).all()
    assert drilling.DIAMETER.covers([3.0, 10.0]).tolist() == [False, True]


@given(st.floats(4.0, 30.0), st.floats(0.0, 0.9))
def test_a_pilot_hole_takes_its_own_torque_away(d, share):
    """Sum over both lips of kc f/2 r dr from the pilot outwards (integral by hand: kc f (d^2 - d0^2)/8)."""
    whole, opened, pilot = drilling.drill_torque(2500.0, 0.2, [d, d, share * d], [0.0, share * d, 0.0])
    assert float(opened + pilot) == pytest.approx(float(whole))


def test_impossible_drills_are_refused():
    with pytest.raises(ValueError, match="pilot hole"):
        drilling.drill_torque(2500.0, 0.2, 10.0, 12.0)
    with pytest.raises(ValueError, match="half point angle"):
        drilling.drill_chip_thickness(0.2, 190.0)
    with pytest.raises(ValueError, match="cutting material of a drill"):
        drilling.depth_without_peck("ceramic")


def test_carbide_drills_go_deeper():
    assert drilling.depth_without_peck("carbide") > drilling.depth_without_peck("high-speed steel")


# ---- threads


def trapezium(depth: float, tip: float) -> np.ndarray:
    """Corners of a 60 degree groove of a depth with a flat tip."""
    spread = depth / np.sqrt(3.0)
    return np.array([[-tip / 2 - spread, 0.0], [-tip / 2, -depth], [tip / 2, -depth], [tip / 2 + spread, 0.0]])


def polygon_area(corners: np.ndarray) -> float:
    x, y = corners.T
    return 0.5 * abs(float(np.dot(x, np.roll(y, -1)) - np.dot(y, np.roll(x, -1))))


@given(st.floats(0.0, 2.0), st.floats(0.01, 1.0), st.floats(0.0, 0.5))
def test_section_of_a_pass_is_the_difference_of_two_grooves(before, step, tip):
    after = before + step
    expected = polygon_area(trapezium(after, tip)) - polygon_area(trapezium(before, tip))
    assert float(threading.pass_area(before, after, tip)) == pytest.approx(expected, rel=1e-6, abs=1e-12)


@given(st.floats(0.2, 4.0), st.integers(1, 20))
def test_constant_area_passes_take_the_same(depth, passes):
    depths = np.concatenate([[0.0], threading.constant_area_depths(depth, passes)])
    assert depths[-1] == pytest.approx(depth)
    areas = threading.pass_area(depths[:-1], depths[1:])
    assert areas == pytest.approx(np.full(passes, areas[0]))


@given(st.floats(0.02, 0.5))
def test_thread_chip_is_the_distance_between_two_flanks(step):
    """Straight in: both flanks move by step sin 30. Along the flank: one moves by the whole step (line distances)."""
    normal = np.array([np.cos(np.radians(30.0)), -np.sin(np.radians(30.0))])  # of the right flank, out of the groove
    straight_in = np.array([0.0, -step])
    along_left_flank = np.array([step * np.tan(np.radians(30.0)), -step])
    assert float(threading.thread_chip_thickness(step)) == pytest.approx(normal @ straight_in)
    assert float(threading.thread_chip_thickness(step, "flank")) == pytest.approx(normal @ along_left_flank)


def test_a_spring_pass_has_no_force():
    assert float(threading.thread_force(1659.0, 0.21, 0.0, 0.0)) == 0.0


def test_thread_force_beside_the_power_law():
    """P 1.5 in six equal sections: the largest pass within a factor of two of the handbook's 826 N."""
    depths = np.concatenate([[0.0], threading.constant_area_depths(0.920, 6)])
    h = threading.thread_chip_thickness(np.diff(depths))
    forces = threading.thread_force(1659.0, 0.21, threading.pass_area(depths[:-1], depths[1:]), h)
    assert 826.0 / 3.0 < float(forces.max()) < 826.0


def test_v_chip_costs_a_third_more_than_one_flank():
    both, one = (float(threading.thread_force(1659.0, 0.21, 0.08, 0.1, way)) for way in ("radial", "flank"))
    assert both / one == pytest.approx(1.3)
    assert one == pytest.approx(float(cutting_force(1659.0, 0.21, 0.1, 0.8)))


def test_unknown_infeed_shallower_pass_and_no_pass_are_refused():
    with pytest.raises(ValueError, match="radial, flank or alternating"):
        threading.thread_chip_thickness(0.1, "sideways")  # type: ignore[arg-type]
    with pytest.raises(ValueError, match="radial, flank or alternating"):
        threading.thread_force(1659.0, 0.21, 0.1, 0.1, "sideways")  # type: ignore[arg-type]
    with pytest.raises(ValueError, match="shallower"):
        threading.pass_area(0.3, 0.2)
    with pytest.raises(ValueError, match="at least one pass"):
        threading.constant_area_depths(0.9, 0)


def test_depths_of_the_iso_profile():
    """Internal: 5/8 of the height sqrt(3)/2 P (ISO 68-1); external: 17/24 of it (root rounded)."""
    height = np.sqrt(3.0) / 2.0 * 2.0
    assert float(threading.internal_depth(2.0)) == pytest.approx(0.625 * height, abs=1e-4)
    assert float(threading.external_depth(2.0)) == pytest.approx(17.0 / 24.0 * height, abs=1e-4)


@pytest.mark.parametrize(
    ("pitch", "fewest", "most"), [(0.5, 4, 4), (1.0, 5, 6), (1.1, 6, 7), (2.0, 8, 10), (6.0, 16, 18)]
)
def test_usual_passes(pitch, fewest, most):
    """Common practice; a pitch between two rows takes the next larger one."""
    assert threading.usual_passes(pitch) == (fewest, most)


def test_pitch_beyond_the_table_is_refused():
    with pytest.raises(ValueError, match="above 6 mm"):
        threading.usual_passes(8.0)


@given(st.floats(5.0, 20.0), st.floats(0.5, 3.0), st.floats(6.0, 60.0))
def test_helix_takes_clearance_from_the_leading_flank(clearance, lead, d):
    left = float(threading.leading_flank_clearance(clearance, lead, d))
    assert left == pytest.approx(clearance - float(threading.lead_angle(lead, d)))


@given(st.floats(3.0, 20.0), st.floats(10.0, 45.0))
def test_flank_of_a_profile_has_less_clearance_than_its_tip(tip, half):
    """Flank as a plane through the profile line and the clearance direction, by cross product."""
    line = np.array([np.sin(np.radians(half)), np.cos(np.radians(half)), 0.0])  # along the flank, in the face
    down = np.array([0.0, np.tan(np.radians(tip)), -1.0])  # towards the work-free side while going down
    flank = np.cross(line, down)
    level = np.cross(flank, [0.0, 1.0, 0.0])  # in the flank, across the infeed
    expected = np.degrees(np.arctan(abs(level[0] / level[2])))
    assert float(threading.profile_flank_clearance(tip, half)) == pytest.approx(expected)


# ---- grooves


def test_groove_geometry():
    """Common practice: last 3 mm or the width; statics: tan 10 deg = 0.1763; a pip of twice the height error."""
    assert parting.slow_zone_diameter([2.0, 5.0]).tolist() == [3.0, 5.0]
    assert float(parting.side_force(1000.0, 10.0)) == pytest.approx(176.3, abs=0.1)
    assert float(parting.side_force(1000.0, -10.0)) == pytest.approx(-176.3, abs=0.1)
    assert parting.pip_diameter([0.1, -0.1]).tolist() == [0.2, 0.2]
