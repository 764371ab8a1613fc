"""Power, torque, force and diameter error along the program's time, each with its band and its limit."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np
from markupsafe import Markup

from auditor.findings import Audit, Finding, Run
from auditor.interpret.moves import Kind
from auditor.mechanics.bending import diameter_error
from auditor.predict.spindle import power_at, torque_at
from auditor.reports._figures import duration, figure
from auditor.reports._shares import Floats, force_limits, seconds, starts
from auditor.reports.html.envelope import Envelope, envelope
from auditor.reports.html.frame import steps
from auditor.reports.html.svg import Drawing

WIDTH = 1000.0  # px
_LEFT, _RIGHT, _TOP, _STRIP, _GAP, _FOOT = 62.0, 14.0, 34.0, 108.0, 22.0, 46.0
_SMALLEST_DIAMETER = 1.0  # mm; bending at the axis itself makes no diameter
_THRUST_SCATTER = 0.5  # one-sided, of push-off and bending


@dataclass(frozen=True, slots=True)
class Curve:
    """One figure along the program, row by row of the loads."""

    title: str
    unit: str
    values: Floats
    low: Floats
    high: Floats
    limit: Floats  # NaN where none is declared


def curves(run: Run) -> list[Curve]:
    """The four strips."""
    loads, machine = run.prediction.loads, run.job.machine
    allowed = run.limits.get("power_share", 1.0)
    tolerance = run.job.workpiece.diameter_tolerance
    part_bend = run.job.limits.get("part_bend")
    error = 1000.0 * _diameter_error(run)
    allowed_error = 2.0 * part_bend.value if part_bend is not None else tolerance
    finishing = run.simulation.final_surface[loads.move]  # roughing may bend: the next cut takes it away
    bound = np.where(finishing, np.nan if allowed_error is None else 1000.0 * allowed_error, np.nan)
    return [
        _banded(run, "Motor power", "kW", loads.motor_power, loads.scatter,
                allowed * power_at(machine, loads.rpm)),
        _banded(run, "Torque at the spindle", "N m", loads.torque, loads.scatter,
                allowed * torque_at(machine, loads.rpm)),
        _banded(run, "Cutting force", "N", loads.cutting, loads.scatter, force_limits(run)),
        _banded(run, "Diameter error by bending of the work", "um", error, np.full(error.shape, _THRUST_SCATTER),
                bound),
    ]


def _diameter_error(run: Run) -> Floats:
    """By how much the work, bent by the cut, comes out wrong, mm; nothing for drills, which make no diameter so."""
    loads = run.prediction.loads
    drills = np.array([move.kind is Kind.DRILL for move in run.path.moves], dtype=bool)[loads.move]
    across = np.maximum(2.0 * np.abs(loads.r), _SMALLEST_DIAMETER)
    error = np.abs(diameter_error(np.nan_to_num(loads.bend), np.nan_to_num(loads.bend_tangential), across))
    return np.where(drills | ~(loads.depth > 0.0), 0.0, error)


def _banded(run: Run, title: str, unit: str, values: Floats, scatter: Floats, limit: Floats) -> Curve:
    wear = run.prediction.wear_factor - 1.0
    upper = np.sqrt(np.nan_to_num(scatter) ** 2 + wear**2)
    known = np.nan_to_num(values)
    return Curve(title, unit, known, known * (1.0 - np.nan_to_num(scatter)), known * (1.0 + upper), limit)


def draw(audit: Audit, numbered: Sequence[tuple[int, Finding]], key: str) -> Markup | None:
    """The picture; None for a program that cuts nothing."""
    run = audit.run
    if not run.prediction.loads.move.size:
        return None
    begin = starts(run)
    span = max(float(begin[-1]), 1e-6)
    at = seconds(run)
    strips = curves(run)
    height = _TOP + len(strips) * (_STRIP + _GAP) + _FOOT - _GAP
    drawing = Drawing(f"{key}loads", WIDTH, height, "Loads along the program's time", _said(run, strips, at))
    _tools(drawing, run, begin, span, height)
    for index, curve in enumerate(strips):
        _strip(drawing, curve, at, span, _TOP + index * (_STRIP + _GAP), run)
    _times(drawing, span, height)
    _ticks(drawing, numbered, begin, span, key)
    return drawing.svg("loads", linked=True)


def _x(second: float, span: float) -> float:
    return _LEFT + second / span * (WIDTH - _LEFT - _RIGHT)


def _strip(drawing: Drawing, curve: Curve, at: Floats, span: float, top: float, run: Run) -> None:
    """Band, predicted figure and limit of one figure."""
    limits = curve.limit[np.isfinite(curve.limit)]
    largest = float(max(curve.high.max(), limits.min() * 1.08 if limits.size else 0.0)) or 1.0
    foot = top + _STRIP

    def y(value: float) -> float:
        return foot - min(value / largest, 1.0) * (_STRIP - 8.0)

    shape = envelope(at, curve, run.prediction.loads.move, span, WIDTH - _LEFT - _RIGHT)
    for x_low, x_high in shape.over:
        drawing.add("rect", x=_LEFT + x_low, y=top - 2, width=max(x_high - x_low, 2.5), height=_STRIP + 2,
                    class_="beyond")
    for value in steps(0.0, largest, 3):
        drawing.path([(_LEFT, y(value)), (WIDTH - _RIGHT, y(value))], "grid")
        drawing.text(_LEFT - 8, y(value) + 4, f"{value:g}", "tick-label", text_anchor="end")
    _band(drawing, shape, y, foot)
    drawing.path(((_LEFT + x, y(value)) for x, value in shape.line), "curve")
    for stretch in shape.limit:
        drawing.path(((_LEFT + x, y(min(value, largest))) for x, value in stretch), "limit")
    unit = {"um": "µm"}.get(curve.unit, curve.unit)
    drawing.text(_LEFT + 4, top + 3, f"{curve.title}, {unit}", "strip-title")


def _band(drawing: Drawing, shape: Envelope, y: Callable[[float], float], foot: float) -> None:
    for stretch in shape.bands:
        upper = [(_LEFT + x, y(high)) for x, _, high in stretch]
        lower = [(_LEFT + x, y(low)) for x, low, _ in reversed(stretch)]
        drawing.path([*upper, *lower], "band", closed=True)
    drawing.path([(_LEFT, foot), (WIDTH - _RIGHT, foot)], "base")


def _tools(drawing: Drawing, run: Run, begin: Floats, span: float, height: float) -> None:
    """Which tool works when, as named fields along the axis."""
    spans: list[tuple[int, float, float]] = []
    for move in run.path.moves:
        number = -1 if move.tool is None else move.tool
        if spans and spans[-1][0] == number:
            spans[-1] = (number, spans[-1][1], float(begin[move.index + 1]))
        else:
            spans.append((number, float(begin[move.index]), float(begin[move.index + 1])))
    foot = height - _FOOT
    for index, (number, start, end) in enumerate(spans):
        low, high = _x(start, span), _x(end, span)
        if high - low < 0.5:
            continue
        drawing.add("rect", x=low, y=_TOP - 8, width=high - low, height=foot - _TOP + 10,
                    class_="turn odd" if index % 2 else "turn")
        drawing.add("rect", x=low, y=foot + 4, width=high - low, height=15, class_="tool-field")
        if high - low > 20.0 and number >= 0:
            drawing.text((low + high) / 2.0, foot + 16, f"T{number}", "tool-name", text_anchor="middle")


def _times(drawing: Drawing, span: float, height: float) -> None:
    foot = height - _FOOT
    for second in steps(0.0, span, 8):
        drawing.path([(_x(second, span), foot), (_x(second, span), foot + 4)], "tick")
        drawing.text(_x(second, span), foot + 34, duration(second), "tick-label", text_anchor="middle")


def _ticks(drawing: Drawing, numbered: Sequence[tuple[int, Finding]], begin: Floats, span: float, key: str) -> None:
    """Numbers of the stops and reviews above the strips, where they fit."""
    taken = -99.0
    moments = sorted({
        (float(begin[finding.move]), number, str(finding.level)) for number, finding in numbered
        if finding.move is not None and finding.level != "note" and finding.accepted is None
    })
    for second, number, level in moments:
        x = _x(second, span)
        drawing.path([(x, 20), (x, _TOP - 4)], f"moment {level}")
        if x - taken < 16.0:
            continue
        taken = x
        with drawing.inside("a", href=f"#{key}f{number}"):
            drawing.text(x, 15, str(number), f"moment-number {level}", text_anchor="middle")


def _said(run: Run, strips: Sequence[Curve], at: Floats) -> str:
    told = []
    for curve in strips:
        row = int(np.argmax(curve.values))
        limit = curve.limit[row]
        largest = figure(float(curve.values[row]), curve.unit)
        words = f"{curve.title}: at most {largest} after {duration(float(at[row]))}"
        told.append(words + (f", limit there {figure(float(limit), curve.unit)}" if np.isfinite(limit) else ""))
    return ". ".join(told) + "."
