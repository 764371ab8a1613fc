"""From what the interpreter noticed about the text to findings: a check names its topics and their levels."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

from auditor.findings import Finding, Level, Run
from auditor.interpret.moves import Remark
from auditor.interpret.topics import TOPICS

_ORDER = (Level.STOP, Level.REVIEW, Level.NOTE)


def remarks_of(run: Run, check: str) -> Iterator[Remark]:
    """The remarks on the topics of one check."""
    topics = TOPICS[check]
    return (remark for remark in run.path.remarks if remark.topic in topics)


def finding_of(check: str, level: Level, remark: Remark, message: str | None = None) -> Finding:
    """The remark as a finding."""
    return Finding(
        check=check, level=level, line=remark.line, block=remark.block, tool=remark.tool,
        message=message or remark.message, value=remark.value, limit=remark.limit, unit=remark.unit,
        remedy=remark.remedy, words=remark.words,
    )


def findings_of(run: Run, check: str, levels: Mapping[str, Level]) -> Iterator[Finding]:
    """A finding a block from the remarks on a check's topics; lesser remarks on a block are told in its finding."""
    by_line: dict[int, list[Remark]] = {}
    for remark in remarks_of(run, check):
        by_line.setdefault(remark.line, []).append(remark)
    for remarks in by_line.values():
        remarks.sort(key=lambda remark: _ORDER.index(levels[remark.topic]))
        messages = dict.fromkeys(remark.message for remark in remarks)
        yield finding_of(check, levels[remarks[0].topic], remarks[0], " Also: ".join(messages))
