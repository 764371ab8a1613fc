"""Simple cuts whose depth, edge length and volume are known in closed form.

Engaged edge of a rounded corner: slice model of the corner (circle and tangents, plane geometry). Volumes: solids of
revolution. Chords stand off a rounding by a thousandth of a millimetre at most, which the tolerances allow for.
"""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest

from tests.simulate.judge import corner_edge
from tests.simulate.workshop import (
    BLADE,
    BORER,
    DRILL,
    KNIFE,
    ROUGHER,
    Path,
    bar,
    cut,
    deepest,
    depth_at,
    edge_length,
    shaped,
    stretches_at,
)

CHORD = 0.001  # mm between a chord and its arc


@pytest.mark.parametrize("depth", [0.05, 0.1, 0.5, 0.8, 2.0, 5.0])
def test_cylinder_pass(depth: float) -> None:
    simulation = cut(Path(2.0, 30.0 - depth).to(-40.0, 30.0 - depth), bar())
    assert deepest(simulation, 0) == pytest.approx(depth, abs=1e-9)
    (low, high), = stretches_at(simulation, 0, 20.0)
    length = corner_edge(depth, 0.8, 95.0)
    # a thousandth in depth is more along the edge where the corner is still flat
    slack = CHORD / math.sin(min(length / 0.8, math.pi / 2.0))
    assert edge_length(simulation, 0, low, high) == pytest.approx(length, abs=slack)
    # the ring, less what the leading edge leaves at the end: it stands back from the tip's foremost point
    height = np.linspace(0.0, depth, 20_001)
    angle = math.radians(95.0)
    round_end = 0.8 * (1.0 - math.cos(angle))
    nose = np.sqrt(np.maximum(0.64 - (0.8 - height) ** 2, 0.0))
    ahead = np.where(height < round_end, nose, 0.8 * math.sin(angle) + (height - round_end) / math.tan(angle)) - 0.8
    left = np.trapezoid(2.0 * math.pi * (30.0 - depth + height) * -ahead, height)
    assert simulation.removed[0] == pytest.approx(
        math.pi * (900.0 - (30.0 - depth) ** 2) * 40.0 - left, abs=2.0 * math.pi * 30.0 * CHORD * length
    )


@pytest.mark.parametrize("taper", [1.0, 10.0, 40.0])
def test_cone_with_an_upright_edge(taper: float) -> None:
    """A sharp corner at 90 degrees: the depth is the upright edge seen at right angles to the sloping feed."""
    slope = math.tan(math.radians(taper))
    simulation = cut(Path(2.0, 25.0).to(-5.0, 25.0 + 7.0 * slope, tool=KNIFE.number), bar())
    for z in (-0.5, -2.5, -4.9):
        radius = 25.0 + (2.0 - z) * slope
        travel = (2.0 - z) / math.cos(math.radians(taper))
        expected = max(0.0, 30.0 - radius) * math.cos(math.radians(taper))
        assert depth_at(simulation, 0, travel) == pytest.approx(expected, abs=1e-9)
    front, back = 25.0 + 2.0 * slope, min(30.0, 25.0 + 7.0 * slope)
    height = (back - front) / slope
    frustum = math.pi * height / 3.0 * (front**2 + front * back + back**2)
    assert simulation.removed[0] == pytest.approx(math.pi * 900.0 * height - frustum, rel=1e-9)


def test_light_finish_on_a_taper_loses_no_volume() -> None:
    """0.1 mm on a 10 degree taper: the point where the nose is tangent to the cone must be a node of the edge."""
    taper, nose = math.radians(10.0), 0.8
    step = 0.1 / math.cos(taper)  # radial distance of the two passes
    end = 20.0 + 32.0 * math.tan(taper)
    path = Path(2.0, 20.0 + step).to(-30.0, end + step).rapid(10.0, 45.0).rapid(2.0, 20.0).to(-30.0, end)
    simulation = cut(path, bar())
    assert depth_at(simulation, 3, 16.0) == pytest.approx(0.1, abs=1e-9)
    # what the second pass leaves: the line tangent to the nose, and at its end the nose itself
    z = np.linspace(-30.0, 0.0, 300_001)
    centre_z, centre_r = -30.0 + nose, end + nose
    tangent_z, tangent_r = centre_z - nose * math.sin(taper), centre_r - nose * math.cos(taper)
    line = tangent_r - (z - tangent_z) * math.tan(taper)
    left = np.where(z > tangent_z, line, centre_r - np.sqrt(np.maximum(nose**2 - (z - centre_z) ** 2, 0.0)))
    assert simulation.removed[3] == pytest.approx(math.pi * np.trapezoid((left + step) ** 2 - left**2, z), rel=1e-4)


def test_facing_past_the_centre() -> None:
    simulation = cut(Path(0.0, 32.0).to(0.0, -0.8), bar(face=1.5))
    assert deepest(simulation, 0) == pytest.approx(1.5, abs=1e-9)
    assert simulation.removed[0] == pytest.approx(math.pi * 900.0 * 1.5, rel=2e-6)
    assert simulation.final.bounds[2] == pytest.approx(0.0, abs=2e-3)


def test_only_the_nose_cuts() -> None:
    simulation = cut(Path(2.0, 29.9).to(-40.0, 29.9), bar())
    (low, high), = stretches_at(simulation, 0, 20.0)
    edge = simulation.edges[0]
    engaged = (edge.across[:-1] < high - 1e-6) & (edge.across[1:] > low + 1e-6)
    # largest chip thickness per feed f: sine of the arc angle reached, acos(1 - a/r), within half a chord of 0.1 rad
    assert edge.sine[engaged].max() == pytest.approx(math.sin(math.acos(1.0 - 0.1 / 0.8)), abs=0.05)
    assert edge.round_high == pytest.approx(0.8) or edge.round_low == pytest.approx(0.8)


def test_groove_plunge() -> None:
    simulation = cut(Path(-20.0, 32.0, tool=BLADE.number).to(-20.0, 22.0), bar())
    assert deepest(simulation, 0) == pytest.approx(3.0, abs=1e-9)
    (low, high), = stretches_at(simulation, 0, 5.0)
    assert edge_length(simulation, 0, low, high) == pytest.approx(3.0, abs=1e-9)
    assert simulation.removed[0] == pytest.approx(math.pi * (900.0 - 484.0) * 3.0, rel=1e-9)
    # the programmed corner is the one nearer the chuck: the groove lies in front of it
    groove = np.array([[z, r] for z, r in simulation.final.exterior.coords if abs(r - 22.0) < 1e-9])
    assert groove[:, 0].min() == pytest.approx(-20.0)
    assert groove[:, 0].max() == pytest.approx(-17.0)


def test_rounded_groove_corners() -> None:
    tool = replace(BLADE, nose_radius=0.4)
    simulation = cut(Path(-20.0, 32.0, tool=4).to(-20.0, 22.0), bar(), [tool])
    (low, high), = stretches_at(simulation, 0, 5.0)
    assert edge_length(simulation, 0, low, high) == pytest.approx(3.0 - 0.8 + math.pi * 0.4, abs=2e-3)
    # Pappus: the area left in each corner is (1 - pi/4) rho^2, its centroid 0.2234 rho from the groove's bottom
    spared = 2.0 * (1.0 - math.pi / 4.0) * 0.16
    volume = math.pi * (900.0 - 484.0) * 3.0 - 2.0 * math.pi * (22.0 + 0.2234 * 0.4) * spared
    assert simulation.removed[0] == pytest.approx(volume, rel=5e-5)


def test_drill() -> None:
    simulation = cut(Path(5.0, 0.0, tool=DRILL.number).to(-30.0, 0.0), bar())
    cone = 6.0 / math.tan(math.radians(70.0))
    assert deepest(simulation, 0) == pytest.approx(6.0, abs=1e-9)
    assert depth_at(simulation, 0, 5.0 + 0.5 * cone) == pytest.approx(3.0, abs=1e-9)
    (low, high), = stretches_at(simulation, 0, 20.0)
    assert edge_length(simulation, 0, low, high) == pytest.approx(6.0 / math.sin(math.radians(70.0)), abs=1e-9)
    assert simulation.removed[0] == pytest.approx(math.pi * 36.0 * (30.0 - cone + cone / 3.0), rel=1e-9)


def test_bore() -> None:
    simulation = cut(Path(2.0, 11.0, tool=BORER.number).to(-40.0, 11.0), bar(bore=20.0))
    assert deepest(simulation, 0) == pytest.approx(1.0, abs=1e-9)
    (low, high), = stretches_at(simulation, 0, 20.0)
    assert edge_length(simulation, 0, low, high) == pytest.approx(corner_edge(1.0, 0.4, 95.0), abs=2e-3)
    assert simulation.removed[0] == pytest.approx(math.pi * 21.0 * 40.0, rel=2e-3)


def test_outside_arc_leaves_a_quarter_round() -> None:
    """Nose centre programmed on a circle about the corner's centre: the work keeps a quarter of radius 10."""
    tool = replace(ROUGHER, tip=9)
    path = Path(0.8, 20.0).arc(-10.0, 30.8, (-10.0, 20.0), clockwise=False)
    simulation = cut(path, bar(), [tool])
    z = np.linspace(-10.0, 0.0, 200_001)
    outside = math.pi * np.trapezoid(900.0 - (20.0 + np.sqrt(100.0 - (z + 10.0) ** 2)) ** 2, z)
    # the path's chords lie inside the circle by a thousandth at most: never less is cut, and hardly more
    assert outside * (1.0 - 1e-5) < simulation.removed[0] < outside + 2.0 * math.pi * 30.0 * 5.0 * math.pi * CHORD
    distance = [math.hypot(z + 10.0, r - 20.0) for z, r in simulation.final.exterior.coords if z > -9.9 and r > 20.1]
    assert max(abs(d - 10.0) for d in distance) < 2.5 * CHORD


def test_inside_arc_leaves_a_hollow() -> None:
    """The nose centre on a circle of 10 - 0.8 inside a radius of 10; the bar keeps the fillet."""
    tool = replace(ROUGHER, tip=9)
    # a shoulder at z = -40 and a core of radius 20 joined by a fillet of 10
    path = Path(2.0, 20.8).to(-30.0, 20.8).arc(-39.2, 30.0, (-30.0, 30.0), clockwise=True).to(-39.2, 41.0)
    simulation = cut(path, shaped((0.0, 0.0), (-80.0, 0.0), (-80.0, 30.0), (0.0, 30.0)), [tool])
    fillet = [(z, r) for z, r in simulation.final.exterior.coords if z < -30.01 and z > -39.9 and r < 29.9 and r > 19]
    assert fillet
    assert max(abs(math.hypot(z + 30.0, r - 30.0) - 10.0) for z, r in fillet) < 2.5 * CHORD
