"""A threading pass: V sections one lead apart, with the chip that each turn really takes.

In the half-section a thread is the tool's outline repeated at every lead. The work meets the edge in the
radial direction; ``infeed`` is the uniform advance that would give the same chip area over the same edge, so
that thickness ``infeed * sine`` and area ``infeed * extent`` follow the rules of every other cut.
"""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from auditor.interpret.moves import Move
from auditor.simulate.outline import Direction, Outline
from auditor.simulate.pieces import Piece, straight
from auditor.simulate.samples import Edge, Floats, Ints

SAME = 1e-6  # mm
GRAZING = 1e-4  # mm: an edge that only slides along the flank it cut before takes no chip

Interval = tuple[float, float]


@dataclass(frozen=True, slots=True)
class ThreadCut:
    """One pass: rows as in Samples and the area of the half-section that it removes."""

    piece: Piece
    edge: Edge
    position: Floats
    low: Floats
    high: Floats
    stretch: Ints
    infeed: Floats
    area: BaseGeometry


def thread_pass(move: Move, outline: Outline, stock: BaseGeometry) -> ThreadCut | None:
    """What a threading pass cuts; None where it cuts air or the lead is not known."""
    piece = straight(move.start, move.end)
    if piece is None or not move.lead:
        return None
    turns = _turns(piece, move.lead)
    sections = shapely.polygons([outline.hull() + _at(piece, turn) for turn in turns])
    chips = shapely.intersection(sections, stock)
    chip_area = shapely.area(chips)
    cutting = np.flatnonzero(chip_area > GRAZING**2)
    if len(cutting) == 0:
        return None
    edge = outline.edge(_inward(outline))
    rows = [
        (turns[turn], low, high, ordinal, float(chip_area[turn]))
        for turn in cutting
        for ordinal, (low, high) in enumerate(_engaged(edge, _at(piece, turns[turn]), chips[turn], stock.boundary))
    ]
    if not rows:
        return None
    position, low, high, stretch, chip = (np.array(column) for column in zip(*rows, strict=True))
    extent = np.array([(high - low)[position == p].sum() for p in position])
    return ThreadCut(
        piece, edge, position, low, high, stretch.astype(np.int64), chip / extent,
        shapely.union_all(sections[cutting]),
    )  # fmt: skip


def _turns(piece: Piece, lead: float) -> Floats:
    """Positions one lead apart, lead measured along the axis of the longer travel."""
    pitch = lead / max(abs(piece.direction[0]), abs(piece.direction[1]))
    return np.arange(0.0, piece.length + 1e-9, pitch)


def _at(piece: Piece, position: float) -> tuple[float, float]:
    return (
        piece.start.z + piece.direction[0] * position,
        piece.start.r + piece.direction[1] * position,
    )


def _inward(outline: Outline) -> Direction:
    """The radial direction that the nose points to."""
    nodes = outline.hull()
    return (0.0, -1.0) if abs(nodes[:, 1].min()) < abs(nodes[:, 1].max()) else (0.0, 1.0)


def _engaged(edge: Edge, at: tuple[float, float], chip: BaseGeometry, surface: BaseGeometry) -> Iterator[Interval]:
    """Across-intervals of the edge that cut into the stock, not those that slide along a flank cut before."""
    dz, dr = edge.direction
    corners = (shapely.get_coordinates(chip) - at) @ np.array((-dr, dz))
    ends = np.unique(np.concatenate((edge.across, np.clip(corners, edge.across[0], edge.across[-1]))))
    ends = ends[np.append(True, np.diff(ends) > SAME)]
    across = 0.5 * (ends[:-1] + ends[1:])
    along = np.interp(across, edge.across, edge.along)
    middles = shapely.points(at[0] + along * dz - across * dr, at[1] + along * dr + across * dz)
    cuts = (shapely.distance(middles, chip) < SAME) & (shapely.distance(middles, surface) > GRAZING)
    begins = np.flatnonzero(cuts & ~np.append(False, cuts[:-1]))
    behind = np.flatnonzero(cuts & ~np.append(cuts[1:], False)) + 1
    return ((float(ends[first]), float(ends[last])) for first, last in zip(begins, behind, strict=True))
