"""Forces of steady cuts in whole programs against reference.py, which works them out from the laws alone."""

from __future__ import annotations

import math
from pathlib import Path

import pytest

from auditor.findings import Audit
from tests.predict.reference import Corner, Cut, Law, steady_cut
from tests.predict.shop import MATERIAL, audited, cutting_moves, figures, steady, tool, turning

CLOSE = 2e-3  # the corner's chords change a force by a thousandth; programs are judged to a quarter


def cylinder(diameter: float, feed: float, rpm: float) -> str:
    return f"G21 G99 G97 S{rpm:g} M3\nT0101\nG0 X{diameter:.4f} Z2.\nG1 Z-30. F{feed:g}\nG0 X80.\nM30\n"


def agrees(audit: Audit, expected: Cut, *, rel: float = CLOSE) -> None:
    """The first cut: its steady middle, and those of its largest figures that entering does not lift."""
    index = cutting_moves(audit)[0]
    for found, names in (
        (steady(audit, index), ("mean", "feed_force", "passive")),
        (steady(audit, index), NAMES),
        (figures(audit, index), NAMES),
    ):
        for name in names:
            assert getattr(found, name) == pytest.approx(getattr(expected, name), rel=rel, abs=1e-6), name


NAMES = ("depth", "length", "area", "rake", "cutting", "torque", "chip_max")

CUTS = [
    # kappa, nose, depth, feed: straight edge and corner together, corner alone, sharp corner
    (95.0, 0.8, 3.0, 0.3),
    (95.0, 0.8, 1.0, 0.2),
    (95.0, 0.8, 0.5, 0.15),
    (95.0, 0.4, 0.1, 0.08),
    (75.0, 0.8, 2.0, 0.25),
    (45.0, 0.8, 2.0, 0.25),
    (62.5, 1.2, 0.3, 0.2),
    (90.0, 0.0, 2.0, 0.2),
    (60.0, 0.0, 2.0, 0.2),
]


@pytest.mark.parametrize(("kappa", "nose", "depth", "feed"), CUTS)
def test_external_turning(tmp_path: Path, kappa: float, nose: float, depth: float, feed: float) -> None:
    tools = turning(nose_radius=f"{nose} mm", cutting_edge_angle=f"{kappa} deg")
    audit = audited(tmp_path, cylinder(60.0 - 2.0 * depth, feed, 1000.0), tools)
    index = cutting_moves(audit)[0]
    expected = steady_cut(Corner(kappa, nose), Law(), depth=depth, feed=feed, rpm=1000.0, radius=30.0 - depth)
    found = figures(audit, index)
    # shallow cuts end on the corner: its chord there is up to half a chord flatter or steeper than the arc
    agrees(audit, expected, rel=CLOSE if depth > nose else 8e-3)
    assert found.power == pytest.approx(expected.torque * 2.0 * math.pi * 1000.0 / 60_000.0, rel=1e-2)
    assert found.motor_power == pytest.approx(found.power / 0.8)


FACES = [
    {"pocket_rake": -6.0, "inclination": -6.0, "face": 18.0, "land": 0.0, "land_width": 0.2},
    {"pocket_rake": -6.0, "inclination": -6.0, "face": 18.0, "land": -15.0, "land_width": 0.3},
    {"pocket_rake": 5.0, "inclination": 0.0, "face": 12.0, "land": 0.0, "land_width": 0.1},
    {"pocket_rake": -6.0, "inclination": -6.0, "face": 0.0, "land": 0.0, "land_width": 0.0},
]


@pytest.mark.parametrize("face", FACES)
@pytest.mark.parametrize("feed", [0.08, 0.4])
def test_land_and_face_make_the_rake(tmp_path: Path, face: dict[str, float], feed: float) -> None:
    tools = turning(
        pocket_rake=f"{face['pocket_rake']} deg", pocket_inclination=f"{face['inclination']} deg",
        face_rake=f"{face['face']} deg", land_rake=f"{face['land']} deg", land_width=f"{face['land_width']} mm",
    )  # fmt: skip
    audit = audited(tmp_path, cylinder(56.0, feed, 1200.0), tools)
    corner = Corner(95.0, 0.8, **face)
    agrees(audit, steady_cut(corner, Law(), depth=2.0, feed=feed, rpm=1200.0, radius=28.0))


def test_declared_thrust_pair(tmp_path: Path) -> None:
    material = MATERIAL + 'kn11 = "900 N/mm^2"\nmn = 0.55\n'
    law = Law(kn11=900.0, mn=0.55)
    for depth, feed in ((2.0, 0.3), (0.5, 0.05)):
        tools = turning(face_rake="10 deg")
        audit = audited(tmp_path, cylinder(60.0 - 2 * depth, feed, 800.0), tools, material=material)
        expected = steady_cut(Corner(face=10.0), law, depth=depth, feed=feed, rpm=800.0, radius=30.0 - depth)
        agrees(audit, expected, rel=8e-3)


# Koenig and Essel 1973 as reprinted by Klocke, from memory: Ck45N, kappa_r 70, carbide (exponents m, not 1 - m)
CK45N = Law(kc11=1659.0, mc=0.21, pairs=(521.0, 0.49, 309.0, 0.40))


@pytest.mark.parametrize(("depth", "feed"), [(3.0, 0.3), (1.0, 0.2), (0.4, 0.05)])
def test_catalogue_material_with_feed_and_passive_pairs(tmp_path: Path, depth: float, feed: float) -> None:
    """Mean thickness above 0.1 mm: the powers; below: their tangents."""
    audit = audited(tmp_path, cylinder(60.0 - 2 * depth, feed, 800.0), turning(), material='material = "C45"\n')
    expected = steady_cut(Corner(), CK45N, depth=depth, feed=feed, rpm=800.0, radius=30.0 - depth)
    agrees(audit, expected, rel=8e-3)


def test_facing(tmp_path: Path) -> None:
    """The minor edge of an 80 degree corner at 95 stands at 95 degrees to the cross feed too."""
    program = "G21 G99 G97 S900 M3\nT0101\nG0 X64. Z0.\nG1 X20. F0.25\nG0 Z5.\nM30\n"
    audit = audited(tmp_path, program, turning(), workpiece='diameter = "60 mm"\nlength = "120 mm"\nface = "1.5 mm"')
    index = cutting_moves(audit)[0]
    rows = audit.run.prediction.loads
    # largest force where the speed is lowest on a falling speed factor: compare at both ends of the cut
    for radius in (float(rows.r[rows.depth > 1.5 - 1e-9].max()), 10.0):
        spot = int(abs(rows.r - radius).argmin())
        expected = steady_cut(Corner(), Law(), depth=1.5, feed=0.25, rpm=900.0, radius=float(rows.r[spot]), facing=True)
        assert rows.cutting[spot] == pytest.approx(expected.cutting, rel=CLOSE)
        assert rows.torque[spot] == pytest.approx(expected.torque, rel=CLOSE)
        assert rows.feed_force[spot] == pytest.approx(expected.feed_force, rel=CLOSE)
        assert rows.passive[spot] == pytest.approx(expected.passive, rel=1e-2)
    # across a face the feed force acts along X
    assert abs(rows.force_x[spot]) == pytest.approx(rows.feed_force[spot], rel=1e-9)
    assert figures(audit, index).depth == pytest.approx(1.5)


def test_boring_carries_its_factor(tmp_path: Path) -> None:
    tools = turning(kind="boring", nose_radius="0.4 mm", bar_diameter="16 mm").replace(
        'shank_height = "25 mm"\nshank_width = "25 mm"\n', ""
    )
    program = "G21 G99 G97 S1500 M3\nT0101\nG0 X22. Z2.\nG1 Z-30. F0.15\nG0 X18.\nZ5.\nM30\n"
    audit = audited(tmp_path, program, tools, workpiece='diameter = "60 mm"\nlength = "120 mm"\nbore = "20 mm"')
    expected = steady_cut(
        Corner(95.0, 0.4), Law(operation=1.2), depth=1.0, feed=0.15, rpm=1500.0, radius=11.0, inward=True
    )
    agrees(audit, expected, rel=4e-3)


def test_grooving_presses_straight_back(tmp_path: Path) -> None:
    """h = f along the whole front edge, factor 1.3, no side force; torque at the groove's radius."""
    tools = tool(1, kind="grooving", width="3 mm", nose_radius="0 mm", clearance_angle="7 deg", hand="right",
                 pocket_rake="0 deg", pocket_inclination="0 deg", face_rake="6 deg", land_width="0 mm",
                 land_rake="0 deg", edge_radius="30 um", overhang="25 mm")  # fmt: skip
    program = "G21 G99 G97 S700 M3\nT0101\nG0 X62. Z-20.\nG1 X50. F0.1\nG0 X70.\nM30\n"
    audit = audited(tmp_path, program, tools)
    index = cutting_moves(audit)[0]
    found = figures(audit, index)
    raw = 1800.0 * 0.1**0.75 * 3.0 * 1.3  # rake 6 is the reference: factor 1
    slow = 2.0 * math.pi * 25.0 * 700.0 / 1000.0
    fast = 2.0 * math.pi * 30.0 * 700.0 / 1000.0
    assert found.rake == pytest.approx(6.0)
    assert found.cutting == pytest.approx(raw * 1.380 / slow**0.07, rel=1e-6)
    assert found.feed_force == pytest.approx(found.cutting * math.tan(math.radians(26.0)), rel=1e-6)
    assert found.passive == pytest.approx(0.0, abs=1e-6)
    assert found.torque == pytest.approx(raw * 1.380 / fast**0.07 * 0.030, rel=1e-4)


def test_drilling(tmp_path: Path) -> None:
    """Two lips of half the feed each: Fc of a lip kc d f / 4, torque kc f d^2 / 8, thrust about kc f d/2 sin(118/2).

    Lip forces: Spur, Handbuch der Fertigungstechnik, from memory; a chisel edge that presses as much as the lips: after
    Ghosh and Mallik.
    """
    tools = tool(1, kind="drilling", diameter="10 mm", point_angle="118 deg", flutes=2, edge_radius="30 um",
                 substrate="carbide", hand="right", overhang="60 mm")  # fmt: skip
    program = "G21 G99 G97 S1000 M3\nT0101\nG0 X0. Z2.\nG1 Z-25. F0.2\nG0 Z5.\nM30\n"
    audit = audited(tmp_path, program, tools)
    found = figures(audit, cutting_moves(audit)[0])
    half_point = math.radians(59.0)
    thickness = 0.1 * math.sin(half_point)
    kc = 1800.0 * thickness**-0.25 * 1.2
    assert found.chip_max == pytest.approx(thickness, rel=1e-9)
    factor = found.torque / (kc * 0.2 * 100.0 / 8.0 / 1000.0)
    # a straight lip has no rake, 6 degrees off the reference; at 15.7 m/min half-way out the speed factor is held
    assert factor == pytest.approx(1.09 * 2.023 / 20.0**0.153, rel=1e-6)
    assert found.feed_force == pytest.approx(kc * factor * 0.2 * 10.0 / 2.0 * math.sin(half_point), rel=1e-6)
    assert found.cutting == pytest.approx(2.0 * kc * factor * 10.0 * 0.2 / 4.0, rel=1e-6)
    assert found.passive == 0.0
    assert found.depth == pytest.approx(5.0)


def test_high_speed_steel_and_factors_switched_off(tmp_path: Path) -> None:
    before = cylinder(56.0, 0.3, 300.0)
    plain = audited(tmp_path, before, turning() + "[model]\nspeed_correction = false\noperation_factor = false\n")
    steel = audited(tmp_path, before, turning(substrate="high-speed steel"))
    expected = steady_cut(Corner(), Law(substrate=1.2), depth=2.0, feed=0.3, rpm=300.0, radius=28.0)
    agrees(steel, expected)
    bare = figures(plain, cutting_moves(plain)[0]).cutting
    speed = 2.0 * math.pi * 29.0 * 300.0 / 1000.0
    assert bare * 1.2 * 2.023 / speed**0.153 == pytest.approx(expected.cutting, rel=3e-3)
