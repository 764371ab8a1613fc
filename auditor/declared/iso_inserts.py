"""Reads insert codes: ISO 1832 (metric) and its inch form, ANSI B212.4.

One short code says more about a cut than a page of a tool list, and setters know it by heart;
so the job file asks for the code and this module says what it means in millimetres and degrees.
The letter and digit tables are those of ISO 1832 as commonly reprinted, written from memory
unless a test names a copy they were confirmed in.
"""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from typing import Literal

Hand = Literal["right", "left", "neutral"]

INCH = 25.4  # mm

INCLUDED_ANGLE: dict[str, float | None] = {
    "A": 85.0, "B": 82.0, "C": 80.0, "D": 55.0, "E": 75.0, "H": 120.0, "K": 55.0, "L": 90.0, "M": 86.0,
    "O": 135.0, "P": 108.0, "R": None, "S": 90.0, "T": 60.0, "V": 35.0, "W": 80.0,
}  # fmt: skip
CLEARANCE_ANGLE: dict[str, float | None] = {
    "N": 0.0, "A": 3.0, "B": 5.0, "C": 7.0, "P": 11.0, "D": 15.0, "E": 20.0, "F": 25.0, "G": 30.0, "O": None,
}  # fmt: skip
TOLERANCE_LETTERS = "ACEFGHJKLMNU"
HANDS: dict[str, Hand] = {"R": "right", "L": "left", "N": "neutral"}
EDGE_CONDITIONS = {
    "F": "sharp",
    "E": "honed",
    "T": "chamfered",
    "S": "chamfered and honed",
    "K": "double chamfered",
    "P": "double chamfered and honed",
}


@dataclass(frozen=True, slots=True)
class _Fixing:
    """What the fourth letter says; None where the letter leaves it to the maker."""

    has_hole: bool | None
    breaker: bool | None
    faces: int | None  # rake faces before the clearance is looked at


_FIXINGS = {
    "N": _Fixing(False, False, 2),
    "R": _Fixing(False, True, 1),
    "F": _Fixing(False, True, 2),
    "A": _Fixing(True, False, 2),
    "M": _Fixing(True, True, 1),
    "G": _Fixing(True, True, 2),
    "W": _Fixing(True, False, 1),
    "T": _Fixing(True, True, 1),
    "Q": _Fixing(True, False, 2),
    "U": _Fixing(True, True, 2),
    "B": _Fixing(True, False, 1),
    "H": _Fixing(True, True, 1),
    "C": _Fixing(True, False, 2),
    "J": _Fixing(True, True, 2),
    "X": _Fixing(None, None, None),
}
# Inch only, for inscribed circles under 1/4 in, counted in 1/32 in instead of 1/8 and 1/16 in.
_SMALL_FIXINGS = {"D": _Fixing(True, False, 2), "E": _Fixing(False, False, 2)}

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

_SEPARATORS = " _-\u2013"
_METRIC_BODY = re.compile(r"(\d\d|S\d)[\s_-]*(\d\d|T\d)[\s_-]*(\d\d|M0|[A-Z]{2})", re.ASCII)
_INCH_BODY = re.compile(r"(1[02]|\d(?:\.\d)?)[\s_-]*(\d(?:\.\d)?)[\s_-]*(0?\.\d|\d)?(?![\d.])", re.ASCII)
_EDGE = re.compile(r"([FETSKP])?([RLN])?(\d+)?", re.ASCII)


class CodeError(ValueError):
    """An insert or holder code that cannot be read: which position, what stands there, what is wanted."""

    def __init__(self, code: str, position: str, found: str, wanted: str) -> None:
        self.code = code
        self.position = position
        self.found = found
        self.wanted = wanted
        super().__init__(f"{code!r}, {position}: found {found or 'nothing'}, wanted {wanted}")


class InsertCodeError(CodeError):
    """A code that is not ISO 1832 or ANSI B212.4."""


@dataclass(frozen=True, slots=True)
class Insert:
    """What an insert code says. Lengths mm, angles degrees; None: the code leaves it open."""

    code: str
    form: Literal["metric", "inch"]
    shape: str
    included_angle: float | None  # None: round
    clearance_angle: float | None  # None: letter O, special
    tolerance: str
    fixing: str
    has_hole: bool | None  # None: letter X, special
    breaker: bool | None
    faces: int | None  # usable rake faces, 1 or 2
    inscribed_circle: float | None  # None: rectangles and parallelograms
    edge_length: float
    thickness: float
    corner_radius: float | None  # None: facet letters of a milling insert
    edge_condition: str | None = None
    hand: Hand | None = None
    chamfer_width: float | None = None
    chamfer_angle: float | None = None
    maker_code: str | None = None
    notes: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class _Size:
    """Positions 5 to 7 in millimetres."""

    inscribed_circle: float | None
    edge_length: float
    thickness: float
    corner_radius: float | None
    notes: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class _Edge:
    """Positions 8 and 9, the chamfer and the maker's own code."""

    condition: str | None = None
    hand: Hand | None = None
    chamfer_width: float | None = None
    chamfer_angle: float | None = None
    maker_code: str | None = None


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


def decode_insert(code: str) -> Insert:
    """Read an insert code, with or without blanks, metric or inch.

    Raises
    ------
    InsertCodeError
        With the position, what stands there and what is wanted.

    Example
    -------
    >>> insert = decode_insert("CNMG 120408")
    >>> insert.included_angle, insert.clearance_angle, insert.corner_radius
    (80.0, 0.0, 0.8)
    >>> round(decode_insert("DNMG-431").corner_radius, 3)
    0.397
    """
    text = " ".join(code.upper().split())
    letters, rest = _take_letters(code, text)
    shape, clearance, tolerance, fixing = letters
    metric = len(fixing) == 1 and _METRIC_BODY.match(rest)
    fits = _FIXINGS | ({} if metric else _SMALL_FIXINGS)
    if fixing and fixing not in fits:
        raise InsertCodeError(code, "letter 4 (fixing and chip-breaker)", fixing, "one of " + " ".join(sorted(fits)))
    body = metric or _INCH_BODY.match(rest)
    if not body:
        raise InsertCodeError(code, "positions 5 to 7 (size)", rest, "six digits such as 120408, or inch such as 432")
    if metric:
        size = _metric_size(code, shape, body[1], body[2], body[3])
    else:
        size = _inch_size(code, shape, fixing, body[1], body[2], body[3])
    edge = _read_edge(code, rest[body.end() :], inch=not metric)
    kind = fits[fixing or "N"]
    clearance_angle = CLEARANCE_ANGLE[clearance]
    faces = 1 if kind.faces == 2 and clearance_angle else kind.faces  # clearance leaves a single cutting face
    return Insert(
        code=code.strip(),
        form="metric" if metric else "inch",
        shape=shape,
        included_angle=INCLUDED_ANGLE[shape],
        clearance_angle=clearance_angle,
        tolerance=tolerance,
        fixing=fixing or "N",
        has_hole=kind.has_hole,
        breaker=kind.breaker,
        faces=faces,
        inscribed_circle=size.inscribed_circle,
        edge_length=size.edge_length,
        thickness=size.thickness,
        corner_radius=size.corner_radius,
        edge_condition=edge.condition,
        hand=edge.hand,
        chamfer_width=edge.chamfer_width,
        chamfer_angle=edge.chamfer_angle,
        maker_code=edge.maker_code,
        notes=size.notes,
    )


def _take_letters(code: str, text: str) -> tuple[tuple[str, str, str, str], str]:
    """The four letters and what follows; the fourth is "" in the old three-letter inch form."""
    wanted = (
        ("letter 1 (shape)", "".join(sorted(INCLUDED_ANGLE))),
        ("letter 2 (clearance)", "".join(CLEARANCE_ANGLE)),
        ("letter 3 (tolerance)", TOLERANCE_LETTERS),
    )
    found = []
    for position, allowed in wanted:
        text = text.lstrip(_SEPARATORS)
        if not text or text[0] not in allowed:
            raise InsertCodeError(code, position, text[:1], "one of " + " ".join(allowed))
        found.append(text[0])
        text = text[1:]
    text = text.lstrip(_SEPARATORS)
    fixing = text[0] if text[:1].isalpha() else ""
    rest = text[len(fixing) :].lstrip(_SEPARATORS)
    return (found[0], found[1], found[2], fixing), rest


def _metric_size(code: str, shape: str, size: str, thickness: str, corner: str) -> _Size:
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
        return _Size(None, float(size), height, radius, tuple(notes))
    circle = _circle_from_edge(code, shape, size)
    return _Size(circle, edge_length(shape, circle), height, radius, tuple(notes))


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


def _round_size(code: str, size: str, thickness: float, corner: str) -> _Size:
    """Round inserts: M0 marks a diameter in whole millimetres, 00 one of the inch series."""
    series = {"M0": _METRIC_CIRCLES, "00": _INCH_CIRCLES}.get(corner)
    if series is None:
        raise InsertCodeError(code, "position 7 (corner)", corner, "M0 (metric diameter) or 00 (inch diameter)")
    for whole in (math.floor, round):
        for diameter in series:
            if size.isdigit() and whole(diameter) == int(size):
                return _Size(diameter, diameter, thickness, diameter / 2.0)
    sizes = " ".join(f"{math.floor(diameter):02d}" for diameter in series)
    raise InsertCodeError(code, "position 5 (diameter)", size, "one of " + sizes)


def _inch_size(code: str, shape: str, fixing: str, size: str, thickness: str, corner: str | None) -> _Size:
    if shape in "ABKL":
        raise InsertCodeError(code, "position 5 (size)", size, f"the metric code; shape {shape} is not read in inch")
    # 7/8 in is no standard circle, so a plain 7 is the 7/32 in of small boring inserts.
    if fixing in _SMALL_FIXINGS or size == "7":
        circle = _inch(code, "position 5 (size in 1/32 in)", size, {"5": 5.0, "6": 6.0, "7": 7.0}, 32)
        height = _inch(code, "position 6 (thickness in 1/32 in)", thickness, _INCH_THICKNESS, 32)
        notes: tuple[str, ...] = ("size and thickness read in 1/32 in, the rule under 1/4 in",)
    else:
        circle = _inch(code, "position 5 (size in 1/8 in; metric codes have six digits)", size, _INCH_SIZES, 8)
        height = _inch(code, "position 6 (thickness in 1/16 in)", thickness, _INCH_THICKNESS, 16)
        notes = ()
    if shape == "R":
        return _Size(circle, circle, height, circle / 2.0, notes)
    digits = (corner or "").removeprefix("0") or (corner or "")
    radius = _inch(code, "position 7 (corner in 1/64 in)", digits, _INCH_CORNERS, 64)
    return _Size(circle, edge_length(shape, circle), height, radius, notes)


def _inch(code: str, position: str, found: str, table: dict[str, float], parts: int) -> float:
    """Millimetres from a code digit that counts parts of an inch."""
    if found not in table:
        raise InsertCodeError(code, position, found, "one of " + " ".join(table))
    return round(table[found] * INCH / parts, 6)


def _read_edge(code: str, tail: str, inch: bool) -> _Edge:
    """Positions 8 and 9 where they read as the standard's letters; anything else is the maker's code.

    Makers put their chip-breaker names after a dash, and many of those names are made of the
    same letters; so only a group not set off by a dash, or one with chamfer digits, is read.
    """
    if tail[:1].isdigit():
        raise InsertCodeError(code, "after position 7", tail, "a letter or a blank: the corner has two digits")
    joined = tail.lstrip().rstrip(_SEPARATORS)
    group, _, after = joined.lstrip(_SEPARATORS).partition(" ")
    if "-" in group:
        group, _, left = group.partition("-")
        after = f"{left} {after}".strip()
    read = _EDGE.fullmatch(group)
    if not read or not group:
        return _Edge(maker_code=joined.lstrip(_SEPARATORS) or None)
    letter, hand, digits = read[1], read[2], read[3]
    if letter in ("T", "S", "K", "P") and not digits and not hand and re.match(r"\d{4,5}\b", after):
        digits, _, after = after.partition(" ")
    dashed = joined[:1] in "-\u2013"
    doubtful = letter in ("K", "P") and hand is not None  # common names of chip-breakers
    if not digits and (dashed or doubtful):
        return _Edge(maker_code=joined.lstrip(_SEPARATORS))
    width, angle = _chamfer(code, letter, digits, inch)
    if digits and width is None:
        after = f"{digits} {after}".strip()
    return _Edge(EDGE_CONDITIONS.get(letter or ""), HANDS.get(hand or ""), width, angle, after or None)


def _chamfer(code: str, letter: str | None, digits: str | None, inch: bool) -> tuple[float | None, float | None]:
    """Chamfer width (mm) and angle (deg) from the digits after T, S, K or P."""
    if not digits or letter not in ("T", "S", "K", "P"):
        return None, None
    expected = 4 if inch else 5
    if len(digits) != expected:
        example = "0820 (0.008 in at 20 deg)" if inch else "02020 (0.20 mm at 20 deg)"
        raise InsertCodeError(code, "chamfer", digits, f"{expected} digits such as {example}")
    unit = INCH / 1000.0 if inch else 0.01
    return int(digits[:-2]) * unit, float(digits[-2:])
