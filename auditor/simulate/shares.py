"""What each move of a run that was cut at once takes off: the volume of revolution that its own rows sweep."""

from __future__ import annotations

import math

import numpy as np

from auditor.simulate.engage import Stretches
from auditor.simulate.pieces import Piece
from auditor.simulate.samples import Edge, Floats


def swept_volume(stretches: Stretches, edge: Edge, piece: Piece) -> float:
    """Volume that the engaged stretches sweep along a piece, mm3; positions count from the piece's start.

    Every point of the leading edge meets fresh stock, so the volume is the way times the engaged extent times the
    circumference on which each point of it runs.
    """
    first = np.flatnonzero(stretches.stretch == 0)
    if len(first) == 0:
        return 0.0
    dz, dr = edge.direction
    low, high = stretches.low, stretches.high
    tip = piece.start.r + dr * stretches.position
    moment = tip * (high - low) + 0.5 * dz * (high**2 - low**2) + dr * (_moment(edge, high) - _moment(edge, low))
    ring = 2.0 * math.pi * np.add.reduceat(np.abs(moment), first)
    return float(np.sum(np.diff(stretches.position[first]) * 0.5 * (ring[1:] + ring[:-1])))


def _moment(edge: Edge, across: Floats) -> Floats:
    """Integral of the along-coordinate over across, from the edge's lower end."""
    sums = np.concatenate(([0.0], np.cumsum(np.diff(edge.across) * 0.5 * (edge.along[1:] + edge.along[:-1]))))
    side = np.clip(np.searchsorted(edge.across, across, "right") - 1, 0, len(edge.across) - 2)
    here = np.interp(across, edge.across, edge.along)
    moment: Floats = sums[side] + (across - edge.across[side]) * 0.5 * (edge.along[side] + here)
    return moment
