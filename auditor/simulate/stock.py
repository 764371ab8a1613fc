"""The remaining stock: an exact polygon of the (z, r) half-section."""

from __future__ import annotations

import math

import numpy as np
import shapely
from shapely.geometry import Polygon
from shapely.geometry.base import BaseGeometry

from auditor.declared.model import Workpiece
from auditor.simulate.samples import Floats

SLIVER = 1e-7  # mm2 below which a scrap of a boolean operation is numerical dust
SNAP = 1e-9  # mm, grid of the fallback after a failed boolean operation


def raw_stock(workpiece: Workpiece) -> BaseGeometry:
    """The stock before the first move."""
    return Polygon([(point.z, point.r) for point in workpiece.outline])


def without(stock: BaseGeometry, sweep: BaseGeometry) -> BaseGeometry:
    """Stock after the area ``sweep`` was cut, free of numerical dust."""
    try:
        rest = shapely.difference(stock, sweep)
    except shapely.errors.GEOSException:
        rest = shapely.difference(stock, sweep, grid_size=SNAP)
    return _tidy(rest)


def _tidy(shape: BaseGeometry) -> BaseGeometry:
    if shape.geom_type == "Polygon":
        return shape
    parts = [part for part in polygons(shape) if part.area > SLIVER]
    return parts[0] if len(parts) == 1 else shapely.multipolygons(parts) if parts else Polygon()


def polygons(shape: BaseGeometry) -> list[Polygon]:
    """The polygons a shape consists of; lines and points left by a boolean operation are dropped."""
    if shape.is_empty:
        return []
    if shape.geom_type == "Polygon":
        return [shape]
    return [part for part in shape.geoms if part.geom_type == "Polygon" and not part.is_empty]


def swept(outline: Floats, step: tuple[float, float], at: tuple[float, float]) -> BaseGeometry:
    """Area that a convex outline ``(n, 2)`` covers while it moves by ``step`` from ``at``."""
    start = outline + np.asarray(at)
    return shapely.convex_hull(shapely.multipoints(np.concatenate((start, start + np.asarray(step)))))


def volume(shape: BaseGeometry) -> float:
    """Volume of revolution about the z axis, mm3 (Pappus, exact for straight sides)."""
    return enclosed_volume(boundary_segments(shape))


def enclosed_volume(sides: tuple[Floats, Floats]) -> float:
    """The same from the sides of a shape, their inside on their left, by Green's theorem."""
    (z_begin, r_begin), (z_end, r_end) = sides[0].T, sides[1].T
    return math.pi / 3.0 * float(np.dot(z_begin - z_end, r_begin * r_begin + r_begin * r_end + r_end * r_end))


def boundary_segments(stock: BaseGeometry) -> tuple[Floats, Floats]:
    """Starts and ends (n, 2) of all sides of the stock, its inside on their left."""
    rings = [
        _turned(shapely.get_coordinates(ring), outer=number == 0)
        for part in polygons(stock)
        for number, ring in enumerate((part.exterior, *part.interiors))
    ] or [np.empty((0, 2))]
    if len(rings) == 1:
        return rings[0][:-1], rings[0][1:]
    return np.concatenate([ring[:-1] for ring in rings]), np.concatenate([ring[1:] for ring in rings])


def _turned(ring: Floats, *, outer: bool) -> Floats:
    """An outer ring counter-clockwise, a hole clockwise."""
    z, r = ring.T
    counter_clockwise = np.dot(z[:-1], r[1:]) > np.dot(z[1:], r[:-1])
    return ring if counter_clockwise == outer else ring[::-1]


def split_loose(stock: BaseGeometry) -> tuple[BaseGeometry, list[Polygon]]:
    """The piece that is still held (the one reaching furthest towards the chuck) and the pieces cut off."""
    parts = polygons(stock)
    if len(parts) < 2:
        return stock, []
    held = min(parts, key=lambda part: part.bounds[0])
    return held, [part for part in parts if part is not held]
