"""The figures as users read them: the JSON of a whole program against closed forms and against reference.py."""

from __future__ import annotations

import json
import math
from pathlib import Path

import pytest

from auditor.findings import Audit
from auditor.reports import View, report
from tests.predict.reference import Corner, Law, steady_cut
from tests.predict.shop import audited, turning

PROGRAM = "G21 G99 G50 S4000\nG96 S180 M3\nT0101\nG0 X56. Z2.\nG1 Z-40. F0.3\nX64.\nG0 X200. Z150.\nM30\n"


def moves_of(audit: Audit) -> list[dict[str, object]]:
    text = report("json").render(audit, View())
    moves: list[dict[str, object]] = json.loads(text)["moves"]
    return moves


def test_a_cylinder_pass_as_reported(tmp_path: Path) -> None:
    cut = moves_of(audited(tmp_path, PROGRAM, turning()))[1]
    rpm = 180_000.0 / (math.pi * 56.0)
    expected = steady_cut(Corner(), Law(), depth=2.0, feed=0.3, rpm=rpm, radius=28.0)
    assert cut["line"] == 5
    assert cut["kind"] == "feed"
    assert cut["from"] == {"x": 56.0, "z": 2.0}
    assert cut["to"] == {"x": 56.0, "z": -40.0}
    assert cut["spindle_rpm"] == pytest.approx([rpm, rpm])
    assert cut["cutting_speed_m_per_min"] == pytest.approx([180.0, 180.0 * 30.0 / 28.0], rel=1e-6)
    for key, value in (
        ("feed_mm_per_rev", 0.3), ("depth_of_cut_mm", 2.0), ("edge_engaged_mm", expected.length),
        ("chip_area_mm2", 0.6), ("chip_thickness_mm", 0.3), ("effective_rake_deg", expected.rake),
        ("cutting_force_N", expected.cutting), ("torque_Nm", expected.torque),
        ("cutting_power_kW", expected.torque * rpm * 2.0 * math.pi / 60_000.0),
        ("motor_power_kW", expected.torque * rpm * 2.0 * math.pi / 60_000.0 / 0.8),
        ("time_s", 42.0 / (0.3 * rpm) * 60.0),
        # the ring less the sliver that the corner leaves at the shoulder
        ("removed_mm3", math.pi * (900.0 - 784.0) * 40.0),
    ):  # fmt: skip
        assert cut[key] == pytest.approx(value, rel=4e-3), key
    # entering the face the edge stands square to the feed for a moment: never less than in the steady cut
    assert cut["feed_force_N"] >= expected.feed_force * (1.0 - 2e-3)  # type: ignore[operator]
    assert cut["passive_force_N"] >= expected.passive * (1.0 - 2e-3)  # type: ignore[operator]


@pytest.mark.parametrize("missing", ["spindle", "feed"])
def test_what_cannot_be_known_is_null(tmp_path: Path, missing: str) -> None:
    program = PROGRAM.replace(" M3", "") if missing == "spindle" else PROGRAM.replace(" F0.3", "")
    audit = audited(tmp_path, program, turning())
    cut = moves_of(audit)[1]
    assert audit.verdict == "stop"
    assert cut["depth_of_cut_mm"] == pytest.approx(2.0)
    assert cut["removed_mm3"] > 0.0  # type: ignore[operator]
    for key in ("cutting_force_N", "feed_force_N", "passive_force_N", "torque_Nm", "cutting_power_kW", "time_s",
                "chip_area_mm2", "chip_thickness_mm"):  # fmt: skip
        assert cut[key] is None, key


def test_air_and_rapids(tmp_path: Path) -> None:
    program = "G21 G99 G97 S1000 M3\nT0101\nG0 X70. Z2.\nG1 Z-40. F0.3\nG0 X200. Z150.\nM30\n"
    rapid, air, _ = moves_of(audited(tmp_path, program, turning()))
    assert air["depth_of_cut_mm"] == 0.0
    assert air["cutting_force_N"] == 0.0
    assert rapid["cutting_force_N"] is None
    assert rapid["feed_mm_per_rev"] is None
