"""Spindle off or turning the wrong way: is the work turning into the edge?

What
    Looks at every cut for a spindle that stands still, and at the sense of rotation against the side the insert
    faces.

Why
    With the spindle still and feed a minute the tool is driven into the work and breaks; with feed a turn the
    machine waits for ever. With the wrong sense the work runs at the back of the edge: the insert is torn from
    its seat within a turn.

Formula and source
    Geometry: with the insert facing up on a front turret, or down on one behind, the work must turn forward
    (M3); in the other two cases backward (M4). This is certain only when machine.turret and the tool's
    insert_faces are declared, then a wrong sense is a stop. Otherwise it is a question at most, since mountings
    differ: a backward spindle for a turning tool whose side is not declared, a right-hand drill under M4 or a
    left-hand one under M3 (a right-hand drill needs the sense that drives a right-hand screw into the work, which
    is M3 by ISO 6983, from memory). The hand of a turning tool says nothing about the sense.

Remedy
    M3 or M4 with a speed before the cut; or declare insert_faces so that the question goes away.
"""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from auditor.checks._judging import cutting_moves
from auditor.checks._remarks import finding_of, remarks_of
from auditor.checks._words import tool_name
from auditor.declared.model import Tool
from auditor.findings import Finding, Level, NotJudged, Run
from auditor.interpret.moves import Kind, Move

CHECK = "spindle-off"
LIMITS = ()


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Cuts with the spindle still, and cuts with it turning the wrong way."""
    asked: set[int] = set()
    stopped: set[int] = set()
    for index in np.flatnonzero(cutting_moves(run)):
        move = run.path.moves[int(index)]
        if move.kind is Kind.RAPID:
            continue
        if move.spindle.direction == 0:
            stopped.add(move.line)
            yield _still(run, move)
        elif move.tool is not None and move.tool not in asked and move.tool in run.job.tools:
            finding = _sense(run, move, run.job.tools[move.tool])
            if finding is not None:
                asked.add(move.tool)
                yield finding
    for remark in remarks_of(run, CHECK):
        if remark.line not in stopped:
            yield finding_of(CHECK, Level.REVIEW, remark)


def _still(run: Run, move: Move) -> Finding:
    waits = move.feed is not None and move.feed.mode == "rev"
    fate = "the machine waits for it for ever" if waits else "the tool is driven into work that does not turn"
    message = f"The spindle stands still in this cut: {fate}."
    return run.finding(CHECK, Level.STOP, move, message, at=move.start, remedy="M3 or M4 with S before this block.")


def _sense(run: Run, move: Move, tool: Tool) -> Finding | None:
    """A finding when the sense of rotation is wrong or cannot be known to be right."""
    turret = run.job.machine.turret
    name = tool_name(run, tool.number)
    runs = "M3" if move.spindle.direction > 0 else "M4"
    if tool.kind == "drilling" and tool.insert_faces is None:
        right = -1 if tool.hand == "left" else 1
        if move.spindle.direction != right:
            return run.finding(
                CHECK, Level.REVIEW, move, f"{name} is a {tool.hand}-hand drill, but the spindle runs {runs}: "
                "it would not cut.", remedy=f"{'M3' if right > 0 else 'M4'} for this tool.",
            )
        return None
    if turret is not None and tool.insert_faces is not None:
        right = 1 if (turret == "front") == (tool.insert_faces == "up") else -1
        if move.spindle.direction == right:
            return None
        wanted = "M3" if right > 0 else "M4"
        return run.finding(
            CHECK, Level.STOP, move, f"The work turns against the back of the edge: {name} faces {tool.insert_faces} "
            f"on a turret {'in front' if turret == 'front' else 'behind'} and needs {wanted}, the spindle runs {runs}.",
            remedy=f"{wanted} for this tool.",
        )
    if move.spindle.direction < 0:
        return run.finding(
            CHECK, Level.REVIEW, move, f"The spindle runs backward (M4) for {name}; whether its insert faces the right "
            "way for that is not declared.", remedy="Look at the turret, then declare machine.turret and insert_faces.",
        )
    return None
