"""How numbers are written: without a point where two readings differ by 1000, with more places than count."""

from __future__ import annotations

from auditor.interpret.cycles.call import INCH
from auditor.interpret.run import Run
from auditor.interpret.words import LENGTH_LETTERS, BlockWords, Value, least_increment, length

_NOT_LENGTHS = {  # words that are times, counts or data in the block of a function
    "dwell": frozenset("XUP"),
    "data input": LENGTH_LETTERS,
    "pattern repeating": frozenset("R"),
    "macro call": LENGTH_LETTERS,
    "modal macro call": LENGTH_LETTERS,
    "drill": frozenset("K"),
    "tap": frozenset("K"),
    "bore": frozenset("K"),
    "variable thread": frozenset("K"),
}


def check_numbers(run: Run, words: BlockWords) -> None:
    """Remark on lengths without a decimal point, and once on lengths finer than the control's step."""
    lengths = _lengths(words)
    plain = [value for value in lengths if not value.number.has_point and value.number.value]
    if plain:
        _without_point(run, plain)
    if not run.log.has_been("too-many-decimals"):
        _too_fine(run, lengths)


def _lengths(words: BlockWords) -> list[Value]:
    excluded = {letter for function in words.functions for letter in _NOT_LENGTHS.get(function, ())}
    return [value for value in words.values if value.letter in LENGTH_LETTERS and value.letter not in excluded]


def _without_point(run: Run, plain: list[Value]) -> None:
    inch = run.state.inch
    first = plain[0]
    word = f"{first.letter}{first.number.text}"
    read = length(first.number, run.control, inch=inch)
    step = least_increment(run.control, inch=inch) if run.control.whole_numbers == "units" else INCH if inch else 1.0
    other = first.number.value * step
    run.remark(
        "plain-number",
        f"{word} has no decimal point: read as {read:g} mm, a control set otherwise reads {other:g} mm",
        *dict.fromkeys(value.letter for value in plain),
        value=read,
        unit="mm",
        remedy="write the point",
    )


def _too_fine(run: Run, lengths: list[Value]) -> None:
    step = least_increment(run.control, inch=run.state.inch) / (INCH if run.state.inch else 1.0)
    for value in lengths:
        steps = value.number.value / step
        if "." in value.number.text and not value.computed and abs(steps - round(steps)) > 1e-3:
            run.log.first_time("too-many-decimals")
            run.remark(
                "too-many-decimals",
                f"{value.letter}{value.number.text} is finer than the control's step of {step:g}: it rounds",
                value.letter,
            )
            return
