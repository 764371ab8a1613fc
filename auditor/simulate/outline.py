"""The tool as it meets the work: a convex outline round the programmed point, and its leading edge."""

from __future__ import annotations

import math
from dataclasses import dataclass, field

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from auditor.simulate.samples import Edge, Floats, Ints, Part

SAGITTA = 0.001  # mm between a chord and its arc
PARALLEL = 1e-9  # sine below which a side runs along the feed and cuts nothing

Direction = tuple[float, float]  # (dz, dr), unit


@dataclass(frozen=True, slots=True)
class Corner:
    """A corner of the outline, rounded or sharp (radius 0), and the side that follows it.

    ``begin`` and ``end`` are the angles of the outward normal before and behind the corner, rad,
    counter-clockwise from +z.
    """

    centre: tuple[float, float]  # (z, r) of the rounding
    radius: float
    begin: float
    end: float
    side: Part

    def angles(self, direction: Direction | None) -> list[float]:
        """Angles of the nodes that stand for the arc, chorded to SAGITTA.

        The point where a feed direction is tangent to the corner is a node too: without it a light
        finish on a taper loses a measurable share of its volume.
        """
        if self.radius <= 0.0:
            return [self.begin]
        span = self.end - self.begin
        step = 2.0 * math.acos(max(0.0, 1.0 - SAGITTA / self.radius))
        count = max(2, math.ceil(span / step))
        angles = [self.begin + span * i / count for i in range(count + 1)]
        if direction is not None:
            heading = math.atan2(direction[1], direction[0])
            for tangent in (heading - math.pi / 2, heading + math.pi / 2):
                turned = self.begin + (tangent - self.begin) % math.tau
                if turned < self.end and min(abs(turned - angle) for angle in angles) > 1e-7:
                    angles.append(turned)
            angles.sort()
        if span > math.tau - 1e-9:
            angles.pop()  # a round insert closes on itself
        return angles

    def touches(self, point: Floats, normal: tuple[float, float]) -> bool:
        """Whether the rounding's tangent point with that outward normal is ``point``."""
        return self.radius > 0.0 and (
            math.hypot(
                self.centre[0] + self.radius * normal[0] - point[0],
                self.centre[1] + self.radius * normal[1] - point[1],
            )
            < 1e-7
        )


@dataclass(frozen=True, slots=True)
class Facing:
    """An outline seen along a direction of motion: its leading edge, and its nodes before and behind.

    ``before`` and ``behind`` (n, 2) share their end nodes, so that one moved ahead and the other left in place
    enclose what the outline sweeps.
    """

    edge: Edge
    before: Floats
    behind: Floats

    def swept(self, length: float, start: tuple[float, float]) -> BaseGeometry:
        """Area covered while the programmed point runs ``length`` mm from ``start``."""
        ahead = self.before + np.asarray(self.edge.direction) * length
        return shapely.polygons(np.concatenate((ahead, self.behind)) + np.asarray(start))


@dataclass(frozen=True, slots=True)
class Outline:
    """Corners in counter-clockwise order in (z, r), relative to the programmed point."""

    tool: int
    corners: tuple[Corner, ...]
    _facings: dict[Direction, Facing] = field(default_factory=dict, compare=False, repr=False)
    _hull: list[Floats] = field(default_factory=list, compare=False, repr=False)

    @property
    def nose(self) -> Corner:
        """The corner that makes the surface."""
        return self.corners[0]

    def nodes(self, direction: Direction | None = None) -> tuple[Floats, Ints]:
        """Chorded outline: nodes (n, 2) in (z, r) and the Part of the side behind each node (n,)."""
        points: list[tuple[float, float]] = []
        parts: list[int] = []
        for corner in self.corners:
            angles = corner.angles(direction)
            (z, r), radius = corner.centre, corner.radius
            points.extend((z + radius * math.cos(angle), r + radius * math.sin(angle)) for angle in angles)
            parts.extend([int(Part.NOSE)] * (len(angles) - 1))
            parts.append(int(corner.side))
        return np.array(points), np.array(parts, dtype=np.int64)

    def hull(self) -> Floats:
        """Nodes of the outline as it stands, (n, 2) in (z, r)."""
        if not self._hull:
            self._hull.append(self.nodes()[0])
        return self._hull[0]

    def edge(self, direction: Direction) -> Edge:
        """The leading edge for a direction of motion."""
        return self.facing(direction).edge

    def facing(self, direction: Direction) -> Facing:
        """The outline seen along a direction of motion; remembered per direction."""
        facing = self._facings.get(direction)
        if facing is None:
            facing = self._facings[direction] = _facing(self, direction)
        return facing


def _facing(outline: Outline, direction: Direction) -> Facing:
    points, parts = outline.nodes(direction)
    dz, dr = direction
    along = points[:, 0] * dz + points[:, 1] * dr
    across = points[:, 1] * dz - points[:, 0] * dr
    steps = np.roll(points, -1, axis=0) - points
    # A counter-clockwise side leads where it climbs across the feed.
    sine = (steps[:, 1] * dz - steps[:, 0] * dr) / np.hypot(steps[:, 0], steps[:, 1])
    leads = sine > PARALLEL
    first = int(np.flatnonzero(leads & ~np.roll(leads, 1))[0])
    order = (first + np.arange(int(leads.sum()))) % len(points)
    nodes = np.append(order, (order[-1] + 1) % len(points))
    low, high = points[nodes[0]], points[nodes[-1]]
    rest = (nodes[-1] + np.arange(len(points) - len(order) + 1)) % len(points)
    edge = Edge(
        tool=outline.tool,
        direction=direction,
        across=_frozen(across[nodes]),
        along=_frozen(along[nodes]),
        sine=_frozen(sine[order]),
        part=_frozen_ints(parts[order]),
        round_low=_radius_at(outline, low, (dr, -dz)),
        round_high=_radius_at(outline, high, (-dr, dz)),
    )
    return Facing(edge, _frozen(points[nodes]), _frozen(points[rest]))


def _radius_at(outline: Outline, point: Floats, normal: tuple[float, float]) -> float:
    """Nose radius when the edge ends where the feed is tangent to a rounded corner, else 0."""
    return next((corner.radius for corner in outline.corners if corner.touches(point, normal)), 0.0)


def _frozen(array: Floats) -> Floats:
    array.setflags(write=False)
    return array


def _frozen_ints(array: Ints) -> Ints:
    array.setflags(write=False)
    return array
