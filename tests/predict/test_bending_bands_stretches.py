"""Give of a stepped part along a cut, bands of a prediction, and stretches that are cut apart."""

from __future__ import annotations

import math
from pathlib import Path

import numpy as np
import pytest
from shapely.geometry import Polygon
from shapely.geometry.polygon import orient

from auditor.predict.stiffness import sections_of
from tests.predict.reference import Corner, Law, effective_rake, speed_factor
from tests.predict.shop import MATERIAL, audited, cutting_moves, figures, tool, turning

MODULUS = 210_000.0

def second_moment(diameter: float, bore: float = 0.0) -> float:
    return math.pi * (diameter**4 - bore**4) / 64.0


def stepped_give(sections: list[tuple[float, float]], at: float) -> float:
    """Unit-load theorem: the sum over the sections of (u^3 - v^3) / (3 E I), u and v measured back from the load."""
    total, begin = 0.0, 0.0
    for end, diameter in sections:
        u, v = max(at - begin, 0.0), max(at - end, 0.0)
        total += (u**3 - v**3) / (3.0 * MODULUS * second_moment(diameter))
        begin = end
    return total


def give(tmp_path: Path, stock: str, z: float, holding: str = 'kind = "chuck"') -> float:
    """Give of the part under a light radial cut of a sharp upright edge at Z; the stock stands 80 mm out."""
    program = f"G21 G99 G97 S800 M3\nT0101\nG0 X70. Z{z:g}\nG1 X39.8 F0.05\nX70.\nM30\n"
    audit = audited(tmp_path, program, turning(), workpiece=stock, holding=holding)
    rows = audit.run.prediction.loads
    return float(rows.compliance[np.flatnonzero(rows.depth > 0.0)[0]])


@pytest.mark.parametrize("z", [-5.0, -40.0, -70.0])
def test_overhung_bar_gives_as_a_cantilever(tmp_path: Path, z: float) -> None:
    """F a^3 / (3 E I), Timoshenko."""
    stock = 'diameter = "40 mm"\nlength = "120 mm"'
    expected = (80.0 + z) ** 3 / (3.0 * MODULUS * second_moment(40.0))
    assert give(tmp_path, stock, z) == pytest.approx(expected, rel=1e-6)


@pytest.mark.parametrize("z", [-10.0, -33.0, -70.0])
def test_a_tailstock_stiffens(tmp_path: Path, z: float) -> None:
    """Built in and propped a^3 b^2 (3 L + b) / (12 E I L^3); between centres a^2 b^2 / (3 E I L) (Roark, 1c and 1e)."""
    stock = 'diameter = "40 mm"\nlength = "120 mm"'
    a, length = 80.0 + z, 80.0
    b, ei = length - a, MODULUS * second_moment(40.0)
    tailstock = 'tailstock = { point = ["0 mm", "0 mm"], diameter = "8 mm" }\n'
    propped = give(tmp_path, stock, z, 'kind = "chuck+tailstock"\n' + tailstock)
    assert propped == pytest.approx(a**3 * b**2 * (3.0 * length + b) / (12.0 * ei * length**3), rel=1e-6)
    centred = give(tmp_path, stock, z, 'kind = "centres"\n' + tailstock)
    assert centred == pytest.approx(a**2 * b**2 / (3.0 * ei * length), rel=1e-6)


def test_sections_of_a_stepped_hollow_part() -> None:
    """Steps, a bore and a cone as second moments of area from the jaws outwards."""
    part = Polygon(
        [(0, 5), (-20, 5), (-20, 0), (-100, 0), (-100, 30), (-60, 30), (-60, 20), (-40, 20), (-40, 15), (0, 10)]
    )
    found = sections_of(orient(part), -80.0)
    assert found is not None
    ends, moments = found
    assert ends[-1] == pytest.approx(80.0)
    starts = np.append(0.0, ends[:-1])
    for end, start, moment in zip(ends, starts, moments, strict=True):
        z = -80.0 + 0.5 * (start + end)
        outer = 30.0 if z < -60.0 else 20.0 if z < -40.0 else 15.0 - (z + 40.0) * 5.0 / 40.0
        inner = 5.0 if z > -20.0 else 0.0
        assert moment == pytest.approx(second_moment(2 * outer, 2 * inner), rel=1e-9)


def test_give_along_a_stepped_shaft(tmp_path: Path) -> None:
    """A slim journal of 40 mm on a collar of 56 mm."""
    stock = 'length = "120 mm"\nprofile = [["0 mm", "40 mm"], ["-40 mm", "40 mm"], ["-40 mm", "56 mm"]]'
    expected = stepped_give([(40.0, 56.0), (80.0, 40.0)], 70.0)
    assert give(tmp_path, stock, -10.0) == pytest.approx(expected, rel=1e-6)


def test_bending_is_give_times_force(tmp_path: Path) -> None:
    program = "G21 G99 G97 S800 M3\nT0101\nG0 X36. Z2.\nG1 Z-30. F0.2\nX50.\nM30\n"
    audit = audited(tmp_path, program, turning(), workpiece='diameter = "40 mm"\nlength = "120 mm"')
    rows = audit.run.prediction.loads
    lengthwise = rows.move == 1  # there the passive force is the radial one
    assert rows.bend[lengthwise] == pytest.approx((rows.compliance * rows.passive)[lengthwise], rel=1e-9)
    assert rows.bend_tangential == pytest.approx(rows.compliance * rows.cutting, rel=1e-9)


@pytest.mark.parametrize(("model", "wear"), [("", 1.0), ("[model]\nwear_factor = 1.3\n", 1.3)])
def test_bands(tmp_path: Path, model: str, wear: float) -> None:
    """nominal (1 - u) to nominal (1 + sqrt(u^2 + (wear - 1)^2)), u = 0.15 as declared."""
    program = "G21 G99 G97 S900 M3\nT0101\nG0 X56. Z2.\nG1 Z-30. F0.3\nX64.\nM30\n"
    audit = audited(tmp_path, program, turning() + model)
    prediction = audit.run.prediction
    low, high = prediction.band(1000.0, 0.15)
    assert low == pytest.approx(850.0)
    assert high == pytest.approx(1000.0 * (1.0 + math.sqrt(0.15**2 + (wear - 1.0) ** 2)))
    # wear is a matter of the band: the nominal figure stays
    plain = audited(tmp_path, program, turning())
    assert figures(audit, 1).cutting == pytest.approx(figures(plain, 1).cutting)


def test_thin_chips_widen_the_band(tmp_path: Path) -> None:
    """Below 0.1 mm the law is carried beyond its measurements: 40 %; below 0.03 mm an order of magnitude."""
    for feed, expected in ((0.3, 0.15), (0.08, 0.4), (0.02, 1.0)):
        program = f"G21 G99 G97 S900 M3\nT0101\nG0 X56. Z2.\nG1 Z-30. F{feed}\nX64.\nM30\n"
        audit = audited(tmp_path, program, turning())
        rows = audit.run.prediction.loads
        steady = np.flatnonzero((rows.move == 1) & (rows.depth > 1.999))
        assert rows.scatter[steady[1]] == pytest.approx(expected)


def test_two_stretches_have_a_thickness_and_a_rake_each(tmp_path: Path) -> None:
    """The corner takes 0.2 mm off the core while the main edge faces a collar 3 mm further out.

    Stock: a core of 40 mm and a ring from 46 to 52 mm, a groove between. Sharp land and face: the thin stretch at
    the corner meets the land alone, the thick one at the main edge mostly the face.
    """
    stock = 'length = "100 mm"\ndiameter = "52 mm"'
    face = {"face_rake": "18 deg", "land_width": "0.2 mm", "pocket_rake": "-6 deg", "pocket_inclination": "0 deg"}
    groover = tool(2, kind="face grooving", width="3 mm", nose_radius="0 mm", clearance_angle="7 deg", hand="right",
                   overhang="25 mm")  # fmt: skip
    program = (
        "G21 G99 G97 S800 M3\nT0202\nG0 X40. Z2.\nG1 Z-20. F0.1\nZ2.\nG0 X100. Z50.\n"
        "T0101\nG0 X39.6 Z2.\nG1 Z-15. F0.3\nX60.\nM30\n"
    )
    audit = audited(tmp_path, program, turning(**face) + groover, workpiece=stock)
    index = next(move.index for move in audit.run.path.moves if move.tool == 1 and move.kind == "feed")
    samples = audit.run.simulation.samples
    rows = np.flatnonzero((samples.move == index) & (samples.position > 10.0) & (samples.position < 16.9))
    if len(rows) == 0:  # nothing changes there: the last rows before hold
        last = samples.position[(samples.move == index) & (samples.position <= 10.0)].max()
        rows = np.flatnonzero((samples.move == index) & (samples.position == last))
    extents = sorted((samples.high - samples.low)[rows[-2:]])
    assert extents == pytest.approx([0.2, 3.0], abs=1e-3)

    corner = Corner(95.0, 0.8, pocket_rake=-6.0, face=18.0, land_width=0.2)
    theta = math.acos(1.0 - 0.2 / 0.8)
    thin = 0.3 * 0.2 / (0.8 * theta)
    thick = 0.3 * math.sin(math.radians(95.0))
    assert effective_rake(corner, thin) < effective_rake(corner, thick) - 5.0
    steps = 20_000
    on_nose = sum(
        (0.3 * math.sin((i + 0.5) / steps * theta)) ** 0.75 * 0.8 * theta / steps for i in range(steps)
    )
    on_edge = thick**0.75 * 3.0 / math.sin(math.radians(95.0))
    pi2 = 2.0 * math.pi * 800.0 / 1000.0

    def factor(mean: float, middle: float) -> float:
        return speed_factor(pi2 * middle) * (1.0 - 0.015 * (effective_rake(corner, mean) - 6.0))

    expected = 1800.0 * (on_nose * factor(thin, 19.9) + on_edge * factor(thick, 24.5))
    loads = audit.run.prediction.loads
    mine = np.flatnonzero(loads.move == index)
    middle = mine[np.abs(loads.position[mine] - 10.0).argmin()]
    assert loads.cutting[middle] == pytest.approx(expected, rel=5e-3)
    assert loads.depth[middle] == pytest.approx(3.2, abs=2e-3)
    assert loads.rake[middle] == pytest.approx(effective_rake(corner, thick), abs=0.05)


def test_plastics_have_geometry_but_no_force(tmp_path: Path) -> None:
    program = "G21 G99 G97 S900 M3\nT0101\nG0 X56. Z2.\nG1 Z-30. F0.3\nX64.\nM30\n"
    audit = audited(tmp_path, program, turning(), material='material = "PEEK"\n')
    found = figures(audit, cutting_moves(audit)[0])
    assert found.depth == pytest.approx(2.0)
    assert found.area == pytest.approx(0.6)
    assert all(math.isnan(value) for value in (found.cutting, found.torque, found.power, found.passive))


def test_force_rises_with_depth_and_with_feed(tmp_path: Path) -> None:
    def cutting(depth: float, feed: float) -> float:
        program = f"G21 G99 G97 S900 M3\nT0101\nG0 X{60 - 2 * depth:.3f} Z2.\nG1 Z-30. F{feed}\nX64.\nM30\n"
        return figures(audited(tmp_path, program, turning(), material=MATERIAL), 1).cutting

    by_depth = [cutting(depth, 0.2) for depth in (0.2, 0.5, 1.0, 3.0)]
    by_feed = [cutting(1.0, feed) for feed in (0.05, 0.1, 0.2, 0.4)]
    assert by_depth == sorted(by_depth)
    assert by_feed == sorted(by_feed)
    assert Law().kc11 == 1800.0
