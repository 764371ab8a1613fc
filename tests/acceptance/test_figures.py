"""Depth, edge, area, thickness, rake, forces, torque, power and time of single cuts against hand calculation."""

from __future__ import annotations

from math import pi, radians, sin, tan
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from tests.acceptance.bench import BAR, DRILL, GROOVER, NO_CORRECTIONS, ROUGHER, WORKPIECE, Report, check, job_text
from tests.acceptance.laws import Edge, Law, cut, facing_time

START = "O1\nG18 G21 G40 G99\nT0101\n"
END = "G0 X200. Z100.\nM30\n"

# kappa, nose, face rake, land, depth, feed: roughing, semi-finishing, nose only, sharp corner, 45 degrees
CUTS = [
    (95.0, 0.8, 18.0, 0.2, 2.0, 0.30),
    (95.0, 0.8, 18.0, 0.2, 0.4, 0.15),
    (95.0, 1.2, 14.0, 0.3, 3.0, 0.45),
    (75.0, 0.8, 12.0, 0.15, 2.5, 0.35),
    (45.0, 1.2, 0.0, 0.0, 3.0, 0.40),
    (90.0, 0.0, 20.0, 0.1, 1.5, 0.25),
    (60.0, 0.4, 10.0, 0.0, 0.5, 0.10),
]


def steady(report: Report, line: int, figure: str, at: float) -> float:
    """A sampled curve read at a distance along the move (mm): the steady cut, past the entry."""
    rows = [row for row in report.document["series"] if row["line"] == line]
    return float(np.interp(at, rows[0]["path_mm"], rows[0][figure]))


def turning(kappa: float, nose: float, face: float, land: float) -> dict[str, Any]:
    included = 80.0 if kappa > 50 else 90.0
    return {
        **ROUGHER, "insert": None, "holder": None,
        "cutting_edge_angle": f"{kappa} deg", "included_angle": f"{included} deg", "nose_radius": f"{nose} mm",
        "clearance_angle": "0 deg", "face_rake": f"{face} deg", "land_width": f"{land} mm", "edge_radius": "20 um",
    }  # fmt: skip


@pytest.mark.parametrize(("kappa", "nose", "face", "land", "depth", "feed"), CUTS)
def test_turning_along(
    tmp_path: Path, kappa: float, nose: float, face: float, land: float, depth: float, feed: float
) -> None:
    """Steady longitudinal cut; at its end nothing else is cut, as the tool leaves the stock sideways at Z-40."""
    diameter = 60 - 2 * depth
    program = START + f"G97 S800 M3\nG0 X{diameter} Z3.\nG1 Z-40. F{feed}\nG0 X70.\n" + END
    report = check(tmp_path, program, job_text({1: turning(kappa, nose, face, land)}, model=NO_CORRECTIONS), "--series")
    move = next(m for m in report.moves if m["line"] == 6)
    want = cut(Edge(kappa, nose, -6.0, -6.0, face, land), Law(), depth, feed, diameter / 2)
    assert move["depth_of_cut_mm"] == pytest.approx(depth, abs=1e-3)
    assert move["chip_area_mm2"] == pytest.approx(want.area, rel=1e-3)
    assert move["edge_engaged_mm"] == pytest.approx(want.length, rel=2e-3)
    assert move["chip_thickness_mm"] == pytest.approx(want.thickest, rel=3e-3)
    assert move["effective_rake_deg"] == pytest.approx(want.rake, abs=0.05)
    assert move["cutting_force_N"] == pytest.approx(want.force, rel=4e-3)
    assert steady(report, 6, "feed_force_N", 30.0) == pytest.approx(want.feed, rel=3e-3)
    assert steady(report, 6, "passive_force_N", 30.0) == pytest.approx(want.passive, rel=5e-3, abs=1.0)
    assert move["feed_force_N"] >= 0.997 * want.feed  # the entry may ask more: the chord is steeper there
    assert move["passive_force_N"] >= 0.995 * want.passive - 1.0
    assert move["torque_Nm"] == pytest.approx(want.torque, rel=4e-3)
    power = want.torque * 2 * pi * 800 / 60 / 1000
    assert move["cutting_power_kW"] == pytest.approx(power, rel=4e-3)
    assert move["motor_power_kW"] == pytest.approx(power / 0.85, rel=4e-3)
    assert move["spindle_rpm"] == [800.0, 800.0]
    assert move["cutting_speed_m_per_min"] == pytest.approx([pi * diameter * 0.8, pi * 60 * 0.8], rel=1e-4)
    assert move["time_s"] == pytest.approx(43 / (feed * 800) * 60, rel=1e-4)


def test_facing_towards_the_axis(tmp_path: Path) -> None:
    """An 80 degree insert at 95 degrees faces with its other edge, again at 95 degrees; depth is axial."""
    program = START + "G50 S2000\nG96 S200 M3\nG0 X64. Z0.5\nG1 X20. F0.2\nG0 Z5.\n" + END
    report = check(tmp_path, program, job_text({1: ROUGHER}, model=NO_CORRECTIONS), "--series")
    move = next(m for m in report.moves if m["line"] == 7)
    want = cut(Edge(95.0, 0.8, -6.0, -6.0, 18.0, 0.2), Law(), 1.0, 0.2, 0.0)
    assert move["depth_of_cut_mm"] == pytest.approx(1.0, abs=1e-3)
    assert move["chip_area_mm2"] == pytest.approx(0.2, rel=1e-3)
    assert move["edge_engaged_mm"] == pytest.approx(want.length, rel=3e-3)
    assert move["cutting_force_N"] == pytest.approx(want.force, rel=5e-3)
    assert steady(report, 7, "feed_force_N", 12.0) == pytest.approx(want.feed, rel=3e-3)
    assert steady(report, 7, "passive_force_N", 12.0) == pytest.approx(want.passive, rel=5e-3)
    assert move["spindle_rpm"] == pytest.approx([200e3 / (pi * 64), 2000.0], rel=1e-3)
    assert move["time_s"] == pytest.approx(facing_time(64, 20, 200, 2000, 0.2), rel=2e-3)
    stock = pi / 4 * (60**2 - 20**2) * 1.0  # to the tip's own diameter; the corner leaves a little less
    assert move["removed_mm3"] == pytest.approx(stock, rel=5e-3)


def test_turning_with_the_catalogue_factors(tmp_path: Path) -> None:
    """Speed factor 1.380 / v^0.07 above 100 m/min (factors of Kienzle's law as handbooks give them)."""
    program = START + "G97 S1000 M3\nG0 X56. Z3.\nG1 Z-40. F0.3\nG0 X70.\n" + END
    report = check(tmp_path, program, job_text({1: ROUGHER}, model={"wear_factor": 1.0}))
    move = next(m for m in report.moves if m["line"] == 6)
    low, high = (1.380 / (pi * d) ** 0.07 for d in (60, 56))
    want = cut(Edge(95.0, 0.8, -6.0, -6.0, 18.0, 0.2), Law(), 2.0, 0.3, 28.0)
    assert low * want.force * 0.996 <= move["cutting_force_N"] <= high * want.force * 1.004


def test_boring_factor(tmp_path: Path) -> None:
    """Internal turning takes 1.2 times the force of external turning; the depth points outwards."""
    program = START + "G97 S1200 M3\nG0 X33. Z3.\nG1 Z-30. F0.15\nG0 X31.\nZ5.\n" + END
    job = {1: BAR}
    stock = {"bore": "30 mm"}
    plain = check(tmp_path, program, job_text(job, workpiece=stock, model=NO_CORRECTIONS))
    model = {**NO_CORRECTIONS, "operation_factor": True}
    factored = check(tmp_path, program, job_text(job, workpiece=stock, model=model), name="other")
    one, two = (next(m for m in r.moves if m["line"] == 6) for r in (plain, factored))
    want = cut(Edge(95.0, 0.4, 0.0, 0.0, 12.0, 0.05), Law(), 1.5, 0.15, 16.5, outwards=-1)
    assert one["cutting_force_N"] == pytest.approx(want.force, rel=5e-3)
    assert one["torque_Nm"] == pytest.approx(want.torque, rel=5e-3)
    assert one["feed_force_N"] == pytest.approx(want.feed, rel=1.5e-2)
    assert two["cutting_force_N"] == pytest.approx(1.2 * want.force, rel=5e-3)
    assert two["feed_force_N"] == pytest.approx(1.2 * want.feed, rel=1.5e-2)
    assert one["removed_mm3"] == pytest.approx(pi / 4 * (33**2 - 30**2) * 31.5, rel=1e-2)


def test_grooving_factor(tmp_path: Path) -> None:
    """A plunge: thickness is the feed, width is the insert's, 1.3 times the force; the feed force is all thrust."""
    program = START + "G97 S600 M3\nG0 X64. Z-20.\nG1 X50. F0.1\nG1 X64. F0.5\n" + END
    tool = {**GROOVER, "nose_radius": "0 mm"}
    model = {**NO_CORRECTIONS, "operation_factor": True}
    report = check(tmp_path, program, job_text({1: tool}, model=model))
    move = next(m for m in report.moves if m["line"] == 6)
    force = 1.3 * 1700 * 0.1**0.78 * 3.0 * (1 - 0.015 * (12 - 6))
    thrust = 1.3 * 800 * 0.1**0.6 * 3.0 * (1 - 0.045 * (12 - 6))
    assert move["depth_of_cut_mm"] == pytest.approx(3.0, abs=1e-3)
    assert move["chip_area_mm2"] == pytest.approx(0.3, rel=1e-3)
    assert move["chip_thickness_mm"] == pytest.approx(0.1, rel=1e-3)
    assert move["cutting_force_N"] == pytest.approx(force, rel=3e-3)
    assert move["feed_force_N"] == pytest.approx(thrust, rel=5e-3)
    assert move["passive_force_N"] == pytest.approx(0.0, abs=2.0)
    assert move["torque_Nm"] == pytest.approx(
        force * 30 / 1000, rel=1e-2
    )  # largest when it first bites, at diameter 60
    assert move["removed_mm3"] == pytest.approx(pi / 4 * (60**2 - 50**2) * 3, rel=1e-3)


def test_drilling_on_the_axis(tmp_path: Path) -> None:
    """Two lips: thickness f/2 * sin(70), area d f / 2, torque Fc d / 4 (Kienzle's form for twist drills)."""
    program = START + "G97 S2000 M3\nG0 X0. Z5.\nG1 Z-20. F0.12\nG0 Z5.\n" + END
    report = check(tmp_path, program, job_text({1: DRILL}, model={**NO_CORRECTIONS, "operation_factor": True}))
    move = next(m for m in report.moves if m["line"] == 6)
    thickness = 0.06 * sin(radians(70))
    assert move["kind"] == "drill"
    assert move["chip_thickness_mm"] == pytest.approx(thickness, rel=2e-3)
    assert move["depth_of_cut_mm"] == pytest.approx(6.0, abs=1e-2)
    assert move["chip_area_mm2"] == pytest.approx(12 * 0.12 / 2, rel=2e-3)
    force = move["cutting_force_N"]
    base = 1.2 * 1700 * thickness**-0.22 * 12 * 0.12 / 2  # before the rake of the drill
    assert 0.75 * base <= force <= 1.45 * base
    assert move["torque_Nm"] == pytest.approx(force * 12 / 4000, rel=1e-2)
    assert move["feed_force_N"] > 0.4 * force
    assert move["passive_force_N"] == pytest.approx(0.0, abs=1.0)
    full = pi / 4 * 12**2 * 21.5  # depth of the tip below the raw face, less the cone of the point
    height = 6 / tan(radians(70))  # of the point: the tip stands at the programmed Z, its cone takes a third
    assert move["removed_mm3"] == pytest.approx(full - pi / 4 * 12**2 * height * 2 / 3, rel=5e-3)


def test_volume_of_a_taper(tmp_path: Path) -> None:
    """A cone cut with a sharp corner takes off exactly cylinder less frustum."""
    tool = turning(95.0, 0.0, 18.0, 0.2)
    program = START + "G97 S800 M3\nG0 X50. Z1.5\nG1 X56. Z-28.5 F0.2\nG0 X70.\n" + END
    report = check(tmp_path, program, job_text({1: tool}, model=NO_CORRECTIONS))
    move = next(m for m in report.moves if m["line"] == 6)
    frustum = pi * 30 / 3 * (25**2 + 25 * 28 + 28**2)
    edge_tail = 0.0  # the edge leans 5 degrees over, so it takes a little beyond the end point as well
    assert move["removed_mm3"] + edge_tail == pytest.approx(pi * 30**2 * 30 - frustum, rel=2e-2)


def test_speed_under_the_clamp(tmp_path: Path) -> None:
    """n = 1000 v / (pi D) between start and end, held at the clamp, the machine's own limit below that."""
    program = START + "G50 S3000\nG96 S300 M3\nG0 X50. Z3.\nG1 Z-5. F0.2\nX62.\nG0 Z0.\nG1 X10.\n" + END
    report = check(tmp_path, program, job_text({1: ROUGHER}, machine={"speed_limit": "2500 rpm"}))
    along = next(m for m in report.moves if m["line"] == 7)
    face = next(m for m in report.moves if m["line"] == 10)
    assert along["spindle_rpm"] == pytest.approx([300e3 / (pi * 50)] * 2, rel=1e-4)
    assert face["spindle_rpm"] == pytest.approx([300e3 / (pi * 62), 2500.0], rel=1e-4)


def test_band_of_a_finding(tmp_path: Path) -> None:
    """Nominal times one less and one plus the scatter; the worn edge joins the upper edge in quadrature."""
    program = START + "G97 S600 M3\nG0 X48. Z3.\nG1 Z-40. F0.5\nG0 X70.\n" + END
    job = job_text(
        {1: ROUGHER}, model={**NO_CORRECTIONS, "wear_factor": 1.3}, machine={"power": "6 kW", "base_speed": "300 rpm"}
    )
    report = check(tmp_path, program, job)
    (finding,) = report.of("spindle-power", "stop")
    value, (low, high) = finding["value"], finding["band"]
    assert finding["line"] == 6
    assert finding["unit"] == "kW"
    assert finding["limit"] == pytest.approx(6.0)
    assert low == pytest.approx(value * 0.85, rel=1e-3)
    assert high == pytest.approx(value * (1 + (0.15**2 + 0.3**2) ** 0.5), rel=1e-3)
    assert value == pytest.approx(next(m for m in report.moves if m["line"] == 6)["motor_power_kW"], rel=1e-2)


@pytest.mark.parametrize(
    ("speed", "factor"),
    [(15.0, 2.023 / 20**0.153), (60.0, 2.023 / 60**0.153), (300.0, 1.380 / 300**0.07), (700.0, 1.380 / 600**0.07)],
)
def test_speed_factor_is_held_outside_its_range(tmp_path: Path, speed: float, factor: float) -> None:
    rpm = speed * 1000 / (pi * 59)  # about the middle of the cut
    program = START + f"G97 S{rpm:.1f} M3\nG0 X58. Z3.\nG1 Z-20. F0.2\nG0 X70.\n" + END
    stock = {"material": {**WORKPIECE["material"]}}
    with_it = check(
        tmp_path, program, job_text({1: ROUGHER}, workpiece=stock, model={"operation_factor": False}), name="a"
    )
    without = check(tmp_path, program, job_text({1: ROUGHER}, workpiece=stock, model=NO_CORRECTIONS), name="b")
    a, b = (next(m for m in r.moves if m["line"] == 6)["cutting_force_N"] for r in (with_it, without))
    assert a / b == pytest.approx(factor, rel=4e-3)
