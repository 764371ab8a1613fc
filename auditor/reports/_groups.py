"""Findings that say the same in several places, told once."""

from __future__ import annotations

from collections.abc import Iterable

from auditor.findings import Finding


def groups(findings: Iterable[Finding]) -> list[list[Finding]]:
    """Findings by line, those of one check that say the same together; what was accepted stands for itself."""
    told: dict[tuple[object, ...], list[Finding]] = {}
    for finding in sorted(findings, key=lambda each: each.line):
        key = (finding.check, finding.level, finding.message, finding.remedy, finding.accepted)
        told.setdefault(key, []).append(finding)
    return list(told.values())
