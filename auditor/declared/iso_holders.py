"""Reads holder codes: ISO 5608 (external) and ISO 6261 (boring bars).

The code fixes how the insert stands to the work: the cutting edge angle, the hand and the shank.
Letter tables as commonly reprinted, from memory; styles M, P, Q and Y are the less certain ones.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import Literal

from auditor.declared.iso_codes import CLEARANCE_ANGLE, HANDS, INCLUDED_ANGLE, CodeError, Hand

BarMaterial = Literal["steel", "heavy metal", "carbide"]

CLAMPS = {
    "C": "top clamp",
    "D": "top clamp and hole, rigid",
    "M": "top clamp and hole",
    "P": "hole, lever or pin",
    "S": "screw",
    "W": "wedge",
}
CUTTING_EDGE_ANGLE: dict[str, float | None] = {
    "A": 90.0, "B": 75.0, "C": 90.0, "D": 45.0, "E": 60.0, "F": 90.0, "G": 90.0, "H": 107.5, "J": 93.0, "K": 75.0,
    "L": 95.0, "M": 50.0, "N": 62.5, "P": 117.5, "Q": 107.5, "R": 75.0, "S": 45.0, "T": 60.0, "U": 93.0, "V": 72.5,
    "W": 60.0, "X": None, "Y": 85.0, "Z": None,
}  # fmt: skip
END_STYLES = "CFKUWY"  # the feed runs along the shank
LENGTHS: dict[str, float | None] = {
    "A": 32.0, "B": 40.0, "C": 50.0, "D": 60.0, "E": 70.0, "F": 80.0, "G": 90.0, "H": 100.0, "J": 110.0, "K": 125.0,
    "L": 140.0, "M": 150.0, "N": 160.0, "P": 170.0, "Q": 180.0, "R": 200.0, "S": 250.0, "T": 300.0, "U": 350.0,
    "V": 400.0, "W": 450.0, "X": None, "Y": 500.0,
}  # fmt: skip


@dataclass(frozen=True, slots=True)
class _Bar:
    """What the first letter of a boring bar says."""

    material: BarMaterial
    damped: bool
    coolant: bool


_BARS = {
    "S": _Bar("steel", damped=False, coolant=False),
    "A": _Bar("steel", damped=False, coolant=True),
    "B": _Bar("steel", damped=True, coolant=False),
    "D": _Bar("steel", damped=True, coolant=True),
    "C": _Bar("carbide", damped=False, coolant=False),
    "E": _Bar("carbide", damped=False, coolant=True),
    "F": _Bar("carbide", damped=True, coolant=False),
    "G": _Bar("carbide", damped=True, coolant=True),
    "H": _Bar("heavy metal", damped=False, coolant=False),
    "J": _Bar("heavy metal", damped=False, coolant=True),
}

_GAP = r"[\s_\-\u2013]*"
_BAR_START = re.compile(rf"([A-Z]){_GAP}(\d+){_GAP}([A-Z]?){_GAP}(?=[A-Z]{{5}})", re.ASCII)
_SHANK = re.compile(rf"(\d\d){_GAP}(\d\d)(?!\d){_GAP}([A-Z](?![A-Z]))?{_GAP}(\d\d)?(?!\d)", re.ASCII)
_INSERT_SIZE = re.compile(r"(\d\d)?(?!\d)", re.ASCII)


class HolderCodeError(CodeError):
    """A code that is neither ISO 5608 nor ISO 6261."""


@dataclass(frozen=True, slots=True)
class Holder:
    """What a holder code says. Lengths mm, angles degrees; None: the code leaves it open."""

    code: str
    kind: Literal["external", "bar"]
    clamp: str
    insert_shape: str
    style: str
    cutting_edge_angle: float | None  # None: styles X and Z
    end_style: bool  # True: the angle is measured from the X feed
    clearance: str
    clearance_angle: float | None
    hand: Hand
    shank_height: float | None = None
    shank_width: float | None = None
    bar_diameter: float | None = None
    length: float | None = None
    bar_material: BarMaterial = "steel"
    damped: bool = False
    coolant: bool = False
    insert_size: str | None = None  # digits of ISO 1832 position 5
    maker_code: str | None = None
    notes: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class _Head:
    """The five letters both standards share."""

    clamp: str
    shape: str
    style: str
    clearance: str
    hand: str


def decode_holder(code: str) -> Holder:
    """Read a holder code, with or without blanks and dashes.

    Raises
    ------
    HolderCodeError
        With the position, what stands there and what is wanted.

    Example
    -------
    >>> holder = decode_holder("PCLNR 2525 M12")
    >>> holder.cutting_edge_angle, holder.hand, holder.shank_height, holder.length
    (95.0, 'right', 25.0, 150.0)
    >>> bar = decode_holder("C12M-SDUCR 07")
    >>> bar.bar_material, bar.bar_diameter, bar.cutting_edge_angle
    ('carbide', 12.0, 93.0)
    """
    text = " ".join(code.upper().split())
    start = _BAR_START.match(text)
    return _read_bar(code, text, start) if start else _read_external(code, text)


def _read_external(code: str, text: str) -> Holder:
    head, rest = _take_head(code, text)
    shank = _SHANK.match(rest)
    if not shank:
        raise HolderCodeError(code, "shank", rest, "height and width as four digits such as 2525")
    height, width = float(shank[1]), float(shank[2])
    if height == 0.0 or width == 0.0:
        raise HolderCodeError(code, "shank", shank[1] + shank[2], "height and width above zero")
    angle, notes = _edge_angle(head)
    return Holder(
        code=code.strip(),
        kind="external",
        clamp=head.clamp,
        insert_shape=head.shape,
        style=head.style,
        cutting_edge_angle=angle,
        end_style=head.style in END_STYLES,
        clearance=head.clearance,
        clearance_angle=CLEARANCE_ANGLE[head.clearance],
        hand=HANDS[head.hand],
        shank_height=height,
        shank_width=width,
        length=_length(code, shank[3]),
        insert_size=shank[4],
        maker_code=_maker_code(rest[shank.end() :]),
        notes=notes,
    )


def _read_bar(code: str, text: str, start: re.Match[str]) -> Holder:
    letter, diameter, length = start[1], start[2], start[3]
    if letter not in _BARS:
        raise HolderCodeError(code, "letter 1 (bar)", letter, "one of " + " ".join(_BARS))
    if len(diameter) != 2 or diameter == "00":
        raise HolderCodeError(code, "bar diameter", diameter, "two digits, mm")
    head, rest = _take_head(code, text[start.end() :])
    size = _INSERT_SIZE.match(rest)
    if not size:
        raise HolderCodeError(code, "insert size", rest, "two digits such as 09")
    bar = _BARS[letter]
    angle, notes = _edge_angle(head)
    return Holder(
        code=code.strip(),
        kind="bar",
        clamp=head.clamp,
        insert_shape=head.shape,
        style=head.style,
        cutting_edge_angle=angle,
        end_style=False,  # the bar lies along Z, so the end styles too are measured from the Z feed
        clearance=head.clearance,
        clearance_angle=CLEARANCE_ANGLE[head.clearance],
        hand=HANDS[head.hand],
        bar_diameter=float(diameter),
        length=_length(code, length),
        bar_material=bar.material,
        damped=bar.damped,
        coolant=bar.coolant,
        insert_size=size[1],
        maker_code=_maker_code(rest[size.end() :]),
        notes=notes,
    )


def _take_head(code: str, text: str) -> tuple[_Head, str]:
    wanted = (
        ("clamping letter", CLAMPS),
        ("insert shape letter", INCLUDED_ANGLE),
        ("style letter", CUTTING_EDGE_ANGLE),
        ("clearance letter", CLEARANCE_ANGLE),
        ("hand letter", HANDS),
    )
    found = []
    for position, allowed in wanted:
        text = re.sub(_GAP, "", text, count=1)
        if not text or text[0] not in allowed:
            raise HolderCodeError(code, position, text[:1], "one of " + " ".join(sorted(allowed)))
        found.append(text[0])
        text = text[1:]
    clamp, shape, style, clearance, hand = found
    return _Head(clamp, shape, style, clearance, hand), re.sub(_GAP, "", text, count=1)


def _edge_angle(head: _Head) -> tuple[float | None, tuple[str, ...]]:
    angle = CUTTING_EDGE_ANGLE[head.style]
    if angle is None:
        return None, (f"style {head.style} fixes no cutting edge angle: give cutting_edge_angle outright",)
    if head.style == "P" and head.hand == "N":
        # A neutral holder shows both edges alike; the letter counts the angle from the other side.
        return 180.0 - angle, ("neutral style P: 62.5 deg to either side",)
    if head.style in "MPQY":
        return angle, (f"style {head.style}: {angle:g} deg is less certain, look at the holder's drawing",)
    return angle, ()


def _length(code: str, letter: str | None) -> float | None:
    if not letter:
        return None
    if letter not in LENGTHS:
        raise HolderCodeError(code, "length letter", letter, "one of " + " ".join(LENGTHS))
    return LENGTHS[letter]


def _maker_code(tail: str) -> str | None:
    return tail.strip(" _-\u2013") or None
