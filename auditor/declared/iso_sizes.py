"""Positions 5 to 7 of an insert code, edge length, thickness and corner, in millimetres."""

from __future__ import annotations

import math
from dataclasses import dataclass

from auditor.declared.iso_codes import INCLUDED_ANGLE, InsertCodeError

INCH = 25.4  # mm

_RHOMBIC = "CDEMV"
_CORNERS = {"H": 6, "O": 8, "P": 5, "S": 4, "T": 3}
_TRIGON_EDGE = 0.6840  # edge / inscribed circle of the 80 deg trigon
_INCH_CIRCLES = (3.96875, 4.7625, 5.55625, 6.35, 7.9375, 9.525, 12.7, 15.875, 19.05, 25.4, 31.75)
_METRIC_CIRCLES = (5.0, 6.0, 8.0, 10.0, 12.0, 16.0, 20.0, 25.0, 32.0)
# Two inscribed circles share a digit here; the standard marks the smaller with an S.
_SMALL_SIZES = {("C", "S4"): 3.96875, ("W", "S3"): 4.7625}
_THICKNESS = {
    "01": 1.59, "T0": 1.79, "T1": 1.98, "02": 2.38, "T2": 2.78, "03": 3.18, "T3": 3.97, "04": 4.76, "T4": 4.96,
    "05": 5.56, "T5": 5.95, "06": 6.35, "T6": 6.75, "07": 7.94, "09": 9.52, "T9": 9.72, "11": 11.11, "12": 12.70,
}  # fmt: skip
_INCH_SIZES = {
    "1.2": 1.25, "1.5": 1.5, "1.8": 1.75, "2": 2.0, "2.5": 2.5, "3": 3.0, "4": 4.0, "5": 5.0, "6": 6.0,
    "8": 8.0, "10": 10.0, "12": 12.0,
}  # 1/8 in, rounded in the code  # fmt: skip
_INCH_THICKNESS = {
    "1": 1.0, "1.2": 1.25, "1.5": 1.5, "1.8": 1.75, "2": 2.0, "2.5": 2.5, "3": 3.0, "3.5": 3.5, "4": 4.0,
    "5": 5.0, "6": 6.0, "7": 7.0, "8": 8.0,
}  # 1/16 in  # fmt: skip
_INCH_CORNERS = {"0": 0.0, ".2": 0.256, ".5": 0.5, **{str(n): float(n) for n in range(1, 9)}}  # 1/64 in; .2 = 0.004 in


@dataclass(frozen=True, slots=True)
class Size:
    """Positions 5 to 7 in millimetres."""

    inscribed_circle: float | None
    edge_length: float
    thickness: float
    corner_radius: float | None
    notes: tuple[str, ...] = ()


def edge_length(shape: str, inscribed_circle: float) -> float:
    """Length of the cutting edge of an equilateral insert from its inscribed circle, mm.

    Rhombus: d / sin(corner angle). Regular polygon of n corners: d tan(180/n). Round: d.

    >>> round(edge_length("C", 12.7), 2)
    12.9
    >>> round(edge_length("T", 9.525), 2)
    16.5
    """
    if shape == "R":
        return inscribed_circle
    if shape == "W":
        return _TRIGON_EDGE * inscribed_circle
    if shape in _CORNERS:
        return inscribed_circle * math.tan(math.pi / _CORNERS[shape])
    angle = INCLUDED_ANGLE[shape]
    if shape not in _RHOMBIC or angle is None:
        raise ValueError(f"shape {shape}: the edge does not follow from an inscribed circle")
    return inscribed_circle / math.sin(math.radians(angle))


def metric_size(code: str, shape: str, size: str, thickness: str, corner: str) -> Size:
    """Size from the metric digits, such as 12, 04 and 08.

    Raises
    ------
    InsertCodeError
        Digits that the standard does not have for this shape.
    """
    if thickness not in _THICKNESS:
        raise InsertCodeError(code, "position 6 (thickness)", thickness, "one of " + " ".join(_THICKNESS))
    height = _THICKNESS[thickness]
    if shape == "R":
        return _round_size(code, size, height, corner)
    notes = []
    if corner.isdigit():
        radius: float | None = int(corner) / 10.0
    elif corner == "M0":
        raise InsertCodeError(code, "position 7 (corner radius)", corner, "two digits; M0 belongs to round inserts")
    else:
        radius = None
        notes.append(f"corner {corner}: facet letters of a milling insert; give the nose radius outright")
    if shape in "ABKL":
        notes.append(f"edge length {int(size)} mm is the whole number of the code")
        if not size.isdigit() or size == "00":
            raise InsertCodeError(code, "position 5 (edge length)", size, "two digits")
        return Size(None, float(size), height, radius, tuple(notes))
    circle = _circle_from_edge(code, shape, size)
    return Size(circle, edge_length(shape, circle), height, radius, tuple(notes))


def _circle_from_edge(code: str, shape: str, size: str) -> float:
    """The standard inscribed circle whose edge, cut off or rounded to whole mm, gives the digits."""
    small = _SMALL_SIZES.get((shape, size))
    if small is not None:
        return small
    edges = {circle: edge_length(shape, circle) for circle in reversed(_INCH_CIRCLES)}
    for whole in (math.floor, round):
        for circle, edge in edges.items():
            if size.isdigit() and whole(edge) == int(size):
                return circle
    sizes = sorted({f"{math.floor(edge):02d}" for edge in edges.values()})
    raise InsertCodeError(code, "position 5 (edge length)", size, f"for shape {shape} one of " + " ".join(sizes))


def _round_size(code: str, size: str, thickness: float, corner: str) -> Size:
    """Round inserts: M0 marks a diameter in whole millimetres, 00 one of the inch series."""
    series = {"M0": _METRIC_CIRCLES, "00": _INCH_CIRCLES}.get(corner)
    if series is None:
        raise InsertCodeError(code, "position 7 (corner)", corner, "M0 (metric diameter) or 00 (inch diameter)")
    for whole in (math.floor, round):
        for diameter in series:
            if size.isdigit() and whole(diameter) == int(size):
                return Size(diameter, diameter, thickness, diameter / 2.0)
    sizes = " ".join(f"{math.floor(diameter):02d}" for diameter in series)
    raise InsertCodeError(code, "position 5 (diameter)", size, "one of " + sizes)


def inch_size(code: str, shape: str, size: str, thickness: str, corner: str | None, in_32nds: bool) -> Size:
    """Size from the inch digits, such as 4, 3 and 2; ``in_32nds``: a letter said that the circle is under 1/4 in.

    Raises
    ------
    InsertCodeError
        Digits that the standard does not have, or a shape whose inch size has another form.
    """
    if shape in "ABKL":
        raise InsertCodeError(code, "position 5 (size)", size, f"the metric code; shape {shape} is not read in inch")
    # 7/8 in is no standard circle, so a plain 7 is the 7/32 in of small boring inserts.
    if in_32nds or size == "7":
        circle = _inch(code, "position 5 (size in 1/32 in)", size, {"5": 5.0, "6": 6.0, "7": 7.0}, 32)
        height = _inch(code, "position 6 (thickness in 1/32 in)", thickness, _INCH_THICKNESS, 32)
        notes: tuple[str, ...] = ("size and thickness read in 1/32 in, the rule under 1/4 in",)
    else:
        circle = _inch(code, "position 5 (size in 1/8 in; metric codes have six digits)", size, _INCH_SIZES, 8)
        height = _inch(code, "position 6 (thickness in 1/16 in)", thickness, _INCH_THICKNESS, 16)
        notes = ()
    if shape == "R":
        return Size(circle, circle, height, circle / 2.0, notes)
    digits = (corner or "").removeprefix("0") or (corner or "")
    radius = _inch(code, "position 7 (corner in 1/64 in)", digits, _INCH_CORNERS, 64)
    return Size(circle, edge_length(shape, circle), height, radius, notes)


def _inch(code: str, position: str, found: str, table: dict[str, float], parts: int) -> float:
    """Millimetres from a code digit that counts parts of an inch."""
    if found not in table:
        raise InsertCodeError(code, position, found, "one of " + " ".join(table))
    return round(table[found] * INCH / parts, 6)
