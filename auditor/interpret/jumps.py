"""Going on elsewhere in the text: jumps and calls, and what is lost when their target is missing."""

from __future__ import annotations

from auditor.interpret.library import Program
from auditor.interpret.run import Run
from auditor.interpret.travel import settle


def jump(run: Run, number: int) -> None:
    """Go on at block N``number``."""
    check_repeated(run, number)
    if not run.flow.jump(number):
        target_missing(run, number)


def check_repeated(run: Run, number: int) -> None:
    """A block number that is used as a target should stand once."""
    lines = run.flow.repeated_number(number)
    if lines:
        where = ", ".join(str(line) for line in lines)
        run.remark("number-repeated", f"N{number} stands more than once: lines {where}")


def target_missing(run: Run, number: int) -> None:
    """A jump or return to a block that does not exist: where the program goes on is not known."""
    run.remark("target-missing", f"N{number} is not in {run.flow.frame.program.title}", "P")
    lose_track(run, f"the program goes on at N{number}, which is missing")


def lose_track(run: Run, reason: str) -> None:
    """Something unknown runs here: the block is not audited, and nothing it may have changed is known."""
    settle(run)
    run.log.add_not_audited(run.words.line, run.words.text, reason)
    run.stock_in_doubt = run.flow_in_doubt = True
    run.state.forget_position()
    run.state.motion = run.state.drilling = None


def call_program(run: Run, program: Program, *, repeats: int, first: int = 0, macro: bool = False) -> None:
    """Run another program and come back."""
    if repeats < 1:
        return
    frame = run.flow.frame
    place = (run.words.line, run.words.label) if frame.program.file is None else (frame.call_line, None)
    run.flow.call(program, repeats=repeats, place=place, first=first, macro=macro)
