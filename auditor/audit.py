"""The six stages as six calls, and the judgement that follows from them."""

from __future__ import annotations

import datetime
import hashlib
from collections import Counter
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import replace
from pathlib import Path

import numpy as np
from shapely.geometry.base import BaseGeometry

from auditor.checks import rules
from auditor.checks._judging import one_per_block
from auditor.declared.jobs import job_beside, load_job
from auditor.declared.model import Acceptance, Assumption, EarlierPart, Job, LimitValue, Point
from auditor.errors import DeclarationError, Fault, ProgramError
from auditor.findings import (
    Audit,
    Coverage,
    Finding,
    Level,
    Limit,
    NotJudged,
    Rule,
    Run,
    Totals,
    Verdict,
)
from auditor.interpret import interpret
from auditor.interpret.moves import Interpretation, Kind, Remark
from auditor.parse import read_program
from auditor.parse.blocks import ProgramText
from auditor.predict import predict
from auditor.simulate import simulate

FLOW = "program-flow"  # the check that speaks of what the block-skip switch changes


def audit_program(path: str | Path, job_path: str | Path | None = None) -> Audit:
    """Audit one program against its job file (``PART.job.toml`` beside it unless named).

    Raises:
        DeclarationError: the job file is missing, or it or its shop file does not hold together.
        ProgramError: the program cannot be read, or nothing in it is understood as motion.
    """
    declared = Path(job_path) if job_path is not None else job_beside(path)
    if declared is None:
        raise DeclarationError(_no_job(path))
    return audit(load_job(declared, program=path))


def audit(job: Job, today: datetime.date | None = None) -> Audit:
    """Audit the program that a job names, with block skip as declared and, where it matters, the other way."""
    day = today or datetime.date.today()
    own = _audit(job, day, ())
    if all(block.skip is None for block in own.run.text.blocks):
        return own
    turned = not job.control.block_skip
    try:
        other = _audit(replace(job, control=replace(job.control, block_skip=turned)), day, ())
    except ProgramError:  # nothing moves with the switch the other way
        return own
    flow = [*_only_in(other, own, turned), *(finding for finding in own.findings if finding.check == FLOW)]
    rest = [finding for finding in own.findings if finding.check != FLOW]
    merged = [verdict for verdict in one_per_block(flow) if isinstance(verdict, Finding)]
    findings = _judged(own.run, [*rest, *merged], day)
    return replace(own, findings=tuple(findings), verdict=_verdict(findings, own.coverage))


def _only_in(other: Audit, own: Audit, skipping: bool) -> Iterator[Finding]:
    """What would be wrong with the block-skip switch the other way, as something to decide."""
    known = {(finding.check, finding.line) for finding in own.findings if finding.level is not Level.NOTE}
    known |= {(FLOW, remark.line) for remark in other.run.path.remarks if remark.topic == "stop-unattended"}
    switch = "on" if skipping else "off"
    does = {Level.STOP: "stops this block", Level.REVIEW: "asks for a review of it"}
    for finding in sorted(other.findings, key=lambda finding: list(Level).index(finding.level)):
        if finding.level is not Level.NOTE and (finding.check, finding.line) not in known:
            yield Finding(
                check=FLOW,
                level=Level.REVIEW,
                line=finding.line,
                block=finding.block,
                tool=finding.tool,
                message=f"With block skip {switch}, {finding.check} {does[finding.level]}: {finding.message}",
                at=finding.at,
                words=finding.words,
                remedy=finding.remedy,
            )


def _judged(run: Run, findings: Iterable[Finding], today: datetime.date) -> list[Finding]:
    """Findings in program order, within a line the gravest first, with fingerprints and decisions."""
    order = list(Level)
    ranked = sorted(findings, key=lambda finding: (finding.line, order.index(finding.level), finding.check))
    return _accepted(_fingerprinted(ranked, run.text), run.job.accepted, today)


def _audit(job: Job, today: datetime.date, later: tuple[Path, ...]) -> Audit:
    """Audit a job; ``later`` are the jobs that wait for its part."""
    job, doubts = _with_earlier_part(job, today, later)
    all_rules = rules()
    limits = limits_in_force(job, all_rules)
    text = read_program(job.program, job.control)
    path = interpret(text, job)
    path = replace(path, remarks=(*path.remarks, *doubts))
    if not path.moves:
        raise ProgramError(_no_motion(text, path))
    simulation = simulate(path, job)
    prediction = predict(path, simulation, job)
    run = Run(job=job, text=text, path=path, simulation=simulation, prediction=prediction, limits=limits)
    findings, not_judged = _judge(run, all_rules.values())
    findings = _judged(run, findings, today)
    coverage = _coverage(path)
    return Audit(
        run=run,
        verdict=_verdict(findings, coverage),
        coverage=coverage,
        findings=tuple(findings),
        not_judged=tuple(not_judged),
        assumptions=_assumptions(job, path),
        totals=_totals(run),
        rules=all_rules,
    )


def _with_earlier_part(job: Job, today: datetime.date, later: tuple[Path, ...]) -> tuple[Job, tuple[Remark, ...]]:
    """The job with the stock that an earlier job leaves, where it names one, and what is doubtful about it."""
    earlier = job.workpiece.earlier
    if earlier is None:
        return job, ()
    waiting = (*later, Path(job.path or "").resolve())
    key = "workpiece.stock.from"

    def fault(message: str, wanted: str) -> DeclarationError:
        return DeclarationError(Fault(message, file=job.path, key=key, found=earlier.job, wanted=wanted))

    if not Path(earlier.job).is_file():
        raise fault("no such job file", "the job file of the operation before")
    if Path(earlier.job).resolve() in waiting:
        raise fault("the jobs take their stock from each other", "a first job with raw stock of its own")
    before = _audit(load_job(earlier.job), today, waiting)
    if before.run.simulation.final.is_empty:
        raise fault("the earlier job leaves no part", "a part to hold")
    outline = _part_outline(before.run.simulation.final, earlier)
    low, high = min(point.z for point in outline), max(point.z for point in outline)
    workpiece = replace(
        job.workpiece, outline=outline, length=high - low, diameter=2.0 * max(point.r for point in outline)
    )
    part = f"the simulated part of {earlier.job}"
    told = Assumption("workpiece.stock", part, f"that job's own verdict is {before.verdict}")
    doubt = Remark(
        topic="earlier-part",
        line=1,
        block=None,
        message=f"the stock is {part}, whose own verdict is {before.verdict}: what really comes out may differ",
        remedy="Settle that job first.",
    )
    doubts = (doubt,) if before.verdict in ("stop", "incomplete") else ()
    return replace(job, workpiece=workpiece, assumptions=(*job.assumptions, told)), doubts


def _part_outline(part: BaseGeometry, earlier: EarlierPart) -> tuple[Point, ...]:
    """The part's half-section in the later job's coordinates: the face in front lies at ``face``."""
    ring = [Point(z, r) for z, r in part.exterior.coords[:-1]]
    if not earlier.flipped:
        return tuple(ring)
    back = min(point.z for point in ring)
    return tuple(Point(earlier.face + back - point.z, point.r) for point in reversed(ring))


def _judge(run: Run, all_rules: Iterable[Rule]) -> tuple[list[Finding], list[NotJudged]]:
    findings: list[Finding] = []
    not_judged: list[NotJudged] = []
    for rule in all_rules:
        for answer in rule.judge(run):
            if isinstance(answer, NotJudged):
                not_judged.append(answer)
            else:
                findings.append(answer)
    return findings, not_judged


def _fingerprinted(findings: Sequence[Finding], text: ProgramText) -> list[Finding]:
    """Marks that survive edits of other lines: check, tool, the block's own text, and its how-manieth."""
    seen: Counter[tuple[str, int | None, str]] = Counter()
    marked = []
    for finding in findings:
        line = text.lines[finding.line - 1] if 0 < finding.line <= len(text.lines) else ""
        key = (finding.check, finding.tool, "".join(line.split()).upper())
        mark = hashlib.sha256(repr((*key, seen[key])).encode()).hexdigest()[:16]
        seen[key] += 1
        marked.append(replace(finding, fingerprint=mark))
    return marked


def _accepted(
    findings: Sequence[Finding], decisions: Sequence[Acceptance], today: datetime.date
) -> list[Finding]:
    """Findings with the person's decision that covers them, unless it has run out."""

    def covers(decision: Acceptance, finding: Finding) -> bool:
        return (
            decision.check == finding.check
            and decision.line in (None, finding.line)
            and decision.tool in (None, finding.tool)
            and (decision.until is None or today <= decision.until)
        )

    return [
        replace(finding, accepted=next((decision for decision in decisions if covers(decision, finding)), None))
        for finding in findings
    ]


def _coverage(path: Interpretation) -> Coverage:
    lines = {entry.line for entry in path.not_audited}
    blocks = len(path.motion_lines | lines)
    return Coverage(motion_blocks=blocks, audited=blocks - len(lines), not_audited=path.not_audited)


def _verdict(findings: Sequence[Finding], coverage: Coverage) -> Verdict:
    open_levels = {finding.level for finding in findings if finding.accepted is None}
    if Level.STOP in open_levels:
        return "stop"
    if coverage.not_audited:
        return "incomplete"
    return "review" if Level.REVIEW in open_levels else "clear"


def _assumptions(job: Job, path: Interpretation) -> tuple[Assumption, ...]:
    """Defaults that this program leans on: those of tools it never calls are left out."""
    called = {str(number) for number, _ in path.tools_called}

    def matters(assumption: Assumption) -> bool:
        room, _, rest = assumption.about.partition(".")
        return room != "tools" or rest.partition(".")[0] in called

    return tuple(assumption for assumption in job.assumptions if matters(assumption)) + path.assumptions


def _totals(run: Run) -> Totals:
    figures = run.prediction.moves
    feed = [move.index for move in run.path.moves if move.kind is not Kind.RAPID]
    cutting = float(figures.cutting_time.sum())
    return Totals(
        time=float(np.nansum(figures.time)) + run.path.dwell_time,
        cutting_time=cutting,
        air_feed_time=float(np.nansum(figures.time[feed])) - cutting,
        removed=float(run.simulation.removed.sum()),
    )


_UNITS = {  # unit of a threshold -> dimension of its entry in [limits], and how many base units it holds
    "": ("number", 1.0),
    "mm": ("length", 1.0),
    "um": ("length", 0.001),
    "m": ("length", 1000.0),
    "deg": ("angle", 1.0),
    "N": ("force", 1.0),
    "kW": ("power", 1.0),
    "m/min": ("speed", 1.0),
    "rpm": ("rotation", 1.0),
    "min": ("time", 1.0),
    "s": ("time", 1.0 / 60.0),
}


def limits_in_force(job: Job, all_rules: Mapping[str, Rule]) -> dict[str, float]:
    """Every threshold of every check, in its own unit: its default, or what [limits] says.

    Raises:
        DeclarationError: [limits] or [[accepted]] name what no check knows, or give the wrong dimension.
    """
    known = {limit.name: limit for rule in all_rules.values() for limit in rule.limits}
    faults = [
        Fault(*problem, file=job.path, key=f"limits.{name}")
        for name, value in job.limits.items()
        if (problem := _limit_problem(value, known.get(name))) is not None
    ]
    faults += [
        Fault(f"no check is called {decision.check!r}", file=job.path, key=f"accepted.{number}.check",
              wanted="a name from `turnaudit explain`")
        for number, decision in enumerate(job.accepted, start=1)
        if decision.check not in all_rules
    ]  # fmt: skip
    if faults:
        raise DeclarationError(*faults)
    return {
        name: job.limits[name].value / _UNITS[limit.unit][1] if name in job.limits else limit.default
        for name, limit in known.items()
    }


def _limit_problem(value: LimitValue, limit: Limit | None) -> tuple[str] | None:
    if limit is None:
        return ("no check has this limit; `turnaudit explain CHECK` lists the limits of a check",)
    dimension = _UNITS[limit.unit][0]
    if value.dimension == dimension:
        return None
    wanted = "a plain number" if dimension == "number" else f'a {dimension} such as "{limit.default:g} {limit.unit}"'
    return (f"found {value.text!r}, wanted {wanted}",)


def _no_motion(text: ProgramText, path: Interpretation) -> Fault:
    first = next((entry for entry in path.not_audited), None)
    return Fault(
        "no motion in this program was understood" if first else "this file holds no motion block",
        file=text.path,
        line=first.line if first else None,
        found=first.reason if first else f"{len(text.lines)} lines without motion",
        wanted="a turning program with G-code motion blocks",
    )


def _no_job(path: str | Path) -> Fault:
    program = Path(path)
    return Fault(
        "no job file says on which machine and with which tools this program runs",
        file=str(path),
        wanted=f"{program.stem}.job.toml beside it, or --job FILE",
    )
