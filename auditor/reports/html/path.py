"""The tool path as lines: every stretch in the class of the share of the limit that it uses."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from itertools import pairwise

import numpy as np

from auditor.findings import Run
from auditor.interpret.moves import Kind
from auditor.reports._shares import Floats
from auditor.reports.html.frame import Frame
from auditor.reports.html.svg import short
from auditor.simulate.pieces import pieces

# Upper bounds of the classes; what is beyond the last is over the limit.
BOUNDS = (0.25, 0.5, 0.75, 1.0)
CLASSES = tuple(f"s{index}" for index in range(len(BOUNDS) + 1))
WORDS = ("under 25 %", "25 to 50 %", "50 to 75 %", "75 to 100 %", "over the limit")
_APART = 1.5  # px between the points that are kept on a curve


@dataclass(frozen=True, slots=True)
class Line:
    """Path data of all stretches of one style."""

    style: str
    data: str


def lines(run: Run, worst: Floats, frame: Frame) -> list[Line]:
    """The whole path, from what is least to what is most: rapids, feed in air, cuts by class."""
    found = [Line("rapid", "".join(_rapids(run, frame))), Line("air", "".join(_air(run, frame)))]
    found += [Line(CLASSES[index], data) for index, data in sorted(_cuts(run, worst, frame).items())]
    return [line for line in found if line.data]


def classes(worst: Floats) -> np.ndarray:
    """Class of each row of the loads; where no limit is declared the least."""
    return np.searchsorted(np.array(BOUNDS), np.nan_to_num(worst), side="left")


def _rapids(run: Run, frame: Frame) -> Iterator[str]:
    for move in run.path.moves:
        if move.kind is Kind.RAPID and move.start is not None and move.end is not None:
            yield _stroke(frame.points([move.start, move.end]))


def _air(run: Run, frame: Frame) -> Iterator[str]:
    cuts = set(run.prediction.loads.move.tolist())
    for move in run.path.moves:
        if move.kind is Kind.RAPID or move.index in cuts or move.start is None or move.end is None:
            continue
        points = [move.start, *((piece.start.z + piece.step[0], piece.start.r + piece.step[1])
                                for piece in pieces(move))]
        yield _stroke(_sparse(frame.points(points)))


def _stroke(points: list[tuple[float, float]]) -> str:
    return "M" + "L".join(f"{short(x)} {short(y)}" for x, y in points)


def _sparse(points: list[tuple[float, float]]) -> list[tuple[float, float]]:
    kept = points[:1]
    for x, y in points[1:-1]:
        if abs(x - kept[-1][0]) + abs(y - kept[-1][1]) >= _APART:
            kept.append((x, y))
    return kept + points[-1:] if len(points) > 1 else kept


def _cuts(run: Run, worst: Floats, frame: Frame) -> dict[int, str]:
    """Path data by class: a stretch between two rows counts as the worse of them."""
    loads = run.prediction.loads
    if loads.move.size < 2:
        return {}
    x, y = frame.columns(loads.z, loads.r)
    grade = classes(worst)
    stretch = np.maximum(grade[:-1], grade[1:])
    joined = np.diff(loads.move) == 0
    engaged = (loads.depth[:-1] > 0.0) | (loads.depth[1:] > 0.0)
    stretch = np.where(joined, np.where(engaged, stretch, 0), -1)
    changes = np.flatnonzero(np.diff(stretch) != 0) + 1
    begins = np.concatenate(([0], changes, [len(stretch)]))
    curved = np.array([move.centre is not None for move in run.path.moves])[loads.move]
    along = np.concatenate(([0.0], np.cumsum(np.hypot(np.diff(x), np.diff(y)))))
    found: dict[int, list[str]] = {}
    for begin, end in pairwise(begins.tolist()):
        index = int(stretch[begin])
        if index >= 0:
            points = _thinned(x, y, along, begin, end, bool(curved[begin]))
            found.setdefault(index, []).append(_stroke(points))
    return {index: "".join(parts) for index, parts in found.items()}


def _thinned(x: Floats, y: Floats, along: Floats, begin: int, end: int, curved: bool) -> list[tuple[float, float]]:
    """Places of rows ``begin`` to ``end``: the ends of a straight stretch, on a curve what a pixel can show."""
    rows = [begin, end]
    if curved:
        cells = np.floor(along[begin : end + 1] / _APART)
        rows = sorted({begin, *(begin + np.flatnonzero(np.diff(cells)) + 1).tolist(), end})
    return [(float(x[row]), float(y[row])) for row in rows]
