"""A check's own text, taken apart for the page."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from auditor.findings import Limit, Rule


@dataclass(frozen=True, slots=True)
class Explained:
    """What a check computes, and the thresholds it was held to."""

    name: str
    title: str
    sections: tuple[tuple[str, str], ...]  # heading, text
    thresholds: tuple[tuple[str, str], ...]  # name, words


def explained(rule: Rule, limits: Mapping[str, float]) -> Explained:
    """The text by its sections: a line without margin is a heading, what stands in from it its text."""
    sections: list[tuple[str, list[str]]] = []
    for line in rule.text.strip().splitlines()[1:]:
        if line and not line[0].isspace():
            sections.append((line.strip(), []))
        elif line.strip() and sections:
            sections[-1][1].append(line.strip())
    return Explained(
        rule.name, rule.title, tuple((heading, " ".join(lines)) for heading, lines in sections),
        tuple((limit.name, _words(limit, limits.get(limit.name, limit.default))) for limit in rule.limits),
    )


def _words(limit: Limit, value: float) -> str:
    """The threshold in force; where the job set it, what it would be otherwise."""
    if value == limit.default:
        return f"{value:g} {limit.unit} ({limit.provenance}): {limit.meaning}".replace("  ", " ")
    return f"{value:g} {limit.unit} (set by the job; else {limit.default:g}): {limit.meaning}".replace("  ", " ")
