"""A row a move, with the unit in every heading, for spreadsheets.

A text that a spreadsheet would take for a formula gets an apostrophe in front and stays a text.
"""

from __future__ import annotations

import csv
import io
from collections import defaultdict
from collections.abc import Iterator, Sequence

from auditor.findings import Audit
from auditor.interpret.moves import Move
from auditor.reports import Outcome, Unreadable, View
from auditor.reports._inert import one_line
from auditor.reports._rows import LARGEST, between, diameter, largest, number, provisional

Cell = str | float | int | None

HEADINGS = (
    "program", "line", "block", "tool", "kind", "from_x_mm", "from_z_mm", "to_x_mm", "to_z_mm", "feed_mm_per_rev",
    "spindle_low_rpm", "spindle_high_rpm", "cutting_speed_low_m_per_min", "cutting_speed_high_m_per_min", *LARGEST,
    "removed_mm3", "time_s", "provisional", "findings",
)
_FORMULA = ("=", "+", "-", "@", "\t", "\r")


def render(outcome: Outcome, view: View) -> str:
    """The rows of one program, without headings; an unreadable one has none."""
    if isinstance(outcome, Unreadable):
        return ""
    sheet = io.StringIO()
    csv.writer(sheet, lineterminator="\n").writerows([_safe(cell) for cell in row] for row in _rows(outcome))
    return sheet.getvalue()


def join(parts: Sequence[str], several: bool) -> str:
    """One sheet of all programs."""
    return ",".join(HEADINGS) + "\n" + "".join(parts)


def _rows(audit: Audit) -> Iterator[list[Cell]]:
    said: dict[int, list[str]] = defaultdict(list)
    for finding in audit.findings:
        if finding.move is not None:
            accepted = " (accepted)" if finding.accepted else ""
            said[finding.move].append(f"{finding.level} {finding.check}{accepted}")
    for row, move in enumerate(audit.run.path.moves):
        yield [audit.run.text.path, *_row(move, row, audit), "; ".join(said[row])]


def _row(move: Move, row: int, audit: Audit) -> list[Cell]:
    figures = audit.run.prediction.moves
    return [
        move.line, move.block, move.tool, str(move.kind),
        diameter(move.start_r), number(move.start_z), diameter(move.end_r), number(move.end_z),
        number(figures.feed_rev[row]),
        *(between(figures.rpm_low[row], figures.rpm_high[row]) or (None, None)),
        *(between(figures.speed_low[row], figures.speed_high[row]) or (None, None)),
        *largest(figures, row).values(),
        number(audit.run.simulation.removed[row]), number(figures.time[row]), int(provisional(move)),
    ]


def _safe(cell: Cell) -> Cell:
    if not isinstance(cell, str):
        return cell
    text = one_line(cell)
    return f"'{text}" if text.lstrip().startswith(_FORMULA) else text
