"""Thread cycles through whole programs: chip area and force of every pass.

A 60 degree V between two depths: (t2^2 - t1^2) tan 30 + w0 (t2 - t1), w0 = 2 r tan 30 for a round tip (plane geometry);
at right angles to the flanks the chip is f sin 30 thick.
"""

from __future__ import annotations

import math
from pathlib import Path

import numpy as np
import pytest

from tests.predict.shop import audited, figures, tool

TAN30 = math.tan(math.radians(30.0))
NOSE = 0.1
THREADER = tool(1, kind="threading", nose_radius=f"{NOSE} mm", clearance_angle="7 deg", hand="right", face_rake="6 deg",
                pocket_rake="0 deg", pocket_inclination="0 deg", land_width="0 mm", land_rake="0 deg",
                edge_radius="30 um", included_angle="60 deg", overhang="25 mm")  # fmt: skip
CYCLES = {
    "block by block": "G92 X29.4 Z-20. F2.\nX29.\nX28.6\nX28.2",
    "multi-pass": "G76 P010060 Q100 R0.05\nG76 X27.6 Z-20. P1200 Q400 F2.",
}


@pytest.mark.parametrize("cycle", CYCLES.values(), ids=CYCLES)
def test_chip_area_of_every_pass(tmp_path: Path, cycle: str) -> None:
    program = f"G21 G99 G97 S600 M3\nT0101\nG0 X34. Z6.\n{cycle}\nG0 X200. Z150.\nM30\n"
    audit = audited(tmp_path, program, THREADER, workpiece='diameter = "30 mm"\nlength = "120 mm"')
    loads = audit.run.prediction.loads
    before = 0.0
    passes = [move for move in audit.run.path.moves if move.kind == "thread"]
    assert len(passes) >= 4
    for move in passes:
        depth = 15.0 - move.end_r
        inner = (loads.move == move.index) & (loads.z > -17.0) & (loads.z < -3.0)
        area = (depth**2 - before**2) * TAN30 + 2.0 * NOSE * TAN30 * (depth - before)
        if before == 0.0:  # the round tip lacks the apex below it
            area = (depth + NOSE) ** 2 * TAN30 - NOSE**2 * (math.sqrt(3.0) - math.pi / 3.0)
        if depth - before > 1e-6:
            assert loads.area[inner] == pytest.approx(np.full(inner.sum(), area), rel=1e-2)
            assert figures(audit, move.index).feed_rev == pytest.approx(2.0)
        before = max(before, depth)


def test_straight_infeed_balances_the_flanks(tmp_path: Path) -> None:
    """Both flanks alike: no force along the axis, thrust along X; passes of equal depth grow in force."""
    program = f"G21 G99 G97 S600 M3\nT0101\nG0 X34. Z6.\n{CYCLES['block by block']}\nG0 X200. Z150.\nM30\n"
    audit = audited(tmp_path, program, THREADER, workpiece='diameter = "30 mm"\nlength = "120 mm"')
    loads = audit.run.prediction.loads
    passes = [move.index for move in audit.run.path.moves if move.kind == "thread"]
    forces = []
    for index in passes:
        rows = (loads.move == index) & (loads.z > -17.0) & (loads.z < -3.0)
        forces.append(float(loads.cutting[rows].max()))
        assert np.abs(loads.force_z[rows]).max() < 0.02 * np.abs(loads.force_x[rows]).max()
    assert forces == sorted(forces)
