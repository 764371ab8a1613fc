"""A second opinion on stock and engagement that knows nothing of the simulation under test.

The insert is built anew from its angles (ISO 3002-1: main edge at kappa_r to the feed, minor edge at
kappa_r + epsilon_r, a circle tangent to both), with corners chorded ten times finer. Depth comes from sampling its
edge against a stock of its own, volume from one union of all sweeps at once, or from a grid of points without any
polygon clipping.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from itertools import pairwise

import numpy as np
import shapely
from numpy.typing import NDArray
from shapely.geometry import Polygon

Array = NDArray[np.float64]
Step = tuple[tuple[float, float], tuple[float, float]]  # (z, r) from, (z, r) to
SAGITTA = 0.0001  # mm between chords and their arc
SAMPLES = 4000  # points on a leading edge


@dataclass(frozen=True)
class Insert:
    """Outline (n, 2) in (z, r) round the programmed point."""

    outline: Array

    @classmethod
    def outside(cls, kappa: float, epsilon: float, radius: float, edge: float) -> Insert:
        """For external turning towards the chuck: the programmed point touches the nose in front and below."""
        x, y = _corner(kappa, epsilon, radius, edge)
        return cls(np.stack((-x, y), axis=1))

    @classmethod
    def inside(cls, kappa: float, epsilon: float, radius: float, edge: float) -> Insert:
        """For boring towards the chuck: the same turned over."""
        x, y = _corner(kappa, epsilon, radius, edge)
        return cls(np.stack((-x, -y), axis=1))

    def swept(self, step: Step) -> Polygon:
        """Area covered along a straight step."""
        ends = np.concatenate([self.outline + np.array(point) for point in step])
        return shapely.convex_hull(shapely.multipoints(ends))

    def covers(self, points: Array, step: Step) -> NDArray[np.bool_]:
        """Which of the points (n, 2) the outline covers on the way: half-planes at a share t of the step."""
        ring = self.outline if _area(self.outline) > 0.0 else self.outline[::-1]
        side = np.roll(ring, -1, axis=0) - ring
        normal = np.stack((side[:, 1], -side[:, 0]), axis=1)  # outward for a counter-clockwise ring
        start, travel = np.array(step[0]), np.subtract(step[1], step[0])
        low, high = np.zeros(len(points)), np.ones(len(points))
        for (nz, nr), (z, r) in zip(normal, ring, strict=True):
            room = nz * z + nr * r - (points - start) @ (nz, nr)
            pace = -(nz * travel[0] + nr * travel[1])  # room grows by -pace * t
            if abs(pace) < 1e-12:
                high[room < 0.0] = -1.0
            elif pace > 0.0:  # the side draws away from the points ahead: only early shares cover them
                high = np.minimum(high, room / pace)
            else:
                low = np.maximum(low, room / pace)
        return low <= high

    def depth(self, stock: Polygon, at: tuple[float, float], heading: tuple[float, float]) -> float:
        """Extent across the heading of all points of the leading edge that lie in the stock."""
        ring = self.outline if _area(self.outline) > 0.0 else self.outline[::-1]
        ends = np.roll(ring, -1, axis=0)
        across = np.array((-heading[1], heading[0]))
        climb = (ends - ring) @ across
        leading = np.flatnonzero(climb > 1e-12)
        count = np.maximum(2, np.ceil(SAMPLES * climb[leading] / climb[leading].sum())).astype(int)
        side = np.repeat(leading, count)
        share = np.concatenate([(np.arange(n) + 0.5) / n for n in count])
        points = ring[side] + share[:, None] * (ends[side] - ring[side]) + np.array(at)
        weight = climb[side] / np.repeat(count, count)
        return float(weight[shapely.contains_xy(stock, points)].sum())


def _corner(kappa: float, epsilon: float, radius: float, edge: float) -> tuple[Array, Array]:
    """The rhombic insert in x (feed), y (away from the finished surface), programmed point at 0, 0."""
    k, e = math.radians(kappa), math.radians(epsilon)
    main, minor = np.array((math.cos(k), math.sin(k))), np.array((math.cos(k + e), math.sin(k + e)))
    tangent = radius / math.tan(e / 2.0)
    middle = np.array((math.cos(k + e / 2.0), math.sin(k + e / 2.0))) * radius / math.sin(e / 2.0)
    angles = np.linspace(k + e + math.pi / 2.0, k + 1.5 * math.pi, _chords(radius, math.pi - e) + 1)
    nose = middle + radius * np.stack((np.cos(angles), np.sin(angles)), axis=1)
    assert np.allclose(nose[0], tangent * minor)
    assert np.allclose(nose[-1], tangent * main)
    ring = np.concatenate((nose, [edge * main, edge * (main + minor), edge * minor]))
    ring = ring - (middle + radius * np.array((1.0, -1.0)))
    return ring[:, 0], ring[:, 1]


def _area(ring: Array) -> float:
    z, r = ring.T
    return 0.5 * float(np.sum(z * np.roll(r, -1) - r * np.roll(z, -1)))


def _chords(radius: float, sweep: float) -> int:
    return max(1, math.ceil(abs(sweep) / (2.0 * math.acos(1.0 - SAGITTA / radius))))


def steps_of(points: Sequence[tuple[float, float]]) -> list[Step]:
    """The straight steps of a chain of points."""
    return list(pairwise(points))


def arc_points(
    start: tuple[float, float], centre: tuple[float, float], sweep: float
) -> list[tuple[float, float]]:
    """Points of an arc path, much closer than any simulation needs."""
    radius = math.hypot(start[0] - centre[0], start[1] - centre[1])
    begin = math.atan2(start[1] - centre[1], start[0] - centre[0])
    angles = begin + np.linspace(0.0, sweep, _chords(radius, sweep) + 1)
    return [(centre[0] + radius * math.cos(a), centre[1] + radius * math.sin(a)) for a in angles]


def corner_edge(depth: float, radius: float, kappa: float) -> float:
    """Length of edge in a cut of that depth: arc of the corner and straight part behind it."""
    angle = math.radians(kappa)
    rounded = radius * (1.0 - math.cos(angle))
    if depth <= rounded:
        return radius * math.acos(1.0 - depth / radius)
    return radius * angle + (depth - rounded) / math.sin(angle)


def volume(area: Polygon) -> float:
    """Pappus: area times the way of its centroid."""
    return 0.0 if area.is_empty else 2.0 * math.pi * area.centroid.y * area.area


def removed_at_once(raw: Polygon, insert: Insert, steps: Iterable[Step]) -> float:
    """Volume taken by all steps together: what the union of their sweeps shares with the raw stock."""
    return volume(raw.intersection(shapely.union_all([insert.swept(step) for step in steps])))


def removed_on_a_grid(
    corners: tuple[float, float, float, float], insert: Insert, steps: Iterable[Step], pitch: float
) -> float:
    """Volume taken from a bar (z low, r low, z high, r high), counted on points, one a cell of a grid."""
    z_low, r_low, z_high, r_high = corners
    z = np.arange(z_low + pitch / 2.0, z_high, pitch)
    r = np.arange(r_low + pitch / 2.0, r_high, pitch)
    points = np.stack([axis.ravel() for axis in np.meshgrid(z, r)], axis=1)
    # a point anywhere in its cell: rows of points in line with a turned surface would all err to one side
    points += np.random.default_rng(1).uniform(-0.5 * pitch, 0.5 * pitch, points.shape)
    gone = np.zeros(len(points), dtype=bool)
    for step in steps:
        ends = np.concatenate([insert.outline + np.array(point) for point in step])
        near = np.flatnonzero(~gone & (points > ends.min(axis=0)).all(axis=1) & (points < ends.max(axis=0)).all(axis=1))
        gone[near] = insert.covers(points[near], step)
    return float(np.sum(2.0 * math.pi * points[gone, 1]) * pitch**2)
