"""What the simulation hands on: where the edge is engaged, move by move, as exact piecewise-linear curves.

Axes. A straight piece of a move runs along the unit vector ``d = (dz, dr)``. ``along`` is measured in that
direction, ``across`` in the direction turned a quarter counter-clockwise, ``(-dr, dz)``; both from the
programmed point of the tool. The uncut chip thickness at a point of the edge is ``h = feed * sine``, where
``sine`` is outward normal times feed direction (the sine of the local working edge angle).
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from enum import IntEnum
from typing import Literal

import numpy as np
from numpy.typing import NDArray
from shapely.geometry.base import BaseGeometry

Floats = NDArray[np.float64]
Ints = NDArray[np.int64]


class Part(IntEnum):
    """Which part of the tool's outline a piece of the edge belongs to."""

    NOSE = 0
    MAIN = 1
    MINOR = 2
    BACK = 3  # beyond the cutting edges: insert body


@dataclass(frozen=True, slots=True)
class Edge:
    """The leading edge of one tool for one direction of motion: ``n`` nodes, ``n - 1`` straight pieces."""

    tool: int
    direction: tuple[float, float]  # (dz, dr), unit
    across: Floats  # (n,) rising, mm
    along: Floats  # (n,) mm
    sine: Floats  # (n-1,) outward normal times feed direction, 0 < sine <= 1
    part: Ints  # (n-1,) Part codes
    round_low: float  # nose radius when the edge starts at a tangent point of a rounded nose, else 0
    round_high: float  # the same at its upper end


@dataclass(frozen=True, slots=True)
class Samples:
    """Engaged stretches of the edge: one row per stretch and position, ``m`` rows in order of execution.

    Between two neighbouring positions of one piece every ``low`` and ``high`` runs linearly; where the
    engagement jumps, the value before and the value after stand at the same position. All arrays have
    shape (m,); lengths in mm. A position where nothing is engaged has one row with ``low == high``.
    """

    move: Ints  # index into Interpretation.moves
    piece: Ints  # running number of the straight piece (an arc has many)
    edge: Ints  # index into Simulation.edges
    position: Floats  # mm of path from the start of the move
    z: Floats  # programmed point
    r: Floats
    low: Floats  # across-coordinate where the stretch begins
    high: Floats  # and where it ends
    stretch: Ints  # 0, 1, … within the position
    infeed: Floats  # thread passes: the advance per turn that gives the chip its area; else NaN


@dataclass(frozen=True, slots=True)
class Contact:
    """Something touches that should not: where first, and how deep."""

    move: int
    kind: Literal["rapid", "dogleg", "near", "jaw", "tailstock"]
    z: float
    r: float
    depth: float  # mm; for "near" the distance left


@dataclass(frozen=True, slots=True)
class LoosePiece:
    """A piece of stock that a move cut off the rest."""

    move: int
    volume: float  # mm3
    z: tuple[float, float]


@dataclass(frozen=True, slots=True)
class Simulation:
    """The program cut in the half-section."""

    samples: Samples
    edges: tuple[Edge, ...]
    removed: Floats  # (moves,) mm3 per move
    final_surface: NDArray[np.bool_]  # (moves,) the move leaves a stretch of the finished surface
    contacts: tuple[Contact, ...]
    loose: tuple[LoosePiece, ...]
    raw: BaseGeometry
    final: BaseGeometry
    stock_before: Mapping[int, BaseGeometry]  # per cutting move
