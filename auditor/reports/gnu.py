"""One line a finding, ``FILE:LINE:COL: LEVEL: MESSAGE [CHECK]``: the form editors and build tools jump from."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from auditor.findings import Audit, Finding
from auditor.reports import Outcome, Unreadable, View
from auditor.reports._inert import one_line, told
from auditor.reports._marks import column


def render(outcome: Outcome, view: View) -> str:
    """The lines of one program; none when there is nothing to say."""
    lines = _unreadable(outcome) if isinstance(outcome, Unreadable) else _audit(outcome)
    return "".join(f"{one_line(line)}\n" for line in lines)


def join(parts: Sequence[str], several: bool) -> str:
    """The lines of all programs."""
    return "".join(parts)


def _audit(audit: Audit) -> Iterator[str]:
    path = audit.run.text.path
    for block in audit.coverage.not_audited:
        yield f"{path}:{block.line}:1: incomplete: not audited: {block.reason} [coverage]"
    for finding in audit.findings:
        place = f"{path}:{finding.line}:{column(finding, audit.run.text)}"
        yield f"{place}: {_said(finding)} [{finding.check}]"


def _said(finding: Finding) -> str:
    """Level and message; what a person accepted is a note from then on, and says so."""
    message = told(finding.message, finding.remedy)
    if finding.accepted is None:
        return f"{finding.level}: {message}"
    return f"note: accepted ({finding.level}): {message} Accepted: {finding.accepted.reason}"


def _unreadable(outcome: Unreadable) -> Iterator[str]:
    for fault in outcome.faults:
        detail = "".join(
            f"; {word} {text}" for word, text in (("found", fault.found), ("wanted", fault.wanted)) if text is not None
        )
        key = "" if fault.key is None else f"{fault.key}: "
        yield f"{fault.file or outcome.path}:{fault.line or 1}:1: unreadable: {key}{fault.message}{detail} [coverage]"
