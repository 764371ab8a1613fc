"""The program as it stands in its file, with the blocks marked that something was found about."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import pairwise

from markupsafe import Markup, escape

from auditor.parse.blocks import Block, ProgramText
from auditor.reports._figures import harmless
from auditor.reports._marks import Span

_WHOLE = 6000  # lines up to which a program is shown whole
_AROUND = 4  # lines shown beside a marked one in a longer program


@dataclass(frozen=True, slots=True)
class Line:
    """One line; ``skipped`` lines before it are not shown."""

    number: int
    text: Markup
    level: str  # gravest level of its findings, "unread" for a block not audited, or ""
    findings: tuple[int, ...]
    skipped: int = 0


def listing(
    text: ProgramText, levels: Mapping[int, str], findings: Mapping[int, Sequence[int]],
    spans: Mapping[int, Sequence[Span]],
) -> Iterator[Line]:
    """The lines to show; ``levels``, ``findings`` and ``spans`` are by line number."""
    blocks = {block.line: block for block in text.blocks}
    last = 0
    for number in _shown(len(text.lines), levels):
        source = text.lines[number - 1]
        marked = painted(source, spans.get(number, ()), blocks.get(number))
        yield Line(number, marked, levels.get(number, ""), tuple(findings.get(number, ())), number - last - 1)
        last = number


def _shown(count: int, levels: Iterable[int]) -> Iterable[int]:
    if count <= _WHOLE:
        return range(1, count + 1)
    near = {near for line in levels for near in range(line - _AROUND, line + _AROUND + 1) if 1 <= near <= count}
    return sorted(near | set(range(1, 21)))


def painted(source: str, marked: Sequence[Span], block: Block | None) -> Markup:
    """A line with its comments set back and the words at fault marked."""
    comments = [(comment.start, comment.end) for comment in block.comments] if block is not None else []
    cuts = sorted({0, len(source), *(edge for span in (*marked, *comments) for edge in span if 0 < edge < len(source))})
    parts = []
    for start, end in pairwise(cuts):
        words = escape(harmless(source[start:end]))
        if any(low <= start < high for low, high in marked):
            words = Markup("<mark>{}</mark>").format(words)
        elif any(low <= start < high for low, high in comments):
            words = Markup("<i>{}</i>").format(words)
        parts.append(words)
    return Markup("").join(parts)
