"""M codes: what every lathe has in common. The rest is the machine builder's choice and only listed."""

from __future__ import annotations

from auditor.interpret.reference import leave_compensation
from auditor.interpret.registry import Phase, m_code
from auditor.interpret.run import Run
from auditor.interpret.words import BlockWords

# known, and without effect on the path: tool change call, coolant, orientation, rigid tapping, gears, overrides
WITHOUT_EFFECT = frozenset({6, 19, 29, *range(40, 46), 48, 49})


@m_code(Phase.AFTER, 0, 1)
def stop(run: Run, words: BlockWords) -> None:
    """M0 and M1: the run waits for a person."""
    if run.job.unattended:
        which = "stop" if 0 in words.m_codes else "optional stop"
        run.remark("stop-unattended", f"a programmed {which} in a run declared as unattended", "M")


@m_code(Phase.START, 7, 8)
def coolant_on(run: Run, words: BlockWords) -> None:
    """Coolant on."""
    run.state.coolant = True


@m_code(Phase.AFTER, 9)
def coolant_off(run: Run, words: BlockWords) -> None:
    """Coolant off."""
    run.state.coolant = False


@m_code(Phase.AFTER, 2, 30)
def end_of_program(run: Run, words: BlockWords) -> None:
    """M2 and M30: the end."""
    leave_compensation(run, "the end of the program")
    if run.state.spindle.direction != 0 and run.state.spindle.certain:
        run.remark("spindle-left-on", "the spindle is not stopped by M5 before the end (most controls stop it)", "M")
    run.ended = "M30" if 30 in words.m_codes else "M2"


def note_unknown(run: Run, code: int) -> None:
    """An M code that is the machine builder's choice: once per number."""
    run.log.first_time("unknown coolant")  # it may be a coolant of the builder's own
    if run.log.first_time("unknown-m", code):
        run.remark("unknown-m", f"M{code} is the machine builder's choice: no effect on the path is assumed", "M")
