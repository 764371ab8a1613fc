"""What the comments of a program say, and which tool each of them is about."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, replace

from auditor.declared.model import Control
from auditor.draft.guesses import remark_text
from auditor.draft.sizes import upper
from auditor.draft.vocabulary import MATERIAL_LABELS, STICK_OUT_LABELS, STOCK_LABELS, TOOL_LABELS, holds
from auditor.interpret.toolwords import read_tool_word
from auditor.parse.blocks import Block, Number, ProgramText

HEADING = 3  # lines a heading may stand above its tool call
_LABELS = "|".join(re.escape(word) for word in sorted(TOOL_LABELS, key=len, reverse=True))
_CODE = re.compile(r"/?(?:N\d+ ?)?[GM]\d{1,3}(?![A-Z])")  # a block taken out by brackets says nothing about tools
_MARK = re.compile(rf"(?<![A-Z0-9])(?:T|(?:{_LABELS})(?![A-Z]))\.?[ :#=-]*(?<!\.)(\d{{1,4}})(?![\d/]|[.,]\d)")

_NUMBER_ALONE = re.compile(r"(?:(?:OFFSET|OFF|OFS|KORREKTUR|CORRECTEUR|CORRETTORE|CORRECTOR)?[ :#=.-]*\d*)")
_OF_WORK = (*MATERIAL_LABELS, *STOCK_LABELS, *STICK_OUT_LABELS)


@dataclass(frozen=True, slots=True)
class Saying:
    """A comment, or the part of one that is about one tool."""

    line: int
    text: str  # upper case without accents
    quote: str  # the comment as it stands, short enough to be quoted
    tool: int | None = None
    marked: bool = False  # the comment itself names the tool, or stands in the block that calls it

    @property
    def place(self) -> str:
        """Where it stands, to be put behind a guess."""
        return f"({self.quote}) in line {self.line}"


def sayings(text: ProgramText, tools: Mapping[int, int]) -> list[Saying]:
    """Every comment; ``tools`` are the numbers the program calls."""
    calls = _calls(text.blocks)
    found: list[Saying] = []
    heading: int | None = None  # the tool of a comment that says no more than its number
    for index, block in enumerate(text.blocks):
        heading = None if block.words else heading
        for comment in block.comments:
            said, quote = upper(comment.text), _short(remark_text(comment.text))
            if said and not _CODE.match(said):
                near = None if block.program is not None else _tool_near(text.blocks, index, calls)  # a title
                parts = list(_parts(Saying(block.line, said, quote, near, marked=index in calls), tools))
                if heading is not None and not parts[0].marked and not holds(said, _OF_WORK):
                    parts = [replace(parts[0], tool=heading, marked=True)]
                bare = len(parts) == 1 and parts[0].marked and _NUMBER_ALONE.fullmatch(parts[0].text)
                heading = parts[0].tool if bare and not block.words else None
                found += parts
    return found


def _short(text: str, most: int = 60) -> str:
    return text if len(text) <= most else f"{text[: most - 3].rstrip()}..."


def _parts(whole: Saying, tools: Mapping[int, int]) -> Iterator[Saying]:
    """A comment that lists tools falls into one part a tool."""
    said, quote, line = whole.text, whole.quote, whole.line
    marks = [(match, number) for match in _MARK.finditer(said) if (number := _number(match[1])) in tools]
    if not marks:
        yield whole
        return
    head = said[: marks[0][0].start()].strip(" -:*=")
    if head:
        yield Saying(line, head, quote, None)
    ends = [match.start() for match, _ in marks[1:]] + [len(said)]
    for (match, number), end in zip(marks, ends, strict=True):
        own = quote if len(marks) == 1 and not head else _short(said[match.start() : end].strip(" -"))
        yield Saying(line, _behind(said[match.end() : end]), own, number, marked=True)


def _behind(text: str) -> str:
    """What follows the number of a tool, without the signs between, but with the point of .125W."""
    return re.sub(r"^(?:[ :=-]|\.(?!\d))+|[ :.=-]+$", "", text)


def _number(digits: str) -> int:
    """The tool of a T word as a comment quotes it: T1, T01, T101, T0101."""
    return int(digits[:-2]) if len(digits) > 2 else int(digits)


def _calls(blocks: Sequence[Block]) -> dict[int, int]:
    """Position of every block that calls a tool, and the tool."""
    found = {}
    for index, block in enumerate(blocks):
        for word in block.words:
            if word.letter == "T" and isinstance(word.value, Number):
                tool = read_tool_word(word.value, Control(), ()).tool
                if tool is not None:
                    found[index] = tool
    return found


def _tool_near(blocks: Sequence[Block], index: int, calls: Mapping[int, int]) -> int | None:
    """The tool called in the block, right below it, or above it with no motion yet; else none."""
    if index in calls:
        return calls[index]
    for later in range(index + 1, min(index + 1 + HEADING, len(blocks))):
        if later in calls:
            return calls[later]
        if _moves(blocks[later]):
            break
    for earlier in range(index - 1, -1, -1):
        if earlier in calls:
            return calls[earlier]
        if _moves(blocks[earlier]):
            break
    return None


def _moves(block: Block) -> bool:
    return any(word.letter in ("X", "Z", "U", "W") for word in block.words)
