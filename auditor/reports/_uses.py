"""What each tool does in the program: its largest figures and its time."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from auditor.declared.model import Tool
from auditor.findings import Audit
from auditor.reports._shares import shares

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


def called(tool: Tool) -> str:
    """A tool as it is spoken of: station first."""
    return tool.name if tool.name.startswith(f"T{tool.number}") else f"T{tool.number} {tool.name}"


def uses(audit: Audit) -> tuple[ToolUse, ...]:
    """The tools in the order of their first move."""
    run = audit.run
    figures, loads = run.prediction.moves, run.prediction.loads
    tool_of = np.array([-1 if move.tool is None else move.tool for move in run.path.moves], dtype=np.int64)
    share = shares(run).spindle
    cutting = figures.cutting_time > 0.0
    found = []
    for number in dict.fromkeys(int(tool) for tool in tool_of if tool >= 0):
        mine = tool_of == number
        cuts = mine & cutting
        tool = run.job.tools.get(number)
        found.append(ToolUse(
            number=number, name=f"T{number} not declared" if tool is None else called(tool),
            kind="" if tool is None else tool.kind,
            depth=_largest(figures.depth[cuts]), feed=_largest(figures.feed_rev[cuts]),
            speed=_largest(figures.speed_high[cuts]), force=_largest(figures.cutting[cuts]),
            share=_largest(share[mine[loads.move]]), time=float(np.nansum(figures.time[mine])),
        ))
    return tuple(found)


def _largest(values: Floats) -> float | None:
    finite = values[np.isfinite(values)]
    return float(finite.max()) if finite.size else None
