"""How far the remaining, stepped stock gives way at the cut."""

from __future__ import annotations

from collections.abc import Mapping

import numpy as np
from shapely.geometry.base import BaseGeometry

from auditor.declared.model import Job, Workholding
from auditor.mechanics.bending import Supports, stepped_compliance
from auditor.predict.loads import Floats
from auditor.simulate.samples import Samples
from auditor.simulate.stock import boundary_segments

STEP = 2.0  # mm: a cone between two nodes of the outline is taken as steps of this length
MOST_STEPS = 16
SHORTEST = 1e-6  # mm


def compliances(samples: Samples, stock_before: Mapping[int, BaseGeometry], job: Job) -> Floats:
    """Radial give of the work at every stretch, mm/N, from the stock that stood before each move; shape (m,)."""
    give = np.zeros(len(samples.move))
    supports = _supports(job.workholding)
    moves, first = np.unique(samples.move, return_index=True)
    known: BaseGeometry | None = None
    sections: tuple[Floats, Floats] | None = None
    for move, rows in zip(moves, np.split(np.arange(len(give)), first[1:]), strict=True):
        stock = stock_before.get(int(move))
        if stock is not known:  # merged moves share the stock before them
            known = stock
            sections = None if stock is None else sections_of(stock, -job.workholding.stick_out)
        if sections is None:
            continue
        ends, moments = sections
        at = np.clip(samples.z[rows] + job.workholding.stick_out, 0.0, ends[-1])
        give[rows] = stepped_compliance(ends, moments * job.workpiece.material.modulus, at, supports)
    return give


def _supports(workholding: Workholding) -> Supports:
    return Supports("chuck" if workholding.kind == "collet" else workholding.kind)


def sections_of(stock: BaseGeometry, jaw_face: float) -> tuple[Floats, Floats] | None:
    """Ends of the sections from the jaw face, mm, and their second moments of area, mm4; None when nothing stands out.

    Cones are cut into steps; bores and undercuts count as what is missing.
    """
    begin, end = boundary_segments(stock)
    nodes = np.unique(np.concatenate(([jaw_face], begin[:, 0])))
    nodes = nodes[nodes >= jaw_face]
    nodes = nodes[np.append(True, np.diff(nodes) > SHORTEST)]
    if len(nodes) < 2:
        return None
    width = np.diff(nodes)
    count = np.clip(np.ceil(width / STEP).astype(np.int64), 1, MOST_STEPS)
    number = np.arange(count.sum()) - np.repeat(np.cumsum(count) - count, count)
    ends = np.append(np.repeat(nodes[:-1], count) + number * np.repeat(width / count, count), nodes[-1])
    middle = 0.5 * (ends[:-1] + ends[1:])
    moments = _second_moments(begin, end, middle)
    solid = moments > 0.0
    if not solid.any():
        return None
    return ends[1:][solid] - jaw_face, moments[solid]


def _second_moments(begin: Floats, end: Floats, z: Floats) -> Floats:
    """Second moment of area of the ring section at each z: sides facing outwards add, those facing inwards take."""
    first = np.searchsorted(z, np.minimum(begin[:, 0], end[:, 0]))
    count = np.searchsorted(z, np.maximum(begin[:, 0], end[:, 0])) - first
    side = np.repeat(np.arange(len(begin)), count)
    section = np.arange(len(side)) - np.repeat(np.cumsum(count) - count - first, count)
    width = end[side, 0] - begin[side, 0]
    share = (z[section] - begin[side, 0]) / width
    radius = begin[side, 1] + share * (end[side, 1] - begin[side, 1])
    # counter-clockwise: the outer surface runs towards -z
    fourth = np.where(width < 0.0, radius**4, -(radius**4))
    return (np.pi / 4.0 * np.bincount(section, weights=fourth, minlength=len(z))).astype(np.float64)
