"""The drafted job file: what is known stands in it with its ground, what is open with a question mark."""

from __future__ import annotations

import textwrap
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, replace
from typing import Literal

from auditor.draft.guesses import OPEN, Guess, remark_text

REMARK_COLUMN = 34
WIDEST = 116

State = Literal["said", "open", "usual"]


@dataclass(frozen=True, slots=True)
class Entry:
    """One key of the file: said by the program, open, or left to its usual value (then commented out)."""

    key: str
    value: str  # as TOML; "?" in quotes where open
    remark: str
    state: State
    usual: str = ""  # an optional key: the value that is taken without it

    @classmethod
    def of(cls, key: str, guess: Guess | None, remark: str) -> Entry:
        """A required key: what is known of it, else open."""
        if guess is None:
            return cls(key, f'"{OPEN}"', remark, "open")
        return cls(key, guess.value, guess.told, "said")

    @classmethod
    def optional(cls, key: str, guess: Guess | None, usual: str, remark: str) -> Entry:
        """A key that may be left out."""
        if guess is None:
            return cls(key, usual, remark, "usual", usual)
        return cls(key, guess.value, guess.told, "said", usual)

    def taken_back(self, why: str) -> Entry:
        """The entry with a value that cannot stand turned into a question, or left out where it may be."""
        remark = remark_text(f"{self.value} ({self.remark}) cannot stand here: {why}")
        if self.usual:
            return replace(self, value=self.usual, remark=remark, state="usual")
        return replace(self, value=f'"{OPEN}"', remark=remark, state="open")

    def lines(self) -> Iterator[str]:
        """As it stands in the file; a long remark goes above its key."""
        lead = f"{'# ' if self.state == 'usual' else ''}{self.key} = {self.value}"
        remark = f"TO BE DECIDED: {self.remark}" if self.state == "open" else self.remark
        filled = f"{lead:<{REMARK_COLUMN}}  # {remark}"
        if not remark:
            yield lead
        elif len(filled) <= WIDEST:
            yield filled
        else:
            yield from textwrap.wrap(remark, WIDEST, initial_indent="# ", subsequent_indent="#   ")
            yield lead


@dataclass(frozen=True, slots=True)
class Section:
    """A table of the file; the head of the file has no name."""

    name: str
    entries: tuple[Entry, ...]
    remarks: tuple[str, ...] = ()  # what the program says about it, above its header

    def lines(self) -> Iterator[str]:
        """As it stands in the file."""
        for remark in self.remarks:
            yield from textwrap.wrap(remark, WIDEST, initial_indent="# ", subsequent_indent="#   ")
        if self.name:
            yield f"[{self.name}]"
        for entry in self.entries:
            yield from entry.lines()

    def path(self, entry: Entry) -> str:
        """The key path of one of its entries, as messages name it."""
        return f"{self.name}.{entry.key}" if self.name else entry.key


@dataclass(frozen=True, slots=True)
class Draft:
    """A job file to fill in."""

    program: str  # its file name
    lines_read: int
    sections: tuple[Section, ...]

    @property
    def open(self) -> tuple[str, ...]:
        """Key paths that are still to be decided."""
        return tuple(path for path, entry in self.entries() if entry.state == "open")

    def entries(self) -> Iterator[tuple[str, Entry]]:
        """Every key path with its entry, in the order of the file."""
        for section in self.sections:
            yield from ((section.path(entry), entry) for entry in section.entries)

    def answered(self, answers: Mapping[str, str]) -> Draft:
        """The draft with values that a person gave, by key path."""
        def with_answer(path: str, entry: Entry) -> Entry:
            if path not in answers:
                return entry
            return replace(entry, value=answers[path], remark="answered", state="said")

        return self._changed(with_answer)

    def taken_back(self, faults: Mapping[str, str]) -> Draft:
        """The draft without values that cannot stand, by key path, with the reasons."""
        return self._changed(
            lambda path, entry: entry.taken_back(faults[path]) if path in faults and entry.state == "said" else entry
        )

    def _changed(self, change: Callable[[str, Entry], Entry]) -> Draft:
        return replace(self, sections=tuple(
            replace(section, entries=tuple(change(section.path(entry), entry) for entry in section.entries))
            for section in self.sections
        ))  # fmt: skip

    def text(self) -> str:
        """The file."""
        body = (line for section in self.sections for line in ("", *section.lines()))
        return "\n".join([*self._head(), *body]) + "\n"

    def _head(self) -> Iterator[str]:
        yield f"# Draft of a job file, from the {self.lines_read} lines of {remark_text(self.program)}."
        yield "# Behind a value stands where it comes from, and how sure that is: sure, likely or guess. Check them."
        yield "# Keys behind # may stay as they are: the value shown is what is taken without them, or an example."
        if self.open:
            yield f'# "{OPEN}" is to be decided: `turnaudit check {remark_text(self.program)}` lists what is left.'
