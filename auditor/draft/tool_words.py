"""What comments say about a tool: its kind, codes, corner, angle, width, diameter."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterable, Iterator, Sequence
from dataclasses import dataclass, field

from auditor.declared.iso_codes import CodeError
from auditor.declared.iso_holders import decode_holder
from auditor.declared.iso_inserts import decode_insert
from auditor.declared.model import ToolKind
from auditor.draft.guesses import Guess, Sure, quantity, text_value
from auditor.draft.sayings import Saying
from auditor.draft.sizes import Size, sizes
from auditor.draft.vocabulary import KINDS_BY_CLAIM, LEFT, SUBSTRATES, TOOL_KINDS, holds, named

_INSERT = re.compile(
    r"(?<![A-Z0-9])[ABCDEHKLMRSTVW][NABCDEFGP][ACEFGHJKLMNU][NRFAMGWTQUBHCJX][ -]?"
    r"(?:(?:\d\d|S\d)[ -]?(?:\d\d|T\d)[ -]?(?:\d\d|M0)|\d{3}|\d\d?\.\d\d|\d[ -]\d[ -]\d)(?!\d)"
)
_HOLDER = re.compile(
    r"(?<![A-Z0-9])[A-JS]\d\d[A-Z]?[ -]?[CDMPSW][ABCDEHKLMRSTVW][A-Z][NABCDEFGP][RLN](?:[ -]?\d\d)?(?!\d)"
    r"|(?<![A-Z0-9])[CDMPSW][ABCDEHKLMRSTVW][A-Z][NABCDEFGP][RLN][ -]?\d{4}(?:[ -]?[A-Z](?![A-Z]))?(?:[ -]?\d\d)?(?!\d)"
)
_TAP = re.compile(r"(?<![A-Z0-9])M[ ]?(\d{1,2}(?:[.,]\d)?)(?![\d.,])")
_BAR = re.compile(r"(?<![A-Z])(?:BAR|STANGE|BOHRSTANGE|BARRE|BARENO|BARRA)(?![A-Z])")

SLOTS = ("grooving", "face grooving", "parting")
INCLUDED_ANGLES = (35.0, 55.0, 60.0, 75.0, 80.0, 86.0, 90.0)  # deg, corners of common inserts (ISO 1832)
INCH_CORNERS = (0.004, 0.005, 0.008, 0.015, 0.0156, 0.016, 0.031, 0.0312, 0.03125, 0.0313, 0.032, 0.047, 0.0469, 0.062,
                0.0625)  # fmt: skip
SMALLEST_CORNER, LARGEST_INCH_CORNER = 0.05, 0.13  # mm, in: a corner beyond is meant in the other unit
NARROWEST, WIDEST, LARGEST_DRILL = 0.4, 30.0, 100.0  # mm


@dataclass(slots=True)
class ToolSaid:
    """What is known of a tool from comments; keys as in the job file."""

    kinds: list[ToolKind] = field(default_factory=list)  # that words stand for, the most particular first
    kind_place: str = ""
    values: dict[str, Guess] = field(default_factory=dict)
    quotes: list[str] = field(default_factory=list)  # every comment about it

    def take(self, key: str, guess: Guess | None) -> None:
        """Keep the first that is said of a key."""
        if guess is not None:
            self.values.setdefault(key, guess)


def tool_said(said: Iterable[Saying], unit: str) -> ToolSaid:
    """What these comments say; ``unit`` is that of the program, for numbers that name none."""
    found = ToolSaid()
    # A comment that names the tool itself is believed before one that merely stands near its call.
    for saying in sorted(said, key=lambda one: not one.marked):
        found.quotes.append(saying.place)
        kinds = named(saying.text, TOOL_KINDS)
        if kinds and not found.kinds:
            found.kinds = [kind for kind in KINDS_BY_CLAIM if kind in kinds]
            found.kind_place = saying.place
        for key, guess in _codes(saying):
            found.take(key, guess)
        rest = _HOLDER.sub(" ", _INSERT.sub(" ", saying.text))
        for key, guess in _figures(saying, rest, unit, found.kinds):
            found.take(key, guess)
    return found


def _codes(saying: Saying) -> Iterator[tuple[str, Guess]]:
    readers: tuple[tuple[str, re.Pattern[str], Callable[[str], object]], ...] = (
        ("insert", _INSERT, decode_insert), ("holder", _HOLDER, decode_holder),
    )  # fmt: skip
    for key, pattern, decode in readers:
        for match in pattern.finditer(saying.text):
            try:
                decode(match[0])
            except CodeError:
                continue
            yield key, Guess(text_value(match[0]), "sure" if saying.marked else "likely", saying.place)


def _figures(saying: Saying, text: str, unit: str, kinds: Sequence[ToolKind]) -> Iterator[tuple[str, Guess]]:
    for name in named(text, SUBSTRATES)[:1]:
        yield "substrate", Guess(text_value(name), "likely", saying.place)
    if holds(text, LEFT):
        yield "hand", Guess('"left"', "likely", saying.place)
    kind = kinds[0] if kinds else None
    found = sizes(text)
    if kind == "drilling":
        yield from _drill(saying, text, found, unit)
        return
    for size in found:
        if size.role == "radius":
            yield from _corner(saying, size, unit)
        elif size.role == "angle" and size.value in INCLUDED_ANGLES and kind not in SLOTS:
            yield "included_angle", Guess(f'"{size.value:g} deg"', "likely", saying.place)
    if kind in SLOTS:
        yield from _width(saying, found, unit)
    elif kind == "boring" and _BAR.search(text):
        yield from _bar(saying, found, unit)


def _corner(saying: Saying, size: Size, unit: str) -> Iterator[tuple[str, Guess]]:
    """A corner radius; one that no insert has in the program's unit is meant in the other."""
    own = size.unit or unit
    if size.unit is None and own == "mm" and (size.value in INCH_CORNERS or size.value < SMALLEST_CORNER):
        own = "in"
    elif size.unit is None and own == "in" and size.value > LARGEST_INCH_CORNER:
        own = "mm"
    sure: Sure = "likely" if own == (size.unit or unit) else "guess"
    if 0.0 < size.value <= (6.4 if own == "mm" else 0.25):
        yield "nose_radius", Guess(quantity(size.value, own), sure, saying.place)


def _width(saying: Saying, found: Sequence[Size], unit: str) -> Iterator[tuple[str, Guess]]:
    said: list[tuple[Size, Sure]] = [(size, "likely") for size in found if size.role == "width"]
    said += [(size, "guess") for size in found if size.role is None]
    for size, sure in said:
        if NARROWEST <= _millimetres(size, unit) <= WIDEST:
            yield "width", Guess(quantity(size.value, size.unit or unit), sure, saying.place)
            return
        if size.unit is None and size.role == "width" and NARROWEST <= 25.4 * size.value <= WIDEST:
            yield "width", Guess(quantity(size.value, "in"), "guess", saying.place)  # no blade is that narrow in mm
            return


def _millimetres(size: Size, unit: str) -> float:
    return size.value * (25.4 if (size.unit or unit) == "in" else 1.0)


def _bar(saying: Saying, found: Sequence[Size], unit: str) -> Iterator[tuple[str, Guess]]:
    for size in found:
        if size.role == "diameter" and size.value > 0.0:
            yield "bar_diameter", Guess(quantity(size.value, size.unit or unit), "guess", saying.place)
            return


def _drill(saying: Saying, text: str, found: Sequence[Size], unit: str) -> Iterator[tuple[str, Guess]]:
    tap = _TAP.search(text)
    if tap:
        yield "diameter", Guess(quantity(float(tap[1].replace(",", ".")), "mm"), "likely", saying.place)
    said: list[tuple[Size, Sure]] = [(size, "likely") for size in found if size.role == "diameter"]
    said += [(size, "guess") for size in found if size.role is None]
    for size, sure in said:
        if 0.0 < _millimetres(size, unit) <= LARGEST_DRILL:
            yield "diameter", Guess(quantity(size.value, size.unit or unit), sure, saying.place)
            break
    for size in found:
        if size.role == "angle" and 60.0 <= size.value < 180.0:
            yield "point_angle", Guess(f'"{size.value:g} deg"', "likely", saying.place)
