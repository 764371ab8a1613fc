"""A long curve reduced to what a pixel can show: per column its lowest and highest figure, in their order."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Protocol

import numpy as np

from auditor.reports._shares import Floats


class Banded(Protocol):
    """A figure with its band and limit, row by row."""

    @property
    def values(self) -> Floats: ...  # noqa: D102
    @property
    def low(self) -> Floats: ...  # noqa: D102
    @property
    def high(self) -> Floats: ...  # noqa: D102
    @property
    def limit(self) -> Floats: ...  # noqa: D102


@dataclass(frozen=True, slots=True)
class Envelope:
    """Places along the axis (px) with figures."""

    line: list[tuple[float, float]]
    bands: list[list[tuple[float, float, float]]]  # x, low, high
    limit: list[list[tuple[float, float]]]
    over: list[tuple[float, float]]  # stretches where the figure is over its limit


def envelope(at: Floats, curve: Banded, move: np.ndarray, span: float, width: float) -> Envelope:
    """The envelope of a curve over a time span drawn on that many pixels; between two cuts it falls to nothing."""
    x = at / span * width
    cuts = np.flatnonzero((np.diff(move) != 0) & (np.diff(x) > 1.0)) + 1
    line: list[tuple[float, float]] = [(0.0, 0.0)]
    bands, limits = [], []
    for rows in np.split(np.arange(len(x)), cuts):
        kept = _kept(x[rows], curve.values[rows])
        rows = rows[kept]
        first, last = float(x[rows[0]]), float(x[rows[-1]])
        line += [(first, 0.0), *zip(x[rows].tolist(), curve.values[rows].tolist(), strict=True), (last, 0.0)]
        bands.append(list(zip(x[rows].tolist(), curve.low[rows].tolist(), curve.high[rows].tolist(), strict=True)))
        limits += _known(x[rows], curve.limit[rows])
    line.append((width, 0.0))
    return Envelope(line, bands, limits, _over(x, curve))


def _kept(x: Floats, values: Floats) -> np.ndarray:
    """Rows that a picture needs: first, last, lowest and highest of every half pixel."""
    if len(x) < 3:
        return np.arange(len(x))
    cells = np.floor(x * 2.0)
    begins = np.concatenate(([0], np.flatnonzero(np.diff(cells) != 0) + 1))
    ends = np.concatenate((begins[1:] - 1, [len(x) - 1]))
    order = np.lexsort((values, np.repeat(np.arange(len(begins)), ends - begins + 1)))
    return np.unique(np.concatenate((begins, ends, order[begins], order[ends])))


def _known(x: Floats, limit: Floats) -> list[list[tuple[float, float]]]:
    """Stretches where there is a limit; straight ones by their ends."""
    known = np.isfinite(limit)
    found = []
    for rows in np.split(np.arange(len(x)), np.flatnonzero(np.diff(known.astype(int)) != 0) + 1):
        if not known[rows[0]]:
            continue
        keep = np.ones(len(rows), dtype=bool)
        if len(rows) > 2:
            same = np.isclose(limit[rows][1:-1], limit[rows][:-2]) & np.isclose(limit[rows][1:-1], limit[rows][2:])
            keep[1:-1] = ~same
        rows = rows[keep]
        found.append(list(zip(x[rows].tolist(), limit[rows].tolist(), strict=True)))
    return found


def _over(x: Floats, curve: Banded) -> list[tuple[float, float]]:
    beyond = np.nan_to_num(curve.values) > np.where(np.isfinite(curve.limit), curve.limit, np.inf)
    found: list[tuple[float, float]] = []
    for rows in np.split(np.arange(len(x)), np.flatnonzero(np.diff(beyond.astype(int)) != 0) + 1):
        if len(rows) and beyond[rows[0]]:
            low, high = float(x[rows[0]]), float(x[rows[-1]])
            if found and low - found[-1][1] < 1.0:
                found[-1] = (found[-1][0], high)
            else:
                found.append((low, high))
    return found
