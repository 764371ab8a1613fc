"""The same program with another tool geometry: what changes in force, bending, surface, edge life and findings."""

from __future__ import annotations

from auditor.compare.changes import Change
from auditor.compare.figures import ToolFigures
from auditor.compare.library import Comparison, Variant, compare_tools
from auditor.compare.rake_study import RakeRow, RakeStudy, study_rake

__all__ = [
    "Change", "Comparison", "RakeRow", "RakeStudy", "ToolFigures", "Variant", "compare_tools", "study_rake",
]  # fmt: skip
