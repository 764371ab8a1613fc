"""A card per tool: what it is, what it does, its edge in section and where it cuts."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from markupsafe import Markup

from auditor.declared.model import Tool
from auditor.findings import Audit
from auditor.reports._figures import duration, figure
from auditor.reports._uses import ToolUse, uses
from auditor.reports.html import rake, window


@dataclass(frozen=True, slots=True)
class ToolCard:
    """One tool, ready for the page."""

    number: int
    name: str
    kind: str
    facts: tuple[tuple[str, str], ...]
    rake: Markup | None
    rake_words: str
    chart: Markup | None
    window_words: str


def tool_cards(audit: Audit, numbers: Mapping[int, tuple[int, str]], key: str) -> list[ToolCard]:
    """The tools in the order of their first move."""
    return [_card(audit, use, audit.run.job.tools.get(use.number), numbers, key) for use in uses(audit)]


def _card(
    audit: Audit, use: ToolUse, tool: Tool | None, numbers: Mapping[int, tuple[int, str]], key: str
) -> ToolCard:
    if tool is None:
        return ToolCard(use.number, "not declared", "", (("time", duration(use.time)),), None, "", None, "")
    pictured = tool.kind != "stop"
    words = ""
    if pictured and tool.kind != "drilling":
        words = rake.said(tool, rake.situation(audit.run, tool))
    chart = window.draw(audit.run, tool, numbers, key)
    declared = tool.breaker_feed is not None and tool.breaker_depth is not None
    return ToolCard(
        number=use.number, name=tool.name.removeprefix(f"T{use.number}").strip(), kind=tool.kind,
        facts=(*_declared(tool), *_used(use)),
        rake=rake.draw(audit.run, tool, key) if pictured else None, rake_words=words, chart=chart,
        window_words="" if chart is None or declared else "No chip-breaker window is declared for this tool.",
    )


def _declared(tool: Tool) -> tuple[tuple[str, str], ...]:
    edge = "" if tool.kind == "drilling" else f"{tool.cutting_edge_angle:g}° / {tool.included_angle:g}°"
    facts = (
        ("insert", tool.insert or ""), ("holder", tool.holder or ""), ("edge / corner angle", edge),
        ("nose radius", f"{tool.nose_radius:g} mm" if tool.nose_radius else ""),
        ("width", f"{tool.width:g} mm" if tool.width else ""),
        ("diameter", f"{tool.diameter:g} mm" if tool.diameter else ""),
        ("overhang", f"{tool.overhang:g} mm" if tool.overhang else ""), ("substrate", tool.substrate),
    )
    return tuple((name, value) for name, value in facts if value)


def _used(use: ToolUse) -> tuple[tuple[str, str], ...]:
    facts = (
        ("deepest cut", "" if use.depth is None else f"{use.depth:.1f} mm"),
        ("largest feed", "" if use.feed is None else f"{use.feed:.2f} mm/rev"),
        ("fastest", "" if use.speed is None else f"{use.speed:.0f} m/min"),
        ("largest force", "" if use.force is None else figure(use.force, "N")),
        ("share of the spindle", "" if use.share is None else f"{100.0 * use.share:.0f} %"),
        ("time", duration(use.time)),
    )
    return tuple((name, value) for name, value in facts if value)
