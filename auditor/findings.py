"""What checks make and reports show. Below both, so that neither knows the other."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass
from enum import StrEnum
from typing import Literal

from auditor.declared.model import Acceptance, Assumption, Job, Point
from auditor.interpret.moves import Interpretation, Move, NotAudited
from auditor.parse.blocks import ProgramText
from auditor.predict.loads import Prediction
from auditor.simulate.samples import Simulation

Verdict = Literal["stop", "incomplete", "review", "clear"]


class Level(StrEnum):
    """How grave a finding is."""

    STOP = "stop"
    REVIEW = "review"
    NOTE = "note"


@dataclass(frozen=True, slots=True)
class Limit:
    """A threshold of a check, settable in [limits] under its name."""

    name: str
    default: float
    unit: str  # "" for a plain number; a pint unit otherwise
    provenance: Literal["published", "common practice", "model", "declared"]
    meaning: str


@dataclass(frozen=True, slots=True)
class Finding:
    """One thing a person must know about a block."""

    check: str
    level: Level
    line: int
    block: str | None
    tool: int | None
    message: str  # what happens at the machine, then the figures, in a setter's words
    at: Point | None = None
    value: float | None = None
    band: tuple[float, float] | None = None
    limit: float | None = None
    unit: str | None = None
    remedy: str | None = None
    words: tuple[str, ...] = ()  # letters of the words to mark in the line: ("F",)
    situation: str | None = None  # the cutting situation in one line
    move: int | None = None
    accepted: Acceptance | None = None
    fingerprint: str = ""


@dataclass(frozen=True, slots=True)
class NotJudged:
    """A check that lacks a declaration it cannot do without."""

    check: str
    why: str


@dataclass(frozen=True, slots=True)
class Coverage:
    """How much of the motion was understood and audited."""

    motion_blocks: int
    audited: int
    not_audited: tuple[NotAudited, ...]


@dataclass(frozen=True, slots=True)
class Totals:
    """Times in s, volume in mm3."""

    time: float
    cutting_time: float
    air_feed_time: float
    removed: float


@dataclass(frozen=True, slots=True)
class Run:
    """All that a check may look at, with the thresholds in force."""

    job: Job
    text: ProgramText
    path: Interpretation
    simulation: Simulation
    prediction: Prediction
    limits: Mapping[str, float]

    def finding(self, check: str, level: Level, move: Move, message: str, **figures: object) -> Finding:
        """A finding about a move, with its place filled in."""
        fields: dict[str, object] = {
            "line": move.line, "block": move.block, "tool": move.tool, "move": move.index, "at": move.end,
        }
        fields.update(figures)
        return Finding(check=check, level=level, message=message, **fields)  # type: ignore[arg-type]


@dataclass(frozen=True, slots=True)
class Rule:
    """A check as found in its file: its name, its text (the docstring) and its thresholds."""

    name: str
    title: str  # first line of the docstring
    text: str  # the docstring: What / Why / Formula and source / Remedy
    limits: tuple[Limit, ...]
    judge: Callable[[Run], Iterator[Finding | NotJudged]]


@dataclass(frozen=True, slots=True)
class Audit:
    """A program, judged."""

    run: Run
    verdict: Verdict
    coverage: Coverage
    findings: tuple[Finding, ...]
    not_judged: tuple[NotJudged, ...]
    assumptions: tuple[Assumption, ...]
    totals: Totals
    rules: Mapping[str, Rule]

    def count(self, level: Level) -> int:
        """Findings of that level that nobody accepted."""
        return sum(finding.level is level and finding.accepted is None for finding in self.findings)
