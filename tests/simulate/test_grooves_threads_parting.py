"""Thread passes, parting off, loose rings, and which moves leave the finished surface."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest

from tests.simulate.workshop import BLADE, CUTTER_OFF, THREADER, Path, bar, cut, deepest

TAN30 = math.tan(math.radians(30.0))


def chips(simulation: object, move: int) -> dict[float, float]:
    """Chip area of every turn of a thread pass: advance times extent, stretches summed."""
    samples = simulation.samples  # type: ignore[attr-defined]
    areas: dict[float, float] = {}
    for row in np.flatnonzero(samples.move == move):
        place = round(float(samples.position[row]), 6)
        areas[place] = areas.get(place, 0.0) + float(samples.infeed[row] * (samples.high[row] - samples.low[row]))
    return areas


@pytest.mark.parametrize("nose", [0.0, 0.1, 0.2])
def test_chip_area_of_thread_passes(nose: float) -> None:
    """Between two depths a 60 degree V loses (t2^2 - t1^2) tan 30 + w0 (t2 - t1), w0 = 2 r tan 30 for a round tip.

    Plane geometry; the sharp apex of flanks tangent to a radius r lies r below its lowest point.
    """
    tool = replace(THREADER, nose_radius=nose)
    path = Path(6.0, 15.0 - 0.5, tool=8).thread(-20.0, 14.5, 2.0).rapid(-20.0, 18.0).rapid(6.0, 18.0)
    path.rapid(6.0, 14.2).thread(-20.0, 14.2, 2.0).rapid(-20.0, 18.0).rapid(6.0, 18.0)
    path.rapid(6.0, 14.0).thread(-20.0, 14.0, 2.0)
    simulation = cut(path, bar(30.0), [tool])
    width = 2.0 * nose * TAN30
    for move, (before, depth) in ((0, (0.0, 0.5)), (4, (0.5, 0.8)), (8, (0.8, 1.0))):
        inner = [area for place, area in chips(simulation, move).items() if 10.0 < place < 24.0]
        expected = (depth**2 - before**2) * TAN30 + width * (depth - before)
        if before == 0.0 and nose:
            # the whole round-tipped V: the sharp V of depth t + r less its tip beyond the rounding
            expected = (depth + nose) ** 2 * TAN30 - nose**2 * (math.sqrt(3.0) - math.pi / 3.0)
        assert inner
        assert inner == pytest.approx([expected] * len(inner), rel=5e-3)


def test_thread_groove_volume() -> None:
    """Pappus: every turn takes a ring of section t^2 tan 30 whose centroid lies a third of t below the surface."""
    path = Path(5.0, 14.2, tool=THREADER.number).thread(-21.0, 14.2, 2.0)
    simulation = cut(path, bar(30.0))
    ring = 2.0 * math.pi * (15.0 - 0.8 / 3.0) * 0.64 * TAN30
    assert simulation.removed[0] == pytest.approx(11 * ring, rel=1e-6)  # turns at z = -1, -3 ... -21
    assert len(chips(simulation, 0)) == 11


def test_parting_off_detaches_and_the_piece_is_gone() -> None:
    path = Path(-40.0, 31.0, tool=CUTTER_OFF.number).to(-40.0, -0.5).to(-40.0, 31.0).rapid(5.0, 35.0)
    path.with_tool(1).rapid(5.0, 25.0).to(-36.0, 25.0)
    simulation = cut(path, bar())
    loose, = simulation.loose
    assert loose.move == 0
    assert loose.z == pytest.approx((-37.0, 0.0), abs=1e-9)
    assert loose.volume == pytest.approx(math.pi * 900.0 * 37.0, rel=1e-4)
    assert simulation.final.bounds[2] == pytest.approx(-40.0, abs=1e-9)
    # what was parted off is not cut any more
    assert deepest(simulation, 4) == 0.0
    # nor is it chips: the move took its groove alone
    assert simulation.removed[0] == pytest.approx(math.pi * 900.0 * 3.0, rel=1e-3)
    assert simulation.removed.sum() == pytest.approx(simulation.removed[0])


def test_a_loose_ring_is_noted() -> None:
    """A tube cut through at its front: a ring of 7 mm falls."""
    path = Path(-10.0, 31.0, tool=BLADE.number).to(-10.0, 19.0)
    simulation = cut(path, bar(bore=40.0))
    loose, = simulation.loose
    assert loose.volume == pytest.approx(math.pi * (900.0 - 400.0) * 7.0, rel=1e-9)


def test_moves_that_leave_the_finished_surface() -> None:
    path = Path(2.0, 28.0).to(-30.0, 28.0).to(-30.0, 32.0).rapid(2.0, 32.0).rapid(2.0, 27.0).to(-20.0, 27.0)
    path.to(-20.0, 32.0).rapid(5.0, 32.0).rapid(0.0, 32.0).to(0.0, -1.0)
    simulation = cut(path, bar(face=0.5))
    # the first pass survives from -30 to -20, the second to the face; both retreats leave the shoulder behind
    assert simulation.final_surface.tolist()[0] is True
    assert simulation.final_surface.tolist()[4] is True
    assert simulation.final_surface.tolist()[8] is True
    assert not simulation.final_surface[[2, 3, 6, 7]].any()


def test_a_roughing_pass_that_is_turned_away_leaves_no_surface() -> None:
    path = Path(2.0, 28.0).to(-30.0, 28.0).rapid(-28.0, 32.0).rapid(2.0, 32.0).rapid(2.0, 26.0).to(-40.0, 26.0)
    simulation = cut(path, bar())
    assert not simulation.final_surface[0]
    assert simulation.final_surface[4]
