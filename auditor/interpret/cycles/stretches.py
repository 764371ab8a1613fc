"""What a level of a roughing cycle may cut: the open stretches between the walls of the profile."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from auditor.interpret.cycles.call import Stroke
from auditor.interpret.cycles.frame import SAME, Frame, Piece, Spot

SHORTEST = 1e-6  # mm; a stretch shorter than this is none


@dataclass(frozen=True, slots=True)
class Stretch:
    """One open stretch of a level; ``wall`` is the piece of the profile behind which it ends."""

    start: float
    end: float
    wall: int


def floor_before(pieces: Sequence[Piece], origin: Spot, first: Spot) -> tuple[Piece, ...]:
    """The profile with a level piece before it when it begins further along than the cuts do."""
    if first.along <= origin.along + SAME:
        return tuple(pieces)
    return (Piece(Spot(origin.along, first.height), first), *pieces)


def open_stretches(pieces: Sequence[Piece], height: float, origin: float) -> list[Stretch]:
    """Stretches along which the profile lies below ``height``, from ``origin`` on, nearest first.

    Examples
    --------
    >>> dip = [Piece(Spot(0, 5), Spot(4, 1)), Piece(Spot(4, 1), Spot(8, 5))]
    >>> [(s.start, s.end) for s in open_stretches(dip, 3.0, 0.0)]
    [(2.0, 6.0)]
    """
    found: list[Stretch] = []
    for index, piece in enumerate(pieces):
        part = _below(piece, height)
        if part is None:
            continue
        start, end, through = part
        stretch = Stretch(start, end, index if through else index + 1)
        if found and start <= found[-1].end + SAME:
            stretch = Stretch(found.pop().start, end, stretch.wall)
        found.append(stretch)
    clipped = (Stretch(max(stretch.start, origin), stretch.end, stretch.wall) for stretch in found)
    return [stretch for stretch in clipped if stretch.end - stretch.start > SHORTEST]


def _below(piece: Piece, height: float) -> tuple[float, float, bool] | None:
    """The part of a piece below the height, and whether the piece rises through the height."""
    before, after = piece.start.height, piece.end.height
    if min(before, after) >= height - SAME:
        return None
    if max(before, after) <= height + SAME:
        return piece.start.along, piece.end.along, False
    crossing = piece.along_at(height)
    if before < after:
        return piece.start.along, crossing, True
    return crossing, piece.end.along, False


def wall_strokes(
    frame: Frame, pieces: Sequence[Piece], wall: int, height: float, ceiling: float
) -> Iterator[tuple[Stroke, Spot]]:
    """Strokes up the wall behind a stretch, to the level above or to the wall's own top."""
    for piece in pieces[wall:]:
        if piece.end.height <= height + SAME or height >= ceiling - SAME:
            return
        if piece.end.height > ceiling + SAME:
            top = Spot(piece.along_at(ceiling), ceiling)
            yield piece.stroke(frame, top), top
            return
        yield piece.stroke(frame, piece.end), piece.end
        height = piece.end.height
