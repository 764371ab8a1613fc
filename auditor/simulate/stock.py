"""The remaining stock: an exact polygon of the (z, r) half-section."""

from __future__ import annotations

import math

import numpy as np
import shapely
from shapely.geometry import Polygon
from shapely.geometry.base import BaseGeometry
from shapely.geometry.polygon import orient

from auditor.declared.model import Workpiece
from auditor.simulate.samples import Floats

SLIVER = 1e-7  # mm2 below which a scrap of a boolean operation is numerical dust
SNAP = 1e-9  # mm, grid of the fallback after a failed boolean operation


def raw_stock(workpiece: Workpiece) -> BaseGeometry:
    """The stock before the first move; outer ring counter-clockwise, holes clockwise."""
    return orient(Polygon([(point.z, point.r) for point in workpiece.outline]))


def without(stock: BaseGeometry, sweep: BaseGeometry) -> BaseGeometry:
    """Stock after the area ``sweep`` was cut, oriented, free of numerical dust."""
    try:
        rest = shapely.difference(stock, sweep)
    except shapely.errors.GEOSException:
        rest = shapely.difference(stock, sweep, grid_size=SNAP)
    return _tidy(rest)


def _tidy(shape: BaseGeometry) -> BaseGeometry:
    if shape.geom_type == "Polygon":
        return orient(shape)
    parts = [orient(part) for part in polygons(shape) if part.area > SLIVER]
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
    total = 0.0
    for polygon in polygons(shape):
        total += _ring_volume(polygon.exterior) - sum(abs(_ring_volume(hole)) for hole in polygon.interiors)
    return total


def _ring_volume(ring: BaseGeometry) -> float:
    coords = shapely.get_coordinates(ring)
    z, r = coords[:, 0], coords[:, 1]
    # integral of r over the area, by Green's theorem
    slices = (z[:-1] - z[1:]) * (r[:-1] ** 2 + r[:-1] * r[1:] + r[1:] ** 2)
    return abs(math.pi / 3.0 * float(slices.sum()))


def boundary_segments(stock: BaseGeometry) -> tuple[Floats, Floats]:
    """Starts and ends (n, 2) of all sides of the stock, its inside on their left."""
    rings = [ring for part in polygons(stock) for ring in (part.exterior, *part.interiors)]
    coords = [shapely.get_coordinates(ring) for ring in rings] or [np.empty((0, 2))]
    return np.concatenate([ring[:-1] for ring in coords]), np.concatenate([ring[1:] for ring in coords])


def split_loose(stock: BaseGeometry) -> tuple[BaseGeometry, list[Polygon]]:
    """The piece that is still held (the one reaching furthest towards the chuck) and the pieces cut off."""
    parts = polygons(stock)
    if len(parts) < 2:
        return stock, []
    held = min(parts, key=lambda part: part.bounds[0])
    return held, [part for part in parts if part is not held]
