"""The passes of each thread of a program, gathered."""

from __future__ import annotations

import math
from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np
import shapely

from auditor.checks._judging import rows_of
from auditor.findings import Run
from auditor.interpret.moves import Kind, Move


@dataclass(frozen=True, slots=True)
class Thread:
    """One thread: its passes in order and what they do."""

    tool: int
    passes: tuple[Move, ...]
    lead: float  # mm
    starts: int
    rpm: float
    depth: float | None  # mm, from the first metal to the root
    infeeds: tuple[float, ...]  # mm, pass by pass
    run_in: float | None  # mm from the start to the metal
    diameter: float  # mm, at the root
    force: float  # N, largest cutting force
    area: float  # mm2, largest chip


def threads(run: Run) -> Iterator[Thread]:
    """Thread moves of one tool and lead, without another feed move between them, are one thread."""
    group: list[Move] = []
    for move in run.path.moves:
        if move.kind is Kind.RAPID:
            continue
        if group and (move.kind is not Kind.THREAD or move.tool != group[0].tool or move.lead != group[0].lead):
            yield _thread(run, group)
            group = []
        if move.kind is Kind.THREAD and move.lead and move.tool is not None and not _on_axis(move):
            group.append(move)
    if group:
        yield _thread(run, group)


def _on_axis(move: Move) -> bool:
    """Whether a move runs on the spindle axis: a tap, whose passes are the tap's own business."""
    return abs(move.start_r or 0.0) < 1e-6 and abs(move.end_r or 0.0) < 1e-6


def _thread(run: Run, group: list[Move]) -> Thread:
    loads = run.prediction.loads
    rows = [rows_of(loads, move.index) for move in group]
    cutting = np.concatenate([loads.cutting[own] for own in rows])
    area = np.concatenate([loads.area[own] for own in rows])
    depths = _depths(run, group)
    infeeds = tuple(float(step) for step in np.diff([0.0, *depths])) if depths else ()
    first = group[0]
    radius = min(abs(move.end_r) for move in group if move.end_r is not None)
    starts = len({round(move.start_z, 6) for move in group if move.start_z is not None}) if depths else 1
    return Thread(
        tool=first.tool or 0, passes=tuple(group), lead=first.lead or 0.0, starts=_starts(group, starts),
        rpm=float(np.nan_to_num(run.prediction.moves.rpm_high[first.index])), depth=depths[-1] if depths else None,
        infeeds=infeeds, run_in=_run_in(run, group), diameter=2.0 * radius,
        force=float(np.nan_to_num(cutting).max(initial=0.0)), area=float(np.nan_to_num(area).max(initial=0.0)),
    )  # fmt: skip


def _starts(group: list[Move], places: int) -> int:
    """Threads begun at several lengths by a share of the lead have several starts; flank infeed shifts by less."""
    return 1 if all(move.cycle for move in group) else places


def _depths(run: Run, group: list[Move]) -> list[float]:
    """Depth reached after each pass, mm: from the cycle, else from how far the passes go in."""
    if all(move.thread_depth is not None for move in group):
        return [float(move.thread_depth or 0.0) for move in group]
    radii = [move.end_r for move in group if move.end_r is not None]
    if len(radii) < 2:
        return []
    outer = _surface(run, group)
    return [abs(outer - radius) for radius in radii] if outer is not None else []


def _surface(run: Run, group: list[Move]) -> float | None:
    """Radius of the metal that the first pass meets halfway along: the bore for passes that go outwards."""
    stock, own = run.simulation.stock_before.get(group[0].index), rows_of(run.prediction.loads, group[0].index)
    engaged = run.prediction.loads.z[own][run.prediction.loads.depth[own] > 0.0]
    if stock is None or not len(engaged):
        return None
    z = float(np.median(engaged))
    across = shapely.intersection(stock, shapely.linestrings([(z, 0.0), (z, stock.bounds[3] + 1.0)]))
    if shapely.is_empty(across):
        return None
    _, inner, _, outer = shapely.bounds(across)
    first, last = group[0].end_r, group[-1].end_r
    return float(inner if first is not None and last is not None and last > first else outer)


def _run_in(run: Run, group: list[Move]) -> float | None:
    """Shortest way, along the thread from where the first pass begins, to the metal that stood there before it."""
    stock, first = run.simulation.stock_before.get(group[0].index), group[0].start
    if stock is None or first is None:
        return None
    ways, here = [], None
    for move in group:
        if move.start and move.end and move.start != here:  # not a stroke joined to the one before
            metal = shapely.intersection(shapely.linestrings([move.start, move.end]), stock)
            if not shapely.is_empty(metal):
                length = math.dist(move.start, move.end)
                ahead = [(end - begin) / length for begin, end in zip(move.start, move.end, strict=True)]
                shift = sum(unit * (own - begin) for unit, own, begin in zip(ahead, move.start, first, strict=True))
                ways.append(float(shapely.distance(metal, shapely.points(move.start))) + shift)
        here = move.end
    return min(ways, default=None)
