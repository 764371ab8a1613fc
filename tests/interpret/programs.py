"""Program texts interpreted for a plain declared lathe: what the tests of this folder share."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from auditor.declared.model import Control, Job, Machine, Material, Point, Tool, Workholding, Workpiece
from auditor.interpret import interpret
from auditor.interpret.moves import Interpretation, Kind, Move
from auditor.parse import parse_text
from auditor.parse.blocks import ProgramText

STEEL = Material("C45", "P", "C45", "test", "declared", 1500.0, 0.25)
TURNING = Tool(1, "T1", "turning", nose_radius=0.8, tip=3)
LETTERS = {Kind.RAPID: "R", Kind.FEED: "F", Kind.DRILL: "F", Kind.THREAD: "T"}
Row = tuple[str, float | None, float | None]


def declared(
    control: Control | None = None,
    tools: Mapping[int, Tool] | None = None,
    *,
    start: Point | None = None,
    fixed: Point | None = None,
    unattended: bool = False,
    program: str = "part.nc",
) -> Job:
    """A job with a machine of 4000 rpm; ``fixed`` is home, second home and machine zero at once."""
    machine = Machine(
        "lathe", 4000.0, ((1000.0, 15.0),), 1000.0, tool_change=start, home=fixed, second_home=fixed, machine_zero=fixed
    )
    return Job(
        None,
        None,
        program,
        control or Control(system_declared=True, units="mm"),
        machine,
        Workholding("chuck", "chuck", 90.0),
        Workpiece(STEEL, (), 100.0, 60.0),
        {1: TURNING} if tools is None else tools,
        unattended=unattended,
    )


def carried_out(text: str | ProgramText, job: Job | None = None, **control: Any) -> Interpretation:
    """The interpretation of a text; keywords declare the control."""
    program = parse_text(text) if isinstance(text, str) else text
    if job is None:
        values: dict[str, Any] = {"system_declared": True, "units": "mm", **control}
        job = declared(Control(**values))
    return interpret(program, job)


def row(move: Move) -> Row:
    """Kind letter, X as a diameter, Z: how the fixtures write a move."""
    kind = LETTERS.get(move.kind) or ("CW" if move.clockwise else "CCW")
    return kind, None if move.end_r is None else 2 * move.end_r, move.end_z


def rows(found: Interpretation) -> list[Row]:
    """All moves as rows."""
    return [row(move) for move in found.moves]


def topics(found: Interpretation) -> set[str]:
    """The topics of all remarks."""
    return {remark.topic for remark in found.remarks}


def not_audited(found: Interpretation) -> list[int]:
    """Lines of the blocks not audited."""
    return [entry.line for entry in found.not_audited]
