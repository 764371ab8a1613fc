"""Which part of a tool's edge is in the cut, and at what angle to the motion."""

from __future__ import annotations

import math

import numpy as np
from numpy.typing import NDArray

from auditor.checks._cuts import Cut
from auditor.findings import Run
from auditor.interpret.moves import Kind
from auditor.simulate.samples import Edge, Part

Floats = NDArray[np.float64]


def engaged_lengths(run: Run, part: Part, *, leaner_than: float = 90.0) -> Floats:
    """Per move, shape (moves,): longest engaged length, mm, on a part of the edge.

    ``leaner_than`` keeps the pieces that lean less than so many degrees to the motion.
    """
    samples = run.simulation.samples
    lengths = np.zeros(len(samples.move))
    order = np.argsort(samples.edge, kind="stable")
    bounds = np.searchsorted(samples.edge[order], np.arange(len(run.simulation.edges) + 1))
    for edge, first, behind in zip(run.simulation.edges, bounds[:-1], bounds[1:], strict=True):
        if behind > first:
            rows = order[first:behind]
            lengths[rows] = _lengths(edge, samples.low[rows], samples.high[rows], part, leaner_than)
    longest = np.zeros(len(run.path.moves))
    np.maximum.at(longest, samples.move, lengths)
    return longest


def _lengths(edge: Edge, low: Floats, high: Floats, part: Part, leaner_than: float) -> Floats:
    """Engaged length on the part for every row."""
    begin, end = edge.across[:-1], edge.across[1:]
    width = end - begin
    own = (edge.part == part) & (edge.sine < math.sin(math.radians(min(leaner_than, 90.0))) + 1e-12) & (width > 0.0)
    if not own.any():
        return np.zeros(len(low))
    length = np.hypot(width, np.diff(edge.along))[own]
    overlap = np.minimum(high[:, None], end[own]) - np.maximum(low[:, None], begin[own])
    share: Floats = np.clip(overlap, 0.0, None) / width[own]
    return np.asarray(share @ length)


def path_angle(cut: Cut) -> float | None:
    """Direction of a straight move against the tool's nominal feed, deg: + away from the axis (in a bore: towards it).

    None for arcs, for tools whose nominal feed is along X, and for motion against the nominal feed.
    """
    start, end, tool = cut.move.start, cut.move.end, cut.tool
    if cut.move.kind is Kind.ARC or start is None or end is None or tool.edge_faces_end:
        return None
    away = tool.tip in (1, 4, 5) or (tool.tip in (0, 6, 8, 9) and tool.hand == "left")
    forward = (end.z - start.z) if away else (start.z - end.z)
    outward = (end.r - start.r) if tool.kind == "turning" else (start.r - end.r)
    if forward < -1e-9 or (abs(forward) < 1e-9 and abs(outward) < 1e-9):
        return None
    return math.degrees(math.atan2(outward, max(forward, 0.0)))
