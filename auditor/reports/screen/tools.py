"""One line a tool: what it does, how deep, how fast, how hard, how long."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from auditor.declared.model import Machine
from auditor.findings import Audit
from auditor.reports._figures import duration, figure
from auditor.reports.screen.paper import Paper

Floats = NDArray[np.float64]


@dataclass(frozen=True, slots=True)
class ToolUse:
    """The largest figures of one tool over the program; None where it has none."""

    number: int
    name: str
    kind: str
    depth: float | None  # mm
    feed: float | None  # mm/rev
    speed: float | None  # m/min
    force: float | None  # N
    share: float | None  # of the power the spindle has at that speed
    time: float  # s


def uses(audit: Audit) -> tuple[ToolUse, ...]:
    """The tools in the order of their first move."""
    run = audit.run
    figures, loads = run.prediction.moves, run.prediction.loads
    tool_of = np.array([-1 if move.tool is None else move.tool for move in run.path.moves], dtype=np.int64)
    share = loads.motor_power / spindle_power(run.job.machine, loads.rpm)
    cutting = figures.cutting_time > 0.0
    found = []
    for number in dict.fromkeys(int(tool) for tool in tool_of if tool >= 0):
        mine = tool_of == number
        cuts = mine & cutting
        tool = run.job.tools.get(number)
        found.append(ToolUse(
            number=number, name="not declared" if tool is None else tool.name, kind="" if tool is None else tool.kind,
            depth=_largest(figures.depth[cuts]), feed=_largest(figures.feed_rev[cuts]),
            speed=_largest(figures.speed_high[cuts]), force=_largest(figures.cutting[cuts]),
            share=_largest(share[mine[loads.move]]), time=float(np.nansum(figures.time[mine])),
        ))
    return tuple(found)


def spindle_power(machine: Machine, rpm: Floats) -> Floats:
    """Motor power in kW that the spindle has at a speed: constant torque below the curve's first point."""
    speeds = np.array([point[0] for point in machine.power_curve])
    powers = np.array([point[1] for point in machine.power_curve])
    share = np.clip(rpm / speeds[0], 1e-9, 1.0)
    return np.asarray(np.interp(rpm, speeds, powers) * share, dtype=np.float64)


def _largest(values: Floats) -> float | None:
    finite = values[np.isfinite(values)]
    return float(finite.max()) if finite.size else None


def write(paper: Paper, audit: Audit) -> None:
    """The table of the tools."""
    found = uses(audit)
    if not found:
        return
    paper.gap()
    head = ("Tool: its largest", "does", "depth", "feed", "m/min", "force", "power", "time")
    _row(paper, head, style="bold")
    for use in found:
        name = use.name if use.name.startswith(f"T{use.number}") else f"T{use.number} {use.name}"
        share = "-" if use.share is None else f"{100.0 * use.share:.0f} %"
        _row(paper, (
            name, use.kind, _cell(use.depth, "mm", ".1f"), _cell(use.feed, "", ".2f"), _cell(use.speed, "", ".0f"),
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
