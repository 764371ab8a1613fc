"""Constant surface speed without a limit: how fast will the work turn near the centre?

What
    Looks at every stretch under constant surface speed (G96) that has no programmed speed limit, or one above the
    machine's or the chuck's, and at a change between G96 and G97 without a new S.

Why
    Under G96 the speed rises as the tool goes inwards, without bound at the centre. Without a limit the spindle
    runs up to its maximum, whatever the chuck, the bar or the grip can bear. A speed word read in the wrong mode
    turns metres a minute into revolutions.

Formula and source
    Speed asked for = 1000 x surface speed / (pi x diameter). Common practice: a limit (G50 S or G92 S) stands
    before the first G96 and is not above what chuck and machine are good for. Stop: the path leads to a diameter
    at which the spindle reaches the machine's or the chuck's limit. Review: it has no limit but does not get
    there, or the limit is above the machine's or the chuck's (spindle-speed says so where the work really turns
    that fast). Nearer the centre than 0.5 mm the speed asked for is given for that radius.

Remedy
    A block G50 S (G92 S in systems B and C) with the lowest of the machine's and the chuck's limit before G96.
"""

from __future__ import annotations

import math
from collections.abc import Iterator

from auditor.checks import spindle_speed
from auditor.checks._remarks import finding_of, remarks_of
from auditor.checks._turning import asked_speed
from auditor.checks._words import x_word
from auditor.findings import Finding, Level, NotJudged, Run
from auditor.interpret.moves import Move, Remark

CHECK = "speed-unclamped"
LIMITS = ()


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Unlimited surface speed, limits that limit nothing, and S read in the wrong mode."""
    told_of = {finding.line for finding in spindle_speed.judge(run) if isinstance(finding, Finding)}
    for remark in remarks_of(run, CHECK):
        if remark.topic != "clamp-missing" and not (remark.topic == "clamp-too-high" and remark.line in told_of):
            yield finding_of(CHECK, Level.REVIEW, remark)
    told = [remark for remark in remarks_of(run, CHECK) if remark.topic == "clamp-missing"]
    for start, moves in _unlimited_stretches(run):
        fastest = max(moves, key=_asked)
        said = next((remark for remark in told if remark.line <= start.line), None)
        yield _unlimited(run, start, fastest, said)


def _unlimited_stretches(run: Run) -> Iterator[tuple[Move, list[Move]]]:
    """Runs of consecutive moves under G96 without a limit, with the move that opens each."""
    stretch: list[Move] = []
    for move in run.path.moves:
        if move.spindle.mode == "surface" and move.spindle.clamp is None and move.spindle.direction:
            stretch.append(move)
        elif stretch:
            yield stretch[0], stretch
            stretch = []
    if stretch:
        yield stretch[0], stretch


def _asked(move: Move) -> float:
    """The speed, rpm, that surface speed asks for at the smallest radius of the move."""
    return asked_speed(move)[0] or 0.0


def _unlimited(run: Run, start: Move, fastest: Move, remark: Remark | None) -> Finding:
    limit, most = _lowest(run), run.job.machine.speed_limit
    asked, at = asked_speed(fastest)
    asked = asked or 0.0
    level = Level.STOP if asked >= limit else Level.REVIEW
    place = x_word(run, at) if at is not None else "its smallest diameter"
    runs = f"the spindle runs up to {most:.0f}, all the machine has" if asked > most else "the spindle follows"
    message = f"Constant surface speed runs without a speed limit: at {place} it asks for {asked:.0f} rpm" \
              f"{' and more' if at == 0.0 else ''}, and {runs}. The least of the machine's and the chuck's limits as " \
              f"declared is {limit:.0f} rpm."
    line, block = (remark.line, remark.block) if remark else (start.line, start.block)
    return Finding(
        CHECK, level, line, block, fastest.tool, message, at=fastest.end, value=asked, limit=limit, unit="rpm",
        words=("S",), move=start.index,
        remedy=f"A block G50 S{math.floor(limit):d} before it (G92 in systems B and C).",
    )


def _lowest(run: Run) -> float:
    chuck = run.job.workholding.speed_limit
    machine = run.job.machine.speed_limit
    return machine if chuck is None else min(machine, chuck)
