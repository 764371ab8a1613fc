"""A shift for other programs: one JSON object, every unit in its key."""

from __future__ import annotations

import json
from collections.abc import Sequence

from auditor.findings import Finding
from auditor.reports._rows import number
from auditor.shift.judge import EdgeNeed, JobAnswer, Shift
from auditor.shift.worst import worst

FORM = "turnaudit-shift/1"

Object = dict[str, object]


def shift_document(shift: Shift) -> str:
    """The document."""
    plan = shift.plan
    body: Object = {
        "report": FORM, "plan": {"path": plan.path, "name": plan.name}, "verdict": shift.verdict,
        "unattended": plan.unattended, "shift_s": number(plan.length), "time_s": number(shift.time),
        "decisions": [
            {"level": each.level, "job": each.job, "text": each.text, "remedy": each.remedy}
            for each in shift.decisions
        ],
        "jobs": [_job(job) for job in shift.jobs],
        "assumptions": [{"about": each.about, "value": each.value, "why": each.why} for each in plan.assumptions],
    }
    return json.dumps(body, indent=1, allow_nan=False) + "\n"


def _job(job: JobAnswer) -> Object:
    return {
        "job": str(job.planned.path), "name": job.name, "verdict": job.verdict, "batch": job.batch,
        "part_time_s": number(job.cycle), "begin_s": number(job.begin), "end_s": number(job.end),
        "largest_shares": [] if job.audit is None else [
            {"limit": each.what, "share": number(each.share), "line": each.line, "tool": each.tool}
            for each in worst(job.audit)
        ],
        "edges": [_edge(need) for need in job.edges],
        "chip_hazards": _named(job.chip_hazards()),
        "errors": [str(fault) for fault in job.faults],
    }


def _edge(need: EdgeNeed) -> Object:
    return {
        "tool": need.tool.number, "name": need.tool.name, "edges_per_part": number(need.per_part),
        "parts_per_edge": need.parts_an_edge, "edges_needed": need.needed, "edges_at_hand": need.at_hand,
    }


def _named(findings: Sequence[Finding]) -> list[Object]:
    return [{"check": each.check, "level": str(each.level), "line": each.line} for each in findings]
