"""Which block comes next: jumps, loops, calls of subprograms and macros, and their ends."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from auditor.declared.control_settings import choice
from auditor.declared.model import Control
from auditor.interpret.library import Library, Program
from auditor.parse.blocks import Block

DEEPEST_CALL = 12  # programs one inside the other
MOST_JUMPS = 10_000  # jumps back and calls in one run, beyond it a loop has no end
MOST_STEPS = 200_000  # blocks carried out, beside twice those of the file


class EndlessError(Exception):
    """The program would not come to an end."""


@dataclass(slots=True)
class Frame:
    """One program being run: where it stands, how often it still runs, where the caller goes on."""

    program: Program
    index: int = 0
    repeats: int = 1
    first: int = 0
    macro: bool = False  # has locals of its own
    call_line: int = 0  # in the audited file, for programs from other files
    call_label: str | None = None
    only_until: int | None = None


@dataclass(slots=True)
class ModalCall:
    """G66: a macro called after every block with motion."""

    program: Program
    arguments: Mapping[int, float]
    depth: int


class Flow:
    """The stack of running programs."""

    def __init__(self, library: Library, control: Control) -> None:
        self.library = library
        self.frames: list[Frame] = []
        self.modal_call: ModalCall | None = None
        self.started: list[Program] = []
        self.from_start = choice(control, "sequence_search") == "from start"
        self.went_back = False  # since last asked
        self._jumps = 0
        self._steps = 0
        self._most_steps = MOST_STEPS + 2 * sum(len(program.blocks) for program in library.programs)

    @property
    def frame(self) -> Frame:
        """The innermost running program."""
        return self.frames[-1]

    def begin(self, program: Program) -> None:
        """Start with the main program."""
        self.frames.append(Frame(program))
        self.started.append(program)

    def next_block(self) -> Block | None:
        """The next block of the running program, None at its textual end."""
        frame = self.frame
        if frame.index >= len(frame.program.blocks):
            return None
        self._steps += 1
        if self._steps > self._most_steps:
            raise EndlessError
        block = frame.program.blocks[frame.index]
        frame.index += 1
        return block

    def place(self, block: Block) -> tuple[int, str | None]:
        """Line and label of a block as the audited file shows them."""
        frame = self.frame
        if frame.program.file is None:
            return block.line, block.label
        inside = f" {block.label}" if block.label else f" line {block.line}"
        return frame.call_line, f"{frame.program.title}{inside}"

    def jump(self, number: int) -> bool:
        """Go on at block N``number`` of the running program; False when it is missing."""
        frame = self.frame
        place = frame.program.find(number, frame.index - 1, from_start=self.from_start)
        if place is None:
            return False
        self._go_to(place)
        return True

    def lies_behind(self, number: int) -> bool:
        """Whether going on at block N``number`` repeats what ran already."""
        place = self.frame.program.find(number, self.frame.index - 1, from_start=self.from_start)
        return place is not None and place < self.frame.index

    def repeated_number(self, number: int) -> tuple[int, ...]:
        """Lines of all blocks that carry a number which stands more than once."""
        program = self.frame.program
        places = program.places.get(number, ())
        return tuple(program.blocks[place].line for place in places) if len(places) > 1 else ()

    def loop_partner(self) -> int | None:
        """Index of the END of the DO just read, or of the DO of the END."""
        return self.frame.program.partners.get(self.frame.index - 1)

    def go_to_index(self, index: int) -> None:
        """Go on at a block of the running program."""
        self._go_to(index)

    def call(
        self, program: Program, *, repeats: int, place: tuple[int, str | None], first: int = 0, macro: bool = False
    ) -> None:
        """Run a program from block ``first``, ``repeats`` times, then go on behind the call."""
        if len(self.frames) > DEEPEST_CALL:
            raise EndlessError
        self._count()
        line, label = place
        if program not in self.started:
            self.started.append(program)
        self.frames.append(Frame(program, first, repeats, first, macro, line, label))

    def back(self, *, to: int | None = None, drop_repeats: bool = False) -> bool:
        """End of a called program: run it again, or return to the caller (to block N``to``)."""
        frame = self.frame
        if frame.repeats > 1 and not drop_repeats and to is None:
            frame.repeats -= 1
            frame.index = frame.first
            self._count()
            return True
        self.frames.pop()
        return to is None or self.jump(to)

    def _go_to(self, index: int) -> None:
        if index < self.frame.index:
            self.went_back = True
            self._count()
        self.frame.index = index

    def _count(self) -> None:
        self._jumps += 1
        if self._jumps > MOST_JUMPS:
            raise EndlessError
