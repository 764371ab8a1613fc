"""Where the numbers go, so that none covers another."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

Place = tuple[float, float]
Box = tuple[float, float, float, float]

_APART = 29.0  # px between two numbers
_RINGS = (24.0, 40.0, 58.0, 78.0, 100.0, 124.0, 150.0)
_TURNS = 16
_EDGE = 12.0


@dataclass(frozen=True, slots=True)
class Label:
    """A number's place and what it points at."""

    anchor: Place
    at: Place


def placed(anchors: Sequence[Place], box: Box) -> list[Label]:
    """A place for each number: as near as can be to its anchor, away from the others and inside the box."""
    taken: list[Place] = []
    labels = []
    for anchor in anchors:
        at = next((spot for spot in _spots(anchor, box) if _free(spot, taken)), (anchor[0], anchor[1] - _RINGS[0]))
        taken.append(at)
        labels.append(Label(anchor, at))
    return labels


def _spots(anchor: Place, box: Box) -> list[Place]:
    """Rings round the anchor, starting straight above."""
    x, y = anchor
    spots = [
        (x + ring * math.sin(math.tau * turn / _TURNS), y - ring * math.cos(math.tau * turn / _TURNS))
        for ring in _RINGS
        for turn in sorted(range(_TURNS), key=lambda turn: min(turn, _TURNS - turn))
    ]
    return [spot for spot in spots if box[0] + _EDGE <= spot[0] <= box[2] - _EDGE and
            box[1] - _EDGE <= spot[1] <= box[3] - _EDGE]


def _free(spot: Place, taken: Sequence[Place]) -> bool:
    return all(math.hypot(spot[0] - x, spot[1] - y) >= _APART for x, y in taken)
