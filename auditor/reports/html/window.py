"""What feed and depth a tool cuts at, against the window of its chip-breaker."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass

import numpy as np
from markupsafe import Markup

from auditor.declared.model import Tool
from auditor.findings import Run
from auditor.reports.html.frame import steps
from auditor.reports.html.svg import Drawing

WIDTH, HEIGHT = 330.0, 250.0  # px
_LEFT, _RIGHT, _TOP, _FOOT = 44.0, 12.0, 16.0, 38.0
_LEAST_FEED, _LEAST_DEPTH = 0.01, 0.05  # the axes reach at least so far
_MOST = 400  # cuts drawn

Placing = Callable[[float, float], tuple[float, float]]  # feed and depth to a place in the picture


@dataclass(frozen=True, slots=True)
class Dot:
    """Cuts at one feed and depth."""

    feed: float
    depth: float
    time: float  # s
    moves: tuple[int, ...]


def dots(run: Run, tool: int) -> list[Dot]:
    """The cuts of a tool, those alike together, the longest first."""
    figures = run.prediction.moves
    found: dict[tuple[float, float], list[int]] = {}
    for move in run.path.moves:
        depth, feed = float(figures.depth[move.index]), float(figures.feed_rev[move.index])
        if move.tool == tool and depth > 0.0 and feed > 0.0:
            found.setdefault((round(feed, 3), round(depth, 2)), []).append(move.index)
    made = [
        Dot(feed, depth, float(np.nansum(figures.cutting_time[moves])), tuple(moves))
        for (feed, depth), moves in found.items()
    ]
    return sorted(made, key=lambda dot: -dot.time)[:_MOST]


def draw(run: Run, tool: Tool, numbers: Mapping[int, tuple[int, str]], key: str) -> Markup | None:
    """The chart; None for a tool that cuts nothing. ``numbers`` gives finding and level of a move."""
    found = dots(run, tool.number)
    if not found:
        return None
    drawing = Drawing(f"{key}w{tool.number}", WIDTH, HEIGHT, f"Depth and feed of T{tool.number}", _said(tool, found))
    feeds, depths = tool.breaker_feed or (0.0, 0.0), tool.breaker_depth or (0.0, 0.0)
    far = 1.15 * max(_LEAST_FEED, feeds[1], *(dot.feed for dot in found))
    deep = 1.15 * max(_LEAST_DEPTH, depths[1], tool.nose_radius, *(dot.depth for dot in found))

    def place(feed: float, depth: float) -> tuple[float, float]:
        return (_LEFT + feed / far * (WIDTH - _LEFT - _RIGHT), HEIGHT - _FOOT - depth / deep * (HEIGHT - _FOOT - _TOP))

    _axes(drawing, place, far, deep)
    _window(drawing, place, tool)
    if tool.nose_radius > 0.0 and tool.kind in ("turning", "boring"):
        low, high = place(0.0, tool.nose_radius), place(far, tool.nose_radius)
        drawing.path([low, high], "nose")
        drawing.text(high[0] - 2, high[1] - 4, "nose radius", "hint", text_anchor="end")
    longest = max(dot.time for dot in found) or 1.0
    for dot in found:
        x, y = place(dot.feed, dot.depth)
        told = next((numbers[move] for move in dot.moves if move in numbers), None)
        style = "cut" if told is None else f"cut {told[1]}"
        drawing.add("circle", cx=x, cy=y, r=2.5 + 6.5 * (max(dot.time, 0.0) / longest) ** 0.5, class_=style)
    return drawing.svg("chart")


def _axes(drawing: Drawing, place: Placing, far: float, deep: float) -> None:
    for feed in steps(0.0, far, 5):
        x, y = place(feed, 0.0)
        drawing.path([(x, _TOP), (x, y)], "grid")
        drawing.text(x, y + 15, f"{feed:g}", "tick-label", text_anchor="middle")
    for depth in steps(0.0, deep, 4):
        x, y = place(0.0, depth)
        drawing.path([(x, y), (WIDTH - _RIGHT, y)], "grid")
        drawing.text(x - 6, y + 4, f"{depth:g}", "tick-label", text_anchor="end")
    drawing.text(WIDTH - _RIGHT, HEIGHT - 6, "feed mm/rev", "tick-label", text_anchor="end")
    drawing.text(6, 11, "depth mm", "tick-label")


def _window(drawing: Drawing, place: Placing, tool: Tool) -> None:
    if tool.breaker_feed is None or tool.breaker_depth is None:
        return
    (x_low, y_high), (x_high, y_low) = (
        place(tool.breaker_feed[0], tool.breaker_depth[1]), place(tool.breaker_feed[1], tool.breaker_depth[0])
    )
    drawing.add("rect", x=x_low, y=y_high, width=x_high - x_low, height=y_low - y_high, class_="breaker")
    drawing.text(x_low + 6, y_high + 14, "chip breaks", "hint")


def _said(tool: Tool, found: list[Dot]) -> str:
    cuts = ", ".join(f"feed {dot.feed:g} at depth {dot.depth:g}" for dot in found[:12])
    if tool.breaker_feed is None or tool.breaker_depth is None:
        window = "No chip-breaker window is declared."
    else:
        window = (
            f"The chip-breaker works from feed {tool.breaker_feed[0]:g} to {tool.breaker_feed[1]:g} and depth "
            f"{tool.breaker_depth[0]:g} to {tool.breaker_depth[1]:g} mm."
        )
    return f"{window} Cuts, the longest first: {cuts}."
