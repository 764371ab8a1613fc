"""What the verdict rests on: coverage, what could not be judged, assumptions, decisions, and the caution."""

from __future__ import annotations

import re
from collections.abc import Sequence

from auditor.declared.model import Assumption
from auditor.findings import Audit, Finding, NotJudged
from auditor.reports._grounds import CAUTION, by_weight
from auditor.reports.screen.paper import Paper

_BLOCKS_NAMED = 12
_ASSUMPTIONS_NAMED = 5

# Defaults that move the figures most come first: which material, which edge, which machine.
_WEIGHTIEST = (
    "kc11", "material", "system", "units", "x_words", "whole_numbers", "face_rake", "land_width", "nose_radius",
    "pocket_rake", "efficiency", "friction", "edge_radius", "rapid", "tool_change",
)
_TOOL = re.compile(r"tools\.(\d+)\.(.+)")


def write(paper: Paper, audit: Audit) -> None:
    """Everything a reader needs to weigh the verdict."""
    _coverage(paper, audit)
    _not_judged(paper, audit.not_judged)
    _assumptions(paper, audit.assumptions)
    _accepted(paper, [finding for finding in audit.findings if finding.accepted is not None])
    paper.gap()
    paper.row(paper.sign("rule") * paper.view.width)
    if any(finding.limit is not None and finding.value is not None for finding in audit.findings):
        sure, band, value, limit = (paper.sign(name) for name in ("sure", "band", "value", "limit"))
        paper.paragraph(
            f"Gauges: {sure} up to the band, {band} the band of the prediction, {value} predicted, {limit} limit."
        )
    paper.paragraph(CAUTION)


def _title(paper: Paper, text: str) -> None:
    paper.gap()
    paper.paragraph((text, "bold"))


def _coverage(paper: Paper, audit: Audit) -> None:
    missing = audit.coverage.not_audited
    if not missing:
        return
    _title(paper, "Not checked, and therefore unknown")
    for block in missing[:_BLOCKS_NAMED]:
        paper.paragraph(f"line {block.line}  {block.text.strip()}: {block.reason}", margin=2, hang=4)
    if len(missing) > _BLOCKS_NAMED:
        paper.paragraph(f"and {len(missing) - _BLOCKS_NAMED} more; all with --format json", margin=2)


def _not_judged(paper: Paper, items: Sequence[NotJudged]) -> None:
    if not items:
        return
    _title(paper, "Not judged")
    reasons: dict[str, list[str]] = {}
    for item in by_weight(items):
        reasons.setdefault(item.check, []).append(item.why)
    for check, whys in reasons.items():
        paper.paragraph(f"{check}: {'; '.join(whys)}", margin=2, hang=4)


def _assumptions(paper: Paper, assumptions: Sequence[Assumption]) -> None:
    if not assumptions:
        return
    lines = _weighed(assumptions)
    more = len(lines) - _ASSUMPTIONS_NAMED
    _title(paper, "Assumed" + (f" (the {_ASSUMPTIONS_NAMED} that matter most of {len(lines)}; all with --format json)"
                               if more > 0 else ""))
    for line in lines[:_ASSUMPTIONS_NAMED]:
        paper.paragraph(line, margin=2, hang=4)


def _weighed(assumptions: Sequence[Assumption]) -> list[str]:
    """One line an assumption, the weightiest first; the same one about several tools is said once."""
    tools: dict[tuple[str, str, str], list[str]] = {}
    for each in assumptions:
        match = _TOOL.fullmatch(each.about)
        key = (match[2] if match else each.about, each.value, each.why)
        tools.setdefault(key, []).extend([match[1]] if match else [])
    ranked = sorted(tools.items(), key=lambda item: _weight(item[0][0]))
    return [
        (f"tool {', '.join(numbers)}: " if numbers else "") + f"{about} = {value} ({why})"
        for (about, value, why), numbers in ranked
    ]


def _weight(about: str) -> int:
    return next((rank for rank, word in enumerate(_WEIGHTIEST) if word in about), len(_WEIGHTIEST))


def _accepted(paper: Paper, findings: Sequence[Finding]) -> None:
    if not findings:
        return
    _title(paper, "Accepted by a person")
    for finding in findings:
        if finding.accepted is not None:
            until = f", until {finding.accepted.until.isoformat()}" if finding.accepted.until else ""
            paper.paragraph(
                f"line {finding.line}  {finding.level} {finding.check}: {finding.message} "
                f"Accepted: {finding.accepted.reason}{until}", margin=2, hang=4,
            )
