"""Whole paths judged by an insert and a stock built anew (see judge.py): depth everywhere, volume of the program."""

from __future__ import annotations

import math
import random

import numpy as np
import pytest
import shapely
from shapely.geometry import Polygon

from tests.simulate.judge import Insert, Step, arc_points, removed_at_once, removed_on_a_grid, steps_of, volume
from tests.simulate.workshop import BORER, COPIER, ROUGHER, Path, bar, cut, depths

WITHIN = 0.003  # mm of depth
SKIN = 0.002  # mm: chords of nose and arcs make the stock uncertain by so much

INSERTS = {
    ROUGHER.number: Insert.outside(95.0, 80.0, 0.8, 12.9),
    COPIER.number: Insert.outside(93.0, 55.0, 0.4, 11.63),
    BORER.number: Insert.inside(95.0, 80.0, 0.4, 6.45),
}


def contour_path(seed: int, tool: int, start: tuple[float, float], outward: int) -> tuple[Path, list[list[Step]]]:
    """Passes of growing depth, each a chain of straights of random slope and some arcs; steps of every move."""
    chance = random.Random(seed)
    path = Path(*start, tool=tool)
    chains: list[list[Step]] = []

    def to(z: float, r: float, *, rapid: bool = False) -> None:
        chains.append([((path.z, path.r), (z, r))])
        (path.rapid if rapid else path.to)(z, r)

    for level in range(1, 5):
        r = start[1] - outward * (0.6 + 1.3 * level)
        to(2.0, r, rapid=True)
        while path.z > -30.0:
            if chance.random() < 0.25 and path.z < 0.0:
                swing = math.radians(chance.uniform(20.0, 60.0))
                radius = chance.uniform(2.0, 5.0)
                centre = (path.z, path.r + outward * radius)
                points = arc_points((path.z, path.r), centre, -swing * outward)
                chains.append(steps_of(points))
                path.arc(*points[-1], centre, clockwise=outward > 0)
            else:
                to(path.z - chance.uniform(1.0, 6.0), path.r + outward * chance.uniform(-0.05, 0.4))
        to(path.z + 1.0, start[1] + outward * 2.0, rapid=True)
        to(2.0, start[1] + outward * 2.0, rapid=True)
    return path, chains


CASES = [
    *[(seed, ROUGHER.number, (5.0, 31.0), 1, (60.0, 0.0)) for seed in range(3)],
    *[(seed, COPIER.number, (5.0, 31.0), 1, (60.0, 0.0)) for seed in range(3, 6)],
    *[(seed, BORER.number, (5.0, 9.5), -1, (60.0, 20.0)) for seed in range(6, 8)],
]


@pytest.mark.parametrize(("seed", "tool", "start", "outward", "diameters"), CASES)
def test_depth_and_volume_of_whole_paths(
    seed: int, tool: int, start: tuple[float, float], outward: int, diameters: tuple[float, float]
) -> None:
    path, chains = contour_path(seed, tool, start, outward)
    insert = INSERTS[tool]
    simulation = cut(path, bar(diameters[0], bore=diameters[1]))
    raw = Polygon([(0.0, diameters[1] / 2), (-100.0, diameters[1] / 2), (-100.0, 30.0), (0.0, 30.0)])
    assert not simulation.loose
    expected = removed_at_once(raw, insert, [step for chain in chains for step in chain])
    assert simulation.removed.sum() == pytest.approx(expected, rel=1e-4)
    assert volume(raw) - volume(simulation.final) == pytest.approx(expected, rel=1e-4)

    stock, compared = raw, 0
    for index, chain in enumerate(chains):
        if len(chain) == 1:
            compared += _depth_agrees(simulation, index, chain[0], insert, stock)
        stock = stock.difference(shapely.union_all([insert.swept(step) for step in chain]))
    assert compared > 30


def _depth_agrees(simulation: object, index: int, step: Step, insert: Insert, stock: Polygon) -> int:
    positions, depth = depths(simulation, index)  # type: ignore[arg-type]
    if len(positions) == 0:
        return 0
    (z0, r0), (z1, r1) = step
    length = math.hypot(z1 - z0, r1 - r0)
    heading = ((z1 - z0) / length, (r1 - r0) / length)
    # between the stored points, where nothing jumps
    spots = 0.5 * (positions[1:] + positions[:-1])[np.diff(positions) > 0.05]
    spots = spots[:: 1 + len(spots) // 8]
    more, less = stock.buffer(SKIN), stock.buffer(-SKIN)
    shapely.prepare([more, less])
    for spot in spots:
        at = (z0 + heading[0] * spot, r0 + heading[1] * spot)
        found = float(np.interp(spot, positions, depth))
        assert insert.depth(less, at, heading) - WITHIN < found < insert.depth(more, at, heading) + WITHIN
    return len(spots)


def test_volume_against_a_grid_of_points() -> None:
    """No clipping of polygons at all: half-planes and counting, to a grid's coarseness."""
    path, chains = contour_path(11, COPIER.number, (5.0, 31.0), 1)
    counted = removed_on_a_grid(
        (-40.0, 20.0, 0.0, 30.0), INSERTS[COPIER.number], [step for chain in chains for step in chain], 0.2
    )
    assert cut(path, bar()).removed.sum() == pytest.approx(counted, rel=5e-3)
