"""One program being carried out: the declared job, the modal state, the record, and the path in the making."""

from __future__ import annotations

from dataclasses import dataclass, field, replace
from typing import Literal

from auditor.declared.control_settings import choice
from auditor.declared.model import Control, Job, Point, System, Tool
from auditor.interpret import corners
from auditor.interpret.compensated_run import CompensatedRun, joined
from auditor.interpret.cycles.call import CycleFault, CycleRemark, Stroke
from auditor.interpret.flow import Flow
from auditor.interpret.library import Program
from auditor.interpret.log import Log
from auditor.interpret.moves import Kind, Move, Remark, Spindle
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
    first_zero: str | None = None  # the work zero taken for the declared Z0
    called_name: str | None = None  # M98 <NAME>
    ended: str | None = None

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

    def cycle_fault(self, fault: CycleFault) -> None:
        """A cycle, corner or arc that cannot be carried out as written."""
        self.remark(fault.topic, fault.message, *fault.words, line=fault.line)

    def cycle_remarks(self, remarks: tuple[CycleRemark, ...]) -> None:
        """What a cycle, or compensation, has to say about its path."""
        for remark in remarks:
            self.remark(remark.topic, remark.message, *remark.words, line=remark.line)

    def lose_track(self, reason: str) -> None:
        """Something unknown ran here: the block is not audited, and nothing it may have changed is known."""
        self.settle()
        self.log.add_not_audited(self.words.line, self.words.text, reason)
        self.stock_in_doubt = self.flow_in_doubt = True
        self.state.forget_position()
        self.state.motion = self.state.drilling = None

    def target_missing(self, number: int) -> None:
        """A jump or return to a block that does not exist: where the program goes on is not known."""
        self.remark("target-missing", f"N{number} is not in {self.flow.frame.program.title}", "P")
        self.lose_track(f"the program goes on at N{number}, which is missing")

    def jump(self, number: int) -> None:
        """Go on at block N``number``."""
        self.check_repeated(number)
        if not self.flow.jump(number):
            self.target_missing(number)

    def check_repeated(self, number: int) -> None:
        """A block number that is used as a target should stand once."""
        lines = self.flow.repeated_number(number)
        if lines:
            where = ", ".join(str(line) for line in lines)
            self.remark("number-repeated", f"N{number} stands more than once: lines {where}")

    def call(self, program: Program, *, repeats: int, first: int = 0, macro: bool = False) -> None:
        """Run another program and come back."""
        if repeats < 1:
            return
        frame = self.flow.frame
        place = (self.words.line, self.words.label) if frame.program.file is None else (frame.call_line, None)
        self.flow.call(program, repeats=repeats, place=place, first=first, macro=macro)

    def finish(self, how: str) -> None:
        """The program ends here."""
        self.ended = how

    def travel(self, stroke: Stroke) -> None:
        """Carry out one stroke from the programmed point; its end is the programmed point afterwards."""
        start = self.state.position
        if start is None:
            raise NotUnderstood(self.unknown_start(), "position-unknown")
        self.begin_stroke()
        stroke = self.dressed(stroke)
        run = self.compensated
        if self.state.compensation != "off" and stroke.kind is not Kind.THREAD:
            run.hold(start, stroke, self.state.compensation)
        elif run.open and run.cancelling:
            run.hold(start, stroke, run.side or "left")
            self.release_compensated()
        else:
            self.write((run.tip or start).z, (run.tip or start).r, stroke)
            run.tip = None
        self.state.z, self.state.r = stroke.end

    def begin_stroke(self) -> None:
        """A motion begins: what has to be settled before the first, and counted for each."""
        self.strokes += 1
        if self.collected is None:
            self.log.motion_lines.add(self.words.line)
        if not self.units_said and self.control.units is None and self.log.first_time("units-missing"):
            self.remark("units-missing", "neither the program nor the job says mm or inch: read as mm")
            self.log.assume("control.units", "mm", "not declared, and no unit code before the first motion")

    def rapid_partly_known(self, end_z: float | None, end_r: float | None) -> None:
        """A rapid whose start or end is not wholly known: written axis by axis."""
        self.settle()
        self.begin_stroke()
        stroke = self.dressed(Stroke(Kind.RAPID, Point(end_z or 0.0, end_r or 0.0)), end_r)
        self.write(self.state.z, self.state.r, stroke, (end_z, end_r))
        self.state.z, self.state.r = end_z, end_r

    def unknown_start(self) -> str:
        """Why a cut cannot be followed when its start is not known."""
        missing = " and ".join(name for name, value in (("X", self.state.r), ("Z", self.state.z)) if value is None)
        return f"the position in {missing} is not known here; a rapid with X and Z would restate it"

    def dressed(self, stroke: Stroke, end_r: float | None = None) -> Stroke:
        """The stroke with line, block, feed and spindle of the block that made it."""
        feed, spindle = stroke.feed, stroke.spindle or self.state.spindle.command()
        if stroke.kind is Kind.RAPID:
            if spindle.mode == "surface" and choice(self.control, "surface_speed_in_rapid") == "end point":
                spindle = replace(spindle, fixed_diameter=2.0 * abs(stroke.end.r if end_r is None else end_r))
        elif feed is None and self.state.feed.certain:
            feed = self.state.feed.command()
        return replace(
            stroke,
            feed=feed,
            spindle=spindle,
            line=stroke.line or self.words.line,
            block=stroke.block or self.words.label,
        )

    def write(
        self,
        start_z: float | None,
        start_r: float | None,
        stroke: Stroke,
        end: tuple[float | None, float | None] | None = None,
    ) -> None:
        """Put a dressed stroke on record as a move; ``end`` replaces an end that is not wholly known."""
        if self.collected is not None:
            if end is not None:
                raise NotUnderstood("a profile block leads to a point that is not known", "position-unknown")
            self.collected.append(stroke)
            return
        state = self.state
        end_z, end_r = stroke.end if end is None else end
        self.log.dwell_time += stroke.dwell_after
        self.moved = True
        self.log.add_move(
            Move(
                index=len(self.log.moves),
                line=stroke.line or self.words.line,
                block=stroke.block,
                tool=state.tool.number if state.tool.certain else None,
                kind=self.kind_at_tool(stroke.kind),
                start_z=start_z,
                start_r=start_r,
                end_z=end_z,
                end_r=end_r,
                feed=stroke.feed,
                spindle=stroke.spindle or Spindle(),
                centre=stroke.centre,
                clockwise=stroke.clockwise,
                lead=stroke.lead,
                cycle=self.cycle,
                cycle_pass=stroke.cycle_pass,
                offset=state.tool.offset,
                compensation=self.cycle_side or self.compensated.side or state.compensation,
                thread_depth=stroke.thread_depth,
                dogleg=choice(self.control, "rapid_path") == "dogleg",
                dwell_after=stroke.dwell_after,
                provisional=self.in_doubt(stroke.kind),
                new_stock_state=self.stock_in_doubt,
            )
        )

    def kind_at_tool(self, kind: Kind) -> Kind:
        """Every feed move of a drilling tool is drilling."""
        drills = self.tool is not None and self.tool.kind == "drilling"
        return Kind.DRILL if drills and kind is Kind.FEED else kind

    def in_doubt(self, kind: Kind) -> bool:
        """Whether a move rests on something that was not understood."""
        state = self.state
        cut_in_doubt = kind is not Kind.RAPID and not (state.spindle.certain and state.feed.certain)
        return cut_in_doubt or self.flow_in_doubt or state.foreign_zero or not state.tool.certain

    def settle(self) -> None:
        """Carry out what still waits for a following move: corners, a compensated run."""
        self.close_chain()
        if self.compensated.open:
            self.release_compensated()

    def settle_or_fault(self) -> None:
        """As ``settle``, inside a profile: what is wrong there is a fault of the cycle."""
        chain, self.chain = self.chain, None
        if chain is not None:
            corners.draw(chain.start, chain.legs)  # raises: the last leg waits for a following move
        if self.compensated.open:
            self.release_compensated()

    def release_compensated(self) -> None:
        """Write the tip path of the compensated run."""
        run = self.compensated
        start, side = run.start, run.side
        assert start is not None
        try:
            path = run.release(self.control, self.tool)
        except CycleFault as fault:
            self.cycle_fault(fault)
            self.stock_in_doubt = True
            self.not_audited(fault.message)
            return
        tip, run.side = run.tip, side
        self.cycle_remarks(path.remarks)
        for point, stroke in joined(start, path.strokes):
            self.write(point.z, point.r, stroke)
        run.side, run.tip = None, tip

    def close_chain(self) -> None:
        """Draw the straight blocks that waited for their following move."""
        chain, self.chain = self.chain, None
        if chain is None:
            return
        try:
            strokes = corners.draw(chain.start, chain.legs)
        except CycleFault as fault:
            self.cycle_fault(fault)
            for words in chain.words:
                self.log.add_not_audited(words.line, words.text, fault.message)
            self.stock_in_doubt = True
            return
        self.state.z, self.state.r = chain.start
        for stroke in strokes:
            self.travel(stroke)
