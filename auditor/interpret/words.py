"""The words of one block as the control reads them: literal numbers, lengths in mm, codes as functions."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, field

from auditor.declared.model import Control, System
from auditor.interpret.cycles.call import INCH
from auditor.interpret.systems import canonical_code, function_of
from auditor.parse.blocks import Number

LENGTH_LETTERS = frozenset({"X", "Z", "U", "W", "Y", "V", "I", "J", "K", "R", ",C", ",R"})
LIVE_LETTERS = frozenset({"Y", "V", "A", "B", "C", "H"})  # axes of milling and of second spindles


@dataclass(frozen=True, slots=True)
class Value:
    """One word with its number known; ``start:end`` are its columns in the line."""

    letter: str
    number: Number
    start: int
    end: int
    computed: bool = False  # from an expression, not written as a number


@dataclass(frozen=True, slots=True)
class BlockWords:
    """A block ready to be carried out: expressions evaluated, words with a null value left out."""

    line: int  # of the audited file
    label: str | None
    text: str
    values: tuple[Value, ...]
    functions: tuple[str, ...] = ()  # of the G words, in order
    unknown_codes: tuple[float, ...] = ()
    m_codes: tuple[int, ...] = ()
    by_letter: dict[str, Number] = field(default_factory=dict)  # last acts

    def number(self, letter: str) -> Number | None:
        """The number of a word, None when the block lacks it."""
        return self.by_letter.get(letter)

    def has(self, *letters: str) -> bool:
        """Whether any of the letters stands in the block."""
        return not self.by_letter.keys().isdisjoint(letters)

    @property
    def only_moves(self) -> bool:
        """Whether the block holds nothing but words for the motion in force."""
        codes = self.functions or self.unknown_codes or self.m_codes
        return not codes and self.by_letter.keys().isdisjoint("FST")

    def calls(self, function: str) -> bool:
        """Whether a G word of the block calls the function."""
        return function in self.functions

    def integer(self, letter: str) -> int | None:
        """A word that counts or names something (P, Q, L, H), without regard to a point."""
        number = self.by_letter.get(letter)
        return None if number is None else round(number.value)


def ready_words(line: int, label: str | None, text: str, values: Iterable[Value], system: System) -> BlockWords:
    """Sort the words of a block: G by function, M by number, the rest by letter."""
    kept = tuple(values)
    functions: list[str] = []
    unknown: list[float] = []
    m_codes: list[int] = []
    for value in kept:
        if value.letter == "G":
            function = function_of(system, value.number.value)
            if function is None:
                unknown.append(canonical_code(value.number.value))
            else:
                functions.append(function)
        elif value.letter == "M":
            m_codes.append(round(value.number.value))
    by_letter = {value.letter: value.number for value in kept if value.letter not in "GMNO"}
    return BlockWords(line, label, text, kept, tuple(functions), tuple(unknown), tuple(m_codes), by_letter)


def length(number: Number, control: Control, *, inch: bool) -> float:
    """A length word in mm as written (no halving of diameters).

    Example
    -------
    >>> length(Number(50, False, "50"), Control(whole_numbers="increments"), inch=False)
    0.05
    """
    scale = INCH if inch else 1.0
    if number.has_point or control.whole_numbers == "units":
        return number.value * scale
    return number.value * least_increment(control, inch=inch)


def least_increment(control: Control, *, inch: bool) -> float:
    """The least input increment in mm: 0.001 mm or 0.0001 in unless declared otherwise."""
    return 0.0001 * INCH if inch else control.increment


def argument_value(value: Value, control: Control, *, inch: bool) -> float:
    """A macro argument as the number that its variable gets: in the program's own unit.

    Without a point it counts like the same address elsewhere: least increments of a length where the
    control reads whole numbers so.
    """
    number = value.number
    if number.has_point or control.whole_numbers == "units" or value.letter not in LENGTH_LETTERS:
        return number.value
    return number.value * (0.0001 if inch else control.increment)
