"""Reads insert codes: ISO 1832 (metric) and its inch form, ANSI B212.4.

One short code says more about a cut than a page of a tool list, and setters know it by heart;
so the job file asks for the code and this module says what it means in millimetres and degrees.
The letter and digit tables are those of ISO 1832 as commonly reprinted, written from memory
unless a test names a copy they were confirmed in.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import Literal

from auditor.declared.iso_codes import CLEARANCE_ANGLE, HANDS, INCLUDED_ANGLE, CodeError, Hand, InsertCodeError
from auditor.declared.iso_sizes import INCH, Size, inch_size, metric_size

__all__ = ["CLEARANCE_ANGLE", "INCLUDED_ANGLE", "CodeError", "Insert", "decode_insert"]

TOLERANCE_LETTERS = "ACEFGHJKLMNU"
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

_SEPARATORS = " _-\u2013"
_METRIC_BODY = re.compile(r"(\d\d|S\d)[\s_-]*(\d\d|T\d)[\s_-]*(\d\d|M0|[A-Z]{2})", re.ASCII)
_INCH_BODY = re.compile(r"(1[02]|\d(?:\.\d)?)[\s_-]*(\d(?:\.\d)?)[\s_-]*(0?\.\d|\d)?(?![\d.])", re.ASCII)
_EDGE = re.compile(r"([FETSKP])?([RLN])?(\d+)?", re.ASCII)


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
class _Edge:
    """Positions 8 and 9, the chamfer and the maker's own code."""

    condition: str | None = None
    hand: Hand | None = None
    chamfer_width: float | None = None
    chamfer_angle: float | None = None
    maker_code: str | None = None


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
    (shape, clearance, tolerance, fixing), rest = _take_letters(code, " ".join(code.upper().split()))
    form, size, tail = _take_size(code, shape, fixing, rest)
    edge = _read_edge(code, tail, inch=form == "inch")
    kind = (_FIXINGS | _SMALL_FIXINGS)[fixing or "N"]
    clearance_angle = CLEARANCE_ANGLE[clearance]
    return Insert(
        code=code.strip(),
        form=form,
        shape=shape,
        included_angle=INCLUDED_ANGLE[shape],
        clearance_angle=clearance_angle,
        tolerance=tolerance,
        fixing=fixing or "N",
        has_hole=kind.has_hole,
        breaker=kind.breaker,
        faces=1 if kind.faces == 2 and clearance_angle else kind.faces,  # clearance leaves a single cutting face
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


def _take_size(code: str, shape: str, fixing: str, rest: str) -> tuple[Literal["metric", "inch"], Size, str]:
    """Positions 5 to 7 in the form they are written in, and what follows them."""
    metric = _METRIC_BODY.match(rest) if fixing else None  # the three-letter form exists in inch alone
    fits = _FIXINGS if metric else _FIXINGS | _SMALL_FIXINGS
    if fixing and fixing not in fits:
        raise InsertCodeError(code, "letter 4 (fixing and chip-breaker)", fixing, "one of " + " ".join(sorted(fits)))
    if metric:
        return "metric", metric_size(code, shape, metric[1], metric[2], metric[3]), rest[metric.end() :]
    inch = _INCH_BODY.match(rest)
    if not inch:
        raise InsertCodeError(code, "positions 5 to 7 (size)", rest, "six digits such as 120408, or inch such as 432")
    size = inch_size(code, shape, inch[1], inch[2], inch[3], in_32nds=fixing in _SMALL_FIXINGS)
    return "inch", size, rest[inch.end() :]


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
