"""Times of whole programs, and spindle speed, cutting speed and feed along them.

Closed forms: with G97 or a reached clamp t = L/(f n); with G96 n ~ 1/D is linear in the path, so
t = pi (D1 + D2)/2 L/(1000 v f); on an arc the integral of the radius over the angle. The figures below were worked out
from these forms and cross-checked by numerical integration; none comes from the code under test.
"""

from __future__ import annotations

import math
from pathlib import Path

import pytest

from auditor.findings import Audit
from tests.predict.shop import BAR, audited, cutting_moves, figures, tool, turning


def time_of(tmp_path: Path, lines: str, *, limit: float = 99_000.0, setting: str = "G21 G99") -> float:
    """Seconds of the last feed move of a program that stays 100 mm and more in front of the stock."""
    audit = audited(tmp_path, f"{setting}\nT0101\n{lines}\nM30\n", turning(), workpiece=BAR, limit=limit)
    moves = audit.run.path.moves
    last = max(move.index for move in moves if move.kind != "rapid")
    return figures(audit, last).time


@pytest.mark.parametrize(
    ("lines", "seconds"),
    [
        pytest.param("G97 S1000 M3\nG0 X100. Z300.\nG1 Z200. F0.2", 30.0, id="steady speed, 100 mm"),
        pytest.param("G96 S200 M3\nG0 X100. Z200.\nG1 X20. F0.2", 11.3097, id="facing, no clamp reached"),
        pytest.param("G50 S3000\nG96 S200 M3\nG0 X100. Z200.\nG1 X0. F0.2", 12.3115, id="clamp from 21.22 mm on"),
        pytest.param("G50 S3000\nG96 S200 M3\nG0 X100. Z200.\nG1 X-1.6 F0.2", 12.3915, id="facing past the centre"),
        pytest.param("G50 S2500\nG96 S180 M3\nG0 X40. Z200.\nG1 X50. Z190. F0.15", 3.5124, id="taper"),
        pytest.param("G96 S180 M3\nG0 X30. Z200.\nG2 X40. Z195. R5. F0.12", 2.3052, id="arc"),
        pytest.param("G97 S1000 M3\nG98\nG0 X100. Z300.\nG1 Z240. F250.", 14.4, id="feed per minute"),
        pytest.param("G97 S600 M3\nG0 X100. Z206.\nG32 Z170. F3.", 1.2, id="thread"),
        pytest.param("G97 S636.62 M3\nG0 X100. Z200.\nG1 X20. F0.2", 18.8496, id="facing at the speed of its rim"),
    ],
)
def test_times(tmp_path: Path, lines: str, seconds: float) -> None:
    assert time_of(tmp_path, lines) == pytest.approx(seconds, abs=6e-5)


def test_the_machine_limit_clamps_as_well(tmp_path: Path) -> None:
    lines = "G50 S5000\nG96 S200 M3\nG0 X100. Z200.\nG1 X0. F0.2"
    assert time_of(tmp_path, lines, limit=3000.0) == pytest.approx(12.3115, abs=6e-5)


def test_a_rapid_takes_as_long_as_its_slower_axis(tmp_path: Path) -> None:
    """200 mm of diameter at 24 m/min of slide travel is 0.25 s, 150 mm at 30 m/min is 0.3 s; no ramps."""
    program = "G21 G99 G97 S500 M3\nT0101\nG0 X100. Z200.\nX300. Z350.\nX302. Z350.\nG1 Z340. F1.\nM30\n"
    audit = audited(tmp_path, program, turning())
    assert figures(audit, 1).time == pytest.approx(0.3)
    assert figures(audit, 2).time == pytest.approx(1.0 / 24_000.0 * 60.0)


def test_dwells_add_to_the_whole(tmp_path: Path) -> None:
    """1500 ms, and 0.2 s."""
    body = "G21 G99 G97 S600 M3\nT0101\nG0 X100. Z200.\nG1 Z190. F0.5\n{}G1 Z180.\nM30\n"
    bare = audited(tmp_path, body.format(""), turning()).totals.time
    assert audited(tmp_path, body.format("G4 P1500\n"), turning()).totals.time == pytest.approx(bare + 1.5)
    assert audited(tmp_path, body.format("G4 X0.2\n"), turning()).totals.time == pytest.approx(bare + 0.2)


def test_times_add_up(tmp_path: Path) -> None:
    """Air and cut: 2 mm of approach and 30 mm in the bar at 0.2 mm and 1000 rpm."""
    program = "G21 G99 G97 S1000 M3\nT0101\nG0 X56. Z2.\nG1 Z-30. F0.2\nX64.\nM30\n"
    audit = audited(tmp_path, program, turning())
    totals = audit.totals
    assert figures(audit, 1).time == pytest.approx(32.0 / 200.0 * 60.0)
    assert figures(audit, 1).cutting_time == pytest.approx(30.0 / 200.0 * 60.0, rel=1e-3)
    assert totals.time == pytest.approx(sum(figures(audit, index).time for index in range(3)))
    # on the way out the nose shaves the shoulder that an edge at 95 degrees left leaning: its foremost point, 0.8 mm
    # above the tip, has 1.2 mm of it
    assert totals.cutting_time == pytest.approx((30.0 + 1.2) / 200.0 * 60.0, rel=1e-3)
    assert totals.air_feed_time == pytest.approx(36.0 / 200.0 * 60.0 - totals.cutting_time)


def facing_audit(tmp_path: Path) -> Audit:
    program = "G21 G99 G50 S3000\nG96 S200 M3\nT0101\nG0 X64. Z0.\nG1 X-1.6 F0.2\nG0 Z5.\nM30\n"
    stock = 'diameter = "60 mm"\nlength = "120 mm"\nface = "1 mm"'
    return audited(tmp_path, program, turning(), workpiece=stock)


def test_facing_through_the_clamp_diameter(tmp_path: Path) -> None:
    """G96 S200 with a clamp of 3000: constant surface speed down to 21.22 mm, then constant speed of the spindle."""
    audit = facing_audit(tmp_path)
    index = cutting_moves(audit)[0]
    rows = audit.run.prediction.loads
    own = rows.move == index
    diameters, speeds = 2.0 * abs(rows.r[own]), rows.rpm[own]
    for diameter, rpm in zip(diameters, speeds, strict=True):
        assert rpm == pytest.approx(min(3000.0, 200_000.0 / (math.pi * diameter)) if diameter else 3000.0)
    found = figures(audit, index)
    assert found.rpm_low == pytest.approx(200_000.0 / (math.pi * 64.0))
    assert found.rpm_high == pytest.approx(3000.0)
    assert found.speed_low == pytest.approx(0.0, abs=1e-9)
    # at the outermost point of the edge the speed is above the programmed one: nose 0.8 mm behind its foremost point
    assert found.speed_high > 200.0


def test_power_is_torque_times_speed_everywhere(tmp_path: Path) -> None:
    rows = facing_audit(tmp_path).run.prediction.loads
    assert rows.power == pytest.approx(rows.torque * rows.rpm * 2.0 * math.pi / 60.0 / 1000.0, rel=1e-9)
    assert rows.motor_power == pytest.approx(rows.power / 0.8, rel=1e-9)


def test_feed_per_minute_thickens_the_chip_as_the_spindle_slows(tmp_path: Path) -> None:
    """G98 under G96 on a taper: 200 mm/min over 200/(pi D) rpm."""
    program = "G21 G98 G50 S4000\nG96 S150 M3\nT0101\nG0 X40. Z2.\nG1 X50. Z-30. F200.\nX64.\nM30\n"
    audit = audited(tmp_path, program, turning())
    index = cutting_moves(audit)[0]
    rows = audit.run.prediction.loads
    own = rows.move == index
    expected = 200.0 / (150_000.0 / (math.pi * 2.0 * rows.r[own]))
    assert rows.feed[own] == pytest.approx(expected, rel=1e-9)
    assert rows.area[own] == pytest.approx(expected * rows.depth[own], rel=1e-9)
    assert figures(audit, index).feed_rev == pytest.approx(200.0 / (150_000.0 / (math.pi * 50.0)))


def test_without_feed_or_spindle_nothing_is_invented(tmp_path: Path) -> None:
    """The stock goes all the same; what depends on feed and speed is not known."""
    program = "G21 G99\nT0101\nG0 X56. Z2.\nG1 Z-30. F0.2\nG0 X80.\nM30\n"
    audit = audited(tmp_path, program, turning())
    found = figures(audit, 1)
    assert audit.run.simulation.removed[1] > 0.0
    assert found.depth == pytest.approx(2.0)
    assert all(math.isnan(value) for value in (found.time, found.cutting, found.torque, found.power, found.area))
    assert audit.verdict == "stop"


def test_drill_in_the_programs_own_units(tmp_path: Path) -> None:
    """Inch and millimetre twins of a drilled and turned part agree in every figure."""
    tools = turning() + tool(2, kind="drilling", diameter="12.7 mm", point_angle="118 deg", hand="right",
                             overhang="60 mm")  # fmt: skip
    metric = "G21 G99\nG97 S800 M3\nT0101\nG0 X50.8 Z2.54\nG1 Z-25.4 F0.254\nX63.5\nG0 X127. Z50.8\nT0202\n"
    metric += "G0 X0. Z5.08\nG1 Z-25.4 F0.127\nG0 Z50.8\nM30\n"
    inch = "G20 G99\nG97 S800 M3\nT0101\nG0 X2. Z.1\nG1 Z-1. F.01\nX2.5\nG0 X5. Z2.\nT0202\n"
    inch += "G0 X0. Z.2\nG1 Z-1. F.005\nG0 Z2.\nM30\n"
    one, other = (audited(tmp_path, text, tools) for text in (metric, inch))
    assert len(one.run.path.moves) == len(other.run.path.moves)
    for index in range(len(one.run.path.moves)):
        left, right = figures(one, index), figures(other, index)
        for name, value in vars(left).items():
            assert getattr(right, name) == pytest.approx(value, rel=1e-9, abs=1e-9, nan_ok=True), name
    assert one.run.simulation.removed == pytest.approx(other.run.simulation.removed, rel=1e-9, abs=1e-9)
