"""What the audits of a shift's jobs say together."""

from __future__ import annotations

import math
from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from typing import Literal

from auditor.audit import audit
from auditor.declared.jobs import JOB_SUFFIX, job_beside, load_job
from auditor.declared.machines import WORN
from auditor.declared.model import Assumption, Job, Tool
from auditor.errors import DeclarationError, Fault, TurnauditError
from auditor.findings import Audit, Finding, Level
from auditor.mechanics.life import UNATTENDED_SHARE
from auditor.predict.edge_use import edge_use
from auditor.reports._figures import duration
from auditor.reports._groups import groups
from auditor.reports._uses import called
from auditor.shift.plan import Plan, PlannedJob

Verdict = Literal["stop", "incomplete", "review", "clear"]

CHIP_CHECKS = ("breaker-window", "stringy-chips", "chip-too-thin")


@dataclass(frozen=True, slots=True)
class EdgeNeed:
    """What a tool's edges must bear in the batch."""

    tool: Tool
    per_part: float | None  # share of an edge; None without a declared Taylor pair
    parts_an_edge: int | None
    needed: int | None  # edges for the batch
    at_hand: int

    @property
    def short(self) -> bool:
        """Whether the edges at hand do not last the batch."""
        return self.needed is not None and self.needed > self.at_hand


@dataclass(frozen=True, slots=True)
class JobAnswer:
    """One job of the shift; times in s from its start."""

    planned: PlannedJob
    name: str
    audit: Audit | None
    faults: tuple[Fault, ...]
    batch: int
    cycle: float  # of one part, with the change of parts
    begin: float
    end: float
    edges: tuple[EdgeNeed, ...]

    @property
    def verdict(self) -> str:
        """The program's verdict."""
        return "unreadable" if self.audit is None else self.audit.verdict

    def open(self, level: Level) -> list[Finding]:
        """Findings of a level that nobody accepted."""
        found = () if self.audit is None else self.audit.findings
        return [finding for finding in found if finding.level is level and finding.accepted is None]

    def chip_hazards(self) -> list[Finding]:
        """Open findings that speak of chips nobody would clear."""
        return [finding for level in (Level.STOP, Level.REVIEW) for finding in self.open(level)
                if finding.check in CHIP_CHECKS]


@dataclass(frozen=True, slots=True)
class Decision:
    """What a person must see to before leaving."""

    level: Literal["stop", "review"]
    job: str | None
    text: str
    remedy: str | None = None


@dataclass(frozen=True, slots=True)
class Shift:
    """A shift, judged."""

    plan: Plan
    jobs: tuple[JobAnswer, ...]
    decisions: tuple[Decision, ...]

    @property
    def time(self) -> float:
        """From the start of the first job to the end of the last, s."""
        return self.jobs[-1].end if self.jobs else 0.0

    @property
    def verdict(self) -> Verdict:
        """The gravest of the jobs' verdicts; whatever must be decided makes it a review at least."""
        verdicts = {job.verdict for job in self.jobs}
        if "stop" in verdicts:
            return "stop"
        if verdicts & {"incomplete", "unreadable"}:
            return "incomplete"
        return "review" if self.decisions else "clear"

    @property
    def counts(self) -> str:
        """How much there is to see to, in words."""
        stops = sum(decision.level == "stop" for decision in self.decisions)
        told = ((stops, "must be fixed"), (len(self.decisions) - stops, "to decide"))
        return ", ".join(f"{number} {what}" for number, what in told if number) or "nothing to decide"


def judge_shift(plan: Plan) -> Shift:
    """Audit every job of a plan, one after the other, and put the answers together."""
    answers: list[JobAnswer] = []
    for planned in plan.jobs:
        begin = answers[-1].end + plan.change_over if answers else 0.0
        answers.append(_answer(plan, planned, begin))
    return Shift(plan, tuple(answers), tuple(_decisions(plan, answers)))


def _answer(plan: Plan, planned: PlannedJob, begin: float) -> JobAnswer:
    is_job = planned.path.name.endswith(JOB_SUFFIX)
    name = planned.path.name.removesuffix(JOB_SUFFIX) if is_job else planned.path.stem
    try:
        job = _as_planned(_load(planned), plan, planned)
        judged = audit(job)
    except TurnauditError as problem:
        return JobAnswer(planned, name, None, problem.faults, planned.batch or 1, 0.0, begin, begin, ())
    batch = job.batch or 1
    cycle = judged.totals.time + planned.part_change
    edges = tuple(_edge_need(judged, tool, batch, planned, plan) for tool in _cutting_tools(judged))
    return JobAnswer(planned, name, judged, (), batch, cycle, begin, begin + batch * cycle, edges)


def _load(planned: PlannedJob) -> Job:
    if planned.path.name.endswith(JOB_SUFFIX):
        return load_job(planned.path)
    declared = job_beside(planned.path)
    if declared is None:
        wanted = f"a job file, or a program with {planned.path.stem}{JOB_SUFFIX} beside it"
        raise DeclarationError(Fault("no job file", file=str(planned.path), wanted=wanted))
    return load_job(declared, program=planned.path)


def _as_planned(job: Job, plan: Plan, planned: PlannedJob) -> Job:
    """The job with the batch and the watch of the shift; without a person beside it edges are taken as worn."""
    model, assumptions = job.model, job.assumptions
    if plan.unattended and not job.unattended and any(each.about == "model.wear_factor" for each in assumptions):
        model = replace(model, wear_factor=WORN)
        worn = Assumption("model.wear_factor", f"{WORN:g}", "the shift is unattended: edges wear")
        assumptions = (*(each for each in assumptions if each.about != worn.about), worn)
    return replace(
        job, batch=planned.batch or job.batch, unattended=plan.unattended, model=model, assumptions=assumptions
    )


def _cutting_tools(judged: Audit) -> list[Tool]:
    run = judged.run
    numbers = dict.fromkeys(
        move.tool for move in run.path.moves if run.prediction.moves.cutting_time[move.index] > 0.0
    )
    return [run.job.tools[number] for number in numbers if number is not None and number in run.job.tools]


def _edge_need(judged: Audit, tool: Tool, batch: int, planned: PlannedJob, plan: Plan) -> EdgeNeed:
    """Edges the batch needs: of a predicted life an unattended run may use a share only."""
    run = judged.run
    usable = run.limits.get("life_share", UNATTENDED_SHARE) if plan.unattended else 1.0
    used = edge_use(tool, run.path.moves, run.prediction.moves)
    at_hand = planned.edges.get(tool.number, 1)
    if used is None or used <= 0.0:
        return EdgeNeed(tool, used, None, None, at_hand)
    lasts = int(usable / used + 1e-9)
    needed = math.ceil(batch / lasts) if lasts else math.ceil(batch * used / usable)
    return EdgeNeed(tool, used, lasts, needed, at_hand)


def _decisions(plan: Plan, answers: Sequence[JobAnswer]) -> Iterator[Decision]:
    for job in answers:
        yield from _about_job(job, plan)
    total = answers[-1].end if answers else 0.0
    if total > plan.length:
        late = [job.name for job in answers if job.end > plan.length]
        yield Decision("review", None, f"The jobs take {duration(total)}, the shift has {duration(plan.length)}: "
                                       f"{', '.join(late)} will not be finished.")


def _about_job(job: JobAnswer, plan: Plan) -> Iterator[Decision]:
    for fault in job.faults:
        yield Decision("stop", job.name, f"Not audited: {fault}")
    if job.audit is None:
        return
    for block in job.audit.coverage.not_audited:
        yield Decision("stop", job.name, f"Line {block.line} was not checked: {block.reason}")
    for group in groups([*job.open(Level.STOP), *job.open(Level.REVIEW)]):
        first = group[0]
        if first.check != "edge-life":  # told below with the edges at hand
            also = f" and {len(group) - 1} more" if len(group) > 1 else ""
            told = f"Line {first.line}{also}, {first.check}: {first.message}"
            yield Decision("stop" if first.level is Level.STOP else "review", job.name, told, first.remedy)
    yield from _about_edges(job, plan)
    for item in job.audit.not_judged:
        if item.check in ("chuck-grip", "spindle-speed", "bar-whip", "jaw-contact"):
            yield Decision("review", job.name, f"Not judged, {item.check}: {item.why}")


def _about_edges(job: JobAnswer, plan: Plan) -> Iterator[Decision]:
    for need in job.edges:
        if need.per_part is None and plan.unattended:
            open_life = f"no Taylor pair is declared, nobody knows how long its edge lasts over {job.batch} parts."
            yield Decision("review", job.name, f"{called(need.tool)}: {open_life}")
        elif need.short:
            lasts = f"an edge lasts {need.parts_an_edge} parts" if need.parts_an_edge else "an edge lasts no whole part"
            yield Decision(
                "review", job.name,
                f"{called(need.tool)}: {job.batch} parts need {need.needed} edges ({lasts}), {need.at_hand} at hand.",
                f"Stop after {need.at_hand * need.parts_an_edge} parts, or have more edges in the turret."
                if need.parts_an_edge else "A lower cutting speed.",
            )
