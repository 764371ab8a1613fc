"""Finished shape: is the part that the program leaves the part that was asked for?

What
    Compares the part as cut in the simulation with the finished outline declared in the job: metal that was cut away
    inside it (gouge), and metal left standing on it.

Why
    A wrong sign, a forgotten compensation, a cycle read in another code system: each leaves a part that is visibly
    wrong, and every block of it looked right by itself.

Formula and source
    Exact geometry of the half-section, within half the diameter tolerance (0.05 mm where none is declared). Inner
    corners may keep the nose radius of the finishing tool, threads may cut into it. Stop: a gouge. Review: metal
    left. The depth told is the greatest distance from the declared outline. Four neighbouring points on one circle,
    or three that join a side tangentially, are taken as an arc drawn with chords, and the arc itself is judged. The
    block named is the cut that came nearest to the place.

Remedy
    Look at that block's words; for slopes and arcs at nose-radius compensation first.
"""

from __future__ import annotations

from collections.abc import Iterator
from itertools import pairwise

import numpy as np
import shapely
from shapely.geometry.base import BaseGeometry

from auditor.checks._outlines import with_round_arcs
from auditor.checks._words import thousandths, x_word, z_word
from auditor.declared.model import Point
from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Kind, Move

CHECK = "finished-shape"
LIMITS: tuple[Limit, ...] = ()
WITHIN = 0.05  # mm on the diameter, where no tolerance is declared (common practice)
RIM_STEP = 0.1  # mm between the places where the depth of a deviation is measured
SPECK = 0.0005  # mm2; smaller differences are chords of arcs


def judge(run: Run) -> Iterator[Finding | NotJudged]:
    """Gouges and metal left on the declared outlines."""
    work, final = run.job.workpiece, run.simulation.final
    if not work.finished and not work.finished_bore:
        return
    slack = 0.5 * (work.diameter_tolerance or WITHIN)
    if work.finished:
        yield from _judge_outline(run, final, work.finished, slack, inside=False)
    if work.finished_bore:
        yield from _judge_outline(run, final, work.finished_bore, slack, inside=True)


def _judge_outline(
    run: Run, final: BaseGeometry, outline: tuple[Point, ...], slack: float, *, inside: bool
) -> Iterator[Finding]:
    """What lies on the axis side of the outline must be metal outside (void in a bore), what lies beyond it not."""
    outline = with_round_arcs(outline)
    under = _under(outline)
    low, _, high, top = under.bounds
    span = shapely.box(low, 0.0, high, max(top, run.simulation.raw.bounds[3]) + 1.0)
    metal = shapely.intersection(_filled(final), span) if not inside else shapely.intersection(final, span)
    if inside:
        beyond = shapely.difference(span, under)
        gouged = shapely.difference(_shrunk(shapely.intersection(beyond, _filled(final)), slack), metal)
        left = shapely.intersection(_shrunk(_opened(under, _corner(run)), slack), metal)
    else:
        gouged = shapely.difference(_shrunk(under, slack), metal)
        left = shapely.difference(metal, shapely.buffer(_opened(under, _corner(run), outwards=True), slack,
                                                        join_style="mitre"))
    gouged = shapely.difference(gouged, _threaded(run, high=span.bounds[3], inside=inside))
    # what stands beyond the outline's ends may leave the nose radius in the corner there
    for level, area, what, margin in (
        (Level.STOP, gouged, "is cut into", slack), (Level.REVIEW, left, "keeps metal on it", slack + _corner(run)),
    ):  # fmt: skip
        worst = max(shapely.get_parts(shapely.intersection(area, _inner(span, margin))), key=shapely.area, default=None)
        if worst is not None and shapely.area(worst) > SPECK:
            yield _finding(run, level, worst, what, slack, outline)


def _threaded(run: Run, high: float, *, inside: bool) -> BaseGeometry:
    """Where threads are cut: an outline does not draw them, their depth is judged by thread-passes."""
    far = 0.0 if inside else high
    zones = []
    for move in run.path.moves:
        if move.kind is Kind.THREAD and move.start and move.end and move.lead and move.start.z != move.end.z:
            flank = move.lead / 2.0 if move.end.z > move.start.z else -move.lead / 2.0  # the V is wider than its tip
            first, last = (move.start.z - flank, move.start.r), (move.end.z + flank, move.end.r)
            zones.append(shapely.polygons([first, last, (last[0], far), (first[0], far)]))
    return shapely.union_all(zones)


def _under(outline: tuple[Point, ...]) -> BaseGeometry:
    """The area between an outline and the axis."""
    points = sorted(outline, key=lambda point: -point.z) if outline[0].z < outline[-1].z else list(outline)
    return shapely.make_valid(shapely.polygons([(points[0].z, 0.0), *points, (points[-1].z, 0.0)]))


def _filled(final: BaseGeometry) -> BaseGeometry:
    """The part with everything between its outer surface and the axis taken as metal."""
    low, _, high, top = final.bounds
    shadow = [final]
    for part in shapely.get_parts(final):
        ring = shapely.get_exterior_ring(part)
        across = shapely.get_coordinates(ring)
        shadow += [
            shapely.polygons([(a[0], 0.0), tuple(a), tuple(b), (b[0], 0.0)])
            for a, b in pairwise(across)
            if a[0] != b[0]
        ]
    return shapely.intersection(shapely.union_all(shadow), shapely.box(low, 0.0, high, top))


def _corner(run: Run) -> float:
    """Largest nose radius among the tools that leave finished surface, mm."""
    finishing = {move.tool for move in run.path.moves if run.simulation.final_surface[move.index]}
    return max((tool.nose_radius for number, tool in run.job.tools.items() if number in finishing), default=0.0)


def _opened(area: BaseGeometry, radius: float, *, outwards: bool = False) -> BaseGeometry:
    """The area with its inner corners rounded as a nose of that radius leaves them."""
    grow = radius if outwards else -radius
    return shapely.buffer(shapely.buffer(area, grow, join_style="mitre"), -grow)


def _shrunk(area: BaseGeometry, by: float) -> BaseGeometry:
    return shapely.buffer(area, -by, join_style="mitre")


def _inner(span: BaseGeometry, margin: float) -> BaseGeometry:
    """The span without its ends, where the outline says nothing, and without the axis."""
    low, _, high, top = span.bounds
    return shapely.box(low + margin, margin, high - margin, top)


def _finding(
    run: Run, level: Level, area: BaseGeometry, what: str, slack: float, outline: tuple[Point, ...]
) -> Finding:
    rim = shapely.get_coordinates(shapely.segmentize(area, RIM_STEP))
    away = shapely.distance(shapely.points(rim), shapely.linestrings(outline))
    deep, (z, r) = float(away.max()), (float(value) for value in rim[int(np.argmax(away))])
    low_z, _, high_z, _ = area.bounds
    move = _nearest(run, z, r)
    message = f"The finished outline {what} between {z_word(run, low_z)} and {z_word(run, high_z)}, by about " \
              f"{thousandths(run, deep)} at {x_word(run, r)} {z_word(run, z)}; {thousandths(run, slack)} is allowed."
    figures = {"value": deep, "limit": slack, "unit": "mm", "at": Point(z, r)}
    remedy = "Look at this block's words and at nose-radius compensation."
    if move is None:
        return Finding(CHECK, level, 1, None, None, message, at=Point(z, r), value=deep, limit=slack, unit="mm")
    return run.finding(CHECK, level, move, message, remedy=remedy, **figures)


def _nearest(run: Run, z: float, r: float) -> Move | None:
    """The cut whose path came nearest to a place."""
    loads = run.prediction.loads
    if not len(loads.move):
        return None
    start = np.hypot(loads.z - z, loads.r - r)
    best, found = np.inf, None
    for index in np.unique(loads.move):
        move = run.path.moves[int(index)]
        if move.start is None or move.end is None:
            continue
        way = shapely.distance(shapely.linestrings([move.start, move.end]), shapely.points(z, r))
        if way <= best:
            best, found = float(way), move
    return found if found is not None else run.path.moves[int(loads.move[int(np.argmin(start))])]
