"""One program being carried out: the declared job, the modal state, the record, and the path in the making."""

from __future__ import annotations

from dataclasses import dataclass, field
from typing import Literal

from auditor.declared.control_settings import SETTINGS, choice, setting
from auditor.declared.model import Control, Job, Point, System, Tool
from auditor.interpret import corners
from auditor.interpret.compensated_run import CompensatedRun
from auditor.interpret.cycles.call import CycleFault, CycleRemark, Stroke
from auditor.interpret.flow import Flow
from auditor.interpret.log import Log
from auditor.interpret.moves import Remark
from auditor.interpret.state import State
from auditor.interpret.variables import Variables
from auditor.interpret.words import BlockWords

Side = Literal["off", "left", "right"]


class NotUnderstood(Exception):  # noqa: N818 - not an error: the block is left out and said so
    """A block with motion that cannot be carried out; becomes a NotAudited, the rest goes on."""

    def __init__(self, reason: str, topic: str | None = None, words: tuple[str, ...] = ()) -> None:
        super().__init__(reason)
        self.reason = reason
        self.topic = topic
        self.words = words


@dataclass(slots=True)
class CornerChain:
    """Straight blocks that wait for the block behind them (corner words, lines known by their angle)."""

    start: Point
    legs: list[corners.Leg] = field(default_factory=list)
    words: list[BlockWords] = field(default_factory=list)


@dataclass(slots=True)
class Run:
    """What every handler of a code works on."""

    job: Job
    system: System
    state: State
    log: Log
    words: BlockWords  # the block being carried out
    flow: Flow
    variables: Variables = field(default_factory=Variables)
    compensated: CompensatedRun = field(default_factory=CompensatedRun)
    chain: CornerChain | None = None
    collected: list[Stroke] | None = None  # strokes of a profile, instead of moves
    profile_is_cut: bool = False  # the profile is being finished, not only drawn for a roughing cycle
    profile_side: Side = "off"  # compensation within the profile carried out last
    rough_starts: dict[tuple[int | None, int | None], Point | None] = field(default_factory=dict)
    cycle: str | None = None  # the cycle whose strokes are being written
    cycle_side: Side | None = None  # compensation of these strokes
    stock_in_doubt: bool = False  # a not-audited block may have cut
    flow_in_doubt: bool = False  # the way taken depended on something not known
    moved: bool = False  # the program has moved already
    strokes: int = 0  # carried out so far
    units_said: bool = False
    units: Literal["mm", "in"] | None = None  # of the first motion
    first_zero: str | None = None  # the work zero taken for the declared Z0
    called_name: str | None = None  # M98 <NAME>
    ended: str | None = None

    doglegs: bool = field(init=False)
    rapid_speed_at_end: bool = field(init=False)

    def __post_init__(self) -> None:
        self.doglegs = choice(self.control, "rapid_path") == "dogleg"
        self.rapid_speed_at_end = choice(self.control, "surface_speed_in_rapid") == "end point"

    @property
    def control(self) -> Control:
        """How the text is read."""
        return self.job.control

    @property
    def tool(self) -> Tool | None:
        """The declared tool in working position."""
        number = self.state.tool.number
        return None if number is None else self.job.tools.get(number)

    def remark(
        self,
        topic: str,
        message: str,
        *words: str,
        line: int | None = None,
        value: float | None = None,
        limit: float | None = None,
        unit: str | None = None,
        remedy: str | None = None,
    ) -> None:
        """Note something about the block being carried out, or about ``line``."""
        own = line is None or line == self.words.line
        remark = Remark(
            topic=topic,
            line=self.words.line if line is None else line,
            block=self.words.label if own else None,
            message=message,
            words=words,
            tool=self.state.tool.number,
            value=value,
            limit=limit,
            unit=unit,
            remedy=remedy,
        )
        self.log.add_remark(remark)

    def not_audited(self, reason: str) -> None:
        """The block has motion that cannot be followed; it may have cut unless it was a rapid."""
        self.log.add_not_audited(self.words.line, self.words.text, reason)
        if self.state.motion != "rapid":
            self.stock_in_doubt = True

    def note(self, *found: CycleFault | CycleRemark) -> None:
        """What a cycle, a corner, an arc or compensation has to say about its path."""
        for one in found:
            self.remark(one.topic, one.message, *one.words, line=one.line)

    def lean_on(self, key: str, what: str) -> None:
        """Note a setting of the control that the path rests on and that nobody declared."""
        if key in self.control.settings or key not in SETTINGS:
            return
        value, entry = setting(self.control, key), SETTINGS[key]
        unit = {"length": " mm", "angle": " deg"}.get(entry.dimension or "", "")
        text = f"{value:g}{unit}" if isinstance(value, float) else str(value)
        self.log.assume(f"control.{key}", text, f"not declared; {what} rests on it: {entry.touches}")

    def finish(self, how: str) -> None:
        """The program ends here."""
        self.ended = how
