"""Rapid moves: the dog-leg that independent axes run, and rapids that end close to raw stock."""

from __future__ import annotations

from typing import Literal

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from auditor.declared.model import Machine, Point
from auditor.interpret.moves import Move
from auditor.simulate.outline import Outline
from auditor.simulate.pieces import straight
from auditor.simulate.samples import Contact
from auditor.simulate.stock import swept

NEAR = 1.0  # mm between the tool and raw stock below which a rapid's end is noted
TOUCHING = 1e-6  # mm


def dogleg_contact(
    move: Move, outline: Outline, stock: BaseGeometry, machine: Machine, scratch: float
) -> Contact | None:
    """Contact on the bent path of two axes that both run at their own rapid rate."""
    start, end = move.start, move.end
    if start is None or end is None or start.z == end.z or start.r == end.r:
        return None
    corner = _corner(start, end, machine)
    for begin, finish in ((start, corner), (corner, end)):
        piece = straight(begin, finish)
        if piece is None:
            continue
        hit = shapely.intersection(stock, swept(outline.hull(), piece.step, piece.start))
        contact = _contact(move, "dogleg", hit, scratch)
        if contact is not None:
            return contact
    return None


def arrival_contact(move: Move, outline: Outline, stock: BaseGeometry, scratch: float) -> Contact | None:
    """Contact where a rapid ends, for one whose start is not known."""
    if move.end is None:
        return None
    hit = shapely.intersection(stock, swept(outline.hull(), (0.0, 0.0), move.end))
    return _contact(move, "rapid", hit, scratch)


def _contact(move: Move, kind: Literal["rapid", "dogleg"], hit: BaseGeometry, scratch: float) -> Contact | None:
    """The contact that an overlap with the stock amounts to; scratches are none."""
    if hit.area <= scratch**2:
        return None
    z_low, r_low, z_high, r_high = hit.bounds
    depth = min(z_high - z_low, r_high - r_low)
    return Contact(move.index, kind, z_high, r_high, depth) if depth > scratch else None


def _corner(start: Point, end: Point, machine: Machine) -> Point:
    """Where the first axis has arrived; X rates are those of the slide, so radial."""
    dz, dr = end.z - start.z, end.r - start.r
    time = min(abs(dz) / machine.rapid_z, abs(dr) / machine.rapid_x)
    reach_z = min(abs(dz), time * machine.rapid_z) * (1 if dz > 0 else -1)
    reach_r = min(abs(dr), time * machine.rapid_x) * (1 if dr > 0 else -1)
    return Point(start.z + reach_z, start.r + reach_r)


def near_contact(move: Move, outline: Outline, stock: BaseGeometry, raw: BaseGeometry) -> Contact | None:
    """A rapid that comes nearer to a raw surface than NEAR."""
    start, end = move.start, move.end
    if start is None or end is None or stock.is_empty:
        return None
    at_end = shapely.polygons(outline.hull() + np.asarray(end))
    gap = shapely.distance(at_end, stock)
    if not TOUCHING < gap < NEAR:
        return None
    at_start = shapely.polygons(outline.hull() + np.asarray(start))
    if shapely.distance(at_start, stock) <= gap:
        return None
    closest = shapely.get_point(shapely.shortest_line(stock, at_end), 0)
    if shapely.distance(closest, raw.boundary) > TOUCHING:
        return None
    return Contact(move.index, "near", closest.x, closest.y, gap)
