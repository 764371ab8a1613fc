"""From millimetres of the half-section to places in a picture."""

from __future__ import annotations

import math
from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray
from shapely.geometry.base import BaseGeometry

from auditor.declared.model import Tool
from auditor.reports.html.svg import Drawing, Point, polyline
from auditor.simulate.tool_outline import tool_outline

Floats = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class Frame:
    """A window of the half-section, to one scale in both directions.

    ``down`` is true for a turret in front of the spindle: X then grows towards the foot of the picture, as the
    setter sees it.
    """

    z_low: float
    z_high: float
    r_low: float
    r_high: float
    scale: float  # px per mm
    left: float = 0.0  # px to the left of the window
    top: float = 0.0
    down: bool = False

    @property
    def width(self) -> float:
        """Of the window, px."""
        return (self.z_high - self.z_low) * self.scale

    @property
    def height(self) -> float:
        """Of the window, px."""
        return (self.r_high - self.r_low) * self.scale

    def x(self, z: float) -> float:
        """Where a length lies."""
        return self.left + (z - self.z_low) * self.scale

    def y(self, r: float) -> float:
        """Where a radius lies."""
        return self.top + ((r - self.r_low) if self.down else (self.r_high - r)) * self.scale

    def points(self, outline: Iterable[tuple[float, float]]) -> list[Point]:
        """Places of points (z, r)."""
        return [(self.x(z), self.y(r)) for z, r in outline]

    def columns(self, z: Floats, r: Floats) -> tuple[Floats, Floats]:
        """Places of many points."""
        rise = (r - self.r_low) if self.down else (self.r_high - r)
        return self.left + (z - self.z_low) * self.scale, self.top + rise * self.scale

    def inside(self, shape: BaseGeometry) -> BaseGeometry:
        """The part of a shape that the window shows."""
        from shapely import clip_by_rect

        return clip_by_rect(shape, self.z_low, self.r_low, self.z_high, self.r_high)

    def tool(self, drawing: Drawing, tool: Tool, at: tuple[float, float]) -> None:
        """A tool's outline with its programmed point at (z, r)."""
        from shapely import Polygon

        self.shape(drawing, Polygon(np.add(tool_outline(tool).hull(), at)), "tool")

    def shape(self, drawing: Drawing, shape: BaseGeometry, style: str, fill: str | None = None) -> None:
        """An area with its holes; ``fill`` names a pattern laid over it."""
        rings = []
        for part in getattr(self.inside(shape), "geoms", [self.inside(shape)]):
            if part.geom_type == "Polygon" and not part.is_empty:
                rings += [part.exterior, *part.interiors]
        if rings:
            data = "".join(polyline(self.points(ring.coords[:-1]), closed=True) for ring in rings)
            drawing.add("path", d=data, class_=style, fill_rule="evenodd")
            if fill is not None:
                drawing.add("path", d=data, class_="hatched", fill_rule="evenodd", fill=f"url(#{fill})")


def steps(low: float, high: float, wanted: int) -> list[float]:
    """Round figures between two bounds, about as many as wanted.

    >>> steps(-130.0, 20.0, 6)
    [-120.0, -100.0, -80.0, -60.0, -40.0, -20.0, 0.0, 20.0]
    """
    if not high > low:
        return [low]
    rough = (high - low) / wanted
    power = 10.0 ** math.floor(math.log10(rough))
    step = next((factor * power for factor in (1.0, 2.0, 5.0) if factor * power >= 0.75 * rough), 10.0 * power)
    first, last = math.ceil(low / step - 1e-9), math.floor(high / step + 1e-9)
    return [round(index * step, 9) + 0.0 for index in range(first, last + 1)]
