"""Spindle speed: does the work turn faster than machine, chuck or grip allow?

What
    Compares the speed the program asks for with the machine's limit (fixed speed, G97), and the speed the spindle
    really reaches with the chuck's limit and with the speed at which flying jaws have lost two thirds of the grip.

Why
    Chuck jaws fly outwards: grip falls with the square of the speed. Above the chuck's limit its body may burst.
    These are the faults that throw a workpiece through the door.

Formula and source
    Jaw force lost = jaws x jaw mass x radius of its centre of mass x (2 pi n / 60)^2 (VDI 3106). It may take at
    most 0.67 of the grip set at standstill (EN 1550), which gives the permitted speed. What the cut itself needs
    of the grip is judged by chuck-grip. Grip gained by speed on an inside grip is not credited. Stop: over the
    limit. The limits of machine and chuck are those declared.

Remedy
    A programmed speed limit (G50 S or G92 S) at the lowest of the three, or a lower S.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

from auditor.checks._judging import threshold
from auditor.checks._turning import asked_speed, has_flying_jaws
from auditor.checks._words import x_word
from auditor.declared.model import Workholding
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Move
from auditor.mechanics.clamping import permitted_speed
from auditor.parse.blocks import Number

CHECK = "spindle-speed"
LIMITS = (
    Limit("grip_loss_share", 0.67, "", "published", "share of the grip that flying jaws may take (EN 1550)"),
)


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Every block that turns the work too fast."""
    holding = run.job.workholding
    bounds = [(run.job.machine.speed_limit, "the machine's limit (as declared)")]
    if holding.speed_limit is None:
        yield NotJudged(CHECK, "workholding.speed_limit is not declared: the chuck's limit is not checked")
    else:
        bounds.append((holding.speed_limit, "the chuck's limit (as declared)"))
    loss = permitted_by_grip(holding, threshold(run, LIMITS[0]))
    if loss is not None:
        bounds.append((loss, "the speed at which the jaws have lost two thirds of their grip (EN 1550)"))
    limit, whose = min(bounds)
    fastest: dict[tuple[str, float | None], tuple[float, Move]] = {}
    for move in run.path.moves:
        speed, cause = _speed(run, move), _cause(move)
        if speed is not None and speed > max(limit * (1.0 + 1e-9), fastest.get(cause, (0.0, move))[0]):
            fastest[cause] = (speed, move)
    for speed, move in fastest.values():
        yield _finding(run, move, speed, limit, whose)


def _cause(move: Move) -> tuple[str, float | None]:
    """What sets the speed: an S word under G97, the speed limit under constant surface speed."""
    spindle = move.spindle
    return spindle.mode, spindle.value if spindle.mode == "rpm" else spindle.clamp


def permitted_by_grip(holding: Workholding, share: float) -> float | None:
    """The speed, rpm, at which flying jaws have taken ``share`` of the grip; None without the declarations."""
    if not has_flying_jaws(holding) or holding.grip_force is None:
        return None
    if holding.jaw_mass is None or holding.jaw_radius is None:
        return None
    return float(
        permitted_speed(holding.grip_force, 0.0, holding.jaw_mass, holding.jaw_radius, holding.jaws, safety=1.0 / share)
    )


def _speed(run: Run, move: Move) -> float | None:
    """The speed asked for under G97, the speed reached under constant surface speed."""
    if not move.spindle.direction:
        return None
    if move.spindle.mode == "rpm":
        return move.spindle.value
    reached = float(run.prediction.moves.rpm_high[move.index])
    return reached if math.isfinite(reached) else None


def _speed_block(run: Run, move: Move, value: float | None) -> tuple[int, str | None]:
    """The block whose S word set that speed or limit, else the move's own."""
    for block in reversed(run.text.blocks[: move.line]):
        for word in block.words:
            if word.letter == "S" and isinstance(word.value, Number) and word.value.value == value:
                return block.line, block.label
    return move.line, move.block


def _finding(run: Run, move: Move, speed: float, limit: float, whose: str) -> Finding:
    _, cause = _cause(move)
    line, block = _speed_block(run, move, cause)
    message = f"The work turns at {speed:.0f} rpm, over {limit:.0f} rpm, {whose}{_how(run, move, line)}."
    return run.finding(
        CHECK, Level.STOP, move, message, value=speed, limit=limit, unit="rpm", words=("S",), line=line, block=block,
        remedy=f"Limit the speed before it: S{math.floor(limit):d} in the G50 or G92 block, or in S itself under G97.",
    )


def _how(run: Run, move: Move, line: int) -> str:
    """Where constant surface speed leads to that speed, and how much it asks for there."""
    asked, at = asked_speed(move)
    if move.spindle.mode != "surface" or asked is None or at is None:
        return ""
    place = f" in line {move.line}" if move.line != line else ""
    return f"; surface speed asks for {asked:.0f} rpm{' and more' if at == 0.0 else ''} at {x_word(run, at)}{place}"
