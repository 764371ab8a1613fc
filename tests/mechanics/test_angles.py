"""Tool angles against three-dimensional vectors; effective rake, clearance and copying against plane geometry."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from auditor.mechanics.clearance import (
    back_clearance,
    bore_heel_clearance,
    feed_angle,
    height_angle,
    height_effect,
    height_radius_error,
    normal_clearance,
    orthogonal_clearance,
    side_clearance,
    vanishing_diameter,
)
from auditor.mechanics.copying import (
    minor_edge_angle,
    minor_working_angle,
    steepest_in_copy,
    steepest_out_copy,
    working_edge_angle,
)
from auditor.mechanics.rake import (
    back_rake,
    edge_limited_rake,
    effective_rake,
    inclination,
    normal_rake,
    orthogonal_rake,
    side_rake,
)

tilt = st.floats(-25.0, 25.0)
edge = st.floats(15.0, 117.5)


class Face:
    """A flat face of a tool as a plane: z (along the cutting speed) falls by tan(angle) along feed and back plane."""

    def __init__(self, side: float, back: float) -> None:
        self.normal = np.array([np.tan(np.radians(side)), np.tan(np.radians(back)), 1.0])

    def trace(self, across: np.ndarray) -> np.ndarray:
        """Direction in which the face meets the plane at right angles to ``across``."""
        line = np.cross(across, self.normal)
        return line / np.linalg.norm(line)

    def fall(self, along: np.ndarray) -> float:
        """Angle below the reference plane when going along a direction of the reference plane (deg)."""
        line = self.trace(np.cross(along, [0.0, 0.0, 1.0]))
        return float(np.degrees(np.arctan(-line[2] / (line @ along))))


def directions(kr: float) -> tuple[np.ndarray, np.ndarray]:
    """In the reference plane: at right angles to the edge into the tool, and along the edge away from the corner."""
    k = np.radians(kr)
    return np.array([np.sin(k), np.cos(k), 0.0]), np.array([-np.cos(k), np.sin(k), 0.0])


@given(tilt, tilt, edge)
def test_rake_and_inclination_are_those_of_the_plane(gf, gp, kr):
    face, (into, along) = Face(gf, gp), directions(kr)
    assert float(orthogonal_rake(gf, gp, kr)) == pytest.approx(face.fall(into), abs=1e-9)
    # lambda_s is positive where the edge falls away from the corner
    assert float(inclination(gf, gp, kr)) == pytest.approx(face.fall(along), abs=1e-9)


@given(tilt, tilt, edge)
def test_normal_rake_is_measured_across_the_edge_itself(gf, gp, kr):
    face, (into, _) = Face(gf, gp), directions(kr)
    edge_line = face.trace(into)  # the edge: where the face meets the plane of the edge
    across_face = np.cross(edge_line, face.normal)
    across_reference = np.cross(edge_line, np.cross(edge_line, [0.0, 0.0, 1.0]))  # cutting speed less its edge part
    cosine = across_face @ across_reference / np.linalg.norm(across_face) / np.linalg.norm(across_reference)
    expected = abs(90.0 - np.degrees(np.arccos(np.clip(cosine, -1.0, 1.0))))
    go, ls = orthogonal_rake(gf, gp, kr), inclination(gf, gp, kr)
    assert abs(float(normal_rake(go, ls))) == pytest.approx(expected, abs=1e-6)


@given(tilt, tilt, edge)
def test_conversions_undo_each_other(go, ls, kr):
    gf, gp = side_rake(go, ls, kr), back_rake(go, ls, kr)
    assert float(orthogonal_rake(gf, gp, kr)) == pytest.approx(go, abs=1e-9)
    assert float(inclination(gf, gp, kr)) == pytest.approx(ls, abs=1e-9)


@given(st.floats(2.0, 20.0), st.floats(-10.0, 10.0), edge)
def test_clearances_are_those_of_one_flank_plane(ao, ls, kr):
    """The flank holds the edge and falls by alpha_o behind it; its side and back clearance as vectors."""
    into, along = directions(kr)
    lam = np.radians(ls)
    edge_line = along * np.cos(lam) - np.array([0.0, 0.0, np.sin(lam)])
    a = np.radians(ao)
    recede = into * np.sin(a) - np.array([0.0, 0.0, np.cos(a)])
    flank = np.cross(edge_line, recede)
    for plane_direction, law in (
        (np.array([1.0, 0.0, 0.0]), side_clearance),
        (np.array([0.0, 1.0, 0.0]), back_clearance),
    ):
        down = np.cross(np.cross(plane_direction, [0.0, 0.0, 1.0]), flank)
        down = down if down[2] < 0.0 else -down
        expected = np.degrees(np.arctan2(down @ plane_direction, -down[2]))
        assert float(law(ao, ls, kr)) == pytest.approx(expected % 180.0, abs=1e-6)


def test_wedge_closes_in_the_normal_plane():
    """ISO 3002-1: clearance + wedge + rake = 90; a 7 deg insert in a 0/0 pocket keeps its 7 deg."""
    assert float(normal_clearance(7.0, 0.0)) == 7.0
    assert float(orthogonal_clearance(normal_clearance(7.0, 0.0), 0.0)) == pytest.approx(7.0)


def test_a_plane_at_right_angles_is_no_rake():
    with pytest.raises(ValueError, match="side rake must be between -90 and 90; found 90 deg"):
        orthogonal_rake(90.0, 0.0, 75.0)


# ---- effective rake


@given(st.floats(-10.0, 10.0), st.floats(0.0, 25.0), st.floats(-25.0, 0.0), st.floats(0.0, 0.5), st.floats(0.0, 1.0))
def test_effective_rake_lies_between_land_and_face(pocket, face, land, width, h):
    g = float(effective_rake(pocket, face, land, width, h))
    assert pocket + land - 1e-9 <= g <= pocket + face + 1e-9


@given(st.floats(0.01, 0.5), st.floats(0.0, 1.0), st.floats(0.0, 1.0))
def test_a_thicker_chip_sees_more_of_the_face(width, h, more):
    thin, thick = effective_rake(-6.0, 16.0, 0.0, width, [h, h + more])
    assert thin <= thick + 1e-9


def test_without_a_land_the_face_counts_and_with_no_chip_the_land():
    assert effective_rake(-6.0, 16.0, -20.0, 0.0, [0.0, 0.2]).tolist() == [10.0, 10.0]
    assert float(effective_rake(-6.0, 16.0, -20.0, 0.1, 0.0)) == -26.0


@given(st.floats(-20.0, 20.0), st.floats(0.005, 0.1))
def test_edge_radius_takes_over_without_a_step(blend, rb):
    switch = rb * (1.0 + np.sin(np.radians(blend)))
    below, above = edge_limited_rake(blend, rb, [switch * (1.0 - 1e-9), switch * (1.0 + 1e-9)])
    assert below == pytest.approx(above, abs=1e-2)


@given(st.floats(-20.0, 20.0), st.floats(0.0, 0.1), st.floats(0.0, 0.3))
def test_a_round_edge_never_makes_the_rake_friendlier(blend, rb, h):
    assert float(edge_limited_rake(blend, rb, h)) <= blend + 1e-9


# ---- feed, height, bore


@given(st.floats(0.01, 1.0), st.floats(1.0, 20.0))
def test_at_the_vanishing_diameter_the_feed_takes_all_clearance(f, a):
    assert float(feed_angle(f, vanishing_diameter(f, a))) == pytest.approx(a, rel=1e-9)


def test_feed_angle_at_the_axis_is_a_right_angle():
    assert float(feed_angle(0.1, 0.0)) == 90.0


@given(st.floats(-2.0, 2.0), st.floats(4.1, 200.0))
def test_height_turns_the_cutting_direction_as_the_circle_does(e, d):
    """The velocity at (x, e) on a circle of diameter d leans by atan(e / x)."""
    x = np.sqrt((d / 2.0) ** 2 - e**2)
    assert float(height_angle(e, d)) == pytest.approx(np.degrees(np.arctan2(e, x)), abs=1e-9)


def test_height_beyond_the_radius_is_held():
    assert height_angle([0.3, -0.3, 0.0], 0.5).tolist() == [90.0, -90.0, 0.0]
    assert height_angle([0.3, -0.3, 0.0], 0.0).tolist() == [90.0, -90.0, 0.0]


@pytest.mark.parametrize(
    ("internal", "height", "rake_sign"), [(False, 0.2, 1), (False, -0.2, -1), (True, 0.2, -1), (True, -0.2, 1)]
)
def test_signs_of_a_height_error(internal, height, rake_sign):
    """Above centre: outside the rake grows, inside it shrinks; clearance always does the opposite."""
    shift, clearance = height_effect(height, 20.0, internal=internal)
    assert np.sign(shift) == rake_sign
    assert float(shift + clearance) == 0.0


def test_radius_error_is_about_half_the_square_over_the_radius():
    assert float(height_radius_error(10.0, 0.2)) == pytest.approx(0.2**2 / 20.0, rel=1e-3)


@given(st.floats(2.0, 100.0), st.floats(0.05, 0.95))
def test_heel_just_touches_the_bore(radius, share):
    """A flank of that clearance through the edge meets the circle again exactly at the heel."""
    v = share * radius
    a = np.radians(float(bore_heel_clearance(radius, v)))
    heel = np.array([radius - v * np.tan(a), v])  # bore centre at the origin, edge at (radius, 0)
    assert np.hypot(*heel) == pytest.approx(radius, rel=1e-9)


def test_heel_deeper_than_the_bore_is_refused():
    with pytest.raises(ValueError, match="heel"):
        bore_heel_clearance(5.0, 6.0)


# ---- copying


@pytest.mark.parametrize(
    ("kr", "included", "steepest"),
    [
        (93.0, 55.0, 30.0),
        (93.0, 35.0, 50.0),
        (72.5, 35.0, 70.0),
        (95.0, 80.0, 3.0),
        (93.0, 60.0, 25.0),
        (107.5, 55.0, 15.5),
    ],
)
def test_in_copying_limits_of_usual_holders(kr, included, steepest):
    """Common practice in plunging angles: D 30, V 50 and 70, C 3, T 25; D at 107.5 deg 15 to 15.5."""
    assert float(steepest_in_copy(minor_edge_angle(kr, included))) == pytest.approx(steepest, abs=0.5)


def test_facing_with_a_95_degree_tool():
    """Outwards the main edge wipes at 5 deg, inwards the minor edge of an 80 deg insert cuts at 95 (plane geometry)."""
    assert float(working_edge_angle(95.0, 90.0)) == 5.0
    assert float(minor_working_angle(minor_edge_angle(95.0, 80.0), -90.0)) == 95.0
    assert float(steepest_out_copy(95.0)) == 92.0


@given(st.floats(60.0, 110.0), st.floats(35.0, 60.0), st.floats(-90.0, 90.0))
def test_the_minor_edge_trails_up_to_its_own_angle(kr, included, phi):
    """It cuts (below 180 deg) exactly where the path dips more steeply than kr'."""
    minor = float(minor_edge_angle(kr, included))
    assert (float(minor_working_angle(minor, phi)) < 180.0) == (-phi > minor)
