"""A program carried out without any declaration, to see what it does by itself."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass, replace
from pathlib import Path
from statistics import median

from auditor.declared.model import Control, Job, Machine, Material, Point, Workholding, Workpiece
from auditor.draft.guesses import Guess, text_value
from auditor.draft.sayings import Saying, sayings
from auditor.interpret import interpret
from auditor.interpret.moves import Interpretation, Kind
from auditor.parse import read_program
from auditor.parse.blocks import Block, Number, ProgramText

INCH_FEED = 0.03  # feed words below this are inches a turn: 0.03 mm a turn would only rub (common practice)
LARGEST_PLAIN = 1000.0  # a coordinate above this without a point is not meant in mm
_INCH_WORDS = re.compile(r"\d\s*(?:\"|INCH|IN\b)|(?<![\d.])\.0\d\d+\s*(?:TNR|RAD|R)\b|\d/(?:2|4|8|16|32|64)\b")
_MM_WORDS = re.compile(r"\d\s*MM\b|\b[CDSTVW][NCPB][MG][GTAM][ -]?\d{6}\b")


@dataclass(frozen=True, slots=True)
class Reading:
    """A program read on its own."""

    text: ProgramText
    path: Interpretation
    said: tuple[Saying, ...]
    system: Guess
    units: Guess
    whole_numbers: Guess | None  # None: nothing speaks against the usual

    @property
    def unit(self) -> str:
        """``mm`` or ``in``: in what the program counts."""
        return self.path.units


def read(program: Path) -> Reading:
    """Read a program file and carry it out as an undeclared control would.

    Raises
    ------
    ProgramError
        The file cannot be read.
    """
    text = read_program(str(program), Control())
    plain = _plain_numbers(text.blocks)
    control = Control(whole_numbers="increments" if plain else "units")
    path = interpret(text, _nobody(text.path, control))
    said = tuple(sayings(text, dict(path.tools_called)))
    units = _units(text, said)
    if units.value == '"in"' and path.units == "mm":
        inch = Control(units="in", whole_numbers=control.whole_numbers)
        path = interpret(text, _nobody(text.path, inch))
    return Reading(text, _with_only_tool(path), said, _system(path), units, plain)


def _with_only_tool(path: Interpretation) -> Interpretation:
    """A program that calls no tool works with one all the same: it is drafted as tool 1."""
    feeding = [move for move in path.moves if move.kind is not Kind.RAPID]
    if path.tools_called or not feeding:
        return path
    moves = tuple(replace(move, tool=1) for move in path.moves)
    return replace(path, moves=moves, tools_called=((1, feeding[0].line),))


def _nobody(program: str, control: Control) -> Job:
    """A job that declares nothing: no stage after the interpreter ever sees it."""
    material = Material("unknown", "P", "unknown", "none", "declared", None, None)
    stock = Workpiece(material, (Point(0.0, 0.0), Point(0.0, 1.0), Point(-1.0, 1.0), Point(-1.0, 0.0)), 1.0, 2.0)
    machine = Machine("unknown", 1e6, ((1e6, 1.0),), 1e6)
    return Job(None, None, program, control, machine, Workholding("unknown", "chuck", 1.0), stock, {})


def _system(path: Interpretation) -> Guess:
    assumed = next((entry for entry in path.assumptions if entry.about == "control.system"), None)
    why = assumed.why.removeprefix("not declared; ") if assumed else "read so"
    why = ", ".join(why.split(", ")[:2])
    conflict = any(remark.topic == "code-system-conflict" for remark in path.remarks)
    return Guess(text_value(path.system), "likely" if why.startswith("marks") and not conflict else "guess", why)


def _units(text: ProgramText, said: Sequence[Saying]) -> Guess:
    """What the program says by G20 or G21 (C: G70, G71 alone), else what numbers and comments look like."""
    for block in text.blocks:
        codes = {word.value.value for word in block.words if word.letter == "G" and isinstance(word.value, Number)}
        letters = {word.letter for word in block.words}
        for code, unit in ((20.0, "in"), (21.0, "mm"), (70.0, "in"), (71.0, "mm")):
            if code in codes and not letters & set("XZUWPQRF"):
                return Guess(f'"{unit}"', "sure", f"G{code:g} in line {block.line}")
    return _units_by_looks(text, said)


def _units_by_looks(text: ProgramText, said: Sequence[Saying]) -> Guess:
    feeds = [
        word.value.value
        for block in text.blocks
        for word in block.words
        if word.letter == "F" and isinstance(word.value, Number) and word.value.has_point and word.value.value > 0.0
    ]
    inch = [saying for saying in said if _INCH_WORDS.search(saying.text)]
    metric = [saying for saying in said if _MM_WORDS.search(saying.text)]
    if feeds and median(feeds) < INCH_FEED and not metric:
        why = f"no G20 or G21; feeds around F{median(feeds):g} are inches"
        return Guess('"in"', "likely" if inch else "guess", why)
    if inch and not metric and not feeds:
        return Guess('"in"', "guess", f"no G20 or G21; {inch[0].place}")
    why = f"no G20 or G21; {metric[0].place}" if metric else "no G20 or G21; feeds and sizes look metric"
    return Guess('"mm"', "likely" if metric else "guess", why)


def _plain_numbers(blocks: Sequence[Block]) -> Guess | None:
    """Coordinates without a point that are too large for mm: counted in least increments."""
    words = ((block.line, word.letter, word.value) for block in blocks for word in block.words)
    for line, letter, value in words:
        if letter in "XZUW" and isinstance(value, Number) and not value.has_point and abs(value.value) >= LARGEST_PLAIN:
            why = f"{letter}{value.text} in line {line} has no point and is no length in mm"
            return Guess('"increments"', "likely", why)
    return None
