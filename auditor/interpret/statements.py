"""Statements between the blocks of motion: assignments, conditions, jumps, loops."""

from __future__ import annotations

from collections.abc import Callable

from auditor.declared.control_settings import choice
from auditor.interpret.expressions import Calculator, ExpressionFault
from auditor.interpret.jumps import jump
from auditor.interpret.run import Run
from auditor.interpret.travel import settle
from auditor.parse.blocks import Assign, Block, Do, End, Expression, Goto, IfThen, Opaque

ALARM, STOP_WITH_TEXT = 3000, 3006


def carry_out_statement(run: Run, block: Block) -> None:
    """Do what a statement says. An expression without a value raises ExpressionFault."""
    statement = block.statement
    if isinstance(statement, Assign):
        _assign(run, statement, block)
    elif isinstance(statement, IfThen):
        if _holds(run, statement.condition):
            _assign(run, statement.then, block)
    elif isinstance(statement, Goto):
        if statement.condition is None or _jumps(run, statement):
            _goto(run, statement.target)
    elif isinstance(statement, Do):
        _do(run, statement)
    elif isinstance(statement, End):
        _end(run)
    else:
        assert isinstance(statement, Opaque)  # data output moves nothing


def calculator(run: Run, *, increment: float | None = None) -> Calculator:
    """The calculator over the variables of the run."""
    signed = choice(run.control, "atan_range") == "-180 to 180"
    return Calculator(run.variables, increment, signed)


def _holds(run: Run, condition: Expression) -> bool:
    truth = calculator(run).holds(condition)
    if run.variables.unknown:
        _doubt_way(run, "taken as empty")
    return truth


def _doubt_way(run: Run, reading: str) -> None:
    variables = named(run.variables.take_unknown())
    run.flow_in_doubt = True
    run.remark("unknown-variable", f"the way taken depends on {variables}, which only the control knows; {reading}")


def _jumps(run: Run, statement: Goto) -> bool:
    """Whether IF lets GOTO act; back over a value that only the control knows (a part counter), one pass is run."""
    assert statement.condition is not None
    truth = calculator(run).holds(statement.condition)
    if not run.variables.unknown:
        return truth
    number = calculator(run).value(statement.target)
    back = number is not None and run.flow.lies_behind(round(number))
    _doubt_way(run, "one pass is carried out" if back else "taken as empty")
    return truth and not back


def named(variables: set[int]) -> str:
    """Variables as a person writes them."""
    return " and ".join(f"#{number}" for number in sorted(variables))


def _assign(run: Run, statement: Assign, block: Block) -> None:
    calculate = calculator(run)
    number = calculate.variable_number(statement.target)
    try:
        value = calculate.value(statement.value)
    except ExpressionFault:
        run.variables.take_unknown()
        run.variables.write_unknown(number)
        raise
    unknown = run.variables.take_unknown()
    special = _SPECIAL.get(number)
    if special is not None:
        special(run, value, " ".join(comment.text.strip() for comment in block.comments))
    elif unknown:
        run.variables.write_unknown(number)
    else:
        run.variables.write(number, value)


def _alarm(run: Run, value: float | None, text: str) -> None:
    settle(run)
    run.remark("alarm", f"the program stops with its own alarm {value or 0:g}: {text}".rstrip(": "))
    run.finish("alarm")


def _stop(run: Run, value: float | None, text: str) -> None:
    if run.job.unattended:
        run.remark("stop-unattended", f"the program stops and waits: {text}".rstrip(": "))


_SPECIAL: dict[int, Callable[[Run, float | None, str], None]] = {ALARM: _alarm, STOP_WITH_TEXT: _stop}


def _goto(run: Run, target: Expression) -> None:
    number = calculator(run).value(target)
    unknown = run.variables.take_unknown()
    if number is None or unknown:
        run.remark("target-missing", "a GOTO whose block number is not known: the program goes on behind it")
        run.flow_in_doubt = True
    elif round(number) != 0:
        jump(run, round(number))


def _do(run: Run, statement: Do) -> None:
    partner = run.flow.loop_partner()
    if partner is None:
        run.remark("target-missing", f"DO{statement.label} has no END{statement.label}")
        run.flow_in_doubt = True
    elif statement.condition is not None and not _enters(run, statement.condition, partner):
        run.flow.go_to_index(partner + 1)


def _enters(run: Run, condition: Expression, end: int) -> bool:
    """Whether a loop runs (again); over a value that only the control knows it runs once."""
    truth = calculator(run).holds(condition)
    if not run.variables.unknown:
        return truth
    _doubt_way(run, "the loop is carried out once")
    return run.log.first_time("loop", run.flow.frame.program.title, end)


def _end(run: Run) -> None:
    partner = run.flow.loop_partner()
    if partner is None:
        run.remark("target-missing", "an END without its DO")
        run.flow_in_doubt = True
    else:
        run.flow.go_to_index(partner)
