"""A tool's edge in section, to its real angles: how it stands, where the chip goes, how much clearance is left.

The section lies at right angles to the edge. The insert lies flat with its face on top; the work comes down from
above, the machined surface is on the left, the chip leaves to the right.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from markupsafe import Markup

from auditor.declared.model import Tool
from auditor.findings import Run
from auditor.mechanics.clearance import normal_clearance, orthogonal_clearance
from auditor.mechanics.shear import merchant_shear_angle
from auditor.reports.html.svg import Drawing, Point

WIDTH, HEIGHT = 400.0, 300.0  # px
_EDGE = (150.0, 158.0)  # px, where the edge is
_CONTACT = 0.7  # chip thicknesses that the chip stays on the face; drawn as usual
_GROOVE = 1.5  # chip thicknesses from the land to the wall behind it, at least; not declared, drawn as usual
_CONSTANT = 70.0  # deg, of Merchant's equation; steels 65 to 76
_FLATTEST_SHEAR = 8.0  # deg, below which the picture would run out of the frame


@dataclass(frozen=True, slots=True)
class Situation:
    """The edge as it works in the heaviest cut of its tool; None for what no cut tells."""

    rake: float  # deg, effective
    thickness: float | None  # mm, mean uncut chip thickness
    shear: float | None  # deg
    friction: float  # deg
    clearance: float  # deg, nominal, orthogonal


def situation(run: Run, tool: Tool) -> Situation:
    """What the heaviest cut of a tool says about its edge."""
    loads = run.prediction.loads
    normal = normal_clearance(tool.insert_clearance, tool.pocket_rake)
    clearance = float(orthogonal_clearance(normal, tool.pocket_inclination)) if normal > 0.0 else float(normal)
    friction = run.job.workpiece.material.friction_angle
    mine = np.array([move.tool == tool.number for move in run.path.moves], dtype=bool)[loads.move]
    rows = np.flatnonzero(mine & (loads.chip_mean > 0.0) & np.isfinite(loads.rake))
    if not rows.size:
        return Situation(tool.pocket_rake + tool.face_rake, None, None, friction, clearance)
    weight = np.nan_to_num(loads.cutting[rows])
    row = int(rows[int(np.argmax(weight))])
    rake = float(loads.rake[row])
    shear = max(_FLATTEST_SHEAR, float(merchant_shear_angle(friction, rake, _CONSTANT)))
    return Situation(rake, float(loads.chip_mean[row]), shear, friction, clearance)


def draw(run: Run, tool: Tool, key: str) -> Markup:
    """The picture of one tool."""
    if tool.kind == "drilling":
        return _drill(tool, key)
    found = situation(run, tool)
    drawing = Drawing(f"{key}r{tool.number}", WIDTH, HEIGHT, f"Edge of T{tool.number} in section", said(tool, found))
    plane = _Plane(_scale(tool, found))
    drawing.add("rect", x=0, y=0, width=WIDTH, height=HEIGHT, class_="field")
    _work(drawing, plane, found)
    _chip(drawing, plane, found)
    _insert(drawing, plane, tool, found)
    _angles(drawing, tool, found)
    _bar(drawing, plane)
    return drawing.svg("rake")


@dataclass(frozen=True, slots=True)
class _Plane:
    """Millimetres from the edge to places in the picture."""

    scale: float

    def at(self, x: float, y: float) -> Point:
        return _EDGE[0] + x * self.scale, _EDGE[1] - y * self.scale

    def far(self, angle: float, length: float, start: Point = (0.0, 0.0)) -> tuple[float, float]:
        """A point ``length`` px from another, in mm; the angle falls to the right from level."""
        return (start[0] + length / self.scale * math.cos(math.radians(angle)),
                start[1] - length / self.scale * math.sin(math.radians(angle)))


def _scale(tool: Tool, found: Situation) -> float:
    """Pixels per millimetre at which land, edge rounding and chip can all be seen."""
    shown = max(3.2 * (found.thickness or 0.1), 1.3 * tool.land_width, 8.0 * tool.edge_radius, 0.15)
    return 110.0 / shown


def _work(drawing: Drawing, plane: _Plane, found: Situation) -> None:
    """The work on the left, with the layer that is about to become the chip."""
    left, right = -_EDGE[0] / plane.scale, found.thickness or 0.0
    top, foot = _EDGE[1] / plane.scale, (_EDGE[1] - HEIGHT) / plane.scale
    shear_top = 0.0 if found.shear is None else right / math.tan(math.radians(found.shear))
    outline = [(left, foot), (0.0, foot), (0.0, 0.0), (right, shear_top), (right, top), (left, top)]
    drawing.path((plane.at(x, y) for x, y in outline), "work", closed=True)
    x, _ = plane.at(0.35 * left, 0.0)
    drawing.path([(x, 34.0), (x, 74.0)], "flow")
    drawing.path([(x - 4, 67.0), (x, 75.0), (x + 4, 67.0)], "flow")
    drawing.text(x, 26.0, "work", "hint", text_anchor="middle")


def _chip(drawing: Drawing, plane: _Plane, found: Situation) -> None:
    """From the shear plane along the effective rake, then curling away."""
    if found.thickness is None or found.shear is None:
        return
    shear, rake = math.radians(found.shear), math.radians(found.rake)
    top = (found.thickness, found.thickness / math.tan(shear))
    thick = found.thickness * math.cos(shear - rake) / math.sin(shear)
    contact = _CONTACT * thick * plane.scale
    under, over = plane.far(found.rake, contact), plane.far(found.rake, contact, top)
    start, inner = plane.at(*under), plane.at(*over)
    radius = 2.2 * thick * plane.scale
    drawing.path([plane.at(0.0, 0.0), plane.at(*top)], "shear")
    turn = math.radians(75.0)
    far_end = _turned(start, rake, radius, turn)
    near_end = _turned(inner, rake, radius - thick * plane.scale, turn)
    data = (
        f"M{_told(plane.at(0.0, 0.0))}L{_told(start)}A{radius:.1f} {radius:.1f} 0 0 0 {_told(far_end)}"
        f"L{_told(near_end)}A{radius - thick * plane.scale:.1f} {radius - thick * plane.scale:.1f} 0 0 1 "
        f"{_told(inner)}L{_told(plane.at(*top))}z"
    )
    drawing.add("path", d=data, class_="chip")


def _turned(start: Point, rake: float, radius: float, turn: float) -> Point:
    """Where an arc ends that leaves along the face and curls upwards."""
    heading = rake  # falling to the right, in picture coordinates
    centre = (start[0] + radius * math.sin(heading), start[1] - radius * math.cos(heading))
    angle = math.pi / 2.0 + heading - turn
    return centre[0] + radius * math.cos(angle), centre[1] + radius * math.sin(angle)


def _told(point: Point) -> str:
    return f"{point[0]:.1f} {point[1]:.1f}"


def _insert(drawing: Drawing, plane: _Plane, tool: Tool, found: Situation) -> None:
    """Land, chip-breaker face, the wall behind it (drawn as usual), flank, and the rounded edge."""
    land, face = tool.pocket_rake + tool.land_rake, tool.pocket_rake + tool.face_rake
    outline: list[Point] = []
    corner = (0.0, 0.0)
    if tool.land_width > 0.0:
        corner = plane.far(land, tool.land_width * plane.scale)
        outline.append(corner)
    first = land if tool.land_width > 0.0 else face
    if tool.face_rake != 0.0:
        width = _groove(found, plane)
        groove = plane.far(face, width, corner)
        level = plane.far(tool.pocket_rake, 1.4 * width, corner)
        outline += [groove, level, plane.far(tool.pocket_rake, WIDTH)]
    else:
        outline.append(plane.far(tool.pocket_rake, WIDTH))
    flank = plane.far(90.0 - found.clearance, HEIGHT)
    behind = (outline[-1][0], flank[1])
    rounding = _rounding(tool.edge_radius, first, found.clearance)
    start, end = plane.far(first, rounding * plane.scale), plane.far(90.0 - found.clearance, rounding * plane.scale)
    radius = tool.edge_radius * plane.scale
    data = f"M{_told(plane.at(*end))}A{radius:.1f} {radius:.1f} 0 0 1 {_told(plane.at(*start))}" + "".join(
        f"L{_told(plane.at(*point))}" for point in [*outline, behind, flank]
    )
    drawing.add("path", d=f"{data}z", class_="insert")
    drawing.path([plane.at(0.0, 0.0), plane.at(*plane.far(tool.pocket_rake, WIDTH))], "seat")
    if found.clearance <= 0.0:
        drawing.path([plane.at(0.0, 0.0), plane.at(*plane.far(90.0 - found.clearance, HEIGHT))], "rubbing")


def _groove(found: Situation, plane: _Plane) -> float:
    """Length of the chip-breaker face in the picture, px."""
    if found.thickness is None or found.shear is None:
        return 95.0
    shear = math.radians(found.shear)
    thick = found.thickness * math.cos(shear - math.radians(found.rake)) / math.sin(shear)
    return min(170.0, max(95.0, _GROOVE * thick * plane.scale))


def _rounding(radius: float, face: float, clearance: float) -> float:
    """Distance from the sharp corner to where the rounding begins, for the wedge between face and flank."""
    wedge = math.radians(max(20.0, 90.0 - face - clearance))
    return radius / math.tan(wedge / 2.0)


def _angles(drawing: Drawing, tool: Tool, found: Situation) -> None:
    """Effective rake against the level, clearance against the machined surface, wedge between them."""
    x, y = _EDGE
    drawing.path([(x, y), (WIDTH - 8, y)], "level")
    drawing.path([(x, y), (x, HEIGHT - 6)], "level")
    drawing.path([(x, y), _polar(found.rake, 225.0)], "effective")
    _arc(drawing, 0.0, found.rake, 205.0)
    _arc(drawing, 90.0, 90.0 - found.clearance, 118.0)
    drawing.text(WIDTH - 10, HEIGHT - 30, f"effective rake {found.rake:+.0f}°", "angle", text_anchor="end")
    drawing.text(WIDTH - 10, HEIGHT - 12, f"wedge {90.0 - tool.pocket_rake - tool.face_rake - found.clearance:.0f}°",
                 "angle", text_anchor="end")
    drawing.text(x - 8, HEIGHT - 12, f"clearance {found.clearance:.0f}°", "angle", text_anchor="end")
    if found.shear is not None:
        drawing.text(WIDTH - 10, HEIGHT - 48, f"shear plane {found.shear:.0f}°", "angle", text_anchor="end")


def _polar(angle: float, reach: float) -> Point:
    """A place seen from the edge; the angle falls to the right from level."""
    return _EDGE[0] + reach * math.cos(math.radians(angle)), _EDGE[1] + reach * math.sin(math.radians(angle))


def _arc(drawing: Drawing, start: float, end: float, reach: float) -> None:
    """An arc between two directions from the edge."""
    if abs(end - start) >= 1.0:
        count = max(2, int(abs(end - start)))
        drawing.path((_polar(start + (end - start) * i / count, reach) for i in range(count + 1)), "arc")


def _bar(drawing: Drawing, plane: _Plane) -> None:
    length = next((step for step in (1.0, 0.5, 0.2, 0.1, 0.05) if step * plane.scale <= 80.0), 0.02)
    x, y = 12.0, HEIGHT - 34.0
    drawing.path([(x, y - 4), (x, y), (x + length * plane.scale, y), (x + length * plane.scale, y - 4)], "scale")
    drawing.text(x, y - 8, f"{length:g} mm", "tick-label")


def said(tool: Tool, found: Situation) -> str:
    """The picture in words."""
    text = (
        f"The insert is tilted by {tool.pocket_rake:+.0f} deg in its pocket; land {tool.land_width:g} mm at "
        f"{tool.pocket_rake + tool.land_rake:+.0f} deg, chip-breaker face at {tool.pocket_rake + tool.face_rake:+.0f} "
        f"deg, edge rounded to {1000.0 * tool.edge_radius:.0f} um, clearance {found.clearance:.0f} deg."
    )
    if found.thickness is None or found.shear is None:
        return f"{text} It cuts nothing in this program."
    return (
        f"{text} In its heaviest cut the chip is {found.thickness:.2f} mm thick before the edge and leaves along an "
        f"effective rake of {found.rake:+.0f} deg; the shear plane stands at {found.shear:.0f} deg (Merchant's "
        f"equation, constant {_CONSTANT:.0f}, friction angle {found.friction:.0f} deg)."
    )


def _drill(tool: Tool, key: str) -> Markup:
    """A drill's point, to its real angle."""
    half = math.radians(tool.point_angle) / 2.0
    radius = (tool.diameter or 1.0) / 2.0
    scale = 90.0 / radius
    tip = radius / math.tan(half)
    said_ = f"A drill of {tool.diameter or 0.0:g} mm with a point of {tool.point_angle:g} deg, {tool.flutes} edges."
    drawing = Drawing(f"{key}r{tool.number}", WIDTH, HEIGHT, f"Point of T{tool.number}", said_)
    drawing.add("rect", x=0, y=0, width=WIDTH, height=HEIGHT, class_="field")
    x, y = 70.0, HEIGHT / 2.0
    outline = [(x, y), (x + tip * scale, y - 90.0), (WIDTH, y - 90.0), (WIDTH, y + 90.0), (x + tip * scale, y + 90.0)]
    drawing.path(outline, "insert", closed=True)
    drawing.path([(10.0, y), (WIDTH, y)], "axis")
    drawing.text(WIDTH - 14, 26, f"point angle {tool.point_angle:g}°, diameter {tool.diameter or 0.0:g} mm", "angle",
                 text_anchor="end")
    return drawing.svg("rake")
