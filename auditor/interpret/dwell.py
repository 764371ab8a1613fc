"""G4: waiting."""

from __future__ import annotations

from dataclasses import replace

from auditor.declared.control_settings import choice
from auditor.interpret.registry import action
from auditor.interpret.run import Run
from auditor.interpret.words import BlockWords

LONG = 60.0  # s, longer looks like a slip of the unit; common practice


@action("dwell")
def dwell(run: Run, words: BlockWords) -> None:
    """X or U in seconds, P in milliseconds."""
    seconds = _seconds(run, words)
    if seconds is None:
        run.remark("dwell", "a dwell without a time", "G")
        return
    if seconds > LONG:
        run.remark("dwell", f"a dwell of {seconds:g} s", "X", "U", "P", value=seconds, limit=LONG, unit="s")
    held = run.compensated.strokes
    if held:
        held[-1] = replace(held[-1], dwell_after=held[-1].dwell_after + seconds)
    elif run.collected:
        run.collected[-1] = replace(run.collected[-1], dwell_after=run.collected[-1].dwell_after + seconds)
    elif run.chain is not None:
        run.log.dwell_time += seconds  # between a corner block and its following move
    else:
        run.log.dwell(seconds)


def _seconds(run: Run, words: BlockWords) -> float | None:
    number = words.number("X") or words.number("U")
    if number is not None:
        value = number.value
        if not number.has_point and run.control.whole_numbers == "increments":
            value *= 0.001
        if choice(run.control, "dwell") == "revolutions" and run.state.feed.mode == "rev":
            return _revolutions(run, value)
        return value
    number = words.number("P")
    if number is None:
        return None
    return number.value if number.has_point else number.value / 1000.0


def _revolutions(run: Run, turns: float) -> float | None:
    spindle = run.state.spindle
    if spindle.mode == "rpm" and spindle.value:
        return 60.0 * turns / spindle.value
    return None
