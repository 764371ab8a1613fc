"""Going to fixed points of the machine: G27, G28, G30, G53."""

from __future__ import annotations

from auditor.declared.control_settings import choice
from auditor.declared.model import Point
from auditor.interpret.cutting_conditions import check_cut
from auditor.interpret.cycles.call import Stroke
from auditor.interpret.motion import end_point, has_axis_words, millimetres, rapid, x_factor
from auditor.interpret.moves import Kind
from auditor.interpret.registry import action
from auditor.interpret.run import NotUnderstood, Run
from auditor.interpret.travel import rapid_partly_known, settle, travel
from auditor.interpret.words import BlockWords

SAME = 1e-9  # mm


@action("reference return", "second reference return")
def reference_return(run: Run, words: BlockWords) -> None:
    """G28 and G30: by rapid through the named point, then each named axis to the reference point."""
    if not has_axis_words(words):
        raise NotUnderstood("a return to the reference point names no axis", "unsupported", ("G",))
    leave_compensation(run, "a return to the reference point")
    home, name = _reference(run, words)
    state = run.state
    z, r = end_point(run, words)
    moves_first = _differs(z, state.z) or _differs(r, state.r)
    if moves_first:
        _through(run, words)
        _rapid(run, z, r)
    new_z = state.z if not words.has("Z", "W") else None if home is None else home.z
    new_r = state.r if not words.has("X", "U") else None if home is None else home.r
    if home is None and run.log.first_time("home-unknown", name):
        run.remark(
            "home-unknown",
            f"{name} is not declared: the way to the reference point is not checked, "
            "the position is known again when X and Z are restated",
            "G",
        )
    _rapid(run, new_z, new_r)


def _reference(run: Run, words: BlockWords) -> tuple[Point | None, str]:
    machine = run.job.machine
    if words.calls("reference return"):
        return machine.home, "machine.home"
    if (words.integer("P") or 2) == 2:
        return machine.second_home, "machine.second_home"
    return None, f"reference point {words.integer('P')}"


def _differs(there: float | None, here: float | None) -> bool:
    return there is not None and (here is None or abs(there - here) > SAME)


def _through(run: Run, words: BlockWords) -> None:
    """A return through a point named in absolute words may cross the part."""
    absolute = [letter for letter in ("X", "Z") if words.has(letter)]
    if absolute and (run.system == "A" or run.state.absolute):
        direct = "U0 W0" if run.system == "A" else "G91 with X0 Z0"
        run.remark(
            "return-through-point",
            "the return goes first to the point named by " + " and ".join(absolute),
            *absolute,
            remedy=f"return straight with {direct}",
        )


def _rapid(run: Run, z: float | None, r: float | None) -> None:
    if run.state.position is None or z is None or r is None:
        rapid_partly_known(run, z, r)
    else:
        travel(run, Stroke(Kind.RAPID, Point(z, r)))


def leave_compensation(run: Run, what: str) -> None:
    """Compensation must be off here; say so when it is not, and end the compensated path."""
    settle(run)
    if run.state.compensation != "off":
        run.remark(
            "compensation-left-on",
            f"nose-radius compensation is on at {what}",
            "G",
            remedy="cancel with G40 in a move before it",
        )


@action("machine position")
def machine_position(run: Run, words: BlockWords) -> None:
    """G53: a rapid to machine coordinates, known only when machine.machine_zero is declared."""
    if not has_axis_words(words):
        return
    if run.system != "A" and not run.state.absolute:
        raise NotUnderstood("machine coordinates under incremental words are ignored by most controls", "unsupported")
    leave_compensation(run, "a move in machine coordinates")
    zero, state = run.job.machine.machine_zero, run.state
    x, z = millimetres(run, words, "X"), millimetres(run, words, "Z")
    if zero is None and run.log.first_time("home-unknown", "machine_zero"):
        run.remark(
            "home-unknown",
            "machine.machine_zero is not declared: a move in machine coordinates is not "
            "checked, the position is known again when X and Z are restated",
            "G",
        )
    new_z = state.z if z is None else None if zero is None else zero.z + z
    new_r = state.r if x is None else None if zero is None else zero.r + x * x_factor(run)
    if choice(run.control, "machine_position_move") == "active" and state.motion != "rapid":
        _feed(run, new_z, new_r)
        return
    _rapid(run, new_z, new_r)


def _feed(run: Run, z: float | None, r: float | None) -> None:
    """A move in machine coordinates by a control that keeps G1 there."""
    state = run.state
    if state.motion != "feed" or state.position is None or z is None or r is None:
        state.z, state.r = z, r
        raise NotUnderstood("a cut in machine coordinates that cannot be placed", "position-unknown", ("G",))
    check_cut(run)
    travel(run, Stroke(Kind.FEED, Point(z, r)))


@action("reference check")
def reference_check(run: Run, words: BlockWords) -> None:
    """G27: a rapid to the named point, which the machine then compares with its reference point."""
    leave_compensation(run, "a reference check")
    rapid(run, words)
