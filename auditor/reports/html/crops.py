"""A look at the cut that a finding is about: stock as it stood, what the move takes, the tool in its place."""

from __future__ import annotations

import math
from bisect import bisect_left, bisect_right
from dataclasses import dataclass, replace

import numpy as np
import shapely
from markupsafe import Markup
from shapely.geometry.base import BaseGeometry

from auditor.declared.model import Point
from auditor.findings import Finding, Run
from auditor.interpret.moves import Kind, Move
from auditor.reports._figures import figure
from auditor.reports.html import section, setting
from auditor.reports.html.frame import Frame
from auditor.reports.html.svg import Drawing
from auditor.simulate.pieces import Piece, pieces
from auditor.simulate.stock import swept
from auditor.simulate.tool_outline import tool_outline

WIDTH, HEIGHT = 300.0, 200.0  # px
_NARROWEST, _WIDEST = 6.0, 90.0  # mm across
_ON_PATH = 0.02  # mm beside its path at which a point still counts as on it
_MOST_PIECES = 60  # of an arc that are swept for a picture


@dataclass(frozen=True, slots=True)
class Stages:
    """The stock before every cutting move, to be asked for any move."""

    run: Run
    moves: tuple[int, ...]

    @classmethod
    def of(cls, run: Run) -> Stages:
        """The stages of a run."""
        return cls(run, tuple(sorted(run.simulation.stock_before)))

    def before(self, move: int) -> BaseGeometry:
        """Stock as it stands when a move begins."""
        place = bisect_left(self.moves, move)
        return self.run.simulation.stock_before[self.moves[place]] if place < len(self.moves) else (
            self.run.simulation.final)

    def after(self, move: int) -> BaseGeometry:
        """Stock as it stands when a move has ended."""
        place = bisect_right(self.moves, move)
        return self.run.simulation.stock_before[self.moves[place]] if place < len(self.moves) else (
            self.run.simulation.final)


def draw(stages: Stages, finding: Finding, number: int, key: str) -> Markup | None:
    """The picture; None for a finding without a place. It borrows its hatching from the half-section."""
    run = stages.run
    if finding.at is None or finding.move is None:
        return None
    move = _cutting(run, finding.at, run.path.moves[finding.move])
    frame = _frame(run, finding.at, move)
    drawing = Drawing(f"{key}c{number}", WIDTH, HEIGHT, f"The cut of line {finding.line}", _said(finding, frame))
    drawing.add("rect", x=0, y=0, width=WIDTH, height=HEIGHT, class_="field")
    now, then = _stock(stages, move, finding.at, frame)
    frame.shape(drawing, now, "left", section.hatch(key))
    if move.kind is not Kind.RAPID:
        frame.shape(drawing, now.difference(then), "chip")
    setting.draw(drawing, frame, run.job)
    section.finished(drawing, frame, run)
    drawing.path(frame.points([(frame.z_low, 0.0), (frame.z_high, 0.0)]), "axis")
    _path(drawing, frame, move)
    _tool(drawing, frame, run, finding)
    _scale_bar(drawing, frame)
    return drawing.svg("crop")


def _cutting(run: Run, at: Point, move: Move) -> Move:
    """The move that ends at the finding's place, where the one that is blamed does not lead there."""
    if _way_to(move, at) is not None:
        return move
    later = (other for other in run.path.moves[move.index:] if other.tool == move.tool and other.end is not None)
    return next((other for other in later if other.end is not None and math.dist(other.end, at) < _ON_PATH), move)


def _way_to(move: Move, at: Point) -> list[Piece] | None:
    """The straight pieces of a move as far as a point on it; None when it does not lead there."""
    way: list[Piece] = []
    for piece in pieces(move):
        along = (at.z - piece.start.z) * piece.direction[0] + (at.r - piece.start.r) * piece.direction[1]
        beside = (at.z - piece.start.z) * piece.direction[1] - (at.r - piece.start.r) * piece.direction[0]
        if abs(beside) < _ON_PATH and -_ON_PATH <= along <= piece.length + _ON_PATH:
            return [*way, replace(piece, length=max(along, 0.0))]
        way.append(piece)
    return None


def _stock(stages: Stages, move: Move, at: Point, frame: Frame) -> tuple[BaseGeometry, BaseGeometry]:
    """Stock with the tool where the finding is, and when the move has ended."""
    before, after = frame.inside(stages.before(move.index)), frame.inside(stages.after(move.index))
    tool = None if move.tool is None else stages.run.job.tools.get(move.tool)
    way = _way_to(move, at)
    if tool is None or way is None or move.kind is Kind.RAPID:
        return before, after
    hull = tool_outline(tool).hull()
    gone = shapely.union_all([frame.inside(swept(hull, piece.step, piece.start)) for piece in way[-_MOST_PIECES:]])
    return before.difference(gone), after


def _frame(run: Run, at: Point, move: Move) -> Frame:
    """A window wide enough for the depth, the chip and the nose; a little more on the tool's side."""
    figures = run.prediction.moves
    depth = np.nan_to_num(figures.depth[move.index])
    tool = None if move.tool is None else run.job.tools.get(move.tool)
    nose = 0.0 if tool is None else max(tool.nose_radius, tool.width or 0.0, (tool.diameter or 0.0) / 2.0)
    across = float(min(_WIDEST, max(_NARROWEST, 7.0 * depth, 8.0 * nose)))
    scale = WIDTH / across
    tall = HEIGHT / scale
    up = 0.42 if run.job.machine.turret == "front" else 0.5
    return Frame(at.z - 0.5 * across, at.z + 0.5 * across, at.r - up * tall, at.r + (1.0 - up) * tall, scale,
                 down=run.job.machine.turret == "front")


def _path(drawing: Drawing, frame: Frame, move: Move) -> None:
    """The move, and an arrow at its end."""
    if move.start is None or move.end is None:
        return
    points = [move.start, *((piece.start.z + piece.step[0], piece.start.r + piece.step[1]) for piece in pieces(move))]
    line = shapely.LineString(points) if len(points) > 1 else None
    shown = None if line is None else frame.inside(line)
    for part in [] if shown is None or shown.is_empty else getattr(shown, "geoms", [shown]):
        places = frame.points(part.coords)
        drawing.path(places, "rapid" if move.kind is Kind.RAPID else "move")
        if len(places) > 1:
            _arrow(drawing, places[-2], places[-1])


def _arrow(drawing: Drawing, start: tuple[float, float], end: tuple[float, float]) -> None:
    dx, dy = end[0] - start[0], end[1] - start[1]
    length = (dx * dx + dy * dy) ** 0.5
    if length > 1.0:
        dx, dy = 7.0 * dx / length, 7.0 * dy / length
        drawing.path([(end[0] - dx - 0.5 * dy, end[1] - dy + 0.5 * dx), end,
                      (end[0] - dx + 0.5 * dy, end[1] - dy - 0.5 * dx)], "move")


def _tool(drawing: Drawing, frame: Frame, run: Run, finding: Finding) -> None:
    tool = None if finding.tool is None else run.job.tools.get(finding.tool)
    if tool is None or finding.at is None:
        return
    frame.tool(drawing, tool, finding.at)
    drawing.add("circle", cx=frame.x(finding.at.z), cy=frame.y(finding.at.r), r=2.6, class_="spot")


def _scale_bar(drawing: Drawing, frame: Frame) -> None:
    """How long a millimetre is here."""
    length = next((step for step in (20.0, 10.0, 5.0, 2.0, 1.0) if step * frame.scale <= 70.0), 0.5)
    x, y = 10.0, HEIGHT - 9.0
    drawing.path([(x, y - 4), (x, y), (x + length * frame.scale, y), (x + length * frame.scale, y - 4)], "scale")
    drawing.text(x + length * frame.scale + 6, y, f"{length:g} mm", "tick-label")


def _said(finding: Finding, frame: Frame) -> str:
    at = finding.at
    place = "" if at is None else f" at X{2.0 * at.r:.4g} Z{at.z:.4g}"
    depth = f", {figure(frame.width / frame.scale, 'mm')} across" if frame.scale else ""
    return f"Stock, tool and path{place}{depth}. {finding.situation or ''}".strip()
