"""A program file to its Blocks: every line is read on its own, and a bad one stops nothing."""

from __future__ import annotations

import hashlib
import re
from bisect import bisect_right
from collections.abc import Iterator
from dataclasses import dataclass, replace
from os import PathLike, fspath
from pathlib import Path

from auditor.errors import Fault, ProgramError
from auditor.parse import faults
from auditor.parse.blocks import Block, Comment, Opaque, ProgramText, Statement, SyntaxFault, TextNote, Word
from auditor.parse.clean import CleanCode, Remark, Semicolon, clean
from auditor.parse.decode import decode, split_lines
from auditor.parse.grammar import ComputedWord, UnreadableError, begins_statement, read_statement, read_words, split_word
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


def read_program(
    path: str | PathLike[str], *, semicolon: Semicolon = "comment", comment_nesting: bool = False
) -> ProgramText:
    """Read a program file. What is wrong inside it stands in its blocks and notes.

    Raises `ProgramError` when the file cannot be opened at all.
    """
    try:
        data = Path(path).read_bytes()
    except (OSError, ValueError) as problem:
        reason = getattr(problem, "strerror", None) or str(problem)
        fault = Fault("the program cannot be opened", file=fspath(path), found=reason, wanted="a readable text file")
        raise ProgramError(fault) from None
    return parse_text(data, fspath(path), semicolon=semicolon, comment_nesting=comment_nesting)


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
            for block in self._line(index + 1, self.lines[index]):
                if block.fault is not None and index in parts.titles:
                    self.notes.append(TextNote("comment", block.line, _TITLE))
                else:
                    yield block

    def _line(self, line: int, text: str) -> Iterator[Block]:
        if len(text) > faults.LONGEST_LINE:
            yield Block(line, text, fault=faults.long_line(text))
            return
        # The block number goes first, so that lines that differ in nothing else are known.
        front = _PLAIN_NUMBER.match(text)
        first = front.end() if front else text.index("%") + 1 if is_mark(text) else 0
        key = (first, text[first:])
        readings = self.known.get(key)
        if readings is None:
            codes = clean(text, first, self.semicolon, self.nesting)
            readings = self.known[key] = [_read(code, text) for code in codes]
        number = int(front[1]) if front else None
        for reading in readings:
            if not reading.is_empty or number is not None:
                yield self._block(reading, line, text, number)
            number = None

    def _block(self, reading: _Reading, line: int, text: str, number: int | None) -> Block:
        for topic, message in reading.remarks:
            self.notes.append(TextNote(topic, line, message))
        if reading.unclosed is not None:
            later = bisect_right(self.closings, line)
            closing = self.closings[later] if later < len(self.closings) else None
            fault = faults.unclosed_comment(reading.unclosed, line, closing)
            reading = replace(reading, words=(), statement=None, called=None, fault=fault)
        return Block(
            line,
            text,
            reading.words,
            reading.statement,
            reading.number if number is None else number,
            reading.program,
            reading.skip,
            reading.comments,
            reading.fault,
            reading.called,
        )


@dataclass(frozen=True, slots=True)
class _Reading:
    """What a piece of a line reads as, on whichever line it stands."""

    comments: tuple[Comment, ...]
    remarks: tuple[Remark, ...]
    unclosed: Comment | None
    is_empty: bool
    number: int | None = None
    program: int | str | None = None
    skip: int | None = None
    called: str | None = None
    words: tuple[Word, ...] = ()
    statement: Statement | None = None
    fault: SyntaxFault | None = None


def _read(code: CleanCode, line: str) -> _Reading:
    reading = _Reading(code.comments, code.remarks, code.unclosed, not (code.text or code.comments))
    text = code.text
    head = _HEAD.match(text)
    if not text or head is None:
        return reading
    position = head.end()
    skip = head["skip"]
    if skip is None and head["number"] and (behind := _SKIP.match(text, position)):
        skip, position = behind["skip"], behind.end()
    program = head["name"] if head["program"] is None else int(head["program"])
    reading = replace(
        reading,
        skip=None if skip is None else int(skip or 1),
        program=program,
        number=None if head["number"] is None else int(head["number"]),
    )
    return _read_rest(reading, code.behind(position), line)


def _read_rest(reading: _Reading, code: CleanCode, line: str) -> _Reading:
    if _DATA_OUTPUT.match(code.text):
        return replace(reading, statement=Opaque(line[code.start(0) : code.end(len(code.text))]))
    fault = faults.fault_before_reading(code, line)
    if fault is not None:
        return replace(reading, fault=fault)
    call = _NAMED_CALL.match(code.text)
    if call is not None:
        reading = replace(reading, called=call["name"])
        code = code.without(call.start("name") - 1, call.end("name") + 1)
    try:
        if begins_statement(code.text):
            return replace(reading, statement=read_statement(code.text))
        return replace(reading, words=_words(code))
    except UnreadableError as stopped:
        return replace(reading, fault=faults.fault_at(code, stopped.position))


def _words(code: CleanCode) -> tuple[Word, ...]:
    """Back to front, because a word ends where the next begins."""
    words = []
    end = len(code.text)
    for item in reversed(read_words(code.text) if code.text else ()):
        if isinstance(item, ComputedWord):
            start, letter, value = item.start, item.letter, item.value
        else:
            start = item.start_pos or 0
            letter, value = split_word(item)
        words.append(Word(letter, value, code.columns[start], code.columns[end - 1] + 1))
        end = start
    return tuple(reversed(words))
