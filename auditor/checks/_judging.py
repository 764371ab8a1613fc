"""The default rule: what lasts one revolution, against a limit, with the prediction's band.

A load that lasts less than one feed of travel (one turn of the work) is a flicker at the edge of a corner and
no reason to stop. Travel runs on across the joints of short moves, so a profile of many small blocks is judged
as the one cut it is.
"""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass, replace

import numpy as np
from numpy.typing import NDArray

from auditor.findings import Finding, Level, Limit, NotJudged, Run
from auditor.interpret.moves import Move
from auditor.predict.loads import Loads

Floats = NDArray[np.float64]

THRUST_SCATTER = 0.5  # one-sided relative; the two published ways to thrust differ by 1.5 to 1.7 on light cuts
MOST_CURED = 20  # blocks a check for which a way out is computed
SMALL_FORCE = 50.0  # N; below it a predicted force is smaller than what is not modelled (seals, chips, way friction)
_GRAVITY = {Level.STOP: 0, Level.REVIEW: 1, Level.NOTE: 2}


@dataclass(frozen=True, slots=True)
class Excess:
    """A predicted figure of one move that lasts a revolution and reaches over its limit."""

    move: Move
    row: int  # of Loads, where it is largest
    value: float
    band: tuple[float, float]
    limit: float
    curable: bool = True  # whether a way out is worth computing: the gravest blocks only, each takes a while

    @property
    def level(self) -> Level:
        """Stop when the expected value is over the limit, review when only its band is."""
        return Level.STOP if self.value > self.limit else Level.REVIEW

    @property
    def gravity(self) -> tuple[int, float]:
        """Sorting key, gravest first."""
        return _GRAVITY[self.level], -self.value / self.limit


def rows_of(loads: Loads, move: int) -> slice:
    """The rows of one move; rows stand in order of execution."""
    low, high = np.searchsorted(loads.move, (move, move + 1))
    return slice(int(low), int(high))


def lasting(loads: Loads, figure: Floats, move: int, over: float = 0.0) -> float:
    """The largest value of ``figure`` that holds for one feed of travel touching the move; 0 where none is ``over``."""
    own = rows_of(loads, move)
    values = figure[own]
    values = np.where(np.isnan(values), -np.inf, values)
    if not len(values) or values.max() <= over:
        return 0.0
    near = _neighbourhood(loads, own)
    travel, level = loads.travel[near], np.nan_to_num(figure[near], nan=-np.inf)
    inside = loads.move[near] == move
    gaps = 1 + np.flatnonzero((np.diff(travel) > 1e-6) & (np.diff(loads.move[near]) > 0))  # a move that cut nothing
    travel, level = np.insert(travel, gaps, travel[gaps]), np.insert(level, gaps, -np.inf)
    inside = np.insert(inside, gaps, False)
    need = min(_feed(loads, own), float(travel[-1] - travel[0])) * (1.0 - 1e-9)
    low, high = over, float(values.max())
    if _holds(travel, level, inside, high, need):
        return high
    if over > 0.0 and not _holds(travel, level, inside, over, need):
        return 0.0
    certain = 1e-4 * high
    while high - low > certain:
        middle = 0.5 * (low + high)
        if _holds(travel, level, inside, middle, need):
            low = middle
        else:
            high = middle
    return low


def _feed(loads: Loads, own: slice) -> float:
    feeds = loads.feed[own]
    known = feeds[np.isfinite(feeds)]
    return float(known.max()) if len(known) else 0.0


def _neighbourhood(loads: Loads, own: slice) -> slice:
    """The rows of the same unbroken run within one feed of travel before and behind the move."""
    feed = _feed(loads, own)
    run = loads.run[own.start]
    first, last = np.searchsorted(loads.run, (run, run + 1))
    travel = loads.travel[first:last]
    low = int(first + np.searchsorted(travel, loads.travel[own.start] - feed, side="left"))
    high = int(first + np.searchsorted(travel, loads.travel[own.stop - 1] + feed, side="right"))
    return slice(max(int(first), min(low - 1, own.start)), min(int(last), max(high + 1, own.stop)))


def _holds(travel: Floats, level: Floats, inside: NDArray[np.bool_], at_least: float, need: float) -> bool:
    """Whether a stretch of travel at or above ``at_least``, as long as ``need``, touches the move."""
    above = level >= at_least
    edges = np.flatnonzero(np.diff(np.concatenate(([False], above, [False])).astype(np.int8)))
    for first, behind in zip(edges[::2], edges[1::2], strict=True):
        if not inside[first:behind].any():
            continue
        start, end = float(travel[first]), float(travel[behind - 1])
        if first > 0:
            start -= _ramp(travel, level, first - 1, first, at_least)
        if behind < len(level):
            end += _ramp(travel, level, behind, behind - 1, at_least)
        if end - start >= need:
            return True
    return False


def _ramp(travel: Floats, level: Floats, below: int, above: int, at_least: float) -> float:
    """Travel on the slope between a node below and its neighbour above, as far as the slope is above."""
    rise = level[above] - level[below]
    if not np.isfinite(rise) or rise <= 0.0:
        return 0.0
    return float(abs(travel[above] - travel[below]) * (level[above] - at_least) / rise)


def over_limit(run: Run, figure: Floats, limit: Floats | float, scatter: Floats | float) -> Iterator[Excess]:
    """Every move whose figure, or whose band, passes the limit for at least a revolution."""
    loads = run.prediction.loads
    limits = np.broadcast_to(np.asarray(limit, dtype=float), figure.shape)
    scatters = np.broadcast_to(np.asarray(scatter, dtype=float), figure.shape)
    share = figure / limits
    upper = share * np.sqrt(scatters**2 + (run.prediction.wear_factor - 1.0) ** 2) + share
    for index in np.unique(loads.move[np.nan_to_num(upper) > 1.0]):
        top = lasting(loads, upper, int(index), over=1.0)
        if top <= 1.0:
            continue
        own = rows_of(loads, int(index))
        row = own.start + int(np.nanargmax(upper[own]))
        value = lasting(loads, share, int(index)) * float(limits[row])
        low, high = run.prediction.band(value, float(scatters[row]))
        band = (low, max(high, top * float(limits[row])))
        yield Excess(run.path.moves[int(index)], row, value, band, float(limits[row]))


def worst_by_block(excesses: Iterable[Excess]) -> list[Excess]:
    """The gravest excess of every program line, in program order."""
    kept: dict[int, Excess] = {}
    for excess in excesses:
        other = kept.get(excess.move.line)
        if other is None or excess.gravity < other.gravity:
            kept[excess.move.line] = excess
    gravest = sorted(kept.values(), key=lambda excess: excess.gravity)[:MOST_CURED]
    lines = {excess.move.line for excess in gravest}
    return [replace(kept[line], curable=line in lines) for line in sorted(kept)]


def one_per_block(verdicts: Iterable[Finding | NotJudged]) -> Iterator[Finding | NotJudged]:
    """One finding a block, its worst; a reason for not judging is said once."""
    kept: dict[int, Finding] = {}
    said: set[NotJudged] = set()
    for verdict in verdicts:
        if isinstance(verdict, NotJudged):
            if verdict not in said:
                said.add(verdict)
                yield verdict
        elif verdict.line not in kept or _graver(verdict, kept[verdict.line]):
            kept[verdict.line] = verdict
    yield from (kept[line] for line in sorted(kept))


def _graver(one: Finding, other: Finding) -> bool:
    return (_GRAVITY[one.level], -_distance(one)) < (_GRAVITY[other.level], -_distance(other))


def _distance(finding: Finding) -> float:
    if finding.value is None or not finding.limit:
        return 0.0
    return abs(finding.value - finding.limit) / abs(finding.limit)


def threshold(run: Run, limit: Limit) -> float:
    """The value in force: the job's own, or the check's default."""
    return run.limits.get(limit.name, limit.default)


def origin(run: Run, limits: Sequence[Limit]) -> str:
    """Where the thresholds come from, as a closing half-sentence."""
    told = []
    for limit in limits:
        value = threshold(run, limit)
        source = "set in this job" if limit.name in run.job.limits else limit.provenance
        unit = f" {limit.unit}" if limit.unit else ""
        told.append(f"{limit.meaning} {value:g}{unit} ({source})")
    return f"Threshold: {'; '.join(told)}."


def cutting_moves(run: Run) -> NDArray[np.bool_]:
    """Per move: whether it takes stock off, rapids included."""
    samples = run.simulation.samples
    found = np.zeros(len(run.path.moves), dtype=bool)
    found[samples.move[samples.high - samples.low > 1e-6]] = True
    return found
