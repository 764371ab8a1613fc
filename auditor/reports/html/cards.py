"""The findings as cards: line, figure, situation, why, way out, and a look at the cut."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from markupsafe import Markup

from auditor.findings import Audit, Finding
from auditor.reports._figures import figure
from auditor.reports._marks import block_at, spans
from auditor.reports.html import crops, gauge
from auditor.reports.html.listing import painted

MOST_PICTURES = 120  # findings that get a picture of their own, the gravest first
MOST_CARDS = 400  # findings told in full; the rest is counted
_GRAVE = {"stop": 0, "review": 1, "note": 2}


@dataclass(frozen=True, slots=True)
class Card:
    """One finding, or several that say the same, ready for the page."""

    number: int
    level: str
    check: str
    title: str  # of the check
    line: int
    also: tuple[int, ...]  # further lines it is about
    quote: Markup
    figure: str | None
    band: str | None
    limit: str | None
    share: str | None
    gauge: Markup | None
    situation: str | None
    message: str
    remedy: str | None
    crop: Markup | None
    placed: bool  # it has a mark in the half-section
    provisional: bool
    reason: str | None  # of a person who accepted it
    until: str | None


def cards(audit: Audit, numbered: Sequence[tuple[int, Sequence[Finding]]], placed: frozenset[int], key: str,
          ) -> list[Card]:
    """A card for each group of findings."""
    stages = crops.Stages.of(audit.run)
    ranked = sorted(numbered, key=lambda item: (item[1][0].accepted is not None, _GRAVE[item[1][0].level]))
    pictured = {number for number, _ in ranked[:MOST_PICTURES]}
    told = {number for number, _ in ranked[:MOST_CARDS]}
    return [
        _card(audit, number, group, crops.draw(stages, group[0], number, key) if number in pictured else None,
              number in placed, key)
        for number, group in numbered if number in told
    ]


def _card(
    audit: Audit, number: int, group: Sequence[Finding], crop: Markup | None, placed: bool, key: str
) -> Card:
    finding, rule = group[0], audit.rules.get(group[0].check)
    block = block_at(audit.run.text, finding.line)
    source = "" if block is None else block.text
    move = None if finding.move is None else audit.run.path.moves[finding.move]
    accepted = finding.accepted
    return Card(
        number=number, level=str(finding.level), check=finding.check,
        title=finding.check if rule is None else rule.title.removesuffix("."), line=finding.line,
        also=tuple(dict.fromkeys(other.line for other in group[1:] if other.line != finding.line)),
        quote=painted(source, spans(finding, block), block),
        figure=None if finding.value is None else figure(finding.value, finding.unit),
        band=_band(finding), limit=None if finding.limit is None else figure(finding.limit, finding.unit),
        share=_share(finding), gauge=gauge.draw(finding, f"{key}g{number}"), situation=finding.situation,
        message=finding.message, remedy=finding.remedy, crop=crop, placed=placed,
        provisional=move is not None and (move.provisional or move.new_stock_state),
        reason=None if accepted is None else accepted.reason,
        until=None if accepted is None or accepted.until is None else accepted.until.isoformat(),
    )


def _band(finding: Finding) -> str | None:
    if finding.band is None:
        return None
    low, high = (figure(edge, finding.unit).removesuffix(f" {finding.unit}") for edge in finding.band)
    return f"{low} to {high}"


def _share(finding: Finding) -> str | None:
    if finding.value is None or finding.limit is None or finding.limit <= 0.0 or finding.value < 0.0:
        return None
    return f"{100.0 * finding.value / finding.limit:.0f} %"
