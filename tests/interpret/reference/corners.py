"""Chamfers and fillets at the corners of a straight-line path (trade knowledge, from memory)."""

from __future__ import annotations

from collections.abc import Sequence
from math import acos, hypot, sin, tan

from tests.interpret.reference.steps import Step

Corner = tuple[str, float] | None  # ("C", size) or ("R", radius)
Place = tuple[float, float]  # z, r


def towards(start: Place, end: Place, length: float) -> Place:
    whole = hypot(end[0] - start[0], end[1] - start[1])
    share = length / whole
    return start[0] + share * (end[0] - start[0]), start[1] + share * (end[1] - start[1])


def broken(start: Place, corners: Sequence[tuple[Place, Corner]]) -> list[Step]:
    """The steps along corner points with each corner broken as asked; the last point carries none."""
    steps = []
    before = start
    for number, (place, word) in enumerate(corners):
        if word is None:
            steps.append(_line(place))
            before = place
            continue
        after = corners[number + 1][0]
        kind, size = word
        back = size if kind == "C" else size / tan(angle(before, place, after) / 2)
        first, last = towards(place, before, back), towards(place, after, back)
        steps.append(_line(first))
        steps.append(_line(last) if kind == "C" else _fillet(before, place, after, first, last, size))
        before = place
    return steps


def angle(before: Place, place: Place, after: Place) -> float:
    """Inside angle at a corner."""
    a, b = (before[0] - place[0], before[1] - place[1]), (after[0] - place[0], after[1] - place[1])
    return acos(max(-1.0, min(1.0, (a[0] * b[0] + a[1] * b[1]) / (hypot(*a) * hypot(*b)))))


def _line(place: Place) -> Step:
    return Step("F", 2 * place[1], place[0])


def _fillet(before: Place, place: Place, after: Place, first: Place, last: Place, radius: float) -> Step:
    middle = ((first[0] + last[0]) / 2, (first[1] + last[1]) / 2)
    centre = towards(place, middle, radius / sin(angle(before, place, after) / 2))
    cross = (place[0] - before[0]) * (after[1] - place[1]) - (place[1] - before[1]) * (after[0] - place[0])
    return Step("CCW" if cross > 0 else "CW", 2 * last[1], last[0], 2 * centre[1], centre[0])
