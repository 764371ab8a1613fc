"""Feed and spindle: feed modes, F, G96/G97, S, the speed limit, M3 M4 M5."""

from __future__ import annotations

import math
from typing import Literal

from auditor.declared.control_settings import amount
from auditor.interpret.cycles.call import INCH
from auditor.interpret.registry import Phase, m_code, modal, word
from auditor.interpret.run import Run
from auditor.interpret.travel import settle
from auditor.interpret.words import BlockWords
from auditor.parse.blocks import Number

FOOT = 0.3048  # m
_FEED_MODES: dict[str, Literal["rev", "min"]] = {"feed per minute": "min", "feed per revolution": "rev"}


@modal(Phase.FEED, "feed per minute", "feed per revolution")
def feed_mode(run: Run, words: BlockWords) -> None:
    """The feed mode; a feed that is not given again keeps its number and changes its meaning."""
    mode = next(function for function in reversed(words.functions) if function in _FEED_MODES)
    run.state.feed.mode = _FEED_MODES[mode]


@word(Phase.FEED)
def feed_word(run: Run, words: BlockWords) -> None:
    """F of the block, in mm per revolution or per minute."""
    number = words.number("F")
    if number is None or words.calls("dwell"):
        return
    feed = run.state.feed
    feed.value = read_feed(run, number)
    feed.line, feed.given_in, feed.certain = words.line, feed.mode, True


def read_feed(run: Run, number: Number) -> float:
    """An F word in mm; without a point it may count in the control's feed increments."""
    scale = INCH if run.state.inch else 1.0
    if number.has_point or run.control.whole_numbers == "units":
        return number.value * scale
    if run.state.feed.mode == "rev":
        return number.value * amount(run.control, "feed_increment") * scale
    return number.value * (0.01 * INCH if run.state.inch else 1.0)


@modal(Phase.SPEED, "surface speed")
def surface_speed(run: Run, words: BlockWords) -> None:
    """G96: S is a surface speed from here on."""
    spindle = run.state.spindle
    if spindle.mode == "rpm":
        spindle.mode, spindle.value = "surface", spindle.last_surface
        spindle.speed_mode_line = words.line
    if spindle.clamp is None:
        spindle.unclamped_line = words.line


@modal(Phase.SPEED, "rotation speed")
def rotation_speed(run: Run, words: BlockWords) -> None:
    """G97: S is a spindle speed from here on; without S the speed reached is kept."""
    spindle = run.state.spindle
    spindle.unclamped_line = None
    if spindle.mode == "surface":
        spindle.last_surface = spindle.value
        spindle.mode, spindle.value = "rpm", _speed_reached(run)
        spindle.speed_mode_line = words.line


def _speed_reached(run: Run) -> float | None:
    """The rpm that constant surface speed has reached at the present diameter."""
    spindle, r = run.state.spindle, run.state.r
    if spindle.value is None or r is None:
        return None
    limit = min(spindle.clamp or math.inf, run.job.machine.speed_limit)
    if r == 0.0:
        return limit
    return min(1000.0 * spindle.value / (2.0 * math.pi * abs(r)), limit)


@word(Phase.SPEED)
def speed_word(run: Run, words: BlockWords) -> None:
    """S of the block, in rpm or m/min; in the block of the speed limit it is the limit alone."""
    number = words.number("S")
    if number is None or words.calls("dwell"):
        return
    if words.calls("preset"):
        speed_limit(run, number.value)
        return
    spindle = run.state.spindle
    foot = FOOT if spindle.mode == "surface" and run.state.inch else 1.0
    spindle.value = number.value * foot if number.value > 0.0 else None
    spindle.speed_mode_line, spindle.certain = None, True


def speed_limit(run: Run, rpm: float) -> None:
    """The programmed limit of the spindle speed."""
    spindle = run.state.spindle
    if rpm <= 0.0:
        spindle.clamp = None
        return
    spindle.clamp, spindle.unclamped_line = rpm, None
    lowest, whose = run.job.machine.speed_limit, "machine"
    chuck = run.job.workholding.speed_limit
    if chuck is not None and chuck < lowest:
        lowest, whose = chuck, "chuck"
    if rpm > lowest:
        run.remark(
            "clamp-too-high",
            f"the limit of {rpm:g} rpm is above the {whose}'s {lowest:g} rpm",
            "S",
            value=rpm,
            limit=lowest,
            unit="rpm",
            remedy=f"limit the speed to {lowest:g} rpm or less",
        )


@m_code(Phase.START, 3, 4)
def start_spindle(run: Run, words: BlockWords) -> None:
    """M3 or M4: the spindle turns already when the block's motion begins."""
    run.state.spindle.direction = 1 if 3 in words.m_codes else -1


@m_code(Phase.AFTER, 5)
def stop_spindle(run: Run, words: BlockWords) -> None:
    """M5 acts behind the motion of its block."""
    settle(run)
    run.state.spindle.direction = 0
    run.state.spindle.stopped_line = words.line
