"""The modal state of the control while a program is carried out on paper."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Literal

from auditor.declared.model import Point
from auditor.interpret.moves import Feed, Spindle

NOWHERE = Point(0.0, 0.0)
STANDING = Spindle()


@dataclass(slots=True)
class SpindleState:
    """What S, G96/G97, M3/M4/M5 and the speed limit have left in force."""

    direction: Literal[-1, 0, 1] = 0
    mode: Literal["rpm", "surface"] = "rpm"
    value: float | None = None  # rpm or m/min
    clamp: float | None = None  # rpm
    last_surface: float | None = None  # m/min, kept while G97 acts
    certain: bool = True  # False after a block that may have held S or M and could not be read
    stopped_line: int = 0  # of the last M5, 0 before any
    speed_mode_line: int | None = None  # G96/G97 changed here without S, not yet restated
    unclamped_line: int | None = None  # G96 here without any limit so far
    commanded: Spindle = STANDING  # as last asked for

    def command(self) -> Spindle:
        """The commanded spindle, as moves carry it: one object for all moves under the same command."""
        value, last = self.value if self.certain else None, self.commanded
        same = last.direction == self.direction and last.mode == self.mode
        if not (same and last.value == value and last.clamp == self.clamp):
            self.commanded = Spindle(self.direction, self.mode, value, self.clamp)
        return self.commanded


@dataclass(slots=True)
class FeedState:
    """What F and the feed mode have left in force."""

    mode: Literal["rev", "min"] = "rev"
    value: float | None = None  # mm/rev or mm/min
    certain: bool = True
    line: int = 0  # of the F word
    given_in: Literal["rev", "min"] = "rev"  # the mode in which F was given
    commanded: Feed | None = None  # as last asked for

    def command(self) -> Feed | None:
        """The commanded feed, one object for all moves under it; None when there is none that moves anything."""
        if self.value is None or self.value <= 0.0:
            return None
        if self.commanded is None or self.commanded.value != self.value or self.commanded.mode != self.mode:
            self.commanded = Feed(self.mode, self.value)
        return self.commanded


@dataclass(slots=True)
class ToolState:
    """Tool, offset and what they were called with."""

    number: int | None = None
    offset: int | None = None
    line: int | None = None  # of the T word
    certain: bool = True


@dataclass(slots=True)
class State:
    """Everything a block leaves behind for the blocks after it.

    ``z`` and ``r`` are the programmed point in part coordinates (mm, X as radius); None = unknown.
    ``motion`` is the function of the motion group in force, None after a block that may have changed it.
    """

    z: float | None = None
    r: float | None = None
    motion: str | None = "rapid"
    drilling: str | None = None  # modal drilling cycle
    inch: bool = False
    absolute: bool = True
    plane: str = "plane ZX"
    spindle: SpindleState = field(default_factory=SpindleState)
    feed: FeedState = field(default_factory=FeedState)
    tool: ToolState = field(default_factory=ToolState)
    compensation: Literal["off", "left", "right"] = "off"
    shift: Point = NOWHERE  # G52, part coordinates = program coordinates + shift
    work_zero: str | None = None  # None until one is called
    foreign_zero: bool = False  # a work zero whose place is not known is in force
    return_to_initial: bool = True
    coolant: bool = False
    data_input: bool = False  # between G10 L50 and G11
    live_mode: str | None = None  # polar or cylindrical interpolation, opposite turret …
    stored: dict[str, dict[str, float]] = field(default_factory=dict)  # per cycle: modal depths, retracts

    @property
    def position(self) -> Point | None:
        """The programmed point, None when any coordinate is unknown."""
        if self.z is None or self.r is None:
            return None
        return Point(self.z, self.r)

    def forget_position(self) -> None:
        """Both coordinates are unknown until they are restated."""
        self.z = self.r = None
