"""All that a program's sheet shows, in the order it shows it."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Mapping, Sequence
from dataclasses import dataclass

from markupsafe import Markup

from auditor.declared.model import Assumption, Job, Material
from auditor.findings import Audit, Finding, NotJudged
from auditor.interpret.moves import NotAudited
from auditor.reports import Unreadable
from auditor.reports._figures import duration
from auditor.reports._grounds import by_weight, counts
from auditor.reports._groups import groups
from auditor.reports._marks import Span, block_at, spans
from auditor.reports._shares import shares
from auditor.reports.html import curves, section
from auditor.reports.html.cards import Card, cards
from auditor.reports.html.explained import Explained, explained
from auditor.reports.html.listing import Line, listing
from auditor.reports.html.toolcards import ToolCard, tool_cards

_MOST_MARKS = 150  # marks in the half-section, the gravest first
_GRAVE = ("stop", "unread", "review", "note")


@dataclass(frozen=True, slots=True)
class Sheet:
    """One program, ready for the page."""

    name: str
    path: str
    verdict: str
    counts: str
    heading: tuple[tuple[str, str], ...]
    beside_clear: str | None
    section: Markup
    cards: Sequence[Card]
    untold: int
    accepted: Sequence[Card]
    curves: Markup | None
    tools: Sequence[ToolCard]
    lines: Sequence[Line]
    not_audited: Sequence[NotAudited]
    coverage: str
    not_judged: Sequence[NotJudged]
    assumptions: Sequence[Assumption]
    material: Material
    rules: Sequence[Explained]
    notes: Sequence[str]
    title_block: tuple[tuple[str, str], ...]


@dataclass(frozen=True, slots=True)
class UnreadableSheet:
    """A program that could not be audited."""

    name: str
    counts: str
    faults: tuple[str, ...]


Numbered = list[tuple[int, list[Finding]]]


def sheet(audit: Audit, key: str) -> Sheet:
    """The sheet of an audit; ``key`` goes before every name in it."""
    run = audit.run
    numbered: Numbered = list(enumerate(groups(audit.findings), start=1))
    single = [(number, finding) for number, group in numbered for finding in group]
    marks = _marked(single, audit)
    told = cards(audit, numbered, frozenset(mark.number for mark in marks), key)
    spoken = {card.check for card in told}
    return Sheet(
        name=name_of(run.text.path), path=run.text.path, verdict=audit.verdict, counts=counts(audit),
        heading=_heading(audit), beside_clear=_beside_clear(audit),
        section=section.draw(audit, shares(run), marks, key),
        cards=[card for card in told if card.reason is None], untold=len(numbered) - len(told),
        accepted=[card for card in told if card.reason is not None],
        curves=curves.draw(audit, single, key), tools=tool_cards(audit, _by_move(single), key),
        lines=_lines(audit, single), not_audited=audit.coverage.not_audited, coverage=_coverage(audit),
        not_judged=by_weight(audit.not_judged), assumptions=audit.assumptions,
        material=run.job.workpiece.material,
        rules=[explained(rule, run.limits) for name, rule in sorted(audit.rules.items()) if name in spoken],
        notes=[note.message for note in run.text.notes], title_block=_title_block(run.job, audit),
    )


def unreadable_sheet(outcome: Unreadable) -> UnreadableSheet:
    """The sheet of a program that could not be audited."""
    return UnreadableSheet(name_of(outcome.path), "not audited", tuple(str(fault) for fault in outcome.faults))


def name_of(path: str) -> str:
    """The file's own name, whatever the system that wrote the path."""
    return path.replace("\\", "/").rstrip("/").rpartition("/")[2] or path


def _marked(single: Sequence[tuple[int, Finding]], audit: Audit) -> list[section.Mark]:
    ranked = sorted(
        single, key=lambda item: (item[1].accepted is not None, _GRAVE.index(item[1].level), item[1].line)
    )
    chosen = sorted(ranked[:_MOST_MARKS], key=lambda item: item[0])
    return section.marks_of(chosen, audit.run)


def _heading(audit: Audit) -> tuple[tuple[str, str], ...]:
    run, job = audit.run, audit.run.job
    batch = "" if job.batch is None else f"{job.batch} parts" + (", unattended" if job.unattended else "")
    facts = (
        ("job file", "none" if job.path is None else name_of(job.path)), ("machine", _machine(job)),
        ("held in", _held(job)), ("material", job.workpiece.material.name), ("batch", batch),
        ("program", f"code system {run.path.system}, {run.path.units}"),
        ("time", f"cutting {duration(audit.totals.cutting_time)} of {duration(audit.totals.time)}"),
    )
    return tuple((name, value) for name, value in facts if value)


def _machine(job: Job) -> str:
    """The machine by its name, where it has one, and by what matters here."""
    machine = job.machine
    figures = f"{max(power for _, power in machine.power_curve):g} kW, {machine.speed_limit:.0f} rpm"
    return figures if machine.name == "machine" else f"{machine.name}, {figures}"


def _held(job: Job) -> str:
    work = job.workholding
    figures = f"{work.kind}, stick-out {work.stick_out:g} mm"
    return figures if work.name == "workholding" else f"{work.name}, {figures}"


def _beside_clear(audit: Audit) -> str | None:
    """What the word clear does not cover stands beside it."""
    if audit.verdict != "clear":
        return None
    names = ", ".join(dict.fromkeys(item.check for item in by_weight(audit.not_judged)))
    promise = "Clear of what was judged: a prediction, no promise."
    return f"{promise} Not judged: {names}." if names else promise


def _coverage(audit: Audit) -> str:
    coverage = audit.coverage
    if not coverage.not_audited:
        return f"All {coverage.motion_blocks} motion blocks were checked."
    missing = coverage.motion_blocks - coverage.audited
    return f"{missing} of {coverage.motion_blocks} motion blocks were NOT checked."


def _by_move(single: Sequence[tuple[int, Finding]]) -> dict[int, tuple[int, str]]:
    """Gravest open finding of each move."""
    found: dict[int, tuple[int, str]] = {}
    for number, finding in sorted(single, key=lambda item: -_GRAVE.index(item[1].level)):
        if finding.move is not None and finding.accepted is None:
            found[finding.move] = (number, str(finding.level))
    return found


def _lines(audit: Audit, single: Sequence[tuple[int, Finding]]) -> list[Line]:
    text = audit.run.text
    levels: dict[int, str] = {block.line: "unread" for block in audit.coverage.not_audited}
    numbers: Mapping[int, list[int]] = defaultdict(list)
    marked: Mapping[int, list[Span]] = defaultdict(list)
    for number, finding in single:
        level = "accepted" if finding.accepted is not None else str(finding.level)
        levels[finding.line] = min(levels.get(finding.line, level), level, key=_rank)
        if number not in numbers[finding.line]:
            numbers[finding.line].append(number)
        marked[finding.line].extend(spans(finding, block_at(text, finding.line)))
    return list(listing(text, levels, numbers, marked))


def _rank(level: str) -> int:
    return _GRAVE.index(level) if level in _GRAVE else len(_GRAVE)


def _title_block(job: Job, audit: Audit) -> tuple[tuple[str, str], ...]:
    text = audit.run.text
    return (
        ("Program", text.path), ("SHA-256 of the program", text.sha256),
        ("Job file", job.path or "none"), ("SHA-256 of the job file", job.sha256 or "-"),
    )
