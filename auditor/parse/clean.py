"""One source line to clean code: comments out, blanks out, upper case, and the way back to the columns."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass, field, replace
from itertools import pairwise
from typing import Literal

from auditor.parse.blocks import Comment
from auditor.parse.decode import IGNORED

Semicolon = Literal["comment", "end of block"]
Topic = Literal["paren", "blank-in-number", "semicolon"]
Remark = tuple[Topic, str]

_GAPS = frozenset(f" \t\v\f{IGNORED}")
_GAP = re.compile(f"[ \t\v\f{IGNORED}]+")
_MARK = re.compile(r"[();]")
_PARENTHESIS = re.compile(r"[()]")
_SPLIT_NUMBER = re.compile(r"[0-9.][ \t]+[0-9.]")
_NUMBER_OR_GAP = frozenset("0123456789.+- \t")
_READS_AS_WORDS = re.compile(r"(?:[A-Z][+-]?(?:[0-9]+(?:\.[0-9]*)?|\.[0-9]+))+")


@dataclass(frozen=True, slots=True)
class CleanCode:
    """The code of one block; ``columns[i]`` is where ``text[i]`` stands in the source line."""

    text: str
    columns: Sequence[int]
    comments: tuple[Comment, ...] = ()
    remarks: tuple[Remark, ...] = ()
    unclosed: Comment | None = None  # a comment that never ends

    def start(self, position: int) -> int:
        """The source column of a position; of the text's end: just behind its last character."""
        return self.columns[position] if position < len(self.columns) else self.end(position)

    def end(self, position: int) -> int:
        """The source column just behind the text that ends before a position."""
        return self.columns[position - 1] + 1 if self.columns and position else 0

    def behind(self, position: int) -> CleanCode:
        """The code from a position on."""
        return replace(self, text=self.text[position:], columns=self.columns[position:]) if position else self

    def without(self, start: int, end: int) -> CleanCode:
        """The code with a piece cut out of it."""
        columns = (*self.columns[:start], *self.columns[end:])
        return replace(self, text=self.text[:start] + self.text[end:], columns=columns)


def clean(line: str, first: int, semicolon: Semicolon, nesting: bool) -> list[CleanCode]:
    """The blocks of a source line from column ``first`` on: one, or several where ``;`` ends a block."""
    if _MARK.search(line, first) is None:
        return [_close_up(line, first, len(line))]
    scan = _Scan(line, first, semicolon, nesting)
    bounds = [first, *scan.block_ends, len(line)]
    return [_close_up(scan.code, start, end, scan) for start, end in pairwise(bounds)]


def without_gaps(text: str) -> str:
    """The text without its blanks and the bytes that count as none."""
    return _GAP.sub("", text)


@dataclass(slots=True)
class _Scan:
    """Takes the comments out of a line: ``code`` has the line's length, with blanks where they stood."""

    line: str
    first: int
    semicolon: Semicolon
    nesting: bool
    code: str = ""
    comments: list[Comment] = field(default_factory=list)
    unclosed: Comment | None = None
    block_ends: list[int] = field(default_factory=list)
    remarks: list[tuple[int, Remark]] = field(default_factory=list)

    def __post_init__(self) -> None:
        pieces = [" " * self.first]
        position = self.first
        while (mark := _MARK.search(self.line, position)) is not None:
            end = self._take(mark[0], mark.start())
            pieces += (self.line[position : mark.start()], " " * (end - mark.start()))
            position = end
        pieces.append(self.line[position:])
        self.code = "".join(pieces)

    def _take(self, mark: str, start: int) -> int:
        if mark == "(":
            return self._comment(start)
        if mark == ";" and self.semicolon == "comment":
            return self._rest_of_line(start)
        if mark == ";":
            self.block_ends.append(start)
        elif not any(topic == "paren" for _, (topic, _) in self.remarks):
            self.remarks.append((start, ("paren", self._stray_parenthesis(start))))
        return start + 1

    def _comment(self, start: int) -> int:
        end = self._closing(start)
        comment = Comment(self.line[start + 1 : (end or len(self.line) + 1) - 1], start, end or len(self.line))
        self.comments.append(comment)
        if end is None:
            self.unclosed = comment
        return comment.end

    def _closing(self, start: int) -> int | None:
        depth = 0
        for parenthesis in _PARENTHESIS.finditer(self.line, start):
            if parenthesis[0] == ")":
                depth -= 1
            elif self.nesting or depth == 0:
                depth += 1
            if depth == 0:
                return parenthesis.end()
        return None

    def _rest_of_line(self, start: int) -> int:
        text = self.line[start + 1 :]
        if text.strip():
            self.comments.append(Comment(text, start, len(self.line)))
        if _READS_AS_WORDS.fullmatch(without_gaps(text).upper()):
            message = f"'{text.strip()}' behind ; was read as a comment; where ; ends a block it would be run"
            self.remarks.append((start, ("semicolon", message)))
        return len(self.line)

    def _stray_parenthesis(self, start: int) -> str:
        if any("(" in comment.text for comment in self.comments):
            return f"the ) in column {start + 1} is left over: the comment ended at the first )"
        return f"the ) in column {start + 1} ends no comment; it was left out"


def _close_up(code: str, start: int, end: int, scan: _Scan | None = None) -> CleanCode:
    text = code[start:end]
    columns: Sequence[int] = range(start, end)
    remarks: tuple[Remark, ...] = ()
    if _GAP.search(text) is not None:
        remarks = _split_number(text)
        columns = [column for column, character in enumerate(text, start) if character not in _GAPS]
        text = without_gaps(text)
    if text.isascii():  # elsewhere upper case may change the length; such a block is at fault anyway
        text = text.upper()
    if scan is None:
        return CleanCode(text, columns, remarks=remarks)
    comments = tuple(comment for comment in scan.comments if start <= comment.start < end)
    remarks += tuple(remark for column, remark in scan.remarks if start <= column < end)
    return CleanCode(text, columns, comments, remarks, scan.unclosed if scan.unclosed in comments else None)


def _split_number(text: str) -> tuple[Remark, ...]:
    split = _SPLIT_NUMBER.search(text)
    if split is None:
        return ()
    start, end = split.span()
    while start and text[start - 1] in _NUMBER_OR_GAP:
        start -= 1
    while end < len(text) and text[end] in _NUMBER_OR_GAP:
        end += 1
    written = text[max(start - 1, 0) : end].strip()
    return (("blank-in-number", f"'{written}' holds a blank inside a number; it was read as {without_gaps(written)}"),)
