"""Where zero lies: presets, local and work zeros, data input."""

from __future__ import annotations

from auditor.declared.model import Point
from auditor.interpret.motion import millimetres, x_factor
from auditor.interpret.registry import Phase, action, modal
from auditor.interpret.run import Run
from auditor.interpret.travel import settle
from auditor.interpret.words import BlockWords


@action("preset")
def preset(run: Run, words: BlockWords) -> None:
    """G50 or G92 with axis words: the present point gets a new name, nothing moves."""
    if not words.has("X", "Z", "U", "W"):
        return
    settle(run)
    run.compensated.tip = None
    state, half = run.state, x_factor(run)
    x, u = millimetres(run, words, "X"), millimetres(run, words, "U")
    z, w = millimetres(run, words, "Z"), millimetres(run, words, "W")
    if x is not None:
        state.r = x * half
    elif u is not None and state.r is not None:
        state.r += u * half
    if z is not None:
        state.z = z
    elif w is not None and state.z is not None:
        state.z += w
    run.remark(
        "preset",
        "the present point is given new coordinates: right only when the tool really stands there",
        *[letter for letter in ("X", "Z", "U", "W") if words.has(letter)],
    )


@action("work preset")
def work_preset(run: Run, words: BlockWords) -> None:
    """The coordinates go back to the work zero, which presets may have left."""
    settle(run)
    run.state.forget_position()
    run.remark("preset", "the coordinates return to the work zero: the position is known again when it is restated")


@action("local zero")
def local_zero(run: Run, words: BlockWords) -> None:
    """G52: programmed points are counted from a shifted zero."""
    shift = run.state.shift
    x, z = millimetres(run, words, "X"), millimetres(run, words, "Z")
    shifted = Point(shift.z if z is None else z, shift.r if x is None else x * x_factor(run))
    if shifted != Point(0.0, 0.0):
        run.remark("local-shift", f"zero is shifted by X{2 * shifted.r:g} Z{shifted.z:g} mm from here on", "G")
    settle(run)
    run.state.shift = shifted


@modal(Phase.MODE, *(f"work zero {n}" for n in range(1, 7)), "further work zero")
def work_zero(run: Run, words: BlockWords) -> None:
    """G54 to G59: the first one called is the declared Z0; where any other lies is not known."""
    name = next(function for function in reversed(words.functions) if "work zero" in function)
    if name == "further work zero":
        name += f" {words.integer('P') or 1}"
    state = run.state
    if run.first_zero is None:
        run.first_zero = "work zero 1" if run.moved else name
    if name == (state.work_zero or run.first_zero):
        state.work_zero = name
        return
    settle(run)
    state.work_zero = name
    state.foreign_zero = name != run.first_zero
    state.forget_position()
    run.remark(
        "work-zero-changed",
        "another work zero is called; where it lies is not declared: "
        "moves under it are taken as if it were the first one",
        "G",
    )


@action("data input")
def data_input(run: Run, words: BlockWords) -> None:
    """G10: offsets or parameters are written by the program."""
    run.state.data_input = words.integer("L") in (50, 52)
    run.remark("data-input", "the program writes offsets or parameters: the audit does not follow them", "G")


@action("data input end")
def data_input_end(run: Run, words: BlockWords) -> None:
    """G11 ends the writing of parameters."""
    run.state.data_input = False
