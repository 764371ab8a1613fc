"""Integrals along the engaged edge, for every stretch of the program at once.

Along an edge the sine of the working angle is constant between nodes, so lengths and Kienzle integrals run
linearly there and first moments as parabolas; sums up to each node plus the started side give them exactly.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from auditor.predict.loads import Floats, Ints
from auditor.simulate.samples import Edge, Part

APART = 1_000.0  # mm between the across-coordinates of two edges in the common table


@dataclass(frozen=True, slots=True)
class EdgeTable:
    """The nodes of all edges in one row, so that one search finds the side of every stretch."""

    first: Ints  # (edges,) index of each edge's first node
    last: Ints  # (edges,)
    across: Floats  # (nodes,)
    along: Floats
    sine: Floats  # (nodes,) of the side behind the node; the last node repeats its own
    part: Ints  # (nodes,)
    turning: Floats  # (nodes,) sine of the working angle at the node itself on a rounded corner, else of its side
    turned: Floats  # (nodes,) the same at the far end of the side behind the node
    peak: Ints  # (edges,) node with the largest sine: it rises up to there and falls behind
    key: Floats  # (nodes,) across shifted apart by edge
    shift: Floats  # (edges,)
    round_low: Floats
    round_high: Floats
    direction: Floats  # (edges, 2) dz, dr

    @classmethod
    def of(cls, edges: Sequence[Edge]) -> EdgeTable:
        """The table of a simulation's edges."""
        sizes = np.array([len(edge.across) for edge in edges], dtype=np.int64)
        last = np.cumsum(sizes) - 1
        first = last - sizes + 1
        across = _joined([edge.across for edge in edges])
        sine = _joined([np.append(edge.sine, edge.sine[-1]) for edge in edges])
        part = _joined([np.append(edge.part, edge.part[-1]) for edge in edges]).astype(np.int64)
        begin, end = _at_ends(edges)
        lowest = across[first] if len(edges) else np.empty(0)
        shift = np.arange(len(edges)) * APART - lowest
        return cls(
            first=first,
            last=last,
            across=across,
            along=_joined([edge.along for edge in edges]),
            sine=sine,
            part=part,
            turning=begin,
            turned=end,
            peak=first + np.array([int(np.argmax(edge.sine)) for edge in edges], dtype=np.int64),
            key=across + np.repeat(shift, sizes),
            shift=shift,
            round_low=np.array([edge.round_low for edge in edges]),
            round_high=np.array([edge.round_high for edge in edges]),
            direction=np.array([edge.direction for edge in edges]).reshape(-1, 2),
        )

    def side(self, edge: Ints, across: Floats, *, upper: bool) -> Ints:
        """Node that begins the side on which ``across`` lies; at a node the side inside the stretch."""
        found = np.searchsorted(self.key, across + self.shift[edge], "left" if upper else "right") - 1
        return np.clip(found, self.first[edge], self.last[edge] - 1)

    def at(self, values: Floats, side: Ints, across: Floats) -> Floats:
        """Node values, linear along each side, at an across-coordinate on a known side."""
        slope = (values[side + 1] - values[side]) / (self.across[side + 1] - self.across[side])
        return values[side] + slope * (across - self.across[side])

    def between(self, weight: Floats, values: Floats, ends: Ends) -> Floats:
        """Integral of ``weight * values`` over across; ``weight`` is constant along a side."""
        step = np.diff(self.across, append=self.across[-1:])
        whole = weight * step * 0.5 * (values + np.append(values[1:], values[-1:]))
        sums = np.concatenate(([0.0], np.cumsum(whole)))

        def up_to(side: Ints, across: Floats) -> Floats:
            middle = 0.5 * (values[side] + self.at(values, side, across))
            return sums[side] + weight[side] * (across - self.across[side]) * middle

        return up_to(ends.above, ends.high) - up_to(ends.below, ends.low)


@dataclass(frozen=True, slots=True)
class Ends:
    """Where stretches begin and end, and the sides on which they do; shape (m,) each."""

    below: Ints
    low: Floats
    above: Ints
    high: Floats


@dataclass(frozen=True, slots=True)
class Integrals:
    """Per stretch, shape (m,): what a force law needs to know of the engaged edge."""

    extent: Floats  # across the feed, mm
    length: Floats  # along the edge, mm
    kienzle: Floats  # integral of sine^(1-mc) along the edge
    moment_along: Floats  # the same times the along-coordinate
    moment_across: Floats  # the same times the across-coordinate
    sine_max: Floats
    low_along: Floats  # along-coordinate of the stretch's ends
    high_along: Floats


def integrate(table: EdgeTable, edge: Ints, low: Floats, high: Floats, mc: float) -> Integrals:
    """Integrals over the stretches ``low`` to ``high`` of the given edges."""
    above = table.side(edge, high, upper=True)
    below = np.minimum(table.side(edge, low, upper=False), above)
    ends = Ends(below, low, above, high)
    one = np.ones_like(table.across)
    weight = table.sine**-mc
    return Integrals(
        extent=high - low,
        length=table.between(1.0 / table.sine, one, ends),
        kienzle=table.between(weight, one, ends),
        moment_along=table.between(weight, table.along, ends),
        moment_across=table.between(weight, table.across, ends),
        sine_max=_largest_sine(table, edge, ends),
        low_along=table.at(table.along, below, low),
        high_along=table.at(table.along, above, high),
    )


def _largest_sine(table: EdgeTable, edge: Ints, ends: Ends) -> Floats:
    """Largest sine of the working angle within the stretches: at the steepest side, or at one of the ends."""
    peak = table.peak[edge]
    at_ends = np.maximum(_sine_at(table, ends.below, ends.low), _sine_at(table, ends.above, ends.high))
    return np.where((ends.below <= peak) & (peak <= ends.above), table.sine[peak], at_ends)


def _sine_at(table: EdgeTable, side: Ints, across: Floats) -> Floats:
    share = (across - table.across[side]) / (table.across[side + 1] - table.across[side])
    return table.turning[side] + share * (table.turned[side] - table.turning[side])


def _at_ends(edges: Sequence[Edge]) -> tuple[Floats, Floats]:
    """Sine at the beginning and the end of every side: on a rounded corner it changes along the chord."""
    begins, ends = [], []
    for edge in edges:
        begin, end = edge.sine.copy(), edge.sine.copy()
        nose = edge.part == Part.NOSE
        # chords meet at the mean of their slopes; a straight side continues the corner's tangent
        joint = np.where(nose[:-1] & nose[1:], 0.5 * (begin[:-1] + begin[1:]), np.where(nose[:-1], begin[1:], end[:-1]))
        begin[1:] = np.where(nose[1:], joint, begin[1:])
        end[:-1] = np.where(nose[:-1], joint, end[:-1])
        begin[0] = 0.0 if edge.round_low > 0.0 else begin[0]
        end[-1] = 0.0 if edge.round_high > 0.0 else end[-1]
        begins.append(np.append(begin, begin[-1]))
        ends.append(np.append(end, end[-1]))
    return _joined(begins), _joined(ends)


def _joined(arrays: Sequence[Floats]) -> Floats:
    return np.concatenate(arrays) if arrays else np.empty(0)
