"""What must hold for any path: stock never grows, cutting a move in two changes nothing, mirrored work mirrors."""

from __future__ import annotations

import math
from dataclasses import replace
from itertools import pairwise

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from auditor.declared.model import Point
from auditor.predict import predict
from auditor.simulate import simulate
from tests.simulate.workshop import (
    BLADE,
    BORER,
    COPIER,
    KNIFE,
    ROUGHER,
    TOOLS,
    Path,
    bar,
    cut,
    deepest,
    depths,
    interpreted,
    job,
)

STEPS = st.lists(
    st.tuples(st.floats(-9.0, 4.0), st.floats(-4.0, 5.0)).filter(lambda step: math.hypot(*step) > 0.05),
    min_size=1, max_size=8,
)  # fmt: skip
LONG_STEPS = st.lists(
    st.tuples(st.floats(-9.0, 4.0), st.floats(-4.0, 5.0)).filter(lambda step: math.hypot(*step) > 3.0),
    min_size=1, max_size=4,
)  # fmt: skip
TOOL = st.sampled_from([ROUGHER, COPIER])


@given(steps=STEPS, tool=st.sampled_from([ROUGHER, COPIER, KNIFE, BLADE]))
@settings(max_examples=40, deadline=None)
def test_depth_along_the_path_is_the_area_that_goes(steps: list[tuple[float, float]], tool: object) -> None:
    """Every point of the edge sweeps fresh stock: extent times way is the area cut out of the half-section."""
    path = path_of(steps, tool.number)  # type: ignore[attr-defined]
    clear = Path(1.0, 45.0, tool=tool.number).to(1.0, 29.0)  # type: ignore[attr-defined]
    for move in path.moves:
        clear.to(move.end_z, move.end_r)
    simulation = cut(clear, bar())
    if simulation.loose:
        return
    before = sorted(simulation.stock_before.items())
    for (index, stock), (_, rest) in pairwise([*before, (None, simulation.final)]):
        positions, depth = depths(simulation, index)
        swept = np.sum(np.diff(positions) * 0.5 * (depth[1:] + depth[:-1]))
        assert swept == pytest.approx(stock.area - rest.area, rel=1e-4, abs=2e-3)


def path_of(steps: list[tuple[float, float]], tool: int) -> Path:
    path = Path(1.0, 29.0, tool=tool)
    for dz, dr in steps:
        path.to(max(-60.0, path.z + dz), min(40.0, max(2.0, path.r + dr)))
    return path


@given(steps=STEPS, tool=TOOL)
@settings(max_examples=40, deadline=None)
def test_stock_never_grows(steps: list[tuple[float, float]], tool: object) -> None:
    simulation = cut(path_of(steps, tool.number), bar())  # type: ignore[attr-defined]
    assert (simulation.removed >= -1e-6).all()
    before = [simulation.stock_before[index] for index in sorted(simulation.stock_before)]
    for earlier, later in pairwise([*before, simulation.final]):
        assert later.difference(earlier.buffer(1e-6)).area < 1e-6
    assert simulation.final.is_valid


@given(steps=LONG_STEPS, tool=TOOL, share=st.floats(0.4, 0.6))
@settings(max_examples=30, deadline=None)
def test_a_move_in_two_parts_cuts_the_same(steps: list[tuple[float, float]], tool: object, share: float) -> None:
    whole = path_of(steps, tool.number)  # type: ignore[attr-defined]
    parts = Path(1.0, 29.0, tool=tool.number)  # type: ignore[attr-defined]
    for move in whole.moves:
        parts.to(
            move.start_z + share * (move.end_z - move.start_z), move.start_r + share * (move.end_r - move.start_r)
        )
        parts.to(move.end_z, move.end_r)
    one, two = cut(whole, bar()), cut(parts, bar())
    together = two.removed.reshape(-1, 2).sum(axis=1)
    # the direction of a half may differ by the rounding of its ends
    assert together == pytest.approx(one.removed, rel=1e-6, abs=1e-2)
    for index in range(len(whole.moves)):
        halves = max(deepest(two, 2 * index), deepest(two, 2 * index + 1))
        if deepest(one, index) > 0.01 and one.removed[index] > 0.1:
            assert halves == pytest.approx(deepest(one, index), abs=0.003)


def test_facing_in_two_blocks_shares_the_volume_by_area() -> None:
    """Rings from 60 to 30 mm and from 30 mm to the centre: three quarters and a quarter of the disc."""
    square = replace(KNIFE, shape="S", included_angle=90.0)
    simulation = cut(Path(0.0, 30.0, tool=3).to(0.0, 15.0).to(0.0, 0.0), bar(face=1.0), [square])
    assert simulation.removed == pytest.approx([math.pi * 675.0, math.pi * 225.0], rel=1e-6)


@pytest.mark.parametrize("points", [40, 150])
def test_a_cut_in_many_small_moves_is_the_same_cut(points: int) -> None:
    """Facing from 60 mm to 20 mm at 1 mm depth, point by point: every move's ring is 2 pi r dr."""
    square = replace(KNIFE, shape="S", included_angle=90.0)
    path = Path(0.0, 30.0, tool=3)
    radii = [30.0 - 20.0 * (i + 1) / points for i in range(points)]
    for r in radii:
        path.to(0.0, r)
    simulation = cut(path, bar(face=1.0), [square])
    rings = [math.pi * (before**2 - after**2) for before, after in pairwise([30.0, *radii])]
    assert simulation.removed == pytest.approx(rings, rel=1e-6)
    assert all(deepest(simulation, index) == pytest.approx(1.0, abs=1e-6) for index in range(points))


def test_dense_points_along_a_curve() -> None:
    """A sine-shaped contour in steps of 0.02 mm against the same contour in steps of 0.4 mm of the same chords."""
    fine, coarse = Path(1.0, 27.0, tool=2), Path(1.0, 27.0, tool=2)

    def height(z: float) -> float:
        return 27.0 + 0.4 * math.sin(z / 3.0)

    fine.to(1.0, height(1.0))
    coarse.to(1.0, height(1.0))
    for i in range(1, 51):
        z = 1.0 - 0.4 * i
        for j in range(1, 21):
            share = j / 20.0
            fine.to(z + 0.4 * (1.0 - share), height(z + 0.4) * (1.0 - share) + height(z) * share)
        coarse.to(z, height(z))
    one, other = cut(coarse, bar()), cut(fine, bar())
    assert other.removed.sum() == pytest.approx(one.removed.sum(), rel=1e-5)
    per_chord = other.removed[1:].reshape(-1, 20).sum(axis=1)
    assert per_chord[5:] == pytest.approx(one.removed[1:][5:], rel=2e-2)
    for chord in range(10, 50):
        together = max(deepest(other, 1 + 20 * chord + j) for j in range(20))
        assert together == pytest.approx(deepest(one, 1 + chord), abs=0.005)  # runs lie within 1 um of a line


def mirrored(path: Path) -> Path:
    """The same path seen from the other side of the lathe."""
    other = Path(-path.moves[0].start_z, path.moves[0].start_r, tool=path.moves[0].tool)
    for move in path.moves:
        other.to(-move.end_z, move.end_r)
    return other


@given(steps=STEPS)
@settings(max_examples=25, deadline=None)
def test_mirrored_work_has_mirrored_forces(steps: list[tuple[float, float]]) -> None:
    """A left-hand tool on a bar that points the other way."""
    right, left = COPIER, replace(COPIER, hand="left", tip=4)
    path, twin = path_of(steps, 2), mirrored(path_of(steps, 2))
    bars = bar(length=100.0), bar(length=100.0)
    turned = replace(bars[1], outline=tuple(Point(-point.z, point.r) for point in bars[1].outline))
    jobs = job(bars[0], [right]), job(turned, [left])
    sides = [simulate(interpreted(p), j) for p, j in zip((path, twin), jobs, strict=True)]
    loads = [
        predict(interpreted(p), s, j) for p, s, j in zip((path, twin), sides, jobs, strict=True)
    ]
    if sides[0].loose or sides[1].loose:
        return  # what falls off depends on where the chuck is
    assert sides[1].removed == pytest.approx(sides[0].removed, rel=1e-6, abs=1e-3)
    for name, sign in (("cutting", 1.0), ("torque", 1.0), ("depth", 1.0), ("force_x", 1.0), ("force_z", -1.0)):
        one, other = (_extremes(side.loads, name, len(path.moves)) for side in loads)
        for (low, high), (low_twin, high_twin), volume in zip(one, other, sides[0].removed, strict=True):
            if volume > 0.1:
                expected = (low, high) if sign > 0.0 else (-high, -low)
                assert (low_twin, high_twin) == pytest.approx(expected, rel=5e-3, abs=1.0), name


def _extremes(loads: object, name: str, moves: int) -> list[tuple[float, float]]:
    values, owner = getattr(loads, name), loads.move  # type: ignore[attr-defined]
    return [
        (float(values[owner == move].min(initial=0.0)), float(values[owner == move].max(initial=0.0)))
        for move in range(moves)
    ]


def test_inside_and_outside_mirror_each_other() -> None:
    """The same corner, depth and feed in a bore and on a bar: chip and in-plane geometry are the same."""
    inside = replace(BORER, kind="turning", tip=2)
    outside = replace(BORER, kind="turning", tip=3)
    one = cut(Path(2.0, 11.0, tool=6).to(-20.0, 11.0), bar(bore=20.0), [inside])
    other = cut(Path(2.0, 29.0, tool=6).to(-20.0, 29.0), bar(), [outside])
    assert one.edges[0].sine == pytest.approx(other.edges[0].sine[::-1])
    assert deepest(one, 0) == pytest.approx(deepest(other, 0))


def test_every_tool_cuts_what_it_sweeps_and_no_more() -> None:
    """Going over the same path again takes nothing."""
    for tool, start, end in (
        (1, (2.0, 27.0), (-20.0, 27.0)), (4, (-20.0, 32.0), (-20.0, 20.0)), (5, (2.0, 0.0), (-20.0, 0.0)),
        (3, (2.0, 27.0), (-20.0, 29.0)),
    ):  # fmt: skip
        path = Path(*start, tool=tool).to(*end).to(*start).to(*end)
        simulation = cut(path, bar(), TOOLS)
        assert simulation.removed[0] > 1.0
        assert simulation.removed[2] == pytest.approx(0.0, abs=1e-6)
