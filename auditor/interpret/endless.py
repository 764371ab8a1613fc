"""Loops that never end: seen when everything stands as it stood a round before, else taken so beyond a limit."""

from __future__ import annotations

from dataclasses import dataclass, field

from auditor.interpret.flow import EndlessError
from auditor.interpret.run import Run

MOST_STROKES = 20_000  # made by going back in the program; audits of that size still take seconds
SHOWN = 500  # moves of a loop without end that stay on record


@dataclass(slots=True)
class _Visit:
    """A block that the program came back to: how things stood last time, and how much was done by then."""

    standing: object
    first_move: int  # on record when the program first came back
    moves: int  # on record now
    strokes: int


@dataclass(slots=True)
class LoopWatch:
    """Looks at every jump back."""

    visits: dict[tuple[int, int], _Visit] = field(default_factory=dict)
    looped: int = 0  # strokes made in rounds behind the first
    last: _Visit | None = None
    kept: int | None = None  # moves of an endless loop that are not yet repetition

    def came_back(self, run: Run) -> None:
        """Raise EndlessError when the block gone back to finds everything as it was the last time."""
        frame = run.flow.frame
        place = (id(frame.program), frame.index)
        visit, standing, moves = self.visits.get(place), _standing(run), len(run.log.moves)
        if visit is None:
            self.last = self.visits[place] = _Visit(standing, moves, moves, run.strokes)
            return
        if visit.standing == standing:
            self.kept = visit.moves
            raise EndlessError
        self.looped += run.strokes - visit.strokes
        visit.standing, visit.moves, visit.strokes = standing, moves, run.strokes
        self.last = visit
        if self.looped > MOST_STROKES:
            raise EndlessError

    def moves_to_keep(self) -> int:
        """How many moves stay on record: the rounds behind them would show nothing new."""
        if self.kept is not None:
            return self.kept
        return SHOWN + (0 if self.last is None else self.last.first_move)


def _standing(run: Run) -> object:
    """Everything on which the rest of the program depends."""
    state, variables = run.state, run.variables
    return (
        (state.z, state.r, state.motion, state.drilling, state.inch, state.absolute, state.plane, state.compensation),
        (state.shift, state.work_zero, state.return_to_initial, state.live_mode, state.data_input),
        (state.spindle.command(), state.spindle.certain, state.feed.value, state.feed.mode, state.feed.certain),
        (state.tool.number, state.tool.offset, state.tool.certain),
        {name: dict(values) for name, values in state.stored.items()},
        (dict(variables.common), [dict(level) for level in variables.levels], set(variables.unknown_values)),
        [(id(frame.program), frame.index, frame.repeats) for frame in run.flow.frames],
        None if run.flow.modal_call is None else id(run.flow.modal_call),
    )
