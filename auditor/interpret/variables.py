"""Variables of a program: local to a call, common to a run, and those that only the control knows."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field

LOCAL = range(1, 34)
COMMON = range(100, 200)  # lost at power-off: empty at the start of an audit
DEEPEST_CALL = 8


@dataclass(slots=True)
class Variables:
    """Values by number; a variable without a value is null (None), which is not zero."""

    common: dict[int, float] = field(default_factory=dict)
    levels: list[dict[int, float]] = field(default_factory=lambda: [{}])
    control_values: Mapping[int, Callable[[], float | None]] = field(default_factory=dict)
    unknown_values: set[int] = field(default_factory=set)  # assigned from such variables
    unknown: set[int] = field(default_factory=set)  # read since last asked, values only the control knows

    def read(self, number: int) -> float | None:
        """The value of ``#number``; null when it has none."""
        if number in self.unknown_values:
            self.unknown.add(number)
            return None
        if number in LOCAL:
            return self.levels[-1].get(number)
        if number in self.common:
            return self.common[number]
        if number == 0 or number in COMMON:
            return None
        known = self.control_values.get(number)
        value = None if known is None else known()
        if value is None:
            self.unknown.add(number)
        return value

    def write(self, number: int, value: float | None) -> None:
        """Set ``#number``; null takes the value away."""
        self.unknown_values.discard(number)
        values = self.levels[-1] if number in LOCAL else self.common
        if value is None:
            values.pop(number, None)
        else:
            values[number] = value

    def write_unknown(self, number: int) -> None:
        """``#number`` gets a value that only the control knows."""
        self.write(number, None)
        self.unknown_values.add(number)

    def enter(self, arguments: Mapping[int, float]) -> None:
        """A macro call: fresh locals, filled with the arguments."""
        self.levels.append(dict(arguments))

    def leave(self) -> None:
        """Back to the caller's locals."""
        self.levels.pop()

    def take_unknown(self) -> set[int]:
        """Which variables were read that only the control knows; asking clears the list."""
        found, self.unknown = self.unknown, set()
        return found
