"""The findings, in the order of the program: its own line, the figure, the situation, why, and the way out."""

from __future__ import annotations

from collections.abc import Sequence

from rich.cells import cell_len

from auditor.findings import Audit, Finding, Level
from auditor.reports._figures import figure
from auditor.reports._groups import groups
from auditor.reports._marks import Span, block_at, spans
from auditor.reports.screen.gauge import draw
from auditor.reports.screen.paper import COLOURS, Paper

_MARGIN = 4
_LINES_NAMED = 6


def write(paper: Paper, audit: Audit) -> None:
    """All findings that nobody accepted."""
    for group in groups(finding for finding in audit.findings if finding.accepted is None):
        paper.gap()
        first = group[0]
        _quote(paper, audit, first)
        if len(group) > 1:
            paper.paragraph(_also(group[1:]), margin=_MARGIN)
        if first.level is not Level.NOTE:
            _figure(paper, first)
            if first.situation:
                paper.paragraph(first.situation, margin=_MARGIN)
        paper.paragraph(first.message, margin=_MARGIN)
        if first.remedy:
            paper.paragraph(("Way out: ", "bold"), first.remedy, margin=_MARGIN)


def _also(others: Sequence[Finding]) -> str:
    lines = ", ".join(str(other.line) for other in others[:_LINES_NAMED])
    more = len(others) - _LINES_NAMED
    return f"also line {lines}" + (f" and {more} more" if more > 0 else "")


def _quote(paper: Paper, audit: Audit, finding: Finding) -> None:
    """The program's line with the words at fault underlined, and the name of the check."""
    block = block_at(audit.run.text, finding.line)
    lead = f"line {finding.line}   "
    room = paper.view.width - len(lead) - 2
    source, marked = _window(block.text if block else "", spans(finding, block), room)
    quoted = paper.quote(source)
    style = COLOURS[finding.level]
    paper.row((paper.sign(finding.level), style), " ", lead, (quoted, "bold"))
    tag = f"{finding.level} {finding.check}"
    under = _underline(quoted, marked, paper.sign("under"))
    column = len(lead) + 2 + cell_len(under) + 2
    if not under or column + len(tag) > paper.view.width:
        if under:
            paper.row(" " * (len(lead) + 2), (under, style))
        paper.row(" " * _MARGIN, (tag, style))
    else:
        paper.row(" " * (len(lead) + 2), (under, style), "  ", (tag, style))


def _window(source: str, marked: tuple[Span, ...], room: int) -> tuple[str, tuple[Span, ...]]:
    """The part of a long line that holds the first marked word; the marks move with it."""
    if len(source) <= room:
        return source, marked
    start = 0
    if marked and marked[0][1] > room:
        start = min(max(0, marked[0][0] - room // 3), len(source) - room)
    end = start + room
    kept = tuple((max(a, start) - start, min(b, end) - start) for a, b in marked if a < end and b > start)
    return source[start:end], kept


def _underline(quoted: str, marked: tuple[Span, ...], sign: str) -> str:
    covered = {index for start, end in marked for index in range(start, end)}
    line = "".join((sign if index in covered else " ") * cell_len(letter) for index, letter in enumerate(quoted))
    return line.rstrip()


def _figure(paper: Paper, finding: Finding) -> None:
    """The figure, its band where it is a prediction, its limit, the gauge and the share."""
    if finding.value is None:
        return
    words = figure(finding.value, finding.unit)
    if finding.band is not None:
        low, high = (_bare(edge, finding.unit) for edge in finding.band)
        words = f"predicted {words} ({low} to {high})"
    if finding.limit is None:
        paper.paragraph(words, margin=_MARGIN)
        return
    words += f", limit {figure(finding.limit, finding.unit)}"
    gauge = draw(paper, finding.value, finding.band, finding.limit)
    share = f"  {100.0 * finding.value / finding.limit:.0f} %" if finding.limit > 0.0 and finding.value >= 0.0 else ""
    text = paper.clean(words)
    if _MARGIN + cell_len(text) + 2 + len(gauge) + len(share) > paper.view.width:
        paper.row(" " * _MARGIN, text)
        text = ""
    paper.row(" " * _MARGIN, text, "  " if text else "", (gauge, COLOURS[finding.level]), share)


def _bare(value: float, unit: str | None) -> str:
    """The figure without its unit, which stands beside it already."""
    return figure(value, unit).removesuffix(f" {unit}")
