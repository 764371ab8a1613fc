"""Which lines of a file are program: what lies between the % marks, and what does not."""

from __future__ import annotations

import re
from collections.abc import Iterator
from dataclasses import dataclass
from itertools import islice, pairwise

from auditor.parse.blocks import TextNote
from auditor.parse.clean import without_gaps

_COMMENT = re.compile(r"\([^)]*\)?|;.*")
_PROGRAM_HEAD = re.compile(r"/?(?:[O:][0-9]+|<[^<>]+>)")
_PROGRAM_END = re.compile(r"/?(?:N[0-9]+)?M0*(?:2|30|99)")
_CLOSED_WITHIN = re.compile(r"(?P<code>(?:[^(;%]|\([^)]*\))*)%")
_ENDS = re.compile(r"M0*(?:2|30|99)(?![0-9.])")
_LOOKS_LIKE_CODE = re.compile(r"(?<![A-Z])[GXZUW][+-]?\.?[0-9]")


@dataclass(frozen=True, slots=True)
class Sections:
    """``data`` holds the indices of the lines to read; ``titles`` those between an opening % and its program number.

    ``closing`` says up to which column a line is code when a % behind it, as in ``M30%``, ends the program.
    """

    data: list[int]
    titles: frozenset[int]
    notes: tuple[TextNote, ...]
    closing: dict[int, int]


def sections(lines: list[str]) -> Sections:
    """Sort the lines of a file by its % marks; a file without any is program throughout."""
    marks = [index for index, line in enumerate(lines) if "%" in line and (is_mark(line) or closed_within(line))]
    if not marks:
        return Sections(list(range(len(lines))), frozenset(), (), {})
    return _Sorting(lines, marks).sort()


def bare(line: str) -> str:
    """The code of a line, roughly: no comments, no blanks, upper case."""
    return without_gaps(_COMMENT.sub("", line)).upper()


def is_mark(line: str) -> bool:
    """Whether a line opens or ends the program text: % at its front."""
    return "%" in line and without_gaps(line).startswith("%")


def closed_within(line: str) -> int | None:
    """The column of the % behind an end code in the same line, as in ``M30%``; None when there is none."""
    found = _CLOSED_WITHIN.match(line)
    if found is None or _ENDS.search(bare(found["code"])) is None:
        return None
    return found.end("code")


def is_program_head(line: str) -> bool:
    """Whether a line opens a program: ``O1234``, ``:1234`` or ``<NAME>``."""
    return _PROGRAM_HEAD.match(bare(line)) is not None


def after_mark(line: str) -> str:
    """What stands behind the % of a mark line: a name, or the program number."""
    return line.partition("%")[2]


class _Sorting:
    def __init__(self, lines: list[str], marks: list[int]) -> None:
        self.lines = lines
        self.bounds = [*marks, len(lines)]
        self.closing = {mark: column for mark in marks if (column := closed_within(lines[mark])) is not None}
        self.data: list[int] = []
        self.titles: list[int] = []
        self.notes: list[TextNote] = []

    def sort(self) -> Sections:
        inside = opened = self._before_first(range(self._end(self.bounds[0])))
        for mark, following in pairwise(self.bounds):
            part = range(mark + 1, self._end(following))
            if mark in self.closing:
                if inside:
                    self._note(mark, "the % behind the end code was read as the end of the program")
                inside = False
                self._note_outside(range(mark + 1, following))
            elif not inside and (not opened or self._begins_program(mark, part)):
                inside = self._open(mark, part)  # two marks with nothing between them open once
                opened = opened or inside
            else:
                inside = False
                self._note_outside(part)
        return Sections(self.data, frozenset(self.titles), tuple(self.notes), self.closing)

    def _end(self, mark: int) -> int:
        """Where the part before a mark ends: the code before a % in its line belongs to it."""
        return mark + 1 if mark in self.closing else mark

    def _before_first(self, part: range) -> bool:
        """Whether a program stands before the first %, which then ends it; else it is leader text."""
        code = [bare(self.lines[index][: self.closing.get(index)]) for index in self._filled(part)]
        is_program = any(_PROGRAM_END.fullmatch(text) for text in code) or any(map(_PROGRAM_HEAD.match, code[:1]))
        if is_program or (code and not any(self._filled(range(self.bounds[0] + 1, len(self.lines)), marks=False))):
            self.data.extend(part)
            return True
        if any(_LOOKS_LIKE_CODE.search(text) for text in code):
            self._note(part[0], "text before the first % was skipped as a leader, though it looks like code")
        return False

    def _open(self, mark: int, part: range) -> bool:
        if is_program_head(after_mark(self.lines[mark])):
            self.data.append(mark)
        self.data.extend(part)
        filled = list(islice(self._filled(part), 2))
        if len(filled) > 1 and is_program_head(self.lines[filled[1]]):
            self.titles.append(filled[0])
        return bool(filled)

    def _begins_program(self, mark: int, part: range) -> bool:
        first = [self.lines[index] for index in islice(self._filled(part), 1)]
        return any(is_program_head(line) for line in [after_mark(self.lines[mark]), *first])

    def _note_outside(self, part: range) -> None:
        first = next(iter(self._filled(part)), None)
        if first is not None:
            self._note(first, "text behind the % that ends the program; controls do not read it, it was not audited")

    def _filled(self, part: range, marks: bool = True) -> Iterator[int]:
        """The lines of a part that hold more than blanks and comments."""
        for index in part:
            text = bare(self.lines[index][: self.closing.get(index)])
            if text and (marks or not text.startswith("%")):
                yield index

    def _note(self, index: int, message: str) -> None:
        self.notes.append(TextNote("after-end", index + 1, message))
