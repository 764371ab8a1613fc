"""What the interpreter hands to a cycle, and what a cycle hands back."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from auditor.declared.model import Control, Point
from auditor.interpret.moves import Feed, Kind, Spindle
from auditor.parse.blocks import Number

INCH = 25.4


@dataclass(frozen=True, slots=True)
class Stroke:
    """One motion made by a cycle, a corner word or compensation; X as radius, mm."""

    kind: Kind
    end: Point
    centre: Point | None = None
    clockwise: bool | None = None
    feed: Feed | None = None  # None: the feed in force
    lead: float | None = None  # threads, mm
    cycle_pass: int | None = None
    thread_depth: float | None = None  # mm
    dwell_after: float = 0.0  # s
    spindle: Spindle | None = None  # None: the spindle in force
    line: int | None = None  # source line when it is not the cycle's own (finishing cycle)
    block: str | None = None
    reversed_spindle: bool = False  # tapping, way out


@dataclass(frozen=True, slots=True)
class CycleFault(Exception):  # noqa: N818 - a fault of the program, not of ours
    """The cycle cannot be carried out as written; becomes a remark, the block is not audited."""

    topic: str
    message: str
    words: tuple[str, ...] = ()
    line: int | None = None  # the profile block at fault, when it is not the cycle's own


@dataclass(frozen=True, slots=True)
class CycleRemark:
    """Something a reviewer should know; the path was made all the same."""

    topic: str
    message: str
    words: tuple[str, ...] = ()
    line: int | None = None


@dataclass(frozen=True, slots=True)
class CycleCall:
    """A cycle block with the state it acts in.

    ``words`` are the block's words as literal numbers (expressions already evaluated, ``has_point``
    then True); ``stored`` holds modal values of the same cycle (depth, retract …) under plain names
    in mm and is replaced by the interpreter with ``Expansion.stored`` afterwards.
    """

    name: str  # "rough turning", "finishing" … independent of the code system
    line: int
    start: Point
    words: Mapping[str, Number]
    control: Control
    inch: bool
    feed: Feed | None
    spindle: Spindle
    rapid_mode: bool = True  # False: infeed in G1 (block ns of a profile)
    profile: tuple[Stroke, ...] = ()  # P..Q carried out from the start point, with their own lines
    profile_spans: frozenset[str] = frozenset()  # letters present in block ns ("X", "Z", "U", "W")
    stored: Mapping[str, float] = field(default_factory=dict)
    absolute: bool = True  # systems B and C: G90/G91
    return_to_initial: bool = True  # systems B and C: G98/G99 in drilling
    nose_radius: float = 0.0
    tool_width: float | None = None

    def length(self, letter: str) -> float | None:
        """A length word in mm as written (no diameter halving); None when absent."""
        number = self.words.get(letter)
        if number is None:
            return None
        scale = INCH if self.inch else 1.0
        if number.has_point or self.control.whole_numbers == "units":
            return number.value * scale
        return number.value * self.least_increment

    def increments(self, letter: str) -> float | None:
        """P, Q, D of the pecking and multi-pass cycles in mm: least increments unless written with a point."""
        number = self.words.get(letter)
        if number is None:
            return None
        if number.has_point:
            return number.value * (INCH if self.inch else 1.0)
        return number.value * self.least_increment

    @property
    def least_increment(self) -> float:
        """The least input increment in mm, in the units in force."""
        return 0.0001 * INCH if self.inch else self.control.increment


@dataclass(frozen=True, slots=True)
class Expansion:
    """What a cycle makes of a call."""

    strokes: tuple[Stroke, ...]
    remarks: tuple[CycleRemark, ...] = ()
    stored: Mapping[str, float] = field(default_factory=dict)
    leaned_on: tuple[str, ...] = ()  # settings of [control] that the path rests on
