"""Which moves leave a stretch of the finished surface."""

from __future__ import annotations

import numpy as np
import shapely
from numpy.typing import NDArray
from shapely.geometry.base import BaseGeometry

from auditor.simulate.samples import Edge, Floats, Samples

ON_SURFACE = 0.003  # mm: chords of nose and arcs stand off by less
SHORTEST = 0.02  # mm of finished surface that make a move count
TOUCHES = 1e-6  # mm between the end of a stretch and the end of the edge


def final_surface(samples: Samples, edges: tuple[Edge, ...], final: BaseGeometry, moves: int) -> NDArray[np.bool_]:
    """Per move: does the surface it generates remain to the end? Shape (moves,).

    A stretch that reaches the end of the edge leaves, there, the surface behind it.
    """
    found = np.zeros(moves, dtype=bool)
    if len(samples.move) == 0 or final.is_empty:
        return found
    ends = np.array([(*_end(edge, 0), *_end(edge, -1)) for edge in edges])[samples.edge]
    lowest = np.array([edge.across[0] for edge in edges])[samples.edge]
    highest = np.array([edge.across[-1] for edge in edges])[samples.edge]
    engaged = samples.high > samples.low
    surface = shapely.buffer(final.boundary, ON_SURFACE, cap_style="flat", join_style="mitre")
    shapely.prepare(surface)
    for touches, offset in (
        (engaged & (samples.low - lowest < TOUCHES), ends[:, 0:2]),
        (engaged & (highest - samples.high < TOUCHES), ends[:, 2:4]),
    ):
        points = np.stack((samples.z, samples.r), axis=1) + offset
        length = _surface_length(samples, np.flatnonzero(touches), points, surface, moves)
        found |= length > SHORTEST
    return found


def _surface_length(
    samples: Samples, rows: NDArray[np.int64], points: Floats, surface: BaseGeometry, moves: int
) -> Floats:
    """Length of finished surface left by each move, from neighbouring rows of the same piece."""
    first, second = rows[:-1], rows[1:]
    neighbours = samples.piece[first] == samples.piece[second]
    first, second = first[neighbours], second[neighbours]
    paths = shapely.linestrings(np.stack((points[first], points[second]), axis=1))
    on = np.zeros(len(paths))
    near = shapely.intersects(surface, paths)  # quick on a prepared shape; most paths were turned away since
    on[near] = shapely.length(shapely.intersection(paths[near], surface))
    return np.bincount(samples.move[first], weights=on, minlength=moves).astype(np.float64)


def _end(edge: Edge, index: int) -> tuple[float, float]:
    """The edge's end node as an offset (z, r) from the programmed point."""
    along, across = edge.along[index], edge.across[index]
    dz, dr = edge.direction
    return along * dz - across * dr, along * dr + across * dz
