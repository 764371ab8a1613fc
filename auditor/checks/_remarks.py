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
        message=sentence(message or remark.message), value=remark.value, limit=remark.limit, unit=remark.unit,
        remedy=sentence(remark.remedy) if remark.remedy else None, words=remark.words,
    )


def findings_of(run: Run, check: str, levels: Mapping[str, Level]) -> Iterator[Finding]:
    """A finding a block from the remarks on a check's topics; lesser remarks on a block are told in its finding."""
    by_line: dict[int, list[Remark]] = {}
    for remark in remarks_of(run, check):
        by_line.setdefault(remark.line, []).append(remark)
    for remarks in by_line.values():
        remarks.sort(key=lambda remark: _ORDER.index(_level(levels, remark)))
        messages = dict.fromkeys(remark.message for remark in remarks)
        yield finding_of(check, _level(levels, remarks[0]), remarks[0], "; also: ".join(messages))


def _level(levels: Mapping[str, Level], remark: Remark) -> Level:
    """The level a check gives the topic; a topic it does not know yet is for a person to decide."""
    return levels.get(remark.topic, Level.REVIEW)


def sentence(text: str) -> str:
    """A remark's half-sentence as a sentence."""
    text = text if text.endswith((".", "?", "!")) else f"{text}."
    return f"{text[0].upper()}{text[1:]}"
