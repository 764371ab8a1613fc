"""A job file to fill in, from what a program already says: its comments, its path, its codes."""

from __future__ import annotations

from auditor.draft.drafting import draft_job, open_faults
from auditor.draft.sheet import Draft

__all__ = ["Draft", "draft_job", "open_faults"]
