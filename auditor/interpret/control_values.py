"""System variables whose values follow from the text: codes in force, feed, speed, tool, and the position."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from functools import partial

from auditor.interpret.cycles.call import INCH
from auditor.interpret.run import Run
from auditor.interpret.state import State
from auditor.interpret.systems import number_of

Reader = Callable[[], float | None]
_MODAL: Mapping[int, Callable[[State], str | None]] = {  # modal groups by number: the function in force
    1: lambda state: state.motion,
    2: lambda state: "surface speed" if state.spindle.mode == "surface" else "rotation speed",
    3: lambda state: "absolute" if state.absolute else "incremental",
    5: lambda state: "feed per revolution" if state.feed.mode == "rev" else "feed per minute",
    6: lambda state: "inch" if state.inch else "metric",
    7: lambda state: f"compensation {state.compensation}",
    10: lambda state: state.drilling or "drilling off",
    14: lambda state: state.work_zero or "work zero 1",
    16: lambda state: state.plane,
}

_SIDES = {"compensation left": "compensation right", "compensation right": "compensation left"}  # as written


def known_control_values(run: Run) -> Mapping[int, Reader]:
    """Readers by variable number: #4001 to #4014 codes in force, #4109 F, #4119 S, #4120 T, #5001 X, #5002 Z …"""
    return {
        **{4000 + group: partial(_code_in_force, run, group) for group in _MODAL},
        4109: lambda: _in_program_unit(run, run.state.feed.value),
        4119: lambda: run.state.spindle.value,
        4120: lambda: _tool_word(run),
        5001: lambda: _x(run),
        5002: lambda: _z(run),
        5041: lambda: _x(run),
        5042: lambda: _z(run),
    }


def _code_in_force(run: Run, group: int) -> float | None:
    """The G number in force of a modal group; macros keep it and restore it at their end."""
    function = _MODAL[group](run.state)
    if run.control.arcs == "mirrored":
        function = _SIDES.get(function or "", function)
    return number_of(run.system, function or "")


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
