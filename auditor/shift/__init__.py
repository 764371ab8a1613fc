"""The jobs of one shift together: what may run, what runs out, what a person must decide before leaving."""

from __future__ import annotations

from auditor.shift.judge import EdgeNeed, JobAnswer, Shift, judge_shift
from auditor.shift.plan import Plan, PlannedJob, read_plan

__all__ = ["EdgeNeed", "JobAnswer", "Plan", "PlannedJob", "Shift", "judge_shift", "read_plan"]
