"""Stock and engagement against the bare polygon operations they rest on."""

from __future__ import annotations

from collections.abc import Iterator
from functools import partial
from itertools import pairwise
from unittest.mock import patch

import shapely
from shapely import affinity

from auditor.declared.model import Job
from auditor.interpret.moves import Interpretation, Kind
from auditor.predict import predict
from auditor.simulate import simulate
from auditor.simulate.outline import Outline
from auditor.simulate.pieces import pieces
from auditor.simulate.stock import raw_stock, swept
from auditor.simulate.tool_outline import tool_outline
from tests.benchmarks.programs import dense_points, wavy_strokes
from tests.benchmarks.timing import Row, seconds, side_by_side
from tests.simulate.workshop import COPIER, Path, bar, interpreted, job


def rows(dense: int = 100_000) -> Iterator[Row]:
    """Per segment, 5,000 moves, dense points, growth; ``dense`` is the largest number of points."""
    yield _per_segment()
    yield _many_moves()
    yield _merging(dense)
    yield from _growth(dense)


def _cut(path: Path) -> None:
    declared, moves = _job(), interpreted(path)
    predict(moves, simulate(moves, declared), declared)


def _job() -> Job:
    return job(bar(60.0, 125.0))


def _cuts(path: Path) -> int:
    return sum(move.kind is not Kind.RAPID for move in path.moves)


def _per_segment() -> Row:
    path = wavy_strokes(600)
    disc = shapely.Point(0.0, 0.0).buffer(10.0, quad_segs=50)
    other = affinity.translate(disc, 5.0, 0.0)
    cuts = _cuts(path)
    moves, declared = interpreted(path), _job()
    ratio = side_by_side(
        lambda: simulate(moves, declared), lambda: [shapely.difference(disc, other) for _ in range(cuts)]
    )
    return Row("stock and engagement, one straight cut", "one difference of 200-vertex polygons", ratio, 10.0)


def _many_moves() -> Row:
    path = wavy_strokes(5_000)
    sweeps = _sweeps(interpreted(path), tool_outline(COPIER))

    def differences() -> None:
        stock = raw_stock(bar(60.0, 125.0))
        for sweep in sweeps:
            stock = shapely.difference(stock, sweep)

    ratio = side_by_side(lambda: _cut(path), differences)
    return Row(f"{_cuts(path):,} cuts with their forces", "differences alone, same cuts", ratio, 5.0)


def _sweeps(path: Interpretation, outline: Outline) -> list[shapely.Geometry]:
    return [
        swept(outline.nodes(piece.direction)[0], piece.step, piece.start)
        for move in path.moves
        for piece in pieces(move)
    ]


def _merging(points: int) -> Row:
    path = dense_points(points)
    merged = seconds(lambda: _cut(path))
    with patch("auditor.simulate.follow.runs", lambda moves: ((move,) for move in moves)):
        single = seconds(lambda: _cut(path))
    return Row(f"{_cuts(path):,} dense points, merged", "the same cut one by one", merged / single, 0.25)


def _growth(largest: int) -> Iterator[Row]:
    paths = {count: dense_points(count) for count in (1_000, 10_000, 100_000) if count <= largest}
    _cut(paths[1_000])  # what is loaded only once is no part of growth
    times = {count: seconds(partial(_cut, path)) for count, path in paths.items()}
    for few, many in pairwise(paths):
        ratio = times[many] / times[few] / (many / few)
        yield Row(f"cost of a cut at {many:,} dense points", f"at {few:,}", ratio, 1.3)
