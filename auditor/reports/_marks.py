"""Where in the program's line a finding points: columns of the words at fault."""

from __future__ import annotations

from auditor.findings import Finding
from auditor.parse.blocks import Block, ProgramText

Span = tuple[int, int]


def block_at(text: ProgramText, line: int) -> Block | None:
    """The block on that line (1-based)."""
    if 1 <= line <= len(text.blocks) and text.blocks[line - 1].line == line:
        return text.blocks[line - 1]
    return next((block for block in text.blocks if block.line == line), None)


def spans(finding: Finding, block: Block | None) -> tuple[Span, ...]:
    """Columns (0-based, end excluded) of the words the finding names; empty when the line holds none of them.

    A letter names all words of that address, a whole word ("G90") itself alone.
    """
    if block is None:
        return ()
    named = {word.upper() for word in finding.words}
    marked = [
        (word.start, word.end)
        for word in block.words
        if word.letter.upper() in named or block.text[word.start : word.end].upper() in named
    ]
    if not marked and block.fault is not None and finding.check == "not-understood":
        marked = [(block.fault.start, max(block.fault.end, block.fault.start + 1))]
    return tuple(sorted(marked))


def column(finding: Finding, text: ProgramText) -> int:
    """The 1-based column to point at: the first word at fault, else the first sign of the block."""
    block = block_at(text, finding.line)
    marked = spans(finding, block)
    if marked:
        return marked[0][0] + 1
    line = "" if block is None else block.text
    return len(line) - len(line.lstrip()) + 1
