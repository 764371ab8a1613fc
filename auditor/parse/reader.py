"""A program file to its Blocks: every line is read on its own, and a bad one stops nothing."""

from __future__ import annotations

import hashlib
import re
from bisect import bisect_right
from collections.abc import Iterator
from os import PathLike, fspath
from pathlib import Path
from typing import NamedTuple

from auditor.declared.control_settings import choice, switch
from auditor.declared.model import Control
from auditor.errors import Fault, ProgramError
from auditor.parse import faults
from auditor.parse.blocks import Block, Opaque, ProgramText, Statement, SyntaxFault, TextNote, Word
from auditor.parse.clean import CleanCode, Semicolon, clean
from auditor.parse.decode import decode, split_lines
from auditor.parse.grammar import UnreadableError, begins_statement, read_statement, read_words
from auditor.parse.sections import is_mark, sections

_HEAD = re.compile(
    r"(?:/(?P<skip>[1-9]?))?"
    r"(?:[O:](?P<program>[0-9]{1,8})(?![0-9.])|<(?P<name>[^<>]+)>)?"
    r"(?:N(?P<number>[0-9]{1,8})(?![0-9.]))?"
)
_SKIP = re.compile("/(?P<skip>[1-9]?)")  # tolerated behind the block number
_NAMED_CALL = re.compile(r".*(?:M0*1?98|G0*6[56])<(?P<name>[^<>]+)>")
_DATA_OUTPUT = re.compile("DPRNT|BPRNT|POPEN|PCLOS")
_PLAIN_NUMBER = re.compile(r"[Nn]([0-9]{1,8})(?=[ \t]*[A-MP-Za-mp-z])")
_TITLE = "a title without parentheses behind the % was left out; some controls refuse it"


def read_program(path: str | PathLike[str], control: Control) -> ProgramText:
    """Read a program file the way a control reads it. What is wrong inside it stands in its blocks and notes.

    Raises `ProgramError` when the file cannot be opened at all.
    """
    try:
        data = Path(path).read_bytes()
    except (OSError, ValueError) as problem:
        reason = getattr(problem, "strerror", None) or str(problem)
        fault = Fault("the program cannot be opened", file=fspath(path), found=reason, wanted="a readable text file")
        raise ProgramError(fault) from None
    semicolon: Semicolon = "comment" if choice(control, "semicolon") == "comment" else "end of block"
    return parse_text(data, fspath(path), semicolon=semicolon, comment_nesting=switch(control, "nested_comments"))


def parse_text(
    data: bytes | str, path: str = "<text>", *, semicolon: Semicolon = "comment", comment_nesting: bool = False
) -> ProgramText:
    """Read a program from its bytes or its text.

    ``semicolon`` says whether ``;`` opens a comment or ends a block, ``comment_nesting`` whether
    parentheses inside a comment are counted.

    >>> program = parse_text("N10 G1 X40. Z-12.5 F.2 (ROUGH)")
    >>> [word.letter for word in program.blocks[0].words], program.blocks[0].label
    (['G', 'X', 'Z', 'F'], 'N10')
    """
    raw = data if isinstance(data, bytes) else data.encode("utf-8", errors="surrogatepass")
    text, notes = decode(data)
    lines, more = split_lines(text)
    reader = _Reader(lines, semicolon, comment_nesting)
    blocks = tuple(reader.blocks())
    found = sorted((*notes, *more, *reader.notes), key=lambda note: note.line)
    return ProgramText(path, hashlib.sha256(raw).hexdigest(), tuple(lines), blocks, tuple(found))


class _Reader:
    def __init__(self, lines: list[str], semicolon: Semicolon, nesting: bool) -> None:
        self.lines = lines
        self.semicolon: Semicolon = semicolon
        self.nesting = nesting
        self.notes: list[TextNote] = []
        # Programs repeat themselves: what was read once in the same columns is not read again.
        self.known: dict[tuple[int, str], list[_Reading]] = {}
        self.closings = [index for index, line in enumerate(lines, start=1) if ")" in line]

    def blocks(self) -> Iterator[Block]:
        parts = sections(self.lines)
        self.notes.extend(parts.notes)
        for index in parts.data:
            for block in self._line(index + 1, self.lines[index], parts.closing.get(index)):
                if block.fault is not None and index in parts.titles:
                    self.notes.append(TextNote("comment", block.line, _TITLE))
                else:
                    yield block

    def _line(self, line: int, text: str, end: int | None) -> Iterator[Block]:
        if len(text) > faults.LONGEST_LINE:
            yield Block(line, text, fault=faults.long_line(text))
            return
        # The block number goes first, so that lines that differ in nothing else are known.
        front = _PLAIN_NUMBER.match(text)
        first = front.end() if front else text.index("%") + 1 if is_mark(text) else 0
        key = (first, text[first:end])
        readings = self.known.get(key)
        if readings is None:
            codes = clean(text[:end], first, self.semicolon, self.nesting)
            readings = self.known[key] = [_read(code, text) for code in codes]
        number = int(front[1]) if front else None
        for reading in readings:
            if not reading.is_empty or number is not None:
                yield self._block(reading, line, text, number)
            number = None

    def _block(self, reading: _Reading, line: int, text: str, number: int | None) -> Block:
        code, head, content = reading.code, reading.head, reading.content
        for topic, message in code.remarks:
            self.notes.append(TextNote(topic, line, message))
        if code.unclosed is not None:
            later = bisect_right(self.closings, line)
            closing = self.closings[later] if later < len(self.closings) else None
            content = _Content(fault=faults.unclosed_comment(code.unclosed, line, closing))
        return Block(
            line,
            text,
            content.words,
            content.statement,
            head.number if number is None else number,
            head.program,
            head.skip,
            code.comments,
            content.fault,
            content.called,
        )


class _Head(NamedTuple):
    """What stands in front of the words: ``/n O N /n``, and the length of it."""

    length: int = 0
    skip: int | None = None
    program: int | str | None = None
    number: int | None = None


class _Content(NamedTuple):
    """What the rest of the block says."""

    words: tuple[Word, ...] = ()
    statement: Statement | None = None
    called: str | None = None
    fault: SyntaxFault | None = None


class _Reading(NamedTuple):
    """What a piece of a line reads as, on whichever line it stands."""

    code: CleanCode
    head: _Head
    content: _Content

    @property
    def is_empty(self) -> bool:
        """Blank lines are no blocks; a lone comment or block number is one."""
        return not (self.code.text or self.code.comments)


_NO_HEAD, _NO_CONTENT = _Head(), _Content()


def _read(code: CleanCode, line: str) -> _Reading:
    head = _read_head(code.text)
    if head.length == len(code.text):
        return _Reading(code, head, _NO_CONTENT)
    return _Reading(code, head, _read_content(code.behind(head.length), line))


def _read_head(text: str) -> _Head:
    found = _HEAD.match(text)
    if found is None or not found[0]:
        return _NO_HEAD
    length, skip = found.end(), found["skip"]
    if skip is None and found["number"] and (behind := _SKIP.match(text, length)):
        length, skip = behind.end(), behind["skip"]
    return _Head(
        length,
        None if skip is None else int(skip or 1),
        found["name"] if found["program"] is None else int(found["program"]),
        None if found["number"] is None else int(found["number"]),
    )


def _read_content(code: CleanCode, line: str) -> _Content:
    if _DATA_OUTPUT.match(code.text):
        return _Content(statement=Opaque(line[code.start(0) : code.end(len(code.text))]))
    fault = faults.fault_before_reading(code, line)
    if fault is not None:
        return _Content(fault=fault)
    called = None
    if "<" in code.text and (call := _NAMED_CALL.match(code.text)):
        called = call["name"]
        code = code.without(call.start("name") - 1, call.end("name") + 1)
    try:
        if begins_statement(code.text):
            return _Content(statement=read_statement(code.text))
        return _Content(_words(code), called=called)
    except UnreadableError as stopped:
        from auditor.parse.diagnosis import fault_at  # most programs have no fault

        return _Content(fault=fault_at(code, stopped.position))


def _words(code: CleanCode) -> tuple[Word, ...]:
    """Back to front, because a word ends where the next begins."""
    words = []
    columns, end = code.columns, len(code.text)
    for letter, value, start in reversed(read_words(code.text)):
        words.append(Word(letter, value, columns[start], columns[end - 1] + 1))
        end = start
    return tuple(reversed(words))
