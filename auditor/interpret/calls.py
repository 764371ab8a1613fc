"""Subprograms and macros: M98, M99, M198, G65, G66, G67."""

from __future__ import annotations

from collections.abc import Mapping

from auditor.interpret.flow import ModalCall
from auditor.interpret.jumps import call_program, jump, lose_track, target_missing
from auditor.interpret.library import Program
from auditor.interpret.registry import Phase, action, m_code
from auditor.interpret.run import Run
from auditor.interpret.travel import settle
from auditor.interpret.words import BlockWords, Value, argument_value

_ARGUMENTS = {
    letter: number
    for number, letter in (
        (1, "A"), (2, "B"), (3, "C"), (7, "D"), (8, "E"), (9, "F"), (11, "H"), (13, "M"), (17, "Q"), (18, "R"),
        (19, "S"), (20, "T"), (21, "U"), (22, "V"), (23, "W"), (24, "X"), (25, "Y"), (26, "Z"),
    )
}  # fmt: skip
_REPEATED = {"I": 4, "J": 5, "K": 6}  # each further set lies 3 higher, ten sets in all


@m_code(Phase.AFTER, 98, 198)
def subprogram_call(run: Run, words: BlockWords) -> None:
    """M98: run another program, or blocks of this one (H, or Q without P), and come back."""
    local = words.integer("Q") if words.integer("H") is None else words.integer("H")
    if local is not None and words.number("P") is None and run.called_name is None:
        _call_within(run, words, local)
        return
    program, repeats = _target(run, words)
    if program is None:
        _missing(run, words)
        return
    first = 0
    start = words.integer("Q")
    if start is not None:
        found = program.find(start, -1)
        if found is None:
            target_missing(run, start)
            return
        first = found
    call_program(run, program, repeats=repeats, first=first)


def _call_within(run: Run, words: BlockWords, number: int) -> None:
    program = run.flow.frame.program
    found = program.find(number, -1)
    if found is None:
        target_missing(run, number)
        return
    call_program(run, program, repeats=max(words.integer("L") or 1, 0), first=found)


def _target(run: Run, words: BlockWords) -> tuple[Program | None, int]:
    """The program called and how often: by name, with L, or the old form with the count before four digits."""
    repeats = words.integer("L")
    if run.called_name is not None:
        return run.flow.library.find(run.called_name), 1 if repeats is None else repeats
    number = words.integer("P")
    if number is None:
        return None, 0
    program = run.flow.library.find(number)
    if repeats is None and program is None and number > 9999:
        return run.flow.library.find(number % 10_000), number // 10_000
    return program, 1 if repeats is None else repeats


def _missing(run: Run, words: BlockWords) -> None:
    name = run.called_name or (f"O{words.integer('P'):04d}" if words.has("P") else "the program called")
    reason = f"{name} is not in the file and not beside it: what it does is not known"
    run.remark("subprogram-missing", reason, "P", remedy=f"put {name} into the file or beside it")
    lose_track(run, reason)


@m_code(Phase.AFTER, 99)
def program_return(run: Run, words: BlockWords) -> None:
    """M99: back to the caller; at the end of the main program it starts over."""
    settle(run)
    flow = run.flow
    if len(flow.frames) == 1:
        target = words.integer("P")
        if target is not None and not flow.lies_behind(target):
            jump(run, target)
            return
        run.remark("repeats-main", "the main program starts over for ever; one pass is audited", "M")
        run.finish("M99")
        return
    target = words.integer("P")
    macro = flow.frame.macro
    depth = len(flow.frames)
    found = flow.back(to=target, drop_repeats=words.has("L"))
    if macro and len(flow.frames) < depth:
        run.variables.leave()
    if not found and target is not None:
        target_missing(run, target)


@action("macro call")
def macro_call(run: Run, words: BlockWords) -> None:
    """G65: run a macro with arguments."""
    program, repeats = _target(run, words)
    if program is None:
        _missing(run, words)
        return
    if repeats < 1:
        return
    arguments = read_arguments(run, words)
    call_program(run, program, repeats=repeats, macro=True)
    run.variables.enter(arguments)


@action("modal macro call")
def modal_macro_call(run: Run, words: BlockWords) -> None:
    """G66: run a macro after every block with motion, until G67."""
    program, _ = _target(run, words)
    if program is None:
        _missing(run, words)
        return
    run.flow.modal_call = ModalCall(program, read_arguments(run, words), len(run.flow.frames))


@action("modal macro call off")
def modal_macro_call_off(run: Run, words: BlockWords) -> None:
    """G67: no macro after motion any more."""
    run.flow.modal_call = None


def call_after_motion(run: Run) -> None:
    """The macro of G66, behind a block with motion."""
    modal = run.flow.modal_call
    if modal is None or len(run.flow.frames) != modal.depth:
        return
    settle(run)
    call_program(run, modal.program, repeats=1, macro=True)
    run.variables.enter(modal.arguments)


def read_arguments(run: Run, words: BlockWords) -> Mapping[int, float]:
    """The local variables that the words of a macro call set."""
    arguments: dict[int, float] = {}
    sets: dict[str, int] = {}
    for value in _argument_values(words):
        number = _ARGUMENTS.get(value.letter)
        if value.letter in _REPEATED:
            number = _REPEATED[value.letter] + 3 * sets.get(value.letter, 0)
            sets[value.letter] = sets.get(value.letter, 0) + 1
        if number is not None and number <= 33:
            arguments[number] = argument_value(value, run.control, inch=run.state.inch)
    return arguments


def _argument_values(words: BlockWords) -> list[Value]:
    return [value for value in words.values if value.letter not in "GLNOP"]
