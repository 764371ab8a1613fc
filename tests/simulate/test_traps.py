"""Situations that give millimetre-size errors when engagement is worked out carelessly."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy as np
import pytest

from tests.simulate.workshop import (
    BLADE,
    KNIFE,
    ROUGHER,
    Path,
    bar,
    cut,
    deepest,
    depth_at,
    depths,
    edge_length,
    shaped,
    stretches_at,
)

BAR = ((0.0, 0.0), (-100.0, 0.0), (-100.0, 30.0), (0.0, 30.0))


def test_either_sense_of_the_declared_outline_is_the_same_stock() -> None:
    path = Path(2.0, 28.0).to(-20.0, 28.0)
    one, other = cut(path, shaped(*BAR)), cut(path, shaped(*BAR[::-1]))
    assert one.removed[0] == pytest.approx(other.removed[0], rel=1e-12)
    assert depths(one, 0)[1] == pytest.approx(depths(other, 0)[1])


def test_a_jump_is_stored_before_and_behind() -> None:
    """An upright edge meets an upright face: nothing at 2 mm of travel, and the whole depth at 2 mm of travel."""
    positions, depth = depths(cut(Path(2.0, 27.0, tool=KNIFE.number).to(-10.0, 27.0), bar()), 0)
    assert positions == pytest.approx([0.0, 2.0, 2.0, 12.0], abs=2e-6)
    assert depth == pytest.approx([0.0, 0.0, 3.0, 3.0], abs=1e-9)


def test_a_jump_to_a_lower_step_is_stored_before_and_behind() -> None:
    stock = shaped((0.0, 0.0), (-100.0, 0.0), (-100.0, 29.0), (-20.0, 29.0), (-20.0, 30.0), (0.0, 30.0))
    positions, depth = depths(cut(Path(2.0, 27.0, tool=KNIFE.number).to(-40.0, 27.0), stock), 0)
    assert positions == pytest.approx([0.0, 2.0, 2.0, 22.0, 22.0, 42.0], abs=2e-6)
    assert depth == pytest.approx([0.0, 0.0, 3.0, 3.0, 2.0, 2.0], abs=1e-9)


def test_events_within_a_millionth_count_once() -> None:
    """Two steps of the face that differ by less than the resolution: one jump to the last state."""
    stock = shaped((0.0, 0.0), (-100.0, 0.0), (-100.0, 30.0), (-4e-7, 30.0), (-4e-7, 28.5), (0.0, 28.5))
    positions, depth = depths(cut(Path(2.0, 27.0, tool=KNIFE.number).to(-10.0, 27.0), stock), 0)
    assert positions == pytest.approx([0.0, 2.0, 2.0, 12.0], abs=3e-6)
    assert depth == pytest.approx([0.0, 0.0, 3.0, 3.0], abs=1e-9)


def test_a_crossing_stays_on_the_edge() -> None:
    """An upright edge of 4 mm in stock 10 mm deep, and a slope that meets the edge's line above its end."""
    short = replace(KNIFE, edge_length=4.0, included_angle=90.0, shape="S")
    assert deepest(cut(Path(2.0, 20.0, tool=KNIFE.number).to(-10.0, 20.0), bar(), [short]), 0) == pytest.approx(4.0)
    slope = shaped((0.0, 0.0), (-100.0, 0.0), (-100.0, 45.0), (-40.0, 45.0), (0.0, 22.0))
    simulation = cut(Path(2.0, 20.0, tool=KNIFE.number).to(-38.0, 20.0), slope, [short])
    for travel in (2.5, 5.0, 5.4):
        height = 22.0 + (travel - 2.0) * 23.0 / 40.0 - 20.0
        assert depth_at(simulation, 0, travel) == pytest.approx(min(4.0, height), abs=1e-9)
    assert deepest(simulation, 0) == pytest.approx(4.0, abs=1e-9)


@pytest.mark.parametrize("end", [0.0, 1e-8])
def test_touching_at_the_end_of_a_move_is_no_cut(end: float) -> None:
    simulation = cut(Path(2.0, 27.0, tool=KNIFE.number).to(end, 27.0), bar())
    assert deepest(simulation, 0) == 0.0
    assert simulation.removed[0] == pytest.approx(0.0, abs=1e-9)


def test_sliding_along_a_surface_is_no_cut() -> None:
    for radius in (30.0, 30.0 - 1e-9):
        simulation = cut(Path(2.0, radius).to(-40.0, radius), bar())
        assert deepest(simulation, 0) < 1e-8
        assert simulation.removed[0] == pytest.approx(0.0, abs=1e-3)
    again = Path(2.0, 28.0).to(-40.0, 28.0).to(-40.0, 28.0 + 3.0).to(2.0, 31.0).to(2.0, 28.0).to(-40.0, 28.0)
    simulation = cut(again, bar())
    assert deepest(simulation, 4) < 1e-8
    assert simulation.removed[4] == pytest.approx(0.0, abs=1e-6)


def test_a_move_that_starts_in_contact_cuts_from_its_first_point() -> None:
    simulation = cut(Path(0.0, 27.0, tool=KNIFE.number).to(-10.0, 27.0), bar())
    assert depth_at(simulation, 0, 0.0) == pytest.approx(3.0, abs=1e-9)
    assert simulation.removed[0] == pytest.approx(math.pi * (900.0 - 729.0) * 10.0, rel=1e-9)


def test_sides_parallel_to_the_feed_cut_nothing() -> None:
    """The blade's flanks in its own groove: widening steps engage the overlap alone."""
    path = Path(-20.0, 31.0, tool=BLADE.number).to(-20.0, 25.0).to(-20.0, 31.0).to(-18.0, 31.0).to(-18.0, 25.0)
    simulation = cut(path, bar())
    assert deepest(simulation, 0) == pytest.approx(3.0, abs=1e-9)
    assert deepest(simulation, 3) == pytest.approx(2.0, abs=1e-9)
    assert simulation.removed[3] == pytest.approx(math.pi * (900.0 - 625.0) * 2.0, rel=1e-9)


def test_vertices_closer_than_any_slab_do_no_harm() -> None:
    crowd = [(-1e-9 * i, 30.0 - 1e-10 * i) for i in range(1, 40)]
    stock = shaped((0.0, 0.0), (-100.0, 0.0), (-100.0, 30.0), (-50.0, 30.0), *crowd[::-1], (0.0, 29.9))
    simulation = cut(Path(2.0, 28.0).to(-20.0, 28.0), stock)
    assert depth_at(simulation, 0, 15.0) == pytest.approx(2.0, abs=1e-7)


def test_tools_of_the_same_number_are_not_mixed_up_between_runs() -> None:
    path = Path(2.0, 25.0).to(-20.0, 25.0)
    for kappa in (95.0, 75.0, 45.0):
        simulation = cut(path, bar(), [replace(ROUGHER, cutting_edge_angle=kappa)])
        (low, high), = stretches_at(simulation, 0, 15.0)
        angle = math.radians(kappa)
        expected = 0.8 * angle + (5.0 - 0.8 * (1.0 - math.cos(angle))) / math.sin(angle)
        assert edge_length(simulation, 0, low, high) == pytest.approx(expected, abs=2e-3)


def test_two_separate_stretches() -> None:
    """A groove already turned in the face: an upright edge has work below and above it, none between."""
    stock = shaped((0.0, 0.0), (-100.0, 0.0), (-100.0, 30.0), (0.0, 30.0), (0.0, 28.0), (-50.0, 28.0), (-50.0, 27.0),
                   (0.0, 27.0))  # fmt: skip
    simulation = cut(Path(2.0, 24.0, tool=KNIFE.number).to(-20.0, 24.0), stock)
    stretches = stretches_at(simulation, 0, 15.0)
    assert len(stretches) == 2
    assert sorted(high - low for low, high in stretches) == pytest.approx([2.0, 3.0], abs=1e-9)
    assert deepest(simulation, 0) == pytest.approx(5.0, abs=1e-9)
    assert simulation.removed[0] == pytest.approx(math.pi * (900.0 - 784.0 + 729.0 - 576.0) * 20.0, rel=1e-9)


def test_an_edge_that_cannot_cut_in_its_direction_of_motion_still_meets_the_stock() -> None:
    """Backwards out of a shoulder: the trailing side of the insert becomes the leading one."""
    simulation = cut(Path(-20.0, 40.0).to(-20.0, 25.0).to(-10.0, 25.0), bar())
    minor = math.tan(math.radians(5.0))  # the end cutting edge of an 80 degree insert at 95 stands 5 degrees off
    # the plunge left, in front of the tip, stock under the minor edge; moving back the whole minor edge bites
    assert deepest(simulation, 1) > 12.0 * minor
    assert simulation.removed[1] > 0.0


def test_samples_are_read_only_and_in_order() -> None:
    path = Path(2.0, 28.0).to(-20.0, 28.0).arc(-22.0, 30.0, (-22.0, 28.0), clockwise=True)
    samples = cut(path, bar()).samples
    with pytest.raises(ValueError, match="read-only"):
        samples.position[0] = 1.0
    assert (np.diff(samples.move) >= 0).all()
    for move in (0, 1):
        assert (np.diff(samples.position[samples.move == move]) >= -1e-12).all()
