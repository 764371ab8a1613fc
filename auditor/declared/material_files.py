"""Reads one file of the material catalogue: every figure with the source that stands for it.

The files are our own, so each figure has one unit and the general reader of units stays out of
the way of a quick start.
"""

from __future__ import annotations

import re
import tomllib
from collections.abc import Iterator, Mapping
from dataclasses import dataclass, field
from functools import lru_cache
from pathlib import Path
from typing import Any

from auditor.declared.model import Disagreement, Material
from auditor.errors import DeclarationError, Fault

GROUPS = ("P", "M", "K", "N", "S", "H", "O")
PROVENANCES = ("confirmed", "confirmed at second hand", "from memory", "common practice")

_UNITS = {
    "kc11": "N/mm^2", "kf11": "N/mm^2", "kp11": "N/mm^2", "reference_rake": "deg", "friction_angle": "deg",
    "tensile_strength": "MPa", "hardness": "HB", "modulus": "GPa", "density": "g/cm^3", "built_up_edge": "m/min",
    "kc": "N/mm^2", "at": "mm",
}  # fmt: skip
_NUMBERS = ("mc", "mf", "mp", "scatter", "difference")
_FIGURES = (
    "aliases", "kc11", "mc", "kf11", "mf", "kp11", "mp", "reference_rake", "friction_angle", "scatter",
    "tensile_strength", "hardness", "modulus", "density", "chips", "built_up_edge", "work_hardening",
)  # fmt: skip
_HEADINGS = ("name", "title", "group", "sources", "disagreements")
_QUANTITY = re.compile(r"(-?\d+(?:\.\d+)?) (\S+)")
_NOT_IN_KEYS = re.compile(r"[\W_]+")


@dataclass(frozen=True, slots=True)
class Figure:
    """One figure of a catalogue entry and how well it is known."""

    key: str
    text: str  # as the file has it, with unit
    source: str
    provenance: str
    row: str | None = None  # the source's own name for the material


@dataclass(frozen=True, slots=True)
class OtherFigure:
    """What another source says about the specific force, and how far apart the two are."""

    source: str
    provenance: str
    kc: float  # N/mm2 at the thickness below
    thickness: float  # mm
    difference: float  # (other - own) / own
    kc11: float | None = None  # None: the source has the one value kc
    mc: float | None = None
    row: str | None = None

    def __str__(self) -> str:
        pair = "" if self.kc11 is None else f"pair {self.kc11:g} N/mm^2 and {self.mc:g}; "
        apart = "more" if self.difference > 0 else "less"
        share = f"{abs(self.difference) * 100:.0f} % {apart}"
        return f"{pair}specific force {self.kc:.0f} N/mm^2 at h = {self.thickness:g} mm, {share} than here"


@dataclass(frozen=True, slots=True)
class Entry:
    """A catalogue entry: the material as the audit uses it, and where every figure comes from."""

    material: Material
    aliases: tuple[str, ...]
    figures: tuple[Figure, ...]
    others: tuple[OtherFigure, ...]


@dataclass(slots=True)
class _Reader:
    """Reads the values of one file and gathers what is wrong with them."""

    path: Path
    faults: list[Fault] = field(default_factory=list)

    def fault(self, key: str, message: str, found: object = None, wanted: str | None = None) -> None:
        """Remember a fault; all of a file are told at once."""
        shown = None if found is None else repr(found)
        self.faults.append(Fault(message, file=self.path.name, key=key, found=shown, wanted=wanted))

    def text(self, table: Mapping[str, Any], key: str, allowed: tuple[str, ...] = ()) -> str:
        """A non-empty text, one of ``allowed`` if that is given."""
        value = table.get(key)
        if not isinstance(value, str) or not value.strip() or (allowed and value not in allowed):
            self.fault(key, "text expected", value, " | ".join(allowed) or "some text")
            return ""
        return value

    def texts(self, table: Mapping[str, Any], key: str) -> tuple[str, ...]:
        """A list of texts."""
        value = table.get(key, [])
        if not isinstance(value, list) or not all(isinstance(item, str) and item.strip() for item in value):
            self.fault(key, "list of texts expected", value)
            return ()
        return tuple(value)

    def tables(self, table: Mapping[str, Any], key: str) -> list[Mapping[str, Any]]:
        """The [[tables]] of that name."""
        value = table.get(key, [])
        if not isinstance(value, list) or not all(isinstance(item, dict) for item in value):
            self.fault(key, "tables expected", value, f"[[{key}]]")
            return []
        return value

    def yes(self, table: Mapping[str, Any], key: str) -> bool:
        """True or false; false where it is left out."""
        value = table.get(key, False)
        if not isinstance(value, bool):
            self.fault(key, "true or false expected", value)
            return False
        return value

    def number(self, table: Mapping[str, Any], key: str) -> float | None:
        """A number, or a quantity in the one unit its key has; None where it is left out."""
        value = table.get(key)
        if value is None:
            return None
        if key in _NUMBERS:
            if isinstance(value, (int, float)) and not isinstance(value, bool):
                return float(value)
            self.fault(key, "number expected", value)
            return None
        return self._quantity(key, value)

    def range(self, table: Mapping[str, Any], key: str) -> tuple[float, float] | None:
        """A pair of quantities, the lower first."""
        value = table.get(key)
        if value is None:
            return None
        ends = [self._quantity(key, item) for item in value] if isinstance(value, list) else []
        if len(ends) != 2 or ends[0] is None or ends[1] is None or ends[0] >= ends[1]:
            self.fault(key, "two rising quantities expected", value, f'["1 {_UNITS[key]}", "2 {_UNITS[key]}"]')
            return None
        return ends[0], ends[1]

    def _quantity(self, key: str, value: object) -> float | None:
        match = _QUANTITY.fullmatch(value) if isinstance(value, str) else None
        if not match or match[2] != _UNITS[key]:
            self.fault(key, "quantity expected", value, f'a text such as "1 {_UNITS[key]}"')
            return None
        return float(match[1])


@lru_cache(maxsize=256)
def read_entry(path: Path) -> Entry:
    """Read one catalogue file.

    Raises
    ------
    DeclarationError
        With everything that is wrong in the file.
    """
    try:
        table = tomllib.loads(path.read_text(encoding="utf-8"))
    except (tomllib.TOMLDecodeError, UnicodeDecodeError) as error:
        raise DeclarationError(Fault(str(error), file=path.name, wanted="a TOML file")) from error
    reader = _Reader(path)
    for key in table.keys() - set(_FIGURES) - set(_HEADINGS):
        reader.fault(key, "unknown key", wanted="one of " + " ".join((*_HEADINGS[:3], *_FIGURES)))
    figures = tuple(_figures(reader, table))
    others = tuple(_others(reader, table))
    material = _material(reader, table, figures, others)
    if key_of(path.stem) != key_of(material.name):
        reader.fault("name", "the file is named otherwise", material.name, path.stem)
    aliases = reader.texts(table, "aliases")
    if reader.faults:
        raise DeclarationError(*reader.faults)
    return Entry(material, aliases, figures, others)


def key_of(name: str) -> str:
    """What is compared when names are: letters and digits alone, no AISI or SAE in front."""
    return re.sub(r"^(aisi|sae)(?=.)", "", letters_of(name))


def letters_of(text: str) -> str:
    """Letters and digits of a text, in lower case."""
    return _NOT_IN_KEYS.sub("", text.casefold())


def _material(
    reader: _Reader, table: Mapping[str, Any], figures: tuple[Figure, ...], others: tuple[OtherFigure, ...]
) -> Material:
    number = {key: reader.number(table, key) for key in (*_UNITS, *_NUMBERS) if key not in ("built_up_edge", "at")}
    _check_numbers(reader, number)
    basis = _basis(figures)
    group = reader.text(table, "group", GROUPS) or "P"
    chips = reader.text(table, "chips", ("long", "short")) or "long"
    given = {key: number[key] for key in ("reference_rake", "friction_angle", "scatter") if number[key] is not None}
    return Material(
        name=reader.text(table, "name"),
        group=group,  # type: ignore[arg-type]  # checked against GROUPS above
        title=reader.text(table, "title"),
        source=basis.source + (f"; row {basis.row}" if basis.row else ""),
        provenance=basis.provenance,
        kc11=number["kc11"],
        mc=number["mc"],
        kf11=number["kf11"],
        mf=number["mf"],
        kp11=number["kp11"],
        mp=number["mp"],
        tensile_strength=number["tensile_strength"],
        hardness=number["hardness"],
        modulus=(number["modulus"] or 0.0) * 1000.0,
        density=number["density"] or 0.0,
        chips=chips,  # type: ignore[arg-type]
        work_hardening=reader.yes(table, "work_hardening"),
        built_up_edge=reader.range(table, "built_up_edge"),
        disagreements=tuple(Disagreement(_named(other), str(other)) for other in others),
        **given,  # type: ignore[arg-type]
    )


def _check_numbers(reader: _Reader, number: Mapping[str, float | None]) -> None:
    if (number["kc11"] is None) != (number["mc"] is None):
        reader.fault("kc11", "kc11 and mc are a pair: both or neither")
    if number["mc"] is not None and not 0.05 <= number["mc"] <= 0.5:
        reader.fault("mc", "outside 0.05 to 0.5: tables may print 1 - mc", number["mc"])
    if number["kc11"] is not None and not 100.0 <= number["kc11"] <= 6000.0:
        reader.fault("kc11", "outside 100 to 6000 N/mm^2, the range of metals", number["kc11"])
    for key in ("modulus", "density"):
        if number[key] is None:
            reader.fault(key, "missing")


def _named(other: OtherFigure) -> str:
    row = f"; row {other.row}" if other.row else ""
    return f"{other.source}{row} ({other.provenance})"


def _basis(figures: tuple[Figure, ...]) -> Figure:
    """The figure whose source stands for the material: the force pair, or the modulus without one."""
    for key in ("kc11", "modulus"):
        for figure in figures:
            if figure.key == key:
                return figure
    return Figure("", "", "", "")


def _figures(reader: _Reader, table: Mapping[str, Any]) -> Iterator[Figure]:
    """Every figure in the file's order, each with the one [[sources]] table that names it."""
    owners: dict[str, Mapping[str, Any]] = {}
    for source in reader.tables(table, "sources"):
        reader.text(source, "source")
        reader.text(source, "provenance", PROVENANCES)
        for key in reader.texts(source, "figures"):
            if key in owners:
                reader.fault(key, "named by two [[sources]]")
            if key not in table:
                reader.fault("sources", "names a figure that the file does not have", key)
            owners[key] = source
    for key in (key for key in table if key in _FIGURES):
        owner = owners.get(key)
        if owner is None:
            reader.fault(key, "no [[sources]] names this figure", wanted="a source for every figure")
            continue
        yield Figure(key, _shown(table[key]), str(owner.get("source")), str(owner.get("provenance")), owner.get("row"))


def _shown(value: object) -> str:
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, list):
        return ", ".join(str(item) for item in value)
    return str(value)


def _others(reader: _Reader, table: Mapping[str, Any]) -> Iterator[OtherFigure]:
    for other in reader.tables(table, "disagreements"):
        source = reader.text(other, "source")
        provenance = reader.text(other, "provenance", PROVENANCES)
        kc11, mc, kc = (reader.number(other, key) for key in ("kc11", "mc", "kc"))
        thickness, difference = reader.number(other, "at"), reader.number(other, "difference")
        if kc is None and kc11 is not None and mc is not None and thickness:
            kc = kc11 * float(thickness**-mc)
        if kc is None or not thickness or difference is None:
            reader.fault("disagreements", "incomplete", source, "at, difference, and either kc or kc11 with mc")
            continue
        yield OtherFigure(source, provenance, kc, thickness, difference, kc11, mc, other.get("row"))
