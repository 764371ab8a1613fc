"""Which stretches of the edge are in the work along one straight piece of a move. Exact, no sampling.

For a convex outline on a straight move a point of the leading edge cannot have been swept earlier in the same
move, so the engagement depends only on the stock before it. In the axes along and across the feed the edge and
the stock boundary are straight between neighbouring nodes; the position at which they meet is then linear
across such a slab, and every stretch begins and ends on straight ramps.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from auditor.simulate.samples import Edge, Floats, Ints

SAME = 1e-6  # mm: events closer than this happen together; thinner skins of stock are dust
THIN = 1e-8  # mm: slabs narrower than this are skipped
BEYOND = 1e9  # mm: where stock ends that the move does not reach the end of


@dataclass(frozen=True, slots=True)
class Stretches:
    """Engaged stretches along one straight piece: rows as in Samples, positions from its start."""

    position: Floats
    low: Floats
    high: Floats
    stretch: Ints

    @property
    def engaged(self) -> bool:
        """Whether anything is cut at all."""
        return len(self.position) > 0

    def only(self, rows: NDArray[np.bool_]) -> Stretches:
        """The rows that a mask picks."""
        return Stretches(self.position[rows], self.low[rows], self.high[rows], self.stretch[rows])


NOTHING = Stretches(np.empty(0), np.empty(0), np.empty(0), np.empty(0, dtype=np.int64))


@dataclass(frozen=True, slots=True)
class _Passages:
    """Slab by slab, stock met from ``enter`` to ``leave``; columns at the slab's lower and upper side."""

    low: Floats  # across, (n,)
    high: Floats
    enter: Floats  # position where the edge meets the stock, (n, 2)
    leave: Floats  # and where it leaves it, (n, 2)


def engagement(
    edge: Edge,
    sides: tuple[Floats, Floats],
    start: tuple[float, float],
    length: float,
    marks: Sequence[float] | Floats = (),
) -> Stretches:
    """Engaged stretches while the programmed point runs ``length`` mm from ``start`` along the edge's direction.

    Args:
        edge: leading edge for the direction.
        sides: starts and ends (n, 2) of the stock's sides, inside on their left.
        start: (z, r) of the programmed point.
        length: mm.
        marks: further positions at which rows are wanted.
    """
    passages = _passages(edge, sides, start, length)
    if passages is None:
        return NOTHING
    positions, behind = _events(passages, length, marks)
    low, high = _intervals(passages, positions, behind)
    kept = _distinct(positions, low, high)
    return _joined(positions[kept], low[kept], high[kept])


def _passages(
    edge: Edge, sides: tuple[Floats, Floats], start: tuple[float, float], length: float
) -> _Passages | None:
    dz, dr = edge.direction
    origin = np.asarray(start)
    begin, end = sides[0] - origin, sides[1] - origin
    across_begin = begin[:, 1] * dz - begin[:, 0] * dr
    across_end = end[:, 1] * dz - end[:, 0] * dr
    lowest, highest = edge.across[0], edge.across[-1]
    near = (
        (np.minimum(across_begin, across_end) < highest - THIN)
        & (np.maximum(across_begin, across_end) > lowest + THIN)
        & (np.abs(across_end - across_begin) > THIN)
    )
    if not near.any():
        return None
    begin, end, across_begin, across_end = begin[near], end[near], across_begin[near], across_end[near]
    along_begin = begin[:, 0] * dz + begin[:, 1] * dr
    along_end = end[:, 0] * dz + end[:, 1] * dr
    if max(along_begin.max(), along_end.max()) < edge.along.min():
        return None
    # Sides beyond the end of the move matter only as "not left yet"; see _paired.
    reached = np.minimum(along_begin, along_end) < edge.along.max() + length + SAME
    if not reached.all():
        along_begin, along_end = along_begin[reached], along_end[reached]
        across_begin, across_end = across_begin[reached], across_end[reached]
    nodes = np.sort(np.concatenate((edge.across, across_begin, across_end)))
    nodes = nodes[(nodes >= lowest) & (nodes <= highest)]
    wide = np.diff(nodes) > THIN
    slab_low, slab_high = nodes[:-1][wide], nodes[1:][wide]
    middle = 0.5 * (slab_low + slab_high)
    crossing = (np.minimum(across_begin, across_end) < middle[:, None]) & (
        np.maximum(across_begin, across_end) > middle[:, None]
    )
    slab, side = np.nonzero(crossing)
    if len(slab) == 0:
        return None
    slope = (along_end - along_begin)[side] / (across_end - across_begin)[side]
    edge_low, edge_high = (np.interp(q, edge.across, edge.along) for q in (slab_low, slab_high))
    reach = np.stack(
        (
            along_begin[side] + slope * (slab_low[slab] - across_begin[side]) - edge_low[slab],
            along_begin[side] + slope * (slab_high[slab] - across_begin[side]) - edge_high[slab],
        ),
        axis=1,
    )
    # Inside on the left: where the stock is met, its boundary runs back across the feed.
    entering = (across_end < across_begin)[side]
    return _paired(slab, reach, entering, slab_low, slab_high, length)


def _paired(
    slab: Ints, reach: Floats, entering: NDArray[np.bool_], slab_low: Floats, slab_high: Floats, length: float
) -> _Passages | None:
    """Join each entry with the exit that follows it in its slab; keep what happens within the move.

    An entry that is last in its slab is left beyond the move's end.
    """
    order = np.lexsort((reach.sum(axis=1), slab))
    slab, reach, entering = slab[order], reach[order], entering[order]
    last = np.append(slab[:-1] != slab[1:], True)
    pair = np.flatnonzero(entering & (last | ~np.append(entering[1:], False)))
    enter = reach[pair]
    leave = np.where(last[pair, None], BEYOND, reach[np.minimum(pair + 1, len(reach) - 1)])
    kept = (
        (leave.max(axis=1) > SAME)
        & (enter.min(axis=1) < length - SAME)
        & ((leave - enter).max(axis=1) > SAME)
    )
    if not kept.any():
        return None
    pair, enter, leave = pair[kept], enter[kept], leave[kept]
    return _Passages(slab_low[slab[pair]], slab_high[slab[pair]], enter, leave)


def _events(passages: _Passages, length: float, marks: Sequence[float] | Floats) -> tuple[Floats, NDArray[np.bool_]]:
    """Positions at which a ramp begins or ends, each seen from before and from behind.

    Of events closer than SAME the state before the first and behind the last is kept.
    """
    times = np.sort(np.concatenate((passages.enter.ravel(), passages.leave.ravel(), marks)))
    times = times[(times > SAME) & (times < length - SAME)]
    gap = np.diff(times) > SAME
    firsts = times[np.concatenate(([True], gap))] if len(times) else times
    lasts = times[np.concatenate((gap, [True]))] if len(times) else times
    positions = np.empty(2 * len(firsts) + 2)
    behind = np.ones(len(positions), dtype=bool)
    positions[0], positions[-1] = 0.0, length
    positions[1:-1:2], positions[2:-1:2] = firsts, lasts
    behind[1:-1:2] = False
    behind[-1] = False  # merely touching at the end is not engagement
    return positions, behind


def _intervals(
    passages: _Passages, positions: Floats, behind: NDArray[np.bool_]
) -> tuple[Floats, Floats]:
    """Engaged interval of every slab (columns) at every position (rows); empty where low >= high."""
    width = passages.high - passages.low
    count = len(width)
    share = _share(np.concatenate((passages.enter, passages.leave)), positions, behind) * np.tile(width, 2)
    entered, left = share[:, :count], share[:, count:]
    enters_low_first = passages.enter[:, 0] <= passages.enter[:, 1]
    leaves_low_first = passages.leave[:, 0] <= passages.leave[:, 1]
    low = np.maximum(
        np.where(enters_low_first, passages.low, passages.high - entered),
        np.where(leaves_low_first, passages.low + left, passages.low),
    )
    high = np.minimum(
        np.where(enters_low_first, passages.low + entered, passages.high),
        np.where(leaves_low_first, passages.high, passages.high - left),
    )
    return low, high


def _distinct(positions: Floats, low: Floats, high: Floats) -> NDArray[np.bool_]:
    """Rows to keep: the view from behind an event only where it differs from the view before it."""
    kept = np.ones(len(positions), dtype=bool)
    before, after = slice(1, -1, 2), slice(2, -1, 2)
    kept[after] = (
        (positions[before] != positions[after])
        | (low[before] != low[after]).any(axis=1)
        | (high[before] != high[after]).any(axis=1)
    )
    return kept


def _share(ramp: Floats, positions: Floats, behind: NDArray[np.bool_]) -> Floats:
    """Share of a slab that a ramp has passed at each position, (positions, slabs)."""
    first = ramp.min(axis=1)
    rise = ramp.max(axis=1) - first
    # An edge that meets a parallel boundary jumps: nothing before, all behind. At the very start of a move
    # what lies within SAME has been reached.
    reach = positions[:, None] + np.where(behind, SAME, -SAME)[:, None]
    jumps = rise < SAME
    sloped = (positions[:, None] - first) / np.where(jumps, 1.0, rise)
    share: Floats = np.clip(np.where(jumps, (reach > first) * 1.0, sloped), 0.0, 1.0)
    return share


def _joined(positions: Floats, low: Floats, high: Floats) -> Stretches:
    """Slab intervals joined to connected stretches; a row with low == high where nothing is engaged."""
    engaged = high - low > THIN
    row = engaged.nonzero()[0]
    if len(row) == 0:
        return NOTHING
    lows, highs = low[engaged], high[engaged]
    if (lows[1:] < lows[:-1])[row[1:] == row[:-1]].any():  # two passages in one slab
        order = np.lexsort((lows, row))
        row, lows, highs = row[order], lows[order], highs[order]
    fresh = np.ones(len(row), dtype=bool)
    fresh[1:] = (row[1:] != row[:-1]) | (lows[1:] > highs[:-1] + SAME)
    first = fresh.nonzero()[0]
    last = np.append(first[1:] - 1, len(row) - 1)
    idle = np.flatnonzero(~engaged.any(axis=1))
    nothing = np.zeros(len(idle))
    rows = np.concatenate((row[first], idle))
    order = rows.argsort(kind="stable")
    rows = rows[order]
    return Stretches(
        positions[rows],
        np.concatenate((lows[first], nothing))[order],
        np.concatenate((highs[last], nothing))[order],
        np.arange(len(rows)) - np.searchsorted(rows, rows),
    )
