"""Sizes in comments: numbers as shops write them, with what is said to belong to each."""

from __future__ import annotations

import re
import unicodedata
from collections.abc import Iterator
from dataclasses import dataclass
from fractions import Fraction
from typing import Literal

Role = Literal["diameter", "inside", "length", "width", "radius", "angle"]
Unit = Literal["mm", "in"]

_GERMAN = str.maketrans({"Ä": "AE", "Ö": "OE", "Ü": "UE", "ß": "SS", "ẞ": "SS"})
_DIAMETER_SIGNS = re.compile("[ØøΦφ⌀∅]")
_INCH_SIGNS = re.compile("[”“″]|''")

_BEFORE: dict[str, Role] = {
    **dict.fromkeys(
        ("DIA", "DIAM", "DIAMETER", "DIAMETRE", "DIAMETRO", "DM", "RD", "PHI", "OD", "D", "DURCHMESSER", "AUSSEN",
         "ROUND", "ROND", "RUND", "TONDO", "REDONDO", "BAR", "STANGE", "BARRE", "BARRA", "DE"), "diameter"),
    **dict.fromkeys(("ID", "BORE", "INNEN", "DI", "INT"), "inside"),
    **dict.fromkeys(
        ("L", "LG", "LEN", "LENGTH", "LONG", "LAENGE", "LANG", "LONGUEUR", "LUNGHEZZA", "LUNG", "LARGO", "LONGITUD",
         "SAWN TO", "CUT TO", "ABGESAEGT AUF", "SAEGELAENGE", "SCIE A", "TAGLIATO A", "CORTADO A"), "length"),
    **dict.fromkeys(
        ("W", "WIDTH", "WIDE", "B", "BREITE", "BREIT", "LARG", "LARGEUR", "LARGHEZZA", "ANCHO"), "width"),
    **dict.fromkeys(
        ("R", "RAD", "RADIUS", "TNR", "CNR", "NOSE", "NOSE RADIUS", "NOSE R", "ECKENRADIUS", "RAYON", "RAGGIO", "RADIO",
         "RE", "TIP RADIUS", "TIP RAD"), "radius"),
}  # fmt: skip
_AFTER: dict[str, Role] = {
    **dict.fromkeys(("OD", "DIA", "DIAM", "DIAMETER", "ROUND", "RD", "RUND", "DIAMETRE", "DIAMETRO"), "diameter"),
    **dict.fromkeys(("ID", "BORE"), "inside"),
    **dict.fromkeys(("L", "LG", "LONG", "LANG", "LENGTH", "LEN", "DE LONG", "LAENGE"), "length"),
    **dict.fromkeys(("W", "WIDE", "WIDTH", "BREIT", "BREITE", "LARGE", "ANCHO"), "width"),
    **dict.fromkeys(("TNR", "CNR", "RAD", "RADIUS", "R", "NOSE", "NOSE RADIUS", "NOSE RAD", "TIP RADIUS"), "radius"),
    **dict.fromkeys(("*", "°", "DEG", "DEGREE", "DEGREES", "GRAD", "DEGRES", "GRADI", "GRADOS"), "angle"),
}  # fmt: skip


def _either(words: dict[str, Role]) -> str:
    return "|".join(re.escape(word) for word in sorted(words, key=len, reverse=True))


_DIGITS = r"\d{1,7}"  # more are no size
_NUMBER = "|".join((
    rf"{_DIGITS}[ -]{_DIGITS}/{_DIGITS}", rf"{_DIGITS}/{_DIGITS}", rf"{_DIGITS}[.,]{_DIGITS}", rf"[.,]{_DIGITS}",
    rf"{_DIGITS}\.?",
))  # fmt: skip
_SIZE = re.compile(
    rf"""(?:(?<![A-Z0-9])(?P<before>{_either(_BEFORE)})[\ ]*[=:.]?[\ ]*)?
    (?<![A-Z0-9.,/-])(?P<number>{_NUMBER})(?![\d/])
    (?:[\ ]?(?P<unit>MM|CM|INCH(?:ES)?|IN|ZOLL|POUCES?|POLLICI|PULGADAS?|")(?![A-Z]))?
    (?:(?P<glued>{_either(_AFTER)})(?![A-Z=:\d])
    |[\ ](?P<after>{_either(_AFTER)})(?![A-Z=:]|[\ ]*[=:.]?[\ ]*[.,]?\d))?""",
    re.VERBOSE,
)
_TIMES = re.compile(r"(?<=[\d\"])[ ]*[X×*][ ]*(?=[.,]?\d|OD|ID|D|L|DIA|PHI)")
_BETWEEN = re.compile(r"(?<=\d)(?=(?:OD|ID|D|L)[ =:]*[.,]?\d)")  # D50L120
_GLUED_MARK = re.compile(rf"(?<![A-Z0-9])(?P<before>{_either(_BEFORE)})(?=[.,]?\d)")
_UNITS: dict[str, tuple[Unit, float]] = {"MM": ("mm", 1.0), "CM": ("mm", 10.0)}


@dataclass(frozen=True, slots=True)
class Size:
    """One number of a comment."""

    value: float
    unit: Unit | None  # None: not said
    role: Role | None
    lead: str = ""  # what stands between it and the number before it


def upper(text: str) -> str:
    """A comment as the vocabulary has its words: capitals without accents, one sign for diameter and for inch.

    >>> upper("Länge 5″, Ø40, dégrossissage")
    'LAENGE 5", DIA 40, DEGROSSISSAGE'
    """
    plain = _INCH_SIGNS.sub('"', _DIAMETER_SIGNS.sub(" DIA ", text)).replace("ß", "SS").upper().translate(_GERMAN)
    spread = unicodedata.normalize("NFKD", plain.replace("½", " 1/2").replace("¼", " 1/4").replace("¾", " 3/4"))
    return " ".join("".join(sign for sign in spread if not unicodedata.combining(sign)).split())


def sizes(text: str) -> list[Size]:
    """Every number of an upper-case comment that does not belong to a code, with its unit and role.

    >>> [(size.value, size.role) for size in sizes("4.5OD X 2.75 ID X .53L")]
    [(4.5, 'diameter'), (2.75, 'inside'), (0.53, 'length')]
    >>> [(size.value, size.unit, size.role) for size in sizes("PHI50 X 52MM")]
    [(50.0, None, 'diameter'), (52.0, 'mm', None)]
    """
    apart = _BETWEEN.sub(" ", _TIMES.sub(" X ", text))
    return list(_found(_GLUED_MARK.sub(lambda match: f"{match['before']} ", apart)))


def _found(text: str) -> Iterator[Size]:
    behind = 0
    for match in _SIZE.finditer(text):
        lead, behind = text[behind : match.start()], match.end()
        after, before = match["glued"] or match["after"], match["before"]
        role = _AFTER[after] if after else _BEFORE[before] if before else None
        unit, scale = _UNITS.get(match["unit"], ("in", 1.0)) if match["unit"] else (None, 1.0)
        value = scale * _value(match["number"])
        if value > 0.0:
            yield Size(value, unit, role, lead.strip(" :=-.,;"))


def _value(text: str) -> float:
    """A decimal with point or comma, or a fraction with or without a whole part."""
    if "/" not in text:
        return float(text.replace(",", "."))
    whole, _, rest = text.replace("-", " ").rpartition(" ")
    top, _, bottom = rest.partition("/")
    return float((int(whole) if whole else 0) + Fraction(int(top), int(bottom) or 1))
