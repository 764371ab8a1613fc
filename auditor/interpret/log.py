"""What is written down while a program is carried out: moves, remarks, blocks not audited, assumptions."""

from __future__ import annotations

from dataclasses import dataclass, field, replace

from auditor.declared.model import Assumption
from auditor.interpret.moves import Move, NotAudited, Remark


@dataclass(slots=True)
class Log:
    """The record of one interpretation, in execution order."""

    moves: list[Move] = field(default_factory=list)
    remarks: list[Remark] = field(default_factory=list)
    not_audited: dict[int, NotAudited] = field(default_factory=dict)  # by line
    motion_lines: set[int] = field(default_factory=set)
    assumptions: dict[str, Assumption] = field(default_factory=dict)  # by what they are about
    dwell_time: float = 0.0  # s, of which the moves carry those behind them
    wet_tools: dict[int, int] = field(default_factory=dict)  # tool that cut with coolant -> line
    dry_tools: dict[int, int] = field(default_factory=dict)
    arc_sweeps: list[float] = field(default_factory=list)  # degrees, of every arc
    tools_called: dict[int, int] = field(default_factory=dict)  # tool number -> line of first call
    said: set[tuple[object, ...]] = field(default_factory=set)

    def add_move(self, move: Move) -> None:
        """Append a move, whose index is its place in the list."""
        assert move.index == len(self.moves)
        self.moves.append(move)
        self.motion_lines.add(move.line)

    def add_remark(self, remark: Remark) -> None:
        """Append a remark, once per line and topic and wording (loops repeat lines)."""
        key = (remark.topic, remark.line, remark.message)
        if key not in self.said:
            self.said.add(key)
            self.remarks.append(remark)

    def first_time(self, *key: object) -> bool:
        """Whether something is met for the first time; for remarks that are made once."""
        if key in self.said:
            return False
        self.said.add(key)
        return True

    def has_been(self, *key: object) -> bool:
        """Whether ``first_time`` was asked before."""
        return key in self.said

    def add_not_audited(self, line: int, text: str, reason: str) -> None:
        """Count a motion block as not audited; a line that runs again keeps its first reason."""
        self.motion_lines.add(line)
        self.not_audited.setdefault(line, NotAudited(line, text.strip(), reason))

    def assume(self, about: str, value: str, why: str) -> None:
        """Note a default that the path rests on, once."""
        self.assumptions.setdefault(about, Assumption(about, value, why))

    def dwell(self, seconds: float) -> None:
        """Count a dwell and hang it behind the last move."""
        self.dwell_time += seconds
        if self.moves:
            last = self.moves[-1]
            self.moves[-1] = replace(last, dwell_after=last.dwell_after + seconds)
