"""The programs within reach: those in the audited file and subprogram files lying beside it."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable
from dataclasses import dataclass, field
from pathlib import Path

from auditor.declared.model import Control
from auditor.errors import ProgramError
from auditor.parse import read_program
from auditor.parse.blocks import Block, Do, End, ProgramText

ENDINGS = ("", ".nc", ".cnc", ".tap", ".txt", ".sub", ".min", ".ptp")


@dataclass(frozen=True, slots=True)
class Program:
    """One program: from an O word (or the top of the file) to the next."""

    name: int | str | None
    blocks: tuple[Block, ...]
    file: str | None = None  # None: the audited file
    places: dict[int, tuple[int, ...]] = field(default_factory=dict)  # N -> indices of blocks
    partners: dict[int, int] = field(default_factory=dict)  # index of DO <-> index of its END

    def find(self, number: int, after: int, *, from_start: bool = False) -> int | None:
        """Index of block ``number``: forward from ``after``, then from the top."""
        places = self.places.get(number, ())
        if not places:
            return None
        return places[0] if from_start else next((place for place in places if place > after), places[0])

    def ends_with(self, *codes: int) -> bool:
        """Whether one of the M codes stands in the program."""
        return any(
            word.letter == "M" and getattr(word.value, "value", None) in codes
            for block in self.blocks
            for word in block.words
        )

    @property
    def title(self) -> str:
        """How a person names the program."""
        if self.name is None:
            return "the program"
        return f"O{self.name:04d}" if isinstance(self.name, int) else f"<{self.name}>"


def programs_of(text: ProgramText, file: str | None = None) -> list[Program]:
    """The programs of a file, in order."""
    parts: list[list[Block]] = []
    for block in text.blocks:
        if block.program is not None or not parts:
            parts.append([])
        parts[-1].append(block)
    return [_program(part, file) for part in parts]


def _program(blocks: Iterable[Block], file: str | None) -> Program:
    kept = tuple(blocks)
    places: defaultdict[int, list[int]] = defaultdict(list)
    for index, block in enumerate(kept):
        if block.number is not None:
            places[block.number].append(index)
    name = kept[0].program if kept else None
    return Program(name, kept, file, {n: tuple(found) for n, found in places.items()}, _loop_partners(kept))


def _loop_partners(blocks: tuple[Block, ...]) -> dict[int, int]:
    open_loops: list[tuple[int, int]] = []
    partners: dict[int, int] = {}
    for index, block in enumerate(blocks):
        if isinstance(block.statement, Do):
            open_loops.append((block.statement.label, index))
        elif isinstance(block.statement, End) and open_loops and open_loops[-1][0] == block.statement.label:
            _, start = open_loops.pop()
            partners[start], partners[index] = index, start
    return partners


class Library:
    """Finds programs by number or name, in the file first, then beside it."""

    def __init__(self, text: ProgramText, control: Control) -> None:
        self._control = control
        self.programs = programs_of(text)
        self._folder = Path(text.path).parent if Path(text.path).is_file() else None
        self._files: dict[str, Path] | None = None
        self._read: dict[int | str, Program | None] = {}

    def main(self) -> Program | None:
        """The program that runs: the first, unless it is plainly a subprogram before a main program."""
        if not self.programs:
            return None
        first = self.programs[0]
        if first.ends_with(99) and not first.ends_with(2, 30):
            return next((program for program in self.programs if program.ends_with(2, 30)), first)
        return first

    def find(self, name: int | str) -> Program | None:
        """The program of that number or name; None when it is nowhere."""
        for program in self.programs:
            if program.name is not None and _same(program.name, name):
                return program
        if name not in self._read:
            self._read[name] = self._from_folder(name)
        return self._read[name]

    def _from_folder(self, name: int | str) -> Program | None:
        stems = (f"o{name:04d}", f"o{name}", f"{name:04d}", f"{name}") if isinstance(name, int) else (name.lower(),)
        for stem in stems:
            for ending in ENDINGS:
                path = self._listing().get(stem + ending)
                if path is not None and (found := _read_file(path, name, self._control)) is not None:
                    return found
        return None

    def _listing(self) -> dict[str, Path]:
        if self._files is None:
            try:
                self._files = {path.name.lower(): path for path in self._folder.iterdir()} if self._folder else {}
            except OSError:
                self._files = {}
        return self._files


def _same(one: int | str, other: int | str) -> bool:
    return str(one).lower() == str(other).lower()


def _read_file(path: Path, name: int | str, control: Control) -> Program | None:
    try:
        found = programs_of(read_program(path, control), path.name)
    except ProgramError:
        return None
    return next((program for program in found if program.name == name), found[0] if found else None)
