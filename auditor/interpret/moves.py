"""What the interpreter hands on: one Move per straight, arc, thread or rapid motion, in execution order."""

from __future__ import annotations

from dataclasses import dataclass, field
from enum import StrEnum
from typing import Literal

from auditor.declared.model import Assumption, Point, System


class Kind(StrEnum):
    """What sort of motion a move is, as the JSON report names it."""

    RAPID = "rapid"
    FEED = "feed"
    ARC = "arc"
    THREAD = "thread"
    DRILL = "drill"


@dataclass(frozen=True, slots=True)
class Spindle:
    """The commanded spindle at a move."""

    direction: Literal[-1, 0, 1] = 0  # +1 M3, -1 M4, 0 stopped
    mode: Literal["rpm", "surface"] = "rpm"
    value: float | None = None  # rpm, or m/min under constant surface speed
    clamp: float | None = None  # rpm, programmed; machine limit not included
    fixed_diameter: float | None = None  # rapid: speed is set for the end point


@dataclass(frozen=True, slots=True)
class Feed:
    """The commanded feed at a move."""

    mode: Literal["rev", "min"]
    value: float  # mm/rev or mm/min


@dataclass(frozen=True, slots=True)
class Move:
    """One motion of the programmed point, X as radius; an unknown coordinate is None."""

    index: int
    line: int
    block: str | None  # "N70"
    tool: int | None
    kind: Kind
    start_z: float | None
    start_r: float | None
    end_z: float | None
    end_r: float | None
    feed: Feed | None
    spindle: Spindle
    centre: Point | None = None  # arcs
    clockwise: bool | None = None  # arcs, in the picture with Z right and X up
    lead: float | None = None  # threads, mm
    cycle: str | None = None  # "rough turning" … when made by a cycle
    cycle_pass: int | None = None  # 1-based pass within the cycle
    offset: int | None = None  # offset number of the T word; 0 cancelled
    compensation: Literal["off", "left", "right"] = "off"
    thread_depth: float | None = None  # mm already reached by this pass, thread cycles
    dogleg: bool = True  # rapids: axes run independently
    dwell_after: float = 0.0  # s, G4 behind this move
    provisional: bool = False  # rests on a position or state after something not understood
    new_stock_state: bool = False  # stock here may be wrong: a not-audited cut came before

    @property
    def start(self) -> Point | None:
        """Start point, or None when any coordinate is unknown."""
        if self.start_z is None or self.start_r is None:
            return None
        return Point(self.start_z, self.start_r)

    @property
    def end(self) -> Point | None:
        """End point, or None when any coordinate is unknown."""
        if self.end_z is None or self.end_r is None:
            return None
        return Point(self.end_z, self.end_r)


@dataclass(frozen=True, slots=True)
class Remark:
    """A fact the interpreter noticed about the text; checks turn remarks into findings.

    ``topic`` names the hazard (see ``interpret/topics.py``), never a level.
    """

    topic: str
    line: int
    block: str | None
    message: str
    words: tuple[str, ...] = ()  # letters of the words at fault, to be marked in the line
    tool: int | None = None
    value: float | None = None
    limit: float | None = None
    unit: str | None = None
    remedy: str | None = None


@dataclass(frozen=True, slots=True)
class NotAudited:
    """A motion block that could not be audited, and why."""

    line: int
    text: str
    reason: str


@dataclass(frozen=True, slots=True)
class Interpretation:
    """A program carried out on paper."""

    moves: tuple[Move, ...]
    remarks: tuple[Remark, ...]
    not_audited: tuple[NotAudited, ...]
    motion_lines: frozenset[int]  # executed source lines with motion
    system: System
    units: Literal["mm", "in"]
    assumptions: tuple[Assumption, ...] = ()
    dwell_time: float = 0.0  # s
    ended: str | None = None  # "M30" …
    tools_called: tuple[tuple[int, int], ...] = field(default=())  # (tool number, line of first call)
