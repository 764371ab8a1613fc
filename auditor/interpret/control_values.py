"""System variables whose values follow from the text: modal feed, speed, tool, and the position."""

from __future__ import annotations

from collections.abc import Callable, Mapping

from auditor.interpret.cycles.call import INCH
from auditor.interpret.run import Run

Reader = Callable[[], float | None]


def known_control_values(run: Run) -> Mapping[int, Reader]:
    """Readers by variable number: #4109 F, #4119 S, #4120 T, #5001 and #5041 X, #5002 and #5042 Z."""
    return {
        4109: lambda: _in_program_unit(run, run.state.feed.value),
        4119: lambda: run.state.spindle.value,
        4120: lambda: _tool_word(run),
        5001: lambda: _x(run),
        5002: lambda: _z(run),
        5041: lambda: _x(run),
        5042: lambda: _z(run),
    }


def _in_program_unit(run: Run, value: float | None) -> float | None:
    return value if value is None or not run.state.inch else value / INCH


def _x(run: Run) -> float | None:
    r = run.state.r
    factor = 2.0 if run.control.x_words == "diameter" else 1.0
    return None if r is None else _in_program_unit(run, (r - run.state.shift.r) * factor)


def _z(run: Run) -> float | None:
    z = run.state.z
    return None if z is None else _in_program_unit(run, z - run.state.shift.z)


def _tool_word(run: Run) -> float | None:
    tool = run.state.tool
    return None if tool.number is None or tool.offset is None else float(tool.number * 100 + tool.offset)
