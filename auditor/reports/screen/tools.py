"""One line a tool: what it does, how deep, how fast, how hard, how long."""

from __future__ import annotations

from auditor.findings import Audit
from auditor.reports._figures import duration, figure
from auditor.reports._uses import uses
from auditor.reports.screen.paper import Paper


def write(paper: Paper, audit: Audit) -> None:
    """The table of the tools."""
    found = uses(audit)
    if not found:
        return
    paper.gap()
    head = ("Tool: its largest", "does", "depth", "feed", "m/min", "force", "power", "time")
    _row(paper, head, style="bold")
    for use in found:
        share = "-" if use.share is None else f"{100.0 * use.share:.0f} %"
        _row(paper, (
            use.name, use.kind, _cell(use.depth, "mm", ".1f"), _cell(use.feed, "", ".2f"), _cell(use.speed, "", ".0f"),
            figure(use.force, "N"), share, duration(use.time),
        ))


def _cell(value: float | None, unit: str, form: str) -> str:
    return "-" if value is None else f"{value:{form}} {unit}".rstrip()


def _row(paper: Paper, cells: tuple[str, ...], style: str = "") -> None:
    widths = (paper.view.width - 58, 9, 7, 5, 5, 7, 5, 11)
    fitted = (
        paper.fit(cell, width, right=column > 1)
        for column, (cell, width) in enumerate(zip(cells, widths, strict=True))
    )
    paper.row(("  " + " ".join(fitted), style))
